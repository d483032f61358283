"""The command line: ``fastaxis predict``, ``fastaxis derive`` and ``fastaxis explain`` on a bench file."""

from fastaxis.cli.main import main

__all__ = ["main"]
