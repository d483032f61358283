"""The set sheet: dials, positions, powers, states, frames, and the files it is taken to the bench in."""

import csv
import io
import runpy

import numpy as np
import pytest
from matplotlib.backends.backend_agg import FigureCanvasAgg

import fastaxis as fa
from fastaxis.inspect import Mount
from fastaxis.units import deg, mm, mW, nm, um


def bench():
    train = fa.Train(wavelength=532 * nm, name="Whelk Steps")
    train.along(
        fa.Laser(waist=0.80 * mm, power=2 * mW, state=fa.H, name="laser"),
        fa.FreeSpace(100 * mm),
        fa.HalfWavePlate(fast=22.5 * deg, name="hwp"),
        fa.FreeSpace(80 * mm),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(slow=30 * deg, name="qwp"),
        fa.QPlate(q=0.5, offset=10 * deg, name="qp"),
        fa.FreeSpace(200 * mm),
        fa.Camera(pixel=20 * um, shape=(256, 256), name="cam"),
    )
    return train.along("pbs.reflected", fa.FreeSpace(50 * mm), fa.Mirror(name="fold"), fa.Detector(name="meter"))


MOUNTS = {"hwp": Mount(12 * deg), "qwp": Mount(3 * deg, sense=-1), "qp": Mount(0, seen_from="source")}


@pytest.fixture(scope="module")
def sheet():
    return bench().set_sheet(mounts=MOUNTS, rail_start=120 * mm, heights={"hwp": 75 * mm}, settings=(fa.H, fa.R))


def rows(sheet):
    return list(csv.DictReader(io.StringIO(sheet.csv())))


def row(sheet, part, face=None):
    return next(r for r in rows(sheet) if r["part"] == part and face in (None, r["leaves by"]))


def test_what_to_dial(sheet):
    assert {r["part"]: r["dial"] for r in rows(sheet) if r["dial"]} == {
        "hwp": "34.5°",  # 12 + 22.5
        "qwp": "333°",  # 3 - 30, from clockwise numbers
        "qp": "340°",  # offset 10 deg is a turn of 20 deg with q = 1/2, clockwise seen from the source
    }
    assert row(sheet, "hwp")["same at"] == "214.5°"
    assert row(sheet, "qp")["same at"] == ""
    assert row(sheet, "qwp")["angle"] == "slow 30°"


def test_a_dialled_sheet_gives_the_declared_bench(sheet):
    for name, parameter in (("hwp", "fast"), ("qwp", "slow")):
        reading = float(row(sheet, name)["dial"].rstrip("°")) * deg
        change = bench().with_changes({f"{name}.{parameter}": MOUNTS[name].angle(reading)})
        for port in ("cam", "meter"):
            assert change.power(port) == pytest.approx(bench().power(port))
            np.testing.assert_allclose(change.state(port).stokes, bench().state(port).stokes, atol=1e-9)


def test_positions_count_along_the_beam_and_heights_only_if_given(sheet):
    places = {(r["part"], r["leaves by"]): float(r["position [mm]"]) for r in rows(sheet)}
    assert places["hwp", "back"] == 220
    assert places["pbs", "transmitted"] == places["pbs", "reflected"] == 300
    assert places["cam", "ends here"] == 500
    assert places["fold", "front"] == 350
    assert {r["part"]: r["height [mm]"] for r in rows(sheet) if r["height [mm]"]} == {"hwp": "75.0"}


def test_powers_and_states_are_those_of_the_train(sheet):
    assert row(sheet, "hwp")["state behind it"] == "linear 45°"
    assert row(sheet, "pbs", "transmitted")["power"] == "1 mW"
    assert row(sheet, "pbs", "reflected")["state behind it"] == "linear 90°"
    state = bench().state("qwp.back")
    assert row(sheet, "qwp")["state behind it"] == (
        f"azimuth {state.azimuth / deg:.4g}°, ellipticity {state.ellipticity / deg:+.4g}°"
    )
    assert row(sheet, "qp")["state behind it"] == "varies over the beam"


def test_parity_and_branches(sheet):
    assert row(sheet, "pbs", "reflected")["picture"] == "mirrored"
    assert row(sheet, "fold")["picture"] == "upright"
    assert row(sheet, "meter")["comes from"] == "fold.front"
    assert "\nfrom hwp.back\npbs" in sheet.text()


def test_the_text_leaves_out_columns_without_words():
    text = bench().set_sheet(settings=(fa.H,)).text()
    assert "dial" not in text
    assert "height" not in text
    assert "signs: exp(-iwt)" in text


def test_cautions_are_no_clearance(sheet):
    assert any("does not mean safe" in remark for remark in sheet.remarks)
    assert any(remark.startswith("Laser caution: cam.in: 1 mW at 532 nm") for remark in sheet.remarks)


def test_a_part_met_twice_is_set_once():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, power=1 * mW, name="laser"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(fast=45 * deg, name="qwp"),
        fa.Mirror(name="end"),
    )
    train.along("end", "qwp.back", "pbs.transmitted").along("pbs.side", fa.Detector(name="meter"))
    sheet = train.set_sheet(mounts={"qwp": Mount(0)})
    assert [(r["part"], r["dial"]) for r in rows(sheet) if "qwp" in r["part"]] == [("qwp", "45°"), ("qwp (again)", "")]


