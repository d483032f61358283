"""Benches about one axis, and the closed form of a Gaussian beam behind a spiral plate and an ABCD section."""

import mpmath
import numpy as np
import pytest

from fastaxis.elements import Camera, Laser
from fastaxis.engines.azimuthal import Settings, run
from fastaxis.light import H
from fastaxis.plan import make_plan
from fastaxis.train import Train
from fastaxis.units import nm, um

WAVELENGTH = 632.8 * nm


@pytest.fixture
def bench():
    """A train of a laser, some parts and a camera."""

    def build(mode, *parts, state=H, power=1.0, beam=None):
        shape = {"beam": beam} if beam else {"mode": mode, "state": state}
        laser = Laser(power=power, name="laser", **shape)
        return Train(wavelength=WAVELENGTH).along(laser, *parts, Camera(pixel=10 * um, shape=(64, 64), name="cam"))

    return build


@pytest.fixture
def arrive(bench):
    """The light behind some parts, by the azimuthal engine."""

    def build(mode, *parts, settings=None, **options):
        plan = make_plan(bench(mode, *parts, **options), "cam", engine="azimuthal")
        return run(plan.branches[0], settings or Settings())

    return build


@pytest.fixture
def vortex():
    """f_l(r') of a Gaussian beam at its waist behind a plate exp(i l phi) and a section (a, b, d), unit power.

    Collins integral of exp(-alpha r^2) J_l(beta r) r dr = (beta/2)^l Gamma(l/2 + 1) / (2 alpha^(l/2+1) Gamma(l+1))
    1F1(l/2 + 1; l + 1; -beta^2/4 alpha), Gradshteyn & Ryzhik 6.631.1, with alpha = 1/w^2 - i k a/2b and
    beta = k r'/b. In 40 digits, since its phases are large near the plate.
    """

    def field(l, waist, a, b, d, radii, wavelength=WAVELENGTH):
        with mpmath.workdps(40):
            k = 2 * mpmath.pi / mpmath.mpf(wavelength)
            w, a, b, d = (mpmath.mpf(float(v)) for v in (waist, a, b, d))
            order, alpha = abs(l), 1 / w**2 - 1j * k * a / (2 * b)
            front = (
                mpmath.sqrt(2 / mpmath.pi) / w * (-1j) ** (order + 1) * k / b * mpmath.gamma(mpmath.mpf(order) / 2 + 1)
            )
            values = []
            for r in map(mpmath.mpf, map(float, radii)):
                beta = k * r / b
                core = (beta / 2) ** order / (2 * alpha ** (mpmath.mpf(order) / 2 + 1) * mpmath.factorial(order))
                kummer = mpmath.hyp1f1(mpmath.mpf(order) / 2 + 1, order + 1, -(beta**2) / (4 * alpha))
                values.append(complex(front * mpmath.expj(k * d * r**2 / (2 * b)) * core * kummer))
        return np.array(values)

    return field
