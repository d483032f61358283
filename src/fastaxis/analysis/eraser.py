"""What restores fringes that a factor of zero has taken away."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.analysis.meeting import ZERO, Overlap

__all__ = ["advice"]

Reals = NDArray[np.float64]
ANGLES = np.arange(720) * (math.pi / 720)  # quarter degrees: nearer than any mount is set


def advice(
    factors: tuple[float, float, float, float], seen: Overlap, stokes: tuple[Reals, Reals], *, mixed: bool
) -> str:
    """The sentence that belongs to a factor of zero; "" where none is.

    Parameters
    ----------
    factors : coherence, balance, polarization, spatial.
    seen : both paths together.
    stokes : S0 .. S3 of each [W].
    mixed : whether the light has parts that do not interfere with each other.
    """
    coherence, balance, polarization, spatial = factors
    if balance == 0:
        return "one of the arms is dark: no fringes"
    if coherence == 0:
        return _forgotten(seen)
    if polarization == 0:
        found = _best_analyzer(seen, stokes) if mixed else _eraser(*stokes)
        return f"arms orthogonally polarized: no fringes; {found}"
    if spatial == 0:
        return "the beams miss each other, or their fringes average out: no fringes; a camera shows which"
    return ""


def _forgotten(seen: Overlap) -> str:
    if seen.whole is not None and seen.whole.best > ZERO * seen.amplitudes:
        return "the path difference is beyond the coherence of the light: no fringes; make the arms equally long"
    return (
        "each arm has a part of the light of its own, and these do not interfere: no fringes; "
        "a polarizer at 45 deg where the light divides restores them if it divides by polarization"
    )


def _best_analyzer(seen: Overlap, stokes: tuple[Reals, Reals]) -> str:
    """The linear analyzer with the deepest fringes, of light that is a mixture."""
    powers = sum(_behind(part, ANGLES) for part in stokes)
    across = np.array([np.cos(ANGLES), np.sin(ANGLES)])
    depth = 2 * abs(np.einsum("an,ab,bn->n", across, seen.matrix, across)) / np.maximum(powers, ZERO * powers.max())
    best = int(np.argmax(np.round(depth, 6)))
    if depth[best] < ZERO:
        return "no linear analyzer restores them"
    return f"an analyzer at {math.degrees(ANGLES[best]):.4g} deg restores {depth[best]:.2f}"


def _eraser(one: Reals, other: Reals) -> str:
    """The linear analyzer behind which both arms have equal power, so that fringes are whole again.

    Power behind an analyzer at angle t is (S0 + S1 cos 2t + S2 sin 2t)/2; it is equal for both arms where
    v cos(2t - u) = c with the difference (c, v cos u, v sin u) of their Stokes parameters.
    """
    apart = one - other
    length = math.hypot(apart[1], apart[2])
    size = one[0] + other[0]
    if length < ZERO * size:
        if abs(apart[0]) < ZERO * size:
            return "any linear analyzer restores 1.00"
        return "a linear analyzer leaves them as unequal as they are; balance the arms"
    if abs(apart[0]) > length:
        return "no linear analyzer makes them equally bright; balance the arms"
    middle, half = math.atan2(apart[2], apart[1]) / 2, math.acos(-apart[0] / length) / 2
    angles = [(middle + sign * half) % math.pi for sign in (1, -1)]
    best = max(angles, key=lambda t: (round((_behind(one, t) + _behind(other, t)) / size, 9), -t))
    return f"an analyzer at {math.degrees(best):.4g} deg restores 1.00"


def _behind(stokes: Reals, angle: Any) -> Any:
    """Power [W] behind a linear analyzer."""
    return (stokes[0] + stokes[1] * np.cos(2 * angle) + stokes[2] * np.sin(2 * angle)) / 2
