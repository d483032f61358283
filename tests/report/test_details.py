import math

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.report.details import detail, in_lab_units
from fastaxis.units import deg, mm, um


@pytest.mark.parametrize(
    ("length", "shown"),
    [(0.5, "500 mm"), (1.0, "1 m"), (3.45e-6, "3.45 µm"), (0.0, "0 m"), (0.08, "80 mm"), (0.4e-3, "0.4 mm")],
)
def test_lengths_as_a_lab_says_them(length, shown):
    assert in_lab_units(length) == shown


@pytest.mark.parametrize(
    ("part", "lines"),
    [
        (fa.HalfWavePlate(fast=22.5 * deg), ["fast 22.5°"]),
        (fa.HalfWavePlate(fast=0 * deg, retardance=178 * deg), ["fast 0°", "δ 178°"]),
        (fa.Retarder(slow=10 * deg, retardance=math.pi), ["slow 10°", "δ 180°"]),
        (fa.QPlate(q=-0.5, offset=45 * deg, retardance=170 * deg), ["q -1/2", "offset 45°", "δ 170°"]),
        (fa.QPlate(q=1, centre=(0.1 * mm, 0 * mm)), ["q 1", "offset 0°", "at (0.1, 0) mm"]),
        (fa.QPlate(q=1, centre=(-2 * um, 3 * um)), ["q 1", "offset 0°", "at (-2, 3) µm"]),
        (fa.Lens(focal=-50 * mm), ["f -50 mm"]),
        (fa.BeamSplitter(reflectance=0.45), ["R 0.45"]),
        (fa.PolarizingBeamSplitter(), []),
        (fa.PolarizingBeamSplitter(Tp=0.97), ["Tp 0.97"]),
        (fa.Mirror(), []),
        (fa.Mirror(fold="vertical"), ["fold vertical"]),
        (fa.Camera(pixel=5 * um, orientation="turned 90"), ["pixel 5 µm", "turned 90"]),
        (
            fa.Laser(power=5e-3, mode=fa.LaguerreGauss(p=0, l=1, waist=1 * mm), state=fa.R),
            ["5.00 mW", "LaguerreGauss", "R"],
        ),
        (fa.SpiralPlate(charge=-2), ["charge -2"]),
        (fa.Camera(pixel=3.45 * um), ["pixel 3.45 µm"]),
        (fa.PatternedRetarder(fast=lambda x, y: np.arctan2(y, x)), ["fast patterned", "δ 180°"]),
        (fa.Laser(power=5e-3, waist=0.8 * mm, state=fa.D), ["5.00 mW", "w 0.8 mm", "D"]),
    ],
)
def test_the_main_settings_of_a_part(part, lines):
    assert detail(part).split("\n") == (lines or [""])
