"""The command line: ``fastaxis predict``, ``derive``, ``explain`` and ``inspect`` on a bench file."""

from fastaxis.cli.entry import main

__all__ = ["main"]
