import numpy as np

from fastaxis.engines.azimuthal import table
from fastaxis.engines.azimuthal.panels import sampled
from fastaxis.engines.azimuthal.table import table_of
from fastaxis.engines.azimuthal.waves import Wave, pictures

PROFILE = sampled(lambda r: np.stack([np.exp(40j * r), np.exp(-(r**2))]), np.linspace(0.5, 3, 12))


def test_the_table_is_the_profile():
    r = np.random.default_rng(1).uniform(0.5, 3, (40, 7))
    expected = PROFILE(r.ravel()).reshape(2, 40, 7)
    # It stops refining at 2e-13 of the peak in the worst place of each cell.
    assert abs(table_of(PROFILE, 3.0)(r) - expected).max() < 5e-13


def test_dark_outside_the_profile_and_bounded_by_the_reach():
    ours = table_of(PROFILE, 2.0)
    assert ours.reach == 2.0
    assert np.all(ours(np.array([0.3, 2.5])) == 0)
    assert np.all(ours(np.array([0.5, 2.0])) != 0)
    assert np.all(table_of(PROFILE, 0.4)(np.array([0.1])) == 0)


def test_cells_are_halved_where_panels_have_more_fringes_than_foreseen(monkeypatch):
    """Begun with eight cells a panel; neighbours with as many are done together."""
    monkeypatch.setattr(table, "PHASE", 1e3)
    edges = np.array([0.5, 0.55, 1.5])
    ours = table.table_of(sampled(lambda r: np.exp(18j * r)[np.newaxis], edges), 1.5)
    assert list(ours.counts) == [64, 64]
    r = np.linspace(0.5, 1.5, 2001)
    assert abs(ours(r) - np.exp(18j * r)).max() < 5e-13


def test_borders_of_panels_are_read_from_either_side():
    ours = table_of(PROFILE, 3.0)
    for edge in PROFILE.edges:
        near = np.nextafter(edge, [0.5, 3.0])
        # The exponential turns by 40 times the rounding.
        assert abs(ours(near) - np.stack([np.exp(40j * near), np.exp(-(near**2))])).max() < 5e-13


def test_the_axis_of_a_picture_has_no_angle():
    ours = table_of(sampled(lambda r: np.exp(-(r**2))[np.newaxis], np.linspace(0, 1, 3)), 1.0)
    both = pictures(ours, [Wave(0, 0, 0, False, False), Wave(0, 0, 2, False, True)], np.zeros(1, dtype=complex))
    assert np.allclose(both[:, 0], [1, 0], atol=1e-12)
