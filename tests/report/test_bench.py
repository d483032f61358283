import pytest

import fastaxis as fa
from fastaxis.report.bench import SAFETY, draw_bench, reflections_in_words
from fastaxis.report.beams import BEAM
from fastaxis.report.style import SOFT, WARN
from fastaxis.units import deg, mm, mrad, mW, nm, um


def laser():
    return fa.Laser(waist=0.8 * mm, power=5 * mW, state=fa.H, name="laser")


def camera(name="cam"):
    return fa.Camera(pixel=3.45 * um, name=name)


def bench(*parts):
    return fa.Train(wavelength=532 * nm, name="bench").along(laser(), *parts)


def line():
    return bench(
        fa.Polarizer(axis=0 * deg, name="first polarizer"),
        fa.HalfWavePlate(fast=22.5 * deg, name="half wave"),
        fa.Lens(focal=100 * mm, name="expander in"),
        fa.FreeSpace(400 * mm),
        fa.Aperture(radius=50 * um, name="pinhole"),
        fa.Lens(focal=300 * mm),
        fa.QuarterWavePlate(fast=45 * deg, name="qwp"),
        fa.QPlate(q=0.5),
        fa.SpiralPlate(charge=1),
        fa.FaradayRotator(angle=45 * deg),
        fa.NeutralDensity(density=1),
        fa.KnifeEdge(),
        fa.FreeSpace(1.25),
        fa.Slit(width=1 * mm),
        fa.Wedge(x=1 * mrad),
        fa.Annulus(inner=1 * mm, outer=2 * mm),
        fa.Obstacle(radius=1 * mm),
        fa.PhaseShift(phase=90 * deg),
        camera("far camera"),
    )


