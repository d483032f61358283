"""Forms against published laws: each is derived from a train of parts and compared exactly, or at the printed digits.

Works are cited from memory unless another place is named; where a row says "common practice, no source", there is none.
"""

from math import pi

import numpy as np
import pytest
import scipy.optimize
import sympy as sp

import fastaxis as fa
from fastaxis import light
from fastaxis.engines.symbolic import derive
from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.ring import ExactMaths, Ring

a, b, d, e, t, q = sp.symbols("alpha beta delta epsilon theta q", real=True)
w, f, z, lam = sp.symbols("w f z lambda", positive=True)


def form(*parts, state=fa.H, laser=None, wavelength=lam):
    train = fa.Train(wavelength=wavelength)
    laser = laser or fa.Laser(waist=w, state=state, power=1.0)
    return derive(train.along(laser, *parts, fa.Camera(pixel=5e-6, shape=(8, 8), name="cam")), "cam")


def vanishes(expression):
    """Whether an expression of the ring is zero, decided exactly."""
    return ExactMaths(Ring()).number(expression).is_zero()


# --- polarizers and plates -------------------------------------------------------------------------------------------


def test_malus():
    """E. L. Malus (1809); E. Hecht, Optics, 4th ed., section 8.2.1."""
    assert form(fa.Polarizer(axis=a)).power == sp.cos(a) ** 2
    assert form(fa.Polarizer(axis=a), state=fa.UNPOLARIZED).power == sp.Rational(1, 2)


def test_a_polarizer_between_crossed_polarizers():
    """Hecht, section 8.2: unpolarized light, sin^2(2 theta)/8."""
    parts = [fa.Polarizer(axis=0.0), fa.Polarizer(axis=t), fa.Polarizer(axis=pi / 2)]
    assert vanishes(form(*parts, state=fa.UNPOLARIZED).power - sp.sin(2 * t) ** 2 / 8)


@pytest.mark.parametrize("count", [2, 3, 6, 9])
def test_a_chain_of_polarizers(count):
    """A. Peres, Quantum Theory: Concepts and Methods (1993), ch. 12: cos^(2N)(pi/2N)."""
    parts = [fa.Polarizer(axis=k * sp.pi / (2 * count)) for k in range(1, count + 1)]
    assert vanishes(form(*parts).power - sp.cos(sp.pi / (2 * count)) ** (2 * count))


def test_a_retarder_between_polarizers():
    """M. Born and E. Wolf, Principles of Optics, 7th ed., section 15.4.1."""
    made = form(fa.Retarder(fast=a, retardance=d))
    crossed, along = made.frame(sp.pi / 2), made.frame(0)
    assert crossed == sp.sin(2 * a) ** 2 * sp.sin(d / 2) ** 2
    assert vanishes(along - 1 + crossed)


def test_a_half_wave_plate_mirrors_linear_light_in_its_axis():
    """Hecht, section 8.7.1."""
    ex, ey = form(fa.HalfWavePlate(fast=a), state=fa.linear(b)).jones()
    assert vanishes(ex * sp.sin(2 * a - b) - ey * sp.cos(2 * a - b))


def test_any_state_from_a_half_and_a_quarter_wave_plate():
    """R. Simon and N. Mukunda, Phys. Lett. A 143, 165 (1990); the sign of the ellipticity is the receiver's."""
    psi, chi = sp.symbols("psi chi", real=True)
    made = form(fa.HalfWavePlate(fast=(psi - chi) / 2), fa.QuarterWavePlate(fast=psi))
    wanted = (1, sp.cos(2 * psi) * sp.cos(2 * chi), sp.sin(2 * psi) * sp.cos(2 * chi), sp.sin(2 * chi))
    assert all(vanishes(got - want) for got, want in zip(made.stokes, wanted, strict=True))


def test_plate_plate_plate_geometric_phase():
    """S. Pancharatnam, Proc. Indian Acad. Sci. A 44, 247 (1956); T. H. Chyba et al., Opt. Lett. 13, 562 (1988)."""
    plates = (fa.QuarterWavePlate(fast=pi / 4), fa.HalfWavePlate(fast=t), fa.QuarterWavePlate(fast=pi / 4))
    ex, ey = form(*plates).jones(global_phase=True)
    assert (sp.simplify(ex + sp.I * sp.exp(-2 * sp.I * t)), ey) == (0, 0)
    ex, ey = form(*plates, state=fa.V).jones(global_phase=True)
    assert (ex, sp.simplify(ey - sp.I * sp.exp(2 * sp.I * t))) == (0, 0)


