import math

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.maths import NUMBERS, Pattern

angles = st.floats(-6, 6)
shares = st.floats(0, 1)
orders = st.sampled_from([0, 0.5, -0.5, 1, 1.5, -2])
laws = st.builds(AxisLaw, st.builds(Amplitude, shares, angles), st.builds(Amplitude, shares, angles), angles, orders)
# (E_L, E_R) = U (E_x, E_y)
U = np.array([[1, -1j], [1, 1j]]) / math.sqrt(2)
D = np.diag([-1.0, 1.0])
# Angles of up to about 30 rad carry 30 * 1.1e-16 of rounding into a phasor; a dozen such steps.
ROUNDING = 1e-13
quick = settings(max_examples=50, deadline=None)


def linear(law, phi=0.0, x=0.0, y=0.0):
    return np.array(law.linear(NUMBERS, phi, x, y), dtype=complex)


def circular(law, phi=0.0):
    return np.array(law.circular(NUMBERS, phi), dtype=complex)


@quick
@given(laws, angles)
def test_bases_agree(law, phi):
    assert circular(law, phi) == pytest.approx(U @ linear(law, phi) @ U.conj().T, abs=ROUNDING)


@quick
@given(laws, angles)
def test_no_gain_and_symmetric(law, phi):
    matrix = linear(law, phi)
    assert np.linalg.norm(matrix, 2) <= 1 + ROUNDING
    assert matrix == pytest.approx(matrix.T, abs=0)


@quick
@given(angles, angles, angles, orders, angles)
def test_unitary_without_loss(one, two, angle, order, phi):
    matrix = linear(AxisLaw(Amplitude(phase=one), Amplitude(phase=two), angle, order), phi)
    assert matrix @ matrix.conj().T == pytest.approx(np.eye(2), abs=ROUNDING)


@quick
@given(laws, angles)
def test_turning_the_part_turns_the_matrix(law, turn):
    c, s = math.cos(turn), math.sin(turn)
    rotation = np.array([[c, -s], [s, c]])
    turned = AxisLaw(law.along, law.across, law.angle + turn)
    plain = AxisLaw(law.along, law.across, law.angle)
    assert linear(turned) == pytest.approx(rotation @ linear(plain) @ rotation.T, abs=ROUNDING)


@quick
@given(laws, angles)
def test_backward_is_d_jt_d_at_the_mirrored_place(law, phi):
    expected = D @ linear(law, phi).T @ D
    assert linear(law.backward(), math.pi - phi) == pytest.approx(expected, abs=ROUNDING)


@quick
@given(laws, angles)
def test_mirrored_in_y_is_met_at_minus_phi(law, phi):
    assert linear(law.mirrored("y"), -phi) == pytest.approx(D @ linear(law, phi) @ D, abs=ROUNDING)


@quick
@given(laws, angles)
def test_backward_twice_is_the_law_itself(law, phi):
    assert linear(law.backward().backward(), phi) == pytest.approx(linear(law, phi), abs=ROUNDING)


def test_q_plate_met_from_behind_has_offset_minus_alpha_minus_q_pi():
    back = AxisLaw(angle=0.3, order=0.5, centre=(1e-3, 2e-3)).backward()
    assert back.angle == pytest.approx(-0.3 - 0.5 * math.pi, abs=1e-15)
    assert back.order == 0.5
    assert back.centre == (-1e-3, 2e-3)


@pytest.mark.parametrize("axis", ["x", "y"])
def test_patterned_axis_is_mirrored_place_by_place(axis):
    law = AxisLaw(Amplitude(phase=-1.0), Amplitude(phase=1.0), Pattern(lambda x, y: 0.4 + 3 * x - y), order=0.5)
    x, y, phi = np.array(0.2), np.array(-0.7), math.atan2(-0.7, 0.2)
    there = (-x, y, math.pi - phi) if axis == "x" else (x, -y, -phi)
    mirrored = linear(law.mirrored(axis), there[2], there[0], there[1])
    assert mirrored == pytest.approx(D @ linear(law, phi, x, y) @ D, abs=ROUNDING)


@pytest.mark.parametrize("order", [0, 0.5])
def test_angle_derivative_is_the_slope(order):
    law = AxisLaw(Amplitude(0.9, -0.4), Amplitude(0.3, 0.8), 0.3, order)
    step = 1e-5  # central difference: error step^2 of the third derivative (8) = 1e-9/1.3, roundings 1e-16/step = 1e-11
    up, down = (linear(AxisLaw(law.along, law.across, 0.3 + s, order), 1.1) for s in (step, -step))
    assert np.array(law.angle_derivative(NUMBERS, 1.1)) == pytest.approx((up - down) / (2 * step), abs=2e-9)


def test_retardance_derivative_is_the_slope():
    def law(delta):
        return AxisLaw(Amplitude(0.9, -delta / 2), Amplitude(0.9, delta / 2), 0.3)

    step = 1e-5
    slope = (linear(law(1.2 + step)) - linear(law(1.2 - step))) / (2 * step)
    assert np.array(law(1.2).retardance_derivative(NUMBERS)) == pytest.approx(slope, abs=2e-9)


def test_uniform():
    assert AxisLaw(angle=0.3).uniform
    assert not AxisLaw(order=0.5).uniform
    assert not AxisLaw(angle=Pattern(lambda x, y: x)).uniform
    assert not AxisLaw(along=Amplitude(phase=Pattern(lambda x, y: x))).uniform


@pytest.mark.parametrize("values", [(0.3, 1.2, 0.5, 0.9), (-1.1, 3.0, 1.0, -2.0)])
def test_letters_agree_with_numbers(letters, values):
    theta, delta, q, phi = sympy.symbols("theta delta q phi", real=True)
    half = delta / 2
    law = AxisLaw(Amplitude(phase=-half), Amplitude(phase=half), theta, q)
    at = dict(zip((theta, delta, q, phi), values, strict=True))
    number = AxisLaw(Amplitude(phase=-values[1] / 2), Amplitude(phase=values[1] / 2), values[0], values[2])
    for basis in ("linear", "circular"):
        symbolic = sympy.Matrix(getattr(law, basis)(letters, phi)).subs(at).evalf()
        expected = np.array(getattr(number, basis)(NUMBERS, values[3]), dtype=complex)
        assert np.array(symbolic, dtype=complex) == pytest.approx(expected, abs=ROUNDING)
