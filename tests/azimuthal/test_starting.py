import numpy as np
import pytest

from fastaxis.elements import Aperture, FreeSpace, HalfWavePlate, Lens
from fastaxis.light import Beam, D, FlatTop, Gaussian, HermiteGauss, L, LaguerreGauss, PlaneWave, R, Term, elliptical
from fastaxis.units import mm, nm

WAVELENGTH = 632.8 * nm
X, Y = np.linspace(-1, 1, 9) * mm, np.linspace(-0.8, 1.1, 8) * mm


@pytest.mark.parametrize(
    "mode",
    [
        Gaussian(waist=0.5 * mm, waist_at=-0.8),
        LaguerreGauss(2, -3, 0.4 * mm),
        HermiteGauss(3, 2, 0.4 * mm),
        HermiteGauss(0, 1, 0.3 * mm, waist_at=1.0),
        FlatTop(radius=0.7 * mm),
        FlatTop(radius=0.7 * mm, order=8),
    ],
)
def test_modes_are_what_they_are(arrive, mode):
    state = elliptical(0.3, 0.2)
    field = arrive(mode, state=state, power=0.5)
    expected = np.sqrt(0.5) * np.multiply.outer(state.jones, mode.amplitude(X, Y[:, np.newaxis], WAVELENGTH))
    # Panels and table are settled to 2e-13 of the peak.
    assert abs(field.at(X, Y) - expected).max() < 1e-12 * abs(expected).max()
    assert field.power == pytest.approx(0.5, rel=1e-12)


def test_a_coherent_sum_keeps_its_phases(arrive):
    beam = Beam(
        (Term(1, LaguerreGauss(0, -1, 0.5 * mm), L), Term(0.6j, LaguerreGauss(1, 2, 0.4 * mm, waist_at=0.5), R))
    )
    field = arrive(None, beam=beam, power=1.0)
    expected = beam.field(X, Y[:, np.newaxis], WAVELENGTH)
    assert abs(field.at(X, Y) - expected).max() < 1e-12 * abs(expected).max()


def test_a_hard_edge_beside_a_soft_beam(arrive):
    beam = Beam((Term(1, FlatTop(radius=0.4 * mm), L), Term(1, Gaussian(waist=0.5 * mm), D)))
    expected = beam.field(X, Y[:, np.newaxis], WAVELENGTH)
    assert abs(arrive(None, beam=beam).at(X, Y) - expected).max() < 1e-12 * abs(expected).max()


def test_a_plane_wave_begins_at_its_first_hole(arrive):
    """Behind a lens it is a sphere, (1/a) exp(-i k r^2/2(f - z)) with a = 1 - z/f."""
    parts = [HalfWavePlate(fast=0.4), Lens(focal=0.5), FreeSpace(0.2), Aperture(radius=0.6 * mm)]
    field = arrive(PlaneWave(area=1 * mm**2), *parts, power=0.3)
    radii = np.hypot(X, Y[:, np.newaxis])
    bend = np.exp(-1j * np.pi / WAVELENGTH * radii**2 / 0.3) / 0.6
    expected = np.sqrt(0.3) / mm * bend * (radii < 0.6 * mm)
    total = np.sqrt((abs(field.at(X, Y)) ** 2).sum(axis=0))
    assert abs(total - abs(expected)).max() < 1e-12 * abs(expected).max()
    assert np.allclose(field.at(X, Y)[0], np.cos(0.8) * -1j * expected, atol=1e-11 * abs(expected).max())
    assert field.power == pytest.approx(0.3 * np.pi * 0.36 / 0.36, rel=1e-12)
