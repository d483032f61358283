"""Where light goes round."""

import fastaxis as fa
from fastaxis.plan.loops import Loops, reflections_round
from fastaxis.units import mm, nm


def cavity(*between):
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(reflectance=0.5, name="m1"), *between,
        fa.BeamSplitter(reflectance=0.5, name="m2"), fa.Detector(name="out"),
    )  # fmt: skip
    return train.along("m2.reflected", *(f"{part.name}.back" for part in between[::-1]), "m1.side")


def hole():
    return fa.Aperture(radius=1 * mm, name="hole")


def test_a_straight_line_has_no_loops():
    train = fa.Train(wavelength=633 * nm).along(fa.Laser(waist=1 * mm, name="laser"), fa.Detector(name="out"))
    assert Loops.of(train, "out").place() is None
    assert reflections_round(train, "out") is None


def test_trips_are_counted_where_light_comes_in_or_behind_a_hole():
    assert Loops.of(cavity(), "out").place() == ("m1", "transmitted", "out")
    assert Loops.of(cavity(hole()), "out").place() == ("hole", "back", "out")
    # Light goes past an obstacle on all sides.
    obstacle = fa.Obstacle(radius=0.1 * mm, name="dot")
    assert Loops.of(cavity(obstacle), "out").place() == ("m1", "transmitted", "out")


def test_ways_in_round_out_and_past():
    train = cavity(hole())
    loops = Loops.of(train, "m1.reflected")
    ways = loops.ways(("laser", "out", "out"), loops.place())
    assert [len(some) for some in (ways.direct, ways.entries, ways.rounds, ways.exits)] == [1, 1, 1, 1]
    assert ways.direct[0][-1] == ways.exits[0][-1] == ("m1", "reflected", "out")
    assert ways.rounds[0][0] == ways.rounds[0][-1] == loops.place()


def test_a_target_at_the_place_itself_is_there_at_once():
    train = cavity(hole())
    loops = Loops.of(train, "hole.back")
    assert loops.ways(("laser", "out", "out"), loops.place()).exits == [(loops.place(),)]


def test_reflections_of_a_trip():
    assert reflections_round(cavity(), "out") == {2}
    tangled = fa.Train(wavelength=633 * nm).along(fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(name="m0"))
    for n in (1, 2):
        tangled.along(f"m{n - 1}.transmitted", fa.BeamSplitter(name=f"m{n}")).along(f"m{n}.reflected", f"m{n - 1}.side")
    assert reflections_round(tangled, "m2") == set()
