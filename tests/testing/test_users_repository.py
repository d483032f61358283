"""The example of a user's own repository, run as a user would, apart from this project's settings."""

import os
import shutil
import subprocess
import sys
from pathlib import Path

import pytest

FOLDER = Path(__file__).parents[2] / "train_examples" / "users_repository"
ENV = {**os.environ, "PYTEST_DISABLE_PLUGIN_AUTOLOAD": "1"}
COMMAND = [sys.executable, "-m", "pytest", "-q", "-p", "fastaxis.testing.plugin"]


@pytest.fixture
def copied(tmp_path):
    return Path(shutil.copytree(FOLDER, tmp_path / "bench", ignore=shutil.ignore_patterns("__pycache__")))


def run(folder, *options):
    return subprocess.run([*COMMAND, *options], cwd=folder, env=ENV, capture_output=True, text=True, check=False)


def test_it_passes(copied):
    done = run(copied)
    assert done.returncode == 0, done.stdout
    assert "7 passed" in done.stdout


def test_an_edit_that_turns_a_plate_is_caught_and_named(copied):
    bench = copied / "heron_switch.py"
    text = bench.read_text(encoding="utf-8")
    edited = text.replace('fa.HalfWavePlate(fast=0 * deg, design=532 * nm, name="hwp")', 'fa.HalfWavePlate(fast=4 * deg, design=532 * nm, name="hwp")')  # fmt: skip
    assert edited != text
    bench.write_text(edited, encoding="utf-8")
    done = run(copied, "-k", "horizontal or dump")
    assert "1 failed, 1 passed" in done.stdout
    assert "likely cause: hwp" in done.stdout
    assert "hwp.fast stands at 0 deg, -4 deg off" in done.stdout
