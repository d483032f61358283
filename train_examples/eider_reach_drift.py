"""Eider Reach: an interferometer one arm of which drifts.

One splitter, two end mirrors. The laser runs on two modes 500 MHz apart; one arm is 60 mm longer, and its mirror is
turned by half a milliradian, so that the returning beam leans by one. The mirror drifts: "drift" is the phase it adds
on one passage, twice which counts.

Look for: upright fringes 0.63 mm apart, 0.81 deep: the two modes beat with a period of 600 mm of path, and the way
there and back differs by 120 mm. Let it drift, and the fringes walk without changing depth:
train.sweep({"drift.phase": [0, 0.2, 0.4]}, "cam", settings). At an arm difference of 150 mm they are gone.
"""

import fastaxis as fa
from fastaxis.units import deg, mm, mrad, mW, nm, um

train = fa.Train(wavelength=632.8 * nm, name="Eider Reach")
train.along(
    fa.Laser(
        waist=1.5 * mm, power=1 * mW, state=fa.H, line=fa.Comb(spacing=499.654e6, weights=(0.5, 0.5)), name="laser"
    ),
    fa.BeamSplitter(name="bs"),
)
train.retro("bs.transmitted", fa.FreeSpace(100 * mm, name="steady"), fa.Mirror(name="end1"))
train.retro(
    "bs.reflected",
    fa.FreeSpace(160 * mm, name="long"),
    fa.PhaseShift(phase=0 * deg, name="drift"),
    fa.Wedge(x=0.5 * mrad, name="lean"),
    fa.Mirror(name="end2"),
)
train.along("bs.side", fa.FreeSpace(100 * mm), fa.Camera(pixel=20 * um, shape=(160, 160), name="cam"))
settings = (fa.Setting("open"),)
