"""Scales of mounts: bench angle = sense (scale - zero), and the other way round seen from the source."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.inspect import Mount
from fastaxis.inspect.turning import turn_of
from fastaxis.units import deg


def test_the_four_kinds_of_scale():
    dialled = {
        (sense, side): Mount(10 * deg, sense=sense, seen_from=side).scale(30 * deg) / deg
        for sense in (1, -1)
        for side in ("receiver", "source")
    }
    assert dialled == pytest.approx(
        {(1, "receiver"): 40, (-1, "receiver"): 340, (1, "source"): 340, (-1, "source"): 40}, abs=1e-12
    )


radians = st.floats(-6, 6).filter(lambda angle: angle == 0 or angle != round(angle))  # whole ones are cautioned


@given(radians, st.sampled_from([1, -1]), st.sampled_from(["receiver", "source"]), st.floats(-6, 6))
def test_dialling_gives_the_angle_back(zero, sense, side, angle):
    mount = Mount(zero, sense=sense, seen_from=side)
    assert 0 <= mount.scale(angle) < 2 * math.pi
    turns = (mount.angle(mount.scale(angle)) - angle) / (2 * math.pi)
    # sums of angles of a few turns: 1e-15 of each, taken to 0 within 1e-12 of a whole turn
    assert turns == pytest.approx(round(turns), abs=1e-12)


def test_zero_is_shown_as_zero_and_not_as_a_whole_turn():
    assert Mount(10 * deg).scale(-10 * deg) == 0.0


@pytest.mark.parametrize(
    ("bad", "words"),
    [
        ({"sense": 0}, "sense is \\+1"),
        ({"seen_from": "above"}, "facing the source"),
        ({"zero": 45}, "in radians"),
        ({"zero": math.nan}, "finite"),
        ({"zero": math.inf}, "finite"),
    ],
)
def test_refusals(bad, words):
    with pytest.raises(fa.ParameterError, match=words) as caught:
        Mount(**bad)
    Mount(**eval(f"dict({caught.value.fix})", {"deg": deg}))  # noqa: S307 - the fix is code to paste


def test_plates_polarizers_and_edges_turn_with_their_angle():
    told = {
        "fast": fa.HalfWavePlate(fast=20 * deg),
        "slow": fa.QuarterWavePlate(slow=20 * deg),
        "axis": fa.Polarizer(axis=20 * deg),
        "angle": fa.Slit(width=1e-3, angle=20 * deg),
    }
    for parameter, part in told.items():
        turn = turn_of(part)
        assert (turn.parameter, turn.angle, turn.period) == (parameter, pytest.approx(20 * deg), pytest.approx(math.pi))
    assert turn_of(fa.KnifeEdge(angle=1.0)).period == 2 * math.pi
    assert turn_of(fa.Lens(focal=0.1)) is None


@pytest.mark.parametrize("q", [0.5, -0.5, 2, 1.5, -1])
@pytest.mark.parametrize("g", [10 * deg, -35 * deg])
def test_a_turned_q_plate(q, g):
    """A plate of offset 0 turned by g has its axis at q (phi - g) + g: read off the law itself."""
    part = fa.QPlate(q=q, offset=(1 - q) * g)
    turn = turn_of(part)
    assert turn.angle == pytest.approx(g)
    law = part.laws(532e-9)[0]
    for phi in (0.0, 0.7, 2.0):
        assert law.axis_angle(phi) == pytest.approx(q * (phi - g) + g)
    # After one period the axes stand where they stood, up to half turns.
    again = (1 - q) * turn.period / math.pi
    assert again == pytest.approx(round(again)) or turn.period == 2 * math.pi


def test_turning_a_q_plate_of_q_1_does_nothing():
    assert turn_of(fa.QPlate(q=1, offset=10 * deg)) is None


def test_an_even_modulator_is_turned_by_its_axis():
    assert turn_of(fa.PhaseModulator(axis=30 * deg, phase=0.5)).angle == 30 * deg
    assert turn_of(fa.PhaseModulator(axis=30 * deg, phase=lambda x, y: x + y)) is None
