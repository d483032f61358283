"""Benches written to a temporary folder and given to the command line in this process."""

from dataclasses import dataclass
from pathlib import Path
from textwrap import dedent

import pytest

from fastaxis.cli import main

HEAD = """\
import fastaxis as fa
from fastaxis.units import *
"""
SMALL = """\
train = fa.Train(wavelength=532*nm, name="Gannet")
train.along(
    fa.Laser(waist=0.5*mm, power=4*mW, state=fa.D, name="laser"),
    fa.QuarterWavePlate(fast=0*deg, name="qwp"),
    fa.Camera(pixel=100*um, shape=(32, 32), name="cam"),
)
"""


@dataclass(frozen=True)
class Ran:
    code: int
    out: str
    err: str


@pytest.fixture
def bench(tmp_path):
    """A bench file of these lines, behind the usual imports (two lines)."""

    def write(text=SMALL, name="bench.py"):
        path = tmp_path / name
        path.write_text(HEAD + dedent(text), encoding="utf-8")
        return path

    return write


@pytest.fixture
def run(tmp_path, monkeypatch, capsys):
    """Run the command line in the temporary folder; gives exit code, stdout and stderr."""
    monkeypatch.chdir(tmp_path)

    def call(*arguments):
        try:
            code = main([str(one) for one in arguments])
        except SystemExit as stopped:
            code = stopped.code
        captured = capsys.readouterr()
        assert "Traceback" not in captured.err
        return Ran(code, captured.out, captured.err)

    return call


@pytest.fixture
def examples():
    return Path(__file__).parents[2] / "train_examples"
