"""The list of findings: ranks, words, JSON, files, and what it says it did not check."""

import json
import warnings

import pytest

import fastaxis as fa
from fastaxis import units
from fastaxis.inspect import Finding, Inspection, Severity
from fastaxis.units import deg, mm, mW, nm, um


def finding(severity, element="hwp", check="slip"):
    return Finding(severity=severity, check=check, element=element, rule="a rule", got="a value", fix="a fix")


MIXED = Inspection("bench", tuple(map(finding, (Severity.NOTE, Severity.HIGH, Severity.LOW, Severity.MEDIUM))), ("x",))


def test_the_weightiest_comes_first():
    assert [f.severity for f in MIXED] == list(Severity)
    assert len(MIXED) == 4
    assert len(MIXED.high) == len(MIXED.medium) == len(MIXED.low) == len(MIXED.notes) == 1
    assert not MIXED.passed
    assert Inspection("bench", MIXED.medium).passed


def test_findings_of_one_part_and_of_its_ports():
    both = Inspection("b", (finding(Severity.LOW, "pbs.reflected"), finding(Severity.LOW, "pbs2")))
    assert [f.element for f in both.of("pbs")] == ["pbs.reflected"]


def test_text_tells_rule_got_fix_and_what_was_not_checked():
    text = str(MIXED)
    assert text.startswith("bench: 1 high, 1 medium, 1 low, 1 note")
    assert "HIGH   hwp: slip" in text
    assert "a value; a rule" in text
    assert "fix: a fix" in text
    assert "not checked:\n  x\n" in text
    assert "signs: exp(-iwt)" in text
    assert "NOTE" not in MIXED.text(notes=False)
    assert Inspection("bench", ()).text().startswith("bench: nothing found")
    assert str(MIXED.high[0]) == "[high] slip: a value; a rule (fix: a fix)"


def test_several_notes_are_counted_in_the_plural():
    assert Inspection("bench", MIXED.notes * 3 + MIXED.low * 2).summary() == "2 low, 3 notes"


def test_json_reads_back():
    data = json.loads(MIXED.json())
    assert data["passed"] is False
    assert data["findings"][0] == {
        "severity": "high", "check": "slip", "element": "hwp", "rule": "a rule", "got": "a value", "fix": "a fix",
    }  # fmt: skip


@pytest.mark.parametrize("ending", ["txt", "json", "pdf", "png"])
def test_saved_whole(tmp_path, ending):
    (path,) = MIXED.save(tmp_path / f"found.{ending}")
    assert path.exists()
    assert path.stat().st_size > 100


def test_another_ending_is_refused(tmp_path):
    with pytest.raises(fa.FileFormatError, match="pdf, png, json or txt"):
        MIXED.save(tmp_path / "found.doc")


def test_many_findings_take_several_pages():
    many = Inspection("bench", tuple(finding(Severity.LOW) for _ in range(60)), ("one", "two"))
    assert len(many.figures()) > 2


def test_letters_leave_only_the_wiring(bench_of):
    import sympy

    theta = sympy.Symbol("theta", real=True)
    train = bench_of(fa.HalfWavePlate(fast=theta, name="hwp"), fa.Detector(name="meter"))
    (note,) = train.inspect()
    assert (note.check, note.severity) == ("letters", Severity.NOTE)
    assert "theta" in note.got
    assert eval(note.fix, {"train": train}).passed  # noqa: S307 - the fix is code to paste


def test_an_inspection_hides_no_caution_from_the_train(bench_of):
    train = bench_of(fa.HalfWavePlate(fast=1 * deg, design=900 * nm, name="hwp"), fa.Detector(name="meter"))
    with warnings.catch_warnings():
        warnings.simplefilter("error")
        train.inspect()
    with pytest.warns(fa.SlipWarning):
        train.validate()


def test_what_is_never_checked_is_said(bench_of):
    told = " ".join(bench_of(fa.Camera(pixel=10 * um, name="cam")).inspect().not_checked)
    assert "saturation and noise of cam: no sensor=fa.Sensor(...) is declared" in told
    for word in ("temperature", "ghosts", "pulsed", "heights"):
        assert word in told


CODE = ["clipped beam", "off centre", "design wavelength", "bare degrees", "isolator", "plate temperature",
        "saturation", "few counts"]  # fmt: skip


@pytest.mark.parametrize("check", CODE)
def test_fixes_that_are_code_mend_what_they_are_for(pairs, check):
    pair = next(p for p in pairs if p.check == check and p.name not in {"stop_beside_the_beam"})
    train = pair.build(True)
    (found,) = [f for f in train.inspect() if f.check == check and f.element == pair.element]
    mended = eval(found.fix, {"train": train, "mm": mm, "nm": nm, "deg": deg, "um": um, "fa": fa})  # noqa: S307 - code to paste
    again = [f for f in mended.inspect() if f.check == check and f.element == pair.element]
    assert all(f.severity.rank > found.severity.rank for f in again), again


# What a change of a number does not mend: it says what to look at, or mends another thing on the way.
LOOKED_AT = {"arm polarization", "open port", "extinction slip", "wiring"}


def test_every_fix_that_is_code_runs_and_makes_it_better(pair):
    names = {"fa": fa} | {name: getattr(units, name) for name in units.__all__}
    for found in pair.build(True).inspect():
        if found.fix.startswith("train."):
            mended = eval(found.fix, names | {"train": pair.build(True)})  # noqa: S307 - code to paste
            if found.check in LOOKED_AT:
                continue
            again = [f for f in mended.inspect() if (f.check, f.element) == (found.check, found.element)]
            assert all(f.severity.rank > found.severity.rank for f in again), f"{found}\n{again}"


def test_a_camera_with_a_sensor_is_not_among_what_was_not_checked(pairs):
    (pair,) = [p for p in pairs if p.name == "exposure_of_seconds_for_milliseconds"]
    assert "saturation" not in " ".join(pair.build(False).inspect().not_checked)


def test_no_example_of_the_project_raises_an_alarm(request):
    import runpy

    folder = request.config.rootpath / "train_examples"
    for path in sorted(folder.glob("*.py")):
        if "planted" in path.name:
            continue
        train = runpy.run_path(str(path))["train"]
        assert train.inspect().passed, f"{path.name}\n{train.inspect()}"


def test_power_units_in_words():
    from fastaxis.inspect.words import degrees, watts

    assert watts(5 * mW) == "5 mW"
    assert watts(3e-15) == "3e-15 W"
    assert degrees(-0.0) == "0°"


def test_light_on_its_way_back_may_be_blocked_by_the_polarizer_it_came_through():
    train = fa.Train(wavelength=1064 * nm)
    train.along(
        fa.Laser(waist=0.9 * mm, power=50 * mW, state=fa.H, name="laser"),
        fa.Polarizer(axis=0 * deg, extinction=1e4, name="in"),
        fa.FaradayRotator(angle=45 * deg, name="rotator"),
        fa.Polarizer(axis=45 * deg, extinction=1e4, name="out"),
        fa.Mirror(name="mirror"),
    )
    train.along("mirror", "out.back", "rotator.back", "in.back")
    findings = train.inspect()
    assert not findings.high
    assert not [f for f in findings if f.check in ("polarizer", "isolator")]
    # The same polarizer turned across the light on its way out is still found.
    turned = train.with_changes({"out.axis": -45 * deg}).inspect()
    assert [f.element for f in turned.high] == ["out"]
