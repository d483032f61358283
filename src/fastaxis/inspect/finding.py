"""One thing an inspection has to say: how much it matters, the rule, what was got, and a fix."""

from __future__ import annotations

from dataclasses import asdict, dataclass
from enum import Enum
from typing import Any

from fastaxis.errors import FastaxisError, FastaxisWarning

__all__ = ["Finding", "Severity", "from_message"]


class Severity(Enum):
    """How much a finding matters.

    HIGH: the bench will not do what is drawn, or sends a strong beam where nothing stops it.
    MEDIUM: it works worse than it looks, or a value is probably a slip.
    LOW: a small loss or a limit worth knowing before parts are ordered.
    NOTE: bookkeeping, nothing to mend.
    """

    HIGH = "high"
    MEDIUM = "medium"
    LOW = "low"
    NOTE = "note"

    @property
    def rank(self) -> int:
        """0 for what comes first."""
        return list(Severity).index(self)


@dataclass(frozen=True, kw_only=True)
class Finding:
    """What one check found at one part.

    Parameters
    ----------
    severity : how much it matters.
    check : name of the check, "aperture", "wiring" ...
    element : name of the part or port; of the train where no single part is meant.
    rule : what should hold, as a clause.
    got : what was found, with its value.
    fix : code that can be pasted, or what to do at the bench.
    """

    severity: Severity
    check: str
    element: str
    rule: str
    got: str
    fix: str

    def __str__(self) -> str:
        return f"[{self.severity.value}] {self.check}: {self.got}; {self.rule} (fix: {self.fix})"

    def as_data(self) -> dict[str, Any]:
        """The same as plain values."""
        return {**asdict(self), "severity": self.severity.value}


def from_message(message: FastaxisError | FastaxisWarning, *, severity: Severity, check: str, element: str) -> Finding:
    """An error or warning of fastaxis as a finding."""
    return Finding(severity=severity, check=check, element=element, rule=message.rule, got=message.got, fix=message.fix)
