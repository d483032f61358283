"""Kelp Slip: there and back through a quarter-wave plate.

Light goes straight through a polarizing splitter, through a quarter-wave plate at 45 deg to a mirror, and comes back
through the same plate: H goes out, V returns, and the splitter sends it to the side where the camera stands.

Look for: practically all of the power on the camera, two reflections. Turn the plate to 0 deg
(fast=0*deg) and the light goes back into the laser instead: the power at the open port "pbs.front" says so.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

train = fa.Train(wavelength=1064 * nm, name="Kelp Slip double pass")
train.along(
    fa.Laser(waist=0.70 * mm, power=20 * mW, state=fa.H, name="laser"),
    fa.PolarizingBeamSplitter(name="pbs"),
    fa.QuarterWavePlate(fast=45 * deg, retardance=88 * deg, name="qwp"),
    fa.FreeSpace(250 * mm, name="gap"),
    fa.Mirror(name="end"),
)
train.along("end", "gap.back", "qwp.back", "pbs.transmitted")
train.along("pbs.side", fa.FreeSpace(100 * mm), fa.Camera(pixel=20 * um, shape=(256, 256), name="cam"))
settings = (fa.H, fa.V)
