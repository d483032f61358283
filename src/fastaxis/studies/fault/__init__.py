"""Faults: which single mistake on the bench explains what is seen."""

from fastaxis.studies.fault.finding import FaultReport, Suspect, find_fault, suspects
from fastaxis.studies.fault.watching import Watch

__all__ = ["FaultReport", "Suspect", "Watch", "find_fault", "suspects"]
