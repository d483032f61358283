"""The numeric namespace and patterns."""

import math

import numpy as np
import pytest
import sympy
from hypothesis import given
from hypothesis import strategies as st

from fastaxis.maths import NUMBERS, Pattern, free_symbols, is_symbolic


@pytest.mark.parametrize("quarters", range(-9, 10))
def test_whole_quarter_turns_are_exact(quarters):
    assert NUMBERS.phasor(quarters * math.pi / 2) == (1, 1j, -1, -1j)[quarters % 4]


def test_degrees_that_carry_roundings_are_still_quarter_turns():
    deg = math.pi / 180
    assert NUMBERS.phasor(2 * 22.5 * deg * 2) == 1j
    assert NUMBERS.cos(3 * 30 * deg) == 0


def test_an_angle_next_to_a_quarter_turn_is_not_snapped():
    assert NUMBERS.phasor(math.pi / 2 + 1e-12) != 1j


@given(st.floats(-50, 50))
def test_phasor_agrees_with_the_exponential(angle):
    # 4 eps of the angle may be snapped away, 2 roundings elsewhere.
    assert abs(NUMBERS.phasor(angle) - np.exp(1j * angle)) <= 6 * np.finfo(float).eps * max(1, abs(angle))


def test_arrays_and_numbers_agree():
    angles = np.linspace(-3, 3, 7)
    assert np.allclose(NUMBERS.phasor(angles), [NUMBERS.phasor(a) for a in angles], atol=1e-15)
    assert np.allclose(NUMBERS.cos(angles) ** 2 + NUMBERS.sin(angles) ** 2, 1, atol=1e-15)
    assert np.array_equal(NUMBERS.root(np.array([4.0, 9.0])), [2, 3])


def test_letters_are_found_in_nested_values():
    a, b = sympy.symbols("a b")
    assert free_symbols([1.0, a + 1, (b, [2 * a])]) == {a, b}
    assert is_symbolic(a)
    assert not is_symbolic(1.0)


CELLS = np.arange(6.0).reshape(2, 3)


@pytest.mark.parametrize(
    ("place", "value"), [((-1, -0.5), 0), ((0, -0.5), 1), ((1, 0.5), 5), ((40, -40), 2), ((-40, 40), 3)]
)
def test_cells_are_uniform_rows_run_along_y_and_the_edge_continues(place, value):
    assert Pattern(CELLS, pixel=1.0)(*place) == value


@given(st.floats(-1, 1), st.floats(-1, 1))
def test_pattern_arithmetic_and_mirrors(x, y):
    p = Pattern(lambda x, y: x + 10 * y)
    assert (2 * (-p) / 2 + 1)(x, y) == pytest.approx(1 - x - 10 * y)
    assert p.mirrored("x")(x, y) == pytest.approx(-x + 10 * y)
    assert p.mirrored("y").mirrored("y")(x, y) == p(x, y)
