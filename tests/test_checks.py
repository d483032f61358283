import math

import numpy as np
import pytest
import sympy

from fastaxis import checks
from fastaxis.errors import ParameterError, SlipWarning
from fastaxis.maths import Pattern


def test_numbers_of_any_kind_become_floats():
    for value in (2, 2.0, np.float32(2), np.int64(2), np.array(2.0)):
        result = checks.number("it", "n", value, fix="n=2.0")
        assert (result, type(result)) == (2.0, float)


@pytest.mark.parametrize("value", [True, "2", None, 1j, math.inf, [1, 2], np.array([1.0, 2.0]), sympy.zoo])
def test_what_is_no_real_finite_number(value):
    with pytest.raises(ParameterError, match="n must be"):
        checks.number("it", "n", value, fix="n=2.0")


def test_letters_pass_every_check():
    a = sympy.Symbol("a")
    assert checks.angle("it", "n", a) is a
    assert checks.length("it", "n", a, fix="") is a
    assert checks.wavelength("it", "n", a) is a
    assert checks.fraction("it", "n", a, fix="") is a
    assert checks.half_integer("it", "n", a) is a
    assert checks.whole("it", "n", a) is a
    assert checks.extinction("it", a) is a
    assert checks.pattern("it", "n", a, None, fix="") is a
    assert checks.centre("it", (a, 0)) == (a, 0.0)


@pytest.mark.parametrize(("value", "nearest"), [(0.3, "0.5"), (-0.3, "-0.5"), (1.2, "1"), (0.9, "1"), (-1.4, "-1.5")])
def test_the_fix_of_a_half_integer_is_the_nearest_one_that_is_not_zero(value, nearest):
    with pytest.raises(ParameterError) as refusal:
        checks.half_integer("it", "q", value)
    assert refusal.value.fix == f"q={nearest}"


def test_two_turns_are_the_largest_angle():
    assert checks.angle("it", "n", 4 * math.pi) == 4 * math.pi
    with pytest.raises(ParameterError, match="in radians"):
        checks.angle("it", "n", 13)


@pytest.mark.parametrize(
    ("value", "fix"), [(22.5, "n=22.5*deg"), (-720, "n=-720*deg"), (721, "n=4.71687"), (-1e6, "n=-5.92562")]
)
def test_the_fix_of_an_angle_is_an_angle_itself(value, fix):
    with pytest.raises(ParameterError, match="in radians") as refusal:
        checks.angle("it", "n", value)
    assert refusal.value.fix == fix
    amount = eval(fix.removeprefix("n="), {"deg": math.radians(1)})
    assert checks.angle("it", "n", amount) == amount


def test_an_endless_angle_makes_no_endless_sentence():
    with pytest.raises(ParameterError) as refusal:
        checks.angle("it", "n", 1e300)
    assert len(str(refusal.value)) < 150


@pytest.mark.parametrize(("value", "fix"), [(532, "w=532*nm"), (0, "w=532*nm"), (2, "w=532*nm")])
def test_wavelengths(value, fix):
    with pytest.raises(ParameterError) as refusal:
        checks.wavelength("it", "w", value)
    assert refusal.value.fix == fix


def test_cells_of_a_share_are_looked_through():
    cells = Pattern(np.array([[0.0, 1.0]]), 1e-6)
    assert checks.fraction("it", "t", cells, fix="t=0.5", patterned=True) is cells
    for bad in (2 * cells, cells + (-0.5), -1 * cells):
        with pytest.raises(ParameterError, match="share of power"):
            checks.fraction("it", "t", bad, fix="t=0.5", patterned=True)


@pytest.mark.parametrize("cells", [np.array([[1j]]), np.array([[np.nan]]), np.zeros((2, 2, 2)), np.array([["a"]])])
def test_cells_that_are_none(cells):
    with pytest.raises(ParameterError, match="as an array is 2-D"):
        checks.pattern("it", "t", cells, 1e-6, fix="t=0.5")


def test_booleans_make_a_mask():
    pattern = checks.pattern("it", "t", np.array([[True, False]]), 1e-6, fix="t=0.5")
    assert pattern(np.array([-0.5e-6, 0.5e-6]), np.array([0.0, 0.0])).tolist() == [1.0, 0.0]


def test_an_ideal_polarizer_has_no_leak():
    assert checks.extinction("it", math.inf) == math.inf
    with pytest.raises(ParameterError) as refusal:
        checks.extinction("it", 1)
    assert refusal.value.fix == "extinction=1e5"


def test_usual_lengths_pass_in_silence():
    assert checks.usual("it", "d", 1.0, 2.0, fix="") == []
    assert checks.usual("it", "d", sympy.Symbol("d"), 2.0, fix="") == []
    (caution,) = checks.usual("it", "d", -3.0, 2.0, fix="d=-3*mm")
    assert isinstance(caution, SlipWarning)


def test_an_exposure_of_many_seconds_may_lack_its_unit():
    assert checks.long_exposure("cam", 1.0) == []
    (caution,) = checks.long_exposure("cam", 20)
    assert isinstance(caution, SlipWarning)
    assert caution.rule == "exposure_time is in seconds and rarely beyond 1 s: its unit may be missing"
    assert caution.fix == "exposure_time=20*ms"


@pytest.mark.parametrize(("wavelength", "count"), [(500e-9, 0), (549e-9, 0), (551e-9, 1), (449e-9, 1)])
def test_a_tenth_off_design(wavelength, count):
    assert len(checks.near_design("it", 500e-9, wavelength)) == count
    assert checks.near_design("it", None, wavelength) == []
    assert checks.near_design("it", 500e-9, sympy.Symbol("w")) == []
