"""Marram: is the round stop really 2 mm wide?

An evenly filled beam meets a round stop of 1.00 mm radius and a lens of 300 mm right behind it. In the focus the
camera shows the rings of a round opening.

Look for: the first dark ring at 1.22 wavelength focal / diameter = 115.8 um. A stop of 0.95 mm would put it at
121.9 um, nearly two pixels further out.
"""

import fastaxis as fa
from fastaxis.units import mm, mW, nm, um

train = fa.Train(wavelength=632.8 * nm, name="Marram pinhole")
train.along(
    fa.Laser(mode=fa.FlatTop(radius=1.5 * mm), power=10 * mW, state=fa.H, name="laser"),
    fa.Aperture(radius=1.00 * mm, name="stop"),
    fa.Lens(focal=300 * mm, name="lens"),
    fa.FreeSpace(300 * mm),
    fa.Camera(pixel=3.45 * um, shape=(200, 200), name="cam"),
)
settings = (fa.no_analyzer(),)
