import math

import numpy as np
import pytest
import sympy
from scipy.integrate import quad

from fastaxis.errors import SamplingError, SymbolError
from fastaxis.light import FlatTop, Gaussian, HermiteGauss, LaguerreGauss, Mode
from fastaxis.units import mm, um

A = 1 * mm


def test_a_disc_is_even_and_ends_at_its_radius(wavelength):
    disc = FlatTop(A)
    inside, outside = disc.amplitude([0, 0.999 * mm], [0, 0], wavelength), disc.amplitude(1.001 * mm, 0, wavelength)
    np.testing.assert_allclose(abs(inside) ** 2 * np.pi * A**2, 1, rtol=1e-15)
    assert outside == 0
    assert disc.hard
    assert not disc.infinite
    assert isinstance(disc, Mode)


@pytest.mark.parametrize("order", [2, 3.5, 6, 20])
def test_a_soft_edge_has_unit_power_and_the_moments_of_its_light(order, wavelength):
    mode = FlatTop(A, order)
    field = lambda r: mode.radial(r * A, wavelength).real * A  # noqa: E731 - a formula
    slope = lambda r: -order * r ** (order - 1) * field(r)  # noqa: E731 - a formula
    around = lambda f: quad(lambda r: f(r) * 2 * np.pi * r, 0, 5, points=[0.8, 1.2], epsabs=1e-12)[0]  # noqa: E731 - a formula
    moments = mode.moments(wavelength)
    # quad is asked for 1e-12.
    assert around(lambda r: field(r) ** 2) == pytest.approx(1, abs=1e-11)
    assert moments.x2 / A**2 == pytest.approx(around(lambda r: r**2 * field(r) ** 2) / 2, abs=1e-11)
    spread = around(lambda r: slope(r) ** 2) / 2
    assert moments.t2 * (2 * np.pi * A / wavelength) ** 2 == pytest.approx(spread, rel=1e-10)
    assert mode.charge == 0
    assert not mode.hard


def test_order_two_is_the_gaussian(wavelength):
    flat, gaussian = FlatTop(A, 2), Gaussian(A)
    assert flat.amplitude(0.4 * mm, 0.2 * mm, wavelength) == pytest.approx(
        gaussian.amplitude(0.4 * mm, 0.2 * mm, wavelength), rel=1e-14
    )
    assert flat.moments(wavelength).quality(wavelength) == pytest.approx(1, rel=1e-14)
    assert flat.overlap(gaussian, wavelength) == pytest.approx(1, abs=1e-12)


def test_high_orders_come_to_the_disc(wavelength):
    # The edge of order n is 1/n wide: x2 comes to that of the disc as 1/n.
    off = [FlatTop(A, n).moments(wavelength).x2 / FlatTop(A).moments(wavelength).x2 - 1 for n in (100, 200, 400)]
    rate = np.polyfit(np.log([100, 200, 400]), np.log(np.abs(off)), 1)[0]
    assert rate == pytest.approx(-1, abs=0.05)


def test_a_disc_takes_its_share_of_a_gaussian(wavelength):
    # <disc|Gauss> = sqrt(2) (w/a) (1 - exp(-a^2/w^2)).
    for ratio in (0.5, 1.0, 1.7):
        expected = math.sqrt(2) * ratio * (1 - math.exp(-1 / ratio**2))
        assert FlatTop(A).overlap(Gaussian(ratio * A), wavelength) == pytest.approx(expected, abs=1e-13)


def test_overlaps_are_hermitian_and_see_the_charge(wavelength):
    disc = FlatTop(A, centre=(0.2 * mm, -0.1 * mm))
    vortex = LaguerreGauss(0, 1, A, waist_at=2.0)
    assert vortex.overlap(disc, wavelength) == pytest.approx(disc.overlap(vortex, wavelength).conjugate())
    assert abs(disc.overlap(vortex, wavelength)) > 0.1
    assert FlatTop(A).overlap(vortex, wavelength) == pytest.approx(0, abs=1e-13)


