"""Irradiance as a few real pictures, against Stokes parameters of the field itself."""

import numpy as np
import pytest

from fastaxis.engines.azimuthal.panels import sampled
from fastaxis.engines.azimuthal.table import table_of
from fastaxis.engines.azimuthal.waves import Wave, parts_of, pictures, waves_of, weights_of
from fastaxis.light.stokes import stokes

EDGES = np.linspace(0, 2, 4)
SHAPES = table_of(sampled(lambda r: np.stack([np.exp((2j - r) * r), r * np.exp(-(r**2)) * (1 + 0.5j * r)]), EDGES), 2.0)
PLACES = np.array([0.3 + 0.4j, -0.7 + 0.2j, -0.5 - 1.1j, 0.9 - 0.1j])
ORDERS = ((0, 0), (0, 2), (1, -1), (1, 3), (0, -3))
NUMBERS = np.array([[1, 0], [0, 0.7j], [0.4 - 0.2j, 0], [0, 0.9], [0.2, 0]])


def test_pictures_mixed_are_the_stokes_parameters():
    table = SHAPES.combined(NUMBERS)
    parts = parts_of(table, ORDERS)
    waves = waves_of(parts)
    hands = np.zeros((2, len(PLACES)), dtype=complex)
    for (hand, l), values in zip(ORDERS, table(abs(PLACES)), strict=True):
        hands[hand] += values * np.exp(1j * l * np.angle(PLACES))
    # L = (1, i)/sqrt2 and R = (1, -i)/sqrt2.
    field = np.array([hands[0] + hands[1], 1j * (hands[0] - hands[1])]) / np.sqrt(2)
    ours = weights_of(parts, waves) @ pictures(table, waves, PLACES)
    assert ours == pytest.approx(stokes(field), rel=1e-13, abs=1e-13)


@pytest.mark.parametrize("turns", range(6))
@pytest.mark.parametrize("sine", [False, True])
def test_mirrored_and_swapped_pictures(turns, sine):
    wave = Wave(0, 1, turns, True, sine)
    here, across, above = (pictures(SHAPES, [wave], places)[0] for places in (PLACES, -PLACES.conj(), PLACES.conj()))
    assert across == pytest.approx(wave.mirrored[0] * here, abs=1e-14)
    assert above == pytest.approx(wave.mirrored[1] * here, abs=1e-14)
    other, sign = wave.swapped
    swapped = pictures(SHAPES, [wave], PLACES.imag + 1j * PLACES.real)[0]
    assert swapped == pytest.approx(sign * pictures(SHAPES, [other], PLACES)[0], abs=1e-14)


def test_terms_of_other_hands_and_numbers_need_the_same_pictures():
    table = SHAPES.combined(NUMBERS)
    other = SHAPES.combined(NUMBERS * np.array([[2], [1j], [0.1], [3], [1]]))
    assert waves_of(parts_of(table, ORDERS)) == waves_of(parts_of(other, tuple((1 - hand, l) for hand, l in ORDERS)))
