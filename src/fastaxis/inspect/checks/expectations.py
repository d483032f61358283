"""Light that arrives in another polarization than a part expects: modulators, isolators, and what declares it."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.isolating import isolators_of
from fastaxis.inspect.mending import ENOUGH, new_plate, share_in, turned_plate
from fastaxis.inspect.strands import state_in_words
from fastaxis.inspect.words import degrees, percent
from fastaxis.light import State, linear

__all__ = ["expectation", "expectations", "inputs_of"]

GOOD = 0.999  # linear light 1.8 degrees off
MOSTLY_WRONG = 0.4  # below it a modulator does next to nothing of what it is there for


def expectations(bench: Bench) -> Iterator[Finding]:
    """Overlap of the light that meets each part with the state it expects."""
    inputs = inputs_of(bench)
    for visit in bench.visits:
        state = expectation(visit, inputs)
        if state is not None and bench.lit(visit):
            share = share_in(state, visit.before)
            if share < GOOD:
                yield _finding(visit, state, share)


def inputs_of(bench: Bench) -> frozenset[str]:
    """Names of the input polarizers of isolators."""
    return frozenset(trio[0].name for trio in isolators_of(bench))


def expectation(visit: Visit, inputs: frozenset[str]) -> State | None:
    """The state a part expects of light that meets it as drawn; an isolator expects light along its input axis."""
    part = visit.element
    if visit.entered != part.entry or visit.returning:
        return None
    if part.expected is None and visit.name in inputs:
        return linear(float(part.axis))
    state: State | None = part.expected
    return state


def _finding(visit: Visit, state: State, share: float) -> Finding:
    severity = Severity.LOW if share >= ENOUGH else Severity.MEDIUM
    return Finding(
        severity=Severity.HIGH if share < MOSTLY_WRONG else severity,
        check="input state",
        element=visit.name,
        rule=f"it expects {_in_words(state)} light"
        + ("" if visit.element.expects is not None else ", along its axis: another state is declared by expects="),
        got=f"{visit.name}: {state_in_words(visit.before)} light arrives, {percent(share)} of it as expected",
        fix=_fix(visit, state),
    )


def _in_words(state: State) -> str:
    return state.label if state.label in {"H", "V", "D", "A", "R", "L"} else f"linear {degrees(state.azimuth)}"


def _fix(visit: Visit, state: State) -> str:
    turned = turned_plate(visit, state)
    if turned is not None:
        name, parameter, angle = turned
        return f'train.with_changes({{"{name}.{parameter}": {degrees(angle).rstrip("°")}*deg}})'
    added = new_plate(visit, state)
    if added is not None:
        kind, fast = added
        return f"fa.{kind.__name__}(fast={degrees(fast).rstrip('°')}*deg) before {visit.name}"
    return f"a polarizer or two wave plates before {visit.name}"
