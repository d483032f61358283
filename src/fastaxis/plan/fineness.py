"""How fine samples must be at a singular axis or an edge for the light further on to be right."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass

from fastaxis.laws import Annulus, AxisLaw, Disc, ScalarLaw, TravelLaw
from fastaxis.maths import Pattern
from fastaxis.plan.sampling import Plane
from fastaxis.plan.spread import Spread
from fastaxis.plan.steps import StepLaw, Steps

__all__ = ["Need", "held", "known_tails", "needs"]

VISIBLE = 1e-3  # of the peak
# Behind a distance z, light from a singular axis or an edge changes within s = root(wavelength z). Held against the
# centred engine, pictures on samples of pitch p behind spiral plates of charge 1 to 8 and over 1 to 256 mm are wrong by
# 1e-3 of their peak from p = 0.1 s on for a charge of 1 and 0.065 s for one of 8, and by the fifth power of p below.
SINGULAR, CHARGE = 0.09, -1 / 5
# Behind holes of 0.15 to 0.8 mm, of Fresnel numbers 0.3 to 50, they are wrong by 2 to 7 times (p/s)^2 times the field
# at the edge; behind straight edges, which do not add up on any axis, by no more than (p/s)^2.
ROUND, STRAIGHT = 6.0, 1.0
# Behind an axis of charge l, samples of pitch p can't hold 0.2 to 0.5 times (l p/w)^2 of the power of a beam of radius
# w, by the factors about the axis; of low charges it depends on where among the samples that lies. The 1 % that users
# are told of is reached from l p/w = 0.146 to 0.25 on.
HELD = 0.14
# Of what all travels are long together: a plane that is imaged onto the target is there as it is, and not diffracted.
IMAGED = 1e-6


@dataclass(frozen=True)
class Need:
    """What a singular axis or an edge asks of the samples.

    Parameters
    ----------
    step : its place among the steps.
    distance : to the target [m], as if the light about it were flat there.
    pitch : largest [m].
    """

    step: int
    distance: float
    pitch: float


def needs(steps: Steps, planes: tuple[Plane, ...], wavelength: float) -> list[Need]:
    """What each singular axis and each edge asks of the samples in its plane, for the picture at the target.

    The whole way to the target counts: what is badly sampled leaves the picture as steep light, wherever parts stand.
    """
    return list(_needs(steps, planes, wavelength))


def _needs(steps: Steps, planes: tuple[Plane, ...], wavelength: float) -> Iterator[Need]:
    ahead, length = TravelLaw(), 0.0
    for index in range(len(planes) - 2, -1, -1):
        law, spread = steps[index].law, planes[index].spread
        if isinstance(law, TravelLaw):
            ahead, length = law.then(ahead), length + abs(law.b)
        elif abs(ahead.b) > IMAGED * length:
            near = ahead.a + ahead.b * spread.curvature
            distance = abs(ahead.b / near) if near else math.inf
            share = _share(law, spread, wavelength)
            if share:
                yield Need(index, distance, share * math.sqrt(wavelength * distance))


def held(steps: Steps, planes: tuple[Plane, ...], wavelength: float) -> Iterator[tuple[int, float]]:
    """Steps with a singular axis, and the pitch [m] on which 99 % of the light behind each goes on to the target.

    A camera behind a whole Fourier transform is far behind the axis, so that nothing else asks for samples about it; in
    a focus there may be few.
    """
    last = max((i for i, step in enumerate(steps) if isinstance(step.law, TravelLaw)), default=0)
    for index, (plane, step) in enumerate(zip(planes, steps[:last], strict=False)):
        law, spread = step.law, plane.spread
        if isinstance(law, AxisLaw | ScalarLaw) and (charge := _charge(law)) and not spread.infinite:
            dimness = _dimness(spread, _apart(spread, law.centre), wavelength)
            yield index, HELD / charge * 2 * spread.size * dimness


def _charge(law: AxisLaw | ScalarLaw) -> float:
    return abs(float(2 * law.order if isinstance(law, AxisLaw) else law.charge))


def _share(law: StepLaw, spread: Spread, wavelength: float) -> float:
    """Largest pitch over root(wavelength distance); 0 where nothing is singular or cut."""
    shares = []
    if isinstance(law, AxisLaw | ScalarLaw):
        charge = _charge(law)
        if charge:
            dimness = _dimness(spread, _apart(spread, law.centre), wavelength)
            shares.append(SINGULAR * charge**CHARGE * dimness**0.2)
    if isinstance(law, ScalarLaw) and law.stop is not None:
        strength = ROUND if isinstance(law.stop, Disc | Annulus) else STRAIGHT
        (x, y), (cx, cy) = spread.offset, law.centre
        inside = max(float(law.stop.depth(x - cx, y - cy)), 0.0)  # else what passes is brightest at the edge
        dimness = _dimness(spread, inside, wavelength)
        shares.append(math.sqrt(VISIBLE / strength * dimness))
    return min(shares, default=0.0)


def _dimness(spread: Spread, distance: float, wavelength: float) -> float:
    """The field in a beam's middle over that so far from it; never less than 1.

    Gaussian beyond its radius w = 2 size; of a beam M^2 times as steep, modes of higher order, M^2 times as fast.
    """
    if spread.infinite:
        return 1.0
    times = 1.0 if spread.rough else max(4 * math.pi * spread.size * spread.angle / wavelength, 1.0)
    beyond = (distance / (2 * spread.size)) ** 2 - (0.0 if times < 1.5 else 1.0)
    return math.exp(min(times * max(beyond, 0.0), 100.0))


def _apart(spread: Spread, centre: tuple[float, float]) -> float:
    return math.hypot(spread.offset[0] - centre[0], spread.offset[1] - centre[1])


def known_tails(steps: Steps, spread: Spread) -> bool:
    """Whether all slow tails of the light come from axes and edges, so that their needs tell how fine it is."""
    laws = [step.law for step in steps]
    return not spread.rough and not any(isinstance(v, Pattern) for law in laws for v in getattr(law, "values", ()))
