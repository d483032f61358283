"""The pytest plugin: a fixture that loads bench files, and frames of failing assertions as PNG."""

from __future__ import annotations

import re
from collections.abc import Callable, Generator
from pathlib import Path
from typing import Any

import pytest

from fastaxis.loader import late

__all__: list[str] = []


def pytest_addoption(parser: pytest.Parser) -> None:
    group = parser.getgroup("fastaxis", "benches under test")
    group.addoption(
        "--fastaxis-frames",
        metavar="DIR",
        default=None,
        help="write the frames of failing bench assertions to this folder, a PNG for each test",
    )


@pytest.fixture
def load_bench(request: pytest.FixtureRequest) -> Callable[[str], Any]:
    """``load_bench("switch.py")``: the train of a bench file, looked for beside the test file."""

    def load(path: str) -> Any:
        return late("cli.bench_file", "read_bench")(Path(request.path).parent / path).train

    return load


@pytest.hookimpl(wrapper=True)
def pytest_runtest_makereport(item: pytest.Item, call: pytest.CallInfo[None]) -> Generator[None, Any, Any]:
    report = yield
    folder = item.config.getoption("--fastaxis-frames")
    error = call.excinfo.value if call.excinfo is not None else None
    # Looked at by name: the class is not imported unless a test has done so.
    if folder and type(error).__name__ == "BenchError" and getattr(error, "frames", None):
        name = re.sub(r"[^\w.-]+", "_", item.nodeid)
        path = Path(folder) / f"{name}.png"
        figure = late("report.failing", "draw_failing")(error)
        late("report.save", "save")(figure, path.with_suffix(""), ("png",))
        report.sections.append(("fastaxis frames", str(path)))
    return report