def test_a_closed_cycle_of_states_has_half_its_solid_angle_as_phase():
    """M. V. Berry, J. Mod. Opt. 34, 1401 (1987): projections on D and on helicity +1 bring H back with (1 - i)/4, the
    phase being half of the octant's pi/2. Reversing the sense of the circle reverses it."""
    for helicity, wanted in ((fa.L, (1 - sp.I) / 4), (fa.R, (1 + sp.I) / 4)):
        # <H|C><C|D><D|H>: the last projection is the analyzer of the first two.
        passed = form(fa.Polarizer(axis=pi / 4)).jones(global_phase=True)
        circle = sp.Matrix(form(state=helicity).jones(global_phase=True))
        around = circle[0] * (circle.H * sp.Matrix(passed))[0]
        assert sp.simplify(around - wanted) == 0


def test_double_pass_isolator_and_its_leak():
    """Hecht, section 8.13; B. E. A. Saleh and M. C. Teich, Fundamentals of Photonics, section 6.6. Met in the frame of
    the returning beam the plate stands at minus its angle; the leak cos^2(d) is common practice, no source."""
    there_and_back = (fa.Retarder(fast=a, retardance=d), fa.Mirror(), fa.Retarder(fast=-a, retardance=d))
    back = form(*there_and_back).frame(0)
    assert vanishes(back.subs({a: sp.pi / 4}) - sp.cos(d) ** 2)
    assert vanishes(back.subs({d: sp.pi / 2}) - sp.cos(2 * a) ** 2)


def test_faraday_isolator():
    """Saleh and Teich, section 6.6: cos^2(45 deg - beta) forward, cos^2(45 deg + beta) backward."""
    forward = form(fa.FaradayRotator(angle=b), fa.Polarizer(axis=pi / 4)).power
    assert vanishes(forward - sp.cos(sp.pi / 4 - b) ** 2)


def test_faraday_rotation_adds_up_and_optical_activity_cancels():
    """M. Faraday (1845); Hecht, section 8.11.2."""
    for part, total in ((fa.FaradayRotator(angle=b, name="rod"), 2 * b), (fa.Rotator(angle=b, name="rod"), 0)):
        train = fa.Train(wavelength=lam).along(fa.Laser(waist=w, power=1.0), part, fa.Mirror(name="m"))
        train.join("m", "rod.back")
        assert vanishes(derive(train, "rod.front").frame(sp.pi / 2) - sp.sin(total) ** 2)


# --- q-plates --------------------------------------------------------------------------------------------------------


def test_conversion_of_a_detuned_q_plate():
    """L. Marrucci, C. Manzo, D. Paparo, Phys. Rev. Lett. 96, 163905 (2006)."""
    left, right = form(fa.QPlate(q=q, offset=a, retardance=d), state=fa.L).jones("circular", global_phase=True)
    assert left == sp.cos(d / 2)
    assert vanishes(right + sp.I * sp.sin(d / 2) * sp.exp(2 * sp.I * (q * PHI + a)))


@pytest.mark.parametrize(
    ("state", "offset", "wanted"),
    [
        (fa.H, 0, (sp.cos(PHI), sp.sin(PHI))),  # radial
        (fa.V, 0, (sp.sin(PHI), -sp.cos(PHI))),  # azimuthal
        (fa.H, sp.pi / 4, (-sp.sin(PHI), sp.cos(PHI))),
        (fa.D, 0, (sp.cos(PHI - sp.pi / 4), sp.sin(PHI - sp.pi / 4))),  # a spiral
    ],
)
def test_vector_beams_of_a_half_charge_plate(state, offset, wanted):
    """Q. Zhan, Adv. Opt. Photon. 1, 1 (2009); M. Stalder and M. Schadt, Opt. Lett. 21, 1948 (1996)."""
    ex, ey = form(fa.QPlate(q=0.5, offset=offset), state=state).jones()
    assert vanishes(ex * wanted[1] - ey * wanted[0])
    assert vanishes(ex**2 + ey**2 - 1)


def test_lobes_behind_an_analyzer():
    """Zhan (2009), section 2: 4|q| lobes at (beta - 2 alpha)/2q that turn with beta/2q."""
    found = form(fa.QPlate(q=q, offset=a)).lobes(t)
    assert found.count == 4 * sp.Abs(q)
    assert sp.expand(found.first - (t - 2 * a) / (2 * q)) == 0
    assert found.turning == 1 / (2 * q)


