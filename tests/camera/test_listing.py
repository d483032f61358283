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
    assert "dark" in str(replace(shots, stokes=0 * shots.stokes)).splitlines()[1]


def test_roundings_are_dark_and_have_no_lobes(shots):
    # Behind V: the difference of two equal images, whose last digits are turned over here and there.
    s0 = shots.stokes[0]
    rough = s0 * (1 - 2e-16 * np.sign(np.sin(3 * np.arctan2(*np.meshgrid(shots.x, shots.y)))))
    dust = replace(shots, stokes=np.stack([s0, rough, 0 * s0, 0 * s0]))
    row = dust.table()[1]
    assert 0 < row.power < 1e-15 * dust.total_power
    assert (row.kind, row.lobes) == ("dark", 0)
    # 1e-12 of the light on the sensor
    assert str(dust).splitlines()[2].split()[1:3] == ["dark:", "<"]
    extinct = replace(shots, stokes=shots.stokes * 1e-32 / shots.total_power, sent=1e-3)
    assert {row.kind for row in extinct.table()} == {"dark"}


def test_a_round_spot_beside_the_axis_is_told_with_its_place(shots):
    axis = np.arange(-40, 41) * 1e-5
    spot = 1e-3 * np.exp(-2 * ((axis - 1.2e-4) ** 2 + (axis[:, None] + 0.8e-4) ** 2) / 1e-8)
    beside = replace(shots, stokes=np.stack([spot, spot, 0 * spot, 0 * spot]), x=axis, y=axis)
    assert beside.table()[0].kind == "beside"
    assert str(beside).splitlines()[1].endswith("round about (0.12, -0.08) mm")
