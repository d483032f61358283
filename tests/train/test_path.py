"""Paths taken apart into joints."""

import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.units import deg, mm, nm


def test_a_plate_entered_from_behind_is_left_at_its_front():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, name="laser"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(fast=45 * deg, name="qwp"),
        fa.Mirror(name="mirror"),
        "qwp.back",
        "pbs.transmitted",
    )
    assert train.joints[-2:] == (("mirror.front", "qwp.back"), ("qwp.front", "pbs.transmitted"))


def test_a_path_starts_and_ends_at_named_ports(fork):
    assert ("bs1.reflected", "m2.front") in fork.joints
    assert ("m2.front", "bs2.side") in fork.joints


def test_a_single_part_is_added_and_joined_to_nothing(line):
    joints = line.joints
    line.along(fa.BeamDump(name="dump"))
    assert "dump" in line.elements
    assert line.joints == joints


@settings(max_examples=30, deadline=None)
@given(st.integers(0, 12), st.randoms(use_true_random=False))
def test_the_order_of_declaration_does_not_matter_for_the_light(count, chance: random.Random):
    makers = [
        lambda n: fa.HalfWavePlate(fast=n * deg, name=f"part{n}"),
        lambda n: fa.Mirror(name=f"part{n}"),
        lambda n: fa.FreeSpace(distance=0.1, name=f"part{n}"),
    ]
    parts = [
        fa.Laser(waist=1 * mm, name="laser"),
        *(chance.choice(makers)(n) for n in range(count)),
        fa.Detector(name="meter"),
    ]
    along = fa.Train(wavelength=532 * nm).along(*parts)
    shuffled = fa.Train(wavelength=532 * nm)
    for part in chance.sample(parts, len(parts)):
        shuffled.add(part)
    pairs = list(zip(parts, parts[1:]))
    for before, after in chance.sample(pairs, len(pairs)):
        shuffled.join(before.name, after.name)
    assert shuffled.route("meter") == along.route("meter")
    assert set(shuffled.lit) == set(along.lit)


def test_things_that_cannot_start_a_path_are_refused(line):
    with pytest.raises(fa.WiringError, match="cam .Camera.; light cannot leave there"):
        line.along("cam", fa.Lens(focal=1.0))
