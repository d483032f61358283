"""Kernels with few fringes on fewer nodes and radii."""

import numpy as np
import pytest
from scipy.special import jv

from fastaxis.engines.azimuthal.condensing import condensed, enough, read, spanned


@pytest.mark.parametrize("phase", [0.0, 1.0, 30.0, 400.0, 3000.0])
def test_so_many_nodes_carry_the_phase(phase):
    degrees = np.arange(enough(phase), enough(phase) + 20)
    assert abs(jv(degrees, phase / 2)).max() < 1e-15


@pytest.mark.parametrize("order", [0, 1, 7, 20])
def test_sums_are_those_of_all_nodes(order):
    rng = np.random.default_rng(3)
    places, scale, radii = np.sort(rng.uniform(0.5, 2, 4000)), 7.0, np.linspace(1, 10, 50)
    values = rng.normal(size=(2, len(places))) + 1j * rng.normal(size=(2, len(places)))
    count = enough(scale * radii[-1] * 1.5)
    fewer = condensed(places, values, 0.5, 2, count)
    sums = fewer @ jv(order, scale * np.multiply.outer(spanned(0.5, 2, count), radii))
    exact = values @ jv(order, scale * np.multiply.outer(places, radii))
    # Some roundings of each of the terms, however they cancel, and of arguments up to 140.
    assert abs(sums - exact).max() < 1e-14 * abs(values).sum()


def test_sums_at_few_radii_give_the_others():
    scale, places = 20.0, np.linspace(0, 1, 300)
    count = enough(scale * 9)
    values = jv(2, scale * np.multiply.outer([0.3, 1.0], spanned(1, 10, count))).astype(complex)
    places = np.linspace(1, 10, 200)
    exact = jv(2, scale * np.multiply.outer([0.3, 1.0], places))
    # Arguments up to 200 are rounded as they are, in either way.
    assert abs(read(values, places, 1, 10) - exact).max() < 1e-14
