"""Planes and their images, against ray matrices of benches with the camera moved, and the thin-lens equation."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.inspect.bench import ray_matrix
from fastaxis.inspect.imaging import image_of, image_words, magnification_words, moved, plane_shown
from fastaxis.inspect.surveying import survey
from fastaxis.units import deg, mm, um

CAMERA = fa.Camera(pixel=10 * um, shape=(640, 640), name="cam")


def bench(*parts):
    laser = fa.Laser(waist=0.5 * mm, power=1e-3, name="laser")
    return fa.Train(wavelength=532e-9, name="bench").along(laser, fa.QPlate(q=0.5, name="qp"), *parts, CAMERA)


def relay(before=200, apart=300, behind=100, f1=200, f2=100):
    return bench(
        fa.FreeSpace(before * mm, name="d1"), fa.Lens(focal=f1 * mm, name="l1"), fa.FreeSpace(apart * mm, name="d2"),
        fa.Lens(focal=f2 * mm, name="l2"), fa.FreeSpace(behind * mm, name="d3"),
    )  # fmt: skip


def ends(train):
    visits = survey(train).visits
    return next(v for v in visits if v.name == "qp"), visits[-1]


def test_one_lens_images_by_the_thin_lens_equation():
    # 1/150 + 1/z = 1/100: z = 300, magnification -2.
    part, camera = ends(bench(fa.FreeSpace(150 * mm), fa.Lens(focal=100 * mm, name="l"), fa.FreeSpace(260 * mm)))
    image = image_of(part, camera)
    assert image.beyond == pytest.approx(40 * mm, rel=1e-12)
    assert image.magnification == pytest.approx(-2, rel=1e-12)
    assert image.real
    # w^2 |a|/(wavelength |b|) with a = 1 - 260/100, b = 150 + 260 - 150 * 260/100 mm
    assert image.fresnel == pytest.approx((0.5e-3) ** 2 * 1.6 / (532e-9 * 0.02), rel=1e-12)


distances = st.floats(20, 900)


@settings(max_examples=40, deadline=None)
@given(distances, distances, distances)
def test_a_camera_moved_onto_the_image_sees_it(before, apart, behind):
    train = relay(before, apart, behind)
    part, camera = ends(train)
    image = image_of(part, camera)
    if not image.real:
        return
    there = ends(train.with_changes({"d3.distance": behind * mm + image.beyond}))
    section = ray_matrix(there[1].chain()[1:-1])
    # Products of five matrices with entries up to 1e2: B is a difference of lengths of up to 1e2 m.
    assert section.b == pytest.approx(0, abs=1e-11 * max(1, abs(image.beyond)) ** 2)
    assert section.a == pytest.approx(image.magnification, rel=1e-8)
    assert section.c / section.a == pytest.approx(image.bend, rel=1e-6, abs=1e-9)


@settings(max_examples=12, deadline=None)
@given(distances, distances, distances)
def test_the_plane_shown_is_imaged_on_the_camera(before, apart, behind):
    """A plate put on the plane that is named is what the camera shows, as large as was said."""
    train = relay(before, apart, behind)
    _, camera = ends(train)
    told = plane_shown(camera)
    if "before l1" not in told:
        return
    where = eval(told.split(" before l1")[0].removeprefix("the plane ").replace(" mm", "*1e-3").replace(" m", ""))
    there = ends(train.with_changes({"d1.distance": where}))
    section = ray_matrix(there[1].chain()[1:-1])
    # Told to four digits: half of the last is up to 5e-4 of the distance, through a magnification.
    assert section.b == pytest.approx(0, abs=5e-4 * where * abs(section.a))
    assert f"magnification {section.a:+.2g}"[:14] == told.split(", ")[1][:14]


def test_a_relay_shows_its_front_focal_plane():
    part, camera = ends(relay())
    assert plane_shown(camera) == "the plane of qp, magnification -0.5 (turned by 180°)"
    assert image_words(part, camera) == "cam shows qp, magnification -0.5 (turned by 180°)"


def test_a_relay_of_another_spacing_still_images_and_bends_the_front():
    part, camera = ends(relay(apart=400))
    # Flat fronts come to a focus f1 behind l1, 200 mm before l2, which sends them on from there: 1/200 + 1/z = 1/100,
    # z = 200 mm behind l2, 100 mm behind the camera. The plate's own image is where it was.
    assert image_words(part, camera) == (
        "cam shows qp, magnification -0.5 (turned by 180°), flat phase fronts bent to a radius of 100 mm"
    )


def test_a_collimated_plane_has_no_image():
    part, camera = ends(bench(fa.FreeSpace(200 * mm), fa.Lens(focal=200 * mm, name="l"), fa.FreeSpace(200 * mm)))
    image = image_of(part, camera)
    assert image.far
    assert image.focus == pytest.approx(0.2)
    assert image_words(part, camera) == "qp has no real image behind the last lens"


def test_a_plane_behind_a_diverging_lens_has_no_real_image():
    part, camera = ends(bench(fa.FreeSpace(200 * mm), fa.Lens(focal=-200 * mm, name="l"), fa.FreeSpace(200 * mm)))
    assert "no real image" in image_words(part, camera)
    assert plane_shown(camera) == ""


def test_without_a_lens_no_plane_is_imaged():
    part, camera = ends(bench(fa.FreeSpace(200 * mm)))
    assert plane_shown(camera) == ""
    assert not image_of(part, camera).real


def test_an_upright_picture_is_not_turned():
    assert magnification_words(2.0) == "magnification +2"


def test_the_picture_at_the_image_is_the_plate_and_not_its_diffraction():
    """Physics beside bookkeeping: between crossed states a q-plate's picture has its dark cross in full only there."""
    sharp = relay(before=150)
    part, camera = ends(sharp)
    on_image = sharp.with_changes({"d3.distance": 100 * mm + image_of(part, camera).beyond})
    off_image = sharp.with_changes({"d3.distance": 100 * mm - image_of(part, camera).beyond})

    def dark_core(train):
        # On the image a half-wave q-plate has no dark middle but a point; away from it light is driven off the axis.
        shots = train.with_changes({"cam.pixel": 4 * um, "cam.shape": (256, 256)}).expose("cam", fa.SIX_STATES)
        middle = shots.stokes[0][124:132, 124:132].mean()
        return middle / shots.stokes[0].max()

    assert dark_core(on_image) > 3 * dark_core(off_image)


