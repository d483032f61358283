"""Random thin benches against matrices written out by hand, a second time, from the sign set alone.

Nothing of ``fastaxis.laws`` is used here: each part's matrix is typed again in the linear basis, frames are
flipped by hand, and the field is compared sample by sample.
"""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm

WAIST = 0.7 * mm
GRID = fa.Grid(samples=32, window=5 * mm)
X = (np.arange(32) - 15.5) * 5 * mm / 32  # where the grid's samples lie: nothing is interpolated


def turn(a):
    return np.array([[math.cos(a), -math.sin(a)], [math.sin(a), math.cos(a)]])


def plate(f, d):
    """Fast axis at f: exp(-id/2) along it, exp(+id/2) across it."""
    return turn(f) @ np.diag([np.exp(-0.5j * d), np.exp(0.5j * d)]) @ turn(-f)


class ByHand:
    """A field on the samples, with the frame it is described in."""

    def __init__(self, jones):
        self.x, self.y = np.meshgrid(X, X)
        u = math.sqrt(2 / math.pi) / WAIST * np.exp(-(self.x**2 + self.y**2) / WAIST**2)
        self.e = math.sqrt(1 * mW) * np.multiply.outer(np.asarray(jones, complex), u)

    def matrix(self, j):
        self.e = np.einsum("ij...,jyx->iyx", j, self.e) if np.ndim(j) == 2 else np.einsum("ijyx,jyx->iyx", j, self.e)

    def everywhere(self, rule):
        self.matrix(np.array([[rule(x, y) for x in X] for y in X]).transpose(2, 3, 0, 1))

    def flip(self, axis):
        self.e = self.e[:, :, ::-1] if axis == "x" else self.e[:, ::-1, :]


angles = st.floats(-math.pi, math.pi)
shares = st.floats(0.05, 1.0)


def retarder(f, d):
    return [fa.Retarder(fast=f, retardance=d)], lambda b: b.matrix(plate(f, d))


def slow_plate(f):
    return [fa.QuarterWavePlate(slow=f)], lambda b: b.matrix(plate(f + math.pi / 2, math.pi / 2))


def q_plate(q, a, d, cx, cy):
    def rule(x, y):
        return plate(q * math.atan2(y - cy, x - cx) + a, d)

    return [fa.QPlate(q=q, offset=a, retardance=d, centre=(cx, cy))], lambda b: b.everywhere(rule)


def polarizer(a, t, extinction):
    j = turn(a) @ np.diag([math.sqrt(t), math.sqrt(t / extinction)]) @ turn(-a)
    return [fa.Polarizer(axis=a, transmission=t, extinction=extinction)], lambda b: b.matrix(j)


def rotator(a):
    return [fa.Rotator(angle=a)], lambda b: b.matrix(turn(a))


def faraday(a):
    return [fa.FaradayRotator(angle=a)], lambda b: b.matrix(turn(a))


def spiral(charge, cx, cy):
    def by_hand(b):
        b.e = b.e * np.exp(1j * charge * np.arctan2(b.y - cy, b.x - cx))

    return [fa.SpiralPlate(charge=charge, centre=(cx, cy))], by_hand


def mirror(fold):
    def by_hand(b):
        b.matrix(np.diag([1, -1]) if fold == "horizontal" else np.diag([-1, 1]))
        b.flip("x" if fold == "horizontal" else "y")

    return [fa.Mirror(fold=fold)], by_hand


def wedge(tx, ty):
    k = 2 * math.pi / (633 * nm)

    def by_hand(b):
        b.e = b.e * np.exp(1j * k * (tx * b.x + ty * b.y))

    return [fa.Wedge(x=tx, y=ty)], by_hand


def splitter_through(r):
    return [fa.BeamSplitter(reflectance=r)], lambda b: b.matrix(math.sqrt(1 - r) * np.eye(2))


centres = st.floats(-0.3, 0.3).map(lambda v: v * mm)
part = st.one_of(
    st.builds(retarder, angles, angles),
    st.builds(slow_plate, angles),
    st.builds(q_plate, st.sampled_from([-1.5, -0.5, 0.5, 1, 2]), angles, angles, centres, centres),
    st.builds(polarizer, angles, shares, st.floats(1.01, 1e4)),
    st.builds(rotator, angles),
    st.builds(faraday, angles),
    st.builds(spiral, st.sampled_from([-2, -1, 1, 3]), centres, centres),
    st.builds(mirror, st.sampled_from(["horizontal", "vertical"])),
    st.builds(wedge, st.floats(-1e-3, 1e-3), st.floats(-1e-3, 1e-3)),
    st.builds(splitter_through, st.floats(0.1, 0.9)),
)


@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")  # 32 samples are few on purpose
@settings(max_examples=60, deadline=None)
@given(
    st.lists(part, min_size=1, max_size=6), st.floats(-math.pi / 2, math.pi / 2), st.floats(-math.pi / 4, math.pi / 4)
)
def test_any_thin_bench_is_the_product_written_by_hand(parts, psi, chi):
    train = fa.Train(wavelength=633 * nm)
    train.along(
        fa.Laser(waist=WAIST, power=1 * mW, state=fa.elliptical(psi, chi)),
        *(p for elements, _ in parts for p in elements),
        fa.Camera(pixel=0.1 * mm, shape=(8, 8), name="cam"),
    )
    expected = ByHand(turn(psi) @ np.array([math.cos(chi), -1j * math.sin(chi)]))
    for _, act in parts:
        act(expected)
    (field,) = train.field("cam", grid=GRID)
    got = field.at(X, X)
    # Each of up to 8 products and the interpolation at its own nodes rounds a few times; fields peak at 40 sqrt(W)/m.
    scale = np.abs(expected.e).max() + 1e-3
    assert np.abs(got - expected.e).max() <= 2e-12 * scale


