"""A branch without the uniform parts that can be met after all else, and what they do together."""

from __future__ import annotations

from dataclasses import replace
from functools import reduce

from fastaxis.laws import Flip, ScalarLaw, TravelLaw, Turn
from fastaxis.plan.plan import Branch
from fastaxis.plan.steps import JonesStep

__all__ = ["without_last_plates"]


def without_last_plates(branch: Branch) -> tuple[Branch, JonesStep]:
    """The branch without the uniform matrices behind its last patterned plate, and their product.

    What stands behind that plate treats both polarizations alike, so those matrices may as well act on the light at
    the target. Light that goes round meets its matrices many times: it is left as it is.
    """
    if branch.round_trip is not None or branch.network is not None:
        return branch, JonesStep()
    found: list[int] = []
    product = JonesStep()
    for index in reversed(range(len(branch.steps))):
        law = branch.steps[index].law
        if isinstance(law, JonesStep):
            found.append(index)
            product = law.then(product)
        elif not isinstance(law, ScalarLaw | TravelLaw | Flip | Turn):
            break
    return reduce(_without, found, branch), product


def _without(branch: Branch, index: int) -> Branch:
    steps, first, sampling = branch.steps, branch.harmonic_steps, branch.sampling
    kept = steps[:index] + steps[index + 1 :]
    if index < first:
        return replace(branch, steps=kept, harmonic_steps=first - 1)
    if sampling is None:
        return replace(branch, steps=kept)
    place = index - first + 1  # of the plane behind the step; the first one is where samples begin
    planes = sampling.planes[:place] + sampling.planes[place + 1 :]
    return replace(branch, steps=kept, sampling=replace(sampling, planes=planes))
