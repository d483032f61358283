"""Where power leaves a bench, and what to do about it."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from fastaxis.cli.console import tell
from fastaxis.engines.ledger import powers
from fastaxis.engines.power_ledger import DARK as NOTHING
from fastaxis.errors import SamplingError, SymbolError, WiringError
from fastaxis.report.prefix import readable

__all__ = ["DARK", "caution", "port_powers", "watts"]

DARK = 1e-9  # of the strongest beam; an ideal port that should be dark is, to roundings


def port_powers(train: Any) -> dict[str, float]:
    """Power [W] that leaves each port; nothing where letters or light that cannot be followed leave it open."""
    try:
        return {f"{name}.{face}": power for (name, face), power in powers(train).items()}
    except SamplingError as error:
        tell(f"Powers were not worked out: {error}")
        return {}
    except (SymbolError, WiringError):
        return {}


def watts(power: float, most: float) -> str:
    """A power as a person reads it; "dark" where it is the rounding of ``most``, the strongest beam.

    >>> watts(1.54e-35, 1e-3), watts(2e-6, 1e-3)
    ('dark', '2.00 µW')
    """
    return "dark" if power <= NOTHING * most else readable(power, "W")


def caution(train: Any, powers: Mapping[str, float]) -> str:
    """The laser caution for the open ports of a train; empty where no power leaves."""
    least = DARK * max(powers.values(), default=0.0)
    leaving = [port for port in train.open_ports() if powers.get(port, 1.0) > least]
    if not leaving:
        return ""
    named = ", ".join(f"{port} ({readable(powers[port], 'W')})" if port in powers else port for port in leaving)
    return (
        f"Laser caution: power leaves at {named}. Block what is not used, keep beams below eye level and enclosed, "
        "wear the eyewear prescribed; your local rules and your laser safety officer have the last word."
    )
