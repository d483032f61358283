"""Saltpan: a full-Poincare beam, every polarization at once.

A round Gaussian in L and a vortex of charge 1 in R, with equal powers, lie on top of each other at the camera.

Look for: L in the middle, R outside, and between them a ring of linear light at w/sqrt(2) = 0.636 mm. The azimuth
turns by half a turn once around the middle (index +1/2): one lobe behind a linear analyzer, going around twice as
fast as the analyzer turns.
"""

import fastaxis as fa
from fastaxis.units import mm, mW, nm, um

waist = 0.90 * mm
beam = fa.Beam(
    (
        fa.Term(1, fa.LaguerreGauss(p=0, l=0, waist=waist), fa.L),
        fa.Term(1, fa.LaguerreGauss(p=0, l=1, waist=waist), fa.R),
    )
)

train = fa.Train(wavelength=632.8 * nm, name="Saltpan")
train.along(
    fa.Laser(beam=beam, power=2 * mW, name="laser"),
    fa.Camera(pixel=15 * um, shape=(320, 320), name="cam"),
)
