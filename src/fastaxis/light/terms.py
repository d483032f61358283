"""Coherent sums of modes, each in its own polarization state."""

from __future__ import annotations

import cmath
import math
from collections.abc import Iterable
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import ArrayLike

from fastaxis.errors import ParameterError, SymbolError
from fastaxis.light.modes import Mode
from fastaxis.light.modes.base import Complexes
from fastaxis.light.states import State
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["Beam", "Term"]


@dataclass(frozen=True)
class Term:
    """One mode in one state, with its amplitude in the sum.

    Parameters
    ----------
    amplitude : complex number or a sympy expression; only ratios between the terms of a beam matter.
    mode : transverse mode, of unit power.
    state : polarization state, of unit power.

    Raises
    ------
    ParameterError : an amplitude that is not finite; a mixture where a pure state belongs.
    """

    amplitude: Scalar
    mode: Mode
    state: State

    def __post_init__(self) -> None:
        if not isinstance(self.state, State):
            raise ParameterError(
                "a term of a coherent sum has a pure state; a mixture of states makes a source of several components",
                got=f"term: state = {getattr(self.state, 'label', None) or type(self.state).__name__}",
                fix="fa.make_source(fa.Gaussian(waist=0.8*mm), fa.UNPOLARIZED, power=5*mW)",
            )
        if is_symbolic(self.amplitude):
            return
        try:
            amplitude = complex(self.amplitude)
        except (TypeError, ValueError):
            amplitude = complex(math.nan)
        if not cmath.isfinite(amplitude):
            raise ParameterError(
                "an amplitude is one finite complex number or a sympy expression",
                got=f"term: amplitude = {self.amplitude!r}",
                fix="fa.Term(0.6 + 0.8j, fa.Gaussian(waist=0.8*mm), fa.H)",
            )
        object.__setattr__(self, "amplitude", amplitude)

    @property
    def symbols(self) -> set[Any]:
        """The letters in amplitude, mode and state."""
        own = set(self.amplitude.free_symbols) if is_symbolic(self.amplitude) else set()
        return own | set(self.mode.symbols) | self.state.symbols

    @property
    def number(self) -> complex:
        """The amplitude as a number."""
        if is_symbolic(self.amplitude) and self.amplitude.free_symbols:
            raise SymbolError(
                "numbers can be had from amplitudes without symbols only: put a number for each symbol",
                got=f"term: amplitude = {self.amplitude}",
                fix="fa.Term(1, fa.Gaussian(waist=0.8*mm), fa.H)",
            )
        return complex(self.amplitude)


@dataclass(frozen=True)
class Beam:
    """A coherent sum: the field is the sum of amplitude * mode * state over the terms.

    Parameters
    ----------
    terms : one or more terms, which keep a fixed phase to each other.

    Raises
    ------
    ParameterError : no terms; terms that cancel (when asked for numbers).

    Examples
    --------
    A radially polarized beam, its power shared evenly by two charges:

    >>> from fastaxis.light import L, LaguerreGauss, R
    >>> from fastaxis.units import mm, nm
    >>> radial = Beam((Term(1, LaguerreGauss(0, -1, 1*mm), L), Term(1, LaguerreGauss(0, 1, 1*mm), R)))
    >>> round(radial.power(532*nm), 12)
    2.0
    """

    terms: tuple[Term, ...]

    def __post_init__(self) -> None:
        terms = (self.terms,) if isinstance(self.terms, Term) else tuple(self.terms)
        if not terms or not all(isinstance(term, Term) for term in terms):
            raise ParameterError(
                "a beam is a sum of one or more terms",
                got=f"beam: terms = {terms}",
                fix="fa.Beam((fa.Term(1, fa.Gaussian(waist=0.8*mm), fa.H),))",
            )
        object.__setattr__(self, "terms", terms)

    @property
    def symbols(self) -> set[Any]:
        """The letters in all terms."""
        return set[Any]().union(*(term.symbols for term in self.terms))

    @property
    def state(self) -> State | None:
        """The state that all terms share, or None."""
        states = {term.state for term in self.terms}
        return states.pop() if len(states) == 1 else None

    def power(self, wavelength: float) -> float:
        """Power of the sum of the unit-power modes as written, before a source scales it.

        sum over terms i, j of a_i* a_j <mode_i|mode_j> <state_i|state_j>.
        """
        total = math.fsum(self._pair(i, j, wavelength) for i in range(len(self.terms)) for j in range(i + 1))
        # Rounding leaves 1e-16 of each part; less than 1e-13 of them all is a sum that cancels.
        if total <= 1e-13 * math.fsum(abs(term.number) ** 2 for term in self.terms):
            raise ParameterError(
                "the terms of a beam must not cancel: what is left has no direction to scale",
                got=f"beam: power {total:.3g} from {len(self.terms)} terms",
                fix="fa.Beam((fa.Term(1, fa.Gaussian(waist=0.8*mm), fa.H),))",
            )
        return total

    def _pair(self, i: int, j: int, wavelength: float) -> float:
        """Power from one pair of terms: both orders together."""
        one, other = self.terms[i], self.terms[j]
        states = complex(np.vdot(one.state.jones, other.state.jones))
        weight = one.number.conjugate() * other.number * states
        # Exactly 0 for orthogonal states or an absent term: the overlap of their modes need not exist.
        if weight == 0:
            return 0.0
        if i == j:
            return weight.real
        return 2 * (weight * one.mode.overlap(other.mode, wavelength)).real

    def scale(self, wavelength: float) -> float:
        """Factor that takes the beam as written to unit power."""
        return 1 / math.sqrt(self.power(wavelength))

    def field(self, x: ArrayLike, y: ArrayLike, wavelength: float) -> Complexes:
        """(Ex, Ey) [1/m] at the places (x, y) [m], shape (2, ...), scaled to unit power."""
        scale = self.scale(wavelength)
        return _sum(
            np.multiply.outer(scale * term.number * term.state.jones, term.mode.amplitude(x, y, wavelength))
            for term in self.terms
        )


def _sum(fields: Iterable[Complexes]) -> Complexes:
    first, *rest = fields
    total = first
    for field in rest:
        total = total + field
    return total
