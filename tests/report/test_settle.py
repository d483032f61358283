from itertools import pairwise

import pytest

from fastaxis.report.boxes import Box, line_boxes
from fastaxis.report.ordering import Axis
from fastaxis.report.routing import bent_line
from fastaxis.report.settle import Beam, settle

RIGHT, UP, LEFT, DOWN = (1, 0), (0, 1), (-1, 0), (0, -1)


def need(one, other):
    return (1.5, 1.45)


def test_runs_are_kept_and_short():
    axis = Axis.of("abc").ordered(("a", "b", 1.0), beam=True).ordered(("b", "c", 2.0), beam=True)
    assert axis.places() == {"a": 0.0, "b": 1.0, "c": 3.0}


def test_runs_that_contradict_each_other_have_no_places():
    assert Axis.of("ab").ordered(("a", "b", 1.0)).ordered(("b", "a", 1.0)).places() is None


def test_a_square_closes():
    beams = [Beam("a", "b", RIGHT, 2.0), Beam("b", "c", UP, 2.0), Beam("c", "d", LEFT, 3.0), Beam("d", "a", DOWN, 2.0)]
    found = settle("abcd", beams, need)
    assert not found.bent
    assert found.x["b"] - found.x["a"] == pytest.approx(3.0)  # the longer side counts
    assert found.x["d"] == found.x["a"]


def test_a_beam_that_contradicts_the_others_is_given_up():
    beams = [Beam("a", "b", RIGHT, 2.0), Beam("b", "c", UP, 2.0), Beam("c", "a", RIGHT, 2.0)]
    assert settle("abc", beams, need).bent == (beams[2],)


def test_parts_without_a_beam_between_them_move_apart():
    found = settle("ab", [], need)
    assert abs(found.x["a"] - found.x["b"]) >= 1.5 or abs(found.y["a"] - found.y["b"]) >= 1.45


def test_a_bent_line_goes_around_a_part():
    part = Box.about(2.0, 0.0, 0.8, 0.8)
    points = bent_line((0.0, 0.0), RIGHT, (4.0, 0.0), RIGHT, parts=[part], lines=[])
    assert points[0] == (0.0, 0.0)
    assert points[-1] == (4.0, 0.0)
    for box in line_boxes(points, 0.02):
        apart = box.left > part.right or box.right < part.left or box.bottom > part.top or box.top < part.bottom
        assert apart
    assert all(a[0] == b[0] or a[1] == b[1] for a, b in pairwise(points))
