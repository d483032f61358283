import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fastaxis.engines.grid.band import band_limit, cut_band


@given(st.floats(1e-3, 1e-1), st.floats(1e-3, 10), st.floats(300e-9, 2e-6))
def test_at_the_limit_the_transfer_function_turns_by_pi_a_sample(window, distance, wavelength):
    f = band_limit(window, distance, wavelength)
    fringes = distance * f / np.sqrt(1 / wavelength**2 - f**2)
    # 1/lambda^2 - f^2 cancels when the limit is loose: up to 1e-16 (2 z/window)^-2 <= 1e-11.
    assert fringes == pytest.approx(window / 2, rel=1e-9)


def test_what_is_cut_is_counted():
    spectrum = np.ones((2, 8, 8), dtype=complex)
    frequency = np.fft.fftfreq(8)
    assert cut_band(spectrum, frequency, 0.3) == pytest.approx(1 - (5 / 8) ** 2)
    assert np.count_nonzero(spectrum) == 2 * 25
    assert cut_band(spectrum, frequency, 0.6) == 0.0
