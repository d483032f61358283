import pytest

from fastaxis.elements import (
    Aperture,
    BeamSplitter,
    FreeSpace,
    HalfWavePlate,
    Laser,
    Mirror,
    NeutralDensity,
    Polarizer,
    PolarizingBeamSplitter,
    QPlate,
    SpiralPlate,
)
from fastaxis.engines.ledger import powers
from fastaxis.light import D, FlatTop, LaguerreGauss
from fastaxis.train import Train
from fastaxis.units import deg, mm, mW, nm


def bench(*parts, **laser):
    train = Train(wavelength=532 * nm)
    return train.along(Laser(power=5 * mW, name="laser", **(laser or {"waist": 0.8 * mm})), *parts)


def test_every_lit_port_is_there_with_its_power():
    train = bench(HalfWavePlate(fast=11.25 * deg, name="hwp"), PolarizingBeamSplitter(name="pbs"), Mirror(name="fold"))
    ledger = powers(train)
    # Malus at 22.5 deg: cos^2 = 0.853553390593, sin^2 = 0.146446609407.
    assert ledger["pbs", "transmitted"] == pytest.approx(5e-3 * 0.8535533905932737, rel=1e-14)
    assert ledger["pbs", "reflected"] == pytest.approx(5e-3 * 0.1464466094067262, rel=1e-13)
    assert ledger["laser", "out"] == ledger["hwp", "back"] == 5e-3
    assert ledger["fold", "front"] == ledger["pbs", "transmitted"]


@pytest.mark.parametrize(
    "laser",
    [{"waist": 0.8 * mm}, {"mode": LaguerreGauss(1, 2, 0.6 * mm), "state": D}, {"mode": FlatTop(radius=1 * mm)}],
)
def test_a_lossless_split_closes_behind_a_q_plate(laser):
    train = bench(QPlate(q=0.5, retardance=170 * deg), FreeSpace(0.3), PolarizingBeamSplitter(name="pbs"), **laser)
    train.along("pbs.reflected", BeamSplitter(reflectance=0.3, name="bs"))
    ledger = powers(train)
    # Sums over 10^6 samples: 1e-13 of rounding.
    assert ledger["pbs", "transmitted"] + ledger["pbs", "reflected"] == pytest.approx(5e-3, rel=1e-12)
    shared = ledger["bs", "transmitted"] + ledger["bs", "reflected"]
    assert shared == pytest.approx(ledger["pbs", "reflected"], rel=1e-12)
    assert ledger["bs", "reflected"] == pytest.approx(0.3 * shared, rel=1e-12)


def test_losses_are_counted():
    ledger = powers(bench(NeutralDensity(transmission=0.1, name="nd"), Polarizer(axis=60 * deg, name="pol")))
    assert ledger["nd", "back"] == pytest.approx(5e-4, rel=1e-14)
    assert ledger["pol", "back"] == pytest.approx(1.25e-4, rel=1e-13)


def test_a_lossy_spiral_plate_counts_with_either_engine():
    plate = SpiralPlate(charge=1, transmission=0.9, name="spp")
    assert powers(bench(plate))["spp", "back"] == pytest.approx(4.5e-3, rel=1e-13)
    behind = bench(QPlate(q=0.5), Aperture(radius=9 * mm), plate)
    assert powers(behind)["spp", "back"] == pytest.approx(4.5e-3, rel=1e-12)


def test_an_aperture_clips_a_gaussian():
    """1 - exp(-2 a^2/w^2), 0.86466472 for a = w (Siegman, Lasers, section 17.1).

    Samples on the rim pass the covered share of the amplitude, whose square falls short of the covered area by 1/6
    of a sample on the average: here pitch/3a * (2 a^2/w^2) exp(-2)/0.865 = 1.2e-3 of the power at 9.4 um.
    """
    ledger = powers(bench(Aperture(radius=0.8 * mm, name="stop")))
    assert ledger["stop", "back"] / 5e-3 == pytest.approx(0.86466472, rel=1.5e-3)
    assert ledger["stop", "back"] / 5e-3 < 0.86466472
