"""Which light has a core: a harmonic with a charge that does not go to the axis as r^|l| (a + b r^2 ...)."""

import numpy as np
import pytest

from fastaxis.engines.azimuthal.panels import sampled
from fastaxis.engines.azimuthal.smooth import has_core
from fastaxis.engines.azimuthal.table import table_of

EDGES = np.linspace(0, 4, 5)


def table(*functions):
    return table_of(sampled(lambda r: np.stack([f(r) for f in functions]), EDGES), 4.0)


@pytest.mark.parametrize("charge", [1, -2, 3])
def test_light_that_has_travelled_has_none(charge):
    """Even on pixels of a third of the beam."""
    travelled = table(lambda r: r ** abs(charge) * np.exp(-(r**2)))
    assert not has_core(travelled, [charge], 0.3, 1.0)


@pytest.mark.parametrize("charge", [1, -2, 3])
def test_light_behind_a_plate_has_one_on_any_pixel(charge):
    fresh = table(lambda r: np.exp(-(r**2)))
    for pixel in (1e-3, 0.3):
        assert has_core(fresh, [charge], pixel, 1.0)
    assert not has_core(fresh, [0], 0.3, 1.0)


def test_a_weak_one_beside_strong_light_is_found():
    both = table(lambda r: np.exp(-(r**2)), lambda r: 1e-9 * np.exp(-(r**2)))
    assert has_core(both, [0, 1], 0.1, 1.0)
