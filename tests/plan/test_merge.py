import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fastaxis.laws import ScalarLaw
from fastaxis.maths import NUMBERS
from fastaxis.plan.merge import split_lens

millimetres = st.floats(-3e-3, 3e-3)


@given(st.floats(-5, 5), millimetres, millimetres, millimetres, millimetres, st.floats(-1e-3, 1e-3))
def test_an_off_centre_lens_is_a_centred_one_a_tilt_and_a_phase(vergence, cx, cy, x, y, tilt):
    wavelength = 500e-9
    k = 2 * np.pi / wavelength
    rest, lens = split_lens(ScalarLaw(vergence=vergence, centre=(cx, cy), tilt=(tilt, 0.0)), wavelength)
    whole = -k * vergence * ((x - cx) ** 2 + (y - cy) ** 2) / 2 + k * tilt * (x - cx)
    (tx, ty), phase = rest.tilt, np.angle(rest.transmission.value(NUMBERS))
    parts = k * lens.c * (x**2 + y**2) / 2 + k * (tx * (x - cx) + ty * (y - cy)) + phase
    # Phases of up to 1e3 rad carry 1e-13 of rounding; three of them are added.
    assert np.exp(1j * whole) == pytest.approx(np.exp(1j * parts), abs=1e-11)
