"""The one place where a room calls a room to its right, by name and on first use.

A train offers ``expose`` and ``derive`` though cameras and engines are built on top of trains, and an element
prints its card though cards are a report. Those calls go through :func:`late`, which also keeps sympy,
networkx and matplotlib out of a plain ``import fastaxis``.
"""

from importlib import import_module
from typing import Any

__all__ = ["late"]


def late(module: str, name: str) -> Any:
    """The object ``name`` of ``fastaxis.<module>``, imported when first asked for."""
    return getattr(import_module(f"fastaxis.{module}"), name)
