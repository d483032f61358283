"""A field against an expected one, up to a common phase."""

from __future__ import annotations

from typing import Any

import numpy as np

from fastaxis.errors import ParameterError
from fastaxis.testing.asked import positive
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train, an_array
from fastaxis.train import Train

__all__ = ["field_equal"]


@about_a_train
def field_equal(train: Any, port: str, expected: Any, *, x: Any, y: Any, within: float = 1e-3) -> None:
    """The field at a port equals an expected one, a phase common to all places being free.

    Parameters
    ----------
    train : the bench.
    port : camera, detector or port.
    expected : complex (2, ny, nx), (Ex, Ey) [sqrt(W)/m]; or another train, whose field at the port is meant.
    x, y : columns and rows [m].
    within : |field - expected| over |expected|, root mean square, that is still good.

    Raises
    ------
    BenchError : it is another field.
    ParameterError : the light has parts that do not interfere; the shapes differ; the expected field is dark or not
        of finite numbers; a deviation that is not positive.
    """
    within = positive("field_equal", "within", within, fix="within=1e-3")
    columns = an_array("field_equal", "x", x, float, fix="x=shots.x")
    rows = an_array("field_equal", "y", y, float, fix="y=shots.y")
    wanted = _wanted(expected, port, columns, rows)
    if wanted.shape != (2, rows.size, columns.size):
        raise ParameterError(
            "a field is (Ex, Ey) at all columns and rows",
            got=f"field_equal: {wanted.shape} for {rows.size} rows and {columns.size} columns",
            fix="np.stack([ex, ey])",
        )

    if not np.isfinite(wanted).all() or not wanted.any():
        raise ParameterError(
            "the expected field has light and finite numbers",
            got=f"field_equal: {'darkness' if np.isfinite(wanted).all() else 'numbers that are not finite'}",
            fix=f'port_dark(train, "{port}")',
        )

    def off(bench: Any) -> float:
        found = _field(bench, port, columns, rows)
        overlap = np.vdot(found, wanted)
        turn = overlap / abs(overlap) if overlap else 1.0
        return float(np.linalg.norm(turn * found - wanted) / np.linalg.norm(wanted))

    hold(
        train,
        Claim(
            port,
            f"the expected field within {within:g}, up to a common phase",
            lambda bench: f"a field that differs by {off(bench):.3g} of it",
            lambda bench: off(bench) / within,
            "train",
        ),
    )


def _wanted(expected: Any, port: str, x: Any, y: Any) -> Any:
    if isinstance(expected, Train):
        return _field(expected, port, x, y)
    return an_array("field_equal", "expected", expected, complex, fix="np.stack([ex, ey])")


def _field(train: Any, port: str, x: Any, y: Any) -> Any:
    parts = train.field(port)
    if len(parts) != 1:
        raise ParameterError(
            "one field is compared with one field",
            got=f"field_equal: {len(parts)} parts that do not interfere at {port}",
            fix=f'frame_matches(train, "{port}", frame, behind=fa.H)',
        )
    return parts[0].at(x, y)
