"""Benches with one planted mistake each, beside sound twins, and ways to inspect them."""

import runpy
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import pytest

import fastaxis as fa
from fastaxis.units import mm, mW, nm

CORPUS = Path(__file__).parent / "corpus"
collect_ignore_glob = ["corpus/*"]  # benches, read below with their helpers in scope


@dataclass(frozen=True)
class Pair:
    """A bench built with or without its mistake, and what an inspection must call it."""

    name: str
    check: str
    element: str
    severity: str
    build: Any


def line(*parts, wavelength=532 * nm, power=1 * mW, state=fa.H, waist=0.8 * mm, name="bench"):
    """A laser and parts in a row."""
    laser = fa.Laser(waist=waist, power=power, state=state, name="laser")
    return fa.Train(wavelength=wavelength, name=name).along(laser, *parts)


def read_corpus():
    pairs = []

    def pair(check, element, severity):
        def register(build):
            pairs.append(Pair(build.__name__, check, element, severity, build))
            return build

        return register

    for path in sorted(CORPUS.glob("*.py")):
        runpy.run_path(str(path), init_globals={"pair": pair, "line": line})
    return pairs


PAIRS = read_corpus()


def pytest_generate_tests(metafunc):
    if "pair" in metafunc.fixturenames:
        metafunc.parametrize("pair", PAIRS, ids=lambda pair: pair.name)


@pytest.fixture(scope="session")
def pairs():
    return PAIRS


@pytest.fixture
def bench_of():
    return line
