"""Frames of benches with one planted mistake."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.studies.fault.suspects import _nearest
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
    ({"qp.q": 1.0}, "qp: another plate, of q = 1"),
    ({"qp.q": -1.5}, "qp: another plate, of q = -1.5"),
    ({"qp.retardance": 90 * deg}, "qp: a quarter-wave plate in its place"),
    ({"qwp.retardance": 180 * deg}, "qwp: a half-wave plate in its place"),
    ({"laser.state": fa.elliptical(10 * deg, -12 * deg)}, "laser: handedness of its light"),
    ({"cam.orientation": "mirrored"}, "cam: picture mirrored"),
]


@pytest.mark.parametrize(
    ("target", "fix"),
    [
        ("space9", "near"),
        ("nera", "near"),
        ("metre", "meter"),
        ("split", "near"),
        ("split.reflected", "near"),
        (3, "near"),
    ],
)
def test_another_target_than_a_camera_or_detector_is_answered_with_one(target, fix):
    train = fa.Train(wavelength=633 * nm, name="Saltpan").along(
        fa.Laser(waist=0.3 * mm, power=2 * mW, state=fa.H, name="laser"),
        fa.FreeSpace(100 * mm, name="space3"),
        fa.BeamSplitter(reflectance=0.5, name="split"),
        fa.Camera(pixel=50 * um, shape=(16, 16), name="near"),
    )
    train.along("split.reflected", fa.Detector(name="meter"))
    with pytest.raises(
        fa.ParameterError, match="cameras and detectors: near, meter; the frames belong to one"
    ) as found:
        train.find_fault(np.ones((1, 16, 16)), [fa.H], target=target)
    assert found.value.fix == f'target="{fix}"'


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


def test_frames_of_something_else(travelling):
    report = travelling.find_fault(np.random.default_rng(2).random((2, 24, 24)), [fa.H, fa.D])
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


def test_parts_in_each_others_place(bench):
    swapped = fa.Train(wavelength=532 * nm, name="Cinder").along(
        bench.elements["laser"], bench.elements["qp"], bench.elements["qwp"], bench.elements["cam"]
    )
    shots = swapped.expose("cam", fa.SIX_STATES)
    report = bench.find_fault(shots.frames, shots.settings)
    assert report.ranking[0].words == "qwp and qp in each other's place"
    assert report.ranking[0].misfit < 1e-7


def test_another_spiral_plate():
    train = fa.Train(wavelength=532 * nm, name="Skerry").along(
        fa.Laser(mode=fa.LaguerreGauss(0, 1, 0.5 * mm), state=fa.H, name="laser"),
        fa.SpiralPlate(charge=1, name="spp"),
        fa.FreeSpace(300 * mm),
        fa.Camera(pixel=100 * um, shape=(24, 24), name="cam"),
    )
    shots = train.with_changes({"spp.charge": -2}).expose("cam", fa.H)
    report = train.find_fault(shots.frames, shots.settings)
    assert report.ranking[0].words == "spp: another plate, of charge -2"


@pytest.fixture(scope="module")
def travelling():
    return fa.Train(wavelength=532 * nm, name="Skerry").along(
        fa.Laser(waist=0.5 * mm, power=5 * mW, state=fa.H, name="laser"),
        fa.QPlate(q=0.5, name="qp"),
        fa.FreeSpace(300 * mm, name="space"),
        fa.Camera(pixel=100 * um, shape=(24, 24), name="cam"),
    )


@pytest.mark.parametrize(
    ("change", "words"),
    [
        ({"qp.centre_x": 60 * um, "qp.centre_y": -25 * um}, "qp stands +60 um in x and -25 um in y beside its place"),
        (
            {"cam.centre_x": -40 * um, "cam.centre_y": 90 * um},
            "cam stands -40 um in x and +90 um in y beside its place",
        ),
    ],
)
def test_a_part_beside_its_place_is_found_with_the_place(travelling, change, words):
    shots = travelling.with_changes(change).expose("cam", [fa.H])
    report = travelling.find_fault(3.0 * shots.frames, shots.settings)
    assert report.ranking[0].words == words
    assert report.ranking[0].misfit < 1e-3  # the fit ends a few parts in a thousand of its last step from the place


VALUES = np.radians(np.arange(-90, 90.05, 0.1))


def test_noise_does_not_draw_a_fitted_angle_to_the_declared_one():
    # What noise leaves over adds in squares, so that the bottom of a dip is flat: 1e-4 above it lies 0.3 deg beside it.
    misfits = np.hypot(0.7, 2 * (VALUES - 2 * deg))
    assert VALUES[_nearest(misfits, np.abs(VALUES))] == pytest.approx(2 * deg, abs=1e-9)
    # Between values that were looked at there may be others that were not.
    looked = np.where(np.arange(len(VALUES)) % 2 == 0, misfits, np.nan)
    assert VALUES[_nearest(looked, np.abs(VALUES))] == pytest.approx(2 * deg, abs=1e-9)


def test_of_dips_that_are_as_deep_the_nearest_is_taken():
    misfits = np.abs(np.sin(2 * (VALUES - 50 * deg)))  # a half-wave plate repeats after 90 deg
    assert VALUES[_nearest(misfits + 1e-6 * (VALUES < 0), np.abs(VALUES))] == pytest.approx(-40 * deg, abs=1e-9)
    assert VALUES[_nearest(np.full(len(VALUES), 0.3), np.abs(VALUES))] == pytest.approx(0, abs=1e-9)


def test_an_angle_is_fitted_in_noise():
    train = fa.Train(wavelength=633 * nm, name="Tern").along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1 * mW, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=10 * deg, name="hwp"),
        fa.Camera(pixel=100 * um, shape=(64, 64), name="cam"),
    )
    shots = train.with_changes({"hwp.fast": 14 * deg}).expose("cam", [fa.H, fa.D])
    noise = 0.3 * shots.frames.mean() * np.random.default_rng(3).normal(size=shots.frames.shape)
    report = train.find_fault(shots.frames + noise, shots.settings, noise=0.5)
    off = next(one.off for one in report.ranking if one.words.startswith("hwp.fast"))
    # Noise of 0.3 over sqrt(4096) pixels, and light that turns by twice the plate's angle: 0.13 deg; four times that.
    assert off == pytest.approx(4 * deg, abs=0.55 * deg)


def test_a_further_frame_leaves_fewer_explanations_and_the_true_one():
    train = fa.Train(wavelength=633 * nm, name="Tern").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"),
        fa.QuarterWavePlate(fast=0 * deg, name="qwp"),
        fa.HalfWavePlate(fast=0 * deg, name="hwp"),
        fa.Camera(pixel=200 * um, shape=(16, 16), name="cam"),
    )
    true = train.with_changes({"hwp.fast": 10 * deg})
    before = train.find_fault(true.expose("cam", [fa.H, fa.V]).frames, [fa.H, fa.V])
    setting, parted = before.separating()
    settings = [fa.H, fa.V, setting]
    after = train.find_fault(true.expose("cam", settings).frames, settings)
    assert len(after.ties) < len(before.ties)
    assert any(one.words.startswith("hwp.fast stands at 10 deg") for one in after.ties)
    assert set(one.words for one in after.ties) <= set(one.words for one in before.ties)
    # No other linear or circular analyzer tells more pairs apart.
    assert parted == max(before.separating([one])[1] for one in fa.SIX_STATES if before.separating([one]))


def test_explanations_that_differ_by_a_scale_alone_are_not_parted():
    # A polarizer turned takes power and nothing else: the counts of a camera do not tell.
    train = fa.Train(wavelength=633 * nm, name="Tern").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"),
        fa.HalfWavePlate(fast=0 * deg, name="hwp"),
        fa.Polarizer(axis=0 * deg, name="pol"),
        fa.Camera(pixel=200 * um, shape=(16, 16), name="cam"),
    )
    shots = train.with_changes({"hwp.fast": 10 * deg}).expose("cam", [fa.H])
    report = train.find_fault(shots.frames, shots.settings)
    turned = [one for one in report.ties if one.words.startswith(("hwp", "as declared"))]
    assert len(turned) > 1
    only = type(report)(turned[0], tuple(turned[1:]), report.target, report.settings, report.noise)
    assert only.separating() is None


@pytest.mark.parametrize("noise", [-0.01, float("nan"), float("inf"), "loud"])
def test_noise_is_zero_or_more(bench, noise):
    with pytest.raises(fa.ParameterError, match="noise"):
        bench.find_fault(np.ones((1, 32, 32)), [fa.H], noise=noise)
