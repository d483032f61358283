"""The page of derivations is what the trains beside it give."""

import runpy
from pathlib import Path

import pytest
from matplotlib.mathtext import MathTextParser

FOLDER = Path(__file__).parents[2] / "train_examples"


@pytest.fixture(scope="module")
def written():
    return (FOLDER / "derivations.md").read_text(encoding="utf-8")


def test_the_page_is_up_to_date(written):
    assert runpy.run_path(str(FOLDER / "derivations.py"))["page"]() == written


def test_its_formulas_are_sound_latex(written):
    formulas = [line[3:-3] for line in written.splitlines() if line.startswith("$$ ")]
    assert len(formulas) > 50
    for formula in formulas:
        if "matrix" not in formula:  # matplotlib draws no columns
            MathTextParser("path").parse(f"${formula}$")


def test_every_entry_with_letters_was_compared_with_numbers(written):
    sections = written.split("\n## ")[1:]
    silent = [text.splitlines()[0] for text in sections if "Beside the numeric laws" not in text]
    # A plate between two wavelengths has no letters: its shares are checked against their published law elsewhere.
    assert silent == ["A spiral plate off its wavelength"]
