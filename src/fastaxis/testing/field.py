"""A field against an expected one, up to a common phase."""

from __future__ import annotations

from typing import Any

import numpy as np

from fastaxis.errors import ParameterError
from fastaxis.testing.asked import positive
from fastaxis.testing.failing import Claim, hold

__all__ = ["field_equal"]


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
    columns, rows = np.asarray(x, float), np.asarray(y, float)
    wanted = _field(expected, port, columns, rows) if hasattr(expected, "elements") else np.asarray(expected, complex)
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


def _field(train: Any, port: str, x: Any, y: Any) -> Any:
    parts = train.field(port)
    if len(parts) != 1:
        raise ParameterError(
            "one field is compared with one field",
            got=f"field_equal: {len(parts)} parts that do not interfere at {port}",
            fix=f'frame_matches(train, "{port}", frame, behind=fa.H)',
        )
    return parts[0].at(x, y)
