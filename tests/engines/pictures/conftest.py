"""Questions asked again, and what counts the readings of pixels."""

import warnings

import pytest

import fastaxis as fa
from fastaxis.camera.exposure import DUST
from fastaxis.engines.azimuthal.plane import AzimuthalField
from fastaxis.engines.grid import FarField, GridField
from fastaxis.engines.joined import JoinedField
from fastaxis.engines.memory import UP_TO, forget_light
from fastaxis.units import deg, mm, nm, um

GRID = fa.Grid(samples=64, window=6 * mm)
CENTRE = (0.1 * mm, -0.2 * mm)


@pytest.fixture(autouse=True)
def all_room():
    yield
    fa.remember_light(up_to=UP_TO)


def _asked(train, camera="cam", grid=GRID, **options):
    """The exposure, and whether there was a warning."""
    with warnings.catch_warnings(record=True) as told:
        warnings.simplefilter("always")
        shots = train.expose(camera, [fa.H], grid=grid, **options)
    return shots, any(issubclass(one.category, fa.SamplingWarning) for one in told)


def _assert_alike(known, fresh, tolerance=1e-13):
    """Beside the answer of an empty memory: some dozen roundings of each pixel, 16 times as large where light was lost."""
    (known, told), (fresh, warned) = known, fresh
    assert told == warned
    if fresh.total_power < DUST * fresh.sent:
        assert known.total_power < DUST * fresh.sent
        return
    assert known.stokes.dtype == fresh.stokes.dtype
    assert abs(known.stokes - fresh.stokes).max() <= tolerance * fresh.stokes[0].max()
    assert known.arrived == pytest.approx(fresh.arrived, rel=tolerance)


def _assert_fresh(trains, **options):
    """Answers one after the other beside those of an empty memory."""
    forget_light()
    known = [_asked(train, **options) for train in trains]
    fa.remember_light(up_to=0)
    try:
        fresh = [_asked(train, **options) for train in trains]
    finally:
        fa.remember_light(up_to=UP_TO)
    for one, other in zip(known, fresh, strict=True):
        _assert_alike(one, other)


@pytest.fixture
def read(monkeypatch):
    """Counts the readings of pixels."""
    done = []
    for kind in (GridField, FarField, AzimuthalField, JoinedField):
        monkeypatch.setattr(
            kind, "stokes_on", lambda field, raster, own=kind.stokes_on: done.append(field) or own(field, raster)
        )
    return done


def _bench(*parts, centre=CENTRE, **laser):
    return fa.Train(wavelength=633 * nm, name="Gannet Stack").along(
        fa.Laser(waist=0.6 * mm, name="laser", **{"state": fa.D, **laser}),
        fa.QPlate(q=0.5, centre=centre, name="first"),
        fa.FreeSpace(0.2, name="arm"),
        *parts,
        fa.HalfWavePlate(fast=10 * deg, name="late"),
        fa.FreeSpace(0.1, name="leg"),
        fa.Camera(pixel=100 * um, shape=(24, 20), name="cam"),
    )


@pytest.fixture(scope="session")
def asked():
    return _asked


@pytest.fixture(scope="session")
def assert_fresh():
    return _assert_fresh


@pytest.fixture(scope="session")
def assert_alike():
    return _assert_alike


@pytest.fixture(scope="session")
def bench():
    return _bench
