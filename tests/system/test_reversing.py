"""Dove prisms, K-mirrors and periscopes in whole trains, by every engine."""

import math

import numpy as np
import pytest
import sympy

import fastaxis as fa
from fastaxis.light import Term
from fastaxis.units import deg, mm, mW, nm, um

W = 0.5 * mm
X = np.linspace(-0.9, 0.9, 9) * mm


def bench(*parts, mode=None, state=fa.D):
    laser = fa.Laser(mode=mode or fa.LaguerreGauss(p=0, l=1, waist=W), power=1 * mW, state=state, name="laser")
    train = fa.Train(wavelength=633 * nm)
    return train.along(laser, *parts, fa.Camera(pixel=20 * um, shape=(64, 64), name="cam"))


def field(train, engine):
    (light,) = train.field("cam", engine=engine)
    return light.at(X, X)


def petals(angle, state=fa.D):
    """LG(l=1) + LG(l=-1) exp(2i angle): two lobes along the line at ``angle``."""
    phase = complex(math.cos(2 * angle), math.sin(2 * angle))
    plus, minus = (fa.LaguerreGauss(p=0, l=l, waist=W) for l in (1, -1))
    return fa.Beam((Term(1, plus, state), Term(phase, minus, state)))


def brightest(train):
    x, y = np.meshgrid(*(2 * (np.arange(64) - 31.5,)))
    frame = train.expose("cam", [fa.no_analyzer()]).frame(0)
    return 0.5 * math.atan2((frame * 2 * x * y).sum(), (frame * (x * x - y * y)).sum())


@pytest.mark.parametrize(
    "make", [lambda roll: fa.KMirror(roll=roll), lambda roll: fa.DovePrism(index=1.515, roll=roll)]
)
@pytest.mark.parametrize("roll", [0.0, 15 * deg, 45 * deg, 100 * deg])
def test_rolling_a_prism_by_a_turns_the_picture_by_2a(make, roll):
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(beam=petals(10 * deg), power=1 * mW), make(roll), fa.Camera(pixel=80 * um, shape=(64, 64), name="cam")
    )
    # A line at 10 deg goes to its mirror image at 2 roll - 10 deg. The frame holds it all to exp(-52).
    apart = brightest(train) - (2 * roll - 10 * deg)
    assert math.remainder(apart, math.pi) == pytest.approx(0, abs=1e-6)


@pytest.mark.parametrize("roll", [0.0, 0.4, -1.3])
def test_charge_is_reversed_and_gains_the_phase_of_twice_the_roll(roll):
    there = field(bench(fa.KMirror(roll=roll)), "azimuthal")
    flipped = field(bench(fa.HalfWavePlate(fast=roll), mode=fa.LaguerreGauss(p=0, l=-1, waist=W)), "azimuthal")
    # The ideal K-mirror is diag(-1, 1) at its roll, the plate -i diag(1, -1): a factor -i, by hand. f(phi) goes to
    # f(2 roll - phi): exp(i phi) to exp(2i roll) exp(-i phi).
    factor = np.exp(2j * roll) / 1j
    assert np.allclose(there, factor * flipped, atol=1e-10 * abs(there).max())


TRAINS = [
    [fa.FreeSpace(0.2), fa.KMirror(roll=0.35), fa.QPlate(q=0.5, offset=0.2, retardance=2.0), fa.FreeSpace(0.3)],
    [fa.QPlate(q=1, retardance=2.0), fa.DovePrism(index=1.515, roll=-0.6), fa.Mirror(), fa.KMirror(roll=1.1), fa.FreeSpace(0.3)],
]  # fmt: skip


@pytest.mark.parametrize("parts", TRAINS)
def test_grid_and_harmonics_agree(parts):
    by_harmonics, by_grid = (field(bench(*parts), engine) for engine in ("azimuthal", "grid"))
    # A q-plate's singularity costs the grid about 1e-3 of the peak at 1024 samples.
    assert np.allclose(by_grid, by_harmonics, atol=3e-3 * abs(by_harmonics).max())


def test_two_prisms_turn_the_picture_by_twice_their_difference():
    # Off the axis, so that only the grid can follow it.
    mode = fa.Gaussian(waist=W, centre=(0.3 * mm, 0.1 * mm))
    turn = 2 * (0.5 - 0.2)
    c, s = math.cos(turn), math.sin(turn)
    there = fa.Gaussian(waist=W, centre=(c * 0.3 * mm - s * 0.1 * mm, s * 0.3 * mm + c * 0.1 * mm))
    prisms = field(bench(fa.KMirror(roll=0.2), fa.KMirror(roll=0.5), mode=mode), "grid")
    # Two half-wave reversals turn the polarization as well: the light goes round as one piece.
    rotated = field(bench(fa.Rotator(angle=turn), mode=there), "grid")
    assert np.allclose(prisms, rotated, atol=1e-9 * abs(rotated).max())


