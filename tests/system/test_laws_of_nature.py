"""Laws of nature that hold whatever the bench: power closes, light runs backwards, turning the bench turns the picture."""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines.ledger import powers
from fastaxis.units import mm, mW, nm, um

WAVELENGTH = 633 * nm
angles = st.floats(-math.pi, math.pi)
shares = st.floats(0.02, 0.98)
states = st.builds(fa.elliptical, angles.map(lambda a: a / 2), angles.map(lambda a: a / 4))

lossless = st.one_of(
    st.builds(lambda a, d: fa.Retarder(fast=a, retardance=d), angles, angles),
    st.builds(lambda a: fa.Rotator(angle=a), angles),
    st.builds(lambda a: fa.FaradayRotator(angle=a), angles),
    st.builds(lambda f: fa.Mirror(fold=f), st.sampled_from(["horizontal", "vertical"])),
    st.builds(lambda d: fa.FreeSpace(d * mm), st.floats(1, 500)),
)
splitters = st.one_of(
    st.builds(lambda r: fa.BeamSplitter(reflectance=r), shares),
    st.builds(lambda p, s: fa.PolarizingBeamSplitter(Tp=p, Ts=s), shares, shares),
    st.just(fa.PolarizingBeamSplitter()),
)


def grow(train, port, parts, choose):
    """Hang a random tree of parts on a port."""
    for k, part in enumerate(parts):
        train.along(port, part)
        name = list(train.elements)[-1]
        if isinstance(part, fa.BeamSplitter | fa.PolarizingBeamSplitter):
            grow(train, f"{name}.reflected", parts[k + 1 :: 2], choose)
            port = f"{name}.transmitted"
        else:
            port = f"{name}.{part.exit}"
    return train


@settings(max_examples=40, deadline=None)
@given(states, st.lists(st.one_of(lossless, splitters), min_size=1, max_size=8))
def test_what_goes_in_comes_out_of_the_open_ports(state, parts):
    train = fa.Train(wavelength=WAVELENGTH).along(fa.Laser(waist=0.5 * mm, power=3 * mW, state=state, name="laser"))
    grow(train, "laser.out", parts, None)
    ledger = powers(train)
    leaving = [ledger[tuple(port.split("."))] for port in train.open_ports()]
    # 3 mW to so many roundings a part
    assert math.fsum(leaving) == pytest.approx(3 * mW, rel=1e-12)


reciprocal = st.one_of(
    st.builds(lambda a, d: fa.Retarder(fast=a, retardance=d), angles, angles),
    st.builds(lambda a, t: fa.Polarizer(axis=a, extinction=30, transmission=t), angles, shares),
    st.builds(lambda a: fa.Rotator(angle=a), angles),
    st.builds(lambda d: fa.NeutralDensity(density=d), st.floats(0, 2)),
)


def transmission(parts, source, passed, *, backwards):
    """Power that passes from one state into another, the parts met from the front or, in reverse order, from behind."""
    train = fa.Train(wavelength=WAVELENGTH)
    for k, part in enumerate(parts):
        train.add(part.changed(name=f"p{k}"))
    order = [f"p{k}.back" for k in reversed(range(len(parts)))] if backwards else [f"p{k}" for k in range(len(parts))]
    train.along(fa.Laser(waist=0.5 * mm, power=1 * mW, state=source, name="laser"), *order, fa.Detector(name="out"))
    return train.expose("out", [passed]).power(0)


def reversed_state(state):
    """The state that runs the same ellipse the other way, in the backward beam's frame: D conj(e)."""
    ex, ey = state.jones.conj()
    return fa.from_jones(-ex, ey)


@settings(max_examples=40, deadline=None)
@given(st.lists(reciprocal, min_size=1, max_size=5), states, states)
def test_source_and_detector_may_change_places(parts, a, b):
    forward = transmission(parts, a, b, backwards=False)
    back = transmission(parts, reversed_state(b), reversed_state(a), backwards=True)
    assert back == pytest.approx(forward, rel=1e-10, abs=1e-15 * mW)


def test_a_faraday_rotator_breaks_it():
    parts = [fa.Polarizer(axis=0), fa.FaradayRotator(angle=math.pi / 4), fa.Polarizer(axis=math.pi / 4)]
    passed = fa.linear(math.pi / 4)
    assert transmission(parts, fa.H, passed, backwards=False) == pytest.approx(1 * mW, rel=1e-12)
    back = transmission(parts, reversed_state(passed), reversed_state(fa.H), backwards=True)
    assert back <= 1e-15 * mW


def turned(part, quarter):
    """A part turned by quarter turns counter-clockwise about the beam."""
    a = quarter * math.pi / 2
    changes = {}
    for angle in ("fast", "axis"):
        if getattr(part, angle, None) is not None:
            changes[angle] = math.remainder(getattr(part, angle) + a, 2 * math.pi)
    if isinstance(part, fa.QPlate):
        # The pattern q*phi + offset turned as a body: q*(phi - a) + offset + a.
        changes["offset"] = math.remainder(part.offset + (1 - part.q) * a, 2 * math.pi)
    if isinstance(part, fa.Slit):
        changes["angle"] = math.remainder(part.angle + a, 2 * math.pi)
    if hasattr(part, "centre"):
        x, y = part.centre
        for _ in range(quarter):
            x, y = -y, x
        changes["centre"] = (x, y)
    return part.changed(**changes)


centres = st.tuples(st.floats(-0.2, 0.2), st.floats(-0.2, 0.2)).map(lambda c: (c[0] * mm, c[1] * mm))
placed = st.one_of(
    st.builds(lambda a, d: fa.Retarder(fast=a, retardance=d), angles, angles),
    st.builds(lambda a: fa.Polarizer(axis=a), angles),
    st.builds(
        lambda q, a, d, c: fa.QPlate(q=q, offset=a, retardance=d, centre=c),
        st.sampled_from([-0.5, 0.5, 1, 1.5]),
        angles,
        angles,
        centres,
    ),
    st.builds(lambda d: fa.FreeSpace(d * mm), st.floats(20, 300)),
    st.builds(lambda a, c: fa.Slit(width=0.8 * mm, angle=a, centre=c), angles, centres),
    st.builds(lambda c: fa.Lens(focal=400 * mm, centre=c), centres),
)


@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")  # both benches are sampled equally ill
@settings(max_examples=25, deadline=None)
@given(st.lists(placed, min_size=1, max_size=5), states, st.integers(1, 3))
def test_turning_the_whole_bench_turns_the_picture(parts, state, quarter):
    def picture(train_parts, light):
        train = fa.Train(wavelength=WAVELENGTH).along(
            fa.Laser(waist=0.5 * mm, power=1 * mW, state=light),
            *train_parts,
            fa.Camera(pixel=60 * um, shape=(40, 40), name="cam"),
        )
        return train.expose("cam", [fa.H], grid=fa.Grid(samples=256, window=9 * mm), engine="grid").stokes

    straight = picture(parts, state)
    around = picture(
        [turned(p, quarter) for p in parts],
        fa.elliptical(math.remainder(state.azimuth + quarter * math.pi / 2, math.pi), state.ellipticity),
    )
    expected = np.rot90(straight, -quarter, axes=(1, 2)).copy()  # rows run along +y: array turns are mirrored
    if quarter % 2:
        expected[1:3] *= -1
    # quarter turns of a square grid move samples onto samples: only roundings differ
    assert np.abs(around - expected).max() <= 1e-11 * np.abs(straight[0]).max() + 1e-20
