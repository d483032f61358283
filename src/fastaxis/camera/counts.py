"""A frame as the camera reads it out: whole counts, with the noise of the light and of the sensor."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING, Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.photons import electrons_of, read_with, signal_to_noise, time_words
from fastaxis.elements.sensor import Sensor
from fastaxis.errors import ParameterError

if TYPE_CHECKING:
    from fastaxis.camera.exposure import Exposure
    from fastaxis.camera.settings import Setting

__all__ = ["Counts", "counts"]


@dataclass(frozen=True, kw_only=True, eq=False)
class Counts:
    """One frame of counts; ``np.asarray(frame)`` gives them as an array.

    Parameters
    ----------
    counts : (ny, nx), whole numbers from 0 to full scale, rows along +y.
    electrons : (ny, nx), on average, before the well ends and without noise.
    saturated : (ny, nx), where the well was full or the counts at full scale.
    sensor, exposure_time : they were read with; the time in [s].
    label : of the analyzer setting.
    target : the camera.
    """

    counts: NDArray[Any] = field(repr=False)
    electrons: NDArray[np.float64] = field(repr=False)
    saturated: NDArray[np.bool_] = field(repr=False)
    sensor: Sensor
    exposure_time: float
    label: str = ""
    target: str = ""

    def __array__(self, dtype: Any = None, copy: bool | None = None) -> NDArray[Any]:  # noqa: FBT001  # numpy's protocol
        return np.array(self.counts, dtype=dtype, copy=copy)

    @property
    def fill(self) -> float:
        """Electrons of the brightest pixel on average, as a share of what saturates it; above 1 it is saturated."""
        return float(self.electrons.max() / self.sensor.most_electrons)

    @property
    def signal_to_noise(self) -> NDArray[np.float64]:
        """Mean signal over its temporal noise, pixel by pixel; of no meaning where ``saturated``."""
        return signal_to_noise(self.electrons, self.sensor, self.exposure_time)

    def __str__(self) -> str:
        where = " ".join(word for word in (self.target, self.label) if word)
        pixels = int(self.saturated.sum())
        told = f"{pixels} of {self.saturated.size} pixels saturated" if pixels else "none saturated"
        return (
            f"{where}: {time_words(self.exposure_time)}, brightest {int(self.counts.max())} of "
            f"{self.sensor.largest_count} counts, {100 * self.fill:.3g} % of the well, {told}, "
            f"signal to noise up to {float(self.signal_to_noise[~self.saturated].max(initial=0.0)):.3g}"
        )


def counts(
    shots: Exposure,
    setting: Setting,
    *,
    exposure_time: float | None,
    seed: int,
    noise: bool,
    sensor: Sensor | None,
) -> Counts:
    """See ``Exposure.counts``."""
    sensor, time = read_with(shots, sensor, exposure_time)
    label = setting.label  # of the receiver's naming, so that the noise stays when a report is named otherwise
    mean = electrons_of(shots.frame(setting), sensor, wavelength=shots.wavelength, exposure_time=time)
    held = _collected(mean, sensor, _generator(seed, label)) if noise else mean
    read = _read(held, sensor, _generator(seed, f"{label}, read out") if noise else None)
    return Counts(
        counts=read,
        electrons=mean,
        saturated=(held >= sensor.full_well) | (read >= sensor.largest_count),
        sensor=sensor,
        exposure_time=time,
        label=shots.view.rename(label),
        target=shots.target,
    )


def _generator(seed: int, label: str) -> np.random.Generator:
    """Noise of its own for each setting, the same again for the same seed."""
    if isinstance(seed, bool) or not hasattr(seed, "__index__") or seed < 0:
        raise ParameterError("seed is a whole number, 0 or more", got=f"counts: seed = {seed!r}", fix="seed=0")
    return np.random.default_rng([int(seed), *label.encode()])


def _collected(mean: NDArray[np.float64], sensor: Sensor, random: np.random.Generator) -> NDArray[np.float64]:
    """Electrons as they came. Beyond twice the well, Poisson numbers below the well no longer happen."""
    within = np.clip(mean, 0.0, 2 * sensor.full_well + 1000)  # mixed frames of single precision dip below 0
    return random.poisson(within).astype(float)


def _read(electrons: NDArray[np.float64], sensor: Sensor, random: np.random.Generator | None) -> NDArray[Any]:
    held = np.minimum(electrons, sensor.full_well)
    if random is not None and sensor.read_noise > 0:
        held = held + random.normal(0.0, sensor.read_noise, held.shape)
    whole = np.rint(sensor.offset + sensor.counts_per_electron * held)
    bits = next(size for size in (8, 16, 32) if size >= sensor.bit_depth)
    return np.clip(whole, 0, sensor.largest_count).astype(f"uint{bits}")
