"""The polarizing beam splitter: four powers and four phases."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import Passages
from fastaxis.elements.splitting import Splitter, check_port_sum
from fastaxis.laws import Amplitude
from fastaxis.maths import Scalar

__all__ = ["PolarizingBeamSplitter"]


@dataclass(frozen=True, kw_only=True)
class PolarizingBeamSplitter(Splitter):
    """Transmits p (along x, in the table plane) and reflects s (along y, upright); real ones leak both ways.

    Transmitted diag(sqrt(Tp) e^(i phase_tp), sqrt(Ts) e^(i phase_ts)); reflected diag(sqrt(Rp) e^(i phase_rp),
    -sqrt(Rs) e^(i phase_rs)) with x -> -x. Faces as those of the plain beam splitter: front, transmitted, reflected,
    side.

    Parameters
    ----------
    Tp, Ts : shares of the p and s power transmitted [0 .. 1].
    Rp, Rs : shares reflected; left out, nothing is absorbed: Rp = 1 - Tp, Rs = 1 - Ts.
    phase_tp, phase_ts, phase_rp, phase_rs : phases [rad], the same from both faces; reflections lag by a quarter wave.

    Raises
    ------
    ParameterError : Tp + Rp or Ts + Rs above 1, or phases for which the outputs could carry more than the inputs.

    Notes
    -----
    Tp = 0.97 leaves 3 % of p in the reflected port: only about 33:1 there. V. Degiorgio, Am. J. Phys. 48, 81 (1980).

    Examples
    --------
    >>> cube = PolarizingBeamSplitter(Tp=0.97, Ts=0.001)
    >>> round(cube.reflected_s / cube.reflected_p, 1)
    33.3
    """

    Tp: Scalar = 1.0
    Ts: Scalar = 0.0
    Rp: Scalar | None = None
    Rs: Scalar | None = None
    phase_tp: Scalar = 0.0
    phase_ts: Scalar = 0.0
    phase_rp: Scalar = pi / 2
    phase_rs: Scalar = pi / 2

    stem: ClassVar[str] = "pbs"

    def __post_init__(self) -> None:
        for share in ("Tp", "Ts", "Rp", "Rs"):
            if (given := getattr(self, share)) is not None:
                self._keep(**{share: checks.fraction(self.label, share, given, fix=f"{share}=0.5")})
        for phase in ("phase_tp", "phase_ts", "phase_rp", "phase_rs"):
            self._keep(**{phase: checks.angle(self.label, phase, getattr(self, phase))})
        p = {"Tp": self.Tp, "Rp": self.reflected_p, "phase_tp": self.phase_tp, "phase_rp": self.phase_rp}
        s = {"Ts": self.Ts, "Rs": self.reflected_s, "phase_ts": self.phase_ts, "phase_rs": self.phase_rs}
        check_port_sum(self.label, p)
        check_port_sum(self.label, s)

    @property
    def reflected_p(self) -> Scalar:
        """Share of the p power reflected, given or left over."""
        return 1 - self.Tp if self.Rp is None else self.Rp

    @property
    def reflected_s(self) -> Scalar:
        """Share of the s power reflected, given or left over."""
        return 1 - self.Ts if self.Rs is None else self.Rs

    def forward(self, wavelength: Scalar) -> Passages:
        through = Amplitude(self.Tp, self.phase_tp), Amplitude(self.Ts, self.phase_ts)
        back = Amplitude(self.reflected_p, self.phase_rp), Amplitude(self.reflected_s, self.phase_rs)
        return self._ways(through, back)
