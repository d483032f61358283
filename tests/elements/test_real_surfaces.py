"""Parts made of bare surfaces: metal mirrors, pick-offs, windows, rhombs, Dove prisms, K-mirrors."""

import cmath
import math

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements import DovePrism, KMirror, MetalMirror, Mirror, PickOff, Rhomb, Wedge, Window
from fastaxis.elements.surfaces import Surface
from fastaxis.errors import SymbolError
from fastaxis.laws import Flip, Turn
from fastaxis.maths import NUMBERS
from fastaxis.units import deg, nm

GOLD = 0.184 + 3.431j
FRONT = ("front", "front")
D = np.diag([-1.0, 1.0])
ROUNDING = 1e-14


def matrix(part, ways=("front", "back"), wavelength=633e-9):
    out = np.eye(2, dtype=complex)
    for law in part.passages(wavelength)[ways].laws:
        if hasattr(law, "linear"):
            out = np.array(law.linear(NUMBERS), dtype=complex) @ out
    return out


def moved(part, x, y, ways=("front", "back")):
    """Where a ray at (x, y) leaves: a law of places sends f(r) to f(M r), so a ray at r goes to M^-1 r."""
    for law in part.passages(633e-9)[ways].laws:
        if isinstance(law, Flip):
            x, y = (-x, y) if law.axis == "x" else (x, -y)
        if isinstance(law, Turn):
            c, s = math.cos(law.angle), math.sin(law.angle)
            x, y = c * x - s * y, s * x + c * y
    return x, y


def mirror_image(x, y, angle):
    c, s = math.cos(2 * angle), math.sin(2 * angle)
    return c * x + s * y, s * x - c * y


def test_a_metal_mirror_is_a_mirror_of_its_own_powers_and_phases():
    surface = Surface(behind=GOLD, incidence=45 * deg)
    made = {"phase_p": cmath.phase(surface.rp), "phase_s": cmath.phase(-surface.rs), "Rp": surface.Rp, "Rs": surface.Rs}
    for fold in ("horizontal", "vertical"):
        expected = matrix(Mirror(fold=fold, **made), FRONT)
        assert matrix(MetalMirror(index=GOLD, fold=fold), FRONT) == pytest.approx(expected, abs=ROUNDING)


reciprocal = st.one_of(
    st.builds(lambda n, i, roll: Rhomb(index=n, incidence=i, roll=roll), st.floats(1.5, 2), st.floats(0.8, 1.5), st.floats(-3, 3)),
    st.builds(lambda n, b, roll: DovePrism(index=n, base=b, roll=roll), st.floats(1.4, 2), st.floats(0.3, 1.2), st.floats(-3, 3)),
    st.builds(lambda n, i, roll: KMirror(index=n, incidence=i, roll=roll), st.sampled_from([None, GOLD, 1.4 + 7.5j]), st.floats(0.8, 1.5), st.floats(-3, 3)),
    st.builds(lambda n, w: Window(index=n, wedge=w), st.floats(1, 2), st.floats(-0.1, 0.1)),
)  # fmt: skip


@settings(max_examples=50, deadline=None)
@given(reciprocal)
def test_passive_and_reciprocal(part):
    assert np.linalg.norm(matrix(part), 2) <= 1 + ROUNDING
    assert matrix(part, ("back", "front")) == pytest.approx(D @ matrix(part).T @ D, abs=ROUNDING)


@settings(max_examples=50, deadline=None)
@given(reciprocal, st.floats(-1, 1), st.floats(-1, 1))
def test_a_ray_sent_back_comes_out_where_it_came_from(part, x, y):
    ahead = moved(part, x, y)
    again = moved(part, -ahead[0], ahead[1], ("back", "front"))  # the backward beam counts x the other way
    assert again == pytest.approx((-x, y), abs=ROUNDING)


@pytest.mark.parametrize("make", [lambda roll: DovePrism(index=1.515, roll=roll), lambda roll: KMirror(roll=roll)])
@pytest.mark.parametrize("roll", [0.0, 0.3, -1.1, math.pi / 2, 2.0])
def test_the_picture_is_its_mirror_image_in_the_line_of_the_base(make, roll):
    assert moved(make(roll), 0.7, -0.2) == pytest.approx(mirror_image(0.7, -0.2, roll), abs=ROUNDING)
    # Rolled by half a turn the prism reverses the picture just the same.
    assert moved(make(roll + math.pi), 0.7, -0.2) == pytest.approx(moved(make(roll), 0.7, -0.2), abs=ROUNDING)


@pytest.mark.parametrize("make", [lambda roll: DovePrism(index=1.515, roll=roll), lambda roll: KMirror(index=GOLD, roll=roll)])  # fmt: skip
def test_rolling_the_prism_rolls_its_matrix(make):
    roll = 0.7
    c, s = math.cos(roll), math.sin(roll)
    turn = np.array([[c, -s], [s, c]])
    assert matrix(make(roll)) == pytest.approx(turn @ matrix(make(0.0)) @ turn.T, abs=ROUNDING)


