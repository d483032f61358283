"""Both kernels against the Gaussian closed form, for any ray matrix, signs and phase included."""

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from fastaxis.engines.grid.light import GridLight, axis
from fastaxis.engines.grid.scaled import travel_scaled
from fastaxis.engines.grid.single import travel_single
from fastaxis.laws import TravelLaw

WAVELENGTH, WIDTH = 500e-9, 1e-3
K = 2 * np.pi / WAVELENGTH
RAYLEIGH = np.pi * WIDTH**2 / WAVELENGTH


def start(curvature=0.0, count=256, window=17e-3):
    """An off-axis Gaussian of unit peak at (0.3, -0.2) mm, with a curvature kept apart."""
    x = axis(count, window / count)
    samples = np.exp(-((x[None] - 0.3e-3) ** 2 + (x[:, None] + 0.2e-3) ** 2) / WIDTH**2).astype(complex)
    return GridLight(samples[None], np.array([1, 0j]), window / count, curvature, WAVELENGTH)


def expected(law, curvature, x, y):
    """Collins integral of exp(-(x - x0)^2/w^2 + i k K x^2/2), each axis a Gaussian integral.

    With p = 1/w^2 - i k (A/B + K)/2 and s = 2 x0/w^2 - i k x/B, one axis gives
    sqrt(-i/(wavelength B)) sqrt(pi/p) exp(s^2/4p - x0^2/w^2 + i k D x^2/2B).
    """

    def one(places, middle):
        p = 1 / WIDTH**2 - 1j * K / 2 * (law.a / law.b + curvature)
        s = 2 * middle / WIDTH**2 - 1j * K * places / law.b
        power = s * s / (4 * p) - middle**2 / WIDTH**2 + 1j * K * law.d * places**2 / (2 * law.b)
        return np.sqrt(np.pi / p) * np.exp(power)

    return -1j / (WAVELENGTH * law.b) * one(x, 0.3e-3)[None, :] * one(y, -0.2e-3)[:, None]


def field(light):
    x = light.x
    r2 = x[None] ** 2 + x[:, None] ** 2
    return light.samples[0] * np.exp(1j * K * light.curvature * r2 / 2)


def error(light, law, curvature):
    found, right = field(light), expected(law, curvature, light.x, light.x)
    return np.max(abs(found - right)) / np.max(abs(right))


def matrix(a, b, d):
    return TravelLaw(a, b, (a * d - 1) / b, d)


# The window is 17 beam radii: the off-axis Gaussian is exp(-8.2^2) = 1e-29 at its edge. Phases of the closed form reach
# k D x^2/2B = 1e4 rad at the edge of the output, where light is dark, and 1e3 where it is bright: 1e-12 with margin.
TOLERANCE = 3e-12


@settings(max_examples=40, deadline=None)
@given(
    a=st.floats(0.3, 3).flatmap(lambda a: st.sampled_from([a, -a])),
    reach=st.floats(0.01, 0.6).flatmap(lambda z: st.sampled_from([z, -z])),
    d=st.floats(-2, 2),
    curvature=st.floats(-0.3, 0.3),
)
def test_scaled_angular_spectrum(a, reach, d, curvature):
    b = a * reach * RAYLEIGH
    near = a + b * curvature
    # The beam must still fit its window when collimated: up to 0.8 Rayleigh ranges it does.
    assume(abs(near) > 0.1 and abs(b / near) < 0.8 * RAYLEIGH)
    law = matrix(a, b, d)
    assert error(travel_scaled(start(curvature), law), law, curvature) < TOLERANCE


@settings(max_examples=40, deadline=None)
@given(
    a=st.floats(-1, 1),
    reach=st.floats(0.6, 20).flatmap(lambda z: st.sampled_from([z, -z])),
    d=st.floats(-2, 2),
    curvature=st.floats(-0.1, 0.1),
)
def test_single_transform(a, reach, d, curvature):
    law = matrix(a, reach * RAYLEIGH, d)
    # The chirp must be sampled over the beam: less than 2 Rayleigh ranges' worth of curvature.
    assume(abs(a / law.b + curvature) * RAYLEIGH < 1.5)
    assert error(travel_single(start(curvature), law), law, curvature) < TOLERANCE


def test_an_image_is_exact_and_inverted():
    light = travel_scaled(start(0.2), TravelLaw(-2.0, 0.0, 0.3, -0.5))
    before = start(0.2)
    assert light.pitch == 2 * before.pitch
    assert np.array_equal(light.samples[0], -before.samples[0, ::-1, ::-1] / 2)
    # C' = C + D K and the new curvature is C'/A'.
    assert light.curvature == pytest.approx((0.3 - 0.5 * 0.2) / -2.0)


@pytest.mark.parametrize("travel", [travel_scaled, travel_single])
def test_travel_keeps_the_power(travel):
    rng = np.random.default_rng(5)
    light = start()
    noise = rng.normal(size=(1, 256, 256)) + 1j * rng.normal(size=(1, 256, 256))
    light.samples[...] *= 1 + 0.1 * noise
    before = light.power
    after = travel(
        GridLight(light.samples, light.jones, light.pitch, 0.0, WAVELENGTH, periodic=True), matrix(0.7, 3.0, 1)
    )
    assert after.power == pytest.approx(before, rel=1e-13)  # 2^16 samples summed, a transform each way


def test_band_limits_take_power_away_and_say_how_much():
    light = start(window=17e-3)
    light.samples[...] *= np.exp(2j * np.pi * 6500 * light.x)[None, None, :]  # close to the highest frequency, 7529/m
    before = light.power
    after = travel_scaled(light, TravelLaw.free(3.0))
    assert after.discarded > 0.9
    assert 1 - after.power / before == pytest.approx(after.discarded, rel=1e-9)


def test_curvature_can_be_kept_apart_or_not():
    light = start(0.4)
    before = field(start(0.4))
    assert np.allclose(field(light.referred(-0.1)), before, atol=1e-12)
