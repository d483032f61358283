"""Where power leaves a bench, and what to do about it."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from fastaxis.cli.console import progress
from fastaxis.errors import FastaxisError
from fastaxis.report.prefix import readable
from fastaxis.report.walk import is_space

__all__ = ["DARK", "caution", "port_powers"]

DARK = 1e-9  # of the strongest beam; an ideal port that should be dark is, to roundings


def port_powers(train: Any) -> dict[str, float]:
    """Power [W] that leaves each port, where it can be told.

    A port behind empty space carries what the port before it does, so it is asked for only where it is open.
    """
    leaving = [name for name in _out_ports(train) if _worth_asking(train, name)]
    powers = {}
    with progress("power at each port", len(leaving)) as move_on:
        for name in leaving:
            move_on(f"power at {name}")
            try:
                powers[name] = train.power(name)
            except FastaxisError:
                continue  # light by two ways, or letters: the drawing leaves the number out
    return powers


def _out_ports(train: Any) -> list[str]:
    lit = set(train.lit)
    ports = [f"{name}.{face}" for name, face, way in train.graph if way == "out"]
    return [port for port in ports if port in lit]


def _worth_asking(train: Any, port: str) -> bool:
    return port in train.open_ports() or not is_space(train.elements[port.partition(".")[0]])


def caution(train: Any, powers: Mapping[str, float]) -> str:
    """The laser caution for the open ports of a train; empty where no power leaves."""
    least = DARK * max(powers.values(), default=0.0)
    leaving = [port for port in train.open_ports() if powers.get(port, 1.0) > least]
    if not leaving:
        return ""
    named = ", ".join(f"{port} ({readable(powers[port], 'W')})" if port in powers else port for port in leaving)
    return (
        f"Laser caution: power leaves at {named}. Block what is not used, keep beams below eye level and enclosed, wear "
        "the eyewear prescribed; your local rules and your laser safety officer have the last word."
    )
