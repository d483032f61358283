"""Tolerances: how errors of parameters spread to powers, states and pictures."""

from fastaxis.studies.tolerance.causes import correlated, together
from fastaxis.studies.tolerance.distributions import normal, triangular, uniform, worst_case
from fastaxis.studies.tolerance.merits import (
    azimuth_error,
    ellipticity_error,
    extinction_ratio,
    frame_correlation,
    lobe_angle,
    measured,
    power_at,
    ring_radius,
    stokes_component,
)
from fastaxis.studies.tolerance.result import Contribution, Range, Tolerance
from fastaxis.studies.tolerance.study import tolerance
from fastaxis.studies.tolerance.surface import Surface
from fastaxis.studies.tolerance.yields import Yield, wilson

__all__ = [
    "Contribution", "Range", "Surface", "Tolerance", "Yield", "azimuth_error", "correlated", "ellipticity_error",
    "extinction_ratio", "frame_correlation", "lobe_angle", "measured", "normal", "power_at", "ring_radius",
    "stokes_component", "together", "tolerance", "triangular", "uniform", "wilson", "worst_case",
]  # fmt: skip
