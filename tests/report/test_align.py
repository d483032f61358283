import pytest

import fastaxis as fa
from fastaxis.report.align import astray
from fastaxis.report.bench import draw_bench
from fastaxis.report.layout import Layout, Link, Place, arrange
from fastaxis.units import mm, nm, um


def interferometer(extra_low=0, extra_high=0):
    """Two arms that meet again, with so many more plates in each."""
    train = fa.Train(wavelength=633 * nm, name="Gannet Stack")
    low = [fa.HalfWavePlate(fast=0, name=f"low {k}") for k in range(extra_low)]
    high = [fa.HalfWavePlate(fast=0, name=f"high {k}") for k in range(extra_high)]
    cameras = [fa.Camera(pixel=5 * um, name=f"cam {k}") for k in "ab"]
    laser = fa.Laser(waist=1 * mm, name="laser")
    train.along(laser, fa.BeamSplitter(name="in"), *low, fa.Mirror(name="m1"), fa.BeamSplitter(name="out"), cameras[0])
    train.along("in.reflected", *high, fa.Mirror(name="m2"), fa.FreeSpace(200 * mm), "out.side")
    return train.along("out.reflected", cameras[1])


@pytest.mark.parametrize("extra", [(0, 0), (3, 0), (0, 3), (2, 1)])
def test_two_arms_close_into_a_rectangle(extra):
    places = arrange(interferometer(*extra)).places
    corners = [places[name] for name in ("in", "m1", "out", "m2")]
    assert corners[0].y == corners[1].y
    assert corners[1].x == corners[2].x
    assert corners[2].y == corners[3].y
    assert corners[3].x == corners[0].x
    assert corners[2].x - corners[0].x > 1
    assert corners[2].y - corners[0].y > 1


@pytest.mark.parametrize("extra", [(0, 0), (3, 0), (2, 2)])
def test_the_closed_drawing_is_legible(extra, assert_nothing_collides):
    assert_nothing_collides(draw_bench(interferometer(*extra)))


def test_parts_along_a_beam_keep_their_order_and_distance():
    places = arrange(interferometer(3, 0)).places
    xs = [places[name].x for name in ("laser", "in", "low 0", "low 1", "low 2", "m1")]
    assert all(behind - before > 0.8 for before, behind in zip(xs, xs[1:], strict=False))


def test_beams_that_slant_or_run_backwards_are_counted():
    places = {"a": Place(0, 0), "b": Place(1, 1), "c": Place(2, 1)}
    right = {("a", "out"): (1, 0), ("b", "out"): (1, 0), ("c", "out"): (1, 0)}
    links = [Link("a.out", "b.in"), Link("b.out", "c.in"), Link("c.out", "b.in")]
    assert [astray(Layout(places=places, exits=right, links=[link])) for link in links] == [1, 0, 1]
