"""The letters of our figures: DejaVu Sans with the characters that figures of light need, and no others.

A PDF holds the letters it uses, so each one written has the whole font read and cut down: of DejaVu's 6000 glyphs
that took as long as drawing the figure. What is not here, in the name of a part say, is taken from DejaVu itself.
"""

from __future__ import annotations

from functools import cache
from pathlib import Path

from matplotlib.font_manager import fontManager

__all__ = ["FACES", "FAMILIES", "FOLDER", "make_known"]

FAMILY = "fastaxis sans"
FAMILIES = [FAMILY, "DejaVu Sans"]  # the second for characters that the first lacks
FACES = {"": "sans.ttf", "-Bold": "sans_bold.ttf", "-Oblique": "sans_oblique.ttf"}  # by the ending of DejaVu's file
FOLDER = Path(__file__).parent


@cache
def make_known() -> None:
    """Let matplotlib find the family by its name; it adds to what is known there and changes no setting."""
    for name in FACES.values():
        fontManager.addfont(FOLDER / name)
