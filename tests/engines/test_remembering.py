"""A question that begins as an earlier one did goes on from there, and its answer is what it always was."""

import random
from concurrent.futures import ThreadPoolExecutor
from dataclasses import fields, replace

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines import grid, propagate
from fastaxis.engines.memory import LIGHT, UP_TO, forget_light
from fastaxis.engines.remembering import APART, keys_of
from fastaxis.laws import TravelLaw, Turn
from fastaxis.plan import Branch
from fastaxis.plan.steps import Step
from fastaxis.units import deg, mm, nm, um

GRID = fa.Grid(samples=64, window=6 * mm)

pytestmark = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


@pytest.fixture(autouse=True)
def all_room():
    yield
    fa.remember_light(up_to=UP_TO)


def bench():
    return fa.Train(wavelength=633 * nm, name="Gannet Stack").along(
        fa.Laser(waist=0.6 * mm, state=fa.D, name="laser"),
        fa.QPlate(q=0.5, centre=(0.1 * mm, 0), name="first"),
        fa.FreeSpace(distance=0.2, name="arm"),
        fa.SpiralPlate(charge=1, centre=(0, 0.1 * mm), name="spiral"),
        fa.HalfWavePlate(fast=10 * deg, name="hwp"),
        fa.FreeSpace(distance=0.1, name="leg"),
        fa.QPlate(q=-0.5, retardance=100 * deg, name="late"),
        fa.Camera(pixel=100 * um, shape=(24, 24), name="cam"),
    )


KNOBS = {
    "laser.waist": (0.4 * mm, 0.7 * mm), "laser.power": (1e-3, 5e-3), "first.offset": (0.1, 1.0),
    "first.centre_x": (0.05 * mm, 0.2 * mm), "arm.distance": (0.1, 0.4), "spiral.centre_y": (0.0, 0.2 * mm),
    "hwp.fast": (0.0, 1.5), "leg.distance": (0.05, 0.3), "late.offset": (0.0, 1.0), "late.retardance": (1.0, 3.0),
}  # fmt: skip


def stokes(train, **options):
    return train.expose("cam", [fa.H], engine="grid", grid=options.pop("grid", GRID), **options).stokes


@pytest.fixture
def travels(monkeypatch):
    """Counts the travels that are worked out."""
    done, past = [], grid._past
    monkeypatch.setattr(
        grid, "_past", lambda light, law, *rest, **more: done.append(law) or past(light, law, *rest, **more)
    )
    return done


def test_a_late_knob_costs_the_steps_behind_it(travels):
    train, counts = bench(), []
    for angle in (0.1, 0.2, 0.3, 0.4):
        stokes(train.with_changes({"late.offset": angle}))
        counts.append(len(travels))
        travels.clear()
    # The second turn shows what stays; from the third on nothing but the plate itself is met.
    assert counts[0] == counts[1] > 3
    assert counts[2:] == [1, 1]


def test_the_same_question_again_costs_no_step_at_all(travels):
    for _ in range(2):
        stokes(bench())
    travels.clear()
    stokes(bench())
    assert not travels


@pytest.mark.parametrize("seed", range(8))
def test_remembered_is_fresh(seed):
    """Random knobs in random order, old values among the new ones; each answer beside that of an empty memory."""
    rng, train = random.Random(seed), bench()
    values = {knob: [rng.uniform(*ends) for _ in range(2)] for knob, ends in KNOBS.items()}
    steps = []
    for _ in range(10):
        train = train.with_changes({knob: rng.choice(values[knob]) for knob in rng.sample(sorted(KNOBS), 2)})
        options = {"precision": rng.choice(["double", "double", "single"])}
        if rng.random() < 0.2:
            options["grid"] = fa.Grid(samples=48, window=6 * mm)
        steps.append((train, options, stokes(train, **options)))
    fa.remember_light(up_to=0)
    for one, options, known in steps:
        fresh = stokes(one, **options)
        # A plate and the matrix behind it are met in one go or in two: a rounding of each sample.
        tolerance = 1e-5 if options["precision"] == "single" else 1e-13
        assert abs(known - fresh).max() <= tolerance * fresh.max()


@pytest.mark.parametrize("seed", range(4))
def test_remembered_harmonics_are_fresh(seed):
    rng = random.Random(seed)
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.6 * mm, state=fa.D, name="laser"), fa.QPlate(q=0.5, name="first"), fa.FreeSpace(0.5, name="arm"),
        fa.HalfWavePlate(fast=10 * deg, name="hwp"), fa.Camera(pixel=100 * um, shape=(24, 24), name="cam"),
    )  # fmt: skip
    knobs = ["laser.waist", "laser.power", "first.offset", "first.retardance", "arm.distance", "hwp.fast"]
    values = {knob: [rng.uniform(*KNOBS.get(knob, (1.0, 3.0))) for _ in range(2)] for knob in knobs}
    steps = []
    for _ in range(8):
        train = train.with_changes({knob: rng.choice(values[knob]) for knob in rng.sample(knobs, 2)})
        steps.append((train, train.expose("cam", [fa.H], engine="azimuthal").stokes))
    for one, known in steps:
        forget_light()
        # Shapes alike to 32 roundings of their peak are taken for the same.
        assert abs(known - one.expose("cam", [fa.H], engine="azimuthal").stokes).max() <= 1e-12 * known.max()


