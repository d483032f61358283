"""Turning rate and sense of lobes against the analyzer."""

import math
from types import SimpleNamespace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.analysis import turning, turning_rate
from fastaxis.errors import ParameterError
from fastaxis.units import deg


def exposure(plane, angles, stokes):
    """Linear analyzers in front of given Stokes images."""
    weights = np.array([(0.5, np.cos(2 * a) / 2, np.sin(2 * a) / 2, 0.0) for a in angles])
    shots = SimpleNamespace(
        weights=weights,
        labels=[f"{a}" for a in angles],
        x=plane.x,
        y=plane.y,
        frame=lambda k: np.tensordot(weights[k], stokes, axes=1),
    )
    shots.upright = shots
    return shots


def vector_beam(plane, index, start=0.0):
    """Linear light whose axis turns ``index`` times about the centre, on a ring."""
    ring, twice = plane.r**2 * np.exp(-2 * plane.r**2), 2 * (index * plane.phi + start)
    return np.stack([ring, ring * np.cos(twice), ring * np.sin(twice), 0 * ring])


@pytest.mark.parametrize(
    ("index", "rate"),
    [
        (1, 1.0),  # radial: the lobes stand along the analyzer
        (-1, -1.0),  # a half-wave plate left in behind: they turn against it
        (2, 0.5),
        (-2, -0.5),
        (0.5, 2.0),
    ],
)
def test_lobes_turn_by_one_over_the_index(plane, index, rate):
    found = turning(exposure(plane, np.arange(0, 180, 15) * deg, vector_beam(plane, index)))
    assert found.rate == pytest.approx(rate, abs=1e-5)  # angles are read to 1e-6, over a range of 3 rad
    assert found.lobes == abs(2 * index)
    assert found.scatter < 1e-5


def test_the_order_of_the_settings_does_not_matter(plane):
    found = turning(exposure(plane, np.array([40, 0, 20, 60]) * deg, vector_beam(plane, 1)))
    assert found.rate == pytest.approx(1, abs=1e-5)


def test_elliptical_settings_are_left_out(plane):
    shots = exposure(plane, np.array([0, 20, 40, 0]) * deg, vector_beam(plane, 1))
    shots.weights[3] = (0.5, 0.0, 0.0, 0.5)
    assert turning(shots).rate == pytest.approx(1, abs=1e-5)


@given(
    count=st.integers(1, 8),
    share=st.floats(-0.4, 0.4),
    step=st.floats(0.01, 0.3),
    offset=st.floats(-3, 3),
)
@settings(max_examples=50, deadline=None)
def test_any_rate_is_recovered_from_angles_known_up_to_a_spacing(count, share, step, offset):
    spacing = 2 * math.pi / count
    knob = np.arange(7) * step
    rate = share * spacing / step
    found = turning_rate(knob, (offset + rate * knob) % spacing, count)
    # Angles of order 1 over a knob range of at least 0.06: roundings enlarged by a few hundred.
    assert found.rate == pytest.approx(rate, abs=1e-12)


def test_lobes_that_stand_still_have_rate_zero(plane):
    ring = plane.X**2 * np.exp(-2 * plane.r**2)
    still = np.stack([ring, 0 * ring, 0 * ring, 0 * ring])
    assert turning(exposure(plane, np.array([0, 20, 40]) * deg, still)).rate == pytest.approx(0, abs=1e-12)


def test_steps_of_half_a_spacing_are_refused():
    with pytest.raises(
        ParameterError, match=r"a step of 90 deg; lobes 180 deg apart show their sense in steps well below"
    ):
        turning_rate([0, 90 * deg, 180 * deg], [0, 90 * deg, 180 * deg], 2)


def test_a_knob_that_does_not_turn_is_refused():
    with pytest.raises(ParameterError, match="a rate needs two different angles of the knob"):
        turning_rate([0.1, 0.1], [0, 0], 2)


def test_two_linear_settings_are_too_few(plane):
    with pytest.raises(
        ParameterError, match=r"2 linear settings among 2; a turning rate needs three.*fix: train.expose"
    ):
        turning(exposure(plane, [0.0, 0.5], vector_beam(plane, 1)))


def test_frames_without_lobes_are_refused(plane):
    round_beam = np.exp(-2 * plane.r**2)
    flat = np.stack([round_beam, 0 * round_beam, 0 * round_beam, 0 * round_beam])
    with pytest.raises(
        ParameterError, match="frames with 0 lobes; all frames of a turning pattern have the same number"
    ):
        turning(exposure(plane, [0.0, 0.5, 1.0], flat))
