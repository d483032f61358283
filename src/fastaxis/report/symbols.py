"""Neutral drawings of the parts, in units of the drawing: light comes from the left, the middle is at (0, 0)."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from typing import Any

from matplotlib.patches import Circle, Patch, PathPatch, Polygon, Rectangle
from matplotlib.path import Path
from matplotlib.transforms import Affine2D

from fastaxis.report.following import Place
from fastaxis.report.style import INK, PAPER, SOFT

__all__ = ["HALF_HEIGHT", "draw_symbol"]

HALF_HEIGHT = 0.3
BODY = "#eef0f2"
GLASS = "#dbe7ee"
LINE: dict[str, Any] = {"ec": INK, "lw": 0.9, "joinstyle": "round"}


def _box(width: float, height: float, fill: str = BODY, **more: Any) -> Rectangle:
    return Rectangle((-width / 2, -height / 2), width, height, **{**LINE, "fc": fill, **more})


def _stroke(points: Sequence[tuple[float, float]], *, wide: float = 0.9, colour: str = INK) -> PathPatch:
    return PathPatch(Path(points), fc="none", ec=colour, lw=wide, capstyle="round")


def _laser() -> list[Patch]:
    nose = Polygon([(0.18, -0.1), (0.3, -0.05), (0.3, 0.05), (0.18, 0.1)], closed=True, **LINE, fc=SOFT)
    return [Rectangle((-0.34, -0.16), 0.52, 0.32, **LINE, fc=BODY), nose]


def _plate() -> list[Patch]:
    return [_box(0.12, 0.58, GLASS), _stroke([(-0.03, -0.16), (0.03, 0.16)])]


def _q_plate() -> list[Patch]:
    fan = [_stroke([(0.0, y - 0.05), (0.07 * math.sin(4 * y), y + 0.05)]) for y in (-0.18, -0.06, 0.06, 0.18)]
    return [_box(0.2, 0.58, GLASS), *fan]


def _patterned() -> list[Patch]:
    cells = [Rectangle((x, y), 0.09, 0.1, fc=SOFT, lw=0) for x, y in ((-0.09, -0.2), (0, -0.1), (-0.09, 0.0), (0, 0.1))]
    return [_box(0.18, 0.58, GLASS), *cells]


def _polarizer() -> list[Patch]:
    bars = [_stroke([(-0.06, y), (0.06, y)], wide=0.6) for y in (-0.21, -0.14, -0.07, 0.0, 0.07, 0.14, 0.21)]
    return [_box(0.12, 0.58, PAPER), *bars]


def _rotator() -> list[Patch]:
    turn = [(0.1 * math.cos(t / 10), 0.1 * math.sin(t / 10)) for t in range(-8, 42)]
    tip, before = turn[-1], turn[-3]
    across = ((tip[1] - before[1]) * 1.6, (before[0] - tip[0]) * 1.6)
    head = [(tip[0] + across[0], tip[1] + across[1]), (tip[0] - across[0], tip[1] - across[1]),
            (3 * tip[0] - 2 * before[0], 3 * tip[1] - 2 * before[1])]  # fmt: skip
    return [_box(0.34, 0.42, GLASS), _stroke(turn), Polygon(head, closed=True, fc=INK, lw=0)]


def _lens() -> list[Patch]:
    bulge, top = 0.13, 0.31
    right = [(0, -top), (bulge, -top / 2), (bulge, top / 2), (0, top)]
    points = right + [(-x, -y) for x, y in right[1:]]
    codes = [Path.MOVETO] + [Path.CURVE4] * 6
    return [PathPatch(Path(points, codes), **LINE, fc=GLASS)]


def _stop() -> list[Patch]:
    return [Rectangle((-0.035, y), 0.07, 0.22, fc=INK, lw=0) for y in (0.09, -0.31)]


def _obstacle() -> list[Patch]:
    return [_box(0.07, 0.18, INK, lw=0)]


def _annulus() -> list[Patch]:
    return [*_stop(), _box(0.07, 0.08, INK, lw=0)]


def _knife() -> list[Patch]:
    return [Polygon([(-0.05, -0.31), (0.05, -0.31), (0.02, 0.0), (-0.02, 0.0)], closed=True, fc=INK, lw=0)]


def _spiral() -> list[Patch]:
    steps = [(0.12, -0.29), (0.12, -0.1), (0.06, -0.1), (0.06, 0.1), (0.0, 0.1), (0.0, 0.29)]
    return [Polygon([(-0.08, -0.29), *steps, (-0.08, 0.29)], closed=True, **LINE, fc=GLASS)]


def _wedge() -> list[Patch]:
    return [Polygon([(-0.08, -0.29), (0.14, -0.29), (0.02, 0.29), (-0.08, 0.29)], closed=True, **LINE, fc=GLASS)]


def _filter() -> list[Patch]:
    return [_box(0.1, 0.58, SOFT)]


def _window() -> list[Patch]:
    return [_box(0.16, 0.5, GLASS)]


def _dove() -> list[Patch]:
    body = Polygon([(-0.36, -0.13), (0.36, -0.13), (0.18, 0.13), (-0.18, 0.13)], closed=True, **LINE, fc=GLASS)
    return [body, _stroke([(-0.27, 0.0), (0.0, -0.13), (0.27, 0.0)], wide=0.6, colour=SOFT)]


def _rhomb() -> list[Patch]:
    body = Polygon([(-0.24, -0.06), (-0.24, 0.24), (0.24, 0.06), (0.24, -0.24)], closed=True, **LINE, fc=GLASS)
    return [body, _stroke([(-0.08, -0.1), (0.08, 0.1)], wide=0.6, colour=SOFT)]


def _k_mirror() -> list[Patch]:
    roof = [_stroke([(-0.3, 0.05), (-0.05, -0.2)], wide=2.0), _stroke([(0.05, -0.2), (0.3, 0.05)], wide=2.0)]
    return [*roof, _stroke([(-0.14, 0.26), (0.14, 0.26)], wide=2.0)]


def _pick_off() -> list[Patch]:
    return [Rectangle((-0.04, -0.32), 0.08, 0.64, **LINE, fc=GLASS)]


def _camera() -> list[Patch]:
    return [
        Rectangle((-0.12, -0.22), 0.46, 0.44, **LINE, fc=BODY),
        Rectangle((-0.2, -0.15), 0.08, 0.3, **LINE, fc=PAPER),
        Rectangle((-0.115, -0.1), 0.05, 0.2, fc=INK, lw=0),
    ]


def _detector() -> list[Patch]:
    shape = Path([(-0.12, -0.2), (0.3, -0.2), (0.3, 0.2), (-0.12, 0.2), (-0.12, -0.2)],
                 [Path.MOVETO, Path.CURVE4, Path.CURVE4, Path.CURVE4, Path.CLOSEPOLY])  # fmt: skip
    return [PathPatch(shape, **LINE, fc=BODY)]


def _dump() -> list[Patch]:
    notch = Polygon([(-0.16, 0.14), (0.14, 0.0), (-0.16, -0.14)], closed=True, fc=PAPER, lw=0)
    return [Rectangle((-0.16, -0.2), 0.4, 0.4, fc=INK, lw=0), notch]


def _unknown() -> list[Patch]:
    return [_box(0.4, 0.4), Circle((0, 0), 0.03, fc=INK)]


def _mirror() -> list[Patch]:
    feet = (-0.28, -0.18, -0.08, 0.02, 0.12, 0.22)
    ticks = [_stroke([(0.0, y), (0.09, y + 0.08)], wide=0.6, colour=SOFT) for y in feet]
    return [_stroke([(0, -0.32), (0, 0.32)], wide=2.4), *ticks]


def _cube(diagonal: float) -> list[Patch]:
    along = 0.26 if diagonal > 0 else -0.26
    return [_box(0.52, 0.52, GLASS), _stroke([(-0.26, -along), (0.26, along)], wide=1.1)]


SYMBOLS: dict[str, Callable[[], list[Patch]]] = {
    "Laser": _laser,
    "Retarder": _plate,
    "QPlate": _q_plate,
    "PatternedRetarder": _patterned,
    "PatternedPolarizer": _patterned,
    "Mask": _patterned,
    "Polarizer": _polarizer,
    "Rotator": _rotator,
    "Lens": _lens,
    "Aperture": _stop,
    "RectangularAperture": _stop,
    "Slit": _stop,
    "Annulus": _annulus,
    "Obstacle": _obstacle,
    "KnifeEdge": _knife,
    "SpiralPlate": _spiral,
    "Wedge": _wedge,
    "NeutralDensity": _filter,
    "PhaseModulator": _window,
    "PhaseShift": _window,
    "Window": _window,
    "DovePrism": _dove,
    "KMirror": _k_mirror,
    "Rhomb": _rhomb,
    "Camera": _camera,
    "Detector": _detector,
    "BeamDump": _dump,
    "FreeSpace": list,
}

REFLECTORS: dict[str, Callable[[], list[Patch]]] = {"Mirror": _mirror, "MetalMirror": _mirror, "PickOff": _pick_off}


def draw_symbol(axes: Any, element: object, place: Place) -> None:
    """Draw a part where it stands, turned the way the light meets it."""
    patches, turn = _patches_and_turn(element, place)
    move = Affine2D().rotate(turn).translate(place.x, place.y) + axes.transData
    for patch in patches:
        patch.set_zorder(3)
        axes.add_patch(patch)
        patch.set_transform(move)


def _patches_and_turn(element: object, place: Place) -> tuple[list[Patch], float]:
    along = math.atan2(place.heading[1], place.heading[0])
    if place.reflects is not None and "Splitter" in type(element).__name__:
        # Seen along the beam, light turned to its left was turned by a diagonal that rises with the beam.
        left = place.heading[0] * place.reflects[1] - place.heading[1] * place.reflects[0]
        return _cube(left), along
    if type(element).__name__ in REFLECTORS:
        reflects = place.reflects or (-place.heading[0], -place.heading[1])
        # The back of a mirror looks along (heading - reflected), and its symbol has the back on the right.
        turn = math.atan2(place.heading[1] - reflects[1], place.heading[0] - reflects[0])
        return REFLECTORS[type(element).__name__](), turn
    if "Splitter" in type(element).__name__:
        return _cube(1), along
    kinds = [SYMBOLS[kind.__name__] for kind in type(element).__mro__ if kind.__name__ in SYMBOLS]
    return (kinds[0] if kinds else _unknown)(), along
