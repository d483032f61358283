"""The checks: each takes a surveyed bench and gives findings, and knows nothing of the others."""

from collections.abc import Callable, Iterator

from fastaxis.inspect.bench import Bench
from fastaxis.inspect.checks.aperture import aperture
from fastaxis.inspect.checks.arms import arms
from fastaxis.inspect.checks.centring import centring
from fastaxis.inspect.checks.conversion import conversion
from fastaxis.inspect.checks.dark import dark
from fastaxis.inspect.checks.expectations import expectations
from fastaxis.inspect.checks.extinction import extinction
from fastaxis.inspect.checks.fringes import fringes
from fastaxis.inspect.checks.gain import gain
from fastaxis.inspect.checks.idle import idle
from fastaxis.inspect.checks.isolators import isolators
from fastaxis.inspect.checks.mirrors import mirrors
from fastaxis.inspect.checks.open_ports import open_ports
from fastaxis.inspect.checks.paraxial import paraxial
from fastaxis.inspect.checks.parity import parity
from fastaxis.inspect.checks.patterns import patterns
from fastaxis.inspect.checks.planes import planes
from fastaxis.inspect.checks.plates import plates
from fastaxis.inspect.checks.polarizers import polarizers
from fastaxis.inspect.checks.relays import relays
from fastaxis.inspect.checks.sampling import sampling
from fastaxis.inspect.checks.saturation import saturation
from fastaxis.inspect.checks.sensor import sensor
from fastaxis.inspect.checks.slips import slips
from fastaxis.inspect.checks.temperatures import temperatures
from fastaxis.inspect.checks.windows import windows
from fastaxis.inspect.checks.wiring import wiring
from fastaxis.inspect.finding import Finding

__all__ = ["CHECKS", "wiring"]

CHECKS: tuple[Callable[[Bench], Iterator[Finding]], ...] = (
    open_ports, dark, gain, aperture, sensor, saturation, patterns, centring, paraxial,
    plates, temperatures, conversion, polarizers, isolators, expectations, mirrors, idle, extinction,
    parity, planes, relays, windows, fringes, arms, sampling, slips,
)  # fmt: skip
"""Run on every bench whose light can be followed; wiring comes before, as it decides whether it can."""
