"""Glass and metal surfaces against published values and classical identities."""

import cmath
import math

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.elements.surfaces import Surface, quarter_wave_reflectance
from fastaxis.maths import NUMBERS
from fastaxis.units import deg, nm

# N-BK7 at 632.8 nm, 1.515089, from the coefficients of its data sheet (SCHOTT 517642.251, 2017; wavelength in um).
SELLMEIER = ((1.03961212, 0.00600069867), (0.231792344, 0.0200179144), (1.01046945, 103.560653))
BK7 = math.sqrt(1 + sum(b * 0.6328**2 / (0.6328**2 - c) for b, c in SELLMEIER))


def matrix(part, ways=("front", "back"), wavelength=632.8e-9):
    out = np.eye(2, dtype=complex)
    for law in part.passages(wavelength)[ways].laws:
        if hasattr(law, "linear"):
            out = np.array(law.linear(NUMBERS), dtype=complex) @ out
    return out


# Born & Wolf, Principles of Optics, 7th ed. (1999), sections 1.5.2-1.5.3; Hecht, Optics, 4th ed. (2002), sections 4.6
# and 8.6. Values from memory, recomputed; 1e-8 are their printed digits.
def test_normal_incidence_and_brewsters_angle_of_bk7():
    brewster = math.atan(BK7)
    assert Surface(behind=BK7, incidence=0.0).Rs == pytest.approx(0.04194287, abs=1e-8)
    assert brewster / deg == pytest.approx(56.574105, abs=1e-6)
    at_brewster = Surface(behind=BK7, incidence=brewster)
    assert at_brewster.Rs == pytest.approx(0.15453622, abs=1e-8)
    assert at_brewster.Rp == pytest.approx(0, abs=1e-30)  # the square of a rounding


def test_a_bare_window_transmits_92_percent():
    (law,) = fa.Window(index=BK7).laws(632.8e-9)
    assert law.transmission.power == pytest.approx(0.919491, abs=1e-6)


# Born & Wolf eq. 1.5.2 (21); Hecht eqs. (4.34)-(4.43); Azzam & Bashara, Ellipsometry and Polarized Light (1977),
# section 4.2. From memory, recomputed. Their rp = -rs at normal incidence is the sign of a mirror diag(1, -1).
def test_fresnel_amplitudes_and_the_sign_of_p():
    surface = Surface(behind=1.5, incidence=30 * deg)
    assert surface.rs == pytest.approx(-0.24040821, abs=1e-8)
    assert surface.rp == pytest.approx(0.15889980, abs=1e-8)
    straight = Surface(behind=1.5, incidence=0.0)
    assert straight.rp == pytest.approx(0.2, abs=1e-15)
    assert straight.rs == pytest.approx(-0.2, abs=1e-15)


def test_a_surface_and_an_ideal_mirror_reflect_with_the_same_signs():
    # A metal of endless k is the perfect conductor; its rp and rs are the ideal mirror's to 1/k.
    perfect = matrix(fa.MetalMirror(index=1 + 1e9j, incidence=20 * deg), ("front", "front"))
    assert perfect == pytest.approx(matrix(fa.Mirror(), ("front", "front")), abs=1e-8)


# F. de la Provostaye and P. Desains (1850); G. G. Stokes, Proc. R. Soc. 11, 545 (1862): m plates with all their
# reflections added as powers. From memory, re-derived.
@pytest.mark.parametrize(("plates", "degree"), [(1, 0.147929), (5, 0.464684), (10, 0.634518)])
def test_pile_of_plates_at_brewsters_angle(plates, degree):
    n = 1.5
    surface = Surface(behind=n, incidence=math.atan(n))
    # 2m surfaces of reflectance R pass (1 - R)/(1 + (2m - 1) R).
    p, s = ((1 - R) / (1 + (2 * plates - 1) * R) for R in (surface.Rp, surface.Rs))
    assert (p - s) / (p + s) == pytest.approx(plates / (plates + (2 * n / (n * n - 1)) ** 2), abs=1e-12)
    assert (p - s) / (p + s) == pytest.approx(degree, abs=1e-6)  # printed digits


