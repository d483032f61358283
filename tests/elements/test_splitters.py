import cmath
import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements import BeamSplitter, PolarizingBeamSplitter
from fastaxis.elements.splitting import largest_port_sum
from fastaxis.errors import ParameterError
from fastaxis.light import D as DIAGONAL
from fastaxis.light import H, V
from fastaxis.units import deg

shares = st.floats(0, 1)
angles = st.floats(-6, 6)
quick = settings(max_examples=50, deadline=None)
ROUNDING = 1e-14  # sums of a few products of entries up to 1
FORWARD = [("front", "transmitted"), ("front", "reflected"), ("side", "reflected"), ("side", "transmitted")]


def scattering(jones, splitter, ways=FORWARD):
    """The 4x4 matrix from (front, side) to (transmitted, reflected), fields at mirrored places taken together."""
    through, turned, through_side, turned_side = (jones(splitter, way) for way in ways)
    return np.block([[through, turned_side], [turned, through_side]])


splitters = st.one_of(
    st.builds(BeamSplitter, reflectance=shares),
    st.builds(PolarizingBeamSplitter, Tp=shares, Ts=shares),
    # A real coating: p and s differ in power and in phase, each lossless for itself.
    st.builds(
        lambda Rp, Rs, p, s: BeamSplitter(
            Rp=Rp, Rs=Rs, phase_tp=p, phase_rp=p + 90 * deg, phase_ts=s, phase_rs=s + 90 * deg
        ),
        shares,
        shares,
        st.floats(-4, 4),
        st.floats(-4, 4),
    ),
)


@quick
@given(splitters)
def test_lossless_ones_are_unitary(jones, splitter):
    s = scattering(jones, splitter)
    assert s @ s.conj().T == pytest.approx(np.eye(4), abs=ROUNDING)


@quick
@given(splitters)
def test_all_ways_back_are_open_and_reciprocal(jones, splitter):
    mirror_x = np.diag([-1.0, 1.0])
    for into, out in FORWARD:
        expected = mirror_x @ jones(splitter, (into, out)).T @ mirror_x
        assert jones(splitter, (out, into)) == pytest.approx(expected, abs=ROUNDING)


@quick
@given(shares, shares, angles, angles)
def test_port_sum_is_the_largest_singular_value_squared(T, R, phase_t, phase_r):
    t, r = math.sqrt(T) * cmath.exp(1j * phase_t), math.sqrt(R) * cmath.exp(1j * phase_r)
    largest = np.linalg.norm(np.array([[t, r], [r, t]]), 2) ** 2
    assert largest_port_sum(T, R, phase_t, phase_r) == pytest.approx(largest, abs=ROUNDING)


@quick
@given(shares, shares, angles, angles)
def test_whatever_is_accepted_is_passive(jones, T, R, phase_t, phase_r):
    try:
        splitter = BeamSplitter(transmittance=T, reflectance=R, phase_t=phase_t, phase_r=phase_r)
    except ParameterError:
        assert largest_port_sum(T, R, phase_t, phase_r) > 1
        return
    assert np.linalg.norm(scattering(jones, splitter), 2) <= 1 + ROUNDING


def test_half_of_the_light_each_way(jones):
    cube = BeamSplitter()
    for way in FORWARD:
        assert np.linalg.norm(jones(cube, way) @ DIAGONAL.jones) ** 2 == pytest.approx(0.5, abs=ROUNDING)


def test_only_reflections_flip_the_picture():
    ways = BeamSplitter().passages(5e-7)
    assert {way: ways[way].reflected for way in FORWARD} == dict(zip(FORWARD, ("", "x", "", "x"), strict=True))
    assert len(ways) == 8


def test_absorbing_splitter_may_have_any_phase_that_stays_passive(jones):
    # T + R + 2 sqrt(TR) = 0.25 + 0.25 + 0.5 = 1 at phases 0 and 0: just passive.
    metal = BeamSplitter(reflectance=0.25, transmittance=0.25, phase_r=0.0)
    assert np.linalg.norm(scattering(jones, metal), 2) ** 2 == pytest.approx(1, abs=ROUNDING)


def test_ideal_cube_sorts(jones):
    cube = PolarizingBeamSplitter()
    for state, through, aside in ((H, 1, 0), (V, 0, 1), (DIAGONAL, 0.5, 0.5)):
        assert np.linalg.norm(jones(cube, FORWARD[0]) @ state.jones) ** 2 == pytest.approx(through, abs=ROUNDING)
        assert np.linalg.norm(jones(cube, FORWARD[1]) @ state.jones) ** 2 == pytest.approx(aside, abs=ROUNDING)


