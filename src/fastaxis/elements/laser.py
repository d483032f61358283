"""The laser: where light begins."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, ClassVar

from fastaxis import checks, light
from fastaxis.elements.base import Element
from fastaxis.errors import FastaxisWarning, ParameterError, SlipWarning
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["Laser"]

USUAL_POWER = 1.0  # [W]; 5 meant as milliwatts lies beyond
USUAL_WAIST = 0.1  # [m]
WAYS = ("waist", "mode", "beam", "incoherent")


@dataclass(frozen=True, kw_only=True)
class Laser(Element):
    """A beam of given power, shape and polarization, at its source plane.

    The shape is given in one of four ways: ``waist`` (a Gaussian), ``mode`` (any transverse mode), ``beam`` (a coherent
    sum of terms, each with its own mode and state) or ``incoherent`` (parts with no fixed phase between them).

    Parameters
    ----------
    power : total power [W].
    waist : radius w [m] at which the irradiance of a Gaussian is down to 1/e^2 (not a diameter).
    waist_at : distance from the source plane downstream to the waist [m]; with ``waist``.
    centre : (x, y) of the beam's axis [m]; with ``waist``.
    mode : a mode of ``fastaxis.light``.
    state : polarization of ``waist`` or ``mode``: a State, or a StateMixture such as UNPOLARIZED; H if left out.
    beam : a Beam of Terms.
    incoherent : sequence of (weight, Beam) or (weight, Beam, wavelength [m]); weights are shares of the power.
    line : shape of its spectral line, which sets how well paths of different length interfere: GaussianLine,
        LorentzianLine, Comb or Monochromatic (if left out).

    Raises
    ------
    ParameterError : none or several of the four ways; a power or waist that is not positive, or lacks its unit.

    Notes
    -----
    Where laser power leaves a port: keep the beam below eye level and enclosed, wear the eyewear your site prescribes,
    and follow your local rules and your laser safety officer, who has the last word.

    Examples
    --------
    >>> from fastaxis.units import mm, mW
    >>> laser = Laser(waist=0.80*mm, power=5*mW, state=light.D)
    >>> len(laser.source.components)
    1
    """

    power: Scalar = 1e-3
    waist: Scalar | None = None
    waist_at: Scalar = 0.0
    centre: tuple[Scalar, Scalar] = (0.0, 0.0)
    mode: light.Mode | None = None
    state: light.State | light.StateMixture | None = None
    beam: light.Beam | None = None
    incoherent: Sequence[Any] | None = None
    line: light.Line = light.MONOCHROMATIC

    stem: ClassVar[str] = "laser"
    faces: ClassVar[tuple[str, ...]] = ("out",)
    exit: ClassVar[str | None] = "out"

    def __post_init__(self) -> None:
        self._check_one_way()
        self._keep(
            power=checks.length(self.label, "power", self.power, fix="power=5*mW"),
            centre=checks.centre(self.label, self.centre),
            waist_at=checks.number(self.label, "waist_at", self.waist_at, fix="waist_at=200*mm"),
        )
        if self.waist is not None:
            self._keep(waist=light.modes.base.waist(self.label, "waist", self.waist))
        elif self.waist_at != 0 or self.centre != (0, 0):
            raise ParameterError(
                "waist_at and centre place the Gaussian of waist=; a mode has its own",
                got=f"{self.label}: waist_at = {self.waist_at}, centre = {self.centre}",
                fix="mode=fa.Gaussian(waist=0.8*mm, waist_at=200*mm)",
            )
        self._check_state()
        self._check_shape()

    def _check_one_way(self) -> None:
        given = [way for way in WAYS if getattr(self, way) is not None]
        if len(given) != 1:
            raise ParameterError(
                "the shape of a laser beam is given once, as waist=, mode=, beam= or incoherent=",
                got=f"{self.label}: {' and '.join(given) or 'none'} given",
                fix="waist=0.8*mm",
            )

    def _check_state(self) -> None:
        shaped = self.waist is not None or self.mode is not None
        if self.state is None:
            self._keep(state=light.H if shaped else None)
            return
        if not shaped:
            raise ParameterError(
                "the terms of a beam have their states already",
                got=f"{self.label}: state given beside {'beam' if self.beam else 'incoherent'}",
                fix="state=None",
            )
        if not isinstance(self.state, light.State | light.StateMixture):
            raise ParameterError(
                "state is a polarization state or a mixture of states",
                got=f"{self.label}: state = {self.state!r}",
                fix="state=fa.H",
            )

    def _check_shape(self) -> None:
        if self.mode is not None and not isinstance(self.mode, light.Mode):
            raise ParameterError(
                "mode is a transverse mode",
                got=f"{self.label}: mode = {self.mode!r}",
                fix="mode=fa.LaguerreGauss(0, 1, 0.8*mm)",
            )
        if self.beam is not None and not isinstance(self.beam, light.Beam):
            raise ParameterError(
                "beam is a Beam of Terms",
                got=f"{self.label}: beam = {self.beam!r}",
                fix="beam=fa.Beam((fa.Term(1, fa.Gaussian(0.8*mm), fa.H),))",
            )
        if self.incoherent is not None:
            self._keep(incoherent=tuple(self._part(part) for part in self.incoherent))
        if not isinstance(self.line, light.Line):
            raise ParameterError(
                "line is the shape of a spectral line",
                got=f"{self.label}: line = {self.line!r}",
                fix="line=fa.GaussianLine(coherence_length=200*mm)",
            )

    def _part(self, part: Any) -> tuple[Any, ...]:
        """One incoherent part as (weight, beam, wavelength or None)."""
        try:
            weight, beam, *rest = part
            good = isinstance(beam, light.Beam) and len(rest) < 2
        except (TypeError, ValueError):
            good = False
        if not good:
            raise ParameterError(
                "each incoherent part is (weight, Beam) or (weight, Beam, wavelength)",
                got=f"{self.label}: part {part!r}",
                fix="incoherent=[(1.0, fa.Beam((fa.Term(1.0, fa.Gaussian(0.8*mm), fa.H),)))]",
            )
        wavelength = rest[0] if rest else None
        if wavelength is not None:
            wavelength = checks.wavelength(self.label, "wavelength", wavelength)
        return checks.fraction(self.label, "weight", weight, fix="weight=0.5"), beam, wavelength

    @property
    def source(self) -> light.Source:
        """The light as mutually incoherent components, each a coherent beam."""
        if self.incoherent is not None:
            return light.Source(tuple(light.Component(*part) for part in self.incoherent), self.power)
        if self.beam is not None:
            return light.Source((light.Component(1.0, self.beam, None),), self.power)
        mode = self.mode or light.Gaussian(waist=self.waist, waist_at=self.waist_at, centre=self.centre)
        parts = self.state.parts if isinstance(self.state, light.StateMixture) else ((1.0, self.state),)
        components = tuple(
            light.Component(weight, light.Beam((light.Term(1, mode, pure),)), None)
            for weight, pure in parts
            if pure is not None
        )
        return light.Source(components, self.power)

    def changed(self, **changes: Any) -> Element:
        # A new shape takes the place of the old one, together with what only the old one could have.
        chosen = [way for way in WAYS if changes.get(way) is not None]
        if chosen:
            dropped: dict[str, Any] = dict.fromkeys(WAYS)
            if "waist" not in chosen:
                dropped |= {"waist_at": 0.0, "centre": (0.0, 0.0)}
            if not {"waist", "mode"} & set(chosen):
                dropped["state"] = None
            changes = dropped | changes
        return super().changed(**changes)

    @property
    def symbols(self) -> set[Any]:
        return self.source.symbols

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        found = (
            []
            if self.waist is None
            else checks.usual(self.label, "waist", self.waist, USUAL_WAIST, fix=f"waist={self.waist}*mm")
        )
        if not is_symbolic(self.power) and self.power > USUAL_POWER:
            found.append(
                SlipWarning(
                    f"power is in watts and above {USUAL_POWER:g} W its unit may be missing; if it is meant, follow "
                    "your local rules and your laser safety officer",
                    got=f"{self.label}: power = {self.power:g}",
                    fix=f"power={self.power:g}*mW",
                )
            )
        return found