def test_a_stack_of_pick_offs_is_the_pile_without_its_ghosts():
    plate = fa.PickOff(index=1.5, incidence=math.atan(1.5))
    passed = np.abs(np.diag(matrix(plate, ("front", "transmitted")))) ** 2
    rs = ((1.5**2 - 1) / (1.5**2 + 1)) ** 2
    assert passed == pytest.approx([1, (1 - rs) ** 2], abs=1e-14)


def lag(index, incidence):
    """By which one total reflection puts s behind p."""
    surface = Surface(before=index, behind=1.0, incidence=incidence)
    return cmath.phase(surface.rs / -surface.rp) + math.pi


# Born & Wolf, section 1.5.4: for n = 1.51 a retardance of 45 deg at 48 deg 37' and 54 deg 37', at most 45 deg 56' at
# 51 deg 20'; A. Fresnel (1823). Partly seen on a stored page, partly from memory; 1' is their last digit.
@pytest.mark.parametrize("incidence", [48 + 37.46 / 60, 54 + 37.39 / 60])
def test_fresnels_angles_for_an_eighth_of_a_wave(incidence):
    assert lag(1.51, incidence * deg) / deg == pytest.approx(45, abs=1 / 60)


def test_largest_retardance_of_one_total_reflection():
    angles = np.linspace(48, 55, 7001)
    lags = [lag(1.51, angle * deg) / deg for angle in angles]
    assert max(lags) == pytest.approx(45 + 56.5 / 60, abs=0.5 / 60)
    assert angles[np.argmax(lags)] == pytest.approx(51 + 20.35 / 60, abs=1 / 60)


@pytest.mark.parametrize("incidence", [42.0, 48.6, 60.0, 85.0])
def test_the_phase_of_total_reflection_has_fresnels_formula(incidence):
    sine, cosine = math.sin(incidence * deg), math.cos(incidence * deg)
    expected = 2 * math.atan(cosine * math.sqrt(sine**2 - 1.51**-2) / sine**2)
    assert lag(1.51, incidence * deg) == pytest.approx(expected, abs=1e-13)  # near the critical angle roots lose digits


# The rhomb of the same section, between +45 deg light and a polarimeter. Recomputed. p is advanced, so with p along x
# Ey lags behind Ex by a quarter wave: (1, i)/sqrt2, L, of positive helicity; S3 = I_R - I_L = -1 in our signs.
def test_a_rhomb_makes_circular_light_of_positive_helicity():
    rhomb = fa.Rhomb(index=1.51, incidence=(54 + 37 / 60) * deg, coated=True)
    out = matrix(rhomb) @ fa.D.jones
    cross = out[0].conjugate() * out[1]
    stokes = [abs(out[0]) ** 2 + abs(out[1]) ** 2, abs(out[0]) ** 2 - abs(out[1]) ** 2, 2 * cross.real, -2 * cross.imag]
    assert stokes == pytest.approx([1, 0, -0.00011782, -0.99999999], abs=1e-6)
    assert abs(np.vdot(fa.helicity(+1).jones, out)) ** 2 == pytest.approx(1, abs=1e-8)


# n and k at 632.8 nm interpolated from A. D. Rakic, Appl. Opt. 34, 4755 (1995); P. B. Johnson and R. W. Christy, Phys.
# Rev. B 6, 4370 (1972); K. M. McPeak et al., ACS Photonics 2, 326 (2015). Partly seen on a stored page, recomputed.
METALS = [
    ("Al, Rakic", 1.44819 + 7.53669j, 0.907752, 0.934110, 0.872561, 10.3060),
    ("Ag, Johnson & Christy", 0.05625 + 4.27603j, 0.988402, 0.991894, 0.983854, 18.5294),
    ("Au, Johnson & Christy", 0.18377 + 3.43125j, 0.944205, 0.961015, 0.923549, 22.7672),
    ("Ag, McPeak", 0.05125 + 4.31654j, 0.989613, 0.992740, 0.985533, 18.3635),
    ("Au, McPeak", 0.14330 + 3.60796j, 0.959984, 0.972058, 0.944897, 21.7438),
    ("Al, McPeak", 1.15279 + 6.68983j, 0.906634, 0.933375, 0.871188, 11.6698),
]


