import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements import FaradayRotator, Mirror, Rotator
from fastaxis.light import D, H

angles = st.floats(-6, 6)
quick = settings(max_examples=50, deadline=None)
ROUNDING = 1e-14  # products of up to four 2x2 matrices with entries up to 1


def test_h_turned_by_45_degrees_is_d(jones):
    assert jones(Rotator(angle=np.pi / 4)) @ H.jones == pytest.approx(D.jones, abs=ROUNDING)


@quick
@given(angles, st.floats(0, 1), st.sampled_from([Rotator, FaradayRotator]))
def test_loss_is_the_transmission(jones, angle, transmission, kind):
    matrix = jones(kind(angle=angle, transmission=transmission))
    assert matrix @ matrix.conj().T == pytest.approx(transmission * np.eye(2), abs=ROUNDING)


@quick
@given(angles)
def test_double_pass(jones, angle):
    mirror = jones(Mirror(), ("front", "front"))
    for part, total in ((Rotator(angle=angle), 0), (FaradayRotator(angle=angle), 2)):
        back = jones(part, ("back", "front")) @ mirror @ jones(part)
        once = jones(Rotator(angle=angle))
        expected = mirror @ np.linalg.matrix_power(once, total)
        assert back == pytest.approx(expected, abs=ROUNDING)


@pytest.mark.parametrize("kind", [Rotator, FaradayRotator])
@pytest.mark.parametrize("ways", [("front", "back"), ("back", "front")])
def test_numbers_agree_with_letters(agrees, kind, ways):
    agrees(kind, {"angle": 0.4}, ways)
