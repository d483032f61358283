"""A bare metal mirror, from the optical constants of its metal."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi

from fastaxis.elements.base import Passages
from fastaxis.elements.folding import Folding, check_fold, reflection
from fastaxis.elements.surfaces import Surface, amplitude, incidence_angle, metal_index
from fastaxis.maths import Scalar

__all__ = ["MetalMirror"]


@dataclass(frozen=True, kw_only=True)
class MetalMirror(Folding):
    """A mirror that reflects rp and rs of a bare surface of index n + ik: J = diag(rp, rs), picture x -> -x.

    It is neither an ideal mirror nor a neutral one: at 45 deg Rp = Rs^2, and p gets another phase than s, 10 deg for
    aluminium and 23 deg for gold at 632.8 nm, so circular light leaves elliptical.

    Parameters
    ----------
    index : n + ik of the metal at the wavelength used; k > 0 absorbs (time runs as exp(-iwt)).
    incidence : angle between beam and normal [rad], 0 up to a right angle; 45 deg folds the beam square.
    fold : "horizontal" (the beam stays in the table plane) or "vertical".
    two_way : whether a second beam runs the same path against the first; ``train.loop`` sets it.

    Raises
    ------
    ParameterError : k below 0, or an incidence of a right angle or more.
    SymbolError : a letter for the index or the incidence.

    Notes
    -----
    Some constants at 632.8 nm: aluminium 1.448 + 7.537j (A. D. Rakic, Appl. Opt. 34, 4755 (1995)); silver
    0.0563 + 4.276j, gold 0.184 + 3.431j (P. B. Johnson and R. W. Christy, Phys. Rev. B 6, 4370 (1972)). Coated
    mirrors differ: give their Rp, Rs and phases to Mirror.

    Examples
    --------
    >>> gold = MetalMirror(index=0.184 + 3.431j)
    >>> law, = gold.passages(632.8e-9)["front", "front"].laws
    >>> round(law.along.power, 3), round(law.across.power, 3)
    (0.923, 0.961)
    """

    index: complex
    incidence: Scalar = pi / 4
    fold: str = "horizontal"
    two_way: bool = False

    def __post_init__(self) -> None:
        check_fold(self.label, self.fold)
        self._keep(
            index=metal_index(self.label, "index", self.index),
            incidence=incidence_angle(self.label, "incidence", self.incidence),
        )

    def forward(self, wavelength: Scalar) -> Passages:
        surface = Surface(behind=self.index, incidence=self.incidence)
        return {("front", "front"): reflection(self.fold, amplitude(surface.rp), amplitude(surface.rs))}
