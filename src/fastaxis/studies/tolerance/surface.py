"""How far a response surface is from the light itself."""

from __future__ import annotations

from dataclasses import dataclass

__all__ = ["Surface"]


@dataclass(frozen=True, kw_only=True)
class Surface:
    """What a figure of merit was read off in place of a propagation for each draw, and how far off that is.

    The light is a polynomial in the parameters that move more than polarization (places, distances, focal lengths, the
    source, the wavelength) and exact in all others. Draws that had no part in making it are propagated and read both
    ways.

    Parameters
    ----------
    parameters : that the polynomial is in.
    points : values of them that it goes through.
    propagations : that were made, for points and fresh draws together.
    fresh : draws it was compared at: twelve at random, and the four that are furthest off.
    error : root mean square of the difference at the random ones [unit of the merit].
    largest : largest difference at all of them.
    share : the error over the standard deviation of the merit.
    used : whether it was good enough; if not, every draw was propagated.
    """

    parameters: tuple[str, ...]
    points: int
    propagations: int
    fresh: int
    error: float
    largest: float
    share: float
    used: bool

    def __str__(self) -> str:
        beside = f"{100 * self.share:.2g} % of the spread" if self.share < 10 else "more than the spread"
        off = f"off by {self.error:.2g} ({beside}), at most {self.largest:.2g}, at {self.fresh} fresh draws"
        if not self.used:
            return f"every draw propagated: a response surface was {off}"
        made = f"{self.points} points, {self.propagations} propagations"
        return f"read off a response surface in {', '.join(self.parameters)} ({made}), {off}"
