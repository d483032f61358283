"""Pure polarization states, as an ellipse: azimuth, ellipticity and a common phase."""

from __future__ import annotations

import math
from dataclasses import dataclass, field
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis import checks
from fastaxis.errors import ParameterError, SymbolError
from fastaxis.maths import NUMBERS, Maths, Scalar, free_symbols, is_symbolic

__all__ = ["A", "D", "H", "L", "R", "State", "V"]

EIGHTH = math.pi / 4


@dataclass(frozen=True)
class State:
    """A fully polarized state: E = exp(i phase) R(azimuth) (cos ellipticity, -i sin ellipticity).

    Parameters
    ----------
    azimuth : angle of the long axis [rad], counter-clockwise from x facing the source.
    ellipticity : arctan of short over long axis [rad], -45 .. 45 deg; positive is right-handed (clockwise in
        that view, negative helicity), so that R has +45 deg.
    phase : common phase [rad]; seen only where beams interfere.
    label : how settings and components of this state are called; equal states may have different labels.

    Raises
    ------
    ParameterError : a bare angle in degrees; an ellipticity beyond 45 deg.

    Notes
    -----
    M. Born and E. Wolf, Principles of Optics, section 1.4.2. Angles may be sympy expressions.

    Examples
    --------
    >>> from fastaxis.units import deg
    >>> State(90*deg).stokes
    array([ 1., -1.,  0.,  0.])
    """

    azimuth: Scalar
    ellipticity: Scalar = 0.0
    phase: Scalar = 0.0
    label: str = field(default="", compare=False)

    @classmethod
    def spoken_for(cls, azimuth: Scalar, ellipticity: Scalar, label: str) -> State:
        """A state of angles whose missing degrees have been cautioned under the name they were given by."""
        state = object.__new__(cls)
        for name, value in (("azimuth", azimuth), ("ellipticity", ellipticity), ("phase", 0.0), ("label", label)):
            object.__setattr__(state, name, value)
        state._check()
        return state

    def __post_init__(self) -> None:
        checks.degrees_missed(self.label or "state", "azimuth", self.azimuth)
        self._check()

    def _check(self) -> None:
        part = self.label or "state"
        for angle in ("azimuth", "ellipticity", "phase"):
            object.__setattr__(self, angle, checks.angle(part, angle, getattr(self, angle)))
        # 1e-12: degrees times pi/180 carries three roundings.
        if not is_symbolic(self.ellipticity) and abs(self.ellipticity) > EIGHTH * (1 + 1e-12):
            raise ParameterError(
                "ellipticity lies between -45 and 45 degrees: at 45 degrees the ellipse is a circle",
                got=f"{part}: ellipticity = {self.ellipticity:g} rad",
                fix=self._folded(),
            )

    def _folded(self) -> str:
        """The same ellipse with its axes told long and short: beyond 45 degrees they have changed places."""
        if self.ellipticity == round(self.ellipticity) and abs(self.ellipticity) <= 45:
            return f"ellipticity={self.ellipticity:g}*deg"  # whole radians were meant as degrees
        beyond = math.remainder(self.ellipticity, math.pi)
        azimuth = self.azimuth
        if abs(beyond) > EIGHTH:
            beyond = math.copysign(math.pi / 2, beyond) - beyond
            azimuth = azimuth + math.pi / 2
        shown = f"({azimuth})" if is_symbolic(azimuth) else f"{math.degrees(math.remainder(azimuth, math.pi)):.9g}*deg"
        return f"azimuth={shown}, ellipticity={math.degrees(beyond):.9g}*deg"

    @property
    def symbols(self) -> set[Any]:
        """The letters among the angles."""
        return free_symbols((self.azimuth, self.ellipticity, self.phase))

    def linear(self, maths: Maths) -> tuple[Any, Any]:
        """(Ex, Ey) in a maths namespace, of unit power."""
        along, across = maths.cos(self.ellipticity), maths.sin(self.ellipticity)
        cos, sin = maths.cos(self.azimuth), maths.sin(self.azimuth)
        ex = cos * along + maths.number(1j) * (sin * across)
        ey = sin * along + maths.number(-1j) * (cos * across)
        return self._phased(maths, ex, ey)

    def circular(self, maths: Maths) -> tuple[Any, Any]:
        """(E_L, E_R) in a maths namespace: E_L = (Ex - i Ey)/sqrt 2, E_R = (Ex + i Ey)/sqrt 2."""
        left, right = self._circular_sizes(maths)
        return self._phased(maths, maths.phasor(-self.azimuth) * left, maths.phasor(self.azimuth) * right)

    def _circular_sizes(self, maths: Maths) -> tuple[Any, Any]:
        if is_symbolic(self.ellipticity):
            # A float pi/4 must not enter a symbolic angle.
            cos, sin = maths.cos(self.ellipticity), maths.sin(self.ellipticity)
            return maths.root(maths.half) * (cos - sin), maths.root(maths.half) * (cos + sin)
        # Not the difference of two rounded halves: R has exactly no L in it.
        return maths.cos(self.ellipticity + EIGHTH), maths.cos(self.ellipticity - EIGHTH)

    def _phased(self, maths: Maths, *components: Any) -> tuple[Any, Any]:
        if not is_symbolic(self.phase) and self.phase == 0:
            first, second = components
        else:
            first, second = (maths.phasor(self.phase) * component for component in components)
        return first, second

    def _need_numbers(self) -> None:
        if self.symbols:
            letter = min(map(str, self.symbols))
            raise SymbolError(
                "numbers can be had from a state without symbols only: put a number for each symbol",
                got=f"{self.label or 'state'}: symbol {letter} in azimuth = {self.azimuth}, "
                f"ellipticity = {self.ellipticity}, phase = {self.phase}",
                fix="azimuth=22.5*deg, ellipticity=0*deg, phase=0*deg",
            )

    @property
    def jones(self) -> NDArray[np.complex128]:
        """(Ex, Ey) as numbers, shape (2,), unit power."""
        self._need_numbers()
        return np.array(self.linear(NUMBERS), dtype=complex)

    @property
    def stokes(self) -> NDArray[np.float64]:
        """(1, S1, S2, S3) as numbers, shape (4,), with S3 = I_R - I_L in the receiver's naming."""
        self._need_numbers()
        turn, hand = 2 * self.azimuth, 2 * self.ellipticity
        cos = NUMBERS.cos(hand)
        return np.array([1.0, NUMBERS.cos(turn) * cos, NUMBERS.sin(turn) * cos, NUMBERS.sin(hand)])

    @property
    def orthogonal(self) -> State:
        """The state that this one never passes: across, and of the other hand."""
        for one, other in ((H, V), (D, A), (R, L)):
            if self == one:
                return other
            if self == other:
                return one
        turned = self.azimuth + math.pi / 2
        if not is_symbolic(turned) and turned > math.pi / 2:
            turned -= math.pi
        return State(turned, -self.ellipticity, self.phase, f"not {self.label}" if self.label else "")


H = State(0.0, label="H")
V = State(2 * EIGHTH, label="V")
D = State(EIGHTH, label="D")
A = State(-EIGHTH, label="A")
R = State(0.0, EIGHTH, label="R")
L = State(0.0, -EIGHTH, label="L")
