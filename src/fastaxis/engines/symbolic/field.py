"""The field on its way through a train: waves of the plane, each with a Jones vector of the ring."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import partial, reduce
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.angles import linear
from fastaxis.engines.symbolic.ring.reading import read
from fastaxis.engines.symbolic.ring.ring import ANGLE, UNIT
from fastaxis.engines.symbolic.waves import IntegralWave, Place, Section, StillWave, Wave
from fastaxis.errors import SymbolError

__all__ = ["Field", "Pair", "split"]

Pair = tuple[Poly, Poly]
"""(E_L, E_R)."""


@dataclass(frozen=True)
class Field:
    """sum wave * (E_L, E_R) over pieces.

    Parameters
    ----------
    pieces : ((wave, (E_L, E_R)), ...); the Jones vectors hold what plates did since the wave last travelled.
    scale : power of the field over that of the pieces; 1/2 keeps the sqrt 2 of linear light out of every product.
    """

    pieces: tuple[tuple[Wave, Pair], ...]
    place: Place
    scale: Fraction = Fraction(1)

    def with_matrix(self, matrix: Any) -> Field:
        """Behind a Jones matrix in the circular basis."""
        (a, b), (c, d) = matrix
        return self._each(lambda pair: (a * pair[0] + b * pair[1], c * pair[0] + d * pair[1]))

    def times(self, factor: Poly) -> Field:
        """Behind a scalar transmission."""
        return self._each(lambda pair: (factor * pair[0], factor * pair[1]))

    def plus(self, other: Field) -> Field:
        """The coherent sum with light of the same source that came another way."""
        found = dict(self.pieces)
        for wave, pair in other.pieces:
            old = found.get(wave)
            found[wave] = pair if old is None else (old[0] + pair[0], old[1] + pair[1])
        return Field(tuple(found.items()), self.place, self.scale)

    def _each(self, change: Any) -> Field:
        return Field(tuple((wave, change(pair)) for wave, pair in self.pieces), self.place, self.scale)

    def flipped(self, axis: str) -> Field:
        """In a frame with x (or y) reversed. The hands stay: the mirror's own law has changed them."""
        angle = sp.pi - PHI if axis == "x" else -PHI
        pieces = []
        for wave, pair in self.pieces:
            gained, turned = wave.flipped(axis)
            phase = self.place.maths.phasor(gained)
            left, right = (_with_phi(poly, angle) * phase for poly in pair)
            pieces.append((turned, (left, right)))
        return Field(tuple(pieces), self.place, self.scale)

    def turned(self, angle: Any) -> Field:
        """With the picture turned counter-clockwise: phi - angle in place of phi, for plates and waves alike.

        Raises
        ------
        ValueError : a wave that is not a function of r times exp(i l phi).
        """
        pieces = []
        for wave, pair in self.pieces:
            if wave.total is None:
                raise ValueError(wave)
            phase = self.place.maths.phasor(-wave.total * angle)
            left, right = (_with_phi(poly, PHI - angle) * phase for poly in pair)
            pieces.append((wave, (left, right)))
        return Field(tuple(pieces), self.place, self.scale)

    def moved(self, section: Section) -> Field:
        """Behind a section of free space and lenses."""
        if section == Section():
            return self
        found: dict[Wave, Pair] = {}
        for wave, pair in self.pieces:
            for key, share in split(pair).items():
                there = _carried(wave, key, section)
                old = found.get(there)
                found[there] = share if old is None else (old[0] + share[0], old[1] + share[1])
        return Field(tuple(found.items()), self.place, self.scale)

    def bent(self, vergence: Any) -> Field:
        """Behind a thin centred lens, which turns no charge and cuts nothing off."""
        lens = Section(c=-vergence)
        phase = self.place.maths.phasor(-self.place.wave_number * vergence * R**2 / 2)
        pieces = tuple(
            (wave, (pair[0] * phase, pair[1] * phase)) if isinstance(wave, StillWave) else (wave.moved(lens), pair)
            for wave, pair in self.pieces
        )
        return Field(pieces, self.place, self.scale)

    @property
    def whole(self) -> Pair:
        """(E_L, E_R) with the waves multiplied in [1/m]."""
        zero = self.place.maths.ring.zero
        parts = [(wave.poly(self.place), pair) for wave, pair in self.pieces]
        return tuple(reduce(lambda total, part: total + part[0] * part[1][i], parts, zero) for i in (0, 1))  # type: ignore[return-value]  # two


Key = tuple[Any, Any]


def split(pair: Pair) -> dict[Key, Pair]:
    """The Jones vector by its charge and its function of r."""
    zero = pair[0].ring.zero
    left, right = (poly.parts(partial(_structure, poly)) for poly in pair)
    return {key: (left.get(key, zero), right.get(key, zero)) for key in left | right}


def _structure(poly: Poly, key: int) -> tuple[Key, int]:
    """((charge, function of r), what is the same everywhere) of a monomial."""
    ring = poly.ring
    root, exponents = ring.exponents(key)
    charge, shape = sp.S.Zero, sp.S.One
    for place in list(exponents):
        generator = ring.generators[place]
        expression = generator.expression
        if not expression.has(R, PHI):
            continue
        power = sp.Rational(exponents.pop(place), UNIT)
        turns = sp.cancel(expression / PHI) if generator.kind == ANGLE else expression
        if generator.kind == ANGLE and not turns.has(PHI, R):
            charge += power * turns
        elif expression.has(PHI):
            raise SymbolError(
                "a part that is tilted, off centre or not round has no closed form once the light travels on",
                got=f"the pattern {expression}",
                fix='train.expose("cam", fa.SIX_STATES)',
            )
        else:
            shape *= sp.exp(sp.I * power * expression) if generator.kind == ANGLE else expression**power
    return (charge, shape), ring.pack(root, exponents)


def _carried(wave: Wave, key: Key, section: Section) -> Wave:
    charge, shape = key
    if shape != 1:
        return IntegralWave(wave, charge, section, shape)
    if charge == 0:
        return wave.moved(section)
    return wave.twisted(charge, section)


def _with_phi(poly: Poly, angle: Any) -> Poly:
    """The polynomial with another expression for phi."""
    ring = poly.ring
    if not any(generator.expression.has(PHI) for generator in ring.generators):
        return poly

    def turned(key: int) -> Poly:
        root, exponents = ring.exponents(key)
        product = ring.rational(1)
        for place in list(exponents):
            generator = ring.generators[place]
            if not generator.expression.has(PHI):
                continue
            power = Fraction(exponents.pop(place), UNIT)
            there = generator.expression.subs(PHI, angle)
            if generator.kind == ANGLE:
                turns, rest = linear(there * sp.Rational(power.numerator, power.denominator))
                product = product * ring.phasor(dict(rest), turns)
            else:
                product = product * read(ring, there).power(int(power))
        return product * ring.poly({ring.pack(root, exponents): 1})

    return poly.map_keys(turned)
