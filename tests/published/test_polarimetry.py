"""Stokes polarimetry and rotating averages against published forms.

Sources often name circular light by helicity, S3(helicity +1) = +1 (the IEEE and IAU sign). Here S3 = I_R - I_L with R of
helicity -1, the other sign: numbers are turned over by ``here`` and, where it matters, tested under both namings.
"""

import numpy as np
import pytest
from scipy.optimize import minimize

from fastaxis.camera import (
    SIX_STATES,
    Setting,
    condition_number,
    four_frames,
    plate_harmonics,
    plate_then_polarizer,
    polarizer_at,
    reconstruct,
    rotating_plate,
)
from fastaxis.camera.settings import as_settings, weight_matrix
from fastaxis.conventions import View
from fastaxis.errors import ParameterError
from fastaxis.laws import Amplitude, AxisLaw, CircularLaw
from fastaxis.light.states import A, D, H, L, R, V
from fastaxis.light.stokes import degree_of_polarization, ellipse
from fastaxis.units import deg

EPS = np.finfo(float).eps


def here(stokes):
    """From the helicity sign of S3 to ours."""
    return np.asarray(stokes) * [1, 1, 1, View.SOURCE.s3_sign]


HELICITY = np.array([1, 0.3, -0.4, 0.5])
EXAMPLE = here(HELICITY)


def powers(settings, stokes=EXAMPLE):
    return weight_matrix(as_settings(settings)) @ stokes


def fast_axes(settings):
    return [setting.laws[0].angle for setting in settings]


# B. Schaefer, E. Collett, R. Smyth, D. Barrett, B. Fraher, Am. J. Phys. 75, 163 (2007), eqs. (20)-(26), from memory:
# I = (A + B sin 2t + C cos 4t + D sin 4t)/2, A = S0 + S1/2, C = S1/2, D = S2/2. Printed there with B = +S3; physics with the
# fast axis at t gives B = +S3 for the helicity sign and B = -S3 for the sign S3(R) = +1 (Goldstein, Polarized Light, 2003).


def test_rotating_quarter_wave_plate_in_fourier_form():
    plates = rotating_plate(16)
    t = np.array(fast_axes(plates))
    s0, s1, s2, s3 = HELICITY
    form = ((s0 + s1 / 2) + s3 * np.sin(2 * t) + s1 / 2 * np.cos(4 * t) + s2 / 2 * np.sin(4 * t)) / 2
    np.testing.assert_allclose(powers(plates), form, atol=20 * EPS)


def test_b_has_the_sign_of_the_helicity():
    found = plate_harmonics(powers(rotating_plate(16)), fast_axes(rotating_plate(16)))
    assert (found.A, found.B, found.C, found.D) == pytest.approx((1.15, 0.5, 0.15, -0.2), abs=40 * EPS)
    np.testing.assert_allclose(found.stokes(), EXAMPLE, atol=40 * EPS)


# Which circular light passes a quarter-wave plate and a horizontal polarizer: follows from the quarter-wave plate with a
# horizontal fast axis that makes D into (1, i)/sqrt2 (E. Hecht, Optics, 4th ed. 2002, table 8.6, from memory).


def test_the_pin_test_of_the_polarimeters_sign():
    positive, negative = L.stokes, R.stokes
    for fast, passes, blocks in ((45, positive, negative), (-45, negative, positive)):
        setting = plate_then_polarizer(fast=fast * deg)
        assert setting.power(passes) == pytest.approx(1, abs=4 * EPS)
        assert setting.power(blocks) == pytest.approx(0, abs=4 * EPS)


# Sixteen frames worked out from the form above; eight decimals are printed.
FRAMES = [
    0.65000000, 0.65299319, 0.65177670, 0.68222620, 0.75000000, 0.82364755, 0.85177670, 0.79441454,
    0.65000000, 0.46165147, 0.29822330, 0.22028643, 0.25000000, 0.36170779, 0.49822330, 0.60307283,
]  # fmt: skip


