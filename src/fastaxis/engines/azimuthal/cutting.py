"""Into how many parts panels are cut, so that their nodes carry the fringes of a Collins kernel."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property
from typing import TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.azimuthal.panels import ORDER, Complexes, Reals

__all__ = ["Counts", "Cutting"]

Counts: TypeAlias = NDArray[np.int_]

WHOLE = 0.4  # share of the phase of a part that an uncut panel may carry
STAGE = 1.5  # output radii are taken together where their phases differ by less: a third more nodes at most
ALIKE = 4 * float(np.finfo(float).eps)
AT_RISK, NEARLY = 2, 9  # panels, places


@dataclass(frozen=True, eq=False)
class Cutting:
    """Parts of panels by the output radius, in stages: all radii of one stage share their nodes.

    Parameters
    ----------
    edges : borders of the panels [m].
    magnification : |a| of the section.
    scale : k/|b| [1/m^2].
    phase : kernel phase [rad] allowed for a part.
    soft_from : where a soft end begins [m].
    softness : widest part there [m].
    """

    edges: Reals
    magnification: float
    scale: float
    phase: float
    soft_from: float = math.inf
    softness: float = math.inf

    @cached_property
    def widths(self) -> Reals:
        return np.diff(self.edges)

    @cached_property
    def _ends(self) -> tuple[float, float]:
        """|a| r + r' [m] up to which the first two stages go: no panel is cut, or hardly any into more than two."""
        farthest, fringe = self.magnification * self.edges[-1], self.phase / (self.scale * self.widths.max())
        first = max(farthest, (1 - ALIKE) * WHOLE * fringe)
        return float(first), float(max(STAGE * first, (1 - ALIKE) * 2 * fringe))

    def stages(self, reach: Reals) -> Counts:
        """The stage of each of some output radii [m]."""
        first, second = self._ends
        whole = self.magnification * self.edges[-1] + reach
        later = np.ceil(np.log(np.maximum(whole / second, 1)) / np.log(STAGE))
        return np.asarray(np.where(whole <= first, 0, 1 + later), dtype=int)

    def _outermost(self, stages: Counts) -> Reals:
        first, second = self._ends
        whole = np.where(stages == 0, first, second * STAGE ** (stages - 1.0))
        return np.asarray(whole - self.magnification * self.edges[-1])

    def phases(self, reach: Reals) -> Reals:
        """Kernel phase [rad] on each panel for some output radii, shape (radii, panels).

        The outer end of a panel has the most fringes, and its parts are equally wide.
        """
        ends = self.magnification * self.edges[1:] + np.asarray(reach)[..., np.newaxis]
        return np.asarray(self.scale * ends * self.widths)

    def parts(self, reach: Reals) -> Counts:
        """Parts of each panel for some output radii, shape (radii, panels).

        Neighbours of one width are cut alike, so that all of their parts are of one width as well.
        """
        phase = self.phases(self._outermost(self.stages(np.asarray(reach, dtype=float))))
        # One part carries the panel's own polynomial too, so it may carry less of the kernel's phase.
        parts = np.where(phase <= WHOLE * self.phase, 1, np.maximum(2, np.ceil(phase / self.phase)))
        soft = np.where(self.edges[1:] > self.soft_from, np.ceil(self.widths / self.softness), 1)
        parts = np.maximum(parts, soft).astype(int)
        starts = np.flatnonzero(np.append(True, abs(np.diff(self.widths)) > ALIKE * self.edges[-1]))
        most = np.maximum.reduceat(parts, starts, axis=-1)
        return np.repeat(most, np.diff(np.append(starts, len(self.widths))), axis=-1)

    def borders(self, counts: Counts) -> Reals:
        """Borders [m] of the parts."""
        place = np.concatenate([np.arange(count) / count for count in counts])
        return np.append(np.repeat(self.edges[:-1], counts) + np.repeat(self.widths, counts) * place, self.edges[-1])

    def hardest(self, r: Reals, values: Complexes) -> list[int]:
        """Which of some output radii the nodes carry worst: for each of the panels most at risk, its own.

        Gauss-Legendre nodes err as the (2 ORDER)-th power of the phase that a part of a panel has.

        Parameters
        ----------
        values : at the nodes of the panels, shape (functions, panels, ORDER).
        """
        parts = self.parts(r)
        load = self.phases(r) / np.where(parts == 1, WHOLE, parts)
        light = abs(values).max(axis=(0, 2)) + np.finfo(float).tiny
        risk = np.log(light) + 2 * ORDER * np.log(load.max(axis=0))
        worst = np.argsort(risk)[: -1 - AT_RISK : -1]
        return [int(place) for panel in worst for place in np.argsort(load[:, panel])[: -1 - NEARLY : -4]]
