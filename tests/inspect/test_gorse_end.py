"""The example bench with planted mistakes, and its report."""

import runpy

import pytest


@pytest.fixture(scope="module")
def gorse_end(request):
    path = request.config.rootpath / "train_examples" / "gorse_end_planted_mistakes.py"
    return runpy.run_path(str(path))["train"].inspect()


PLANTED = [
    ("design wavelength", "hwp", "high"),
    ("off centre", "qp", "medium"),
    ("clipped beam", "lens", "high"),
    ("off focus", "cam", "medium"),
    ("mirrored picture", "cam", "medium"),
    ("open port", "pbs.reflected", "medium"),
    ("laser caution", "pbs.reflected", "high"),
]


@pytest.mark.parametrize(("check", "element", "severity"), PLANTED)
def test_each_planted_mistake_is_reported(gorse_end, check, element, severity):
    found = [f for f in gorse_end if (f.check, f.element) == (check, element)]
    assert [f.severity.value for f in found] == [severity], str(gorse_end)


def test_nothing_else_is_of_high_severity(gorse_end):
    planted = {(check, element) for check, element, _ in PLANTED}
    assert {(f.check, f.element) for f in gorse_end.high} <= planted


def test_numbers_of_the_report(gorse_end):
    by_check = {(f.check, f.element): f for f in gorse_end}
    # 180 deg * 633/532 = 214.17 deg
    assert "214.2°" in by_check["design wavelength", "hwp"].got
    # 0.5 mm beside a beam of w = 1.0 mm sqrt(1 + (280 mm/zR)^2), zR = pi w^2/wavelength = 5.9 m
    assert "0.5 mm or 0.5 w" in by_check["off centre", "qp"].got
