"""Frames of benches with one planted mistake."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm, um


@pytest.fixture(scope="module")
def bench():
    return fa.Train(wavelength=532 * nm, name="Cinder").along(
        fa.Laser(waist=0.8 * mm, power=5 * mW, state=fa.elliptical(10 * deg, 12 * deg), name="laser"),
        fa.QuarterWavePlate(fast=20 * deg, name="qwp"),
        fa.QPlate(q=0.5, offset=5 * deg, retardance=170 * deg, name="qp"),
        fa.Camera(pixel=100 * um, shape=(32, 32), name="cam"),
    )


PLANTED = [
    ({"qwp.fast": 23 * deg}, "qwp.fast stands at 23 deg, +3 deg off"),
    ({"qwp.fast": 110 * deg}, "qwp: fast and slow axis swapped"),
    ({"qwp.fast": -20 * deg}, "qwp: sign of fast"),
    ({"qp.q": -0.5}, "qp: sign of q (the plate stands back to front)"),
    ({"qp.retardance": 150 * deg}, "qp.retardance is 150 deg, -20 deg off"),
    ({"laser.state": fa.elliptical(10 * deg, -12 * deg)}, "laser: handedness of its light"),
    ({"cam.orientation": "mirrored"}, "cam: picture mirrored"),
]


@pytest.mark.parametrize(("change", "words"), PLANTED)
def test_the_planted_mistake_is_among_the_best(bench, change, words):
    shots = bench.with_changes(change).expose("cam", fa.SIX_STATES)
    report = bench.find_fault(1e6 * shots.frames, shots.settings)  # counts, not watts
    assert words in [one.words for one in report.ties]
    # Radial tables are good to about 1e-8, and the sums of a sweep are made of others than the frames of an exposure.
    assert report.ranking[0].misfit < 1e-7
    assert report.declared.misfit > 0.01


def test_a_bench_without_fault(bench):
    shots = bench.expose("cam", [fa.H, fa.D])
    report = bench.find_fault(shots.frames, shots.settings)
    assert report.declared.misfit < 1e-12
    assert "nothing needs explaining" in str(report)
    assert report.declared in report.ties
    assert "no single mistake" not in str(report)


def test_the_bench_as_declared_competes(bench):
    shots = bench.with_changes({"qwp.fast": 23 * deg}).expose("cam", fa.SIX_STATES)
    report = bench.find_fault(shots.frames, shots.settings, noise=0.01)
    assert report.declared not in report.ties
    assert "as good as any" not in str(report)
    # Where the camera's noise is greater than what the plate does, nothing says that there is a mistake at all.
    noisy = shots.frames + 0.3 * shots.frames.max() * np.random.default_rng(1).random(shots.frames.shape)
    report = bench.find_fault(noisy, shots.settings, noise=0.1)
    assert report.declared in report.ties
    assert "the bench as declared is as good as any" in str(report)


def test_frames_of_something_else(bench):
    report = bench.find_fault(np.random.default_rng(2).random((6, 32, 32)), fa.SIX_STATES)
    assert "no single mistake explains these frames" in str(report)


def test_a_tie_names_the_frame_that_parts_it():
    # Behind H and V a turned half-wave plate and a turned quarter-wave plate can share the power alike: linear light in
    # one case, elliptical in the other.
    train = fa.Train(wavelength=633 * nm, name="Tern").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"),
        fa.QuarterWavePlate(fast=0 * deg, name="qwp"),
        fa.HalfWavePlate(fast=0 * deg, name="hwp"),
        fa.Camera(pixel=200 * um, shape=(16, 16), name="cam"),
    )
    shots = train.with_changes({"hwp.fast": 10 * deg}).expose("cam", [fa.H, fa.V])
    report = train.find_fault(shots.frames, shots.settings)
    words = " ".join(one.words for one in report.ties)
    assert "hwp.fast" in words
    assert "qwp.fast" in words
    setting, parted = report.separating()
    frames = {one.words.split()[0]: one.train.expose("cam", [setting]).power(0) for one in report.ties}
    assert parted >= 1
    assert abs(frames["hwp.fast"] / frames["qwp.fast"] - 1) > 0.05
    assert "explanations are equally good" in str(report)


def test_readings_of_a_detector():
    train = fa.Train(wavelength=633 * nm, name="Low Quay").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"),
        fa.QuarterWavePlate(fast=30 * deg, name="qwp"),
        fa.Detector(name="meter"),
    )
    shots = train.with_changes({"qwp.fast": 34 * deg}).expose("meter", fa.four_frames())
    report = train.find_fault([shots.power(k) for k in range(4)], fa.four_frames(), target="meter")
    assert report.ranking[0].words == "qwp.fast stands at 34 deg, +4 deg off"
    assert report.separating() is None


def test_refusals(bench):
    with pytest.raises(fa.ParameterError, match="frame of the camera"):
        bench.find_fault(np.ones((1, 3, 3)), [fa.H])
    with pytest.raises(fa.ParameterError, match="one camera"):
        fa.Train(wavelength=633 * nm).along(fa.Laser(waist=1 * mm), fa.Detector()).find_fault([1.0], [fa.H])


@pytest.mark.parametrize(
    ("frames", "words"),
    [
        (np.zeros((1, 32, 32)), "could be of any bench"),
        (np.full((1, 32, 32), np.nan), "finite"),
        ("frames.npz", "array of numbers"),
        (object(), "array of numbers"),
        ([[1.0, 2.0], [3.0]], "array of numbers"),
    ],
)
def test_frames_that_say_nothing_are_refused(bench, frames, words):
    with pytest.raises(fa.ParameterError, match=words):
        bench.find_fault(frames, [fa.H])
