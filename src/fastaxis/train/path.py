"""A path of parts in the order the light meets them, taken apart into joints."""

from __future__ import annotations

from collections.abc import Iterable
from itertools import pairwise

from fastaxis.elements.base import Element
from fastaxis.errors import WiringError
from fastaxis.maths import Scalar
from fastaxis.train.graph import Joints
from fastaxis.train.joining import checked_joint
from fastaxis.train.naming import with_name
from fastaxis.train.ports import Elements, out_faces, read_port

__all__ = ["joined_along"]


def joined_along(
    elements: Elements, joints: Joints, wavelength: Scalar, items: Iterable[Element | str]
) -> tuple[dict[str, Element], Joints]:
    """Parts and joints with a path added; nothing is changed when any of it is refused."""
    parts, stops = dict(elements), []
    for item in items:
        if isinstance(item, str):
            read_port(parts, item)
            stops.append(item)
        else:
            named = with_name(parts, item)
            parts[named.name] = named
            stops.append(named.name)
    for index, (here, there) in enumerate(pairwise(stops)):
        if here not in elements:
            _refuse_end(parts, wavelength, here)
        out_port = here if index == 0 else _way_out(parts, joints, wavelength, stops, index)
        joints = (
            *joints,
            checked_joint(parts, joints, wavelength, out_port, there, new=parts.keys() - elements.keys()),
        )
    return parts, joints


def _refuse_end(elements: Elements, wavelength: Scalar, here: str) -> None:
    """A WiringError for a new part that others come after though light does not leave it."""
    part = elements[read_port(elements, here)[0]]
    if not out_faces(part, wavelength):
        raise WiringError(
            "light cannot leave there: a camera, a detector or a dump comes last in a path, or behind a splitter",
            got=f"{here} ({type(part).__name__})",
            fix='fa.BeamSplitter(name="splitter")',
        )


def _way_out(elements: Elements, joints: Joints, wavelength: Scalar, stops: list[str], index: int) -> str:
    """The port by which light leaves a part it entered in the middle of a path."""
    before, port, after = stops[:index], stops[index], stops[index + 1 :]
    name, face = read_port(elements, port)
    element = elements[name]
    if not face or face == element.entry:
        return name
    ways = [out for into, out in element.passages(wavelength) if into == face]
    if len(ways) == 1:
        return f"{name}.{ways[0]}"
    fed = {in_port for _, in_port in joints}
    by_default = element.entry and f"{name}.{element.entry}" not in fed
    two = f"train.along({_quoted(*before, name)}); train.along({_quoted(port, *after)})"
    raise WiringError(
        "inside a path a part is entered and left by its default faces; a path by another port ends or starts there",
        got=f"{port}: {len(ways)} ways on from this face",
        fix=two if by_default else f"train.along({_quoted(*before, port)})",
    )


def _quoted(*ports: str) -> str:
    return ", ".join(f'"{port}"' for port in ports)
