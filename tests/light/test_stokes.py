import math

import numpy as np
import pytest

from fastaxis.conventions import View
from fastaxis.light import D, H, L, R, degree_of_polarization, ellipse, elliptical, stokes
from fastaxis.units import deg


def test_s3_is_the_power_of_r_less_that_of_l():
    field = np.array([0.3 - 0.4j, 0.9 + 0.2j])
    power = {state.label: abs(np.vdot(state.jones, field)) ** 2 for state in (R, L)}
    assert stokes(field)[3] == pytest.approx(power["R"] - power["L"], abs=1e-15)


def test_r_is_named_l_and_s3_turns_in_the_view_of_the_source():
    assert View.SOURCE.s3_sign * stokes(L.jones)[3] == pytest.approx(1)
    assert View.SOURCE.circular_name(+1) == View.SOURCE.rename("L") == "R"


def test_components_lead_and_the_plane_follows():
    field = np.random.default_rng(1).normal(size=(2, 3, 5, 2)) @ [1, 1j]
    whole = stokes(field)
    assert whole.shape == (4, 3, 5)
    np.testing.assert_allclose(whole[:, 1, 2], stokes(field[:, 1, 2]), rtol=0, atol=2e-15)  # a few roundings


def test_coherent_light_is_fully_polarized():
    field = np.random.default_rng(2).normal(size=(2, 50, 2)) @ [1, 1j]
    np.testing.assert_allclose(degree_of_polarization(stokes(field)), 1, rtol=0, atol=2e-15)


@pytest.mark.parametrize("azimuth", [-89, -45, 0, 25, 89])
@pytest.mark.parametrize("ellipticity", [-45, -44.9999, -12, 0, 30, 44.9999, 45])
def test_the_ellipse_comes_back(azimuth, ellipticity):
    state = elliptical(azimuth * deg, ellipticity * deg)
    found_azimuth, found_ellipticity = ellipse(state.stokes)
    # No loss of digits near the circle, where an arcsine would keep only half of them.
    assert found_ellipticity == pytest.approx(ellipticity * deg, abs=1e-15)
    if abs(ellipticity) < 45:
        # The azimuth is the argument of a number of size cos(2 ellipticity).
        assert found_azimuth == pytest.approx(azimuth * deg, abs=2e-16 / math.cos(2 * ellipticity * deg))


def test_the_ellipse_is_that_of_the_polarized_part():
    whole, part = ellipse([1, 0.3, -0.4, 0.5]), ellipse([math.sqrt(0.5), 0.3, -0.4, 0.5])
    assert whole == part
    assert part[1] == pytest.approx(math.asin(0.5 / math.sqrt(0.5)) / 2, abs=1e-15)


def test_dark_places_are_quiet():
    dark = np.zeros((4, 2, 2))
    assert not np.any(ellipse(dark))
    assert not np.any(degree_of_polarization(dark))


def test_handedness_is_positive_for_r():
    assert ellipse(R.stokes)[1] == pytest.approx(45 * deg)
    assert ellipse(H.stokes)[1] == 0
    assert ellipse(D.stokes)[0] == pytest.approx(45 * deg)
