"""Irradiance of harmonics as a few real pictures: products of two radial shapes, times the cosine or sine of a turn.

With E_hand = sum of a_i g_j(r) exp(i l phi), each of S0 .. S3 is a sum of numbers times

    Re or Im of g_j* g_k,  times  cos m phi or sin m phi,  m = |l' - l|.

Numbers are all that a turned plate changes.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import NamedTuple

import numpy as np

from fastaxis.engines.azimuthal.panels import Complexes, Reals
from fastaxis.engines.azimuthal.table import Table

__all__ = ["Part", "Wave", "parts_of", "pictures", "waves_of", "weights_of"]


NOTHING = 1e-300  # [m]: on the axis there is no angle


class Part(NamedTuple):
    """One term a g_j(r) exp(i l phi) of the field of a hand."""

    hand: int
    l: int
    shape: int
    number: complex


class Wave(NamedTuple):
    """A picture: the real or imaginary part of g_first* g_second, times cos or sin of ``turns`` phi."""

    first: int
    second: int
    turns: int
    imaginary: bool
    sine: bool

    @property
    def mirrored(self) -> tuple[int, int]:
        """What the picture is multiplied by where x, and where y, changes its sign."""
        odd = -1 if self.turns % 2 else 1
        return (-odd, -1) if self.sine else (odd, 1)

    @property
    def swapped(self) -> tuple[Wave, int]:
        """The picture whose value at x and y, times a sign, this one has where both change places: at pi/2 - phi."""
        sign = (1, 1, -1, -1)[(self.turns + self.sine * (2 if self.turns % 2 == 0 else 0)) % 4]
        return self._replace(sine=self.sine != bool(self.turns % 2)), sign


def parts_of(table: Table, orders: Sequence[tuple[int, int]]) -> list[Part]:
    """The field, term by term."""
    return [
        Part(hand, l, int(j), complex(row[j]))
        for (hand, l), row in zip(orders, table.parts(), strict=True)
        for j in row.nonzero()[0]
    ]


def _waves(one: Part, other: Part) -> Iterable[tuple[Wave, complex]]:
    """g_one* g_other exp(i (l' - l) phi) as pictures, with the number of each."""
    first, second = sorted((one.shape, other.shape))
    turns = other.l - one.l
    for imaginary in (False, True)[: 1 if first == second else 2]:
        for sine in (False, True)[: 2 if turns else 1]:
            number = 1j * (1 if one.shape == first else -1) if imaginary else 1.0
            if sine:
                number *= 1j if turns > 0 else -1j
            yield Wave(first, second, abs(turns), imaginary, sine), number


def waves_of(parts: Iterable[Part]) -> tuple[Wave, ...]:
    """All pictures that terms of these shapes and charges may need, whatever their hands and numbers are."""
    distinct = {(part.shape, part.l): part for part in parts}.values()
    return tuple(sorted({wave for one in distinct for other in distinct for wave, _ in _waves(one, other)}))


def weights_of(parts: Sequence[Part], waves: Sequence[Wave]) -> Reals:
    """What S0 .. S3 take of each picture, shape (4, waves): S1 + i S2 = 2 E_L* E_R and S3 = I_R - I_L."""
    place = {wave: i for i, wave in enumerate(waves)}
    both, cross = np.zeros((2, len(waves))), np.zeros(len(waves), dtype=complex)
    for one in parts:
        for other in parts:
            product = one.number.conjugate() * other.number
            for wave, number in _waves(one, other):
                if one.hand == other.hand:
                    # Each pair comes in both orders, so that imaginary parts cancel.
                    both[one.hand, place[wave]] += (product * number).real
                elif one.hand < other.hand:
                    cross[place[wave]] += 2 * product * number
    left, right = both
    return np.stack([left + right, cross.real, cross.imag, right - left])


def pictures(table: Table, waves: Sequence[Wave], places: Complexes) -> Reals:
    """The pictures at places x + i y [m], shape (waves, *places.shape)."""
    r: Reals = np.abs(places)
    shapes = table.shapes(r)
    unit = places * (1 / np.maximum(r, NOTHING))
    powers = [np.ones_like(unit)]
    for _ in range(max((wave.turns for wave in waves), default=0)):
        powers.append(powers[-1] * unit)
    products: dict[tuple[int, int], Complexes | Reals] = {}
    out = np.empty((len(waves), *r.shape))
    for picture, wave in zip(out, waves, strict=True):
        pair = (wave.first, wave.second)
        if pair not in products:
            one, other = shapes[wave.first], shapes[wave.second]
            same = wave.first == wave.second
            products[pair] = one.real**2 + one.imag**2 if same else one.conj() * other
        product = products[pair].imag if wave.imaginary else products[pair].real
        power = powers[wave.turns]
        np.multiply(product, power.imag if wave.sine else power.real, out=picture)
    return out
