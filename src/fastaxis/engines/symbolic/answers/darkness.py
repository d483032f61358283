"""For which angle is it dark? All branches, or a clear "never"."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.expressions import centred, written
from fastaxis.engines.symbolic.presentations import harmonics
from fastaxis.engines.symbolic.presentations.factors import factored
from fastaxis.engines.symbolic.printing import as_text
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
            f"{self.angle} = {as_text(branch)}" + ("" if condition == True else f" if {_said(condition)}")  # noqa: E712  # sympy's true
            for branch, condition in zip(self.branches, self.conditions, strict=True)
        ]
        text += [f"or {as_text(other)} = 0 at every {self.angle}" for other in self.others]
        return "; ".join(text) + "; n any whole number" * bool(self.branches) if text else "no solution"


def _said(condition: Any) -> str:
    """A condition in words: sin(x) = 0, several joined by and."""
    if isinstance(condition, sp.And):
        return " and ".join(sorted(map(_said, condition.args)))
    if isinstance(condition, sp.Eq):
        return f"{as_text(condition.lhs)} = {as_text(condition.rhs)}"
    return str(condition)


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
    """Where one complex amplitude is zero: its real and its imaginary part at once, if it has both."""
    _, turned = centred(amplitude)
    half, i = turned.ring.rational(Fraction(1, 2)), turned.ring.root_of_unity(Fraction(1, 4))
    parts = ((turned + turned.conj()) * half, (turned.conj() - turned) * half * i)
    first, *rest = [_real_vanishing(part, angle) for part in parts if not part.is_zero()]
    return _common(first, rest[0]) if rest else first


def _real_vanishing(amplitude: Poly, angle: Any) -> Branches:
    factors = factored(amplitude) or [(amplitude, 1)]
    branches: list[Any] = []
    conditions: list[Any] = []
    others: list[Any] = []
    for factor, _ in factors:
        if len(factor) == 1:
            continue
        real = _made_real(factor)
        if not written(real).has(angle):
            others.append(_bare(written(real)))
            continue
        for branch, condition in _roots(real, angle):
            if condition != False:  # noqa: E712  # sympy's false
                branches.append(branch)
                conditions.append(condition)
    found = [other for other in others if other.free_symbols]
    return Branches(angle, tuple(branches), tuple(conditions), tuple(found))


def _made_real(factor: Poly) -> Poly:
    """A factor of a real polynomial, turned by the phase that makes it real."""
    _, turned = centred(factor)
    for eighths in range(4):
        real = turned * turned.ring.root_of_unity(Fraction(eighths, 8))
        if real.terms == real.conj().terms:
            return real
    raise SymbolError(
        "an amplitude with a complex factor is not solved for an angle",
        got=str(written(factor)),
        fix="form.frame(theta, way='exponential')",
    )


def _bare(expression: Any) -> Any:
    return sp.Mul(*(part for part in sp.Mul.make_args(expression) if part.free_symbols))


def _roots(real: Poly, angle: Any) -> list[tuple[Any, Any]]:
    """(branch, condition) of a + b cos(m angle) + c sin(m angle) = 0."""
    waves = harmonics(real, angle)
    orders = [order for order in waves if order != 0]
    if len(orders) != 1:
        raise SymbolError(
            "the angle is solved for where it enters in one harmonic",
            got=f"harmonics {orders} of {angle}",
            fix=f"form.frame(theta, way='harmonics', angle={angle})",
        )
    (order,) = orders
    a, (size, phase) = waves.get(sp.S.Zero, (sp.S.Zero, 0))[0], _polar(*waves[order])
    if a == 0:
        return [(_least((phase + sp.pi / 2 + sp.pi * TURN_COUNT) / order), sp.true)]
    opening, turns = sp.acos(sp.cancel(-a / size)), 2 * sp.pi * TURN_COUNT
    reach = sp.Abs(sp.cancel(a / size)) <= 1
    return [((phase + sign * opening + turns) / order, reach) for sign in (1, -1)]


def _least(branch: Any) -> Any:
    """A branch with its constant brought between zero and one step of n."""
    branch = sp.expand(branch)
    step = branch.coeff(TURN_COUNT)
    constant = sp.Add(*(part for part in sp.Add.make_args(branch) if not part.free_symbols))
    whole = sp.floor(constant / step)
    return sp.expand(branch - whole * step) if whole.is_integer and not step.free_symbols else branch


def _polar(b: Any, c: Any) -> tuple[Any, Any]:
    """(size, phase) with b = size cos(phase) and c = size sin(phase); read off where b and c show the angle."""
    if c == 0:
        return b, sp.S.Zero
    if b == 0:
        return c, sp.pi / 2
    for factor in sp.Mul.make_args(b):
        if isinstance(factor, sp.cos):
            size, phase = b / factor, factor.args[0]
            for sign in (1, -1):
                if sp.expand(c - sign * size * sp.sin(phase)) == 0:
                    return size, sign * phase
    return sp.sqrt(b**2 + c**2), sp.atan2(c, b)


def _common(one: Branches, other: Branches) -> Branches:
    """What makes both vanish: shared branches, a branch of one with a condition of the other, shared conditions."""
    found: list[tuple[Any, Any]] = []
    for first, second in ((one, other), (other, one)):
        for branch, condition in zip(first.branches, first.conditions, strict=True):
            for branch_there, theirs in zip(second.branches, second.conditions, strict=True):
                if _within(branch, branch_there) and not _known(branch, found):
                    found.append((branch, sp.And(condition, theirs)))
    others = tuple(elsewhere for elsewhere in one.others if elsewhere in other.others)
    for first, second in ((one, other), (other, one)):
        found += [
            (branch, sp.And(condition, sp.Eq(elsewhere, 0)))
            for branch, condition in zip(first.branches, first.conditions, strict=True)
            for elsewhere in second.others
            if elsewhere not in others and not _known(branch, found)
        ]
    return Branches(one.angle, tuple(b for b, _ in found), tuple(c for _, c in found), others)


def _known(branch: Any, found: list[tuple[Any, Any]]) -> bool:
    return any(_within(branch, other) for other, _ in found)


def _within(one: Any, other: Any) -> bool:
    """Whether every angle of one branch is also one of another."""
    step, wider = sp.diff(one, TURN_COUNT), sp.diff(other, TURN_COUNT)
    apart = sp.simplify((one - other).subs(TURN_COUNT, 0) / wider)
    return sp.simplify(step / wider).is_integer is True and apart.is_integer is True
