import numpy as np
import pytest

from fastaxis.engines.azimuthal.averaging import LONGEST, averaged, taps


@pytest.mark.parametrize("reach", range(LONGEST + 1))
def test_the_mean_of_a_polynomial_is_exact(reach):
    x = np.arange(-reach, reach + 1)
    for degree in range(2 * reach + 2):
        mean = (0.5 ** (degree + 1) - (-0.5) ** (degree + 1)) / (degree + 1)
        # Terms as large as reach^degree cancel.
        assert taps(reach) @ x.astype(float) ** degree == pytest.approx(mean, abs=4e-16 * (1 + reach) ** degree)


def test_order_of_convergence():
    """The error of a filter of reach 2 falls as the 6th power of the pitch."""
    errors, pitches = [], np.array([0.8, 0.4, 0.2])
    for h in pitches:
        x = np.arange(-2, 8) * h
        samples = np.multiply.outer(np.cos(x), np.cos(x))
        exact = np.multiply.outer(np.cos(x[2:-2]), np.cos(x[2:-2])) * np.sinc(h / 2 / np.pi) ** 2
        errors.append(abs(averaged(samples, 2, 1) - exact).max())
    slope = np.polyfit(np.log(pitches), np.log(errors), 1)[0]
    assert slope == pytest.approx(6, abs=0.2)


def test_cells_are_gathered_into_pixels():
    samples = np.arange(24.0).reshape(4, 6)
    assert np.array_equal(averaged(samples, 0, 2), samples.reshape(2, 2, 3, 2).mean(axis=(1, 3)))
