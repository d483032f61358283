"""The thin wedge, which turns the whole beam a little."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.errors import ParameterError
from fastaxis.laws import ScalarLaw
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["Wedge"]

LARGEST_TILT = 0.3  # [rad]; beyond it sin and tan differ by more than 10 %


@dataclass(frozen=True, kw_only=True)
class Wedge(ThroughElement):
    """Turns the beam by small angles: the field is multiplied by exp(i k (x X + y Y)).

    Parameters
    ----------
    x, y : angles by which the beam is turned towards +x and +y [rad], at most 0.3.

    Raises
    ------
    ParameterError : an angle beyond 0.3 rad.

    Notes
    -----
    Also stands for a small misalignment of a mirror or splitter (which turns the beam by twice the mirror's tilt).

    Examples
    --------
    >>> from fastaxis.units import mrad
    >>> Wedge(x=2.0*mrad).laws(532e-9)[0].tilt
    (0.002, 0.0)
    """

    x: Scalar = 0.0
    y: Scalar = 0.0

    stem: ClassVar[str] = "wedge"

    def __post_init__(self) -> None:
        for axis in ("x", "y"):
            tilt = checks.number(self.label, axis, getattr(self, axis), fix=f"{axis}=2*mrad")
            if not is_symbolic(tilt) and abs(tilt) > LARGEST_TILT:
                raise ParameterError(
                    f"a thin wedge turns the beam by at most {LARGEST_TILT} rad",
                    got=f"{self.label}: {axis} = {tilt:g}",
                    fix=f"{axis}={0.1 if abs(tilt) > 100 else tilt:g}*mrad",
                )
            self._keep(**{axis: tilt})

    def laws(self, wavelength: Scalar) -> tuple[ScalarLaw, ...]:
        return (ScalarLaw(tilt=(self.x, self.y)),)
