import numpy as np
import pytest

from fastaxis.laws import Amplitude, AxisLaw, CircularLaw, Flip, Passage, ScalarLaw, TravelLaw
from fastaxis.maths import NUMBERS, Pattern

D = np.diag([-1.0, 1.0])
PLATE = AxisLaw(Amplitude(0.9, -0.5), Amplitude(0.9, 0.5), 0.4)
TWIST = CircularLaw(Amplitude(phase=-0.3), Amplitude(phase=0.3))


def matrix(passage):
    out = np.eye(2, dtype=complex)
    for law in passage.laws:
        out = np.array(law.linear(NUMBERS), dtype=complex) @ out
    return out


def test_through_backward_is_d_jt_d_of_the_whole():
    passage = Passage((PLATE, TWIST, AxisLaw(Amplitude(), Amplitude(0.1), -1.0)))
    # Three 2x2 products.
    assert matrix(passage.backward()) == pytest.approx(D @ matrix(passage).T @ D, abs=1e-15)


def test_backward_takes_the_laws_in_reverse():
    lens, space = ScalarLaw(vergence=2.0), TravelLaw.free(0.1)
    assert Passage((lens, space)).backward().laws == (space, lens.backward())


def test_reflection_appends_the_frame_change():
    assert Passage((PLATE,), "x").steps() == (PLATE, Flip("x"))
    assert Passage((PLATE,)).steps() == (PLATE,)


@pytest.mark.parametrize("axis", ["x", "y"])
def test_reflection_backward_is_d_jt_d(axis):
    passage = Passage((AxisLaw(Amplitude(0.9, 0.2), Amplitude(0.7, 3.0)),), axis)
    back = passage.backward()
    assert back.reflected == axis
    assert matrix(back) == pytest.approx(D @ matrix(passage).T @ D, abs=1e-15)


@pytest.mark.parametrize("axis", ["x", "y"])
def test_the_way_back_by_a_mirror_meets_each_place_of_it_again(axis):
    # A mirror with a phase pattern. Follow one ray there: it leaves the place (x, y) at the flipped place. Sent back,
    # the frame of the new beam has x reversed; it must meet the same phase and come out where the first one came from.
    phase = Pattern(lambda x, y: 5 * x + 11 * y)
    passage = Passage((ScalarLaw(Amplitude(1.0, phase)),), axis)
    x, y = 0.3, 0.2
    met = phase(x, y)
    leaves = (-x, y) if axis == "x" else (x, -y)
    returns = (-leaves[0], leaves[1])
    assert passage.backward().laws[0].transmission.phase(*returns) == pytest.approx(met, abs=1e-15)
    again = (-returns[0], returns[1]) if axis == "x" else (returns[0], -returns[1])
    assert again == (-x, y)  # the place it came from, in the frame of the beam that goes back


def test_backward_twice_restores():
    for passage in (Passage((PLATE, TWIST)), Passage((AxisLaw(),), "x"), Passage((AxisLaw(),), "y")):
        assert matrix(passage.backward().backward()) == pytest.approx(matrix(passage), abs=1e-15)
        assert passage.backward().backward().reflected == passage.reflected


def test_flip_is_its_own_way_back():
    assert Flip("y").backward() == Flip("y").mirrored("x") == Flip("y")
