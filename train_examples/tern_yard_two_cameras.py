"""Tern Yard: one vector beam, looked at by two cameras at once.

A q-plate of q = 1 makes a beam whose polarization turns twice around the axis. A polarizing splitter sends its
horizontal part straight on to one camera and its vertical part over a folding mirror to another.

Look for: four lobes on both cameras, the dark gaps of one where the other has its lobes. The picture of "over" was
reflected twice and is upright again. A real splitter (Tp = 0.97, Rs = 0.995) lets 3 % of the horizontal light go
the wrong way, and absorbs a little.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um

train = fa.Train(wavelength=780 * nm, name="Tern Yard")
train.along(
    fa.Laser(waist=0.60 * mm, power=8 * mW, state=fa.H, name="laser"),
    fa.QPlate(q=1, offset=0 * deg, name="qp"),
    fa.FreeSpace(200 * mm),
    fa.PolarizingBeamSplitter(Tp=0.97, Ts=0.003, Rp=0.028, Rs=0.995, name="pbs"),
    fa.FreeSpace(150 * mm),
    fa.Camera(pixel=10 * um, shape=(320, 320), name="straight"),
)
train.along(
    "pbs.reflected",
    fa.FreeSpace(50 * mm),
    fa.Mirror(name="fold"),
    fa.FreeSpace(100 * mm),
    fa.Camera(pixel=10 * um, shape=(320, 320), name="over"),
)
settings = (fa.Setting("open"), fa.linear(0 * deg), fa.linear(45 * deg), fa.linear(90 * deg))
