import pytest
import sympy

from fastaxis.light import (
    UNPOLARIZED,
    Beam,
    Component,
    D,
    Gaussian,
    H,
    HermiteGauss,
    LaguerreGauss,
    R,
    Source,
    Term,
    V,
    coherent_source,
    make_source,
    partially_polarized,
)
from fastaxis.units import mm, mW, nm

MODE = Gaussian(0.8 * mm)


def test_one_mode_in_one_state_is_one_coherent_beam():
    source = make_source(MODE, D, power=5 * mW)
    assert source.beam == Beam((Term(1, MODE, D),))
    assert source.powers == (5 * mW,)
    assert source.components[0].wavelength_or(532 * nm) == 532 * nm


def test_a_mixture_of_states_makes_a_component_each():
    source = make_source(MODE, partially_polarized(R, 0.5), power=4 * mW)
    assert source.beam is None
    assert [c.beam.state for c in source.components] == [R, R.orthogonal]
    assert source.powers == pytest.approx((3 * mW, 1 * mW), rel=1e-15)


def test_modes_states_and_lines_combine():
    modes = ((0.9, MODE), (0.1, LaguerreGauss(0, 1, 0.8 * mm)))
    source = make_source(modes, UNPOLARIZED, power=1.0, lines=((0.8, 632.8 * nm), (0.2, 635 * nm)))
    assert len(source.components) == 8
    assert sum(source.powers) == pytest.approx(1, abs=1e-15)
    last = source.components[-1]
    assert (last.weight, last.wavelength) == (pytest.approx(0.1 * 0.5 * 0.2), 635 * nm)
    assert last.wavelength_or(532 * nm) == 635 * nm
    assert last.beam.terms[0].state == V


def test_a_coherent_sum_stays_one_beam():
    terms = [Term(1, MODE, H), Term(1j, HermiteGauss(1, 0, 0.8 * mm), V)]
    assert coherent_source(terms, power=1 * mW).beam == Beam(tuple(terms))
    assert coherent_source(terms, power=1 * mW, lines=((1.0, 532 * nm),)).components[0].wavelength == 532 * nm


def test_symbols_are_gathered():
    p, w, share, line = sympy.symbols("P w s lambda", positive=True)
    source = make_source(((share, Gaussian(w)), (1 - share, MODE)), H, power=p, lines=((1, line),))
    assert source.symbols == {p, w, share, line}


@pytest.mark.parametrize(
    ("code", "text"),
    [
        ("make_source(Gaussian(1*mm), H, power=0)", "source: power = 0.0; power must be positive (fix: power=5*mW)"),
        ("make_source(Gaussian(1*mm), H, power=-1)", "power must be positive"),
        ("make_source(((0.5, Gaussian(1*mm)),), H, power=1)", "modes: weights add up to 0.5; weights must add up to 1"),
        ("make_source(H, H, power=1)", "modes are given as pairs of weight and value"),
        ("make_source(Gaussian(1*mm), H, power=1, lines=532*nm)", "lines are given as pairs of weight and value"),
        ("make_source(Gaussian(1*mm), H, power=1, lines=((1.0, 532),))", "wavelength is in metres and must lie between"),
        ("make_source(Gaussian(1*mm), H, power=1, lines=((1.5, 532*nm), (-0.5, 633*nm)))", "a weight is a share of power"),
        ("make_source(Gaussian(1*mm), 'H', power=1)", "a term of a coherent sum has a pure state"),
        ("Source((), power=1)", "source: no parts; a mixture needs at least one part"),
        ("Source((Component(0.5, Beam(Term(1, Gaussian(1*mm), H))),), power=1)", "source: weights add up to 0.5"),
        ("Component(weight='all', beam=Beam(Term(1, Gaussian(1*mm), H)))", "weight must be one real, finite number"),
        ("coherent_source([], power=1)", "a beam is a sum of one or more terms"),
    ],
)  # fmt: skip
def test_refusals(refuses, code, text):
    refuses(code, text)


def test_a_source_is_read_only():
    source = Source((Component(1.0, Beam(Term(1, MODE, H))),), 1 * mW)
    with pytest.raises(AttributeError):
        source.power = 2.0
