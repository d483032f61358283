"""Joined light at places: one state or several, it is the same light."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines.joined.sight import sight
from fastaxis.light import stokes
from fastaxis.units import deg, mm, mrad

X, Y = np.linspace(-1.2 * mm, 1.4 * mm, 300), np.linspace(-0.9 * mm, 0.9 * mm, 301)
HOLE, WEDGE = [fa.Aperture(radius=0.5 * mm), fa.FreeSpace(0.2)], [fa.Wedge(x=1 * mrad), fa.FreeSpace(0.1)]
TURN = fa.HalfWavePlate(fast=30 * deg)


def seen(field):
    return sight(field.arms, field.mixtures, 1.4 * mm)


@pytest.mark.parametrize("state", [fa.H, fa.R, fa.elliptical(20 * deg, 10 * deg)])
@pytest.mark.parametrize("y", [Y, np.linspace(-0.3 * mm, 1.0 * mm, 120)], ids=["symmetric", "beside"])
def test_light_of_one_state_is_one_picture(mach_zehnder, state, y):
    laser = fa.Laser(waist=1 * mm, power=0.5, state=state, name="laser")
    train = mach_zehnder(laser, arm=[*HOLE, fa.SpiralPlate(charge=-1)], other=WEDGE)
    (field,) = train.field("out.transmitted")
    one = seen(field)
    images = one.images(X, y)
    assert images.shape == (1, len(y), len(X))
    expected = stokes(field.at(X, y))
    # Some dozen roundings of each field, and their squares.
    assert abs(one.polarized(images) - expected).max() < 1e-13 * expected[0].max()


@pytest.mark.parametrize(
    ("arm", "other"),
    [([TURN, *HOLE], WEDGE), ([fa.QPlate(q=0.5), *HOLE], WEDGE), (HOLE, [*WEDGE, fa.Slit(width=1 * mm)])],
    ids=["plate", "q-plate", "samples"],
)
def test_light_of_several_states_is_four(mach_zehnder, arm, other):
    (field,) = mach_zehnder(arm=arm, other=other).field("out.transmitted")
    images = seen(field).images(X, Y)
    expected = stokes(field.at(X, Y))
    assert images.shape == (4, len(Y), len(X))
    assert abs(seen(field).polarized(images) - expected).max() < 1e-13 * expected[0].max()


def test_sums_that_do_not_interfere_add_in_power(mach_zehnder):
    line = fa.GaussianLine(coherence_length=0.3)
    train = mach_zehnder(arm=HOLE, other=WEDGE).with_changes({"laser.line": line})
    (field,) = train.field("out.transmitted")
    assert len(field.mixtures) == 2
    one, other = (arm.at(X, Y)[0] for arm in field.arms)
    degrees = field.mixtures.T @ field.mixtures.conj()
    expected = abs(one) ** 2 + abs(other) ** 2 + 2 * (degrees[0, 1] * one * other.conj()).real
    assert seen(field).images(X, Y)[0] == pytest.approx(expected, abs=1e-13 * expected.max())
    assert 0.1 < abs(degrees[0, 1]) < 0.9
