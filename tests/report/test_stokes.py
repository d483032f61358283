import numpy as np
import pytest

from fastaxis.conventions import View
from fastaxis.report.stokes import draw_stokes


def panel(figure, name):
    axes = next(axes for axes in figure.axes if axes.get_title().startswith(name))
    return np.ma.filled(axes.images[0].get_array().astype(float), np.nan), axes


def shown_radius(axes, values):
    left, right, bottom, top = axes.images[0].get_extent()
    ny, nx = values.shape
    x = left + (np.arange(nx) + 0.5) * (right - left) / nx
    y = bottom + (np.arange(ny) + 0.5) * (top - bottom) / ny
    return np.hypot(x[None, :] - 0.2, y[:, None])  # the beam stands at x = 0.2 mm


def test_s3_is_positive_for_r_and_changes_at_the_l_line(six_shots):
    values, axes = panel(draw_stokes(six_shots), "S3")
    radius = shown_radius(axes, values)
    ring = 0.6 / np.sqrt(2)  # [mm]
    lit = ~np.isnan(values)
    assert np.all(values[lit & (radius > ring * 1.05)] > 0)
    assert np.all(values[lit & (radius < ring * 0.95)] < 0)


def test_the_other_view_turns_s3_and_ellipticity_over_and_nothing_else(six_shots):
    here, there = draw_stokes(six_shots), draw_stokes(six_shots.in_view(View.SOURCE))
    for name, sign in (("S1", 1), ("S2", 1), ("S3", -1), ("ellipticity", -1), ("azimuth", 1)):
        assert np.allclose(panel(there, name)[0], sign * panel(here, name)[0], equal_nan=True)


def test_dark_places_are_masked_and_lit_ones_are_not(six_shots):
    figure = draw_stokes(six_shots)
    total, _ = panel(figure, "S0")
    for name in ("S1", "S2", "S3", "ellipticity"):
        assert np.array_equal(np.isnan(panel(figure, name)[0]), total <= 0.01 * total.max())


def test_azimuth_is_not_told_for_circular_light(six_shots):
    values, axes = panel(draw_stokes(six_shots), "azimuth")
    radius = shown_radius(axes, values)
    # E_R/E_L = sqrt2 r/w; ellipticity 43 deg is tan(2 deg) = sqrt2 r/w.
    assert np.isnan(values[radius < 0.6 * np.tan(np.radians(2)) / np.sqrt(2)]).all()
    assert not np.isnan(values[(radius > 0.1) & (radius < 0.5)]).any()


def test_azimuth_is_half_of_phi_for_this_beam(six_shots):
    values, axes = panel(draw_stokes(six_shots), "azimuth")
    ny, nx = values.shape
    left, right, _, _ = axes.images[0].get_extent()
    x = left + (np.arange(nx) + 0.5) * (right - left) / nx
    row = values[ny // 2 - 1 : ny // 2 + 1].mean(axis=0)  # the two rows beside y = 0
    # phi = 0 on the right: azimuth 0, up to the half pixel the rows lie off the axis, whose phi averages out.
    assert row[(x > 0.4) & (x < 0.8)] == pytest.approx(0, abs=1e-9)


def test_every_panel_has_a_bar_with_a_unit(six_shots):
    figure = draw_stokes(six_shots)
    labels = [axes.get_ylabel() for axes in figure.axes if axes.get_label() == "<colorbar>"]
    assert labels == ["µW per pixel", "share of S0", "share of S0", "share of S0", "deg", "deg"]