def test_a_half_wave_plate_between_q_plates_adds_their_charges():
    """Marrucci et al. (2006) for one plate; the pair is common practice, no source."""
    two = (fa.QPlate(q=q), fa.HalfWavePlate(fast=0.0), fa.QPlate(q=q))
    left, right = form(*two, state=fa.L).jones("circular")
    assert left == 0
    turned = right * sp.exp(-4 * sp.I * q * PHI)
    assert not turned.has(PHI)
    assert sp.Abs(turned) == 1


def test_linear_light_through_a_quarter_wave_q_plate_has_an_l_line_on_the_x_axis():
    """J. F. Nye, Proc. R. Soc. Lond. A 389, 279 (1983) names the lines where S3 = 0; here S3 = sin(phi)."""
    assert form(fa.QPlate(q=0.5, retardance=pi / 2)).stokes[3] == sp.sin(PHI)


# --- polarimetry -----------------------------------------------------------------------------------------------------


def test_rotating_plate_polarimeter():
    """H. G. Berry, G. Gabrielse, A. E. Livingston, Appl. Opt. 16, 3200 (1977); B. Schaefer et al., Am. J. Phys. 75,
    163 (2007), whose sign of the sin(2 theta) term belongs to the other handedness: with fast axis theta and
    S3 = I_R - I_L it is -S3/2. With a wrong retardance the mean and the 4 theta terms carry the bias."""
    psi, chi = sp.symbols("psi chi", real=True)
    s1, s2, s3 = sp.cos(2 * psi) * sp.cos(2 * chi), sp.sin(2 * psi) * sp.cos(2 * chi), sp.sin(2 * chi)
    found = form(fa.Retarder(fast=t, retardance=d), state=fa.elliptical(psi, chi)).harmonics(0, t)
    assert set(found) == {0, 2, 4}
    assert vanishes(found[0][0] - sp.Rational(1, 2) - s1 * sp.cos(d / 2) ** 2 / 2)
    assert found[2][0] == 0
    assert vanishes(found[2][1] + s3 * sp.sin(d) / 2)
    assert vanishes(found[4][0] - s1 * sp.sin(d / 2) ** 2 / 2)
    assert vanishes(found[4][1] - s2 * sp.sin(d / 2) ** 2 / 2)


# --- structured beams ------------------------------------------------------------------------------------------------


def test_full_poincare_beam():
    """A. M. Beckley, T. G. Brown, M. A. Alonso, Opt. Express 18, 10777 (2010): S3 is that of a stereographic map and
    vanishes at r = w/sqrt 2. The core is L, so S3 = -1 there in the receiver's naming."""
    beam = light.Beam(
        (light.Term(1, light.LaguerreGauss(0, 0, w), fa.L), light.Term(1, light.LaguerreGauss(0, 1, w), fa.R))
    )
    made = form(fa.HalfWavePlate(fast=0.0), fa.HalfWavePlate(fast=0.0), laser=fa.Laser(beam=beam, power=1.0))
    rho2 = 2 * R**2 / w**2
    s0, s1, s2, s3 = made.stokes
    assert sp.simplify(s3 / s0 + (1 - rho2) / (1 + rho2)) == 0
    assert sp.solve(sp.numer(sp.together(s3)), R) == [w / sp.sqrt(2)]
    assert sp.simplify(s2 / s1 - sp.tan(PHI)) == 0


@pytest.mark.parametrize(
    ("charge", "peak", "height"), [(1, 0.8442312118, 0.1987534442), (2, 1.339134845, 0.08905784323)]
)
def test_far_field_of_a_spiral_plate(charge, peak, height):
    """V. V. Kotlyar et al., J. Opt. Soc. Am. A 22, 849 (2005); digits recomputed from its function."""
    made = form(fa.SpiralPlate(charge=charge), fa.Lens(focal=f), fa.FreeSpace(f))
    plain = form(fa.Lens(focal=f), fa.FreeSpace(f))
    values = {"w": 1e-3, "f": 0.3, "lambda": 632.8e-9}
    spot = values["lambda"] * values["f"] / (pi * values["w"])
    ring, focus = made.to_function("irradiance"), plain.to_function("irradiance")

    def down(s):
        return -ring(values, r=s * spot) / focus(values, r=0.0)

    found = scipy.optimize.minimize_scalar(down, bracket=(peak * 0.9, peak * 1.1), tol=1e-12)
    # A maximum is flat: its place is known to half the digits of its height, here to 1e-8.
    assert found.x == pytest.approx(peak, rel=3e-8)
    assert -found.fun == pytest.approx(height, rel=1e-9)


