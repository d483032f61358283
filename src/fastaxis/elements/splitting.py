"""What all splitters share: four faces, four ways forward, and ports that never give more than they got."""

from __future__ import annotations

from cmath import exp
from dataclasses import dataclass
from math import pi, sqrt
from typing import ClassVar

from fastaxis.elements.base import Element, Passages
from fastaxis.errors import ParameterError
from fastaxis.laws import Amplitude, AxisLaw, Passage
from fastaxis.maths import Scalar, is_symbolic

__all__ = ["Splitter", "check_port_sum", "largest_port_sum"]

# A port sum may exceed 1 by the roundings of two square roots, two phasors and a sum.
PORT_SUM_ROUNDING = 1e-14


def largest_port_sum(T: float, R: float, phase_t: float, phase_r: float) -> float:
    """Largest ratio of output to input power of a symmetric two-port splitter, over all inputs at its two faces.

    The larger eigenvalue of S* S with S = [[t, r], [r, t]]: T + R + 2 |Re(t* r)|.
    """
    t, r = sqrt(T) * exp(1j * phase_t), sqrt(R) * exp(1j * phase_r)
    return T + R + 2 * abs((t.conjugate() * r).real)


def check_port_sum(part: str, given: dict[str, Scalar]) -> None:
    """Refuse a pair of powers and phases with which the two outputs could carry more than the two inputs.

    ``given`` names and values in the order transmitted power, reflected power, transmitted phase, reflected phase.
    """
    if any(is_symbolic(value) for value in given.values()):
        return
    (transmitted, reflected, phase_t, phase_r), (T, R, lag_t, lag_r) = given.keys(), given.values()
    powers = f"{part}: {transmitted} = {T:g}, {reflected} = {R:g}"
    if T + R > 1 + PORT_SUM_ROUNDING:
        raise ParameterError(
            f"a splitter has no gain: {transmitted} + {reflected} is at most 1 and here the port sum is {T + R:.4g}",
            got=powers,
            fix=f"{transmitted}={T:g}, {reflected}={max(0.0, round(1 - T, 12)):g}",
        )
    port_sum = largest_port_sum(T, R, lag_t, lag_r)
    if port_sum > 1 + PORT_SUM_ROUNDING:
        raise ParameterError(
            "light at both faces would leave with more power than it brought: r t* + t r* = 0 needs the two phases a "
            f"quarter wave apart, and here the port sum reaches {port_sum:.4g}",
            got=f"{powers}, {phase_t} = {lag_t:g}, {phase_r} = {lag_r:g}",
            fix=f"{phase_t}={lag_t:g}, {phase_r}={lag_t:g} + 90*deg",
        )


@dataclass(frozen=True, kw_only=True)
class Splitter(Element):
    """Base of the splitters: front and side go in, transmitted and reflected come out; all four work both ways."""

    stem: ClassVar[str] = "splitter"
    faces: ClassVar[tuple[str, ...]] = ("front", "transmitted", "reflected", "side")
    entry: ClassVar[str | None] = "front"
    exit: ClassVar[str | None] = "transmitted"

    def _ways(self, through: tuple[Amplitude, Amplitude], back: tuple[Amplitude, Amplitude]) -> Passages:
        """The ways forward from the amplitudes (p, s) of both; p lies along x."""
        (tp, ts), (rp, rs) = through, back
        passed = Passage((AxisLaw(tp, ts),))
        # The mirror's frame rule diag(1, -1) puts half a wave on s.
        turned = Passage((AxisLaw(rp, Amplitude(rs.power, rs.phase + pi)),), "x")
        return {
            ("front", "transmitted"): passed,
            ("front", "reflected"): turned,
            ("side", "reflected"): passed,
            ("side", "transmitted"): turned,
        }
