import numpy as np
import pytest

from fastaxis.engines.azimuthal.resolving import Settings, extended, resolved

SETTINGS = Settings()


def fringes(r):
    return np.exp(1j * 300 * r**2)[np.newaxis]


def test_panels_are_split_until_the_function_has_settled():
    profile, rest = resolved(fringes, np.array([0.0, 1.0]), SETTINGS)
    r = np.linspace(0, 1, 301)
    assert rest == 0
    # Settled to 1e-13 of the peak in each of the last coefficients; a few of them add up.
    assert abs(profile(r) - fringes(r)).max() < 1e-12
    # Fringes narrow outwards, so do the panels.
    assert np.diff(profile.edges)[0] > np.diff(profile.edges)[-1]


def test_what_cannot_be_resolved_is_reported():
    _, rest = resolved(fringes, np.array([0.0, 1.0]), Settings(most=3))
    assert rest > 1e-3
    _, rest = resolved(lambda r: (r < 1 / 3)[np.newaxis].astype(complex), np.array([0.0, 1.0]), SETTINGS)
    assert rest > 1e-3


def test_a_bell_is_followed_until_it_is_dark():
    profile, _, cut = extended(lambda r: np.exp(-(r**2))[np.newaxis], np.array([0.0, 2.0]), SETTINGS)
    assert not cut
    assert np.exp(-(profile.end**2)) < SETTINGS.dark < np.exp(-((profile.end / 2) ** 2))


def test_a_tail_is_cut_at_the_furthest_radius():
    profile, rest, cut = extended(lambda r: (1 / (1 + r**2))[np.newaxis], np.array([0.0, 2.0]), SETTINGS)
    assert cut
    assert rest == 0
    assert profile.end == pytest.approx(2 * SETTINGS.furthest)


def test_a_tail_of_many_fringes_takes_no_more_than_its_panels():
    def tail(r):
        return (np.exp(1j * 50 * r**2) / (1 + r**4))[np.newaxis]

    profile, _, cut = extended(tail, np.array([0.0, 2.0]), Settings(tail=60))
    assert cut
    assert len(profile.edges) < 120


def test_a_second_function_too_small_to_matter_splits_nothing():
    def pair(r):
        return np.stack([np.ones_like(r), 1e-15 * np.cos(300 * r)])

    assert len(resolved(pair, np.array([0.0, 1.0]), SETTINGS)[0].edges) == 2
