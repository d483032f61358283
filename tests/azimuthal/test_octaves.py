"""Bessel sums by octaves, against Bessel functions one by one."""

import numpy as np
import pytest
from scipy.special import jv

from fastaxis.engines.azimuthal.far import HIGHEST
from fastaxis.engines.azimuthal.octaves import LARGE, MANY, octave_sums, octaves_of

RHO = np.sort(np.random.default_rng(1).uniform(0, 1, 900))


def near(order):
    return lambda rho, values, r: values @ jv(order, np.multiply.outer(rho, r))


@pytest.mark.parametrize("order", [0, 1, 4, 12])
def test_an_octave_of_radii(order):
    rng = np.random.default_rng(2)
    values = rng.normal(size=(2, len(RHO))) + 1j * rng.normal(size=(2, len(RHO)))
    radii = np.sort(rng.uniform(500, 1000, 40))
    exact = values @ jv(order, np.multiply.outer(RHO, radii))
    # 1e-14 of each term, whose kernels are 0.05; Bessel functions one by one are rounded as their arguments are.
    assert abs(octave_sums(order, 1.0, radii, RHO, values, near(order)) - exact).max() < 1e-14 * abs(values).sum() / 10


def test_octaves_with_many_radii_and_large_arguments():
    rho = np.linspace(0, 1, LARGE)
    radii = np.linspace(0, 4000, 4 * MANY)
    octaves = octaves_of(1, 1.0, radii, rho)
    assert [len(radii[some]) for some in octaves] == [2 * MANY, MANY]
    assert radii[octaves[0].start] >= 2000
    assert octaves_of(1, 1.0, radii[: MANY - 1], rho) == []
    assert octaves_of(1, 1.0, radii, rho[:-1]) == []
    assert octaves_of(1, 0.01, radii, rho)[:1] == []
    assert octaves_of(HIGHEST + 1, 1.0, radii, rho) == []


def test_few_nodes_are_near_and_left_one_by_one():
    asked = []
    octave_sums(
        0, 1.0, np.array([600.0, 900.0]), RHO, RHO[np.newaxis] + 0j, lambda *some: asked.append(some) or near(0)(*some)
    )
    ((rho, _, _),) = asked
    assert rho.max() * 600 < 12 < (rho.max() + 0.01) * 600
