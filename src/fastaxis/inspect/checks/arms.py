"""Paths that meet on a camera: do they agree in polarization, in parity, in place, size and curvature?"""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Iterator
from itertools import combinations, islice

import numpy as np
from numpy.typing import NDArray

from fastaxis.elements.camera import Camera
from fastaxis.elements.detector import Detector
from fastaxis.elements.polarizing_beam_splitter import PolarizingBeamSplitter
from fastaxis.inspect.bench import DARK, Bench, Visit
from fastaxis.inspect.checks.parity import symmetric
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.strands import state_in_words
from fastaxis.inspect.words import degrees, length

__all__ = ["agreement", "arms", "overlap", "restoring"]

Complexes = NDArray[np.complex128]

NO_FRINGES, SHALLOW = 0.1, 0.7  # of the depth that fringes would have
ROOM = 0.9  # of the overlap of beams; radii that differ by a factor 1.6
FLAT = 1e-3  # [1/m]; a kilometre of radius
MOST = 200  # pairs looked at
RINGS = 1.0  # of fringes between the middle and w


def arms(bench: Bench) -> Iterator[Finding]:
    """Pairs of paths of one laser to a camera or detector; each kind of finding once an end, of its worst pair."""
    for visits in _ends(bench):
        pairs = list(islice(combinations(visits, 2), MOST))
        for check in (_polarization, _parity, _beside, _curvature):
            found = [finding for pair in pairs for finding in check(bench, *pair)]
            if found:
                yield min(found, key=lambda finding: finding.severity.rank)


def _ends(bench: Bench) -> Iterator[list[Visit]]:
    """Where light arrives by several paths; light that goes round a loop has no two that make its fringes."""
    ends: dict[tuple[str, str], list[Visit]] = defaultdict(list)
    for visit in bench.of_kind(Camera, Detector):
        if visit.power > DARK * bench.total and not bench.loops:
            ends[visit.name, visit.source].append(visit)
    return (visits for visits in ends.values() if len(visits) > 1)


def _rings(visit: Visit) -> list[Complexes]:
    return [strand.ring for strand in visit.before]


def agreement(one: Visit, other: Visit) -> float:
    """How far the polarizations of two paths agree, place by place on the ring, 0 .. 1.

    Each part of the source is compared with itself: different ones do not interfere.
    """
    both = list(zip(_rings(one), _rings(other), strict=True))
    met = sum(float(np.abs((a.conj() * b).sum(axis=0)).sum()) for a, b in both)
    most = sum(float((np.linalg.norm(a, axis=0) * np.linalg.norm(b, axis=0)).sum()) for a, b in both)
    return met / most if most else 0.0


def restoring(one: Visit, other: Visit) -> float:
    """Angle [rad] of the linear analyzer behind which fringes swing most: the largest product of amplitudes."""
    angles = np.radians(np.arange(0.0, 180.0, 0.5))
    axes = np.stack([np.cos(angles), np.sin(angles)], axis=1)
    swing = sum(
        (np.abs(axes @ a) * np.abs(axes @ b)).sum(axis=1) for a, b in zip(_rings(one), _rings(other), strict=True)
    )
    # Roundings must not choose among angles that do equally well.
    return float(angles[np.argmax(np.round(swing / np.max(swing), 9))])


def _polarization(_bench: Bench, one: Visit, other: Visit) -> Iterator[Finding]:
    agreed = agreement(one, other)
    if agreed >= SHALLOW:
        return
    angle = restoring(one, other)
    words = f"{state_in_words(one.before)} and {state_in_words(other.before)}"
    # Behind a polarizing splitter arms are of orthogonal polarization on purpose.
    meant = any(isinstance(visit.element, PolarizingBeamSplitter) for visit in (*one.chain(), *other.chain()))
    yield _finding(
        one, Severity.MEDIUM if agreed < NO_FRINGES and not meant else Severity.LOW, "arm polarization",
        "beams of orthogonal polarization make no fringes; an analyzer that passes half of each restores them",
        got=f"two paths meet, {words}: polarization leaves {round(agreed, 9):.2g} of the depth of fringes",
        fix=f'train.expose("{one.name}", fa.linear({degrees(angle).rstrip("°")}*deg))',
    )  # fmt: skip