def on_axis_state(train, target):
    """Unit Jones vector on the axis, phase taken off."""
    (field,) = train.field(target, grid=GRID, engine="grid")
    e = field.at(np.array([X[16]]), np.array([X[16]]))[:, 0, 0]
    return e / np.linalg.norm(e)


def overlap(e, state):
    return abs(np.vdot(state.jones, e)) ** 2


@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")
@pytest.mark.parametrize(
    ("before", "after"),
    [("H", "H"), ("V", "V"), ("D", "A"), ("A", "D"), ("R", "L"), ("L", "R")],
)
def test_one_mirror_maps_the_six_states(before, after):
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=WAIST, power=1 * mW, state=getattr(fa, before)), fa.Mirror(name="m"), fa.BeamDump(name="end")
    )
    assert overlap(on_axis_state(train, "end"), getattr(fa, after)) == pytest.approx(1, abs=1e-12)


@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")
@pytest.mark.parametrize("theta", [0, 13 * deg, 45 * deg, -70 * deg])
def test_double_pass_through_a_quarter_wave_plate_by_wiring(theta):
    """Light goes through the plate, back from a mirror, through the plate again: H share cos^2(2 theta)."""
    train = fa.Train(wavelength=633 * nm)
    train.along(fa.Laser(waist=WAIST, power=1 * mW), fa.QuarterWavePlate(fast=theta, name="qwp"), fa.Mirror(name="m"))
    train.along("m", "qwp.back", fa.Detector(name="out"))
    e = on_axis_state(train, "qwp.front")
    assert overlap(e, fa.H) == pytest.approx(math.cos(2 * theta) ** 2, abs=1e-12)


@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")
@pytest.mark.parametrize(("part", "azimuth"), [(fa.FaradayRotator, 46 * deg), (fa.Rotator, 0)])
def test_double_pass_adds_faraday_rotation_and_cancels_optical_activity(part, azimuth):
    train = fa.Train(wavelength=633 * nm)
    train.along(fa.Laser(waist=WAIST, power=1 * mW), part(angle=23 * deg, name="rot"), fa.Mirror(name="m"))
    train.join("m", "rot.back")
    e = on_axis_state(train, "rot.front")
    assert overlap(e, fa.V) == pytest.approx(math.sin(azimuth) ** 2, abs=1e-12)


@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")
def test_a_radial_beam_stays_radial_and_a_spiral_one_changes_hand_at_a_mirror():
    def local_angles(offset, mirrors):
        train = fa.Train(wavelength=633 * nm).along(
            fa.Laser(waist=WAIST, power=1 * mW),
            fa.QPlate(q=0.5, offset=offset),
            *(fa.Mirror() for _ in range(mirrors)),
            fa.Camera(pixel=0.1 * mm, shape=(8, 8), name="cam"),
        )
        (field,) = train.field("cam", grid=GRID)
        e = field.at(X, X)
        x, y = np.meshgrid(X, X)
        radial = (e[0] * x + e[1] * y) / np.hypot(x, y)
        around = (-e[0] * y + e[1] * x) / np.hypot(x, y)
        # sign of radial * around tells which way the spiral winds
        return (
            float((abs(radial) ** 2).sum() / (abs(e) ** 2).sum()),
            float((radial * around.conj()).real.sum() / (abs(e) ** 2).sum()),
        )

    for mirrors in range(4):
        assert local_angles(0, mirrors)[0] == pytest.approx(1, abs=1e-12)
        share, hand = local_angles(15 * deg, mirrors)
        assert share == pytest.approx(math.cos(30 * deg) ** 2, abs=1e-12)
        assert hand == pytest.approx((-1) ** mirrors * math.sin(60 * deg) / 2, abs=1e-12)


def test_a_straight_return_is_the_same_light_whichever_way_the_fold_is_called():
    """Both frames are right-handed about the returning beam; one is the other turned by half a turn."""

    def returned(fold):
        train = fa.Train(wavelength=633 * nm).along(
            fa.Laser(
                mode=fa.Gaussian(waist=WAIST, centre=(0.2 * mm, 0.1 * mm)), power=1 * mW, state=fa.elliptical(0.3, 0.2)
            ),
            fa.QPlate(q=1, offset=0.4, centre=(-0.1 * mm, 0.05 * mm)),
            fa.Mirror(fold=fold),
            fa.Camera(pixel=0.1 * mm, shape=(8, 8), name="cam"),
        )
        (field,) = train.field("cam", grid=fa.Grid(samples=64, window=8 * mm))
        return field.at(X, X)

    half_turn = -returned("horizontal")[:, ::-1, ::-1]
    assert np.abs(returned("vertical") - half_turn).max() <= 1e-12 * np.abs(half_turn).max()
