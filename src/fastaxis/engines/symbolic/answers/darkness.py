"""For which angle is it dark? All branches, or a clear "never"."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.expressions import centred, written
from fastaxis.engines.symbolic.presentations import harmonics
from fastaxis.engines.symbolic.presentations.factors import factored
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.errors import SymbolError

__all__ = ["TURN_COUNT", "Branches", "dark_when"]

TURN_COUNT = sp.Symbol("n", integer=True)
"""Any whole number, in the branches of a solution."""


@dataclass(frozen=True)
class Branches:
    """Values of an angle that make an amplitude vanish.

    Parameters
    ----------
    angle : what was solved for.
    branches : expressions with n any whole number; none if there is no solution.
    conditions : for each branch, what must hold for it to be real (True if nothing).
    others : conditions without the angle that make it dark too, as expressions that must be zero.
    always : dark whatever the angle.
    """

    angle: Any
    branches: tuple[Any, ...] = ()
    conditions: tuple[Any, ...] = ()
    others: tuple[Any, ...] = ()
    always: bool = False

    def __bool__(self) -> bool:
        return self.always or bool(self.branches)

    def __str__(self) -> str:
        if self.always:
            return f"dark at every {self.angle}"
        text = [
            f"{self.angle} = {branch}" + ("" if condition == True else f" if {condition}")  # noqa: E712  # sympy's true
            for branch, condition in zip(self.branches, self.conditions, strict=True)
        ]
        text += [f"or {other} = 0 at every {self.angle}" for other in self.others]
        return "; ".join(text) + "; n any whole number" * bool(self.branches) if text else "no solution"


def dark_when(amplitudes: tuple[Poly, ...], angle: Any) -> Branches:
    """Where all amplitudes vanish together.

    Raises
    ------
    SymbolError : the condition is no simple one: several harmonics that do not factor.
    """
    solutions = [_vanishing(amplitude, angle) for amplitude in amplitudes if not amplitude.is_zero()]
    if not solutions:
        return Branches(angle, always=True)
    first, *rest = solutions
    for other in rest:
        first = _common(first, other)
    return first


def _vanishing(amplitude: Poly, angle: Any) -> Branches:
    factors = factored(amplitude)
    if not factors:
        factors = [(amplitude, 1)] if len(amplitude) > 1 else []
    branches: list[Any] = []
    conditions: list[Any] = []
    others: list[Any] = []
    for factor, _ in factors:
        real = written(centred(factor)[1])
        if not real.has(angle):
            if real.free_symbols:
                others.append(sp.Mul(*(part for part in sp.Mul.make_args(real) if part.free_symbols)))
            continue
        for branch, condition in _roots(factor, angle):
            if condition != False:  # noqa: E712  # sympy's false
                branches.append(branch)
                conditions.append(condition)
    return Branches(angle, tuple(branches), tuple(conditions), tuple(others))


def _roots(factor: Poly, angle: Any) -> list[tuple[Any, Any]]:
    """Angles at which a + b cos(m angle) + c sin(m angle) is zero, for a factor that is real up to a phase."""
    _, turned = centred(factor)
    if turned.terms != turned.conj().terms:
        turned = turned * turned.ring.root_of_unity(Fraction(1, 4))
    if turned.terms != turned.conj().terms:
        both = turned.abs2()
        raise SymbolError(
            "an amplitude that is complex vanishes only where two conditions hold at once",
            got=f"{written(both)} for {angle}",
            fix=f"form.frame(theta, way='harmonics', angle={angle})",
        )
    waves = harmonics(turned, angle)
    orders = [order for order in waves if order != 0]
    if len(orders) != 1:
        raise SymbolError(
            "the angle is solved for where it enters in one harmonic",
            got=f"harmonics {orders} of {angle}",
            fix=f"form.frame(theta, way='harmonics', angle={angle})",
        )
    (order,) = orders
    a, (b, c) = waves.get(sp.S.Zero, (sp.S.Zero, 0))[0], waves[order]
    turns = 2 * sp.pi * TURN_COUNT
    if a == 0:
        return [(sp.expand((_phase(b, c) + sp.pi / 2 + sp.pi * TURN_COUNT) / order), sp.true)]
    size = sp.sqrt(sp.simplify(b**2 + c**2))
    reach = sp.simplify(sp.Abs(a) <= size)
    opening = sp.acos(sp.simplify(-a / size))
    return [((_phase(b, c) + sign * opening + turns) / order, reach) for sign in (1, -1)]


def _phase(b: Any, c: Any) -> Any:
    """arg(b + i c), read off where b and c are the cosine and sine of one angle."""
    for factor_b in sp.Mul.make_args(b):
        if isinstance(factor_b, sp.cos) and sp.expand(c - b / factor_b * sp.sin(factor_b.args[0])) == 0:
            rest = b / factor_b
            return factor_b.args[0] + (sp.pi if rest.could_extract_minus_sign() else 0)
        if isinstance(factor_b, sp.cos) and sp.expand(c + b / factor_b * sp.sin(factor_b.args[0])) == 0:
            rest = b / factor_b
            return -factor_b.args[0] + (sp.pi if rest.could_extract_minus_sign() else 0)
    return sp.atan2(c, b)


def _common(one: Branches, other: Branches) -> Branches:
    """What makes both vanish, as far as the branches agree."""
    shared = [
        (branch, condition)
        for branch, condition in zip(one.branches, one.conditions, strict=True)
        if any(_same(branch, theirs) for theirs in other.branches) or other.always
    ]
    others = tuple(o for o in one.others if o in other.others)
    return Branches(one.angle, tuple(b for b, _ in shared), tuple(c for _, c in shared), others)


def _same(one: Any, other: Any) -> bool:
    """Whether two branches name the same set of angles."""
    step = sp.diff(one, TURN_COUNT)
    return (
        step == sp.diff(other, TURN_COUNT) and sp.simplify((one - other).subs(TURN_COUNT, 0) / step).is_integer is True
    )
