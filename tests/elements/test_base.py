"""What all parts have in common."""

import pickle

import sympy as sp

from fastaxis.elements import HalfWavePlate
from fastaxis.units import deg, nm

DESIGNED = HalfWavePlate(fast=20 * deg, design=532 * nm, name="hwp")


def retardance(part, wavelength):
    law = part.passages(wavelength)["front", "back"].laws[0]
    return law.across.phase - law.along.phase


def test_passages_are_made_once_for_each_wavelength():
    assert DESIGNED.passages(532 * nm) is DESIGNED.passages(532 * nm)
    assert retardance(DESIGNED, 532 * nm) != retardance(DESIGNED, 633 * nm)
    assert retardance(DESIGNED, 532 * nm) == retardance(HalfWavePlate(fast=20 * deg), 532 * nm)


def test_a_number_does_not_answer_for_a_symbol():
    """sympy's 1/2 equals 0.5, but what is made of it is exact."""
    half = sp.Rational(1, 2)
    plate = HalfWavePlate(fast=0, design=sp.Rational(1, 4))
    assert isinstance(retardance(plate, half), sp.Expr)
    assert plate.passages(0.5) is not plate.passages(half)


def test_what_is_kept_is_no_part_of_the_part():
    asked, fresh = (HalfWavePlate(fast=20 * deg, name="hwp") for _ in range(2))
    asked.passages(532 * nm)
    assert asked == fresh
    assert repr(asked) == repr(fresh)
    assert hash(asked) == hash(fresh)
    assert pickle.loads(pickle.dumps(asked)) == fresh
    turned = asked.changed(fast=30 * deg)
    assert turned.passages(532 * nm) != asked.passages(532 * nm)
