"""Where light that is round about the axis at first is handed over to samples."""

from __future__ import annotations

import math
from dataclasses import replace

from fastaxis.laws import AxisLaw, ScalarLaw, TravelLaw
from fastaxis.light import Source
from fastaxis.plan.covariant import covariance_reason
from fastaxis.plan.fineness import needs
from fastaxis.plan.grid import Grid
from fastaxis.plan.sampling import Sampling, follow
from fastaxis.plan.steps import StepLaw, Steps

__all__ = ["roomier", "round_steps"]

ROOMIER = 2.5
"""Three radii of a rough beam become seven and a half.

Of windows from 3 to 14 mm on three benches (q-plate, hole, q-plate and lens) this errs least, twenty times less than
the smallest: behind a charge of 1 the tail falls as r^-2, and so does the error, until the pitch shows.
"""


def _hard_on_samples(law: StepLaw) -> bool:
    """Whether a law leaves light that samples carry badly: a singular axis, or a rim."""
    if isinstance(law, AxisLaw):
        return not law.uniform and law.order != 0
    return isinstance(law, ScalarLaw) and (law.charge != 0 or law.stop is not None)


def _travels(law: StepLaw) -> bool:
    return isinstance(law, TravelLaw) and law.b != 0


def round_steps(steps: Steps, source: Source) -> int:
    """How many steps are better done by harmonics before samples take over; 0 if none.

    It pays where a plate with a singular axis or a round rim is followed by travel, and only later by a part off the
    axis: harmonics follow the singular light exactly, and what arrives behind the travel is smooth.
    """
    end = next((i for i in range(len(steps)) if covariance_reason(steps[i : i + 1], source)), len(steps))
    hard = [i for i in range(end) if _hard_on_samples(steps[i].law)]
    travels = [i for i in range(end) if _travels(steps[i].law)]
    if end == len(steps) or not hard or not travels or travels[-1] < hard[0]:
        return 0
    count = travels[-1] + 1
    return 0 if covariance_reason(steps[:count], source) else count


def roomier(sampling: Sampling, steps: Steps, wavelength: float) -> Sampling:
    """The same number of samples on a wider window, as far as its pitch allows.

    A window for light at a rim is as small as can be, since the rim wants a fine pitch. Light that has travelled on
    from it has no rim but a tail; cut too early, the tail costs more than a coarser pitch.
    """
    here = sampling.planes[0]
    spare = math.sqrt(here.band / here.room)
    if not 1 < spare < math.inf:
        return sampling
    grid = Grid(sampling.grid.samples, sampling.grid.window * min(spare, ROOMIER))
    planes = follow(steps, here.spread, grid, wavelength)
    least = min(min(plane.room, plane.band) for plane in planes)
    wider = replace(sampling, grid=grid, planes=planes)
    fine = all(planes[need.step + 1].pitch <= need.pitch for need in needs(steps, planes, wavelength))
    return wider if least >= 1 and fine else sampling
