"""Ellipses over a picture."""

import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.analysis import ellipse_map
from fastaxis.light.states import A, D, H, L, R, State, V
from fastaxis.units import deg


def row_of(*states, power=1.0):
    return (np.array([state.stokes for state in states]).T * power)[:, None, :]


def test_the_six_states():
    found = ellipse_map(row_of(H, V, D, A, R, L))
    np.testing.assert_allclose(found.azimuth[0, :4], np.array([0, 90, 45, -45]) * deg, atol=1e-15)
    assert np.isnan(found.azimuth[0, 4:]).all()
    np.testing.assert_allclose(found.ellipticity[0], np.array([0, 0, 0, 0, 45, -45]) * deg, atol=1e-15)
    assert found.hand.tolist() == [[0, 0, 0, 0, 1, -1]]


@given(azimuth=st.floats(-1.5, 1.5), ellipticity=st.floats(-0.78, 0.78))
@settings(max_examples=50, deadline=None)
def test_angles_come_back_in_their_quadrant(azimuth, ellipticity):
    found = ellipse_map(row_of(State(azimuth, ellipticity)))
    # Near the poles the azimuth rests on a small vector: roundings over cos(2 * 0.78) = 0.011.
    np.testing.assert_allclose((found.azimuth.item(), found.ellipticity.item()), (azimuth, ellipticity), atol=1e-13)
    assert found.hand.item() == (0 if abs(ellipticity) <= 0.1 * deg else np.sign(ellipticity))


def test_dark_pixels_are_masked():
    found = ellipse_map(np.concatenate([row_of(R), row_of(R, power=1e-4)], axis=2))
    assert found.lit.tolist() == [[True, False]]
    assert np.isnan(found.ellipticity[0, 1])
    assert np.isnan(found.degree[0, 1])
    assert found.hand[0, 1] == 0


def test_darkness_is_masked_everywhere():
    assert not ellipse_map(np.zeros((4, 2, 2))).lit.any()


def test_partly_polarized_light_keeps_its_ellipse_and_shows_its_degree():
    half = row_of(State(0.3, 0.2)) * np.array([1, 0.5, 0.5, 0.5])[:, None, None]
    found = ellipse_map(half)
    np.testing.assert_allclose(found.degree, 0.5, atol=1e-15)
    np.testing.assert_allclose((found.azimuth.item(), found.ellipticity.item()), (0.3, 0.2), atol=1e-15)
