"""What the README says runs: every Python block, in order, in one session."""

import re
import runpy
from pathlib import Path

import numpy as np
import pytest

README = (Path(__file__).parent.parent / "README.md").read_text(encoding="utf-8")
BLOCKS = re.findall(r"```python\n(.*?)```", README, re.DOTALL)


@pytest.fixture(scope="module")
def session(tmp_path_factory):
    path = tmp_path_factory.mktemp("readme") / "readme.py"
    path.write_text("\n".join(BLOCKS), encoding="utf-8")
    return runpy.run_path(str(path))


def test_the_ten_lines_show_what_the_text_says(session):
    rows = session["shots"].table()
    assert [row.lobes for row in rows] == [2, 2, 2, 2, 0, 0]
    assert [row.angle for row in rows[:4]] == pytest.approx(np.radians([0, 90, 45, 135]), abs=1e-6)


def test_the_cavity_is_that_of_airy(session):
    """T = 1/(1 + F sin^2(half the round trip)), F = 4R/(1-R)^2: M. Born and E. Wolf, section 7.6.1; each mirror adds i."""
    cavity = session["cavity"]
    half = 2 * np.pi / 850e-9 * 10e-3 + 0.3 + np.pi / 2
    # k L = 7e4 is rounded to 1e-11, and F = 360 makes the most of it.
    power = cavity.with_changes({"tuning.phase": 0.3}).power("out")
    assert power == pytest.approx(1e-3 / (1 + 360 * np.sin(half) ** 2), rel=1e-8)


def test_every_part_of_the_table_exists():
    import fastaxis as fa

    table = README.split("## Parts")[1].split("Analyzer settings")[0]
    rows = [line.split("|")[1] for line in table.splitlines() if line.startswith("| `")]
    names = re.findall(r"`(\w+)", " ".join(rows))
    assert len(names) > 25
    assert all(hasattr(fa, name) for name in names)


def test_the_stamp_is_printed_as_it_is():
    from fastaxis.conventions import stamp

    quoted = " ".join(
        line.lstrip("> ") for line in README.splitlines() if line.startswith(">") and not line.startswith(">>>")
    )
    assert stamp() == quoted
