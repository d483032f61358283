import math
import warnings
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from fastaxis.elements import (
    Camera,
    DovePrism,
    FreeSpace,
    KMirror,
    Laser,
    Lens,
    Mirror,
    PatternedRetarder,
    RectangularAperture,
    Retarder,
    SpiralPlate,
    Wedge,
)
from fastaxis.engines import propagate
from fastaxis.laws import Amplitude, AxisLaw, Disc, Flip, Rectangle, ScalarLaw, TravelLaw, Turn
from fastaxis.light import Gaussian, elliptical
from fastaxis.maths import NUMBERS, Pattern
from fastaxis.plan import Grid, Step, make_plan
from fastaxis.plan.gather_flips import gather_flips
from fastaxis.plan.making import simplified, unfused
from fastaxis.plan.proposing import sampling_for
from fastaxis.plan.spread import Spread, of_beam
from fastaxis.plan.turning import seen_before_turn, turned
from fastaxis.train import Train
from fastaxis.units import deg, mm, mrad, nm, um

PLACES = [(0.4, 0.9), (-0.7, 0.2), (0.5, -0.6)]
TURNS = [0.3, -2.0, math.pi / 2, math.pi]


def _matrix(law, x, y):
    x, y = x - law.centre[0], y - law.centre[1]
    return np.array(law.linear(NUMBERS, np.arctan2(y, x), x, y))


@pytest.mark.parametrize("angle", TURNS)
@pytest.mark.parametrize("q", [0.5, 1, -1.5])
def test_a_q_plate_behind_a_turn_is_seen_at_the_place_the_light_comes_from(angle, q):
    law = AxisLaw(Amplitude(1.0, -0.8), Amplitude(1.0, 0.8), 0.3, q, (0.1, -0.2))
    before = seen_before_turn(law, angle)
    for place in PLACES:
        # Light at r leaves the turn at R(angle) r and meets the plate there; a few roundings of angles.
        assert np.allclose(_matrix(before, *place), _matrix(law, *turned(place, angle)), atol=1e-14)


@pytest.mark.parametrize("angle", TURNS)
def test_a_spiral_wedge_with_a_hole_behind_a_turn(angle):
    law = ScalarLaw(Amplitude(0.5, 0.2), 3, 2.0, (0.2, -0.1), Disc(0.8), (0.1, 0.3))
    before = seen_before_turn(law, angle)

    def phase(law, x, y):
        x, y = x - law.centre[0], y - law.centre[1]
        tilt = law.tilt[0] * x + law.tilt[1] * y
        return law.transmission.number() * np.exp(
            1j * (law.charge * np.arctan2(y, x) + tilt - law.vergence * (x * x + y * y))
        )

    for place in PLACES:
        assert phase(before, *place) == pytest.approx(phase(law, *turned(place, angle)), abs=1e-14)
    assert before.stop == law.stop


def test_what_cannot_be_turned_says_so():
    pattern = Pattern(lambda x, y: x)
    assert seen_before_turn(AxisLaw(angle=pattern), 0.3) is None
    assert seen_before_turn(ScalarLaw(Amplitude(1.0, pattern)), 0.3) is None
    assert seen_before_turn(ScalarLaw(stop=Rectangle(1.0, 2.0)), 0.3) is None
    uniform, space = AxisLaw(angle=0.4), TravelLaw.free(1.0)
    assert seen_before_turn(uniform, 0.3) is uniform
    assert seen_before_turn(space, 0.3) is space


def places(steps, x, y):
    for step in steps:
        if isinstance(step.law, Flip):
            x, y = (-x, y) if step.law.axis == "x" else (x, -y)
        else:
            x, y = turned((x, y), step.law.angle)
    return x, y


@pytest.mark.parametrize(
    "laws",
    [
        (Turn(0.3), Turn(0.4)),
        (Flip("x"), Turn(0.3)),
        (Flip("y"), Turn(0.3), Flip("x"), Turn(-1.0), Flip("y")),
        (Turn(0.2), Flip("x"), Flip("y"), Turn(0.5)),
        (Flip("y"), Turn(0.6), Flip("y"), Turn(0.6)),
        (Flip("y"), Turn(math.pi), Flip("y"), Turn(math.pi)),
    ],
)
def test_turns_and_flips_gather_into_one_of_each(laws, bench):
    (branch,) = unfused(bench(), "cam").branches
    steps = tuple(Step((f"part{k}",), law) for k, law in enumerate(laws))
    plan = replace(unfused(bench(), "cam"), branches=(replace(branch, steps=steps),))
    gathered = gather_flips(plan).steps
    assert places(gathered, 0.3, -0.8) == pytest.approx(places(steps, 0.3, -0.8), abs=1e-14)
    assert sum(isinstance(step.law, Turn) for step in gathered) <= 1