def test_a_prism_from_behind():
    ahead = bench(fa.KMirror(roll=0.3), fa.Mirror())
    again = ahead.elements["kmirror1"].passages(633e-9)["back", "front"]
    twice = fa.KMirror(roll=-0.3).passages(633e-9)["front", "back"]
    # Met from behind it is the prism at -roll: the same places, the same matrix.
    x = np.array([0.2, 0.5])

    def moved(laws):
        place = x
        for law in laws[1:] if hasattr(laws[0], "linear") else laws[:-1]:
            if hasattr(law, "axis"):
                place = place * [-1, 1] if law.axis == "x" else place * [1, -1]
            else:
                c, s = math.cos(law.angle), math.sin(law.angle)
                place = np.array([[c, -s], [s, c]]) @ place
        return place

    assert moved(again.laws) == pytest.approx(moved(twice.laws), abs=1e-15)


def test_the_roll_as_a_letter():
    roll = sympy.Symbol("alpha", real=True)
    laser = fa.Laser(beam=petals(10 * deg), power=1 * mW, name="laser")

    def petals_behind(angle):
        parts = [laser, fa.KMirror(roll=angle), fa.DovePrism(index=1.515), fa.Polarizer(axis=0.2)]
        return fa.Train(wavelength=633 * nm).along(*parts, fa.Camera(pixel=80 * um, shape=(64, 64), name="cam"))

    at = petals_behind(roll).derive("cam").to_function("stokes", absolute=True)
    (light,) = petals_behind(0.35).field("cam", engine="grid")
    for r, phi in ((0.4e-3, 0.7), (0.5e-3, 2.9)):
        ex, ey = light.at(np.array([r * math.cos(phi)]), np.array([r * math.sin(phi)]))[:, 0, 0]
        found = np.ravel(at({roll: 0.35, "r": r, "phi": phi}))
        # The lobes stand where alpha puts them: the letter reaches the picture and not only the polarization.
        assert found[0] == pytest.approx(abs(ex) ** 2 + abs(ey) ** 2, rel=1e-9)


def test_a_sweep_of_the_roll_turns_the_picture_too():
    rolls = [0.0, 0.1, 0.9]  # at 0 there is nothing to be turned
    laser = fa.Laser(beam=petals(10 * deg), power=1 * mW, name="laser")
    camera = fa.Camera(pixel=80 * um, shape=(64, 64), name="cam")
    train = fa.Train(wavelength=633 * nm).along(laser, fa.KMirror(roll=0.0, name="k"), camera)
    swept = train.sweep({"k.roll": rolls}, "cam", [fa.H])
    for place, roll in enumerate(rolls):
        one = train.with_changes({"k.roll": roll}).expose("cam", [fa.H]).frame(0)
        assert np.allclose(swept.frame(place, 0), one, rtol=0, atol=1e-12 * one.max())


def test_a_hermite_gauss_beam_has_no_short_form_behind_a_turn():
    train = bench(fa.KMirror(roll=0.3), mode=fa.HermiteGauss(m=1, n=0, waist=W))
    with pytest.raises(fa.SymbolError, match="Hermite-Gauss beam turned by any angle"):
        train.derive("cam")


def test_a_periscope_of_two_vertical_folds_restores_everything():
    there = field(bench(fa.Mirror(fold="vertical"), fa.FreeSpace(0.1), fa.Mirror(fold="vertical")), "azimuthal")
    assert np.allclose(there, field(bench(fa.FreeSpace(0.1)), "azimuthal"), atol=1e-12 * abs(there).max())


def test_a_periscope_that_turns_the_corner_turns_picture_and_polarization():
    # One vertical and one horizontal fold: diag(1, -1) diag(-1, 1) = -1 and both axes reversed, half a turn of the
    # picture. In the frames that follow the beam nothing else is left: charge and hand are restored.
    corner = field(bench(fa.Mirror(fold="vertical"), fa.Mirror()), "azimuthal")
    straight = field(bench(), "azimuthal")
    assert np.allclose(corner, -straight[:, ::-1, ::-1], atol=1e-12 * abs(corner).max())


def test_a_prism_reverses_the_parity_of_the_picture():
    train = bench(fa.DovePrism(index=1.5), fa.Mirror())
    assert train.route("cam").reflections == 2
    assert bench(fa.KMirror()).route("cam").parity == -1


def test_trains_of_real_surfaces_survive_a_file():
    parts = [
        fa.MetalMirror(index=0.184 + 3.431j, fold="vertical"), fa.DovePrism(index=1.515, roll=sympy.Symbol("a")),
        fa.KMirror(index=1.4 + 7.5j), fa.Rhomb(index=1.51, incidence=54.6 * deg, coated=True),
        fa.Window(index=1.5, layer=1.38, design=633 * nm), fa.PickOff(index=1.5),
        fa.BeamSplitter(Rp=0.47, Rs=0.52, phase_rs=90 * deg),
    ]  # fmt: skip
    train = bench(*parts)
    again = fa.Train.from_text(train.to_text())
    assert again.elements == train.elements
    assert again.to_text() == train.to_text()
