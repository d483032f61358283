"""Closed forms of light that goes round: cavities and rings, against textbooks, laws of nature and numbers."""

import functools
import math

import pytest
import sympy as sp
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines.symbolic.ring import ExactMaths, Ring
from fastaxis.errors import SymbolError
from fastaxis.units import mm, nm

R1, R2, R = sp.symbols("R_1 R_2 R", positive=True)
p, b, d = sp.symbols("psi beta delta", real=True)


def vanishes(expression):
    return ExactMaths(Ring()).number(expression).is_zero()


def wave(state=fa.H, **values):
    return fa.Laser(mode=fa.PlaneWave(area=1 * mm**2), power=1.0, state=state, name="laser", **values)


def cavity(first, second, phase, *parts, laser=None):
    """Two mirrors; what stands between them is passed there and back."""
    train = fa.Train(wavelength=633 * nm).along(
        laser or wave(), fa.BeamSplitter(reflectance=first, name="m1"), fa.PhaseShift(phase=phase, name="tuning"),
        *parts, fa.BeamSplitter(reflectance=second, name="m2"), fa.Detector(name="out"),
    )  # fmt: skip
    return train.along("m2.reflected", *(f"{part.name}.back" for part in parts[::-1]), "tuning.back", "m1.side")


def ring(reflectance, phase, *parts, mirrors=3, laser=None):
    train = fa.Train(wavelength=633 * nm).along(laser or wave(), fa.BeamSplitter(reflectance=reflectance, name="bs"))
    mirrors = [fa.Mirror(name=f"m{n}") for n in range(mirrors)]
    return train.along("bs.transmitted", fa.PhaseShift(phase=phase, name="tuning"), *parts, *mirrors, "bs.side")


def sum_is_one(*forms):
    first, *others = (form.stokes_polys()[0] for form in forms)
    for other in others:
        first = first + first.ring.adopted(other)
    return (first - first.ring.rational(1)).is_zero()


def test_two_mirrors_give_the_airy_function_at_both_ports():
    """M. Born and E. Wolf, section 7.6; each mirror reflects with i sqrt(R), which is half a wave a trip."""
    train = cavity(R1, R2, p)
    through, back = train.derive("out"), train.derive("m1.reflected")
    trip = sp.sqrt(R1 * R2)
    airy = (1 - R1) * (1 - R2) / ((1 - trip) ** 2 + 4 * trip * sp.cos(p) ** 2)
    assert vanishes(through.power - airy)
    assert vanishes(through.power + back.power - 1)
    assert vanishes(back.power - ((sp.sqrt(R1) - sp.sqrt(R2)) ** 2 + 4 * trip * sp.cos(p) ** 2) / (
        (1 - trip) ** 2 + 4 * trip * sp.cos(p) ** 2))  # fmt: skip
    assert sum_is_one(through, back)


def test_equal_mirrors_are_written_shortly():
    form = cavity(R, R, p).derive("out")
    assert form.power == (R - 1) ** 2 / (R**2 + 2 * R * sp.cos(2 * p) + 1)
    assert list(form.jones()) == [(1 - R) / sp.sqrt(R**2 + 2 * R * sp.cos(2 * p) + 1), 0]


def test_the_phase_of_the_whole_is_kept_apart_and_asked_for():
    form = cavity(0.3, 0.6, 0.4).derive("out")
    (ex, _), (zeta,) = form.jones(global_phase=True), form.meanings
    field = cavity(0.3, 0.6, 0.4).field("out")[0].jones[0]
    value = complex(form.spelled_out(ex).evalf())
    assert zeta.name == "zeta"
    assert value == pytest.approx(field, abs=1e-14)  # some ten roundings


def test_light_between_the_mirrors_builds_up():
    """A. E. Siegman, Lasers (1986), section 11.3: between the mirrors (1 - R1)/|1 - trip|^2."""
    inside = cavity(R1, R2, p).derive("tuning.back").power
    trip = sp.sqrt(R1 * R2)
    assert vanishes(inside - (1 - R1) / ((1 - trip) ** 2 + 4 * trip * sp.cos(p) ** 2))


def test_a_ring_without_loss_returns_everything():
    form = ring(R, p).derive("bs.reflected")
    assert form.power == 1
    assert sum_is_one(form)


def test_a_ring_is_dark_where_its_loss_is_what_the_splitter_lets_in():
    """A. Yariv, Electron. Lett. 36, 321 (2000): |t|^2 = loss; here 1 - T = R and the filter passes R too."""
    form = ring(R, p, fa.NeutralDensity(transmission=R1, name="nd")).derive("bs.reflected")
    root = sp.sqrt(R * R1)
    assert vanishes(form.power - (R + R1 + 2 * root * sp.sin(p)) / (1 + R * R1 + 2 * root * sp.sin(p)))
    assert form.power.subs({R1: R, p: -sp.pi / 2}) == 0


