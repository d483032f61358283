"""Short travel: only the light around the geometric image of a place, and the light from the axis, reach it.

With alpha = k a/2b the kernel of the Collins integral is exp(i alpha (r - r'/a)^2) times something slow. Far from the
axis the integral therefore lives

* in a window of t = sqrt|alpha| (r - r'/|a|), |t| < 15, cut softly, where the trapezoidal rule converges
  geometrically: 150 nodes a place, whatever the distance; and
* at r = 0, if the field is not smooth there (a spiral plate): the wave from the axis, an asymptotic series in 1/r'.

Near the axis the whole integral is done up to a soft end. Erdelyi, Asymptotic Expansions (1956), ch. 2.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from functools import cached_property
from weakref import WeakKeyDictionary

import numpy as np
from numpy.polynomial import Chebyshev, Polynomial
from scipy.special import erf, gamma, rgamma

from fastaxis.engines.azimuthal.collins import Collins, turn
from fastaxis.engines.azimuthal.panels import Complexes, Profile, Reals
from fastaxis.engines.azimuthal.table import Table, table_of
from fastaxis.engines.azimuthal.taper import Taper

__all__ = ["Nearby", "suits"]

MIDDLE = 8.5  # middle of the window's edges in t; with edges of width 1, exp(-MIDDLE^2/2) = 2e-16 is left of the cut
EDGE = 5.9  # erf(5.9) is 1 to the last digit
STEP = 0.19  # below pi/(MIDDLE + EDGE): the chirp at the end of the window still has two nodes a fringe
INNER = 18.0  # t of the places near the axis; beyond, terms of the series fall by 1/400 each
SMOOTH = 5.0  # largest t by which light at an angle may shift an image
TERMS = 17  # of the Taylor series of the field about the axis
LEAST = 1e-17  # of a term of Hankel's series that counts
MOST_CHARGE = 12  # the phase of a kernel of high order is no longer nearly linear within the window

TABLES: WeakKeyDictionary[Profile, Table] = WeakKeyDictionary()


def suits(section: Collins) -> bool:
    """Whether the light is smooth compared with sqrt(b/k), so that this is exact and cheaper than all of it."""
    flat, profile = section.flat, section.profile
    if flat.a == 0 or profile.start > 0 or max(abs(l) for l in section.charges) > MOST_CHARGE:
        return False
    # The last four nodes, for one alone may stand at a dark ring.
    ends = section.taper is not None or abs(profile.values[:, -1, -4:]).max() <= 1e-12 * profile.peak
    root = math.sqrt(section.wavenumber * abs(flat.a / flat.b) / 2)
    shift = profile.highest_frequency / (2 * root)
    return bool(ends and shift < SMOOTH)


@dataclass(frozen=True, eq=False)
class Nearby:
    """The field behind a short section, asked as :class:`Collins` is."""

    section: Collins
    margin: float = 1.0

    @property
    def behind(self) -> float:
        """Curvature 1/R [1/m] of the phase front behind that the field is relative to."""
        return self.section.behind

    def finer(self) -> Nearby:
        """Wider windows, nodes closer together."""
        return Nearby(self.section.finer(), self.margin * 1.3)

    def hardest(self, r: Reals) -> list[int]:
        """Which of some output radii are carried worst: of those near the axis, if there are any."""
        return self.core.hardest(r[: max(1, np.count_nonzero(r <= self.inner * abs(self.section.flat.a)))])

    def phases(self, reach: float) -> float:
        """Phases [rad] within the windows only: the large ones cancel before they are rounded."""
        return 1 + (self.inner * self.root) ** 2

    @cached_property
    def root(self) -> float:
        """sqrt|alpha| [1/m]."""
        flat = self.section.flat
        return math.sqrt(self.section.wavenumber * abs(flat.a / flat.b) / 2)

    @cached_property
    def middle(self) -> float:
        """Middle of the window's edges; light at an angle shifts the image by its own t."""
        return (MIDDLE + self.section.profile.highest_frequency / (2 * self.root)) * self.margin

    @cached_property
    def inner(self) -> float:
        """Radius [m] before the section up to whose image all of the light near the axis is summed."""
        return (INNER + 3 * (self.middle - MIDDLE) + max(abs(l) for l in self.section.charges)) / self.root

    @property
    def table(self) -> Table:
        """One for all fronts and windows that the same light is asked with."""
        profile = self.section.profile
        if profile not in TABLES:
            TABLES[profile] = table_of(profile, profile.end)
        return TABLES[profile]

    def __call__(self, r: Reals) -> Complexes:
        """The fields at radii r [m], relative to the front behind; shape (functions, len(r))."""
        near = r <= self.inner * abs(self.section.flat.a)
        out = np.empty((len(self.section.charges), len(r)), dtype=complex)
        if near.any():
            out[:, near] = self.core(r[near])
        for some in np.array_split(np.flatnonzero(~near), 1 + np.count_nonzero(~near) // 1024):
            if len(some):
                out[:, some] = self._image(r[some]) + self._axis_wave(r[some])
        return out

    @cached_property
    def core(self) -> Collins:
        """The section that places near the axis are reached by: all of the light around it, up to a soft end."""
        start = self.inner + (self.middle - EDGE) / self.root
        end = start + 2 * EDGE / self.root
        if self.section.taper and self.section.taper.start < end:
            return self.section
        return replace(self.section, profile=self.section.profile.clipped(0.0, end), taper=Taper(start, end))

    def _image(self, r: Reals) -> Complexes:
        """The window about the geometric image, by the branch of the Bessel function that is stationary there."""
        section, flat, k = self.section, self.section.flat, self.section.wavenumber
        sign = 1 if flat.a * flat.b > 0 else -1
        step = STEP / self.margin * MIDDLE / self.middle
        count = math.ceil((self.middle + EDGE) / step)
        t = np.arange(-count, count + 1, dtype=float) * step
        window = np.exp(1j * sign * t**2) * _window(t, self.middle) * (step / self.root)
        before = r[:, np.newaxis] / abs(flat.a) + t / self.root
        x = k / abs(flat.b) * r[:, np.newaxis] * before
        fields = self.table(before) * (before / np.sqrt(2 * math.pi * x))
        if section.taper:
            fields = fields * section.taper(before)
        out = np.empty((len(section.charges), len(r)), dtype=complex)
        for row, charge in enumerate(section.charges):
            slow = _slow(abs(charge), x, sign)
            out[row] = (
                np.einsum("rt,rt,t->r", fields[row], slow, window)
                * turn(charge, flat.b)
                * np.exp(1j * sign * (abs(charge) / 2 + 0.25) * math.pi)
            )
        return np.asarray(out * (k / flat.b * np.exp(1j * k / 2 * flat.c / flat.a * r**2)))

    def _axis_wave(self, r: Reals) -> Complexes:
        """Sum of c_n int r^(n+1) J_l(s r) dr = c_n 2^(n+1) s^(-n-2) Gamma((l+n+2)/2)/Gamma((l-n)/2)."""
        section, flat, k = self.section, self.section.flat, self.section.wavenumber
        s = k / abs(flat.b) * r
        out = np.zeros((len(section.charges), len(r)), dtype=complex)
        powers, further = np.arange(TERMS), 1 / (s * self._unit)
        for row, (charge, series) in enumerate(zip(section.charges, self._series, strict=True)):
            l = abs(charge)
            moments = 2.0 ** (powers + 1) * gamma((l + powers + 2) / 2) * rgamma((l - powers) / 2)
            total = np.zeros(len(r), dtype=complex)
            for number in (series * moments)[::-1]:
                total *= further
                total += number
            out[row] = total / s**2 * turn(charge, flat.b)
        return np.asarray(out * (k / flat.b * np.exp(1j * k / 2 * flat.d / flat.b * r**2)))

    @property
    def _unit(self) -> float:
        """Length [m] that the Taylor series counts in."""
        return 4 / max(self.section.profile.highest_frequency, 4 / self.section.profile.end)

    @cached_property
    def _series(self) -> Complexes:
        """Taylor coefficients of f(r) exp(i alpha r^2) about the axis in r/unit, shape (functions, TERMS)."""
        flat, unit = self.section.flat, self._unit
        values = self.section.profile(unit * PLACES)
        alpha = self.section.wavenumber * flat.a / flat.b / 2
        chirp = np.zeros(TERMS, dtype=complex)
        for j in range((TERMS + 1) // 2):
            chirp[2 * j] = (1j * alpha * unit**2) ** j / math.factorial(j)
        return np.array([np.convolve(TO_TAYLOR @ value, chirp)[:TERMS] for value in values])


def _to_taylor() -> tuple[Reals, Reals]:
    """Chebyshev points u in [0, 1], and the matrix from values there to coefficients of powers of u."""
    points = np.cos(np.pi * (np.arange(TERMS) + 0.5) / TERMS)
    shifted = np.zeros((TERMS, TERMS))
    for j in range(TERMS):
        basis = Chebyshev.basis(j, domain=[0, 1])
        shifted[: j + 1, j] = basis.convert(kind=Polynomial, domain=[-1, 1], window=[-1, 1]).coef
    fit = np.cos(np.multiply.outer(np.arange(TERMS), np.arccos(points))) * (2 / TERMS)
    fit[0] /= 2
    return (1 + points) / 2, shifted @ fit


PLACES, TO_TAYLOR = _to_taylor()


def _window(t: Reals, middle: float) -> Reals:
    return np.asarray((erf(t + middle) - erf(t - middle)) / 2)


def _slow(order: int, x: Reals, sign: int) -> Complexes:
    """H_l(x) sqrt(pi x/2) without its exponential: Hankel's series sum of a_j (+-i/x)^j (DLMF 10.17.5)."""
    terms, nearest = [1.0], float(x.min())
    for j in range(1, 2 * order + 10):
        terms.append(terms[-1] * (4 * order**2 - (2 * j - 1) ** 2) / (8 * j))
        if abs(terms[-1]) < LEAST * nearest**j:
            break
    inverse, total = -1j * sign / x, np.zeros_like(x, dtype=complex)
    for term in reversed(terms):
        total *= inverse
        total += term
    return total
