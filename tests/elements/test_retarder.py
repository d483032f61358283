import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements import HalfWavePlate, QuarterWavePlate, Retarder
from fastaxis.errors import SlipWarning
from fastaxis.light import H, R, V, linear
from fastaxis.units import deg, nm

angles = st.floats(-6, 6)
quick = settings(max_examples=50, deadline=None)
ROUNDING = 1e-14  # products of up to four 2x2 matrices with entries up to 1


def test_half_wave_plate_at_zero_is_minus_i_times_diag(jones):
    assert jones(HalfWavePlate(fast=0)) == pytest.approx(np.diag([-1j, 1j]), abs=0)


def test_quarter_wave_plate_makes_r_of_h(jones):
    out = jones(QuarterWavePlate(fast=45 * deg)) @ H.jones
    assert abs(np.vdot(R.jones, out)) ** 2 == pytest.approx(1, abs=ROUNDING)


@quick
@given(angles, angles)
def test_half_wave_plate_turns_linear_light_to_the_mirror_azimuth(jones, fast, azimuth):
    out = jones(HalfWavePlate(fast=fast)) @ linear(azimuth).jones
    leaves = math.remainder(2 * fast - azimuth, math.pi)
    assert abs(np.vdot(linear(leaves).jones, out)) == pytest.approx(1, abs=ROUNDING)


@quick
@given(angles, angles, st.floats(0, 1))
def test_loss_is_the_transmission_in_any_state(jones, fast, retardance, transmission):
    matrix = jones(Retarder(fast=fast, retardance=retardance, transmission=transmission))
    assert matrix @ matrix.conj().T == pytest.approx(transmission * np.eye(2), abs=ROUNDING)


@quick
@given(angles, angles)
def test_slow_is_a_quarter_turn_from_fast(jones, slow, retardance):
    assert jones(Retarder(slow=slow, retardance=retardance)) == pytest.approx(
        jones(Retarder(fast=slow - math.pi / 2, retardance=retardance)), abs=ROUNDING
    )


@quick
@given(angles, angles)
def test_swapping_the_axes_is_negative_retardance(jones, fast, retardance):
    assert jones(Retarder(fast=fast, retardance=retardance)) == pytest.approx(
        jones(Retarder(slow=fast, retardance=-retardance)), abs=ROUNDING
    )


def test_path_difference_goes_as_one_over_wavelength():
    plate = Retarder(fast=0.0, retardance=90 * deg, design=600 * nm, order=2)
    assert plate.retardance_at(600 * nm) == pytest.approx(4.5 * math.pi, rel=1e-15)
    assert plate.retardance_at(1200 * nm) == pytest.approx(2.25 * math.pi, rel=1e-15)


def test_without_design_retardance_holds_anywhere():
    assert QuarterWavePlate(fast=0).retardance_at(1e-6) == math.pi / 2


def test_numbers_agree_with_letters(agrees):
    agrees(lambda fast, retardance: Retarder(fast=fast, retardance=retardance), {"fast": 0.4, "retardance": 1.3})
    agrees(lambda slow: Retarder(slow=slow, retardance=0.9), {"slow": 0.4}, ("back", "front"))


def test_changing_one_axis_unnames_the_other():
    turned = HalfWavePlate(slow=10 * deg).changed(fast=20 * deg)
    assert (turned.fast, turned.slow) == (20 * deg, None)
    assert HalfWavePlate(fast=10 * deg).changed(slow=20 * deg).fast is None


def test_far_from_design_is_a_caution():
    plate = QuarterWavePlate(fast=0, design=633 * nm, name="qwp")
    assert plate.cautions(650 * nm) == []
    (caution,) = plate.cautions(532 * nm)
    assert isinstance(caution, SlipWarning)
    assert str(caution) == (
        "qwp: design = 633*nm; a plate made for 633 nm is far off its nominal values at 532 nm (fix: design=532*nm)"
    )
    assert plate.changed(**eval(f"dict({caution.fix})", {"nm": nm})).cautions(532 * nm) == []


def test_v_stays_v_along_the_axis(jones):
    out = jones(Retarder(fast=90 * deg, retardance=1.0)) @ V.jones
    assert out == pytest.approx(np.exp(-0.5j) * V.jones, abs=ROUNDING)
