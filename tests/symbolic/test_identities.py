"""Equal trains have equal forms, and forms have the values of the numeric laws."""

from math import pi

import pytest
import sympy as sp
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines.symbolic import derive

a, b, d, e = sp.symbols("a b d e", real=True)
ELLIPTICAL = fa.elliptical(sp.Symbol("psi", real=True), sp.Symbol("chi", real=True))


def hwp(angle):
    return fa.HalfWavePlate(fast=angle)


def qwp(angle):
    return fa.QuarterWavePlate(fast=angle)


def ret(delta, angle):
    return fa.Retarder(fast=angle, retardance=delta)


EQUAL = {
    "two half-wave plates are a rotator": ([hwp(a), hwp(b)], [fa.Rotator(angle=2 * b - 2 * a)]),
    "two quarter-wave plates are a half-wave plate": ([qwp(a), qwp(a)], [hwp(a)]),
    "a turned plate": ([fa.Rotator(angle=-b), ret(d, a), fa.Rotator(angle=b)], [ret(d, a + b)]),
    "a plate and its inverse": ([ret(d, a), ret(-d, a)], []),
    "axes exchanged": ([ret(d, a + sp.pi / 2)], [ret(-d, a)]),
    "slow named": ([fa.Retarder(slow=a, retardance=d)], [ret(d, a - pi / 2)]),
    "a plate between half-wave plates": ([hwp(a), ret(d, b), hwp(a)], [ret(d, 2 * a - b)]),
    "a variable rotator": ([qwp(-pi / 4), ret(d, 0), qwp(pi / 4)], [fa.Rotator(angle=-d / 2)]),
    "two q-plates of one charge": (
        [fa.QPlate(q=1, offset=b), fa.QPlate(q=1, offset=a)],
        [fa.Rotator(angle=2 * a - 2 * b)],
    ),
    "two mirrors": ([fa.Mirror(), fa.Mirror()], []),
    "a plate met in a mirror": ([fa.Mirror(), ret(d, a), fa.Mirror()], [ret(d, -a)]),
    "an ideal polarizer twice": ([fa.Polarizer(axis=a), fa.Polarizer(axis=a)], [fa.Polarizer(axis=a)]),
}


def _derived(parts, state=ELLIPTICAL):
    train = fa.Train(wavelength=532e-9)
    train.along(fa.Laser(waist=0.8e-3, state=state, power=1.0), *parts, fa.Camera(pixel=5e-6, shape=(8, 8), name="cam"))
    return derive(train, "cam")


@pytest.mark.parametrize("name", EQUAL)
def test_equal_trains_have_equal_forms(name):
    one, two = EQUAL[name]
    assert _derived(one).equals(_derived(two))


def test_unequal_trains_have_unequal_forms():
    assert not _derived([hwp(a), hwp(b)]).equals(_derived([fa.Rotator(angle=2 * a - 2 * b)]))
    assert not _derived([ret(d, a)]).equals(_derived([ret(-d, a)]))


_angle = st.sampled_from([a, b, a + 2 * b, pi / 8, 0.3, -pi / 2, sp.pi / 3])
_delta = st.sampled_from([d, e, pi, pi / 2, 2.0])
_part = st.one_of(
    st.builds(ret, _delta, _angle),
    st.builds(lambda x: fa.Rotator(angle=x), _angle),
    st.builds(lambda x: fa.FaradayRotator(angle=x), _angle),
    st.builds(lambda x: fa.Polarizer(axis=x, extinction=400), _angle),
    st.builds(lambda q, x, y: fa.QPlate(q=q, offset=x, retardance=y), st.sampled_from([0.5, -1, 1.5]), _angle, _delta),
    st.builds(lambda l: fa.SpiralPlate(charge=l), st.integers(-3, 3)),
    st.sampled_from([fa.Mirror(), fa.Mirror(fold="vertical", Rs=0.9, phase_p=0.2), fa.Lens(focal=0.5)]),
)


@given(st.lists(_part, min_size=1, max_size=3), st.sampled_from([fa.H, fa.D, fa.R, fa.linear(b), fa.UNPOLARIZED]))
@settings(max_examples=25, deadline=None)
def test_random_trains_agree_with_numbers(parts, state):
    # Three parts of up to ten roundings each, and sums of up to a few hundred cosines in the form.
    assert _derived(parts, state).check(points=4).roundings < 200
