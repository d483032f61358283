"""An exposure: four Stokes images and the frames that each analyzer setting makes of them."""

from __future__ import annotations

import math
from dataclasses import dataclass, field, replace
from pathlib import Path
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.arrival import Arrival
from fastaxis.camera.chosen import chosen
from fastaxis.camera.mixing import mixed
from fastaxis.camera.mounting import Mounting
from fastaxis.camera.reading import Reading
from fastaxis.camera.room import check_frames
from fastaxis.camera.rows import Row, row
from fastaxis.camera.settings import Setting, weight_matrix
from fastaxis.conventions import View, stamp
from fastaxis.elements.sensor import Sensor
from fastaxis.light.states import State
from fastaxis.loader import late

__all__ = ["Exposure", "Row"]

DARK, DARK_SINGLE = 1e-12, 1e-6  # of the light on the sensor: some thousand roundings; what "single" promises
DUST = 1e-24  # of the light sent; an amplitude that ideal parts extinguish is left at 1e-16 or so
_S3_FLIP = np.array([1.0, 1.0, 1.0, -1.0])


@dataclass(frozen=True, kw_only=True, eq=False)
class Exposure(Reading):
    """What a camera or detector recorded; made by ``train.expose``.

    Parameters
    ----------
    stokes : S0, S1, S2, S3 [W per pixel], shape (4, ny, nx), rows along +y; S3 in the naming of ``view``.
    settings : the analyzer settings, in order.
    x, y : centres of the columns and rows [m], counted from the axis of the beam in the camera's picture.
    pixel : side of a pixel [m]; None for a detector.
    wavelength : in vacuum [m].
    name, target : of the train and of the camera.
    orientation : how the camera is mounted.
    view : the naming of R and L, and with it the sign of S3 and of the last weight.
    guard : how well the sampling carried the light; None if not known.
    plan : how it was computed, in words.
    sent : power that the laser sends out [W]; None if not known.
    arrival : the power in the plane of the sensor, on it and beside it; None if not known.
    sensor, exposure_time : what the camera makes of the light, and for how long [s]; None if not declared.
    """

    stokes: NDArray[np.float64] = field(repr=False)
    settings: tuple[Setting, ...] = field(repr=False)
    x: NDArray[np.float64] = field(repr=False)
    y: NDArray[np.float64] = field(repr=False)
    pixel: float | None
    wavelength: float
    name: str = ""
    target: str = ""
    orientation: str = "upright"
    view: View = View.RECEIVER
    guard: Any = field(default=None, repr=False)
    plan: str = field(default="", repr=False)
    sent: float | None = None
    arrival: Arrival | None = field(default=None, repr=False)
    sensor: Sensor | None = None
    exposure_time: float | None = None

    @property
    def stamp(self) -> str:
        """The signs under which this was made, in one line."""
        return stamp(self.view)

    @property
    def labels(self) -> tuple[str, ...]:
        """Names of the settings, R and L as this view names them."""
        return tuple(self.view.rename(setting.label) for setting in self.settings)

    @property
    def weights(self) -> NDArray[np.float64]:
        """The instrument matrix (n, 4): frames = weights . stokes, S3 as this view names it."""
        return weight_matrix(self.settings) * self._s3_signs

    @property
    def _s3_signs(self) -> NDArray[np.float64]:
        return np.ones(4) if self.view is View.RECEIVER else _S3_FLIP

    def __len__(self) -> int:
        return len(self.settings)

    @property
    def frames(self) -> NDArray[np.float64]:
        """All frames [W per pixel], shape (n, ny, nx); made anew at each call, ``frame(k)`` makes one at a time."""
        check_frames(
            self.target,
            len(self),
            self.stokes.shape[1:],
            size=self.stokes.itemsize,
            fix="for k in range(len(shots)): shots.frame(k)",
        )
        return self._mixed(self.weights)

    def frame(self, which: int | str | Setting | State) -> NDArray[np.float64]:
        """One frame [W per pixel], shape (ny, nx).

        Parameters
        ----------
        which : label or index of a setting of this exposure; or any state or setting, exposed or not.

        Raises
        ------
        ParameterError : no setting of this label or index.

        Examples
        --------
        >>> from fastaxis.camera.settings import as_setting
        >>> from fastaxis.light.states import H, V
        >>> shots = Exposure(stokes=np.array([3.0, 1.0, 0.0, 0.0]).reshape(4, 1, 1), settings=(as_setting(H),),
        ...                  x=np.zeros(1), y=np.zeros(1), pixel=None, wavelength=532e-9)
        >>> float(shots.frame("H")[0, 0]), float(shots.frame(V)[0, 0])
        (2.0, 1.0)
        """
        frame: NDArray[np.float64] = self._mixed(self._setting(which).weights[None] * self._s3_signs)[0]
        return frame

    def _mixed(self, weights: NDArray[np.float64]) -> NDArray[np.float64]:
        return mixed(weights, self.stokes.reshape(4, -1)).reshape(-1, *self.stokes.shape[1:])

    def power(self, which: int | str | Setting | State) -> float:
        """Power on the sensor behind this setting [W]; ``which`` as in :meth:`frame`.

        Light that passes beside the sensor is not in it; ``train.power("cam")`` is all the light in the camera's plane.
        """
        return float(self.frame(which).sum())

    @property
    def total_power(self) -> float:
        """Power on the sensor without an analyzer [W]."""
        return float(self.stokes[0].sum())

    @property
    def arrived(self) -> float | None:
        """Power in the plane of the sensor, on it and beside it [W]; None if not known.

        Where several arms meet it is worked out when first asked for, which may take as long as the exposure.
        """
        return None if self.arrival is None else self.arrival.power

    @property
    def dark_below(self) -> float:
        """Power [W] below which a frame holds roundings and no light.

        A frame is a difference of Stokes images, right to some roundings of the light on the sensor. Where ideal
        parts on the way let nothing pass, that light is itself the square of some roundings.
        """
        fine = self.stokes.dtype.itemsize >= 8
        total = self.total_power
        if total < DUST * (self.sent or 0.0):
            return math.inf
        return (DARK if fine else DARK_SINGLE) * total

    def is_dark(self, which: int | str | Setting | State) -> bool:
        """Whether the frame behind this setting holds no light but roundings."""
        power = self.power(which)
        return power == 0 or power < self.dark_below

    @property
    def upright(self) -> Exposure:
        """The same light as an upright camera at the same place would have taken it: the beam's own frame."""
        mounting = Mounting(self.orientation)
        if mounting.upright:
            return self
        x, y = mounting.undone_axes(self.x, self.y)
        return replace(self, stokes=mounting.undone(self.stokes), x=x, y=y, orientation="upright")

    def _setting(self, which: int | str | Setting | State) -> Setting:
        return chosen(which, self.settings, self.labels, self.target)

    def in_view(self, view: View) -> Exposure:
        """The same exposure under another naming of circular light.

        R and L change places, S3 and the last weight change sign, all together; the frames stay as they are.
        """
        if view is self.view:
            return self
        return replace(self, view=view, stokes=self.stokes * _S3_FLIP[:, None, None])

    def table(self) -> tuple[Row, ...]:
        """Power, peak, and what kind of picture it is, for each setting, in order."""
        return tuple(self.row(k) for k in range(len(self)))

    def row(self, k: int) -> Row:
        """One line of :meth:`table`."""
        return row(self, k)

    def save(self, path: str | Path) -> Path:
        """Keep everything in an .npz file; ``fastaxis.camera.load`` reads it back."""
        return Path(late("camera.bundle", "save")(self, path))

    def save_tiff(self, path: str | Path) -> Path:
        """All frames as the pages of one 16-bit TIFF on one watt scale."""
        return Path(late("camera.pictures", "save_tiff")(self, path))

    def save_pngs(self, folder: str | Path) -> tuple[Path, ...]:
        """One 16-bit PNG for each setting on one watt scale."""
        return tuple(late("camera.pictures", "save_pngs")(self, folder))

    def __str__(self) -> str:
        return str(late("camera.listing", "listing")(self))
