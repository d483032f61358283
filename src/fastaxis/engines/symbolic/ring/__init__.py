"""The exact ring of amplitudes: sums of coefficient x phasor x product of real amplitudes, in one canonical form."""

from fastaxis.engines.symbolic.ring.maths import ExactMaths
from fastaxis.engines.symbolic.ring.poly import Poly
from fastaxis.engines.symbolic.ring.ring import Ring

__all__ = ["ExactMaths", "Poly", "Ring"]
