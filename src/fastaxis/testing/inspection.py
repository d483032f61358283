"""Whether a bench passes its inspection."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

from fastaxis.errors import ParameterError
from fastaxis.testing.failing import BenchError
from fastaxis.testing.kinds import about_a_train, texts

__all__ = ["passes_inspection"]

SEVERITIES = ("high", "medium", "low")


@about_a_train
def passes_inspection(train: Any, *, severity: str = "high", allowed: Iterable[str] = ()) -> None:
    """``train.inspect()`` finds nothing of a severity or above.

    Parameters
    ----------
    train : the bench.
    severity : "high", "medium" or "low".
    allowed : names of checks, or of parts, whose findings are known and accepted.

    Raises
    ------
    BenchError : something was found.
    ParameterError : another severity; names that are no list of texts.
    """
    if severity not in SEVERITIES:
        raise ParameterError(
            f"findings have the severity {', '.join(SEVERITIES)}",
            got=f"passes_inspection: {severity!r}",
            fix='severity="medium"',
        )
    known = texts("passes_inspection", "allowed", allowed, fix='allowed=["qp"]')
    counted = SEVERITIES[: SEVERITIES.index(severity) + 1]
    found = [
        finding
        for finding in train.inspect()
        if finding.severity.value in counted and not {finding.check, finding.element} & known
    ]
    if found:
        raise BenchError(
            train.name,
            expected=f"nothing of {severity} severity" + ("" if severity == "high" else " or above"),
            got="; ".join(f"{one.element}: {one.check}, {one.got}" for one in found),
            cause=f"{found[0].rule} (fix: {found[0].fix})",
        )
