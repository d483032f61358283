"""Light alike up to a number travels once, and what came behind a section is remembered."""

import numpy as np
import pytest

from fastaxis.elements import FreeSpace, HalfWavePlate, QPlate
from fastaxis.engines.azimuthal.panels import ORDER, Profile
from fastaxis.engines.azimuthal.shapes import ROWS, Shapes, remembered
from fastaxis.engines.memory import LIGHT, forget_light
from fastaxis.light import Gaussian, elliptical
from fastaxis.units import deg, mm

EDGES = np.array([0.0, 1.0, 2.0])
RNG = np.random.default_rng(5)


def rough(count):
    return RNG.normal(size=(count, 2, ORDER)) + 1j * RNG.normal(size=(count, 2, ORDER))


def test_shapes_times_numbers_are_the_functions():
    base = rough(2)
    values = np.stack([base[0], (2 - 1j) * base[0], base[1], 1e-5j * base[0]])
    found = Shapes.of(Profile(EDGES, values), (1, -1, 1, 2))
    # The first two share a shape; another function or another |l| does not.
    assert found.charges == (1, 1, 2)
    # Two roundings each of the quotient and the product.
    assert abs(found.profile.combined(found.numbers).values - values).max() < 4e-15


def test_a_function_of_rounding_stays_small():
    """Blown up to 1 it would never settle."""
    base = rough(1)[0]
    found = Shapes.of(Profile(EDGES, np.stack([base, 3e-14 * rough(1)[0]])), (0, 1))
    # A power of ten at least as large as the row: 1e-13 of the strongest, whose own peak is 1 now.
    assert abs(found.profile.values[1]).max() <= 1.0001e-13


def test_turning_a_plate_asks_for_no_other_travel(arrive):
    def through(angle):
        parts = [HalfWavePlate(fast=angle), QPlate(q=0.5, retardance=2.0), FreeSpace(0.2), QPlate(q=1), FreeSpace(0.3)]
        return arrive(Gaussian(waist=0.5 * mm), *parts, state=elliptical(0.1, 0.2)).at(
            np.array([0.3 * mm]), np.zeros(1)
        )

    through(10 * deg)
    known = len(LIGHT)
    warm = through(70 * deg)
    assert len(LIGHT) == known
    forget_light()
    assert warm == pytest.approx(through(70 * deg), rel=1e-12)


def test_what_differs_by_its_shapes_alone_takes_turns():
    forget_light()
    made = []
    bases = [Shapes.of(Profile(EDGES, rough(1)), (1,)) for _ in range(ROWS + 1)]
    for base in [*bases, bases[-1], bases[0]]:
        remembered(("key",), base, lambda base=base: made.append(base) or base.profile.values)
    # The latest is still known, the first is not.
    assert made == [*bases, bases[0]]
