"""Low Quay teaching room: a rotating-plate polarimeter and its two usual mistakes.

632.8 nm; light of azimuth 20 deg and ellipticity 15 deg; a quarter-wave plate turned in 64 steps of 5.625 deg before a fixed
analyzer at 0. The numbers were worked out by hand from the harmonics of such a polarimeter: with a plate of retardance d,
I = [S0 + c S1 + s (S1 cos 4t + S2 sin 4t) - sin d S3 sin 2t] / 2, c = cos^2(d/2), s = sin^2(d/2).
"""

import numpy as np
import pytest

from fastaxis.camera import plate_harmonics, reconstruct, rotating_plate
from fastaxis.camera.settings import as_settings, weight_matrix
from fastaxis.light import elliptical
from fastaxis.light.stokes import ellipse
from fastaxis.units import deg

STATE = elliptical(20 * deg, 15 * deg)
# Four digits are stated.
DIGITS = 0.5e-4


def frames(**instrument):
    return weight_matrix(as_settings(rotating_plate(64, span=360 * deg, **instrument))) @ STATE.stokes


ASSUMED = rotating_plate(64, span=360 * deg)
FAST = np.arange(64) * 5.625 * deg


def test_a_true_instrument_gives_the_state_itself():
    _, s1, s2, s3 = reconstruct(frames(), ASSUMED).stokes
    assert (s1, s2, s3) == pytest.approx((0.6634, 0.5567, 0.5000), abs=DIGITS)


def test_a_plate_of_85_deg_reduced_as_90_deg():
    found = reconstruct(frames(retardance=85 * deg), ASSUMED)
    assert found.stokes == pytest.approx((1.0578, 0.6056, 0.5082, 0.4981), abs=DIGITS)
    assert float(found.degree) == pytest.approx(0.883, abs=0.5e-3)


def test_the_sums_give_the_same_as_least_squares():
    found = plate_harmonics(frames(retardance=85 * deg), FAST)
    # 64 terms of order one.
    np.testing.assert_allclose(
        found.stokes(), reconstruct(frames(retardance=85 * deg), ASSUMED).stokes, atol=64 * np.finfo(float).eps
    )


def test_reduced_with_its_true_retardance_nothing_is_left_of_the_mistake():
    true = rotating_plate(64, span=360 * deg, retardance=85 * deg)
    found = reconstruct(frames(retardance=85 * deg), true)
    np.testing.assert_allclose(found.stokes, STATE.stokes, atol=64 * np.finfo(float).eps)


@pytest.mark.parametrize("error", [2.0, -2.0])
def test_an_error_of_the_zero_turns_the_azimuth_twice_and_shows_as_cos_2t(error):
    found = plate_harmonics(frames(start=error * deg), FAST)
    azimuth, _ = ellipse(found.stokes())
    # The plate stands further on by the error than its scale says: at 4t the pattern is turned by 4 errors, in azimuth by 2.
    assert np.degrees(azimuth) == pytest.approx(20 - 2 * error, abs=1e-10)
    # sin d S3 sin(2 error) with S3 = 0.5: half of it is the amplitude in I, the harmonic is counted as I = [...]/2.
    assert abs(found.cos2) == pytest.approx(np.sin(4 * deg) * 0.5, abs=64 * np.finfo(float).eps)
    assert abs(found.cos2) / 2 == pytest.approx(0.0174, abs=DIGITS)
