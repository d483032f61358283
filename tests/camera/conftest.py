"""Small exposures with known Stokes images, and a bench whose light is known in closed form."""

from contextlib import nullcontext
from dataclasses import dataclass, field
from types import SimpleNamespace

import numpy as np
import pytest

from fastaxis.camera import SIX_STATES, Exposure
from fastaxis.camera.settings import as_settings
from fastaxis.elements import Camera, Detector
from fastaxis.light.stokes import stokes


@pytest.fixture
def shots():
    """A radial ring with some right-handed light in its centre: all four Stokes images differ everywhere."""
    x, y = np.arange(-6, 7) * 1e-5, np.arange(-5, 6) * 1e-5
    X, Y = np.meshgrid(x / 4e-5, y / 4e-5)
    envelope = np.exp(-(X**2) - Y**2)
    field = np.stack([(X + 0.3) * envelope, (Y - 0.3j) * envelope])
    return Exposure(
        stokes=stokes(field) * 1e-6,
        settings=as_settings(SIX_STATES),
        x=x,
        y=y,
        pixel=1e-5,
        wavelength=633e-9,
        name="Cinder Lane",
        target="cam",
        plan="closed form",
    )


@dataclass
class Beam:
    """Light of uniform polarization whose irradiance rises along x and y, so that every flip shows."""

    vector: tuple = (2.0, 1.0, 0.5, -1.0)
    guard: object = None

    def stokes_on(self, raster):
        picture = 1.0 + 1e5 * raster.x + 1e6 * raster.y[:, None]
        return np.array(self.vector)[:, None, None] * picture

    @property
    def power(self):
        return self.vector[0]

    @property
    def total_stokes(self):
        return np.array(self.vector)


@dataclass
class Plan:
    wavelength: float = 633e-9
    joined = False
    source: object = field(default_factory=lambda: SimpleNamespace(power=8.0))

    def __str__(self):
        return "a plan"


@dataclass
class Bench:
    elements: dict
    name: str = "Low Quay"
    cameras: tuple = ("cam",)

    def open_ports(self):
        return []


@pytest.fixture
def bench():
    return Bench({"cam": Camera(pixel=1e-6, shape=(2, 3), name="cam"), "bucket": Detector(name="bucket")})


@pytest.fixture
def light(monkeypatch):
    """Puts given fields in the place of the plan and the engines; returns the list they stand in."""
    fields = [Beam()]
    parts = {
        "make_plan": lambda *_args, **_keys: Plan(),
        "large_arrays_once": nullcontext,
        "remembered": lambda *_args, **_keys: None,
        "propagate": lambda _plan: tuple(fields),
    }
    monkeypatch.setattr("fastaxis.camera.exposing.late", lambda _module, name: parts[name])
    return fields
