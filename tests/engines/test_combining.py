"""Sums of fields: what the sum of the amplitudes gives."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines.combining import combined, combines
from fastaxis.errors import SamplingError
from fastaxis.light import Raster
from fastaxis.light.stokes import stokes
from fastaxis.units import mm, nm

NUMBERS = np.array([0.3 - 0.4j, 1.1, 0.0])
RASTER = Raster(0.1 * mm, (20, 22), (0.1 * mm, 0.0))
WIDE = Raster(1.0 * mm, (6, 6))

pytestmark = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


def fields(*plates, window=6 * mm):
    grid = fa.Grid(samples=128, window=window)
    laser = fa.Laser(waist=0.6 * mm, power=1e-3, state=fa.D, name="laser")
    ends = [fa.FreeSpace(distance=0.2, name="arm"), fa.Camera(pixel=50e-6, shape=(8, 8), name="cam")]
    return [fa.Train(wavelength=633 * nm).along(laser, plate, *ends).field("cam", grid=grid) for plate in plates]


PLATES = {
    "patterned": [fa.QPlate(q=0.5, offset=a, centre=(0.1 * mm, 0)) for a in (0.1, 0.5, 0.9)],
    "one state, several shapes": [fa.SpiralPlate(charge=k) for k in (0, 1, 2)],
    "one shape, several states": [fa.HalfWavePlate(fast=a) for a in (0.1, 0.5, 0.9)],
    "patterned and uniform": [fa.QPlate(q=0.5), fa.HalfWavePlate(fast=0.2), fa.HalfWavePlate(fast=0.4)],
}


@pytest.mark.parametrize("kind", PLATES)
def test_amplitudes_add(kind):
    parts = fields(*PLATES[kind])
    (total,) = combined("grid", parts, NUMBERS)
    expected = sum(number * part.at(RASTER.x, RASTER.y) for number, (part,) in zip(NUMBERS, parts, strict=True))
    # Sums of some hundred terms in another order.
    peak = abs(expected).max()
    np.testing.assert_allclose(total.at(RASTER.x, RASTER.y), expected, rtol=0, atol=1e-13 * peak)
    assert total.wavelength == 633 * nm


@pytest.mark.parametrize("kind", PLATES)
@pytest.mark.parametrize("raster", [RASTER, WIDE])
def test_pixels_collect_the_sum(kind, raster):
    parts = fields(*PLATES[kind])
    (total,) = combined("grid", parts, NUMBERS)
    own = total.whole.stokes_on(raster)
    np.testing.assert_allclose(total.stokes_on(raster), own, rtol=0, atol=1e-12 * own.max())
    assert total.power == pytest.approx(total.whole.power)
    np.testing.assert_allclose(total.total_stokes[0], total.power, rtol=1e-12)


def test_total_stokes_is_the_sum_over_the_plane():
    (part,) = fields(PLATES["patterned"][0])[0]
    x = part.light.x
    kept = stokes(part.at(x, x)).sum(axis=(1, 2)) * part.light.pitch**2
    np.testing.assert_allclose(
        part.total_stokes,
        kept + sum(stokes(one.whole) - stokes(one.kept) for one in part.light.steep).sum(axis=(1, 2)),
        atol=1e-15 * part.power,
    )


def test_total_power_of_light_with_dark_samples_left_out_is_that_of_one_state():
    """Behind a turned half-wave plate J = cos(2a) J(0) + sin(2a) J(45 deg): the same power for each a."""
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.8 * mm, power=1e-3, name="laser"),
        fa.HalfWavePlate(fast=0.0, name="hwp"),
        fa.FreeSpace(distance=0.1),
        fa.SpiralPlate(charge=8, centre=(0.1 * mm, 0.0)),
        fa.FreeSpace(distance=3.0),
        fa.Camera(pixel=50e-6, shape=(8, 8), name="cam"),
    )
    turned = [train.with_changes({"hwp.fast": angle}).field("cam", engine="grid") for angle in (0.0, np.pi / 4)]
    near = turned[0][0].carried
    assert near.full > near.count and near.steep_power > 1e-3 * near.power  # else this tests nothing
    (total,) = combined("grid", turned, np.array([0.6, 0.8]))
    assert total.power == pytest.approx(1e-3, rel=1e-13)


def test_light_beyond_the_band_adds_where_it_is_of_the_same_samples_only():
    """Behind one plate amplitudes add, behind plates at two places powers do."""
    places = [(0.1 * mm, 0.0), (0.1 * mm, 0.0), (-0.4 * mm, 0.2 * mm)]
    parts = [one for (one,) in fields(*[fa.SpiralPlate(charge=4, centre=centre) for centre in places])]
    one, same, apart = (part.carried.steep_power for part in parts)
    assert one == same != apart
    for chosen, expected in (((0, 1), 4 * one), ((0, 2), one + apart)):
        (total,) = combined("grid", [(parts[i],) for i in chosen], np.array([1.0, 1.0]))
        assert total.whole.carried.steep_power == pytest.approx(expected, rel=1e-12)


def test_the_guard_is_the_worst():
    parts = fields(*PLATES["one state, several shapes"])
    (total,) = combined("grid", parts, NUMBERS)
    assert total.guard.phase_step == max(part.guard.phase_step for (part,) in parts)


def test_other_samples_are_refused():
    parts = fields(PLATES["patterned"][0]) + fields(PLATES["patterned"][1], window=5 * mm)
    with pytest.raises(SamplingError, match="they need the same samples"):
        combined("grid", parts, NUMBERS[:2])


def test_which_engines_add():
    assert combines("grid")
    assert combines("uniform")
    assert combines("azimuthal")
    # Light that the engine has left out of its panels is known by its power alone.
    assert not combines("azimuthal", totals=True)
    assert combines("grid", totals=True)


def test_jones_vectors_add():
    laser = fa.Laser(mode=fa.PlaneWave(area=1e-6), state=fa.D, name="laser")
    camera = fa.Camera(pixel=1e-5, shape=(1, 1), name="cam")
    trains = [fa.Train(wavelength=633 * nm).along(laser, fa.HalfWavePlate(fast=a), camera) for a in (0.1, 0.5, 0.9)]
    parts = [train.field("cam") for train in trains]
    (total,) = combined("uniform", parts, NUMBERS)
    expected = sum(number * part.jones for number, (part,) in zip(NUMBERS, parts, strict=True))
    np.testing.assert_allclose(total.jones, expected, rtol=1e-15)
    np.testing.assert_allclose(total.total_stokes, stokes(expected), rtol=1e-15)
