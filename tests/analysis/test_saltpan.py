"""Saltpan, a full-Poincare beam: equal powers in LG00 of one circular state and LG01 of the other, at the camera.

Expected: index 1/2 at the centre, the L-line at w/sqrt2, and inside a radius a w the share 2 a^2/(1 + 2 a^2) of the sphere
(Beckley, Brown, Alonso, Opt. Express 18, 10777 (2010)).
"""

import numpy as np
import pytest

from fastaxis.analysis import ellipse_map, l_line_radius, polarization_index, sphere_wrapping
from fastaxis.light.stokes import stokes


def full_poincare(plane, charge=1, core=1):
    """R in the centre for core = +1, L for -1; the ring around in the other state."""
    envelope = np.exp(-(plane.r**2))
    ring = np.sqrt(2) * plane.r * np.exp(1j * charge * plane.phi) * envelope
    right, left = (envelope, ring) if core > 0 else (ring, envelope)
    # Ex = (E_L + E_R)/sqrt2, Ey = i (E_L - E_R)/sqrt2.
    return stokes(np.stack([left + right, 1j * (left - right)]) / np.sqrt(2))


def test_the_l_line_is_at_w_over_root_two(plane):
    assert l_line_radius(full_poincare(plane), **plane.axes) == pytest.approx(
        np.sqrt(0.5), abs=2e-4
    )  # (step w/60)^2 / 8 times S3''/S3' = 4.2/w


@pytest.mark.parametrize(("charge", "core", "index"), [(1, -1, 0.5), (-1, -1, -0.5), (1, 1, -0.5), (-1, 1, 0.5)])
def test_lemon_or_star_hangs_on_charge_and_core(plane, charge, core, index):
    # The receiver's L has positive helicity: a left core with l = +1 around is the lemon.
    assert polarization_index(full_poincare(plane, charge, core), **plane.axes, radius=1.0) == index


@pytest.mark.parametrize("a", [0.5, 1.0, 1.5])
def test_the_share_of_the_sphere_grows_as_the_stereographic_projection_says(plane, a):
    covered = abs(sphere_wrapping(full_poincare(plane), **plane.axes, radius=a))
    # Cells of w/15: chords against arcs and the circle taken as straight across a cell, each (1/15)^2 / (8 a^2) or less.
    assert covered == pytest.approx(2 * a**2 / (1 + 2 * a**2), rel=2 / (15**2 * 8 * a**2))


def test_the_sense_of_covering_changes_with_the_charge_and_with_the_naming(plane):
    one = sphere_wrapping(full_poincare(plane), **plane.axes, radius=1.5)
    assert sphere_wrapping(full_poincare(plane, charge=-1), **plane.axes, radius=1.5) == pytest.approx(-one, rel=1e-12)
    renamed = full_poincare(plane) * np.array([1, 1, 1, -1])[:, None, None]
    assert sphere_wrapping(renamed, **plane.axes, radius=1.5) == pytest.approx(-one, rel=1e-12)


def test_a_uniform_beam_covers_nothing(plane):
    ring = np.exp(-2 * plane.r**2)
    uniform = np.stack([ring, 0.6 * ring, 0 * ring, 0.8 * ring])
    assert sphere_wrapping(uniform, **plane.axes) == pytest.approx(0, abs=1e-12)


def test_hand_changes_across_the_l_line(plane):
    drawn = ellipse_map(full_poincare(plane))
    assert (drawn.hand[(plane.r < 0.65)] == 1).all()
    assert (drawn.hand[(plane.r > 0.75) & drawn.lit] == -1).all()
