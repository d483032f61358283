import math
from importlib import import_module

import pytest
from PIL import Image

import fastaxis as fa
from fastaxis.camera import load, read_pictures


predict_module = import_module("fastaxis.cli.predict")
SMALL = """\
train = fa.Train(wavelength=532*nm, name="Gannet")
train.along(
    fa.Laser(waist=0.5*mm, power=4*mW, state=fa.D, name="laser"),
    fa.QuarterWavePlate(fast=0*deg, name="qwp"),
    fa.Camera(pixel=100*um, shape=(32, 32), name="cam"),
)
"""
METER = """\
train = fa.Train(wavelength=532*nm, name="Gannet")
train.along(fa.Laser(waist=0.5*mm, power=4*mW, state=fa.D, name="laser"), fa.Detector(name="meter"))
"""


def table(text):
    """{setting: cells} of a printed table."""
    rows = [line.split() for line in text.splitlines() if "%" in line]
    return {row[0]: row[1:] for row in rows}


def test_everything_is_written_and_the_table_printed(bench, run, tmp_path):
    ran = run("predict", bench(), "--out", "out")
    assert ran.code == 0
    assert {path.name for path in (tmp_path / "out").iterdir()} == {
        "cam.npz", "cam.tif", "cam_frames.png", "cam_frames.pdf", "cam_stokes.png", "cam_stokes.pdf",
        "cam_ellipses.png", "cam_ellipses.pdf", "bench.png", "bench.pdf",
    }  # fmt: skip
    # D through a quarter-wave plate with its fast axis at 0 is L.
    assert table(ran.out)["L"][:3] == ["4.000", "mW", "100.00%"]
    assert table(ran.out)["R"][:2] == ["0", "W"]
    assert "plan for cam" in ran.out
    assert ran.out.count("signs: exp(-iwt)") == 1


def test_without_out_the_folder_is_named_after_the_bench(bench, run, tmp_path):
    run("predict", bench(METER, name="quay.py"), "--format", "png")
    assert (tmp_path / "quay_predicted" / "meter_powers.png").exists()


def test_the_data_can_be_read_back(bench, run, tmp_path):
    run("predict", bench(), "--out", "out", "--format", "png")
    shots = load(tmp_path / "out" / "cam.npz")
    assert shots.power("L") == pytest.approx(4e-3, rel=1e-6)
    pictures = read_pictures(tmp_path / "out" / "cam.tif")
    assert pictures.labels == ("H", "V", "D", "A", "R", "L")
    assert pictures.frames[5].sum() == pytest.approx(4e-3, rel=1e-3)  # 16 bits over a picture of 30 lit pixels a side


def test_the_source_view_renames_everything_at_once(bench, run, tmp_path):
    ran = run("predict", bench(), "--out", "out", "--format", "png", "--view", "source")
    assert table(ran.out)["R"][2] == "100.00%"
    assert fa.stamp(fa.View.SOURCE) in ran.out
    assert fa.stamp() not in ran.out
    assert load(tmp_path / "out" / "cam.npz").view is fa.View.SOURCE
    for name in ("cam_frames", "cam_stokes", "cam_ellipses", "bench"):
        with Image.open(tmp_path / "out" / f"{name}.png") as image:
            assert image.text["Description"] == fa.stamp(fa.View.SOURCE)


def test_settings_come_from_the_command_then_the_bench_then_six(bench, run):
    own = bench(METER + "settings = (fa.A,)")
    assert list(table(run("predict", own, "--format", "png").out)) == ["A"]
    assert list(table(run("predict", own, "--format", "png", "--settings", "four").out)) == ["H", "V", "D", "R"]


def test_a_letter_gets_its_value(bench, run):
    text = """\
    import sympy
    theta = sympy.Symbol("theta", real=True)
    train = fa.Train(wavelength=532*nm, name="Gannet")
    train.along(
        fa.Laser(waist=0.5*mm, power=4*mW, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=theta, name="hwp"),
        fa.Detector(name="meter"),
    )
    """
    path = bench(text)
    assert table(run("predict", path, "--symbol", "theta=22.5deg", "--format", "png").out)["D"][2] == "100.00%"
    refused = run("predict", path)
    assert refused.code == 1
    assert "theta left open; a prediction needs a number for every letter (fix: --symbol theta=30deg)" in refused.err
    unknown = run("predict", path, "--symbol", "thta=1")
    assert unknown.code == 1
    assert "--symbol thta; the letters of this bench are theta (fix: --symbol theta=30deg)" in unknown.err
    bare = run("predict", path, "--symbol", "theta=45")
    assert bare.code == 1
    assert bare.err.rstrip().endswith("(fix: --symbol theta=45deg)")
    none = run("predict", bench(METER), "--symbol", "theta=1")
    assert "this bench has no letters (fix: leave out --symbol)" in none.err


