"""Mistakes of plates, polarizers and mirrors."""

import warnings

import fastaxis as fa
from fastaxis.units import deg, mm, nm, um

CAMERA = fa.Camera(pixel=10 * um, shape=(640, 640), name="cam")
METER = fa.Detector(name="meter")


@pair("design wavelength", "hwp", "high")
def plate_for_another_laser(wrong):
    return line(fa.HalfWavePlate(fast=20 * deg, design=(633 if wrong else 532) * nm, name="hwp"), METER)


@pair("design wavelength", "qwp", "medium")
def high_order_plate_three_nanometres_off(wrong):
    plate = fa.QuarterWavePlate(fast=20 * deg, order=3 if wrong else 0, design=532 * nm, name="qwp")
    return line(plate, METER, wavelength=535 * nm)


@pair("plate order", "hwp", "low")
def plate_of_tenth_order(wrong):
    return line(fa.HalfWavePlate(fast=20 * deg, order=10 if wrong else 0, design=532 * nm, name="hwp"), METER)


@pair("plate temperature", "hwp", "medium")
def high_order_plate_in_a_warm_room(wrong):
    order = 20 if wrong else 0
    warm = {"drift": -1e-4, "temperature": 298.15}
    plate = fa.HalfWavePlate(fast=20 * deg, order=order, design=532 * nm, name="hwp", **warm)
    return line(plate, METER)


@pair("plate temperature", "qwp", "high")
def high_order_plate_in_an_oven(wrong):
    oven = 353.15 if wrong else 294.15
    plate = fa.QuarterWavePlate(fast=20 * deg, order=10, design=532 * nm, drift=-1e-4, temperature=oven, name="qwp")
    return line(plate, METER)


@pair("plate temperature", "qp", "medium")
def q_plate_on_a_warm_day(wrong):
    plate = fa.QPlate(q=0.5, drift=-3e-3, temperature=308.15 if wrong else 293.15, name="qp")
    return line(plate, CAMERA)


@pair("plate name", "hwp", "medium")
def half_wave_plate_of_a_quarter(wrong):
    return line(fa.HalfWavePlate(fast=20 * deg, retardance=(90 if wrong else 178) * deg, name="hwp"), METER)


@pair("design wavelength", "spiral", "high")
def spiral_plate_for_another_laser(wrong):
    return line(fa.SpiralPlate(charge=1, design=(633 if wrong else 532) * nm, name="spiral"), CAMERA)


@pair("unconverted light", "qp", "medium")
def detuned_q_plate(wrong):
    return line(fa.QPlate(q=0.5, retardance=(150 if wrong else 180) * deg, name="qp"), CAMERA)


@pair("unconverted light", "qp", "high")
def q_plate_for_another_laser(wrong):
    return line(fa.QPlate(q=1, design=(1064 if wrong else 532) * nm, name="qp"), CAMERA)


@pair("polarizer", "pol", "medium")
def circular_light_on_a_polarizer(wrong):
    plate = fa.QuarterWavePlate(fast=(45 if wrong else 0) * deg, name="qwp")
    return line(plate, fa.Polarizer(axis=0 * deg, name="pol"), METER)


@pair("polarizer", "pol", "medium")
def polarizer_across_the_light(wrong):
    pol = fa.Polarizer(axis=(30 if wrong else 120) * deg, extinction=1e4, name="pol")
    return line(fa.HalfWavePlate(fast=60 * deg, name="hwp"), pol, METER)


@pair("polarizer", "pol", "low")
def polarizer_half_turned(wrong):
    return line(fa.Polarizer(axis=(45 if wrong else 5) * deg, name="pol"), METER)


@pair("idle plate", "hwp", "note")
def plate_along_the_light(wrong):
    return line(fa.HalfWavePlate(fast=(0 if wrong else 20) * deg, name="hwp"), METER)


@pair("isolator", "out", "high")
def isolator_output_not_turned(wrong):
    return _isolator(angle=45 * deg, out=(0 if wrong else 45) * deg)


@pair("isolator", "rotator", "high")
def isolator_of_thirty_degrees(wrong):
    angle = (30 if wrong else 45) * deg
    return _isolator(angle=angle, out=angle)


@pair("isolator", "rotator", "medium")
def isolator_a_little_off(wrong):
    angle = (42 if wrong else 45) * deg
    return _isolator(angle=angle, out=angle)


def _isolator(angle, out):
    return line(
        fa.Polarizer(axis=0 * deg, extinction=1e5, name="in"),
        fa.FaradayRotator(angle=angle, name="rotator"),
        fa.FreeSpace(20 * mm),
        fa.Polarizer(axis=out, extinction=1e5, name="out"),
        METER,
    )


@pair("mirror polarization", "fold", "medium")
def metal_mirror_at_45_degrees(wrong):
    state = fa.D if wrong else fa.H
    fold = fa.Mirror(Rp=0.9, Rs=0.96, phase_s=20 * deg, name="fold")
    return line(fold, fa.Mirror(name="second"), METER, state=state)


