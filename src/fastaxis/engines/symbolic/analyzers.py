"""What passes an analyzer setting: a linear analyzer at an angle, a state, or a camera setting."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.field import Pair
from fastaxis.engines.symbolic.ring import ExactMaths, Poly
from fastaxis.errors import SymbolError
from fastaxis.laws import ScalarLaw
from fastaxis.light import State

__all__ = ["behind"]


def behind(setting: Any, pair: Pair, maths: ExactMaths) -> tuple[Fraction, tuple[Poly, ...]]:
    """(scale, amplitudes): the frame is scale times the sum of |amplitude|^2."""
    left, right = pair
    if isinstance(setting, int | float | sp.Expr):
        # <linear at t| = (exp(it) <L| + exp(-it) <R|)/sqrt 2.
        return Fraction(1, 2), (maths.phasor(setting) * left + maths.phasor(-setting) * right,)
    state = setting if isinstance(setting, State) else getattr(setting, "state", None)
    if isinstance(state, State):
        return _state(state, pair, maths)
    laws = getattr(setting, "laws", None)
    if laws is None:
        raise SymbolError(
            "a setting is an angle, a state or an analyzer",
            got=f"the setting {setting!r}",
            fix='form.frame(sympy.Symbol("theta"))',
        )
    for law in laws:
        left, right = _through(law, (left, right), maths)
    return Fraction(1), (left, right)


def _state(state: State, pair: Pair, maths: ExactMaths) -> tuple[Fraction, tuple[Poly, ...]]:
    own = state.circular(maths)
    doubled = tuple(part * maths.root(2) for part in own)
    scale = Fraction(1)
    if sum(map(len, doubled)) < sum(map(len, own)):
        own, scale = (doubled[0], doubled[1]), Fraction(1, 2)
    return scale, (own[0].conj() * pair[0] + own[1].conj() * pair[1],)


def _through(law: Any, pair: Pair, maths: ExactMaths) -> Pair:
    if isinstance(law, ScalarLaw):
        factor = law.transmission.value(maths)
        return factor * pair[0], factor * pair[1]
    (a, b), (c, d) = law.circular(maths)
    return a * pair[0] + b * pair[1], c * pair[0] + d * pair[1]
