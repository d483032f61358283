"""An exposure in words."""

from dataclasses import replace

import numpy as np

from fastaxis.conventions import View, stamp


def test_a_line_a_setting_closed_by_the_signs(shots):
    lines = str(shots).splitlines()
    assert lines[0] == "Cinder Lane, cam"
    assert [line.split()[0] for line in lines[1:7]] == list("HVDARL")
    assert lines[1].split()[2] == "uW"
    assert lines[7] == stamp()


def test_lobes_are_told_where_there_are_some(shots):
    radial = np.zeros_like(shots.stokes)
    X, Y = np.meshgrid(shots.x / 3e-5, shots.y / 3e-5)
    ring = np.exp(-2 * (X**2 + Y**2)) * 1e-3
    radial[0], radial[1], radial[2] = ring * (X**2 + Y**2), ring * (X**2 - Y**2), ring * 2 * X * Y
    lines = str(replace(shots, stokes=radial)).splitlines()
    assert lines[1].endswith("2 lobes at 0.0°")
    assert lines[2].endswith("2 lobes at 90.0°")
    assert "lobe" not in lines[5]


def test_the_naming_in_force_is_shown(shots):
    lines = str(shots.in_view(View.SOURCE)).splitlines()
    assert lines[5].split()[0] == "L"
    assert lines[7] == stamp(View.SOURCE)


def test_darkness_and_watts(shots):
    scaled = replace(shots, stokes=shots.stokes / shots.power("H") * 2)
    assert "2 W" in str(scaled).splitlines()[1]
    assert "0 nW" in str(replace(shots, stokes=0 * shots.stokes))
