"""Laser cautions after IEC 60825-1: continuous light, 400 to 1400 nm; never a clearance."""

from fastaxis.inspect.laser_safety.cautions import DEFERS, laser_cautions
from fastaxis.inspect.laser_safety.limits import (
    CLASSES,
    correction,
    covered,
    exceeded,
    hazard_distance,
    limit,
    maximum_exposure,
    optical_density,
    readings,
)

__all__ = [
    "CLASSES",
    "DEFERS",
    "correction",
    "covered",
    "exceeded",
    "hazard_distance",
    "laser_cautions",
    "limit",
    "maximum_exposure",
    "optical_density",
    "readings",
]
