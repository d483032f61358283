"""Random round benches by both engines. They share the laws but neither the light's form nor the integral."""

import random

import numpy as np
import pytest

from fastaxis.elements import (
    Aperture,
    DovePrism,
    FreeSpace,
    Lens,
    Mirror,
    Polarizer,
    QPlate,
    Retarder,
    Rotator,
    SpiralPlate,
)
from fastaxis.engines import propagate
from fastaxis.light import Gaussian, HermiteGauss, LaguerreGauss, elliptical
from fastaxis.plan import make_plan
from fastaxis.units import mm


def draw(rng):
    """A mode, a state and five to eight parts, at most one of which is singular at the axis."""
    waist = rng.uniform(0.4, 0.7) * mm
    mode = rng.choice(
        [
            Gaussian(waist=waist, waist_at=rng.uniform(-0.5, 0.5)),
            LaguerreGauss(1, rng.choice([-2, 1]), waist),
            HermiteGauss(rng.randint(0, 2), 1, waist),
        ]
    )
    singular = rng.choice([QPlate(q=rng.choice([-0.5, 0.5, 1]), offset=0.3, retardance=2.5), SpiralPlate(charge=-1)])
    smooth = [
        Retarder(fast=rng.uniform(0, 3), retardance=rng.uniform(0, 3)),
        Polarizer(axis=rng.uniform(0, 3), extinction=100),
        Rotator(angle=rng.uniform(0, 3)),
        DovePrism(index=1.5, roll=rng.uniform(0, 3)),
        Lens(focal=rng.choice([-1, 1]) * rng.uniform(0.5, 2)),
        Mirror(fold=rng.choice(["horizontal", "vertical"])),
        FreeSpace(rng.uniform(0.05, 0.4)),
        FreeSpace(rng.uniform(0.05, 0.4)),
    ]
    parts = [singular, *rng.sample(smooth, 5)]
    rng.shuffle(parts)
    return mode, elliptical(rng.uniform(0, 3), rng.uniform(-0.7, 0.7)), [*parts, FreeSpace(0.2)]


def both(train, x, y):
    fields = [propagate(make_plan(train, "cam", engine=name))[0] for name in ("azimuthal", "grid")]
    return fields, [field.at(x, y) for field in fields]


# The grid samples the turn of phase about the axis of a plate with a pitch h, and loses some (h/w)^2 of the peak:
# 1e-3 at 1024 samples across twelve or more radii. A wrong sign anywhere costs all of it.
@pytest.mark.parametrize("seed", range(6))
def test_both_engines_give_the_same_field(bench, seed):
    mode, state, parts = draw(random.Random(seed))
    x, y = np.linspace(-1, 1, 9) * mm, np.linspace(-1.1, 0.9, 8) * mm
    (exact, _), (ours, grids) = both(bench(mode, *parts, state=state), x, y)
    assert abs(ours - grids).max() <= 1e-3 * abs(exact.at(np.linspace(-1, 1, 41) * mm, y)).max()
