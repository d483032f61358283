"""Units are plain factors: a quantity is number times unit, in SI."""

import math

import numpy as np
import pytest
import sympy

from fastaxis import units


@pytest.mark.parametrize(
    ("unit", "value"),
    [("pm", 1e-12), ("nm", 1e-9), ("um", 1e-6), ("mm", 1e-3), ("cm", 1e-2), ("m", 1), ("km", 1e3),
     ("nW", 1e-9), ("uW", 1e-6), ("mW", 1e-3), ("W", 1), ("s", 1), ("ms", 1e-3), ("us", 1e-6), ("rad", 1), ("mrad", 1e-3), ("urad", 1e-6)],
)  # fmt: skip
def test_metric_prefixes(unit, value):
    assert getattr(units, unit) == value


def test_angles_close_the_circle():
    assert 360 * units.deg == 2 * math.pi
    assert 60 * units.arcmin == pytest.approx(units.deg, rel=1e-15)
    assert units.turn == 2 * math.pi
    assert 0.25 * units.waves == math.pi / 2


def test_units_work_on_arrays_and_symbols():
    assert np.allclose(np.array([1.0, 2.0]) * units.mm, [1e-3, 2e-3], rtol=1e-15)
    x = sympy.Symbol("x")
    assert (x * units.mm).subs(x, 2) == pytest.approx(2e-3)


def test_everything_listed_exists():
    assert all(isinstance(getattr(units, name), float) for name in units.__all__)
