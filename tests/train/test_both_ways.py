"""Arms that start at the laser, and arms that are none."""

import pytest

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

WORDS = {"fa": fa, "mm": mm}


def split():
    return fa.Train(wavelength=633 * nm).along(fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(name="bs"))


@pytest.mark.parametrize(
    "last",
    [
        fa.FreeSpace(100 * mm, name="gap"),
        fa.BeamSplitter(name="other"),
        fa.Camera(pixel=5 * um, shape=(16, 16), name="cam"),
        fa.Mirror(two_way=True, name="fold"),
    ],
)
def test_an_arm_ends_where_light_turns_round(last):
    train = split()
    before = train.to_text()
    with pytest.raises(fa.WiringError, match=rf"{last.name}\.\w+ .* does not come back from there") as caught:
        train.retro("bs.transmitted", fa.HalfWavePlate(fast=0 * deg), last)
    assert train.to_text() == before
    eval(caught.value.fix, {"train": train, **WORDS})
    assert len(train.routes("bs.side")) == 1


@pytest.mark.parametrize("items", [(), ("bs.transmitted",), (fa.FreeSpace(10 * mm), fa.Mirror())])
def test_an_arm_starts_at_a_port(items):
    train = split()
    with pytest.raises(fa.WiringError, match=r"retro: .*an arm starts at a port") as caught:
        train.retro(*items)
    eval(caught.value.fix, {"train": train, **WORDS})
    assert len(train.routes("bs.side")) == 1


def test_an_arm_from_the_laser_leaves_the_port_before_it_open():
    laser = fa.Laser(waist=1 * mm, power=2 * mW, name="laser")
    train = fa.Train(wavelength=633 * nm).along(laser)
    train.retro("laser", fa.NeutralDensity(transmission=0.5, name="nd"), fa.FreeSpace(10 * mm), fa.Mirror())
    # A power is the sum of a few squares.
    assert train.power("nd.front") == pytest.approx(0.5 * mW, rel=1e-12)
    assert train.ledger().of("back to the laser") == {"nd.front": pytest.approx(0.5 * mW, rel=1e-12)}
