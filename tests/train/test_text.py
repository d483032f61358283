"""The text form: the same train comes back, and malformed text is refused in a sentence."""

import json

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.elements.base import Element
from fastaxis.units import deg, mm, mW, nm, um

alpha = sympy.Symbol("alpha", real=True)


def angles():
    every = st.floats(-6.0, 6.0, allow_subnormal=True)
    numbers = every.filter(lambda angle: angle == 0 or angle != round(angle))  # whole radians are cautioned
    return numbers | st.builds(lambda x, n: x * alpha + sympy.pi / n, st.integers(-3, 3), st.integers(1, 9))


def lengths(least=1e-6, most=0.2):
    return st.floats(least, most)


def states():
    return (
        st.sampled_from([fa.H, fa.R])
        | st.builds(fa.linear, angles())
        | st.builds(fa.partially_polarized, st.just(fa.D), st.floats(0.1, 0.9))
    )


def lasers():
    modes = st.builds(
        lambda p, l, w: fa.LaguerreGauss(p=p, l=l, waist=w), st.integers(0, 3), st.integers(-3, 3), lengths()
    )
    return st.builds(lambda w, p, s: fa.Laser(waist=w, power=p, state=s), lengths(), lengths(), states()) | st.builds(
        lambda m, s: fa.Laser(mode=m, state=s), modes, states()
    )


def through_parts():
    return st.one_of(
        st.builds(lambda a: fa.HalfWavePlate(fast=a), angles()),
        st.builds(lambda a, d: fa.Retarder(slow=a, retardance=d), angles(), angles()),
        st.builds(
            lambda a, e: fa.Polarizer(axis=a, extinction=e), angles(), st.just(float("inf")) | st.floats(10, 1e8)
        ),
        st.builds(lambda q, o: fa.QPlate(q=q / 2, offset=o), st.integers(-4, 4).filter(bool), angles()),
        st.builds(lambda d: fa.FreeSpace(distance=d), lengths()),
        st.builds(lambda f, x: fa.Lens(focal=f, centre=(x, -x)), lengths(), lengths()),
        st.builds(lambda r: fa.Aperture(radius=r), lengths()),
    )


@st.composite
def trains(draw):
    parts = draw(st.lists(through_parts(), max_size=5))
    train = fa.Train(wavelength=draw(st.floats(2e-7, 2e-6)), name=draw(st.text(max_size=8)))
    train.along(draw(lasers()), *parts, fa.PolarizingBeamSplitter(name="pbs"))
    if draw(st.booleans()):
        train.along("pbs.reflected", fa.Mirror(), fa.Camera(pixel=draw(lengths(1e-6, 1e-4))))
    return train


@settings(max_examples=50, deadline=None)
@given(trains())
def test_the_same_train_comes_back(train):
    text = train.to_text()
    back = fa.Train.from_text(text)
    assert back.elements == train.elements
    assert list(back.elements) == list(train.elements)
    assert (back.joints, back.wavelength, back.name) == (train.joints, train.wavelength, train.name)
    assert back.symbols == train.symbols
    assert back.to_text() == text


def test_a_saved_bench_reads_well(tmp_path, line):
    line.save(tmp_path / "bench.json")
    text = (tmp_path / "bench.json").read_text(encoding="utf-8")
    assert '"fast": 0.17453292519943295' in text
    assert '["laser.out", "hwp.front"]' in text
    assert json.loads(text)["stamp"] == fa.stamp()
    assert fa.Train.load(tmp_path / "bench.json").elements == line.elements


def test_arrays_of_patterns_and_modes_come_back_exactly():
    rng = np.random.default_rng(7)
    cells, field = rng.normal(size=(3, 4)), rng.normal(size=(4, 4)) + 1j * rng.normal(size=(4, 4))
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(mode=fa.SampledMode(field, 10 * um), name="laser"),
        fa.PatternedRetarder(fast=-(fa.Pattern(cells, pixel=20 * um) * 0.1), retardance=180 * deg, name="patterned"),
    )
    back = fa.Train.from_text(train.to_text())
    pattern, before = back.elements["patterned"].fast, train.elements["patterned"].fast
    assert np.array_equal(pattern.source, cells)
    assert (pattern.pixel, pattern.scale, pattern.shift) == (before.pixel, before.scale, before.shift)
    assert np.array_equal(back.elements["laser"].mode.array, train.elements["laser"].mode.array)
    assert back.to_text() == train.to_text()


def test_coherent_and_incoherent_sources_come_back():
    beam = fa.Beam(
        (fa.Term(0.6, fa.Gaussian(1 * mm), fa.L), fa.Term(0.8j, fa.LaguerreGauss(p=0, l=1, waist=1 * mm), fa.R))
    )
    single = fa.Beam((fa.Term(1.0, fa.Gaussian(1 * mm), fa.H),))
    train = fa.Train(wavelength=532 * nm)
    train.add(fa.Laser(beam=beam, name="coherent"))
    train.add(fa.Laser(incoherent=[(0.25, single), (0.75, beam, 633 * nm)], power=2 * mW, name="lines"))
    back = fa.Train.from_text(train.to_text())
    assert back.elements == train.elements
    assert back.elements["lines"].source == train.elements["lines"].source


