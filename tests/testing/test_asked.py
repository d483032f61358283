"""What an assertion expects must be something that can be: slips in a test are told as such."""

import re

import numpy as np
import pytest
import sympy

import fastaxis as fa
import fastaxis.testing as ft
from fastaxis.units import deg, mm, nm, um

NAN, INF = float("nan"), float("inf")
AXIS = np.linspace(-0.5, 0.5, 5) * mm
FRAME = np.ones((64, 64))
FIELD = np.ones((2, 5, 5))

REFUSED = [
    *[("ring_radius", (90 * um,), {"within": wrong}, "within must be") for wrong in (0.0, -0.1, NAN, INF, "2 %")],
    *[("ring_radius", (wrong,), {}, "radius must be") for wrong in (-90 * um, NAN, None)],
    ("ring_radius", (90 * um,), {"centre": 0.0}, "centre is a place"),
    ("ring_radius", (90 * um,), {"centre": (NAN, 0.0)}, "centre must be"),
    *[("frame_matches", (FRAME,), {"behind": fa.D, "within": wrong}, "within must be") for wrong in (0.0, -1, NAN)],
    ("frame_matches", (np.where(FRAME == 1, NAN, 0.0),), {"behind": fa.D}, "finite numbers only"),
    *[("lobe_count", (wrong,), {"behind": fa.H}, "count must be") for wrong in (-2, 1.5, NAN)],
    ("lobe_count", (2,), {"behind": fa.H, "centre": (1, 2, 3)}, "centre is a place"),
    ("lobe_angle", (0 * deg,), {"behind": fa.H, "centre": ("left", 0)}, "centre must be"),
    *[("lobe_angle", (0 * deg,), {"behind": fa.H, "within": wrong}, "within must be") for wrong in (0.0, -0.1, NAN)],
    *[("turning", (1,), {"within": wrong}, "within must be") for wrong in (0.0, -0.05, NAN)],
    ("turning", (NAN,), {}, "rate must be"),
    ("turning", (1,), {"analyzers": [fa.H]}, "one analyzer to the next"),
    *[("singular_index", (wrong,), {"radius": 80 * um}, "index must be") for wrong in (0.3, NAN, "radial")],
    *[("singular_index", (1,), {"radius": wrong}, "radius must be") for wrong in (0.0, -80 * um, NAN)],
    *[("charge", (wrong,), {"behind": fa.R, "radius": 80 * um}, "charge must be") for wrong in (0.5, NAN)],
    ("charge", (30,), {"behind": fa.R, "radius": 80 * um}, "told up to 23"),
    *[("charge", (1,), {"behind": fa.R, "radius": wrong}, "radius must be") for wrong in (0.0, NAN)],
    *[("charge", (1,), {"behind": fa.R, "radius": 80 * um, "share": wrong}, "share") for wrong in (0, 1, NAN, "most")],
    *[("visibility", (wrong,), {}, "must be") for wrong in (-0.1, NAN)],
    ("visibility", (1.1,), {}, "between 0 and 1"),
    *[("visibility", (0.8,), {"within": wrong}, "within must be") for wrong in (0.0, -0.1, NAN)],
    *[
        ("visibility", (0.8,), {"knob": wrong}, "a knob is a parameter")
        for wrong in ("hwp", "nothing.phase", "qp.centre")
    ],
    *[("field_equal", (FIELD,), {"x": AXIS, "y": AXIS, "within": wrong}, "within must be") for wrong in (0.0, NAN)],
    ("field_equal", (0 * FIELD,), {"x": AXIS, "y": AXIS}, "has light"),
    ("field_equal", (NAN * FIELD,), {"x": AXIS, "y": AXIS}, "has light and finite"),
    ("form_equal", ("cos(theta)**2",), {"behind": fa.H}, "sympy expression"),
]


@pytest.mark.parametrize(("assertion", "expected", "options", "words"), REFUSED)
def test_what_cannot_be_expected_is_refused_with_a_fix(ring, assertion, expected, options, words):
    with pytest.raises(fa.ParameterError, match=re.escape(words)) as caught:
        getattr(ft, assertion)(ring, "cam", *expected, **options)
    assert assertion in caught.value.got
    assert caught.value.fix


@pytest.mark.parametrize(
    ("options", "words"),
    [
        ({"within": 0.0}, "within must be"),
        ({"within": NAN}, "within must be"),
        ({"absorbed": -0.1}, "absorbed must be"),
        ({"absorbed": NAN}, "absorbed must be"),
        ({"absorbed": 25}, "share of the power"),
    ],
)
def test_energy_is_asked_with_shares(line, options, words):
    with pytest.raises(fa.ParameterError, match=words):
        ft.energy_closes(line, **options)


def test_a_frame_belongs_to_a_camera(ring):
    with pytest.raises(fa.ParameterError, match="taken by a Camera"):
        ft.frame_matches(ring, "lens", FRAME, behind=fa.D)


def test_readings_of_a_detector_may_be_a_frame(line):
    power = line.expose("meter", [fa.H]).frame(0)
    ft.frame_matches(line, "meter", power, behind=fa.H, scale=False)


def test_a_form_may_be_a_plain_number():
    train = fa.Train(wavelength=633 * nm, name="Marram").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"), fa.Polarizer(axis=0 * deg, name="pol")
    )
    ft.form_equal(train, "pol", 0.5, behind=fa.D)
    with pytest.raises(ft.BenchError, match="random points"):
        ft.form_equal(train, "pol", 0.25, behind=fa.D)
    theta = sympy.Symbol("theta", real=True)
    with pytest.raises(ft.BenchError):
        ft.form_equal(train, "pol", sympy.cos(theta) ** 2, behind=fa.D)


def test_a_wrong_number_of_lobes_names_the_plate(ring, fails):
    error = fails(ft.lobe_count, ring.with_changes({"qp.q": 1.0}), "cam", 2, behind=fa.H)
    assert (error.expected, error.got) == ("2 lobes", "4 lobes behind H")
    assert "qp: another plate, of q = 0.5" in error.cause


def test_another_field_names_the_mistake(ring, fails):
    other = ring.with_changes({"qp.q": -0.5})
    error = fails(ft.field_equal, ring, "qp", other, x=AXIS, y=AXIS)
    assert error.expected.startswith("the expected field within")
    assert "qp: sign of q" in error.cause


def test_shallow_fringes_name_the_plate_in_the_arm(fails):
    train = fa.Train(wavelength=633 * nm, name="Curlew").along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), state=fa.H, name="laser"),
        fa.BeamSplitter(reflectance=0.5, name="first"),
        fa.HalfWavePlate(fast=45 * deg, name="hwp"),
        fa.Mirror(name="m1"),
        fa.BeamSplitter(reflectance=0.5, name="second"),
        fa.Detector(name="meter"),
    )
    train.along("first.reflected", fa.Mirror(name="m2"), "second.side")
    ft.visibility(train, "meter", 0.0)
    error = fails(ft.visibility, train, "meter", 1.0)
    assert "polarization 0.000" in error.got
    assert "hwp: left out" in error.cause
