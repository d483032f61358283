"""Whether all power that goes in comes out somewhere."""

from __future__ import annotations

from typing import Any

from fastaxis.errors import ParameterError
from fastaxis.testing.asked import at_least, positive
from fastaxis.testing.failing import BenchError
from fastaxis.testing.kinds import about_a_train
from fastaxis.testing.words import watts

__all__ = ["energy_closes"]


@about_a_train
def energy_closes(train: Any, *, absorbed: float = 0.0, within: float = 1e-6) -> None:
    """The power at all open ports and ends adds up to that of the lasers, less the share that parts absorb.

    Parameters
    ----------
    train : the bench.
    absorbed : share of the power that is meant to stay in polarizers, filters and stops.
    within : deviation that is still good, as a share of the power.

    Raises
    ------
    BenchError : power is missing, or there is too much.
    ParameterError : a share absorbed that is not between 0 and 1; a deviation that is not positive.
    """
    absorbed = at_least("energy_closes", "absorbed", absorbed, 0.0, fix="absorbed=0.25")
    within = positive("energy_closes", "within", within, fix="within=1e-6")
    if absorbed > 1:
        raise ParameterError(
            "what parts absorb is a share of the power, 0 to 1",
            got=f"energy_closes: absorbed = {absorbed:g}",
            fix="absorbed=0.25",
        )
    sent = float(sum(train.elements[name].power for name in train.sources))
    ends = [f"{name}.{part.entry}" for name, part in train.elements.items() if part.exit is None and part.entry]
    ports = [*train.open_ports(), *(port for port in ends if port in train.lit)]
    powers = {port: train.power(port) for port in ports}
    missing = 1 - sum(powers.values()) / sent - absorbed
    if not abs(missing) <= within:
        share = f"{abs(missing):.2g} of all too {'little' if missing > 0 else 'much'}"
        ledger = ", ".join(f"{port} {watts(power)}" for port, power in powers.items())
        raise BenchError(
            train.name,
            expected=f"{watts(sent * (1 - absorbed))} at all ports together",
            got=f"{watts(sum(powers.values()))}, {share}: {ledger}",
            cause=_cause(train, missing),
        )


def _cause(train: Any, missing: float) -> str:
    if missing < 0:
        return "a part with gain, or a larger share absorbed was meant"
    lossy = [
        name
        for name, part in train.elements.items()
        if type(part).__name__ in {"Polarizer", "PatternedPolarizer", "NeutralDensity", "Mask"}
        or getattr(part, "transmission", 1.0) != 1.0
        or getattr(part, "radius", None) is not None
    ]
    return f"absorbed or clipped by {' or '.join(lossy)}" if lossy else "a splitter or mirror that absorbs"
