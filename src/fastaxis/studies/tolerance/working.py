"""The light of many draws, and the figures of merit read off it: as sums, or propagated anew for each draw."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, field, replace
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.mixing import mixed
from fastaxis.errors import ParameterError
from fastaxis.studies.tolerance.reading import Reading, light_at

__all__ = ["Anew", "Summed", "Work"]

Reals: TypeAlias = NDArray[np.float64]
Rows: TypeAlias = slice | NDArray[np.intp]

BLOCK = 32 << 20  # bytes of frames made in one product


@dataclass(frozen=True, eq=False)
class Summed:
    """Draws whose light is a sum of a few pictures.

    Parameters
    ----------
    reading : what is read.
    images : (4, chosen, pixels), in front of the last uniform parts; with a basis, their shares of it.
    shares : (draws, steps, chosen).
    last : (draws, steps, 4, 4) Mueller matrices of the last uniform parts.
    basis : (r, pixels) pictures that the images are sums of.
    shape, x, y : of a picture, and its axes [m].
    """

    reading: Reading
    images: Reals = field(repr=False)
    shares: Reals = field(repr=False)
    last: Reals = field(repr=False)
    basis: Reals | None = field(default=None, repr=False)
    shape: tuple[int, ...] = ()
    x: Any = None
    y: Any = None

    def rows(self, rows: Rows) -> Summed:
        """Some of the draws."""
        return replace(self, shares=self.shares[rows], last=self.last[rows])

    def only(self, kept: Sequence[bool]) -> Summed:
        """Some of the figures of merit."""
        return replace(self, reading=self.reading.only(kept))

    def stokes(self) -> Reals:
        """Powers of all light (draws, steps, 4) [W]."""
        before = self.shares @ self.images.sum(axis=2).T
        return np.asarray((self.last @ before[..., None])[..., 0])

    def values(self) -> Reals:
        """The figures of merit of each draw, (draws, merits)."""
        merits = self.reading.merits
        if self.reading.kind == "powers":
            stokes = self.stokes()
            return np.stack([merit.values(stokes) for merit in merits], axis=1)
        out = np.empty((len(self.shares), len(merits)))
        for weights in {merit.weights.tobytes(): merit.weights for merit in merits}.values():
            same = [place for place, merit in enumerate(merits) if np.array_equal(merit.weights, weights)]
            for draw, frame in enumerate(self._frames(weights)):
                out[draw, same] = [merits[place].value(frame, self.x, self.y) for place in same]
        return out

    def _frames(self, weights: Reals) -> Iterator[Reals]:
        """The frame of each draw behind an analyzer of these weights."""
        flat = self.images.reshape(-1, self.images.shape[2])
        pixels = flat if self.basis is None else self.basis
        block = max(1, BLOCK // (8 * max(pixels.shape[1], len(flat))))
        for start in range(0, len(self.shares), block):
            part = slice(start, start + block)
            behind = np.einsum("i,vij->vj", weights, self.last[part, 0])
            mixture = np.einsum("vk,vc->vkc", behind, self.shares[part, 0]).reshape(-1, len(flat))
            frames = mixed(mixture if self.basis is None else mixture @ flat, pixels)
            yield from frames.reshape(-1, *self.shape)


@dataclass(frozen=True, eq=False)
class Anew:
    """Draws whose light is propagated one by one.

    Parameters
    ----------
    reading : what is read.
    train : as declared.
    changes : the values of each draw.
    options : grid and engine.
    """

    reading: Reading
    train: Any
    changes: tuple[dict[str, float], ...] = field(repr=False)
    options: dict[str, Any] = field(default_factory=dict)

    def rows(self, rows: Rows) -> Anew:
        """Some of the draws."""
        some = self.changes[rows] if isinstance(rows, slice) else tuple(self.changes[row] for row in rows.tolist())
        return replace(self, changes=some)

    def only(self, kept: Sequence[bool]) -> Anew:
        """Some of the figures of merit."""
        return replace(self, reading=self.reading.only(kept))

    def values(self) -> Reals:
        """The figures of merit of each draw, (draws, merits)."""
        return np.array([self._values(change) for change in self.changes]).reshape(-1, len(self.reading.merits))

    def _values(self, change: dict[str, float]) -> list[float]:
        train, reading = self.train.with_changes(change), self.reading
        if reading.kind == "train":
            return [_as_number(merit, merit(train)) for merit in reading.merits]
        turned = _turned(train, reading, change)
        looks = [light_at(one, reading.target, reading.kind, self.options) for one in turned]
        if reading.kind == "powers":
            stokes = np.array([one.sum(axis=(1, 2)) for one, _, _ in looks])
            return [float(merit.values(stokes)) for merit in reading.merits]
        stokes, x, y = looks[0]
        return [merit.value(np.tensordot(merit.weights, stokes, axes=1), x, y) for merit in reading.merits]


Work: TypeAlias = Summed | Anew


def _as_number(merit: Any, value: Any) -> float:
    try:
        return float(value)
    except (TypeError, ValueError):
        raise ParameterError(
            "a figure of merit that is a function of a train gives a number",
            got=f"tolerance: {getattr(merit, '__name__', type(merit).__name__)} gave {value!r}",
            fix='lambda train: train.power("cam")',
        ) from None


def _turned(train: Any, reading: Reading, change: dict[str, float]) -> Iterator[Any]:
    """The train at each step of a knob."""
    if not reading.knob:
        yield train
        return
    part, _, parameter = reading.knob.partition(".")
    declared = change.get(reading.knob, train.elements[part].parameters()[parameter])
    for step in reading.steps:
        yield train.with_changes({reading.knob: declared + step})