def _parity(bench: Bench, one: Visit, other: Visit) -> Iterator[Finding]:
    (ax, ay), (bx, by) = one.flips, other.flips
    mirrored, turned = (ax + ay - bx - by) % 2 == 1, (ax - bx) % 2 == 1 and (ay - by) % 2 == 1
    if not (mirrored or turned) or (symmetric(bench, one) and symmetric(bench, other)):
        return
    if not isinstance(one.element, Camera):
        return
    met = "mirror images" if mirrored else "turned by 180°"
    yield _finding(
        one, Severity.MEDIUM if mirrored else Severity.LOW, "mirrored arms",
        "arms reflected unequally often meet as mirror images: charge l meets -l, R meets L, left meets right"
        if mirrored else "a fold out of the table in one arm only turns its picture against the other",
        got=f"two paths meet after {sum(one.flips)} and {sum(other.flips)} reflections, {met} of each other",
        fix="one more mirror in one of the arms" if mirrored else "the same folds in both arms",
    )  # fmt: skip


def overlap(one: Visit, other: Visit) -> float:
    """Integral of the product of two Gaussian amplitudes of these radii and places, of unit power each.

    2 a b/(a^2 + b^2) exp(-d^2/(a^2 + b^2)) for radii a, b a distance d apart; 1 where one is a plane wave.
    """
    a, b = one.radius, other.radius
    if math.isinf(a) or math.isinf(b):
        return 1.0
    return 2 * a * b / (a**2 + b**2) * math.exp(-(_apart(one, other) ** 2) / (a**2 + b**2))


def _apart(one: Visit, other: Visit) -> float:
    (ax, ay), (bx, by) = one.widest.spread.offset, other.widest.spread.offset
    return math.hypot(ax - bx, ay - by)


def _beside(_bench: Bench, one: Visit, other: Visit) -> Iterator[Finding]:
    if not isinstance(one.element, Camera):
        return
    shared = overlap(one, other)
    if shared >= ROOM:
        return
    yield _finding(
        one, Severity.MEDIUM if shared < SHALLOW else Severity.LOW, "arm overlap",
        "fringes are as deep as the beams are alike where they meet, in place and in size",
        got=f"two paths meet with radii {length(one.radius)} and {length(other.radius)}, middles "
        f"{length(_apart(one, other))} apart: overlap {shared:.2g}",
        fix="equal distances and lenses in both arms, and the same tilt",
    )  # fmt: skip


def _curvature(_bench: Bench, one: Visit, other: Visit) -> Iterator[Finding]:
    radius = min(one.radius, other.radius)
    if math.isinf(radius) or not isinstance(one.element, Camera):
        return
    bend = abs(one.widest.spread.curvature - other.widest.spread.curvature)
    wavelength = one.widest.wavelength
    rings = bend * radius**2 / (2 * wavelength)
    if rings < RINGS:
        return
    pixels = wavelength / (bend * radius) / one.element.pixel
    severity = Severity.MEDIUM if pixels < 4 else Severity.LOW
    yield _finding(
        one, Severity.HIGH if pixels < 2 else severity, "arm curvature",
        "phase fronts of unequal curvature make rings instead of straight or even fringes; they need four pixels each",
        got=f"two paths meet with {_fronts(one)} and {_fronts(other)}: {rings:.2g} rings out to "
        f"w = {length(radius)}, the last {pixels:.2g} pixels wide",
        fix="equal distances and lenses in both arms",
    )  # fmt: skip


def _fronts(visit: Visit) -> str:
    curvature = visit.widest.spread.curvature
    return "flat fronts" if abs(curvature) < FLAT else f"fronts of radius {length(1 / curvature)}"


def _finding(visit: Visit, severity: Severity, check: str, rule: str, *, got: str, fix: str) -> Finding:
    name = visit.name
    return Finding(severity=severity, check=check, element=name, rule=rule, got=f"{name}: {got}", fix=fix)