@pytest.mark.parametrize("order", [None, 8])
def test_overlaps_agree_with_a_plain_sum(order, wavelength, integral):
    flat, mode = FlatTop(A, order, (0.3 * mm, 0.0)), HermiteGauss(1, 0, 0.7 * mm, waist_at=1.5)

    def product(x, y):
        return flat.amplitude(x, y, wavelength).conj() * mode.amplitude(x, y, wavelength)

    # The sum cuts the hard edge into squares: 2000 of them across 4 mm leave about 1e-5.
    tolerance = 2e-5 if order is None else 1e-12
    assert flat.overlap(mode, wavelength) == pytest.approx(integral(product, 4 * mm, 2000), abs=tolerance)


def test_two_discs_share_a_lens(wavelength):
    one, inside, apart = FlatTop(A), FlatTop(A / 2, centre=(0.1 * mm, 0)), FlatTop(A, centre=(2.5 * mm, 0))
    assert one.overlap(one, wavelength) == pytest.approx(1, abs=1e-15)
    assert one.overlap(inside, wavelength) == pytest.approx(0.5, abs=1e-15)
    assert one.overlap(apart, wavelength) == 0
    # Two equal discs one radius apart share 2 pi/3 - sqrt(3)/2 of a^2.
    shared = (2 * np.pi / 3 - math.sqrt(3) / 2) / np.pi
    assert one.overlap(FlatTop(A, centre=(A, 0)), wavelength) == pytest.approx(shared, abs=1e-15)


def test_a_hard_and_a_soft_disc(wavelength):
    hard, soft = FlatTop(A), FlatTop(A, 4)
    expected = quad(lambda r: np.exp(-(r**4)) * 2 * np.pi * r, 0, 1)[0]
    expected *= A**2 * soft.radial(0.0, wavelength).real * hard.radial(0.0, wavelength).real
    assert hard.overlap(soft, wavelength) == pytest.approx(expected, abs=1e-12)
    assert soft.overlap(hard, wavelength) == pytest.approx(expected, abs=1e-12)
    assert soft.overlap(soft, wavelength) == pytest.approx(1, abs=1e-12)


def test_a_hard_edge_has_no_finite_spread_of_angles(wavelength):
    assert FlatTop(A).moments(wavelength).t2 == math.inf
    assert FlatTop(A).curvature(wavelength) == 0


def test_charge_is_zero_on_the_axis_only():
    assert FlatTop(A).charge == 0
    assert FlatTop(A, centre=(0, 1 * um)).charge is None


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("FlatTop(radius=0)", "FlatTop: radius = 0.0; radius must be positive"),
        ("FlatTop(radius=3)", "its unit is probably missing (fix: radius=3*mm)"),
        ("FlatTop(radius=0.001, order=1)", "FlatTop: order = 1; the order of a flat top is 2 (Gaussian) or more"),
        ("FlatTop(radius=0.001, order='steep')", "order must be one real, finite number"),
        ("FlatTop(radius=0.001, centre=5)", "centre must be a pair"),
    ],
)
def test_refusals(refuses, code, text):
    refuses(code, text)


@pytest.mark.parametrize("mode", ["Gaussian(5*um, centre=(5*mm, 0))", "Gaussian(0.5*um, waist_at=-10*mm)"])
def test_an_overlap_too_fine_to_integrate_is_refused(refuses, mode):
    refuses(
        f"FlatTop(10*mm).overlap({mode}, 633*nm)", "FlatTop beside Gaussian; the overlap of two modes", SamplingError
    )


def test_symbols_wait_for_numbers(refuses):
    assert FlatTop(sympy.Symbol("a")).symbols == {sympy.Symbol("a")}
    refuses("FlatTop(sympy.Symbol('a')).amplitude(0, 0, 633*nm)", "FlatTop: symbol a in radius = a", SymbolError)
