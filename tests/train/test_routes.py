"""Light paths to cameras and ports."""

import pytest

import fastaxis as fa
from fastaxis.laws import AxisLaw, Flip
from fastaxis.units import deg, mm, nm


def names(route):
    return [leg.element_name for leg in route.legs]


def test_route_to_a_camera(line):
    route = line.route("cam")
    assert (route.source_name, route.laser, route.target) == ("laser", line.elements["laser"], "cam.in")
    assert [(leg.element_name, leg.entered, leg.left) for leg in route.legs] == [
        ("hwp", "front", "back"),
        ("lens", "front", "back"),
    ]
    assert [name for name, _ in route.steps()] == ["hwp", "lens"]


def test_a_part_stands_for_the_light_that_leaves_it(line):
    assert names(line.route("hwp")) == names(line.route("hwp.back")) == ["hwp"]
    assert names(line.route("laser")) == []


def test_an_entry_stands_for_the_light_that_arrives_there(line):
    assert names(line.route("lens.front")) == ["hwp"]


def test_double_pass_meets_the_plate_from_both_sides(isolator):
    route = isolator.route("cam")
    assert names(route) == ["pbs", "qwp", "mirror", "qwp", "pbs"]
    there, back = (leg.passage for leg in route.legs if leg.element_name == "qwp")
    assert back == there.backward()
    # Met from behind, the axis at 45 deg stands at -45 deg in the frame of the returning beam.
    assert [law.angle for passage in (there, back) for law in passage.laws] == pytest.approx([45 * deg, -45 * deg])


@pytest.mark.parametrize("folds", range(5))
def test_parity_changes_at_every_reflection(folds):
    train = fa.Train(wavelength=532 * nm)
    mirrors = [fa.Mirror(name=f"m{n}") for n in range(folds)]
    train.along(fa.Laser(waist=1 * mm, name="laser"), *mirrors, fa.Detector(name="meter"))
    route = train.route("meter")
    assert (route.reflections, route.parity) == (folds, (-1) ** folds)
    assert train.reflections("meter") == folds
    assert sum(isinstance(law, Flip) for _, law in route.steps()) == folds


def test_a_reflection_brings_its_law_and_then_its_frame_change(isolator):
    laws = [type(law) for name, law in isolator.route("cam").steps() if name == "mirror"]
    assert laws == [AxisLaw, Flip]


def test_the_reflected_port_of_a_splitter_is_a_reflection(fork):
    assert fork.route("bs1.reflected").reflections == 1
    assert fork.route("bs1.transmitted").reflections == 0


def test_two_lasers_on_one_table_keep_their_own_paths(line):
    line.along(fa.Laser(waist=1 * mm, name="guide"), fa.BeamDump(name="dump"))
    assert line.route("dump").source_name == "guide"
    assert line.route("cam").source_name == "laser"


def test_paths_that_meet_are_refused_with_the_place(fork):
    with pytest.raises(fa.WiringError, match="each of them is a route of its own") as caught:
        fork.route("cam")
    assert "cam.in: light by way of" in str(caught.value)
    assert {"bs2.front", "bs2.side"} == set(caught.value.got.split("by way of ")[1].split(" meets")[0].split(" and "))
    assert names(fork.route("m1")) == ["bs1", "m1"]
    assert {tuple(names(route)) for route in eval(caught.value.fix, {"train": fork})} == {
        ("bs1", "m1", "bs2"),
        ("bs1", "m2", "bs2"),
    }


def test_a_single_path_is_its_own_list_of_routes(line):
    assert line.routes("cam") == (line.route("cam"),)


def test_routes_of_a_cavity_leave_out_its_round_trips():
    train = fa.Train(wavelength=532 * nm)
    train.along(fa.Laser(waist=1 * mm), fa.BeamSplitter(name="left"), fa.FreeSpace(0.1, name="gap"))
    train.along("gap", fa.BeamSplitter(name="right"), fa.Detector(name="out"))
    train.along("right.reflected", "gap.back", "left.side")
    assert [names(route) for route in train.routes("out")] == [["left", "gap", "right"]]
    assert {tuple(names(route)) for route in train.routes("left.reflected")} == {
        ("left",),
        ("left", "gap", "right", "gap", "left"),
    }


def test_more_paths_than_anyone_reads_are_refused():
    train = fa.Train(wavelength=532 * nm).along(fa.Laser(waist=1 * mm), fa.BeamSplitter(name="bs0"))
    for n in range(13):
        train.along(f"bs{n}.transmitted", fa.BeamSplitter(name=f"bs{n + 1}"))
        train.along(f"bs{n}.reflected", fa.Mirror(), f"bs{n + 1}.side")
    with pytest.raises(fa.WiringError, match="more than 4096 paths are not listed") as caught:
        train.routes("bs13")
    assert 0 <= eval(caught.value.fix, {"train": train}) < 1e-3


def test_str_of_a_route_reads_as_a_path(line):
    assert str(line.route("cam")) == "laser -> hwp -> lens -> cam.in"
