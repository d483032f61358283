"""Cut our letters out of the DejaVu Sans that comes with matplotlib: ``python -m fastaxis.report.letters.cut``."""

from __future__ import annotations

from pathlib import Path

import matplotlib as mpl
from fontTools.subset import Options, Subsetter, load_font, parse_unicodes
from fontTools.ttLib import TTFont

from fastaxis.report.letters import FACES, FAMILY, FOLDER

__all__ = ["CHARACTERS", "DEJAVU", "cut", "cut_all"]

DEJAVU = Path(mpl.get_data_path()) / "fonts" / "ttf"
# Latin with accents, Greek, dashes and quotes, raised and lowered digits, arrows, and the signs of formulas.
CHARACTERS = (
    "U+0020-007E,U+00A0-00FF,U+0370-03FF,U+2010-2026,U+2030-2033,U+2070-2099,U+2190-2194,U+2202,U+2207,"
    "U+2211-2212,U+221A,U+221D,U+221E,U+2248,U+2260,U+2264-2265,U+2295,U+2297"
)
COPYRIGHT, FAMILY_NAME, STYLE, UNIQUE, WHOLE, VERSION, POSTSCRIPT, LICENCE, LICENCE_PAGE = 0, 1, 2, 3, 4, 5, 6, 13, 14
ENGLISH = 0x409


def cut(source: Path, goal: Path) -> None:
    """Write the font of a file with our characters only, under our name, as its licence asks.

    Hints and kerning pairs stay, so that texts look and measure the same. Tables of ligatures and alternates go: they
    take most of the time to read, and without a ligature a search of the PDF finds "field".
    """
    options = Options(
        glyph_names=True, notdef_outline=True, recommended_glyphs=True, legacy_kern=True, recalc_timestamp=False,
        name_IDs=[COPYRIGHT, FAMILY_NAME, STYLE, UNIQUE, WHOLE, VERSION, POSTSCRIPT, LICENCE, LICENCE_PAGE],
        name_languages=[ENGLISH],
    )  # fmt: skip
    options.drop_tables += ["FFTM", "MATH", "GDEF", "GPOS", "GSUB"]
    subsetter = Subsetter(options)
    subsetter.populate(unicodes=parse_unicodes(CHARACTERS))
    with load_font(source, options) as font:
        subsetter.subset(font)
        _rename(font)
        font.save(goal)


def _rename(font: TTFont) -> None:
    style = font["name"].getDebugName(STYLE)
    whole = f"{FAMILY} {style}"
    names = {FAMILY_NAME: FAMILY, UNIQUE: whole, WHOLE: whole, POSTSCRIPT: whole.replace(" ", "-")}
    for record in font["name"].names:
        record.string = names.get(record.nameID, record.string)


def cut_all() -> None:
    """Write the fonts anew beside this file."""
    for ending, name in FACES.items():
        cut(DEJAVU / f"DejaVuSans{ending}.ttf", FOLDER / name)


if __name__ == "__main__":
    cut_all()
