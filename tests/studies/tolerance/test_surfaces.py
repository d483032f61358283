"""Errors that move more than polarization: a response surface beside brute force."""

from concurrent.futures import ProcessPoolExecutor

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.studies.tolerance import (
    lobe_angle,
    normal,
    power_at,
    ring_radius,
    stokes_component,
    together,
    uniform,
)
from fastaxis.studies.tolerance.polynomials import Polynomials, nodes
from fastaxis.units import deg, mm, nm, um

ERRORS = {
    "hwp.fast": normal(1 * deg),
    "qp.retardance": normal(2 * deg),
    "space.distance": normal(5 * mm),
    "laser.waist": normal(0.01 * mm),
}
MERITS = {
    "ring": ring_radius("cam"),
    "lobe": lobe_angle("cam", fa.H, count=2),
    "behind D": power_at("iris", fa.D),
    "s1": stokes_component("iris", 1),
}


@pytest.fixture(scope="module")
def clipped():
    """A radial beam that an iris cuts, so that its power depends on the distance and the waist."""
    return fa.Train(wavelength=532 * nm, name="Saltpan").along(
        fa.Laser(waist=0.5 * mm, power=1e-3, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=2 * deg, name="hwp"),
        fa.QPlate(q=0.5, retardance=160 * deg, name="qp"),
        fa.FreeSpace(300 * mm, name="space"),
        fa.Aperture(radius=0.7 * mm, name="iris"),
        fa.FreeSpace(100 * mm, name="rest"),
        fa.Camera(pixel=60 * um, shape=(32, 32), name="cam"),
    )


@pytest.fixture(scope="module")
def both(clipped):
    """The study, and its first draws propagated one by one: a seed gives the same ones, however many."""
    found = clipped.tolerance(ERRORS, MERITS, draws=300, seed=4)
    exact = clipped.tolerance(ERRORS, MERITS, draws=60, seed=4, accuracy=0)
    assert np.array_equal(exact.offsets, found.offsets[:60])
    return found, exact.values


def test_every_draw_is_within_the_error_told(both):
    found, exact = both
    for column, name in enumerate(MERITS):
        surface = found.surfaces[name]
        assert surface.used
        assert surface.points < 15
        off = np.abs(found.values[:60, column] - exact[:, column])
        # The farthest draws are among the fresh ones, and a polynomial is worst far out.
        assert off.max() <= surface.largest
        # Errors grow with a high power of the distance, so that few draws make most of their mean square: of twelve
        # it is known to a factor of 3 or so.
        assert np.sqrt((off**2).mean()) <= 3 * surface.error
        assert surface.error == pytest.approx(surface.share * found.values[:, column].std(), rel=0.2)
        assert surface.share <= 0.02


def test_means_spreads_and_yields_are_those_of_brute_force(both):
    found, exact = both
    for column, values in enumerate(found.values[:60].T):
        true = exact[:, column]
        # The same draws, each within 2 % of the spread.
        assert values.mean() == pytest.approx(true.mean(), abs=0.02 * true.std())
        assert values.std() == pytest.approx(true.std(), rel=0.02)
        # Draws that change sides lie within the error of the limit, one or two of sixty.
        limit = np.percentile(true, 80)
        assert abs((values <= limit).mean() - (true <= limit).mean()) < 0.04


def test_what_is_said_beside_the_draws_comes_from_the_bench_itself(both, clipped):
    found, _ = both
    shots = clipped.expose("cam", [fa.no_analyzer()])
    assert found.nominal["ring"] == pytest.approx(MERITS["ring"].value(shots.frame(0), shots.x, shots.y), rel=1e-12)
    step = 0.1 * mm
    ends = [clipped.with_changes({"space.distance": 300 * mm + sign * step}) for sign in (1, -1)]
    powers = [sum(light.total_stokes for light in end.field("iris"))[[0, 2]].sum() / 2 for end in ends]
    slope = found.sensitivities["behind D"]["space.distance"]
    assert slope.value == pytest.approx((powers[0] - powers[1]) / (2 * step), abs=slope.error)
    assert slope.error < 0.1 * abs(slope.value)
    assert "response surface in space.distance, laser.waist" in str(found)


