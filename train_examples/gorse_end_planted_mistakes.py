"""Gorse End: a polarization switch drawn on the back of an envelope, with the mistakes such drawings have.

Run ``fastaxis inspect train_examples/gorse_end_planted_mistakes.py`` before ordering the parts. Six mistakes are
planted: a half-wave plate of the wrong laser, a q-plate half a beam off centre, a lens whose clear radius is too small,
a camera a few centimetres behind the focus, one mirror too few, and the reflected port of the cube left open.

Look for: exit code 3, because the plate, the lens and the strong beam that leaves the cube are of high severity.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

train = fa.Train(wavelength=532 * nm, name="Gorse End")
train.along(
    fa.Laser(waist=1.0 * mm, power=40 * mW, state=fa.H, name="laser"),
    fa.FreeSpace(120 * mm),
    fa.HalfWavePlate(fast=22.5 * deg, design=633 * nm, name="hwp"),
    fa.FreeSpace(60 * mm),
    fa.PolarizingBeamSplitter(Tp=0.97, Ts=0.001, name="pbs"),
    fa.FreeSpace(100 * mm),
    fa.QPlate(q=0.5, offset=0 * deg, centre=(0.5 * mm, 0 * mm), name="qp"),
    fa.FreeSpace(150 * mm),
    fa.Mirror(name="fold"),
    fa.FreeSpace(150 * mm),
    fa.Lens(focal=300 * mm, radius=1.0 * mm, name="lens"),
    fa.FreeSpace(330 * mm),
    fa.Camera(pixel=3.45 * um, shape=(400, 400), name="cam"),
)
