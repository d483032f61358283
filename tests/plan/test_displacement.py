"""Light moved and tilted as a whole: written out on a wave, in any order."""

import numpy as np
import pytest

from fastaxis.laws import TravelLaw
from fastaxis.plan.displacement import Displacement

K = 2 * np.pi / 633e-9


def applied(displacement, light):
    """exp(i k tilt.(r - offset/2)) E(r - offset) exp(i k path), as it stands in the class."""
    (x0, y0), (tx, ty) = displacement.offset, displacement.tilt

    def moved(x, y):
        phase = K * (tx * (x - x0 / 2) + ty * (y - y0 / 2) + displacement.path)
        return np.exp(1j * phase) * light(x - x0, y - y0)

    return moved


def spot(x, y):
    return (1 + 2e3 * x + 1e3j * y) * np.exp(-(x * x + y * y) / 1e-6 + 3e5j * x * y)


ONE = Displacement((0.3e-3, -0.2e-3), (1e-3, 2e-3), 1e-7)
OTHER = Displacement((-0.1e-3, 0.4e-3), (-3e-3, 0.5e-3), -2e-7)
X, Y = np.random.default_rng(4).uniform(-1e-3, 1e-3, (2, 30))


def test_two_displacements_are_one():
    # Phases of some 30 rad, a dozen roundings.
    assert applied(ONE.then(OTHER), spot)(X, Y) == pytest.approx(applied(OTHER, applied(ONE, spot))(X, Y), abs=1e-13)
    assert abs(applied(ONE, applied(OTHER, spot))(X, Y) - applied(OTHER, applied(ONE, spot))(X, Y)).max() > 0.1


@pytest.mark.parametrize("axis", ["x", "y"])
def test_seen_reversed_it_does_the_same(axis):
    sx, sy = (-1, 1) if axis == "x" else (1, -1)
    behind = applied(ONE.reversed(axis), lambda x, y: spot(sx * x, sy * y))(X, Y)
    assert behind == pytest.approx(applied(ONE, spot)(sx * X, sy * Y), abs=1e-14)


def test_a_wedge_turns_about_its_own_middle():
    tilt, centre = (1e-3, -2e-3), (0.5e-3, 0.1e-3)
    expected = np.exp(1j * K * (tilt[0] * (X - centre[0]) + tilt[1] * (Y - centre[1]))) * spot(X, Y)
    assert applied(Displacement.wedge(tilt, centre), spot)(X, Y) == pytest.approx(expected, abs=1e-14)


def test_the_middle_goes_where_a_ray_goes_and_a_lens_adds_no_phase_of_its_own():
    there = ONE.through(TravelLaw.free(0.5))
    assert (there.tilt, there.path) == (ONE.tilt, ONE.path)
    assert there.offset == pytest.approx((0.8e-3, 0.8e-3))
    lens, vergence = TravelLaw.lens(2.0), np.exp(-1j * K * (X**2 + Y**2))
    # A lens multiplies by a phase, so that both orders can be written out.
    behind = applied(ONE.through(lens), lambda x, y: np.exp(-1j * K * (x * x + y * y)) * spot(x, y))(X, Y)
    assert behind == pytest.approx(vergence * applied(ONE, spot)(X, Y), abs=1e-13)