def test_a_full_example_of_sixteen_frames():
    plates = rotating_plate(16)
    assert powers(plates) == pytest.approx(FRAMES, abs=0.5e-8)
    found = reconstruct(powers(plates), plates)
    np.testing.assert_allclose(found.stokes, EXAMPLE, atol=40 * EPS)
    assert found.degree == pytest.approx(np.sqrt(0.5), abs=40 * EPS)
    azimuth, ellipticity = np.degrees(ellipse(found.stokes))
    assert azimuth == pytest.approx(-26.56505118, abs=0.5e-8)
    assert ellipticity == pytest.approx(-22.5, abs=1e-12)  # left-handed: +22.5 deg under the helicity sign


# H. G. Berry, G. Gabrielse, A. E. Livingston, Appl. Opt. 16, 3200 (1977), from memory: sin 4t vanishes at 0, 45, 90, 135 deg.


@pytest.mark.parametrize(("count", "rank"), [(4, 3), (5, 4), (6, 4), (8, 4)])
def test_the_least_number_of_plate_angles(count, rank):
    assert np.linalg.matrix_rank(weight_matrix(rotating_plate(count)), tol=100 * EPS) == rank


def test_four_plate_angles_are_refused_and_the_lost_component_is_named():
    with pytest.raises(ParameterError, match="do not see S2"):
        reconstruct(powers(rotating_plate(4)), rotating_plate(4))


@pytest.mark.parametrize("count", [5, 6, 7, 8, 12])
def test_the_sums_are_exact_for_five_angles_and_more(count):
    plates = rotating_plate(count)
    found = plate_harmonics(powers(plates), fast_axes(plates))
    np.testing.assert_allclose(found.stokes(), EXAMPLE, atol=1e-13)  # a dozen terms of order one


# Six and four frames: E. Hecht, Optics, section 8.12; B. Saleh, M. Teich, Fundamentals of Photonics, eq. (6.1-14), whose
# R turns clockwise facing the source, as here. From memory.


def test_six_and_four_frames():
    by_state = dict(zip("HVDARL", powers(SIX_STATES), strict=True))
    assert [by_state[k] for k in "HVDALR"] == pytest.approx([0.65, 0.35, 0.3, 0.7, 0.75, 0.25], abs=4 * EPS)
    i_h, i_v, i_d, i_r = powers(four_frames())
    s0 = i_h + i_v
    np.testing.assert_allclose([s0, i_h - i_v, 2 * i_d - s0, 2 * i_r - s0], EXAMPLE, atol=8 * EPS)
    np.testing.assert_allclose(reconstruct([i_h, i_v, i_d, i_r], four_frames()).stokes, EXAMPLE, atol=20 * EPS)


def test_circular_frames_through_a_real_plate():
    assert plate_then_polarizer(fast=45 * deg).power(EXAMPLE) == pytest.approx(0.75, abs=4 * EPS)
    assert plate_then_polarizer(fast=-45 * deg).power(EXAMPLE) == pytest.approx(0.25, abs=4 * EPS)


# D. S. Sabatke et al., Opt. Lett. 25, 802 (2000): 132 deg, +-51.7 and +-15.1 deg, condition number sqrt 3. The best four angles
# of a quarter-wave plate, 3.2739, were found by numerical search for this check.


def conditions(angles, retardance):
    return condition_number([plate_then_polarizer(fast=a * deg, retardance=retardance * deg, axis=0) for a in angles])


def test_the_best_rotating_retarder_polarimeter():
    printed = conditions((51.7, -51.7, 15.1, -15.1), 132)
    # Angles are printed to 0.1 deg, and at a minimum the error is of second order.
    assert printed == pytest.approx(np.sqrt(3), abs=0.02)
    best = minimize(
        lambda p: conditions((p[0], -p[0], p[1], -p[1]), p[2]), (51.7, 15.1, 132), method="Nelder-Mead",
        options={"xatol": 1e-4, "fatol": 1e-7},
    )  # fmt: skip
    assert best.x == pytest.approx((51.7, 15.1, 131.8), abs=0.1)
    assert best.fun == pytest.approx(np.sqrt(3), abs=1e-4)


def test_a_quarter_wave_plate_conditions_worse():
    best = minimize(
        lambda p: conditions((p[0], -p[0], p[1], -p[1]), 90), (50, 20), method="Nelder-Mead", options={"fatol": 1e-7}
    )
    assert best.fun == pytest.approx(3.2739, abs=1e-3)


