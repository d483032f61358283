"""Products in pieces are the products."""

import numpy as np
import pytest

from fastaxis.engines.azimuthal import products
from fastaxis.engines.azimuthal.products import multiplied, product, transformed, weighted

RNG = np.random.default_rng(7)


def numbers(*shape):
    return RNG.normal(size=shape) + 1j * RNG.normal(size=shape)


@pytest.mark.parametrize("left", [(3, 5), (70, 5), (1, 5), (2, 40, 5)])
@pytest.mark.parametrize("right", [(5, 4), (5, 90), (5, 1), (2, 5, 33)])
def test_pieces_are_the_product(monkeypatch, left, right):
    monkeypatch.setattr(products, "PRODUCT", 300)
    monkeypatch.setattr(products, "VECTOR", 40)
    one, other = numbers(*left), numbers(*right)
    assert product(one, other) == pytest.approx(one @ other, rel=1e-13, abs=1e-13)
    assert product(one.real, other.real) == pytest.approx(one.real @ other.real, rel=1e-13, abs=1e-13)


def test_no_piece_is_larger_than_the_library_does_alone(monkeypatch):
    seen = []
    matmul = np.matmul

    def watched(left, right, out):
        seen.append(left.shape[-2] * left.shape[-1] * right.shape[-1])
        matmul(left, right, out=out)

    monkeypatch.setattr(products.np, "matmul", watched)
    for shape in ((100, 30, 4000), (4000, 30, 100)):
        multiplied(np.ones(shape[:2]), np.ones(shape[1:]), np.empty((shape[0], shape[2])))
    assert max(seen) <= products.PRODUCT
    assert sum(seen) == 2 * 100 * 30 * 4000


def test_complex_values_times_a_real_matrix():
    values, matrix = numbers(2, 3, 6), RNG.normal(size=(6, 5))
    assert transformed(values, matrix) == pytest.approx(values @ matrix, rel=1e-13, abs=1e-13)


def test_combinations_of_pictures():
    matrix, values = numbers(4, 2), numbers(2, 3, 5)
    assert weighted(matrix, values) == pytest.approx(np.tensordot(matrix, values, axes=1), rel=1e-13, abs=1e-13)
