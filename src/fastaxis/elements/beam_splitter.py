"""The beam splitter that treats both polarizations alike."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import Passages
from fastaxis.elements.splitting import Splitter, check_port_sum
from fastaxis.laws import Amplitude
from fastaxis.maths import Scalar

__all__ = ["BeamSplitter"]


@dataclass(frozen=True, kw_only=True)
class BeamSplitter(Splitter):
    """Splits by power: t = sqrt(T), r = i sqrt(R); the reflected beam also gets the mirror's diag(1, -1) and x -> -x.

    Faces: light at "front" leaves by "transmitted" (t) and "reflected" (r); light at "side" leaves by "reflected" (t)
    and "transmitted" (r). All ways are open backwards too.

    Parameters
    ----------
    reflectance : R, share of the power reflected [0 .. 1].
    transmittance : T, share of the power transmitted [0 .. 1 - R]; left out, nothing is absorbed: T = 1 - R.
    phase_t, phase_r : phases [rad] of t and r, the same from both faces.

    Raises
    ------
    ParameterError : R + T above 1, or phases for which the two outputs could carry more than the two inputs.

    Notes
    -----
    V. Degiorgio, Am. J. Phys. 48, 81 (1980); A. Zeilinger, Am. J. Phys. 49, 882 (1981).

    Examples
    --------
    >>> BeamSplitter(reflectance=0.45).T
    0.55
    """

    reflectance: Scalar = 0.5
    transmittance: Scalar | None = None
    phase_t: Scalar = 0.0
    phase_r: Scalar = pi / 2

    stem: ClassVar[str] = "splitter"

    def __post_init__(self) -> None:
        self._keep(
            reflectance=checks.fraction(self.label, "reflectance", self.reflectance, fix="reflectance=0.5"),
            phase_t=checks.angle(self.label, "phase_t", self.phase_t),
            phase_r=checks.angle(self.label, "phase_r", self.phase_r),
        )
        if self.transmittance is not None:
            share = checks.fraction(self.label, "transmittance", self.transmittance, fix="transmittance=0.5")
            self._keep(transmittance=share)
        check_port_sum(
            self.label,
            {
                "transmittance": self.T,
                "reflectance": self.reflectance,
                "phase_t": self.phase_t,
                "phase_r": self.phase_r,
            },
        )

    @property
    def T(self) -> Scalar:
        """Share of the power transmitted, given or left over."""
        return 1 - self.reflectance if self.transmittance is None else self.transmittance

    def forward(self, wavelength: Scalar) -> Passages:
        t, r = Amplitude(self.T, self.phase_t), Amplitude(self.reflectance, self.phase_r)
        return self._ways((t, t), (r, r))
