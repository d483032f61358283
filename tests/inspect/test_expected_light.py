"""Light that a part expects: modulators, isolators, and whatever says so."""

import pytest

import fastaxis as fa
from fastaxis.units import deg, mm

METER = fa.Detector(name="meter")


def checks(train, check):
    return [f for f in train.inspect() if f.check == check]


def input_state(train):
    (found,) = checks(train, "input state")
    return found


def test_the_plate_before_a_modulator_is_turned_the_short_way(bench_of):
    plate = fa.HalfWavePlate(fast=15 * deg, name="hwp")
    cell = fa.PhaseModulator(axis=45 * deg, phase=1.3, name="cell")
    found = input_state(bench_of(plate, fa.FreeSpace(10 * mm), cell, METER))
    # H behind a plate at 15 deg stands at 30: cos^2 of 15 deg is along the axis.
    assert "linear 30° light arrives, 93.3 % of it as expected" in found.got
    assert "it expects linear 45° light, along its axis" in found.rule
    assert found.fix == 'train.with_changes({"hwp.fast": 22.5*deg})'


@pytest.mark.parametrize("fold", [(), (fa.Mirror(name="fold"),)])
def test_the_fix_holds_through_what_stands_between(bench_of, fold):
    plate = fa.HalfWavePlate(slow=100 * deg, name="hwp")
    train = bench_of(plate, *fold, fa.Rotator(angle=10 * deg), fa.Detector(expects=fa.linear(20 * deg), name="meter"))
    found = input_state(train)
    assert '"hwp.slow"' in found.fix
    mended = eval(found.fix, {"train": train, "deg": deg})
    assert not checks(mended, "input state")
    # 90 deg apart two settings do the same; the nearer one is offered.
    assert abs(mended.elements["hwp"].slow - 100 * deg) <= 45 * deg


@pytest.mark.parametrize(
    ("state", "expects", "fix"),
    [
        (fa.H, fa.linear(30 * deg), "fa.HalfWavePlate(fast=15*deg) before meter"),
        (fa.R, fa.L, "fa.HalfWavePlate(fast="),
        (fa.H, fa.L, "fa.QuarterWavePlate(fast=-45*deg) before meter"),
        (fa.R, fa.V, "fa.QuarterWavePlate(fast="),
        (
            fa.elliptical(20 * deg, 15 * deg),
            fa.elliptical(-40 * deg, 40 * deg),
            "a polarizer or two wave plates before",
        ),
        (fa.UNPOLARIZED, fa.H, "a polarizer or two wave plates before meter"),
    ],
)
def test_without_a_plate_one_is_named(bench_of, state, expects, fix):
    train = bench_of(fa.Detector(expects=expects, name="meter"), state=state)
    found = input_state(train)
    assert found.fix.startswith(fix)
    if found.fix.startswith("fa."):
        plate = eval(found.fix.removesuffix(" before meter"), {"fa": fa, "deg": deg})
        assert not checks(bench_of(plate, train.elements["meter"], state=state), "input state")


def test_a_plate_that_cannot_mend_it_is_left_alone(bench_of):
    plate = fa.HalfWavePlate(fast=10 * deg, name="hwp")
    found = input_state(bench_of(plate, fa.Detector(expects=fa.L, name="meter")))
    assert found.fix.startswith("fa.QuarterWavePlate(fast=")


def test_an_isolator_is_told_once_and_light_on_its_way_back_is_not(bench_of):
    train = bench_of(
        fa.Polarizer(axis=30 * deg, extinction=1e5, name="in"),
        fa.FaradayRotator(angle=45 * deg, name="rotator"),
        fa.Polarizer(axis=75 * deg, extinction=1e5, name="out"),
        fa.Mirror(name="end"),
    ).along("end", "out.back", "rotator.back", "in.back")
    assert input_state(train).element == "in"
    assert input_state(train).severity.value == "medium"
    assert not [f for f in checks(train, "polarizer") if f.element == "in"]


@pytest.mark.parametrize(("angle", "faces"), [(42, ""), (-42, ""), (42, ".back"), (-40, ".back")])
def test_the_fix_of_an_isolator_sets_rotator_and_output_right(bench_of, angle, faces):
    train = bench_of(state=fa.linear(20 * deg) if not faces else fa.linear(-20 * deg))
    train.add(fa.Polarizer(axis=20 * deg, extinction=1e5, name="in"))
    train.add(fa.FaradayRotator(angle=angle * deg, name="rotator"))
    train.add(fa.Polarizer(axis=(20 + angle) * deg, extinction=1e5, name="out"))
    train.along("laser", f"in{faces}", f"rotator{faces}", f"out{faces}").along(
        "out.front" if faces else "out.back", fa.Detector(name="meter")
    )
    (found,) = checks(train, "isolator")
    mended = eval(found.fix, {"train": train, "deg": deg})
    assert not checks(mended, "isolator")
    assert mended.power("meter") == pytest.approx(1e-3, rel=1e-9)


def test_the_analyzer_of_a_modulator_takes_whatever_comes(bench_of):
    """At the middle of its swing an amplitude modulator gives circular light: nothing to mend."""
    parts = (fa.HalfWavePlate(fast=22.5 * deg), fa.Polarizer(axis=-45 * deg, name="pol"), METER)
    cell = fa.PhaseModulator(axis=0 * deg, phase=90 * deg, expects=fa.linear(45 * deg), name="cell")
    assert not checks(bench_of(parts[0], cell, *parts[1:]), "polarizer")
    plate = fa.QuarterWavePlate(slow=0 * deg)
    assert checks(bench_of(parts[0], plate, *parts[1:]), "polarizer")
