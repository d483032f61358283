"""Which cameras and detectors of a train a command is about."""

from __future__ import annotations

from typing import Any

from fastaxis.errors import WiringError

__all__ = ["targets"]


def targets(train: Any, wanted: str | None) -> list[str]:
    """The camera asked for, or all cameras and detectors that light reaches.

    Raises
    ------
    WiringError : there is none.
    """
    if wanted is not None:
        return [wanted]
    lit = {port.partition(".")[0] for port in train.lit}
    # Cameras and detectors are the parts that record something of a given shape and let no light out.
    found = [n for n, part in train.elements.items() if n in lit and part.exit is None and hasattr(part, "shape")]
    if not found:
        train.validate()
        raise WiringError(
            "a prediction needs a camera or detector that light reaches",
            got=f"{train.name}: none among {', '.join(train.elements) or 'no parts'}",
            fix='train.along("lens", fa.Camera(pixel=3.45*um, shape=(512, 512), name="cam"))',
        )
    return found
