"""How long an expression is to read, and products of a sine and a cosine as the sine of the double."""

from __future__ import annotations

from typing import Any

import sympy as sp

__all__ = ["content_out", "doubled", "length", "one_number"]


def length(expression: Any) -> int:
    """Operations and letters to read; exponentials and i count more than cosines."""
    digits = sum(max(0, len(str(n.p)) + len(str(n.q)) - 3) for n in expression.atoms(sp.Rational))
    operations, imaginary = int(sp.count_ops(expression)), int(expression.count(sp.I))
    return operations + digits + 6 * len(expression.atoms(sp.exp)) + 2 * imaginary


def doubled(product: Any) -> Any:
    """Equal powers of sin x and cos x as one of sin(2x)/2."""
    powers = product.as_powers_dict()
    for base, power in list(powers.items()):
        twin = sp.cos(base.args[0]) if isinstance(base, sp.sin) else None
        if twin is not None and powers.get(twin) == power:
            product = product / (base * twin) ** power * (sp.sin(2 * base.args[0]) / 2) ** power
    return product


def content_out(expression: Any) -> Any:
    """A sum without the rational number its terms share, times that number."""
    content, rest = expression.as_content_primitive()
    return sp.Mul(content, rest, evaluate=False) if isinstance(rest, sp.Add) and content != 1 else expression


def one_number(product: Any) -> Any:
    """The numbers of a product multiplied out, sums of square roots among them."""
    numbers = [factor for factor in sp.Mul.make_args(product) if factor.is_number and not factor.has(sp.exp)]
    if not any(isinstance(number, sp.Add) for number in numbers) or len(numbers) < 2:
        return product
    rest = [factor for factor in sp.Mul.make_args(product) if factor not in numbers]
    return sp.Mul(sp.expand(sp.Mul(*numbers)), *rest)
