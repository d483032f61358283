"""The small maths namespace that laws and states are written against.

A law uses only :class:`Maths`: phasors, square roots, cosines. The numeric member lives here; the exact
symbolic one lives with the symbolic engine. So the same lines run on numbers, arrays and symbols.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable
from dataclasses import dataclass, replace
from typing import Any, Protocol, TypeAlias, runtime_checkable

import numpy as np

__all__ = ["NUMBERS", "Maths", "Pattern", "Symbolic", "Value", "free_symbols", "is_symbolic"]


@runtime_checkable
class Symbolic(Protocol):
    """What we need of a sympy expression, without importing sympy."""

    @property
    def free_symbols(self) -> set[Any]: ...
    def subs(self, *args: Any) -> Any: ...


Scalar: TypeAlias = Any
"""A real number or a sympy expression (SI units). Both take the same arithmetic operators."""

Value: TypeAlias = Any
"""A Scalar, or a Pattern that gives a number at each place of the plane."""


def is_symbolic(value: object) -> bool:
    """True for a sympy expression that still has letters or exact numbers in it."""
    return hasattr(value, "free_symbols")


def free_symbols(values: Iterable[object]) -> set[Any]:
    """All letters that occur in some values."""
    found: set[Any] = set()
    for value in values:
        if isinstance(value, tuple | list):
            found |= free_symbols(value)
        elif is_symbolic(value):
            found |= set(value.free_symbols)  # type: ignore[attr-defined]  # is_symbolic saw it
    return found


@dataclass(frozen=True, eq=False)
class Pattern:
    """A number that varies over a plate: ``scale * source(x, y) + shift``, in the plate's own frame.

    Parameters
    ----------
    source : ``f(x, y)`` on arrays [m], or a (ny, nx) array of cells, rows along +y, centred on the plate.
        Each cell is uniform; the outermost cells continue outwards.
    pixel : side of a cell [m]; needed for an array.
    """

    source: Callable[[Any, Any], Any] | np.ndarray[Any, Any]
    pixel: float | None = None
    scale: float = 1.0
    shift: float = 0.0
    flip_x: bool = False
    flip_y: bool = False

    def __call__(self, x: Any, y: Any) -> Any:
        """Values at the places (x, y) [m]."""
        x = -x if self.flip_x else x
        y = -y if self.flip_y else y
        if callable(self.source):
            return self.scale * self.source(x, y) + self.shift
        ny, nx = self.source.shape
        column = np.clip(np.floor(np.asarray(x) / self.pixel + nx / 2).astype(int), 0, nx - 1)
        row = np.clip(np.floor(np.asarray(y) / self.pixel + ny / 2).astype(int), 0, ny - 1)
        return self.scale * self.source[row, column] + self.shift

    def mirrored(self, axis: str = "x") -> Pattern:
        """The pattern met with x (or y) reversed."""
        if axis == "x":
            return replace(self, flip_x=not self.flip_x)
        return replace(self, flip_y=not self.flip_y)

    def __neg__(self) -> Pattern:
        return replace(self, scale=-self.scale, shift=-self.shift)

    def __mul__(self, factor: float) -> Pattern:
        return replace(self, scale=self.scale * factor, shift=self.shift * factor)

    __rmul__ = __mul__

    def __truediv__(self, divisor: float) -> Pattern:
        return self * (1 / divisor)

    def __add__(self, shift: float) -> Pattern:
        return replace(self, shift=self.shift + shift)

    __radd__ = __add__


class Maths(Protocol):
    """Operations a law may use. Results of these support + - * among themselves."""

    @property
    def half(self) -> Any: ...
    def phasor(self, angle: Any) -> Any:
        """exp(i angle)."""

    def root(self, power: Any) -> Any:
        """The non-negative square root."""

    def cos(self, angle: Any) -> Any: ...
    def sin(self, angle: Any) -> Any: ...
    def number(self, value: complex) -> Any:
        """A plain number as an amplitude of this namespace."""


def _quarter_turns(angle: float) -> int | None:
    """The whole number of quarter turns in an angle, if it is one to within its own rounding."""
    quarters = angle / (math.pi / 2)
    nearest = round(quarters)
    # 4 eps: degrees times pi/180 carries up to three roundings.
    if abs(quarters - nearest) <= 4 * np.finfo(float).eps * max(1.0, abs(quarters)):
        return nearest % 4
    return None


_QUARTER_PHASORS = (1 + 0j, 1j, -1 + 0j, -1j)


class Numbers:
    """The numeric namespace: floats, complex numbers and numpy arrays.

    Whole quarter turns are exact, so a half-wave plate has a zero diagonal and not 6e-17.

    >>> NUMBERS.phasor(math.pi)
    (-1+0j)
    """

    half = 0.5

    def phasor(self, angle: Any) -> Any:
        if isinstance(angle, np.ndarray):
            out = np.empty(angle.shape, complex)
            np.cos(angle, out=out.real)
            np.sin(angle, out=out.imag)
            return out
        angle = float(angle)
        quarter = _quarter_turns(angle)
        if quarter is not None:
            return _QUARTER_PHASORS[quarter]
        return complex(math.cos(angle), math.sin(angle))

    def cos(self, angle: Any) -> Any:
        return np.cos(angle) if isinstance(angle, np.ndarray) else self.phasor(angle).real

    def sin(self, angle: Any) -> Any:
        return np.sin(angle) if isinstance(angle, np.ndarray) else self.phasor(angle).imag

    def root(self, power: Any) -> Any:
        return np.sqrt(power) if isinstance(power, np.ndarray) else math.sqrt(power)

    def number(self, value: complex) -> Any:
        return value


NUMBERS = Numbers()
