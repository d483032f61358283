"""The words of ``print(plan)``."""

from __future__ import annotations

import math
import textwrap
from collections.abc import Iterator
from itertools import groupby
from typing import TYPE_CHECKING

from fastaxis.conventions import stamp
from fastaxis.laws import AxisLaw, Flip, ScalarLaw, TravelLaw, Turn
from fastaxis.plan.displacement import Displacement

if TYPE_CHECKING:
    from fastaxis.plan.plan import Branch, Plan
    from fastaxis.plan.sampling import Plane
    from fastaxis.plan.steps import StepLaw, Steps

__all__ = ["explain"]

MOST_ARMS = 8  # of a cavity the first few trips tell what the rest are

WIDTH = 110  # of the lists of parts


def _said(law: StepLaw) -> str:
    if isinstance(law, TravelLaw):
        bend = f"{law.c:.4g}/m" if law.c else "0"
        return f"ABCD ({law.a:.4g}, {law.b * 1e3:.4g} mm; {bend}, {law.d:.4g}), path {law.path * 1e3:.4g} mm"
    if isinstance(law, AxisLaw):
        return f"axis law, q = {law.order:g}" if law.order else "patterned axis law"
    if isinstance(law, ScalarLaw):
        return "scalar law" + "".join(_pieces(law))
    if isinstance(law, Displacement):
        (x, y), (tx, ty) = ((1e3 * one + 0.0, 1e3 * other + 0.0) for one, other in (law.offset, law.tilt))
        return f"moved by ({x:.4g}, {y:.4g}) mm, tilted by ({tx:.4g}, {ty:.4g}) mrad"
    if isinstance(law, Turn):
        return f"picture turned by {math.degrees(law.angle):.6g} deg"
    return f"{law.axis} reversed" if isinstance(law, Flip) else "uniform matrix"


def _pieces(law: ScalarLaw) -> Iterator[str]:
    if law.charge:
        yield f", charge {law.charge:+g}"
    if law.tilt != (0.0, 0.0):
        yield f", tilt ({law.tilt[0] * 1e3:.4g}, {law.tilt[1] * 1e3:.4g}) mrad"
    if law.stop is not None:
        yield f", stop {type(law.stop).__name__}"


def _sampled(plane: Plane) -> str:
    text = f"window {plane.window * 1e3:.4g} mm, pitch {plane.pitch * 1e6:.4g} um"
    if plane.hop is not None:
        kernels = {"scaled": "scaled angular spectrum", "single": "single transform"}
        text = f"{kernels[plane.hop.kernel]} -> {text}"
    return text if math.isinf(plane.margin) else f"{text}, margin {plane.margin:.2g}"


def _branch(branch: Branch) -> Iterator[str]:
    yield f"  {branch.wavelength * 1e9:.6g} nm, {branch.power * 1e3:.6g} mW"
    if branch.path:
        yield f"  arm {branch.path}: engine {branch.engine}, path {float(branch.length) * 1e3:.6g} mm"
    if branch.round_trip is not None:
        yield from _round(branch)
        return
    sampling = branch.sampling
    if sampling is not None:
        precision = "" if sampling.precision == "double" else f", {sampling.precision} precision"
        yield f"  {sampling.grid.samples} x {sampling.grid.samples} samples ({sampling.chosen}){precision}"
        yield "  margin: of room or pitch over what the light needs; 1 or more is enough"
        if not branch.harmonic_steps:
            begins = f"{', '.join(branch.opening)} in closed form" if branch.opening else "source"
            yield f"    0. {begins}: {_sampled(sampling.planes[0])}"
    for index, step in enumerate(branch.steps, start=1):
        line, place = f"    {index}. {', '.join(step.names)}: {_said(step.law)}", index - branch.harmonic_steps
        if sampling is None or place < 0:
            yield line if sampling is None else f"{line}; by harmonics"
        elif place == 0:
            yield f"{line}; by harmonics, handed over to samples: {_sampled(sampling.planes[0])}"
        else:
            yield f"{line}; {_sampled(sampling.planes[place])}"


def _round(branch: Branch) -> Iterator[str]:
    """The ways of light that goes round: in, once round, out."""
    assert branch.round_trip is not None
    entry, once = branch.round_trip.entries[0].steps, branch.round_trip.rounds[0].steps
    out = branch.steps[len(branch.steps) - branch.last :]
    for title, steps in (("in", entry), ("round", once), ("out", out)):
        for index, step in enumerate(steps, start=1):
            yield f"    {title} {index}. {', '.join(step.names)}: {_said(step.law)}"


def _listed(when: str, steps: Steps) -> list[str]:
    """The parts in the order of the steps, those made one joined by +; one that takes several in a row named once."""
    runs = [(name, sum(1 for _ in run)) for name, run in groupby(" + ".join(step.names) for step in steps)]
    parts = [name if count == 1 else f"{name} ({count} steps)" for name, count in runs]
    text = f"{when + ':':8}{' | '.join(parts)}"
    return textwrap.wrap(text, WIDTH, initial_indent="  ", subsequent_indent=" " * 10, break_on_hyphens=False)


def explain(plan: Plan) -> str:
    """The plan as text: engine and why, the steps before and after what was fused, and these with their samples."""
    lines = [f"plan for {plan.target}: engine {plan.engine}, because {plan.reason}"]
    passes = [f"  {note}" for note in plan.notes]
    if plan.declared:
        passes = [*_listed("before", plan.declared), *passes, *_listed("after", plan.steps)]
    lines += passes
    for group in plan.groups:
        for branch in group[:MOST_ARMS]:
            lines += _branch(branch)
        if len(group) > MOST_ARMS:
            last = 1e3 * float(group[-1].length)
            lines.append(f"  and {len(group) - MOST_ARMS} longer ways, up to a path of {last:.6g} mm")
    return "\n".join([*lines, stamp()])
