import numpy as np
import pytest

from fastaxis.engines.azimuthal.collins import KERNELS, Collins
from fastaxis.engines.azimuthal.resolving import Settings, resolved
from fastaxis.laws import TravelLaw
from fastaxis.units import mm, nm

WAVELENGTH = 632.8 * nm
K = 2 * np.pi / WAVELENGTH
W = 0.5 * mm
RAYLEIGH = K * W**2 / 2


@pytest.fixture(scope="module")
def bell():
    peak = np.sqrt(2 / np.pi) / W
    return resolved(lambda r: peak * np.exp(-((r / W) ** 2))[np.newaxis], np.linspace(0, 6 * W, 4), Settings())[0]


SECTIONS = {
    "near": TravelLaw.free(0.05 * RAYLEIGH),
    "middle": TravelLaw.free(RAYLEIGH),
    "far": TravelLaw.free(20 * RAYLEIGH),
    "backwards": TravelLaw.free(-0.7 * RAYLEIGH),
    "focus": TravelLaw.free(0.3).then(TravelLaw.lens(1 / 0.3)).then(TravelLaw.free(0.3)),
    "turned": TravelLaw.free(0.2).then(TravelLaw.lens(1 / 0.05)).then(TravelLaw.free(0.25)),
}


@pytest.mark.parametrize("l", [0, 1, -1, 2, -3, 6])
@pytest.mark.parametrize("name", SECTIONS)
def test_spiral_gaussian_in_closed_form(bell, vortex, name, l):
    section = SECTIONS[name]
    span = np.hypot(section.a, section.b / RAYLEIGH) * W
    radii = np.array([0.01, 0.3, 0.7, 1.0, 2.0, 3.5]) * span
    exact = vortex(l, W, section.a, section.b, section.d, radii)
    field = Collins(bell, (l,), K, section, before=0.0, behind=0.0)(radii)[0]
    # 1e3 nodes and phases up to 1e2 rad: some hundred roundings.
    assert abs(field - exact).max() < 1e-13 * abs(exact).max()


def test_reference_fronts_are_lenses_before_and_behind(bell, vortex):
    section, radii = TravelLaw.free(0.4), np.array([0.2, 0.9]) * mm
    exact = vortex(1, W, 1 - 0.4 * 0.8, 0.4, 1.0, radii)
    field = Collins(bell, (1,), K, section, before=-0.8, behind=1.3)(radii)[0]
    assert np.allclose(field * np.exp(1j * K * 1.3 * radii**2 / 2), exact, atol=1e-12 * abs(exact).max())


def test_there_and_back_is_the_identity():
    """A section and its inverse: the inverse of the integral is the integral with -b."""
    ring, _ = resolved(lambda r: (r**2 * np.exp(-(r**2)))[np.newaxis] / W, np.linspace(0, 7, 5), Settings())
    ring = ring.stretched(W)
    there, _ = resolved(
        Collins(ring, (-2,), K, TravelLaw.free(0.7 * RAYLEIGH), before=0.0, behind=0.0),
        np.linspace(0, 8 * W, 9),
        Settings(),
    )
    back = Collins(there, (-2,), K, TravelLaw.free(-0.7 * RAYLEIGH), before=0.0, behind=0.0)
    radii = np.array([0.1, 0.5, 1.0, 2.0]) * W
    # Both profiles are settled to 1e-13.
    assert abs(back(radii) - ring(radii)).max() < 5e-13 * ring.peak


def test_turned_plates_meet_kept_kernels(bell):
    radii = np.linspace(0.1, 1, 7) * W
    one = Collins(bell, (1,), K, TravelLaw.free(0.123), before=0.0, behind=0.0)(radii)
    count = len(KERNELS)
    other = Collins(bell.combined(np.array([[1j]])), (1,), K, TravelLaw.free(0.123), before=0.0, behind=0.0)(radii)
    assert len(KERNELS) == count
    assert np.allclose(other, 1j * one, rtol=1e-14)


def test_a_finer_integral_agrees(bell):
    section = Collins(bell, (1,), K, TravelLaw.free(0.1 * RAYLEIGH), before=0.0, behind=0.0)
    radii = np.linspace(0, 3, 11) * W
    assert abs(section.finer()(radii) - section(radii)).max() < 1e-13 * bell.peak
