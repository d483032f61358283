import cmath

import numpy as np
import pytest

from fastaxis.laws import UNIT, Amplitude, at
from fastaxis.maths import NUMBERS, Pattern


def test_is_root_of_power_times_phasor():
    assert Amplitude(0.25, 0.3).number() == pytest.approx(0.5 * cmath.exp(0.3j), abs=1e-15)


def test_unit_leaves_light_alone():
    assert UNIT.number() == 1
    assert UNIT.uniform


def test_product():
    product = Amplitude(0.5, 0.3).times(Amplitude(0.4, -0.5))
    assert product.power == pytest.approx(0.2, abs=1e-16)
    assert product.phase == pytest.approx(-0.2, abs=1e-16)


def test_pattern_is_looked_up_at_the_place():
    amplitude = Amplitude(1.0, Pattern(lambda x, y: 2 * x + y))
    assert not amplitude.uniform
    x, y = np.array([0.1, 0.2]), np.array([0.0, -1.0])
    # The phase has one rounding, its cosine and sine one more.
    assert amplitude.value(NUMBERS, x, y) == pytest.approx(np.exp(1j * (2 * x + y)), abs=1e-15)
    assert amplitude.mirrored("x").value(NUMBERS, -x, y) == pytest.approx(amplitude.value(NUMBERS, x, y), abs=0)
    assert amplitude.mirrored("y").value(NUMBERS, x, -y) == pytest.approx(amplitude.value(NUMBERS, x, y), abs=0)


def test_patterned_power():
    amplitude = Amplitude(Pattern(np.array([[0.25, 1.0]]), 1.0))
    assert amplitude.value(NUMBERS, np.array([-0.5, 0.5]), np.array([0.0, 0.0])).tolist() == [0.5, 1.0]


def test_at_gives_anything_else_as_it_is():
    assert at(0.3, 1.0, 2.0) == 0.3


def test_letters_agree_with_numbers(letters):
    import sympy

    t, phase = sympy.symbols("t phase", positive=True)
    value = complex(Amplitude(t, phase).value(letters).subs({t: 0.3, phase: 1.1}))
    assert value == pytest.approx(Amplitude(0.3, 1.1).number(), abs=1e-15)
