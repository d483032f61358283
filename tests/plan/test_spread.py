import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fastaxis.laws import AxisLaw, Disc, Flip, HalfPlane, ScalarLaw, TravelLaw
from fastaxis.light import Beam, FlatTop, Gaussian, H, LaguerreGauss, PlaneWave, Term
from fastaxis.plan.spread import of_beam

WAVELENGTH = 633e-9


def beam(*modes):
    return Beam(tuple(Term(1, mode, H) for mode in modes))


@given(st.floats(0.1e-3, 2e-3), st.floats(-3, 3), st.floats(0.01, 5), st.integers(0, 3))
def test_free_space_moves_moments_as_the_mode_moves(waist, waist_at, distance, charge):
    mode = LaguerreGauss(1, charge, waist, waist_at=waist_at)
    moved = of_beam(beam(mode), WAVELENGTH).through(TravelLaw.free(distance))
    expected = of_beam(beam(mode.moved(distance)), WAVELENGTH)
    # Rayleigh ranges down to 5 cm: curvature and size cancel by up to (5 m/5 cm)^2 = 1e4 roundings.
    assert moved.size == pytest.approx(expected.size, rel=1e-11)
    assert moved.curvature == pytest.approx(expected.curvature, rel=1e-8, abs=1e-9)
    assert moved.angle == pytest.approx(expected.angle, rel=1e-8)


def test_a_lens_law_bends_as_its_ray_matrix():
    start = of_beam(beam(Gaussian(waist=1e-3, centre=(0.3e-3, 0.0))), WAVELENGTH)
    law, matrix = start.past(ScalarLaw(vergence=2.0), WAVELENGTH), start.through(TravelLaw.lens(2.0))
    assert law.curvature == pytest.approx(matrix.curvature) and law.slope == pytest.approx(matrix.slope)


def test_a_flip_reverses_where_the_beam_is():
    start = of_beam(beam(Gaussian(waist=1e-3, centre=(0.3e-3, 0.1e-3))), WAVELENGTH)
    assert start.past(Flip("x"), WAVELENGTH).offset == (-0.3e-3, 0.1e-3)
    assert start.past(Flip("y"), WAVELENGTH).offset == (0.3e-3, -0.1e-3)


def test_a_wide_stop_changes_nothing_and_a_narrow_one_bounds_the_beam():
    start = of_beam(beam(Gaussian(waist=1e-3)), WAVELENGTH)
    assert start.past(ScalarLaw(stop=Disc(7e-3)), WAVELENGTH) == start
    clipped = start.past(ScalarLaw(stop=Disc(0.5e-3)), WAVELENGTH)
    assert clipped.rough and clipped.size == 0.25e-3


def test_a_plane_wave_is_infinite_until_a_closed_stop():
    start = of_beam(beam(PlaneWave(1e-6)), WAVELENGTH)
    assert start.infinite and start.past(ScalarLaw(stop=HalfPlane(0.0, 1.0, 0.0)), WAVELENGTH).infinite
    assert start.past(ScalarLaw(stop=Disc(1e-3)), WAVELENGTH).size == 0.5e-3
    assert start.through(TravelLaw(1.0, 0.5, -1.0, 0.5)).curvature == -1.0


def test_singular_plates_and_hard_edges_are_rough():
    start = of_beam(beam(Gaussian(waist=1e-3)), WAVELENGTH)
    assert not start.rough
    assert start.past(AxisLaw(order=0.5), WAVELENGTH).rough and start.past(ScalarLaw(charge=2), WAVELENGTH).rough
    assert of_beam(beam(FlatTop(radius=1e-3)), WAVELENGTH).rough


def test_modes_of_one_beam_with_different_curvature_spread_by_the_difference():
    one, two = Gaussian(waist=1e-3), Gaussian(waist=1e-3, waist_at=-1.0)
    both = of_beam(beam(one, two), WAVELENGTH)
    assert both.curvature == pytest.approx(two.curvature(WAVELENGTH))
    assert both.angle > of_beam(beam(two), WAVELENGTH).angle and math.isfinite(both.angle)


def test_a_spiral_phase_spreads_as_a_ring_of_half_the_radius():
    """On a ring of radius w/2 the phase turns by charge/(w/2) a metre; along one axis half of its square counts."""
    start = of_beam(beam(Gaussian(waist=1e-3)), WAVELENGTH)
    after = start.past(ScalarLaw(charge=3), WAVELENGTH)
    added = after.angle**2 - start.angle**2
    assert added == pytest.approx((3 / 0.5e-3 * WAVELENGTH / (2 * math.pi)) ** 2 / 2, rel=1e-9)
    plate = start.past(AxisLaw(order=-1.5), WAVELENGTH)
    assert plate.angle == pytest.approx(after.angle)
