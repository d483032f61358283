"""Patterns finer than the samples they are put on: told, with a grid that holds them."""

import re
import warnings

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.errors import SamplingWarning
from fastaxis.plan import Grid
from fastaxis.units import mm, mrad, nm, um

WAVELENGTH = 633 * nm
K = 2 * np.pi / WAVELENGTH
GRID = Grid(512, 6 * mm)  # a pitch of 11.7 um


def grey(period):
    return fa.Mask(transmission=lambda x, y: (0.5 + 0.5 * np.cos(2 * np.pi * (x + 0.2 * y) / period)) ** 2)


def turning(period):
    return fa.PatternedRetarder(retardance=np.pi, fast=lambda x, y: np.pi * y / period)


def cone(angle):
    return fa.Mask(phase=lambda x, y: -K * angle * np.hypot(x, y))


def cells(side, height):
    """Random ones, or those of a lens of this focal length."""
    if height is None:
        return fa.Mask(phase=np.random.default_rng(7).random((900, 900)) * 6, pixel=side)
    x = (np.arange(900) - 449.5) * side
    return fa.Mask(phase=-K * (x[None, :] ** 2 + x[:, None] ** 2) / (2 * height), pixel=side)


def told(*parts, grid=GRID):
    train = fa.Train(wavelength=WAVELENGTH).along(
        fa.Laser(waist=0.5 * mm, power=1.0), *parts, fa.FreeSpace(20 * mm), fa.Camera(pixel=20 * um, shape=(96, 96))
    )
    fa.forget_light()
    with warnings.catch_warnings(record=True) as caught:
        warnings.simplefilter("always", SamplingWarning)
        images = train.expose("camera1", fa.H, grid=grid, engine="grid").stokes
    return images, [str(one.message) for one in caught]


FINE = {
    "grey": (grey(18 * um), 2),
    "finer": (grey(6 * um), 8),
    "turning": (turning(18 * um), 2),
    "cone": (cone(30 * mrad), 2),
}


@pytest.mark.parametrize("case", FINE)
def test_a_pattern_finer_than_the_samples_is_told_and_the_grid_named_holds_it(case):
    part, times = FINE[case]
    images, said = told(part)
    assert len(said) == 1
    assert f"{times} times too fine" in said[0]
    samples, window = re.search(r"Grid\(samples=(\d+), window=([\d.]+)\)", said[0]).groups()
    better, left = told(part, grid=Grid(int(samples), float(window)))
    assert not left
    assert abs(images - better).max() > 0.1 * better[0].max()
    finest, _ = told(part, grid=Grid(2 * int(samples), float(window)))
    # Kinks, as of a cone's tip, leave some 1e-4; lines are held to rounding.
    assert abs(better - finest).max() < 1e-3 * finest[0].max()


def test_an_automatic_grid_is_told_of_too():
    _, said = told(cone(60 * mrad), grid=None)
    assert "times too fine" in said[0]


COARSE = {
    "grey": grey(30 * um),
    "turning": turning(48 * um),
    "cone": cone(15 * mrad),
    "vortex": fa.Mask(phase=lambda x, y: 2 * np.arctan2(y, x)),
    "blazed": fa.Mask(phase=lambda x, y: 2 * np.pi * np.mod(x / (300 * um), 1)),
    "two levels": fa.Mask(phase=lambda x, y: np.pi * (np.sin(x / (40 * um)) > 0)),
    "large cells": cells(40 * um, None),
    "small cells of a lens": cells(5 * um, 0.3),
}


@pytest.mark.parametrize("case", COARSE)
def test_patterns_that_samples_hold_and_steps_that_none_hold_are_not_told(case):
    _, said = told(COARSE[case], grid=Grid(1024, 6 * mm))
    assert not [one for one in said if "too fine" in one]


def test_light_with_slow_tails_is_no_fine_pattern():
    _, said = told(
        fa.Aperture(radius=0.3 * mm), fa.FreeSpace(100 * mm), fa.Mask(phase=lambda x, y: np.cos(x / (90 * um)))
    )
    assert not [one for one in said if "too fine" in one]


def test_random_cells_smaller_than_the_samples_need_samples_of_their_size():
    _, said = told(cells(5 * um, None))
    assert "3 times too fine" in said[0]
