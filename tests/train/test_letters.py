"""Letters at any depth, and numbers in their place."""

import pytest
import sympy

import fastaxis as fa
from fastaxis.units import mm, nm

alpha, beta = sympy.symbols("alpha beta", real=True)
lam = sympy.Symbol("lambda", positive=True)


@pytest.fixture
def lettered():
    beam = fa.Beam(
        (fa.Term(sympy.cos(beta), fa.Gaussian(1 * mm), fa.H), fa.Term(sympy.sin(beta), fa.Gaussian(1 * mm), fa.V))
    )
    return fa.Train(wavelength=lam).along(
        fa.Laser(beam=beam, name="laser"),
        fa.HalfWavePlate(fast=alpha / 2 + sympy.pi / 8, name="hwp"),
        fa.Polarizer(axis=alpha),
    )


def test_symbols_are_found_at_any_depth(lettered):
    assert lettered.symbols == {alpha, beta, lam}


def test_numbers_take_the_place_of_letters_everywhere(lettered):
    numbers = lettered.with_values({alpha: 0.25, "beta": 0.5, lam: 633 * nm})
    assert numbers.symbols == set()
    assert numbers.wavelength == 633 * nm
    # One subtraction and one product of numbers near 1: a few roundings of 1e-16.
    assert numbers.elements["hwp"].fast == pytest.approx(0.125 + float(sympy.pi) / 8, abs=1e-15)
    assert type(numbers.elements["hwp"].fast) is float
    amplitudes = [term.amplitude for term in numbers.elements["laser"].beam.terms]
    assert [complex(a) for a in amplitudes] == pytest.approx(
        [complex(sympy.cos(0.5)), complex(sympy.sin(0.5))], abs=1e-15
    )


def test_letters_without_a_value_stay(lettered):
    assert lettered.with_values({alpha: 0.1}).symbols == {beta, lam}


def test_exact_values_stay_exact(lettered):
    assert lettered.with_values({alpha: sympy.pi / 4}).elements["hwp"].fast == sympy.pi / 4


def test_whole_numbers_stay_whole():
    q = sympy.Symbol("q")
    train = fa.Train(wavelength=532 * nm).add(fa.QPlate(q=q, name="qp"))
    assert train.with_values({q: 1}).elements["qp"].q == 1


def test_checks_apply_to_the_numbers(lettered):
    with pytest.raises(fa.ParameterError, match="radians"):
        lettered.with_values({alpha: 45})


def test_a_label_made_of_a_letter_goes_with_it():
    train = fa.Train(wavelength=532 * nm).add(fa.Laser(waist=1 * mm, state=fa.linear(alpha), name="laser"))
    state = train.with_values({alpha: 0.1}).elements["laser"].state
    assert (state.azimuth, "alpha" in state.label) == (0.1, False)


def test_unknown_letter_is_refused_with_the_likely_one(lettered):
    with pytest.raises(fa.SymbolError, match="alhpa: no such letter") as caught:
        lettered.with_values({"alhpa": 0.1})
    assert caught.value.fix == 'train.with_values({"alpha": 0.1})'


def test_a_train_of_numbers_has_no_letters(line):
    assert line.symbols == set()
    with pytest.raises(fa.SymbolError, match="all values are numbers already"):
        line.with_values({"alpha": 0.1})
