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
    with pytest.raises(fa.WiringError, match="fringes need two paths from one laser that meet") as caught:
        train.visibility("meter")
    eval(caught.value.fix, {"train": train})


def test_lasers_that_meet_make_no_fringes_with_each_other():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm), fa.BeamSplitter(name="bs"), fa.Detector(name="d")
    )
    train.along(fa.Laser(waist=1 * mm, name="other"), "bs.side")
    with pytest.raises(fa.WiringError, match="fringes need two paths from one laser that meet"):
        train.visibility("d")


def test_the_label_of_an_analyzer_is_told_by_the_state_meant(mach_zehnder):
    with pytest.raises(fa.ParameterError, match="setting 'D'; a setting is a state") as refusal:
        mach_zehnder().visibility("out", "D")
    assert refusal.value.fix == "fa.D"


def test_a_cavity_has_no_pairs_of_paths():
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(reflectance=0.5, name="left"),
        fa.BeamSplitter(reflectance=0.5, name="right"),
    )  # fmt: skip
    train.along("right.reflected", "left.side")
    with pytest.raises(fa.WiringError, match="goes round a cavity comes by a new path on each trip") as caught:
        train.visibility("right.transmitted")
    eval(caught.value.fix, {"train": train})


def test_light_of_several_parts_is_taken_together_and_says_so(mach_zehnder):
    laser = fa.Laser(waist=1 * mm, state=fa.UNPOLARIZED, name="laser")
    found = mach_zehnder(laser).visibility("out.transmitted")
    assert found.incoherent == 2
    assert "of 2 parts of the light together" in str(found)
    assert found.value == pytest.approx(1, abs=1e-12)


def term(mode, state, number=1):
    return fa.Beam((fa.Term(number, mode, state),))


GAUSS, RING = fa.Gaussian(1 * mm), fa.LaguerreGauss(0, 1, 0.8 * mm)
LIGHTS = {
    "unpolarized": {"waist": 1 * mm, "state": fa.UNPOLARIZED},
    "partly polarized": {
        "incoherent": [(0.7, term(GAUSS, fa.linear(20 * deg))), (0.3, term(GAUSS, fa.elliptical(57 * deg, 0.3)))]
    },
    "two lines": {"incoherent": [(0.6, term(GAUSS, fa.D)), (0.4, term(GAUSS, fa.D), 632.81 * nm)]},
    "two modes": {"incoherent": [(0.5, term(GAUSS, fa.H)), (0.5, term(RING, fa.D))]},
    "two lines of a broad laser": {
        "incoherent": [(0.6, term(GAUSS, fa.H)), (0.4, term(RING, fa.L), 632.81 * nm)],
        "line": fa.GaussianLine(coherence_length=0.1),
    },
}


@pytest.mark.parametrize("light", LIGHTS)
def test_mixtures_have_the_depth_that_a_scan_shows(mach_zehnder, light):
    arm = [fa.FreeSpace(0.02), fa.Retarder(fast=10 * deg, retardance=1.3, design=632.8 * nm)]
    train = mach_zehnder(
        fa.Laser(power=1e-3, name="laser", **LIGHTS[light]), arm=arm,
        other=[fa.Wedge(x=0.05 * mrad), fa.NeutralDensity(transmission=0.6)],
    )  # fmt: skip
    for setting in (None, fa.linear(75 * deg), fa.R):
        found = train.visibility("out.transmitted", setting)
        (pair,) = found.pairs
        bench = train.copy()
        if setting is not None:
            bench.along("out.transmitted", fa.Detector(name="meter"))
        wanted = scanned(bench, "out.transmitted") if setting is None else scanned_behind(bench, "meter", setting)
        # The scan sums fields and the factors sum products, over the same kind of samples: 1e-10 of the power.
        assert pair.value == pytest.approx(wanted, abs=1e-9)
        assert 0 < pair.value < 0.999
        assert pair.coherence * pair.balance * pair.polarization * pair.spatial == pair.value


def scanned_behind(train, port, setting, points=8):
    phases = np.arange(points) * 2 * math.pi / points
    powers = [train.with_changes({"phase.phase": p}).expose(port, [setting]).power(0) for p in phases]
    return 2 * abs(np.fft.fft(powers)[1]) / sum(powers)


