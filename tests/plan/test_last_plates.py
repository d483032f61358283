"""Uniform matrices behind the last patterned plate act as well on the light at the target."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines import propagate
from fastaxis.plan import JonesStep, make_plan
from fastaxis.plan.cavity import RoundTrip
from fastaxis.plan.last_plates import without_last_plates
from fastaxis.units import mm, nm

GRID = fa.Grid(320, 9 * mm)
CENTRE = (0.1 * mm, -0.2 * mm)
angles = st.floats(-1.5, 1.5)
plates = st.one_of(
    st.builds(lambda a, d: fa.Retarder(fast=a, retardance=d), angles, angles),
    st.builds(lambda a: fa.Polarizer(axis=a), angles),
    st.builds(lambda a: fa.FaradayRotator(angle=a), angles),
    st.builds(lambda t: fa.NeutralDensity(transmission=t), st.floats(0.2, 1.0)),
    st.builds(lambda fold: fa.Mirror(fold=fold), st.sampled_from(["horizontal", "vertical"])),
)
places = st.one_of(
    st.builds(lambda d: fa.FreeSpace(d), st.floats(0.05, 0.4)),
    st.builds(lambda f: fa.Lens(focal=f), st.sampled_from([0.5, -0.8])),
    st.builds(lambda r: fa.Aperture(radius=r, centre=CENTRE), st.floats(0.6e-3, 1.5e-3)),
    st.builds(lambda l: fa.SpiralPlate(charge=l), st.sampled_from([-1, 2])),
)
patterns = st.builds(
    lambda q, c: fa.QPlate(q=q, centre=c), st.sampled_from([0.5, -1]), st.sampled_from([(0, 0), CENTRE])
)


@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")
@settings(max_examples=50, deadline=None)
@given(st.lists(st.one_of(plates, places, patterns), min_size=1, max_size=7), st.booleans())
def test_they_can_be_met_last(parts, round_about):
    if round_about:  # the same parts on the axis
        parts = [replace(part, centre=(0.0, 0.0)) if hasattr(part, "centre") else part for part in parts]
    train = fa.Train(wavelength=633 * nm).along(fa.Laser(waist=0.5 * mm, state=fa.elliptical(0.3, 0.2)), *parts)
    where = list(train.elements)[-1]
    try:
        plan = make_plan(train, where, grid=None if round_about else GRID)
        (fresh,) = propagate(plan)
    except fa.SamplingError:
        assume(False)
    bare, matrix = without_last_plates(plan.branches[0])
    assert len(bare.steps) == len(plan.steps) or len(bare.steps) == len(plan.steps) - 1
    (light,) = propagate(replace(plan, branches=(bare,)))
    x = np.linspace(-0.9, 1.1, 7) * mm
    before = light.at(x, x[::-1])
    after = np.tensordot(matrix.matrix, before, axes=1)
    # Harmonics are settled to some 1e-14 of the peak, in either state.
    assert abs(after - fresh.at(x, x[::-1])).max() <= 1e-12 * abs(before).max()


def steps_of(*parts, **options):
    train = fa.Train(wavelength=633 * nm).along(fa.Laser(waist=0.5 * mm, name="laser"), *parts)
    return without_last_plates(make_plan(train, list(train.elements)[-1], **options).branches[0])


def test_only_what_stands_behind_the_last_pattern_is_taken():
    early, late = fa.HalfWavePlate(fast=0.1, name="early"), fa.Rotator(angle=0.3, name="late")
    bare, matrix = steps_of(early, fa.QPlate(q=0.5, name="qp"), fa.FreeSpace(0.2, name="arm"), late, grid=GRID)
    assert [step.names for step in bare.steps] == [("early",), ("qp",), ("arm",)]
    assert len(bare.sampling.planes) == 4
    # A rotation by beta counter-clockwise: H goes to (cos beta, sin beta).
    assert np.array(matrix.matrix)[:, 0] == pytest.approx([np.cos(0.3), np.sin(0.3)], abs=1e-15)


def test_without_a_pattern_all_plates_are_last():
    bare, matrix = steps_of(fa.HalfWavePlate(fast=0.1), fa.FreeSpace(0.2), fa.Rotator(angle=0.3), engine="azimuthal")
    assert [type(step.law).__name__ for step in bare.steps] == ["TravelLaw"]
    assert abs(np.linalg.det(np.array(matrix.matrix))) == pytest.approx(1, abs=1e-15)


def test_steps_of_harmonics_are_counted_without_them():
    parts = [fa.QPlate(q=0.5), fa.HalfWavePlate(fast=0.2), fa.FreeSpace(0.3), fa.Aperture(radius=1 * mm, centre=CENTRE)]
    bare, matrix = steps_of(*parts)
    assert (bare.harmonic_steps, len(bare.steps), len(bare.sampling.planes)) == (2, 3, 2)
    assert matrix != JonesStep()


def test_light_that_goes_round_keeps_its_matrices():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.5 * mm), fa.QPlate(q=0.5), fa.HalfWavePlate(fast=0.1, name="plate")
    )
    branch = replace(make_plan(train, "plate", engine="azimuthal").branches[0], round_trip=RoundTrip((), (), 0.5))
    assert without_last_plates(branch) == (branch, JonesStep())