def test_two_equal_prisms_leave_nothing_to_be_turned(bench):
    plan = simplified(
        unfused(bench(DovePrism(index=1.5, roll=0.4), FreeSpace(0.1), DovePrism(index=1.5, roll=0.4)), "cam")
    )
    assert [type(step.law).__name__ for step in plan.steps] == ["JonesStep", "TravelLaw"]


def test_a_prism_parts_no_travel(bench):
    plan = simplified(unfused(bench(FreeSpace(0.1), KMirror(roll=10 * deg), FreeSpace(0.2)), "cam"))
    assert [type(step.law).__name__ for step in plan.steps] == ["JonesStep", "TravelLaw", "Turn", "Flip"]
    # The turn goes before the reversal, where it has the other sense.
    assert "picture turned by -20 deg" in str(make_plan(bench(KMirror(roll=10 * deg)), "cam", engine="grid"))


def test_a_turn_waits_before_a_rectangle(bench):
    plan = simplified(unfused(bench(KMirror(roll=10 * deg), RectangularAperture(width=1 * mm, height=2 * mm)), "cam"))
    names = [type(step.law).__name__ for step in plan.steps]
    assert names.index("Turn") < names.index("ScalarLaw") < names.index("Flip")


def test_the_middle_of_the_beam_goes_with_the_picture():
    spread = Spread(1e-3, 0.0, 1e-4, (1e-3, 0.0), (0.0, 2e-3))
    after = spread.past(Turn(math.pi / 2), 633e-9)
    assert after.offset == pytest.approx((0.0, 1e-3), abs=1e-18)
    assert after.slope == pytest.approx((-2e-3, 0.0), abs=1e-18)


# A whole number of radians is warned about, as degrees without their unit.
angles = st.floats(-3.0, 3.0).filter(lambda angle: not angle.is_integer())
parts = st.one_of(
    st.builds(lambda roll: KMirror(roll=roll), angles),
    st.builds(lambda roll: DovePrism(index=1.5, roll=roll), angles),
    st.builds(lambda a, d: Retarder(fast=a, retardance=d), angles, angles),
    st.builds(lambda: PatternedRetarder(fast=lambda x, y: 0.3 * np.sin(x / 0.9e-3) + 0.1 * y / 1e-3, retardance=2.0)),
    st.builds(lambda d: FreeSpace(d), st.floats(0.05, 0.3)),
    st.builds(lambda x, y: Lens(focal=0.8, centre=(x, y)), st.floats(-2e-4, 2e-4), st.floats(-2e-4, 2e-4)),
    st.builds(lambda x, y: Wedge(x=x, y=y), st.floats(-0.5e-3, 0.5e-3), st.floats(-0.5e-3, 0.5e-3)),
    st.builds(lambda fold: Mirror(fold=fold), st.sampled_from(["horizontal", "vertical"])),
)


@settings(max_examples=12, deadline=None, suppress_health_check=list(HealthCheck))
@given(some=st.lists(parts, min_size=2, max_size=6))
def test_the_answer_is_unchanged(some):
    laser = Laser(mode=Gaussian(waist=0.5 * mm), power=1.0, state=elliptical(0.3, 0.2), name="laser")
    train = Train(wavelength=633 * nm).along(laser, *some, Camera(pixel=10 * um, shape=(8, 8), name="cam"))
    fields = []
    for plan in (unfused(train, "cam"), simplified(unfused(train, "cam"))):
        (branch,) = plan.branches
        grid, x = Grid(192, 13 * mm), np.linspace(-1.4e-3, 1.4e-3, 15)
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")  # the grid is set by hand; both sides of the comparison have the same
            sampling = sampling_for(branch.steps, of_beam(branch.beam, branch.wavelength), branch.wavelength, grid)
            (field,) = propagate(replace(plan, engine="grid", branches=(replace(branch, sampling=sampling),)))
        fields.append(field.at(x, x))
    # As in the other passes: the 13 mm window holds the beams to about 1e-9 of their peak of 1600 per metre.
    assert np.allclose(*fields, atol=1600 * 1e-7)


def test_a_charge_behind_a_prism_is_reversed_and_turned(bench):
    (step,) = (
        s
        for s in simplified(unfused(bench(KMirror(roll=0.2), SpiralPlate(charge=2)), "cam")).steps
        if isinstance(s.law, ScalarLaw)
    )
    assert step.law.charge == -2
