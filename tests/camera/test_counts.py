"""Electrons and counts of a frame: their mean, their noise, where they end, and what is refused."""

from dataclasses import replace

import numpy as np
import pytest
from scipy.constants import c, h

import fastaxis as fa
from fastaxis.camera import no_analyzer
from fastaxis.conventions import View
from fastaxis.elements import Sensor
from fastaxis.errors import ParameterError
from fastaxis.units import ms, um

SENSOR = Sensor(full_well=10_000, quantum_efficiency=0.6, read_noise=3.0, dark_current=50.0, bit_depth=12, offset=64)
SIDE = 200


def even(electrons, *, sensor=SENSOR, exposure_time=2 * ms, wavelength=633e-9):
    """An exposure of even, unpolarized light that frees so many electrons behind any polarizer."""
    light = electrons - sensor.dark_current * exposure_time
    power = light * h * c / (wavelength * sensor.quantum_efficiency * exposure_time)
    stokes = np.zeros((4, SIDE, SIDE))
    stokes[0] = 2 * power
    axis = (np.arange(SIDE) - SIDE / 2 + 0.5) * 5 * um
    return fa.Exposure(
        stokes=stokes, settings=fa.camera.settings.as_settings([fa.H, fa.V, fa.R]), x=axis, y=axis, pixel=5 * um,
        wavelength=wavelength, target="cam", sensor=sensor, exposure_time=exposure_time,
    )  # fmt: skip


def test_electrons_are_photons_times_efficiency_and_the_dark():
    shots = even(1234.5)
    np.testing.assert_allclose(shots.electrons("H"), 1234.5, rtol=1e-13)  # some ten products and quotients
    np.testing.assert_allclose(shots.electrons(no_analyzer()), 2 * (1234.5 - 0.1) + 0.1, rtol=1e-13)
    dark = replace(shots, stokes=0 * shots.stokes)
    np.testing.assert_allclose(dark.electrons("H", exposure_time=1.0), 50.0, rtol=1e-15)


@pytest.mark.parametrize("electrons", [0.5, 40.0, 3000.0])
def test_mean_and_variance_of_counts(electrons):
    """Variance K^2 (N + read_noise^2) + 1/12 of N electrons, whatever their number; the mean K N + offset."""
    read = even(electrons).counts("H", seed=3)
    values, gain = np.asarray(read, dtype=float), SENSOR.counts_per_electron
    variance = gain**2 * (electrons + 9.0) + 1 / 12
    pixels = values.size
    # Five standard errors: sqrt(v/n) of a mean, v sqrt(2/n) of a variance (a little more for few electrons).
    assert values.mean() == pytest.approx(64 + gain * electrons, abs=5 * (variance / pixels) ** 0.5)
    assert values.var() == pytest.approx(variance, rel=5 * (2.5 / pixels) ** 0.5)
    assert not read.saturated.any()


def test_without_noise_the_mean_is_rounded():
    read = even(1000.0).counts("V", noise=False)
    assert np.unique(read.counts).tolist() == [round(64 + 0.4031 * 1000)]
    assert read.counts.dtype == np.uint16


def test_a_full_well_and_full_scale_are_saturated():
    over = even(12_000.0).counts("H")
    assert over.saturated.all()
    assert over.counts.max() == 4095
    assert over.fill == pytest.approx(1.2, rel=1e-12)
    steep = replace(SENSOR, gain=1.0)
    clipped = even(5000.0, sensor=steep).counts("H")  # the well is half full, the counts are at their end
    assert clipped.saturated.all()
    assert np.unique(clipped.counts).tolist() == [4095]


def test_around_the_well_some_pixels_are_full():
    read = even(10_000.0, sensor=replace(SENSOR, read_noise=0.0)).counts("H")
    # Half of the Poisson numbers reach their mean, up to one in 2.5 sqrt(10^4) and five standard errors of n pixels.
    assert read.saturated.mean() == pytest.approx(0.5, abs=0.004 + 2.5 / SIDE)


