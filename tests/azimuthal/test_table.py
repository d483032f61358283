import numpy as np

from fastaxis.engines.azimuthal.panels import sampled
from fastaxis.engines.azimuthal.table import table_of

PROFILE = sampled(lambda r: np.stack([np.exp(40j * r), np.exp(-(r**2))]), np.linspace(0.5, 3, 12))


def test_the_table_is_the_profile():
    r = np.random.default_rng(1).uniform(0.5, 3, (40, 7))
    expected = PROFILE(r.ravel()).reshape(2, 40, 7)
    # It stops refining at 2e-13 of the peak in the worst place of each cell.
    assert abs(table_of(PROFILE, 3.0)(r) - expected).max() < 5e-13


def test_dark_outside_the_profile_and_bounded_by_the_reach():
    table = table_of(PROFILE, 2.0)
    assert table.reach == 2.0
    assert np.all(table(np.array([0.3, 2.5])) == 0)
    assert np.all(table(np.array([0.5, 2.0])) != 0)
    assert np.all(table_of(PROFILE, 0.4)(np.array([0.1])) == 0)
