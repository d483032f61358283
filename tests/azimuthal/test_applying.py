"""Each law against its own 2x2 matrix, place by place."""

import numpy as np
import pytest

from fastaxis.engines.azimuthal.applying import TO_CIRCULAR, apply
from fastaxis.engines.azimuthal.harmonics import LEFT, RIGHT, Harmonics
from fastaxis.engines.azimuthal.panels import sampled
from fastaxis.engines.azimuthal.plane import AzimuthalField
from fastaxis.engines.azimuthal.resolving import Settings
from fastaxis.laws import Amplitude, Annulus, AxisLaw, CircularLaw, Disc, Flip, ScalarLaw, TravelLaw
from fastaxis.maths import NUMBERS
from fastaxis.plan import JonesStep

X, Y = np.linspace(-2, 2, 8), np.linspace(-1.7, 1.9, 7)
SETTINGS = Settings()


@pytest.fixture
def light():
    profile = sampled(lambda r: np.stack([np.exp(-(r**2)), 1j * r**3 * np.exp(-(r**2))]), np.linspace(0, 7, 7))
    return Harmonics(orders=((LEFT, 1), (RIGHT, -3)), profile=profile, curvature=0.0, wavenumber=2 * np.pi)


def values(light):
    return AzimuthalField(1.0, light).at(X, Y)


def pointwise(matrix, field):
    (a, b), (c, d) = matrix
    return np.stack([a * field[0] + b * field[1], c * field[0] + d * field[1]])


@pytest.mark.parametrize(
    "law",
    [
        AxisLaw(Amplitude(0.9, 0.4), Amplitude(0.7, -1.1), angle=0.37),
        AxisLaw(Amplitude(0.9, 0.4), Amplitude(0.7, -1.1), angle=0.37, order=0.5),
        AxisLaw(Amplitude(1.0, -1.2), Amplitude(1.0, 1.2), angle=-0.2, order=-1.5),
        CircularLaw(Amplitude(0.5, 0.3), Amplitude(0.9, -0.3)),
        JonesStep(((0.3 + 0.1j, 0.2j), (0.5, -0.4 + 0.2j))),
    ],
)
def test_polarizing_laws(light, law):
    phi = np.arctan2(Y[:, np.newaxis], X)
    expected = pointwise(law.linear(NUMBERS, phi=phi), values(light))
    # Table and panels are settled to 2e-13 of the peak.
    assert abs(values(apply(law, light, SETTINGS)) - expected).max() < 1e-12


def test_a_tuned_q_plate_sends_left_to_right_with_2q_more(light):
    half_wave = AxisLaw(Amplitude(1, -np.pi / 2), Amplitude(1, np.pi / 2), order=1)
    assert set(apply(half_wave, light, SETTINGS).orders) == {(RIGHT, 3), (LEFT, -5)}


def test_a_uniform_half_wave_plate_leaves_no_trace_of_the_old_hand(light):
    step = JonesStep.of(AxisLaw(Amplitude(1, -np.pi / 2), Amplitude(1, np.pi / 2), angle=0.3))
    assert set(apply(step, light, SETTINGS).orders) == {(RIGHT, 1), (LEFT, -3)}


def test_charge_and_amplitude(light):
    law = ScalarLaw(transmission=Amplitude(0.25, 0.8), charge=2)
    phi = np.arctan2(Y[:, np.newaxis], X)
    expected = 0.5 * np.exp(0.8j + 2j * phi) * values(light)
    assert abs(values(apply(law, light, SETTINGS)) - expected).max() < 1e-12


def test_a_lens_bends_the_front_only(light):
    law = ScalarLaw(vergence=0.3)
    expected = np.exp(-1j * np.pi * 0.3 * (X**2 + Y[:, np.newaxis] ** 2)) * values(light)
    assert abs(values(apply(law, light, SETTINGS)) - expected).max() < 1e-12


@pytest.mark.parametrize("stop", [Disc(1.3), Disc(1.3, opaque=True), Annulus(0.8, 1.9)])
def test_round_stops(light, stop):
    inside = stop.depth(X, Y[:, np.newaxis]) > 0
    stopped = apply(ScalarLaw(stop=stop), light, SETTINGS)
    assert abs(values(stopped) - inside * values(light)).max() < 1e-12


@pytest.mark.parametrize("axis", ["x", "y"])
def test_flips_move_places_only(light, axis):
    """The field seen at (x', y') is the old one at (-x', y')."""
    field = AzimuthalField(1.0, light)
    expected = field.at(-X, Y) if axis == "x" else field.at(X, -Y)
    assert abs(values(apply(Flip(axis), light, SETTINGS)) - expected).max() < 1e-12


def test_travel_waits(light):
    later = apply(TravelLaw.free(2.0), apply(TravelLaw.free(1.0), light, SETTINGS), SETTINGS)
    assert later.profile is light.profile
    assert later.section.b == 3.0


def test_basis():
    assert np.allclose(TO_CIRCULAR @ TO_CIRCULAR.conj().T, np.eye(2))
    assert np.allclose(TO_CIRCULAR @ (np.array([1, 1j]) / np.sqrt(2)), [1, 0])
