"""Laws of nature on random graphs of parts: energy, reciprocity, and the paths against the equations."""

import math

import numpy as np
import pytest
from hypothesis import HealthCheck, assume, given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.errors import FastaxisError
from fastaxis.units import mm, nm

angles = st.floats(-math.pi, math.pi)
shares = st.floats(0.05, 0.95)
# The steady state is solved to some 1e-16 of its largest field; a nearly closed cavity holds a field that is larger
# than what enters by the inverse of what its mirrors let out, here at most some hundred times.
CLOSED = 1e-12


@st.composite
def parts(draw, lossless=True, reciprocal=False, most=12):
    kinds = ["splitter", "pbs", "mirror", "plate", "rotator", "space", "phase", "splitter", "pbs"]
    kinds += [] if reciprocal else ["faraday"]
    kinds += [] if lossless else ["filter", "polarizer", "leaky"]
    made = []
    for index in range(draw(st.integers(1, most))):
        kind, name = draw(st.sampled_from(kinds)), f"p{index}"
        made.append({
            "splitter": lambda: fa.BeamSplitter(reflectance=draw(shares), name=name),
            "leaky": lambda: fa.BeamSplitter(reflectance=0.3, transmittance=0.4, name=name),
            "pbs": lambda: fa.PolarizingBeamSplitter(Tp=draw(shares), Ts=draw(shares), name=name),
            "mirror": lambda: fa.Mirror(name=name, two_way=draw(st.booleans())),
            "plate": lambda: fa.Retarder(fast=draw(angles), retardance=draw(angles), name=name),
            "rotator": lambda: fa.Rotator(angle=draw(angles), name=name),
            "faraday": lambda: fa.FaradayRotator(angle=draw(angles), name=name),
            "space": lambda: fa.FreeSpace(draw(st.floats(0.01, 1.0)), name=name),
            "phase": lambda: fa.PhaseShift(phase=draw(angles), name=name),
            "filter": lambda: fa.NeutralDensity(transmission=draw(shares), name=name),
            "polarizer": lambda: fa.Polarizer(axis=draw(angles), name=name),
        }[kind]())  # fmt: skip
    return made


def faces(part):
    return sorted({face for way in part.passages(633 * nm) for face in way})


@st.composite
def graphs(draw, both_ways=False, **options):
    """(parts, pairs of joined ports, free ports): every joint is made both ways if asked."""
    made = draw(parts(**options))
    ports = draw(st.permutations([f"{part.name}.{face}" for part in made for face in faces(part)]))
    joints, free = [], []
    ports = list(ports)
    while ports:
        one = ports.pop()
        other = next((p for p in ports if p.split(".")[0] != one.split(".")[0]), None)
        if other is None or draw(st.integers(0, 3)) == 0:
            free.append(one)
            continue
        ports.remove(other)
        joints.append((one, other))
    assume(free)
    return made, joints, free


def wired(made, joints, feed, state=fa.H):
    train = fa.Train(wavelength=633 * nm)
    for part in made:
        train.add(part)
    for one, other in joints:
        train.join(one, other).join(other, one)
    train.add(fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1.0, state=state, name="laser"))
    return train.join("laser", feed)


def quiet(question):
    """An answer without the warnings about parts that no light reaches; a bench that resonates without loss is left out."""
    import warnings

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        try:
            return question()
        except FastaxisError as refusal:
            assume("builds up for ever" not in str(refusal) and "build up for ever" not in str(refusal))
            raise


common = settings(
    max_examples=40, deadline=None, suppress_health_check=[HealthCheck.filter_too_much, HealthCheck.too_slow]
)


@common
@given(graphs())
def test_energy_closes_at_the_ports_of_any_lossless_graph(graph):
    made, joints, free = graph
    train = wired(made, joints, free[0])
    total = quiet(lambda: sum(train.power(port, engine="auto") for port in train.open_ports()))
    assert total == pytest.approx(1.0, abs=CLOSED)


@common
@given(graphs(lossless=False))
def test_the_ledger_accounts_for_every_watt(graph):
    made, joints, free = graph
    train = wired(made, joints, free[0])
    ledger = quiet(train.ledger)
    assert abs(ledger.missing) < CLOSED
    assert all(row.power > -CLOSED for row in ledger.rows)


def sent(made, joints, source, target, state, seen):
    """Amplitude of ``seen`` in the light that leaves by one port when ``state`` enters by another."""
    train = wired(made, joints, source, state)
    if target not in train.open_ports():
        return 0.0
    field = quiet(lambda: train.field(target, engine="uniform"))[0]
    return complex(np.vdot(seen.jones, field.jones))


def mirrored(state):
    """The same light described in the frame of a beam that runs the other way: E* with x reversed, for Jones J^T."""
    ex, ey = state.jones
    return fa.from_jones(-np.conj(ex), np.conj(ey))


@common
@given(graphs(reciprocal=True), angles, st.floats(-0.7, 0.7))
def test_source_and_detector_can_change_places(graph, azimuth, ellipticity):
    made, joints, free = graph
    assume(len(free) > 1)
    one, other = fa.elliptical(azimuth, ellipticity), fa.linear(0.3)
    there = sent(made, joints, free[0], free[1], one, other)
    back = sent(made, joints, free[1], free[0], mirrored(other), mirrored(one))
    assert abs(there) == pytest.approx(abs(back), abs=CLOSED)


def test_a_faraday_rotator_breaks_reciprocity():
    made, joints = [fa.Polarizer(axis=0.0, name="p0"), fa.FaradayRotator(angle=math.pi / 4, name="p1"),
                    fa.Polarizer(axis=math.pi / 4, name="p2")], [("p0.back", "p1.front"), ("p1.back", "p2.front")]  # fmt: skip
    there = sent(made, joints, "p0.front", "p2.back", fa.H, fa.D)
    back = sent(made, joints, "p2.back", "p0.front", mirrored(fa.D), mirrored(fa.H))
    assert abs(there) == pytest.approx(1)
    assert abs(back) == pytest.approx(0, abs=1e-15)


@settings(common, max_examples=15)
@given(graphs(lossless=False, most=5))
def test_paths_one_by_one_give_what_the_equations_give(graph):
    made, joints, free = graph
    train = wired(made, joints, free[0])
    slow = train.with_changes({"laser.line": fa.Comb(spacing=1.0, weights=(1.0,))})  # sharp, but not known to be
    for port in train.open_ports()[:2]:
        expected = quiet(lambda: train.power(port))
        try:
            found = quiet(lambda: slow.power(port))
        except fa.SamplingError:
            assume(False)
        assert found == pytest.approx(expected, abs=1e-12)
