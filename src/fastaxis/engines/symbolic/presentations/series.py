"""A form for small errors: the terms up to a total order in some symbols."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import combinations_with_replacement
from math import factorial
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.presentations.compact import compact
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.slopes import derivative, set_to_zero

__all__ = ["series", "series_terms"]


def series(poly: Poly, small: Sequence[Any], order: int = 2) -> Any:
    """Taylor sum in the small symbols about zero, to a total order."""
    return sp.Add(*series_terms(poly, small, order).values())


def series_terms(poly: Poly, small: Sequence[Any], order: int) -> dict[tuple[Any, ...], Any]:
    """The non-zero terms of the sum by the symbols they are products of; () is the value without errors."""
    found: dict[tuple[Any, ...], Any] = {}
    slopes: dict[tuple[Any, ...], Poly] = {(): poly}
    for degree in range(order + 1):
        for product in combinations_with_replacement(small, degree):
            if product:
                slopes[product] = derivative(slopes[product[:-1]], product[-1])
            value = set_to_zero(slopes[product], small)
            if not value.is_zero():
                weight = sp.Mul(*(sp.Rational(1, factorial(product.count(s))) for s in set(product)))
                found[product] = compact(value) * sp.Mul(*product) * weight
    return found
