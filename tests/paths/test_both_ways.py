"""Short ways to declare arms that return and loops run both ways."""

import pytest

import fastaxis as fa
from fastaxis.laws import AxisLaw
from fastaxis.units import deg, mm, nm


def start(splitter=None):
    return fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, name="laser"), splitter or fa.BeamSplitter(name="bs")
    )


def test_an_arm_there_and_back_is_wired_as_by_hand():
    parts = [fa.QuarterWavePlate(fast=20 * deg, name="qwp"), fa.FreeSpace(0.2, name="gap"), fa.Mirror(name="end")]
    short = start().retro("bs.transmitted", *parts)
    by_hand = start().along("bs.transmitted", *parts).along("end", "gap.back", "qwp.back", "bs.transmitted")
    assert set(short.joints) == set(by_hand.joints)


def test_the_plate_of_an_arm_is_met_from_both_sides():
    train = start().retro("bs.transmitted", fa.QuarterWavePlate(fast=20 * deg, name="qwp"), fa.Mirror(name="end"))
    route = next(route for route in train.routes("bs.side") if len(route.legs) == 5)
    angles = [law.angle for name, law in route.steps() if name == "qwp" and isinstance(law, AxisLaw)]
    assert angles == pytest.approx([20 * deg, -20 * deg])


def test_a_fold_on_the_way_becomes_two_way_and_the_end_does_not():
    train = start().retro("bs.transmitted", fa.Mirror(name="fold"), fa.Mirror(name="end"))
    assert (train.elements["fold"].two_way, train.elements["end"].two_way) == (True, False)
    route = next(route for route in train.routes("bs.side") if len(route.legs) > 1)
    assert [leg.element_name for leg in route.legs] == ["bs", "fold", "end", "fold", "bs"]


def test_both_senses_of_a_loop_pass_every_part():
    train = start().loop(
        "bs.transmitted", fa.Mirror(name="m1"), fa.FreeSpace(0.1, name="gap"), fa.Mirror(name="m2"), "bs.reflected"
    )
    senses = {tuple(leg.element_name for leg in route.legs) for route in train.routes("bs.side")}
    assert senses == {("bs", "m1", "gap", "m2", "bs"), ("bs", "m2", "gap", "m1", "bs")}


def test_a_metal_mirror_can_be_in_a_loop():
    train = start().loop(
        "bs.transmitted", fa.MetalMirror(index=0.18 + 3.4j, name="gold"), fa.Mirror(name="m2"), "bs.reflected"
    )
    assert train.elements["gold"].faces == ("front", "side")
    assert train.power("bs.side") + train.power("bs.front") < 1e-3


def test_a_mirror_that_is_in_the_train_already_can_be_named():
    train = start().add(fa.Mirror(name="m1")).loop("bs.transmitted", "m1", fa.Mirror(name="m2"), "bs.reflected")
    assert train.elements["m1"].two_way


def test_a_vertical_fold_met_the_other_way_is_turned_by_half_a_turn():
    there, back = fa.Mirror(fold="vertical", two_way=True).passages(633 * nm).values()
    assert there.reflected == back.reflected == "y"


def test_a_loop_between_no_ports_is_refused():
    with pytest.raises(fa.WiringError, match="loop: bs at an end; a loop starts at a port") as caught:
        start().loop("bs", fa.Mirror(name="m1"), "bs.reflected")
    train = start(fa.PolarizingBeamSplitter(name="pbs"))
    eval(caught.value.fix, {"train": train, "fa": fa})
    assert len(train.routes("pbs.side")) == 2


def test_nothing_is_added_when_an_arm_is_refused():
    train = start().along("bs.transmitted", fa.Detector(name="meter"))
    before = train.to_text()
    with pytest.raises(fa.WiringError, match="already joined"):
        train.retro("bs.transmitted", fa.Mirror(name="end"))
    assert train.to_text() == before
