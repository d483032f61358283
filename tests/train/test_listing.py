"""What print(train) shows."""

import sympy

import fastaxis as fa
from fastaxis.train.lab_values import lab_length, lab_parameters
from fastaxis.units import deg, mm, mrad, mW, nm, um


def test_listing_of_a_double_pass(isolator):
    assert str(isolator) == (
        "Low Quay: 632.8 nm, 5 parts\n"
        "from laser.out\n"
        "  laser   out                  Laser                   power 5 mW, waist 0.8 mm, state H\n"
        "  pbs     front > transmitted  PolarizingBeamSplitter  Tp 1\n"
        "  qwp     front > back         QuarterWavePlate        fast 45°\n"
        "  mirror  front > front        Mirror                  fold horizontal\n"
        "  qwp     back > front         QuarterWavePlate        fast 45°\n"
        "  pbs     transmitted > front  PolarizingBeamSplitter  Tp 1\n"
        "from pbs.side\n"
        "  pbs  side  PolarizingBeamSplitter  Tp 1\n"
        "  cam  in    Camera                  pixel 3.45 µm, shape (16, 16)\n"
        "open ports: pbs.front, pbs.reflected"
    )


def test_parts_without_light_and_letters_are_told(line):
    line.add(fa.Retarder(fast=sympy.Symbol("alpha"), retardance=90 * deg, name="spare"))
    shown = repr(line)
    assert "without light\n  spare    Retarder  fast alpha, retardance 90°\n" in shown
    assert shown.endswith("letters: alpha")


def test_an_empty_train_can_be_shown():
    assert str(fa.Train(wavelength=532 * nm, name="Saltpan")) == "Saltpan: 532 nm, 0 parts"


def test_lab_units():
    assert lab_parameters(fa.Polarizer(axis=30 * deg, extinction=1e4)) == "axis 30°, extinction 10000"
    assert lab_parameters(fa.FreeSpace(distance=2.5)) == "distance 2.5 m"
    assert lab_parameters(fa.Wedge(x=1 * mrad)) == "x 0.0572958°"
    assert lab_parameters(fa.Laser(waist=45 * um, power=20e-9)) == "power 20 nW, waist 45 µm, state H"
    assert lab_parameters(fa.Laser(mode=fa.LaguerreGauss(p=0, l=1, waist=1 * mm), power=2 * mW)).startswith(
        "power 2 mW, mode LaguerreGauss("
    )
    assert lab_parameters(fa.PatternedRetarder(fast=fa.Pattern(lambda x, y: x), retardance=180 * deg)).startswith(
        "fast patterned"
    )
    assert [lab_length(v) for v in (0.0, -2 * mm, 1e-12)] == ["0 m", "-2 mm", "1e-12 m"]


def test_a_loop_can_be_shown():
    train = fa.Train(wavelength=532 * nm).along(fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(name="bs"))
    train.along("bs.transmitted", fa.Mirror(name="m1"), fa.Mirror(name="m2"), "bs.side")
    assert str(train).count("  m1 ") == 1


def test_a_coherent_sum_is_told_by_its_modes_and_nothing_is_cut_off():
    ring = fa.Term(1.0, fa.LaguerreGauss(p=0, l=1, waist=1 * mm), fa.L)
    spot = fa.Term(1.0, fa.Gaussian(waist=1 * mm), fa.R)
    assert "beam sum of Gaussian R and LaguerreGauss L" in lab_parameters(fa.Laser(beam=fa.Beam((spot, ring))))
    assert "beam sum of 3 modes" in lab_parameters(fa.Laser(beam=fa.Beam((spot, ring, ring))))
