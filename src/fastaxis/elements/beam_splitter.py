"""The beam splitter that treats both polarizations alike, or nearly so."""

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

    A real coating treats p and s a little differently: give what differs by its own name, Rp=0.47, phase_rs=95*deg.

    Faces: light at "front" leaves by "transmitted" (t) and "reflected" (r); light at "side" leaves by "reflected" (t)
    and "transmitted" (r). All ways are open backwards too.

    Parameters
    ----------
    reflectance : R, share of the power reflected [0 .. 1].
    transmittance : T, share of the power transmitted [0 .. 1 - R]; left out, nothing is absorbed: T = 1 - R.
    phase_t, phase_r : phases [rad] of t and r, the same from both faces.
    Tp, Ts, Rp, Rs : shares of p (along x) and of s (upright) of a real coating; those left out are T and R, and a
        share transmitted that nothing is said about is what the reflection leaves.
    phase_tp, phase_ts, phase_rp, phase_rs : their phases [rad]; left out, phase_t and phase_r.

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
    Tp: Scalar | None = None
    Ts: Scalar | None = None
    Rp: Scalar | None = None
    Rs: Scalar | None = None
    phase_tp: Scalar | None = None
    phase_ts: Scalar | None = None
    phase_rp: Scalar | None = None
    phase_rs: Scalar | None = None

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
        for share in ("Tp", "Ts", "Rp", "Rs"):
            if (given := getattr(self, share)) is not None:
                self._keep(**{share: checks.fraction(self.label, share, given, fix=f"{share}=0.5")})
        for phase in ("phase_tp", "phase_ts", "phase_rp", "phase_rs"):
            if (given := getattr(self, phase)) is not None:
                self._keep(**{phase: checks.angle(self.label, phase, given)})
        for component in "ps":
            check_port_sum(self.label, self._of(component))

    @property
    def T(self) -> Scalar:
        """Share of the power transmitted, given or left over."""
        return 1 - self.reflectance if self.transmittance is None else self.transmittance

    def _of(self, component: str) -> dict[str, Scalar]:
        """What holds for p or s, each under the name it was given by: powers and phases, transmitted, reflected."""
        reflected = self._said(f"R{component}", "reflectance")
        passed = self._said(f"T{component}", "transmittance")
        if None in passed.values():
            passed = {"transmittance": 1 - next(iter(reflected.values()))}
        phases = self._said(f"phase_t{component}", "phase_t") | self._said(f"phase_r{component}", "phase_r")
        return passed | reflected | phases

    def _said(self, own: str, common: str) -> dict[str, Scalar]:
        name = common if getattr(self, own) is None else own
        return {name: getattr(self, name)}

    def forward(self, wavelength: Scalar) -> Passages:
        amplitudes = []
        for component in "ps":
            passed, reflected, phase_t, phase_r = self._of(component).values()
            amplitudes.append((Amplitude(passed, phase_t), Amplitude(reflected, phase_r)))
        (tp, rp), (ts, rs) = amplitudes
        return self._ways((tp, ts), (rp, rs))
