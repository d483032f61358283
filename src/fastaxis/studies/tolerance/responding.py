"""The light as a polynomial in the parameters that move more than polarization, exact in all others."""

from __future__ import annotations

from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray
from scipy.linalg import qr

from fastaxis.studies.spanning import products
from fastaxis.studies.tolerance.box import Box
from fastaxis.studies.tolerance.causes import Causes
from fastaxis.studies.tolerance.chain import Chain, make_chain
from fastaxis.studies.tolerance.polynomials import Index, Polynomials
from fastaxis.studies.tolerance.preparing import Pictures, fewer, rows_of
from fastaxis.studies.tolerance.reading import Reading
from fastaxis.studies.tolerance.working import Summed

__all__ = ["Responding", "stiff_names"]

Reals: TypeAlias = NDArray[np.float64]

FINE = 1e-9  # of a picture may be left out of the few that all are sums of
BYTES = 1 << 30  # of pictures, and of the shares of them


def stiff_names(train: Any, causes: Causes, offsets: Reals, target: str) -> tuple[str, ...]:
    """Parameters that move more than polarization; all of them where light comes by several paths."""
    values = offsets + np.array(list(causes.nominal.values()))
    tried = [column[[0, int(column.argmin()), int(column.argmax())], None] for column in values.T]
    return tuple(
        name for name, some in zip(causes.names, tried, strict=True) if make_chain(train, target, (name,), some) is None
    )


class Responding:
    """A polynomial in some parameters with pictures as its coefficients, built point by point.

    At each point the few pictures are propagated that the light is summed of at any value of the other parameters.

    Parameters
    ----------
    train, causes, offsets : as in a study.
    reading : what is read.
    stiff : parameters of the polynomial.
    options : grid and engine.
    """

    def __init__(
        self,
        train: Any,
        causes: Causes,
        offsets: Reals,
        reading: Reading,
        *,
        stiff: tuple[str, ...],
        options: dict[str, Any],
    ) -> None:
        columns = [causes.names.index(name) for name in stiff]
        self._middle = {name: causes.nominal[name] for name in stiff}
        self._box = Box(offsets[:, columns])
        self._places = self._box.places(offsets[:, columns])
        self.pictures = _pictures(train, causes, offsets, reading, stiff=stiff, options=options)
        self.polynomials = Polynomials(self._box.numbers)
        self._surplus: list[Reals] = []
        self._basis: Reals | None = None
        self._frame: tuple[Any, Any, Any] | None = None

    @property
    def distances(self) -> Reals:
        """How far each draw is from the middle."""
        return np.asarray(np.sqrt((self._places**2).sum(axis=1)))

    def _changes(self, index: Index) -> dict[str, float]:
        moved = self._box.offsets(self.polynomials.point(index)).tolist()
        return {name: value + off for (name, value), off in zip(self._middle.items(), moved, strict=True)}

    @property
    def cost(self) -> int:
        """Propagations a point."""
        return self.pictures.count(self._changes(self.polynomials.start[0]))

    def take(self, index: Index) -> bool:
        """Add a point; False if its pictures are of other places than the first ones, or too many."""
        images, x, y = self.pictures.taken(self._changes(index))
        if self._frame is None:
            self._frame = images.shape[2:], x, y
        if not _same(self._frame, (images.shape[2:], x, y)):
            return False
        found = self._compressed(images.reshape(*images.shape[:2], -1))
        if self._surplus:
            here = self.polynomials.values(self.polynomials.point(index)[None])[0]
            found = found - np.tensordot(here, self._padded(found.shape[2]), axes=1)
        self._surplus.append(found)
        self.polynomials.take(index, float(np.linalg.norm(found)))
        shares = len(self._places) * len(self.pictures.reading.steps) * self.pictures.pictures.rank * len(self._surplus)
        return 8 * max(shares, 0 if self._basis is None else self._basis.size) <= BYTES

    def _compressed(self, images: Reals) -> Reals:
        """Images (4, pictures, pixels) as sums of a few orthogonal ones, (4, pictures, r)."""
        if images.shape[2] == 1:
            return images
        flat = images.reshape(-1, images.shape[2])
        basis = np.zeros((0, flat.shape[1])) if self._basis is None else self._basis
        rest = flat - (flat @ basis.T) @ basis
        directions, sizes, _ = qr(rest.T, mode="economic", pivoting=True)
        fresh = directions.T[np.abs(np.diagonal(sizes)) > FINE * float(np.linalg.norm(flat))]
        self._basis = np.concatenate([basis, fresh])
        return np.asarray((flat @ self._basis.T).reshape(*images.shape[:2], -1))

    def _padded(self, most: int) -> Reals:
        """Surpluses (points, 4, pictures, r), earlier ones without what came later into the basis."""
        return np.stack([np.pad(one, ((0, 0), (0, 0), (0, most - one.shape[2]))) for one in self._surplus])

    def summed(self) -> Summed:
        """All draws, read off the polynomial as it is."""
        assert self._frame is not None
        terms = self.polynomials.values(self._places)
        pictures, steps = self.pictures, len(self.pictures.reading.steps)
        shares = products(pictures.pictures.coefficients, np.repeat(terms, steps, axis=0))
        images = np.moveaxis(self._padded(self._surplus[-1].shape[2]), 0, 2)
        flat = images.reshape(4, -1, images.shape[3])
        return Summed(pictures.reading, flat, pictures.by_draw(shares), pictures.last, self._basis, *self._frame)


def _pictures(
    train: Any, causes: Causes, offsets: Reals, reading: Reading, *, stiff: tuple[str, ...], options: dict[str, Any]
) -> Pictures:
    """The pictures that other parameters take; one alone where light comes by several paths or in several colours."""
    linear = [k for k, name in enumerate(causes.names) if name not in stiff]
    others = Causes((), {name: value for name, value in causes.nominal.items() if name not in stiff})
    few = fewer(train, others, offsets[:, linear], reading, options)
    rows = rows_of(train, others, offsets[:, linear], few)
    colours = None
    if "wavelength" in stiff:
        own = offsets[:, causes.names.index("wavelength")] + causes.nominal["wavelength"]
        colours = np.repeat(own, len(few.steps))
    chain = make_chain(train, few.target, rows.names, rows.values, colours)
    if chain is None:
        chain = Chain(np.ones((len(rows.values), 1), dtype=complex), np.eye(2, dtype=complex)[None], ())
    return Pictures(train, few, rows, chain, options)


def _same(one: tuple[Any, Any, Any], other: tuple[Any, Any, Any]) -> bool:
    """Whether pictures have the same columns and rows."""
    return one[0] == other[0] and all(
        (a is None and b is None) or np.array_equal(a, b) for a, b in zip(one[1:], other[1:], strict=True)
    )
