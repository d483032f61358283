"""Rotation mounts: what their scale reads when a part stands at an angle."""

from __future__ import annotations

import math
from dataclasses import KW_ONLY, dataclass

from fastaxis import checks
from fastaxis.errors import ParameterError

__all__ = ["Mount"]

TURN = 2 * math.pi


@dataclass(frozen=True)
class Mount:
    """A rotation mount with a scale: bench angle = sense * (scale - zero).

    The bench angle is counter-clockwise facing the source, as all angles here. A scale that is read from the source
    side turns the other way as seen by the receiver, so there the sense counts the other way round.

    Parameters
    ----------
    zero : scale reading [rad] at which the axis of the part is along x.
    sense : +1 when the numbers of the scale grow as the part is turned counter-clockwise, seen by the one who reads
        it; -1 when they grow clockwise.
    seen_from : where the scale is read from, "receiver" (facing the source) or "source" (looking along the beam).

    Raises
    ------
    ParameterError : a sense other than 1 and -1; another side; a bare angle in degrees.

    Warns
    -----
    SlipWarning : a whole number of radians, which was probably meant in degrees.

    Examples
    --------
    >>> from fastaxis.units import deg
    >>> mount = Mount(12*deg, sense=-1)
    >>> round(mount.scale(22.5*deg) / deg, 6)
    349.5
    >>> round(Mount(12*deg, sense=-1, seen_from="source").scale(22.5*deg) / deg, 6)
    34.5
    """

    zero: float = 0.0
    _: KW_ONLY
    sense: int = 1
    seen_from: str = "receiver"

    def __post_init__(self) -> None:
        zero = checks.angle("mount", "zero", self.zero)
        checks.degrees_missed("mount", "zero", self.zero)
        object.__setattr__(self, "zero", zero)
        if self.sense not in (1, -1):
            raise ParameterError(
                "sense is +1 for a scale that grows counter-clockwise and -1 for one that grows clockwise",
                got=f"mount: sense = {self.sense}",
                fix="sense=-1",
            )
        if self.seen_from not in ("receiver", "source"):
            raise ParameterError(
                'a scale is read facing the source ("receiver") or looking along the beam ("source")',
                got=f"mount: seen_from = {self.seen_from!r}",
                fix='seen_from="source"',
            )

    @property
    def sense_at_receiver(self) -> int:
        """The sense as the receiver sees it."""
        return self.sense if self.seen_from == "receiver" else -self.sense

    def angle(self, scale: float) -> float:
        """Angle of the part on the bench [rad] at a scale reading [rad]."""
        return self.sense_at_receiver * (scale - self.zero)

    def scale(self, angle: float) -> float:
        """Scale reading [rad], 0 up to a turn, at which the part stands at an angle [rad]."""
        reading = (self.zero + self.sense_at_receiver * angle) % TURN
        # 1e-12 below a full turn is 0 with the roundings of degrees.
        return 0.0 if TURN - reading < 1e-12 else reading
