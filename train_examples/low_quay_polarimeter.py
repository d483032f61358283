"""Low Quay: a rotating-plate polarimeter in a teaching room.

Elliptical light (azimuth 20 deg, ellipticity 15 deg, so right-handed) meets a quarter-wave plate that turns in 64 steps
of 5.625 deg, a fixed polarizer at 0 deg and a detector.

Look for: the power repeats twice a turn and ripples four times. Taken together the 64 readings give
S1 = 0.6634, S2 = 0.5567, S3 = 0.5000 of S0.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, turn

train = fa.Train(wavelength=632.8 * nm, name="Low Quay polarimeter")
train.along(
    fa.Laser(waist=0.50 * mm, power=1 * mW, state=fa.elliptical(20 * deg, 15 * deg), name="laser"),
    fa.FreeSpace(300 * mm),
    fa.Detector(name="meter"),
)
settings = fa.rotating_plate(64, retardance=90 * deg, axis=0 * deg, span=1 * turn)
