"""Analyzer settings: first rows of Mueller matrices, in the receiver's sign of S3."""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.camera.settings import (
    Setting,
    as_setting,
    as_settings,
    no_analyzer,
    plate_then_polarizer,
    polarizer_at,
)
from fastaxis.errors import ParameterError, SymbolError
from fastaxis.laws import Amplitude, AxisLaw, CircularLaw, ScalarLaw, TravelLaw
from fastaxis.light import A, D, H, L, R, State, V, elliptical, linear
from fastaxis.maths import NUMBERS
from fastaxis.units import deg

# A handful of products and sums of numbers of order one.
ROUNDINGS = 20 * np.finfo(float).eps
angles = st.floats(-math.pi, math.pi)


def test_a_quarter_wave_plate_at_minus_45_in_front_of_a_horizontal_polarizer_passes_R():
    passes_r = plate_then_polarizer(fast=-45 * deg, axis=0 * deg)
    assert passes_r.power(R.stokes) == pytest.approx(1, abs=ROUNDINGS)
    assert passes_r.power(L.stokes) == pytest.approx(0, abs=ROUNDINGS)


def test_at_plus_45_it_passes_L():
    passes_l = plate_then_polarizer(fast=45 * deg, axis=0 * deg)
    assert passes_l.power(L.stokes) == pytest.approx(1, abs=ROUNDINGS)
    assert passes_l.power(R.stokes) == pytest.approx(0, abs=ROUNDINGS)


def test_the_slow_axis_is_across_the_fast_one():
    one, other = plate_then_polarizer(slow=45 * deg), plate_then_polarizer(fast=-45 * deg)
    np.testing.assert_allclose(one.weights, other.weights, atol=ROUNDINGS)


@pytest.mark.parametrize(
    ("state", "weights"),
    [
        (H, (1, 1, 0, 0)),
        (V, (1, -1, 0, 0)),
        (D, (1, 0, 1, 0)),
        (A, (1, 0, -1, 0)),
        (R, (1, 0, 0, 1)),
        (L, (1, 0, 0, -1)),
    ],
)
def test_a_state_weighs_the_stokes_images_by_its_own_vector(state, weights):
    np.testing.assert_array_equal(as_setting(state).weights, np.array(weights) / 2)


@given(azimuth=angles, ellipticity=st.floats(-math.pi / 4, math.pi / 4), fast=angles, d=angles, axis=angles)
@settings(max_examples=50, deadline=None)
def test_weights_agree_with_the_field_sent_through_the_laws(azimuth, ellipticity, fast, d, axis):
    state = State(azimuth, ellipticity)
    analyzer = plate_then_polarizer(fast=fast, retardance=d, axis=axis, extinction=50, transmission=0.8)
    field = state.jones
    for law in analyzer.laws:
        field = np.array(law.linear(NUMBERS)) @ field
    assert analyzer.power(state.stokes) == pytest.approx(np.vdot(field, field).real, abs=ROUNDINGS)


@given(azimuth=angles, ellipticity=st.floats(-math.pi / 4, math.pi / 4), fast=angles, d=angles, axis=angles)
@settings(max_examples=50, deadline=None)
def test_no_setting_passes_more_than_there_is_nor_less_than_nothing(azimuth, ellipticity, fast, d, axis):
    power = plate_then_polarizer(fast=fast, retardance=d, axis=axis).power(State(azimuth, ellipticity).stokes)
    assert -ROUNDINGS <= power <= 1 + ROUNDINGS


def test_extinction_is_the_ratio_of_the_powers_along_and_across():
    real = polarizer_at(30 * deg, 200, transmission=0.9)
    along, across = real.power(linear(30 * deg).stokes), real.power(linear(120 * deg).stokes)
    assert along == pytest.approx(0.9, abs=ROUNDINGS)
    assert along / across == pytest.approx(200, rel=200 * ROUNDINGS)


def test_rotators_and_filters_may_stand_in_front_of_the_polarizer():
    turn = CircularLaw(Amplitude(1.0, -30 * deg), Amplitude(1.0, 30 * deg))
    half = ScalarLaw(Amplitude(0.5))
    setting = Setting("turned", (half, turn, AxisLaw(across=Amplitude(0.0))))
    # Turned by +30 deg before a polarizer at 0, light at -30 deg passes.
    np.testing.assert_allclose(setting.weights, as_setting(linear(-30 * deg)).weights / 2, atol=ROUNDINGS)


