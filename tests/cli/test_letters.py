"""Values for letters, in the unit of the parameter they stand in."""

import pytest
import sympy as sp

import fastaxis as fa
from fastaxis.cli.letters import given, typed
from fastaxis.units import mm, nm

f, a, w, t = sp.symbols("f a w t", positive=True)


@pytest.fixture
def train():
    return fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=w, state=fa.elliptical(a, 0), name="laser"),
        fa.NeutralDensity(density=t, name="nd"),
        fa.Lens(focal=f, name="lens"),
        fa.Aperture(radius=1 * mm, name="stop"),
    )


@pytest.mark.parametrize(("letter", "said"), [("f", "200mm"), ("a", "30deg"), ("w", "0.5mm"), ("t", "0.3")])
def test_a_likely_value_has_the_unit_of_its_parameter(train, letter, said):
    assert typed(train, letter) == f"{letter}={said}"


def test_a_bare_whole_number_gets_its_unit(train):
    assert given(train, "f", 150) == "f=150mm"
    assert given(train, "a", 45) == "a=45deg"
    assert given(train, "a", 0.7853) == "a=30deg"
