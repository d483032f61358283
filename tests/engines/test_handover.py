"""Light about the axis by harmonics, handed over to samples before a part off the axis."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines import handover, propagate
from fastaxis.engines.sharing import Relay, shared_steps
from fastaxis.light import Raster, stokes
from fastaxis.plan import make_plan
from fastaxis.units import deg, mm, nm, um

RASTER = Raster(30 * um, (48, 50))
PARTS = {
    "q-plates": [fa.QPlate(q=0.5), fa.FreeSpace(0.4), fa.QPlate(q=0.5, centre=(0.1 * mm, 0)), fa.FreeSpace(0.2)],
    "spiral": [
        fa.SpiralPlate(charge=1),
        fa.FreeSpace(0.3),
        fa.Lens(focal=0.3, centre=(0.1 * mm, 0)),
        fa.FreeSpace(0.3),
    ],
    "hole": [
        fa.Aperture(radius=0.4 * mm),
        fa.FreeSpace(0.4),
        fa.Lens(focal=0.3, centre=(0, 0.1 * mm)),
        fa.FreeSpace(0.2),
    ],
}

pytestmark = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


def train(*parts, **laser):
    laser = {"state": fa.elliptical(10 * deg, 20 * deg)} | laser
    return fa.Train(wavelength=633 * nm, name="Gannet Stack").along(
        fa.Laser(waist=0.5 * mm, name="laser", **laser), *parts, fa.Camera(pixel=30 * um, shape=(48, 50), name="cam")
    )


def images(plan):
    return propagate(plan)[0].stokes_on(RASTER)


@pytest.mark.parametrize("name", PARTS)
def test_agrees_with_samples_all_the_way(name):
    """What both lack is the tail outside of 20 mm: 1e-4 of the power behind a plate or a rim."""
    bench = train(*PARTS[name])
    plan = make_plan(bench, "cam")
    assert plan.engine == "handover"
    ours = images(plan)
    coarse, fine = (images(make_plan(bench, "cam", grid=fa.Grid(n, 20 * mm))) for n in (1024, 2048))
    own_error = abs(coarse - fine).max()
    assert abs(ours - fine).max() < own_error + 2e-4 * fine[0].max()
    if name == "q-plates":
        # Samples all the way cut the tail of the first plate at the second one's window; harmonics follow it.
        alone = images(make_plan(bench, "cam", engine="grid"))
        assert abs(ours - fine).max() < abs(alone - fine).max() / 3


def test_the_plan_says_where():
    text = str(make_plan(train(*PARTS["q-plates"]), "cam"))
    assert "engine handover" in text
    assert "1. qplate1: axis law, q = 0.5; by harmonics\n" in text
    assert "by harmonics, handed over to samples: window" in text
    assert "source:" not in text


@pytest.mark.parametrize(
    ("parts", "engine"),
    [
        ([fa.QPlate(q=0.5), fa.FreeSpace(0.4)], "azimuthal"),
        ([fa.FreeSpace(0.4), fa.QPlate(q=0.5, centre=(0.1 * mm, 0)), fa.FreeSpace(0.2)], "grid"),
        ([fa.QPlate(q=0.5), fa.QPlate(q=0.5, centre=(0.1 * mm, 0)), fa.FreeSpace(0.2)], "grid"),
        ([fa.Lens(focal=1.0), fa.FreeSpace(0.4), fa.Lens(focal=0.3, centre=(0.1 * mm, 0))], "grid"),
    ],
)
def test_only_where_it_pays(parts, engine):
    """No part off the axis; none singular; no travel in between; nothing hard."""
    assert make_plan(train(*parts), "cam").engine == engine


def test_samples_set_by_hand_begin_at_the_source():
    bench = train(*PARTS["q-plates"])
    assert make_plan(bench, "cam", grid=fa.Grid(512, 10 * mm)).engine == "grid"
    assert make_plan(bench, "cam", engine="grid").engine == "grid"


def test_one_state_stays_one_scalar_field():
    (branch,) = make_plan(train(*PARTS["spiral"]), "cam").branches
    light = handover.begun(branch)
    assert light.samples.shape[0] == 1
    seen = stokes(light.jones)
    assert seen / seen[0] == pytest.approx(fa.elliptical(10 * deg, 20 * deg).stokes, abs=1e-12)
    (branch,) = make_plan(train(*PARTS["q-plates"]), "cam").branches
    assert handover.begun(branch).samples.shape[0] == 2


def test_single_precision_is_kept():
    plan = make_plan(train(*PARTS["hole"]), "cam").with_precision("single")
    assert handover.begun(plan.branches[0]).samples.dtype == np.complex64


def test_plans_share_what_they_begin_with():
    plans = [
        make_plan(train(*PARTS["q-plates"], fa.QPlate(q=1, offset=a, centre=(0.1 * mm, 0)), fa.FreeSpace(0.1)), "cam")
        for a in (0.1, 0.4)
    ]
    assert shared_steps(*plans) == 4
    shared = [lights[0].stokes_on(RASTER) for lights in Relay().propagate(plans)]
    for plan, seen in zip(plans, shared, strict=True):
        alone = images(plan)
        assert abs(seen - alone).max() < 1e-13 * alone.max()
    other = make_plan(train(fa.QPlate(q=1), *PARTS["q-plates"][1:]), "cam")
    assert shared_steps(plans[0], other) == 0


def test_an_angle_before_the_axis_is_swept_by_sums():
    bench = train(fa.HalfWavePlate(fast=0.0, name="hwp"), *PARTS["q-plates"])
    angles = [0.0, 0.3, 0.7, 1.1]
    swept = bench.sweep({"hwp.fast": angles}, "cam", fa.H)
    assert "engine handover" in swept.exposure(0).plan
    assert swept.propagations <= 3
    for angle in angles[1::2]:
        alone = bench.with_changes({"hwp.fast": angle}).expose("cam", fa.H).frame(0)
        assert abs(swept.frame({"hwp.fast": angle}, "H") - alone).max() < 1e-11 * alone.max()
