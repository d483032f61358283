"""Samples about singular axes: right in their plane, in what they become behind it, and in power."""

from dataclasses import replace

import numpy as np
import pytest

from fastaxis.engines.field import Guard
from fastaxis.engines.grid.light import GridLight, axis, inner
from fastaxis.engines.grid.pointwise import flipped, past_axis, past_matrix, past_scalar
from fastaxis.engines.grid.reading import GridField
from fastaxis.engines.grid.settling import leaves, settled
from fastaxis.engines.grid.turning import turned
from fastaxis.laws import Amplitude, AxisLaw, Disc, Flip, ScalarLaw, Turn
from fastaxis.maths import Pattern
from fastaxis.plan import JonesStep

COUNT, PITCH, WAIST, WAVELENGTH = 128, 20e-6, 0.5e-3, 633e-9
HALF_WAVE = (Amplitude(1.0, -np.pi / 2), Amplitude(1.0, np.pi / 2))
PLACES = [(0.0, 0.0), (5e-6, -8e-6), (0.31e-3, 0.1e-3), (1.27e-3, 0.0)]


def light(jones=(0.6, 0.8j)):
    x = axis(COUNT, PITCH)
    bell = np.sqrt(2 / np.pi) / WAIST * np.exp(-(x[None] ** 2 + x[:, None] ** 2) / WAIST**2)
    return GridLight(bell.astype(complex)[None], np.array(jones, dtype=complex), PITCH, 0.0, WAVELENGTH)


def spiral(before, charge, centre=(0.0, 0.0)):
    return past_scalar(before, ScalarLaw(charge=charge, centre=centre))


def plate(before, order, centre=(0.0, 0.0), angle=0.2, **more):
    return past_axis(before, AxisLaw(*HALF_WAVE, angle, order, centre), **more)


def close(one, other):
    """Samples the same to some roundings of the peak."""
    return np.allclose(one.components(), other.components(), rtol=0, atol=1e-14 * abs(other.samples).max())


@pytest.mark.parametrize("centre", PLACES)
def test_in_its_plane_a_plate_changes_no_modulus(centre):
    after = spiral(light(), 4, centre)
    assert np.allclose(abs(after.samples), abs(light().samples), rtol=1e-14)
    assert after.steep == ()


@pytest.mark.parametrize("centre", PLACES)
def test_plates_in_contact_are_one(centre):
    assert close(settled(spiral(spiral(light(), 5, centre), -5, centre)), light())
    assert close(settled(spiral(spiral(light(), 1, centre), 2, centre)), settled(spiral(light(), 3, centre)))
    twice = settled(plate(plate(light(), 1, centre), 1, centre))
    assert close(twice, replace(light(), jones=-light().jones))


def test_a_uniform_plate_between_adds_charges():
    """A half-wave plate between two q-plates turns L -> R of the first into L -> R of the second: one q-plate of 2q."""
    between = JonesStep.of(AxisLaw(*HALF_WAVE, 0.0))
    left = light(np.array([1, 1j]) / np.sqrt(2))
    both = settled(plate(past_matrix(plate(left, 0.5, angle=0.0), between), 0.5, angle=0.0))
    together = settled(plate(plate(left, 0.5, angle=0.0, after=between), 0.5, angle=0.0))
    once = settled(plate(light(left.jones), 1.0, angle=0.0))
    assert close(both, replace(once, samples=-once.samples))
    assert close(together, both)


def test_a_spiral_plate_before_a_q_plate_is_the_plate_on_twisted_light():
    right = light(np.array([1, -1j]) / np.sqrt(2))
    found = settled(plate(spiral(right, 3), 0.5, angle=0.0))  # R to L with 2q turns less
    twisted = settled(spiral(light(-1j * np.array([1, 1j]) / np.sqrt(2)), 2))
    assert close(found, twisted)


def test_a_polarizer_before_or_behind_the_change_is_the_same():
    polarizer = JonesStep.of(AxisLaw(Amplitude(1.0), Amplitude(0.0), 0.3))
    first = settled(past_matrix(plate(light(), 1.0, (3e-6, 0.0)), polarizer))
    last = past_matrix(settled(plate(light(), 1.0, (3e-6, 0.0))), polarizer)
    assert first.samples.shape == (1, COUNT, COUNT) and close(first, last)


@pytest.mark.parametrize("charge", [1, -2, 4, 12])
@pytest.mark.parametrize("centre", PLACES)
def test_power_is_kept(charge, centre):
    after = settled(spiral(light(), charge, centre))
    assert after.power == pytest.approx(light().power, rel=1e-13)
    assert after.singular is None
    turned = settled(plate(light(), charge / 2, centre))
    assert turned.power == pytest.approx(light().power, rel=1e-13)
    again = settled(spiral(after, charge, (-0.2e-3, 0.0)))
    assert again.steep_power > after.steep_power
    assert again.power == pytest.approx(light().power, rel=1e-13)


LATER = {
    "nothing": None,
    "half-wave plate": AxisLaw(*HALF_WAVE, 0.4),
    "polarizer": AxisLaw(Amplitude(1.0), Amplitude(0.0), -0.7),
    "weak polarizer": AxisLaw(Amplitude(0.8), Amplitude(0.3), 0.1),
}


