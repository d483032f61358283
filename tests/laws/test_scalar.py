import cmath
import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.laws import Amplitude, Disc, HalfPlane, ScalarLaw
from fastaxis.maths import NUMBERS, Pattern

K = 2 * math.pi / 1e-6
places = st.floats(-2e-3, 2e-3)
laws = st.builds(
    ScalarLaw,
    st.builds(Amplitude, st.floats(0, 1), st.floats(-6, 6)),
    charge=st.integers(-4, 4),
    vergence=st.floats(-2, 2),
    tilt=st.tuples(st.floats(-1e-3, 1e-3), st.floats(-1e-3, 1e-3)),
    centre=st.tuples(places, places),
)
# Phases reach k*2e-3*4e-3 = 50 rad and k*tilt*4e-3 = 25 rad, each with some roundings of 1.1e-16.
ROUNDING = 1e-12
quick = settings(max_examples=50, deadline=None)


def value(law, x, y):
    """The transmission at a place of the beam's frame, written out."""
    dx, dy = x - law.centre[0], y - law.centre[1]
    phase = law.charge * math.atan2(dy, dx) - K * law.vergence * (dx * dx + dy * dy) / 2
    phase += K * (law.tilt[0] * dx + law.tilt[1] * dy)
    return law.transmission.value(NUMBERS, dx, dy) * cmath.exp(1j * phase)


@quick
@given(laws, places, places)
def test_backward_is_the_same_transmission_at_minus_x(law, x, y):
    assert value(law.backward(), -x, y) == pytest.approx(value(law, x, y), abs=ROUNDING)


@quick
@given(laws, places, places)
def test_mirrored_in_y_is_the_same_transmission_at_minus_y(law, x, y):
    assert value(law.mirrored("y"), x, -y) == pytest.approx(value(law, x, y), abs=ROUNDING)


@quick
@given(laws, places, places)
def test_backward_twice_restores(law, x, y):
    assert value(law.backward().backward(), x, y) == pytest.approx(value(law, x, y), abs=ROUNDING)


def test_charge_reverses_when_met_from_behind():
    back = ScalarLaw(charge=3).backward()
    assert back.charge == -3
    assert back.transmission.phase == pytest.approx(3 * math.pi, abs=0)


def test_patterned_mask_is_mirrored():
    law = ScalarLaw(Amplitude(1.0, Pattern(lambda x, y: 1e3 * x)), charge=1)
    assert value(law.backward(), -1e-3, 4e-4) == pytest.approx(value(law, 1e-3, 4e-4), abs=ROUNDING)


def test_stop_is_mirrored():
    law = ScalarLaw(stop=HalfPlane(0.0, 1.0, 0.0))
    assert law.backward().stop.depth(-1.0, 0.0) == 1.0


def test_uniform_only_without_any_structure():
    assert ScalarLaw(Amplitude(0.5, 1.0)).uniform
    for law in (ScalarLaw(charge=1), ScalarLaw(vergence=1.0), ScalarLaw(tilt=(0.0, 1e-3)), ScalarLaw(stop=Disc(1.0))):
        assert not law.uniform


def test_values_list_everything_that_may_hold_a_letter():
    assert ScalarLaw(Amplitude(0.1, 0.2), 3, 0.4, (0.5, 0.6), Disc(0.7), (0.8, 0.9)).values == (
        0.1, 0.2, 3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9,
    )  # fmt: skip
