"""Figures of merit: what is read off the light at a port, or off a picture."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.analysis.lobes import lobes
from fastaxis.analysis.widths import ring_radius as ring_of
from fastaxis.camera.settings import as_setting, no_analyzer, weight_matrix
from fastaxis.errors import ParameterError
from fastaxis.studies.tolerance.coarse import coarse

__all__ = [
    "Merit", "PictureMerit", "StokesMerit", "azimuth_error", "ellipticity_error", "extinction_ratio",
    "frame_correlation", "lobe_angle", "measured", "power_at", "ring_radius", "stokes_component",
]  # fmt: skip

Reals: TypeAlias = NDArray[np.float64]
Merit: TypeAlias = Any  # StokesMerit, PictureMerit, or a function of a train


@dataclass(frozen=True, eq=False)
class StokesMerit:
    """A number from the powers S0 .. S3 of all light at a port.

    Parameters
    ----------
    target : port, camera or detector.
    reading : "power", "decibel", "component", "azimuth" or "ellipticity".
    rows : (r, 4): first the light is seen through these; powers behind settings, or Stokes parameters as reduced.
    wanted : value that is subtracted.
    component : of "component".
    knob, steps : parameter turned for each reading, and the angles added to it.
    unit : of the number.
    """

    target: str
    reading: str
    rows: Reals = field(repr=False)
    wanted: float = 0.0
    component: int = 0
    knob: str = ""
    steps: tuple[float, ...] = (0.0,)
    unit: str = ""

    def values(self, stokes: Reals) -> Reals:
        """The number for light (..., steps, 4) [W]; shape (...)."""
        return np.asarray(_read(self, stokes.reshape(*stokes.shape[:-2], -1) @ self.rows.T))

    def apart(self, one: Reals, other: Reals) -> Reals:
        """How far values are apart; an azimuth is the same after half a turn."""
        return _apart(one, other, math.pi if self.reading == "azimuth" else math.inf)

    def slope(self, stokes: Reals, change: Reals) -> float:
        """Its derivative where the light (steps, 4) changes at this rate, by the chain rule."""
        seen, moved = self.rows @ stokes.ravel(), self.rows @ change.ravel()
        return float(_gradient(self, seen) @ moved)


def _apart(one: Reals, other: Reals, period: float) -> Reals:
    """Absolute differences; 0 where neither could be read, infinite where one could not."""
    off = np.abs(one - other)
    off = np.minimum(off, np.abs(period - off)) if math.isfinite(period) else off
    alike = (np.isnan(one) & np.isnan(other)) | (one == other)
    return np.where(alike, 0.0, np.where(np.isfinite(off), off, np.inf))


def _read(merit: StokesMerit, seen: Reals) -> Any:
    if merit.reading == "power":
        return seen[..., 0] - merit.wanted
    if merit.reading == "decibel":
        with np.errstate(divide="ignore"):
            return 10 * np.log10(seen[..., 0] / np.maximum(seen[..., 1], 0.0)) - merit.wanted
    if merit.reading == "component":
        return seen[..., merit.component] / seen[..., 0] - merit.wanted
    if merit.reading == "azimuth":
        off = np.arctan2(seen[..., 2], seen[..., 1]) / 2 - merit.wanted
        return (off + math.pi / 2) % math.pi - math.pi / 2
    return np.arctan2(seen[..., 3], np.hypot(seen[..., 1], seen[..., 2])) / 2 - merit.wanted


def _gradient(merit: StokesMerit, seen: Reals) -> Reals:
    """Of the reading, with respect to what is seen."""
    out = np.zeros(len(seen))
    if merit.reading == "power":
        out[0] = 1.0
    elif merit.reading == "decibel":
        out[:2] = 10 / math.log(10) / seen[0], -10 / math.log(10) / seen[1] if seen[1] else math.nan
    elif merit.reading == "component":
        out[merit.component] = 1 / seen[0]
        out[0] -= seen[merit.component] / seen[0] ** 2
    else:
        _, s1, s2, s3 = seen
        across = s1**2 + s2**2
        if merit.reading == "azimuth":
            out[1:3] = -s2 / (2 * across), s1 / (2 * across)
        else:
            root, whole = math.sqrt(across), across + s3**2
            out[1:] = -s3 * s1 / (2 * root * whole), -s3 * s2 / (2 * root * whole), root / (2 * whole)
    return out


def power_at(target: str, behind: Any = None) -> StokesMerit:
    """Power [W] of all light at a port, camera or detector; ``behind`` a state or an analyzer if one is given.

    At a camera that is all light in its plane, as ``train.power`` tells it, beside the sensor too; ``shots.power`` of
    an exposure is what falls on the sensor.
    """
    weights = weight_matrix([no_analyzer() if behind is None else as_setting(behind)])
    return StokesMerit(target, "power", weights, unit="W")


def extinction_ratio(target: str, passed: Any, blocked: Any) -> StokesMerit:
    """Power behind one setting over power behind another, in decibels."""
    return StokesMerit(target, "decibel", weight_matrix([as_setting(passed), as_setting(blocked)]), unit="dB")


def stokes_component(target: str, component: int, wanted: float = 0.0) -> StokesMerit:
    """S1, S2 or S3 over S0 of all the light together, less the value wanted."""
    if component not in (1, 2, 3):
        raise ParameterError("Stokes components are 1, 2 and 3", got=f"stokes_component: {component!r}", fix="1")
    return StokesMerit(target, "component", np.eye(4), wanted, component)


def azimuth_error(target: str, wanted: float = 0.0) -> StokesMerit:
    """Azimuth of the polarized part less the one wanted [rad], -90 to 90 deg."""
    return StokesMerit(target, "azimuth", np.eye(4), wanted, unit="rad")


def ellipticity_error(target: str, wanted: float = 0.0) -> StokesMerit:
    """Ellipticity of the polarized part less the one wanted [rad]; positive is right-handed."""
    return StokesMerit(target, "ellipticity", np.eye(4), wanted, unit="rad")


def measured(target: str, quantity: str, *, knob: str, settings: Sequence[Any], wanted: float = 0.0) -> StokesMerit:
    """What a polarimeter in the train says of the light in front of it, reduced as if its parts were right.

    The true parts, with their errors, make the readings; the settings say what they are believed to be.

    Parameters
    ----------
    target : the detector behind the turned part.
    quantity : "s1", "s2", "s3", "azimuth" or "ellipticity".
    knob : parameter that is turned for each reading, "plate.fast": to its declared value, its error and the angle of
        the plate in the setting, taken together.
    settings : the analyzer as it is believed to stand at each reading, ``fa.rotating_plate(64)``.
    wanted : value that is subtracted.

    Raises
    ------
    ParameterError : another quantity; settings that do not measure all four Stokes parameters.
    """
    weights = weight_matrix([as_setting(one) for one in settings])
    if np.linalg.matrix_rank(weights) < 4:
        raise ParameterError(
            "the settings of a polarimeter tell all four Stokes parameters",
            got=f"measured: {len(weights)} settings of rank {np.linalg.matrix_rank(weights)}",
            fix="settings=fa.rotating_plate(16)",
        )
    known = {"s1": 1, "s2": 2, "s3": 3, "azimuth": 0, "ellipticity": 0}
    if quantity not in known:
        raise ParameterError(f"a polarimeter measures {', '.join(known)}", got=f"measured: {quantity!r}", fix='"s1"')
    # Each reading is the power behind the true parts, S0 at the detector.
    rows = np.kron(np.linalg.pinv(weights), np.array([1.0, 0.0, 0.0, 0.0]))
    steps = tuple(_turns(settings))
    reading = "component" if known[quantity] else quantity
    unit = "" if known[quantity] else "rad"
    return StokesMerit(target, reading, rows, wanted, known[quantity], knob, steps, unit)


def _turns(settings: Sequence[Any]) -> list[float]:
    """Angle of the fast axis of the plate of each setting."""
    plates = [as_setting(one).laws[:1] for one in settings]
    angles = [getattr(plate[0], "angle", math.nan) if plate else math.nan for plate in plates]
    if any(math.isnan(angle) for angle in angles):
        raise ParameterError(
            "a polarimeter turns a plate in front of a polarizer", got="measured: settings without a plate",
            fix="settings=fa.rotating_plate(16)",
        )  # fmt: skip
    return [float(angle) for angle in angles]


@dataclass(frozen=True, eq=False)
class PictureMerit:
    """A number from one frame of a camera.

    Parameters
    ----------
    target : camera.
    weights : (4,) of the setting.
    reading : "lobe angle", "ring radius" or "correlation".
    count : of lobes.
    reference : frame to compare with.
    centre : of the picture [m].
    unit : of the number.
    """

    target: str
    weights: Reals = field(repr=False)
    reading: str
    count: int = 0
    reference: Reals | None = field(default=None, repr=False)
    centre: tuple[float, float] = (0.0, 0.0)
    unit: str = ""

    def value(self, frame: Reals, x: Reals, y: Reals) -> float:
        """The number of one frame (ny, nx)."""
        if self.reading == "ring radius":
            return ring_of(frame, x=x, y=y, centre=self.centre)
        if self.reading == "lobe angle":
            frame, x, y = coarse(frame, x, y)
            found = lobes(frame, x=x, y=y, centre=self.centre)
            spacing = 2 * math.pi / max(self.count, 1)
            return (found.angle + spacing / 2) % spacing - spacing / 2 if found.count == self.count else math.nan
        assert self.reference is not None
        norm = math.sqrt(float((frame**2).sum() * (self.reference**2).sum()))
        return float((frame * self.reference).sum()) / norm if norm else math.nan

    def apart(self, one: Reals, other: Reals) -> Reals:
        """How far values are apart; lobes are the same after their spacing."""
        lobed = self.reading == "lobe angle" and self.count
        return _apart(one, other, 2 * math.pi / self.count if lobed else math.inf)


def _weights(behind: Any) -> Reals:
    return np.asarray(weight_matrix([no_analyzer() if behind is None else as_setting(behind)])[0])


def lobe_angle(target: str, behind: Any, *, count: int, centre: tuple[float, float] = (0.0, 0.0)) -> PictureMerit:
    """Angle of a bright lobe in the beam's frame [rad], within half a spacing of zero; nan at another count."""
    return PictureMerit(target, _weights(behind), "lobe angle", count=count, centre=centre, unit="rad")


def ring_radius(target: str, behind: Any = None, *, centre: tuple[float, float] = (0.0, 0.0)) -> PictureMerit:
    """Radius of the brightest circle [m]."""
    return PictureMerit(target, _weights(behind), "ring radius", centre=centre, unit="m")


def frame_correlation(target: str, behind: Any, reference: Any) -> PictureMerit:
    """Likeness to a reference frame: sum(a b)/sqrt(sum a^2 sum b^2), 1 for the same picture at any scale."""
    return PictureMerit(target, _weights(behind), "correlation", reference=np.asarray(reference, float))
