"""Bent lines for beams that no straight line could draw: level and upright pieces around everything else."""

from __future__ import annotations

import heapq
from collections.abc import Iterable, Sequence
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from fastaxis.report.boxes import Box, Point

__all__ = ["bent_line"]

Vector = tuple[int, int]
WAYS: tuple[Vector, ...] = ((1, 0), (0, 1), (-1, 0), (0, -1))
REACH = 0.5  # a line runs straight out of its part for this long
STEP = 0.2
BEND, CROSS, BESIDE, THROUGH = 1.0, 1.5, 30.0, 200.0  # costs in steps of length; the last two are to be avoided
MARGIN = 1.4
AWAY = 0.24  # a line keeps half of this from a part


def bent_line(
    start: Point, leaving: Vector, end: Point, entering: Vector, *, parts: Iterable[Box], lines: Iterable[Box]
) -> list[Point]:
    """Corners of the cheapest line: short, with few bends and crossings, through no part and along no other beam.

    Parameters
    ----------
    start, end : middles of the two parts.
    leaving, entering : directions of the light at both.
    parts, lines : what is on the drawing already.
    """
    first = (start[0] + REACH * leaving[0], start[1] + REACH * leaving[1])
    last = (end[0] - REACH * entering[0], end[1] - REACH * entering[1])
    solid = [Box.about(*box.middle, box.right - box.left + AWAY, box.top - box.bottom + AWAY) for box in parts]
    beams = list(lines)
    xs = _lattice([first[0], last[0]], [side for box in solid for side in (box.left, box.right)])
    ys = _lattice([first[1], last[1]], [side for box in solid for side in (box.bottom, box.top)])
    costs = _costs(xs, ys, solid, beams)
    at = (int(np.argmin(abs(xs - first[0]))), int(np.argmin(abs(ys - first[1]))), WAYS.index(leaving))
    goal = (int(np.argmin(abs(xs - last[0]))), int(np.argmin(abs(ys - last[1]))), WAYS.index(entering))
    walk = _cheapest(costs, at, goal)
    points = [start, *((float(xs[i]), float(ys[j])) for i, j, _ in walk), end]
    return _corners(points)


def _lattice(wanted: Sequence[float], sides: Sequence[float]) -> NDArray[np.float64]:
    every = [*wanted, *sides]
    grid = np.arange(min(every) - MARGIN, max(every) + MARGIN, STEP)
    # Beside the ends, other lines of the lattice would only give bends too short to see.
    grid = grid[np.min(abs(grid[:, None] - np.array(wanted)), axis=1) > STEP / 2]
    return np.unique(np.concatenate([grid, np.unique(np.round(wanted, 9))]))


def _costs(
    xs: NDArray[np.float64], ys: NDArray[np.float64], parts: Sequence[Box], beams: Sequence[Box]
) -> tuple[NDArray[np.float64], NDArray[np.float64]]:
    """Cost of each level and each upright edge of the lattice, by its lower left end (x, y)."""
    level = np.repeat(np.diff(xs)[:, None], len(ys), axis=1)
    upright = np.repeat(np.diff(ys)[None, :], len(xs), axis=0)
    for box, through in [*((box, True) for box in parts), *((box, False) for box in beams)]:
        wide = box.right - box.left > box.top - box.bottom
        for edges, along, across, low, high, left, right, along_it in (
            (level, xs, ys, box.left, box.right, box.bottom, box.top, wide),
            (upright.T, ys, xs, box.bottom, box.top, box.left, box.right, not wide),
        ):
            near = 0.0 if through or not along_it else 0.1
            hit = ((along[:-1] < high) & (along[1:] > low))[:, None] & (
                (across > left - near) & (across < right + near)
            )
            edges[hit] += THROUGH * STEP if through else BESIDE * STEP if along_it else CROSS
    return level, upright


def _cheapest(
    costs: tuple[NDArray[np.float64], NDArray[np.float64]], start: tuple[int, int, int], goal: tuple[int, int, int]
) -> list[tuple[int, int, int]]:
    level, upright = costs
    nx, ny = upright.shape[0], level.shape[1]
    best, before, waiting = {start: 0.0}, {start: start}, [(0.0, start)]
    while waiting:
        cost, here = heapq.heappop(waiting)
        if here == goal:
            break
        if cost > best[here]:
            continue
        i, j, way = here
        for turn in (0, 1, 3):
            new = (way + turn) % 4
            k, m = i + WAYS[new][0], j + WAYS[new][1]
            if not (0 <= k < nx and 0 <= m < ny):
                continue
            edge = level[min(i, k), j] if WAYS[new][0] else upright[i, min(j, m)]
            total, there = cost + float(edge) + (BEND if turn else 0.0), (k, m, new)
            # Arriving costs a bend as well where the light turns at the very end.
            if total < best.get(there, np.inf):
                best[there], before[there] = total, here
                heapq.heappush(waiting, (total, there))
            end = (k, m, goal[2])
            if (k, m) == goal[:2] and (new + 2) % 4 != goal[2] and total + BEND < best.get(end, np.inf):
                best[end], before[end] = total + BEND, here
                heapq.heappush(waiting, (total + BEND, end))
    walk = [goal]
    while before[walk[-1]] != walk[-1]:
        walk.append(before[walk[-1]])
    return walk[::-1]


def _corners(points: Sequence[Point]) -> list[Point]:
    """The points at which a line turns, with both its ends."""
    distinct = [points[0], *(there for here, there in pairwise(points) if there != here)]
    kept = [distinct[0]]
    for before, here, after in zip(distinct, distinct[1:], distinct[2:], strict=False):
        level = abs(before[1] - here[1]) < 1e-9 and abs(here[1] - after[1]) < 1e-9
        upright = abs(before[0] - here[0]) < 1e-9 and abs(here[0] - after[0]) < 1e-9
        if not (level or upright):
            kept.append(here)
    return [*kept, distinct[-1]]
