"""What a sweep offers: labels, chunks, powers without frames, progress, refusals, and its memory."""

import tracemalloc

import numpy as np
import pytest
import sympy

import fastaxis as fa
from fastaxis.errors import FastaxisError, ParameterError, SymbolError, WiringError
from fastaxis.units import deg, mW

# Samples set by hand on purpose coarser than edges and vortices want; that they are is said, and tested elsewhere.
coarse = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")

ANGLES = np.radians(np.linspace(0, 90, 7))


@pytest.fixture
def swept(flat):
    return flat.sweep({"hwp.fast": ANGLES}, "cam", fa.SIX_STATES)


def test_values_are_found_by_index_value_and_name(swept):
    assert len(swept) == 7
    assert swept.values == {"hwp.fast": tuple(ANGLES.tolist())}
    for which in (2, -5, np.int64(2), 30 * deg, {"hwp.fast": 30 * deg}):
        assert swept.at(which) == {"hwp.fast": ANGLES[2]}
        np.testing.assert_array_equal(swept.frame(which, "H"), swept.frame(2, "H"))


def test_negative_indices_count_from_the_end(swept):
    assert np.array_equal(swept.frame(-1, "H"), swept.frame(6, "H"))
    assert np.array_equal(swept.frame(-7, -1), swept.frame(0, "L"))


def test_settings_are_found_by_label_index_and_themselves(swept):
    for which in ("D", 2, -4, fa.D):
        np.testing.assert_array_equal(swept.frame(1, which), swept.frame(1, 2))
    assert swept.labels == ("H", "V", "D", "A", "R", "L")


def test_any_other_setting_can_be_asked_for(swept, flat):
    shots = flat.with_changes(swept.at(3)).expose("cam", fa.linear(33 * deg))
    np.testing.assert_allclose(swept.frame(3, fa.linear(33 * deg)), shots.frame(0), rtol=1e-12)


def test_chunks_and_frames_agree_with_single_frames(swept):
    chunks = list(swept.chunks("R", most=3))
    assert [len(indices) for indices, _ in chunks] == [3, 3, 1]
    for index, frame in swept.frames("R"):
        np.testing.assert_allclose(frame, swept.frame(index, "R"), rtol=1e-14)
    np.testing.assert_array_equal(np.concatenate([frames for _, frames in chunks]), [f for _, f in swept.frames("R")])


def test_powers_are_those_of_the_frames(swept):
    frames = np.array([[swept.frame(i, k).sum() for k in range(6)] for i in range(7)])
    assert swept.powers.shape == (7, 6)
    np.testing.assert_allclose(swept.powers, frames, atol=1e-12 * frames.max())


# E. Hecht, Optics, 4th ed. (2002), ch. 8: a half-wave plate at a turns H to 2a; Malus's law then gives cos^2 2a.
def test_a_turned_half_wave_plate_follows_malus():
    train = fa.Train(wavelength=532e-9).along(
        fa.Laser(waist=1e-3, power=4 * mW, state=fa.H), fa.HalfWavePlate(fast=0, name="hwp"), fa.Detector(name="bucket")
    )
    powers = train.sweep({"hwp.fast": ANGLES}, "bucket", fa.H).powers[:, 0]
    np.testing.assert_allclose(powers, 4 * mW * np.cos(2 * ANGLES) ** 2, atol=1e-12 * mW)


def test_an_exposure_of_one_value_is_whole(swept, flat):
    shots, own = swept.exposure(4), flat.with_changes(swept.at(4)).expose("cam", fa.SIX_STATES)
    assert (shots.name, shots.target, shots.pixel, shots.labels) == (own.name, own.target, own.pixel, own.labels)
    assert shots.guard == own.guard
    np.testing.assert_array_equal(shots.x, own.x)
    np.testing.assert_allclose(shots.frames, own.frames, rtol=0, atol=1e-12 * own.stokes[0].max())


def test_it_says_what_it_did(swept):
    text = str(swept)
    assert "7 values, 6 settings" in text
    assert "2 propagations" in text


@coarse
def test_progress_counts_propagations(bench):
    told = []
    grid = fa.Grid(samples=128, window=8e-3)
    values = {"leg.distance": [0.1, 0.12], "hwp.fast": ANGLES}
    swept = bench.sweep(values, "cam", fa.H, grid=grid, progress=lambda done, of: told.append((done, of)))
    assert told == [(1, 4), (2, 4)]
    swept.powers  # noqa: B018 - asks for the rest
    assert told == [(1, 4), (2, 4), (3, 4), (4, 4)]


