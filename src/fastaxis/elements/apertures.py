"""Stops in the beam: round, rectangular, slit, knife edge, ring, and the round obstacle."""

from __future__ import annotations

from dataclasses import dataclass
from math import cos, sin
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.errors import FastaxisWarning, ParameterError, SymbolError
from fastaxis.laws import ScalarLaw, stops
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["Annulus", "Aperture", "KnifeEdge", "Obstacle", "RectangularAperture", "Slit"]

LARGEST = 1.0  # [m]; a bare number of millimetres lies beyond


@dataclass(frozen=True, kw_only=True)
class _StopElement(ThroughElement):
    """A part that lets light through a clear area and absorbs the rest."""

    centre: tuple[Scalar, Scalar] = (0.0, 0.0)

    stem: ClassVar[str] = "stop"

    @property
    def clear(self) -> stops.Stop:
        """The clear area."""
        raise NotImplementedError

    def __post_init__(self) -> None:
        self._keep(centre=checks.centre(self.label, self.centre))

    def _keep_lengths(self, *names: str) -> None:
        for parameter in names:
            value = getattr(self, parameter)
            self._keep(
                **{parameter: checks.length(self.label, parameter, value, most=LARGEST, fix=f"{parameter}=2*mm")}
            )

    def _keep_angle(self) -> None:
        angle = checks.angle(self.label, "angle", self.angle)  # type: ignore[attr-defined]  # of those that have one
        if is_symbolic(angle):
            raise SymbolError(
                "an edge is drawn on a grid and needs its angle as a number",
                got=f"{self.label}: angle = {angle}",
                fix="angle=45*deg",
            )
        self._keep(angle=angle)

    def laws(self, wavelength: Scalar) -> tuple[ScalarLaw, ...]:
        return (ScalarLaw(stop=self.clear, centre=self.centre),)

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        lengths = [(n, v) for n, v in self.parameters().items() if n not in ("centre", "angle", "expects")]
        found = [c for n, v in lengths for c in checks.usual(self.label, n, v, 0.1, fix=f"{n}={v}*mm")]
        return super().cautions(wavelength) + found


@dataclass(frozen=True, kw_only=True)
class Aperture(_StopElement):
    """Round hole: light passes within ``radius`` of the centre.

    Parameters
    ----------
    radius : [m], half the diameter.
    centre : (x, y) [m].

    Raises
    ------
    ParameterError : a radius of zero or less, or so large that its unit is missing.

    Examples
    --------
    >>> Aperture(radius=2e-3).clear.depth(0.0, 0.0)
    0.002
    """

    radius: Scalar

    def __post_init__(self) -> None:
        super().__post_init__()
        self._keep_lengths("radius")

    @property
    def clear(self) -> stops.Disc:
        return stops.Disc(self.radius)


@dataclass(frozen=True, kw_only=True)
class Obstacle(_StopElement):
    """Round opaque spot: light passes beyond ``radius`` of the centre.

    Parameters
    ----------
    radius : [m], half the diameter.
    centre : (x, y) [m].

    Examples
    --------
    >>> Obstacle(radius=2e-3).clear.depth(0.0, 0.0)
    -0.002
    """

    radius: Scalar

    def __post_init__(self) -> None:
        super().__post_init__()
        self._keep_lengths("radius")

    @property
    def clear(self) -> stops.Disc:
        return stops.Disc(self.radius, opaque=True)


@dataclass(frozen=True, kw_only=True)
class Annulus(_StopElement):
    """Ring-shaped hole: light passes between two circles.

    Parameters
    ----------
    inner, outer : radii [m], inner < outer.
    centre : (x, y) [m].

    Raises
    ------
    ParameterError : inner not below outer.

    Examples
    --------
    >>> Annulus(inner=1e-3, outer=2e-3).clear.depth(1.5e-3, 0.0)
    0.0005
    """

    inner: Scalar
    outer: Scalar

    def __post_init__(self) -> None:
        super().__post_init__()
        self._keep_lengths("inner", "outer")
        if not (is_symbolic(self.inner) or is_symbolic(self.outer)) and self.inner >= self.outer:
            raise ParameterError(
                "the inner radius of a ring is smaller than the outer one",
                got=f"{self.label}: inner = {self.inner:g}, outer = {self.outer:g}",
                fix=f"inner={self.outer * 500:g}*mm, outer={self.outer * 1000:g}*mm",
            )

    @property
    def clear(self) -> stops.Annulus:
        return stops.Annulus(self.inner, self.outer)


@dataclass(frozen=True, kw_only=True)
class RectangularAperture(_StopElement):
    """Rectangular hole with its sides along x and y.

    Parameters
    ----------
    width : along x [m].
    height : along y [m].
    centre : (x, y) [m].

    Examples
    --------
    >>> RectangularAperture(width=4e-3, height=2e-3).clear.depth(0.0, 0.0)
    0.001
    """

    width: Scalar
    height: Scalar

    def __post_init__(self) -> None:
        super().__post_init__()
        self._keep_lengths("width", "height")

    @property
    def clear(self) -> stops.Rectangle:
        return stops.Rectangle(self.width, self.height)


@dataclass(frozen=True, kw_only=True)
class Slit(_StopElement):
    """Long slit through the centre.

    Parameters
    ----------
    width : [m], across the slit.
    angle : of the slit's long side [rad], counter-clockwise from x facing the source; 90 deg is an upright slit.
    centre : (x, y) [m].

    Raises
    ------
    SymbolError : a letter for the angle.

    Examples
    --------
    >>> Slit(width=2e-3, angle=0).clear.depth(5.0, 0.0)
    0.001
    """

    width: Scalar
    angle: Scalar = 1.5707963267948966  # upright, as slits are mounted

    def __post_init__(self) -> None:
        super().__post_init__()
        self._keep_lengths("width")
        self._keep_angle()

    @property
    def clear(self) -> stops.Strip:
        return stops.Strip(self.width, self.angle, cos(self.angle), sin(self.angle))


@dataclass(frozen=True, kw_only=True)
class KnifeEdge(_StopElement):
    """Knife edge through ``centre``: light passes on one side.

    Parameters
    ----------
    angle : direction from the centre into the clear side [rad]: 0 lets x > 0 pass, 90 deg lets y > 0 pass.
    centre : a point (x, y) on the edge [m].

    Raises
    ------
    SymbolError : a letter for the angle.

    Examples
    --------
    >>> KnifeEdge(angle=0).clear.depth(1e-3, 7.0)
    0.001
    """

    angle: Scalar = 0.0

    stem: ClassVar[str] = "knife"

    def __post_init__(self) -> None:
        super().__post_init__()
        self._keep_angle()

    @property
    def clear(self) -> stops.HalfPlane:
        return stops.HalfPlane(self.angle, cos(self.angle), sin(self.angle))
