"""Our letters against the font they were cut from, which comes with matplotlib."""

import re
from pathlib import Path

import numpy as np
import pytest
from fontTools.pens.recordingPen import DecomposingRecordingPen
from fontTools.ttLib import TTFont
from matplotlib.backends.backend_agg import FigureCanvasAgg

import fastaxis
from fastaxis.report.letters import FACES, FAMILIES, FOLDER
from fastaxis.report.letters.cut import DEJAVU, cut_all
from fastaxis.report.save import save
from fastaxis.report.style import RULES, new_figure, rules


def outline(font, character):
    pen = DecomposingRecordingPen(font.getGlyphSet())
    font.getGlyphSet()[font.getBestCmap()[ord(character)]].draw(pen)
    return pen.value


@pytest.fixture(params=FACES)
def face(request):
    return request.param


@pytest.fixture
def ours(face):
    with TTFont(FOLDER / FACES[face]) as font:
        yield font


@pytest.fixture
def theirs(face):
    with TTFont(DEJAVU / f"DejaVuSans{face}.ttf") as font:
        yield font


def test_every_character_of_the_code_is_there(ours):
    """Texts of figures stand in the code, so what the code can spell our letters must have."""
    code = "".join(path.read_text(encoding="utf-8") for path in Path(fastaxis.__file__).parent.rglob("*.py"))
    assert not {ord(c) for c in set(code) if c.isprintable()} - set(ours.getBestCmap())


def test_each_letter_has_the_outline_and_width_it_was_cut_from(ours, theirs):
    for character in map(chr, ours.getBestCmap()):
        assert outline(ours, character) == outline(theirs, character)
    names, their_names = ours.getBestCmap(), theirs.getBestCmap()
    assert {c: ours["hmtx"][names[c]][0] for c in names} == {c: theirs["hmtx"][their_names[c]][0] for c in names}


def test_it_has_a_name_of_its_own_and_the_licence_it_came_with(ours):
    """The licence: modified fonts must not be called by the names of the first ones."""
    names = [ours["name"].getDebugName(number) for number in (1, 3, 4, 6)]
    assert all(name.startswith("fastaxis") for name in names)
    assert "Permission is hereby granted" in ours["name"].getDebugName(13)
    assert "Permission is hereby granted" in (FOLDER / "LICENSE").read_text(encoding="utf-8")


def test_cutting_again_gives_the_same_letters(tmp_path, monkeypatch):
    monkeypatch.setattr("fastaxis.report.letters.cut.FOLDER", tmp_path)
    cut_all()
    assert {path.name for path in tmp_path.iterdir()} == set(FACES.values())
    for path in tmp_path.iterdir():
        with TTFont(path) as again, TTFont(FOLDER / path.name) as ours:
            assert again.getBestCmap() == ours.getBestCmap()
            assert again["name"].getDebugName(4) == ours["name"].getDebugName(4)


def drawn(text, family):
    with rules():
        figure = new_figure(5, 0.5)
        figure.set_layout_engine("none")
        figure.text(0.02, 0.3, text, size=8, family=family)
        canvas = FigureCanvasAgg(figure)
        canvas.draw()
        return np.asarray(canvas.buffer_rgba()).copy()


@pytest.mark.parametrize("text", ["AVATAR To 12.5 µm, √2, δ/2, 45°", "Zażółć in Żabno", "Приливный стол"])
def test_texts_look_the_same_dot_by_dot_also_where_letters_are_lacking(text):
    """Kerning pairs are kept ("AV", "To"); what our letters lack is taken from the font they were cut from."""
    assert np.array_equal(drawn(text, FAMILIES), drawn(text, "DejaVu Sans"))


def test_a_pdf_holds_our_letters_as_text_in_truetype(tmp_path):
    with rules():
        figure = new_figure(3, 1)
        figure.set_layout_engine("none")
        figure.text(0.1, 0.5, "field at √2")
    (path,) = save(figure, tmp_path / "words", ["pdf"])
    assert {*re.findall(rb"/BaseFont /[A-Z]+\+([^ /\n]+)", path.read_bytes())} == {b"fastaxis-sans-Book"}
    assert RULES["pdf.fonttype"] == 42
