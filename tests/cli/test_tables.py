from dataclasses import replace

import numpy as np
import pytest
from rich.console import Console

from fastaxis.camera import Exposure
from fastaxis.camera.settings import as_settings, plate_then_polarizer
from fastaxis.cli.console import say
from fastaxis.cli.tables import exposure_table, remarks, rows_of
from fastaxis.light import H, V


@pytest.fixture
def two_lobes():
    x = (np.arange(40) - 19.5) * 1e-5
    px, py = np.meshgrid(x, x)
    s0 = px**2 * np.exp(-(px**2 + py**2) / (1e-4) ** 2)
    s0 *= 2e-3 / s0.sum()
    stokes = np.stack([s0, s0, 0 * s0, 0 * s0])
    return Exposure(
        stokes=stokes, settings=as_settings((H, V)), x=x, y=x, pixel=1e-5, wavelength=5e-7, name="Gannet", target="cam"
    )


def rows(shots):
    console = Console(width=100)
    with console.capture() as captured:
        console.print(exposure_table(shots, rows_of(shots)))
    return {line.split()[0]: line.split()[1:] for line in captured.get().splitlines() if "%" in line or " - " in line}


def test_power_share_peak_lobes_and_angle(two_lobes):
    found = rows(two_lobes)["H"]
    peak = two_lobes.frame("H").max() / 1e-10
    assert found[:3] == ["2.000", "mW", "100.00%"]
    assert float(found[3]) == pytest.approx(peak / 1e3, rel=5e-3)  # three digits shown
    assert found[4:] == ["kW/m²", "2", "lobes", "0.0°"]


def test_a_dark_frame_has_no_lobes(two_lobes):
    assert rows(two_lobes)["V"] == ["0", "W", "0.00%", "-", "dark", "-"]


def test_roundings_are_no_power_and_have_no_lobes(two_lobes):
    s0 = two_lobes.stokes[0]
    crossed = replace(two_lobes, stokes=np.stack([s0, s0 * (1 - 2e-16), 0 * s0, 0 * s0]))
    assert crossed.power("V") > 0
    assert rows(crossed)["V"] == ["<", "2", "fW", "0.00%", "-", "dark", "-"]  # 1e-12 of 2 mW


def test_rings_and_places_are_told(two_lobes):
    def told(s0):
        shots = replace(two_lobes, stokes=np.stack([s0, s0, 0 * s0, 0 * s0]))
        return [*rows(shots)["H"][5:], *remarks(shots, rows_of(shots))]

    px, py = np.meshgrid(two_lobes.x, two_lobes.y)
    r2 = (px**2 + py**2) / 1e-8
    # r^2 exp(-2 r^2) is brightest at w/sqrt2; pixels of w/10 average it over a twelfth of a square of a tenth.
    ring = told(r2 * np.exp(-2 * r2))
    assert ring[:3] == ["ring,", "r", "="]
    assert float(ring[3]) == pytest.approx(70.7, abs=0.7)
    spot = np.exp(-2 * ((px - 3e-5) ** 2 + (py + 2e-5) ** 2) / 4e-9)
    assert told(spot)[:3] == ["round,", "off", "axis"]
    assert told(spot)[-1] == "H: centre of gravity at (0.030, -0.020) mm"
    dark_ring = (1 - 2 * r2) ** 2 * np.exp(-2 * r2)
    # Pixels of 10 um smear the dip at 70.7 um: it is read to half a pixel.
    assert float(told(dark_ring)[-1].removeprefix("H: first dark ring at r = ").split()[0]) == pytest.approx(
        70.7, abs=5
    )


def test_nothing_is_cut_where_there_is_no_terminal(two_lobes, capsys):
    long = plate_then_polarizer(fast=0.1, axis=0.2)
    shots = replace(two_lobes, settings=(long,))
    say(exposure_table(shots, rows_of(shots)))
    assert long.label in capsys.readouterr().out


def test_each_row_is_told_of(two_lobes):
    told = []
    rows_of(two_lobes, lambda: told.append(1))
    assert len(told) == 2


def test_a_detector_has_power_and_share_only(two_lobes):
    meter = replace(
        two_lobes, pixel=None, x=np.zeros(1), y=np.zeros(1), stokes=two_lobes.stokes.sum((1, 2), keepdims=True)
    )
    assert rows(meter)["H"] == ["2.000", "mW", "100.00%"]


def test_no_light_at_all_has_no_shares(two_lobes):
    assert rows(replace(two_lobes, stokes=0 * two_lobes.stokes))["H"][2] == "-"
