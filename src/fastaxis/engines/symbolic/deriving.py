"""From a train and a port to the form of the light there."""

from __future__ import annotations

from typing import Any

from fastaxis.engines.symbolic.coordinates import check_letters
from fastaxis.engines.symbolic.form import Form, Part
from fastaxis.engines.symbolic.letters import Letters
from fastaxis.engines.symbolic.ring import ExactMaths, Ring
from fastaxis.engines.symbolic.sources import as_field
from fastaxis.engines.symbolic.steps import applied
from fastaxis.engines.symbolic.waves import Place
from fastaxis.engines.symbolic.waves.base import exactly

__all__ = ["derive"]


def derive(train: Any, target: str) -> Form:
    """The light at a port as an exact form, with the letters of the train left as letters.

    Parameters
    ----------
    train : parts, joints and wavelength; any parameter may be a sympy expression.
    target : a port such as "cam" or "pbs.reflected".

    Raises
    ------
    SymbolError : a letter named r or phi or not real; a part without a closed form.
    WiringError : no light there, or light by several paths.

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
    route = train.route(target)
    source, steps = route.laser.source, route.steps()
    letters = set(train.symbols) | set(source.symbols)
    check_letters(letters)
    maths = ExactMaths(Ring())
    names = Letters({str(letter) for letter in letters} | {"r", "phi"})
    parts = []
    for component in source.components:
        place = Place(maths, names, exactly(component.wavelength_or(train.wavelength)))
        field = as_field(component.beam, place)
        for name, law in steps:
            field = applied(field, name, law)
        parts.append(Part(component.weight, component.beam, field))
    return Form(train, target, tuple(parts), source.power, frozenset(letters))
