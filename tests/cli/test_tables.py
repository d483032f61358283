from dataclasses import replace

import numpy as np
import pytest
from rich.console import Console

from fastaxis.camera import Exposure
from fastaxis.camera.settings import as_settings
from fastaxis.cli.tables import exposure_table
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
        console.print(exposure_table(shots))
    return {line.split()[0]: line.split()[1:] for line in captured.get().splitlines() if "%" in line or " - " in line}


def test_power_share_peak_lobes_and_angle(two_lobes):
    found = rows(two_lobes)["H"]
    peak = two_lobes.frame("H").max() / 1e-10
    assert found[:3] == ["2.000", "mW", "100.00%"]
    assert float(found[3]) == pytest.approx(peak / 1e3, rel=5e-3)  # three digits shown
    assert found[4:] == ["kW/m²", "2", "0.0°"]


def test_a_dark_frame_has_no_lobes(two_lobes):
    assert rows(two_lobes)["V"] == ["0", "W", "0.00%", "0", "W/m²", "round", "-"]


def test_a_detector_has_power_and_share_only(two_lobes):
    meter = replace(
        two_lobes, pixel=None, x=np.zeros(1), y=np.zeros(1), stokes=two_lobes.stokes.sum((1, 2), keepdims=True)
    )
    assert rows(meter)["H"] == ["2.000", "mW", "100.00%"]


def test_no_light_at_all_has_no_shares(two_lobes):
    assert rows(replace(two_lobes, stokes=0 * two_lobes.stokes))["H"][2] == "-"
