"""Where all the watts of a bench go: on every edge, into parts, out of open ports, back to the laser."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Any

from fastaxis.conventions import stamp
from fastaxis.engines.ledger import powers
from fastaxis.train.graph import lit_nodes, source_nodes
from fastaxis.train.validate import check_source

__all__ = ["DARK", "Ledger", "Row", "power_ledger"]

DARK = 1e-12  # of the lasers; some thousand roundings, and below what any crystal or coating reaches


@dataclass(frozen=True)
class Row:
    """One entry of the ledger.

    Parameters
    ----------
    kind : "edge" (light on its way), "absorbed", "clipped" (lost in a part with a clear area), "detected", "dumped",
        "open port" or "back to the laser".
    place : "pbs.reflected -> cam.in", a port, or a part.
    power : [W].
    """

    kind: str
    place: str
    power: float


@dataclass(frozen=True)
class Ledger:
    """The power of a bench, written down. ``print(train.ledger())`` shows it.

    Parameters
    ----------
    rows : the entries; all but the edges are places where light ends.
    input : power of all lasers [W].
    """

    rows: tuple[Row, ...]
    input: float

    def of(self, kind: str) -> dict[str, float]:
        """The entries of one kind, place -> watts."""
        return {row.place: row.power for row in self.rows if row.kind == kind}

    @property
    def ends(self) -> tuple[Row, ...]:
        """The entries where light ends."""
        return tuple(row for row in self.rows if row.kind != "edge")

    @property
    def missing(self) -> float:
        """Input less all the ends [W]: rounding, and what samples lost."""
        return math.fsum([self.input, *(-row.power for row in self.ends)])

    def __str__(self) -> str:
        wide = max(len(row.kind) for row in self.rows)
        lines = [f"power of the lasers {1e3 * self.input:.6g} mW"]
        lines += [f"  {row.kind:<{wide}}  {self._told(row.power)}  {row.place}" for row in self.rows]
        lines.append(f"sum of the ends {1e3 * (self.input - self.missing):.6g} mW")
        return "\n".join([*lines, stamp()])

    def _told(self, power: float) -> str:
        return f"{'dark':>15}" if abs(power) <= DARK * self.input else f"{1e3 * power:12.6g} mW"


def power_ledger(train: Any, *, engine: str = "auto") -> Ledger:
    """The ledger of a train.

    Raises
    ------
    WiringError : no laser.
    SymbolError : a letter without a value on the way.
    SamplingError : light that cannot be sampled, or a cavity whose light takes too many trips to fade.

    Examples
    --------
    >>> from fastaxis.elements import Detector, Laser, NeutralDensity, PolarizingBeamSplitter
    >>> from fastaxis.light import D
    >>> from fastaxis.train import Train
    >>> train = Train(wavelength=633e-9).along(
    ...     Laser(waist=1e-3, power=2e-3, state=D), PolarizingBeamSplitter(name="pbs"),
    ...     NeutralDensity(density=1.0, name="nd"), Detector(name="meter"))
    >>> ledger = power_ledger(train)
    >>> {row.place: round(row.power, 9) for row in ledger.ends}
    {'pbs.reflected': 0.001, 'meter': 0.0001, 'nd': 0.0009}
    """
    check_source(train.elements, train.name)
    graph, out = train.graph, powers(train, engine=engine)
    edges, ends = [], []
    for (name, face), watts in out.items():
        ahead = next(iter(graph.successors((name, face, "out"))), None)
        if ahead is None:
            ends.append(Row(_open_kind(train, name, face), f"{name}.{face}", watts))
            continue
        edges.append(Row("edge", f"{name}.{face} -> {ahead[0]}.{ahead[1]}", watts))
        if graph.out_degree(ahead) == 0:
            ends.append(
                Row("dumped" if type(train.elements[ahead[0]]).__name__ == "BeamDump" else "detected", ahead[0], watts)
            )
    lasers = math.fsum(float(train.elements[name].source.power) for name in train.sources)
    return Ledger((*edges, *ends, *_losses(train, out)), lasers)


def _open_kind(train: Any, name: str, face: str) -> str:
    feeder = (
        next(iter(train.graph.predecessors((name, face, "in"))), None) if (name, face, "in") in train.graph else None
    )
    return "back to the laser" if feeder is not None and feeder[0] in train.sources else "open port"


def _losses(train: Any, out: dict[tuple[str, str], float]) -> list[Row]:
    """What parts keep: the light that enters less the light that leaves."""
    graph, kept = train.graph, dict[str, list[float]]()
    lit = lit_nodes(graph, source_nodes(train.elements))
    for name, face, way in (node for node in graph if node in lit and node[0] not in train.sources):
        if way == "out":
            kept.setdefault(name, []).append(-out[name, face])
        elif graph.out_degree((name, face, way)):
            feeder = next(iter(graph.predecessors((name, face, way))))
            kept.setdefault(name, []).append(out[feeder[0], feeder[1]])
    most = max(out.values(), default=0.0)
    rows = []
    for name, watts in kept.items():
        lost = math.fsum(watts)
        # Less than the roundings of some hundred sums is no loss.
        if lost > 1e-13 * most:
            rows.append(Row("clipped" if _clips(train, name) else "absorbed", name, lost))
    return rows


def _clips(train: Any, name: str) -> bool:
    passages = train.elements[name].passages(float(train.wavelength)).values()
    return any(getattr(law, "stop", None) is not None for passage in passages for law in passage.laws)
