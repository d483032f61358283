"""The tolerance study of a train: which knob matters, and how many benches come out good."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping
from concurrent.futures import Executor
from numbers import Integral
from pathlib import Path
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.checks import at_least
from fastaxis.errors import FileFormatError, ParameterError
from fastaxis.studies.tolerance.causes import EXAMPLE, Causes, caution_bare, read_causes
from fastaxis.studies.tolerance.checkpoint import Checkpoint, fingerprint
from fastaxis.studies.tolerance.drawing import batch_size, shares, work_off
from fastaxis.studies.tolerance.looking import Looked
from fastaxis.studies.tolerance.merits import Merit, PictureMerit, StokesMerit
from fastaxis.studies.tolerance.result import Contribution, Limits, Tolerance
from fastaxis.studies.tolerance.slopes import Answer

__all__ = ["tolerance"]

Reals: TypeAlias = NDArray[np.float64]


def tolerance(
    train: Any,
    errors: Mapping[Any, Any],
    figures_of_merit: Mapping[str, Merit],
    *,
    limits: Mapping[str, Limits] | None = None,
    draws: int = 10_000,
    seed: int = 0,
    executor: Executor | None = None,
    checkpoint: str | Path | None = None,
    progress: Callable[[int, int], None] | None = None,
    batch: int | None = None,
    accuracy: float = 0.02,
    grid: Any = None,
    engine: str = "auto",
) -> Tolerance:
    """Sensitivities, ranked contributions, worst case and a seeded Monte Carlo.

    Errors that move polarization laws only (axes, retardances, extinctions, rotations) cost a few propagations in all,
    whatever the number of draws, and are exact. In places, distances, focal lengths, the wavelength and the source, the
    light is made a polynomial through a few points, each a handful of propagations; its error is measured at draws
    that had no part in it and told in the report. Where it is above ``accuracy``, where draws are so few that points
    would not pay, and for a figure of merit that is a function of a train, every draw is propagated.

    Parameters
    ----------
    train : with numbers everywhere.
    errors : {"hwp.fast": normal(0.5*deg), ("a.axis", "b.axis"): together(uniform(0.1*deg)), ...}; a parameter
        named more than once gets the sum.
    figures_of_merit : name -> ``power_at(...)`` and the like, or any function of a train that gives a number.
    limits : name -> (lowest, highest) that is good; None for no limit.
    draws, seed : of the Monte Carlo.
    executor : any ``concurrent.futures.Executor``; in this thread if left out. A process pool needs a train and
        functions that can be pickled.
    checkpoint : path of an .npz file, written after each batch; a study that was stopped goes on from there, with the
        points of a polynomial propagated again.
    progress : called as progress(draws done, draws) after each batch.
    batch : draws in a batch.
    accuracy : root mean square error of a response surface that is good enough, as a share of the standard deviation
        of the figure of merit; 0 propagates every draw.
    grid, engine : as in ``train.expose``.

    Raises
    ------
    ParameterError : no errors or figures of merit, an unknown parameter, limits of something else or the wrong way
        round, no draws, a negative seed or accuracy; a function that gives something else than a number.
    FileFormatError : the checkpoint is that of another study.

    Warns
    -----
    SlipWarning : the error of an angle is a whole number of radians, which was probably meant in degrees.

    Examples
    --------
    >>> import fastaxis as fa
    >>> from fastaxis.studies.tolerance import normal, power_at
    >>> from fastaxis.units import deg, mm, mW, nm
    >>> train = fa.Train(wavelength=633*nm).along(fa.Laser(waist=1*mm, power=1*mW, state=fa.H, name="laser"),
    ...     fa.Polarizer(axis=45*deg, name="pol"))
    >>> found = train.tolerance({"pol.axis": normal(1*deg)}, {"power": power_at("pol")}, draws=100)
    >>> round(found.sensitivities["power"]["pol.axis"].value / mW, 9), found.ranking[0].cause
    (-1.0, 'pol.axis')
    """
    causes = read_causes(train, errors)
    caution_bare(causes)
    _check_whole("draws", draws, least=1, fix="draws=1000")
    _check_whole("seed", seed, least=0, fix="seed=0")
    _check_whole("batch", 1 if batch is None else batch, least=1, fix="batch=100")
    _check_executor(executor)
    merits, wanted = _checked(figures_of_merit, {} if limits is None else limits)
    share = _accuracy(accuracy)
    options = {"grid": grid, "engine": engine}
    offsets = causes.offsets(shares(draws, len(causes.errors), seed))
    study = fingerprint(
        _text(train), *map(repr, errors.items()), *map(_told, merits.items()), draws, seed, options, share
    )
    kept = Checkpoint(checkpoint, study, (draws, len(merits)))
    looked = Looked(train, causes, list(merits.values()), offsets, options=options, accuracy=share, seed=seed)
    works = looked.draws
    return Tolerance(
        train=train.copy(),
        causes=causes,
        merits=merits,
        limits=wanted,
        nominal=dict(zip(merits, looked.nominal, strict=True)),
        sensitivities=dict(zip(merits, looked.slopes, strict=True)),
        rankings={name: _ranked(causes, each) for name, each in zip(merits, looked.answers, strict=True)},
        worst=dict(zip(merits, looked.worst, strict=True)),
        offsets=offsets,
        values=work_off(works, kept, size=batch or batch_size(works), executor=executor, progress=progress),
        seed=seed,
        surfaces={name: one for name, one in zip(merits, looked.surfaces, strict=True) if one is not None},
    )


def _check_whole(parameter: str, value: Any, *, least: int, fix: str) -> None:
    if isinstance(value, bool) or not isinstance(value, Integral) or value < least:
        raise ParameterError(
            f"{parameter} is a whole number of {least} or more", got=f"tolerance: {parameter} = {value!r}", fix=fix
        )


def _check_executor(executor: Any) -> None:
    if executor is not None and not hasattr(executor, "submit"):
        raise ParameterError(
            "an executor is one of concurrent.futures",
            got=f"tolerance: executor = {executor!r}",
            fix="executor=concurrent.futures.ThreadPoolExecutor(2)",
        )


def _checked(merits: Mapping[str, Merit], limits: Mapping[str, Limits]) -> tuple[dict[str, Merit], dict[str, Limits]]:
    known = isinstance(merits, Mapping) and bool(merits)
    if not known or not all(isinstance(m, StokesMerit | PictureMerit) or callable(m) for m in merits.values()):
        raise ParameterError(
            "figures of merit are named, and each is power_at(...) or another of its kind, or a function of a train",
            got=f"tolerance: {merits!r}",
            fix=EXAMPLE,
        )
    if not isinstance(limits, Mapping):
        raise ParameterError(
            "limits are given by the name of the figure of merit they belong to",
            got=f"tolerance: limits = {limits!r}",
            fix=f'limits={{"{next(iter(merits))}": (None, 1e-3)}}',
        )
    for name in limits:
        if name not in merits:
            raise ParameterError(
                f"limits belong to figures of merit: {', '.join(merits)}",
                got=f"tolerance: limits of {name!r}",
                fix=f'limits={{"{next(iter(merits))}": (None, 1e-3)}}',
            )
        _check_limits(name, limits[name])
    return dict(merits), dict(limits)


def _check_limits(name: str, limits: Any) -> None:
    try:
        low, high = (end if end is None else float(end) for end in limits)
        good = (-math.inf if low is None else low) <= (math.inf if high is None else high)  # nan is not
    except (TypeError, ValueError):
        good = False
    if not good:
        raise ParameterError(
            "limits are a lowest and a highest value, in this order; None for no limit",
            got=f"tolerance: limits of {name!r} are {limits!r}",
            fix=f'limits={{"{name}": (None, 1e-3)}}',
        )


def _accuracy(accuracy: Any) -> float:
    rule = "accuracy is a share of the spread of a figure of merit, zero or more"
    return at_least("tolerance", "accuracy", accuracy, 0.0, fix="accuracy=0.02", rule=rule)


def _ranked(causes: Causes, each: tuple[Answer, ...]) -> tuple[Contribution, ...]:
    variances = np.zeros(len(causes.causes))
    for owner, error, answer in zip(causes.owners, causes.errors, each, strict=True):
        variances[owner] += answer.variance(error.sigma, error.kurtosis)
    total = variances.sum() or 1.0
    order = np.argsort(-variances, kind="stable")
    return tuple(
        Contribution(causes.causes[k].label, float(np.sqrt(variances[k])), float(variances[k] / total)) for k in order
    )


def _text(train: Any) -> str:
    try:
        return str(train.to_text())
    except FileFormatError:
        return str(train)  # a part holds a function: its name has to do


def _told(item: tuple[str, Merit]) -> str:
    name, merit = item
    if isinstance(merit, StokesMerit | PictureMerit):
        return f"{name}: {sorted((k, np.asarray(v).tolist()) for k, v in vars(merit).items() if v is not None)}"
    return f"{name}: {getattr(merit, '__module__', '')}.{getattr(merit, '__qualname__', type(merit).__qualname__)}"
