"""Parts of panels: enough for the fringes of each output radius, alike where they can be."""

import numpy as np
import pytest

from fastaxis.engines.azimuthal.cutting import Cutting
from fastaxis.engines.azimuthal.panels import ORDER

EDGES = np.array([0.0, 0.5, 1.0, 1.5, 1.8])
RADII = np.linspace(0.0, 3.0, 301)


@pytest.mark.parametrize("magnification", [0.0, 0.3, 2.0])
def test_no_part_has_more_fringes_than_allowed(magnification):
    cutting = Cutting(EDGES, magnification, 300.0, 40.0)
    phases, parts = cutting.phases(RADII), cutting.parts(RADII)
    # A border of a stage is rounded.
    assert (phases / parts)[parts > 1].max() <= 40.0 * (1 + 1e-12)
    assert phases[parts == 1].max(initial=0.0) <= 16.0 * (1 + 1e-12)


def test_radii_of_a_stage_share_their_nodes():
    cutting = Cutting(EDGES, 0.3, 300.0, 40.0)
    stages, parts = cutting.stages(RADII), cutting.parts(RADII)
    assert len(np.unique(stages)) > 2
    for stage in np.unique(stages):
        assert (np.ptp(parts[stages == stage], axis=0) == 0).all()


def test_neighbours_of_one_width_are_cut_alike():
    parts = Cutting(EDGES, 1.0, 300.0, 40.0).parts(np.array([0.0, 3.0]))
    assert (parts[:, :3] == parts[:, :1]).all()
    assert (parts[:, 3] < parts[:, 0]).all()


def test_borders_of_the_parts():
    cutting = Cutting(np.array([0.0, 1.0, 3.0]), 1.0, 1.0, 40.0)
    assert cutting.borders(np.array([2, 4])) == pytest.approx([0, 0.5, 1, 1.5, 2, 2.5, 3], abs=1e-15)


def test_a_soft_end_takes_four_parts():
    parts = Cutting(EDGES, 0.0, 1.0, 40.0, 1.6, 0.08).parts(np.array(0.1))
    assert list(parts) == [1, 1, 1, 4]


def test_the_hardest_places_come_before_another_stage():
    """Up to there a part has more and more fringes; behind, the panels are cut more often."""
    cutting = Cutting(EDGES, 0.3, 300.0, 40.0)
    load = cutting.phases(RADII) / cutting.parts(RADII)
    values = np.ones((1, len(EDGES) - 1, ORDER), dtype=complex)
    panels = load.max(axis=0)
    for place in cutting.hardest(RADII, values)[::3]:
        assert (load[place] > 0.99 * panels).any()


def test_narrow_panels_carry_a_wide_soft_end_as_they_are():
    parts = Cutting(EDGES, 0.0, 1.0, 40.0, 0.4, 0.5).parts(np.array(0.1))
    assert list(parts) == [1, 1, 1, 1]
