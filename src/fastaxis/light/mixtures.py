"""Incoherent mixtures of states: unpolarized and partly polarized light."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.light.states import H, State, V
from fastaxis.maths import Scalar, free_symbols

__all__ = ["UNPOLARIZED", "StateMixture", "check_weights", "partially_polarized"]

# Weights such as 1/3 or 0.1 are rounded to 1e-16 each; a sum that is off by more was never 1.
SUM_TOLERANCE = 1e-12


def check_weights(part: str, weights: tuple[Scalar, ...], *, fix: str) -> tuple[Scalar, ...]:
    """Shares of power: none negative, together 1 (not checked while symbols are among them)."""
    checked = tuple(checks.number(part, "weight", weight, fix=fix) for weight in weights)
    if not checked:
        raise ParameterError("a mixture needs at least one part", got=f"{part}: no parts", fix=fix)
    if free_symbols(checked):
        return checked
    if min(checked) < 0:
        raise ParameterError("a weight is a share of power and not negative", got=f"{part}: weights {checked}", fix=fix)
    total = math.fsum(checked)
    if abs(total - 1) > SUM_TOLERANCE:
        raise ParameterError("weights must add up to 1", got=f"{part}: weights add up to {total:.12g}", fix=fix)
    return checked


@dataclass(frozen=True)
class StateMixture:
    """Light that is now in one state, now in another, with no fixed phase between them.

    Parameters
    ----------
    parts : ((weight, State), ...); the weights are shares of power and add up to 1.
    label : its name in messages and reports.

    Raises
    ------
    ParameterError : a negative weight; weights that do not add up to 1.

    Examples
    --------
    >>> StateMixture(((0.75, H), (0.25, V))).stokes
    array([1. , 0.5, 0. , 0. ])
    """

    parts: tuple[tuple[Scalar, State], ...]
    label: str = ""

    def __post_init__(self) -> None:
        parts = tuple((weight, state) for weight, state in self.parts)
        weights = check_weights(self.label or "mixture", tuple(w for w, _ in parts), fix=_normalized(parts))
        object.__setattr__(self, "parts", tuple(zip(weights, (s for _, s in parts), strict=True)))

    @property
    def symbols(self) -> set[Any]:
        """The letters among weights and states."""
        return free_symbols(w for w, _ in self.parts).union(*(state.symbols for _, state in self.parts))

    @property
    def stokes(self) -> NDArray[np.float64]:
        """(1, S1, S2, S3), shape (4,): the weighted mean of the parts."""
        weighted = [float(weight) * state.stokes for weight, state in self.parts]
        return np.asarray(np.sum(weighted, axis=0))

    @property
    def degree(self) -> float:
        """Degree of polarization, 0 .. 1."""
        return float(np.linalg.norm(self.stokes[1:]))


def _normalized(parts: tuple[tuple[Scalar, State], ...]) -> str:
    try:
        sizes = [abs(float(weight)) for weight, _ in parts]
        total = math.fsum(sizes)
        shares = [f"({size / total!r}, {_code(state)})" for size, (_, state) in zip(sizes, parts, strict=True)]
    except (TypeError, ValueError, ZeroDivisionError):
        shares = []
    return (
        f"fa.StateMixture(({', '.join(shares)}{',' * (len(shares) == 1)}))"
        if shares
        else "fa.StateMixture(((0.5, fa.H), (0.5, fa.V)))"
    )


def _code(state: State) -> str:
    if state.label in {"H", "V", "D", "A", "R", "L"}:
        return f"fa.{state.label}"
    return f"fa.elliptical({state.azimuth}, {state.ellipticity})"


UNPOLARIZED = StateMixture(((0.5, H), (0.5, V)), "unpolarized")


def partially_polarized(state: State, degree: Scalar) -> StateMixture:
    """Light polarized to a degree P, 0 (none) .. 1 (pure): (1+P)/2 in a state and (1-P)/2 in the one across.

    >>> partially_polarized(H, 0.8).stokes.round(12)
    array([1. , 0.8, 0. , 0. ])
    """
    degree = checks.fraction("partially_polarized", "degree", degree, fix="degree=0.9")
    parts = (((1 + degree) / 2, state), ((1 - degree) / 2, state.orthogonal))
    return StateMixture(tuple(part for part in parts if part[0] != 0), label=f"{state.label or 'state'} to {degree}")
