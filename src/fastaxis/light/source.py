"""Sources: beams that add in power, with a total power in watts."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from itertools import product
from typing import Any

from fastaxis import checks
from fastaxis.errors import ParameterError
from fastaxis.light.mixtures import StateMixture, check_weights
from fastaxis.light.modes import Mode
from fastaxis.light.states import State
from fastaxis.light.terms import Beam, Term
from fastaxis.maths import Scalar, free_symbols

__all__ = ["Component", "Source", "coherent_source", "make_source"]

Weighted = Sequence[tuple[Scalar, Any]]


@dataclass(frozen=True)
class Component:
    """A beam that has no fixed phase to the rest of its source.

    Parameters
    ----------
    weight : share of the power of the source, 0 .. 1.
    beam : its coherent sum of modes.
    wavelength : its own vacuum wavelength [m]; None for that of the train.
    """

    weight: Scalar
    beam: Beam
    wavelength: Scalar | None = None

    def __post_init__(self) -> None:
        object.__setattr__(self, "weight", checks.number("component", "weight", self.weight, fix="weight=1.0"))
        if self.wavelength is not None:
            object.__setattr__(self, "wavelength", checks.wavelength("component", "wavelength", self.wavelength))

    def wavelength_or(self, default: Scalar) -> Scalar:
        """Its own wavelength, or the train's."""
        return default if self.wavelength is None else self.wavelength

    @property
    def symbols(self) -> set[Any]:
        """The letters in weight, beam and wavelength."""
        return free_symbols((self.weight, self.wavelength)) | self.beam.symbols


@dataclass(frozen=True)
class Source:
    """All light that leaves a port: components whose powers add.

    Parameters
    ----------
    components : mutually incoherent parts; their weights add up to 1.
    power : total power [W].

    Raises
    ------
    ParameterError : weights that are negative or do not add up to 1; a power that is not positive.
    """

    components: tuple[Component, ...]
    power: Scalar

    def __post_init__(self) -> None:
        object.__setattr__(self, "components", tuple(self.components))
        fix = "fa.make_source(fa.Gaussian(waist=0.8*mm), fa.H, power=5*mW)"
        check_weights("source", tuple(component.weight for component in self.components), fix=fix)
        object.__setattr__(self, "power", checks.length("source", "power", self.power, fix="power=5*mW"))

    @property
    def powers(self) -> tuple[Scalar, ...]:
        """Power of each component [W]."""
        return tuple(component.weight * self.power for component in self.components)

    @property
    def beam(self) -> Beam | None:
        """The one beam of a fully coherent source, or None."""
        return self.components[0].beam if len(self.components) == 1 else None

    @property
    def symbols(self) -> set[Any]:
        """The letters in the components and the power."""
        return free_symbols((self.power,)).union(*(component.symbols for component in self.components))


def make_source(
    modes: Mode | Weighted, state: State | StateMixture, *, power: Scalar, lines: Weighted | None = None
) -> Source:
    """A source of one or several modes, states and lines, each list an incoherent mixture.

    ``modes`` is a mode or ((weight, mode), ...), ``state`` a state or a mixture, ``lines`` ((weight, wavelength [m]),
    ...), and ``power`` the total [W]. The lists are independent: every combination is a component.

    >>> from fastaxis.light import UNPOLARIZED, Gaussian
    >>> from fastaxis.units import mm, mW
    >>> [float(1e3 * watts) for watts in make_source(Gaussian(waist=0.8*mm), UNPOLARIZED, power=5*mW).powers]
    [2.5, 2.5]
    """
    fix = "((0.9, fa.Gaussian(waist=0.8*mm)), (0.1, fa.LaguerreGauss(0, 1, 0.8*mm)))"
    chosen_modes = _weighted(modes, "modes", fix)
    states = state.parts if isinstance(state, StateMixture) else ((1.0, state),)
    beams = [(wm * ws, Beam((Term(1, mode, pure),))) for (wm, mode), (ws, pure) in product(chosen_modes, states)]
    return Source(_on_lines(beams, lines), power)


def coherent_source(terms: Iterable[Term], *, power: Scalar, lines: Weighted | None = None) -> Source:
    """A source of one coherent sum of ``terms``, of a total ``power`` [W], on one or several ``lines``.

    >>> from fastaxis.light import H, Gaussian
    >>> from fastaxis.units import mm, mW
    >>> coherent_source([Term(1, Gaussian(waist=0.8*mm), H)], power=5*mW).beam.state.label
    'H'
    """
    return Source(_on_lines([(1.0, Beam(tuple(terms)))], lines), power)


def _on_lines(beams: Weighted, lines: Weighted | None) -> tuple[Component, ...]:
    fix = "((0.8, 632.8*nm), (0.2, 635*nm))"
    spectrum = ((1.0, None),) if lines is None else _weighted(lines, "lines", fix)
    return tuple(
        Component(wb if lines is None else wb * wl, beam, wavelength)
        for (wb, beam), (wl, wavelength) in product(beams, spectrum)
    )


def _weighted(value: Any, part: str, fix: str) -> Weighted:
    """A list ((weight, item), ...) with its weights checked; a single mode becomes one."""
    if isinstance(value, Mode):
        return ((1.0, value),)
    try:
        pairs = [(weight, item) for weight, item in value]
    except (TypeError, ValueError):
        raise ParameterError(
            f"{part} are given as pairs of weight and value", got=f"source: {part} = {value!r}", fix=f"{part}={fix}"
        ) from None
    weights = check_weights(part, tuple(weight for weight, _ in pairs), fix=f"{part}={fix}")
    return tuple(zip(weights, (item for _, item in pairs), strict=True))
