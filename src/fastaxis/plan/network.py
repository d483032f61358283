"""The bench as a set of linear equations, for light whose shape need not be followed."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import Any

from fastaxis.errors import ParameterError
from fastaxis.laws import AxisLaw, Flip, ScalarLaw, TravelLaw, Turn
from fastaxis.maths import Pattern
from fastaxis.plan.binding import bound, refuse_letters
from fastaxis.plan.fuse import as_matrix
from fastaxis.plan.steps import JonesStep, Step
from fastaxis.train.graph import Node

__all__ = ["Edge", "Network", "carrier_turns", "network_of"]


@dataclass(frozen=True)
class Edge:
    """Light handed from one port state to the next.

    Parameters
    ----------
    start, end : places of the port states in the network.
    matrix : on (Ex, Ey).
    turns : whole and broken turns of the carrier [2 pi], the whole ones taken off.
    """

    start: int
    end: int
    matrix: JonesStep
    turns: float


@dataclass(frozen=True)
class Network:
    """Port states and what leads from one to the next: the field at each is the sum of what comes in.

    Parameters
    ----------
    nodes : the port states (part, face, "in" | "out").
    edges : between them.
    feeds : (place, source) of each laser.
    target : place of the port state asked for.
    """

    nodes: tuple[Node, ...]
    edges: tuple[Edge, ...]
    feeds: tuple[tuple[int, str], ...]
    target: int


def carrier_turns(length: float | Fraction, wavelength: float) -> float:
    """The part below one of length/wavelength, by exact arithmetic: no rounding of a large phase sets a fringe.

    >>> carrier_turns(1000000.25, 1.0), carrier_turns(-0.25, 1.0)
    (0.25, 0.75)
    """
    return float(Fraction(length) / Fraction(wavelength) % 1)


def network_of(train: Any, nodes: set[Node], end: Node, wavelength: float) -> Network:
    """The equations of the port states that light passes on its way to ``end``.

    Raises
    ------
    ParameterError : a part whose action depends on the place in the beam.
    """
    graph = train.graph
    places = {node: index for index, node in enumerate(node for node in graph if node in nodes)}
    edges = []
    for start, stop, data in graph.edges(data=True):
        if start in places and stop in places:
            matrix, turns = JonesStep(), 0.0
            if data["kind"] == "inside":
                matrix, turns = _passage(train, start, stop, wavelength)
            edges.append(Edge(places[start], places[stop], matrix, turns))
    feeds = tuple((place, node[0]) for node, place in places.items() if node[0] in train.sources)
    return Network(tuple(places), tuple(edges), feeds, places[end])


def _passage(train: Any, start: Node, stop: Node, wavelength: float) -> tuple[JonesStep, float]:
    element = train.elements[start[0]]
    refuse_letters(start[0], element.parameters())
    matrix, length = JonesStep(), Fraction(0)
    for law in map(bound, element.passages(wavelength)[start[1], stop[1]].steps()):
        matrix = matrix.then(_uniform_part(start[0], law))
        if isinstance(law, TravelLaw):
            length += Fraction(law.path)
    return matrix, carrier_turns(length, wavelength)


def _uniform_part(name: str, law: Any) -> JonesStep:
    """What a law does to all of the light alike; its lens, travel or frame change only shapes the beam."""
    uniform = as_matrix(Step((name,), law))
    if uniform is not None:
        return uniform
    if isinstance(law, TravelLaw | Flip | Turn):
        return JonesStep()
    if isinstance(law, ScalarLaw) and not _placed(law):
        return JonesStep.scale(law.transmission.number())
    what = "axis" if isinstance(law, AxisLaw) else "phase or transmission"
    raise ParameterError(
        "the uniform engine follows no transverse structure, and here the light gets some",
        got=f"engine = 'uniform', but the {what} of {name} varies over the beam",
        fix='engine="auto"',
    )


def _placed(law: ScalarLaw) -> bool:
    """Whether a scalar law does more than bend the whole beam towards the axis."""
    shaped = law.stop is not None or law.charge != 0 or tuple(law.tilt) != (0, 0)
    return shaped or any(isinstance(value, Pattern) for value in law.transmission.values)
