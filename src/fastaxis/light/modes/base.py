"""What every transverse mode answers, and the second moments it answers with."""

from __future__ import annotations

import math
from collections.abc import Set as AbstractSet
from dataclasses import dataclass
from typing import Any, Protocol, runtime_checkable

import numpy as np
from numpy.typing import ArrayLike, NDArray

from fastaxis import checks
from fastaxis.errors import ParameterError, SymbolError
from fastaxis.maths import Scalar, free_symbols, is_symbolic

LARGEST_WAIST = 0.2  # [m]; beams of a bench are thinner, and 0.8 was meant in millimetres

__all__ = ["Complexes", "Mode", "Moments", "order", "places", "require_numbers", "waist", "waist_at"]

Complexes = NDArray[np.complex128]


@dataclass(frozen=True)
class Moments:
    """Second moments along one transverse axis (the worse one), about the beam's own centre.

    Parameters
    ----------
    x2 : variance of position [m^2]; the radius of a Gaussian beam is 2 sqrt(x2).
    xt : covariance of position and angle [m rad]; positive for a diverging beam.
    t2 : variance of angle [rad^2]; infinite for a hard edge.
    """

    x2: float
    xt: float
    t2: float

    def quality(self, wavelength: float) -> float:
        """Beam quality M^2 = (4 pi / wavelength) sqrt(x2 t2 - xt^2) of ISO 11146; 1 for a Gaussian beam.

        >>> round(Moments(0.25e-6, 0.0, (532e-9 / np.pi) ** 2 / 4e-6).quality(532e-9), 12)
        1.0
        """
        return 4 * math.pi / wavelength * math.sqrt(max(self.x2 * self.t2 - self.xt**2, 0.0))


@runtime_checkable
class Mode(Protocol):
    """A transverse amplitude of unit power in the plane of the source."""

    @property
    def charge(self) -> int | None:
        """The l if the amplitude is f(r) exp(i l phi) about the axis of the beam, else None."""

    @property
    def infinite(self) -> bool:
        """Whether it fills the whole plane."""

    @property
    def hard(self) -> bool:
        """Whether it has a hard edge."""

    @property
    def symbols(self) -> AbstractSet[Any]:
        """The letters among the parameters."""

    def amplitude(self, x: ArrayLike, y: ArrayLike, wavelength: float) -> Complexes:
        """Complex amplitude [1/m] at the places (x, y) [m]; broadcast together."""

    def radial(self, r: ArrayLike, wavelength: float) -> Complexes:
        """f(r) [1/m] of a mode that has a charge."""

    def curvature(self, wavelength: float) -> float:
        """1/R [1/m] of the mean phase front; positive for a diverging beam."""

    def moments(self, wavelength: float) -> Moments:
        """Second moments of the worse axis."""

    def overlap(self, other: Mode, wavelength: float) -> complex:
        """<self|other>, the integral of conj(self) other over the plane."""


def places(x: ArrayLike, y: ArrayLike, centre: tuple[Any, Any]) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Places (x, y) [m] as seen from a centre."""
    return np.asarray(x, dtype=float) - float(centre[0]), np.asarray(y, dtype=float) - float(centre[1])


def require_numbers(mode: Any) -> None:
    """Refuse a numeric question to a mode that still has symbols."""
    if mode.symbols:
        kind, letter = type(mode).__name__, min(map(str, mode.symbols))
        values = ", ".join(f"{name} = {value}" for name, value in vars(mode).items() if free_symbols((value,)))
        raise SymbolError(
            "numbers can be had from a mode without symbols only: put a number for each symbol",
            got=f"{kind}: symbol {letter} in {values}",
            fix=", ".join(f"{name}={_example(name)}" for name, value in vars(mode).items() if free_symbols((value,))),
        )


def _example(parameter: str) -> str:
    return {"p": "0", "l": "1", "m": "1", "n": "0", "centre": "(0*mm, 0*mm)", "area": "1*mm**2"}.get(parameter, "1*mm")


def waist(part: str, parameter: str, value: Any) -> Scalar:
    """A radius in metres; more than 20 cm has lost its unit."""
    plain = isinstance(value, int | float) and LARGEST_WAIST < value <= 1e3 * LARGEST_WAIST
    fix = f"{parameter}={value:g}*mm" if plain else f"{parameter}=0.8*mm"
    return checks.length(part, parameter, value, most=LARGEST_WAIST, fix=fix)


def waist_at(part: str, value: Any) -> Scalar:
    """Distance from the source plane downstream to the waist [m]; negative for a waist upstream."""
    return checks.number(part, "waist_at", value, fix="waist_at=0*mm")


def order(part: str, parameter: str, value: Any, *, signed: bool = False) -> Scalar:
    """A whole number that counts nodes or turns; not negative unless ``signed``."""
    rule = f"{parameter} is a whole number" + (
        ": 2 pi of phase times it must close on a turn" if signed else " of nodes, zero or more"
    )
    number = checks.number(part, parameter, value, fix=f"{parameter}=1")
    if is_symbolic(number) and free_symbols((number,)):
        if number.is_integer is False or (not signed and number.is_negative):
            raise ParameterError(rule, got=f"{part}: {parameter} = {value}", fix=f"{parameter}=1")
        return number
    whole = round(float(number))
    if whole != number or (whole < 0 and not signed):
        fix = whole if signed else max(abs(whole), 0)
        raise ParameterError(rule, got=f"{part}: {parameter} = {value}", fix=f"{parameter}={fix}")
    return whole
