"""The table of an exposure: what kind of picture each setting gives."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

from fastaxis.loader import late

if TYPE_CHECKING:
    from fastaxis.camera.exposure import Exposure

__all__ = ["Row", "row"]


@dataclass(frozen=True)
class Row:
    """One line of the table of an exposure.

    Parameters
    ----------
    label : of the setting.
    power : on the sensor [W].
    peak : brightest pixel: irradiance [W/m^2], or power [W] for a detector.
    lobes : bright lobes about the axis of the beam; 0 for a picture without, and if the axis is not on the sensor.
    angle : of a bright lobe [rad] in the beam's own frame, as analyzer angles are, counter-clockwise from x, in
        [0, 2 pi / lobes); nan where there are no lobes.
    kind : "dark", where only roundings are left; "round", "lobes"; "beside", a round picture beside the axis; "other",
        uneven but not in lobes about the axis; "" for a detector, and if the axis is not on the sensor.
    centroid : (x, y) of the picture [m] in the beam's own frame; nan for a detector and in the dark.
    ring : radius of the brightest ring of a round picture [m], 0 for a spot; else nan.
    dark_ring : radius of the first dark ring of a round picture [m]; nan without one.
    """

    label: str
    power: float
    peak: float
    lobes: int
    angle: float
    kind: str = ""
    centroid: tuple[float, float] = (math.nan, math.nan)
    ring: float = math.nan
    dark_ring: float = math.nan


def row(shots: Exposure, k: int) -> Row:
    """The line of the table for the k-th setting."""
    frame = shots.frame(k)
    area = 1.0 if shots.pixel is None else shots.pixel**2
    told = (shots.labels[k], float(frame.sum()), float(frame.max()) / area)
    if shots.is_dark(k):
        return Row(*told, 0, math.nan, "dark")
    if shots.pixel is None:
        return Row(*told, 0, math.nan)
    # All places are told in the beam's own frame: there they agree with the angles of analyzers and plates.
    upright = shots.upright
    picture, axes = upright.frame(shots.settings[k]), {"x": upright.x, "y": upright.y}
    centroid = late("analysis.widths", "widths")(picture, **axes).centroid
    x, y = upright.x, upright.y
    if min(frame.shape) < 3 or not x[0] < 0 < x[-1] or not y[0] < 0 < y[-1]:
        return Row(*told, 0, math.nan, "", centroid)
    found = late("analysis.lobes", "lobes")(picture, **axes)
    rings = late("analysis.rings", "rings")(picture, **axes) if found.kind == "round" else (math.nan, math.nan)
    return Row(*told, found.count, found.angle, found.kind, centroid, *rings)