def test_the_same_seed_gives_the_same_values(both, clipped):
    again = clipped.tolerance(ERRORS, MERITS, draws=300, seed=4, batch=77)
    assert again.values == pytest.approx(both[0].values, rel=1e-12)


def test_a_checkpoint_of_a_surface_goes_on(clipped, tmp_path):
    path = tmp_path / "study.npz"

    def stop(done, draws):
        raise KeyboardInterrupt

    options = {"draws": 200, "batch": 50, "checkpoint": path}
    errors = {"space.distance": normal(10 * mm)}
    with pytest.raises(KeyboardInterrupt):
        clipped.tolerance(errors, {"p": power_at("iris")}, progress=stop, **options)
    told = []
    found = clipped.tolerance(errors, {"p": power_at("iris")}, progress=lambda *a: told.append(a), **options)
    assert told == [(100, 200), (150, 200), (200, 200)]
    assert found.surfaces["p"].used
    with pytest.raises(fa.FileFormatError, match="another study"):
        clipped.tolerance(errors, {"p": power_at("iris")}, accuracy=0.5, **options)


def test_what_few_points_do_not_follow_is_propagated():
    # Fringes that run through four turns within the error take nineteen points, more than pay for sixty draws.
    arms = fa.Train(wavelength=633 * nm, name="Curlew").along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), state=fa.H, name="laser"),
        fa.BeamSplitter(reflectance=0.5, name="first"),
        fa.PhaseShift(phase=0.3, name="shift"),
        fa.Mirror(name="m1"),
        fa.BeamSplitter(reflectance=0.5, name="second"),
        fa.Detector(name="meter"),
    )
    arms.along("first.reflected", fa.Mirror(name="m2"), "second.side")
    found = arms.tolerance({"shift.phase": uniform(12.0)}, {"p": power_at("meter")}, draws=60)
    assert not found.surfaces["p"].used
    assert "every draw propagated" in str(found)
    assert arms.tolerance({"shift.phase": uniform(12.0)}, {"p": power_at("meter")}, draws=120).surfaces["p"].used
    start, span = found.nominal["p"], 1e-3
    phases = 0.3 + found.offsets[:, 0]
    assert {round(found.nominal["p"] / span, 9)} <= {round(np.cos(0.15) ** 2, 9), round(np.sin(0.15) ** 2, 9)}
    share = np.cos(phases / 2) ** 2 if start > 0.5 * span else np.sin(phases / 2) ** 2
    assert found.samples["p"] == pytest.approx(span * share, abs=1e-12 * span)


def test_arms_that_interfere_have_a_surface_in_all_errors():
    arms = fa.Train(wavelength=633 * nm, name="Curlew").along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), state=fa.H, name="laser"),
        fa.BeamSplitter(reflectance=0.5, name="first"),
        fa.PhaseShift(phase=1.3, name="shift"),
        fa.HalfWavePlate(fast=3 * deg, name="hwp"),
        fa.Mirror(name="m1"),
        fa.BeamSplitter(reflectance=0.5, name="second"),
        fa.Detector(name="meter"),
    )
    arms.along("first.reflected", fa.Mirror(name="m2"), "second.side")
    errors = {"shift.phase": normal(0.05), "hwp.fast": normal(1 * deg)}
    found = arms.tolerance(errors, {"p": power_at("meter")}, draws=400, seed=2)
    assert found.surfaces["p"].used
    assert set(found.surfaces["p"].parameters) == set(errors)
    row = 17
    exact = arms.with_changes(found.causes.changes(found.offsets[row])).power("meter")
    assert found.values[row, 0] == pytest.approx(exact, abs=2 * found.surfaces["p"].largest)


