"""Ends of a beam without pixels: the detector and the dump."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis.elements.base import Element

__all__ = ["BeamDump", "Detector"]


@dataclass(frozen=True, kw_only=True)
class Detector(Element):
    """Collects all light that reaches it: its frame is one number [W].

    Examples
    --------
    >>> Detector(name="bucket").shape
    (1, 1)
    """

    stem: ClassVar[str] = "detector"
    faces: ClassVar[tuple[str, ...]] = ("in",)
    entry: ClassVar[str | None] = "in"
    shape: ClassVar[tuple[int, int]] = (1, 1)


@dataclass(frozen=True, kw_only=True)
class BeamDump(Element):
    """Ends a beam on purpose: its light is counted as dumped, not as leaving by an open port.

    Examples
    --------
    >>> BeamDump().faces
    ('in',)
    """

    stem: ClassVar[str] = "dump"
    faces: ClassVar[tuple[str, ...]] = ("in",)
    entry: ClassVar[str | None] = "in"
