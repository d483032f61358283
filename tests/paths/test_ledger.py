"""The power ledger: every watt has a place."""

import math

import pytest

import fastaxis as fa
from fastaxis.engines.power_ledger import Ledger, Row
from fastaxis.units import deg, mm, mW, nm


def test_a_tree_agrees_with_hand_arithmetic():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, power=4 * mW, state=fa.D, name="laser"), fa.Aperture(radius=1 * mm, name="hole"),
        fa.PolarizingBeamSplitter(Tp=0.9, Ts=0.0, Rp=0.05, name="pbs"), fa.Polarizer(axis=0 * deg, transmission=0.8, name="pol"),
        fa.Detector(name="meter"),
    )  # fmt: skip
    train.along("pbs.reflected", fa.BeamDump(name="dump"))
    ledger = train.ledger()
    passed = 4 * mW * (1 - math.exp(-2))  # of a Gaussian through a hole of its own radius
    assert ledger.of("clipped") == pytest.approx({"hole": 4 * mW - passed}, rel=1e-9)
    assert ledger.of("dumped") == pytest.approx({"dump": passed * 0.525}, rel=1e-9)
    assert ledger.of("detected") == pytest.approx({"meter": passed * 0.45 * 0.8}, rel=1e-9)
    assert ledger.of("absorbed") == pytest.approx({"pbs": passed * 0.025, "pol": passed * 0.09}, rel=1e-9)
    assert ledger.input == 4 * mW
    assert ledger.missing == pytest.approx(0, abs=1e-15)


def test_a_part_passed_twice_loses_twice():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1.0, name="laser"), fa.BeamSplitter(name="bs")
    )
    train.retro("bs.transmitted", fa.NeutralDensity(transmission=0.5, name="nd"), fa.Mirror(Rp=0.9, name="end"))
    train.along("bs.reflected", fa.BeamDump(name="dump"))
    ledger = train.ledger()
    there, back = 0.25, 0.25 * 0.9 * 0.5
    assert ledger.of("absorbed") == pytest.approx({"nd": there + back, "end": 0.025})
    assert ledger.of("back to the laser") == pytest.approx({"bs.front": back_power()})
    assert ledger.of("open port") == pytest.approx({"bs.side": back_power()})
    assert ledger.missing == pytest.approx(0, abs=1e-15)


def back_power():
    return 0.25 * 0.9 * 0.5 * 0.5


def test_printed_it_ends_with_the_sum():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, power=2 * mW, name="laser"), fa.Detector(name="meter")
    )
    text = str(train.ledger())
    assert "detected             2 mW  meter" in text
    assert "sum of the ends 2 mW" in text
    assert "signs:" in text


def test_roundings_are_printed_as_dark_and_kept_as_they_are():
    rows = (Row("detected", "meter", 1e-3), Row("open port", "pbs.reflected", 1.5e-35), Row("dumped", "dump", 2e-12))
    text = str(Ledger(rows, 1e-3))
    assert [line.split()[-2] for line in text.splitlines()[1:4]] == ["mW", "dark", "mW"]
    assert text.splitlines()[3].split()[1] == "2e-09"
    assert rows[1].power == 1.5e-35


def ring_with(*parts, reflectance=0.9):
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.2 * mm, power=1 * mW, name="laser"), fa.BeamSplitter(reflectance=reflectance, name="in"),
        fa.FreeSpace(0.2), *parts, fa.BeamSplitter(reflectance=reflectance, name="out"),
    )  # fmt: skip
    return train.along("out.reflected", fa.Mirror(name="m1"), fa.Mirror(name="m2"), "in.side")


def test_a_cavity_that_is_not_round_says_before_any_trip_that_it_takes_too_many(monkeypatch):
    monkeypatch.setattr("fastaxis.engines.ledger.MOST_PATHS", 8)
    train = ring_with(fa.QPlate(q=0.5, centre=(0.1 * mm, 0.0), name="qp"), reflectance=0.1)
    with pytest.raises(fa.SamplingError, match="13 paths through parts that shape the light"):
        train.ledger()


def test_a_cavity_with_a_round_stop_has_a_ledger():
    ledger = ring_with(fa.Aperture(radius=0.5 * mm, name="hole")).ledger()
    assert ledger.missing == pytest.approx(0, abs=1e-15)
    # What is clipped is the difference of what comes and goes; the edges tell it too: in, hole, and what is reflected.
    edges = ledger.of("edge")
    before = next(watts for place, watts in edges.items() if place.endswith("hole.front"))
    behind = next(watts for place, watts in edges.items() if place.startswith("hole.back"))
    assert ledger.of("clipped")["hole"] == pytest.approx(before - behind, rel=1e-9)
    assert behind == pytest.approx(ledger.of("open port")["out.transmitted"] / 0.1, rel=1e-9)
    # The splitter loses nothing of what comes from the laser and from the ring; both outputs are sums of their own.
    into = 1 * mW + next(watts for place, watts in edges.items() if place.endswith("in.side"))
    inside = next(watts for place, watts in edges.items() if place.startswith("in.transmitted"))
    assert inside + ledger.of("open port")["in.reflected"] == pytest.approx(into, rel=1e-9)
