"""The power ledger: watts on every port that light leaves."""

from __future__ import annotations

from typing import Any

from fastaxis.engines import propagate
from fastaxis.laws import AxisLaw, CircularLaw, Law, Passage, ScalarLaw
from fastaxis.plan import make_plan

__all__ = ["lossless", "powers"]

Port = tuple[str, str]


def lossless(law: Law) -> bool:
    """Whether a law keeps all the power, whatever the light is."""
    if isinstance(law, AxisLaw):
        return _is_one(law.along.power) and _is_one(law.across.power)
    if isinstance(law, CircularLaw):
        return _is_one(law.left.power) and _is_one(law.right.power)
    if isinstance(law, ScalarLaw):
        return law.stop is None and _is_one(law.transmission.power)
    return True


def _is_one(power: Any) -> bool:
    return isinstance(power, int | float) and power == 1


def powers(train: Any) -> dict[Port, float]:
    """Power [W] on every lit port that light leaves, (part, face) -> watts, in the order the light gets there.

    A passage without loss hands its power on; only where a part may lose or divide light is it worked out, and then
    without what follows in the same path.

    Raises
    ------
    SymbolError : a letter without a value on the way.
    WiringError : light by two paths meets in a port.

    Examples
    --------
    >>> from fastaxis.elements import Laser, PolarizingBeamSplitter
    >>> from fastaxis.light import D
    >>> from fastaxis.train import Train
    >>> laser = Laser(waist=1e-3, power=2e-3, state=D)
    >>> train = Train(wavelength=633e-9).along(laser, PolarizingBeamSplitter(name="pbs"))
    >>> {port: round(watts, 9) for port, watts in powers(train).items()}
    {('laser1', 'out'): 0.002, ('pbs', 'transmitted'): 0.001, ('pbs', 'reflected'): 0.001}
    """
    graph = train.graph
    ledger: dict[Port, float] = {}
    waiting = [(name, train.elements[name].exit or "out", "out") for name in train.sources]
    for name, face, _ in waiting:
        ledger[name, face] = float(train.elements[name].source.power)
    while waiting:
        here = waiting.pop(0)
        arriving = ledger[here[0], here[1]]
        for entry in graph.successors(here):
            for leaving in graph.successors(entry):
                port = (leaving[0], leaving[1])
                if port not in ledger:
                    passage = graph.edges[entry, leaving]["passage"]
                    ledger[port] = _after(train, port, passage, arriving)
                    waiting.append(leaving)
    return ledger


def _after(train: Any, port: Port, passage: Passage, arriving: float) -> float:
    if all(lossless(law) for law in passage.laws):
        return arriving
    return sum(field.power for field in propagate(make_plan(train, ".".join(port), power_only=True)))
