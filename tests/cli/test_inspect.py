"""``fastaxis inspect``: the report, the files, and the exit code a pipeline can go by."""

import json
import runpy

SOUND = """
train = fa.Train(wavelength=532*nm, name="bench").along(
    fa.Laser(waist=0.8*mm, power=1*mW, name="laser"), fa.HalfWavePlate(fast=20*deg, name="hwp"), fa.Detector(name="meter")
)
"""
WRONG = SOUND.replace("fast=20*deg", "fast=20*deg, design=1064*nm")
LETTERS = SOUND.replace("fast=20*deg", "fast=__import__('sympy').Symbol('theta', real=True)")


def test_a_sound_bench_gives_zero(run, bench):
    ran = run("inspect", bench(SOUND))
    assert ran.code == 0
    assert ran.out.startswith("bench: ")
    assert "laser caution" in ran.out
    assert "does not mean safe" in ran.out


def test_a_finding_of_high_severity_gives_three(run, bench):
    ran = run("inspect", bench(WRONG), "--brief")
    assert ran.code == 3
    assert "HIGH   hwp: design wavelength" in ran.out
    assert "NOTE" not in ran.out


def test_json_on_stdout_alone(run, bench, tmp_path):
    ran = run("inspect", bench(WRONG), "--json", "--out", "found")
    assert json.loads(ran.out)["findings"][0]["element"] == "hwp"
    assert sorted(path.name for path in (tmp_path / "found").iterdir()) == [
        "inspection-1.png",
        "inspection.json",
        "inspection.pdf",
        "inspection.txt",
    ]


def test_the_example_with_planted_mistakes(run, examples):
    path = examples / "gorse_end_planted_mistakes.py"
    ran = run("inspect", path, "--json")
    assert ran.code == 3
    assert json.loads(ran.out) == runpy.run_path(str(path))["train"].inspect().as_data()


def test_files_are_named(run, bench):
    ran = run("inspect", bench(SOUND), "--out", "found")
    assert "Written found/inspection.pdf" in ran.out.replace("\\", "/")


def test_letters_take_values(run, bench):
    path = bench(LETTERS)
    assert "theta without a value" in run("inspect", path).out
    assert "theta" not in run("inspect", path, "--symbol", "theta=20deg").out


def test_a_mistake_in_the_file_is_another_exit_code(run, bench):
    ran = run("inspect", bench("train = fa.Train(wavelength=532)"))
    assert ran.code == 1


def test_help_names_the_exit_code(run):
    ran = run("inspect", "--help")
    assert ran.code == 0
    assert "3 (inspect) a finding of high severity" in " ".join(ran.out.split())
