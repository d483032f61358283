"""How a form shows itself: LaTeX, notebook, text."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.printing import as_latex, as_text
from fastaxis.errors import SymbolError

__all__ = ["Shown"]

QUANTITIES = ("jones", "stokes", "frame", "power", "irradiance", "envelope", "scale")


class Shown:
    """LaTeX, text and the list of assumptions of a form."""

    parts: tuple[Any, ...]
    letters: frozenset[Any]
    target: str

    @property
    def meanings(self) -> dict[Any, Any]:
        """What the names in the form stand for."""
        raise NotImplementedError

    def latex(self, quantity: str = "jones", *arguments: Any, **options: Any) -> str:
        r"""LaTeX of a quantity in the user's own letters: "jones", "stokes", "power", or "frame" with its setting.

        What the names in it stand for follows after "with". ``form.latex("frame", theta)``.
        """
        value = self._value(quantity, *arguments, **options)
        text = as_latex(value)
        used = self._explained(value)
        if used:
            text += r", \quad \text{with } " + r",\; ".join(
                f"{as_latex(name)} = {as_latex(_short(meaning))}" for name, meaning in used.items()
            )
        return text

    def show(self, value: Any, *, latex: bool = False) -> str:
        """An expression of the form as it is printed: one line of text, or LaTeX."""
        return as_latex(value) if latex else as_text(value)

    def to_text(self, quantity: str = "jones", *arguments: Any, spelled_out: bool = True, **options: Any) -> str:
        """A quantity as text that sympy.sympify reads back; names are spelled out unless asked otherwise."""
        value = self._value(quantity, *arguments, **options)
        if spelled_out:
            value = self.spelled_out(value)
        return str(sp.sstr(value, full_prec=True))

    @property
    def assumptions(self) -> tuple[str, ...]:
        """What the form takes for granted, one sentence each."""
        place = self.parts[0].field.place
        assert self.meanings is not None  # writing the waves down makes their notes
        letters = ", ".join(sorted(str(letter) for letter in self.letters))
        lines = ["exp(-i w t), seen facing the source, angles counter-clockwise, S3 = I_R - I_L"]
        if letters:
            lines.append(f"{letters}: real; lengths positive; shares of power between 0 and 1")
        lines.append("thin parts, paraxial light, r and phi about the axis of the beam")
        return (*lines, *place.letters.notes)

    def spelled_out(self, expression: Any) -> Any:
        """An expression of the form with every name replaced by what it stands for."""
        assert self.meanings is not None  # writing the waves down gives their names
        return self.parts[0].field.place.letters.spelled_out(expression)

    def names_in(self, values: Iterable[Any]) -> dict[Any, Any]:
        """The names that occur in some expressions of the form, with what they stand for."""
        return self._explained(sp.Tuple(*values))

    def _value(self, quantity: str, *arguments: Any, **options: Any) -> Any:
        if quantity not in QUANTITIES:
            raise SymbolError(f"a form has {', '.join(QUANTITIES)}", got=f'"{quantity}"', fix='form.latex("stokes")')
        if quantity == "frame" and not arguments:
            raise SymbolError(
                "a frame belongs to an analyzer setting", got='"frame" alone', fix='form.latex("frame", theta)'
            )
        found = getattr(self, quantity)
        return found(*arguments, **options) if callable(found) else found

    def _explained(self, value: Any) -> dict[Any, Any]:
        """The names in an expression, those in their meanings included."""
        meanings: dict[Any, Any] = self.meanings
        used: dict[Any, Any] = {}
        open_names = [name for name in meanings if value.has(name)]
        while open_names:
            name = open_names.pop(0)
            used[name] = meanings[name]
            open_names += [other for other in meanings if other not in used and meanings[name].has(other)]
        return used

    def _repr_latex_(self) -> str:
        return f"$\\displaystyle {self.latex(*(('jones',) if len(self.parts) == 1 else ('stokes',)))}$"

    def __str__(self) -> str:
        quantity = "jones" if len(self.parts) == 1 else "stokes"
        names = "(Ex, Ey)" if quantity == "jones" else "(S0, S1, S2, S3)"
        value, envelope = self._value(quantity), self._value("envelope")
        lines = [
            f"light at {self.target}, relative to its envelope [sqrt(W)/m]",
            f"{names} = ({', '.join(map(as_text, value))})",
            f"envelope = {as_text(envelope)}",
        ]
        used = self._explained(sp.Tuple(*value, envelope))
        lines += [f"  {as_text(name)} = {as_text(_short(meaning))}" for name, meaning in used.items()]
        return "\n".join((*lines, "assumed: " + "; ".join(self.assumptions)))


def _short(meaning: Any) -> Any:
    """A plain number in six digits; anything else as it is."""
    return meaning if meaning.free_symbols else meaning.evalf(6)
