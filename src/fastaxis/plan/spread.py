"""How wide a beam is and how fast it spreads, followed through the steps by second moments."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

from fastaxis.laws import Annulus, AxisLaw, Disc, Flip, Rectangle, ScalarLaw, Stop, Strip, TravelLaw, Turn
from fastaxis.light import Beam, Mode, SampledMode
from fastaxis.maths import Pattern
from fastaxis.plan.displacement import Displacement
from fastaxis.plan.steps import StepLaw
from fastaxis.plan.turning import turned

__all__ = ["Spread", "clear_width", "closed", "of_beam", "reach"]

Pair = tuple[float, float]

SMOOTH_RADII = 6.0  # exp(-6^2) = 2e-16: a Gaussian field has fallen below its own rounding
ROUGH_RADII = 3.0  # for edges, whose light falls off by a power law and not beyond some radius


@dataclass(frozen=True)
class Spread:
    """Second moments of a beam on its worse axis, in the terms a sampled field needs.

    Parameters
    ----------
    size : rms half-width [m]; w/2 for a Gaussian. Infinite for a plane wave that met no stop.
    curvature : 1/R [1/m] of the mean phase front, cov(x, angle)/var(x).
    angle : rms angle [rad] left when that curvature is taken out; M^2 wavelength/(4 pi size).
    offset, slope : where the beam's middle is (x, y) [m] and where it heads [rad].
    rough : whether an edge, a mask or a singularity has left tails that fall off slowly.
    whole : whether samples must hold all of it at the source, since they are scaled to unit power.
    """

    size: float
    curvature: float
    angle: float
    offset: tuple[float, float] = (0.0, 0.0)
    slope: tuple[float, float] = (0.0, 0.0)
    rough: bool = False
    whole: bool = False

    @property
    def infinite(self) -> bool:
        return math.isinf(self.size)

    @property
    def radii(self) -> float:
        """How many beam radii (2 rms) a window half must hold."""
        return ROUGH_RADII if self.rough else SMOOTH_RADII

    @property
    def half_window(self) -> float:
        """Half side of the window that holds the beam [m]; 0 where a plane wave asks for none."""
        return 0.0 if self.infinite else max(map(abs, self.offset)) + self.radii * 2 * self.size

    def half_band(self, wavelength: float) -> float:
        """Highest spatial frequency [1/m] with the mean curvature taken out."""
        return (self.leaning + self.radii * 2 * self.angle) / wavelength

    @property
    def leaning(self) -> float:
        """Steepest angle [rad] of the beam's middle with the mean curvature taken out."""
        return max(abs(t - self.curvature * x) for x, t in zip(self.offset, self.slope, strict=True))

    def through(self, travel: TravelLaw) -> Spread:
        """After an ABCD section."""
        a, b, c, d = travel.a, travel.b, travel.c, travel.d
        near, far = a + b * self.curvature, c + d * self.curvature
        (x, y), (tx, ty) = self.offset, self.slope
        offset, slope = (a * x + b * tx, a * y + b * ty), (c * x + d * tx, c * y + d * ty)
        if self.infinite:
            return replace(self, curvature=far / near if near else 0.0, offset=offset, slope=slope)
        x2 = (near * self.size) ** 2 + (b * self.angle) ** 2
        xt = near * far * self.size**2 + b * d * self.angle**2
        size = math.sqrt(x2)
        return replace(
            self, size=size, curvature=xt / x2, angle=self.size * self.angle / size, offset=offset, slope=slope
        )

    def past(self, law: StepLaw, wavelength: float) -> Spread:
        """After any law."""
        if isinstance(law, TravelLaw):
            return self.through(law)
        if isinstance(law, Flip | Turn | Displacement):
            return self._moved(law)
        if isinstance(law, AxisLaw):
            spread = self if law.order == 0 else self.twisted(2 * law.order, wavelength)
            return spread if law.uniform or law.order != 0 else replace(spread, rough=True)
        if isinstance(law, ScalarLaw):
            return self._past_scalar(law, wavelength)
        return self

    def _moved(self, law: Flip | Turn | Displacement) -> Spread:
        if isinstance(law, Flip):
            return replace(self, offset=_reversed(self.offset, law.axis), slope=_reversed(self.slope, law.axis))
        if isinstance(law, Turn):
            return replace(self, offset=turned(self.offset, law.angle), slope=turned(self.slope, law.angle))
        return replace(self, offset=_added(self.offset, law.offset), slope=_added(self.slope, law.tilt))

    def _past_scalar(self, law: ScalarLaw, wavelength: float) -> Spread:
        spread = self if law.charge == 0 else self.twisted(law.charge, wavelength)
        if any(isinstance(v, Pattern) for v in law.transmission.values):
            spread = replace(spread, rough=True)
        (sx, sy), (tx, ty), (x, y), (cx, cy) = spread.slope, law.tilt, spread.offset, law.centre
        slope = (sx + tx - law.vergence * (x - cx), sy + ty - law.vergence * (y - cy))
        spread = replace(spread, slope=slope, curvature=spread.curvature - law.vergence)
        return spread if law.stop is None else spread.clipped(law.stop, law.centre, wavelength)

    def twisted(self, charge: float, wavelength: float) -> Spread:
        """After a phase of this many turns about the axis, which leaves tails of the far field.

        Its mean square angle (charge wavelength/2 pi)^2 <1/r^2>/2 grows with the logarithm of the finest step kept;
        the value with <1/r^2> = 4/(2 size)^2, a ring of half the beam radius, is used.
        """
        if self.infinite:
            return replace(self, rough=True)
        added = abs(charge) * wavelength / (2 * math.pi * math.sqrt(2) * self.size)
        return replace(self, angle=math.hypot(self.angle, added), rough=True)

    def clipped(self, stop: Stop, centre: tuple[float, float], wavelength: float) -> Spread:
        """After a stop; unchanged if the beam is well inside it."""
        radius, (cx, cy) = reach(stop), centre
        if not closed(stop):
            return replace(self, rough=True)
        apart = max(abs(self.offset[0] - cx), abs(self.offset[1] - cy))
        if not self.infinite and self.radii * 2 * self.size + apart < radius:
            return self
        size = min(self.size, radius / 2)
        offset = (cx, cy) if self.infinite or radius < self.size else self.offset
        return Spread(
            size, self.curvature, max(self.angle, wavelength / (2 * math.pi * size)), offset, self.slope, True
        )