def test_frames_that_cannot_be_worked_out_are_said():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), name="laser"),
        fa.Lens(focal=0.3),
        fa.FreeSpace(0.3),
        fa.Camera(pixel=5e-6),
    )
    sheet = train.set_sheet()
    assert not sheet.shots
    assert sheet.remarks[0].startswith("No frames of camera1")


def test_a_mount_for_a_part_that_does_not_turn():
    with pytest.raises(fa.ParameterError, match="mounts turn the parts hwp, qwp, qp") as caught:
        bench().set_sheet(mounts={"cam": Mount(0)})
    eval(f"dict({caught.value.fix})", {"fa": fa, "deg": deg})  # noqa: S307 - the fix is code to paste


@pytest.mark.parametrize(("given", "zero"), [(12 * deg, 12 * deg), ("12 deg", 0.0), (None, 0.0)])
def test_a_bare_reading_is_no_mount(given, zero):
    with pytest.raises(fa.ParameterError, match="a mount is given by") as caught:
        bench().set_sheet(mounts={"hwp": given})
    fixed = eval(f"dict({caught.value.fix})", {"fa": fa, "deg": deg})  # noqa: S307 - the fix is code to paste
    # Its degrees are written with six digits.
    assert fixed["mounts"]["hwp"].zero == pytest.approx(zero, rel=1e-5)


def test_letters_are_refused():
    sympy = pytest.importorskip("sympy")
    with pytest.raises(fa.SymbolError):
        bench().with_changes({"hwp.fast": sympy.Symbol("t", real=True)}).set_sheet()


@pytest.mark.parametrize("ending", ["txt", "csv", "pdf", "png"])
def test_saved(sheet, tmp_path, ending):
    written = sheet.save(tmp_path / f"sheet.{ending}")
    assert all(path.stat().st_size > 300 for path in written)
    assert [path.name for path in written] == (["sheet-1.png"] if ending == "png" else [f"sheet.{ending}"])


def test_another_ending_is_refused(sheet, tmp_path):
    with pytest.raises(fa.FileFormatError, match="pdf, png, csv or txt"):
        sheet.save(tmp_path / "sheet.xls")


def texts(figure):
    return [text for axes in figure.axes for text in axes.texts]


def test_nothing_on_paper_runs_off_the_page_or_into_its_neighbour(sheet, request):
    example = runpy.run_path(str(request.config.rootpath / "train_examples" / "gorse_end_planted_mistakes.py"))["train"]
    for figure in (*sheet.figures(), *example.inspect().figures()):
        renderer = FigureCanvasAgg(figure).get_renderer()
        boxes = [(text.get_text(), text.get_window_extent(renderer)) for text in texts(figure)]
        width, height = figure.bbox.width, figure.bbox.height
        for words, box in boxes:
            # Printers leave out the outermost quarter of an inch.
            margin = 0.25 * figure.dpi
            assert margin <= box.x0, words
            assert box.x1 <= width - margin, words
            assert margin <= box.y0, words
            assert box.y1 <= height - margin, words
        for k, (words, box) in enumerate(boxes):
            for other_words, other in boxes[k + 1 :]:
                # Boxes of neighbouring lines touch within a pixel.
                across = min(box.x1, other.x1) - max(box.x0, other.x0)
                down = min(box.y1, other.y1) - max(box.y0, other.y0)
                assert across <= 0 or down <= 2, f"{words} | {other_words}"


def test_the_frames_on_paper_are_those_of_the_camera(sheet):
    (figure,) = sheet.figures()
    pictures = [axes.images[0].get_array() for axes in figure.axes if axes.images]
    assert len(pictures) == 2
    peak = max(sheet.shots["cam"].frame(k).max() for k in range(2))
    assert max(picture.max() for picture in pictures) == pytest.approx(peak)


@pytest.mark.parametrize(
    ("given", "words"),
    [
        ({"rail_start": 50}, "unit is probably missing"),
        ({"rail_start": float("nan")}, "finite"),
        ({"heights": 75}, "unit is probably missing"),
        ({"heights": "75 mm"}, "finite"),
        ({"heights": {"hwp": 75}}, "height of hwp is in metres"),
        ({"heights": {"hpw": 75 * mm}}, "heights are those of the parts laser, "),
        ({"mounts": Mount(12 * deg)}, "by the name of the part"),
    ],
)
def test_places_without_units_and_unknown_names(given, words):
    with pytest.raises(fa.ParameterError, match=words) as caught:
        bench().set_sheet(**given)
    fixed = eval(f"dict({caught.value.fix})", {"mm": mm})  # noqa: S307 - the fix is code to paste
    assert bench().set_sheet(**fixed, settings=(fa.H,)).rows


@pytest.mark.parametrize("settings", ["H", [5], []])
def test_settings_that_are_none_are_refused_before_the_sheet_is_made(settings):
    with pytest.raises(fa.ParameterError, match="setting"):
        bench().set_sheet(settings=settings)
