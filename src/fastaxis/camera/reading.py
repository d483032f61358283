"""Reading an exposure out: the electrons and counts that the camera's sensor makes of its frames."""

from __future__ import annotations

from typing import TYPE_CHECKING, cast

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.chosen import chosen
from fastaxis.camera.counts import Counts, counts
from fastaxis.camera.photons import electrons_of, fills_well_after, read_with
from fastaxis.camera.settings import Setting
from fastaxis.elements.sensor import Sensor
from fastaxis.light.states import State

if TYPE_CHECKING:
    from fastaxis.camera.exposure import Exposure

__all__ = ["Reading"]


class Reading:
    """What an :class:`~fastaxis.camera.exposure.Exposure` says beyond watts, of a camera whose sensor is known."""

    def electrons(
        self,
        which: int | str | Setting | State,
        *,
        exposure_time: float | None = None,
        sensor: Sensor | None = None,
    ) -> NDArray[np.float64]:
        """Electrons a pixel collects on average behind this setting, shape (ny, nx); as if its well had no end.

        quantum_efficiency * power * time * wavelength/(h c) + dark_current * time, the wavelength that of the train.

        Parameters
        ----------
        which : as in :meth:`frame`.
        exposure_time : [s]; that of the camera if left out.
        sensor : another one than the camera's.

        Raises
        ------
        ParameterError : no sensor or no exposure time, neither here nor with the camera.
        """
        shots = cast("Exposure", self)
        sensor, time = read_with(shots, sensor, exposure_time)
        found: NDArray[np.float64] = electrons_of(
            shots.frame(which), sensor, wavelength=shots.wavelength, exposure_time=time
        )
        return found

    def counts(
        self,
        which: int | str | Setting | State,
        *,
        exposure_time: float | None = None,
        seed: int = 0,
        noise: bool = True,
        sensor: Sensor | None = None,
    ) -> Counts:
        """The frame behind this setting as the camera reads it out: ``.counts``, ``.saturated``, ``.electrons``.

        Electrons come as Poisson numbers, fill the well, gain normal read noise and are rounded to whole counts within
        full scale.

        Parameters
        ----------
        which : as in :meth:`frame`.
        exposure_time : [s]; that of the camera if left out.
        seed : of the noise, a stream of its own for each label; the same seed gives the same frame again.
        noise : whether there is any; without, the mean is rounded.
        sensor : another one than the camera's.

        Raises
        ------
        ParameterError : no sensor or no exposure time, neither here nor with the camera; a seed below 0.

        Examples
        --------
        >>> import fastaxis as fa
        >>> from fastaxis.units import mm, ms, nm, nW, um
        >>> sensor = fa.Sensor(full_well=10_500, quantum_efficiency=0.62, read_noise=2.4)
        >>> train = fa.Train(wavelength=532*nm).along(
        ...     fa.Laser(waist=0.3*mm, power=10*nW),
        ...     fa.Camera(pixel=10*um, shape=(128, 128), sensor=sensor, exposure_time=0.5*ms, name="cam"))
        >>> shots = train.expose("cam", [fa.H])
        >>> print(shots.counts("H", seed=1))
        cam H: 0.5 ms, brightest 2365 of 4095 counts, 55.8 % of the well, none saturated, signal to noise up to 76.5
        >>> f"{shots.saturates_after / ms:.3f} ms"
        '0.895 ms'
        """
        shots = cast("Exposure", self)
        setting = chosen(which, shots.settings, shots.labels, shots.target)
        return counts(shots, setting, exposure_time=exposure_time, seed=seed, noise=noise, sensor=sensor)

    @property
    def saturates_after(self) -> float:
        """Exposure time [s] at which the brightest pixel of all settings is saturated; infinite in the dark.

        Raises
        ------
        ParameterError : no sensor declared with the camera.
        """
        shots = cast("Exposure", self)
        sensor, _ = read_with(shots, None, 1.0)
        peak = max(float(shots.frame(k).max()) for k in range(len(shots)))
        return fills_well_after(peak, sensor, shots.wavelength)
