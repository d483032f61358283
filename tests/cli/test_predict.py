import pytest
from PIL import Image

import fastaxis as fa
from fastaxis.camera import load, read_pictures


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
    assert "theta left open; a prediction needs a number for every letter (fix: --symbol theta=0.3)" in refused.err
    assert run("predict", path, "--symbol", "thta=1").code == 1


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
