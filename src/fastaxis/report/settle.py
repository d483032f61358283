"""Setting parts down so that beams run straight and nothing stands on anything else."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass
from itertools import combinations

from fastaxis.report.ordering import CLOSE, Axis, Run

__all__ = ["Beam", "Settled", "settle", "sketched"]

Need = Callable[[str, str], tuple[float, float]]
Step = tuple[int, Run]
"""A run added along x (0) or y (1)."""

THROUGH, ALONG = 0.6, 0.12  # a beam keeps this far from the middle of a part, and from a beam beside it
MOST = 400  # steps aside; a train of 25 parts needs some dozens


@dataclass(frozen=True)
class Beam:
    """Light from one part to the next, in one of the four directions, drawn at least ``gap`` long."""

    start: str
    end: str
    way: tuple[int, int]
    gap: float

    @property
    def axis(self) -> int:
        """0 if it runs along x, 1 along y."""
        return 0 if self.way[0] else 1

    @property
    def sides(self) -> tuple[tuple[tuple[str, tuple[int, int]], str], ...]:
        """Of each end, the side of the part that the beam takes, and the part that it leads to."""
        back = (-self.way[0], -self.way[1])
        return ((self.start, self.way), self.end), ((self.end, back), self.start)

    @property
    def run(self) -> Run:
        ends = (self.start, self.end) if sum(self.way) > 0 else (self.end, self.start)
        return (*ends, self.gap)


@dataclass(frozen=True)
class Settled:
    """Places by name, and the beams that could not be drawn straight."""

    x: dict[str, float]
    y: dict[str, float]
    bent: tuple[Beam, ...]


def sketched(names: Sequence[str], beams: Sequence[Beam]) -> Settled:
    """Places that keep as many beams straight as possible; parts may still stand on each other."""
    axes, bent = _straightened(names, beams, ())
    return _settled(axes, bent)


def settle(names: Sequence[str], beams: Sequence[Beam], need: Need) -> Settled:
    """Places where parts and beams are clear of each other; beams in the way of parts are given up as straight.

    Parameters
    ----------
    names : of all parts.
    beams : each pair of parts once.
    need : least distance of two parts, along x or else along y.
    """
    refused: tuple[Beam, ...] = ()
    while True:
        axes, bent = _straightened(names, beams, refused)
        axes, struck = _cleared(axes, [beam for beam in beams if beam not in bent], need)
        if struck is None:
            return _settled(axes, bent)
        refused = (*refused, struck)


def _settled(axes: tuple[Axis, Axis], bent: tuple[Beam, ...]) -> Settled:
    xs, ys = axes[0].places(), axes[1].places()
    assert xs is not None
    assert ys is not None
    return Settled(xs, ys, bent)


def _straightened(
    names: Sequence[str], beams: Sequence[Beam], refused: Sequence[Beam]
) -> tuple[tuple[Axis, Axis], tuple[Beam, ...]]:
    """Each beam in turn puts its parts into one row or column, unless that contradicts the beams before it.

    Of two beams at one side of a part, to different places, the first is straight.
    """
    axes, bent = (Axis.of(names), Axis.of(names)), tuple(refused)
    sides: dict[tuple[str, tuple[int, int]], str] = {}
    for beam in beams:
        if beam in refused:
            continue
        if any(sides.get(side, there) != there for side, there in beam.sides):
            bent = (*bent, beam)
            continue
        along = axes[beam.axis].ordered(beam.run, beam=True)
        across = axes[1 - beam.axis].joined(beam.start, beam.end)
        trial = (along, across) if beam.axis == 0 else (across, along)
        if _possible(trial):
            axes = trial
            sides |= dict(beam.sides)
        else:
            bent = (*bent, beam)
    return axes, bent


def _possible(axes: tuple[Axis, Axis]) -> bool:
    places = set(zip(axes[0].group.values(), axes[1].group.values(), strict=True))
    return len(places) == len(axes[0].group) and all(axis.places() is not None for axis in axes)


def _cleared(axes: tuple[Axis, Axis], beams: Sequence[Beam], need: Need) -> tuple[tuple[Axis, Axis], Beam | None]:
    """Parts moved apart one step at a time; also the beam that keeps its part in its way, if there is one."""
    for _ in range(MOST):
        found = (axes[0].places() or {}, axes[1].places() or {})
        trouble = next(_troubles(found, beams, need), None)
        if trouble is None:
            return axes, None
        beam, steps = trouble
        trials = (_stepped(axes, step) for step in sorted(steps, key=lambda step: _cost(found, step)))
        better = next((trial for trial in trials if trial is not None), None)
        if better is None:
            return axes, beam or beams[-1]
        axes = better
    return axes, beams[-1] if beams else None


def _stepped(axes: tuple[Axis, Axis], step: Step) -> tuple[Axis, Axis] | None:
    which, run = step
    axis = axes[which]
    if axis.group[run[0]] == axis.group[run[1]]:
        return None
    changed = axis.ordered(run)
    if changed.places() is None:
        return None
    return (changed, axes[1]) if which == 0 else (axes[0], changed)


def _cost(found: tuple[dict[str, float], dict[str, float]], step: Step) -> float:
    which, (before, behind, gap) = step
    return gap - (found[which][behind] - found[which][before])


def _troubles(
    found: tuple[dict[str, float], dict[str, float]], beams: Sequence[Beam], need: Need
) -> Iterator[tuple[Beam | None, list[Step]]]:
    """Parts too near each other, and beams through parts, each with the steps that would help."""
    xs, ys = found
    for one, other in combinations(xs, 2):
        dx, dy = need(one, other)
        if abs(xs[one] - xs[other]) < dx - 1e-6 and abs(ys[one] - ys[other]) < dy - 1e-6:
            yield None, [*_either_side(0, one, other, dx), *_either_side(1, one, other, dy)]
    for beam in beams:
        for name in xs:
            if name not in (beam.start, beam.end) and _struck(found, beam, name, need):
                yield beam, list(_out_of(beam, name, need))


def _either_side(axis: int, one: str, other: str, gap: float) -> list[Step]:
    return [(axis, (one, other, gap)), (axis, (other, one, gap))]


def _struck(found: tuple[dict[str, float], dict[str, float]], beam: Beam, name: str, need: Need) -> bool:
    """Whether a part stands in a beam between two others."""
    along, across = found[beam.axis], found[1 - beam.axis]
    low, high = sorted((along[beam.start], along[beam.end]))
    wide = _width(name, need)
    return low - THROUGH < along[name] < high + THROUGH and abs(across[name] - across[beam.start]) < wide - CLOSE


def _width(name: str, need: Need) -> float:
    """How far a part keeps from the beam: empty space only has to lie on another line."""
    return THROUGH if need(name, name)[0] > 1 else ALONG


def _out_of(beam: Beam, name: str, need: Need) -> Iterator[Step]:
    low, high, _ = beam.run
    yield beam.axis, (name, low, THROUGH + 0.3)
    yield beam.axis, (high, name, THROUGH + 0.3)
    wide = _width(name, need)
    yield from _either_side(1 - beam.axis, name, beam.start, wide)
