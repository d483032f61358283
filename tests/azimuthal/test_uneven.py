"""Sums of waves by transforms, against the waves one by one."""

import numpy as np
import pytest

from fastaxis.engines.azimuthal.uneven import wave_sums


@pytest.mark.parametrize(
    ("places", "frequencies", "phase"), [(700, 500, 300.0), (300, 200, 3.0), (20, 1, 5.0), (1, 9, 2.0)]
)
def test_sums_of_waves(places, frequencies, phase):
    rng = np.random.default_rng(5)
    x, s = 2 + rng.uniform(-1, 1, places), phase * (1.5 + rng.uniform(-1, 1, frequencies))
    values = rng.normal(size=(places, 3)) + 1j * rng.normal(size=(places, 3))
    exact = np.exp(1j * np.multiply.outer(s, x)) @ values
    # 1e-14 of each for the bells, and the rounding of phases of up to 7.5 times as much, in either way.
    allowed = 1e-14 + 2.2e-16 * 7.5 * phase
    assert abs(wave_sums(x, s, values) - exact).max() <= allowed * abs(values).sum(axis=0).max()


def test_a_place_on_the_border_of_the_grid_is_seen():
    x, s = np.array([-1.0, 1.0]), np.linspace(-40, 40, 300)
    sums = wave_sums(x, s, np.array([[1.0], [0.5]]))[:, 0]
    assert abs(sums - np.exp(-1j * s) - 0.5 * np.exp(1j * s)).max() < 3e-14


def test_nothing_spreads_and_nothing_turns():
    """All places are one, as are all frequencies."""
    assert wave_sums(np.full(3, 2.0), np.zeros(4), np.ones((3, 1)))[:, 0] == pytest.approx([3, 3, 3, 3], abs=3e-14)
