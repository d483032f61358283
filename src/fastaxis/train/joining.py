"""Rules for one joint between two ports, applied when it is made."""

from __future__ import annotations

from collections.abc import Set as AbstractSet

from fastaxis.elements.base import Element
from fastaxis.errors import WiringError
from fastaxis.maths import Scalar
from fastaxis.train.graph import Joints, build, lit_nodes, port_of, source_nodes
from fastaxis.train.ports import Elements, in_faces, out_faces, read_port, split
from fastaxis.train.suggest import join_code, nearest, open_out

__all__ = ["checked_joint"]


def _default(element: Element, way: str) -> str:
    return (element.exit if way == "out" else element.entry) or ""


def _other_in_port(
    elements: Elements, joints: Joints, wavelength: Scalar, besides: str, new: AbstractSet[str] = frozenset()
) -> str | None:
    """A free default entry of another part, the last declared first."""
    taken = {into for _, into in joints}
    for name in reversed([name for name in elements if name != besides and name not in new]):
        face = _default(elements[name], "in")
        if face in in_faces(elements[name], wavelength) and f"{name}.{face}" not in taken:
            return f"{name}.{face}"
    return None


def _other_out_port(
    elements: Elements, joints: Joints, wavelength: Scalar, besides: str, new: AbstractSet[str] = frozenset()
) -> str | None:
    """The free out-port nearest to a part: one with light, else the exit of a part that may get some."""
    graph = build(elements, joints, wavelength)
    sources = source_nodes(elements)
    free = [node for node in open_out(graph, set(graph)) if node[0] not in new]
    lit = lit_nodes(graph, sources)
    exits = [node for node in free if elements[node[0]].exit == node[1]]
    found = nearest(elements, [node for node in free if node in lit], besides)
    found = found or nearest(elements, exits or (() if sources else free), besides)
    return port_of(found) if found else None


def _directed(
    elements: Elements, joints: Joints, wavelength: Scalar, out: tuple[str, str], into: tuple[str, str]
) -> tuple[str, str]:
    """Both ports with their faces filled in, or a WiringError when light cannot leave here or enter there."""
    out_name, into_name = out[0], into[0]
    out_face = out[1] or _default(elements[out_name], "out")
    in_face = into[1] or _default(elements[into_name], "in")
    leaves = out_face in out_faces(elements[out_name], wavelength)
    enters = in_face in in_faces(elements[into_name], wavelength)
    if leaves and enters:
        return f"{out_name}.{out_face}", f"{into_name}.{in_face}"
    if leaves:
        likely = _other_in_port(elements, joints, wavelength, out_name)
        port, verb, fix = f"{into_name}.{in_face}", "enter", join_code(f"{out_name}.{out_face}", likely or "cam.in")
    else:
        likely = _other_out_port(elements, joints, wavelength, into_name)
        fix = join_code(likely, f"{into_name}.{in_face}") if likely else 'train.add(fa.BeamSplitter(name="splitter"))'
        port, verb = f"{out_name}.{out_face}", "leave"
    swapped = _swapped(elements, joints, wavelength, out, into)
    raise WiringError(
        f"light cannot {verb} there; join(out_port, in_port) names the port it leaves first",
        got=f"{port.rstrip('.')} ({type(elements[split(port)[0]]).__name__})",
        fix=swapped or fix,
    )


def _swapped(
    elements: Elements, joints: Joints, wavelength: Scalar, out: tuple[str, str], into: tuple[str, str]
) -> str | None:
    """The joint taken the other way round, where light can go that way and both ports are free."""
    first, last = elements[into[0]], elements[out[0]]
    out_face, in_face = into[1] or _default(first, "out"), out[1] or _default(last, "in")
    out_port, in_port = f"{into[0]}.{out_face}", f"{out[0]}.{in_face}"
    taken = any(out_port == left or in_port == entered for left, entered in joints)
    possible = out_face in out_faces(first, wavelength) and in_face in in_faces(last, wavelength)
    return join_code(out_port, in_port) if possible and not taken else None


def checked_joint(
    elements: Elements,
    joints: Joints,
    wavelength: Scalar,
    out_port: str,
    in_port: str,
    *,
    new: AbstractSet[str] = frozenset(),
) -> tuple[str, str]:
    """The joint with full port names, after every rule for a single joint was applied.

    Parts that are ``new`` are not yet in the user's train: a fix cannot name them, and is the other port alone.
    """
    out, into = read_port(elements, out_port), read_port(elements, in_port)
    if out[0] == into[0]:
        likely = _other_in_port(elements, joints, wavelength, out[0])
        raise WiringError(
            "a part cannot be joined to itself",
            got=f"{out_port} -> {in_port}",
            fix=join_code(out_port, likely) if likely else f'train.along("{out_port}", fa.BeamDump())',
        )
    full_out, full_in = _directed(elements, joints, wavelength, out, into)
    _check_free(elements, joints, wavelength, full_out, full_in, new=new)
    return full_out, full_in


def _check_free(
    elements: Elements, joints: Joints, wavelength: Scalar, out_port: str, in_port: str, *, new: AbstractSet[str]
) -> None:
    """Each port carries one joint only."""
    known = split(out_port)[0] not in new and split(in_port)[0] not in new
    for other_out, other_in in joints:
        if other_out == out_port:
            twin = _twin(elements, joints, wavelength, out_port, "out")
            likely = twin or _other_out_port(elements, joints, wavelength, split(in_port)[0], new)
            raise WiringError(
                f"light leaving a port goes to one place{_free(likely)}; a splitter makes two beams of one",
                got=f"{out_port}: already joined to {other_in}",
                fix=_instead(likely, join_code(likely or "", in_port) if known else "", "splitter"),
            )
        if other_in == in_port:
            twin = _twin(elements, joints, wavelength, in_port, "in")
            likely = twin or _other_in_port(elements, joints, wavelength, split(out_port)[0], new)
            raise WiringError(
                f"a port is fed by one beam{_free(likely)}; a splitter brings two together",
                got=f"{in_port}: already fed by {other_out}",
                fix=_instead(likely, join_code(out_port, likely or "") if known else "", "combiner"),
            )


def _instead(likely: str | None, joint: str, splitter: str) -> str:
    """The likely port, in a joint if there is one, or the splitter that is missing."""
    if not likely:
        return f'train.add(fa.BeamSplitter(name="{splitter}"))'
    return joint or f'"{likely}"'


def _free(likely: str | None) -> str:
    return f", and {likely} is free" if likely else ""


def _twin(elements: Elements, joints: Joints, wavelength: Scalar, port: str, way: str) -> str | None:
    """The free face of the same part that light goes to, or comes from, by the same faces: the other of a splitter."""
    name, face = split(port)
    here, there = (0, 1) if way == "in" else (1, 0)
    partners: dict[str, set[str]] = {}
    for pair in elements[name].passages(wavelength):
        partners.setdefault(pair[here], set()).add(pair[there])
    taken = {joint[there] for joint in joints}
    alike = (other for other in partners if other != face and partners[other] == partners.get(face))
    return next((f"{name}.{other}" for other in alike if f"{name}.{other}" not in taken), None)
