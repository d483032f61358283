"""Ways to write one and the same form: compact, harmonics, series, exponential."""

from fastaxis.engines.symbolic.presentations.compact import compact
from fastaxis.engines.symbolic.presentations.exponential import exponential
from fastaxis.engines.symbolic.presentations.harmonics import harmonics
from fastaxis.engines.symbolic.presentations.series import series

__all__ = ["compact", "exponential", "harmonics", "series"]
