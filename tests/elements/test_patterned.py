import math

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.elements import Mask, PatternedPolarizer, PatternedRetarder, Polarizer, QPlate, Retarder
from fastaxis.errors import ParameterError
from fastaxis.maths import Pattern
from fastaxis.units import um

ROUNDING = 1e-14  # one 2x2 matrix, its angle by two routes
D = np.diag([-1.0, 1.0])
PLACES = [(0.3, 0.1), (-0.2, 0.5), (-0.4, -0.7)]


def spot(x, y):
    return {"x": np.array(x), "y": np.array(y)}


@pytest.mark.parametrize(("x", "y"), PLACES)
def test_drawn_as_a_q_plate_it_is_one(jones, x, y):
    drawn = PatternedRetarder(fast=lambda x, y: 0.5 * np.arctan2(y, x) + 0.3, retardance=2.0)
    assert jones(drawn, **spot(x, y)) == pytest.approx(
        jones(QPlate(q=0.5, offset=0.3, retardance=2.0), phi=math.atan2(y, x)), abs=ROUNDING
    )


@pytest.mark.parametrize(("x", "y"), PLACES)
def test_patterned_retardance(jones, x, y):
    part = PatternedRetarder(slow=0.4, retardance=lambda x, y: 1 + x - y)
    assert jones(part, **spot(x, y)) == pytest.approx(jones(Retarder(slow=0.4, retardance=1 + x - y)), abs=ROUNDING)


@pytest.mark.parametrize(("x", "y"), PLACES)
def test_patterned_slow_axis(jones, x, y):
    part = PatternedRetarder(slow=lambda x, y: x * y, retardance=1.0)
    assert jones(part, **spot(x, y)) == pytest.approx(jones(Retarder(slow=x * y, retardance=1.0)), abs=ROUNDING)


@pytest.mark.parametrize(("x", "y"), PLACES)
@pytest.mark.parametrize(
    "part",
    [
        PatternedRetarder(fast=lambda x, y: 2 * x + y, retardance=lambda x, y: 1 + x),
        PatternedPolarizer(axis=lambda x, y: 2 * x + y, extinction=30, transmission=0.9),
    ],
    ids=["retarder", "polarizer"],
)
def test_reciprocal_from_behind(jones, part, x, y):
    back = jones(part, ("back", "front"), **spot(-x, y))
    assert back == pytest.approx(D @ jones(part, **spot(x, y)).T @ D, abs=ROUNDING)


def test_cells_run_along_plus_y(jones):
    cells = np.array([[0.0, 0.1, 0.2], [0.3, 0.4, 0.5]])
    part = PatternedPolarizer(axis=cells, pixel=8 * um)
    assert jones(part, **spot(8 * um, 4 * um)) == pytest.approx(jones(Polarizer(axis=0.5)), abs=ROUNDING)
    assert jones(part, **spot(-8 * um, -4 * um)) == pytest.approx(jones(Polarizer(axis=0.0)), abs=ROUNDING)


def test_a_pattern_is_taken_as_it_is():
    cells = Pattern(np.eye(2), 1e-3)
    assert PatternedPolarizer(axis=cells).axis is cells
    shifted = PatternedPolarizer(axis=2 * Pattern(lambda x, y: x) + 0.5).axis
    assert shifted(np.array([0.1]), np.array([0.0])) == 0.7


@pytest.mark.parametrize(
    ("make", "says"),
    [
        (
            lambda: PatternedRetarder(fast=lambda x, y: np.log(x)),
            r"fast gives NaN at 2 of 6 samples \(first at x = -0.1 mm",
        ),
        (lambda: PatternedPolarizer(axis=Pattern(lambda x, y: 1 / (x - x))), "axis gives NaN|axis gives inf"),
        (lambda: Mask(phase=lambda x, y: x / 0), "phase"),
        (
            lambda: Mask(transmission=lambda x, y: x / abs(x)),
            "transmission gives -1 at 2 of 6 samples .*shares of power",
        ),
    ],
)
def test_a_function_that_gives_no_numbers_is_refused_when_it_is_declared(make, says):
    with pytest.raises(ParameterError, match=says):
        make()


def test_a_function_that_gives_no_number_somewhere_is_refused_with_the_place():
    """Right where it is tried out, and NaN 2 mm off the axis, where the beam still has some samples."""
    plate = PatternedRetarder(fast=lambda x, y: np.sqrt(2e-3 - abs(x)), name="plate")
    train = fa.Train(wavelength=532e-9).along(fa.Laser(waist=0.8e-3), plate, fa.FreeSpace(0.1), fa.Detector(name="d"))
    with pytest.raises(
        ParameterError, match=r"plate: the function fast gives NaN at \d+ of \d+ samples \(first at x = -"
    ):
        train.power("d", engine="grid")


def test_number_of_a_plain_plate_is_allowed(jones):
    assert jones(PatternedRetarder(fast=0.3, retardance=1.0)) == pytest.approx(
        jones(Retarder(fast=0.3, retardance=1.0)), abs=ROUNDING
    )


def test_changing_one_axis_unnames_the_other():
    part = PatternedRetarder(fast=lambda x, y: x).changed(slow=0.2)
    assert (part.fast, part.slow) == (None, 0.2)


def test_numbers_agree_with_letters(agrees):
    agrees(PatternedRetarder, {"fast": 0.3, "retardance": 1.2})
    agrees(PatternedPolarizer, {"axis": 0.3})