@pytest.mark.parametrize("name", ["l2", "cam"])
def test_relays_are_told_once_of_several_paths(name):
    built = fa.Train(wavelength=532e-9).along(
        fa.Laser(waist=0.5 * mm, name="laser"), fa.QPlate(q=0.5, name="qp"), fa.BeamSplitter(name="split"),
        fa.BeamSplitter(name="join"), fa.FreeSpace(200 * mm), fa.Lens(focal=200 * mm, name="l1"),
        fa.FreeSpace((430 if name == "l2" else 400) * mm), fa.Lens(focal=200 * mm, name="l2"),
        fa.FreeSpace((200 if name == "l2" else 320) * mm), CAMERA,
    )  # fmt: skip
    built.along("split.reflected", fa.PhaseShift(phase=40 * deg), "join.side").along("join.reflected", fa.BeamDump())
    found = [f for f in built.inspect() if f.check == "relay spacing"]
    assert [f.element for f in found] == [name]


def test_numbers_of_a_note_about_diffraction():
    found = [f for f in relay(behind=400).inspect() if f.check == "plane shown"]
    assert "the image of qp lies 300 mm before cam, magnification -0.5 (turned by 180°)" in found[0].got
    assert np.isfinite(image_of(*ends(relay(behind=400))).fresnel)


@pytest.mark.parametrize(
    ("built", "check", "space"),
    [
        (relay(apart=330), "relay spacing", '"d2.distance": 300*mm'),
        (relay(behind=108), "off the image", '"d3.distance": 100*mm'),
    ],
)
def test_a_part_is_moved_by_the_space_before_it(built, check, space):
    (found,) = (f for f in built.inspect() if f.check == check)
    assert space in found.fix
    mended = eval(found.fix, {"train": built, "mm": mm})  # noqa: S307 - the fix is code to paste
    assert not [f for f in mended.inspect() if f.check == check]


def test_without_room_before_it_a_part_is_moved_by_hand():
    built = bench(
        fa.FreeSpace(200 * mm), fa.Lens(focal=100 * mm, name="l"), fa.FreeSpace(190 * mm), fa.FreeSpace(1 * mm)
    )
    _, camera = ends(built)
    assert moved(camera, -9 * mm) == "move cam by -9*mm along the beam"
    assert moved(camera, 9 * mm) == f'train.with_changes({{"{camera.previous.name}.distance": 10*mm}})'
