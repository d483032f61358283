"""The graph of port states."""

import networkx as nx
import pytest

import fastaxis as fa
from fastaxis.laws import Passage
from fastaxis.units import nm


def test_edges_say_whether_they_lie_inside_a_part_or_join_two(line):
    edges = line.graph.edges
    assert edges[("laser", "out", "out"), ("hwp", "front", "in")] == {"kind": "join"}
    inside = edges[("hwp", "front", "in"), ("hwp", "back", "out")]
    assert inside["kind"] == "inside"
    assert inside["passage"] == line.elements["hwp"].passages(532 * nm)["front", "back"]


def test_every_passage_of_every_part_is_an_edge(fork):
    inside = [edge for edge in fork.graph.edges(data=True) if edge[2]["kind"] == "inside"]
    assert len(inside) == sum(len(part.passages(fork.wavelength)) for part in fork.elements.values())
    assert all(isinstance(data["passage"], Passage) for _, _, data in inside)


def test_a_double_pass_is_a_path_and_not_a_loop(isolator):
    assert nx.is_directed_acyclic_graph(isolator.graph)
    path = nx.shortest_path(isolator.graph, ("laser", "out", "out"), ("cam", "in", "in"))
    assert [name for name, _, way in path if way == "in"] == ["pbs", "qwp", "mirror", "qwp", "pbs", "cam"]


def test_the_graph_follows_the_train(line):
    first = line.graph
    assert line.graph is first
    line.add(fa.BeamDump(name="dump"))
    assert ("dump", "in", "in") in line.graph
    assert ("dump", "in", "in") not in first


def test_the_graph_cannot_be_changed_behind_the_train(line):
    with pytest.raises(nx.NetworkXError):
        line.graph.add_edge("a", "b")