# The classical measurement: G. G. Stokes 1852; Goldstein, Polarized Light (2003), from memory. A retarder with its fast axis at 0
# before a polarizer at t: I = (S0 + S1 cos 2t + S2 sin 2t cos d +- S3 sin 2t sin d)/2; + for S3(R) = +1, - for the helicity sign.


@pytest.mark.parametrize("theta", [0, 20, 45, 90, 130])
@pytest.mark.parametrize("retardance", [0, 60, 90])
def test_the_classical_measurement_formula(theta, retardance):
    t, d = theta * deg, retardance * deg
    s0, s1, s2, s3 = HELICITY
    form = (s0 + s1 * np.cos(2 * t) + s2 * np.sin(2 * t) * np.cos(d) - s3 * np.sin(2 * t) * np.sin(d)) / 2
    setting = plate_then_polarizer(fast=0, retardance=d, axis=t)
    assert setting.power(EXAMPLE) == pytest.approx(form, abs=8 * EPS)


def test_the_classical_measurement_of_the_example():
    assert plate_then_polarizer(fast=0, axis=45 * deg).power(EXAMPLE) == pytest.approx(0.25, abs=4 * EPS)


# Averages over a turning part. B. H. Billings, J. Opt. Soc. Am. 41, 966 (1951), re-derived: a half-wave plate averages to the Mueller
# matrix diag(1, 0, 0, -1), a quarter-wave plate to diag(1, 1/2, 1/2, 0), retardance d to diag(1, cos^2(d/2), cos^2(d/2), cos d), a
# polarizer to diag(1, 1/2, 1/2, 0)/2, a rotator to diag(1, 0, 0, 1).


def average(law_at):
    """Mueller matrix averaged over a turn of the part, each row and column measured by the six states."""
    rows = []
    for one, other in ((H, V), (D, A), (R, L)):
        weights = [
            np.mean([_behind(law_at(t), state).weights for t in np.arange(8) * np.pi / 8], axis=0)
            for state in (one, other)
        ]
        rows += [weights[0] + weights[1]] * (not rows) + [weights[0] - weights[1]]
    return np.array(rows)


def _behind(law, state):
    """The part, then an analyzer that passes the state."""
    if state.ellipticity == 0:
        return Setting("behind", (law, AxisLaw(across=Amplitude(0.0), angle=state.azimuth)))
    # R passes a quarter-wave plate at -45 deg and a polarizer at 0.
    plate = AxisLaw(Amplitude(1.0, -45 * deg), Amplitude(1.0, 45 * deg), -state.ellipticity)
    return Setting("behind", (law, plate, AxisLaw(across=Amplitude(0.0))))


def plate(d):
    return lambda t: AxisLaw(Amplitude(1.0, -d * deg / 2), Amplitude(1.0, d * deg / 2), t)


@pytest.mark.parametrize(
    ("law_at", "diagonal"),
    [
        (plate(180), (1, 0, 0, -1)),
        (plate(90), (1, 0.5, 0.5, 0)),
        (plate(50), (1, np.cos(25 * deg) ** 2, np.cos(25 * deg) ** 2, np.cos(50 * deg))),
        (lambda t: AxisLaw(across=Amplitude(0.0), angle=t), (0.5, 0.25, 0.25, 0)),
        (lambda t: CircularLaw(Amplitude(1.0, -t), Amplitude(1.0, t)), (1, 0, 0, 1)),
    ],
)
def test_averages_over_a_turning_part(law_at, diagonal):
    np.testing.assert_allclose(average(law_at), np.diag(diagonal), atol=40 * EPS)


# M. Born, E. Wolf, Principles of Optics (7th ed. 1999), section 10.9.3, from memory.


def test_two_orthogonal_beams_added_without_a_fixed_phase():
    for share in (0.0, 0.3, 0.5, 1.0):
        for one, other in ((H, V), (D, A), (R, L)):
            mixed = share * one.stokes + (1 - share) * other.stokes
            assert degree_of_polarization(mixed) == pytest.approx(abs(2 * share - 1), abs=4 * EPS)