def test_light_handed_over_is_remembered_as_well():
    parts = [fa.QPlate(q=0.5, name="qp"), fa.FreeSpace(0.3), fa.QPlate(q=0.5, centre=(0.1 * mm, 0), name="late")]
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.5 * mm), *parts, fa.Camera(pixel=100 * um, shape=(16, 16), name="cam")
    )
    assert train.plan("cam").engine == "handover"
    known = [train.with_changes({"late.offset": v}).expose("cam", [fa.H]).stokes for v in (0.1, 0.2, 0.3)]
    forget_light()
    fresh = train.with_changes({"late.offset": 0.3}).expose("cam", [fa.H]).stokes
    assert abs(known[-1] - fresh).max() <= 1e-13 * fresh.max()


def test_light_before_a_last_turn_is_not_light_at_the_target():
    """Samples about a singular axis are made ready to be sheared; at the target point values are right."""
    branch = bench().plan("cam", engine="grid", grid=GRID).branches[0]
    sampling = replace(branch.sampling, planes=(*branch.sampling.planes, branch.sampling.planes[-1]))
    turned = replace(branch, steps=(*branch.steps, Step(("turner",), Turn(0.3))), sampling=sampling)
    end = len(branch.steps)
    last = max(i for i, step in enumerate(branch.steps) if isinstance(step.law, TravelLaw))
    straight, before = keys_of("grid", branch, end), keys_of("grid", turned, end)
    assert [straight[i] == before[i] for i in range(end + 1)] == [i <= last for i in range(end + 1)]


def test_warnings_are_given_again():
    train = bench().with_changes({"leg.distance": 30.0})
    for _ in range(3):
        with pytest.warns(fa.SamplingWarning):
            stokes(train)


def test_what_is_kept_is_not_used_up():
    train = bench()
    answers = [stokes(train) for _ in range(4)]
    for answer in answers[1:]:
        assert np.array_equal(answer, answers[0])


def test_a_pattern_is_known_by_its_cells_and_a_function_not_at_all():
    def keys(axis, **more):
        plate = fa.PatternedRetarder(fast=axis, retardance=1.0, name="cells", **more)
        train = fa.Train(wavelength=633 * nm).along(fa.Laser(waist=0.5 * mm), plate, fa.FreeSpace(0.1))
        return keys_of("grid", train.plan("space1", grid=GRID, engine="grid").branches[0], 2)

    cells = np.linspace(0, 1, 12).reshape(3, 4)
    same, other = cells.copy(), cells.copy()
    other[1, 2] += 1e-12
    assert keys(cells, pixel=0.1 * mm) == keys(same, pixel=0.1 * mm)
    assert keys(cells, pixel=0.1 * mm)[1] != keys(other, pixel=0.1 * mm)[1]
    assert list(keys(lambda x, y: x * 0 + y)) == [0]


def test_all_that_a_branch_has_counts_but_what_is_told_apart():
    """A new field of a branch is part of the key unless it is put on the list."""
    assert {f.name for f in fields(Branch)} > APART
    branch = bench().plan("cam", grid=GRID, engine="grid").branches[0]
    assert branch.sampling.chosen == "by hand"
    first = keys_of("grid", branch, 0)[0]
    assert keys_of("handover", branch, 0)[0] != first
    train = bench().with_changes({"laser.power": 2e-3})
    assert keys_of("grid", train.plan("cam", grid=GRID, engine="grid").branches[0], 0)[0] != first


def test_large_light_is_not_kept_and_has_most_of_the_room():
    stokes(bench())
    stokes(bench())
    assert LIGHT.size > 64 * 64 * 16
    fa.remember_light(up_to=4 * 64 * 64 * 16)  # of which three quarters of a quarter are too little for one field
    LIGHT.put("other", "light", LIGHT.largest)
    LIGHT.put("little", "light", 100)
    stokes(bench().with_changes({"first.offset": 0.5}))
    assert "other" not in LIGHT
    assert "little" in LIGHT
    assert LIGHT.size < LIGHT.largest


def test_nothing_is_kept_if_so_asked():
    fa.remember_light(up_to=0)
    stokes(bench())
    stokes(bench())
    assert len(LIGHT) == 0


def test_threads_ask_at_once():
    train = bench()
    angles = [0.1 * i for i in range(6)]
    changed = [train.with_changes({"late.offset": angle}) for angle in angles]
    with ThreadPoolExecutor(3) as pool:
        known = list(pool.map(stokes, changed * 2))
    fa.remember_light(up_to=0)
    for one, (first, second) in zip(changed, zip(known[:6], known[6:], strict=True), strict=True):
        fresh = stokes(one)
        assert max(abs(first - fresh).max(), abs(second - fresh).max()) <= 1e-13 * fresh.max()
