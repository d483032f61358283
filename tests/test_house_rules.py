"""The checks of style, types and import direction, so that one command runs everything."""

import shutil
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).parent.parent


def run(*command):
    done = subprocess.run(command, cwd=ROOT, capture_output=True, text=True, check=False)
    assert done.returncode == 0, done.stdout + done.stderr


def tool(name):
    # The tools stand beside the interpreter in a virtual environment, whose bin need not be on the path.
    beside = Path(sys.executable).parent / name
    return str(beside) if beside.exists() else shutil.which(name) or pytest.fail(f"{name} is not installed")


def test_lint():
    run(sys.executable, "-m", "ruff", "check", ".")


def test_format():
    run(sys.executable, "-m", "ruff", "format", "--check", ".")


def test_types():
    run(sys.executable, "-m", "mypy")


def test_imports_point_one_way():
    run(tool("lint-imports"))


def test_top_level_holds_only_what_belongs_there():
    tracked = subprocess.run(["git", "ls-files"], cwd=ROOT, capture_output=True, text=True, check=False)
    if tracked.returncode:
        pytest.skip("not a git checkout")
    visible = {path.split("/")[0] for path in tracked.stdout.split() if not path.startswith(".")}
    assert visible == {"README.md", "DEVELOPERS.md", "pyproject.toml", "LICENSE", "src", "tests", "train_examples"}
