"""Index of singular points, L-lines."""

import math

import numpy as np
import pytest

from fastaxis.analysis import l_line_radius, polarization_index
from fastaxis.errors import ParameterError


def vector_beam(plane, index):
    ring, twice = np.exp(-2 * plane.r**2), 2 * index * plane.phi
    return np.stack([ring, ring * np.cos(twice), ring * np.sin(twice), 0 * ring])


@pytest.mark.parametrize("index", [-2, -1, -0.5, 0, 0.5, 1, 2])
def test_the_index_counts_the_turns_of_the_axis(plane, index):
    assert polarization_index(vector_beam(plane, index), **plane.axes, radius=1.0) == index


def test_a_circle_beside_the_point_has_none(plane):
    assert polarization_index(vector_beam(plane, 1), **plane.axes, radius=0.5, centre=(1.0, 1.0)) == 0


def test_a_circle_outside_the_picture_is_refused(plane):
    with pytest.raises(ParameterError, match=r"radius = 4 m, room for 2.66667 m; the circle .*radius=1333\*mm"):
        polarization_index(vector_beam(plane, 1), **plane.axes, radius=4.0)


def test_circular_light_has_no_axis_to_follow(plane):
    ring = np.exp(-2 * plane.r**2)
    circular = np.stack([ring, 0 * ring, 0 * ring, ring])
    with pytest.raises(ParameterError, match="the circle avoids places that are dark or circular"):
        polarization_index(circular, **plane.axes, radius=1.0)


def test_an_l_line_is_where_the_hand_changes(plane):
    s3 = (1 - plane.r**2 / 0.64) * np.exp(-2 * plane.r**2)
    stokes = np.stack([np.exp(-2 * plane.r**2), 0 * s3, 0 * s3, s3])
    # Cubic splines on w/15 and a straight line over w/60.
    assert l_line_radius(stokes, **plane.axes) == pytest.approx(0.8, abs=1e-4)


def test_light_of_one_hand_has_no_l_line(plane):
    ring = np.exp(-2 * plane.r**2)
    with pytest.raises(ParameterError, match="S3 keeps its sign; an L-line parts right-handed from left-handed"):
        l_line_radius(np.stack([ring, 0 * ring, 0 * ring, -ring]), **plane.axes)


def test_rotation_of_the_picture_keeps_the_index_and_mirroring_changes_its_sign(plane):
    lemon = vector_beam(plane, 0.5)
    turned = lemon[:, ::-1, ::-1]
    mirrored = lemon[:, :, ::-1]
    assert polarization_index(turned, **plane.axes, radius=1.0) == 0.5
    assert polarization_index(mirrored, **plane.axes, radius=1.0) == -0.5
    assert math.isclose(polarization_index(lemon, **plane.axes, radius=2.0), 0.5)
