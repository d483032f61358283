"""Plans that sum all ways of the light at once, by linear equations instead of a list of paths."""

from __future__ import annotations

from typing import Any

from fastaxis.errors import ParameterError
from fastaxis.laws import ScalarLaw, TravelLaw
from fastaxis.light import Source
from fastaxis.plan.arms import upstream
from fastaxis.plan.binding import bound, refuse_letters
from fastaxis.plan.network import Network, network_of
from fastaxis.plan.plan import Branch, Plan
from fastaxis.train.graph import Node, lit_nodes, source_nodes
from fastaxis.train.routes import lit_target

__all__ = ["by_network"]


def by_network(train: Any, target: str, *, asked: str) -> Plan | None:
    """The plan for light whose shape need not be followed, where several ways of it meet; None for other light.

    Plane waves through uniform parts qualify by themselves. Asked for ``engine="uniform"`` any beam does: its
    spreading, lenses and frame changes are then taken to leave it alone.

    Raises
    ------
    ParameterError : asked for, but a part gives the light a shape.
    """
    if asked not in ("auto", "uniform"):
        return None
    train.validate()
    graph = train.graph
    lit = lit_nodes(graph, source_nodes(train.elements))
    end = lit_target(train.elements, graph, lit, target)
    nodes = upstream(graph, lit, end)
    if all(sum(before in nodes for before in graph.predecessors(node)) < 2 for node in nodes):
        return None
    lasers = {name: train.elements[name] for name in train.sources if any(node[0] == name for node in nodes)}
    if not all(laser.line.sharp for laser in lasers.values()) or (asked == "auto" and not _plane(train, lasers, nodes)):
        return None
    refuse_letters(train.name, {"wavelength": train.wavelength})
    return _plan(train, target, nodes, end, lasers)


def _plane(train: Any, lasers: dict[str, Any], nodes: set[Node]) -> bool:
    """Whether all light is plane waves, and no part on the way bends or shapes them."""
    modes = [term.mode for laser in lasers.values() for part in laser.source.components for term in part.beam.terms]
    edges = (data for a, b, data in train.graph.edges(data=True) if a in nodes and b in nodes)
    laws = [law for data in edges if data["kind"] == "inside" for law in data["passage"].laws]
    return all(mode.infinite for mode in modes) and not any(map(_shaping, laws))


def _shaping(law: Any) -> bool:
    if isinstance(law, TravelLaw):
        return bool(law.a != 1 or law.c != 0)
    return (isinstance(law, ScalarLaw) or hasattr(law, "order")) and not law.uniform


def _plan(train: Any, target: str, nodes: set[Node], end: Node, lasers: dict[str, Any]) -> Plan:
    branches, networks = [], dict[float, Network]()
    for name, laser in lasers.items():
        refuse_letters(name, laser.parameters())
        source: Source = bound(laser.source)
        for part in source.components:
            wavelength = float(part.wavelength_or(train.wavelength))
            if wavelength not in networks:
                networks[wavelength] = network_of(train, nodes, end, wavelength)
            network = networks[wavelength]
            feed = next(place for place, laser_name in network.feeds if laser_name == name)
            power = float(source.power * part.weight)
            branches.append(
                Branch(part.beam, wavelength, power, (), engine="network", network=network, feed=feed, line=laser.line)
            )
    _check_one_mode(branches)
    first: Source = bound(next(iter(lasers.values())).source)
    reason = "all ways of light without a shape are summed at once"
    return Plan(target, float(train.wavelength), first, tuple(branches), engine="uniform", reason=reason)


def _check_one_mode(branches: list[Branch]) -> None:
    for branch in branches:
        if len({term.mode for term in branch.beam.terms}) > 1:
            raise ParameterError(
                "the uniform engine follows one mode; a sum of several has a shape",
                got=f"engine = 'uniform': {len(branch.beam.terms)} modes",
                fix='engine="auto"',
            )
