"""How deep fringes are and why: coherence, balance, polarization overlap and spatial overlap of each pair of paths."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from itertools import combinations
from typing import Any

from fastaxis.analysis.eraser import advice
from fastaxis.analysis.meeting import ZERO, Meeting, Overlap, met
from fastaxis.conventions import stamp
from fastaxis.errors import WiringError
from fastaxis.plan import Branch, make_plan

__all__ = ["PathPair", "Visibility", "visibility"]


@dataclass(frozen=True)
class PathPair:
    """Two paths to a target and the four factors of their fringes, each 0 .. 1.

    Parameters
    ----------
    paths : both as text.
    coherence : how far the light of one remembers that of the other: the degree |g| of the line at their path
        difference, and less where parts of the light, of other wavelength or shape, have their fringes elsewhere.
    balance : 2 sqrt(P1 P2)/(P1 + P2) of the powers that arrive.
    polarization : how far their polarizations agree, place by place; of unpolarized light |tr(J1^dagger J2)| over
        the norms of both Jones matrices.
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
    incoherent : parts of the light that do not interfere with each other; their fringes are added.
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
            lines.append(f"  of {self.incoherent} parts of the light together, which do not interfere with each other")
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
    With E1c, E2c the fields of part c of the light by both paths behind the analyzer, G_c its degree of coherence with
    the carrier, W = sum_c G_c E1c E2c^dagger place by place, a1^2 and a2^2 the irradiances, P1 and P2 the powers:

        coherence = S|W|/S a1 a2,  polarization = S|tr W|/S|W|,  balance = 2 sqrt(P1 P2)/(P1 + P2),
        spatial = S a1 a2/sqrt(P1 P2), at a detector times |S tr W|/S|tr W|,

    S summing over places and |W| being the sum of singular values: what |tr W| is if a polarization element makes the
    best of it. The product is 2 S|tr W|/(P1 + P2), the depth of the fringes while a phase common to all parts is
    scanned. M. Born and E. Wolf, Principles of Optics, 7th ed. (1999), section 7.2; of mixtures, F. Gori,
    M. Santarsiero and R. Borghi, Opt. Lett. 32, 588 (2007).

    Examples
    --------
    >>> import fastaxis as fa
    >>> train = fa.Train(wavelength=633e-9).along(fa.Laser(mode=fa.PlaneWave(area=1e-6)), fa.BeamSplitter(name="in"))
    >>> _ = train.along("in.transmitted", fa.NeutralDensity(density=0.6, name="nd"), fa.BeamSplitter(name="out"))
    >>> _ = train.along("in.reflected", "out.side")
    >>> round(visibility(train, "out.transmitted").value, 3)
    0.801
    """
    lights = _lights(train, target, grid, engine)
    bucket = not hasattr(train.elements[target.partition(".")[0]], "pixel")
    pairs = []
    for parts in lights:
        meeting = met(parts, setting)
        pairs += [_pair(meeting, parts, i, j, bucket=bucket) for i, j in combinations(range(len(parts[0])), 2)]
    return Visibility(target, tuple(pairs), sum(map(len, lights)))


def _lights(train: Any, target: str, grid: Any, engine: str) -> list[list[Sequence[Branch]]]:
    """The light of each laser that comes by several paths: for each part of it, its arms."""
    # Arms are looked at one by one, also where a plane wave's would be summed at once.
    plan = make_plan(train, target, grid=grid, engine=engine, by_arms=True)
    found: dict[tuple[str, ...], list[Sequence[Branch]]] = {}
    for group in plan.groups:
        if len(group) > 1:
            found.setdefault(tuple(branch.path for branch in group), []).append(group)
    if not found:
        raise WiringError(
            "fringes need two paths from one laser that meet",
            got=f"{target}: light by one path",
            fix=f'print(train.routes("{target}"))',
        )
    trips = max(len(paths) for paths in found)
    if trips > len(train.routes(target)):
        raise WiringError(
            "light that goes round a cavity comes by a new path on each trip, and no two of them make its fringes; "
            "sweep the length or a phase and look at the power",
            got=f"{target}: {trips} paths, trips included",
            fix=f'train.power("{target}")',
        )
    return list(found.values())


def _pair(meeting: Meeting, parts: list[Sequence[Branch]], i: int, j: int, *, bucket: bool) -> PathPair:
    one, other = parts[0][i], parts[0][j]
    seen, powers = meeting.overlap(i, j), (meeting.power(i), meeting.power(j))
    factors = _factors(seen, powers, bucket=bucket)
    told = advice(factors, seen, (meeting.stokes(i), meeting.stokes(j)), mixed=len(parts) > 1)
    return PathPair((one.path, other.path), *factors, float(other.length - one.length), powers, told)


def _factors(seen: Overlap, powers: tuple[float, float], *, bucket: bool) -> tuple[float, float, float, float]:
    """(coherence, balance, polarization, spatial)."""
    scale = math.sqrt(powers[0] * powers[1])
    coherence = seen.best / seen.amplitudes if seen.amplitudes else 0.0
    # Where nothing is remembered the other factors are those of light that remembers everything.
    sums = seen if coherence > ZERO or seen.whole is None else seen.whole
    polarization = sums.met / sums.best if sums.best > ZERO * scale else 1.0
    spatial = seen.amplitudes / scale if scale else 0.0
    if bucket and sums.met > ZERO * scale:
        spatial *= sums.together / sums.met
    balance = 2 * scale / sum(powers) if scale else 0.0
    return tuple(0.0 if f < ZERO else min(f, 1.0) for f in (coherence, balance, polarization, spatial))  # type: ignore[return-value]  # four
