import numpy as np
import pytest

from fastaxis.engines.azimuthal import travelling
from fastaxis.engines.azimuthal.harmonics import LEFT, Harmonics
from fastaxis.engines.azimuthal.panels import sampled
from fastaxis.engines.azimuthal.resolving import Settings
from fastaxis.engines.azimuthal.travelling import arrived, images
from fastaxis.engines.memory import forget_light
from fastaxis.laws import TravelLaw
from fastaxis.units import mm, nm

WAVELENGTH = 632.8 * nm
K = 2 * np.pi / WAVELENGTH
W = 0.5 * mm
RAYLEIGH = K * W**2 / 2
SETTINGS = Settings()
RELAY = (
    TravelLaw.free(0.3)
    .then(TravelLaw.lens(1 / 0.3))
    .then(TravelLaw.free(0.3 + 0.2))
    .then(TravelLaw.lens(1 / 0.2))
    .then(TravelLaw.free(0.2))
)


@pytest.fixture
def vortex_light():
    profile = sampled(lambda r: np.exp(-((r / W) ** 2))[np.newaxis], np.linspace(0, 6 * W, 4))
    return Harmonics(orders=((LEFT, 1),), profile=profile, curvature=0.0, wavenumber=K)


def test_a_relay_is_an_image_though_it_closes_to_a_rounding(vortex_light):
    relay = TravelLaw(RELAY.a, 1e-17, RELAY.c, RELAY.d)
    for section in (RELAY, relay):
        waiting = vortex_light.through(section)
        assert images(waiting)
        image = arrived(waiting, SETTINGS)
        r = np.array([0.2, 0.7]) * W
        # Magnified by -2/3: the picture is turned by half a turn, exp(i pi l) = -1, and 1/a is negative too.
        assert np.allclose(image.profile(r)[0], 1.5 * np.exp(-((1.5 * r / W) ** 2)), atol=1e-12)
        assert image.error == 0


def test_a_micrometre_is_not_an_image(vortex_light):
    assert not images(vortex_light.through(TravelLaw.free(1e-6)))


@pytest.mark.parametrize("distance", [0.01, 0.3, 1, 5])
def test_power_is_what_arrives_and_what_lies_beyond(vortex_light, distance):
    there = arrived(vortex_light.through(TravelLaw.free(distance * RAYLEIGH)), SETTINGS)
    assert there.taper is not None
    assert there.power == pytest.approx(vortex_light.power, rel=1e-13)
    # The tail of charge 1 is z w^2 / (2 z_R r^2) of the peak: beyond six waists, a thousandth of the power or less.
    assert 0 < there.beyond[0] < 1e-3 * there.power


def test_a_smooth_field_arrives_whole():
    profile = sampled(lambda r: (r / W * np.exp(-((r / W) ** 2)))[np.newaxis], np.linspace(0, 6 * W, 4))
    ring = Harmonics(orders=((LEFT, 1),), profile=profile, curvature=0.0, wavenumber=K)
    there = arrived(ring.through(TravelLaw.free(RAYLEIGH)), SETTINGS)
    assert there.taper is None
    assert there.beyond == (0.0, 0.0)
    assert sum(there.powers) == pytest.approx(ring.power, rel=1e-13)
    # The front of a Gaussian beam at its Rayleigh range is 1/(2 z_R).
    assert there.curvature == pytest.approx(0.5 / RAYLEIGH, rel=0.5)


def test_behind_a_hole_only_the_hole_is_filled(vortex_light):
    there = arrived(vortex_light.through(TravelLaw.free(RAYLEIGH)), SETTINGS, start=0.1 * mm, end=0.4 * mm)
    assert (there.profile.start, there.profile.end) == pytest.approx((0.1 * mm, 0.4 * mm))


def test_far_out_the_tail_is_followed_on_its_own_front(vortex_light, vortex):
    """At 0.1 of the Rayleigh range the beam's front and the wave from the axis part by 660 rad within eight waists."""
    distance = 0.1 * RAYLEIGH
    there = arrived(vortex_light.through(TravelLaw.free(distance)), SETTINGS, end=8 * W)
    assert there.curvature == pytest.approx(1 / distance, rel=1e-12)
    # On the front of the beam it takes four times as many.
    assert len(there.profile.nodes) <= 900
    radii = np.array([0.3, 1.0, 3.0, 7.5]) * W
    unit = np.sqrt(2 / np.pi) / W  # of unit power, where the light here peaks at 1
    exact = vortex(1, W, 1.0, distance, 1.0, radii) / unit
    ours = there.profile(radii)[0] * np.exp(0.5j * K * there.curvature * radii**2)
    assert abs(ours - exact).max() < 1e-12 * abs(exact).max()


def test_near_the_axis_the_front_is_that_of_the_beam(vortex_light):
    near = arrived(vortex_light.through(TravelLaw.free(0.1 * RAYLEIGH)), SETTINGS, end=2 * W)
    assert 0 < near.curvature < 0.2 / (0.1 * RAYLEIGH)


def test_light_without_a_tail_keeps_its_front_far_out():
    profile = sampled(lambda r: (r / W * np.exp(-((r / W) ** 2)))[np.newaxis], np.linspace(0, 6 * W, 4))
    ring = Harmonics(orders=((LEFT, 1),), profile=profile, curvature=0.0, wavenumber=K)
    there = arrived(ring.through(TravelLaw.free(0.1 * RAYLEIGH)), SETTINGS, end=10 * W)
    assert 0 < there.curvature < 0.2 / (0.1 * RAYLEIGH)


@pytest.mark.parametrize("reach", [0.5, 2, 4, 8, 30])
def test_panels_are_foreseen_and_few_have_to_be_halved(vortex_light, reach, monkeypatch):
    forget_light()
    asked = []
    first = travelling.resolved
    monkeypatch.setattr(
        travelling, "resolved", lambda f, edges, settings: asked.append(len(edges) - 1) or first(f, edges, settings)
    )
    there = arrived(vortex_light.through(TravelLaw.free(0.1 * RAYLEIGH)), SETTINGS, end=reach * W)
    found = len(there.profile.edges) - 1
    assert there.profile.edges[0] == 0
    assert there.profile.edges[-1] == reach * W
    assert found <= asked[0] * 1.6 + 1
    assert there.error < 1e-11
