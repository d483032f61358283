"""Spectral lines: how the light of a source loses its memory with path difference."""

from __future__ import annotations

from cmath import exp as phasor
from dataclasses import dataclass, field
from math import exp, log, pi, sqrt
from typing import Any

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["MONOCHROMATIC", "SPEED_OF_LIGHT", "Comb", "GaussianLine", "Line", "LorentzianLine", "Monochromatic"]

SPEED_OF_LIGHT = 299792458.0  # [m/s], exact by definition of the metre
NARROWEST = 1e-3  # [Hz]


@dataclass(frozen=True, kw_only=True)
class Line:
    """Base of the line shapes. Each is centred on the wavelength of the source.

    Notes
    -----
    The field after a path longer by ``d`` correlates with the field itself as ``degree(d) exp(i k d)``: the carrier is
    kept apart, so that ``degree`` is real and positive for a single symmetric line. J. W. Goodman, Statistical Optics
    (1985), section 5.1.
    """

    def degree(self, difference: float) -> complex:
        """Complex degree of coherence of two paths, without its carrier.

        Parameters
        ----------
        difference : of the optical path lengths [m].
        """
        raise NotImplementedError

    @property
    def sharp(self) -> bool:
        """Whether the light interferes fully whatever the path difference."""
        return False


@dataclass(frozen=True, kw_only=True)
class Monochromatic(Line):
    """One frequency: full coherence at any path difference.

    >>> Monochromatic().degree(1000.0)
    1.0
    """

    def degree(self, difference: float) -> complex:
        return 1.0

    @property
    def sharp(self) -> bool:
        return True


@dataclass(frozen=True, kw_only=True)
class _Width(Line):
    """A line given by its width or by its coherence length."""

    fwhm: Scalar | None = None
    coherence_length: Scalar | None = None

    def __post_init__(self) -> None:
        kind = type(self).__name__
        if (self.fwhm is None) == (self.coherence_length is None):
            raise ParameterError(
                "the width of a line is given once, as fwhm= [Hz] or as coherence_length= [m]",
                got=f"{kind}: {'both' if self.fwhm is not None else 'neither'} given",
                fix=f"fa.{kind}(coherence_length=200*mm)",
            )
        name = "fwhm" if self.fwhm is not None else "coherence_length"
        value = checks.number(kind, name, getattr(self, name), fix=f"fa.{kind}(coherence_length=200*mm)")
        if not value > 0:
            raise ParameterError(
                "a line has a width above zero; light of one frequency has none",
                got=f"{kind}: {name} = {value}",
                fix="line=fa.Monochromatic()",
            )
        if name == "fwhm":
            _refuse_length(f"{kind}: fwhm = {value:g}", "the width of a line", "fwhm", value)
        object.__setattr__(self, name, value)


def _refuse_length(got: str, what: str, parameter: str, value: Scalar) -> None:
    """No source has a line narrower than a millihertz: a difference of wavelengths was given."""
    if is_symbolic(value) or value >= NARROWEST:
        return
    raise ParameterError(
        f"{what} is a frequency in hertz: c/wavelength**2 times the difference of wavelengths",
        got=got,
        fix=f"{parameter}={SPEED_OF_LIGHT:.0f} * {value:g} / (532*nm)**2",
    )


@dataclass(frozen=True, kw_only=True)
class GaussianLine(_Width):
    """A Gaussian line: degree = exp(-(d/Lc)^2) = exp(-(pi fwhm d/c)^2 / (4 ln 2)).

    Parameters
    ----------
    fwhm : full width at half maximum of the power spectrum [Hz].
    coherence_length : Lc, the path difference [m] at which fringes have fallen to 1/e. Other definitions are in use;
        this one is 2 sqrt(ln 2) c/(pi fwhm) = 0.53 c/fwhm.

    Raises
    ------
    ParameterError : none or both given, or not above zero; a width given as a difference of wavelengths.

    Examples
    --------
    >>> from fastaxis.units import mm
    >>> round(GaussianLine(coherence_length=200*mm).degree(40*mm), 4)
    0.9608
    """

    @property
    def length(self) -> float:
        """Path difference [m] at which fringes have fallen to 1/e."""
        if self.fwhm is not None:
            return float(2 * sqrt(log(2)) * SPEED_OF_LIGHT / (pi * self.fwhm))
        return float(self.coherence_length)  # type: ignore[arg-type]  # one of the two is given

    def degree(self, difference: float) -> complex:
        return exp(-((difference / self.length) ** 2))


