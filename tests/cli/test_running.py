import pytest

import fastaxis as fa
from fastaxis.camera import load


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        ((), "COMMAND"),
        (("predict",), "BENCH.py"),
        (("predict", "nowhere.py"), "there is no file nowhere.py"),
        (("fly", "bench.py"), "invalid choice: 'fly'"),
        (("predict", "bench.py", "--settings", "nine"), "six, four, linear:N or plate:N"),
        (("predict", "bench.py", "--grid", "8mm"), "SAMPLES,WINDOW"),
        (("predict", "bench.py", "--format", "svg"), "format 'svg'"),
        (("predict", "bench.py", "--symbol", "theta"), "LETTER=VALUE"),
        (("predict", "bench.py", "--dpi", "7"), "a whole number from 20 to 1200, not '7'"),
        (("predict", "bench.py", "--view", "side"), "receiver or source"),
        (("predict", "bench.py", "--settings", "plate:100000"), "at most 1000 settings"),
        (("predict", "bench.py", "--decades", "0"), "a whole number from 1 to 12, not '0'"),
        (("predict", "bench.py", "--engine", "steam"), "invalid choice: 'steam'"),
        (("derive", "bench.py", "--setting", "5 furlongs"), "a quantity is a number"),
    ],
)
def test_wrong_usage_is_2_and_says_why_in_one_line(bench, run, arguments, says):
    bench()
    ran = run(*arguments)
    assert ran.code == 2
    assert says in ran.err
    assert len(ran.err.splitlines()) == 1
    assert ran.err.rstrip().endswith("--help)")


@pytest.mark.parametrize("command", ["predict", "derive", "explain"])
@pytest.mark.parametrize(
    ("text", "says"),
    [
        ("lens = fa.Lens(focal=0)", "bench.py:3: Lens: focal = 0"),
        ("train = None", "train is NoneType"),
        ("train = fa.Train(wavelength=532*nm).along(fa.Camera(pixel=5*um, name='cam'))", "a train needs a laser"),
        ("train = fa.Train(wavelength=532)", "wavelength"),
    ],
)
def test_a_mistake_in_the_bench_is_1_and_one_line(bench, run, command, text, says):
    ran = run(command, bench(text).name)
    assert ran.code == 1
    last = ran.err.strip().splitlines()[-1]
    assert last.startswith("fastaxis: ")
    assert says in last


def test_an_unknown_camera_gets_the_likely_name(bench, run):
    ran = run("predict", bench(), "--camera", "cann")
    assert ran.code == 1
    assert '(fix: "cam")' in ran.err


@pytest.mark.parametrize("command", ["predict", "explain", "inspect"])
def test_a_file_in_the_place_of_the_folder_is_told_before_any_work(bench, run, tmp_path, command):
    (tmp_path / "taken").write_text("a file")
    ran = run(command, bench(), "--out", "taken")
    assert ran.code == 2
    assert "taken is a file; results are written to a folder (fix: --out taken_results)" in ran.err
    assert ran.out == ""


def test_a_folder_that_cannot_be_made_is_one_line(bench, run, tmp_path):
    (tmp_path / "taken").write_text("a file")
    ran = run("predict", bench(), "--out", "taken/inside")
    assert ran.code == 1
    assert ran.err.strip().splitlines()[-1].startswith("fastaxis: taken/inside")


def test_version(run):
    assert run("--version").out == f"fastaxis {fa.__version__}\n"


def test_a_warning_is_told_once_as_a_caution(bench, run):
    text = """\
    train = fa.Train(wavelength=532*nm, name="Gannet")
    train.along(fa.Laser(waist=0.5*mm, name="laser"), fa.Detector(name="meter"))
    train.add(fa.Lens(focal=1*m, name="spare"))
    """
    ran = run("predict", bench(text), "--format", "png")
    assert ran.code == 0
    assert ran.err.count("caution: spare (Lens); no light reaches it") == 1


@pytest.mark.parametrize("stopped_at", ["draw_stokes", "draw_ellipses"])
def test_ctrl_c_is_130_and_leaves_finished_files_whole(bench, run, tmp_path, monkeypatch, stopped_at):
    def stop(*_, **__):
        raise KeyboardInterrupt

    monkeypatch.setattr(f"fastaxis.cli.predict.{stopped_at}", stop)
    ran = run("predict", bench(), "--out", "out", "--format", "png")
    assert ran.code == 130
    assert "stopped" in ran.err
    names = {path.name for path in (tmp_path / "out").iterdir()}
    finished = {"cam.npz", "cam.tif", "cam_frames.png"}
    assert names == (finished if stopped_at == "draw_stokes" else finished | {"cam_stokes.png"})
    assert load(tmp_path / "out" / "cam.npz").total_power == pytest.approx(4e-3, rel=1e-6)
