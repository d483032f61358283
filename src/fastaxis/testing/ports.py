"""Power at ports."""

from __future__ import annotations

import math
from typing import Any

import numpy as np

from fastaxis.camera.settings import as_setting, no_analyzer
from fastaxis.testing.asked import at_least
from fastaxis.testing.failing import Claim, hold
from fastaxis.testing.kinds import about_a_train
from fastaxis.testing.words import watts

__all__ = ["port_dark", "port_power"]


@about_a_train
def port_dark(train: Any, port: str, *, db: float = 30.0, behind: Any = None) -> None:
    """The power at a port is at least this many decibels below that of all lasers together.

    Parameters
    ----------
    train : the bench.
    port : port, camera or detector.
    db : depth [dB].
    behind : analyzer or state in front of it, if any.

    Raises
    ------
    BenchError : it is brighter.
    ParameterError : a depth that is negative or no number.
    """
    db = at_least("port_dark", "db", db, 0.0, fix="db=30")
    weights = (no_analyzer() if behind is None else as_setting(behind)).weights
    sent = sum(train.elements[name].power for name in train.sources)

    def told(stokes: Any) -> str:
        power = max(float(weights @ stokes), 0.0)
        depth = f", {10 * math.log10(sent / power):.1f} dB below the laser" if power else ""
        return f"{watts(power)}{depth}"

    hold(
        train,
        Claim(
            port,
            f"dark to {db:g} dB below the laser",
            told,
            lambda stokes: float(weights @ stokes) / sent / 10 ** (-db / 10),
        ),
    )


@about_a_train
def port_power(train: Any, port: str, power: float, *, within: float = 0.01, behind: Any = None) -> None:
    """The power at a port.

    Parameters
    ----------
    train : the bench.
    port : port, camera or detector.
    power : expected [W].
    within : relative deviation that is still good.
    behind : analyzer or state in front of it, if any.

    Raises
    ------
    BenchError : it is another.
    ParameterError : a power or deviation that is negative or no number.
    """
    power = at_least("port_power", "power", power, 0.0, fix="2*mW")
    within = at_least("port_power", "within", within, 0.0, fix="within=0.01")
    weights = (no_analyzer() if behind is None else as_setting(behind)).weights
    slack = within * abs(power) or np.finfo(float).tiny
    hold(
        train,
        Claim(
            port,
            f"{watts(power)} within {100 * within:g} %",
            lambda stokes: watts(float(weights @ stokes)),
            lambda stokes: abs(float(weights @ stokes) - power) / slack,
        ),
    )
