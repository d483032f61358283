"""Light that is round about the axis at first: harmonics up to a plane, samples from there on."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING, cast

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines import azimuthal, grid
from fastaxis.engines.grid.guard import edge_watched
from fastaxis.engines.grid.light import GridLight, axis, curve, inner, multiply_separable
from fastaxis.plan import Branch

if TYPE_CHECKING:
    from fastaxis.plan.sampling import Sampling

__all__ = ["begun", "combined", "continued", "finished", "run"]

combined = grid.combined

Complexes = NDArray[np.complex128]

SAME_STATE = 1e-13  # of the peak: what the harmonics themselves are settled to


def run(branch: Branch) -> grid.GridField | grid.FarField:
    """The light of a branch at its target."""
    return finished(continued(begun(branch), branch, 0, len(branch.steps)), branch)


def begun(branch: Branch) -> GridLight:
    """The light of a branch on samples, behind the steps that harmonics do."""
    sampling = cast("Sampling", branch.sampling)
    first = replace(branch, steps=branch.steps[: branch.harmonic_steps], sampling=None)
    x, curvature = axis(sampling.grid.samples, sampling.grid.pitch), sampling.planes[0].kept
    samples, jones = _scalar(azimuthal.run(first).at(x, x))
    multiply_separable(samples, curve(x, -curvature, branch.wavelength))
    kind = np.complex64 if sampling.precision == "single" else np.complex128
    light = GridLight(samples.astype(kind, copy=False), jones, sampling.grid.pitch, curvature, branch.wavelength)
    return edge_watched(light)


def continued(light: GridLight, branch: Branch, first: int, end: int) -> GridLight:
    """Light before step ``first`` taken to before step ``end``; what harmonics did is done."""
    done = branch.harmonic_steps
    return grid.continued(light, _rest(branch), max(first - done, 0), max(end - done, 0))


def finished(light: GridLight, branch: Branch) -> grid.GridField | grid.FarField:
    """Light at the target of a branch, looked over."""
    return grid.finished(light, _rest(branch))


def _rest(branch: Branch) -> Branch:
    return replace(branch, steps=branch.steps[branch.harmonic_steps :], harmonic_steps=0)


def _scalar(field: Complexes) -> tuple[Complexes, Complexes | None]:
    """One scalar field and a Jones vector where the state is the same everywhere; else the field as it is."""
    parts = field[:1], field[1:]
    powers = [inner(part, part).real for part in parts]
    main = int(np.argmax(powers))
    if powers[main] == 0:
        return field, None
    share = inner(parts[main], parts[1 - main]) / powers[main]
    if abs(field[1 - main] - share * field[main]).max() > SAME_STATE * abs(field[main]).max():
        return field, None
    jones = np.empty(2, dtype=complex)
    jones[main], jones[1 - main] = 1, share
    return field[main][np.newaxis].copy(), jones
