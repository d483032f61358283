import numpy as np
import pytest

from fastaxis.engines.grid.light import GridLight, axis
from fastaxis.engines.grid.pointwise import flipped, past_axis, past_matrix, past_scalar
from fastaxis.laws import Amplitude, AxisLaw, Disc, Flip, Rectangle, ScalarLaw
from fastaxis.maths import Pattern
from fastaxis.plan import JonesStep

COUNT, PITCH, WAVELENGTH = 64, 0.1e-3, 500e-9
HALF_WAVE = (Amplitude(1.0, -np.pi / 2), Amplitude(1.0, np.pi / 2))


def light(jones=(1, 0)):
    x = axis(COUNT, PITCH)
    samples = np.exp(-(x[None] ** 2 + x[:, None] ** 2) / 1e-6).astype(complex)[None]
    return GridLight(samples, np.array(jones, dtype=complex), PITCH, 0.0, WAVELENGTH)


def test_a_tuned_q_plate_turns_left_into_right_with_two_q_turns_more():
    before = light(np.array([1, 1j]) / np.sqrt(2))
    after = past_axis(before, AxisLaw(*HALF_WAVE, 0.0, 1))
    phi = np.arctan2(before.x[:, None], before.x[None, :])
    right = (after.samples[0] + 1j * after.samples[1]) / np.sqrt(2)
    left = (after.samples[0] - 1j * after.samples[1]) / np.sqrt(2)
    assert after.jones is None
    assert np.allclose(right, -1j * np.exp(2j * phi) * before.samples[0], atol=1e-15)
    assert np.allclose(left, 0, atol=1e-15)


def test_two_half_wave_q_plates_give_the_light_back_with_a_sign():
    twice = past_axis(past_axis(light((0.6, 0.8j)), AxisLaw(*HALF_WAVE, 0.2, 0.5)), AxisLaw(*HALF_WAVE, 0.2, 0.5))
    assert np.allclose(twice.samples, -light((0.6, 0.8j)).components(), atol=1e-14)


def test_a_pattern_is_looked_up_about_the_centre_of_its_plate():
    law = AxisLaw(*HALF_WAVE, Pattern(lambda x, y: (x > 0) * np.pi / 4), centre=(1e-3, 0.0))
    after = past_axis(light(), law)
    dark = after.x < 1e-3
    assert np.allclose(after.samples[0][:, dark], -1j * light().samples[0][:, dark])
    assert np.allclose(after.samples[1][:, ~dark], -1j * light().samples[0][:, ~dark])


def test_a_polarizer_leaves_one_scalar_field():
    mixed = past_axis(light(), AxisLaw(*HALF_WAVE, 0.1, 0.5))
    polarizer = JonesStep.of(AxisLaw(Amplitude(1.0), Amplitude(0.0), 0.3))
    single = past_matrix(mixed, polarizer)
    assert single.samples.shape == (1, COUNT, COUNT)
    expected = np.tensordot(np.array(polarizer.matrix), mixed.samples, axes=1)
    assert np.allclose(single.components(), expected, atol=1e-15)


def test_a_plate_keeps_both_components():
    mixed = past_axis(light(), AxisLaw(*HALF_WAVE, 0.1, 0.5))
    plate = JonesStep.of(AxisLaw(*HALF_WAVE, 0.3))
    right = np.tensordot(np.array(plate.matrix), mixed.samples, axes=1)
    after = past_matrix(mixed, plate)
    assert after.jones is None
    assert np.allclose(after.samples, right)


def test_a_wedge_turns_the_phase_with_the_place():
    after = past_scalar(light(), ScalarLaw(tilt=(1e-3, -2e-3), centre=(0.5e-3, 0.0)))
    x = after.x
    phase = 2 * np.pi / WAVELENGTH * (1e-3 * (x[None] - 0.5e-3) - 2e-3 * x[:, None])
    assert np.allclose(after.samples[0], light().samples[0] * np.exp(1j * phase), atol=1e-13)


def test_a_lens_changes_the_curvature_kept_apart_and_off_centre_also_tilts():
    centred = past_scalar(light(), ScalarLaw(vergence=2.0))
    assert centred.curvature == -2.0 and np.array_equal(centred.samples, light().samples)
    off = past_scalar(light(), ScalarLaw(vergence=2.0, centre=(0.3e-3, 0.0)))
    x, k = off.x, 2 * np.pi / WAVELENGTH
    found = off.samples[0] * np.exp(-1j * k * (x[None] ** 2 + x[:, None] ** 2))
    right = light().samples[0] * np.exp(-1j * k * ((x[None] - 0.3e-3) ** 2 + x[:, None] ** 2))
    assert np.allclose(found, right, atol=1e-12)  # phases of 1e2 rad


def test_losses_masks_and_charges_multiply():
    mask = Amplitude(Pattern(lambda x, y: 0.25 + 0 * x), Pattern(lambda x, y: 0.3 + 0 * y))
    after = past_scalar(light(), ScalarLaw(mask, charge=2))
    phi = np.arctan2(after.x[:, None], after.x[None, :])
    assert np.allclose(after.samples[0], light().samples[0] * 0.5 * np.exp(1j * (0.3 + 2 * phi)), atol=1e-15)
    assert past_scalar(light(), ScalarLaw(Amplitude(0.25, 0.0))).power == pytest.approx(light().power / 4)


@pytest.mark.parametrize("stop", [Disc(1.03e-3), Rectangle(1.94e-3, 1.37e-3)])
def test_a_rim_sample_passes_its_covered_share(stop):
    flat = GridLight(np.ones((1, COUNT, COUNT), complex), np.array([1, 0j]), PITCH, 0.0, WAVELENGTH, periodic=True)
    after = past_scalar(flat, ScalarLaw(stop=stop))
    area = np.sum(after.samples[0].real) * PITCH**2
    exact = np.pi * stop.radius**2 if isinstance(stop, Disc) else stop.width * stop.height
    # Straight along the rim the share is exact; curvature and corners leave a fraction of one sample's area, 1e-8.
    assert area == pytest.approx(exact, abs=1e-8)
    assert not after.periodic


@pytest.mark.parametrize(("flip", "place"), [("x", np.s_[:, :, ::-1]), ("y", np.s_[:, ::-1, :])])
def test_a_flip_reverses_columns_or_rows_exactly(flip, place):
    mixed = past_axis(light(), AxisLaw(*HALF_WAVE, 0.1, 0.5, (0.2e-3, 0.1e-3)))
    assert np.array_equal(flipped(mixed, Flip(flip)).samples, mixed.samples[place])
