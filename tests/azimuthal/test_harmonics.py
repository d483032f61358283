import numpy as np
import pytest

from fastaxis.engines.azimuthal.harmonics import LEFT, RIGHT, Harmonics
from fastaxis.engines.azimuthal.panels import sampled
from fastaxis.laws import TravelLaw


@pytest.fixture
def light():
    """L with l = 0, R with l = 2; powers pi/2 and pi/8 of Gaussian shapes."""
    profile = sampled(lambda r: np.stack([np.exp(-(r**2)), 0.5 * np.exp(-(r**2))]), np.linspace(0, 6, 5))
    return Harmonics(orders=((LEFT, 0), (RIGHT, 2)), profile=profile, curvature=0.0, wavenumber=1e7, beyond=(0.3, 0.1))


def test_power_counts_both_hands_and_what_lies_beyond(light):
    assert light.powers == pytest.approx((np.pi / 2, np.pi / 8), rel=1e-14)
    assert light.power == pytest.approx(np.pi * 5 / 8 + 0.4, rel=1e-14)


def test_links_shift_and_equal_orders_add_up(light):
    linked = light.linked([(LEFT, RIGHT, 2, 0.5), (RIGHT, RIGHT, 0, 1j)])
    assert linked.orders == ((RIGHT, 2),)
    assert np.allclose(linked.profile.values[0], (0.5 + 0.5j) * light.profile.values[0])
    assert linked.beyond == pytest.approx((0.0, 0.25 * 0.3 + 0.1))


def test_what_cancels_to_rounding_is_dropped(light):
    linked = light.linked([(LEFT, LEFT, 0, 1), (RIGHT, RIGHT, 0, 1e-17)])
    assert linked.orders == ((LEFT, 0),)


def test_nothing_left_is_darkness_and_not_an_error(light):
    dark = light.linked([(LEFT, LEFT, 0, 0), (RIGHT, RIGHT, 0, 0)])
    assert dark.power == 0


@pytest.mark.parametrize(("axis", "sign"), [("x", -1), ("y", 1)])
def test_a_flip_reverses_the_charge(light, axis, sign):
    """exp(i l phi) is exp(i l (pi - phi')) = (-1)^l exp(-i l phi') with x reversed."""
    odd = light.linked([(LEFT, LEFT, 1, 1), (RIGHT, RIGHT, 0, 1)]).flipped(axis)
    assert set(odd.orders) == {(LEFT, -1), (RIGHT, -2)}
    values = dict(zip(odd.orders, odd.profile.values, strict=True))
    assert np.allclose(values[LEFT, -1], sign * light.profile.values[0])
    assert np.allclose(values[RIGHT, -2], light.profile.values[1])


def test_a_turned_picture(light):
    turned = light.turned(0.3)
    assert np.allclose(turned.profile.values[1], np.exp(-0.6j) * light.profile.values[1])


def test_sections_add_up(light):
    waiting = light.through(TravelLaw.free(0.2)).through(TravelLaw.free(0.3))
    assert waiting.section.b == pytest.approx(0.5)
    assert waiting.power == light.power
