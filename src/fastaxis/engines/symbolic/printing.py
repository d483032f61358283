"""Expressions as a person would print them: long numbers short, phi last, sums that start with a plus."""

from __future__ import annotations

from typing import Any

import sympy as sp
from sympy.printing.latex import LatexPrinter
from sympy.printing.str import StrPrinter

from fastaxis.engines.symbolic.coordinates import PHI

__all__ = ["as_latex", "as_text"]

LONG = 10_000  # a fraction of larger numbers, such as 133/250000000 for 532 nm, is shown in decimals
INTRICATE = 12  # operations in a number, beyond which it is shown in decimals
DIGITS = 6


def as_text(expression: Any) -> str:
    """One line of text, with numbers in six digits where they are long."""
    return str(_Text().doprint(_eased(expression)))


def as_latex(expression: Any) -> str:
    """LaTeX, with numbers in six digits where they are long."""
    return str(_Latex().doprint(_eased(expression)))


class _Azimuth(sp.Symbol):  # type: ignore[misc]  # sympy has no types
    """The azimuth, sorted behind all letters: 2 q phi, not 2 phi q."""

    def sort_key(self, order: Any = None) -> Any:
        return sp.Symbol("~").sort_key(order)


class _Order:
    """The order of terms, for both kinds of text."""

    def _as_ordered_terms(self, expr: Any, order: Any = None) -> list[Any]:
        terms = list(super()._as_ordered_terms(expr, order=order))  # type: ignore[misc]  # of the printer it is mixed into
        first = next((term for term in terms if not term.could_extract_minus_sign()), terms[0])
        terms.remove(first)
        return [first, *terms]


class _Text(_Order, StrPrinter):  # type: ignore[misc]  # sympy has no types
    def _print_hyper(self, e: Any) -> str:
        (a,), (b,) = e.ap, e.bq
        return f"1F1({self._print(a)}; {self._print(b)}; {self._print(e.argument)})"


class _Latex(_Order, LatexPrinter):  # type: ignore[misc]  # sympy has no types
    def _print_hyper(self, e: Any, exp: Any = None) -> str:
        (a,), (b,) = e.ap, e.bq
        inside = r";\, ".join(self._print(part) for part in (a, b, e.argument))
        return rf"{{}}_1F_1\left({inside}\right)" + ("" if exp is None else f"^{{{exp}}}")


def _eased(expression: Any) -> Any:
    if isinstance(expression, sp.MatrixBase):
        return expression.applyfunc(_eased)
    numbers = {n: sp.Float(n, DIGITS) for n in expression.atoms(sp.Rational) if n.q > LONG or abs(n.p) > LONG}
    plain = _with_short_numbers(expression.xreplace(numbers))
    return _arranged(plain.xreplace({PHI: _Azimuth("phi", real=True)}))


def _with_short_numbers(e: Any) -> Any:
    """Numbers of many operations in decimals."""
    if not e.args:
        return e
    if e.is_number:
        return sp.N(e, DIGITS) if sp.count_ops(e) > INTRICATE else e
    return e.func(*(_with_short_numbers(part) for part in e.args))


def _arranged(e: Any) -> Any:
    """(1 + cos x)/2 for 1/2 + cos(x)/2, and cosines of angles that start with a plus."""
    if isinstance(e, sp.cos):
        (angle,) = e.args
        leading = angle.as_ordered_terms()[0]
        return sp.cos(-angle, evaluate=False) if leading.could_extract_minus_sign() else e
    if isinstance(e, sp.Mul | sp.Add | sp.Pow):
        e = e.func(*(_arranged(part) for part in e.args), evaluate=False)
    if isinstance(e, sp.Add):
        shares = {part.as_coeff_Mul()[0] for part in e.args}
        below = {share.q if share.is_Rational else 1 for share in shares}
        if len(below) == 1 and below != {1}:
            (common,) = below
            return sp.Mul(sp.Rational(1, common), sp.expand_mul(e * common), evaluate=False)
    return e
