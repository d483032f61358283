"""What one smooth surface does to light: Fresnel's amplitudes for glass and metal, outside and inside."""

from __future__ import annotations

import cmath
from dataclasses import dataclass
from math import asin, cos, degrees, pi, sin
from typing import Any

from fastaxis import checks
from fastaxis.errors import ParameterError, SymbolError
from fastaxis.laws import Amplitude
from fastaxis.maths import is_symbolic

__all__ = ["Surface", "amplitude", "glass_index", "incidence_angle", "metal_index", "quarter_wave_reflectance"]


@dataclass(frozen=True, kw_only=True)
class Surface:
    """A plane surface between two media, met at an angle: Fresnel's r and t for p and s light.

    With n1 before, n2 behind, c = cos(incidence) and q = sqrt(n2^2 - n1^2 sin^2(incidence)), the root that decays
    behind the surface under exp(-iwt):

        rs = (n1 c - q)/(n1 c + q)        ts = 2 n1 c/(n1 c + q)
        rp = (n2^2 c - n1 q)/(n2^2 c + n1 q)    tp = 2 n1 n2 c/(n2^2 c + n1 q)

    The sign of rp is that of Born & Wolf and of Hecht, rp = -rs at normal incidence: the p directions before and after
    make right-handed triples (p, s, k) with the same s. This is the frame that follows the beam, so a mirror is
    diag(rp, rs) as it stands, and a perfect conductor (rp = 1, rs = -1) is the ideal mirror diag(1, -1).

    Parameters
    ----------
    before : index of the medium that the light comes from; real.
    behind : index n + ik of the medium behind, k >= 0 where it absorbs.
    incidence : angle between beam and normal [rad], 0 up to a right angle.

    Notes
    -----
    M. Born and E. Wolf, Principles of Optics, 7th ed. (1999), sections 1.5.2 and 14.2; E. Hecht, Optics, 4th ed.
    (2002), section 4.6.

    Examples
    --------
    >>> glass = Surface(behind=1.5, incidence=0.0)
    >>> round(glass.rp.real, 12), round(glass.rs.real, 12)
    (0.2, -0.2)
    """

    before: float = 1.0
    behind: complex
    incidence: float

    @property
    def _across(self) -> complex:
        """q: the part of the wave vector across the surface behind it, in units of the vacuum's."""
        # The square of n + ik with k >= 0 has its principal root in the quadrant of decaying, forward waves.
        return cmath.sqrt(complex(self.behind) ** 2 - (self.before * sin(self.incidence)) ** 2)

    @property
    def rs(self) -> complex:
        """Amplitude reflected, across the plane of incidence."""
        before, q = self.before * cos(self.incidence), self._across
        return (before - q) / (before + q)

    @property
    def rp(self) -> complex:
        """Amplitude reflected, in the plane of incidence."""
        before, q = complex(self.behind) ** 2 * cos(self.incidence), self.before * self._across
        return (before - q) / (before + q)

    @property
    def ts(self) -> complex:
        """Amplitude passed, across the plane of incidence."""
        return 1 + self.rs

    @property
    def tp(self) -> complex:
        """Amplitude passed, in the plane of incidence."""
        return (1 + self.rp) * self.before / self.behind

    @property
    def Rp(self) -> float:
        """Share of the p power reflected; at most 1 whatever the rounding."""
        return min(abs(self.rp) ** 2, 1.0)

    @property
    def Rs(self) -> float:
        """Share of the s power reflected."""
        return min(abs(self.rs) ** 2, 1.0)

    @property
    def Tp(self) -> float:
        """Share of the p power that enters the medium behind: n2 cos(behind)/(n1 cos(before)) |tp|^2 for glass."""
        normal = (self._across * (complex(self.behind).conjugate() / self.behind)).real
        return max(normal / (self.before * cos(self.incidence)), 0.0) * abs(self.tp) ** 2

    @property
    def Ts(self) -> float:
        """Share of the s power that enters the medium behind."""
        return self._across.real / (self.before * cos(self.incidence)) * abs(self.ts) ** 2

    @property
    def total(self) -> bool:
        """Whether all light is reflected: a clear medium behind, met beyond the critical angle."""
        behind = complex(self.behind)
        return behind.imag == 0 and behind.real < self.before * sin(self.incidence)

    @property
    def refraction(self) -> float:
        """Angle of the passed light to the normal behind a clear surface [rad]."""
        return asin(self.before * sin(self.incidence) / complex(self.behind).real)