@pytest.mark.parametrize(
    ("charge", "rho", "wanted"),
    [(1, 0.5, 0.057550069), (1, 1.0, 0.130997222), (1, 2.0, 0.051362030), (2, 1.0, 0.032070124), (2, 2.0, 0.067736207)],
)
def test_a_spiral_plate_one_rayleigh_range_on(charge, rho, wanted):
    """Kotlyar et al. (2005), with complex argument; digits recomputed. Amplitude 1 on the axis of the plate."""
    made = form(fa.SpiralPlate(charge=charge), fa.FreeSpace(z))
    values = {"w": 1e-3, "lambda": 632.8e-9}
    reach = pi * values["w"] ** 2 / values["lambda"]
    got = made.to_function("irradiance")(values, z=reach, r=rho * values["w"]) * pi * values["w"] ** 2 / 2
    # Nine decimals are printed.
    assert got == pytest.approx(wanted, abs=6e-10)


def test_gaussian_beam_behind_free_space_and_behind_a_lens():
    """H. Kogelnik and T. Li, Appl. Opt. 5, 1550 (1966); S. A. Self, Appl. Opt. 22, 658 (1983): in the back focal plane
    of a lens met in its front focal plane the waist is lambda f/(pi w)."""
    made = form(fa.FreeSpace(z))
    (width,) = [meaning for name, meaning in made.meanings.items() if name.name.startswith("w")]
    assert sp.simplify(width**2 - w**2 * (1 + (lam * z / (sp.pi * w**2)) ** 2)) == 0
    focused = form(fa.FreeSpace(f), fa.Lens(focal=f), fa.FreeSpace(f))
    assert lam * f / (sp.pi * w) in focused.meanings.values()


@pytest.mark.parametrize(("charge", "shares"), [(1, (pi / 4, 0.09817477, 0.03681554)), (2, (1 / 2, 1 / 6, 1 / 12))])
def test_laguerre_gauss_content_of_a_spiral_beam(charge, shares):
    """M. W. Beijersbergen et al., Opt. Commun. 112, 321 (1994) print 78.5 % for charge 1; further digits recomputed."""
    made = form(fa.SpiralPlate(charge=charge))
    for p, wanted in enumerate(shares):
        got = made.share(light.LaguerreGauss(p, charge, w))
        assert float(got) == pytest.approx(wanted, abs=6e-9)
    assert made.share(light.LaguerreGauss(0, charge + 1, w)) == 0


@pytest.mark.parametrize("charge", [1, 2, 3])
def test_best_waist_for_a_spiral_beam(charge):
    """The waist w/sqrt(l + 1) follows from the derivative of the overlap; common practice, no source."""
    v = sp.Symbol("v", positive=True)
    share = form(fa.SpiralPlate(charge=charge)).share(light.LaguerreGauss(0, charge, v))
    (best,) = [root for root in sp.solve(sp.diff(sp.log(share), v), v) if root.is_positive]
    assert sp.simplify(best - w / sp.sqrt(charge + 1)) == 0


def test_a_spiral_plate_off_its_design_wavelength():
    """A step of c waves with c between whole numbers holds the charge l with sin^2(pi (c - l))/(pi (c - l))^2.
    M. W. Beijersbergen et al., Opt. Commun. 112, 321 (1994)."""
    with pytest.warns(fa.SlipWarning, match="far off"):
        made = form(fa.SpiralPlate(charge=1, design=600e-9), wavelength=800e-9)
    assert vanishes(made.charge_share(1) - 8 / sp.pi**2)
    assert vanishes(made.charge_share(0) - 8 / (9 * sp.pi**2))


def test_pattern_rotation_with_distance():
    """The sum of two charges turns with the difference of their Gouy phases (Siegman, Lasers, section 17.5): LG_0^0 and
    LG_0^2 by half a turn of phi in all, half of it at the Rayleigh range."""
    beam = light.Beam(
        (light.Term(1, light.LaguerreGauss(0, 0, w), fa.H), light.Term(1, light.LaguerreGauss(0, 2, w), fa.H))
    )
    made = form(fa.FreeSpace(z), laser=fa.Laser(beam=beam, power=1.0))
    angle = np.array([0.4])
    values = {"w": 1e-3, "lambda": 632.8e-9, "r": 1e-3}
    reach = pi * 1e-6 / 632.8e-9
    function = made.to_function("irradiance")
    turned = function(values, z=reach, phi=angle + pi / 4) * 2
    start = function(values | {"r": 1e-3 / np.sqrt(2)}, z=1e-9, phi=angle)
    # z = 1e-9 m stands for the waist, where the Gouy phase is 2e-10.
    assert turned == pytest.approx(start, rel=1e-8)
