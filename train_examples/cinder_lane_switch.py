"""Cinder Lane: a switch between radial and azimuthal polarization.

A half-wave plate in front of a q-plate of q = 1/2 turns the polarization pattern from radial (plate at 0 deg) to
azimuthal (plate at 45 deg). The camera stands at the focus of a 500 mm lens.

Look for: two lobes along every linear analyzer, turning with it one to one; a whole ring of 89 um radius behind R
and L. With the plate at 45 deg the lobes stand across the analyzer. A q-plate of 170 deg leaves 0.76 % of the power
unconverted: a spot in the middle that is brightest with the analyzer at H.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

train = fa.Train(wavelength=532 * nm, name="Cinder Lane switch")
train.along(
    fa.Laser(waist=0.80 * mm, power=5 * mW, state=fa.H, name="laser"),
    fa.HalfWavePlate(fast=0 * deg, name="hwp"),
    fa.QPlate(q=0.5, offset=0 * deg, retardance=180 * deg, name="qp"),
    fa.FreeSpace(500 * mm),
    fa.Lens(focal=500 * mm, name="lens"),
    fa.FreeSpace(500 * mm),
    fa.Camera(pixel=3.45 * um, shape=(256, 256), name="cam"),
)
