"""Accessible emission limits of IEC 60825-1:2014 (edition 3) for continuous light, as data.

Values from memory of the standard's tables, compared with the public tables of Directive 2006/25/EC and of ICNIRP,
Health Phys. 105, 271 (2013). They are for cautions only: the standard's current edition is what counts.
"""

from __future__ import annotations

from dataclasses import dataclass

__all__ = ["COVERED", "ROWS", "Row", "source_named"]

COVERED = (400e-9, 1400e-9)  # [m]


@dataclass(frozen=True)
class Row:
    """One limit: coefficient * (product of its factors), in watts, on a band of wavelengths.

    Parameters
    ----------
    laser_class : "1", "2", "3R" or "3B".
    band : from, up to [m]; the upper end belongs to the next row.
    watts : coefficient [W].
    factors : names of the correction factors it is multiplied by.
    clause : where in the standard it stands.
    remark : on how it is read.
    """

    laser_class: str
    band: tuple[float, float]
    watts: float
    factors: tuple[str, ...] = ()
    clause: str = ""
    remark: str = ""


ROWS = (
    Row("1", (400e-9, 700e-9), 3.9e-4, clause="table 3", remark="thermal, 10 s and longer"),
    Row("1", (400e-9, 600e-9), 3.9e-5, ("C3",), "table 3", "photochemical, 100 s and longer, within 11 mrad"),
    Row("1", (700e-9, 1400e-9), 3.9e-4, ("C4", "C7"), "table 3", "10 s and longer"),
    Row("2", (400e-9, 700e-9), 1e-3, ("C6",), "table 5", "0.25 s and longer"),
    Row("3R", (400e-9, 700e-9), 5e-3, ("C6",), "table 6"),
    Row("3R", (700e-9, 1400e-9), 2.0e-3, ("C4", "C7"), "table 6", "as tabulated, rounded"),
    Row("3R", (700e-9, 1400e-9), 5 * 3.9e-4, ("C4", "C7"), "table 6", "as five times the limit of Class 1"),
    Row("3B", (400e-9, 1400e-9), 0.5, clause="table 8", remark="0.25 s and longer"),
)
"""Where a class has several rows at one wavelength, the smallest counts: so each row can only add caution."""


def source_named(laser_class: str) -> str:
    """The standard and the table of a class.

    >>> source_named("3B")
    'IEC 60825-1:2014, table 8'
    """
    clause = next(row.clause for row in ROWS if row.laser_class == laser_class)
    return f"IEC 60825-1:2014, {clause}"