@pair("extinction", "pbs.reflected", "medium")
def reflected_port_of_a_splitting_cube(wrong):
    cube = fa.PolarizingBeamSplitter(Tp=0.97 if wrong else 0.9995, Ts=0.0005, name="pbs")
    return line(cube, METER, state=fa.D).along("pbs.reflected", fa.Detector(name="other"))


@pair("extinction slip", "pol", "medium")
def extinction_in_decibels(wrong):
    return line(fa.Polarizer(axis=0 * deg, extinction=40 if wrong else 1e4, name="pol"), METER)


@pair("extinction", "pol", "low")
def weak_polarizer(wrong):
    return line(fa.Polarizer(axis=0 * deg, extinction=300 if wrong else 1e5, name="pol"), METER)


@pair("mirrored picture", "cam", "medium")
def one_mirror_too_few(wrong):
    folds = [fa.Mirror(name="m1")] if wrong else [fa.Mirror(name="m1"), fa.Mirror(name="m2")]
    return line(fa.QPlate(q=0.5, name="qp"), *folds, CAMERA)


@pair("mirrored picture", "cam", "low")
def one_mirror_too_few_for_a_round_beam(wrong):
    folds = [fa.Mirror(name="m1")] if wrong else [fa.Mirror(name="m1"), fa.Mirror(name="m2")]
    return line(*folds, CAMERA)


@pair("mirrored picture", "cam", "medium")
def orientation_mirrored_for_nothing(wrong):
    camera = fa.Camera(pixel=10 * um, orientation="mirrored" if wrong else "upright", name="cam")
    return line(camera, state=fa.D)


@pair("turned picture", "cam", "low")
def folds_in_both_planes(wrong):
    second = fa.Mirror(fold="vertical" if wrong else "horizontal", name="m2")
    return line(fa.Mirror(name="m1"), second, CAMERA)


@pair("parity of cameras", "over", "low")
def cameras_of_both_parities(wrong):
    split = fa.BeamSplitter(name="split")
    over = fa.Camera(pixel=10 * um, name="over", orientation="mirrored" if wrong else "upright")
    folds = [] if wrong else [fa.Mirror(name="m1")]
    return line(split, CAMERA).along("split.reflected", *folds, over)


@pair("bare degrees", "hwp", "medium")
def three_radians(wrong):
    return line(fa.HalfWavePlate(fast=3.0 if wrong else 3 * deg, name="hwp"), METER)


@pair("bare degrees", "laser", "medium")
def azimuth_of_two_radians(wrong):
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # a caution when it is typed
        state = fa.State(2.0 if wrong else 2 * deg)
    return line(METER, state=state)


@pair("mirror polarization", "gold", "medium")
def gold_mirror_for_diagonal_light(wrong):
    gold = fa.MetalMirror(index=0.184 + 3.431j, name="gold")
    return line(gold, fa.Mirror(name="second"), METER, state=fa.D if wrong else fa.V, wavelength=632.8 * nm)


@pair("parallel window", "window", "medium")
def parallel_window_before_the_camera(wrong):
    return line(fa.Window(index=1.52, wedge=(0 if wrong else 0.5) * deg, name="window"), CAMERA)


@pair("input state", "cell", "high")
def modulator_across_the_light(wrong):
    cell = fa.PhaseModulator(axis=(90 if wrong else 0) * deg, phase=60 * deg, name="cell")
    return line(cell, METER)


@pair("input state", "slm", "medium")
def modulator_behind_a_plate_turned_too_little(wrong):
    plate = fa.HalfWavePlate(fast=(15 if wrong else 22.5) * deg, name="hwp")
    slm = fa.PhaseModulator(axis=45 * deg, phase=lambda x, y: 1e3 * x + 0 * y, name="slm")
    return line(plate, fa.FreeSpace(50 * mm), slm, CAMERA)


@pair("input state", "cell", "medium")
def amplitude_modulator_along_the_light(wrong):
    cell = fa.PhaseModulator(axis=0 * deg, phase=90 * deg, expects=fa.D, name="cell")
    return line(cell, fa.Polarizer(axis=-45 * deg, extinction=1e5), METER, state=fa.H if wrong else fa.D)


@pair("input state", "in", "medium")
def isolator_turned_away_from_the_laser(wrong):
    return line(
        fa.Polarizer(axis=(30 if wrong else 0) * deg, extinction=1e5, name="in"),
        fa.FaradayRotator(angle=45 * deg, name="rotator"),
        fa.Polarizer(axis=(75 if wrong else 45) * deg, extinction=1e5, name="out"),
        METER,
    )


@pair("input state", "qp", "high")
def circular_light_of_the_other_hand(wrong):
    plate = fa.QuarterWavePlate(fast=(45 if wrong else -45) * deg, name="qwp")
    return line(plate, fa.QPlate(q=0.5, expects=fa.L, name="qp"), CAMERA)
