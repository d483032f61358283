"""Mistakes of size, place and power."""

import numpy as np

import fastaxis as fa
from fastaxis.units import deg, mm, mrad, mW, nW, um, uW

CAMERA = fa.Camera(pixel=10 * um, shape=(640, 640), name="cam")


@pair("gain", "mask", "high")
def mask_with_gain(wrong):
    most = 1.5 if wrong else 1.0
    return line(fa.Mask(transmission=lambda x, y: most * np.exp(-(x**2 + y**2) / 1e-6), name="mask"), CAMERA)


@pair("clipped beam", "lens", "high")
def small_lens(wrong):
    lens = fa.Lens(focal=500 * mm, radius=(1.5 if wrong else 6) * mm, name="lens")
    return line(lens, fa.FreeSpace(500 * mm), fa.Camera(pixel=5 * um, name="cam"), waist=2 * mm)


@pair("clipped beam", "stop", "high")
def stop_beside_the_beam(wrong):
    stop = fa.Aperture(radius=2 * mm, centre=((5 if wrong else 0) * mm, 0 * mm), name="stop")
    return line(stop, fa.Detector(name="meter"))


@pair("clipped beam", "slit", "medium")
def slit_a_tenth_as_wide(wrong):
    return line(fa.Slit(width=(0.3 if wrong else 3) * mm, name="slit"), fa.Detector(name="meter"))


@pair("sensor too small", "cam", "high")
def beam_wider_than_the_sensor(wrong):
    return line(fa.Camera(pixel=3.45 * um, shape=(150, 150) if wrong else (1500, 1500), name="cam"))


@pair("sensor too small", "cam", "high")
def beam_steered_off_the_sensor(wrong):
    return line(fa.Wedge(x=(10 if wrong else 0.1) * mrad, name="wedge"), fa.FreeSpace(500 * mm), CAMERA)


@pair("few pixels", "cam", "medium")
def spot_on_one_pixel(wrong):
    focal = (20 if wrong else 500) * mm
    return line(fa.Lens(focal=focal, name="lens"), fa.FreeSpace(focal), fa.Camera(pixel=3.45 * um, name="cam"))


@pair("pattern too small", "plate", "high")
def cells_end_inside_the_beam(wrong):
    fast = np.linspace(0, np.pi, 64 * 64).reshape(64, 64)
    plate = fa.PatternedRetarder(fast=fast, pixel=(8 if wrong else 80) * um, name="plate")
    return line(plate, CAMERA)


@pair("off centre", "qp", "high")
def plate_far_from_the_beam(wrong):
    return line(fa.QPlate(q=0.5, centre=((1.2 if wrong else 0.02) * mm, 0), name="qp"), CAMERA)


@pair("off centre", "spiral", "medium")
def spiral_plate_off_centre(wrong):
    return line(fa.SpiralPlate(charge=1, centre=(0, (0.3 if wrong else 0.02) * mm), name="spiral"), CAMERA)


@pair("not paraxial", "laser", "medium")
def waist_in_micrometres(wrong):
    return line(fa.FreeSpace(5 * mm), fa.Detector(name="meter"), waist=0.8 * (um if wrong else mm))


@pair("not paraxial", "lens", "high")
def focal_length_lost_a_digit(wrong):
    focal = (5 if wrong else 50) * mm
    return line(fa.Lens(focal=focal, name="lens"), fa.FreeSpace(focal), fa.Detector(name="meter"), waist=4 * mm)


@pair("off the image", "cam", "medium")
def camera_before_the_image(wrong):
    return line(
        fa.SpiralPlate(charge=1, name="spiral"),
        fa.FreeSpace(200 * mm), fa.Lens(focal=200 * mm, name="l1"),
        fa.FreeSpace(400 * mm), fa.Lens(focal=200 * mm, name="l2"),
        fa.FreeSpace((180 if wrong else 200) * mm), CAMERA, waist=0.3 * mm,
    )  # fmt: skip


@pair("off focus", "cam", "medium")
def camera_behind_the_focus(wrong):
    far = (310 if wrong else 300) * mm
    return line(fa.Lens(focal=300 * mm, name="lens"), fa.FreeSpace(far), fa.Camera(pixel=3.45 * um, name="cam"))


@pair("relay spacing", "l2", "medium")
def relay_too_short(wrong):
    return line(
        fa.Lens(focal=200 * mm, name="l1"), fa.FreeSpace((280 if wrong else 300) * mm),
        fa.Lens(focal=100 * mm, name="l2"), fa.FreeSpace(100 * mm), CAMERA,
    )  # fmt: skip


