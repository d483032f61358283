"""Ring, recorded frames, charge and field of a radial beam."""

import numpy as np
import pytest

import fastaxis as fa
import fastaxis.testing as ft
from fastaxis.units import deg, mm, um


def test_ring(ring, fails):
    # r 1F1(3/2; 2; -r^2/w^2) with w = 105.8 um is brightest at 0.8446 w.
    ft.ring_radius(ring, "cam", 89.4 * um)
    assert fails(ft.ring_radius, ring, "cam", 100 * um).got.startswith("a ring of 89")
    error = fails(ft.ring_radius, ring.with_changes({"qp.retardance": 0 * deg}), "cam", 89.4 * um)
    assert error.got == "a spot, brightest in the middle"
    assert "qp.retardance is" in error.cause


def test_a_recorded_frame(ring, fails):
    recorded = ring.expose("cam", [fa.D]).frame(0)
    ft.frame_matches(ring, "cam", recorded, behind=fa.D, scale=False)
    ft.frame_matches(ring, "cam", 3e6 * recorded, behind=fa.D)
    error = fails(ft.frame_matches, ring, "cam", 1.5 * recorded, behind=fa.D, scale=False)
    assert "differs by 33.3 %" in error.got  # (1.5 - 1)/1.5
    assert set(error.frames) == {"recorded", "got, D"}


def test_a_moved_or_mirrored_frame_matches_only_if_allowed(ring, fails):
    recorded = ring.expose("cam", [fa.D]).frame(0)
    mirrored, moved = recorded[:, ::-1], np.roll(recorded, (3, -2), (0, 1))
    ft.frame_matches(ring, "cam", mirrored, behind=fa.D, flip=True)
    # The tails of a vortex reach the edge of this small camera, where np.roll brings them in at the other side.
    ft.frame_matches(ring, "cam", moved, behind=fa.D, shift=True, within=0.05)
    assert "cam: picture mirrored" in fails(ft.frame_matches, ring, "cam", mirrored, behind=fa.D).cause
    fails(ft.frame_matches, ring, "cam", moved, behind=fa.D, within=0.05)


def test_a_recorded_frame_of_a_bench_two_degrees_off_says_so(ring, fails):
    recorded = ring.with_changes({"hwp.fast": 2 * deg}).expose("cam", [fa.D]).frame(0)
    error = fails(ft.frame_matches, ring, "cam", recorded, behind=fa.D)
    assert "hwp.fast stands at 2 deg, +2 deg off" in error.cause


def test_a_frame_of_another_shape_is_refused(ring):
    with pytest.raises(fa.ParameterError, match="shape"):
        ft.frame_matches(ring, "cam", np.ones((3, 3)), behind=fa.D)


def test_a_dark_frame():
    from fastaxis.testing.frame import likeness

    dark, light = np.zeros((2, 2)), np.ones((2, 2))
    assert likeness(dark, light, scale=True, shift=False, flip=False) == 1
    assert likeness(dark, dark, scale=True, shift=False, flip=False) == 0


def test_charge(ring, fails):
    # The half-wave plate makes R into L, and L leaves a q-plate as R with charge 2q.
    train = ring.with_changes({"laser.state": fa.R})
    ft.charge(train, "qp", +1, behind=fa.R, radius=0.5 * mm)
    error = fails(ft.charge, train, "qp", -1, behind=fa.R, radius=0.5 * mm)
    assert error.got == "charge +1 with 100 % of the power"
    assert "qp: sign of q" in error.cause
    assert fails(ft.charge, train, "laser", 1, behind=fa.L, radius=0.5 * mm).got == "no light on the circle"
    with pytest.raises(fa.ParameterError, match="share"):
        ft.charge(train, "qp", 1, behind=fa.R, radius=0.5 * mm, share=1)


def test_field_up_to_a_phase(ring, fails):
    axis = np.linspace(-0.5, 0.5, 5) * mm
    (field,) = ring.field("hwp")
    ft.field_equal(ring, "hwp", 1j * field.at(axis, axis), x=axis, y=axis)
    ft.field_equal(ring, "hwp", ring.with_changes({"hwp.fast": 180 * deg}), x=axis, y=axis)
    error = fails(ft.field_equal, ring, "hwp", ring.with_changes({"hwp.fast": 45 * deg}), x=axis, y=axis)
    assert "differs by 1.41" in error.got  # H and V are orthogonal: sqrt 2
    with pytest.raises(fa.ParameterError, match="columns"):
        ft.field_equal(ring, "hwp", np.ones(3), x=axis, y=axis)
    mixed = ring.with_changes({"laser.state": fa.UNPOLARIZED})
    with pytest.raises(fa.ParameterError, match="one field"):
        ft.field_equal(mixed, "hwp", field.at(axis, axis), x=axis, y=axis)


def test_what_is_not_tried_is_not_ruled_out(ring, fails):
    axis = np.linspace(-0.2, 0.2, 9) * mm
    error = fails(ft.field_equal, ring, "hwp", ring.with_changes({"hwp.fast": 3 * deg}), x=axis, y=axis)
    assert error.cause.endswith("; errors of angles and retardances by degrees were not tried")
    assert "not tried" not in fails(ft.ring_radius, ring, "cam", 100 * um).cause