def quarter_wave_reflectance(index: float, layer: float, detuning: float = 1.0) -> float:
    """Power reflected by glass behind one clear layer, in air at normal incidence.

    r = (r1 + r2 e^(2ib))/(1 + r1 r2 e^(2ib)) with b = detuning * pi/2; ``detuning`` is the wavelength for which the
    layer is a quarter wave over the wavelength used. H. A. Macleod, Thin-Film Optical Filters, 4th ed. (2010), ch. 2.

    >>> round(quarter_wave_reflectance(1.52, 1.38), 8)
    0.01260079
    """
    first, second = (1 - layer) / (1 + layer), (layer - index) / (layer + index)
    turn = cmath.exp(1j * pi * detuning)
    return float(abs((first + second * turn) / (1 + first * second * turn)) ** 2)


def amplitude(value: complex, times: int = 1) -> Amplitude:
    """A complex amplitude, met some times, as power and phase."""
    value = complex(value.real, value.imag + 0.0)  # a zero of negative sign would turn pi into -pi
    # Rounding may leave a total reflection a last digit above 1.
    return Amplitude(min(abs(value) ** (2 * times), 1.0), times * cmath.phase(value))


def _plain(part: str, parameter: str, value: Any, fix: str) -> complex:
    if is_symbolic(value) and getattr(value, "free_symbols", None):
        raise SymbolError(
            f"Fresnel's amplitudes are worked out in numbers: {parameter} can't be a letter",
            got=f"{part}: {parameter} = {value}",
            fix=fix,
        )
    try:
        number = complex(value) if not isinstance(value, bool | str) else complex("nan")
    except (TypeError, ValueError):
        number = complex("nan")
    if not cmath.isfinite(number):
        raise ParameterError(f"{parameter} must be one finite number", got=f"{part}: {parameter} = {value}", fix=fix)
    return number


def glass_index(part: str, parameter: str, value: Any) -> float:
    """The refractive index of a clear medium, 1 or more."""
    fix = f"{parameter}=1.515"
    number = _plain(part, parameter, value, fix)
    if number.imag != 0 or number.real < 1:
        raise ParameterError(
            f"{parameter} is the refractive index of clear glass: real, and 1 or more",
            got=f"{part}: {parameter} = {value}",
            fix=fix,
        )
    return number.real


def metal_index(part: str, parameter: str, value: Any) -> complex:
    """The index n + ik of a medium that may absorb."""
    number = _plain(part, parameter, value, f"{parameter}=0.056 + 4.28j")
    if number.real <= 0 or number.imag < 0:
        right = complex(abs(number.real), abs(number.imag))
        raise ParameterError(
            f"{parameter} is n + ik with n above 0 and k not below 0: under exp(-iwt) a positive k absorbs",
            got=f"{part}: {parameter} = {value}",
            fix=f"{parameter}={right.real or 0.1:g} + {right.imag:g}j",
        )
    return number


def incidence_angle(part: str, parameter: str, value: Any, *, most: float = pi / 2) -> float:
    """An angle between beam and normal, below a right angle."""
    _plain(part, parameter, value, f"{parameter}=45*deg")
    angle = float(checks.angle(part, parameter, value))
    if not 0 <= angle < most:
        raise ParameterError(
            f"{parameter} is an angle of 0 deg up to below {degrees(most):g} deg, from beam to normal",
            got=f"{part}: {parameter} = {degrees(angle):g} deg",
            fix=f"{parameter}={min(45.0, degrees(most) / 2):g}*deg",
        )
    return angle
