"""What Gaussian, Laguerre-Gauss and Hermite-Gauss modes must share."""

import itertools
import math
import pickle

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.errors import SymbolError
from fastaxis.light import Gaussian, HermiteGauss, LaguerreGauss, Mode
from fastaxis.units import mm, nm

W = 0.5 * mm
PLACE = {"waist_at": -0.8, "centre": (0.1 * mm, -0.2 * mm)}
MODES = [
    Gaussian(W),
    Gaussian(W, **PLACE),
    LaguerreGauss(0, 3, W),
    LaguerreGauss(2, -1, W, **PLACE),
    HermiteGauss(0, 2, W),
    HermiteGauss(3, 1, W, **PLACE),
]
# A sum over some 1e5 samples of order 1, whose roundings partly cancel.
SUM_ROUNDINGS = 1e-13


@pytest.mark.parametrize("mode", MODES, ids=str)
def test_unit_power(mode, wavelength, integral):
    power = integral(lambda x, y: abs(mode.amplitude(x, y, wavelength)) ** 2, 9 * mode.width(wavelength))
    assert power == pytest.approx(1, abs=SUM_ROUNDINGS)


@pytest.mark.parametrize("mode", MODES, ids=str)
def test_obeys_the_paraxial_wave_equation(mode, wavelength, paraxial_residue):
    # Differences of order 8 with steps of w/20 and zR/50: truncation about (sqrt N/20)^8/3000 < 1e-11 and roundings
    # of 1e-16 divided by the square of the step, 400; N = 8 at most.
    residue = paraxial_residue(mode, 0.31 * mm, 0.13 * mm, W / 20, mode.rayleigh(wavelength) / 50)
    assert residue < 1e-8


@pytest.mark.parametrize("mode", MODES, ids=str)
def test_second_moments_are_those_of_the_light(mode, wavelength, integral):
    moments, axis = mode.moments(wavelength), 0
    if isinstance(mode, HermiteGauss) and mode.n > mode.m:
        axis = 1
    k, step = 2 * np.pi / wavelength, 1e-3 * mode.width(wavelength)

    def place(x, y):
        return (x, y)[axis] - mode.centre[axis]

    def slope(x, y):
        dx, dy = (step, 0) if axis == 0 else (0, step)
        ahead, behind = mode.amplitude(x + dx, y + dy, wavelength), mode.amplitude(x - dx, y - dy, wavelength)
        return (ahead - behind) / (2j * k * step)

    def field(x, y):
        return mode.amplitude(x, y, wavelength)

    reach = 9 * mode.width(wavelength)
    x2 = integral(lambda x, y: place(x, y) ** 2 * abs(field(x, y)) ** 2, reach)
    xt = integral(lambda x, y: place(x, y) * (field(x, y).conj() * slope(x, y)).real, reach)
    t2 = integral(lambda x, y: abs(slope(x, y)) ** 2, reach)
    assert moments.x2 == pytest.approx(x2, rel=1e-12)
    # Second-order differences with a step of w/1000: (k_max step)^2/6 with k_max w < 6.
    assert moments.xt == pytest.approx(xt, abs=1e-5 * math.sqrt(x2 * t2))
    assert moments.t2 == pytest.approx(t2, rel=1e-5)


@pytest.mark.parametrize("mode", MODES, ids=str)
def test_beam_quality_stays_on_the_way(mode, wavelength):
    expected = mode.quality
    for distance in (0, 0.3, 5):
        # x2 t2 - xt^2 cancels (z/zR)^2 + 1 of about 30 at 5 m.
        assert mode.moved(distance).moments(wavelength).quality(wavelength) == pytest.approx(expected, rel=1e-13)


@pytest.mark.parametrize("mode", [m for m in MODES if m.charge is not None], ids=str)
def test_a_charged_mode_is_its_radial_form_times_a_spiral(mode, wavelength):
    r, phi = np.array([0.2, 0.5, 0.9]) * mm, np.array([0.3, 2.0, -2.5])
    spiral = mode.radial(r, wavelength) * np.exp(1j * mode.charge * phi)
    found = mode.amplitude(r * np.cos(phi), r * np.sin(phi), wavelength)
    np.testing.assert_allclose(found, spiral, rtol=2e-14)  # some ten roundings of a phase below 10


@pytest.mark.parametrize("mode", [m for m in MODES if m.charge is not None], ids=str)
def test_the_phase_front_without_its_curvature_is_smooth(mode, wavelength):
    mode = mode.moved(0.7)
    r = np.linspace(0.05, 0.3, 20) * mm
    flat = mode.radial(r, wavelength) * np.exp(-1j * np.pi / wavelength * mode.curvature(wavelength) * r**2)
    np.testing.assert_allclose(np.angle(flat / flat[0]), 0, atol=1e-13)


