"""A few rows span a table, with coefficients that stay small."""

import numpy as np
import pytest

from fastaxis.studies.spanning import compressed, products, spanning, squares


def circle(angles, degree):
    return np.exp(2j * np.outer(angles, np.arange(-degree, degree + 1)))


@pytest.mark.parametrize("degree", [1, 2, 4])
@pytest.mark.parametrize("span", [np.pi, 0.3, 1e-3])
def test_turns_are_spanned_by_twice_their_degree_and_one(degree, span):
    table = circle(0.2 + np.linspace(0, span, 50), degree)
    found = spanning(table)
    assert found.rank <= 2 * degree + 1
    assert found.rank == 2 * degree + 1 or span < 1  # close angles need fewer: what they add is below rounding
    np.testing.assert_allclose(found.coefficients @ table[found.nodes], table, atol=1e-13)
    # Pivoting takes the farthest row each time; the worst growth known in practice is a few.
    assert abs(found.coefficients).max() < 4
    np.testing.assert_array_equal(found.coefficients[found.nodes], np.eye(found.rank))


def test_a_table_of_zeros_is_spanned_by_one_row():
    found = spanning(np.zeros((4, 3), dtype=complex))
    assert found.rank == 1
    np.testing.assert_array_equal(found.coefficients @ np.zeros((1, 3)), np.zeros((4, 3)))


def test_equal_rows_are_one():
    assert spanning(np.ones((5, 2), dtype=complex)).rank == 1


def test_real_tables_have_real_coefficients():
    assert spanning(np.eye(3)).coefficients.dtype == float


def test_squares_hold_every_power():
    rng = np.random.default_rng(3)
    table = rng.normal(size=(6, 3)) + 1j * rng.normal(size=(6, 3))
    fields = rng.normal(size=(3, 2)) + 1j * rng.normal(size=(3, 2))
    powers = (abs(table @ fields) ** 2).sum(axis=1)
    assert squares(table).shape == (6, 9)
    fitted, *_ = np.linalg.lstsq(np.concatenate([squares(table)] * 2), np.tile(powers, 2), rcond=None)
    np.testing.assert_allclose(squares(table) @ fitted, powers, rtol=1e-12)
    # More rows than products: the powers of new rows follow from the nine numbers that a Hermitian form has.
    gram = fields @ fields.conj().T
    first, second = np.triu_indices(3)
    upper = gram.T[first, second]
    form = np.concatenate([np.where(first == second, 1, 2) * upper.real, -2 * upper.imag[first < second]])
    np.testing.assert_allclose(squares(table) @ form, powers, rtol=1e-12)


def test_products_and_compression_keep_the_relations():
    one, other = circle(np.linspace(0, 3, 20), 1), circle(np.linspace(0, 2, 20), 1)
    both = products(one, other)
    assert both.shape == (20, 9)
    small = compressed(np.concatenate([both, both], axis=1))
    assert small.shape == (20, 9)
    found = spanning(small)
    np.testing.assert_allclose(found.coefficients @ both[found.nodes], both, atol=1e-12)
