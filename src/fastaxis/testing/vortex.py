"""The charge of a vortex, by the turns of phase around a circle."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines import propagate
from fastaxis.errors import ParameterError
from fastaxis.light import State
from fastaxis.plan import make_plan
from fastaxis.testing.asked import a_place, positive, real, whole
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train

__all__ = ["charge"]

POINTS = 48  # on the circle: charges up to 24
DARK = 1e-12  # of the power on the circle; roundings of matrices leave 1e-32, of sums on a grid up to 1e-14


@about_a_train
def charge(
    train: Any,
    port: str,
    charge: int,  # the quantity
    *,
    behind: State,
    radius: float,
    share: float = 0.9,
    centre: tuple[float, float] = (0.0, 0.0),
) -> None:
    """On a circle, light behind an analyzer has the phase exp(i charge phi), for most of its power.

    Parameters
    ----------
    train : the bench.
    port : camera, detector or port.
    charge : turns of phase per counter-clockwise turn, facing the source.
    behind : state that is looked at: a vector beam has another charge in L than in R.
    radius, centre : of the circle [m].
    share : of the power on the circle that has this charge, at least.

    Raises
    ------
    BenchError : another charge prevails.
    ParameterError : a charge that is not whole, or beyond what the points on the circle tell; a radius that is not
        positive; a share that is not between 0 and 1.
    """
    charge = whole("charge", "charge", charge, fix="+1")
    if not abs(charge) < POINTS // 2:
        raise ParameterError(
            f"a charge is told up to {POINTS // 2 - 1}, either way", got=f"charge: charge = {charge}", fix="+1"
        )
    radius, centre = positive("charge", "radius", radius, fix="radius=0.5*mm"), a_place("charge", centre)
    across = np.conj(_state(behind).jones)

    def content(bench: Any) -> NDArray[np.float64]:
        circles = [_on_circle(one, radius, centre) for one in propagate(make_plan(bench, port))]
        found = np.asarray(sum(_content(np.tensordot(across, circle, axes=1)) for circle in circles))
        whole = sum(float(_content(circle).sum()) for circle in circles)
        return found if found.sum() > DARK * whole else np.zeros(POINTS)

    def misfit(bench: Any) -> float:
        powers = content(bench)
        whole = powers.sum()
        # 1 at the share that is asked for, less above it.
        return (1 - powers[charge] / whole) / (1 - share) if whole > 0 else math.inf

    def told(bench: Any) -> str:
        powers = content(bench)
        if not powers.sum() > 0:
            return "no light on the circle"
        most = int(np.argmax(powers))
        return f"charge {_signed(most):+d} with {100 * powers[most] / powers.sum():.3g} % of the power"

    _check(share)
    label = behind.label or "the analyzer"
    expected = f"charge {charge:+d} behind {label} with {100 * share:g} % of the power"
    hold(train, Claim(port, expected, told, misfit, "train"))


def _state(behind: object) -> State:
    if not isinstance(behind, State):
        raise ParameterError(
            "a charge is told behind a state", got=f"charge: behind = {behind!r:.60}", fix="behind=fa.R"
        )
    return behind


def _check(share: float) -> None:
    share = real("charge", "share", share, fix="share=0.9")
    if not 0 < share < 1:
        raise ParameterError("a share lies between 0 and 1", got=f"charge: share = {share!r}", fix="share=0.9")


def _signed(place: int) -> int:
    return place if place < POINTS // 2 else place - POINTS


def _on_circle(field: Any, radius: float, centre: tuple[float, float]) -> NDArray[np.complex128]:
    """(Ex, Ey) along the circle, shape (2, POINTS)."""
    phi = 2 * np.pi * np.arange(POINTS) / POINTS
    x, y = centre[0] + radius * np.cos(phi), centre[1] + radius * np.sin(phi)
    # Fields give crossings of columns and rows; the circle is their diagonal. Coordinates go in rising order.
    columns, rows = np.unique(x), np.unique(y)
    every = field.at(columns, rows)
    return np.asarray(every[:, np.searchsorted(rows, y), np.searchsorted(columns, x)])


def _content(amplitude: NDArray[np.complex128]) -> NDArray[np.float64]:
    """Power of each charge, place k for charge k and place -k for charge -k."""
    return np.asarray(np.abs(np.fft.fft(amplitude)) ** 2)
