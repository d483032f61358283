import pytest

import fastaxis as fa
import fastaxis.testing as ft
from fastaxis.units import deg, mW


def test_a_crossed_polarizer_is_dark(line):
    ft.port_dark(line, "meter", db=49)  # extinction 1e5 is 50 dB


def test_a_bright_port_names_the_plate_that_is_off(line, fails):
    error = fails(ft.port_dark, line.with_changes({"hwp.fast": 42 * deg}), "meter", db=45)
    assert error.expected == "dark to 45 dB below the laser"
    assert "19.6 dB below the laser" in error.got  # sin^2(6 deg) = 0.0109
    assert "hwp.fast stands at 45 deg, +3 deg off" in error.cause


def test_a_left_out_plate_is_found(fails, line):
    bare = line.with_changes({"pol.axis": 90 * deg})
    error = fails(ft.port_dark, bare, "meter")
    assert "hwp: left out" in error.cause


def test_darkness_behind_an_analyzer(line, fails):
    ft.port_dark(line, "hwp", behind=fa.H, db=100)
    assert "laser: long axis of its light turned by 90 deg" in fails(ft.port_dark, line, "hwp", behind=fa.V).cause


def test_power_at_a_port(line, fails):
    ft.port_power(line, "hwp", 4 * mW)
    ft.port_power(line, "hwp", 4 * mW, behind=fa.V)
    error = fails(ft.port_power, line, "hwp", 5 * mW)
    assert (error.expected, error.got) == ("5 mW within 1 %", "4 mW")
    assert error.cause == "no single mistake of the usual list explains it"


def test_half_the_power_is_explained_by_a_detuned_or_turned_plate(line, fails):
    cause = fails(ft.port_power, line, "meter", 2 * mW).cause
    assert "hwp.retardance is 90 deg, -90 deg off" in cause
    assert "22.5 deg off" in cause  # either way


def test_an_unknown_port_is_refused(line):
    with pytest.raises(fa.WiringError):
        ft.port_dark(line, "nowhere")


def test_powers_and_depths_that_cannot_be_are_refused(line):
    for db in (-30.0, float("nan")):
        with pytest.raises(fa.ParameterError, match="db must be"):
            ft.port_dark(line, "meter", db=db)
    for power in (-1 * mW, float("nan")):
        with pytest.raises(fa.ParameterError, match="power must be"):
            ft.port_power(line, "hwp", power)
    with pytest.raises(fa.ParameterError, match="within must be"):
        ft.port_power(line, "hwp", 4 * mW, within=-0.1)


def test_the_room_lists_its_assertions():
    assert {"port_dark", "state_at", "BenchError"} <= set(dir(ft))
