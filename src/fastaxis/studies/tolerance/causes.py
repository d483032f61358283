"""What may be off: one parameter, several that move together, or several with a covariance."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

from fastaxis.checks import whole_radians
from fastaxis.elements.base import ANGLES
from fastaxis.errors import ParameterError, SlipWarning, caution
from fastaxis.studies.tolerance.distributions import Distribution, normal

__all__ = ["Cause", "Causes", "Correlated", "Together", "caution_bare", "correlated", "read_causes", "together"]

Reals: TypeAlias = NDArray[np.float64]
EXAMPLE = 'train.tolerance({"hwp.fast": normal(0.5*deg)}, {"leak": power_at("pbs.reflected")})'


@dataclass(frozen=True)
class Together:
    """One error that moves several parameters at once; made by :func:`together`."""

    error: Distribution
    factors: tuple[float, ...] = ()


@dataclass(frozen=True)
class Correlated:
    """Normal errors with a covariance; made by :func:`correlated`."""

    covariance: tuple[tuple[float, ...], ...]


def together(error: Distribution, factors: Sequence[float] = ()) -> Together:
    """One error for several parameters: {("hwp.fast", "qwp.fast"): together(normal(0.5*deg))}.

    Parameters
    ----------
    error : of the common cause, a table that is tilted, say.
    factors : by how much each parameter follows; 1 if left out.
    """
    return Together(error, tuple(float(factor) for factor in factors))


def correlated(covariance: Any) -> Correlated:
    """Normal errors of several parameters with this covariance matrix, in the order of the names.

    Raises
    ------
    ParameterError : the matrix is not symmetric, or has a negative variance in some direction.
    """
    matrix = np.atleast_2d(np.asarray(covariance, float))
    square = matrix.ndim == 2 and matrix.shape[0] == matrix.shape[1]
    # 1e-9 of the largest entry: a matrix typed with nine digits or rounded from a fit.
    slack = 1e-9 * float(np.abs(matrix).max(initial=0.0))
    if not square or np.abs(matrix - matrix.T).max() > slack or np.linalg.eigvalsh(matrix).min() < -slack:
        raise ParameterError(
            "a covariance is a square symmetric matrix without negative variances",
            got=f"correlated: {matrix.tolist()}",
            fix="correlated([[s1**2, r*s1*s2], [r*s1*s2, s2**2]])",
        )
    return Correlated(tuple(map(tuple, matrix.tolist())))


@dataclass(frozen=True, eq=False)
class Cause:
    """An independent source of error.

    Parameters
    ----------
    names : parameters it moves.
    errors : independent errors of the cause.
    directions : (errors, names), by how much each error moves each parameter.
    label : for tables.
    """

    names: tuple[str, ...]
    errors: tuple[Distribution, ...]
    directions: Reals = field(repr=False)
    label: str = ""


@dataclass(frozen=True, eq=False)
class Causes:
    """All causes, their errors listed one after the other.

    Parameters
    ----------
    causes : in the order given.
    nominal : value of each parameter as declared.
    """

    causes: tuple[Cause, ...]
    nominal: dict[str, float]

    @property
    def names(self) -> tuple[str, ...]:
        """The parameters, each once."""
        return tuple(self.nominal)

    @property
    def errors(self) -> tuple[Distribution, ...]:
        """Every independent error."""
        return tuple(error for cause in self.causes for error in cause.errors)

    @property
    def owners(self) -> tuple[int, ...]:
        """The cause of each error."""
        return tuple(number for number, cause in enumerate(self.causes) for _ in cause.errors)

    @property
    def directions(self) -> Reals:
        """(errors, parameters): what each error of size 1 does to every parameter."""
        place = {name: k for k, name in enumerate(self.names)}
        rows = np.zeros((len(self.errors), len(place)))
        row = 0
        for cause in self.causes:
            for direction in cause.directions:
                for name, step in zip(cause.names, direction, strict=True):
                    rows[row, place[name]] += step
                row += 1
        return rows

    def offsets(self, shares: Reals) -> Reals:
        """Errors of the parameters, (draws, parameters), from even random numbers (draws, errors)."""
        sizes = np.stack([error.values(shares[:, k]) for k, error in enumerate(self.errors)], axis=1)
        return np.asarray(sizes @ self.directions)

    def changes(self, offsets: Reals) -> dict[str, float]:
        """The values of all parameters at one row of offsets, for ``train.with_changes``."""
        return {name: value + float(off) for (name, value), off in zip(self.nominal.items(), offsets, strict=True)}


def read_causes(train: Any, errors: Mapping[Any, Any]) -> Causes:
    """The causes of a tolerance study, with the declared values of their parameters.

    Raises
    ------
    ParameterError : no errors; an error of an unknown kind; a parameter that is not there, or has no number.
    """
    if not isinstance(errors, Mapping) or not errors:
        raise ParameterError(
            'a tolerance study names at least one "part.parameter" and its error', got=repr(errors), fix=EXAMPLE
        )
    causes = tuple(_cause(key, error) for key, error in errors.items())
    names = dict.fromkeys(name for cause in causes for name in cause.names)
    return Causes(causes, {name: _nominal(train, name) for name in names})


def caution_bare(causes: Causes) -> None:
    """A caution for an error of 1, 2, 5 ... radians of an angle: small enough to pass, but it was meant in degrees."""
    for cause in causes.causes:
        if len(cause.errors) == 1 and all(name.rpartition(".")[2] in ANGLES for name in cause.names):
            (error,) = cause.errors
            if whole_radians(cause.label, "error", error.width):
                caution(
                    SlipWarning(
                        f"errors of angles are in radians and {error.width:g} rad is {np.degrees(error.width):.1f} deg:"
                        " degrees are written 10*deg",
                        got=f"tolerance: {cause.label}: {error}",
                        fix=f"{error.kind}({error.width:g}*deg)",
                    )
                )


def _cause(key: Any, error: Any) -> Cause:
    names = (key,) if isinstance(key, str) else tuple(key)
    label = ", ".join(names)
    if isinstance(error, Distribution) and len(names) == 1:
        return Cause(names, (error,), np.ones((1, 1)), label)
    if isinstance(error, Together) and len(error.factors or names) == len(names):
        return Cause(names, (error.error,), np.array([error.factors or (1.0,) * len(names)]), f"{label} together")
    if isinstance(error, Correlated) and len(error.covariance) == len(names):
        sizes, axes = np.linalg.eigh(np.array(error.covariance))
        widths = np.sqrt(np.maximum(sizes, 0.0))
        return Cause(names, tuple(normal(width) for width in widths.tolist()), axes.T, f"{label} correlated")
    raise ParameterError(
        "one parameter has an error like normal(0.5*deg); several, named in a tuple, have together(...) or"
        " correlated(...) with one number or row for each",
        got=f"tolerance: {key!r}: {error!r}",
        fix='{"hwp.fast": normal(0.5*deg), ("qwp.fast", "pol.axis"): together(normal(0.2*deg))}',
    )


def _nominal(train: Any, name: str) -> float:
    if name == "wavelength":
        return float(train.wavelength)
    part, _, parameter = name.partition(".")
    element = train.elements.get(part)
    known = {} if element is None else element.parameters()
    if parameter in ("centre_x", "centre_y") and "centre" in known:
        return float(known["centre"][parameter == "centre_y"])
    value = known.get(parameter)
    if isinstance(value, bool) or not isinstance(value, int | float):
        train.with_changes({name: 0.0} if element is None or parameter not in known else {})  # names what is missing
        raise ParameterError(
            "an error is added to a parameter that has a number as its value",
            got=f"tolerance: {name} = {value!r}",
            fix='"hwp.slow"' if parameter == "fast" else f'train.with_changes({{"{name}": 0.0}})',
        )
    return float(value)
