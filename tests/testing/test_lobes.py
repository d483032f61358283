"""Lobes, turning and index of a radial beam."""

import pytest

import fastaxis as fa
import fastaxis.testing as ft
from fastaxis.units import deg, um


def test_lobes_hold(ring):
    ft.lobe_count(ring, "cam", 2, behind=fa.H)
    ft.lobe_count(ring, "cam", 0, behind=fa.R)
    ft.lobe_angle(ring, "cam", 0 * deg, behind=fa.H)
    ft.lobe_angle(ring, "cam", 210 * deg, behind=fa.linear(30 * deg))


def test_a_wrong_number_of_lobes(ring, fails):
    error = fails(ft.lobe_count, ring, "cam", 4, behind=fa.H)
    assert (error.expected, error.got) == ("4 lobes", "2 lobes behind H")
    assert error.frames["got, H"].shape == (64, 64)


def test_lobes_astray_name_the_plate(ring, fails):
    error = fails(ft.lobe_angle, ring.with_changes({"hwp.fast": 10 * deg}), "cam", 0 * deg, behind=fa.H)
    assert "2 lobes, at 20 deg" in error.got  # light at 20 deg leaves the q-plate at phi - 20 deg
    assert "hwp.fast stands at 0 deg, -10 deg off" in error.cause


def test_bare_degrees_are_refused(ring):
    with pytest.raises(fa.ParameterError, match="radians"):
        ft.lobe_angle(ring, "cam", 45, behind=fa.H)
    with pytest.raises(fa.ParameterError, match="radians"):
        ft.lobe_angle(ring, "cam", 0 * deg, behind=fa.H, within=20.0)


def test_no_lobes_to_measure(ring, fails):
    assert fails(ft.lobe_angle, ring, "cam", 0 * deg, behind=fa.R).got == "no lobes"


def test_turning_sense_and_its_cause(ring, fails):
    ft.turning(ring, "cam", +1)
    error = fails(ft.turning, ring, "cam", -1)
    assert error.got == "2 lobes turning with the analyzer, +1 to one"
    assert "a half-wave plate left in front of the target" in error.cause or "sign of q" in error.cause
    assert "none" not in error.cause


def test_turning_without_lobes(ring, fails):
    error = fails(ft.turning, ring.with_changes({"qp.retardance": 0 * deg}), "cam", 1)
    assert "lobes" in error.got
    assert "qp.retardance" in error.cause


def test_index(ring, fails):
    ft.singular_index(ring, "cam", +1, radius=80 * um)
    error = fails(ft.singular_index, ring.with_changes({"qp.q": -0.5}), "cam", +1, radius=80 * um)
    assert (error.expected, error.got) == ("index +1", "index -1")
    assert "qp: sign of q (the plate stands back to front)" in error.cause


def test_index_where_there_is_none(ring, fails):
    circular = ring.with_changes({"laser.state": fa.R})
    assert "no index" in fails(ft.singular_index, circular, "cam", 1, radius=80 * um).got


def test_lobes_and_index_are_those_of_the_beam_however_the_camera_is_mounted(ring):
    mirrored = ring.with_changes({"cam.orientation": "mirrored"})
    ft.lobe_angle(mirrored, "cam", 30 * deg, behind=fa.linear(30 * deg))
    ft.singular_index(mirrored, "cam", +1, radius=80 * um)


def test_the_dark_has_no_lobes(ring, fails):
    dark = ring.with_changes({"qp.retardance": 0 * deg})
    assert fails(ft.lobe_count, dark, "cam", 2, behind=fa.V).got == "0 lobes behind V"