SENSOR = fa.Sensor(full_well=10_500, quantum_efficiency=0.62, read_noise=2.4, bit_depth=12)


def _read(exposure_time, power):
    camera = fa.Camera(pixel=10 * um, shape=(640, 640), sensor=SENSOR, exposure_time=exposure_time, name="cam")
    return line(fa.QPlate(q=0.5, name="qp"), camera, power=power)


@pair("relay spacing", "l2", "medium")
def relay_100_mm_too_long(wrong):
    return _relay(400 + (100 if wrong else 0), 200)


@pair("relay spacing", "l2", "low")
def relay_too_long_behind_a_slit(wrong):
    apart = (520 if wrong else 400) * mm
    return line(
        fa.Slit(width=0.8 * mm, name="slit"), fa.FreeSpace(200 * mm), fa.Lens(focal=200 * mm, name="l1"),
        fa.FreeSpace(apart), fa.Lens(focal=200 * mm, name="l2"), fa.FreeSpace(200 * mm), fa.HalfWavePlate(fast=0),
        fa.FreeSpace((70 if wrong else 0) * mm), CAMERA, waist=0.5 * mm,
    )  # fmt: skip


@pair("relay spacing", "cam", "medium")
def camera_100_mm_behind_a_relay(wrong):
    return _relay(400, 300 if wrong else 200)


@pair("relay spacing", "qp", "low")
def plate_too_close_to_a_relay(wrong):
    return _relay(400, 200, before=100 if wrong else 200)


def _relay(apart, behind, before=200):
    """A plate, lenses of 200 mm, a camera; distances in millimetres."""
    return line(
        fa.QPlate(q=0.5, name="qp"),
        fa.FreeSpace(before * mm), fa.Lens(focal=200 * mm, name="l1"),
        fa.FreeSpace(apart * mm), fa.Lens(focal=200 * mm, name="l2"),
        fa.FreeSpace(behind * mm), CAMERA, waist=0.5 * mm,
    )  # fmt: skip


@pair("saturation", "cam", "high")
def exposure_of_seconds_for_milliseconds(wrong):
    return _read(1.0 if wrong else 1e-3, power=20 * nW)


@pair("saturation", "cam", "high")
def density_filter_forgotten(wrong):
    return _read(20e-6, power=20 * (mW if wrong else uW) / 20)


@pair("few counts", "cam", "low")
def exposure_of_microseconds_for_milliseconds(wrong):
    return _read(20e-6 if wrong else 20e-3, power=1 * nW)


@pair("sampling", "cam", "medium")
def plane_wave_at_its_focus(wrong):
    parts = [fa.Lens(focal=300 * mm, name="lens"), fa.FreeSpace(300 * mm), fa.Camera(pixel=3.45 * um, name="cam")]
    stop = [] if wrong else [fa.Aperture(radius=1 * mm, name="stop")]
    laser = fa.Laser(mode=fa.PlaneWave(area=1e-6), name="laser")
    return fa.Train(wavelength=633e-9, name="bench").along(laser, *stop, *parts)


@pair("slip", "laser", "medium")
def power_without_its_unit(wrong):
    return line(fa.Detector(name="meter"), power=5 if wrong else 5e-3)


@pair("slip", "space1", "medium")
def distance_without_its_unit(wrong):
    return line(fa.FreeSpace(150 if wrong else 0.150), fa.Detector(name="meter"))


@pair("unit", "cam", "medium")
def pixel_ten_times_too_large(wrong):
    return line(fa.Camera(pixel=(345 if wrong else 3.45) * um, shape=(1500, 1500), name="cam"))


@pair("unit", "lens", "medium")
def focal_length_in_micrometres(wrong):
    focal = 200 * (um if wrong else mm)
    return line(fa.Lens(focal=focal, name="lens"), fa.FreeSpace(focal), fa.Detector(name="meter"), waist=0.05 * mm)


@pair("unit", "laser", "low")
def power_in_nanowatts(wrong):
    return line(fa.Detector(name="meter"), power=5e-9 if wrong else 5e-3)


@pair("wavelength", "bench", "medium")
def wavelength_in_tens_of_micrometres(wrong):
    parts = [fa.FreeSpace(100 * mm), fa.Detector(name="meter")]
    return line(*parts, wavelength=53.2e-6 if wrong else 532e-9, waist=5 * mm)


@pair("diameter for radius", "lens", "medium")
def lens_by_its_diameter(wrong):
    lens = fa.Lens(focal=200 * mm, radius=(25.4 if wrong else 12.7) * mm, name="lens")
    return line(fa.HalfWavePlate(fast=20 * deg), lens, fa.Detector(name="meter"), waist=6 * mm)
