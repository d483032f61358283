"""The far plane of a last transform, read from its waves where a camera looks."""

from dataclasses import replace

import numpy as np
import pytest

from fastaxis.engines.field import CLEAN
from fastaxis.engines.grid import far as far_room
from fastaxis.engines.grid.combining import combined
from fastaxis.engines.grid.far import FarField
from fastaxis.engines.grid.light import GridLight, axis
from fastaxis.engines.grid.pointwise import flipped, past_matrix
from fastaxis.engines.grid.reading import GridField
from fastaxis.engines.grid.waves import Places
from fastaxis.laws import Flip, TravelLaw
from fastaxis.light import Raster
from fastaxis.plan import JonesStep

COUNT, PITCH, WAVELENGTH, W = 256, 50e-6, 500e-9, 0.8e-3
RASTER = Raster(90e-6, (90, 70), (0.3e-3, -0.2e-3))
WIDE = Raster(0.5e-3, (40, 30), (1e-3, 0.0))


def far(b, x0=0.0, kind=complex, jones=None):
    """Two Gaussians beside each other, in two states or in one, before an ABCD section."""
    x = axis(COUNT, PITCH)
    one = np.exp(-((x[None] - 0.4e-3 - x0) ** 2 + x[:, None] ** 2) / W**2)
    two = np.exp(-(x[None] ** 2 + (x[:, None] + 0.3e-3) ** 2) / W**2) * np.exp(2j * np.pi * 300 * x[None])
    samples = np.stack([one, two]) if jones is None else (one - 0.4 * two)[None]
    ahead = TravelLaw(0.9, b, (0.9 * 1.1 - 1) / b, 1.1, b)
    return FarField(GridLight(samples.astype(kind), jones, PITCH, 0.2, WAVELENGTH, ahead=ahead), CLEAN)


def by_samples(field):
    return GridField(field.light, CLEAN)


@pytest.mark.parametrize("b", [1.5, -1.5])
@pytest.mark.parametrize("parts", [1, 2, 3])
def test_at_the_samples_the_waves_are_the_samples(b, parts):
    """With an odd number of places for each sample the middle one lies at it; with two they lie a quarter beside."""
    field = far(b)
    light = field.light
    rows, columns = Places(20 * parts, 60 * parts, COUNT * parts), Places(30 * parts, 71 * parts, COUNT * parts)
    found = field.waves.at(rows, columns)
    if parts == 2:
        step = light.pitch / 2
        y, x = ((np.arange(p.first, p.first + p.count) - (p.length - 1) / 2) * step for p in (rows, columns))
        curvature = np.exp(1j * np.pi * light.curvature / WAVELENGTH * (x**2 + y[:, None] ** 2))
        right = field.at(x, y) / curvature
    else:
        found = found[:, parts // 2 :: parts, parts // 2 :: parts]
        right = light.samples[:, 20:80, 30:101]
    # Waves left out hold 1e-25 of the power, 3e-13 of the field.
    assert np.allclose(found, right, rtol=0, atol=1e-12 * abs(light.samples).max())


@pytest.mark.parametrize("b", [1.5, -1.5])
@pytest.mark.parametrize("jones", [None, np.array([0.6, 0.8j])])
@pytest.mark.parametrize("raster", [RASTER, WIDE])
@pytest.mark.parametrize(("kind", "error"), [(np.complex128, 1e-12), (np.complex64, 3e-6)])
def test_pixels_collect_what_they_collect_from_the_samples_of_the_window(b, jones, raster, kind, error):
    field = far(b, kind=kind, jones=jones)
    found, right = field.stokes_on(raster), by_samples(field).stokes_on(raster)
    assert found.dtype == right.dtype
    # Either kernel leaves 2e-14, the waves 3e-13; in single precision some ten roundings of a hundred terms.
    assert np.allclose(found, right, rtol=0, atol=error * right.max())


@pytest.mark.parametrize("jones", [None, np.array([0.6, 0.8j])])
def test_the_power_is_known_before_the_travel(jones):
    field = far(1.5, jones=jones)
    after = by_samples(field)
    # A sum of 7e4 squares, in another order.
    assert field.power == pytest.approx(after.power, rel=1e-13)
    assert np.allclose(field.total_stokes, after.total_stokes, rtol=0, atol=1e-13 * after.power)


def test_sums_are_read_from_waves_too():
    fields = [far(1.5), far(1.5, x0=0.3e-3)]
    total = combined(fields, np.array([1, -0.5j]))
    right = combined([by_samples(field) for field in fields], np.array([1, -0.5j])).whole
    assert isinstance(total.whole, FarField)
    scale = right.stokes_on(RASTER).max()
    assert np.allclose(total.stokes_on(RASTER), right.stokes_on(RASTER), rtol=0, atol=1e-12 * scale)
    assert np.allclose(total.whole.stokes_on(RASTER), right.stokes_on(RASTER), rtol=0, atol=1e-12 * scale)


def test_a_sum_of_light_before_and_behind_its_travel():
    field, other = far(1.5), far(1.5, x0=0.3e-3)
    mixed = combined([field, by_samples(other)], np.array([1, 2j]))
    right = combined([by_samples(field), by_samples(other)], np.array([1, 2j])).stokes_on(RASTER)
    assert np.allclose(mixed.stokes_on(RASTER), right, rtol=0, atol=1e-12 * right.max())


def test_a_raster_beyond_the_window_gets_all_the_light():
    field = far(1.5)
    assert field.stokes_on(Raster(0.5e-3, (40, 40)))[0].sum() == pytest.approx(field.power, rel=1e-12)


def test_what_takes_too_many_places_is_read_plane_by_plane(monkeypatch):
    field = far(1.5)
    right = field.stokes_on(RASTER)
    monkeypatch.setattr(far_room, "MOST", 0)
    assert field.collected_by(RASTER, field.orders).parts > 1
    assert np.allclose(field.stokes_on(RASTER), right, rtol=0, atol=1e-12 * right.max())


@pytest.mark.parametrize(
    "change", [lambda light: flipped(light, Flip("x")), lambda light: past_matrix(light, JonesStep(((0, 1), (1j, 0))))]
)
def test_reversals_and_plates_may_come_before_the_travel(change):
    before = FarField(change(far(1.5).near), CLEAN).stokes_on(RASTER)
    after = GridField(change(far(1.5).light), CLEAN).stokes_on(RASTER)
    assert np.allclose(before, after, rtol=0, atol=1e-12 * after.max())


def test_faint_light_all_over_the_window_takes_no_waves_away():
    """Roundings of single precision on one side of a narrow beam: none beats with it, together they are some light."""
    count = 1024
    x, rng = np.arange(count), np.random.default_rng(3)
    core = np.exp(-(np.add.outer((x - 900) ** 2, (x - 900) ** 2)) / 4.0**2)
    faint = 4e-9 * rng.choice([-1, 1], (count, count)) * (x < 880)
    ahead = TravelLaw(0.0, 1.5, -1 / 1.5, 0.0, 1.5)
    near = GridLight((core + faint)[None].astype("complex64"), np.array([1, 0]), PITCH, 0.0, WAVELENGTH, ahead=ahead)
    field = FarField(near, CLEAN)
    assert field.waves.samples.shape[2] > 2.9 * field.orders[1]
    raster = Raster(200e-6, (20, 20))
    right = by_samples(field).stokes_on(raster)
    # Single precision: a hundred roundings of 6e-8.
    assert np.allclose(field.stokes_on(raster), right, rtol=0, atol=1e-5 * right.max())
