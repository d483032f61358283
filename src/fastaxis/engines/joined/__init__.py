"""Coherent joining: fields that come by several paths add up, as far as their light still remembers itself."""

from fastaxis.engines.joined.joining import JoinedField, joined

__all__ = ["JoinedField", "joined"]