@pytest.mark.parametrize(("metal", "index", "R0", "Rs", "Rp", "retardance"), METALS)
def test_bare_metals_at_632_8_nm(metal, index, R0, Rs, Rp, retardance):
    straight = matrix(fa.MetalMirror(index=index, incidence=0.0), ("front", "front"))
    # 1e-6: the printed digits of the reflectances; n and k themselves have one digit less to say about the last of them.
    assert np.abs(np.diag(straight)) ** 2 == pytest.approx([R0, R0], abs=2e-6), metal
    p, s = np.diag(matrix(fa.MetalMirror(index=index), ("front", "front")))
    assert (abs(p) ** 2, abs(s) ** 2) == pytest.approx((Rp, Rs), abs=2e-6)
    assert cmath.phase(-p / s) / deg == pytest.approx(retardance, abs=1e-3)


# F. Abeles (1950); Azzam & Bashara (1977), section 4.4: Rp = Rs^2 at 45 deg, for every isotropic bare surface.
@pytest.mark.parametrize("index", [metal[1] for metal in METALS] + [1.5, 2.4, 4.0 + 0.03j])
def test_p_is_the_square_of_s_at_45_degrees(index):
    surface = Surface(behind=index, incidence=45 * deg)
    assert surface.rp == pytest.approx(surface.rs**2, abs=1e-14)
    assert surface.Rp == pytest.approx(surface.Rs**2, abs=1e-14)


# Hecht, section 9.7.2; H. A. Macleod, Thin-Film Optical Filters. From memory, recomputed.
def test_quarter_wave_layer_of_magnesium_fluoride():
    assert quarter_wave_reflectance(1.52, 1.38) == pytest.approx(0.01260079, abs=1e-8)
    assert quarter_wave_reflectance(1.52, 1.52) == pytest.approx(0.04257999, abs=1e-8)
    assert quarter_wave_reflectance(1.52, math.sqrt(1.52)) == pytest.approx(0, abs=1e-30)
    # Off by a factor of two in wavelength the layer is a half wave: as if it were not there.
    coated = fa.Window(index=1.52, layer=1.38, design=1064 * nm)
    assert coated.reflectance(532 * nm) == pytest.approx(0.04257999, abs=1e-8)


# Two gold mirrors of a periscope in crossed planes: what one does to p the other does to s, so circular light is
# restored; in the same plane the retardance adds. Common practice, no source.
def test_crossed_gold_mirrors_undo_each_others_retardance():
    gold = METALS[2][1]
    across = matrix(fa.MetalMirror(index=gold, fold="vertical"), ("front", "front"))
    along = matrix(fa.MetalMirror(index=gold), ("front", "front"))
    crossed = across @ along
    assert crossed == pytest.approx(crossed[0, 0] * np.eye(2), abs=1e-15)
    p, s = np.diag(along @ along)
    assert cmath.phase(p / s) / deg == pytest.approx(2 * METALS[2][5], abs=2e-3)


# J. Leach, M. J. Padgett, S. M. Barnett, S. Franke-Arnold and J. Courtial, Phys. Rev. Lett. 88, 257901 (2002): two
# Dove prisms rolled apart by a put 2 l a between the arms, ports cos^2(l a) and sin^2(l a). From memory.
@pytest.mark.parametrize("apart", [90, 45, 30])
def test_two_prisms_sort_charges(apart):
    phi = 0.3
    for l in range(-4, 5):
        arms = []
        for roll in (0.0, apart * deg):
            place = phi  # followed from the far side of the prism back to the near side
            for law in reversed(fa.KMirror(roll=roll).laws(633 * nm)[1:]):
                place = place - law.angle if hasattr(law, "angle") else -place
            arms.append(cmath.exp(1j * l * place))
        port = abs(arms[0] + arms[1]) ** 2 / 4
        assert port == pytest.approx(math.cos(l * apart * deg) ** 2, abs=1e-14)
