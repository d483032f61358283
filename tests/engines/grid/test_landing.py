"""Samples read again between themselves, from the waves that made them."""

from dataclasses import replace

import numpy as np
import pytest

from fastaxis.engines.field import CLEAN
from fastaxis.engines.grid.combining import combined
from fastaxis.engines.grid.light import GridLight, axis
from fastaxis.engines.grid.pointwise import flipped, past_matrix
from fastaxis.engines.grid.reading import GridField
from fastaxis.engines.grid.single import travel_single
from fastaxis.engines.grid.waves import Places
from fastaxis.laws import Flip, TravelLaw
from fastaxis.light import Raster
from fastaxis.plan import JonesStep

COUNT, PITCH, WAVELENGTH, W = 256, 50e-6, 500e-9, 0.8e-3
RASTER = Raster(90e-6, (90, 70), (0.3e-3, -0.2e-3))


def far(b, x0=0.0, kind=complex):
    """Two Gaussians beside each other, in two states, behind an ABCD section."""
    x = axis(COUNT, PITCH)
    one = np.exp(-((x[None] - 0.4e-3 - x0) ** 2 + x[:, None] ** 2) / W**2)
    two = np.exp(-(x[None] ** 2 + (x[:, None] + 0.3e-3) ** 2) / W**2) * np.exp(2j * np.pi * 300 * x[None])
    light = GridLight(np.stack([one, two]).astype(kind), None, PITCH, 0.2, WAVELENGTH)
    return travel_single(light, TravelLaw(0.9, b, (0.9 * 1.1 - 1) / b, 1.1, b), measured=True)


@pytest.mark.parametrize("b", [1.5, -1.5])
@pytest.mark.parametrize("parts", [1, 2, 3])
def test_at_the_samples_the_waves_are_the_samples(b, parts):
    light = far(b)
    found = light.waves.at(Places(20 * parts, 60 * parts), Places(30 * parts, 71 * parts), parts)[:, ::parts, ::parts]
    # Waves left out hold 1e-25 of the power, 3e-13 of the field.
    assert np.allclose(found, light.samples[:, 20:80, 30:101], rtol=0, atol=1e-12 * abs(light.samples).max())


@pytest.mark.parametrize("b", [1.5, -1.5])
@pytest.mark.parametrize(("kind", "error"), [(np.complex128, 1e-12), (np.complex64, 3e-6)])
def test_pixels_collect_what_they_collect_from_the_samples_of_the_window(b, kind, error):
    light = far(b, kind=kind)
    assert light.waves is not None
    landed, moved = (GridField(one, CLEAN) for one in (light, replace(light, waves=None)))
    assert landed.collected_by(RASTER).parts == 1 < moved.collected_by(RASTER).parts
    found, right = landed.stokes_on(RASTER), moved.stokes_on(RASTER)
    assert found.dtype == right.dtype
    # Either kernel leaves 2e-14, the waves 3e-13; in single precision some ten roundings of a hundred terms.
    assert np.allclose(found, right, rtol=0, atol=error * right.max())


def test_sums_are_read_from_waves_too():
    fields = [GridField(far(1.5), CLEAN), GridField(far(1.5, x0=0.3e-3), CLEAN)]
    total = combined(fields, np.array([1, -0.5j]))
    assert all(field.collected_by(RASTER).parts == 1 for field in fields)
    right = total.whole.stokes_on(RASTER)
    assert np.allclose(total.stokes_on(RASTER), right, rtol=0, atol=1e-12 * right.max())


def test_a_raster_beyond_the_window_is_read_from_its_samples():
    light = far(1.5)
    wide = Raster(0.5e-3, (40, 40))
    assert GridField(light, CLEAN).collected_by(wide).parts > 1
    assert GridField(light, CLEAN).stokes_on(wide)[0].sum() == pytest.approx(light.power, rel=1e-12)


@pytest.mark.parametrize(
    "change", [lambda light: flipped(light, Flip("x")), lambda light: past_matrix(light, JonesStep(((0, 1), (1j, 0))))]
)
def test_what_changes_the_samples_drops_their_waves(change):
    light = change(far(1.5))
    landed, moved = (GridField(one, CLEAN).stokes_on(RASTER) for one in (light, replace(light, waves=None)))
    assert np.array_equal(landed, moved)
