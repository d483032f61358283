"""What a camera's sensor makes of light: electrons held, lost and counted."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.maths import is_symbolic

__all__ = ["Sensor"]

MOST_BITS = 32


@dataclass(frozen=True, kw_only=True)
class Sensor:
    """The data of a linear sensor, in the words of EMVA 1288; all pixels alike.

    A pixel collects quantum_efficiency photons and dark_current * time as electrons, holds full_well of them, and reads
    offset + gain * electrons, in whole counts from 0 to 2^bit_depth - 1.

    Parameters
    ----------
    full_well : electrons that a pixel holds (the saturation capacity).
    quantum_efficiency : electrons a photon on the pixel gives, at the wavelength in use (0 .. 1].
    read_noise : temporal noise in the dark [electrons, rms], zero or more.
    dark_current : [electrons/s], zero or more.
    bit_depth : of the counts, 1 to 32.
    offset : counts without light, zero or more.
    gain : counts per electron, the system gain K of the standard; chosen so that a full well reads full scale if left
        out.

    Raises
    ------
    ParameterError : a value out of its range; a letter.

    Notes
    -----
    EMVA Standard 1288, release 4.0 Linear (2021), section 2. Pixels that differ (PRNU, DSNU), light that spills over to
    the neighbours and non-linear response are left out.

    Examples
    --------
    >>> sensor = Sensor(full_well=10_500, quantum_efficiency=0.62, read_noise=2.4, bit_depth=12)
    >>> round(sensor.counts_per_electron, 4)
    0.39
    """

    full_well: float
    quantum_efficiency: float
    read_noise: float = 0.0
    dark_current: float = 0.0
    bit_depth: int = 12
    offset: float = 0.0
    gain: float | None = None

    def __post_init__(self) -> None:
        for name, value in _checked(self).items():
            object.__setattr__(self, name, value)
        if not 0 <= self.offset < self.largest_count:
            raise ParameterError(
                f"offset is a number of counts below full scale, {self.largest_count} here",
                got=f"Sensor: offset = {self.offset:g}",
                fix="offset=0",
            )

    @property
    def largest_count(self) -> int:
        """Full scale, 2^bit_depth - 1."""
        return int(2**self.bit_depth - 1)

    @property
    def counts_per_electron(self) -> float:
        """The gain, given or chosen."""
        return (self.largest_count - self.offset) / self.full_well if self.gain is None else self.gain

    @property
    def most_electrons(self) -> float:
        """Electrons at which a pixel is saturated: the well is full, or the counts are at full scale."""
        return min(self.full_well, (self.largest_count - self.offset) / self.counts_per_electron)

    def __str__(self) -> str:
        return (
            f"full well {self.full_well:g} e-, quantum efficiency {self.quantum_efficiency:g}, "
            f"read noise {self.read_noise:g} e-, {self.bit_depth} bit"
        )


def _checked(sensor: Sensor) -> dict[str, Any]:
    fixes = {
        "full_well": "full_well=10000",
        "quantum_efficiency": "quantum_efficiency=0.6",
        "read_noise": "read_noise=2.5",
        "dark_current": "dark_current=1.0",
        "offset": "offset=0",
    }
    values = {name: _number(name, getattr(sensor, name), fix) for name, fix in fixes.items()}
    values["bit_depth"] = checks.whole("Sensor", "bit_depth", sensor.bit_depth, least=1)
    if values["bit_depth"] > MOST_BITS:
        raise _refused("bit_depth is 1 to 32 bits", f"bit_depth = {values['bit_depth']}", "bit_depth=12")
    if sensor.gain is not None:
        values["gain"] = _number("gain", sensor.gain, "gain=0.4")
    for name in ("full_well", "gain"):
        if values.get(name, 1.0) <= 0:
            raise _refused(f"{name} is above zero", f"{name} = {values[name]:g}", fixes.get(name, "gain=0.4"))
    for name in ("read_noise", "dark_current"):
        if values[name] < 0:
            raise _refused(f"{name} is zero or more", f"{name} = {values[name]:g}", fixes[name])
    share = values["quantum_efficiency"]
    if not 0 < share <= 1:
        percent = 1 < share <= 100
        raise _refused(
            "quantum_efficiency is a share of the photons, above 0 and up to 1",
            f"quantum_efficiency = {share:g}",
            f"quantum_efficiency={share / 100:g}" if percent else fixes["quantum_efficiency"],
        )
    return values


def _number(name: str, value: Any, fix: str) -> float:
    if is_symbolic(value):
        raise _refused("what a sensor holds is given in numbers", f"{name} = {value}", fix)
    return float(checks.number("Sensor", name, value, fix=fix))


def _refused(rule: str, got: str, fix: str) -> ParameterError:
    return ParameterError(rule, got=f"Sensor: {got}", fix=fix)
