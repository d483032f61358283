"""Closed forms of paraxial light behind a ray matrix, written from handbooks and without the library.

Each gives the amplitude of a beam of 1 W from the integral of S. A. Collins, J. Opt. Soc. Am. 60, 1168 (1970),

    u(r) = k/(iB) exp(ik D r^2/2B) sum over l of (-i)^l exp(il phi) int exp(ik A s^2/2B) u_l(s) J_l(k r s/B) s ds,

for exp(-iwt), without the carrier exp(ikz). Places lie on the axis phi = 0.
"""

import mpmath
import numpy as np
from scipy.special import eval_genlaguerre, factorial, ive, j1


def matrix(*parts):
    """Ray matrix of sections in the order the light meets them: lengths [m] of space, ("lens", focal length)."""
    whole = np.eye(2)
    for part in parts:
        step = [[1, 0], [-1 / part[1], 1]] if isinstance(part, tuple) else [[1, part], [0, 1]]
        whole = np.array(step) @ whole
    return whole


def laguerre(p, l, waist, wavelength, rays, r):
    """Laguerre-Gauss mode, waist at the start. A. E. Siegman, Lasers (1986), sections 17.5 and 20.5, from memory."""
    (a, b), (c, d) = rays
    start = 1j * wavelength / (np.pi * waist**2)  # 1/q
    grown = a + b * start
    width, bend = waist * abs(grown), (c + d * start) / grown
    x = np.sqrt(2) * r / width
    peak = np.sqrt(2 * factorial(p) / (np.pi * factorial(p + abs(l)))) / width
    shape = x ** abs(l) * eval_genlaguerre(p, abs(l), x**2)
    return peak * shape * np.exp(1j * np.pi / wavelength * bend * r**2 - 1j * (2 * p + abs(l) + 1) * np.angle(grown))


def _vortex_numbers(waist, wavelength, rays, r):
    (a, b), (_, d) = rays
    k = 2 * np.pi / wavelength
    front = np.sqrt(2 / np.pi) / waist * k / (1j * b) * np.exp(0.5j * k * d / b * r**2)
    return front, 1 / waist**2 - 0.5j * k * a / b, k * r / b


def vortex(charge, waist, wavelength, rays, r):
    """A Gaussian with exp(il phi) put on its waist; r > 0.

    Difference of modified Bessel functions, from M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions
    (1964), 11.4.31, by one integration by parts; V. V. Kotlyar et al., J. Opt. Soc. Am. A 22, 849 (2005).
    """
    front, alpha, beta = _vortex_numbers(waist, wavelength, rays, r)
    l, z = abs(charge), beta**2 / (8 * alpha)
    rings = np.exp(-1j * z.imag) * (ive((l - 1) / 2, z) - ive((l + 1) / 2, z))
    return front * (-1j) ** l * np.sqrt(np.pi) * beta / (8 * alpha**1.5) * rings


def vortex_by_kummer(charge, waist, wavelength, rays, r):
    """The same to 30 digits by Kummer's function: Abramowitz and Stegun, 11.4.28."""
    front, alpha, beta = _vortex_numbers(waist, wavelength, rays, r)
    l = abs(charge)
    with mpmath.workdps(60):  # Kummer's series cancels by up to exp(|z|)
        z = mpmath.mpf(beta) ** 2 / (4 * mpmath.mpc(alpha))
        half = mpmath.mpf(l) / 2 + 1
        value = mpmath.gamma(half) / (2 * mpmath.factorial(l)) * z ** (half - 1) / mpmath.mpc(alpha)
        return front * (-1j) ** l * complex(value * mpmath.hyp1f1(half, l + 1, -z))


def airy(radius, focal, wavelength, r):
    """An evenly lit hole in the focus. M. Born and E. Wolf, Principles of Optics, 7th ed. (1999), section 8.5.2."""
    k = 2 * np.pi / wavelength
    v = k * radius * r / focal
    bright = np.sqrt(np.pi) * radius / (1j * wavelength * focal)
    return bright * np.where(v == 0, 1, 2 * j1(v) / np.where(v == 0, 1, v)) * np.exp(0.5j * k / focal * r**2)


def lommel(radius, distance, wavelength, r):
    """An evenly lit hole and a space, by Lommel's functions U1, U2. Born and Wolf, section 8.8.1; r > 0."""
    k = 2 * np.pi / wavelength
    u, v = k * radius**2 / distance, k * radius * r / distance
    disc = np.array([_disc(u, one) for one in v])
    return k * radius / (1j * distance * np.sqrt(np.pi)) * np.exp(0.5j * k / distance * r**2) * disc


def _disc(u, v):
    """int_0^1 exp(iu s^2/2) J0(v s) s ds; the series cancels by up to exp(u/2)."""
    with mpmath.workdps(30):
        terms = [(mpmath.mpf(u) / v) ** n * mpmath.besselj(n, v) for n in range(1, 41)]
        u1, u2 = (sum((-1) ** s * term for s, term in enumerate(terms[first::2])) for first in (0, 1))
        return complex((u1 - 1j * u2) * mpmath.expj(u / 2) / u)


def on_axis_behind_hole(radius, waist, wavelength, rays):
    """A Gaussian cut by a hole at its waist, on the axis: the integral of Collins is an elementary one there."""
    front, alpha, _ = _vortex_numbers(waist, wavelength, rays, np.zeros(1))
    return -front * np.expm1(-alpha * radius**2) / (2 * alpha)