def _added(one: Pair, other: Pair) -> Pair:
    return (one[0] + other[0], one[1] + other[1])


def _reversed(pair: Pair, axis: str) -> Pair:
    return (-pair[0], pair[1]) if axis == "x" else (pair[0], -pair[1])


def reach(stop: Stop) -> float:
    """Radius [m] of the circle that holds the edges of a stop; 0 for a straight edge."""
    if isinstance(stop, Disc):
        return float(stop.radius)
    if isinstance(stop, Annulus):
        return float(stop.outer)
    if isinstance(stop, Rectangle):
        return float(max(stop.width, stop.height)) / 2
    return float(stop.width) / 2 if isinstance(stop, Strip) else 0.0


def clear_width(stop: Stop) -> float:
    """Area over perimeter [m] of a clear area, or of an obstacle: half the width of a slit, half the radius of a disc.

    Samples of pitch p keep 1 - p/(6 clear_width) of the power of even light that passes: an edge that crosses a sample
    lets c of the power through and c^2 of it into the samples, and c - c^2 is 1/6 on average. Infinite for a straight
    edge, which takes its share of whatever light there is.
    """
    if isinstance(stop, Disc):
        return float(stop.radius) / 2
    if isinstance(stop, Annulus):
        return float(stop.outer - stop.inner) / 2
    if isinstance(stop, Rectangle):
        width, height = float(stop.width), float(stop.height)
        return width * height / (2 * (width + height))
    return float(stop.width) / 2 if isinstance(stop, Strip) else math.inf


def closed(stop: Stop) -> bool:
    """Whether the clear area is bounded on all sides."""
    return isinstance(stop, Annulus | Rectangle) or (isinstance(stop, Disc) and not stop.opaque)


def of_beam(beam: Beam, wavelength: float) -> Spread:
    """The spread of the light at the source: the widest and steepest of its modes.

    Modes of one beam may be focused differently; what the curvature of the widest leaves of the others is angle.
    """
    spreads = [_of_mode(term.mode, wavelength) for term in beam.terms]
    widest = max(spreads, key=lambda spread: spread.size)
    farthest = max(spreads, key=lambda spread: max(map(abs, spread.offset)))
    angle = max(_angle_beside(spread, widest.curvature) for spread in spreads)
    rough, whole = any(spread.rough for spread in spreads), any(spread.whole for spread in spreads)
    return replace(widest, angle=angle, offset=farthest.offset, rough=rough, whole=whole)


def _angle_beside(spread: Spread, curvature: float) -> float:
    if spread.infinite:
        return 0.0
    return math.hypot(spread.angle, (spread.curvature - curvature) * spread.size)


def _of_mode(mode: Mode, wavelength: float) -> Spread:
    if mode.infinite:
        return Spread(math.inf, 0.0, 0.0)
    moments = mode.moments(wavelength)
    size, curvature = math.sqrt(moments.x2), mode.curvature(wavelength)
    x, y = getattr(mode, "centre", (0.0, 0.0))
    centre, whole = (float(x), float(y)), mode.hard or isinstance(mode, SampledMode)
    least = wavelength / (2 * math.pi * size)
    if math.isinf(moments.t2):
        return Spread(size, curvature, least, centre, rough=True, whole=whole)
    # Never below the diffraction limit, which rounding of a difference of large moments could reach.
    angle = math.sqrt(max(moments.t2 - (moments.xt / size) ** 2, (least / 2) ** 2))
    return Spread(size, curvature, angle, centre, rough=mode.hard, whole=whole)
