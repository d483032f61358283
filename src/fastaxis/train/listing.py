"""A train as a short table: the parts along each path, with ports and values in lab units."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING, Any

from fastaxis.train.graph import Node, port_of, source_nodes
from fastaxis.train.lab_values import lab_length, lab_parameters

if TYPE_CHECKING:
    from fastaxis.train.train import Train

__all__ = ["listing"]

Row = tuple[str, str, str, str]


def _rows(train: Train, graph: Any, start: Node, seen: set[Node]) -> tuple[list[Row], list[Node]]:
    """Rows of one path from an out-port, and the out-ports at which further paths branch off."""
    rows, branches = [], []
    name = start[0]
    rows.append(_row(train, name, start[1]))
    node: Node | None = start
    while node:
        seen.add(node)
        into = next(graph.successors(node), None)
        if into is None or into in seen:
            break
        seen.add(into)
        outs = [out for out in graph.successors(into) if out not in seen]
        node = outs[0] if outs else None
        branches += outs[1:]
        rows.append(_row(train, into[0], f"{into[1]} > {node[1]}" if node else into[1]))
    return rows, branches


def _row(train: Train, name: str, faces: str) -> Row:
    part = train.elements[name]
    return name, faces, type(part).__name__, lab_parameters(part)


def _table(rows: list[Row]) -> Iterator[str]:
    widths = [max(len(row[column]) for row in rows) for column in range(3)]
    for row in rows:
        cells = [cell.ljust(width) for cell, width in zip(row, (*widths, 0), strict=True)]
        yield "  " + "  ".join(cells).rstrip()


def listing(train: Train) -> str:
    """The listing that ``print(train)`` shows."""
    count = len(train.elements)
    lines = [f"{train.name}: {lab_length(train.wavelength)}, {count} part{'s' if count != 1 else ''}"]
    graph, seen = train.graph, set[Node]()
    waiting = source_nodes(train.elements)
    while waiting:
        start = waiting.pop(0)
        if start in seen:
            continue
        rows, branches = _rows(train, graph, start, seen)
        if len(rows) > 1 or start[0] in train.sources:  # a bare splitter port is listed among the open ports
            lines += [f"from {port_of(start)}", *_table(rows)]
        waiting = branches + waiting
    told = {node[0] for node in seen}
    dark = [_row(train, name, "") for name in train.elements if name not in told]
    if dark:
        lines += ["without light", *_table(dark)]
    lines += [f"{title}: {', '.join(words)}" for title, words in _notes(train) if words]
    return "\n".join(lines)


def _notes(train: Train) -> Iterator[tuple[str, list[str]]]:
    yield "open ports", train.open_ports()
    yield "letters", sorted(str(letter) for letter in train.symbols)
