"""Forms as fast numpy functions."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from functools import cached_property
from typing import Any

import sympy as sp
from sympy.printing.numpy import SciPyPrinter

from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.kummer_numbers import kummer
from fastaxis.errors import SymbolError

__all__ = ["NumericForm"]

WHOLE = 2**53  # up to here a float is the whole number itself


class _Printer(SciPyPrinter):  # type: ignore[misc]  # sympy has no types
    """scipy's names for the special functions of the forms."""

    def _print_hyper(self, e: Any) -> str:
        (above,), (below,) = e.ap, e.bq
        return f"hyp1f1({self._print(above)}, {self._print(below)}, {self._print(e.argument)})"

    def _print_Integer(self, e: Any) -> str:
        # numpy has no root of a whole number beyond 64 bits, as the exact value of a decimal has in its surds.
        return repr(float(e)) if abs(e) > WHOLE else str(super()._print_Integer(e))


@dataclass(frozen=True, eq=False)
class NumericForm:
    """A function of the form's letters, of r [m] and of phi [rad]; arrays broadcast.

    Parameters
    ----------
    expression : sympy expression or column.
    """

    expression: Any

    @cached_property
    def letters(self) -> tuple[Any, ...]:
        """The letters in the order of :meth:`positional`."""
        return tuple(sorted(self.expression.free_symbols, key=lambda s: (s in (R, PHI), str(s))))

    @cached_property
    def positional(self) -> Any:
        """The bare numpy function, arguments in the order of ``letters``."""
        names = {"hyp1f1": kummer}
        return sp.lambdify(self.letters, self.expression, modules=[names, "scipy", "numpy"], printer=_Printer, cse=True)

    def __call__(self, values: Mapping[Any, Any] | None = None, **named: Any) -> Any:
        """The value; letters by symbol in a mapping or by name.

        Raises
        ------
        SymbolError : a letter without a value.
        """
        if self.expression.has(sp.Integral):
            raise SymbolError(
                "a form with an integral left in it has no fast function; the numeric engines work it out",
                got=str(next(iter(self.expression.atoms(sp.Integral))))[:60],
                fix='train.expose("cam", fa.SIX_STATES)',
            )
        given = {str(letter): value for letter, value in (values or {}).items()} | named
        missing = [str(letter) for letter in self.letters if str(letter) not in given]
        if missing:
            raise SymbolError(
                "every letter of a form needs a number before it has a value",
                got=f"no value for {', '.join(missing)}",
                fix=f"function({', '.join(f'{name}=0.1' for name in missing)})",
            )
        return self.positional(*(given[str(letter)] for letter in self.letters))
