"""Wick Head: what comes back through an isolator.

A window behind the isolator returns 4 % of the light straight into it. On the way out the Faraday rotator turns H by
44 deg towards a polarizer at 45 deg; on the way back it turns the light on in the same sense of the room, so that it
meets the first polarizer almost crossed.

Look for: the power at the open port "in.front", back to the laser: 0.8 uW of the 2 mW returned, three parts of it for
the last degree of the rotator and one for the extinction of the polarizers. print(train.ledger()) shows where the
rest of the returned light goes. An optically active rotator in its place (fa.Rotator) lets all of it back.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

train = fa.Train(wavelength=1064 * nm, name="Wick Head isolator")
train.along(
    fa.Laser(waist=0.90 * mm, power=50 * mW, state=fa.H, name="laser"),
    fa.Polarizer(axis=0 * deg, extinction=1e4, name="in"),
    fa.FaradayRotator(angle=44 * deg, name="rotator"),
    fa.Polarizer(axis=45 * deg, extinction=1e4, name="out"),
    fa.FreeSpace(200 * mm, name="gap"),
    fa.BeamSplitter(reflectance=0.04, name="window"),
    fa.Camera(pixel=20 * um, shape=(256, 256), name="cam"),
)
train.along("window.reflected", "gap.back", "out.back", "rotator.back", "in.back")
settings = (fa.D, fa.A)
