"""Visibility split into its factors, against fringes worked out for real."""

import math

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.units import deg, mm, mrad, nm


def scanned(train, port, points=8):
    powers = [train.with_changes({"phase.phase": p}).power(port) for p in np.arange(points) * 2 * math.pi / points]
    return 2 * abs(np.fft.fft(powers)[1]) / sum(powers)


def test_the_product_is_the_depth_of_the_fringes(mach_zehnder):
    train = mach_zehnder(
        arm=[fa.FreeSpace(0.3), fa.HalfWavePlate(fast=12 * deg), fa.NeutralDensity(transmission=0.4)],
        other=[fa.Wedge(x=0.05 * mrad)],
    ).with_changes({"laser.line": fa.GaussianLine(coherence_length=0.7)})
    (pair,) = train.visibility("out.transmitted").pairs
    assert pair.coherence == pytest.approx(math.exp(-((0.3 / 0.7) ** 2)))
    assert pair.balance == pytest.approx(2 * math.sqrt(0.4) / 1.4)
    assert pair.polarization == pytest.approx(math.cos(24 * deg))
    assert 0 < pair.spatial < 1
    # Both are sums over the same kind of samples, good to some 1e-12.
    assert pair.value == pytest.approx(scanned(train, "out.transmitted"), abs=1e-10)


def test_a_camera_sees_tilted_arms_in_full_and_a_detector_does_not(mach_zehnder):
    train = mach_zehnder(other=[fa.Wedge(x=1 * mrad)])
    train.along("out.transmitted", fa.Camera(pixel=10e-6, shape=(8, 8), name="cam"))
    train.along("out.reflected", fa.Detector(name="bucket"))
    assert train.visibility("cam").value == pytest.approx(1, abs=1e-9)
    assert train.visibility("bucket").value == pytest.approx(
        math.exp(-((math.pi * mm * 1e-3 / 632.8e-9) ** 2) / 2), abs=1e-9
    )


@pytest.mark.parametrize(
    ("state", "marks", "angle"),  # of the last, 10 and 100 deg arrive mirrored: -55 and 35 deg halve them
    [
        (fa.H, [fa.HalfWavePlate(fast=45 * deg)], 45),
        (fa.D, [fa.HalfWavePlate(fast=0 * deg)], 0),
        (fa.linear(10 * deg), [fa.Rotator(angle=90 * deg)], 35),
    ],
)
def test_orthogonal_arms_get_the_analyzer_that_restores_them(mach_zehnder, state, marks, angle):
    train = mach_zehnder(fa.Laser(waist=1 * mm, state=state, name="laser"), arm=marks)
    found = train.visibility("out.transmitted")
    assert found.value == 0
    assert "arms orthogonally polarized: no fringes" in str(found)
    said = float(found.pairs[0].advice.split("analyzer at ")[1].split(" deg")[0])
    assert said % 90 == pytest.approx(angle % 90, abs=1e-6)
    assert train.visibility("out.transmitted", fa.linear(said * deg)).value == pytest.approx(1, abs=1e-9)


def test_an_eraser_makes_unequal_arms_equal(mach_zehnder):
    train = mach_zehnder(arm=[fa.HalfWavePlate(fast=45 * deg), fa.NeutralDensity(transmission=0.25)])
    advice = train.visibility("out.transmitted").pairs[0].advice
    said = float(advice.split("analyzer at ")[1].split(" deg")[0])
    assert math.tan(said * deg) ** 2 == pytest.approx(4, rel=1e-3)  # the angle is written with four digits
    assert train.visibility("out.transmitted", fa.linear(said * deg)).value == pytest.approx(1, abs=1e-6)


def test_circular_arms_are_restored_by_any_linear_analyzer(mach_zehnder):
    train = mach_zehnder(fa.Laser(waist=1 * mm, state=fa.L, name="laser"), arm=[fa.HalfWavePlate(fast=0.2)])
    assert "any linear analyzer restores 1.00" in train.visibility("out.transmitted").pairs[0].advice
    assert train.visibility("out.transmitted", fa.linear(0.7)).value == pytest.approx(1, abs=1e-9)


def test_light_beyond_its_coherence_says_so(mach_zehnder):
    train = mach_zehnder(arm=[fa.FreeSpace(1.0)]).with_changes({"laser.line": fa.GaussianLine(coherence_length=0.1)})
    assert "beyond the coherence of the light" in str(train.visibility("out.transmitted"))


def test_a_dark_arm_says_so(mach_zehnder):
    train = mach_zehnder(arm=[fa.Polarizer(axis=90 * deg, extinction=1e20)])
    assert "one of the arms is dark" in train.visibility("out.transmitted").pairs[0].advice


def test_one_path_has_no_fringes_to_speak_of():
    train = fa.Train(wavelength=633 * nm).along(fa.Laser(waist=1 * mm, name="laser"), fa.Detector(name="meter"))
    with pytest.raises(fa.WiringError, match="fringes need two paths that meet") as caught:
        train.visibility("meter")
    eval(caught.value.fix, {"train": train})


def test_a_cavity_has_no_pairs_of_paths():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(reflectance=0.5, name="left"),
        fa.BeamSplitter(reflectance=0.5, name="right"),
    )  # fmt: skip
    train.along("right.reflected", "left.side")
    with pytest.raises(fa.WiringError, match="goes round a cavity comes by a new path on each trip") as caught:
        train.visibility("right.transmitted")
    eval(caught.value.fix, {"train": train})


def test_light_of_several_parts_says_which_is_looked_at(mach_zehnder):
    laser = fa.Laser(waist=1 * mm, state=fa.UNPOLARIZED, name="laser")
    found = mach_zehnder(laser).visibility("out.transmitted")
    assert found.incoherent == 2
    assert "of the first of 2 parts of the light that do not interfere" in str(found)