def test_an_upright_prism_or_k_mirror_is_a_vertical_fold_that_goes_straight_on():
    assert matrix(KMirror()) == pytest.approx(matrix(Mirror(fold="vertical"), FRONT), abs=0)
    three = matrix(MetalMirror(index=GOLD, incidence=30 * deg, fold="vertical"), FRONT)
    two = matrix(MetalMirror(index=GOLD, incidence=60 * deg, fold="vertical"), FRONT)
    assert matrix(KMirror(index=GOLD)) == pytest.approx(two @ three @ two, abs=ROUNDING)


def test_a_dove_prism_refracts_twice_and_reflects_once():
    # By the ray inside: 45 deg outside, asin(sin 45/n) in the glass, and so 45 deg + that on the base of a 45 deg prism.
    n = 1.515
    inside = math.asin(math.sin(45 * deg) / n)
    enters = Surface(behind=n, incidence=45 * deg)
    base = Surface(before=n, behind=1.0, incidence=45 * deg + inside)
    leaves = Surface(before=n, behind=1.0, incidence=inside)
    p, s = enters.tp * base.rp * leaves.tp, enters.ts * base.rs * leaves.ts
    assert matrix(DovePrism(index=n)) == pytest.approx(np.diag([s, p]), abs=ROUNDING)
    coated = np.diag([s / abs(s), p / abs(p)])
    assert matrix(DovePrism(index=n, coated=True)) == pytest.approx(coated, abs=ROUNDING)


def test_a_rhomb_is_a_retarder_of_its_retardance():
    rhomb = Rhomb(index=1.51, incidence=50 * deg, coated=True)
    p, s = np.diag(matrix(rhomb))
    assert cmath.phase(s / p) == pytest.approx(rhomb.retardance, abs=ROUNDING)
    two = Rhomb(index=1.51, incidence=50 * deg, reflections=4)
    assert two.retardance == pytest.approx(2 * rhomb.retardance, abs=ROUNDING)
    bare = (1 - ((1.51 - 1) / (1.51 + 1)) ** 2) ** 2
    assert abs(np.linalg.det(matrix(two))) == pytest.approx(bare, abs=ROUNDING)


def test_a_pick_off_accounts_for_its_power():
    plate = PickOff(index=1.7, incidence=50 * deg)
    for place, (_, ghost, _) in enumerate(plate.ghosts):
        shares = [abs(matrix(plate, ("front", out))[place, place]) ** 2 for out in ("transmitted", "reflected")]
        # The series of what is reflected inside, (1 - R) R in all, closes the sum.
        assert sum(shares) + ghost == pytest.approx(1, abs=ROUNDING)
    upright = matrix(PickOff(index=1.7, incidence=50 * deg, fold="vertical"), ("front", "transmitted"))
    assert upright == pytest.approx(matrix(plate, ("front", "transmitted"))[::-1, ::-1], abs=0)


def test_a_wedged_window_keeps_its_ghosts_out_of_the_beam_and_turns_it():
    (law,) = Window(index=1.5, wedge=0.01).laws(532e-9)
    assert law.transmission.power == pytest.approx(0.96**2, abs=1e-15)
    assert law.tilt == Wedge(x=0.005).laws(532e-9)[0].tilt
    parallel = Window(index=1.5).laws(532e-9)[0].transmission.power
    # All orders of the ghosts together: (1 - R)^2 (1 + R^2 + R^4 ...).
    assert parallel == pytest.approx(0.96**2 / (1 - 0.04**2), abs=1e-15)
    assert "turned further" in Window(index=1.5, wedge=0.01).ghosts[0][2]


def test_a_layer_far_off_its_design_is_a_caution():
    (caution,) = Window(index=1.52, layer=1.38, design=532 * nm).cautions(1064 * nm)
    assert caution.fix == "design=1064*nm"
    assert Window(index=1.52, layer=1.38, design=532 * nm).cautions(540 * nm) == []


def test_numbers_agree_with_letters():
    a = sympy.Symbol("a", real=True)
    for make in (lambda roll: Rhomb(index=1.5, incidence=1.0, roll=roll), lambda roll: KMirror(roll=roll)):
        assert make(a).symbols == {a}
        (jones, *places) = make(a).laws(633e-9)
        assert sympy.sympify(jones.angle).subs(a, 0.4) == make(0.4).laws(633e-9)[0].angle
        if places:
            assert places == [Flip("y"), Turn(2 * a)]


@pytest.mark.parametrize("make", [lambda x: MetalMirror(index=x), lambda x: PickOff(index=1.5, incidence=x)])
def test_letters_where_numbers_are_needed(make):
    with pytest.raises(SymbolError, match="Fresnel's amplitudes are worked out in numbers"):
        make(sympy.Symbol("x"))


def test_a_layer_needs_its_design_as_a_number():
    window = Window(index=1.52, layer=1.38, design=sympy.Symbol("lambda_0", positive=True))
    with pytest.raises(SymbolError, match="design and the wavelength can't be letters"):
        window.laws(532e-9)