def test_a_bench_without_settings_and_one_with_none_are_not_the_same(bench, run):
    refused = run("predict", bench(METER + "settings = ()"), "--format", "png")
    assert refused.code == 1
    assert "at least one setting" in refused.err


def test_what_misses_the_sensor_is_told(bench, run):
    ran = run("predict", bench(SMALL.replace("shape=(32, 32)", "shape=(8, 8)")), "--format", "png")
    # A square of half side 0.4 mm in a beam of w = 0.5 mm collects erf(sqrt2 0.4/0.5)^2 of it.
    share = math.erf(math.sqrt(2) * 0.8) ** 2
    assert f"on the sensor {4 * share:.3f} mW of 4.000 mW; {1 - share:.2%} falls beside it" in ran.out
    assert "falls beside" not in run("predict", bench(), "--format", "png").out


def test_shares_are_said_to_be_of_the_light_on_the_sensor(bench, run):
    assert "share: of the light on the sensor" in run("predict", bench(), "--format", "png").out


@pytest.mark.parametrize("orientation", ["turned 90", "mirrored"])
def test_a_turned_picture_is_told_below_the_table(bench, run, orientation):
    text = SMALL.replace('name="cam"', f'orientation={orientation!r}, name="cam"')
    told = run("predict", bench(text), "--format", "png").out
    assert "states, angles and places are named in the beam's own frame" in told


def test_an_engine_by_name(bench, run):
    assert "engine grid" in run("predict", bench(), "--format", "png", "--engine", "grid").out


def test_decades_make_the_scale_logarithmic(bench, run, monkeypatch):
    seen = []
    draw = predict_module.draw_frames
    monkeypatch.setattr(predict_module, "draw_frames", lambda shots, **k: seen.append(k) or draw(shots, **k))
    assert run("predict", bench(), "--format", "png", "--decades", "5").code == 0
    assert seen == [{"decades": 5.0}]


def test_a_grid_of_the_users_own(bench, run):
    assert "64 x 64" in run("explain", bench(), "--grid", "64,4mm", "--format", "png").out


def test_power_that_leaves_is_cautioned_about(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm, name="Gannet")
    train.along(
        fa.Laser(waist=0.5*mm, power=4*mW, state=fa.H, name="laser"),
        fa.BeamSplitter(reflectance=0.25, name="tap"),
        fa.Detector(name="meter"),
    )
    """
    ran = run("predict", bench(text), "--format", "png")
    assert "power leaves at tap.reflected (1.00 mW)" in ran.err
    assert "laser safety officer" in ran.err


def test_no_caution_on_a_closed_bench(bench, run):
    assert run("predict", bench(METER), "--format", "png").err == ""


def test_all_cameras_are_predicted_unless_one_is_named(bench, run, tmp_path):
    text = """\
    train = fa.Train(wavelength=532*nm, name="Gannet")
    train.along(fa.Laser(waist=0.5*mm, name="laser"), fa.BeamSplitter(name="tap"), fa.Detector(name="one"))
    train.along("tap.reflected", fa.Detector(name="two"))
    """
    path = bench(text)
    run("predict", path, "--format", "png", "--out", "both")
    run("predict", path, "--format", "png", "--out", "single", "--camera", "two")
    assert {p.stem for p in (tmp_path / "both").glob("*.npz")} == {"one", "two"}
    assert {p.stem for p in (tmp_path / "single").glob("*.npz")} == {"two"}


def test_a_bench_without_a_camera_is_told_how_to_add_one(bench, run):
    ran = run("predict", bench("train = fa.Train(wavelength=532*nm).along(fa.Laser(waist=1*mm), fa.BeamDump())"))
    assert ran.code == 1
    assert "needs a camera or detector that light reaches" in ran.err
    open_end = run(
        "predict", bench("train = fa.Train(wavelength=532*nm).along(fa.Laser(waist=1*mm), fa.Mirror(name='m'))")
    )
    assert 'train.along("m.front", fa.Camera' in open_end.err
