"""Gaussian modes behind a section without an integral: the integral gives the same light."""

import math

import numpy as np
import pytest

from fastaxis.elements import (
    Aperture, FreeSpace, HalfWavePlate, Lens, Mirror, NeutralDensity, QPlate, QuarterWavePlate, Rotator, SpiralPlate,
)  # fmt: skip
from fastaxis.engines.azimuthal import AzimuthalField, Settings
from fastaxis.engines.azimuthal.applying import apply
from fastaxis.engines.azimuthal.carried import edges_for, gathered
from fastaxis.engines.azimuthal.panels import sampled
from fastaxis.engines.azimuthal.starting import started, started_with
from fastaxis.laws import TravelLaw
from fastaxis.light import Beam, FlatTop, Gaussian, H, HermiteGauss, L, LaguerreGauss, Raster, Term, elliptical
from fastaxis.plan import make_plan
from fastaxis.plan.advance import carried
from fastaxis.units import deg, mm, nm, um

WAVELENGTH = 632.8 * nm
X, Y = np.linspace(-1, 1, 9) * mm, np.linspace(-0.8, 1.1, 8) * mm

MODES = [
    Gaussian(waist=0.5 * mm, waist_at=-0.8),
    LaguerreGauss(2, -3, 0.4 * mm),
    HermiteGauss(3, 2, 0.4 * mm, waist_at=0.3),
    HermiteGauss(0, 1, 0.3 * mm),
]


def travelled(bench, mode, *parts, **options):
    """(carried, integrated) light behind some parts."""
    branch = make_plan(bench(mode, *parts, **options), "cam", engine="azimuthal").branches[0]
    settings = Settings()
    light, steps = started(branch, settings)
    integrated = started_with(branch.beam.terms, branch, settings)
    for step in steps:
        light = apply(step.law, light, settings)
    for step in branch.steps:
        integrated = apply(step.law, integrated, settings)
    return (AzimuthalField(branch.wavelength, one, settings) for one in (light, integrated))


@pytest.mark.parametrize("mode", MODES)
@pytest.mark.parametrize("section", ["free", "focus", "behind a focus", "relay"])
def test_a_mode_is_carried_as_the_integral_carries_it(bench, mode, section):
    parts = {
        "free": [FreeSpace(0.7)],
        "focus": [Lens(focal=0.4), FreeSpace(0.4)],  # a = 0
        "behind a focus": [Lens(focal=0.2), FreeSpace(0.45)],  # a < 0
        "relay": [FreeSpace(0.2), Lens(focal=0.2), FreeSpace(0.6), Lens(focal=0.4), FreeSpace(0.4)],  # b = 0, a = -2
    }[section]
    ours, integrated = travelled(bench, mode, *parts, SpiralPlate(charge=1), state=elliptical(0.2, 0.3))
    expected = integrated.at(X, Y)
    # The integral is settled to some 1e-13 of its peak, which rounding of its phases of up to 1e3 rad doubles.
    assert abs(ours.at(X, Y) - expected).max() < 2e-12 * abs(expected).max()


def test_plates_mirrors_and_absorbers_keep_their_order(bench):
    parts = [
        HalfWavePlate(fast=20 * deg), FreeSpace(0.2), Mirror(), QuarterWavePlate(fast=10 * deg),
        Lens(focal=0.4), NeutralDensity(transmission=0.3), FreeSpace(0.3), Rotator(angle=0.3), QPlate(q=0.5),
        FreeSpace(0.2),
    ]  # fmt: skip
    beam = Beam((Term(1, LaguerreGauss(1, 2, 0.4 * mm), L), Term(0.4j, HermiteGauss(1, 0, 0.5 * mm), H)))
    ours, integrated = travelled(bench, None, *parts, beam=beam)
    expected = integrated.at(X, Y)
    assert abs(ours.at(X, Y) - expected).max() < 2e-12 * abs(expected).max()
    assert ours.power == pytest.approx(0.3, rel=1e-12)


def test_what_shapes_the_light_ends_it(bench):
    steps = make_plan(
        bench(MODES[0], FreeSpace(0.1), Lens(focal=1.0), FreeSpace(0.1), Aperture(radius=1 * mm), FreeSpace(0.3)), "cam"
    ).steps
    section, rest = gathered((Term(1, MODES[0], H),), steps)
    assert (section.a, section.b, section.c, section.d) == pytest.approx((0.9, 0.19, -1, 0.9))
    assert [type(step.law).__name__ for step in rest] == ["ScalarLaw", "TravelLaw"]
    # Other light has no such closed form and begins at its source.
    assert gathered((Term(1, FlatTop(radius=1 * mm), H),), steps) == (TravelLaw(), steps)
    assert gathered((Term(1, Gaussian(waist=1 * mm, centre=(1 * um, 0)), H),), steps) == (TravelLaw(), steps)


def test_a_reference_beam_behind_a_lens():
    """A collimated beam of w in a lens has its focus w_f = lambda f/(pi w) and a quarter turn of Gouy phase."""
    term = Term(1, Gaussian(waist=1 * mm), H)
    focal = 0.25
    there = carried(term, TravelLaw.lens(1 / focal).then(TravelLaw.free(focal)), WAVELENGTH)
    assert there.mode.width(WAVELENGTH) == pytest.approx(WAVELENGTH * focal / (math.pi * 1 * mm), rel=1e-14)
    # As from the lens: flat only if the waist had been a focal length in front of it.
    assert there.mode.curvature(WAVELENGTH) == pytest.approx(1 / focal, rel=1e-14)
    axis = there.number * there.mode.radial(0.0, WAVELENGTH)
    assert axis / abs(axis) == pytest.approx(-1j, abs=1e-12)


@pytest.mark.parametrize("mode", [*MODES, LaguerreGauss(5, 4, 0.3 * mm), HermiteGauss(20, 0, 0.3 * mm)])
def test_panels_end_where_the_mode_is_dark(mode):
    edges = edges_for([mode], WAVELENGTH, 1e-13)
    around = np.array([0.0, 0.3, 0.7, 1.1, 1.5])[:, None]
    profile = sampled(lambda r: mode.amplitude(r * np.cos(around), r * np.sin(around), WAVELENGTH), edges)
    beyond = np.linspace(1, 1.2, 40) * edges[-1]
    rest = abs(mode.amplitude(beyond * np.cos(around), beyond * np.sin(around), WAVELENGTH)).max()
    # Where it is dark, and no further than twice as far as need be.
    assert rest < 1.5e-13 * profile.peak
    assert abs(profile(edges[-1:] / 2)).max() > 1e-13 * profile.peak


def test_free_space_before_a_plate_asks_for_no_integral(bench, monkeypatch):
    from fastaxis.engines.azimuthal import travelling  # noqa: PLC0415 - patched below

    monkeypatch.setattr(travelling, "section_for", None)
    branch = make_plan(bench(MODES[0], FreeSpace(0.1), QPlate(q=0.5)), "cam", engine="azimuthal").branches[0]
    light, steps = started(branch, Settings())
    for step in steps:
        light = apply(step.law, light, Settings())
    assert AzimuthalField(WAVELENGTH, light).stokes_on(Raster(50 * um, (1, 1)))[0] > 0
