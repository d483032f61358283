"""Samples for the grid engine: how many, how wide, and which transform at each travel."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass

from fastaxis.laws import ScalarLaw, TravelLaw
from fastaxis.plan.grid import Grid
from fastaxis.plan.spread import Spread
from fastaxis.plan.steps import Steps

__all__ = ["Hop", "Plane", "Sampling", "follow", "turned_at"]


@dataclass(frozen=True)
class Hop:
    """How one ABCD section is computed.

    Parameters
    ----------
    kernel : "scaled" (angular spectrum, then magnified) or "single" (one transform of the chirped field).
    curvature : reference curvature [1/m] the samples are referred to before the hop.
    """

    kernel: str
    curvature: float


@dataclass(frozen=True)
class Plane:
    """The samples and the beam after a step (the first one: at the source).

    Parameters
    ----------
    samples, window : number along a side and side [m].
    spread : second moments of the beam.
    room : half window over the half window the beam needs; 1 or more is enough.
    band : highest frequency of the samples over the highest of the beam; 1 or more is enough.
    hop : how the light came here, if it travelled.
    kept : curvature [1/m] that the samples keep apart: with it they hold all of the light.
    beside, leaning : for a beam further off the axis, or turned further, than it is wide or spreads: what is left
        between its middle and the edge of window or band, over what it needs about its middle. Such a beam may be over
        the edge as a whole, and in again at the other side, where no guard of that edge sees it.
    """

    samples: int
    window: float
    spread: Spread
    room: float
    band: float
    hop: Hop | None = None
    kept: float = 0.0
    beside: float = math.inf
    leaning: float = math.inf

    @property
    def pitch(self) -> float:
        """Distance of neighbouring samples [m]."""
        return self.window / self.samples

    @property
    def margin(self) -> float:
        """The smaller of what window and band leave; of light with slow tails the band holds the middle only."""
        return min(self.width_margin, self.pitch_margin)

    @property
    def width_margin(self) -> float:
        """What the window leaves."""
        return min(self.room, self.beside)

    @property
    def pitch_margin(self) -> float:
        """What the band leaves."""
        return self.leaning if self.spread.rough else min(self.band, self.leaning)


def _plane(  # noqa: PLR0917 - what a plane is made of, in its order
    samples: int, window: float, spread: Spread, wavelength: float, kept: float, hop: Hop | None = None
) -> Plane:
    needed, steepest = spread.half_window, spread.half_band(wavelength)
    half, highest = window / 2, samples / (2 * window) if window else math.inf
    room = half / needed if needed else math.inf
    band = highest / steepest if steepest else math.inf
    off = 0.0 if spread.infinite else max(map(abs, spread.offset))
    beside, leaning = _left(half, needed, off), _left(highest, steepest, spread.leaning / wavelength)
    return Plane(samples, window, spread, room, band, hop, kept, beside, leaning)


def _left(edge: float, needed: float, middle: float) -> float:
    """Space between a beam's middle and an edge over what it needs there, if it is further out than that."""
    about = needed - middle
    if about <= 0:  # a plane wave needs nothing but its middle
        return math.inf if middle <= edge else 0.0
    return (edge - middle) / about if about < middle else math.inf


@dataclass(frozen=True)
class Sampling:
    """The samples where they begin and at every step.

    Parameters
    ----------
    grid : at the source, whether or not there is any need for them there.
    planes : after each step; ``planes[0]`` is where samples begin, most often the source itself.
    taper : whether a plane wave fades out smoothly at the window's edge, where an open stop does not bound it.
    chosen : "automatic" or "by hand".
    precision : "double", or "single" for half the memory and six digits.
    turned : whether an odd number of single transforms lies between the source and where samples begin: windows there
        grow as the pitch at the source shrinks.
    known : whether axes and edges are all that keeps the light from falling off fast, so that what they ask of the
        pitch tells whether it is fine enough.
    named : the grid that was named when the plan was cautioned of; None if it was not.
    """

    grid: Grid
    planes: tuple[Plane, ...]
    taper: bool = False
    chosen: str = "automatic"
    precision: str = "double"
    turned: bool = False
    known: bool = False
    named: Grid | None = None

    @property
    def worst(self) -> Plane:
        """The plane with the least margin."""
        return min(self.planes, key=lambda plane: plane.margin)

    def hop(self, index: int) -> Hop | None:
        """How step ``index`` travels."""
        return self.planes[index + 1].hop


def turned_at(planes: tuple[Plane, ...], index: int) -> bool:
    """Whether an odd number of single transforms leads to a plane, so that window and band have changed places."""
    singles = [plane for plane in planes[: index + 1] if plane.hop and plane.hop.kernel == "single"]
    return len(singles) % 2 == 1


def _hops(here: Plane, travel: TravelLaw, wavelength: float) -> Iterator[Plane]:
    """The plane after a travel, by each kernel that can be used.

    Scaled: the window is magnified by A' = A + B curvature. Single: its side becomes wavelength |B| / pitch. With the
    mean curvature taken out a beam turns least from sample to sample. Of light with slow tails that is true of its
    middle only; behind a single transform the tails fill the window, and against another curvature than the one kept
    apart they would turn by more than samples show.
    """
    spread = here.spread
    curvature = here.kept if spread.rough else spread.curvature
    near, far = travel.a + travel.b * curvature, travel.c + travel.d * curvature
    after = spread.through(travel)
    if near != 0:
        hop = Hop("scaled", curvature)
        yield _plane(here.samples, abs(near) * here.window, after, wavelength, far / near, hop)
    if travel.b != 0 and not spread.infinite:
        hop = Hop("single", curvature)
        window = wavelength * abs(travel.b) / here.pitch
        # A smooth beam may be referred to its own curvature before a part makes it rough.
        kept = travel.d / travel.b if after.rough else after.curvature
        yield _plane(here.samples, window, after, wavelength, kept, hop)


def _best(planes: list[Plane]) -> Plane:
    """The better kernel: the larger margin, and for light with slow tails the larger window.

    The larger window is the critical sampling rule (D. G. Voelz and M. C. Roggemann, Appl. Opt. 48, 6132 (2009)):
    up to pitch = wavelength B / window the transfer function is sampled well enough, beyond it the chirp is.
    """
    if planes[0].spread.rough:
        return max(planes, key=lambda plane: plane.window)
    return max(planes, key=lambda plane: plane.margin)


def follow(steps: Steps, spread: Spread, grid: Grid, wavelength: float) -> tuple[Plane, ...]:
    """The planes a grid at the source leads to, one for the source and one after each step."""
    planes = [_plane(grid.samples, grid.window, spread, wavelength, spread.curvature)]
    for step in steps:
        here = planes[-1]
        if isinstance(step.law, TravelLaw):
            ahead = list(_hops(here, step.law, wavelength))
            if not ahead:  # a plane wave at its own focus: no grid holds a point
                planes.append(Plane(here.samples, 0.0, here.spread, 0.0, 0.0))
                break
            planes.append(_best(ahead))
        else:
            kept = here.kept - (step.law.vergence if isinstance(step.law, ScalarLaw) else 0.0)
            spread = here.spread.past(step.law, wavelength)
            planes.append(_plane(here.samples, here.window, spread, wavelength, kept))
    return tuple(planes)
