"""Light about one axis: a few azimuthal harmonics in the circular basis, moved by the Collins integral.

Each harmonic f_l(r) exp(i l phi) lives on panels of Gauss-Legendre nodes, so hard rims cost no accuracy, nothing
wraps around, and the plane of the target may be as wide or as narrow as one likes.
"""

from fastaxis.engines.azimuthal.combining import combined, combined_on
from fastaxis.engines.azimuthal.overlapping import overlap
from fastaxis.engines.azimuthal.plane import AzimuthalField
from fastaxis.engines.azimuthal.resolving import Settings
from fastaxis.engines.azimuthal.running import run

__all__ = ["TOTALS_ADD", "AzimuthalField", "Settings", "combined", "combined_on", "overlap", "run"]

TOTALS_ADD = False
"""Light outside a cut is counted but not followed, so of a sum's total power that share is not known."""