def test_a_function_cannot_be_kept():
    plate = fa.PatternedRetarder(fast=fa.Pattern(lambda x, y: x + y), retardance=180 * deg, name="patterned")
    train = fa.Train(wavelength=532 * nm).add(plate)
    with pytest.raises(fa.FileFormatError, match=r"patterned\.fast\.source: a function; .*sample it to an array"):
        train.to_text()


class Stray(Element):
    """A part of a user's own."""

    faces = ("in",)
    entry = "in"


def test_parts_of_ones_own_are_built_only_when_named():
    text = fa.Train(wavelength=532 * nm).add(Stray(name="stray")).to_text()
    with pytest.raises(fa.FileFormatError, match="stray: unknown kind 'Stray'"):
        fa.Train.from_text(text)
    assert type(fa.Train.from_text(text, kinds=[Stray]).elements["stray"]) is Stray


GOOD = {
    "fastaxis": 1,
    "stamp": fa.stamp(),
    "name": "bench",
    "wavelength": 532e-9,
    "elements": [{"kind": "FreeSpace", "name": "gap", "distance": 0.1}],
    "joints": [],
}


def altered(**changes):
    return {key: value for key, value in {**GOOD, **changes}.items() if value is not None}


def with_part(**changes):
    return altered(elements=[{key: v for key, v in {**GOOD["elements"][0], **changes}.items() if v is not ...}])


MALFORMED = {
    "not json": ("{", "no JSON at line 1"),
    "nested too deep": ("[" * 100_000, "no JSON: nested too deep"),
    "not a number": (json.dumps(altered(wavelength=float("nan"))), "NaN as a number"),
    "other json": ("[1, 2]", "JSON, but no saved train"),
    "newer version": (altered(fastaxis=2), "version 2; this fastaxis reads version 1"),
    "odd version": (altered(fastaxis=True), "version True"),
    "other signs": (altered(stamp="signs: exp(+iwt)"), "a train is read under the signs it was written with"),
    "no wavelength": (altered(wavelength=None), "missing field 'wavelength'"),
    "no elements": (altered(elements=None), "missing field 'elements'"),
    "no joints": (altered(joints=None), "missing field 'joints'"),
    "no stamp": (altered(stamp=None), "missing field 'stamp'"),
    "wavelength in words": (altered(wavelength="green"), "'wavelength' is 'green'"),
    "elements in words": (altered(elements="all"), "'elements' is 'all'"),
    "number for a part": (altered(elements=[3]), "3 as a part"),
    "part without a kind": (with_part(kind=...), "no kind"),
    "part without a name": (with_part(name=...), "no name"),
    "unknown kind": (with_part(kind="FreeSpaec"), "gap: unknown kind 'FreeSpaec'"),
    "class of another module": (with_part(kind="Popen"), "gap: unknown kind 'Popen'"),
    "base of all parts": (with_part(kind="State"), "gap: unknown kind 'State'"),
    "missing parameter": (with_part(distance=...), "gap: missing field 'distance'"),
    "unknown parameter": (with_part(distnace=1), "gap: unknown field 'distnace'"),
    "part inside a part": (with_part(distance={"kind": "FreeSpace", "distance": 1}), "unknown kind 'FreeSpace'"),
    "unknown light": (with_part(distance={"kind": "Sate"}), "gap.distance: unknown kind 'Sate'"),
    "nameless object": (with_part(distance={"a": 1}), "gap.distance: {'a': 1}; an object in a file names its kind"),
    "bad complex": (
        with_part(distance={"complex": [1]}),
        "a number, complex number or array is written as it was saved",
    ),
    "bad number word": (with_part(distance={"number": "lots"}), "a number, complex number or array"),
    "array of objects": (with_part(distance={"array": [1], "type": "object"}), "a number, complex number or array"),
    "ragged array": (
        with_part(distance={"array": [[1], [1, 2]], "type": "float64"}),
        "a number, complex number or array",
    ),
    "bad formula": (with_part(distance={"expression": "__import__('os')"}), "a formula in a file holds names, numbers"),
    "joint of one": (altered(joints=[["gap.back"]]), "['gap.back'] as a joint"),
    "joint of numbers": (altered(joints=[[1, 2]]), "[1, 2] as a joint"),
}


def test_the_good_text_is_good():
    assert fa.Train.from_text(json.dumps(GOOD)).elements["gap"].distance == 0.1


@pytest.mark.parametrize("case", MALFORMED)
def test_malformed_text_is_refused_in_a_sentence(case):
    data, says = MALFORMED[case]
    with pytest.raises(fa.FileFormatError) as caught:
        fa.Train.from_text(data if isinstance(data, str) else json.dumps(data))
    assert says in str(caught.value)
    assert "\n" not in str(caught.value)


def test_a_picture_is_no_bench(tmp_path):
    (tmp_path / "frame.png").write_bytes(b"\x89PNG\r\n\x1a\n")
    with pytest.raises(fa.FileFormatError, match="frame.png: not text"):
        fa.Train.load(tmp_path / "frame.png")


def test_impossible_values_and_joints_are_refused_by_their_own_rules():
    with pytest.raises(fa.ParameterError, match="gap: distance"):
        fa.Train.from_text(json.dumps(with_part(distance=-1)))
    with pytest.raises(fa.WiringError, match="a part cannot be joined to itself"):
        fa.Train.from_text(json.dumps(altered(joints=[["gap.back", "gap.front"]])))
