"""Which engine answers, and why."""

from __future__ import annotations

from fastaxis.errors import ParameterError
from fastaxis.laws import Flip, ScalarLaw, TravelLaw, Turn
from fastaxis.light import Source
from fastaxis.maths import Pattern
from fastaxis.plan.covariant import covariance_reason
from fastaxis.plan.steps import JonesStep, StepLaw, Steps

__all__ = ["ENGINES", "choose"]

ENGINES = ("uniform", "azimuthal", "grid")


def _keeps_power(law: StepLaw) -> bool:
    """Whether a law changes neither power nor polarization from place to place, wherever the light goes."""
    if isinstance(law, ScalarLaw):
        return law.stop is None and not isinstance(law.transmission.power, Pattern)
    return isinstance(law, JonesStep | TravelLaw | Flip | Turn)


def _keeps_plane_wave(law: StepLaw) -> bool:
    """Whether a plane wave along the axis stays one."""
    if isinstance(law, TravelLaw):
        return bool(law.a == 1 and law.c == 0)
    return isinstance(law, JonesStep | Flip | Turn)


def _uniform_reason(steps: Steps, source: Source, *, bucket: bool) -> str:
    """Why no transverse structure need be followed; empty if it must."""
    laws = [step.law for step in steps]
    modes = [term.mode for part in source.components for term in part.beam.terms]
    if all(mode.infinite for mode in modes):
        return "a plane wave through uniform parts stays one" if all(map(_keeps_plane_wave, laws)) else ""
    one_mode = all(len(part.beam.terms) == 1 for part in source.components)
    if bucket and one_mode and all(map(_keeps_power, laws)):
        return "all light is collected and nothing on the way depends on the place"
    return ""


def _automatic(uniform: str, shaped: str, *, sampled: bool) -> tuple[str, str]:
    if uniform:
        return "uniform", uniform
    if sampled:
        return "grid", "a grid was set by hand"
    if shaped:
        return "grid", shaped
    return "azimuthal", "beam and parts are round about the axis"


def choose(steps: Steps, source: Source, *, bucket: bool, asked: str, sampled: bool = False) -> tuple[str, str]:
    """(engine, reason).

    Parameters
    ----------
    steps, source : what the light goes through, and the light.
    bucket : whether only the total power and state at the target are asked for.
    asked : "auto", or an engine by name.
    sampled : whether a grid was set by hand.

    Raises
    ------
    ParameterError : no such engine, or one that cannot answer this.
    """
    reason = _uniform_reason(steps, source, bucket=bucket)
    shaped = covariance_reason(steps, source)
    if asked == "auto":
        return _automatic(reason, shaped, sampled=sampled)
    if asked not in ENGINES:
        raise ParameterError(f"the engines are {', '.join(ENGINES)}", got=f"engine = {asked!r}", fix='engine="auto"')
    if asked == "uniform" and not reason:
        raise ParameterError(
            "the uniform engine follows no transverse structure, and this question has some",
            got="engine = 'uniform'",
            fix='engine="grid"',
        )
    if asked == "azimuthal" and shaped:
        raise ParameterError(
            "the azimuthal engine wants beam and parts round about the axis",
            got=f"engine = 'azimuthal', but {shaped}",
            fix='engine="grid"',
        )
    return asked, "asked for"
