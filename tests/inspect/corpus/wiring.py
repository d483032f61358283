"""Mistakes of joining."""

import fastaxis as fa
from fastaxis.units import deg, mm, mrad, mW, um


@pair("wiring", "second", "high")
def camera_without_light(wrong):
    train = line(fa.BeamSplitter(name="split"), fa.Camera(pixel=10 * um, shape=(512, 512), name="first"))
    train.add(fa.Camera(pixel=10 * um, shape=(512, 512), orientation="mirrored", name="second"))
    return train.along("split.reflected", fa.BeamDump(name="dump") if wrong else "second")


@pair("wiring", "spare", "medium")
def plate_never_joined(wrong):
    train = line(fa.HalfWavePlate(fast=20 * deg, name="hwp"), fa.Detector(name="meter"))
    return train.add(fa.QuarterWavePlate(fast=0 * deg, name="spare")) if wrong else train


@pair("wiring", "bench", "high")
def no_laser(wrong):
    if not wrong:
        return line(fa.HalfWavePlate(fast=20 * deg, name="hwp"), fa.Detector(name="meter"))
    return fa.Train(wavelength=532e-9, name="bench").along(fa.HalfWavePlate(fast=20 * deg), fa.Detector())


@pair("light runs round", "m1", "medium")
def light_runs_round(wrong):
    train = line(fa.BeamSplitter(reflectance=0.1, name="split"), fa.Mirror(name="m1"), fa.Mirror(name="m2"))
    train.along("m2", fa.Mirror(name="m3"), "split.side" if wrong else fa.Detector(name="meter"))
    return train.along("split.reflected", fa.BeamDump(name="dump"))


@pair("open port", "pbs.reflected", "medium")
def forgotten_dump(wrong):
    train = line(fa.PolarizingBeamSplitter(name="pbs"), fa.Detector(name="meter"), state=fa.D, power=0.5 * mW)
    return train if wrong else train.along("pbs.reflected", fa.BeamDump(name="dump"))


@pair("laser caution", "pbs.reflected", "high")
def strong_beam_leaves(wrong):
    train = line(fa.PolarizingBeamSplitter(name="pbs"), fa.Detector(name="meter"), state=fa.D, power=100 * mW)
    return train if wrong else train.along("pbs.reflected", fa.BeamDump(name="dump"))


@pair("returning light", "pbs.front", "medium")
def double_pass_with_a_turned_plate(wrong):
    train = line(
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(fast=(30 if wrong else 45) * deg, name="qwp"),
        fa.Mirror(name="end"),
    )
    return train.along("end", "qwp.back", "pbs.transmitted").along("pbs.side", fa.Detector(name="meter"))


@pair("dark port", "meter", "medium")
def crossed_polarizer(wrong):
    return line(fa.Polarizer(axis=(90 if wrong else 0) * deg, name="pol"), fa.Detector(name="meter"))


@pair("fringe period", "cam", "high")
def steep_fringes(wrong):
    return _two_arms(tilt=0.03 if wrong else 0.001, longer=0.0, pixel=10 * um)


@pair("path difference", "cam", "low")
def unequal_arms(wrong):
    return _two_arms(tilt=0.001, longer=40 * mm if wrong else 0.0)


@pair("path difference", "cam", "high")
def arms_beyond_the_coherence_length(wrong):
    return _two_arms(tilt=0.001, longer=40 * mm, coherence=(10 if wrong else 2000) * mm)


@pair("arm polarization", "cam", "medium")
def half_wave_plate_in_one_arm(wrong):
    return _meeting([fa.HalfWavePlate(fast=(45 if wrong else 0) * deg, name="hwp")], [])


@pair("arm polarization", "cam", "low")
def polarizing_splitter_without_an_analyzer(wrong):
    train = line(fa.PolarizingBeamSplitter(name="split"), fa.Mirror(name="m1"), state=fa.D, waist=0.3 * mm)
    analyzer = [] if wrong else [fa.Polarizer(axis=45 * deg, extinction=1e5, name="analyzer")]
    train.along("m1", fa.BeamSplitter(name="join")).along("split.reflected", fa.Mirror(name="m2"), "join.side")
    train.along("join.transmitted", *analyzer, fa.Camera(pixel=5 * um, shape=(640, 640), name="cam"))
    return train.along("join.reflected", fa.BeamDump(name="dump"))


@pair("mirrored arms", "cam", "medium")
def spiral_met_by_its_mirror_image(wrong):
    folds = [fa.Mirror(name=f"fold{n}") for n in range(1 if wrong else 2)]
    return _meeting(folds, [], before=[fa.SpiralPlate(charge=1, name="spiral")])


@pair("arm overlap", "cam", "medium")
def telescope_in_one_arm(wrong):
    lenses = [fa.Lens(focal=50 * mm), fa.FreeSpace(200 * mm), fa.Lens(focal=150 * mm)]
    return _meeting(lenses if wrong else [fa.FreeSpace(200 * mm)], [fa.FreeSpace(200 * mm)])


@pair("arm overlap", "cam", "medium")
def wedge_in_one_arm(wrong):
    wedge = fa.Wedge(x=(4 if wrong else 0.2) * mrad, name="wedge")
    return _meeting([wedge, fa.FreeSpace(200 * mm)], [fa.FreeSpace(200 * mm)])


@pair("arm curvature", "cam", "low")
def lens_in_one_arm(wrong):
    return _meeting([fa.Lens(focal=1000 * mm, name="lens")] if wrong else [], [], waist=1.2 * mm)


@pair("arm curvature", "cam", "high")
def short_lens_in_one_arm(wrong):
    lenses = [fa.Lens(focal=40 * mm, name="lens"), fa.FreeSpace(80 * mm)]
    even = [fa.FreeSpace(80 * mm)]
    return _meeting(lenses if wrong else even, even, waist=1.2 * mm, pixel=10 * um)


def _meeting(one, other, before=(), waist=0.3 * mm, pixel=5 * um):
    """Two arms with a mirror each, and what else stands in them."""
    train = line(*before, fa.BeamSplitter(name="split"), *one, fa.Mirror(name="m1"), waist=waist)
    train.along("m1", fa.PhaseShift(phase=1.5, name="tuning"), fa.BeamSplitter(name="join"))
    train.along("split.reflected", *other, fa.Mirror(name="m2"), "join.side")
    camera = fa.Camera(pixel=pixel, shape=(1024, 1024), name="cam")
    return train.along("join.reflected", camera).along("join.transmitted", fa.BeamDump(name="dump"))


def _two_arms(tilt, longer, coherence=None, pixel=5 * um):
    train = line(fa.BeamSplitter(name="split"), fa.FreeSpace(100 * mm), fa.Mirror(name="m1"), waist=0.3 * mm)
    train.along("m1", fa.Wedge(x=tilt, name="tilt"), fa.BeamSplitter(name="join"))
    train.along("split.reflected", fa.FreeSpace(100 * mm + longer), fa.Mirror(name="m2"), "join.side")
    if coherence is not None:
        train = train.with_changes({"laser.line": fa.GaussianLine(coherence_length=coherence)})
    camera = fa.Camera(pixel=pixel, shape=(1024, 1024), orientation="mirrored", name="cam")
    return train.along("join.transmitted", camera).along("join.reflected", fa.BeamDump(name="dump"))
