import numpy as np
import pytest

import fastaxis as fa
from fastaxis.maths import NUMBERS
from fastaxis.studies.tolerance.lawtable import law_tables
from fastaxis.units import deg, mm, nm

WAY = ("front", "back")
LINE = 633 * nm


def asked_one_by_one(element, names, values):
    tables = [law_tables(element, WAY, LINE, names, row[None]) for row in values]
    return [np.concatenate([table[k][1] for table in tables]) for k in range(len(tables[0]))]


@pytest.mark.parametrize(
    ("element", "names"),
    [
        (fa.HalfWavePlate(fast=10 * deg), ("fast",)),
        (fa.Retarder(slow=0.3, retardance=100 * deg), ("slow", "retardance")),
        (fa.QPlate(q=0.5, retardance=150 * deg), ("offset", "retardance")),
        (fa.Polarizer(axis=0.2, extinction=30), ("axis",)),
        (fa.Rotator(angle=0.1), ("angle",)),
    ],
)
def test_nine_values_of_an_angle_give_all_others(element, names):
    values = np.random.default_rng(1).uniform(-3, 3, (200, len(names)))
    found = law_tables(element, WAY, LINE, names, values)
    for (_, numbers), exact in zip(found, asked_one_by_one(element, names, values), strict=True):
        assert numbers == pytest.approx(exact, abs=1e-13)


def test_other_parameters_are_asked_at_every_value():
    element = fa.Polarizer(axis=0.2, extinction=30)
    values = np.linspace(10, 1000, 40)[:, None]
    (found,) = law_tables(element, WAY, LINE, ("extinction",), values)
    # Across the axis the amplitude is the root of 1/extinction.
    across = found[1].reshape(-1, 2, 2) @ [-np.sin(0.2), np.cos(0.2)]
    assert np.linalg.norm(across, axis=1) == pytest.approx(1 / np.sqrt(values[:, 0]), rel=1e-12)


def test_a_place_is_not_a_number_of_the_law():
    values = np.array([[0.0], [0.1 * mm]])
    assert law_tables(fa.QPlate(q=0.5), WAY, LINE, ("centre_x",), values) is None


@pytest.mark.parametrize(
    ("element", "names", "around", "within"),
    [
        (fa.Polarizer(axis=0.2, extinction=300), ("axis", "extinction"), [0.2, 300], [0.1, 100]),
        (fa.QuarterWavePlate(fast=0.3), ("fast", "retardance", "wavelength"), [0.3, 1.5, LINE], [0.1, 0.1, 2 * nm]),
    ],
)
def test_a_few_values_of_a_smooth_parameter_give_all_others(element, names, around, within):
    values = np.array(around) + np.random.default_rng(2).uniform(-1, 1, (3000, len(names))) * within
    asked = []
    law = type(element).laws

    class Counting(type(element)):
        def laws(self, wavelength):
            asked.append(wavelength)
            return law(self, wavelength)

    counting = Counting(**element.parameters())
    found = law_tables(counting, WAY, LINE, names, values)
    assert len(asked) < len(values)
    for row in (1, 1234, -2):
        changes = dict(zip(names, values[row], strict=True))
        colour = changes.pop("wavelength", LINE)
        exact = [law.linear(NUMBERS) for law in element.changed(**changes).laws(colour)]
        assert [numbers[row].reshape(2, 2) for _, numbers in found] == [pytest.approx(np.array(exact[0]), abs=1e-13)]
