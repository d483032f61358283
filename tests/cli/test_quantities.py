import math

import pytest

from fastaxis.cli.quantities import assignment, quantity
from fastaxis.errors import ParameterError


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("22.5deg", math.pi / 8),
        (" 8 mm ", 8e-3),
        ("3.45um", 3.45e-6),
        ("3.45 µm", 3.45e-6),
        ("-45°", -math.pi / 4),
        ("532*nm", 532e-9),
        ("1e-3", 1e-3),
        (".5mW", 5e-4),
    ],
)
def test_a_number_and_its_unit(text, value):
    assert quantity(text) == pytest.approx(value, rel=4e-16)  # one multiplication, one parse


@pytest.mark.parametrize("text", ["", "mm", "5 furlongs", "1,5mm", "nan", "deg5"])
def test_anything_else_is_refused_with_an_example(text):
    with pytest.raises(ParameterError, match=r"a quantity is a number and one of the units .* \(fix: 22.5deg\)"):
        quantity(text)


def test_a_letter_and_its_value():
    assert assignment("d = 8mm") == ("d", 8e-3)


@pytest.mark.parametrize("text", ["theta", "=5mm", "22.5deg"])
def test_an_assignment_needs_a_letter_and_an_equals_sign(text):
    with pytest.raises(ParameterError, match="LETTER=VALUE"):
        assignment(text)
