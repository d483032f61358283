"""How deep fringes are and why: coherence, balance, polarization overlap and spatial overlap of each pair of paths."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from importlib import import_module
from itertools import combinations
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.settings import as_setting
from fastaxis.conventions import stamp
from fastaxis.engines.joined.extent import Extent
from fastaxis.engines.joined.overlap import places, total
from fastaxis.errors import WiringError
from fastaxis.plan import Branch, make_plan

__all__ = ["PathPair", "Visibility", "visibility"]

Complexes = NDArray[np.complex128]

# Overlaps are sums of some 1e4 products of engines good to 1e-11; what is smaller is zero.
ZERO = 1e-9


@dataclass(frozen=True)
class PathPair:
    """Two paths to a target and the four factors of their fringes, each 0 .. 1.

    Parameters
    ----------
    paths : both as text.
    coherence : degree of coherence |g| at their path difference.
    balance : 2 sqrt(P1 P2)/(P1 + P2) of the powers that arrive.
    polarization : how far their polarizations agree, place by place.
    spatial : how far their beams agree: on a camera, where one puts its light the other does too; at a detector or a
        port, whose light is taken together, also that their phases keep step all over the beam.
    difference : of the optical path lengths [m], second less first.
    powers : of both at the target [W].
    advice : the sentence that belongs to a factor of zero; "" without one.
    """

    paths: tuple[str, str]
    coherence: float
    balance: float
    polarization: float
    spatial: float
    difference: float
    powers: tuple[float, float]
    advice: str = ""

    @property
    def value(self) -> float:
        """Visibility: the product of the four."""
        return self.coherence * self.balance * self.polarization * self.spatial

    def __str__(self) -> str:
        return (
            f"{self.value:.3f} = coherence {self.coherence:.3f} x balance {self.balance:.3f} x polarization "
            f"{self.polarization:.3f} x spatial {self.spatial:.3f}; path difference {self.difference * 1e3:.6g} mm"
        )


@dataclass(frozen=True)
class Visibility:
    """The fringes at a target. ``print`` shows every pair of paths with its factors.

    Parameters
    ----------
    target : where they are.
    pairs : one for each pair of paths.
    incoherent : parts of the light that do not interfere with each other; the pairs are those of the first.
    """

    target: str
    pairs: tuple[PathPair, ...]
    incoherent: int = 1

    @property
    def value(self) -> float:
        """Visibility of the pair with the deepest fringes."""
        return max(pair.value for pair in self.pairs)

    def __str__(self) -> str:
        lines = [f"visibility at {self.target}"]
        if self.incoherent > 1:
            lines.append(
                f"  of the first of {self.incoherent} parts of the light that do not interfere with each other"
            )
        for pair in self.pairs:
            lines += [f"  {pair.paths[0]}", f"  {pair.paths[1]}", f"    {pair}"]
            lines += [f"    {pair.advice}"] if pair.advice else []
        return "\n".join([*lines, stamp()])


def visibility(train: Any, target: str, setting: Any = None, *, grid: Any = None, engine: str = "auto") -> Visibility:
    """The visibility of the fringes at a target, pair by pair.

    Parameters
    ----------
    train : the bench.
    target : camera, detector or port.
    setting : a state that passes, or an analyzer, in front of the target.
    grid, engine : as in ``train.expose``.

    Raises
    ------
    WiringError : light gets there by one path only, or round a cavity.

    Notes
    -----
    M. Born and E. Wolf, Principles of Optics, 7th ed. (1999), section 7.2; of several components of a source, the
    first is looked at, and ``print`` says so.

    Examples
    --------
    >>> import fastaxis as fa
    >>> train = fa.Train(wavelength=633e-9).along(fa.Laser(mode=fa.PlaneWave(area=1e-6)), fa.BeamSplitter(name="in"))
    >>> _ = train.along("in.transmitted", fa.NeutralDensity(density=0.6, name="nd"), fa.BeamSplitter(name="out"))
    >>> _ = train.along("in.reflected", "out.side")
    >>> round(visibility(train, "out.transmitted").value, 3)
    0.801
    """
    branches, names, incoherent = _arms(train, target, grid, engine)
    fields = [import_module(f"fastaxis.engines.{branch.engine}").run(branch) for branch in branches]
    seen = _Seen.of(fields, branches, setting)
    bucket = not hasattr(train.elements[target.partition(".")[0]], "pixel")
    pairs = combinations(range(len(branches)), 2)
    return Visibility(target, tuple(_pair(seen, branches, names, i, j, bucket=bucket) for i, j in pairs), incoherent)


def _arms(train: Any, target: str, grid: Any, engine: str) -> tuple[Sequence[Branch], list[str], int]:
    # Arms are looked at one by one, also where a plane wave's would be summed at once.
    plan = make_plan(train, target, grid=grid, engine=engine, by_arms=True)
    groups = [group for group in plan.groups if len(group) > 1]
    if not groups:
        raise WiringError(
            "fringes need two paths that meet",
            got=f"{target}: light by one path",
            fix=f'print(train.routes("{target}"))',
        )
    group = groups[0]
    if len(group) > len(train.routes(target)):
        raise WiringError(
            "light that goes round a cavity comes by a new path on each trip, and no two of them make its fringes; "
            "sweep the length or a phase and look at the power",
            got=f"{target}: {len(group)} paths, trips included",
            fix=f'train.power("{target}")',
        )
    return group, [branch.path for branch in group], len(plan.groups)


@dataclass(frozen=True)
class _Seen:
    """Fields of the arms behind the analyzer, as rows of a table with weights.

    Parameters
    ----------
    values : (arms, 2, places) [sqrt(W)] with the weights taken in.
    stokes : (arms, 4) [W], before the analyzer.
    passed : the analyzer as a matrix A with power E^H A E.
    """

    values: Complexes
    stokes: NDArray[np.float64]
    passed: Complexes

    @classmethod
    def of(cls, fields: Sequence[Any], branches: Sequence[Branch], setting: Any) -> _Seen:
        passed = np.eye(2, dtype=complex)
        if setting is not None:
            m0, m1, m2, m3 = as_setting(setting).weights
            passed = np.array([[m0 + m1, m2 + 1j * m3], [m2 - 1j * m3, m0 - m1]], dtype=complex)
        if all(branch.engine == "uniform" for branch in branches):
            values = np.stack([field.jones[:, np.newaxis] for field in fields])
        else:
            x, pitch = places(Extent.of(branches))
            values = np.stack([field.at(x, x).reshape(2, -1) for field in fields]) * pitch
        return cls(values, np.stack([total(field) for field in fields]), passed)

    def power(self, i: int) -> float:
        """Power of an arm behind the analyzer [W]; the samples hold only what arms have in common."""
        s0, s1, s2, s3 = self.stokes[i]
        matrix = np.array([[s0 + s1, s2 + 1j * s3], [s2 - 1j * s3, s0 - s1]]) / 2
        # tr(A C) with the coherency matrix C_ab = <E_a E_b^*>, whose s3 is 2 Im(Ex Ey*).
        return max(0.0, float(np.trace(self.passed @ matrix).real))

    def product(self, i: int, j: int) -> Complexes:
        """E_i^H A E_j, place by place."""
        return np.asarray(np.einsum("ap,ab,bp->p", self.values[i].conj(), self.passed, self.values[j]))


def _pair(seen: _Seen, branches: Sequence[Branch], names: Sequence[str], i: int, j: int, *, bucket: bool) -> PathPair:
    a, b = branches[i], branches[j]
    difference = float(b.length - a.length)
    own = [np.sqrt(np.maximum(seen.product(n, n).real, 0)) for n in (i, j)]
    powers = [seen.power(n) for n in (i, j)]
    both, together = float(own[0] @ own[1]), seen.product(i, j)
    met = float(abs(together).sum())
    scale = math.sqrt(powers[0] * powers[1])
    spatial = both / scale if scale else 0.0
    if bucket and met > ZERO * scale:
        spatial *= float(abs(together.sum())) / met
    factors = (
        abs(a.line.degree(difference)),
        2 * scale / sum(powers) if scale else 0.0,
        met / both if both else 0.0,
        spatial,
    )
    coherence, balance, polarization, spatial = (0.0 if f < ZERO else min(f, 1.0) for f in factors)
    advice = _advice(seen, i, j, (coherence, balance, polarization, spatial))
    return PathPair(
        (names[i], names[j]), coherence, balance, polarization, spatial, difference, (powers[0], powers[1]), advice
    )


def _advice(seen: _Seen, i: int, j: int, factors: tuple[float, float, float, float]) -> str:
    coherence, balance, polarization, spatial = factors
    if balance == 0:
        return "one of the arms is dark: no fringes"
    if polarization == 0:
        return f"arms orthogonally polarized: no fringes; {_eraser(seen.stokes[i], seen.stokes[j])}"
    if coherence == 0:
        return "the path difference is beyond the coherence of the light: no fringes; make the arms equally long"
    if spatial == 0:
        return "the beams miss each other, or their fringes average out: no fringes; a camera shows which"
    return ""


def _eraser(one: NDArray[np.float64], other: NDArray[np.float64]) -> str:
    """The linear analyzer behind which both arms have equal power, so that fringes are whole again.

    Power behind an analyzer at angle t is (S0 + S1 cos 2t + S2 sin 2t)/2; it is equal for both arms where
    v cos(2t - u) = c with the difference (c, v cos u, v sin u) of their Stokes parameters.
    """
    apart = one - other
    length = math.hypot(apart[1], apart[2])
    size = one[0] + other[0]
    if length < ZERO * size:
        if abs(apart[0]) < ZERO * size:
            return "any linear analyzer restores 1.00"
        return "a linear analyzer leaves them as unequal as they are; balance the arms"
    if abs(apart[0]) > length:
        return "no linear analyzer makes them equally bright; balance the arms"
    middle, half = math.atan2(apart[2], apart[1]) / 2, math.acos(-apart[0] / length) / 2
    angles = [(middle + sign * half) % math.pi for sign in (1, -1)]
    best = max(angles, key=lambda t: (round((_behind(one, t) + _behind(other, t)) / size, 9), -t))
    return f"an analyzer at {math.degrees(best):.4g} deg restores 1.00"


def _behind(stokes: NDArray[np.float64], angle: float) -> float:
    return float(stokes[0] + stokes[1] * math.cos(2 * angle) + stokes[2] * math.sin(2 * angle)) / 2
