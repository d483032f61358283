import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements import Polarizer
from fastaxis.light import H
from fastaxis.units import deg

angles = st.floats(-6, 6)
quick = settings(max_examples=50, deadline=None)
ROUNDING = 1e-14  # products of up to three 2x2 matrices with entries up to 1


def test_malus(jones):
    assert np.linalg.norm(jones(Polarizer(axis=30 * deg)) @ H.jones) ** 2 == pytest.approx(0.75, abs=ROUNDING)


def test_ideal_one_passes_nothing_across(jones):
    assert jones(Polarizer(axis=0)) == pytest.approx(np.diag([1, 0]), abs=0)


@quick
@given(angles, st.floats(1.001, 1e8), st.floats(0, 1))
def test_powers_along_and_across(jones, axis, extinction, transmission):
    matrix = jones(Polarizer(axis=axis, extinction=extinction, transmission=transmission))
    along = np.array([math.cos(axis), math.sin(axis)])
    across = np.array([-along[1], along[0]])
    assert np.linalg.norm(matrix @ along) == pytest.approx(math.sqrt(transmission), abs=ROUNDING)
    assert np.linalg.norm(matrix @ across) == pytest.approx(math.sqrt(transmission / extinction), abs=ROUNDING)


@quick
@given(angles)
def test_projects(jones, axis):
    matrix = jones(Polarizer(axis=axis))
    assert matrix @ matrix == pytest.approx(matrix, abs=ROUNDING)
    assert jones(Polarizer(axis=axis), ("back", "front")) == pytest.approx(jones(Polarizer(axis=-axis)), abs=ROUNDING)


def test_numbers_agree_with_letters(agrees):
    agrees(Polarizer, {"axis": 0.4, "transmission": 0.9, "extinction": 50.0})
