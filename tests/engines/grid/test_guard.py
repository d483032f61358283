from dataclasses import replace

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.engines.grid.guard import check, edge_watched, phase_step, rim_of, rim_share, steps_of
from fastaxis.engines.grid.light import GridLight, Rims, axis
from fastaxis.errors import SamplingError, SamplingWarning
from fastaxis.plan import Grid
from fastaxis.plan.sampling import Sampling

GRID = Grid(256, 25.6e-3)
AUTOMATIC, BY_HAND = Sampling(GRID, ()), Sampling(GRID, (), chosen="by hand")


def light(width, curvature=0.0, count=256, pitch=0.1e-3, **options):
    x = axis(count, pitch)
    r2 = x[None] ** 2 + x[:, None] ** 2
    samples = np.exp(-r2 / width**2 + 1j * np.pi / 500e-9 * curvature * r2)[None]
    return GridLight(samples, np.array([1, 0j]), pitch, 0.0, 500e-9, **options)


def test_edge_power_is_the_share_in_the_outer_sixteenth():
    flat = GridLight(np.ones((1, 256, 256), complex), np.array([1, 0j]), 1e-4, 0.0, 500e-9)
    assert edge_watched(flat).edge_power == pytest.approx(1 - (15 / 16) ** 2)
    assert edge_watched(light(1e-3)).edge_power < 1e-15


def test_the_largest_edge_power_on_the_way_is_kept():
    assert edge_watched(light(1e-3, rims=Rims(edge=0.1))).edge_power == 0.1


def test_a_plane_wave_that_fills_the_window_is_exempt():
    assert edge_watched(light(1.0, periodic=True)).edge_power == 0


def test_phase_steps_are_those_where_the_light_is():
    """Along x the phase pi K x^2/wavelength turns by 2 pi K x pitch/wavelength a sample."""
    step = phase_step(light(1e-3, curvature=0.5))
    at_one_width = 2 * np.pi * 0.5 * 1e-3 * 0.1e-3 / 500e-9
    # 99 % of the |u|^2 along a line lies within 1.29 w.
    assert step == pytest.approx(1.29 * at_one_width, rel=0.05)


def test_both_figures_are_known_before_the_last_transform():
    """Light that fills its near plane evenly is everywhere in the far one; a beam 20 times narrower is at its middle."""
    from fastaxis.engines.grid.far import FarField
    from fastaxis.engines.grid.single import travel_single
    from fastaxis.laws import TravelLaw

    near = light(1e-3, curvature=0.1, ahead=TravelLaw(1.0, 2.56e-2 * 0.1e-3 / 500e-9, 0.0, 1.0, 0.0))
    field = FarField(near, None)
    far = travel_single(replace(near, samples=near.samples.copy(), ahead=None), near.ahead)
    # The least phase step that is told apart is that of one wave, 2 pi/256; lines of waves are one in two.
    assert steps_of(*field.marginals, 256) == pytest.approx(phase_step(far), abs=2 * np.pi / 256 + 0.02)
    assert rim_of(*field.waves.profiles(64)) == pytest.approx(rim_share(far.samples), rel=0.05)


def test_good_light_passes_silently():
    assert check(light(1e-3), 0.1, ("cam",), AUTOMATIC).edge_power == 0


def test_light_near_the_edge_is_warned_about_and_then_refused():
    with pytest.warns(SamplingWarning, match=r"lens: 5.00% of the power near the edge"):
        check(light(1e-3, rims=Rims(edge=0.05)), 0.1, ("lens",), AUTOMATIC)
    with pytest.raises(SamplingError, match=r"30.00% cut off by the band limit.*samples=512, window=0.0512"):
        check(light(1e-3, rims=Rims(cut=0.3)), 0.1, ("lens",), AUTOMATIC)


def test_a_grid_set_by_hand_is_told_when_it_is_coarse():
    """A vortex 2.3 samples wide after 10 mm: three parts in a hundred of the peak are wrong."""
    train = fa.Train(wavelength=633e-9).along(
        fa.Laser(waist=0.65e-3), fa.SpiralPlate(charge=1), fa.FreeSpace(10e-3),
        fa.Camera(pixel=30e-6, shape=(96, 96), name="cam"),
    )  # fmt: skip
    with pytest.warns(
        SamplingWarning, match=r"34.6 um at spiral1; a picture 10 mm.*Grid\(samples=2048, window=0.0133\)"
    ):
        train.expose("cam", fa.H, grid=fa.Grid(samples=384, window=13.3e-3), engine="grid")


def test_light_near_the_edge_is_said_earlier_where_the_grid_was_set_by_hand():
    assert check(light(1e-3, rims=Rims(edge=1e-3)), 0.1, ("lens",), AUTOMATIC).edge_power == 1e-3
    with pytest.warns(SamplingWarning, match="0.10% of the power near the edge"):
        check(light(1e-3, rims=Rims(edge=1e-3)), 0.1, ("lens",), BY_HAND)


@pytest.mark.parametrize("count", [16, 32, 100])
def test_the_rim_of_a_spectrum_is_that_of_its_waves_in_order(count):
    spectrum = np.random.default_rng(count).normal(size=(2, count, count)) + 0.5j
    shares = rim_share(spectrum, spectrum=True), rim_share(np.fft.fftshift(spectrum, axes=(1, 2)))
    margin = int(np.ceil(count / 32))
    inner = np.fft.fftshift(spectrum, axes=(1, 2))[:, margin:-margin, margin:-margin]
    expected = 1 - (abs(inner) ** 2).sum() / (abs(spectrum) ** 2).sum()
    assert shares == pytest.approx((expected, expected), rel=1e-12)