def test_light_far_beyond_the_well_is_no_error():
    read = even(1e25).counts("H")
    assert read.saturated.all()


def test_the_seed_makes_the_same_frame_again_and_each_setting_its_own():
    shots = even(500.0)
    again, other = shots.counts("H", seed=5).counts, shots.counts("H", seed=6).counts
    np.testing.assert_array_equal(shots.counts("H", seed=5).counts, again)
    assert abs(np.corrcoef(again.ravel(), other.ravel())[0, 1]) < 5 / SIDE
    assert abs(np.corrcoef(again.ravel(), shots.counts("V", seed=5).counts.ravel())[0, 1]) < 5 / SIDE
    # The noise stays the same when a report names R and L the other way.
    np.testing.assert_array_equal(
        shots.counts("R", seed=5).counts, shots.in_view(View.SOURCE).counts("L", seed=5).counts
    )
    assert shots.in_view(View.SOURCE).counts("L", seed=5).label == "L"


def test_signal_to_noise_is_that_of_repeated_frames():
    shots = even(800.0)
    frames = np.array([shots.counts("H", seed=seed).counts[:50, :50] for seed in range(200)], dtype=float)
    expected = shots.counts("H").signal_to_noise[0, 0]
    measured = (frames.mean() - 64 - SENSOR.counts_per_electron * 0.1) / frames.std(axis=0).mean()
    # 200 frames give each deviation to 5 %, 2500 pixels their mean to 0.1 % and a bias of 1/(4 * 200).
    assert measured == pytest.approx(expected, rel=0.004)


def test_the_time_that_fills_the_well():
    shots = even(2000.0, sensor=replace(SENSOR, dark_current=0.0))
    assert shots.saturates_after == pytest.approx(10 * ms, rel=1e-12)
    dark = replace(shots, stokes=0 * shots.stokes)
    assert dark.saturates_after == float("inf")


def test_another_time_and_another_sensor():
    shots = even(100.0)
    larger = Sensor(full_well=40_000, quantum_efficiency=0.3, bit_depth=8)
    assert shots.electrons("H", exposure_time=4 * ms)[0, 0] == pytest.approx(200, rel=1e-13)
    read = shots.counts("H", sensor=larger, exposure_time=4 * ms)
    assert read.counts.dtype == np.uint8
    assert read.electrons[0, 0] == pytest.approx((200 - 0.2) / 2, rel=1e-13)


def test_in_words():
    assert str(even(12_000.0).counts("H")) == (
        "cam H: 2 ms, brightest 4095 of 4095 counts, 120 % of the well, 40000 of 40000 pixels saturated, "
        "signal to noise up to 0"
    )


def test_what_is_missing_is_told_with_a_fix():
    shots = even(100.0)
    bare, timeless = replace(shots, sensor=None), replace(shots, exposure_time=None)
    with pytest.raises(ParameterError, match="cam: no sensor; electrons and counts need the sensor's data"):
        bare.counts("H")
    with pytest.raises(ParameterError, match="cam: no exposure_time; electrons and counts need an exposure") as told:
        timeless.electrons("H")
    assert eval(told.value.fix, {"shots": timeless, "ms": ms}).counts.shape == (SIDE, SIDE)
    for time in (-1, 0.0, float("inf"), float("nan"), True, "1 ms"):
        with pytest.raises(ParameterError, match=f"exposure_time = {time}; exposure_time is in seconds, above zero"):
            shots.counts("H", exposure_time=time)
    assert shots.electrons("H", exposure_time=np.float32(0.25))[0, 0] == shots.electrons("H", exposure_time=0.25)[0, 0]
    with pytest.raises(ParameterError, match="counts: seed = -1; seed is a whole number, 0 or more"):
        shots.counts("H", seed=-1)


def bench(**camera):
    return fa.Train(wavelength=633e-9).along(
        fa.Laser(waist=0.3e-3, power=20e-9, name="laser"),
        fa.Camera(pixel=10 * um, shape=(64, 64), name="cam", **camera),
    )


