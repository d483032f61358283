"""Which cameras and detectors of a train a command is about."""

from __future__ import annotations

from typing import Any

from fastaxis.errors import WiringError

__all__ = ["sensors", "targets"]


def sensors(train: Any) -> list[str]:
    """Cameras and detectors that light reaches: parts that record something of a given shape and let no light out."""
    lit = {port.partition(".")[0] for port in train.lit}
    return [n for n, part in train.elements.items() if n in lit and part.exit is None and hasattr(part, "shape")]


def targets(train: Any, wanted: str | None) -> list[str]:
    """The camera asked for, or all that record something.

    Raises
    ------
    WiringError : there is none.
    """
    found = [wanted] if wanted is not None else sensors(train)
    if not found:
        train.validate()  # a bench without a laser, say, has a message of its own
        raise WiringError(
            "the question needs a camera or detector that light reaches",
            got=f"{train.name}: none among {', '.join(train.elements)}",
            fix=f'train.along("{_loose_end(train)}", fa.Camera(pixel=3.45*um, shape=(512, 512), name="cam"))',
        )
    return found


def _loose_end(train: Any) -> str:
    """A port that light leaves and nothing takes up; else the laser, after which a camera sees light in any case."""
    return str(next(iter([*train.open_ports(), *train.sources])))
