"""Drawings of interferometers, loops and random graphs: nothing lies on anything else, whatever is wired."""

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.report.bench import BENT, draw_bench
from fastaxis.report.boxes import line_boxes
from fastaxis.report.layout import arrange
from fastaxis.report.lines import lines_of, part_boxes, stub_line
from fastaxis.units import deg, mm, mW, nm, um


def begun(*parts):
    laser = fa.Laser(waist=0.8 * mm, power=5 * mW, state=fa.D, name="laser")
    return fa.Train(wavelength=633 * nm, name="Low Quay").along(laser, *parts)


def camera(name="cam"):
    return fa.Camera(pixel=5 * um, name=name)


def splitter(name):
    return fa.BeamSplitter(name=name)


def mirror(name):
    return fa.Mirror(name=name)


def mach_zehnder(low=0, high=0):
    plates = [fa.HalfWavePlate(fast=0 * deg, name=f"low {k}") for k in range(low)]
    train = begun(splitter("in"), *plates, mirror("m1"), splitter("out"), camera("cam a"))
    plates = [fa.HalfWavePlate(fast=0 * deg, name=f"high {k}") for k in range(high)]
    train.along("in.reflected", *plates, mirror("m2"), fa.FreeSpace(200 * mm), "out.side")
    return train.along("out.reflected", camera("cam b"))


def michelson():
    train = begun(splitter("bs"))
    train.retro("bs.transmitted", fa.FreeSpace(200 * mm), mirror("end 1"))
    train.retro("bs.reflected", fa.FreeSpace(210 * mm), fa.QuarterWavePlate(fast=45 * deg, name="qwp"), mirror("end 2"))
    return train.along("bs.side", camera())


def loop(mirrors):
    train = begun(fa.PolarizingBeamSplitter(name="pbs"))
    train.loop("pbs.transmitted", *(mirror(f"m{k}") for k in range(mirrors)), fa.SpiralPlate(charge=1), "pbs.reflected")
    return train.along("pbs.side", camera())


def isolator():
    parts = (fa.Polarizer(axis=0 * deg, name="p1"), fa.FaradayRotator(angle=45 * deg, name="rotator"), mirror("end"))
    return begun(*parts).along("end", "rotator.back", "p1.back")


def ring():
    train = begun(splitter("in"), fa.FreeSpace(150 * mm), mirror("m1"), splitter("tap"))
    train.along("tap.reflected", mirror("m2"), "in.side").along("in.reflected", camera("cam a"))
    return train.along("tap.transmitted", camera("cam b"))


def nested():
    gap = fa.FreeSpace(100 * mm)
    train = begun(fa.HalfWavePlate(fast=22.5 * deg, name="hwp"), splitter("bs1"), splitter("bs2"), gap, mirror("m1"))
    train.along("m1", fa.SpiralPlate(charge=1, name="spiral"), splitter("bs3"), gap, splitter("bs4"))
    train.along("bs2.reflected", gap, mirror("m2"), fa.PhaseShift(phase=90 * deg, name="phase"), "bs3.side")
    plate = fa.QuarterWavePlate(fast=45 * deg, name="qwp")
    train.along("bs1.reflected", fa.FreeSpace(400 * mm), mirror("m3"), plate, fa.FreeSpace(500 * mm), "bs4.side")
    train.along(
        "bs4.transmitted",
        fa.Polarizer(axis=0 * deg, name="pol a"),
        gap,
        fa.Lens(focal=200 * mm, name="lens"),
        camera("cam a"),
    )
    train.along("bs4.reflected", fa.Polarizer(axis=0 * deg, name="pol"), camera("cam b"))
    return train.along("bs3.reflected", fa.FreeSpace(50 * mm), fa.Detector(name="meter"))


BENCHES = [mach_zehnder, michelson, lambda: loop(3), isolator, ring, nested]


def lit_everywhere(train):
    return {f"{name}.{face}": 1.25e-3 for name, face, way in train.graph if way == "out"}


def overlap(one, other):
    return min(one.x1, other.x1) - max(one.x0, other.x0), min(one.y1, other.y1) - max(one.y0, other.y0)


def assert_legible(train, check):
    figure = draw_bench(train, powers=lit_everywhere(train))
    check(figure)
    axes = figure.axes[0]
    parts = [patch.get_window_extent() for patch in axes.patches]
    for text in (text for text in axes.texts if text.get_text()):
        box = text.get_window_extent()
        for part in parts:
            # One pixel: the outline of a part is that wide.
            assert min(overlap(box, part)) < 1, f"{text.get_text()!r} lies on a part"
    plan = arrange(train)
    lines = [box for line in lines_of(plan, train) for box in line.boxes]
    assert all(box.right - box.left < 0.1 or box.top - box.bottom < 0.1 for box in lines)
    boxes = list(part_boxes(plan, train).values())
    for k, one in enumerate(boxes):
        for other in boxes[k + 1 :]:
            wide = min(one.right, other.right) - max(one.left, other.left)
            high = min(one.top, other.top) - max(one.bottom, other.bottom)
            assert min(wide, high) < 1e-6, "a part stands on a part"


