"""Closed forms: the laws of a train run on an exact ring, with the letters left as letters."""

from fastaxis.engines.symbolic.deriving import derive
from fastaxis.engines.symbolic.form import Form

__all__ = ["Form", "derive"]
