"""A window: a little light lost at each face, and ghosts."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from fastaxis import checks
from fastaxis.elements.base import ThroughElement
from fastaxis.elements.surfaces import glass_index, quarter_wave_reflectance
from fastaxis.errors import FastaxisWarning, ParameterError, SymbolError
from fastaxis.laws import Amplitude, ScalarLaw
from fastaxis.maths import Scalar, free_symbols, is_symbolic

__all__ = ["Window"]

LARGEST_WEDGE = 0.1  # [rad]; thin prisms beyond it also turn the polarization and stretch the beam


@dataclass(frozen=True, kw_only=True)
class Window(ThroughElement):
    """A flat window at normal incidence, bare or with a quarter-wave layer on both faces; each reflects R.

    A parallel window passes (1 - R)/(1 + R): the light that went to and fro inside leaves along the beam and is counted
    with it, as its mean over the fringes. With a wedge the ghosts leave by other ways: the beam keeps (1 - R)^2
    and is turned by (index - 1) wedge.

    Parameters
    ----------
    index : of the glass, 1 or more.
    wedge : angle between the faces [rad], at most 0.1; the thick side is at +x, and the beam turns towards it.
    layer : index of a quarter-wave layer on both faces; None for bare glass.
    design : vacuum wavelength [m] at which the layer is a quarter wave; None for the wavelength used.

    Raises
    ------
    ParameterError : an index below 1, a wedge beyond 0.1 rad.
    SymbolError : a letter for an index.

    Notes
    -----
    In coherent light a parallel window's power swings by 2R about the mean with its temperature; that is not
    followed, nor is the reflected light: PickOff has a port for it. H. A. Macleod, Thin-Film Optical Filters, 4th ed.
    (2010), ch. 3.

    Examples
    --------
    >>> round(Window(index=1.515089).laws(632.8e-9)[0].transmission.power, 6)
    0.919491
    """

    index: float
    wedge: Scalar = 0.0
    layer: float | None = None
    design: Scalar | None = None

    stem: ClassVar[str] = "window"

    def __post_init__(self) -> None:
        self._keep(index=glass_index(self.label, "index", self.index))
        if self.layer is not None:
            self._keep(layer=glass_index(self.label, "layer", self.layer))
        if self.design is not None:
            self._keep(design=checks.wavelength(self.label, "design", self.design))
        wedge = checks.number(self.label, "wedge", self.wedge, fix="wedge=0.5*deg")
        if not is_symbolic(wedge) and abs(wedge) > LARGEST_WEDGE:
            raise ParameterError(
                f"the faces of a window make an angle of at most {LARGEST_WEDGE} rad",
                got=f"{self.label}: wedge = {wedge:g}",
                fix="wedge=0.5*deg",
            )
        self._keep(wedge=wedge)

    def reflectance(self, wavelength: Scalar) -> float:
        """Share of the power that one face reflects."""
        if self.layer is None:
            return quarter_wave_reflectance(self.index, self.index)
        detuning = 1.0 if self.design is None else self.design / wavelength
        if free_symbols([detuning]):
            raise SymbolError(
                "what a layer reflects is worked out in numbers: its design and the wavelength can't be letters",
                got=f"{self.label}: design/wavelength = {detuning}",
                fix="design=None",
            )
        return quarter_wave_reflectance(self.index, self.layer, float(detuning))

    @property
    def ghosts(self) -> tuple[tuple[str, float, str], ...]:
        """(which, share of the beam's power, where it goes) of the light reflected twice inside, at the design."""
        R = self.reflectance(1.0 if self.design is None else self.design)
        if self.wedge == 0:
            return (("first", R**2, "of the beam, along it and counted with it"),)
        return (("first", R**2, "of the beam, turned further by 2 index wedge: not followed"),)

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        return super().cautions(wavelength) + checks.near_design(self.label, self.design, wavelength)

    def laws(self, wavelength: Scalar) -> tuple[ScalarLaw, ...]:
        R = self.reflectance(wavelength)
        if self.wedge == 0:
            return (ScalarLaw(Amplitude((1 - R) / (1 + R))),)
        return (ScalarLaw(Amplitude((1 - R) ** 2), tilt=((self.index - 1) * self.wedge, 0.0)),)