def test_a_plate_between_mirrors_makes_two_combs_of_resonances():
    """Born and Wolf, section 7.6, for each axis of the plate by itself; light along one axis sees that one only."""
    plate, half = fa.Retarder(fast=b, retardance=d, name="plate"), sp.Rational(1, 2)
    combs = [half**2 / (1 + half**2 + 2 * half * sp.cos(2 * p + sign * d)) for sign in (-1, 1)]
    form = cavity(0.5, 0.5, p, plate).derive("out")
    assert vanishes(form.power - sp.cos(b) ** 2 * combs[0] - sp.sin(b) ** 2 * combs[1])
    straight = cavity(R, R, p, fa.Retarder(fast=0.0, retardance=d, name="plate")).derive("out")
    assert vanishes(straight.power - (1 - R) ** 2 / (1 + R**2 + 2 * R * sp.cos(2 * p - d)))


ROUND = {
    "plate": lambda: fa.Retarder(fast=b, retardance=d, name="part"),
    "faraday": lambda: fa.FaradayRotator(angle=b, name="part"),
    "rotator": lambda: fa.Rotator(angle=b, name="part"),
}


@pytest.mark.parametrize("part", ROUND)
def test_energy_closes_identically_with_a_part_inside(part):
    train = cavity(R1, R2, p, ROUND[part]())
    assert sum_is_one(train.derive("out"), train.derive("m1.reflected"))
    assert sum_is_one(ring(R, p, ROUND[part](), laser=wave(fa.D)).derive("bs.reflected"))


@pytest.mark.parametrize("port", ["out", "m1.reflected", "m2.reflected"])
def test_numbers_confirm_a_cavity_with_everything_in_it(port):
    parts = (
        fa.Retarder(fast=0.3, retardance=d, name="plate"), fa.NeutralDensity(transmission=0.8, name="nd"),
        fa.FreeSpace(3 * mm, name="gap"),
    )  # fmt: skip
    # The path of 6 mm is 9479 waves, whose phase a double keeps to 1e-12: 5000 roundings, times the finesse.
    assert cavity(R1, 0.6, p, *parts).derive(port).check(points=4).roundings < 2e4


@given(st.floats(0.01, 0.95), st.floats(0.01, 0.95), st.floats(-3, 3), st.floats(-1.5, 1.5), st.floats(0.1, 3))
@settings(max_examples=15, deadline=None)
def test_forms_agree_with_numbers(first, second, phase, fast, retardance):
    values = {R1: first, R2: second, p: phase, b: fast, d: retardance}
    train = cavity(R1, R2, p, fa.Retarder(fast=b, retardance=d, name="plate"))
    numbers = train.with_values({str(letter): value for letter, value in values.items()})
    for port, form in _derived():
        found = form.to_function("power")(**{str(letter): value for letter, value in values.items()})
        # Near resonance a rounding of the phase counts 1/(1 - R) times, twice over.
        assert found == pytest.approx(numbers.power(port), abs=1e-12)


@functools.cache
def _derived():
    train = cavity(R1, R2, p, fa.Retarder(fast=b, retardance=d, name="plate"))
    return [(port, train.derive(port)) for port in ("out", "m1.reflected")]


def test_two_coupled_cavities():
    """Three mirrors by hand: the two behind are one mirror of complex reflection for the first."""
    train = fa.Train(wavelength=633 * nm).along(
        wave(), fa.BeamSplitter(reflectance=R1, name="m1"), fa.PhaseShift(phase=p, name="p1"),
        fa.BeamSplitter(reflectance=0.5, name="m2"), fa.PhaseShift(phase=b, name="p2"),
        fa.BeamSplitter(reflectance=R2, name="m3"), fa.Detector(name="out"),
    )  # fmt: skip
    train.along("m2.reflected", "p1.back", "m1.side").along("m3.reflected", "p2.back", "m2.side")
    form = train.derive("out")
    assert sum_is_one(form, train.derive("m1.reflected"))
    values = {R1: 0.37, R2: 0.81, p: 0.9, b: -0.4}
    r = [1j * math.sqrt(x) for x in (0.37, 0.5, 0.81)]
    t = [math.sqrt(x) for x in (0.63, 0.5, 0.19)]
    one, two = complex(math.cos(0.9), math.sin(0.9)), complex(math.cos(0.4), -math.sin(0.4))
    behind = 1 / (1 - r[1] * r[2] * two**2)
    mirror = r[1] + t[1] ** 2 * r[2] * two**2 * behind
    through = t[0] * one * t[1] * two * behind * t[2] / (1 - r[0] * mirror * one**2)
    assert float(form.power.subs(values)) == pytest.approx(abs(through) ** 2, rel=1e-12)


