"""The light of a source as harmonics."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from typing import Any

import numpy as np

from fastaxis.engines.azimuthal.applying import TO_CIRCULAR
from fastaxis.engines.azimuthal.carried import edges_for, gathered
from fastaxis.engines.azimuthal.estimates import Known
from fastaxis.engines.azimuthal.harmonics import LEFT, RIGHT, Harmonics
from fastaxis.engines.azimuthal.panels import ORDER, Complexes, Profile, Reals
from fastaxis.engines.azimuthal.resolving import Settings, extended, resolved
from fastaxis.errors import SamplingError
from fastaxis.laws import Annulus, TravelLaw
from fastaxis.light import Term
from fastaxis.light.modes.family import GaussFamily
from fastaxis.plan import Branch, JonesStep
from fastaxis.plan.advance import carried
from fastaxis.plan.steps import Steps

__all__ = ["started"]

Radial = Callable[[Reals], Complexes]

FALLEN = 1e-16
"""Of the peak: where a Gaussian mode ends. A vortex put on it later darkens the focus and not what the cut does there:
at charge 20 the peak is 1/300 of the one without. Two panels carry the bell out to here as well as to 1e-13."""


def started(branch: Branch, settings: Settings) -> tuple[Harmonics, Steps]:
    """The harmonics where they begin, scaled to the power of the branch, and the steps left to do.

    Gaussian modes keep their shape up to the first part that shapes the light, and begin there; other light begins in
    the plane of the source. A plane wave begins at the first hole, since it changes nothing of itself on the way there.
    """
    if any(term.mode.infinite for term in branch.beam.terms):
        return started_at_stop(branch)
    section, steps = gathered(branch.beam.terms, branch.steps)
    terms = branch.beam.terms
    if section != TravelLaw():
        terms = tuple(carried(term, section, branch.wavelength) for term in terms)
    return started_with(terms, branch, settings), steps


def started_at_stop(branch: Branch) -> tuple[Harmonics, Steps]:
    """A plane wave through an ABCD section is (1/a) exp(i k c r^2/2a), cut off by the first hole behind it.

    Raises
    ------
    SamplingError : the hole stands where the plane wave comes to its focus.
    """
    first = next(i for i, step in enumerate(branch.steps) if getattr(step.law, "stop", None) is not None)
    rim = _rim(branch.steps[first].law)
    level = [term.number * complex(term.mode.radial(0.0, branch.wavelength)) for term in branch.beam.terms]
    jones = np.array([term.state.jones for term in branch.beam.terms]).T @ np.array(level)
    jones = jones * branch.beam.scale(branch.wavelength) * math.sqrt(branch.power)
    section = TravelLaw()
    for step in branch.steps[:first]:
        if isinstance(step.law, TravelLaw):
            section = section.then(step.law)
        elif isinstance(step.law, JonesStep):
            jones = np.array(step.law.matrix) @ jones
    if section.a == 0:
        raise SamplingError(
            "a plane wave has no finite focus; a stop before it gives it one",
            got=f"plane wave at {', '.join(branch.steps[first].names)}",
            fix='fa.Aperture(radius=2*mm, name="stop")',
        )
    hands = TO_CIRCULAR @ jones / section.a
    kept = [hand for hand in (LEFT, RIGHT) if abs(hands[hand]) > 4 * np.finfo(float).eps * abs(hands).max()]
    values = np.ones((1, 1, ORDER)) * hands[kept, np.newaxis, np.newaxis]
    field = Harmonics(
        orders=tuple((hand, 0) for hand in kept),
        profile=Profile(np.array([0.0, rim]), values),
        curvature=section.c / section.a,
        wavenumber=2 * math.pi / branch.wavelength,
    )
    return field, branch.steps[first:]


def _rim(law: Any) -> float:
    return float(law.stop.outer if isinstance(law.stop, Annulus) else law.stop.radius)


def started_with(terms: Sequence[Term], branch: Branch, settings: Settings) -> Harmonics:
    """The harmonics of the terms that a beam has where they begin."""
    wavelength = branch.wavelength
    scale = branch.beam.scale(wavelength) * math.sqrt(branch.power)
    main = max(terms, key=lambda term: abs(term.number)).mode
    curvature = float(main.curvature(wavelength))
    wavenumber = 2 * math.pi / wavelength
    rows: dict[tuple[int, int], list[tuple[int, complex]]] = {}
    radials: list[Radial] = []
    for term in terms:
        hands = scale * term.number * (TO_CIRCULAR @ term.state.jones)
        for l, radial in _harmonics(term.mode, wavelength):
            for hand in (LEFT, RIGHT):
                if abs(hands[hand]) > 4 * np.finfo(float).eps * abs(hands).max():
                    rows.setdefault((hand, l), []).append((len(radials), complex(hands[hand])))
            radials.append(radial)

    def relative(r: Reals) -> Complexes:
        front = np.exp(-1j * wavenumber * curvature / 2 * r**2)
        return np.stack([radial(r) * front for radial in radials])

    profile, rest = _profile([term.mode for term in terms], relative, wavelength, settings)
    matrix = np.zeros((len(rows), len(radials)), dtype=complex)
    for i, parts in enumerate(rows.values()):
        for j, amplitude in parts:
            matrix[i, j] += amplitude
    return Harmonics(
        orders=tuple(rows),
        profile=profile.combined(matrix),
        curvature=curvature,
        wavenumber=wavenumber,
        estimates=(Known(rest),),
    ).without_dark()


def _harmonics(mode: Any, wavelength: float) -> list[tuple[int, Radial]]:
    """(l, f_l) of a mode on the axis."""
    if mode.charge is not None:
        return [(int(mode.charge), lambda r: mode.radial(r, wavelength))]
    # A polynomial of degree N times a round envelope has |l| <= N: so many samples around separate them exactly.
    around = np.arange(2 * mode.degree + 2) * (math.pi / (mode.degree + 1))

    def part(l: int) -> Radial:
        turn = np.exp(-1j * l * around) / len(around)
        return lambda r: (
            turn
            @ mode.amplitude(np.multiply.outer(np.cos(around), r), np.multiply.outer(np.sin(around), r), wavelength)
        )

    # Only orders of the parity of the degree occur.
    return [(l, part(l)) for l in range(-mode.degree, mode.degree + 1, 2)]


def _profile(modes: list[Any], radials: Radial, wavelength: float, settings: Settings) -> tuple[Profile, float]:
    if all(isinstance(mode, GaussFamily) for mode in modes):
        return resolved(radials, edges_for(modes, wavelength, FALLEN), settings)
    hard = [float(mode.radius) for mode in modes if mode.hard]
    if hard:
        # Panels break at each edge; beyond the last edge soft modes go on.
        soft = [4 * math.sqrt(mode.moments(wavelength).x2) for mode in modes if not mode.hard]
        edges = np.unique([0.0, *hard, *(w for w in soft if w > max(hard))])
        if not soft:
            return resolved(radials, edges, settings)
    else:
        edges = np.linspace(0, 6 * max(math.sqrt(mode.moments(wavelength).x2) for mode in modes), 4)
    profile, rest, _ = extended(radials, edges, settings)
    return profile, rest
