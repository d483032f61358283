import math

import numpy as np
import pytest

from fastaxis.engines.grid.light import GridLight, axis
from fastaxis.engines.grid.turning import turned
from fastaxis.laws import Turn

COUNT, PITCH, WAVELENGTH = 128, 0.1e-3, 500e-9
JONES = np.array([1.0, 0.0], dtype=complex)


def lopsided(x, y):
    """A beam off the axis that runs aside, with a phase singularity."""
    return np.exp(-((x - 1e-3) ** 2 / 1.0e-6 + (y - 0.3e-3) ** 2 / 0.6e-6) + 3e3j * x) * (x + 1j * y) / 1e-3


def light(function):
    x = axis(COUNT, PITCH)
    return GridLight(function(x[None], x[:, None]).astype(complex)[None], JONES, PITCH, 0.5, WAVELENGTH)


@pytest.mark.parametrize("angle", [0.3, -0.785, math.pi / 4, 2.5, -3.0, 7.0])
def test_the_picture_turns_counter_clockwise(angle):
    c, s, x = math.cos(angle), math.sin(angle), axis(COUNT, PITCH)
    expected = lopsided(c * x[None] + s * x[:, None], c * x[:, None] - s * x[None])
    found = turned(light(lopsided), Turn(angle))
    # The beam leaves about 1e-11 of its peak beyond the band once it is sheared.
    assert np.allclose(found.samples[0], expected, atol=1e-10 * abs(expected).max())
    assert found.curvature == 0.5


@pytest.mark.parametrize("quarters", [-3, -1, 1, 2, 4])
def test_quarter_turns_only_move_samples(quarters):
    before = light(lopsided)
    after = turned(before, Turn(quarters * math.pi / 2)).samples
    assert np.array_equal(np.sort_complex(after.ravel()), np.sort_complex(before.samples.ravel()))
    x, y = 5, 90  # a sample (column, row); each quarter sends (x, y) to (-y, x)
    for _ in range(quarters % 4):
        x, y = COUNT - 1 - y, x
    assert after[0, y, x] == before.samples[0, 90, 5]


def test_no_power_is_lost_and_the_turn_can_be_undone():
    before = light(lopsided)
    there = turned(before, Turn(0.6))
    assert there.power == pytest.approx(before.power, rel=1e-13)  # six transforms
    back = turned(there, Turn(-0.6))
    assert np.allclose(back.samples, before.samples, atol=1e-10 * abs(before.samples).max())
