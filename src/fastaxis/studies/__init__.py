"""Studies: one bench at many values of its parameters."""

from fastaxis.studies.sweep import Sweep, sweep

__all__ = ["Sweep", "sweep"]
