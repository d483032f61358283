"""Checks of a bench before it is built, laser cautions, and the sheet of what to dial on each mount."""

from fastaxis.inspect.finding import Finding, Severity
from fastaxis.inspect.inspecting import inspect_train
from fastaxis.inspect.inspection import Inspection
from fastaxis.inspect.mount import Mount
from fastaxis.inspect.set_sheet import SetSheet, set_sheet

__all__ = ["Finding", "Inspection", "Mount", "SetSheet", "Severity", "inspect_train", "set_sheet"]
