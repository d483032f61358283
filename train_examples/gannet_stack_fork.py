"""Gannet Stack: the charge of a spiral plate, read from a fork.

Two arms between two splitters of R = 0.45; a spiral plate of charge 2 in one, and the second splitter tilted so that
the other arm arrives at 2.0 mrad. The arms differ by 40 mm; the laser's fringes fall to 1/e at 200 mm.

Look for: straight fringes 316 um apart that part in the middle, where two more of them begin. The deepest fringes at
"cross" reach 0.961, what the coherence leaves; at "along" the arms are unequal and the fringes away from the core 0.942
deep. Add the two frames: fringes stay until one of them is mirrored left to right, since one camera sees every beam
after one reflection more. print(train.visibility("along")) splits the number into its factors.
"""

import fastaxis as fa
from fastaxis.units import mm, mrad, mW, nm, um

train = fa.Train(wavelength=632.8 * nm, name="Gannet Stack")
train.along(
    fa.Laser(waist=1.0 * mm, power=2 * mW, state=fa.V, line=fa.GaussianLine(coherence_length=200 * mm), name="laser"),
    fa.BeamSplitter(reflectance=0.45, name="split"),
    fa.Mirror(name="m1"),
    fa.FreeSpace(300 * mm, name="short"),
    fa.SpiralPlate(charge=2, name="spiral"),
    fa.BeamSplitter(reflectance=0.45, name="join"),
    fa.Camera(pixel=12 * um, shape=(160, 160), name="along"),
)
train.along("split.reflected", fa.FreeSpace(340 * mm, name="long"), fa.Mirror(name="m2"))
train.along("m2", fa.Wedge(x=2.0 * mrad, name="tilt"), "join.side")
train.along("join.reflected", fa.Camera(pixel=12 * um, shape=(160, 160), name="cross"))
settings = (fa.Setting("open"),)
