"""The limit of each laser class at a wavelength, and what follows from it."""

from __future__ import annotations

import math

from fastaxis.errors import ParameterError
from fastaxis.inspect.laser_safety.table import COVERED, ROWS
from fastaxis.inspect.words import length

__all__ = [
    "CLASSES",
    "correction",
    "covered",
    "exceeded",
    "hazard_distance",
    "limit",
    "maximum_exposure",
    "optical_density",
    "readings",
]  # fmt: skip

CLASSES = ("1", "2", "3R", "3B")


def covered(wavelength: float) -> bool:
    """Whether the table holds limits at a wavelength [m]: 400 to 1400 nm."""
    return COVERED[0] <= wavelength < COVERED[1]


def correction(factor: str, wavelength: float) -> float:
    """A correction factor at a wavelength [m].

    C3 = 10^(0.02 (nm - 450)) from 450 to 600 nm, 1 below; C4 = 10^(0.002 (nm - 700)) from 700 to 1050 nm, 1 below, 5
    above. C6 is 1 for a source seen under 1.5 mrad or less, as a laser beam is. C7 is 1 up to 1150 nm; beyond it is
    larger, and taken as 1 here, which can only lower the limit.

    >>> round(correction("C4", 850e-9), 8)
    1.99526231
    """
    nm = wavelength * 1e9
    if factor == "C3":
        return 10 ** (0.02 * (max(nm, 450.0) - 450))
    if factor == "C4":
        return 10 ** (0.002 * (max(nm, 700.0) - 700)) if nm < 1050 else 5.0
    return 1.0


def readings(laser_class: str, wavelength: float) -> tuple[float, ...]:
    """Every limit [W] the rows give for a class at a wavelength [m]; none where the class does not exist.

    Raises
    ------
    ParameterError : no such class; a wavelength outside 400 to 1400 nm.
    """
    if laser_class not in CLASSES:
        raise ParameterError(
            f"the classes with a limit are {', '.join(CLASSES)}",
            got=f"class {laser_class!r}",
            fix='limit("3R", 532*nm)',
        )
    if not covered(wavelength):
        raise ParameterError(
            "the table of limits covers 400 to 1400 nm",
            got=f"wavelength = {length(wavelength)}",
            fix="wavelength=532*nm",
        )
    return tuple(
        row.watts * math.prod(correction(factor, wavelength) for factor in row.factors)
        for row in ROWS
        if row.laser_class == laser_class and row.band[0] <= wavelength < row.band[1]
    )


def limit(laser_class: str, wavelength: float) -> float | None:
    """Accessible emission limit [W] of a class for continuous light, or None where the class does not exist.

    Parameters
    ----------
    laser_class : "1", "2", "3R" or "3B".
    wavelength : [m], 400 to 1400 nm.

    Notes
    -----
    IEC 60825-1:2014, tables 3, 5, 6 and 8, small source, no optical aids. For cautions: no clearance.

    Examples
    --------
    >>> limit("1", 532e-9), limit("2", 1064e-9)
    (0.00039, None)
    """
    return min(readings(laser_class, wavelength), default=None)


def exceeded(power: float, wavelength: float) -> str | None:
    """The highest class whose limit a power [W] is above; None when it is above none of them."""
    above = [name for name in CLASSES if (most := limit(name, wavelength)) is not None and power > most]
    return above[-1] if above else None


def maximum_exposure(duration: float) -> float:
    """Largest irradiance [W/m^2] at the eye for visible light (400 to 700 nm) of a duration [s].

    18 t^0.75 J/m^2 from 18 us to 10 s, 10 W/m^2 from there. ICNIRP, Health Phys. 105, 271 (2013), table 5.

    Raises
    ------
    ParameterError : a duration below 18 us.

    >>> round(maximum_exposure(0.25), 4)
    25.4558
    """
    if duration < 18e-6:
        raise ParameterError(
            "exposures below 18 us are not covered", got=f"duration = {duration:g}", fix="duration=0.25"
        )
    return 18 * duration**-0.25 if duration < 10 else 10.0


def hazard_distance(power: float, divergence: float, diameter: float, exposure: float) -> float:
    """Distance [m] at which a beam has thinned out to an irradiance: (sqrt(4 P/(pi E)) - a)/divergence.

    Parameters
    ----------
    power : [W].
    divergence : full angle [rad] and ``diameter`` at the port [m], both of the circle that holds 63 % of the power
        (1/e); values at 1/e^2 are larger by sqrt 2 and would give too short a distance.
    exposure : irradiance E [W/m^2].

    Notes
    -----
    IEC TR 60825-14, nominal ocular hazard distance. Air, no optical aids: no clearance.
    """
    return (math.sqrt(4 * power / (math.pi * exposure)) - diameter) / divergence


def optical_density(power: float, allowed: float) -> float:
    """Optical density that brings a power [W] down to another one: log10 of their ratio.

    >>> round(optical_density(50e-3, 1e-3), 6)
    1.69897
    """
    return math.log10(power / allowed)
