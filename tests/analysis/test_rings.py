"""Bright and dark rings of round pictures."""

import math

import numpy as np
import pytest
from scipy.special import j1, jn_zeros

from fastaxis.analysis import rings


def picture(radial, half=3.0, count=121):
    axis = np.linspace(-half, half, count)
    return radial(np.hypot(axis, axis[:, None])), axis


def test_the_first_dark_ring_behind_a_pinhole_is_found_though_it_is_faint():
    # G. B. Airy, Trans. Camb. Phil. Soc. 5, 283 (1835): (2 J1(v)/v)^2, first dark at the first zero of J1.
    frame, axis = picture(lambda r: np.where(r == 0, 1.0, 2 * j1(r) / np.where(r == 0, 1, r)) ** 2, half=9)
    found = rings(frame, x=axis, y=axis)
    assert found.bright == 0
    # Steps of 0.04; a parabola through the samples around a square of a zero is good to a tenth of one.
    assert found.dark == pytest.approx(jn_zeros(1, 1)[0], abs=0.004)


def test_a_ring_is_bright_at_its_radius_and_has_no_dark_ring_outside():
    frame, axis = picture(lambda r: r**2 * np.exp(-2 * r**2))
    found = rings(frame, x=axis, y=axis)
    assert found.bright == pytest.approx(1 / math.sqrt(2), abs=1e-3)
    assert math.isnan(found.dark)


def test_light_too_faint_for_any_camera_makes_no_dark_ring():
    frame, axis = picture(lambda r: np.exp(-2 * r**2) + 1e-9 * np.exp(-50 * (r - 2.6) ** 2))
    assert math.isnan(rings(frame, x=axis, y=axis).dark)
