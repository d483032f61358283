"""Laser cautions: which limits the light at a port is above. Never a clearance."""

from __future__ import annotations

from collections.abc import Iterator

from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.laser_safety.limits import covered, exceeded, limit
from fastaxis.inspect.laser_safety.ports import PortLight, lit_ports
from fastaxis.inspect.laser_safety.table import source_named
from fastaxis.inspect.words import length, watts

__all__ = ["DEFERS", "laser_cautions"]

DEFERS = (
    "the current edition of IEC 60825-1, your local rules and your laser safety officer have the last word; being "
    "below a limit does not mean safe"
)
OPEN = "end the beam on a dump, keep it below eye level and enclosed, wear the eyewear your site prescribes"
CLOSED = "keep the path enclosed and below eye level, and attenuate before you align by eye or card"


def laser_cautions(bench: Bench) -> Iterator[Finding]:
    """One caution for each port where light leaves the bench or meets a camera or detector."""
    for light in lit_ports(bench):
        yield Finding(
            severity=_severity(light),
            check="laser caution",
            element=light.port,
            rule=DEFERS,
            got=f"{_described(light)}; {_compared(light)}",
            fix=OPEN if light.leaves else CLOSED,
        )


def _described(light: PortLight) -> str:
    wide, narrow = light.diameters
    colours = ", ".join(length(wavelength) for wavelength in light.wavelengths)
    return (
        f"{light.port}: {watts(light.power)} at {colours} {'leaves the bench' if light.leaves else 'arrives'}, "
        f"beam diameter {length(wide)} (1/e²), {length(narrow)} (1/e)"
    )


def _worst(light: PortLight) -> tuple[str, float] | None:
    """The highest class whose limit is exceeded by all the power at the wavelength most strictly limited."""
    found = [(name, w) for w in light.wavelengths if (name := exceeded(light.power, w)) is not None]
    return max(found, key=lambda pair: ("1", "2", "3R", "3B").index(pair[0]), default=None)


def _compared(light: PortLight) -> str:
    outside = [w for w in light.wavelengths if not covered(w)]
    if outside:
        return f"{length(outside[0])} is not covered here (400 to 1400 nm, continuous light): ask for its limits"
    worst = _worst(light)
    if worst is None:
        return "taken as one continuous beam it is above none of the limits listed here, which does not mean safe"
    name, wavelength = worst
    most = limit(name, wavelength)
    assert most is not None, "a class that is exceeded has a limit"
    above = ", so Class 4 at this port" if name == "3B" else ""
    return f"above the Class {name} limit of {watts(most)} ({source_named(name)}, continuous light){above}"


def _severity(light: PortLight) -> Severity:
    """Weight of a caution: of a beam that leaves, from what can hurt before one blinks."""
    if not all(map(covered, light.wavelengths)):
        return Severity.MEDIUM if light.leaves else Severity.LOW
    worst = _worst(light)
    name = worst[0] if worst else ""
    if light.leaves:
        return {"3R": Severity.HIGH, "3B": Severity.HIGH, "": Severity.NOTE}.get(name, Severity.MEDIUM)
    return {"3R": Severity.LOW, "3B": Severity.MEDIUM}.get(name, Severity.NOTE)
