"""What Gaussian, Laguerre-Gauss and Hermite-Gauss modes share: one waist, one Rayleigh range, exact travel.

For exp(-i w t), with z measured from the waist (the source plane is at z = -waist_at):
u = P(x, y)/w exp(-r^2/w^2) exp(+i k r^2/2R) exp(-i N zeta), N = 2p + |l| + 1 or m + n + 1.
"""

from __future__ import annotations

import math
from abc import ABC, abstractmethod
from dataclasses import Field, replace
from typing import Any, ClassVar, Self

import numpy as np
from numpy.typing import ArrayLike, NDArray

from fastaxis.light.modes.base import Complexes, Mode, Moments, places, require_numbers
from fastaxis.maths import Scalar, free_symbols, is_symbolic

__all__ = ["GaussFamily"]


class GaussFamily(ABC):
    """Base of the modes that keep their shape under free space."""

    waist: Scalar
    waist_at: Scalar
    centre: tuple[Scalar, Scalar]

    # The members are dataclasses: that is how moved() copies them.
    __dataclass_fields__: ClassVar[dict[str, Field[Any]]]

    infinite: ClassVar[bool] = False
    hard: ClassVar[bool] = False

    @property
    @abstractmethod
    def charge(self) -> int | None:
        """The l of a mode f(r) exp(i l phi) on the axis, else None."""

    @property
    @abstractmethod
    def degree(self) -> int:
        """Degree N - 1 of the polynomial: the Gouy phase is N zeta."""

    @property
    @abstractmethod
    def quality(self) -> int:
        """Beam quality M^2 of the worse axis."""

    @abstractmethod
    def polynomial(self, u: Any, v: Any, *, conjugate: bool = False) -> Any:
        """P at u = sqrt(2) x/w, v = sqrt(2) y/w, as an entire function; ``conjugate`` conjugates its coefficients."""

    @property
    def symbols(self) -> set[Any]:
        return free_symbols(vars(self).values())

    @property
    def centred(self) -> bool:
        """Whether the mode sits on the axis of the beam."""
        return all(not is_symbolic(c) and c == 0 for c in self.centre)

    def rayleigh(self, wavelength: float) -> float:
        """Rayleigh range pi w0^2 / wavelength [m]."""
        require_numbers(self)
        return math.pi * float(self.waist) ** 2 / wavelength

    def width(self, wavelength: float) -> float:
        """Radius w [m] in the source plane."""
        reach = self.rayleigh(wavelength)
        return float(self.waist) * math.hypot(1, float(self.waist_at) / reach)

    def curvature(self, wavelength: float) -> float:
        """1/R [1/m] in the source plane; positive behind the waist."""
        reach = self.rayleigh(wavelength)
        z = -float(self.waist_at)
        return z / (z**2 + reach**2)

    def gouy(self, wavelength: float) -> float:
        """Gouy phase zeta [rad] of the source plane, from -pi/2 far before the waist to pi/2 far behind."""
        reach = self.rayleigh(wavelength)
        return math.atan2(-float(self.waist_at), reach)

    def moments(self, wavelength: float) -> Moments:
        """Second moments: M^2 times those of a Gaussian beam."""
        reach = self.rayleigh(wavelength)
        z, spread = -float(self.waist_at), self.quality * (float(self.waist) / reach) ** 2 / 4
        return Moments(x2=spread * (z**2 + reach**2), xt=z * spread, t2=spread)

    def moved(self, distance: float) -> Self:
        """The mode after a distance [m] of free space, exactly (the fast carrier exp(ikd) left out)."""
        return replace(self, waist_at=self.waist_at - distance)

    def q_inverse(self, wavelength: float) -> complex:
        """The a [1/m^2] of exp(-a r^2): 1/w^2 - i k/2R."""
        return 1 / self.width(wavelength) ** 2 - 1j * math.pi / wavelength * self.curvature(wavelength)

    def amplitude(self, x: ArrayLike, y: ArrayLike, wavelength: float) -> Complexes:
        """Complex amplitude [1/m] of unit power at the places (x, y) [m]."""
        require_numbers(self)
        dx, dy = places(x, y, self.centre)
        scale = math.sqrt(2) / self.width(wavelength)
        # Along rows and columns of a plane an exponential is a product of two lines.
        a, plane = -self.q_inverse(wavelength), np.broadcast(dx, dy).size > 2 * max(dx.size, dy.size)
        envelope = np.exp(a * dx * dx) * np.exp(a * dy * dy) if plane else np.exp(a * (dx * dx + dy * dy))
        return np.asarray(
            self.front_factor(wavelength) * self.polynomial(scale * dx, scale * dy) * envelope, dtype=np.complex128
        )

    def front_factor(self, wavelength: float) -> complex:
        """exp(-i N zeta)/w [1/m]."""
        turn = (self.degree + 1) * self.gouy(wavelength)
        return complex(math.cos(turn), -math.sin(turn)) / self.width(wavelength)

    def radial(self, r: ArrayLike, wavelength: float) -> Complexes:
        """f(r) [1/m]: the amplitude along +x."""
        return self.amplitude(r, 0.0, wavelength)

    def overlap(self, other: Mode, wavelength: float) -> complex:
        """<self|other>: exact within the family; any other mode integrates with its own rule."""
        if isinstance(other, GaussFamily):
            return _exact_overlap(self, other, wavelength)
        return other.overlap(self, wavelength).conjugate()


def _exact_overlap(one: GaussFamily, other: GaussFamily, wavelength: float) -> complex:
    """Polynomial times complex Gaussian, by Gauss-Hermite nodes turned and moved into the complex plane.

    The integrand is entire, so the path may follow the steepest descent of exp(-a x^2 + b x + c), where the rule
    is exact for a polynomial of degree up to 2 nodes - 1.
    """
    a_one, a_other = one.q_inverse(wavelength).conjugate(), other.q_inverse(wavelength)
    t, weights = np.polynomial.hermite.hermgauss((one.degree + other.degree) // 2 + 1)
    root = np.sqrt(a_one + a_other)
    nodes, rest = [], 0j
    for places_of_both in zip(one.centre, other.centre, strict=True):
        c_one, c_other = map(float, places_of_both)
        middle = (a_one * c_one + a_other * c_other) / (a_one + a_other)
        rest -= a_one * a_other / (a_one + a_other) * (c_one - c_other) ** 2
        nodes.append(middle + t / root)
    x, y = np.meshgrid(nodes[0], nodes[1])
    product = _bare(one, x, y, wavelength, conjugate=True) * _bare(other, x, y, wavelength, conjugate=False)
    front = one.front_factor(wavelength).conjugate() * other.front_factor(wavelength)
    return complex(front * np.exp(rest) / root**2 * np.sum(np.outer(weights, weights) * product))


def _bare(mode: GaussFamily, x: NDArray[Any], y: NDArray[Any], wavelength: float, *, conjugate: bool) -> Any:
    scale = math.sqrt(2) / mode.width(wavelength)
    return mode.polynomial(
        scale * (x - float(mode.centre[0])), scale * (y - float(mode.centre[1])), conjugate=conjugate
    )
