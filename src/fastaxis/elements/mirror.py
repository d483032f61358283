"""The mirror, folding in the table plane or out of it."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi

from fastaxis import checks
from fastaxis.elements.base import Passages
from fastaxis.elements.folding import Folding, check_fold, reflection
from fastaxis.laws import Amplitude
from fastaxis.maths import Scalar

__all__ = ["Mirror"]


@dataclass(frozen=True, kw_only=True)
class Mirror(Folding):
    """A flat mirror: J = diag(1, -1) in the frame that follows the beam, and the picture is flipped x -> -x.

    So H and V stay, +45 deg becomes -45 deg, R becomes L, charge l becomes -l; a second reflection restores all of it.
    With the p component along x (horizontal fold) J = diag(sqrt(Rp) exp(i phase_p), -sqrt(Rs) exp(i phase_s)). For a
    vertical fold p is along y: J = diag(-sqrt(Rs) exp(i phase_s), sqrt(Rp) exp(i phase_p)), and the picture is flipped
    y -> -y. At normal incidence both describe the same reflected field, in frames half a turn apart.

    Parameters
    ----------
    fold : "horizontal" (the beam stays in the table plane; also for a straight return) or "vertical".
    Rp, Rs : shares of the power reflected, in and across the plane of incidence [0 .. 1].
    phase_p, phase_s : phases [rad] on top of the ideal mirror's.
    two_way : whether a second beam runs the same path against the first; ``train.loop`` sets it.

    Raises
    ------
    ParameterError : a reflectance beyond 0 .. 1; another word for the fold; a bare angle in degrees.

    Notes
    -----
    The sign of the p component is that of a perfect mirror met at normal incidence, where Rp = Rs and
    phase_p = phase_s. E. Hecht, Optics, 4th ed. (2002), section 4.6.

    Examples
    --------
    >>> from fastaxis.maths import NUMBERS
    >>> law, = Mirror().passages(532e-9)["front", "front"].laws
    >>> [[int(entry.real) for entry in row] for row in law.linear(NUMBERS)]
    [[1, 0], [0, -1]]
    """

    fold: str = "horizontal"
    Rp: Scalar = 1.0
    Rs: Scalar = 1.0
    phase_p: Scalar = 0.0
    phase_s: Scalar = 0.0
    two_way: bool = False

    def __post_init__(self) -> None:
        check_fold(self.label, self.fold)
        for share in ("Rp", "Rs"):
            self._keep(**{share: checks.fraction(self.label, share, getattr(self, share), fix=f"{share}=0.98")})
        for phase in ("phase_p", "phase_s"):
            self._keep(**{phase: checks.angle(self.label, phase, getattr(self, phase))})

    def forward(self, wavelength: Scalar) -> Passages:
        p, s = Amplitude(self.Rp, self.phase_p), Amplitude(self.Rs, self.phase_s + pi)
        return {("front", "front"): reflection(self.fold, p, s)}
