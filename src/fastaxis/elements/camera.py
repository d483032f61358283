"""The camera: where a beam ends on pixels."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, ClassVar

from fastaxis import checks
from fastaxis.elements.base import Element
from fastaxis.elements.sensor import Sensor
from fastaxis.errors import FastaxisWarning, ParameterError
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["ORIENTATIONS", "Camera"]

ORIENTATIONS = (
    "upright", "turned 90", "turned 180", "turned 270",
    "mirrored", "mirrored, turned 90", "mirrored, turned 180", "mirrored, turned 270",
)  # fmt: skip


@dataclass(frozen=True, kw_only=True)
class Camera(Element):
    """A sensor of square pixels at the end of a beam.

    Parameters
    ----------
    pixel : side of a pixel [m].
    shape : (ny, nx) of its frames.
    centre : (x, y) of the middle of the sensor [m].
    orientation : how its frames stand to the view that faces the source with x to the right and y up: "upright"; or
        "turned 90", "turned 180", "turned 270" counter-clockwise; or "mirrored" left-right, and then turned.
    sensor : what it makes of the light (:class:`Sensor`); None if only watts are asked for.
    exposure_time : of a frame [s], above zero.

    Raises
    ------
    ParameterError : a pixel that is not positive or lacks its unit; a shape that is not two whole numbers; another
        word for the orientation; something else for a sensor; an exposure time that is not above zero.

    Examples
    --------
    >>> Camera(pixel=3.45e-6, shape=(512, 640)).seen
    (512, 640)
    """

    pixel: float
    shape: tuple[int, int] = (512, 512)
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)
    orientation: str = "upright"
    sensor: Sensor | None = None
    exposure_time: float | None = None

    stem: ClassVar[str] = "camera"
    faces: ClassVar[tuple[str, ...]] = ("in",)
    entry: ClassVar[str | None] = "in"

    def __post_init__(self) -> None:
        self._keep(
            pixel=checks.length(self.label, "pixel", self.pixel, most=0.01, fix="pixel=3.45*um"),
            shape=self._checked_shape(),
            centre=checks.centre(self.label, self.centre),
        )
        if self.orientation not in ORIENTATIONS:
            raise ParameterError(
                f"orientation is one of {', '.join(map(repr, ORIENTATIONS))}",
                got=f"{self.label}: orientation = {self.orientation!r}",
                fix='orientation="upright"',
            )
        self._check_reading()

    def _check_reading(self) -> None:
        if self.sensor is not None and not isinstance(self.sensor, Sensor):
            raise ParameterError(
                "a sensor is declared by what it holds",
                got=f"{self.label}: sensor = {self.sensor!r}",
                fix="sensor=fa.Sensor(full_well=10000, quantum_efficiency=0.6)",
            )
        if self.exposure_time is None:
            return
        time = checks.number(self.label, "exposure_time", self.exposure_time, fix="exposure_time=1*ms")
        if is_symbolic(time) or time <= 0:
            raise ParameterError(
                "exposure_time is a number of seconds above zero",
                got=f"{self.label}: exposure_time = {time}",
                fix="exposure_time=1*ms",
            )
        self._keep(exposure_time=time)

    def _checked_shape(self) -> tuple[int, int]:
        try:
            ny, nx = (int(n) for n in self.shape)
            good = (ny, nx) == tuple(self.shape) and ny > 0 and nx > 0
        except (TypeError, ValueError):
            good = False
        if not good:
            raise ParameterError(
                "shape is a pair (ny, nx) of whole numbers of pixels",
                got=f"{self.label}: shape = {self.shape}",
                fix="shape=(512, 512)",
            )
        return ny, nx

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        return [] if self.exposure_time is None else checks.long_exposure(self.label, self.exposure_time)

    @property
    def seen(self) -> tuple[int, int]:
        """Shape (ny, nx) of the picture in the beam's own frame, before the sensor turns it."""
        ny, nx = self.shape
        return (nx, ny) if self.orientation.endswith(("90", "270")) else (ny, nx)

    def oriented(self, picture: Any) -> Any:
        """The frame this camera gives of a picture (..., ny, nx) in the beam's own frame, rows along +y.

        The picture has the shape ``seen``, the frame the shape ``shape``.
        """
        if self.orientation.startswith("mirrored"):
            picture = picture[..., ::-1]
        if self.orientation.endswith("180"):
            return picture[..., ::-1, ::-1]
        if self.orientation.endswith("90"):
            return picture.swapaxes(-1, -2)[..., ::-1]
        if self.orientation.endswith("270"):
            return picture.swapaxes(-1, -2)[..., ::-1, :]
        return picture
