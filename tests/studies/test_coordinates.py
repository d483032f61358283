"""A law is, at every place, linear in its coordinates; what is not belongs to its frame."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.laws import Amplitude, AxisLaw, CircularLaw, ScalarLaw, TravelLaw
from fastaxis.maths import NUMBERS, Pattern
from fastaxis.studies.coordinates import coordinates
from fastaxis.studies.spanning import spanning

angles = st.floats(-7, 7)
shares = st.floats(0, 1)
amplitudes = st.builds(Amplitude, shares, angles)
PHI, X, Y = 0.7, np.array([0.3e-3]), np.array([-0.2e-3])


def wave(x, y):
    return 1e3 * x + 2e3 * y**2 / 1e-3


PATTERN = Pattern(wave)
shifted = st.floats(-3, 3).map(lambda shift: PATTERN + shift)
leaking = st.builds(Amplitude, shares, shifted)

LAWS = {
    "plate": st.builds(AxisLaw, amplitudes, amplitudes, angles),
    "q-plate": st.builds(AxisLaw, amplitudes, amplitudes, angles, st.just(0.5), st.just((1e-4, 0.0))),
    "axis pattern": st.builds(AxisLaw, amplitudes, amplitudes, shifted),
    "phase patterns": st.builds(AxisLaw, leaking, leaking, angles, st.just(1.0)),
    "phase and axis patterns": st.builds(AxisLaw, leaking, amplitudes, shifted),
    "rotator": st.builds(CircularLaw, amplitudes, amplitudes),
    "mask": st.builds(ScalarLaw, leaking),
    "loss": st.builds(ScalarLaw, amplitudes, st.just(2)),
}


def matrix(law):
    if isinstance(law, ScalarLaw):
        return np.ravel(law.transmission.value(NUMBERS, X, Y))
    return np.array([np.ravel(entry)[0] for row in law.linear(NUMBERS, PHI, X, Y) for entry in row])


@pytest.mark.parametrize("kind", LAWS)
@settings(max_examples=20, deadline=None)
@given(data=st.data())
def test_matrices_follow_their_coordinates(kind, data):
    """The law held out is combined of the others with the coefficients of its coordinates."""
    laws = data.draw(st.lists(LAWS[kind], min_size=7, max_size=7))
    frames, vectors = zip(*(coordinates(law) for law in laws), strict=True)
    assert all(frame == frames[0] for frame in frames)
    span = spanning(np.array(vectors))
    nodes = np.array([matrix(laws[index]) for index in span.nodes])
    # A few roundings, and directions left out as noise, of 2e-14 times the largest row.
    np.testing.assert_allclose(span.coefficients @ nodes, np.array([matrix(law) for law in laws]), atol=2e-13)


BASE = AxisLaw(Amplitude(1.0, -1.0), Amplitude(1.0, PATTERN), 0.2, 0.5, (1e-4, 0.0))


@pytest.mark.parametrize(
    "other",
    [
        replace(BASE, order=1.0),
        replace(BASE, centre=(2e-4, 0.0)),
        replace(BASE, across=Amplitude(1.0, PATTERN * 2)),
        replace(BASE, across=Amplitude(1.0, PATTERN.mirrored())),
        replace(BASE, across=Amplitude(PATTERN, 0.0)),
        replace(BASE, across=Amplitude(1.0, Pattern(lambda x, y: wave(x, y)))),
        replace(BASE, angle=PATTERN),
        ScalarLaw(),
    ],
)
def test_other_frames_are_told_apart(other):
    assert coordinates(other)[0] != coordinates(BASE)[0]


def test_power_patterns_that_are_shifted_are_not_linear():
    one, other = (ScalarLaw(Amplitude(PATTERN + shift)) for shift in (0.1, 0.2))
    assert coordinates(one)[0] != coordinates(other)[0]


@pytest.mark.parametrize(
    ("one", "other"),
    [
        (TravelLaw.lens(0.1), TravelLaw.lens(0.2)),
        (ScalarLaw(vergence=1.0), ScalarLaw(vergence=2.0)),
        (ScalarLaw(tilt=(0.0, 1e-3)), ScalarLaw()),
        (ScalarLaw(charge=1), ScalarLaw(charge=2)),
    ],
)
def test_what_moves_light_is_part_of_the_frame(one, other):
    assert coordinates(one)[0] == coordinates(one)[0]
    assert coordinates(one)[0] != coordinates(other)[0]