def test_a_train_hands_its_sensor_to_exposures_files_and_sweeps(tmp_path):
    train = bench(sensor=SENSOR, exposure_time=1 * ms)
    shots = train.expose("cam", [fa.H])
    back = fa.camera.load(shots.save(tmp_path / "shots.npz"))
    assert (back.sensor, back.exposure_time) == (SENSOR, 1 * ms)
    np.testing.assert_array_equal(back.counts("H", seed=2).counts, shots.counts("H", seed=2).counts)
    swept = train.sweep({"cam.exposure_time": [1 * ms, 3 * ms]}, "cam", [fa.H])
    assert swept.exposure(1).electrons("H").max() == pytest.approx(3 * shots.electrons("H").max(), rel=1e-12)


def test_the_listing_says_how_full_the_brightest_pixel_is():
    shots = bench(sensor=SENSOR, exposure_time=0.2 * ms).expose("cam", [fa.H])
    share = shots.electrons("H").max() / 1e4
    assert 0 < share < 1
    full = f"  the brightest pixel is full after {0.2 / share:.3g} ms"
    assert f"{full}; at 0.2 ms it holds {share:.3g} of that" in str(shots).split("\n")
    assert f"{full}; at 2 ms it is saturated" in str(replace(shots, exposure_time=2 * ms)).split("\n")
    assert full in str(replace(shots, exposure_time=None)).split("\n")
    assert "full" not in str(replace(shots, sensor=None))
    assert "full" not in str(replace(shots, stokes=0 * shots.stokes, sensor=replace(SENSOR, dark_current=0.0)))


def test_the_fix_for_a_camera_without_a_sensor_gives_it_one():
    train = bench()
    with pytest.raises(ParameterError) as refusal:
        train.expose("cam", [fa.H]).counts("H", exposure_time=1 * ms)
    better = eval(refusal.value.fix, {"train": train, "fa": fa})
    assert better.expose("cam", [fa.H]).counts("H", exposure_time=1 * ms).counts.any()


def test_a_detector_is_read_with_a_sensor_given():
    train = fa.Train(wavelength=633e-9).along(
        fa.Laser(waist=1e-3, power=1e-12, name="laser"), fa.Detector(name="meter")
    )
    shots = train.expose("meter", [fa.H])
    with pytest.raises(ParameterError) as refusal:
        shots.electrons("H")
    read = eval(refusal.value.fix, {"shots": shots, "fa": fa, "ms": ms})
    # 1 pW for 1 ms at 633 nm: 3187 photons, 0.6 of them
    assert read.electrons.sum() == pytest.approx(1912, abs=1)


def test_many_seconds_on_a_camera_are_asked_about_once(recwarn):
    """20 typed for 20*ms passes as seconds: the caution says so, at the first question to the train."""
    train = fa.Train(wavelength=633e-9, name="Saltpan").along(
        fa.Laser(waist=0.1e-3, power=1e-9, state=fa.H, name="laser"),
        fa.Camera(pixel=50 * um, shape=(8, 8), sensor=SENSOR, exposure_time=20, name="cam"),
    )
    with pytest.warns(fa.SlipWarning, match="rarely beyond 1 s") as said:
        shots = train.expose("cam", fa.H)
    assert said[0].message.fix == "exposure_time=20*ms"
    shots.electrons("H")
    assert not recwarn.list
    train.with_changes({"cam.exposure_time": 20 * ms}).expose("cam", fa.H)


def test_many_seconds_given_with_the_question_are_asked_about_too():
    shots = even(100.0)
    with pytest.warns(fa.SlipWarning, match=r"cam: exposure_time = 2\.5; .*rarely beyond 1 s.*exposure_time=2\.5\*ms"):
        shots.electrons("H", exposure_time=2.5)
    shots.electrons("H", exposure_time=1.0)
