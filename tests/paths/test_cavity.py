"""Light that comes back to where it was: cavities and loops."""

import math

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines.network import fields_at
from fastaxis.plan import JonesStep
from fastaxis.plan.network import Edge, Network
from fastaxis.units import mm, nm


def ring(laser, reflectance=0.7, *parts):
    """A splitter lets light into a ring of three mirrors and out again."""
    train = fa.Train(wavelength=633 * nm).along(laser, fa.BeamSplitter(reflectance=reflectance, name="bs"))
    mirrors = [fa.Mirror(name=f"m{n}") for n in range(3)]
    return train.along("bs.transmitted", *parts, *mirrors, "bs.side")


def wave(**values):
    return fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1.0, name="laser", **values)


def test_a_lossless_ring_returns_everything():
    train = ring(wave(), 0.7, fa.PhaseShift(phase=0.3))
    assert train.power("bs.reflected") == pytest.approx(1, abs=1e-14)


def test_a_ring_at_critical_coupling_absorbs_everything():
    # Loss in the ring equals what the splitter lets in: T = 1 - filter.
    train = ring(
        wave(state=fa.V), 0.7, fa.NeutralDensity(transmission=0.7, name="nd"), fa.PhaseShift(phase=0.0, name="scan")
    )
    powers = [train.with_changes({"scan.phase": p}).power("bs.reflected") for p in np.arange(16) * math.pi / 8]
    assert min(powers) == pytest.approx(0, abs=1e-14)
    best = train.with_changes({"scan.phase": float(np.argmin(powers)) * math.pi / 8})
    ledger = best.ledger()
    assert ledger.of("absorbed") == pytest.approx({"nd": 1.0})
    assert ledger.missing == pytest.approx(0, abs=1e-13)


def test_trips_of_a_beam_add_up_to_the_steady_state_of_a_wave():
    shift = [fa.NeutralDensity(transmission=0.3), fa.PhaseShift(phase=0.5)]
    laser = fa.Laser(waist=1 * mm, power=1.0, name="laser")
    # Without distance and with an even number of reflections in all, every trip lies on the one before.
    assert ring(laser, 0.4, *shift).power("bs.reflected") == pytest.approx(
        ring(wave(), 0.4, *shift).power("bs.reflected")
    )


def test_energy_closes_in_a_cavity_whose_beam_spreads():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.5 * mm, power=1.0, name="laser"), fa.BeamSplitter(reflectance=0.2, name="left"),
        fa.FreeSpace(0.2, name="gap"), fa.BeamSplitter(reflectance=0.2, name="right"),
    )  # fmt: skip
    train.along("right.reflected", "gap.back", "left.side")
    total = train.power("right.transmitted") + train.power("left.reflected")
    # Trips are left out below 1e-14 of the amplitude.
    assert total == pytest.approx(1, abs=1e-12)


def two_mirrors(reflectance, *parts):
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, power=1.0, name="laser"), fa.BeamSplitter(reflectance=reflectance, name="left"), *parts,
        fa.BeamSplitter(reflectance=reflectance, name="right"),
    )  # fmt: skip
    return train.along("right.reflected", *(f"{part.name}.back" for part in parts), "left.side")


def test_a_fine_cavity_of_beams_is_that_of_waves_where_nothing_spreads():
    # Anti-resonant: F = 39600.
    assert two_mirrors(0.99).power("right") == pytest.approx(1 / (1 + 39600), rel=1e-9)


def test_a_fine_cavity_that_is_not_round_is_refused_and_the_fix_answers_for_waves():
    slit = fa.Slit(width=20 * mm, name="slit")
    with pytest.raises(fa.SamplingError, match="after a round trip, which takes 3208 trips to fade") as caught:
        two_mirrors(0.99, slit).power("right")
    assert eval(caught.value.fix, {"train": two_mirrors(0.99)}) == pytest.approx(1 / (1 + 39600), rel=1e-9)


def test_a_closed_ring_that_no_light_enters_stays_dark():
    train = fa.Train(wavelength=633 * nm).along(wave(state=fa.V), fa.BeamSplitter(reflectance=0.5, name="bs"))
    train.along("bs.transmitted", fa.PolarizingBeamSplitter(name="pbs"))
    train.along("bs.reflected", fa.BeamDump(name="dump"))
    # p light could run round through the splitter for ever, and in phase; but only s light is there.
    train.along("pbs.reflected", fa.Mirror(name="a"), fa.PhaseShift(phase=0.0, name="scan"), "pbs.side")
    answers = [train.with_changes({"scan.phase": p}).power("pbs.transmitted") for p in np.arange(8) * math.pi / 4]
    assert answers == pytest.approx([0.5] * 8)


def test_light_that_builds_up_for_ever_has_no_steady_state():
    nodes = (("gap", "front", "in"), ("gap", "back", "out"))
    there, back = (Edge(*ends, JonesStep(), 0.0) for ends in ((0, 1), (1, 0)))
    with pytest.raises(fa.ParameterError, match="steady state among gap; light that comes round in phase"):
        fields_at(Network(nodes, (there, back), ((0, "laser"),), 1), 0, np.array([1.0, 0.0j]))
    # Half a wave more on the trip: 1 - 1 + 1 - ... settles at a half.
    back = Edge(1, 0, JonesStep(), 0.5)
    found = fields_at(Network(nodes, (there, back), ((0, "laser"),), 1), 0, np.array([1.0, 0.0j]))
    assert found[:, 0] == pytest.approx([0.5, 0.5])


@pytest.mark.parametrize("engine", ["uniform"])
def test_a_part_that_shapes_the_light_is_refused_by_the_uniform_engine(engine):
    train = ring(fa.Laser(waist=1 * mm, name="laser"), 0.5, fa.SpiralPlate(charge=1, name="spiral"))
    with pytest.raises(fa.ParameterError, match="of spiral varies over the beam") as caught:
        train.power("bs.reflected", engine=engine)
    assert caught.value.fix == 'engine="auto"'


@pytest.mark.parametrize("place", [0, 1, 2, 3])
@pytest.mark.parametrize("mirrors", [2, 3, 4])
def test_two_senses_of_a_loop_leave_with_charges_in_the_ratio_of_its_mirrors(mirrors, place):
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, state=fa.D, name="laser"), fa.PolarizingBeamSplitter(name="pbs")
    )
    parts = [fa.Mirror(name=f"m{n}") for n in range(mirrors)]
    parts.insert(min(place, mirrors), fa.SpiralPlate(charge=1, name="spiral"))
    train.loop("pbs.transmitted", *parts, "pbs.reflected")
    field = train.field("pbs.side")[0]
    phi = np.arange(17) * math.pi / 8
    around = np.array([field.at(np.array([mm * np.cos(a)]), np.array([mm * np.sin(a)]))[:, 0, 0] for a in phi])
    one, other = np.round(np.sum(np.angle(around[1:] / around[:-1]), axis=0) / (2 * np.pi), 9)
    assert abs(one) == 1
    assert other / one == (-1) ** mirrors
