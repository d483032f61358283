"""From a train and a port to the form of the light there."""

from __future__ import annotations

from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.circulating import circulating, has_loop
from fastaxis.engines.symbolic.coordinates import check_letters
from fastaxis.engines.symbolic.form import Form, Part
from fastaxis.engines.symbolic.letters import Letters
from fastaxis.engines.symbolic.paths import joined, open_routes
from fastaxis.engines.symbolic.ring import ExactMaths, Ring
from fastaxis.engines.symbolic.waves import Place
from fastaxis.engines.symbolic.waves.base import exactly

__all__ = ["derive"]


def derive(train: Any, target: str) -> Form:
    """The light at a port as an exact form, with the letters of the train left as letters.

    Light that comes by several paths is summed, each path with the phase of its length beyond the first one's; light
    of several lasers adds up in power. Plane waves that go round a cavity or a ring are summed over all their trips.

    Parameters
    ----------
    train : parts, joints and wavelength; any parameter may be a sympy expression.
    target : a port such as "cam" or "pbs.reflected".

    Raises
    ------
    SymbolError : a letter named r or phi or not real; a part without a closed form; a beam that goes round a loop.
    WiringError : no light there.

    Examples
    --------
    >>> import sympy as sp
    >>> from fastaxis.elements.laser import Laser
    >>> from fastaxis.elements.retarder import HalfWavePlate
    >>> from fastaxis.train import Train
    >>> a, t = sp.symbols("alpha theta", real=True)
    >>> train = Train(wavelength=532e-9).along(Laser(waist=0.8e-3), HalfWavePlate(fast=a, name="hwp"))
    >>> derive(train, "hwp").frame(t)
    cos(2*alpha - theta)**2
    """
    routes = open_routes(train, target)
    sources = {name: ways[0].laser.source for name, ways in routes.items()}
    letters = set(train.symbols).union(*(source.symbols for source in sources.values()))
    check_letters(letters)
    maths = ExactMaths(Ring())
    names = Letters({str(letter) for letter in letters} | {"r", "phi"})
    total = sum((exactly(source.power) for source in sources.values()), sp.S.Zero)
    parts, loop = [], has_loop(train, target)
    for name, source in sources.items():
        for component in source.components:
            place = Place(maths, names, exactly(component.wavelength_or(train.wavelength)))
            field = (
                circulating(train, component, name, target, place)
                if loop
                else joined(train, component, routes[name], place)
            )
            parts.append(Part(exactly(component.weight) * exactly(source.power) / total, component.beam, field))
    return Form(train, target, tuple(parts), total, frozenset(letters), loop)
