"""Reading ports, and which faces light may use."""

import pytest

import fastaxis as fa
from fastaxis.train.ports import closest, in_faces, out_faces, split
from fastaxis.units import mm, nm, um


@pytest.mark.parametrize(
    ("part", "entered", "left"),
    [
        (fa.Laser(waist=1 * mm), (), ("out",)),
        (fa.Camera(pixel=3.45 * um), ("in",), ()),
        (fa.Detector(), ("in",), ()),
        (fa.BeamDump(), ("in",), ()),
        (fa.Mirror(), ("front",), ("front",)),
        (fa.Lens(focal=1.0), ("front", "back"), ("front", "back")),
        (
            fa.BeamSplitter(),
            ("front", "transmitted", "reflected", "side"),
            ("front", "transmitted", "reflected", "side"),
        ),
    ],
    ids=lambda value: type(value).__name__,
)
def test_faces_for_light_in_and_out(part, entered, left):
    assert in_faces(part, 532 * nm) == entered
    assert out_faces(part, 532 * nm) == left


def test_split():
    assert split("pbs.reflected") == ("pbs", "reflected")
    assert split("pbs") == ("pbs", "")


@pytest.mark.parametrize(("word", "meant"), [("hpw", "hwp"), ("CAM", "cam"), ("lasser", "laser"), ("zzz", "laser")])
def test_the_closest_name(word, meant):
    assert closest(word, ["laser", "hwp", "cam"]) == meant


def test_no_names_no_guess():
    assert closest("cam", []) is None
