"""What an inspection says of paths that meet, against the visibility worked out from their fields."""

import math

import pytest

import fastaxis as fa
from fastaxis.inspect.checks.arms import agreement, arms, overlap, restoring
from fastaxis.inspect.surveying import survey
from fastaxis.units import deg, mm, um

CAMERA = fa.Camera(pixel=5 * um, shape=(512, 512), name="cam")


def meeting(bench_of, one, other, *, state=fa.H, end=CAMERA, before=()):
    train = bench_of(*before, fa.BeamSplitter(name="split"), *one, fa.Mirror(name="m1"), state=state, waist=0.3 * mm)
    train.along("m1", fa.PhaseShift(phase=1.5), fa.BeamSplitter(name="join"))
    train.along("split.reflected", *other, fa.Mirror(name="m2"), "join.side")
    return train.along("join.reflected", end).along("join.transmitted", fa.BeamDump(name="dump"))


def met(train):
    return [visit for visit in survey(train).visits if visit.name == train.cameras[0]]


def found(train, check):
    return [f for f in arms(survey(train)) if f.check == check]


@pytest.mark.parametrize(
    ("one", "state"),
    [
        ([fa.HalfWavePlate(fast=20 * deg)], fa.H),
        ([fa.QuarterWavePlate(fast=30 * deg)], fa.elliptical(20 * deg, 10 * deg)),
        ([fa.QPlate(q=0.5)], fa.H),
        ([fa.QPlate(q=1, retardance=120 * deg)], fa.R),
        ([], fa.D),
    ],
)
def test_agreement_is_the_polarization_factor_of_the_visibility(bench_of, one, state):
    train = meeting(bench_of, one, [], state=state)
    # Uniform states to roundings; |cos| of a pattern has kinks, which a mean over 32 places misses by about 1/32^2.
    assert agreement(*met(train)) == pytest.approx(train.visibility("cam").pairs[0].polarization, abs=2e-3)


@pytest.mark.parametrize(
    ("one", "state"),
    [([fa.HalfWavePlate(fast=45 * deg)], fa.H), ([fa.HalfWavePlate(fast=0)], fa.linear(45 * deg)),
     ([fa.HalfWavePlate(fast=0)], fa.R), ([fa.HalfWavePlate(fast=60 * deg)], fa.linear(15 * deg))],
)  # fmt: skip
def test_the_analyzer_offered_restores_the_fringes(bench_of, one, state):
    train = meeting(bench_of, one, [], state=state)
    (finding,) = found(train, "arm polarization")
    assert finding.severity.value == "medium"
    angle = restoring(*met(train))
    assert f"fa.linear({round(math.degrees(angle), 9) + 0.0:.4g}*deg)" in finding.fix
    assert train.visibility("cam").value < 1e-9
    # Both arms lose half of their light to it and meet alike; the angle is offered in steps of half a degree.
    assert train.visibility("cam", fa.linear(angle)).value == pytest.approx(1, abs=1e-4)


@pytest.mark.parametrize(
    ("one", "other"),
    [
        ([fa.FreeSpace(300 * mm)], [fa.Lens(focal=200 * mm), fa.FreeSpace(300 * mm)]),
        ([fa.Wedge(x=1e-3), fa.FreeSpace(300 * mm)], [fa.FreeSpace(300 * mm)]),
        ([fa.Wedge(y=1e-3), fa.FreeSpace(300 * mm)], [fa.Lens(focal=200 * mm), fa.FreeSpace(300 * mm)]),
    ],
)
def test_overlap_is_the_spatial_factor_of_the_visibility(bench_of, one, other):
    train = meeting(bench_of, one, other)
    # Gaussians of known radii and places: a closed form beside a sum over samples good to 1e-4.
    assert overlap(*met(train)) == pytest.approx(train.visibility("cam").pairs[0].spatial, abs=1e-3)


def test_a_plane_wave_overlaps_with_anything():
    train = fa.Train(wavelength=532e-9).along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), name="laser"),
        fa.BeamSplitter(name="split"),
        fa.BeamSplitter(name="join"),
    )
    train.along("split.reflected", "join.side").along("join.reflected", CAMERA)
    assert overlap(*met(train)) == 1.0
    assert not list(arms(survey(train)))