def test_a_length_enters_with_its_exact_phase():
    length, lam = sp.symbols("L lambda", positive=True)
    train = fa.Train(wavelength=lam).along(
        wave(), fa.BeamSplitter(reflectance=R, name="m1"), fa.FreeSpace(length, name="gap"),
        fa.BeamSplitter(reflectance=R, name="m2"),
    )  # fmt: skip
    train.along("m2.reflected", "gap.back", "m1.side")
    wanted = (1 - R) ** 2 / (1 + R**2 + 2 * R * sp.cos(4 * sp.pi * length / lam))
    assert vanishes(train.derive("m2.transmitted").power - wanted)


def test_what_stands_behind_a_cavity_may_shape_its_light():
    train = cavity(R, R, p)
    train = fa.Train(wavelength=633 * nm).along(
        wave(), fa.BeamSplitter(reflectance=R, name="m1"), fa.PhaseShift(phase=p, name="tuning"),
        fa.BeamSplitter(reflectance=R, name="m2"), fa.QPlate(q=0.5, name="qp"),
        fa.Camera(pixel=5e-6, shape=(8, 8), name="cam"),
    )  # fmt: skip
    train.along("m2.reflected", "tuning.back", "m1.side")
    frame = train.derive("cam").frame(b)
    phi = sp.Symbol("phi", real=True)
    assert vanishes(frame - sp.cos(b - phi) ** 2 * (1 - R) ** 2 / (1 + R**2 + 2 * R * sp.cos(2 * p)))


def test_where_a_cavity_sends_nothing_back():
    dark = cavity(R, R, p).derive("m1.reflected").dark_when(p)
    n = sp.Symbol("n", integer=True)
    assert dark.branches == (sp.pi * n + sp.pi / 2,)


def test_the_slope_on_the_side_of_a_resonance():
    form = cavity(R, R, p).derive("out")
    wanted = sp.diff((1 - R) ** 2 / (1 + R**2 + 2 * R * sp.cos(2 * p)), p)
    assert vanishes(form.derivative(0, p) - wanted)


def test_unpolarized_light_in_a_cavity_with_a_polarizer_loses_half_of_what_passes():
    form = cavity(R, R, p, fa.Polarizer(axis=0.0, name="pol"), laser=wave(fa.UNPOLARIZED)).derive("out")
    assert vanishes(form.power - (1 - R) ** 2 / (1 + R**2 + 2 * R * sp.cos(2 * p)) / 2)


@pytest.mark.parametrize(
    ("train", "why"),
    [
        (cavity(R, R, p, laser=fa.Laser(waist=1 * mm, name="laser")), "laser sends a beam of finite width"),
        (cavity(R, R, p, fa.Lens(focal=0.5, name="lens")), "lens gives it a shape"),
        (cavity(R, R, p, fa.Aperture(radius=1 * mm, name="hole")), "hole gives it a shape"),
        (cavity(R, R, p, fa.QPlate(q=0.5, name="qp")), "qp gives it a shape"),
    ],
)
def test_light_with_a_shape_is_refused(train, why):
    with pytest.raises(SymbolError, match=f"a loop on the way, and {why}") as caught:
        train.derive("out")
    if "qp" not in why:  # which takes seconds
        assert eval(caught.value.fix, {"train": train.with_values({"R": 0.01, "psi": 0.3})}) > 0


def test_a_line_of_some_width_is_refused():
    train = cavity(R, R, p, laser=wave(line=fa.GaussianLine(coherence_length=1.0)))
    with pytest.raises(SymbolError, match="one frequency alone has a steady field in a loop") as caught:
        train.derive("out")
    fixed = eval(caught.value.fix, {"train": train, "fa": fa})
    assert vanishes(fixed.derive("out").power - cavity(R, R, p).derive("out").power)


def test_too_many_loops_are_refused():
    train = fa.Train(wavelength=633 * nm).along(wave(), fa.BeamSplitter(reflectance=0.2, name="m0"))
    for n in range(1, 5):
        train.along(f"m{n - 1}.transmitted", fa.BeamSplitter(reflectance=0.2, name=f"m{n}"))
        train.along(f"m{n}.reflected", f"m{n - 1}.side")
    with pytest.raises(SymbolError, match="4 loops; more than 3 loops that feed each other") as caught:
        train.derive("m4")
    assert 0 < eval(caught.value.fix, {"train": train}) < 1
