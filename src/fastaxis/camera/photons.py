"""From watts on a pixel to electrons in it."""

from __future__ import annotations

from math import inf
from numbers import Real
from typing import TYPE_CHECKING, Any

import numpy as np
from numpy.typing import NDArray

from fastaxis import checks
from fastaxis.errors import ParameterError, caution
from fastaxis.light.line import SPEED_OF_LIGHT

if TYPE_CHECKING:
    from fastaxis.camera.exposure import Exposure
    from fastaxis.elements.sensor import Sensor

__all__ = ["electrons_of", "fills_well_after", "photons_per_joule", "read_with", "signal_to_noise", "time_words"]

TIMES = ((0.1, 1.0, "s"), (1e-4, 1e-3, "ms"), (1e-7, 1e-6, "us"), (0.0, 1e-9, "ns"))  # from, unit; exposures go by ms
PLANCK = 6.62607015e-34  # [J s], exact by definition of the kilogram
QUANTIZATION = 1 / 12  # counts squared, of rounding to whole counts


def photons_per_joule(wavelength: float) -> float:
    """Photons in a joule of light, wavelength/(h c).

    h and c are exact since the SI of 2019.

    >>> f"{photons_per_joule(1.0):.8e}"
    '5.03411657e+24'
    """
    return wavelength / (PLANCK * SPEED_OF_LIGHT)


def electrons_of(power: Any, sensor: Sensor, *, wavelength: float, exposure_time: float) -> Any:
    """Electrons that a power [W] on a pixel frees on average, those of the dark included; a well without an end."""
    light = sensor.quantum_efficiency * photons_per_joule(wavelength) * power
    return (light + sensor.dark_current) * exposure_time


def read_with(shots: Exposure, sensor: Sensor | None, exposure_time: float | None) -> tuple[Sensor, float]:
    """The sensor and the exposure time [s] to read with: those given, or those of the camera.

    Raises
    ------
    ParameterError : neither given nor declared with the camera; a time that is not a number above zero.
    """
    sensor = shots.sensor if sensor is None else sensor
    if sensor is None:
        told = "fa.Sensor(full_well=10000, quantum_efficiency=0.6)"
        raise ParameterError(
            "electrons and counts need the sensor's data, declared with the camera or given here",
            got=f"{shots.target}: no sensor",
            # A detector has none to be declared.
            fix=f'shots.counts("{shots.labels[0]}", exposure_time=1*ms, sensor={told})'
            if shots.pixel is None
            else f'train.with_changes({{"{shots.target or "cam"}.sensor": {told}}})',
        )
    time = shots.exposure_time if exposure_time is None else exposure_time
    if time is None:
        raise ParameterError(
            "electrons and counts need an exposure time, given here or declared with the camera",
            got=f"{shots.target}: no exposure_time",
            fix=f'shots.counts("{shots.labels[0]}", exposure_time=1*ms)',
        )
    if isinstance(time, bool) or not (isinstance(time, Real) and 0 < time < inf):
        raise ParameterError(
            "exposure_time is in seconds, above zero",
            got=f"{shots.target}: exposure_time = {time}",
            fix=f'shots.counts("{shots.labels[0]}", exposure_time=1*ms)',
        )
    if exposure_time is not None:  # of one declared with the camera the train tells
        for warning in checks.long_exposure(shots.target, float(time)):
            caution(warning)
    return sensor, float(time)


def fills_well_after(peak: float, sensor: Sensor, wavelength: float) -> float:
    """Exposure time [s] at which a pixel of this power [W] is saturated; infinite in the dark."""
    rate = electrons_of(peak, sensor, wavelength=wavelength, exposure_time=1.0)
    return float(sensor.most_electrons / rate) if rate > 0 else float("inf")


def signal_to_noise(electrons: Any, sensor: Sensor, exposure_time: float) -> NDArray[np.float64]:
    """Mean signal over its temporal noise: N/sqrt(N + dark + read_noise^2 + 1/(12 gain^2)), N electrons of light.

    Parameters
    ----------
    electrons : on average, those of the dark included.
    sensor, exposure_time : as they are read.
    """
    electrons = np.asarray(electrons, dtype=float)
    quantization = QUANTIZATION / sensor.counts_per_electron**2
    light = electrons - sensor.dark_current * exposure_time
    return np.asarray(light / np.sqrt(electrons + sensor.read_noise**2 + quantization))


def time_words(time: float) -> str:
    """An exposure time.

    >>> time_words(0.5e-3), time_words(4.95e-7)
    ('0.5 ms', '0.495 us')
    """
    _, unit, name = next(step for step in TIMES if time >= step[0])
    return f"{time / unit:.3g} {name}"
