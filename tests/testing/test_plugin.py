"""The plugin in a pytest of its own."""

import os
import subprocess
import sys

from PIL import Image

FILES = {
    "gannet.py": """
import fastaxis as fa
from fastaxis.units import *
train = fa.Train(wavelength=633*nm, name="Gannet").along(
    fa.Laser(waist=0.3*mm, state=fa.H, name="laser"), fa.HalfWavePlate(fast=10*deg, name="hwp"),
    fa.Camera(pixel=50*um, shape=(32, 32), name="cam"))
""",
    "test_gannet.py": """
import fastaxis as fa, fastaxis.testing as ft
def test_good(load_bench):
    ft.port_power(load_bench("gannet.py"), "cam", 1e-3)
def test_bad(load_bench):
    ft.lobe_count(load_bench("gannet.py"), "cam", 2, behind=fa.H)
""",
}


def run(folder, *options):
    for name, text in FILES.items():
        (folder / name).write_text(text)
    loaded = ["-p", "fastaxis.testing.plugin"] if "PYTEST_DISABLE_PLUGIN_AUTOLOAD" in ENV else []
    command = [sys.executable, "-m", "pytest", "-q", "-p", "no:cacheprovider", *loaded, *options, "test_gannet.py"]
    return subprocess.run(command, cwd=folder, env=ENV, capture_output=True, text=True, check=False)


ENV = {**os.environ, "PYTEST_DISABLE_PLUGIN_AUTOLOAD": "1", "PYTHONDONTWRITEBYTECODE": "1"}


def test_frames_of_a_failing_assertion_are_written(tmp_path):
    done = run(tmp_path, "--fastaxis-frames", "shown")
    assert "1 failed, 1 passed" in done.stdout, done.stdout + done.stderr
    (picture,) = (tmp_path / "shown").iterdir()
    assert picture.name == "test_gannet.py_test_bad.png"
    with Image.open(picture) as image:
        assert image.width > 400
    assert "expected: 2 lobes" in done.stdout
    assert str(picture.name) in done.stdout


def test_without_the_option_nothing_is_written(tmp_path):
    assert "1 failed, 1 passed" in run(tmp_path).stdout
    assert {path.suffix for path in tmp_path.iterdir()} == {".py"}