@pytest.mark.parametrize("retardance", [0.4, 1.6, 3.0])
def test_unpolarized_light_agrees_as_the_trace_of_both_matrices(mach_zehnder, retardance):
    """F. Gori et al. (2007): |tr(J1^dagger J2)|/2 of lossless parts; of a retarder that is cos(delta/2)."""
    laser = fa.Laser(mode=fa.PlaneWave(area=1e-6), state=fa.UNPOLARIZED, name="laser")
    train = mach_zehnder(laser, arm=[fa.Retarder(fast=0.3, retardance=retardance)])
    (pair,) = train.visibility("out.transmitted").pairs
    assert pair.polarization == pytest.approx(math.cos(retardance / 2), abs=1e-14)
    assert (pair.coherence, pair.balance, pair.spatial) == pytest.approx((1, 1, 1))


def test_an_analyzer_along_an_axis_restores_unpolarized_light_behind_a_half_wave_plate(mach_zehnder):
    laser = fa.Laser(waist=1 * mm, state=fa.UNPOLARIZED, name="laser")
    train = mach_zehnder(laser, arm=[fa.HalfWavePlate(fast=0 * deg)])
    (pair,) = train.visibility("out.transmitted").pairs
    assert pair.polarization == 0
    assert "an analyzer at 0 deg restores 1.00" in pair.advice
    assert train.visibility("out.transmitted", fa.linear(0 * deg)).value == pytest.approx(1, abs=1e-9)
    assert train.visibility("out.transmitted", fa.linear(45 * deg)).value == pytest.approx(0, abs=1e-9)


def test_a_rotator_of_a_quarter_turn_leaves_unpolarized_light_without_any_eraser(mach_zehnder):
    laser = fa.Laser(waist=1 * mm, state=fa.UNPOLARIZED, name="laser")
    (pair,) = mach_zehnder(laser, arm=[fa.Rotator(angle=90 * deg)]).visibility("out.transmitted").pairs
    # R and L keep their fringes, in opposite phase; any linear analyzer sees both alike.
    assert pair.advice.endswith("no linear analyzer restores them")


def test_unpolarized_light_divided_by_polarization_does_not_interfere_even_behind_an_analyzer():
    """D. F. J. Arago and A. Fresnel, Ann. Chim. Phys. 10, 288 (1819), third law."""
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=1 * mm, state=fa.UNPOLARIZED, name="laser"), fa.PolarizingBeamSplitter(name="in"),
        fa.PhaseShift(phase=0.0, name="phase"), fa.Mirror(name="m1"), fa.BeamSplitter(name="out"),
    )  # fmt: skip
    train.along("in.reflected", fa.Mirror(name="m2"), "out.side")
    for setting in (None, fa.D):
        (pair,) = train.visibility("out.transmitted", setting).pairs
        assert pair.coherence == 0
        assert "each arm has a part of the light of its own" in pair.advice
    polarized = train.with_changes({"laser.state": fa.D})
    assert polarized.visibility("out.transmitted", fa.D).value == pytest.approx(1, abs=1e-9)


def test_a_camera_adds_the_fringes_of_two_lines_pixel_by_pixel(mach_zehnder):
    light = {"incoherent": [(0.6, term(GAUSS, fa.D)), (0.4, term(RING, fa.H), 640 * nm)]}
    train = mach_zehnder(fa.Laser(power=1e-3, name="laser", **light), other=[fa.Wedge(x=0.4 * mrad)])
    train.along("out.transmitted", fa.Camera(pixel=40e-6, shape=(150, 150), name="cam"))
    phases = np.arange(4) * math.pi / 2
    shots = [train.with_changes({"phase.phase": p}).expose("cam", [fa.H, fa.V]) for p in phases]
    frames = np.array([both.frame("H") + both.frame("V") for both in shots])
    depth = 2 * abs(np.fft.fft(frames, axis=0)[1]).sum() / frames.sum()
    # A pixel of 40 um averages fringes of 1.6 mm: 1e-3 of their depth.
    assert train.visibility("cam").value == pytest.approx(depth, rel=2e-3)
