"""Pixels about the axis where the light has a core: behind a q-plate its polarization depends on the side of the axis.

A function of radius and angle that jumps on the axis is smooth along any ray from it. So a pixel is cut into triangles
with a corner on the axis, one for each side of it, and each is integrated along rays (Duffy, SIAM J. Numer. Anal. 19,
1260, 1982).
"""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from fastaxis.engines.azimuthal.panels import Complexes, Reals
from fastaxis.light import Raster
from fastaxis.light.gauss import gauss_legendre

__all__ = ["FREE", "core_means", "near_axis", "near_places"]

NEAR = 1.4  # pixels from the axis to a middle; those beyond are nearly a pixel away, and polynomials again
FREE = NEAR - 0.5
CLOSEST = 1e-13  # of a pixel or two: a line this close to the axis has no triangles to speak of
FEWEST, MOST = 16, 128  # nodes along a ray, and on either half of a side
Images = Callable[[Complexes], Reals]
"""Places x + i y [m], shape (places,), to pictures (images, places)."""


def near_axis(raster: Raster) -> tuple[slice, slice] | None:
    """Rows and columns of the pixels about the axis; None where it passes the camera by."""
    rows, columns = (near_places(side, raster.pitch) for side in (raster.y, raster.x))
    return (rows, columns) if rows and columns else None


def near_places(places: Reals, pitch: float) -> slice | None:
    """Which of some pixel centres [m] along a side are near the axis."""
    near = np.flatnonzero(abs(places) < NEAR * pitch)
    return slice(int(near[0]), int(near[-1]) + 1) if len(near) else None


def core_means(images: Images, x: Reals, y: Reals, pitch: float, settled: float) -> Reals | None:
    """Means over pixels in columns x and rows y [m] near the axis, shape (images, ny, nx).

    Nodes are doubled until no mean changes by ``settled``; None if that never comes.
    """
    count, before = FEWEST, _means(images, x, y, pitch, FEWEST)
    while count < MOST:
        count *= 2
        means = _means(images, x, y, pitch, count)
        if abs(means - before).max() <= settled:
            return means
        before = means
    return None


def _means(images: Images, x: Reals, y: Reals, pitch: float, count: int) -> Reals:
    """Counter-clockwise about each pixel: triangles on its far sides, less those on its near sides."""
    columns, rows = (np.append(side - pitch / 2, side[-1] + pitch / 2) for side in (x, y))
    standing = np.stack([_triangles(images, 1, place, rows, count) for place in columns], axis=2)
    lying = np.stack([_triangles(images, 1j, place, columns, count) for place in rows], axis=1)
    return np.asarray((np.diff(standing, axis=2) + np.diff(lying, axis=1)) / pitch**2)


def _triangles(images: Images, normal: complex, h: float, corners: Reals, count: int) -> Reals:
    """Integrals over the triangles between the axis and each stretch from corner to corner of a line.

    With s along the line, h its distance and u along the ray that is h ds u du. In s = h sinh(t) a line that
    passes close to the axis turns about it slowly.

    Parameters
    ----------
    normal : 1 for a line across x, 1j for one across y.
    """
    if abs(h) <= CLOSEST * float(np.ptp(corners)):
        return np.zeros((len(images(np.zeros(1, dtype=complex))), len(corners) - 1))
    ends = np.arcsinh(corners / abs(h))
    foot = np.clip(0.0, ends[:-1], ends[1:])
    starts, spans = np.stack([ends[:-1], foot]), np.stack([foot - ends[:-1], ends[1:] - foot])
    nodes, weights = gauss_legendre(count)
    u: Reals = (1 + nodes) / 2
    t = starts[..., np.newaxis] + spans[..., np.newaxis] * u
    # 1j * 1 runs along y, and 1j * -1j along x.
    line = h * normal + abs(h) * np.sinh(t) * (1j * normal.conjugate())
    places: Complexes = np.multiply(line[..., np.newaxis], u, dtype=np.complex128)
    along_rays = np.einsum("...n,n", images(places.reshape(-1)).reshape(-1, *places.shape), u * weights / 2)
    steps = h * abs(h) * np.cosh(t) * spans[..., np.newaxis] * weights / 2
    return np.asarray((along_rays * steps).sum(axis=(1, 3)))
