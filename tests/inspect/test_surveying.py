"""The light an inspection carries agrees with the light the engines propagate."""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.inspect.strands import state_in_words, total
from fastaxis.inspect.surveying import survey
from fastaxis.units import deg, mm, mW, nm, um

angles = st.floats(-math.pi, math.pi)


def last(train):
    return survey(train).visits[-1]


@settings(max_examples=30, deadline=None)
@given(angles, angles, st.floats(0.1, 3), angles, st.floats(-0.7, 0.7), st.booleans())
def test_states_behind_plates_and_mirrors_are_those_of_the_engine(fast, axis, retardance, turn, hand, folded):
    folds = [fa.Mirror(fold="vertical", Rp=0.9, phase_s=0.4)] if folded else []
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, power=2 * mW, state=fa.elliptical(0.3, hand)),
        fa.Retarder(fast=fast, retardance=retardance),
        *folds,
        fa.Rotator(angle=turn),
        fa.FreeSpace(100 * mm),
        fa.Polarizer(axis=axis, extinction=20),
        fa.Detector(name="meter"),
    )
    stokes = total(last(train).before)
    # a dozen roundings of amplitudes of order one
    np.testing.assert_allclose(stokes, train.power("meter") * train.state("meter").stokes, atol=1e-13, rtol=1e-10)


def test_power_of_a_patterned_beam_behind_a_polarizer():
    """Half of a radial beam passes any polarizer; the uniform part of a detuned one does not."""
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, power=1 * mW, state=fa.H),
        fa.QPlate(q=0.5, retardance=150 * deg),
        fa.Polarizer(axis=90 * deg),
        fa.Detector(name="meter"),
    )
    # The engine's ring integrals are good to 1e-6 at a singularity; across the input only the converted half is left.
    assert total(last(train).before)[0] == pytest.approx(train.power("meter"), rel=1e-5)
    assert total(last(train).before)[0] == pytest.approx(0.5e-3 * math.sin(75 * deg) ** 2, rel=1e-12)


def test_a_mirror_puts_the_ring_in_its_own_frame():
    """Behind a mirror an axis q phi + a stands at q phi' - a - q pi; a second plate there undoes the first."""
    undone = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, state=fa.H),
        fa.QPlate(q=0.5, offset=20 * deg),
        fa.Mirror(),
        fa.QPlate(q=0.5, offset=-20 * deg - 90 * deg),
        fa.Detector(name="meter"),
    )
    assert not last(undone).patterned
    assert state_in_words(last(undone).before) == "linear 0°"
    # 20 deg beside that place, both together turn the light by twice 20 deg.
    assert state_in_words(last(undone.with_changes({"qplate2.offset": -90 * deg})).before) == "linear 40°"


def test_a_prism_turns_the_ring():
    """A rolled Dove prism between two q-plates: what passes a polarizer agrees with the engine."""
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, power=1e-3, state=fa.H),
        fa.QPlate(q=0.5, offset=10 * deg),
        fa.DovePrism(roll=25 * deg, index=1.52),
        fa.QPlate(q=0.5, offset=30 * deg),
        fa.Polarizer(axis=20 * deg),
        fa.Detector(name="meter"),
    )
    # The engine's rings are good to 1e-6 at singularities.
    assert total(last(train).before)[0] == pytest.approx(train.power("meter"), rel=1e-5)


def test_beams_of_two_states_are_carried_as_two():
    beam = fa.Beam((fa.Term(1, fa.Gaussian(1 * mm), fa.R), fa.Term(1, fa.LaguerreGauss(0, 1, 1 * mm), fa.L)))
    train = fa.Train(wavelength=532 * nm).along(fa.Laser(beam=beam, power=2 * mW), fa.Detector(name="meter"))
    visit = last(train)
    assert visit.patterned
    assert visit.power == pytest.approx(2e-3, rel=1e-12)
    np.testing.assert_allclose(total(visit.before)[1:], 0, atol=1e-15)


def test_beam_radius_at_a_focus():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=0.8 * mm), fa.Lens(focal=500 * mm), fa.FreeSpace(500 * mm), fa.Camera(pixel=5 * um)
    )
    # lambda f/(pi w) for a waist at the lens: exact in the back focal plane
    assert last(train).radius == pytest.approx(532e-9 * 0.5 / (math.pi * 0.8e-3), rel=1e-9)


def test_the_ledger_comes_first_and_paths_are_followed_to_their_ends():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, power=1 * mW), fa.BeamSplitter(reflectance=0.3, name="s"), fa.Detector(name="a")
    )
    train.along("s.reflected", fa.Mirror(name="m"), fa.Detector(name="b"))
    bench = survey(train)
    assert [v.name for v in bench.visits] == ["s", "a", "s", "m", "b"]
    assert bench.ledger["s", "reflected"] == pytest.approx(0.3e-3)
    assert [v.flips for v in bench.visits if v.name == "b"] == [(2, 0)]
    assert bench.whole


def test_too_many_paths_are_cut_and_said(monkeypatch):
    monkeypatch.setattr("fastaxis.inspect.surveying.MOST", 20)
    train = fa.Train(wavelength=532 * nm).along(fa.Laser(waist=1 * mm), fa.BeamSplitter(name="s0"))
    for k in range(4):
        train.along(f"s{k}.transmitted", fa.BeamSplitter(name=f"s{k + 1}")).join(f"s{k}.reflected", f"s{k + 1}.side")
    assert len(survey(train).visits) == 20
    assert any(f.check == "paths" for f in train.inspect())
