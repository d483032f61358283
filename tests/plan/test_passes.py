"""Every pass leaves the answer unchanged, whatever the train."""

import warnings
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from fastaxis.elements import (
    Camera,
    FaradayRotator,
    FreeSpace,
    Laser,
    Lens,
    Mirror,
    NeutralDensity,
    PatternedRetarder,
    Polarizer,
    Retarder,
    SpiralPlate,
    Wedge,
)
from fastaxis.engines import propagate
from fastaxis.light import Gaussian, elliptical
from fastaxis.plan import Grid
from fastaxis.plan.commute import commute
from fastaxis.plan.fuse import fuse
from fastaxis.plan.gather_flips import gather_flips
from fastaxis.plan.making import PASSES, simplified, unfused
from fastaxis.plan.merge import merge
from fastaxis.plan.multiply import multiply
from fastaxis.plan.proposing import sampling_for
from fastaxis.plan.spread import of_beam
from fastaxis.train import Train
from fastaxis.units import mm, mrad, nm, um

GRID = Grid(192, 13 * mm)
angles = st.floats(-3.0, 3.0).filter(lambda angle: angle == 0 or angle != round(angle))  # whole ones are cautioned


def smooth_plate(turn, wave):
    """A plate whose axis turns smoothly and slowly, so that no pass changes how well it is sampled."""
    return PatternedRetarder(
        fast=lambda x, y: turn + 0.3 * np.sin(x / 0.9e-3) + 0.2 * np.cos(y / 1.1e-3), retardance=wave
    )


parts = st.one_of(
    st.builds(lambda a, d: Retarder(fast=a, retardance=d), angles, angles),
    st.builds(lambda a: Polarizer(axis=a), angles),
    st.builds(lambda a: FaradayRotator(angle=a), angles),
    st.builds(lambda t: NeutralDensity(transmission=t), st.floats(0.2, 1.0)),
    st.builds(smooth_plate, angles, angles),
    st.builds(lambda d: FreeSpace(d), st.floats(0.05, 0.3)),
    st.builds(
        lambda f, x, y: Lens(focal=f, centre=(x, y)),
        st.sampled_from([0.6, 1.0, -0.8]),
        st.floats(-0.2e-3, 0.2e-3),
        st.floats(-0.2e-3, 0.2e-3),
    ),
    st.builds(lambda x, y: Wedge(x=x, y=y), st.floats(-0.5e-3, 0.5e-3), st.floats(-0.5e-3, 0.5e-3)),
    st.builds(lambda fold: Mirror(fold=fold), st.sampled_from(["horizontal", "vertical"])),
)


def answer(plan):
    (branch,) = plan.branches
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # a tight grid is the same on both sides
        sampling = sampling_for(branch.steps, of_beam(branch.beam, branch.wavelength), branch.wavelength, GRID)
        (field,) = propagate(replace(plan, branches=(replace(branch, sampling=sampling),), engine="grid"))
    places = np.linspace(-0.7e-3, 0.7e-3, 9)
    return field.at(places + 0.13e-3, places - 0.21e-3), field.power


def planned(some):
    laser = Laser(mode=Gaussian(waist=0.5 * mm), power=1.0, state=elliptical(0.3, 0.2), name="laser")
    train = Train(wavelength=633 * nm).along(laser, *some, Camera(pixel=10 * um, shape=(8, 8), name="cam"))
    return unfused(train, "cam")


@pytest.mark.parametrize(
    "rewrite", [fuse, commute, gather_flips, merge, multiply, simplified], ids=lambda f: f.__name__
)
@settings(max_examples=12, deadline=None, suppress_health_check=list(HealthCheck))
@given(some=st.lists(parts, min_size=1, max_size=7))
def test_the_answer_is_unchanged(rewrite, some):
    plan = planned(some)
    (before, power), (after, power_after) = answer(plan), answer(rewrite(plan))
    # The 13 mm window holds the 0.5 .. 1.5 mm beams to about 1e-9 of their peak at its edge, and merging
    # travels changes what wraps round there; the source's peak is 1/(w sqrt(pi/2)) = 1600 per metre.
    assert np.allclose(before, after, atol=1600 * 1e-7)
    assert power_after == pytest.approx(power, rel=1e-9, abs=1e-12)


BOTH_FOLDS = [
    Wedge(x=0.3 * mrad),
    Wedge(y=-0.2 * mrad),
    Mirror(),
    smooth_plate(0.4, 2.0),
    FreeSpace(0.2),
    Lens(focal=0.8, centre=(0.2 * mm, 0.1 * mm)),
    Mirror(fold="vertical"),
    Retarder(fast=0.3, retardance=1.0),
    smooth_plate(-0.2, 1.0),
    Mirror(),
    Wedge(x=0.2 * mrad, y=0.4 * mrad),
    FreeSpace(0.1),
]


@pytest.mark.parametrize("rewrite", [*dict.fromkeys(PASSES), simplified], ids=lambda f: f.__name__)
def test_the_answer_is_unchanged_where_every_pass_has_work(rewrite):
    plan = planned(BOTH_FOLDS)
    after = rewrite(fuse(plan)) if rewrite is commute else rewrite(plan)
    assert after is not plan
    (before, power), (found, power_after) = answer(plan), answer(after)
    assert np.allclose(before, found, atol=1600 * 1e-7)  # as above
    assert power_after == pytest.approx(power, rel=1e-9)


def test_a_pass_that_changes_nothing_says_nothing():
    plan = planned([FreeSpace(0.1)])
    assert all(rewrite(plan) is plan for rewrite in PASSES)


def test_a_run_of_plates_and_spaces_is_one_matrix_and_one_travel():
    some = [Retarder(fast=0.3), FreeSpace(0.1), Retarder(fast=0.1), Mirror(), FreeSpace(0.1), Lens(focal=0.5), Mirror()]
    plan = simplified(planned(some))
    assert [type(step.law).__name__ for step in plan.steps] == ["JonesStep", "TravelLaw"]
    assert plan.steps[1].names == ("space1", "space2", "lens1")


def test_a_polarizer_gathers_right_behind_the_patterned_plate():
    plan = simplified(planned([smooth_plate(0.0, 3.0), FreeSpace(0.1), Polarizer(axis=0.3)]))
    assert [type(step.law).__name__ for step in plan.steps] == ["AxisLaw", "JonesStep", "TravelLaw"]


def test_parts_in_one_plane_are_one_scalar_law():
    plan = simplified(planned([SpiralPlate(charge=1), Wedge(x=1 * mrad), SpiralPlate(charge=2)]))
    assert [step.law.charge for step in plan.steps] == [3]


def test_parts_with_different_centres_stay_apart():
    plan = simplified(planned([SpiralPlate(charge=1), SpiralPlate(charge=2, centre=(0.1 * mm, 0.0))]))
    assert [step.law.charge for step in plan.steps] == [1, 2]
