import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements import QPlate, Retarder
from fastaxis.light import H, L, R
from fastaxis.units import deg, mm, nm

angles = st.floats(-6, 6)
charges = st.sampled_from([0.5, -0.5, 1, 1.5, -2, 3])
quick = settings(max_examples=50, deadline=None)
# 2 q phi + 2 offset reaches 50 rad: its rounding of 50 * 1.1e-16 passes into the phasor.
ROUNDING = 1e-13
D = np.diag([-1.0, 1.0])


def test_half_charge_makes_h_radial(jones):
    for phi in (0.0, 1.0, -2.0):
        out = jones(QPlate(q=0.5), phi=phi) @ H.jones
        assert out == pytest.approx(-1j * np.array([math.cos(phi), math.sin(phi)]), abs=ROUNDING)


def test_teaching_number_of_a_plate_of_170_degrees():
    # Recomputed: cos^2(85 deg).
    assert QPlate(q=0.5, retardance=170 * deg).unconverted(532 * nm) == pytest.approx(0.0075961235, abs=5e-11)


@quick
@given(charges, angles, angles, angles)
def test_is_a_plain_plate_at_each_azimuth(jones, q, offset, retardance, phi):
    plain = Retarder(fast=math.remainder(q * phi + offset, math.pi), retardance=retardance)
    assert jones(QPlate(q=q, offset=offset, retardance=retardance), phi=phi) == pytest.approx(
        jones(plain), abs=ROUNDING
    )


@quick
@given(charges, angles, angles, angles)
def test_reciprocal_from_behind(jones, q, offset, retardance, phi):
    plate = QPlate(q=q, offset=offset, retardance=retardance)
    back = jones(plate, ("back", "front"), phi=math.pi - phi)
    assert back == pytest.approx(D @ jones(plate, phi=phi).T @ D, abs=ROUNDING)


@quick
@given(charges, angles, angles)
def test_turning_frame_and_plate_together_changes_nothing(jones, q, turn, phi):
    # Rotational covariance: the plate turned bodily has offset + (1 - q) turn.
    c, s = math.cos(turn), math.sin(turn)
    rotation = np.array([[c, -s], [s, c]])
    turned = QPlate(q=q, offset=0.2 + math.remainder((1 - q) * turn, math.pi), retardance=2.0)
    expected = rotation @ jones(QPlate(q=q, offset=0.2, retardance=2.0), phi=phi) @ rotation.T
    assert jones(turned, phi=phi + turn) == pytest.approx(expected, abs=ROUNDING)


def test_hands_change_places_with_the_sign_of_q(jones):
    phase = np.vdot(R.jones, jones(QPlate(q=-1), phi=0.4) @ L.jones)
    assert phase == pytest.approx(-1j * np.exp(-0.8j), abs=ROUNDING)


def test_design_wavelength():
    plate = QPlate(q=1, design=633 * nm)
    assert plate.retardance_at(1266 * nm) == pytest.approx(math.pi / 2, rel=1e-15)
    assert plate.unconverted(1266 * nm) == pytest.approx(0.5, abs=1e-15)
    assert len(plate.cautions(532 * nm)) == 1
    assert QPlate(q=1).cautions(532 * nm) == []


def test_centre_is_changed_by_coordinate():
    plate = QPlate(q=0.5, centre=(0.1 * mm, 0.2 * mm)).changed(centre_x=0.3 * mm)
    assert plate.centre == (0.3 * mm, 0.2 * mm)
    assert plate.changed(centre_x=0.0, centre_y=0.5 * mm).centre == (0.0, 0.5 * mm)
    assert plate.laws(532 * nm)[0].centre == plate.centre


def test_numbers_agree_with_letters(agrees):
    values = {"q": 0.5, "offset": 0.3, "retardance": 2.0}
    agrees(QPlate, values)
