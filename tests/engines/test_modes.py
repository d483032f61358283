"""Gaussian modes beside the axis and tilted: against closed forms, against samples, and against integrals."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines import modes
from fastaxis.plan.closed import closed
from fastaxis.plan.making import unfused
from fastaxis.units import mm, mrad, nm

WAVELENGTH = 633 * nm
K = 2 * np.pi / WAVELENGTH
X, Y = np.linspace(-0.7 * mm, 1.1 * mm, 9), np.linspace(-0.9 * mm, 0.5 * mm, 7)


def bench(*parts, mode, state=fa.H):
    laser = fa.Laser(mode=mode, state=state, power=0.5)
    return fa.Train(wavelength=WAVELENGTH).along(laser, *parts, fa.Detector(name="end"))


def light(train):
    (branch,) = closed(unfused(train, "end").branches)
    return modes.run(branch)


def test_behind_a_wedge_a_beam_leaves_at_an_angle_with_the_phase_of_the_slanted_way():
    """exp(i k (t.r - t^2 d/2)) u(r - t d): a tilt is a shift in the angular spectrum, whose transfer is exp(-ikt^2d/2)."""
    (tx, ty), d, mode = (1 * mrad, -0.4 * mrad), 0.7, fa.LaguerreGauss(p=1, l=2, waist=0.3 * mm)
    x, y = X, Y[:, np.newaxis]
    straight = mode.moved(d).amplitude(x - tx * d, y - ty * d, WAVELENGTH)
    expected = np.sqrt(0.5) * np.exp(1j * K * (tx * x + ty * y - (tx**2 + ty**2) * d / 2)) * straight
    found = light(bench(fa.Wedge(x=tx, y=ty), fa.FreeSpace(d), mode=mode)).at(X, Y)
    # Phases of some ten thousand roundings of a radian are right to a few of them each.
    assert abs(found[0] - expected).max() < 1e-12 * abs(expected).max()
    assert abs(found[1]).max() == 0


def test_a_lens_beside_the_axis_brings_a_collimated_beam_to_its_own_focus():
    found = light(bench(fa.Lens(focal=0.4, centre=(0.3 * mm, 0.1 * mm)), fa.FreeSpace(0.4), mode=fa.Gaussian(1 * mm)))
    (waves,) = found.waves
    assert waves.middles[0] == pytest.approx([0.3 * mm, 0.1 * mm])
    assert waves.widths[0] == pytest.approx(WAVELENGTH * 0.4 / np.pi / (1 * mm))


small = st.floats(-0.3 * mm, 0.3 * mm)
angle = st.floats(-0.4 * mrad, 0.4 * mrad)
parts = st.one_of(
    st.builds(lambda x, y: fa.Wedge(x=x, y=y), angle, angle),
    st.builds(lambda f, x, y: fa.Lens(focal=f, centre=(x, y)), st.sampled_from([-1.5, 1.2, 2.0]), small, small),
    st.builds(fa.FreeSpace, st.floats(0.05, 0.5)),
    st.builds(fa.Mirror),
    st.builds(lambda fast: fa.QuarterWavePlate(fast=fast), st.floats(0.01, 0.99)),
)
kinds = st.one_of(
    st.builds(lambda c, z: fa.Gaussian(0.4 * mm, z, c), st.tuples(small, small), st.floats(-0.3, 0.3)),
    st.builds(lambda c, l: fa.LaguerreGauss(1, l, 0.3 * mm, centre=c), st.tuples(small, small), st.integers(-2, 2)),
    st.builds(lambda c: fa.HermiteGauss(2, 1, 0.3 * mm, 0.1, c), st.tuples(small, small)),
)


@settings(max_examples=12, deadline=None)
@given(kinds, st.lists(parts, min_size=2, max_size=7))
def test_closed_forms_are_what_samples_say(mode, chain):
    train = bench(*chain, mode=mode, state=fa.D)
    (branch,) = train.plan("end", engine="grid").branches
    (samples,), form = train.field("end", engine="grid"), light(train)
    x = np.linspace(-1, 1, 11) * branch.sampling.planes[-1].spread.half_window / 3
    seen, told = samples.at(x, x + 0.05 * mm), form.at(x, x + 0.05 * mm)
    # Samples hold their beam to 1e-12 of the power, 1e-6 of the amplitude at the rim of a window that is just wide
    # enough; inside it is better by orders.
    assert abs(seen - told).max() < 1e-8 * abs(form.at(x, x)).max() + 1e-8 * abs(seen).max()
    assert form.power == pytest.approx(0.5, rel=1e-12)


def summed(one, other):
    """<one|other> on equally spaced places, exact for what falls off on all sides and has a band."""
    x = np.linspace(-3 * mm, 3 * mm, 801)
    a, b = one.at(x, x), other.at(x, x)
    return np.einsum("kij,kij->k", a.conj(), b) * (x[1] - x[0]) ** 2


@pytest.mark.parametrize("other", [fa.Gaussian(0.5 * mm), fa.HermiteGauss(1, 2, 0.4 * mm, 0.2, (0.2 * mm, 0.0))])
def test_overlaps_are_exact_however_the_beams_lie(other):
    one = light(bench(fa.Wedge(x=0.3 * mrad, y=0.2 * mrad), fa.FreeSpace(0.5), mode=fa.LaguerreGauss(1, 1, 0.4 * mm)))
    two = light(bench(fa.FreeSpace(0.2), fa.Lens(focal=2.0, centre=(0.0, 0.5 * mm)), fa.FreeSpace(0.3), mode=other))
    both = modes.combined([one, two], np.array([1.0, 0.6j]))
    expected = one.total_stokes[0] + 0.36 * two.total_stokes[0] + 2 * (0.6j * summed(one, two)[0]).real
    assert abs(summed(one, two)[0]) > 1e-3
    assert both.total_stokes[0] == pytest.approx(expected, abs=1e-13)


def test_a_number_on_a_field_is_a_number_on_its_power():
    one = light(bench(fa.Wedge(x=1 * mrad), mode=fa.Gaussian(0.5 * mm, centre=(1 * mm, 0.0))))
    (waves,) = one.waves
    dark = replace(one, waves=(replace(waves, jones=0 * waves.jones),))
    assert (dark.power, dark.guard.discarded) == (0.0, 0.0)
    # Far from the beam there is nothing, without a warning of numbers that run out.
    assert abs(one.at(np.array([1.0]), np.array([1.0]))).max() == 0
