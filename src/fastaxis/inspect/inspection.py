"""All findings of an inspection, the weightiest first."""

from __future__ import annotations

import json
from collections import Counter
from collections.abc import Iterator
from dataclasses import dataclass
from os import PathLike
from pathlib import Path
from typing import Any

from fastaxis.conventions import stamp
from fastaxis.errors import FileFormatError
from fastaxis.files import write_whole
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.loader import late

__all__ = ["Inspection"]


@dataclass(frozen=True)
class Inspection:
    """What an inspection of a train found. ``print(inspection)`` tells it; it is no proof that the rest is right.

    Parameters
    ----------
    name : of the train.
    findings : ranked by severity.
    not_checked : what was not looked at, and why.
    """

    name: str
    findings: tuple[Finding, ...]
    not_checked: tuple[str, ...] = ()

    def __post_init__(self) -> None:
        # Sorting is stable: within a severity the order of the checks stays.
        object.__setattr__(self, "findings", tuple(sorted(self.findings, key=lambda f: f.severity.rank)))

    def __iter__(self) -> Iterator[Finding]:
        return iter(self.findings)

    def __len__(self) -> int:
        return len(self.findings)

    def _of(self, severity: Severity) -> tuple[Finding, ...]:
        return tuple(finding for finding in self.findings if finding.severity is severity)

    @property
    def high(self) -> tuple[Finding, ...]:
        return self._of(Severity.HIGH)

    @property
    def medium(self) -> tuple[Finding, ...]:
        return self._of(Severity.MEDIUM)

    @property
    def low(self) -> tuple[Finding, ...]:
        return self._of(Severity.LOW)

    @property
    def notes(self) -> tuple[Finding, ...]:
        return self._of(Severity.NOTE)

    @property
    def passed(self) -> bool:
        """Whether nothing of high severity was found."""
        return not self.high

    def of(self, element: str) -> tuple[Finding, ...]:
        """The findings at one part or port."""
        return tuple(f for f in self.findings if f.element == element or f.element.startswith(f"{element}."))

    def __str__(self) -> str:
        return self.text()

    def text(self, *, notes: bool = True) -> str:
        """The findings in words, numbered through; ``notes`` also gives the bookkeeping."""
        lines = [f"{self.name}: {self.summary()}"]
        for number, finding in enumerate(self.findings, start=1):
            if notes or finding.severity is not Severity.NOTE:
                lines += [
                    f"{number:3}. {finding.severity.value.upper():6} {finding.element}: {finding.check}",
                    f"     {finding.got}; {finding.rule}",
                    f"     fix: {finding.fix}",
                ]
        lines += ["not checked:", *(f"  {item}" for item in self.not_checked)] if self.not_checked else []
        return "\n".join([*lines, stamp()])

    def summary(self) -> str:
        """How many findings of each severity."""
        counts = Counter(finding.severity for finding in self.findings)
        told = [_counted(counts[severity], severity) for severity in Severity if counts[severity]]
        return ", ".join(told) or "nothing found"

    def as_data(self) -> dict[str, Any]:
        """The same as plain values."""
        return {
            "name": self.name,
            "stamp": stamp(),
            "passed": self.passed,
            "findings": [finding.as_data() for finding in self.findings],
            "not_checked": list(self.not_checked),
        }

    def json(self) -> str:
        """The same as JSON text."""
        return json.dumps(self.as_data(), ensure_ascii=False, indent=2)

    def figures(self) -> Any:
        """The findings as matplotlib figures of A4 size."""
        return late("report.inspection", "draw_inspection")(self)

    def save(self, path: str | PathLike[str]) -> tuple[Path, ...]:
        """Write the findings as .pdf (all pages), .png (a file a page), .json or .txt.

        Raises
        ------
        FileFormatError : another ending.
        """
        path = Path(path)
        written = {".json": self.json, ".txt": self.text}
        if path.suffix in written:
            text = f"{written[path.suffix]()}\n".encode()
            return (write_whole(path, lambda file: file.write(text)),)
        if path.suffix in (".pdf", ".png"):
            pages: tuple[Path, ...] = late("report.paper", "save_pages")(self.figures(), path)
            return pages
        raise FileFormatError(
            "an inspection is written as pdf, png, json or txt", got=str(path), fix='"inspection.pdf"'
        )


def _counted(number: int, severity: Severity) -> str:
    """A number and a severity: 3 high, 3 low, but 3 notes."""
    return f"{number} {severity.value}{'s' if severity is Severity.NOTE and number > 1 else ''}"