def assert_texts_off_beams(train):
    figure = draw_bench(train, powers=lit_everywhere(train))
    axes = figure.axes[0]
    to_page = axes.transData.transform
    pieces = []
    for line in (line for line in axes.lines if line.get_zorder() >= 1):
        corners = to_page(line.get_xydata())
        pieces += [box.sides for box in line_boxes([tuple(corner) for corner in corners], 1.0)]
    for text in (text for text in axes.texts if text.get_text()):
        box = text.get_window_extent()
        for left, bottom, right, top in pieces:
            inside = (min(box.x1, right) - max(box.x0, left), min(box.y1, top) - max(box.y0, bottom))
            assert min(inside) < 0.5, f"{text.get_text()!r} lies on a beam"


@pytest.mark.parametrize("made", BENCHES)
def test_interferometers_are_legible(made, assert_nothing_collides):
    train = made()
    assert_legible(train, assert_nothing_collides)
    assert_texts_off_beams(train)


@pytest.mark.parametrize("made", BENCHES)
def test_interferometers_close_with_straight_lines(made):
    assert not arrange(made()).bent


def test_a_loop_that_cannot_close_at_right_angles_is_bent_and_the_foot_says_so():
    train = loop(2)
    figure = draw_bench(train)
    assert arrange(train).bent
    assert BENT[:30] in figure.texts[-1].get_text().replace("\n", " ")


@pytest.mark.parametrize("extra", [(0, 0), (3, 0), (0, 3), (2, 1)])
def test_two_arms_close_into_a_rectangle(extra):
    places = arrange(mach_zehnder(*extra)).places
    first, low, last, high = (places[name] for name in ("in", "m1", "out", "m2"))
    assert (first.y, low.x, last.y, high.x) == (low.y, last.x, high.y, first.x)
    assert last.x - first.x > 1
    assert abs(last.y - first.y) > 1


def test_light_there_and_back_shares_one_line_with_both_arrows():
    train = michelson()
    lines = lines_of(arrange(train), train)
    arm = next(line for line in lines if line.there.out_port == "bs.transmitted")
    assert arm.back is not None
    assert arm.back.in_port == "bs.transmitted"
    texts = [text.get_text() for text in draw_bench(train, powers=lit_everywhere(train)).axes[0].texts]
    assert any(text.startswith("→") for text in texts)
    assert any(text.startswith("←") for text in texts)


def test_light_back_by_another_face_shares_the_line():
    train = begun(fa.FreeSpace(200 * mm, name="gap"), splitter("window"), camera())
    train.join("window.reflected", "gap.back")
    back = {line.there.out_port: line.back and line.back.out_port for line in lines_of(arrange(train), train)}
    assert "window.reflected" in back.values()


def test_light_in_and_out_by_one_face_gets_two_lines():
    train = loop(3).along("pbs.front", fa.BeamDump(name="dump"))
    plan = arrange(train)
    assert plan.bent == {"pbs.front"}
    assert plan.places["laser"].y == plan.places["pbs"].y
    assert_legible(train, lambda figure: None)


def test_light_folded_towards_nothing_is_an_open_end():
    train = begun(mirror("fold"))
    assert any(text.get_text() == "open: fold.front" for text in draw_bench(train).axes[0].texts)


def test_reflections_of_several_paths_are_counted():
    texts = " ".join(text.get_text() for text in draw_bench(mach_zehnder()).axes[0].texts)
    assert "2 paths\n1 or 3 reflections\nmirrored" in texts
    assert "2 paths\n2 reflections\nupright" in texts


def test_longer_distances_are_drawn_longer():
    train = begun(fa.FreeSpace(50 * mm), splitter("bs"), fa.FreeSpace(900 * mm), camera())
    places = arrange(train).places
    assert places["cam"].x - places["bs"].x > places["bs"].x - places["laser"].x + 0.1


def test_an_open_end_keeps_clear_of_other_parts():
    plan = arrange(nested())
    parts = part_boxes(plan, nested())
    for stub in plan.stubs:
        (left, low, right, top) = line_boxes(stub_line(plan, stub), 0.02)[0].sides
        for name, box in parts.items():
            apart = left >= box.right or right <= box.left or low >= box.top or top <= box.bottom
            assert apart or name == stub.port.partition(".")[0]


@st.composite
def graphs(draw):
    """Up to 25 parts joined at random: each free port that light leaves goes to a new part or to a free port."""
    count = draw(st.integers(2, 25))
    train, waiting, k = begun(), ["laser.out"], 1
    makers = [splitter, mirror, lambda name: fa.FreeSpace(100 * mm, name=name), camera,
              lambda name: fa.HalfWavePlate(fast=1 * deg, name=name)]  # fmt: skip
    free = []
    while waiting and k < count:
        port = waiting.pop(draw(st.integers(0, len(waiting) - 1)))
        others = [side for side in free if side.partition(".")[0] != port.partition(".")[0]]
        if others and draw(st.booleans()):
            side = draw(st.sampled_from(others))
            free.remove(side)
            train.join(port, side)
            continue
        name = f"part {k}"
        kind = draw(st.integers(0, len(makers) - 1)) if waiting else draw(st.integers(0, 2))
        part = makers[kind](name)
        train.along(port, part)
        k += 1
        if kind == 0:
            waiting += [f"{name}.transmitted", f"{name}.reflected"]
            free.append(f"{name}.side")
        elif kind != 3:
            waiting.append(name)
    return train


# The checker holds nothing between examples.
@settings(max_examples=15, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(graphs())
def test_random_graphs_are_legible(assert_nothing_collides, train):
    if len(train.elements) > 1:
        assert_legible(train, assert_nothing_collides)
