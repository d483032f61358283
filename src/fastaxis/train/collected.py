"""Power and polarization of all the light at a port, taken together."""

from __future__ import annotations

from collections.abc import Sequence
from math import hypot
from typing import Any

from fastaxis.errors import ParameterError
from fastaxis.light import State, StateMixture, from_stokes, partially_polarized

__all__ = ["state_of"]

# The Stokes powers are sums over a grid of up to 1e7 places, good to about 1e-12; a degree of polarization this
# close to 1 cannot be told from 1, and one beyond it is no state.
PURE = 1e-9


def state_of(parts: Sequence[Any], target: str) -> State | StateMixture:
    """The polarization a large detector would find, from fields that do not interfere.

    Raises
    ------
    ParameterError : no light arrives.
    """
    s0, s1, s2, s3 = (float(total) for total in sum(part.total_stokes for part in parts))
    if s0 <= 0:
        raise ParameterError("the dark has no polarization", got=f"{target}: {s0:g} W", fix=f'train.power("{target}")')
    degree = hypot(s1, s2, s3) / s0
    if degree < PURE:
        return partially_polarized(State(0.0), 0.0)
    state = from_stokes(s1 / s0 / degree, s2 / s0 / degree, s3 / s0 / degree)
    return state if degree > 1 - PURE else partially_polarized(state, degree)