def test_without_an_analyzer_all_light_counts():
    np.testing.assert_array_equal(no_analyzer().weights, [1, 0, 0, 0])


def test_labels_say_what_stands_there():
    assert as_setting(R).label == "R"
    assert as_setting(linear(30 * deg)).label == linear(30 * deg).label
    assert as_setting(State(0.5, 0.1)).label == "28.6479°, 5.72958°"
    assert plate_then_polarizer(slow=22.5 * deg, axis=90 * deg).label == "plate slow 22.5°, polarizer 90°"
    assert polarizer_at(0, label="cube").label == "cube"


def test_power_of_a_map_keeps_its_shape():
    assert polarizer_at(0).power(np.ones((4, 3, 2))).shape == (3, 2)


def test_weights_cannot_be_changed_by_accident():
    with pytest.raises(ValueError, match="read-only"):
        as_setting(H).weights[0] = 1


def test_letters_are_kept_and_refused_as_numbers():
    import sympy

    a = sympy.Symbol("a", real=True)
    for setting in (as_setting(linear(a)), plate_then_polarizer(fast=a), polarizer_at(a)):
        assert setting.symbols == {a}
        with pytest.raises(SymbolError, match=r"a left open; a frame needs numbers.*\(fix: fa.linear\(30\*deg\)\)"):
            _ = setting.weights


def test_exact_numbers_of_a_symbol_library_are_numbers():
    import sympy

    np.testing.assert_allclose(as_setting(linear(sympy.pi / 4)).weights, [0.5, 0, 0.5, 0], atol=ROUNDINGS)


@pytest.mark.parametrize(
    ("slip", "message"),
    [
        (lambda: polarizer_at(0, 0.01), "extinction = 0.01; extinction is power passed along .* 1 or more .*100"),
        (lambda: polarizer_at(0, -3), "extinction = -3; .*fix: extinction=1e5"),
        (lambda: polarizer_at(45), r"axis = 45.*fix: axis=45\*deg"),
        (lambda: polarizer_at(0, transmission=1.2), "transmission = 1.2; .*no gain"),
        (lambda: plate_then_polarizer(fast=0, retardance=90), r"retardance = 90.*fix: retardance=90\*deg"),
        (lambda: plate_then_polarizer(fast=0, slow=1), r"fast = 0, slow = 1; a plate has its axis named once"),
        (lambda: plate_then_polarizer(retardance=1.5), r"fast = None, slow = None; .*fix: fast=45\*deg"),
        (lambda: plate_then_polarizer(fast=22.5), r"fast = 22.5.*fix: fast=22.5\*deg"),
        (lambda: Setting(""), "label = ''; a setting has a label"),
        (lambda: Setting("two", (AxisLaw(),), H), "two: 1 laws and a state; a setting is either"),
        (lambda: Setting("q", (AxisLaw(order=0.5),)), "q: AxisLaw varies over the plane; .*belongs into the train"),
        (lambda: Setting("far", (TravelLaw.free(1.0),)), "far: TravelLaw varies"),
        (lambda: as_settings(()), "no settings; a camera needs at least one"),
        (lambda: as_settings("HV"), "settings = 'HV'; settings are states or analyzers, not their labels"),
        (lambda: as_settings(["H"]), r"setting 'H'; a setting is a state that passes.*fix: fa\.H\)"),
        (lambda: as_setting("horizontal"), r"setting 'horizontal'; .*fix: fa\.linear\(30\*deg\)\)"),
        (lambda: as_settings(7), "settings = 7; settings are states"),
    ],
)
def test_slips_are_told_in_one_sentence(slip, message):
    with pytest.raises(ParameterError, match=message):
        slip()


def test_one_state_or_setting_alone_is_a_set():
    assert [s.label for s in as_settings(H)] == ["H"]
    assert [s.label for s in as_settings(no_analyzer())] == ["no analyzer"]
    assert as_settings(elliptical(0.1, 0.2))[0].state.ellipticity == 0.2
