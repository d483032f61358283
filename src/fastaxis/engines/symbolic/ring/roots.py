"""Roots of unity and square roots of whole numbers, in a basis that decides equality.

A root of unity is exp(2 pi i e / TURN) with e a whole number. The products, over the primes p dividing its order,
of zeta_p**j with j < p - 1 and of the higher digits zeta_(p**k)**j with j < p form a basis of the field of all of
them over the rationals; the only rule needed is zeta_p**(p-1) = -(1 + zeta_p + ... + zeta_p**(p-2)).

W. Bosma, "Canonical bases for cyclotomic fields", AAECC 1, 125 (1990).
"""

from __future__ import annotations

from fractions import Fraction
from functools import lru_cache

import sympy as sp

__all__ = ["SURD_PRIMES", "TURN", "canonical", "gauss_root", "split_square"]

_POWERS = {2: 12, 3: 5, 5: 5, 7: 2, 11: 1, 13: 1, 17: 1, 19: 1, 23: 1, 29: 1, 31: 1}
TURN = 1
for _prime, _power in _POWERS.items():
    TURN *= _prime**_power

SURD_PRIMES = (2, 3, 5)  # their square roots are written in roots of unity; larger ones are generators

Combination = tuple[tuple[int, int], ...]


@lru_cache(maxsize=65536)
def canonical(exponent: int) -> Combination:
    """exp(2 pi i exponent/TURN) as a sum of (whole coefficient, exponent) over basis elements.

    >>> canonical(TURN // 2)
    ((-1, 0),)
    """
    parts: Combination = ((1, exponent % TURN),)
    for prime, power in _POWERS.items():
        parts = tuple(piece for part in parts for piece in _leading_digit(part, prime, prime**power))
    return parts


def _leading_digit(part: tuple[int, int], prime: int, order: int) -> Combination:
    """Rewrites the digit zeta_p**(p-1) of one prime."""
    coefficient, exponent = part
    # The p-part of e/TURN is n/order with n = e * (TURN/order)^-1 modulo order.
    digits = exponent * pow(TURN // order, -1, order) % order
    if digits * prime // order != prime - 1:
        return (part,)
    step = TURN // prime
    # zeta_p is exp(2 pi i step/TURN); its p-part has the leading digit 1 only after this scaling.
    unit = pow(step * pow(TURN // order, -1, order) % order * prime // order, -1, prime)
    base = exponent - step * unit * (prime - 1)
    return tuple((-coefficient, (base + step * unit * j) % TURN) for j in range(prime - 1))


@lru_cache(maxsize=1024)
def gauss_root(prime: int) -> Combination:
    """sqrt(prime) as a sum of roots of unity (C. F. Gauss 1811)."""
    eighth = TURN // 8
    if prime == 2:
        return ((1, eighth), (1, -eighth % TURN))
    turn = 0 if prime % 4 == 1 else -TURN // 4
    step = TURN // prime
    return tuple((int(sp.jacobi_symbol(a, prime)), (a * step + turn) % TURN) for a in range(1, prime))


@lru_cache(maxsize=4096)
def split_square(value: Fraction) -> tuple[Fraction, tuple[int, ...]]:
    """Rational c and primes p1, p2, ... with sqrt(value) = c sqrt(p1) sqrt(p2) ...

    >>> split_square(Fraction(3, 8))
    (Fraction(1, 4), (2, 3))
    """
    outside, primes = Fraction(1, value.denominator), []
    for prime, power in sp.factorint(value.numerator * value.denominator).items():
        outside *= int(prime) ** (int(power) // 2)
        if power % 2:
            primes.append(int(prime))
    return outside, tuple(sorted(primes))
