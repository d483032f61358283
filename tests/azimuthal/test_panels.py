import numpy as np
import pytest

from fastaxis.engines.azimuthal.panels import ORDER, Profile, nodes_on, sampled

EDGES = np.array([0.0, 0.4, 1.5, 2.0])


@pytest.fixture
def polynomial():
    """A polynomial of the highest degree that a panel holds, and a complex second function."""
    return sampled(lambda r: np.stack([(r / 2) ** (ORDER - 1), np.exp(1j * r)]), EDGES)


def test_values_between_the_nodes(polynomial):
    r = np.linspace(0, 2, 57)
    # 32 coefficients, each off by up to 10 eps, which add up at the ends of a panel.
    assert np.allclose(polynomial(r), [(r / 2) ** (ORDER - 1), np.exp(1j * r)], atol=7e-14, rtol=0)


def test_dark_outside(polynomial):
    assert np.all(polynomial(np.array([2.1, 5.0])) == 0)
    assert np.all(polynomial.clipped(0.5, 1.0)(np.array([0.3, 1.2])) == 0)


def test_power_is_the_integral_over_the_plane(polynomial):
    # 2 pi int (r/2)^62 r dr on [0, 2] = 2 pi 4/64, and pi 2^2 for the pure phase.
    assert polynomial.powers() == pytest.approx([np.pi / 8, 4 * np.pi], rel=1e-14)


@pytest.mark.parametrize("counts", [[1, 1, 1], [3, 3, 2], [1, 5, 4]])
def test_refining_changes_no_values_and_no_integral(polynomial, counts):
    nodes, weights, values = polynomial.refined(np.array(counts))
    assert len(nodes) == sum(counts) * ORDER
    assert np.all(np.diff(nodes) > 0)
    assert np.allclose(values, polynomial(nodes), atol=7e-14, rtol=0)
    assert weights.sum() == pytest.approx(2.0, rel=1e-14)


def test_a_cut_falls_exactly_on_its_radius(polynomial):
    part = polynomial.clipped(0.3, 1.1)
    assert (part.start, part.end) == (0.3, 1.1)
    assert part.powers()[1] == pytest.approx(np.pi * (1.1**2 - 0.3**2), rel=1e-14)
    assert np.all(polynomial.clipped(3.0, 4.0).powers() == 0)


def test_clipping_beyond_the_ends_clips_nothing(polynomial):
    whole = polynomial.clipped(polynomial.start - 1.0, polynomial.end + 1.0)
    assert np.array_equal(whole.edges, polynomial.edges)


def test_stretching_and_combining(polynomial):
    r = np.linspace(0, 3.9, 11)
    assert np.allclose(polynomial.stretched(2.0)(r), polynomial(r / 2), atol=1e-14)
    mixed = polynomial.combined(np.array([[1, 2j]]))
    assert np.allclose(mixed(r / 2), polynomial(r / 2)[0] + 2j * polynomial(r / 2)[1], atol=1e-13)


def test_degree_says_how_much_of_a_panel_is_used():
    assert sampled(lambda r: (r**3)[np.newaxis], EDGES).degree == 3
    assert Profile(EDGES, np.zeros((1, 3, ORDER), dtype=complex)).degree == 1


def test_nodes_are_inside_their_panels():
    nodes = nodes_on(EDGES).reshape(3, ORDER)
    assert np.all((nodes > EDGES[:-1, np.newaxis]) & (nodes < EDGES[1:, np.newaxis]))


def test_frequency_of_a_plane_wave():
    c = 9.0
    wave = sampled(lambda r: np.exp(1j * c * r)[np.newaxis], np.array([0.0, 2.0]))
    # The inverse of an asymptotic bound, good to a fifth where 10 to 30 coefficients count.
    assert wave.highest_frequency == pytest.approx(c, rel=0.25)
