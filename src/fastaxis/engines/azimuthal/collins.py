"""Travel through an ABCD section: the Collins integral of each harmonic, by quadrature fine enough for its kernel.

For a field sum of f_l(r) exp(i l phi) the two-dimensional integral of Collins (1970) becomes

    g_l(r') = (-i)^(l+1) (k/B) exp(i k D r'^2/2B)  int f_l(r) exp(i k A r^2/2B) J_l(k r r'/B) r dr

for either sign of B and l, the carrier exp(ikL) left out. Both fields are kept relative to a parabolic phase front,
which is a lens before and a lens behind the section and so only changes the matrix.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from fastaxis.engines.azimuthal.bessel import bessel
from fastaxis.engines.azimuthal.panels import ORDER, Complexes, Profile, Reals
from fastaxis.engines.azimuthal.taper import Taper
from fastaxis.engines.memory import Memory
from fastaxis.laws import TravelLaw

__all__ = ["Collins", "turn"]

BLOCK = 1 << 16  # kernel values at a time: half a megabyte stays in the cache of a core
WHOLE = 0.4  # share of the phase of a part that an uncut panel may carry
AT_RISK, NEARLY = 2, 9  # panels, places
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

    @property
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
        rank = np.argsort(r, kind="stable")
        out = np.empty((len(self.charges), len(r)), dtype=complex)
        for some in np.array_split(rank, max(1, min(len(r) // 64, 16))):
            if len(some):
                out[:, some] = self._block(r[some])
        return out

    def _block(self, r: Reals) -> Complexes:
        flat, k = self.flat, self.wavenumber
        nodes, weights, values = self.profile.refined(self.parts(float(r.max())))
        if self.taper:
            values = values * self.taper(nodes)
        values = values * (weights * nodes * np.exp(1j * k * flat.a / flat.b / 2 * nodes**2))
        out = np.empty((len(self.charges), len(r)), dtype=complex)
        for order in {abs(charge) for charge in self.charges}:
            rows = [i for i, charge in enumerate(self.charges) if abs(charge) == order]
            out[rows] = self._transform(order, nodes, values[rows], r)
        for row, charge in enumerate(self.charges):
            out[row] *= turn(charge, flat.b)
        return np.asarray(out * (k / flat.b * np.exp(1j * k * flat.d / flat.b / 2 * r**2)))

    def _transform(self, order: int, nodes: Reals, values: Complexes, r: Reals) -> Complexes:
        """Sums over the nodes, some rows of the kernel at a time."""
        scale = self.wavenumber / abs(self.flat.b)
        # A real kernel times real and imaginary parts as columns: half the work of a complex product.
        columns = np.ascontiguousarray(values.T).view(float)
        step = max(1, BLOCK // len(nodes))
        rows = [_kernel(order, scale, nodes, r[i : i + step]) @ columns for i in range(0, len(r), step)]
        return np.asarray(np.ascontiguousarray(np.concatenate(rows)).view(complex).T)

    def _phases(self, reach: Reals) -> Reals:
        """Kernel phase [rad] on each panel for some output radii, shape (radii, panels).

        The outer end of a panel has the most fringes, and its parts are equally wide.
        """
        edges, flat = self.profile.edges, self.flat
        ends = abs(flat.a) * edges[1:] + np.asarray(reach)[..., np.newaxis]
        return np.asarray(self.wavenumber / abs(flat.b) * ends * np.diff(edges))

    def parts(self, reach: float | Reals) -> np.ndarray[Any, np.dtype[np.int_]]:
        """Into how many parts each panel is cut, for output radii up to ``reach``."""
        phase = self._phases(np.asarray(reach, dtype=float))
        # One part carries the panel's own polynomial too, so it may carry less of the kernel's phase.
        parts = np.where(phase <= WHOLE * self.phase, 1, np.maximum(2, np.ceil(phase / self.phase)))
        if self.taper:
            parts = np.where(self.profile.edges[1:] > self.taper.start, np.maximum(parts, 4), parts)
        return np.asarray(parts, dtype=int)

    def hardest(self, r: Reals) -> list[int]:
        """Which of some output radii the nodes carry worst: for each of the panels most at risk, its own.

        Gauss-Legendre nodes err as the (2 ORDER)-th power of the phase that a part of a panel has. The very worst place
        may be done in one block with further ones, which cut its panels finer; so some that are nearly as bad as well.
        """
        parts = self.parts(r)
        load = self._phases(r) / np.where(parts == 1, WHOLE, parts)
        light = abs(self.profile.values).max(axis=(0, 2)) + np.finfo(float).tiny
        risk = np.log(light) + 2 * ORDER * np.log(load.max(axis=0))
        worst = np.argsort(risk)[: -1 - AT_RISK : -1]
        return [int(place) for panel in worst for place in np.argsort(load[:, panel])[: -1 - NEARLY : -4]]
