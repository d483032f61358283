import re

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.report.tolerance import draw_tolerance
from fastaxis.studies.tolerance import lobe_angle, normal, power_at
from fastaxis.units import deg, mm, nm, um


@pytest.fixture(scope="module")
def found():
    train = fa.Train(wavelength=532 * nm, name="Cinder").along(
        fa.Laser(waist=0.4 * mm, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=0 * deg, name="hwp"),
        fa.QPlate(q=0.5, name="qp"),
        fa.Camera(pixel=100 * um, shape=(24, 24), name="cam"),
    )
    errors = {"hwp.fast": normal(1 * deg), "qp.offset": normal(0.5 * deg), "hwp.retardance": normal(1 * deg)}
    merits = {
        "lobe": lobe_angle("cam", fa.H, count=2),
        "seven": lobe_angle("cam", fa.H, count=7),
        "H": power_at("cam", fa.H),
    }
    return train.tolerance(errors, merits, draws=80, limits={"lobe": (-3 * deg, 3 * deg)})


def test_bars_histogram_and_three_frames(found):
    first, *_ = pages = draw_tolerance(found)
    axes = [one for page in pages for one in page.axes]
    titles = [one.get_title() for one in axes]
    for title in ("5th percentile", "as declared", "95th percentile"):
        assert titles.count(title) == 1
    bars = next(one for one in axes if one.get_xlabel().startswith("share"))
    widths = [patch.get_width() for patch in bars.patches]
    assert widths == sorted(widths)  # the largest is drawn last, on top
    # Axis of the plate: lobes turn by 2 deg a degree for the plate and for the offset; variances 4 to 1.
    assert widths[-1] / widths[-2] == pytest.approx(4, rel=0.02)
    assert any("°" in one.get_xlabel() for one in axes)


def test_frames_are_on_one_scale(found):
    images = [one.images[0] for page in draw_tolerance(found) for one in page.axes if one.images]
    assert len({image.get_clim() for image in images}) == 1
    assert not np.array_equal(images[0].get_array(), images[2].get_array())


def test_what_could_not_be_read_is_said(found):
    said = [text.get_text() for page in draw_tolerance(found) for one in page.axes for text in one.texts]
    assert "no draw could be read" in said
    assert any(re.fullmatch(r"(\d+) of \1 draws could not be read", words) for words in said)


def test_a_bar_alone_is_a_bar_and_stands_at_the_top():
    train = fa.Train(wavelength=633 * nm, name="Saltpan").along(
        fa.Laser(waist=0.4 * mm, power=1e-3, state=fa.H, name="laser"), fa.Polarizer(axis=45 * deg, name="pol")
    )
    study = train.tolerance({"pol.axis": normal(1 * deg)}, {"through": power_at("pol")}, draws=20)
    (bars,) = [axes for page in draw_tolerance(study) for axes in page.axes if axes.get_xlabel().startswith("share")]
    (bar,) = bars.patches
    low, high = bars.get_ylim()
    assert bar.get_height() < 0.2 * (high - low)
    assert bar.get_y() > (low + high) / 2


def test_a_figure_of_merit_that_no_error_touches_is_said_to_stay():
    train = fa.Train(wavelength=633 * nm, name="Saltpan").along(
        fa.Laser(waist=0.4 * mm, power=1e-3, state=fa.H, name="laser"), fa.HalfWavePlate(fast=0 * deg, name="hwp")
    )
    study = train.tolerance({"hwp.fast": normal(1 * deg)}, {"through": power_at("hwp")}, draws=20)
    said = [text.get_text() for page in draw_tolerance(study) for one in page.axes for text in one.texts]
    assert "all draws give the same: none of the errors shows here" in said


def test_saving(found, tmp_path):
    (pdf,) = found.save(tmp_path / "study.pdf")
    assert pdf.read_bytes().startswith(b"%PDF")
    (text,) = found.save(tmp_path / "study.txt")
    assert "hwp.fast" in text.read_text(encoding="utf-8")
    with pytest.raises(fa.FileFormatError, match="pdf, png or txt"):
        found.save(tmp_path / "study.doc")


def test_what_a_figure_was_read_off_stands_beside_it():
    train = fa.Train(wavelength=532 * nm, name="Cinder").along(
        fa.Laser(waist=0.4 * mm, power=1e-3, state=fa.H, name="laser"),
        fa.Aperture(radius=0.3 * mm, name="iris"),
    )
    study = train.tolerance({"laser.waist": normal(0.01 * mm)}, {"through": power_at("iris")}, draws=100)
    said = " ".join(text.get_text() for page in draw_tolerance(study) for one in page.axes for text in one.texts)
    assert "read off a response surface in laser.waist" in said
    assert "fresh draws" in said