def test_ten_thousand_values_do_not_fill_memory(flat):
    train = flat.with_changes({"cam.shape": (64, 64)})
    swept = train.sweep({"qwp.fast": np.linspace(0, 3, 10_000)}, "cam", fa.SIX_STATES)
    tracemalloc.start()
    brightest = max(float(frames.max()) for _, frames in swept.chunks("H"))
    _, peak = tracemalloc.get_traced_memory()
    tracemalloc.stop()
    assert brightest > 0
    # All frames are 328 MB. A chunk is 16 MB, and the next is made while it is still held; images, shares and blocks of
    # 1 MB for each thread are a few more.
    assert peak < 40 * 2**20


@coarse
def test_pictures_of_earlier_values_are_let_go(bench, monkeypatch):
    monkeypatch.setattr("fastaxis.studies.gallery.KEPT", 0)
    grid = fa.Grid(samples=128, window=8e-3)
    swept = bench.sweep({"leg.distance": [0.1, 0.12]}, "cam", fa.H, grid=grid)
    first = swept.frame(0, 0)
    swept.powers  # noqa: B018 - asks for the rest
    assert swept.propagations == 2
    np.testing.assert_array_equal(swept.frame(0, 0), first)
    assert swept.propagations == 3


@pytest.mark.parametrize(
    ("values", "target", "settings", "kind", "words"),
    [
        ({"hwp.fsat": ANGLES}, "cam", fa.H, ParameterError, "no parameter 'fsat'"),
        ({"hwq.fast": ANGLES}, "cam", fa.H, FastaxisError, "hwq"),
        ({"hwp": ANGLES}, "cam", fa.H, WiringError, "no parameter named"),
        ({"hwp.fast": []}, "cam", fa.H, ParameterError, "at least one value"),
        ({"hwp.fast": [0, 90]}, "cam", fa.H, ParameterError, "write degrees"),
        ({"hwp.fast": ANGLES}, "qwp", fa.H, ParameterError, "pictures are taken by a Camera"),
        ({"hwp.fast": ANGLES}, "cam", [], ParameterError, "at least one setting"),
        ({"hwp.fast": ANGLES}, "cam", fa.linear(sympy.Symbol("a")), SymbolError, "left open"),
    ],
)
def test_refusals(flat, values, target, settings, kind, words):
    with pytest.raises(kind, match=words):
        flat.sweep(values, target, settings)


def test_a_letter_in_the_train_is_refused(flat):
    train = flat.with_changes({"qwp.fast": sympy.Symbol("theta", real=True)})
    with pytest.raises(SymbolError, match=r"qwp.fast = theta has no value"):
        train.sweep({"hwp.fast": ANGLES}, "cam", fa.H)


def test_a_letter_that_is_swept_needs_no_other_value(flat, compare):
    train = flat.with_changes({"qwp.fast": sympy.Symbol("theta", real=True)})
    compare(train, {"qwp.fast": ANGLES, "hwp.fast": ANGLES})


@pytest.mark.parametrize(
    ("which", "setting", "words"),
    [
        (7, "H", "values are counted from 0 to 6"),
        (-8, "H", "from the end: -1 to -7"),
        (0.1234, "H", "only values that were swept have frames"),
        ({"qwp.fast": 0.1}, "H", "a value of this sweep names hwp.fast"),
        (0, "X", "the settings of this sweep are: H, V, D, A, R, L"),
        (0, 6, "the settings of this sweep"),
    ],
)
def test_what_was_not_swept_is_refused(swept, which, setting, words):
    with pytest.raises(ParameterError, match=words):
        swept.frame(which, setting)


def test_of_several_parameters_all_are_named(flat):
    swept = flat.sweep({"hwp.fast": ANGLES, "qwp.fast": ANGLES}, "cam", fa.H)
    assert swept.at({"hwp.fast": ANGLES[1], "qwp.fast": ANGLES[2]}) == swept.at(9)
    with pytest.raises(ParameterError, match="by its index or as a dict of all swept parameters"):
        swept.frame(0.3, 0)
    zipped = flat.sweep({"hwp.fast": ANGLES, "qwp.fast": ANGLES}, "cam", fa.H, zipped=True)
    assert zipped.at({"hwp.fast": ANGLES[1], "qwp.fast": ANGLES[1]}) == zipped.at(1)
    with pytest.raises(ParameterError, match="only values that were swept"):
        zipped.at({"hwp.fast": ANGLES[1], "qwp.fast": ANGLES[2]})


def test_pictures_that_would_not_fit_are_propagated_value_by_value(flat, compare, monkeypatch):
    # 5 x 3 pictures of 4 x 20 pixels are 9.6 kB; without the plate of fewer values 5 are left, 3.2 kB.
    monkeypatch.setattr("fastaxis.studies.gallery.MOST", 4000)
    swept = compare(flat, {"qwp.fast": ANGLES, "hwp.fast": ANGLES[:4]})
    assert swept.gallery.linear == [("qwp.fast",)]
    assert swept.propagations == 4 * 3
