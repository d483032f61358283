"""Heron Wharf: a polarization switch in front of a camera, as it is drawn today.

Look for: two lobes along every linear analyzer with the half-wave plate at 0 deg, across it with the plate at 45 deg.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

train = fa.Train(wavelength=532 * nm, name="Heron Wharf")
train.along(
    fa.Laser(waist=0.80 * mm, power=0.5 * mW, state=fa.H, name="laser"),
    fa.FreeSpace(100 * mm),
    fa.PolarizingBeamSplitter(Tp=0.97, Ts=0.001, Rp=0.02, Rs=0.995, name="cube"),
    fa.HalfWavePlate(fast=0 * deg, design=532 * nm, name="hwp"),
    fa.QPlate(q=0.5, offset=0 * deg, retardance=180 * deg, name="qp"),
    fa.FreeSpace(400 * mm),
    fa.Lens(focal=400 * mm, radius=12 * mm, name="lens"),
    fa.FreeSpace(400 * mm),
    fa.Camera(pixel=6.9 * um, shape=(64, 64), name="cam"),
)
train.along("cube.reflected", fa.BeamDump(name="dump"))
