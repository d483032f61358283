"""Sedge Hollow: a vector beam out of a loop.

A polarizing splitter sends horizontal light one way round a loop of three mirrors and vertical light the other way.
Both pass the same spiral plate, from opposite sides, and leave together by the splitter's fourth face: as no path is
longer than the other, nothing drifts. With an odd number of mirrors they come out with opposite charges; a quarter-
wave plate at 45 deg makes their polarizations circular, and the sum is linear everywhere, turning once around the
axis.

Look for: a ring without analyzer, and two lobes behind any linear one, which turn with it one to one. With a fourth
mirror in the loop both charges are alike and the lobes are gone.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

train = fa.Train(wavelength=633 * nm, name="Sedge Hollow")
train.along(
    fa.Laser(waist=0.70 * mm, power=3 * mW, state=fa.D, name="laser"),
    fa.PolarizingBeamSplitter(name="pbs"),
)
train.loop(
    "pbs.transmitted",
    fa.FreeSpace(150 * mm, name="side1"),
    fa.Mirror(name="m1"),
    fa.FreeSpace(75 * mm, name="half1"),
    fa.SpiralPlate(charge=1, name="spiral"),
    fa.FreeSpace(75 * mm, name="half2"),
    fa.Mirror(name="m2"),
    fa.FreeSpace(150 * mm, name="side2"),
    fa.Mirror(name="m3"),
    "pbs.reflected",
)
train.along(
    "pbs.side",
    fa.QuarterWavePlate(fast=45 * deg, name="qwp"),
    fa.FreeSpace(400 * mm),
    fa.Lens(focal=400 * mm, name="lens"),
    fa.FreeSpace(400 * mm),
    fa.Camera(pixel=8 * um, shape=(160, 160), name="cam"),
)
train.along("pbs.front", fa.BeamDump(name="dump"))
settings = (fa.Setting("open"), fa.linear(0 * deg), fa.linear(30 * deg), fa.linear(60 * deg), fa.linear(90 * deg))
