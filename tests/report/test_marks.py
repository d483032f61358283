import numpy as np
import pytest

from fastaxis.camera.settings import as_setting, no_analyzer, plate_then_polarizer
from fastaxis.conventions import View
from fastaxis.light import L, R, linear
from fastaxis.report.frames import draw_frames
from fastaxis.report.marks import mark_analyzer
from fastaxis.report.style import new_figure
from fastaxis.units import deg


def marked(setting):
    axes = new_figure(3, 3).subplots()
    axes.set(xlim=(-1, 1), ylim=(-2, 0))
    mark_analyzer(axes, as_setting(setting).weights)
    return axes


def turning(points):
    x, y = np.asarray(points).T
    return float(np.sum(x[:-1] * y[1:] - x[1:] * y[:-1]) / 2)


@pytest.mark.parametrize("angle", [0, 30, 90, 135])
def test_a_linear_analyzer_is_a_line_at_its_angle(angle):
    axes = marked(linear(angle * deg))
    points = axes.lines[0].get_xydata()
    far = points[np.argmax(np.hypot(*(points - points.mean(axis=0)).T))] - points.mean(axis=0)
    assert abs(far @ [np.sin(angle * deg), -np.cos(angle * deg)]) < 1e-9
    assert not axes.patches


def test_circular_analyzers_turn_the_way_the_light_does_and_carry_an_arrow():
    for state, sign in ((R, -1), (L, 1)):
        axes = marked(state)
        assert np.sign(turning(axes.lines[0].get_xydata())) == sign
        assert len(axes.patches) == 1


def test_a_plate_in_front_of_a_polarizer_is_what_the_pair_lets_pass():
    # A quarter-wave plate at -45 deg in front of a polarizer at 0 passes R.
    axes = marked(plate_then_polarizer(fast=-45 * deg, axis=0 * deg))
    assert turning(axes.lines[0].get_xydata()) < 0


def test_no_analyzer_no_mark_and_the_picture_keeps_its_limits():
    axes = marked(no_analyzer())
    assert not axes.lines
    assert axes.get_xlim() == (-1, 1)
    assert marked(R).get_ylim() == (-2, 0)


def test_the_foot_speaks_of_marks_only_where_there_are_some(six_shots, poincare_shots):
    assert "White mark" in draw_frames(six_shots).texts[-1].get_text()
    assert "White mark" not in draw_frames(poincare_shots([no_analyzer()])).texts[-1].get_text()


def test_marks_do_not_follow_the_naming(six_shots):
    for shots in (six_shots, six_shots.in_view(View.SOURCE)):
        frames = [axes for axes in draw_frames(shots).axes if axes.images and axes.lines]
        senses = [np.sign(turning(axes.lines[0].get_xydata())) for axes in frames[4:]]
        assert senses == [-1, 1]
