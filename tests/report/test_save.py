import pytest
from PIL import Image

from fastaxis.conventions import View, stamp
from fastaxis.errors import FileFormatError
from fastaxis.report.save import save
from fastaxis.report.style import footer, new_figure


@pytest.fixture
def figure():
    made = new_figure(3, 2)
    made.subplots().plot([0, 1], [0, 1])
    footer(made)
    return made


def test_a_png_and_a_vector_pdf_with_the_stamp_inside(figure, tmp_path):
    png, pdf = save(figure, tmp_path / "new" / "bench", view=View.SOURCE)
    with Image.open(png) as image:
        assert image.text["Description"] == stamp(View.SOURCE)
    data = pdf.read_bytes()
    assert data.startswith(b"%PDF")
    assert b"/Subtype /Image" not in data


def test_dots_an_inch(figure, tmp_path):
    with Image.open(save(figure, tmp_path / "small", ["png"], dpi=50)[0]) as image:
        assert image.size == (150, 100)


def test_the_same_figure_writes_the_same_bytes(figure, tmp_path):
    first, second = (save(figure, tmp_path / name, ["pdf"])[0].read_bytes() for name in ("a", "b"))
    assert first == second


def test_an_interrupted_write_leaves_the_older_file_whole(figure, tmp_path, monkeypatch):
    (path,) = save(figure, tmp_path / "bench", ["png"])
    before = path.read_bytes()

    def stopped(picture, unfinished, **_):
        unfinished.write(b"half")
        raise KeyboardInterrupt

    monkeypatch.setattr(Image.Image, "save", stopped)
    with pytest.raises(KeyboardInterrupt):
        save(figure, tmp_path / "bench", ["png"])
    assert path.read_bytes() == before
    assert list(tmp_path.iterdir()) == [path]


def test_places_are_found_once_for_both_formats(figure, tmp_path, monkeypatch):
    engine, runs = figure.get_layout_engine(), []
    execute = engine.execute
    monkeypatch.setattr(engine, "execute", lambda laid_out: (runs.append(laid_out.dpi), execute(laid_out)))
    save(figure, tmp_path / "bench", dpi=120)
    assert runs == [120, 120]  # one pass to place, one to place again with the ticks of the first; none for the PDF


@pytest.mark.parametrize("kind", ["png", "pdf"])
def test_a_figure_is_afterwards_what_it_was(figure, tmp_path, kind):
    before = figure.get_layout_engine(), figure.canvas, figure.dpi
    save(figure, tmp_path / "bench", [kind], dpi=120)
    assert (figure.get_layout_engine(), figure.canvas, figure.dpi) == before


def test_a_figure_with_fixed_places_stays_one(figure, tmp_path):
    figure.set_layout_engine("none")
    engine, place = figure.get_layout_engine(), figure.axes[0].get_position().bounds
    save(figure, tmp_path / "bench")
    assert figure.get_layout_engine() is engine
    assert figure.axes[0].get_position().bounds == place


def test_another_format_is_refused(figure, tmp_path):
    with pytest.raises(FileFormatError, match=r"bench: gif; figures are written as png and pdf \(fix: \"pdf\"\)"):
        save(figure, tmp_path / "bench", ["gif"])
    assert not list(tmp_path.iterdir())
