"""What is foreseen of the light behind a section."""

from dataclasses import replace

import numpy as np
import pytest

from fastaxis.elements import FreeSpace, Obstacle, QPlate
from fastaxis.engines.azimuthal.foreseeing import foreseen, waist_behind
from fastaxis.light import Gaussian, L
from fastaxis.units import mm, nm

W = 0.4 * mm


@pytest.fixture
def light(arrive):
    """A ring of charge 1 with a section still to go."""
    return arrive(Gaussian(waist=W), QPlate(q=0.5), FreeSpace(0.7), state=L).harmonics


def test_the_waist_is_that_of_a_beam_that_spreads_twice_for_a_charge_of_one(light):
    waist = waist_behind(light)
    # The radius is that of the first node by which the share is reached: of 64, a few per cent.
    assert waist.radius == pytest.approx(np.hypot(W, 2 * 0.7 * 632.8 * nm / np.pi / W), rel=0.05)
    assert waist.reach > waist.radius


@pytest.mark.parametrize("share", [0.3, 1.0, 4.0])
def test_panels_end_where_the_light_is_asked_for(light, share):
    waist = waist_behind(light)
    edges = foreseen(light, waist, waist.curvature, share * waist.reach, 640)
    assert (edges[0], edges[-1]) == (0.0, share * waist.reach)
    assert (np.diff(edges) > 0).all()


def test_no_more_panels_than_allowed(light):
    waist = waist_behind(light)
    assert len(foreseen(light, waist, waist.curvature, 0.9 * waist.reach, 3)) == 4


def test_what_is_followed_into_the_dark_widens_no_panels(light):
    nodes, end = light.profile.nodes, light.profile.end
    waist = waist_behind(light)
    lit = waist.reach / waist.radius * nodes[np.searchsorted(_share(light), 1 - np.exp(-2))]
    assert 0.85 * end < lit < 0.95 * end
    assert abs(light.profile(np.array([lit]))).max() >= 1e-13 * light.profile.peak


def _share(light):
    density = (abs(light.profile.flat()) ** 2).sum(axis=0) * light.profile.weights * light.profile.nodes
    return np.cumsum(density) / density.sum()


def test_a_soft_end_is_no_rim(arrive):
    cut = arrive(Gaussian(waist=W), QPlate(q=0.5), FreeSpace(0.2), QPlate(q=0.5), FreeSpace(0.2), state=L).harmonics
    waist = waist_behind(cut)
    assert cut.taper
    soft, hard = (
        foreseen(light, waist, waist.curvature, waist.reach, 640) for light in (cut, replace(cut, taper=None))
    )
    assert 2 * len(soft) < len(hard)


def test_the_rim_of_an_obstacle_is_one_though_the_end_is_soft(arrive):
    parts = [QPlate(q=0.5), FreeSpace(0.2), Obstacle(radius=0.3 * mm), FreeSpace(0.02)]
    behind = arrive(Gaussian(waist=W), *parts, state=L).harmonics
    assert behind.taper
    waist = waist_behind(behind)
    edges = foreseen(behind, waist, waist.curvature, 1 * mm, 640)
    # Waves of k rim/b along the radius, 2.5 fringes a panel.
    fringes = 1 * mm * 0.3 * mm / 0.02 / (632.8 * nm)
    assert len(edges) - 1 > fringes / 2.6
