"""The phase modulator: an electro-optic or liquid-crystal element that shifts the phase of one polarization only."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.laws import Amplitude, AxisLaw
from fastaxis.light import State, linear
from fastaxis.maths import Pattern, Scalar

__all__ = ["PhaseModulator"]


@dataclass(frozen=True, kw_only=True)
class PhaseModulator(ThroughElement):
    """Multiplies the component along its axis by exp(i phase) and leaves the one across it alone.

    J = R(axis) diag(exp(i phase), 1) R(-axis). Light along the axis is shifted in phase and keeps its polarization;
    light at 45 degrees to it changes its polarization as behind a wave plate of retardance ``phase`` with its slow axis
    there, and crossed polarizers around it pass sin^2(phase/2).

    Parameters
    ----------
    axis : of the component that is shifted [rad], counter-clockwise from x facing the source.
    phase : [rad], positive for more optical path: a number, a function ``f(x, y)`` of arrays [m] in the part's own
        frame, or a (ny, nx) array of cells, rows along +y.
    pixel : side of a cell [m], for arrays.
    centre : (x, y) of the part's own origin [m].
    transmission : share of the power that passes [0 .. 1].
    expects : as of any part; light along the axis if left out. To modulate amplitude or polarization, declare
        ``expects=fa.linear(axis + 45*deg)``.

    Raises
    ------
    ParameterError : a bare angle in degrees; an array without ``pixel``; a function that does not work on arrays.

    Notes
    -----
    Thin part at normal incidence, no field along the beam, cells much larger than the wavelength. A. Yariv and P. Yeh,
    Photonics, 6th ed. (2007), chapter 9.

    Examples
    --------
    >>> from fastaxis.units import deg
    >>> cell = PhaseModulator(axis=0*deg, phase=180*deg)
    >>> cell.laws(532e-9)[0].along.number(), cell.expected.azimuth
    ((-1+0j), 0.0)
    """

    axis: Scalar
    phase: Any
    pixel: float | None = None
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)
    transmission: Scalar = 1.0

    stem: ClassVar[str] = "modulator"

    def __post_init__(self) -> None:
        phase = checks.pattern(self.label, "phase", self.phase, self.pixel, fix="phase=90*deg")
        self._keep(
            axis=checks.angle(self.label, "axis", self.axis),
            phase=checks.angle(self.label, "phase", phase, patterned=True),
            centre=checks.centre(self.label, self.centre),
            transmission=checks.fraction(self.label, "transmission", self.transmission, fix="transmission=0.9"),
        )

    @property
    def expected(self) -> State:
        return linear(self.axis) if self.expects is None else self.expects

    @property
    def uniform(self) -> bool:
        """Whether the phase is the same all over the part."""
        return not isinstance(self.phase, Pattern)

    def laws(self, wavelength: Scalar) -> tuple[AxisLaw, ...]:
        along, across = Amplitude(self.transmission, self.phase), Amplitude(self.transmission)
        return (AxisLaw(along, across, self.axis, centre=self.centre),)
