"""Pure polarization states, as an ellipse: azimuth, ellipticity and a common phase."""

from __future__ import annotations

import cmath
import math
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis import checks
from fastaxis.errors import ParameterError, SymbolError
from fastaxis.maths import NUMBERS, Maths, Scalar, free_symbols, is_symbolic

__all__ = ["A", "D", "H", "L", "R", "State", "V", "elliptical", "from_jones", "from_stokes", "helicity", "linear"]

EIGHTH = math.pi / 4
ON_THE_SPHERE = 1e-6  # a point typed with six digits may be this far off the unit sphere


@dataclass(frozen=True)
class State:
    """A fully polarized state: E = exp(i phase) R(azimuth) (cos ellipticity, -i sin ellipticity).

    Parameters
    ----------
    azimuth : angle of the long axis [rad], counter-clockwise from x facing the source.
    ellipticity : arctan of short over long axis [rad], -45 .. 45 deg; positive is right-handed (clockwise in
        that view, negative helicity), so that R has +45 deg.
    phase : common phase [rad]; seen only where beams interfere.
    label : how settings and components of this state are called.

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
    label: str = ""

    def __post_init__(self) -> None:
        part = self.label or "state"
        for angle in ("azimuth", "ellipticity", "phase"):
            object.__setattr__(self, angle, checks.angle(part, angle, getattr(self, angle)))
        # 1e-12: degrees times pi/180 carries three roundings.
        if not is_symbolic(self.ellipticity) and abs(self.ellipticity) > EIGHTH * (1 + 1e-12):
            raise ParameterError(
                "ellipticity lies between -45 and 45 degrees: at 45 degrees the ellipse is a circle",
                got=f"{part}: ellipticity = {self.ellipticity:g} rad",
                fix=f"ellipticity={math.copysign(45, self.ellipticity):g}*deg",
            )

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


def _degrees(angle: Scalar) -> str:
    return str(angle) if is_symbolic(angle) else f"{math.degrees(angle):.6g}°"


def linear(angle: Scalar, *, label: str = "") -> State:
    """Linear light at an angle [rad], counter-clockwise from x facing the source.

    >>> from fastaxis.units import deg
    >>> linear(30*deg).label
    '30°'
    """
    angle = checks.angle("linear", "angle", angle)
    return State(angle, label=label or _degrees(angle))


def elliptical(azimuth: Scalar, ellipticity: Scalar, *, label: str = "") -> State:
    """Elliptical light with its long axis at ``azimuth`` [rad]; positive ``ellipticity`` [rad] is right-handed.

    >>> from fastaxis.units import deg
    >>> elliptical(25*deg, -12*deg).stokes.round(4)
    array([ 1.    ,  0.5872,  0.6998, -0.4067])
    """
    azimuth = checks.angle("elliptical", "azimuth", azimuth)
    ellipticity = checks.angle("elliptical", "ellipticity", ellipticity)
    return State(azimuth, ellipticity, label=label or f"{_degrees(azimuth)}, {_degrees(ellipticity)}")


def helicity(sign: int) -> State:
    """The circular state whose photons carry ``sign`` hbar along the beam: +1 is L, -1 is R.

    >>> helicity(+1).label
    'L'
    """
    if isinstance(sign, bool) or sign not in (1, -1):
        raise ParameterError(
            "the helicity of circular light is +1 or -1", got=f"helicity: sign = {sign!r}", fix="helicity(+1)"
        )
    return L if sign == 1 else R


def from_jones(ex: complex, ey: complex, *, label: str = "") -> State:
    """The state of a Jones vector of any length, its phase included.

    >>> from_jones(2, 2).stokes.round(12) + 0.0
    array([1., 0., 1., 0.])
    """
    for name, value in (("ex", ex), ("ey", ey)):
        if is_symbolic(value) and value.free_symbols:  # type: ignore[attr-defined]  # is_symbolic saw it
            raise SymbolError(
                "a Jones vector is taken in numbers; a state with symbols is declared by its ellipse",
                got=f"from_jones: {name} = {value}",
                fix='elliptical(sympy.Symbol("a", real=True), 0)',
            )
    ex, ey = complex(ex), complex(ey)
    length = math.hypot(abs(ex), abs(ey))
    if not math.isfinite(length) or length == 0:
        raise ParameterError(
            "a state needs a finite field that is not zero", got=f"from_jones: ({ex}, {ey})", fix="from_jones(1, 1j)"
        )
    ex, ey = ex / length, ey / length
    s1, s2 = abs(ex) ** 2 - abs(ey) ** 2, 2 * (ex.conjugate() * ey).real
    s3 = 2 * (ex * ey.conjugate()).imag
    azimuth, ellipticity = math.atan2(s2, s1) / 2, math.atan2(s3, math.hypot(s1, s2)) / 2
    bare_x, bare_y = State(azimuth, ellipticity).jones
    phase = cmath.phase(bare_x.conjugate() * ex + bare_y.conjugate() * ey)
    return State(azimuth, ellipticity, phase, label)


def from_stokes(s1: float, s2: float, s3: float, *, label: str = "") -> State:
    """The pure state at a point of the Poincare sphere (S1, S2, S3 divided by S0; S3 = I_R - I_L).

    >>> from_stokes(0, 0, 1).ellipticity == R.ellipticity
    True
    """
    s1, s2, s3 = (
        checks.number("from_stokes", n, v, fix="from_stokes(0, 0.6, 0.8)")
        for n, v in (("s1", s1), ("s2", s2), ("s3", s3))
    )
    if free_symbols((s1, s2, s3)):
        raise SymbolError(
            "a point on the sphere is taken in numbers; a state with symbols is declared by its ellipse",
            got=f"from_stokes: ({s1}, {s2}, {s3})",
            fix='elliptical(sympy.Symbol("a", real=True), 0)',
        )
    s1, s2, s3 = float(s1), float(s2), float(s3)
    degree = math.hypot(s1, s2, s3)
    if abs(degree - 1) > ON_THE_SPHERE:
        raise _off_the_sphere(s1, s2, s3, degree)
    return State(math.atan2(s2, s1) / 2, math.atan2(s3, math.hypot(s1, s2)) / 2, label=label)


def _off_the_sphere(s1: float, s2: float, s3: float, degree: float) -> ParameterError:
    got = f"from_stokes: ({s1:g}, {s2:g}, {s3:g})"
    if degree == 0:
        return ParameterError(
            "zero Stokes parameters have no state: unpolarized light is a mixture", got=got, fix="UNPOLARIZED"
        )
    pure = f"from_stokes({s1 / degree:.9g}, {s2 / degree:.9g}, {s3 / degree:.9g})"
    if degree < 1:
        return ParameterError(
            f"a pure state has s1^2 + s2^2 + s3^2 = 1, this light is polarized to {degree:.6g}: it is a mixture",
            got=got,
            fix=f"partially_polarized({pure}, {degree:.9g})",
        )
    return ParameterError(
        "s1^2 + s2^2 + s3^2 is at most 1: divide by S0, and make partly polarized light with partially_polarized",
        got=got,
        fix=pure,
    )
