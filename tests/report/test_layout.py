import pytest

import fastaxis as fa
from fastaxis.report.layout import arrange
from fastaxis.units import deg, mm, nm, um

LEFT, RIGHT, UP, DOWN = (-1, 0), (1, 0), (0, 1), (0, -1)


def laser():
    return fa.Laser(waist=0.8 * mm, name="laser")


def camera(name="cam"):
    return fa.Camera(pixel=5 * um, name=name)


def train(*parts):
    return fa.Train(wavelength=532 * nm, name="bench").along(*parts)


def plates(count):
    return [fa.HalfWavePlate(fast=0 * deg, name=f"plate{k}") for k in range(count)]


def test_a_line_runs_to_the_right_in_order():
    plan = arrange(train(laser(), *plates(3), camera()))
    xs = [plan.places[name].x for name in ("laser", "plate0", "plate1", "plate2", "cam")]
    assert xs == sorted(xs)
    assert {place.y for place in plan.places.values()} == {0}
    assert not plan.stubs


def test_a_long_line_goes_on_in_a_second_row():
    plan = arrange(train(laser(), *plates(12), camera()))
    wrapped = [link for link in plan.links if link.wrapped]
    assert len(wrapped) == 1
    first = wrapped[0].in_port.partition(".")[0]
    assert plan.places[first].x == 0
    assert plan.places["cam"].y < 0


def test_a_long_line_with_a_splitter_stays_in_one_row():
    plan = arrange(train(laser(), fa.BeamSplitter(name="bs"), *plates(12), camera()))
    assert not any(link.wrapped for link in plan.links)


def test_a_mirror_folds_and_a_second_folds_back():
    plan = arrange(train(laser(), fa.Mirror(name="m1"), fa.Mirror(name="m2"), camera()))
    assert plan.exits["m1", "front"] == UP
    assert plan.exits["m2", "front"] == RIGHT
    assert plan.places["m2"].x == plan.places["m1"].x
    assert plan.places["cam"].y == plan.places["m2"].y


def test_a_double_pass_comes_straight_back_and_leaves_by_the_far_side():
    bench = train(laser(), fa.PolarizingBeamSplitter(name="pbs"), *plates(1), fa.Mirror(name="end"))
    bench.along("end", "plate0.back", "pbs.transmitted").along("pbs.side", camera())
    plan = arrange(bench)
    assert plan.exits["end", "front"] == LEFT
    assert plan.exits["pbs", "side"] == DOWN  # opposite of the reflected face
    assert plan.exits["pbs", "reflected"] == UP
    assert {stub.port for stub in plan.stubs} == {"pbs.front", "pbs.reflected"}


def test_no_beam_runs_through_a_part_of_another():
    bench = train(laser(), fa.PolarizingBeamSplitter(name="pbs"), fa.Mirror(name="fold"), *plates(2), camera("a"))
    bench.along("pbs.reflected", fa.BeamSplitter(name="bs"), camera("b"))
    bench.along("bs.reflected", fa.Mirror(name="m1"), fa.Mirror(name="m2"), camera("c"))
    plan = arrange(bench)
    for link in plan.links:
        ends = [link.out_port.partition(".")[0], link.in_port.partition(".")[0]]
        here, there = (plan.places[name] for name in ends)
        for name, place in plan.places.items():
            inside_x = min(here.x, there.x) - 0.3 < place.x < max(here.x, there.x) + 0.3
            inside_y = min(here.y, there.y) - 0.3 < place.y < max(here.y, there.y) + 0.3
            assert name in ends or not (inside_x and inside_y), f"{link} runs through {name}"


@pytest.mark.parametrize("count", [1, 4, 9])
def test_no_two_parts_stand_on_each_other(count):
    bench = train(laser(), *(fa.Mirror(name=f"m{k}") for k in range(count)), camera())
    places = list(arrange(bench).places.values())
    for k, one in enumerate(places):
        for other in places[k + 1 :]:
            assert max(abs(one.x - other.x), abs(one.y - other.y)) > 0.9


def test_parts_without_light_have_a_row_of_their_own():
    bench = train(laser(), camera()).add(fa.Lens(focal=0.1, name="spare"))
    plan = arrange(bench)
    assert plan.unlit == ("spare",)
    assert plan.places["spare"].y < plan.places["laser"].y - 1


def test_a_train_without_a_laser_is_all_unlit():
    plan = arrange(train(fa.Lens(focal=0.1, name="lens"), camera()))
    assert plan.unlit == ("lens", "cam")
