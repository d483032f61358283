"""Faults: which single mistake on the bench explains what is seen."""

from fastaxis.studies.fault.finding import find_fault
from fastaxis.studies.fault.ranked import FaultReport
from fastaxis.studies.fault.suspects import Suspect, suspects
from fastaxis.studies.fault.watching import Watch

__all__ = ["FaultReport", "Suspect", "Watch", "find_fault", "suspects"]
