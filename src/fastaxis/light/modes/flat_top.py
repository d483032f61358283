"""A disc of even light, with a hard or a soft edge."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any, ClassVar

import numpy as np
from numpy.typing import ArrayLike

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.light.modes.base import Complexes, Mode, Moments, places, require_numbers, waist
from fastaxis.light.modes.quadrature import over_disc
from fastaxis.maths import Scalar, free_symbols, is_symbolic

__all__ = ["FlatTop"]


@dataclass(frozen=True)
class FlatTop:
    """Flat phase and an even irradiance: a disc, or |u|^2 ~ exp(-2 (r/radius)^order).

    Parameters
    ----------
    radius : radius [m] of the disc, or where the irradiance has fallen to 1/e^2.
    order : None for a hard edge; 2 for a Gaussian beam; the higher, the steeper.
    centre : (x, y) of the middle [m].

    Raises
    ------
    ParameterError : a radius that is not positive, or above 1 m; an order below 2.

    Notes
    -----
    A hard edge has an infinite variance of angle (ISO 11146-1 names the case).

    Examples
    --------
    >>> from fastaxis.units import mm, nm
    >>> round(FlatTop(radius=1*mm).moments(532*nm).x2 / (1*mm)**2, 12)
    0.25
    """

    radius: Scalar
    order: float | None = None
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    infinite: ClassVar[bool] = False

    def __post_init__(self) -> None:
        object.__setattr__(self, "radius", waist("FlatTop", "radius", self.radius))
        object.__setattr__(self, "centre", checks.centre("FlatTop", self.centre))
        if self.order is not None:
            order = checks.number("FlatTop", "order", self.order, fix="order=10")
            if not is_symbolic(order) and order < 2:
                raise ParameterError(
                    "the order of a flat top is 2 (Gaussian) or more", got=f"FlatTop: order = {order:g}", fix="order=10"
                )
            object.__setattr__(self, "order", order)

    @property
    def hard(self) -> bool:
        return self.order is None

    @property
    def charge(self) -> int | None:
        return 0 if all(not is_symbolic(c) and c == 0 for c in self.centre) else None

    @property
    def symbols(self) -> set[Any]:
        return free_symbols(vars(self).values())

    def amplitude(self, x: ArrayLike, y: ArrayLike, wavelength: float) -> Complexes:
        """Amplitude [1/m] of unit power at the places (x, y) [m]; real."""
        require_numbers(self)
        s = np.hypot(*places(x, y, self.centre)) / float(self.radius)
        shape = s <= 1 if self.order is None else np.exp(-(s**self.order))
        return np.asarray(shape / math.sqrt(self._area), dtype=np.complex128)

    def radial(self, r: ArrayLike, wavelength: float) -> Complexes:
        """f(r) [1/m]."""
        return self.amplitude(r, 0.0, wavelength)

    @property
    def _area(self) -> float:
        """Integral of exp(-2 s^n) over the plane: pi radius^2 (2/n) Gamma(2/n) 2^(-2/n)."""
        disc = float(math.pi * self.radius**2)
        if self.order is None:
            return disc
        return disc * (2 / self.order) * math.gamma(2 / self.order) * 2 ** (-2 / self.order)

    def curvature(self, wavelength: float) -> float:
        """Flat."""
        return 0.0

    def moments(self, wavelength: float) -> Moments:
        """x2 = radius^2/4 and no finite t2 for a disc; Gamma functions of the order for a soft edge."""
        require_numbers(self)
        if self.order is None:
            return Moments(x2=float(self.radius) ** 2 / 4, xt=0.0, t2=math.inf)
        n = self.order
        x2 = float(self.radius) ** 2 / 2 * 2 ** (-2 / n) * math.gamma(4 / n) / math.gamma(2 / n)
        slope = n**2 * 2 ** (2 / n) / (4 * math.gamma(2 / n) * float(self.radius) ** 2)  # mean of |du/dr|^2
        return Moments(x2=x2, xt=0.0, t2=slope / 2 * (wavelength / (2 * math.pi)) ** 2)

    @property
    def reach(self) -> float:
        """Radius [m] that holds all of the amplitude, to the last digit of it for a soft edge."""
        # exp(-37) is below the rounding of 1.
        return float(self.radius) if self.order is None else float(self.radius * 37 ** (1 / self.order))

    def overlap(self, other: Mode, wavelength: float) -> complex:
        """<self|other>, by quadrature over the disc."""
        require_numbers(self)
        if isinstance(other, FlatTop):
            return self._with_flat_top(other, wavelength)
        if other.infinite or not hasattr(other, "centre"):
            return other.overlap(self, wavelength).conjugate()
        return over_disc((self, other), wavelength, centre=self.centre, radius=self.reach)

    def _with_flat_top(self, other: FlatTop, wavelength: float) -> complex:
        require_numbers(other)
        if self.hard and other.hard:
            distance = math.dist(self.centre, other.centre)
            shared = _shared_area(float(self.radius), float(other.radius), distance)
            return complex(shared / (math.pi * self.radius * other.radius))
        # Integrate where the hard edge is the border of the region, not inside it.
        region = other if other.hard else self
        return over_disc((self, other), wavelength, centre=region.centre, radius=region.reach)


def _shared_area(a: float, b: float, distance: float) -> float:
    """Area that two discs share."""
    if distance >= a + b:
        return 0.0
    if distance <= abs(a - b):
        return math.pi * min(a, b) ** 2
    half_a = math.acos((distance**2 + a**2 - b**2) / (2 * distance * a))
    half_b = math.acos((distance**2 + b**2 - a**2) / (2 * distance * b))
    kite = distance * a * math.sin(half_a)
    return a**2 * half_a + b**2 * half_b - kite
