import numpy as np
import pytest

from fastaxis.elements import Aperture, FreeSpace, HalfWavePlate, Lens, Polarizer, QPlate, QuarterWavePlate
from fastaxis.engines.azimuthal import combined
from fastaxis.errors import ParameterError
from fastaxis.light import Gaussian, H, Raster, elliptical, stokes
from fastaxis.units import mm, um

W = 0.5 * mm
X, Y = np.linspace(-0.7, 0.8, 9) * mm, np.linspace(-0.6, 0.5, 7) * mm
NUMBERS = np.array([0.7 - 0.2j, 0.4 + 0.9j])

TRAINS = {
    "angles": [[QuarterWavePlate(fast=a), QPlate(q=0.5, retardance=2.0), FreeSpace(0.4)] for a in (0.1, 0.8)],
    "a harmonic dark in one": [
        [HalfWavePlate(fast=a), QPlate(q=1), FreeSpace(0.3), Polarizer(axis=a)] for a in (0, 0.4)
    ],
    "different light": [[Aperture(radius=a), FreeSpace(0.2)] for a in (0.3 * mm, 0.5 * mm)],
    "cut and not": [[*parts, FreeSpace(0.5), QPlate(q=0.5), FreeSpace(0.2)] for parts in ([QPlate(q=0.5)], [])],
    "in focus": [[QPlate(q=q), Lens(focal=0.3), FreeSpace(0.3)] for q in (0.5, -1)],
}


@pytest.mark.parametrize("name", TRAINS)
def test_the_sum_is_the_sum(arrive, name):
    state = elliptical(0.1, 0.3)
    fields = [arrive(Gaussian(waist=W), *parts, state=state) for parts in TRAINS[name]]
    total = combined(fields, NUMBERS)
    expected = sum(number * field.at(X, Y) for number, field in zip(NUMBERS, fields, strict=True))
    # Each is known to 1e-12 of its peak, by its own estimate.
    assert max(field.error(1.2 * mm) for field in fields) < 1e-11
    assert abs(total.at(X, Y) - expected).max() < 1e-11 * abs(expected).max()
    raster = Raster(100 * um, (7, 6), (30 * um, 0.0))
    n, w = np.polynomial.legendre.leggauss(10)
    x, y = ((c[:, np.newaxis] + n * raster.pitch / 2).ravel() for c in (raster.x, raster.y))
    fine = stokes(sum(c * field.at(x, y) for c, field in zip(NUMBERS, fields, strict=True))).reshape(4, 7, 10, 6, 10)
    images = np.einsum("siajb,a,b->sij", fine, w, w) * raster.pitch**2 / 4
    assert abs(total.stokes_on(raster) - images).max() < 2e-11 * images[0].max()


def test_the_estimate_counts_the_errors_of_all(arrive):
    fields = [arrive(Gaussian(waist=W), *parts) for parts in TRAINS["cut and not"]]
    total = combined(fields, NUMBERS)
    weighed = [abs(c) * f.harmonics.error * f.harmonics.profile.peak for c, f in zip(NUMBERS, fields, strict=True)]
    assert total.harmonics.error * total.harmonics.profile.peak >= sum(weighed)


def test_the_power_of_a_sum_interferes(arrive):
    fields = [arrive(Gaussian(waist=W), *parts, state=H) for parts in TRAINS["angles"]]
    total = combined(fields, np.array([1, -1]))
    assert combined([fields[0], fields[0]], np.array([0.5, 0.5])).power == pytest.approx(fields[0].power, rel=1e-13)

    # The q-plate and the space keep the power of what two quarter-wave plates make of H: projectors P on their axes,
    # difference (1 - i)(P_1 - P_2) H, of which |(P_1 - P_2) H|^2 = sin^2 of the angle between the axes.
    assert total.power == pytest.approx(2 * np.sin(0.7) ** 2, rel=1e-13)


def test_other_sections_are_refused(arrive):
    fields = [arrive(Gaussian(waist=W), QPlate(q=0.5), FreeSpace(z)) for z in (0.1, 0.2)]
    with pytest.raises(ParameterError, match="same way still to go"):
        combined(fields, NUMBERS)
