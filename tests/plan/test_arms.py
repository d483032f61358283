"""Letters without a value in a bench of several paths are told by name, whatever is asked."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

import pytest
import sympy

import fastaxis as fa
from fastaxis.units import mm, mW, nm, um

P = sympy.Symbol("p", real=True)
QUESTIONS: dict[str, Callable[[Any], object]] = {
    "power": lambda train: train.power("cam"),
    "state": lambda train: train.state("cam"),
    "plan": lambda train: train.plan("cam"),
    "visibility": lambda train: train.visibility("cam"),
    "field": lambda train: train.field("cam"),
    "ledger": lambda train: train.ledger(),
    "expose": lambda train: train.expose("cam", [fa.H]),
}


def two_arms(*, phase: Any = P, power: Any = 1 * mW) -> fa.Train:
    train = fa.Train(wavelength=633 * nm)
    train.along(fa.Laser(waist=1 * mm, power=power, state=fa.H, name="laser"), fa.BeamSplitter(name="first"))
    train.along(
        "first.transmitted", fa.Mirror(), fa.PhaseShift(phase=phase, name="x"), fa.BeamSplitter(name="last"),
        fa.Camera(pixel=100 * um, shape=(32, 32), name="cam"),
    )  # fmt: skip
    return train.along("first.reflected", fa.Mirror(), "last.side")


@pytest.mark.parametrize("question", QUESTIONS)
def test_a_letter_in_one_of_two_arms_is_named(question: str) -> None:
    with pytest.raises(fa.SymbolError, match=r'^x\.phase = p has no value; .*train\.with_values\({"p": 0\.3}\)'):
        QUESTIONS[question](two_arms())


@pytest.mark.parametrize("question", QUESTIONS)
def test_a_letter_of_the_laser_is_named(question: str) -> None:
    with pytest.raises(fa.SymbolError, match=r"^laser\.power = p has no value"):
        QUESTIONS[question](two_arms(phase=0.3, power=sympy.Symbol("p", positive=True)))


def test_the_fix_works() -> None:
    """One way through is transmitted twice, the other reflected twice: a phase of pi apart, cos^2 and sin^2."""
    power = two_arms().with_values({"p": 0.3}).power("cam") / mW
    # Gaussian light is sampled in polynomials of modes: a few roundings.
    assert power == pytest.approx(math.sin(0.15) ** 2, abs=1e-12)
