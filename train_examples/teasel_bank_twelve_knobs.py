"""Teasel Bank: which of twelve knobs spoils a beam, told before any is bought.

A half-wave and a quarter-wave plate prepare the light for a q-plate, another pair leads it onto a polarizer, and a
camera looks. Each axis and each retardance may be off by a degree, the extinction of the polarizer by 100.

    python train_examples/teasel_bank_twelve_knobs.py

prints how far power and ring go with all of that at once, and writes teasel_bank.pdf. Look for: the plates in front of
the q-plate make nearly all of it, four fifths of the variance of the power the half-wave plate; the retardances hardly
matter. Two thousand benches take about a second, since angles and retardances need no propagation each.
"""

import fastaxis as fa
from fastaxis.studies.tolerance import normal, power_at, ring_radius, uniform
from fastaxis.units import deg, mm, mW, nm, um

train = fa.Train(wavelength=532 * nm, name="Teasel Bank")
train.along(
    fa.Laser(waist=0.8 * mm, power=5 * mW, state=fa.H, name="laser"),
    fa.HalfWavePlate(fast=10 * deg, name="hwp"),
    fa.QuarterWavePlate(fast=20 * deg, name="q1"),
    fa.QPlate(q=0.5, offset=4 * deg, retardance=170 * deg, name="qp"),
    fa.HalfWavePlate(fast=3 * deg, name="h2"),
    fa.QuarterWavePlate(fast=40 * deg, name="q2"),
    fa.Polarizer(axis=0 * deg, extinction=1e3, name="pol"),
    fa.FreeSpace(300 * mm, name="space"),
    fa.Camera(pixel=60 * um, shape=(32, 32), name="cam"),
)
settings = (fa.Setting("open"),)
errors = {
    f"{name}.{knob}": normal(1 * deg) for name in ("hwp", "q1", "h2", "q2") for knob in ("fast", "retardance")
} | {
    "qp.offset": normal(1 * deg),
    "qp.retardance": normal(1 * deg),
    "pol.axis": normal(1 * deg),
    "pol.extinction": uniform(100.0),
}
merits = {"power": power_at("cam"), "ring": ring_radius("cam")}

if __name__ == "__main__":
    study = train.tolerance(errors, merits, draws=2000)
    print(study)
    study.save("teasel_bank.pdf")
