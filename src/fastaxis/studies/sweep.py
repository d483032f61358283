"""Sweeps: pictures for many values of some parameters, from few propagations."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from typing import Any, TypeAlias

import numpy as np

from fastaxis.camera.exposing import sensor_at
from fastaxis.camera.exposure import Exposure
from fastaxis.camera.mixing import mixed
from fastaxis.camera.settings import Setting, as_settings, weight_matrix
from fastaxis.conventions import stamp
from fastaxis.light.states import State
from fastaxis.studies.asking import place_of, setting_of
from fastaxis.studies.gallery import Gallery, Indices, Progress, Reals
from fastaxis.studies.knobs import read_knobs

__all__ = ["Sweep", "sweep"]

Which: TypeAlias = int | float | Mapping[str, Any]
Asked: TypeAlias = int | str | Setting | State

CHUNK = 16 << 20  # bytes of frames made in one product


def sweep(
    train: Any,
    values: Mapping[str, Any],
    target: str,
    settings: Setting | State | Iterable[Setting | State],
    *,
    zipped: bool = False,
    grid: Any = None,
    engine: str = "auto",
    progress: Progress | None = None,
) -> Sweep:
    """Frames for every value of some parameters and every setting.

    Parameters
    ----------
    train : the bench.
    values : {"hwp.fast": angles, "space.distance": [0.1, 0.2], ...}, in SI units as in ``train.with_changes``.
    target : name of a camera or detector.
    settings : states that pass, or analyzers.
    zipped : change the parameters together, one value of each at a time; else take every combination, the last
        parameter running fastest.
    grid, engine : as in ``train.expose``.
    progress : called as progress(done, expected) after each propagation.

    Raises
    ------
    ParameterError : an unknown parameter, no values, zipped lists of different lengths, a target without pictures.
    SymbolError : a letter among the values, in a setting or in the train.

    Examples
    --------
    >>> import fastaxis as fa
    >>> from fastaxis.units import deg, mm, mW, nm
    >>> train = fa.Train(wavelength=633*nm)
    >>> _ = train.along(fa.Laser(waist=1*mm, power=4*mW, state=fa.H), fa.HalfWavePlate(fast=0*deg, name="hwp"),
    ...                 fa.Detector(name="bucket"))
    >>> turned = sweep(train, {"hwp.fast": [0*deg, 15*deg, 22.5*deg]}, "bucket", [fa.H, fa.V])
    >>> (turned.powers / mW).round(9) + 0.
    array([[4., 0.],
           [3., 1.],
           [2., 2.]])
    """
    knobs = read_knobs(values, zipped=zipped)
    analyzers = as_settings(settings)
    weight_matrix(analyzers)  # letters are refused before anything is computed
    sensor_at(train, target)
    gallery = Gallery(train, target, knobs, grid=grid, engine=engine, progress=progress)
    gallery.family(0)  # what cannot be propagated is refused now, not with the first frame
    return Sweep(gallery=gallery, settings=analyzers)


@dataclass(frozen=True, kw_only=True, eq=False)
class Sweep:
    """What a camera sees at every value of a sweep; made by ``train.sweep``.

    Frames are made when asked for and not kept, so their number does not count in memory. Parameters that only move
    polarization (the angle of an axis, a retardance, an extinction, a rotation) need a few propagations in all, done
    at once; every combination of other parameters needs its own, done when first asked for, from the first
    part of the train that it changes on.

    Parameters
    ----------
    gallery : the pictures that frames are combined from.
    settings : the analyzer settings, in order.
    """

    gallery: Gallery
    settings: tuple[Setting, ...]

    def __len__(self) -> int:
        return len(self.gallery.knobs)

    @property
    def shape(self) -> tuple[int, ...]:
        """Number of values along each parameter, as for ``powers.reshape(*sweep.shape, -1)``."""
        return self.gallery.knobs.shape

    @property
    def values(self) -> dict[str, tuple[Any, ...]]:
        """The values of each parameter."""
        return dict(self.gallery.knobs.values)

    @property
    def labels(self) -> tuple[str, ...]:
        """Names of the settings."""
        return tuple(setting.label for setting in self.settings)

    @property
    def propagations(self) -> int:
        """How many propagations were made so far."""
        return self.gallery.propagations

    def at(self, which: Which) -> dict[str, Any]:
        """The value of each parameter at an index."""
        return self.gallery.knobs.at(place_of(self.gallery.knobs, which))

    @property
    def powers(self) -> Reals:
        """Power on the sensor [W] for every value and setting, shape (values, settings); no frames are made.

        Summed from the pictures the frames would be combined from.
        """
        return np.maximum(self.gallery.total_stokes @ weight_matrix(self.settings).T, 0.0)

    def stokes(self, which: Which) -> Reals:
        """S0 .. S3 [W per pixel] without an analyzer, shape (4, ny, nx); ``which`` as in :meth:`frame`."""
        family, shares = self._shared(which)
        return np.asarray(np.tensordot(shares, family.images, axes=(0, 1)))

    def frame(self, which: Which, setting: Asked) -> Reals:
        """One frame [W per pixel], shape (ny, nx).

        Parameters
        ----------
        which : index of a value, -1 for the last; or the value itself (not a whole number) where one parameter is
            swept; or {parameter: value}.
        setting : label or index (-1 for the last) of a setting of this sweep; or any state or setting.

        Raises
        ------
        ParameterError : a value or a setting that is not part of the sweep.
        """
        weights = setting_of(self.settings, setting, self.gallery.target).weights
        family, shares = self._shared(which)
        images = family.images
        mixture = np.outer(weights, shares).reshape(1, -1)
        return np.asarray(mixed(mixture, images.reshape(mixture.size, -1))).reshape(images.shape[2:])

    def frames(self, setting: Asked) -> Iterator[tuple[int, Reals]]:
        """(index, frame) for every value, in the order that takes the fewest propagations.

        That is the order of the values where only angles, retardances and the like are swept. A frame is part of a
        chunk of about 16 MB: keep a copy if you keep only few of them.
        """
        for indices, frames in self.chunks(setting):
            yield from zip(indices.tolist(), frames, strict=True)

    def chunks(self, setting: Asked, most: int | None = None) -> Iterator[tuple[Indices, Reals]]:
        """(indices, frames (k, ny, nx)) over all values, a new array each time.

        Parameters
        ----------
        setting : as in :meth:`frame`.
        most : frames in a chunk; about 16 MB of them if left out.
        """
        weights = setting_of(self.settings, setting, self.gallery.target).weights
        for number, indices in self.gallery.members.items():
            family = self.gallery.family(number)
            images = family.contracted(weights)
            size = most or max(1, CHUNK // (8 * images.shape[1]))
            for part in np.split(indices, range(size, len(indices), size)):
                frames = mixed(self.gallery.shares(family, part), images)
                yield part, frames.reshape(-1, *family.images.shape[2:])

    def exposure(self, which: Which) -> Exposure:
        """All that ``train.expose`` gives at one value; ``which`` as in :meth:`frame`."""
        family, _ = self._shared(which)
        return Exposure(
            stokes=self.stokes(which),
            settings=self.settings,
            x=family.x,
            y=family.y,
            pixel=family.pixel,
            wavelength=family.plan.wavelength,
            name=self.gallery.train.name,
            target=self.gallery.target,
            orientation=family.orientation,
            guard=family.guard,
            plan=str(family.plan),
            **self._reading(which),
        )

    def _reading(self, which: Which) -> dict[str, Any]:
        """Sensor and exposure time of the camera at one value."""
        gallery = self.gallery
        changes = gallery.knobs.at(place_of(gallery.knobs, which))
        camera = sensor_at(gallery.train.with_changes(changes), gallery.target)
        return {name: getattr(camera, name, None) for name in ("sensor", "exposure_time")}

    def _shared(self, which: Which) -> tuple[Any, Reals]:
        """The family of a value, and what it takes of each of its pictures."""
        place = place_of(self.gallery.knobs, which)
        family = self.gallery.family(int(self.gallery.numbers[place]))
        return family, self.gallery.shares(family, np.array([place]))[0]

    def __str__(self) -> str:
        gallery = self.gallery
        values = "together" if gallery.knobs.zipped else "every combination"
        lines = [
            f"sweep of {gallery.train.name} at {gallery.target}: {len(self)} values, {len(self.settings)} settings"
        ]
        lines += [f"  {name}: {len(some)} values" for name, some in self.values.items()]
        if len(self.values) > 1:
            lines.append(f"  {values}")
        linear = ", ".join(name for group in gallery.linear for name in group) or "nothing"
        stiff = ", ".join(name for group in gallery.stiff for name in group) or "nothing"
        lines.append(f"  the field is linear in what {linear} does; propagated anew for each value of {stiff}")
        lines.append(f"  {self.propagations} propagations so far, in {len(gallery.members)} groups of values")
        return "\n".join([*lines, stamp()])
