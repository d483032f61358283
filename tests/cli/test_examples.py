"""Every example bench through the command line, with numbers worked out apart from this project's engines."""

import ast
import runpy
from dataclasses import dataclass
from pathlib import Path

import numpy as np
import pytest
from scipy.special import jn_zeros

import fastaxis as fa
from fastaxis.analysis import l_line_radius, polarization_index, radial_profile, ring_radius
from fastaxis.camera import load, reconstruct
from fastaxis.units import deg, mm, mW, um


@dataclass(frozen=True)
class Predicted:
    text: str
    cautions: str
    folder: object

    def shots(self, camera="cam"):
        return load(self.folder / f"{camera}.npz")


@pytest.fixture
def predicted(run, examples, tmp_path):
    def predict(name):
        ran = run("predict", examples / f"{name}.py", "--out", "out", "--format", "png", "--dpi", "40")
        assert ran.code == 0
        return Predicted(ran.out, ran.err, tmp_path / "out")

    return predict


def test_cinder_lane_is_radial(predicted):
    shots = predicted("cinder_lane_switch").shots()
    for row, analyzer in zip(shots.table()[:4], (0, 90, 45, 135), strict=True):
        assert row.lobes == 2
        assert row.angle / deg % 180 == pytest.approx(analyzer, abs=0.1)
    # The brightest ring of r 1F1(3/2; 2; -r^2/w^2) with w = wavelength f/(pi 0.8 mm) = 105.8 um lies at 0.8446 w.
    assert ring_radius(shots.stokes[0], x=shots.x, y=shots.y) == pytest.approx(89.4 * um, abs=0.4 * um)


def test_cinder_lane_at_45_degrees_is_azimuthal(examples):
    train = runpy.run_path(str(examples / "cinder_lane_switch.py"))["train"].with_changes({"hwp.fast": 45 * deg})
    row = train.expose("cam", [fa.H]).table()[0]
    assert row.lobes == 2
    assert row.angle / deg == pytest.approx(90, abs=0.1)


def test_saltpan_holds_every_polarization(predicted):
    shots = predicted("saltpan_full_poincare").shots()
    # S3 = 0 where sqrt2 r/w = 1.
    assert l_line_radius(shots.stokes, x=shots.x, y=shots.y) == pytest.approx(0.9 * mm / np.sqrt(2), rel=1e-3)
    assert polarization_index(shots.stokes, x=shots.x, y=shots.y, radius=0.3 * mm) == pytest.approx(0.5)
    assert shots.power("R") == pytest.approx(1 * mW, rel=1e-4)
    assert [row.lobes for row in shots.table()[:4]] == [1, 1, 1, 1]


def test_low_quay_measures_the_state_and_shows_a_wrong_plate(predicted, examples):
    shots = predicted("low_quay_polarimeter").shots("meter")
    assert len(shots) == 64
    measured = reconstruct(shots.frames, shots.settings).stokes.ravel()
    azimuth, ellipticity = 20 * deg, 15 * deg
    expected = [
        1,
        np.cos(2 * ellipticity) * np.cos(2 * azimuth),
        np.cos(2 * ellipticity) * np.sin(2 * azimuth),
        np.sin(2 * ellipticity),
    ]
    # The file keeps doubles; the fit of 64 readings loses a few roundings times its condition number of about 2.
    assert measured / measured[0] == pytest.approx(expected, abs=1e-12)
    true = fa.rotating_plate(64, retardance=85 * deg, span=360 * deg)
    wrong = reconstruct([shots.power(one) for one in true], shots.settings).stokes / shots.total_power
    assert wrong == pytest.approx([1.0578, 0.6056, 0.5082, 0.4981], abs=5e-5)  # four digits, from an independent sum


def test_tern_yard_shares_the_light_as_the_splitter_says(predicted):
    ran = predicted("tern_yard_two_cameras")
    straight, over = ran.shots("straight"), ran.shots("over")
    # Half of the light is H everywhere on the ring; what passes are Tp, Ts and Rp, Rs.
    assert straight.power("90°") / straight.total_power == pytest.approx(0.003 / 0.973, rel=5e-3)
    assert over.power("0°") / over.total_power == pytest.approx(0.028 / 1.023, rel=5e-3)
    assert [row.lobes for row in straight.table()[:2]] == [4, 4]
    assert straight.table()[0].angle / deg % 90 == pytest.approx(0, abs=0.2)
    assert over.table()[0].angle / deg % 90 == pytest.approx(45, abs=0.2)


def test_kelp_slip_returns_what_the_plate_leaves(predicted):
    ran = predicted("kelp_slip_double_pass")
    # Twice 88 deg of retardance: sin^2(88 deg) goes to the side, the rest back towards the laser.
    assert ran.shots().total_power == pytest.approx(20 * mW * np.sin(88 * deg) ** 2, rel=1e-6)
    assert f"pbs.front ({20e3 * np.cos(88 * deg) ** 2:.1f} µW)" in ran.cautions
    assert "laser safety officer" in ran.cautions


def test_marram_ring_is_that_of_a_round_opening(predicted):
    shots = predicted("marram_pinhole").shots()
    r, profile = radial_profile(shots.stokes[0], x=shots.x, y=shots.y, count=100)
    near = (r > 80 * um) & (r < 150 * um)
    dark = r[near][np.argmin(profile[near])]
    # G. B. Airy, Trans. Camb. Phil. Soc. 5, 283 (1835): the first zero of J1; found to one pixel.
    assert dark == pytest.approx(jn_zeros(1, 1)[0] / np.pi * 632.8e-9 * 0.3 / 2e-3, abs=3.45 * um)


def test_curlew_mill_halves_part_by_polarization(predicted):
    shots = predicted("curlew_mill_split_plate").shots()
    assert shots.power("H") == pytest.approx(shots.total_power / 2, rel=1e-3)
    left = shots.frame("H")[:, shots.x < 0].sum() / shots.power("H")
    right = shots.frame("V")[:, shots.x > 0].sum() / shots.power("V")
    # Diffraction at the seam reaches sqrt(wavelength z) = 0.2 mm across a beam of 1 mm.
    assert left > 0.95
    assert right > 0.95


def test_every_example_is_tried_somewhere(examples):
    tests = "".join(path.read_text(encoding="utf-8") for path in Path(__file__).parents[1].rglob("test_*.py"))
    for path in examples.glob("*.py"):
        assert path.stem in tests, path.name


def test_every_example_says_what_to_look_for(examples):
    for path in examples.glob("*.py"):
        assert "Look for:" in (ast.get_docstring(ast.parse(path.read_text(encoding="utf-8"))) or ""), path.name
