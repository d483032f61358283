"""The examples whose light meets again: gannet_stack_fork, sedge_hollow_loop, wick_head_isolator, eider_reach_drift."""

import runpy
from pathlib import Path

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.analysis import polarization_index
from fastaxis.units import deg, mm, mW, um

EXAMPLES = Path(__file__).parents[2] / "train_examples"


@pytest.fixture
def bench():
    def load(name):
        made = runpy.run_path(str(EXAMPLES / f"{name}.py"))
        return made["train"], made["settings"]

    return load


def depth(values):
    return (values.max() - values.min()) / (values.max() + values.min())


def test_gannet_stack_shows_both_visibilities(bench):
    train, settings = bench("gannet_stack_fork")
    shots = [train.expose(camera, settings) for camera in ("along", "cross")]
    one, other = (s.frame(0) for s in shots)
    x = shots[0].x
    # In the plane of the spiral plate both arms are the same Gaussian, 2 mW in all.
    light = 2 * mW * (12 * um) ** 2 * 2 / np.pi / mm**2 * np.exp(-2 * (x**2 + x[:, None] ** 2) / mm**2)
    ring = (np.hypot(x, x[:, None]) > 0.3 * mm) & (np.hypot(x, x[:, None]) < 0.7 * mm)
    # A pixel averages over 1/26 of a fringe: 0.3 % less; and pixels do not always hit the crest.
    assert depth((one / light)[ring]) == pytest.approx(0.942, abs=5e-3)
    assert depth((other / light)[ring]) == pytest.approx(0.961, abs=5e-3)
    assert depth(((one + other[:, ::-1]) / light)[ring]) < 0.02  # arms of 300 and 340 mm differ a little in width
    assert depth(((one + other) / light)[ring]) > 0.3
    for camera, expected in (("along", 0.942), ("cross", 0.961)):
        (pair,) = train.visibility(camera).pairs
        assert pair.coherence * pair.balance == pytest.approx(expected, abs=5e-4)
        assert pair.polarization == pytest.approx(1)


def test_gannet_stack_shows_two_more_fringes(bench):
    train, settings = bench("gannet_stack_fork")
    shots = train.expose("along", settings)
    turns = []
    for row in (70, 89):  # 0.11 mm below and above the core
        bare = shots.frame(0)[row] / np.exp(-2 * shots.x**2 / mm**2)
        spectrum = np.fft.fft(bare)
        spectrum[0], spectrum[80:] = 0, 0
        turns.append(np.sum(np.diff(np.unwrap(np.angle(np.fft.ifft(spectrum)[10:150])))) / (2 * np.pi))
    # The lines end 0.84 mm from the core, which leaves 2 * 4 atan(0.11/0.84)/2 pi = 0.17 of the two turns outside.
    assert abs(turns[0] - turns[1]) == pytest.approx(2, abs=0.3)
    assert np.mean(np.abs(turns)) == pytest.approx(139 * 12e-6 * 2e-3 / 632.8e-9, abs=0.2)


def test_gannet_stack_fringes_have_the_period_of_their_angle(bench):
    train, settings = bench("gannet_stack_fork")
    shots = train.expose("along", settings)
    frame = shots.frame(0)
    # Above the core the spiral adds a turn to the fringes along a row, below it takes one away; the mean has neither.
    found = [12 * um / _frequency(rows) for rows in (frame[:20], frame[-20:])]
    assert abs(1 / found[0] - 1 / found[1]) > 100
    # 0.3164 mm; about six fringes in the beam, whose middle the transform finds to a hundredth of one.
    assert 2 / (1 / found[0] + 1 / found[1]) == pytest.approx(632.8e-9 / 2e-3, rel=5e-3)


