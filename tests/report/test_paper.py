"""Sheets of A4: lines that fit, pages that are numbered, files that are whole and repeatable."""

import numpy as np
import pytest

from fastaxis.conventions import stamp
from fastaxis.report.paper import A4, blank, number_pages, save_pages, wrapped


def pages(count=2):
    sheets = [blank() for _ in range(count)]
    for sheet in sheets:
        sheet.write("a line", size=8)
        sheet.rule()
    return number_pages(sheets, "Whelk Steps")


def test_a_page_is_a4_upright_or_turned():
    assert tuple(blank().figure.get_size_inches()) == A4
    assert tuple(blank(landscape=True).figure.get_size_inches()) == A4[::-1]


def test_writing_moves_down_the_page():
    sheet = blank()
    before = sheet.room
    sheet.write("one " * 200, size=8)
    # 800 characters at about 117 a line of 7 inches are seven lines of 10.8 points
    assert before - sheet.room == pytest.approx(7 * 1.35 * 8 / 72)


def test_lines_are_broken_to_the_width():
    assert all(len(line) <= 20 for line in wrapped("word " * 40, 8, 20.5 * 0.54 * 8 / 72))
    assert len(wrapped("x" * 200, 8, 2, mono=True)) > len(wrapped("x" * 200, 8, 2))
    assert wrapped("", 8, 2) == [""]


def test_a_number_keeps_its_unit():
    for text in ("a clear radius of 2 w keeps all but 0.03 % of it", "seen from 12.5 mm away", "some 3 µW of it"):
        for width in np.linspace(0.5, 3, 40):
            lines = wrapped(text, 8, width)
            assert " ".join(lines) == text
            assert not any(line.endswith(("0.03", "12.5", "3")) for line in lines)


def test_every_page_has_its_number_and_the_signs():
    for number, figure in enumerate(pages(), start=1):
        words = [text.get_text() for text in figure.axes[0].texts]
        assert stamp() in words
        assert f"Whelk Steps, page {number} of 2" in words


def test_a_pdf_holds_all_pages_and_the_same_bytes_each_time(tmp_path):
    (first,) = save_pages(pages(), tmp_path / "a.pdf")
    (second,) = save_pages(pages(), tmp_path / "deep" / "b.pdf")
    assert first.read_bytes() == second.read_bytes()
    assert first.read_bytes().count(b"/Type /Page\n") + first.read_bytes().count(b"/Type /Page ") == 2


def test_a_png_for_each_page(tmp_path):
    assert [path.name for path in save_pages(pages(), tmp_path / "a.png")] == ["a-1.png", "a-2.png"]


def test_a_broken_off_write_leaves_the_old_file(tmp_path):
    (path,) = save_pages(pages(1), tmp_path / "a.pdf")
    old = path.read_bytes()
    with pytest.raises(ValueError, match="No figure"):
        save_pages([pages(1)[0], "no figure"], path)
    assert path.read_bytes() == old
    assert [p.name for p in tmp_path.iterdir()] == ["a.pdf"]
