"""Curlew Mill: a half-wave plate made of two halves.

The left half of the plate has its fast axis at 0 deg, the right half at 45 deg, so H leaves the left half as H and
the right half as V.

Look for: behind H only the left half of the beam, behind V only the right half, and behind R and L both, with a
fringe along the seam where the two halves spread into each other.
"""

import numpy as np

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um


def fast_axis(x, _y):
    return np.where(x < 0, 0 * deg, 45 * deg)


train = fa.Train(wavelength=532 * nm, name="Curlew Mill")
train.along(
    fa.Laser(waist=1.0 * mm, power=3 * mW, state=fa.H, name="laser"),
    fa.PatternedRetarder(fast=fast_axis, retardance=180 * deg, name="halves"),
    fa.FreeSpace(80 * mm),
    fa.Camera(pixel=15 * um, shape=(256, 256), name="cam"),
)
