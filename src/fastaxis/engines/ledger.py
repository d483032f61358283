"""The power ledger: watts on every port that light leaves."""

from __future__ import annotations

from typing import Any

from fastaxis.engines import propagate
from fastaxis.errors import SamplingError
from fastaxis.laws import AxisLaw, CircularLaw, Law, ScalarLaw
from fastaxis.plan import Plan, make_plan
from fastaxis.plan.binding import refuse_letters
from fastaxis.train.graph import lit_nodes, source_nodes

__all__ = ["lossless", "powers"]

Port = tuple[str, str]
MOST_PATHS = 64  # each takes some hundredths of a second at each port


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


def powers(train: Any, *, engine: str = "auto") -> dict[Port, float]:
    """Power [W] on every lit port that light leaves, (part, face) -> watts, in the order the light gets there.

    A passage without loss hands its power on; only where a part may lose, divide or join light is it worked out, and
    then without what follows in the same path.

    Raises
    ------
    SymbolError : a letter without a value on the way.
    SamplingError : light that cannot be sampled, or a cavity whose light takes too many trips to fade; said before any
        trip is followed.

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
    lit = lit_nodes(graph, source_nodes(train.elements))
    ledger: dict[Port, float] = {}
    waiting = [(name, train.elements[name].exit or "out", "out") for name in train.sources]
    for name, face, _ in waiting:
        refuse_letters(name, train.elements[name].parameters())
        ledger[name, face] = float(train.elements[name].source.power)
    while waiting:
        here = waiting.pop(0)
        arriving = ledger[here[0], here[1]]
        for entry in graph.successors(here):
            for leaving in graph.successors(entry):
                port = (leaving[0], leaving[1])
                if port not in ledger:
                    alone = sum(before in lit for before in graph.predecessors(leaving)) == 1
                    hands_on = alone and all(map(lossless, graph.edges[entry, leaving]["passage"].laws))
                    ledger[port] = arriving if hands_on else _worked_out(train, port, engine)
                    waiting.append(leaving)
    return ledger


def _worked_out(train: Any, port: Port, engine: str) -> float:
    plan = make_plan(train, ".".join(port), power_only=True, engine=engine)
    _check_paths(plan, ".".join(port))
    return sum(field.power for field in propagate(plan))


def _check_paths(plan: Plan, port: str) -> None:
    """A ledger asks at every port, which is no time to follow hundreds of round trips through stops and gratings."""
    followed = sum(branch.engine in ("azimuthal", "grid") for branch in plan.branches)
    if followed > MOST_PATHS:
        raise SamplingError(
            f"the powers of all ports are worked out where light with a shape comes by at most {MOST_PATHS} paths; "
            "one port may be asked by itself, which takes a while",
            got=f"{port}: {followed} paths through parts that shape the light carry power",
            fix=f'train.power("{port}")',
        )
