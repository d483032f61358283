"""Modes travel in closed form up to the part that shapes them."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines import propagate
from fastaxis.engines.grid import begun, continued, finished
from fastaxis.engines.grid.source import _reach
from fastaxis.laws import TravelLaw
from fastaxis.light import Beam, Gaussian, HermiteGauss, LaguerreGauss, Raster, Term
from fastaxis.plan.advance import carried, advance
from fastaxis.plan.making import simplified, unfused
from fastaxis.plan.proposing import sampling_for
from fastaxis.plan.spread import of_beam
from fastaxis.units import deg, mm, nm, um

WAVELENGTH, GRID = 633 * nm, fa.Grid(samples=1024, window=12 * mm)
modes = st.sampled_from([
    Gaussian(waist=0.5 * mm),
    Gaussian(waist=0.4 * mm, waist_at=0.7),
    LaguerreGauss(p=1, l=-2, waist=0.3 * mm, waist_at=-0.2),
    HermiteGauss(m=2, n=1, waist=0.3 * mm, waist_at=0.1),
])  # fmt: skip
lengths = st.floats(0.05, 1.5)


def train(mode, *parts):
    laser = fa.Laser(mode=mode, power=1.0, state=fa.elliptical(0.3, 0.2), name="laser")
    camera = fa.Camera(pixel=20 * um, shape=(24, 32), centre=(0.2 * mm, 0.0), name="cam")
    return fa.Train(wavelength=WAVELENGTH).along(laser, *parts, camera)


def plate():
    return fa.QPlate(q=0.5, centre=(0.1 * mm, -0.05 * mm), retardance=140 * deg, name="qp")


@settings(max_examples=20, deadline=None)
@given(modes, lengths, st.sampled_from([0.3, -0.5, 1.0]), lengths)
def test_a_mode_carried_through_a_section_is_what_free_travel_makes_of_it(mode, before, focal, after):
    """Beside the free travel of the family itself, which knows nothing of sections, and the thin lens on its field."""
    section = TravelLaw(1.0, before, 0.0, 1.0, before).then(TravelLaw(1.0, 0.0, -1 / focal, 1.0, 0.0))
    term = carried(Term(0.6 + 0.8j, mode, fa.H), section, WAVELENGTH)
    x = np.linspace(-1, 1, 7) * mm
    y = x[:, None] * 0.7
    lens = np.exp(-1j * np.pi * (x**2 + y**2) / (WAVELENGTH * focal))
    right = (0.6 + 0.8j) * mode.moved(before).amplitude(x, y, WAVELENGTH) * lens
    found = term.number * term.mode.amplitude(x, y, WAVELENGTH)
    # A lens turns the phase by up to some 30 rad here, of which the waist behind it keeps 13 digits.
    assert np.allclose(found, right, rtol=0, atol=1e-12 * abs(right).max())
    # Behind the lens it travels on as a mode of its own.
    on = carried(term, TravelLaw(1.0, after, 0.0, 1.0, after), WAVELENGTH)
    free = term.number * term.mode.moved(after).amplitude(x, y, WAVELENGTH)
    assert np.allclose(on.number * on.mode.amplitude(x, y, WAVELENGTH), free, rtol=0, atol=1e-12 * abs(free).max())


@settings(max_examples=12, deadline=None)
@given(modes, lengths, st.floats(-0.9, 0.9), st.booleans(), lengths)
def test_the_answer_is_unchanged(mode, before, fast, fold, after):
    parts = [fa.Retarder(fast=fast, retardance=1.0), fa.FreeSpace(before), *[fa.Mirror()] * fold]
    bench = train(mode, *parts, plate(), fa.FreeSpace(after))
    plan = bench.plan("cam", engine="grid")
    assert plan.branches[0].opening == ("space1",)
    (branch,) = simplified(unfused(bench, "cam")).branches
    spread = of_beam(branch.beam, WAVELENGTH)
    whole = replace(branch, sampling=sampling_for(branch.steps, spread, WAVELENGTH, None))
    assert whole.sampling.planes[-1] == plan.sampling.planes[-1]
    one, other = (propagate(each)[0] for each in (plan, replace(plan, branches=(whole,))))
    raster = Raster(20 * um, (24, 32))
    right = other.stokes_on(raster)
    # At the edge of a window of three radii a mode of the source is down to exp(-9), its power to 2e-8.
    assert np.allclose(one.stokes_on(raster), right, rtol=0, atol=2e-7 * right.max())
    assert one.power == pytest.approx(other.power, rel=1e-6)


def test_light_that_nothing_shapes_stays_on_the_samples_asked_for():
    plan = train(Gaussian(waist=0.5 * mm), fa.FreeSpace(1.0)).plan("cam", engine="grid")
    assert plan.branches[0].opening == ()
    assert [step.names for step in plan.steps] == [("space1",)]


@pytest.mark.parametrize(
    "mode", [Gaussian(waist=0.5 * mm, centre=(0.1 * mm, 0.0)), fa.FlatTop(radius=0.5 * mm)], ids=["beside", "flat"]
)
def test_what_is_no_mode_on_the_axis_begins_at_the_source(mode):
    plan = train(mode, fa.FreeSpace(0.2), plate(), fa.FreeSpace(0.3)).plan("cam", engine="grid")
    assert plan.branches[0].opening == ()
    assert advance(plan) is plan


def test_the_plan_says_so():
    plan = train(Gaussian(waist=0.5 * mm), fa.FreeSpace(0.2), fa.Lens(focal=0.4), plate(), fa.FreeSpace(0.3)).plan(
        "cam", engine="grid"
    )
    assert "space1, lens1 in closed form: up to there the modes of the laser keep their shape" in str(plan)
    assert "0. space1, lens1 in closed form: window" in str(plan)


def test_two_modes_keep_their_phase():
    """A Gaussian and a ring in two states: where they are alike the azimuth turns with their Gouy phases."""
    beam = Beam((Term(1, Gaussian(waist=0.4 * mm), fa.R), Term(1, LaguerreGauss(0, 1, 0.4 * mm), fa.L)))
    stop = fa.Aperture(radius=4 * mm, centre=(0.1 * mm, 0.0))  # ten radii wide: there is nothing to stop
    camera = fa.Camera(pixel=20 * um, shape=(48, 48), name="cam")
    stopped, free = (
        fa.Train(wavelength=WAVELENGTH).along(fa.Laser(beam=beam, power=1.0), fa.FreeSpace(0.8), *parts, camera)
        for parts in ([stop], [])
    )
    assert stopped.plan("cam", engine="grid").branches[0].opening == ("space1",)
    sampled, right = stopped.expose("cam", fa.H, engine="grid"), free.expose("cam", fa.H, engine="azimuthal")
    assert np.allclose(sampled.stokes, right.stokes, rtol=0, atol=1e-9 * right.stokes.max())


@pytest.mark.filterwarnings(
    "ignore::fastaxis.errors.SamplingWarning"
)  # of the axis of the plate, the same on both sides
@pytest.mark.parametrize(
    "mode", [Gaussian(waist=0.3 * mm), LaguerreGauss(p=2, l=3, waist=0.2 * mm), HermiteGauss(4, 1, 0.2 * mm)]
)
def test_dark_samples_are_not_carried_and_change_nothing(mode):
    """Near travel fills the window up again, a single transform does not; all rounding of the power is kept."""
    near, far = (train(mode, fa.FreeSpace(0.1), plate(), fa.FreeSpace(d)) for d in (20 * mm, 2.0))
    for bench in (near, far):
        branch = bench.plan("cam", engine="grid", grid=GRID).branches[0]
        light = begun(branch)
        assert light.count < light.full == 1024
        # The samples left out hold 1e-25 of the power, the rest is known to a sum of 1e5 roundings.
        assert light.power == pytest.approx(branch.power, rel=1e-12)
        (found,) = propagate(bench.plan("cam", engine="grid", grid=GRID))
        right = finished(continued(light.filled_up(), branch, 0, len(branch.steps)), branch)
        x = np.linspace(-0.8, 0.9, 9) * mm
        # 3e-13 of the field were left out.
        assert np.allclose(found.at(x, x), right.at(x, x), rtol=0, atol=1e-12 * abs(right.at(x, x)).max())


def test_beyond_its_reach_a_mode_holds_rounding_only():
    """Beside its samples on a wide window, for modes of many rings and of many lines."""
    for mode in (
        LaguerreGauss(p=0, l=8, waist=0.3 * mm),
        LaguerreGauss(p=6, l=1, waist=0.3 * mm),
        HermiteGauss(9, 0, 0.3 * mm),
    ):
        branch = train(mode, fa.FreeSpace(0.1), plate(), fa.FreeSpace(2.0)).plan("cam", engine="grid").branches[0]
        reach = _reach(branch)
        x = np.linspace(-1.5, 1.5, 801) * reach
        power = abs(branch.beam.terms[0].mode.amplitude(x, x[:, None], WAVELENGTH)) ** 2
        outside = (abs(x) > reach) | (abs(x[:, None]) > reach)
        assert power[outside].sum() <= 1e-25 * power.sum()
        tighter = (abs(x) > 0.75 * reach) | (abs(x[:, None]) > 0.75 * reach)
        assert power[tighter].sum() > 1e-25 * power.sum()
