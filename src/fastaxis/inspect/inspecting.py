"""The inspection of a train: wiring first, then everything that follows the light."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from fastaxis.inspect.checks import CHECKS, wiring
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.inspection import Inspection
from fastaxis.inspect.laser_safety import laser_cautions
from fastaxis.inspect.surveying import survey

__all__ = ["inspect_train"]

NEVER = (
    "temperature of parts other than plates; thickness, walk-off and tilt inside parts",
    "ghosts of parts other than windows",
    "pulsed light, damage thresholds, and laser limits outside 400 to 1400 nm",
    "mechanics: heights, clearances, mounts",
)


def inspect_train(train: Any) -> Inspection:
    """Check a train before it is built.

    Parameters
    ----------
    train : the train; nothing about it is changed.

    Returns
    -------
    Inspection : findings ranked by severity, and what was not checked.

    Notes
    -----
    Beam sizes are second moments (a Gaussian's are exact; rings and edges are estimates), powers come from the power
    ledger. Nothing found is no proof that the bench is right.
    """
    train = train.copy()  # so that cautions shown here are shown again when the train itself is asked
    found = list(wiring(train))
    blocked = [finding for finding in found if finding.severity is Severity.HIGH and not _only_dark(finding)]
    if blocked:
        return Inspection(train.name, tuple(found), ("all that follows the light: mend the wiring first", *NEVER))
    if train.symbols:
        return _with_letters(train, found)
    found += dict.fromkeys(_following_the_light(train))  # of paths that are alike each finding once
    return Inspection(train.name, tuple(found), (*_without_sensor(train), *NEVER))


def _without_sensor(train: Any) -> Iterator[str]:
    bare = [name for name in train.cameras if train.elements[name].sensor is None]
    if bare:
        yield f"saturation and noise of {', '.join(bare)}: no sensor=fa.Sensor(...) is declared"


def _only_dark(finding: Finding) -> bool:
    """Whether the finding is about a part without light; the rest of the bench can be followed."""
    return finding.rule in {"nothing feeds it", "no light reaches it"}


def _with_letters(train: Any, found: list[Finding]) -> Inspection:
    letters = sorted(map(str, train.symbols))
    values = ", ".join(f'"{letter}": 0.3' for letter in letters)
    note = Finding(
        severity=Severity.NOTE,
        check="letters",
        element=train.name,
        rule="powers, beam sizes and states need a number for every letter",
        got=f"{train.name}: {', '.join(letters)} without a value",
        fix=f"train.with_values({{{values}}}).inspect()",
    )
    return Inspection(train.name, (*found, note), ("all that needs numbers: only the wiring was looked at", *NEVER))


def _following_the_light(train: Any) -> Iterator[Finding]:
    bench = survey(train)
    if not bench.whole:
        yield Finding(
            severity=Severity.LOW,
            check="paths",
            element=train.name,
            rule="paths are followed up to a number",
            got=f"{train.name}: more paths than {len(bench.visits)} visits hold",
            fix="inspect a part of the bench on its own",
        )
    for name in bench.loops:
        yield Finding(
            severity=Severity.MEDIUM,
            check="light runs round",
            element=name,
            rule="light that comes back to where it was makes a cavity, whose powers hang on its length",
            got=f"{name}: light that left it comes back to it the same way",
            fix="end the loop on a dump, unless a cavity is meant; beam sizes here are those of the first turn",
        )
    for check in CHECKS:
        yield from check(bench)
    yield from laser_cautions(bench)
