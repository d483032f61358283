"""Light that meets a polarizer in a state it does not pass."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator

from fastaxis.elements.phase_modulator import PhaseModulator
from fastaxis.elements.polarizer import Polarizer
from fastaxis.inspect.bench import Bench, Visit
from fastaxis.inspect.checks.expectations import expectation, inputs_of
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.strands import azimuth, degree, state_in_words, total
from fastaxis.inspect.words import degrees, percent
from fastaxis.maths import NUMBERS

__all__ = ["axis_fix", "passing", "polarizers"]


def polarizers(bench: Bench) -> Iterator[Finding]:
    """Share of the light that each polarizer passes, of what it could pass with its axis along the light."""
    expecting, meeting = inputs_of(bench), _where_states_meet(bench)
    for visit in bench.of_kind(Polarizer):
        if visit.patterned or visit.returning:
            continue  # a beam of many states is what such a polarizer sorts; light on its way back, what it stops
        if _analyzes_a_modulator(visit):
            continue  # its light swings between all and nothing
        if expectation(visit, expecting) is not None or visit.name in meeting:
            continue  # told by the check of expectations; there to bring paths of two polarizations together
        share = passing(visit)
        if share < 0.9:
            yield _finding(visit, share)


def _analyzes_a_modulator(visit: Visit) -> bool:
    """Whether the light was modulated in polarization on its way: by a modulator that is declared to expect it."""
    return any(isinstance(v.element, PhaseModulator) and v.element.expects is not None for v in visit.chain())


def _where_states_meet(bench: Bench) -> set[str]:
    """Polarizers that light of several polarizations comes to by several paths, forwards."""
    states: dict[str, set[str]] = defaultdict(set)
    for visit in bench.of_kind(Polarizer):
        if not visit.returning:
            states[visit.name].add(state_in_words(visit.before))
    return {name for name, several in states.items() if len(several) > 1}


def passing(visit: Visit) -> float:
    """Share of the light along the axis of a polarizer: (1 + s . a)/2 of its Stokes vector on the equator."""
    s0, s1, s2, _ = total(visit.before)
    turn = 2 * float(visit.laws[0].angle)  # as met; from behind the axis stands mirrored
    return float((1 + (s1 * NUMBERS.cos(turn) + s2 * NUMBERS.sin(turn)) / s0) / 2)


def axis_fix(visit: Visit) -> str:
    """Code that turns the axis along the light."""
    met, wanted = float(visit.laws[0].angle), azimuth(total(visit.before))
    sense = -1 if visit.entered == "back" else 1
    axis = float(visit.element.axis) + sense * (wanted - met)
    return f'train.with_changes({{"{visit.name}.axis": {degrees(axis).rstrip("°")}*deg}})'


def _finding(visit: Visit, share: float) -> Finding:
    stokes = total(visit.before)
    got = f"{visit.name}: {state_in_words(visit.before)} light meets the axis at {degrees(float(visit.laws[0].angle))}"
    if degree(stokes) < 0.1:
        return Finding(
            severity=Severity.NOTE,
            check="polarizer",
            element=visit.name,
            rule="of unpolarized light a polarizer passes half",
            got=got,
            fix="a polarized laser, or twice the power",
        )
    if abs(stokes[3]) > 0.9 * stokes[0]:
        return Finding(
            severity=Severity.MEDIUM,
            check="polarizer",
            element=visit.name,
            rule=f"of circular light a polarizer passes half, {percent(share)} here, whatever its axis",
            got=got,
            fix=f"fa.QuarterWavePlate(fast={degrees(float(visit.element.axis)).rstrip('°')}*deg + 45*deg) "
            f"before {visit.name}",
        )
    return Finding(
        severity=Severity.MEDIUM if share < 0.02 else Severity.LOW,
        check="polarizer",
        element=visit.name,
        rule="a polarizer across the light blocks it" if share < 0.02 else "a polarizer passes cos² of the angle",
        got=f"{got}: {percent(share)} passes",
        fix=axis_fix(visit),
    )