@pytest.mark.parametrize("later", LATER)
@pytest.mark.parametrize("centre", PLACES)
def test_all_light_keeps_its_polarization(later, centre):
    """What a detuned q-plate scatters to steep angles is of the hand it converts to, not as the rest; and it stays so
    behind uniform parts, each of which lets as much of it pass as in the plane of the plate."""
    detuned = AxisLaw(Amplitude(1.0, -0.4), Amplitude(1.0, 0.4), 0.2, 1.5, centre)
    here = past_axis(light(np.array([1, 1j]) / np.sqrt(2)), detuned)
    there = settled(replace(here, samples=here.samples.copy()))
    assert not centre[0] <= PITCH or there.steep_power > 1e-4
    if LATER[later]:
        here, there = (past_matrix(one, JonesStep.of(LATER[later])) for one in (here, there))
    exact, found = (GridField(replace(one, singular=None), Guard()).total_stokes for one in (here, there))
    assert found == pytest.approx(exact, rel=1e-12, abs=1e-13)


def test_two_plates_one_after_the_other_count_the_light_of_both():
    first = settled(plate(light(), 1.0))
    both = settled(plate(first, 1.0, (0.2e-3, 0.0)))
    assert both.power == pytest.approx(light().power, rel=1e-13)
    assert both.steep_power > 1.5 * first.steep_power
    stopped = past_scalar(replace(both, samples=both.samples.copy()), ScalarLaw(stop=Disc(0.6e-3)))
    assert stopped.steep == ()


@pytest.mark.parametrize("charge", [8, 12, 20])
def test_what_is_counted_beside_is_what_is_steeper_than_the_samples(charge):
    """exp(il phi) is |l|/(2 pi f^2) in waves. The square of that outside |fx|, |fy| < 1/(2 pitch) is
    l^2 pitch^2 (pi + 2)/(2 pi^2), times the irradiance there."""
    found = settled(spiral(light((1, 0)), charge, (3e-6, 1e-6)))
    lost = found.power - inner(found.samples, found.samples).real * PITCH**2
    steep = charge**2 * PITCH**2 * (np.pi + 2) / (2 * np.pi**2) * 2 / (np.pi * WAIST**2)
    # Means over samples in a circle do not end sharply at the edge of a square band: 21 % at the smallest charge here,
    # whose circle is not below 3 samples.
    assert lost == pytest.approx(steep, rel=0.25)


def test_a_plate_beside_the_window_or_across_its_edge_is_no_trouble():
    edge = COUNT / 2 * PITCH
    for centre in ((edge, 0.0), (0.0, -edge - 2 * PITCH), (5 * edge, -7 * edge)):
        after = settled(plate(light(), 1.0, centre))
        assert after.power == pytest.approx(light().power, rel=1e-13)
        changed = np.sum(abs(after.samples) ** 2, axis=0) / abs(light().samples[0]) ** 2 - 1
        assert np.abs(changed)[20:-20, 20:-20].max() < 1e-13


def same(one, other):
    """The same light, and the same gone beyond its band, sample by sample.

    The factors about an axis make up what sums over some thousand samples, 1e4 in size, lack: 1e-12 and some of them.
    """
    pairs = [(one.samples, other.samples)]
    for two, others in zip(one.steep, other.steep, strict=True):
        assert two.samples == others.samples
        pairs += [(two.whole, others.whole), (two.kept, others.kept)]
    for found, expected in pairs:
        assert found.shape == expected.shape
        assert np.allclose(found, expected, rtol=0, atol=1e-10 * abs(expected).max())


@pytest.mark.parametrize("centre", [*PLACES, (PITCH / 2, 0.0)])
def test_mirrored_light_is_that_of_the_mirrored_plate(centre):
    """All of it: else arms with a mirror more in one of them would not cancel in power."""
    x, y = centre
    after = settled(spiral(light(), 4, centre))
    same(flipped(after, Flip()), settled(spiral(light(), -4, (-x, y))))
    same(flipped(after, Flip("y")), settled(spiral(light(), -4, (x, -y))))


@pytest.mark.parametrize("centre", [*PLACES, (PITCH / 2, 0.0)])
@pytest.mark.parametrize("quarters", [1, 2, -1])
def test_light_turned_by_quarters_is_that_of_the_turned_plate(centre, quarters):
    there = (1j**quarters) * complex(*centre)
    after = turned(settled(spiral(light(), 4, centre)), Turn(quarters * np.pi / 2))
    same(after, settled(spiral(light(), 4, (there.real, there.imag))))  # exp(il pi/2) is 1


def test_other_parts_in_the_plane_leave_first():
    """A wedge, a stop or a plate about another axis meets samples ready to leave; a lens and a spiral are one law."""
    for law in (ScalarLaw(tilt=(1e-3, 0.0)), ScalarLaw(stop=Disc(1e-3)), ScalarLaw(charge=1, centre=(0.1e-3, 0.0))):
        here, there = past_scalar(spiral(light(), 4), law), past_scalar(settled(spiral(light(), 4)), law)
        assert close(here, there)
    pattern = AxisLaw(*HALF_WAVE, Pattern(lambda x, y: x * 1e3))
    assert close(past_axis(spiral(light(), 4), pattern), past_axis(settled(spiral(light(), 4)), pattern))
    assert leaves(spiral(light(), 4), pattern)
    lens = past_scalar(spiral(light(), 4), ScalarLaw(vergence=2.0))
    assert lens.curvature == -2.0 and close(settled(lens), settled(spiral(light(), 4)))


def test_single_precision_stays_single():
    single = replace(light(), samples=light().samples.astype(np.complex64))
    after = settled(plate(single, 1.0))
    assert after.samples.dtype == np.complex64
    assert after.power == pytest.approx(light().power, rel=1e-6)


def test_a_broken_charge_keeps_its_point_values():
    after = spiral(light(), 1.5)
    assert after.singular is None
    assert np.allclose(abs(settled(after).samples), abs(light().samples), rtol=1e-14)