@pytest.mark.parametrize(("one", "other"), list(itertools.combinations_with_replacement(MODES, 2)), ids=str)
def test_overlaps_agree_with_the_plain_integral(one, other, wavelength, integral):
    def product(x, y):
        return one.amplitude(x, y, wavelength).conj() * other.amplitude(x, y, wavelength)

    assert one.overlap(other, wavelength) == pytest.approx(integral(product, 6 * mm), abs=SUM_ROUNDINGS)


@pytest.mark.parametrize("kind", [LaguerreGauss, HermiteGauss])
def test_each_family_is_orthonormal(kind, wavelength):
    orders = list(itertools.product((0, 1, 2), (-2, 0, 3) if kind is LaguerreGauss else (0, 1, 4)))
    modes = [kind(*order, W, waist_at=0.4) for order in orders]
    gram = [[one.overlap(other, wavelength) for other in modes] for one in modes]
    # Terms of alternating sign up to some 10 in a polynomial of degree 14.
    np.testing.assert_allclose(gram, np.eye(len(modes)), atol=1e-13)


@settings(max_examples=30)
@given(st.floats(0.2, 2), st.floats(-2, 2), st.floats(-1, 1), st.integers(-3, 3))
def test_travel_keeps_every_overlap(waist, waist_at, shift, l):
    one, other = LaguerreGauss(1, l, W), HermiteGauss(1, 2, waist * mm, waist_at, (shift * mm, 0.0))
    before = one.overlap(other, 632.8 * nm)
    after = one.moved(0.9).overlap(other.moved(0.9), 632.8 * nm)
    assert after == pytest.approx(before, abs=1e-12)  # exponents up to (1/0.2)^2 carry 25 roundings or so


def test_laguerre_gauss_of_one_turn_is_a_pair_of_hermite_gauss(wavelength):
    x, y = np.array([0.2, -0.5, 0.4]) * mm, np.array([0.3, 0.1, -0.6]) * mm
    across = HermiteGauss(1, 0, W, 0.3).amplitude(x, y, wavelength)
    up = HermiteGauss(0, 1, W, 0.3).amplitude(x, y, wavelength)
    expected = (across + 1j * up) / math.sqrt(2)
    np.testing.assert_allclose(LaguerreGauss(0, 1, W, 0.3).amplitude(x, y, wavelength), expected, rtol=1e-14)


def test_lowest_orders_are_the_gaussian(wavelength):
    gaussian = Gaussian(W, -0.3).amplitude(0.2 * mm, 0.3 * mm, wavelength)
    for mode in (LaguerreGauss(0, 0, W, -0.3), HermiteGauss(0, 0, W, -0.3)):
        assert mode.amplitude(0.2 * mm, 0.3 * mm, wavelength) == pytest.approx(gaussian, rel=1e-14)


@pytest.mark.parametrize(
    ("mode", "order"), [(Gaussian(W), 1), (LaguerreGauss(2, -3, W), 8), (HermiteGauss(2, 4, W), 7)], ids=str
)
def test_gouy_phase_is_order_times_that_of_the_gaussian(mode, order, wavelength):
    # On a bright ray off axis that scales with w, past the waist, the curvature taken away.
    def phase(distance):
        moved = mode.moved(distance)
        x, y = 0.93 * moved.width(wavelength), 0.41 * moved.width(wavelength)
        curve = np.pi / wavelength * moved.curvature(wavelength) * (x * x + y * y)
        return moved.amplitude(x, y, wavelength) * np.exp(-1j * curve)

    zeta = math.atan(1.7 / mode.rayleigh(wavelength))
    turned = phase(1.7) / phase(0.0)
    assert turned / abs(turned) == pytest.approx(np.exp(-1j * order * zeta), abs=1e-13)


def test_waist_at_points_downstream(wavelength):
    converging = Gaussian(W, waist_at=0.5)
    assert converging.curvature(wavelength) < 0
    assert converging.moved(0.5).width(wavelength) == W
    assert converging.moved(1.0).curvature(wavelength) > 0


def test_only_modes_on_the_axis_have_a_charge():
    assert LaguerreGauss(1, -2, W).charge == -2
    assert LaguerreGauss(1, -2, W, centre=(1 * mm, 0)).charge is None
    assert Gaussian(W).charge == HermiteGauss(0, 0, W).charge == 0
    assert HermiteGauss(0, 1, W).charge is None


