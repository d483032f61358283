import numpy as np
import pytest

import fastaxis as fa
from fastaxis.report.layout import Place
from fastaxis.report.style import new_figure
from fastaxis.report.symbols import REFLECTORS, SYMBOLS, draw_symbol

UP, DOWN, LEFT, RIGHT = (0, 1), (0, -1), (-1, 0), (1, 0)


def drawn(part, place):
    axes = new_figure(3, 3).subplots()
    draw_symbol(axes, part, place)
    to_data = axes.transData.inverted()
    return [to_data.transform(patch.get_transform().transform(patch.get_path().vertices)) for patch in axes.patches]


def test_every_part_of_the_package_has_a_symbol():
    parts = {name for name in dir(fa) if isinstance(getattr(fa, name), type) and hasattr(getattr(fa, name), "stem")}
    for name in parts - set(REFLECTORS) - {"BeamSplitter", "PolarizingBeamSplitter"}:
        assert any(kind.__name__ in SYMBOLS for kind in getattr(fa, name).__mro__), name
    assert {"Laser", "Camera", "QPlate"} <= parts


def test_a_part_of_ones_own_is_a_plain_box():
    class Gadget(fa.Mirror.__mro__[1]):
        pass

    assert len(drawn(Gadget(name="gadget"), Place(0, 0))) == 2


@pytest.mark.parametrize(("heading", "reflects"), [(RIGHT, UP), (RIGHT, DOWN), (UP, RIGHT), (UP, LEFT), (LEFT, UP)])
def test_mirrors_and_diagonals_stand_halfway_between_the_two_beams(heading, reflects):
    for part, stroke in ((fa.Mirror(), 0), (fa.BeamSplitter(), 1)):
        ends = drawn(part, Place(2.0, 1.0, heading, reflects))[stroke]
        along = (ends[-1] - ends[0]) / np.linalg.norm(ends[-1] - ends[0])
        normal = np.subtract(reflects, heading) / np.sqrt(2)
        assert along @ normal == pytest.approx(0, abs=1e-12)


def test_the_back_of_a_mirror_is_away_from_the_light():
    line, *ticks = drawn(fa.Mirror(), Place(0, 0, RIGHT, UP))
    behind = np.mean([tick[-1] for tick in ticks], axis=0)
    assert behind @ np.array([1, -1]) > 0


def test_a_mirror_met_head_on_stands_across_the_beam():
    ends = drawn(fa.Mirror(), Place(0, 0, RIGHT, LEFT))[0]
    assert ends[:, 0] == pytest.approx([0, 0], abs=1e-12)


def test_a_splitter_without_light_is_drawn_too():
    assert len(drawn(fa.BeamSplitter(), Place(0, 0))) == 2


def test_a_camera_looks_at_the_light():
    sensor = drawn(fa.Camera(pixel=1e-6), Place(0, 0, UP))[1]
    assert sensor[:, 1].max() < 0
