"""Parts as matrices, for checks against published ones."""

import numpy as np
import pytest

from fastaxis.elements import HalfWavePlate, Mirror, Polarizer, QuarterWavePlate, Retarder, Rotator
from fastaxis.light import A, D, H, L, R, V, stokes
from fastaxis.maths import NUMBERS
from fastaxis.units import nm

WAVELENGTH = 632.8 * nm
# Products of up to ten 2x2 matrices with entries up to 1: each entry gathers some tens of roundings of 1.1e-16.
ROUNDING = 1e-14


def _jones(part, ways=("front", "back"), phi=0.0, x=0.0, y=0.0):
    out = np.eye(2, dtype=complex)
    for law in part.passages(WAVELENGTH)[ways].laws:
        out = np.array(law.linear(NUMBERS, phi, x, y), dtype=complex) @ out
    return out


def _hwp(angle):
    return _jones(HalfWavePlate(fast=angle))


def _qwp(angle):
    return _jones(QuarterWavePlate(fast=angle))


def _retarder(delta, angle):
    return _jones(Retarder(fast=angle, retardance=delta))


def _polarizer(angle):
    return _jones(Polarizer(axis=angle))


def _rotation(angle):
    return _jones(Rotator(angle=angle))


def _there_and_back(*parts):
    """Round trip through parts to a plain mirror and back, each in the frame of its own beam."""
    out = np.eye(2, dtype=complex)
    for part in parts:
        out = _jones(part) @ out
    out = _jones(Mirror(), ("front", "front")) @ out
    for part in reversed(parts):
        out = _jones(part, ("back", "front")) @ out
    return out


def _mueller(matrix):
    """Mueller matrix in our S3: columns from six states through the Jones matrix."""
    h, v, d, a, r, left = (stokes(matrix @ s.jones) for s in (H, V, D, A, R, L))
    return np.stack([(h + v) / 2, (h - v) / 2, (d - a) / 2, (r - left) / 2], axis=1)


def _share(field, state):
    return abs(np.vdot(state, field)) ** 2


def _close(value, tolerance=ROUNDING):
    return pytest.approx(value, abs=tolerance, rel=0)


@pytest.fixture(scope="session")
def jones():
    return _jones


@pytest.fixture(scope="session")
def hwp():
    return _hwp


@pytest.fixture(scope="session")
def qwp():
    return _qwp


@pytest.fixture(scope="session")
def retarder():
    return _retarder


@pytest.fixture(scope="session")
def polarizer():
    return _polarizer


@pytest.fixture(scope="session")
def rotation():
    return _rotation


@pytest.fixture(scope="session")
def there_and_back():
    return _there_and_back


@pytest.fixture(scope="session")
def mueller():
    return _mueller


@pytest.fixture(scope="session")
def share():
    return _share


@pytest.fixture(scope="session")
def close():
    return _close
