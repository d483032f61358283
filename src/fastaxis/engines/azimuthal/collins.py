"""Travel through an ABCD section: the Collins integral of each harmonic, by quadrature fine enough for its kernel.

For a field sum of f_l(r) exp(i l phi) the two-dimensional integral of Collins (1970) becomes

    g_l(r') = (-i)^(l+1) (k/B) exp(i k D r'^2/2B)  int f_l(r) exp(i k A r^2/2B) J_l(k r r'/B) r dr

for either sign of B and l, the carrier exp(ikL) left out. Both fields are kept relative to a parabolic phase front,
which is a lens before and a lens behind the section and so only changes the matrix.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from functools import cached_property, partial
from itertools import pairwise

import numpy as np

from fastaxis.engines.azimuthal.bessel import bessel
from fastaxis.engines.azimuthal.condensing import condensed, enough, read, spanned
from fastaxis.engines.azimuthal.cutting import Cutting
from fastaxis.engines.azimuthal.far import far_from, far_runs, far_sums
from fastaxis.engines.azimuthal.octaves import octave_sums, octaves_of
from fastaxis.engines.azimuthal.panels import ORDER, Complexes, Profile, Reals
from fastaxis.engines.azimuthal.products import product
from fastaxis.engines.azimuthal.taper import Taper
from fastaxis.engines.memory import Memory
from fastaxis.laws import TravelLaw

__all__ = ["Collins", "turn"]

BLOCK = 1 << 16  # kernel values at a time: half a megabyte stays in the cache of a core
RADII = 192  # done at a time: their sines and cosines stay in the cache
NEAR = 4  # times as far from the axis as kernels with small arguments for all nodes
SPARED = 2  # times as few nodes and radii as there are, or they are not worth finding
FEW = 12  # radii not worth a block of their own
TURNS = (1, 1j, -1, -1j)

KERNELS = Memory(0.25)


def _kernel(order: int, scale: float, r_in: Reals, r_out: Reals) -> Reals:
    """J_order(scale r' r), shape (out, in); the last ones are kept, since turning a plate changes none of them."""
    key = (order, scale, r_in.tobytes(), r_out.tobytes())
    kernel: Reals | None = KERNELS.get(key)
    if kernel is None:
        kernel = bessel(order, np.multiply.outer(scale * r_out, r_in))
        KERNELS.put(key, kernel, kernel.nbytes)
    return kernel


def turn(charge: int, b: float) -> complex:
    """(-i)^(l+1), and the sign that takes J_l of a positive argument to the kernel of any l and b.

    J_{-l} = (-1)^l J_l, and J_l(-x) = (-1)^l J_l(x).
    """
    odd = charge % 2 and (charge < 0) != (b < 0)
    return TURNS[-(charge + 1) % 4] * (-1 if odd else 1)


@dataclass(frozen=True, eq=False)
class Collins:
    """One section, ready to be asked for the field behind it at any radius.

    Parameters
    ----------
    profile : radial functions before the section, relative to ``before``.
    charges : l of each.
    wavenumber : k [1/m].
    section : the ray matrix; its b is not zero.
    before, behind : curvatures 1/R [1/m] of the phase fronts that the fields are relative to.
    taper : soft end of a profile that had to be cut.
    phase : kernel phase [rad] allowed for a part of a panel.
    """

    profile: Profile
    charges: tuple[int, ...]
    wavenumber: float
    section: TravelLaw
    before: float
    behind: float
    taper: Taper | None = None
    phase: float = 40.0

    @cached_property
    def flat(self) -> TravelLaw:
        """The section between the two reference fronts, on which the fields are smooth."""
        return TravelLaw.lens(-self.before).then(self.section).then(TravelLaw.lens(self.behind))

    def finer(self) -> Collins:
        """The same with half the phase a part and, if cut, cut earlier: what differs is the error."""
        taper = self.taper.earlier() if self.taper else None
        return replace(self, phase=self.phase / 2, taper=taper)

    def phases(self, reach: float) -> float:
        """Largest phase [rad] whose rounding enters, for output radii up to ``reach``; at least 1."""
        flat, k = self.flat, self.wavenumber
        return float(
            1 + k / abs(flat.b) * float(max(abs(flat.a) * self.profile.end**2 / 2, abs(flat.d) * reach**2 / 2))
        )

    def __call__(self, r: Reals) -> Complexes:
        """The fields at radii r [m], relative to the front ``behind``; shape (functions, len(r))."""
        out = np.empty((len(self.charges), len(r)), dtype=complex)
        rank = np.argsort(r, kind="stable")
        stages = self.cutting.stages(r[rank])
        for some in np.split(rank, np.flatnonzero(np.diff(stages)) + 1):
            if len(some):
                out[:, some] = self._at_stage(r[some])
        flat, k = self.flat, self.wavenumber
        turns = np.array([turn(charge, flat.b) for charge in self.charges])
        return np.asarray(out * turns[:, np.newaxis] * (k / flat.b * np.exp(1j * k * flat.d / flat.b / 2 * r**2)))

    def _at_stage(self, r: Reals) -> Complexes:
        """The integrals at ascending radii of one stage, in groups that have large arguments in common."""
        flat, k = self.flat, self.wavenumber
        counts = self.cutting.parts(r[-1])
        nodes, weights, values = self.profile.refined(counts)
        if self.taper:
            values = values * self.taper(nodes)
        values = values * (weights * nodes * np.exp(1j * k * flat.a / flat.b / 2 * nodes**2))
        borders, out = self.cutting.borders(counts), np.empty((len(self.charges), len(r)), dtype=complex)
        for order in {abs(charge) for charge in self.charges}:
            rows = [i for i, charge in enumerate(self.charges) if abs(charge) == order]
            scale, left = self.cutting.scale, len(r)
            for some in octaves_of(order, scale, r, nodes):
                near = partial(self._near_sums, order)
                out[rows, some] = octave_sums(order, scale, r[some], nodes, values[rows], near)
                left = some.start
            if left:
                out[rows, :left] = self._nearer(order, borders, nodes, values[rows], r[:left])
        return out

    def _nearer(self, order: int, borders: Reals, nodes: Reals, values: Complexes, r: Reals) -> Complexes:
        """The sums at radii that no octave is full of."""
        if self._spares(nodes, r):
            return self._near_sums(order, nodes, values, r)
        out = np.empty((len(values), len(r)), dtype=complex)
        for some in self._groups(r):
            out[:, some] = self._transform(order, borders, nodes, values, r[some])
        return out

    def _fewer(self, nodes: Reals, r: Reals) -> tuple[int, int]:
        """How many nodes and radii carry the kernel between all of these."""
        scale = self.cutting.scale
        return enough(scale * r[-1] * (nodes[-1] - nodes[0])), enough(scale * nodes[-1] * (r[-1] - r[0]))

    def _spares(self, nodes: Reals, r: Reals) -> bool:
        count, radii = self._fewer(nodes, r)
        return bool(SPARED * max(count, radii) <= len(r) and SPARED * count <= len(nodes))

    def _groups(self, r: Reals) -> list[slice]:
        """Few of the kernels to places near the axis have large arguments, and most of the others."""
        near = int(np.searchsorted(r, NEAR * far_from(1) / (self.cutting.scale * self.profile.end)))
        ends = [0, *((near,) if len(r) - near >= FEW else ()), len(r)]
        return [
            slice(start, min(start + RADII, stop)) for low, stop in pairwise(ends) for start in range(low, stop, RADII)
        ]

    def _transform(self, order: int, borders: Reals, nodes: Reals, values: Complexes, r: Reals) -> Complexes:
        """Sums over the nodes: those of large arguments run by run, the others by a kernel."""
        runs = far_runs(order, self.cutting.scale, r, borders)
        parts = values.reshape(len(values), -1, ORDER)
        total, near = np.zeros((len(values), len(r)), dtype=complex), np.ones(len(borders) - 1, dtype=bool)
        for run in runs:
            total += far_sums(order, self.cutting.scale, r, borders[run.start : run.stop + 1], parts[:, run])
            near[run] = False
        if near.any():
            rest = parts[:, near].reshape(len(values), -1)
            total += self._near_sums(order, nodes.reshape(-1, ORDER)[near].ravel(), rest, r)
        return total

    def _near_sums(self, order: int, nodes: Reals, values: Complexes, r: Reals) -> Complexes:
        """By a kernel: that of few nodes and radii, if those will do."""
        if not self._spares(nodes, r):
            return self._kernel_sums(order, nodes, values, r)
        (count, radii), ends, reach = self._fewer(nodes, r), (nodes[0], nodes[-1]), (r[0], r[-1])
        fewer = condensed(nodes, values, *ends, count)
        return read(self._kernel_sums(order, spanned(*ends, count), fewer, spanned(*reach, radii)), r, *reach)

    def _kernel_sums(self, order: int, nodes: Reals, values: Complexes, r: Reals) -> Complexes:
        """Some rows of the kernel at a time."""
        # A real kernel times real and imaginary parts as columns: half the work of a complex product.
        columns = np.ascontiguousarray(values.T).view(float)
        step = max(1, BLOCK // len(nodes))
        rows = [
            product(_kernel(order, self.cutting.scale, nodes, r[i : i + step]), columns) for i in range(0, len(r), step)
        ]
        return np.asarray(np.concatenate(rows).view(complex).T)

    @cached_property
    def cutting(self) -> Cutting:
        """Into how many parts panels are cut."""
        flat = self.flat
        soft = (self.taper.start, self.taper.step) if self.taper else (math.inf, math.inf)
        return Cutting(self.profile.edges, abs(flat.a), self.wavenumber / abs(flat.b), self.phase, *soft)

    def hardest(self, r: Reals) -> list[int]:
        """Which of some output radii are carried worst."""
        return self.cutting.hardest(r, self.profile.values)
