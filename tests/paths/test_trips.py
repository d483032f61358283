"""Beams in cavities: sums of round trips against closed forms and against the engines that follow every trip."""

import math

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.light import Raster
from fastaxis.units import mm, nm, um

WAVELENGTH, ARM, FOCAL = 633 * nm, 0.1, 0.3


def ring(mode, reflectance, *parts, focal=FOCAL):
    """Two splitters, two mirrors, a lens half way round from splitter to splitter; the way back has no length."""
    train = fa.Train(wavelength=WAVELENGTH).along(
        fa.Laser(mode=mode, power=1.0, name="laser"), fa.BeamSplitter(reflectance=reflectance, name="in"),
        fa.FreeSpace(ARM), fa.Lens(focal=focal, name="lens"), fa.FreeSpace(ARM), *parts,
        fa.BeamSplitter(reflectance=reflectance, name="out"),
    )  # fmt: skip
    return train.along("out.reflected", fa.Mirror(name="m1"), fa.Mirror(name="m2"), "in.side")


def airy(mode, reflectance, phase=0.0):
    """Transmitted share of a mode that fits the cavity: the plane-wave formula with N Gouy phases on each trip."""
    matched = math.sqrt(ARM * (2 * FOCAL - ARM))  # Rayleigh range that the trip gives back
    gouy = (mode.degree + 1) * math.atan2((2 * ARM - ARM**2 / FOCAL) / matched, 1 - ARM / FOCAL)
    # Each splitter reflects with a quarter of a wave: a factor of -1 on each trip.
    trip = 2 * math.pi * (2 * ARM / WAVELENGTH % 1) + math.pi - gouy + phase
    return (1 - reflectance) ** 2 / abs(1 - reflectance * np.exp(1j * trip)) ** 2


def matched_waist():
    return math.sqrt(math.sqrt(ARM * (2 * FOCAL - ARM)) * WAVELENGTH / math.pi)


@pytest.mark.parametrize("phase", [0.0, 1.0, 3.3])
@pytest.mark.parametrize(
    "mode",
    [fa.Gaussian(matched_waist()), fa.LaguerreGauss(1, 2, matched_waist()), fa.HermiteGauss(2, 1, matched_waist())],
    ids=["gauss", "lg", "hg"],
)
def test_a_mode_that_fits_follows_the_airy_function_with_its_gouy_phases(mode, phase):
    train = ring(mode, 0.9, fa.PhaseShift(phase=phase))
    # The path of 3e5 waves is known to 1e-16 of itself, its phase here to 4e-10 by the float formula above.
    assert train.power("out.transmitted") == pytest.approx(airy(mode, 0.9, phase), rel=1e-8)
    assert train.power("out.transmitted") + train.power("in.reflected") == pytest.approx(1, abs=1e-12)


def test_a_resonance_is_found_for_each_transverse_mode_where_its_gouy_phase_puts_it():
    best = []
    for mode in (fa.Gaussian(matched_waist()), fa.LaguerreGauss(0, 1, matched_waist())):
        phases = np.linspace(0, 2 * math.pi, 24, endpoint=False)
        found = [ring(mode, 0.5, fa.PhaseShift(phase=p)).power("out.transmitted") for p in phases]
        # The first harmonic of the Airy function stands where its peak does, exactly.
        best.append(np.angle(np.sum(found * np.exp(1j * phases))))
    gouy = math.acos(1 - ARM / FOCAL)
    assert (best[1] - best[0]) % (2 * math.pi) == pytest.approx(gouy, abs=1e-4)  # 0.5^24 = 6e-8 of it aliases


@pytest.mark.parametrize("mode", [fa.Gaussian(0.2 * mm, 0.3), fa.LaguerreGauss(1, -1, 0.2 * mm, -0.1)])
def test_a_beam_that_does_not_fit_agrees_with_the_engine_that_follows_its_trips(mode):
    train = ring(mode, 0.2, fa.Mirror(name="odd"), focal=0.5)
    (quick,), (slow,) = train.field("out.transmitted"), train.field("out.transmitted", engine="azimuthal")
    x, y = np.linspace(-0.4 * mm, 0.3 * mm, 7), np.linspace(-0.2 * mm, 0.4 * mm, 5)
    # The azimuthal engine settles its profiles to 1e-12 of the peak, for each of some forty trips.
    assert np.allclose(quick.at(x, y), slow.at(x, y), rtol=0, atol=1e-9 * abs(slow.at(x, y)).max())
    assert quick.total_stokes == pytest.approx(slow.total_stokes, abs=1e-9)


def test_the_picture_of_a_fine_cavity_holds_its_power():
    train = ring(fa.Gaussian(0.15 * mm), 0.9, focal=0.4)
    train.along("out.transmitted", fa.Camera(pixel=20 * um, shape=(240, 240), name="cam"))
    frame = train.expose("cam", [fa.H]).frame(0)
    assert frame.sum() == pytest.approx(train.power("out.transmitted"), rel=1e-9)


def test_a_shape_made_of_two_modes_and_two_colours():
    beam = fa.Beam((fa.Term(0.8, fa.Gaussian(0.2 * mm), fa.H), fa.Term(0.6j, fa.LaguerreGauss(0, 1, 0.3 * mm), fa.R)))
    train = fa.Train(wavelength=WAVELENGTH).along(
        fa.Laser(beam=beam, power=0.2, line=fa.GaussianLine(coherence_length=0.5), name="laser"),
        fa.BeamSplitter(name="in"), fa.FreeSpace(0.4), fa.QuarterWavePlate(fast=0.3), fa.Mirror(name="m1"),
        fa.BeamSplitter(name="out"),
    ).along("in.reflected", fa.Mirror(name="m2"), fa.FreeSpace(0.1), "out.side")  # fmt: skip
    quick, slow = (train.field("out.transmitted", engine=engine)[0] for engine in ("auto", "azimuthal"))
    assert quick.total_stokes == pytest.approx(slow.total_stokes, abs=1e-10)
    raster = Raster(20 * um, (40, 40))
    assert np.allclose(
        quick.stokes_on(raster), slow.stokes_on(raster), rtol=0, atol=1e-9 * quick.stokes_on(raster).max()
    )


def test_the_plan_of_a_cavity_shows_the_first_trips_and_counts_the_others():
    plan = ring(fa.Gaussian(0.2 * mm), 0.9).plan("out.transmitted")
    text = str(plan)
    assert text.count("arm laser") == 8
    assert f"and {len(plan.branches) - 8} longer ways, up to a path of" in text