def tree():
    train = bench(
        fa.HalfWavePlate(fast=22.5 * deg, name="hwp"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.FreeSpace(200 * mm),
        fa.Mirror(name="fold"),
        fa.FreeSpace(300 * mm),
        fa.Lens(focal=300 * mm, name="lens a"),
        camera("cam a"),
    )
    train.along("pbs.reflected", fa.FreeSpace(150 * mm), fa.BeamSplitter(name="sampler"), camera("cam b"))
    mirrors = (fa.Mirror(name="mirror 1"), fa.FreeSpace(100 * mm), fa.Mirror(name="mirror 2"))
    return train.along("sampler.reflected", *mirrors, fa.Detector(name="meter"))


def double_pass():
    train = bench(
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(fast=45 * deg, name="qwp"),
        fa.FreeSpace(100 * mm, name="gap"),
        fa.Mirror(name="end mirror"),
    )
    train.along("end mirror", "gap.back", "qwp.back", "pbs.transmitted")
    return train.along("pbs.side", camera())


def chain_of_splitters():
    train = bench(*(fa.BeamSplitter(name=f"tap {k}") for k in range(3)), fa.BeamDump(name="dump"))
    for k in range(3):
        train.along(f"tap {k}.reflected", fa.FreeSpace(100 * mm), camera(f"cam {k}"))
    return train


TRAINS = [line, tree, double_pass, chain_of_splitters]


def words(figure):
    return [text.get_text() for text in figure.axes[0].texts]


def coloured(figure, colour):
    return [text.get_text() for text in figure.axes[0].texts if text.get_color() == colour]


@pytest.mark.parametrize("made", TRAINS)
def test_every_text_is_legible(made, assert_nothing_collides):
    train = made()
    powers = {f"{name}.{face}": 4.56e-3 for name, face, way in train.graph if way == "out"}
    figure = draw_bench(train, powers=powers)
    assert_nothing_collides(figure)
    axes = figure.axes[0]
    for text in axes.texts:
        box = text.get_window_extent()
        for patch in axes.patches:
            part = patch.get_window_extent()
            over_x, over_y = min(box.x1, part.x1) - max(box.x0, part.x0), min(box.y1, part.y1) - max(box.y0, part.y0)
            # One pixel: the outline of a part is that wide.
            assert not text.get_text() or min(over_x, over_y) < 1, f"{text.get_text()!r} lies on a part"


@pytest.mark.parametrize("made", TRAINS)
def test_every_part_is_named_and_every_distance_written(made):
    train = made()
    figure = draw_bench(train)
    texts = words(figure)
    distances = [text.get_text() for text in figure.axes[0].texts if text.get_style() == "italic"]
    spaces = {name: part for name, part in train.elements.items() if isinstance(part, fa.FreeSpace)}
    assert set(train.elements) - set(spaces) <= set(texts)
    assert sorted(distances) == sorted(
        f"{space.distance:g} m" if space.distance >= 1 else f"{space.distance * 1e3:g} mm" for space in spaces.values()
    )


def test_settings_are_written_in_lab_units():
    texts = words(draw_bench(line()))
    assert "fast 22.5°" in texts
    assert "f 100 mm" in texts
    assert "1.25 m" in texts
    assert "radius 50 µm" in texts


def test_cameras_say_how_often_their_light_was_reflected():
    train = tree()
    assert reflections_in_words(train, "cam a") == "1 reflection: mirrored"
    assert reflections_in_words(train, "meter") == "4 reflections: upright"
    assert any("1 reflection\nmirrored" in text for text in words(draw_bench(train)))
    assert "no reflection" in reflections_in_words(line(), "far camera")


def test_faces_of_splitters_are_named():
    texts = words(draw_bench(double_pass()))
    for face in ("front", "transmitted", "side"):
        assert texts.count(face) == 1


def test_power_is_written_on_each_beam():
    figure = draw_bench(bench(camera()), powers={"laser.out": 5e-3})
    assert coloured(figure, BEAM) == ["5.00 mW"]


def test_power_that_leaves_is_shown_with_the_caution():
    figure = draw_bench(double_pass(), powers={"laser.out": 5e-3, "pbs.front": 1e-5, "pbs.reflected": 0.0})
    assert coloured(figure, WARN) == ["back out: pbs.front\n10.0 µW"]
    assert "open: pbs.reflected, dark" in coloured(figure, SOFT)
    assert "laser safety officer" in figure.texts[-1].get_text().replace("\n", " ")


def test_no_caution_where_nothing_leaves():
    sealed = draw_bench(bench(camera()))
    dark = draw_bench(double_pass(), powers={"laser.out": 5e-3, "pbs.front": 1e-15, "pbs.reflected": 0.0})
    for figure in (sealed, dark):
        assert SAFETY[:20] not in " ".join(text.get_text() for text in figure.texts)


def test_an_open_port_of_unknown_power_is_cautioned_about():
    figure = draw_bench(bench(fa.BeamSplitter(name="bs"), camera()))
    assert "open: bs.reflected" in coloured(figure, WARN)
    assert SAFETY[:20] in " ".join(text.get_text() for text in figure.texts)


def test_parts_without_light_say_so():
    with pytest.warns(fa.WiringWarning, match="spare"):
        texts = words(draw_bench(bench(camera()).add(fa.Lens(focal=1.0, name="spare"))))
    assert "f 1 m\nno light" in texts


def test_the_state_of_the_laser_follows_the_view():
    train = fa.Train(wavelength=532 * nm).along(fa.Laser(waist=1 * mm, state=fa.R, name="laser"), camera())
    named = [next(t for t in words(draw_bench(train, view=view)) if "w 1 mm" in t)[-1] for view in fa.View]
    assert named == ["R", "L"]


def test_letters_stay_letters():
    import sympy as sp

    alpha, d = sp.symbols("alpha d", real=True)
    texts = words(draw_bench(bench(fa.HalfWavePlate(fast=alpha, name="hwp"), fa.FreeSpace(d), camera())))
    assert "fast alpha" in texts
    assert "d" in texts


def cavity(*between, end=None):
    """Two splitters as mirrors, light between them coming back to the side of the first."""
    train = bench(
        fa.BeamSplitter(reflectance=0.9, name="m1"), *between, fa.BeamSplitter(reflectance=0.9, name="m2"), *(end or ())
    )
    return train.along("m2.reflected", *(f"{part.name}.back" for part in between[::-1]), "m1.side")


@pytest.mark.parametrize(
    "between",
    [
        (),
        (fa.FreeSpace(10 * mm, name="gap"),),
        (fa.FreeSpace(10 * mm, name="gap"), fa.PhaseShift(phase=0.1, name="tuning")),
    ],
)
def test_light_between_two_mirrors_comes_back_along_its_own_line(between):
    powers = {"m1.transmitted": 0.01, "m2.reflected": 0.009} | {f"{part.name}.front": 0.009 for part in between}
    figure = draw_bench(cavity(*between), powers=powers)
    assert not any("bent for the drawing only" in text for text in words(figure))
    assert any("\N{LEFTWARDS ARROW} 9.00 mW" in text for text in words(figure))
    # All beams of a laser, a cavity and an open end lie on one row.
    rows = {round(float(y), 6) for line in figure.axes[0].lines for y in line.get_ydata() if line.get_color() == BEAM}
    assert len(rows) == 1


@pytest.mark.parametrize(
    ("train", "told"),
    [
        (cavity(end=[fa.Detector(name="out")]), "round and round: no reflection, 2 more each trip; upright"),
        (
            bench(fa.BeamSplitter(name="bs"), *(fa.Mirror(name=f"m{n}") for n in range(2))).along(
                "m1", "bs.side").along("bs.reflected", fa.Detector(name="out")),
            "round and round: 1 or 2 reflections, 3 more each trip; upright and mirrored in turn",
        ),
    ],
)  # fmt: skip
def test_of_light_that_goes_round_the_reflections_of_a_trip_are_told(train, told):
    assert reflections_in_words(train, "out") == told


def test_of_coupled_cavities_only_the_first_way_is_told():
    train = cavity(end=[fa.BeamSplitter(reflectance=0.5, name="m3"), fa.Detector(name="out")]).along(
        "m3.reflected", "m2.side"
    )
    assert reflections_in_words(train, "out") == "round and round: at first no reflection"