def test_a_wavelength_moves_the_plates_behind_the_last_pattern_too(clipped):
    train = fa.Train(wavelength=532 * nm, name="Saltpan").along(
        fa.Laser(waist=0.5 * mm, power=1e-3, state=fa.H, name="laser"),
        fa.QPlate(q=0.5, design=532 * nm, name="qp"),
        fa.QuarterWavePlate(fast=20 * deg, design=532 * nm, name="qwp"),
        fa.Polarizer(axis=30 * deg, name="pol"),
        fa.Camera(pixel=60 * um, shape=(32, 32), name="cam"),
    )
    errors = {"wavelength": normal(2 * nm), "qwp.fast": normal(1 * deg)}
    found = train.tolerance(errors, {"p": power_at("cam"), "lobe": lobe_angle("cam", None, count=2)}, draws=200)
    assert found.surfaces["p"].used
    row = int(np.argmax(np.abs(found.offsets[:, 0])))
    bench = train.with_changes(found.causes.changes(found.offsets[row]))
    assert found.samples["p"][row] == pytest.approx(bench.power("cam"), abs=2 * found.surfaces["p"].largest)
    # The power of a radial beam behind a turned plate does not depend on either: nothing but roundings is left.
    assert found.samples["lobe"].std() > 100 * found.surfaces["lobe"].error


def test_an_error_of_nothing_moves_nothing(clipped):
    errors = {"laser.waist": normal(0.0), "hwp.fast": normal(1 * deg)}
    found = clipped.tolerance(errors, {"p": power_at("iris", fa.D)}, draws=100)
    assert found.surfaces["p"].points == 1
    row = int(np.argmax(np.abs(found.offsets[:, 1])))
    light = clipped.with_changes(found.causes.changes(found.offsets[row])).field("iris")
    assert found.values[row, 0] == pytest.approx(sum(one.total_stokes for one in light)[[0, 2]].sum() / 2, rel=1e-7)


def test_any_executor_reads_the_surface(clipped):
    errors = {"space.distance": normal(10 * mm), "qp.retardance": normal(1 * deg)}
    alone = clipped.tolerance(errors, {"p": power_at("iris")}, draws=120)
    with ProcessPoolExecutor(1) as pool:
        pooled = clipped.tolerance(errors, {"p": power_at("iris")}, draws=120, executor=pool, batch=50)
    assert pooled.surfaces["p"].used
    assert pooled.values == pytest.approx(alone.values, rel=1e-12)


def test_parameters_that_move_together_are_one(clipped):
    errors = {("space.distance", "rest.distance"): together(normal(5 * mm), factors=(1, -1))}
    found = clipped.tolerance(errors, {"ring": ring_radius("cam")}, draws=100)
    assert found.surfaces["ring"].used
    row = int(np.argmax(np.abs(found.offsets[:, 0])))
    shots = clipped.with_changes(found.causes.changes(found.offsets[row])).expose("cam", [fa.no_analyzer()])
    exact = MERITS["ring"].value(shots.frame(0), shots.x, shots.y)
    assert found.values[row, 0] == pytest.approx(exact, abs=1.01 * found.surfaces["ring"].largest)


def test_an_accuracy_is_a_share(clipped):
    for wrong in (-0.1, float("nan")):
        with pytest.raises(fa.ParameterError, match="accuracy"):
            clipped.tolerance(ERRORS, MERITS, accuracy=wrong)


def test_nodes_lie_far_from_each_other():
    found = np.array(nodes(9))
    assert len(set(found.round(6))) == 9
    assert np.abs(found).max() == 1
    # Interpolation at Leja points swings by no more than about their number.
    fine = np.linspace(-1, 1, 1001)
    swing = sum(np.abs(np.prod([(fine - b) / (a - b) for b in found if b != a], axis=0)) for a in found)
    assert swing.max() < 9


def test_a_polynomial_goes_through_its_points_and_is_exact_for_its_own_kind():
    def law(place):
        return 1 + 2 * place[0] - place[1] ** 2 + 0.5 * place[0] * place[1]

    made, surplus = Polynomials(2), []
    queue = made.start
    while len(surplus) < 6:
        for index in queue:
            place = made.point(index)
            known = made.values(place[None])[0] @ surplus if surplus else 0.0
            surplus.append(law(place) - known)
            made.take(index, abs(surplus[-1]))
        queue = made.next()
    assert (1, 1) in made.sizes
    places = np.random.default_rng(1).uniform(-1, 1, (50, 2))
    assert made.values(places) @ surplus == pytest.approx([law(place) for place in places], abs=1e-12)
