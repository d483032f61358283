"""The engine's own estimate of its error against a run with much finer settings."""

import math
import random

import numpy as np
import pytest

from fastaxis.elements import (
    Aperture, FreeSpace, Lens, Obstacle, Polarizer, QPlate, QuarterWavePlate, SpiralPlate,
)  # fmt: skip
from fastaxis.engines.azimuthal import Settings
from fastaxis.light import Gaussian, H, L, LaguerreGauss, R, elliptical
from fastaxis.units import mm

FINE = Settings(dark=1e-14, tail=320, furthest=10.0, phase=25.0)
CASES = 25
CHARGES = [1, 1, 2, 3, 5, 8, 12, 20]


def draw(rng):
    """A mode, its state, and two to four parts that need the light in their plane, with spaces and lenses between."""
    waist = rng.uniform(0.3, 0.6) * mm
    bell = Gaussian(waist=waist, waist_at=rng.uniform(-1, 1))
    mode = rng.choice([bell, bell, LaguerreGauss(rng.randrange(6), rng.randrange(-5, 6), waist)])
    state = rng.choice([H, L, R, elliptical(rng.uniform(0, 3), rng.uniform(-0.7, 0.7))])
    parts = []
    for _ in range(rng.choice([1, 1, 1, 1, 2])):
        charge = rng.choice([-1, 1]) * rng.choice(CHARGES)
        plate = [QPlate(q=charge / 2, retardance=rng.choice([0.1, 2.5, math.pi])), SpiralPlate(charge=charge)]
        stop = [Aperture(radius=rng.uniform(0.3, 1) * mm), Obstacle(radius=rng.uniform(0.05, 0.2) * mm)]
        parts += [rng.choice(plate + stop), FreeSpace(rng.uniform(0.15, 1.0))]
    if rng.random() < 0.3:
        parts += [QuarterWavePlate(fast=rng.uniform(0, 3)), Polarizer(axis=rng.uniform(0, 3))]
    if rng.random() < 0.5:
        parts += [Lens(focal=0.3), FreeSpace(0.3 * rng.uniform(0.8, 1.2))]
    return mode, state, parts


def case(arrive, seed):
    """(true error, estimate) as shares of the peak."""
    mode, state, parts = draw(random.Random(seed))
    radii = np.linspace(0, 1.2, 41) * mm
    ours, best = arrive(mode, *parts, state=state), arrive(mode, *parts, state=state, settings=FINE)
    fields = [field.at(radii, np.zeros(1)) for field in (ours, best)]
    return abs(fields[0] - fields[1]).max() / abs(fields[1]).max(), ours.error(1.2 * mm)


def test_the_estimate_is_honest(arrive):
    cases = [case(arrive, seed) for seed in range(CASES)]
    below = sum(true <= estimate for true, estimate in cases)
    assert below >= 0.99 * CASES
    # And not idle: an estimate of 1 would be honest too.
    assert np.median([estimate for _, estimate in cases]) < 1e-10


@pytest.mark.parametrize(("settings", "distance"), [(Settings(phase=400.0), 0.5), (Settings(most=6), 0.05)])
def test_a_poor_run_says_so(arrive, settings, distance):
    field = arrive(Gaussian(waist=0.5 * mm), SpiralPlate(charge=1), FreeSpace(distance), settings=settings)
    best = arrive(Gaussian(waist=0.5 * mm), SpiralPlate(charge=1), FreeSpace(distance), settings=FINE)
    radii = np.linspace(0, 1.2, 41) * mm
    true = (
        abs(field.at(radii, np.zeros(1)) - best.at(radii, np.zeros(1))).max() / abs(best.at(radii, np.zeros(1))).max()
    )
    assert 1e-11 < true < field.error(1.2 * mm)
