"""Shapes that let light through: data, with the depth of a place inside the clear area."""

from __future__ import annotations

from dataclasses import dataclass, replace
from math import pi
from typing import Any, Protocol

from fastaxis.maths import Scalar

__all__ = ["Annulus", "Disc", "HalfPlane", "Rectangle", "Stop", "Strip"]


class Stop(Protocol):
    """A clear area. Lengths in metres, in the stop's own frame."""

    @property
    def values(self) -> tuple[Scalar, ...]: ...
    @property
    def round(self) -> bool:
        """Whether turning it about its centre changes nothing."""

    def depth(self, x: Any, y: Any) -> Any:
        """Signed distance to the rim [m], positive inside the clear area."""

    def mirrored(self, axis: str = "x") -> Stop: ...


def _smaller(a: Any, b: Any) -> Any:
    # min() for numbers and arrays without an array library: (a + b - |a - b|)/2.
    return (a + b - abs(a - b)) / 2


@dataclass(frozen=True)
class Disc:
    """Clear inside a circle of this radius; with ``opaque`` clear outside it (a round obstacle)."""

    radius: Scalar
    opaque: bool = False
    round = True

    @property
    def values(self) -> tuple[Scalar, ...]:
        return (self.radius,)

    def depth(self, x: Any, y: Any) -> Any:
        depth = self.radius - (x * x + y * y) ** 0.5
        return -depth if self.opaque else depth

    def mirrored(self, axis: str = "x") -> Disc:
        return self


@dataclass(frozen=True)
class Annulus:
    """Clear between two circles."""

    inner: Scalar
    outer: Scalar
    round = True

    @property
    def values(self) -> tuple[Scalar, ...]:
        return (self.inner, self.outer)

    def depth(self, x: Any, y: Any) -> Any:
        r = (x * x + y * y) ** 0.5
        return _smaller(self.outer - r, r - self.inner)

    def mirrored(self, axis: str = "x") -> Annulus:
        return self


@dataclass(frozen=True)
class Rectangle:
    """Clear inside width (x) by height (y)."""

    width: Scalar
    height: Scalar
    round = False

    @property
    def values(self) -> tuple[Scalar, ...]:
        return (self.width, self.height)

    def depth(self, x: Any, y: Any) -> Any:
        return _smaller(self.width / 2 - abs(x), self.height / 2 - abs(y))

    def mirrored(self, axis: str = "x") -> Rectangle:
        return self


@dataclass(frozen=True)
class Strip:
    """A slit: clear within half a width of a line through the centre at ``angle`` from x."""

    width: Scalar
    angle: Scalar
    cosine: float
    sine: float
    round = False

    @property
    def values(self) -> tuple[Scalar, ...]:
        return (self.width, self.angle)

    def depth(self, x: Any, y: Any) -> Any:
        return self.width / 2 - abs(y * self.cosine - x * self.sine)

    def mirrored(self, axis: str = "x") -> Strip:
        return replace(self, angle=-self.angle, sine=-self.sine)


@dataclass(frozen=True)
class HalfPlane:
    """A knife edge: clear on the side of the direction ``(cosine, sine)`` from the centre."""

    angle: Scalar
    cosine: float
    sine: float
    round = False

    @property
    def values(self) -> tuple[Scalar, ...]:
        return (self.angle,)

    def depth(self, x: Any, y: Any) -> Any:
        return x * self.cosine + y * self.sine

    def mirrored(self, axis: str = "x") -> HalfPlane:
        if axis == "x":
            return HalfPlane(pi - self.angle, -self.cosine, self.sine)
        return HalfPlane(-self.angle, self.cosine, -self.sine)