@dataclass(frozen=True, kw_only=True)
class LorentzianLine(_Width):
    """A Lorentzian line: degree = exp(-|d|/Lc) = exp(-pi fwhm |d|/c).

    Parameters
    ----------
    fwhm : full width at half maximum of the power spectrum [Hz].
    coherence_length : Lc, the path difference [m] at which fringes have fallen to 1/e; c/(pi fwhm).

    Raises
    ------
    ParameterError : none or both given, or not above zero; a width given as a difference of wavelengths.

    Examples
    --------
    >>> round(LorentzianLine(fwhm=1.5e9).degree(0.0299792458), 8)
    0.62422843
    """

    @property
    def length(self) -> float:
        """Path difference [m] at which fringes have fallen to 1/e."""
        if self.fwhm is not None:
            return float(SPEED_OF_LIGHT / (pi * self.fwhm))
        return float(self.coherence_length)  # type: ignore[arg-type]  # one of the two is given

    def degree(self, difference: float) -> complex:
        return exp(-abs(difference) / self.length)


@dataclass(frozen=True, kw_only=True)
class Comb(Line):
    """Equally spaced lines, such as the longitudinal modes of a laser, centred on its wavelength.

    degree = sum_n weight_n exp(2 pi i f_n d/c) times that of one tooth, f_n = (n - (N - 1)/2) spacing. It may be
    negative (fringes have changed places) or, for uneven weights, complex.

    Parameters
    ----------
    spacing : of neighbouring teeth [Hz].
    weights : share of the power in each, from the lowest frequency up; they add up to 1.
    tooth : the line of each; sharp if left out.

    Raises
    ------
    ParameterError : a spacing that is not above zero, or is a difference of wavelengths; weights that are negative or
        do not add up to 1.

    Examples
    --------
    Two equal modes of a tube of 300 mm beat: no fringes at 300 mm of path difference, full ones again at 600 mm.

    >>> pair = Comb(spacing=SPEED_OF_LIGHT/0.6, weights=(0.5, 0.5))
    >>> [round(abs(pair.degree(d)), 12) for d in (0.0, 0.3, 0.6)]
    [1.0, 0.0, 1.0]
    """

    spacing: Scalar
    weights: tuple[Scalar, ...]
    tooth: Line = field(default_factory=Monochromatic)

    def __post_init__(self) -> None:
        spacing = checks.number("Comb", "spacing", self.spacing, fix="spacing=500e6")
        weights = tuple(self.weights)
        if not spacing > 0:
            raise ParameterError(
                "the teeth of a comb stand apart", got=f"Comb: spacing = {spacing}", fix="spacing=500e6"
            )
        # Shares typed with a few digits, such as three times 0.3333, are a slip; roundings of sums are not.
        if not weights or min(weights) < 0 or abs(sum(weights) - 1) > 1e-9:
            raise ParameterError(
                "the weights of a comb are shares of the power and add up to 1",
                got=f"Comb: weights = {weights}",
                fix="weights=(0.25, 0.5, 0.25)",
            )
        _refuse_length(f"Comb: spacing = {spacing:g}", "the spacing of a comb", "spacing", spacing)
        object.__setattr__(self, "spacing", spacing)
        object.__setattr__(self, "weights", weights)

    def degree(self, difference: float) -> complex:
        middle = (len(self.weights) - 1) / 2
        turns = self.spacing * difference / SPEED_OF_LIGHT
        teeth = sum(w * phasor(2j * pi * (n - middle) * turns) for n, w in enumerate(self.weights))
        return complex(teeth * self.tooth.degree(difference))


MONOCHROMATIC: Any = Monochromatic()