def test_arms_turned_by_half_a_turn(bench_of):
    spiral = [fa.SpiralPlate(charge=1)]
    folds = [fa.Mirror(fold="vertical"), fa.Mirror()]
    (finding,) = found(meeting(bench_of, folds, [], before=spiral), "mirrored arms")
    assert finding.severity.value == "low"
    assert "turned by 180° of each other" in finding.got
    assert not found(meeting(bench_of, folds, []), "mirrored arms")  # a round beam of H is its own mirror image


def test_a_detector_is_told_of_polarization_alone(bench_of):
    train = meeting(
        bench_of, [fa.HalfWavePlate(fast=45 * deg), fa.Lens(focal=40 * mm), fa.FreeSpace(80 * mm)], [fa.Mirror()],
        end=fa.Detector(name="meter"), before=[fa.SpiralPlate(charge=1)],
    )  # fmt: skip
    assert [f.check for f in arms(survey(train))] == ["arm polarization"]


def test_each_kind_is_told_once_however_many_paths_meet(bench_of):
    train = bench_of(fa.BeamSplitter(name="s1"), fa.BeamSplitter(name="s2"), fa.BeamSplitter(name="j1"))
    train.along("s2.reflected", fa.HalfWavePlate(fast=45 * deg), "j1.side")
    train.along("j1.reflected", fa.BeamSplitter(name="j2")).along("j1.transmitted", fa.BeamDump())
    train.along("s1.reflected", fa.HalfWavePlate(fast=20 * deg), "j2.side")
    train.along("j2.reflected", CAMERA).along("j2.transmitted", fa.BeamDump())
    assert len(met(train)) == 3
    (finding,) = found(train, "arm polarization")
    assert finding.severity.value == "medium"


def test_light_that_runs_round_is_not_compared_with_itself(bench_of):
    cavity = bench_of(fa.BeamSplitter(reflectance=0.9, name="a"), fa.FreeSpace(0.1, name="gap"))
    cavity.along("gap", fa.BeamSplitter(reflectance=0.9, name="b"), CAMERA)
    cavity.along("b.reflected", "gap.back", "a.side")
    assert not list(arms(survey(cavity)))


def michelson(*, wrong, end, line=None):
    laser = fa.Laser(waist=1 * mm, state=fa.H, line=line or fa.GaussianLine(coherence_length=100 * mm), name="laser")
    train = fa.Train(wavelength=633e-9, name="Withy Eyot").along(laser, fa.BeamSplitter(name="bs"))
    train.retro("bs.transmitted", fa.FreeSpace(200 * mm, name="short"), fa.Mirror(name="m1"))
    train.retro("bs.reflected", fa.FreeSpace(200 * mm + wrong, name="long"), fa.Mirror(name="m2"))
    return train.along("bs.side", end)


@pytest.mark.parametrize("end", [fa.Detector(name="meter"), CAMERA])
def test_a_path_difference_is_told_at_a_detector_too_and_its_fix_mends_it(end):
    train = michelson(wrong=60 * mm, end=end)
    (finding,) = (f for f in train.inspect().findings if f.check == "path difference")
    assert finding.severity.value == "medium"
    # There and back: 120 mm, of 100 mm coherence length, exp(-1.44) = 0.237.
    assert "120 mm" in finding.got
    assert "0.237" in finding.got
    assert finding.fix == 'train.with_changes({"short.distance": 260*mm})'
    mended = eval(finding.fix, {"train": train, "mm": mm})  # noqa: S307 - the fix is code to paste
    assert not [f for f in mended.inspect().findings if f.check == "path difference"]


def test_paths_of_crossed_polarization_are_not_held_to_a_coherence_length(bench_of):
    end = fa.Detector(name="meter")
    line = fa.GaussianLine(coherence_length=10 * mm)
    severities = []
    for plate in ([], [fa.HalfWavePlate(fast=45 * deg)]):
        train = meeting(bench_of, [*plate, fa.FreeSpace(100 * mm)], [], end=end)
        train = train.with_changes({f"{train.sources[0]}.line": line})
        severities += [f.severity.value for f in train.inspect().findings if f.check == "path difference"]
    assert severities == ["high", "medium"]