def _frequency(rows):
    """Where the spectrum of some rows peaks [1/pixel], between the frequencies of the frame."""
    size = 16 * rows.shape[1]
    bare = (rows - rows.mean(axis=1, keepdims=True)) * np.hanning(rows.shape[1])
    spectrum = abs(np.fft.rfft(bare, n=size)).sum(axis=0)
    first = size // 80  # what is slower than 80 pixels is the envelope
    peak = first + int(np.argmax(spectrum[first:]))
    left, top, right = np.log(spectrum[peak - 1 : peak + 2])
    return (peak + (left - right) / (2 * (left - 2 * top + right))) / size


def test_sedge_hollow_turns_with_the_analyzer(bench):
    train, settings = bench("sedge_hollow_loop")
    shots = train.expose("cam", settings)
    rows = shots.table()
    assert [row.lobes for row in rows] == [0, 2, 2, 2, 2]
    turned = (np.array([row.angle for row in rows[1:]]) - rows[1].angle) / deg % 180
    assert turned == pytest.approx([0, 30, 60, 90], abs=0.2)
    assert polarization_index(shots.stokes, x=shots.x, y=shots.y, radius=0.15 * mm) == pytest.approx(1)
    assert train.power("pbs.front") == pytest.approx(0, abs=1e-15)


def test_sedge_hollow_with_a_fourth_mirror_has_no_lobes(bench):
    train, settings = bench("sedge_hollow_loop")
    joints = [joint for joint in train.joints if {"m3.side", "m3.front"} & set(joint) and "pbs.reflected" in joint]
    train.joints = tuple(joint for joint in train.joints if joint not in joints)
    train.add(fa.Mirror(two_way=True, name="m4"))
    train.join("m3.side", "m4.front").join("m4.front", "m3.side")
    train.join("m4.side", "pbs.reflected").join("pbs.reflected", "m4.side")
    assert [row.lobes for row in train.expose("cam", settings).table()] == [0] * 5


def test_wick_head_lets_little_back(bench):
    train, _ = bench("wick_head_isolator")
    ledger = train.ledger()
    out = 50 * mW * (np.cos(1 * deg) ** 2 + np.sin(1 * deg) ** 2 / 1e4)
    assert ledger.of("detected")["cam"] == pytest.approx(out * 0.96, rel=1e-6)
    # Nearly all of it comes back at 45 deg; cos^2(89 deg) is along the first polarizer and 1e-4 leaks across it.
    back = out * 0.04 * (np.cos(89 * deg) ** 2 + 1e-4)
    assert ledger.of("back to the laser")["in.front"] == pytest.approx(back, rel=0.02)
    assert abs(ledger.missing) < 1e-12 * ledger.input


def test_eider_reach_has_upright_fringes_that_walk(bench):
    train, settings = bench("eider_reach_drift")
    shots = train.expose("cam", settings)
    envelope = np.exp(-2 * shots.x**2 / (1.5 * mm) ** 2)
    degree = np.cos(np.pi * 499.654e6 * 0.12 / 299792458)

    def fringes(row):
        turn = 2 * np.pi * shots.x * 1e-3 / 632.8e-9
        model = np.stack([np.ones(160), shots.x, shots.x**2, np.cos(turn), np.sin(turn)])
        fitted = np.linalg.lstsq(model.T, row / envelope, rcond=None)[0]
        return np.hypot(*fitted[3:]) / fitted[0]

    frame = shots.frame(0)
    # The leaning beam arrives a quarter of a millimetre aside, which makes the arms unequal at the edge of the frame.
    # Five fringes in the frame are not quite told from the slope that this makes: a few hundredths of the depth.
    assert fringes(frame[80]) == pytest.approx(degree, abs=0.05)
    upright = frame[:, 80] / np.exp(-2 * shots.y**2 / (1.5 * mm) ** 2)
    assert np.ptp(upright) < 0.03 * upright.max()
    # A quarter of a wave on each passage changes bright for dark.
    walked = train.with_changes({"drift.phase": np.pi / 2}).expose("cam", settings).frame(0)
    assert fringes(walked[80]) == pytest.approx(degree, abs=0.05)
    assert fringes(frame[80] + walked[80]) < 0.02
