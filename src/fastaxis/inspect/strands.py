"""Light as an inspection carries it: second moments, and polarization on a ring about the axis."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.inspect.clear_area import passed
from fastaxis.laws import AxisLaw, CircularLaw, Flip, ScalarLaw, Turn
from fastaxis.light import Component, State, ellipse, from_stokes
from fastaxis.maths import NUMBERS
from fastaxis.plan.binding import bound
from fastaxis.plan.spread import Spread, of_beam

__all__ = ["PLACES", "Strand", "azimuth", "degree", "start", "state_in_words", "through", "total"]

PLACES = 32  # on the ring; a pattern that turns up to 15 times in a turn is told from a uniform one
PHI = 2 * math.pi * (np.arange(PLACES) + 0.5) / PLACES

Reals = NDArray[np.float64]


@dataclass(frozen=True, eq=False)
class Strand:
    """One incoherent part of the light on one path.

    Parameters
    ----------
    wavelength : vacuum wavelength [m].
    spread : second moments.
    ring : Jones vectors at ``PLACES`` angles on a ring about the axis, shape (2, PLACES); the mean of |ring|^2 is the
        power [W].
    mixed : whether polarization was averaged over a beam whose terms have different states and shapes.
    """

    wavelength: float
    spread: Spread
    ring: NDArray[np.complex128]
    mixed: bool = False

    @property
    def local(self) -> Reals:
        """Stokes parameters along the ring [W], shape (4, PLACES)."""
        ex, ey = self.ring
        cross = 2 * np.conj(ex) * ey
        px, py = np.abs(ex) ** 2, np.abs(ey) ** 2
        return np.stack([px + py, px - py, cross.real, -cross.imag])

    @property
    def stokes(self) -> Reals:
        """Mean Stokes parameters [W]."""
        return np.asarray(self.local.mean(axis=1))

    @property
    def patterned(self) -> bool:
        """Whether the polarization varies over the beam."""
        s0, *vector = self.stokes
        # A hundred roundings; a plate turned by 0.001 deg from place to place already shows 1e-9.
        return self.mixed or bool(s0 > 0 and np.linalg.norm(vector) < s0 * (1 - 1e-12))


def start(component: Component, power: float, wavelength: float) -> tuple[Strand, ...]:
    """The strands of one incoherent part of a source.

    A beam whose terms differ in state has, taken together, two orthogonal states: the eigenvectors of its coherency
    matrix. Each is carried on its own, which is exact for powers behind parts that are the same everywhere.
    """
    own = wavelength if component.wavelength is None else float(component.wavelength)
    beam = bound(component.beam)
    spread, watts = of_beam(beam, own), power * float(component.weight)
    if beam.state is not None:
        return (_strand(own, spread, beam.state.jones, watts),)
    shares, states = np.linalg.eigh(_coherency(beam, own))
    return tuple(
        replace(_strand(own, spread, states[:, k], watts * float(shares[k])), mixed=True)
        for k in range(2)
        if shares[k] > 1e-12  # below it a share is the rounding of the eigenvalues
    )


def _strand(wavelength: float, spread: Spread, jones: NDArray[np.complex128], power: float) -> Strand:
    return Strand(wavelength, spread, np.repeat(math.sqrt(power) * jones[:, None], PLACES, axis=1))


def _coherency(beam: Any, wavelength: float) -> NDArray[np.complex128]:
    """Integral of E E^dagger over the plane, of unit trace."""
    total = np.zeros((2, 2), complex)
    for one in beam.terms:
        for other in beam.terms:
            weight = one.number * other.number.conjugate()
            same = 1.0 if one.mode == other.mode else other.mode.overlap(one.mode, wavelength)
            total += weight * same * np.outer(one.state.jones, other.state.jones.conj())
    unit: NDArray[np.complex128] = total / np.trace(total).real
    return unit


def through(strand: Strand, law: Any) -> Strand:
    """A strand after one law. Travel moves no polarization round the ring."""
    spread = strand.spread.past(law, strand.wavelength)
    if isinstance(law, Flip):
        return replace(strand, spread=spread, ring=_reversed(strand.ring, law.axis))
    if isinstance(law, Turn):
        return replace(strand, spread=spread, ring=_carried_round(strand.ring, law.angle))
    if isinstance(law, AxisLaw | CircularLaw):
        return replace(strand, spread=spread, ring=_turned(strand, law))
    if isinstance(law, ScalarLaw):
        x, y = _ring_places(strand.spread, law.centre)
        amplitude = law.transmission.value(NUMBERS, x, y)
        share = 1.0 if law.stop is None else passed(law.stop, law.centre, strand.spread)
        return replace(strand, spread=spread, ring=strand.ring * amplitude * math.sqrt(max(share, 0.0)))
    return replace(strand, spread=spread)


def _ring_places(spread: Spread, centre: tuple[Any, Any]) -> tuple[Reals, Reals]:
    """Places on the ring as seen from a centre [m]; the ring has the rms radius of the beam."""
    radius = 1e-3 if spread.infinite else math.sqrt(2) * spread.size
    (ox, oy), (cx, cy) = spread.offset, centre
    return radius * np.cos(PHI) + ox - float(cx), radius * np.sin(PHI) + oy - float(cy)


def _turned(strand: Strand, law: Any) -> NDArray[np.complex128]:
    x, y = _ring_places(strand.spread, getattr(law, "centre", (0.0, 0.0)))
    (a, b), (c, d) = law.linear(NUMBERS, np.arctan2(y, x), x, y)
    ex, ey = strand.ring
    return np.stack([a * ex + b * ey, c * ex + d * ey])


def _reversed(ring: NDArray[np.complex128], axis: str) -> NDArray[np.complex128]:
    """The ring in a frame with x (phi -> pi - phi) or y (phi -> -phi) reversed."""
    places = np.arange(PLACES)
    return ring[:, (PLACES // 2 - 1 - places) % PLACES if axis == "x" else PLACES - 1 - places]


def _carried_round(ring: NDArray[np.complex128], angle: float) -> NDArray[np.complex128]:
    """The ring turned counter-clockwise: exp(i l phi) becomes exp(i l (phi - angle))."""
    charges = np.fft.fftfreq(PLACES, 1 / PLACES)
    return np.fft.ifft(np.fft.fft(ring, axis=1) * np.exp(-1j * charges * angle), axis=1)


def total(strands: tuple[Strand, ...]) -> Reals:
    """Stokes parameters of all strands together [W]."""
    return np.asarray(sum((strand.stokes for strand in strands), np.zeros(4)))


def degree(stokes: Reals) -> float:
    """Degree of polarization; 0 in the dark."""
    return float(np.linalg.norm(stokes[1:]) / stokes[0]) if stokes[0] > 0 else 0.0


def azimuth(stokes: Reals) -> float:
    """Azimuth of the polarized part [rad]."""
    return float(ellipse(stokes)[0])


def state_in_words(strands: tuple[Strand, ...]) -> str:
    """The polarization of some light, for a person: "linear 45°, ellipticity 0°" or "varies over the beam"."""
    stokes = total(strands)
    if stokes[0] <= 0:
        return "dark"
    if any(strand.patterned for strand in strands):
        return "varies over the beam"
    share = degree(stokes)
    if share < 1e-6:
        return "unpolarized"
    return _named(from_stokes(*(float(s / stokes[0] / share) for s in stokes[1:]))) + (
        "" if share > 1 - 1e-9 else f", {100 * share:.3g} % polarized"
    )


def _named(state: State) -> str:
    # Nine decimals: what is left of 0 degrees after a few plates is 1e-14.
    turn, hand = (round(math.degrees(angle), 9) + 0.0 for angle in (state.azimuth, state.ellipticity))
    if abs(abs(hand) - 45) < 0.01:
        return "circular R" if hand > 0 else "circular L"
    if abs(hand) < 0.01:
        return f"linear {turn:.4g}°"
    return f"azimuth {turn:.4g}°, ellipticity {hand:+.4g}°"
