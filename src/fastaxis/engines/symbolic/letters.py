"""Short names for long quantities of a form (the beam radius behind a lens) and what they stand for."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Any

import sympy as sp

__all__ = ["Letters"]


@dataclass(eq=False)
class Letters:
    """Names that are given away, with their meaning.

    Parameters
    ----------
    taken : names of the user's own letters, which are never used.
    """

    taken: set[str]
    meanings: dict[Any, Any] = field(default_factory=dict)
    notes: list[str] = field(default_factory=list)

    def name(self, stem: str, meaning: Any, **assumptions: bool) -> Any:
        """A symbol for an expression; the same one for the same expression."""
        for symbol, known in self.meanings.items():
            if known == meaning and symbol.name.split("_")[0] == stem:
                return symbol
        symbol = sp.Symbol(self._free(stem), real=True, **assumptions)
        self.meanings[symbol] = meaning
        return symbol

    def function(self, stem: str, meaning: Any) -> Any:
        """A symbol for a complex function of the plane."""
        for symbol, known in self.meanings.items():
            if known == meaning:
                return symbol
        symbol = sp.Symbol(self._free(stem), complex=True)
        self.meanings[symbol] = meaning
        return symbol

    def _free(self, stem: str) -> str:
        used = self.taken | {symbol.name for symbol in self.meanings}
        count, name = 0, stem
        while name in used:
            count += 1
            name = f"{stem}_{count}"
        return name

    def note(self, sentence: str) -> None:
        """Something the reader of the form should know."""
        if sentence not in self.notes:
            self.notes.append(sentence)

    def spelled_out(self, expression: Any) -> Any:
        """An expression with every name replaced by what it stands for; later names may stand for earlier ones."""
        for name, meaning in reversed(self.meanings.items()):
            expression = expression.subs(name, meaning)
        return expression