def test_high_orders_neither_overflow_nor_lose_power(wavelength):
    mode = HermiteGauss(180, 0, W)
    line = np.linspace(-20, 20, 40001) * W
    along = abs(mode.amplitude(line, 0.0, wavelength)) ** 2
    # The integral along x of |u|^2 at y = 0 is |u_0(0)|^2 of the fundamental across: sqrt(2/pi)/w.
    # 180 steps of a recurrence, each a few roundings.
    assert np.sum(along) * 1e-3 * W == pytest.approx(math.sqrt(2 / math.pi) / W, rel=2e-13)


@pytest.mark.parametrize("mode", MODES, ids=str)
def test_modes_are_modes_and_travel_between_processes(mode):
    assert isinstance(mode, Mode)
    assert pickle.loads(pickle.dumps(mode)) == mode
    assert not mode.infinite
    assert not mode.hard


def test_symbols_may_be_declared(wavelength):
    w, l = sympy.Symbol("w", positive=True), sympy.Symbol("l", integer=True)
    mode = LaguerreGauss(0, l, w)
    assert mode.symbols == {w, l}
    assert mode.charge == l


def test_exact_numbers_of_sympy_count_as_numbers(wavelength):
    exact = HermiteGauss(
        sympy.Integer(1), 0, sympy.Rational(1, 2000), sympy.Rational(1, 3), (sympy.Rational(1, 10000), 0)
    )
    plain = HermiteGauss(1, 0, W, 1 / 3, (0.1 * mm, 0))
    assert exact.moments(wavelength) == plain.moments(wavelength)
    assert exact.amplitude(0.2 * mm, 0, wavelength) == plain.amplitude(0.2 * mm, 0, wavelength)
    assert exact.overlap(plain, wavelength) == pytest.approx(1, abs=1e-14)


@pytest.mark.parametrize("question", ["amplitude(0, 0, 633*nm)", "moments(633*nm)", "radial(0, 633*nm)",
                                      "curvature(633*nm)", "overlap(Gaussian(1*mm), 633*nm)"])  # fmt: skip
def test_numeric_questions_refuse_symbols(refuses, question):
    text = "Gaussian: symbol w in waist = w; numbers can be had from a mode without symbols only"
    refuses(f"Gaussian(sympy.Symbol('w')).{question}", text, SymbolError)


def test_the_message_names_the_symbols_of_the_centre_too(refuses):
    code = "Gaussian(1*mm, centre=(sympy.Symbol('c'), 0)).amplitude(0, 0, 633*nm)"
    assert refuses(code, "symbol c in centre = (c, 0.0)", SymbolError).fix == "centre=(0*mm, 0*mm)"


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("Gaussian(waist=0)", "Gaussian: waist = 0.0; waist must be positive (fix: waist=0.8*mm)"),
        ("Gaussian(waist=-1e-3)", "Gaussian: waist = -0.001; waist must be positive"),
        ("Gaussian(waist=5)", "5 m is beyond 0.2 m: its unit is probably missing (fix: waist=5*mm)"),
        (
            "LaguerreGauss(p=0, l=1, waist=500)",
            "500 m is beyond 0.2 m: its unit is probably missing (fix: waist=0.8*mm)",
        ),
        ("Gaussian(waist=float('inf'))", "waist must be one real, finite number or a symbol (fix: waist=0.8*mm)"),
        ("Gaussian(waist='1 mm')", "Gaussian: waist = '1 mm'; waist must be one real, finite number"),
        ("Gaussian(waist=0.001, waist_at=None)", "Gaussian: waist_at = None"),
        ("Gaussian(waist=0.001, centre=0.001)", "centre must be a pair (x, y) in metres"),
        ("Gaussian(waist=0.001, centre=(3, 0))", "centre x is in metres and 3 m is beyond 1 m"),
        ("LaguerreGauss(p=-1, l=0, waist=0.001)", "LaguerreGauss: p = -1; p is a whole number of nodes, zero or more"),
        ("LaguerreGauss(p=0.5, l=0, waist=0.001)", "LaguerreGauss: p = 0.5; p is a whole number of nodes"),
        ("LaguerreGauss(p=0, l=1.5, waist=0.001)", "l = 1.5; l is a whole number: 2 pi of phase times it must close"),
        ("LaguerreGauss(p=0, l=sympy.Rational(1, 2), waist=0.001)", "l is a whole number"),
        ("LaguerreGauss(p=sympy.Symbol('p', negative=True), l=0, waist=0.001)", "p is a whole number of nodes"),
        ("HermiteGauss(m=-2, n=0, waist=0.001)", "HermiteGauss: m = -2; m is a whole number of nodes"),
        ("HermiteGauss(m=0, n=0.2, waist=0.001)", "HermiteGauss: n = 0.2; n is a whole number of nodes"),
    ],
)
def test_refusals(refuses, code, text):
    refuses(code, text)
