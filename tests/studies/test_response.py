"""Whether light is linear in a parameter is read off the laws, so it holds for parts of one's own."""

from dataclasses import dataclass
from math import pi

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.elements.base import ThroughElement
from fastaxis.laws import Amplitude, AxisLaw, ScalarLaw
from fastaxis.maths import Pattern
from fastaxis.studies.knobs import read_knobs
from fastaxis.studies.response import response
from fastaxis.studies.spanning import spanning
from fastaxis.units import deg, mm, nm

GRID = fa.Grid(samples=128, window=6 * mm)
VOLTS = np.linspace(1, 9, 12)

pytestmark = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


@dataclass(frozen=True, kw_only=True)
class Cell(ThroughElement):
    """A retarder whose retardance falls with the voltage on it."""

    volts: float = 2.0

    def laws(self, wavelength):
        half = pi / (1 + self.volts**2)
        return (AxisLaw(Amplitude(1.0, -half), Amplitude(1.0, half), 0.4),)


@dataclass(frozen=True, kw_only=True)
class Film(ThroughElement):
    """A mask that is a new function at each look, so that no two looks can be known to be alike."""

    depth: float = 1.0

    def laws(self, wavelength):
        return (ScalarLaw(Amplitude(1.0, Pattern(lambda x, y: self.depth * 1e3 * x * (1 + 0 * y)))),)


def bench(part):
    return fa.Train(wavelength=633 * nm, name="Gannet Stack").along(
        fa.Laser(waist=0.5 * mm, state=fa.D, name="laser"),
        fa.QPlate(q=0.5, centre=(0.1 * mm, 0), name="qp"),
        part,
        fa.FreeSpace(distance=0.1, name="arm"),
        fa.Camera(pixel=80e-6, shape=(20, 20), name="cam"),
    )


def rank(train, values, *, zipped=False):
    table = response(train, "cam", read_knobs(values, zipped=zipped))
    return None if table is None else spanning(table).rank


def test_a_part_of_ones_own_moves_its_phases_oppositely(compare):
    assert compare(bench(Cell(name="cell")), {"cell.volts": VOLTS}, grid=GRID).propagations == 2


def test_functions_that_cannot_be_compared_are_propagated_each_for_itself(compare):
    assert compare(bench(Film(name="film")), {"film.depth": [0.5, 1.0, 1.5]}, grid=GRID, checked=3).propagations == 3


@pytest.mark.parametrize(
    ("values", "expected"),
    [
        ({"plate.fast": VOLTS}, 3),
        ({"plate.retardance": VOLTS}, 2),
        ({"plate.transmission": VOLTS / 10}, 1),
        ({"qp.offset": VOLTS}, 2),  # tuned: nothing passes unconverted
        ({"qp.q": [0.5, 1.0]}, None),
        ({"qp.centre_y": [0.0, 1e-4]}, None),
        ({"arm.distance": [0.1, 0.2]}, None),
        ({"laser.power": [1e-3, 2e-3]}, None),
        ({"cam.centre_x": [0.0, 1e-4]}, None),
        ({"wavelength": [500 * nm, 600 * nm]}, None),
    ],
)
def test_how_many_numbers_a_parameter_stands_for(values, expected):
    train = bench(fa.Retarder(fast=10 * deg, retardance=1.0, name="plate"))
    assert rank(train, values) == expected


def test_one_value_that_is_not_linear_takes_the_others_along():
    train = bench(fa.Retarder(fast=10 * deg, retardance=1.0, name="plate"))
    assert rank(train, {"plate.fast": [0.1, 0.2], "arm.distance": [0.1, 0.2]}, zipped=True) is None


def test_three_plates_turned_together_are_of_third_degree():
    plates = [fa.Retarder(fast=0, retardance=1.0 + 0.1 * k, name=f"p{k}") for k in range(3)]
    train = fa.Train(wavelength=633 * nm).along(fa.Laser(waist=1 * mm), *plates, fa.Camera(pixel=1e-5, name="cam"))
    angles = np.linspace(0, 3, 40)
    assert rank(train, {f"p{k}.fast": angles for k in range(3)}, zipped=True) == 7
