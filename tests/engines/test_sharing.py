"""Steps that plans have in common are done once, and the answers stay what they were."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines import propagate
from fastaxis.engines.sharing import Prefix, Relay, shared_steps
from fastaxis.units import deg, mm, nm

GRID = fa.Grid(samples=64, window=6 * mm)

pytestmark = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


def plan(grid=GRID, **changes):
    train = fa.Train(wavelength=633 * nm, name="Gannet Stack").along(
        fa.Laser(waist=0.6 * mm, state=fa.D, name="laser"),
        fa.QPlate(q=0.5, centre=(0.1 * mm, 0), name="first"),
        fa.FreeSpace(distance=0.2, name="arm"),
        fa.QPlate(q=-0.5, retardance=100 * deg, name="second"),
        fa.HalfWavePlate(fast=10 * deg, name="hwp"),
        fa.FreeSpace(distance=0.1, name="leg"),
        fa.Camera(pixel=50e-6, shape=(8, 8), name="cam"),
    )
    return train.with_changes({key.replace("_", ".", 1): value for key, value in changes.items()}).plan(
        "cam", grid=grid
    )


# The steps are first, arm, second, hwp, leg.
@pytest.mark.parametrize(
    ("changes", "count"),
    [
        ({}, 5),
        ({"leg_distance": 0.2}, 4),
        ({"hwp_fast": 0.2}, 3),
        ({"second_retardance": 1.0}, 2),
        ({"arm_distance": 0.1}, 1),
        ({"first_offset": 0.1}, 0),
        ({"laser_waist": 0.5 * mm}, 0),
        ({"laser_power": 2e-3}, 0),
        ({"laser_state": fa.H}, 0),
        ({"grid": fa.Grid(samples=64, window=5 * mm)}, 0),
    ],
)
def test_steps_in_common_end_at_the_first_change(changes, count):
    assert shared_steps(plan(), plan(**changes)) == count
    assert len(plan().steps) == 5


def test_light_of_another_precision_is_not_shared():
    assert shared_steps(plan(), plan().with_precision("single")) == 0


def test_other_engines_are_not_stopped_on_the_way():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6)), fa.HalfWavePlate(fast=0), fa.Camera(pixel=1e-5, name="cam")
    )
    assert shared_steps(train.plan("cam"), train.plan("cam")) == 0


def assert_alike(found, right):
    """But for some roundings: a plate and the matrix behind it are multiplied first, unless a prefix ends there."""
    np.testing.assert_allclose(found, right, rtol=0, atol=8 * np.finfo(float).eps * abs(right).max())


@pytest.mark.parametrize("count", range(6))
def test_going_on_from_a_prefix_changes_nothing(count):
    (whole,), kept = propagate(plan()), Prefix.of(plan(), count)
    for _ in range(2):  # what is kept outlives its use
        (field,) = kept.propagate(plan())
        assert_alike(field.light.samples, whole.light.samples)
        assert vars(field.guard) == pytest.approx(vars(whole.guard), rel=1e-12)


def test_a_relay_gives_what_each_plan_gives_alone():
    lengths, angles = [0.1, 0.15], [0.1, 0.2, 0.3]
    relay = Relay()
    for length in lengths:
        plans = [plan(leg_distance=length, hwp_fast=angle) for angle in angles]
        for each, (field,) in zip(plans, relay.propagate(plans), strict=True):
            (alone,) = propagate(each)
            assert_alike(field.light.samples, alone.light.samples)


def test_a_relay_takes_common_steps_once(monkeypatch):
    begun = []
    from fastaxis.engines import grid  # noqa: PLC0415 - patched below

    start = grid.begun
    monkeypatch.setattr(grid, "begun", lambda branch: begun.append(1) or start(branch))
    relay = Relay()
    for length in (0.1, 0.12, 0.14, 0.16):
        list(relay.propagate([plan(leg_distance=length)]))
    # The second plan shows what is common, and its light is kept for all that follow.
    assert len(begun) == 2
