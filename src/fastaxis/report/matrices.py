"""The Jones matrix of a law as text: numbers rounded, letters kept."""

from __future__ import annotations

from typing import Any

from fastaxis.laws import AxisLaw, CircularLaw
from fastaxis.maths import NUMBERS, free_symbols

__all__ = ["Letters", "matrix_lines"]


SIMPLE = 10_000  # a share that is no whole number of hundredths of a percent was worked out, and stays a decimal


class Letters:
    """The maths namespace of a card: sympy, with multiples of pi made exact."""

    def __init__(self) -> None:
        import sympy  # noqa: PLC0415 - only cards with letters need it

        self.sympy = sympy
        self.half = sympy.Rational(1, 2)

    def exact(self, angle: Any) -> Any:
        """An angle whose floats are read as simple fractions, or simple parts of pi, where they are that."""
        angle = self.sympy.sympify(angle)
        return angle.xreplace({number: self._simple(number) for number in angle.atoms(self.sympy.Float)})

    def _simple(self, number: Any) -> Any:
        # 1e-12 is far above the rounding of a product of a few floats, and no part of pi is that near to a twelfth.
        for unit, finest in ((self.sympy.Integer(1), 12), (self.sympy.pi, 720)):
            part = self.sympy.nsimplify(number / unit.n(), rational=True, tolerance=1e-12)
            if part.q <= finest:
                return part * unit
        return number

    def phasor(self, angle: Any) -> Any:
        # As cosine and sine, so that the sum and difference of two phasors shorten by themselves: a general
        # simplifier takes seconds for the card of one plate.
        return self.cos(angle) + self.sympy.I * self.sin(angle)

    def cos(self, angle: Any) -> Any:
        return self.sympy.cos(self.exact(angle))

    def sin(self, angle: Any) -> Any:
        return self.sympy.sin(self.exact(angle))

    def root(self, power: Any) -> Any:
        share = self.sympy.nsimplify(power, rational=True)
        return self.sympy.sqrt(share) if getattr(share, "q", 1) <= SIMPLE else self.sympy.sqrt(share).n()

    def number(self, value: complex) -> Any:
        return self.sympy.nsimplify(value, rational=True)

    def short(self, value: Any) -> Any:
        """A short form that is found quickly."""
        found = self.sympy.factor_terms(self.sympy.expand(value))
        return found.xreplace({number: self.sympy.Float(number, 4) for number in found.atoms(self.sympy.Float)})


def _complex(value: complex) -> str:
    real, imag = round(value.real, 4) + 0.0, round(value.imag, 4) + 0.0
    if imag == 0:
        return f"{real:g}"
    return f"{imag:g}i" if real == 0 else f"{real:g}{imag:+g}i"


def matrix_lines(law: AxisLaw | CircularLaw) -> list[str]:
    """Two rows of the matrix in the basis (x, y); a q-plate's depends on phi.

    >>> matrix_lines(CircularLaw())
    ['[ 1  0 ]', '[ 0  1 ]']
    """
    local = isinstance(law, AxisLaw) and law.order != 0
    if local or free_symbols(law.values):
        letters = Letters()
        phi = letters.sympy.Symbol("phi", real=True)
        rows = [[str(letters.short(entry)) for entry in row] for row in law.linear(letters, phi)]
    else:
        rows = [[_complex(complex(entry)) for entry in row] for row in law.linear(NUMBERS)]
    widths = [max(len(row[column]) for row in rows) for column in (0, 1)]
    return [f"[ {row[0]:>{widths[0]}}  {row[1]:>{widths[1]}} ]" for row in rows]
