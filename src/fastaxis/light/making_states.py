"""Ways to declare a state: by its angles, its hand, its Jones vector or its place on the Poincare sphere."""

from __future__ import annotations

import cmath
import math

from fastaxis import checks
from fastaxis.errors import ParameterError, SymbolError
from fastaxis.light.states import L, R, State
from fastaxis.maths import Scalar, free_symbols, is_symbolic

__all__ = ["elliptical", "from_jones", "from_stokes", "helicity", "linear"]

ON_THE_SPHERE = 1e-6  # a point typed with six digits may be this far off the unit sphere


def _degrees(angle: Scalar) -> str:
    return str(angle) if is_symbolic(angle) else f"{math.degrees(angle):.6g}°"


def linear(angle: Scalar, *, label: str = "") -> State:
    """Linear light at an angle [rad], counter-clockwise from x facing the source.

    >>> from fastaxis.units import deg
    >>> linear(30*deg).label
    '30°'
    """
    checks.degrees_missed("linear", "angle", angle)
    angle = checks.angle("linear", "angle", angle)
    return State.spoken_for(angle, 0.0, label or _degrees(angle))


def elliptical(azimuth: Scalar, ellipticity: Scalar, *, label: str = "") -> State:
    """Elliptical light with its long axis at ``azimuth`` [rad]; positive ``ellipticity`` [rad] is right-handed.

    >>> from fastaxis.units import deg
    >>> elliptical(25*deg, -12*deg).stokes.round(4)
    array([ 1.    ,  0.5872,  0.6998, -0.4067])
    """
    checks.degrees_missed("elliptical", "azimuth", azimuth)
    azimuth = checks.angle("elliptical", "azimuth", azimuth)
    ellipticity = checks.angle("elliptical", "ellipticity", ellipticity)
    return State.spoken_for(azimuth, ellipticity, label or f"{_degrees(azimuth)}, {_degrees(ellipticity)}")


def helicity(sign: int) -> State:
    """The circular state whose photons carry ``sign`` hbar along the beam: +1 is L, -1 is R.

    >>> helicity(+1).label
    'L'
    """
    if isinstance(sign, bool) or sign not in (1, -1):
        raise ParameterError(
            "the helicity of circular light is +1 or -1", got=f"helicity: sign = {sign!r}", fix="fa.helicity(+1)"
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
                fix='fa.elliptical(sympy.Symbol("a", real=True), 0)',
            )
    ex, ey = complex(ex), complex(ey)
    length = math.hypot(abs(ex), abs(ey))
    if not math.isfinite(length) or length == 0:
        raise ParameterError(
            "a state needs a finite field that is not zero", got=f"from_jones: ({ex}, {ey})", fix="fa.from_jones(1, 1j)"
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
        checks.number("from_stokes", n, v, fix="fa.from_stokes(0, 0.6, 0.8)")
        for n, v in (("s1", s1), ("s2", s2), ("s3", s3))
    )
    if free_symbols((s1, s2, s3)):
        raise SymbolError(
            "a point on the sphere is taken in numbers; a state with symbols is declared by its ellipse",
            got=f"from_stokes: ({s1}, {s2}, {s3})",
            fix='fa.elliptical(sympy.Symbol("a", real=True), 0)',
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
            "zero Stokes parameters have no state: unpolarized light is a mixture", got=got, fix="fa.UNPOLARIZED"
        )
    pure = f"fa.from_stokes({s1 / degree:.9g}, {s2 / degree:.9g}, {s3 / degree:.9g})"
    if degree < 1:
        return ParameterError(
            f"a pure state has s1^2 + s2^2 + s3^2 = 1, this light is polarized to {degree:.6g}: it is a mixture",
            got=got,
            fix=f"fa.partially_polarized({pure}, {degree:.9g})",
        )
    return ParameterError(
        "s1^2 + s2^2 + s3^2 is at most 1: divide by S0, and make partly polarized light with partially_polarized",
        got=got,
        fix=pure,
    )