def test_three_percent_leak_leaves_the_reflected_port_at_33_to_1(jones):
    # Common practice, no source: (1 - 0.001)/0.03.
    cube = PolarizingBeamSplitter(Tp=0.97, Ts=0.001)
    p, s = (np.linalg.norm(jones(cube, ("front", "reflected")) @ state.jones) ** 2 for state in (H, V))
    assert s / p == pytest.approx(33.3, abs=0.05)


def test_changing_the_reflectance_changes_what_is_left_over():
    assert BeamSplitter(reflectance=0.45).changed(reflectance=0.3).T == pytest.approx(0.7, abs=1e-16)


@pytest.mark.parametrize(
    ("make", "sentence"),
    [
        (
            lambda **over: BeamSplitter(name="bs", **{"phase_r": 0.0} | over),
            "bs: transmittance = 0.5, reflectance = 0.5, phase_t = 0, phase_r = 0; light at both faces would leave with "
            "more power than it brought: r t* + t r* = 0 needs the two phases a quarter wave apart, and here the port "
            "sum reaches 2 (fix: phase_t=0, phase_r=0 + 90*deg)",
        ),
        (
            lambda **over: PolarizingBeamSplitter(name="pbs", **{"Tp": 0.9, "phase_rp": 0.0} | over),
            "pbs: Tp = 0.9, Rp = 0.1, phase_tp = 0, phase_rp = 0; light at both faces would leave with more power than "
            "it brought: r t* + t r* = 0 needs the two phases a quarter wave apart, and here the port sum reaches 1.6 "
            "(fix: phase_tp=0, phase_rp=0 + 90*deg)",
        ),
        (
            lambda **over: BeamSplitter(name="bs", **{"reflectance": 0.5, "transmittance": 0.6} | over),
            "bs: transmittance = 0.6, reflectance = 0.5; a splitter has no gain: transmittance + reflectance is at most "
            "1 and here the port sum is 1.1 (fix: transmittance=0.6, reflectance=0.4)",
        ),
        (
            lambda **over: PolarizingBeamSplitter(name="pbs", **{"Ts": 0.2, "Rs": 0.99} | over),
            "pbs: Ts = 0.2, Rs = 0.99; a splitter has no gain: Ts + Rs is at most 1 and here the port sum is 1.19 "
            "(fix: Ts=0.2, Rs=0.8)",
        ),
    ],
)
def test_non_unitary_sets_are_refused_with_their_port_sum(make, sentence):
    with pytest.raises(ParameterError) as refusal:
        make()
    assert str(refusal.value) == sentence
    make(**eval(f"dict({refusal.value.fix})", {"deg": deg}))


def test_a_real_coating_says_only_what_differs(jones):
    cube = BeamSplitter(reflectance=0.45, Rs=0.52, phase_rs=85 * deg, phase_ts=-5 * deg)
    s = -math.sqrt(0.52) * cmath.exp(85j * deg)
    assert jones(cube, ("front", "reflected")) == pytest.approx(np.diag([1j * math.sqrt(0.45), s]), abs=ROUNDING)
    passed = np.diag([math.sqrt(0.55), math.sqrt(0.48) * cmath.exp(-5j * deg)])
    assert jones(cube, ("side", "reflected")) == pytest.approx(passed, abs=ROUNDING)
    lossy = BeamSplitter(reflectance=0.45, transmittance=0.5, Tp=0.46)
    assert jones(lossy, ("front", "transmitted")) == pytest.approx(np.diag(np.sqrt([0.46, 0.5])), abs=ROUNDING)


def test_a_coating_is_refused_with_its_port_sum():
    # s reflected in phase: 1 + 2 sqrt(0.48 0.52) at worst.
    with pytest.raises(ParameterError, match=r"port sum reaches 1.999") as refusal:
        BeamSplitter(Rs=0.52, phase_rs=0.0)
    assert refusal.value.got.endswith("transmittance = 0.48, Rs = 0.52, phase_t = 0, phase_rs = 0")


def test_numbers_agree_with_letters(agrees):
    for way in FORWARD:
        agrees(lambda R: BeamSplitter(reflectance=R), {"R": 0.3}, way)
        agrees(lambda Tp, Ts: PolarizingBeamSplitter(Tp=Tp, Ts=Ts), {"Tp": 0.9, "Ts": 0.05}, way)
