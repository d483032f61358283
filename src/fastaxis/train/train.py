"""The train: parts, how they are joined, and the questions that can be asked of them."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from os import PathLike
from pathlib import Path
from typing import Any, Self

from fastaxis.checks import wavelength as checked_wavelength
from fastaxis.elements.base import Element
from fastaxis.elements.camera import Camera
from fastaxis.errors import caution
from fastaxis.files import require, write_whole
from fastaxis.maths import Scalar
from fastaxis.train import validate as checks
from fastaxis.train.both_ways import looped, returned
from fastaxis.train.changes import changed_elements, refuse_unpaired
from fastaxis.train.graph import Joints, Node, build, is_source, lit_nodes, port_of, source_nodes
from fastaxis.train.joining import checked_joint
from fastaxis.train.letters import as_symbols, letters, substituted, substituted_element
from fastaxis.train.listing import listing
from fastaxis.train.naming import with_name
from fastaxis.train.path import joined_along
from fastaxis.train.questions import Questions
from fastaxis.train.routes import Route, find_route, find_routes
from fastaxis.train.suggest import open_out
from fastaxis.train.text import decoded, read_text, write_text

__all__ = ["Train"]


class Train(Questions):
    """Parts of a bench, joined by named ports.

    Light leaves a port ("pbs.reflected") and enters another ("cam.in"). The train only wires; what happens to the
    light is stated by its parts.

    Parameters
    ----------
    wavelength : vacuum wavelength [m], 10 nm to 1 mm, or a symbol.
    name : title in figures and listings.

    Raises
    ------
    ParameterError : a wavelength whose unit is missing.
    WiringError : from the methods, when light cannot go as asked; the message holds the likely connection.

    Examples
    --------
    >>> from fastaxis.elements.retarder import HalfWavePlate
    >>> from fastaxis.units import deg, nm
    >>> train = Train(wavelength=532*nm, name="Low Quay").along(HalfWavePlate(fast=0*deg), HalfWavePlate(fast=9*deg))
    >>> train.joints
    (('plate1.back', 'plate2.front'),)
    """

    def __str__(self) -> str:
        return listing(self)

    __repr__ = __str__

    def __init__(self, *, wavelength: Scalar, name: str = "train") -> None:
        self.wavelength: Scalar = checked_wavelength(name, "wavelength", wavelength)
        self.name = name
        self.elements: dict[str, Element] = {}
        self.joints: Joints = ()
        self._said: set[str] = set()
        self._drawn: tuple[object, Any] | None = None

    # -- declaring ------------------------------------------------------------------------------------------------

    def along(self, *items: Element | str) -> Self:
        """Add parts in the order the light meets them, each joined to the next, and return the train.

        Parameters
        ----------
        items : new parts, or strings: the name of a part that is in the train already, or one of its ports. A path
            may start from a port ("pbs.reflected") and end at one ("qwp.back"). Where no face is named, light
            leaves by the part's default exit and enters by its default entry; a part entered by a named face in
            the middle of a path is left by the only way out from there.
        """
        self.elements, self.joints = joined_along(self.elements, self.joints, self.wavelength, items)
        return self

    def add(self, element: Element) -> Self:
        """Add a part without joining it, and return the train; without a name it gets one ("lens1")."""
        named = with_name(self.elements, element)
        self.elements = {**self.elements, named.name: named}
        return self

    def join(self, out_port: Element | str, in_port: Element | str) -> Self:
        """Send the light that leaves one port into another, and return the train.

        Parameters
        ----------
        out_port, in_port : "name.face", or "name" for the default face. ``join("mirror", "qwp.back")`` sends
            the light from a mirror back through a plate it came through. A new part is added, and joined by its
            default face.
        """
        if not (isinstance(out_port, str) and isinstance(in_port, str)):
            return self.along(out_port, in_port)
        joint = checked_joint(self.elements, self.joints, self.wavelength, out_port, in_port)
        self.joints = (*self.joints, joint)
        return self

    def retro(self, *items: Element | str) -> Self:
        """Add an arm that light runs out along and comes back through, and return the train.

        ``retro("bs.transmitted", fa.FreeSpace(200*mm), fa.Mirror(name="end"))`` sends the light of that port to the
        mirror, and what the mirror returns back through the same parts to the same port.

        Parameters
        ----------
        items : as for :meth:`along`; the first is where the arm starts, the last what turns the light round. Mirrors
            in between become two-way: light comes to them from both sides. An arm that starts at the laser
            (``retro("laser", plate, fa.Mirror())``) ends at the part before it, whose port is left open.

        Raises
        ------
        WiringError : no port to start from, or a last part that does not turn the light round.
        """
        self.elements, self.joints = returned(self.elements, self.joints, self.wavelength, items)
        return self

    def loop(self, *items: Element | str) -> Self:
        """Add a loop that light runs round in both senses, and return the train.

        ``loop("pbs.transmitted", fa.Mirror(name="m1"), fa.Mirror(name="m2"), "pbs.reflected")``.

        Parameters
        ----------
        items : as for :meth:`along`; the first and the last are ports. Mirrors in between become two-way.
        """
        self.elements, self.joints = looped(self.elements, self.joints, self.wavelength, items)
        return self

    # -- changed copies -------------------------------------------------------------------------------------------

    def copy(self) -> Self:
        """A train of the same parts and joints that can be extended on its own."""
        return self._with(dict(self.elements), self.wavelength)

    def with_changes(self, changes: Mapping[str, Any]) -> Self:
        """A copy with other values: {"hwp.fast": 3*deg, "wavelength": 633*nm}.

        Parameters
        ----------
        changes : "name.parameter" -> new value; "wavelength" for the wavelength; "name.centre_x" for one half of
            a centre. The checks of the part apply to the new value.
        """
        refuse_unpaired(changes)
        rest = {key: value for key, value in changes.items() if key != "wavelength"}
        return self._with(changed_elements(self.elements, rest), changes.get("wavelength", self.wavelength))

    def with_values(self, values: Mapping[Any, Any]) -> Self:
        """A copy with numbers in place of letters, at any depth of parts, states and modes.

        Parameters
        ----------
        values : {letter: number}, the letter as a symbol or by its name, the number in SI units.

        Raises
        ------
        SymbolError : no such letter in the train.
        """
        by_symbol = as_symbols(self.symbols, values)
        elements = {name: substituted_element(part, by_symbol) for name, part in self.elements.items()}
        return self._with(elements, substituted(self.wavelength, by_symbol))

    # -- text form ------------------------------------------------------------------------------------------------

    def to_text(self) -> str:
        """The train as versioned JSON text, numbers exact to the last bit.

        Raises
        ------
        FileFormatError : a part holds a function; sample it to an array first.
        """
        return write_text(self.name, self.wavelength, self.elements, self.joints)

    @classmethod
    def from_text(cls, text: str, kinds: Iterable[type[Element]] = ()) -> Self:
        """The train of a text form. Only parts and light of fastaxis are built, and formulas are never run.

        Parameters
        ----------
        text : what :meth:`to_text` gave.
        kinds : classes of parts of your own that the text may name.

        Raises
        ------
        FileFormatError : no JSON, another version, an unknown kind, a missing or unknown field.
        """
        name, wavelength, parts, joints = read_text(text, kinds)
        train = cls(wavelength=wavelength, name=name)
        for part in parts:
            train.add(part)
        for out_port, in_port in joints:
            train.join(out_port, in_port)
        return train

    def save(self, path: str | PathLike[str]) -> None:
        """Write the text form to a file (UTF-8)."""
        text = self.to_text().encode()
        write_whole(Path(path), lambda file: file.write(text))

    @classmethod
    def load(cls, path: str | PathLike[str], kinds: Iterable[type[Element]] = ()) -> Self:
        """The train of a file written by :meth:`save`."""
        return cls.from_text(decoded(require(Path(path), 'train.save("bench.json")').read_bytes(), str(path)), kinds)

    def _with(self, elements: dict[str, Element], wavelength: Scalar) -> Self:
        copy = type(self)(wavelength=wavelength, name=self.name)
        copy.elements, copy.joints = elements, self.joints
        # A sweep makes hundreds of copies; a caution about the bench is worth saying once.
        copy._said = set(self._said)  # noqa: SLF001  # a copy of itself
        return copy

    # -- wiring ---------------------------------------------------------------------------------------------------

    @property
    def symbols(self) -> set[Any]:
        """All letters in the train."""
        return letters((*self.elements.values(), self.wavelength))

    @property
    def graph(self) -> Any:
        """The frozen networkx.DiGraph on port states (part, face, "in" | "out").

        Edges inside a part have ``kind="inside"`` and a ``passage``; edges between parts have ``kind="join"``.
        """
        state = (tuple(self.elements.items()), self.joints, self.wavelength)
        if self._drawn is None or not _same(self._drawn[0], state):
            self._drawn = (state, build(self.elements, self.joints, self.wavelength))
        return self._drawn[1]

    @property
    def sources(self) -> list[str]:
        """Names of the parts that send out light."""
        return [name for name, element in self.elements.items() if is_source(element)]

    @property
    def cameras(self) -> list[str]:
        """Names of the cameras."""
        return [name for name, element in self.elements.items() if isinstance(element, Camera)]

    def _lit(self) -> set[Node]:
        return lit_nodes(self.graph, source_nodes(self.elements))

    @property
    def lit(self) -> list[str]:
        """Ports that light reaches, in either direction."""
        lit = self._lit()
        return list(dict.fromkeys(port_of(node) for node in self.graph if node in lit))

    def open_ports(self) -> list[str]:
        """Ports that light leaves towards nothing: where power leaves the bench."""
        return [port_of(node) for node in open_out(self.graph, self._lit())]

    def validate(self) -> None:
        """Check the wiring as a whole.

        Raises
        ------
        WiringError : no laser, or an impossible joint.

        Warns
        -----
        WiringWarning : a camera that nothing feeds, a part that no light reaches.
        FastaxisWarning : cautions of the parts at this wavelength. Each warning is given once.
        """
        self._warn(self._checked())

    def _checked(self) -> set[Node]:
        """The lit port states of a train without impossible joints."""
        checks.check_joints(self.elements, self.joints, self.wavelength)
        checks.check_source(self.elements, self.name)
        return self._lit()

    def _warn(self, lit: set[Node]) -> None:
        for finding in checks.findings(self.elements, self.graph, lit, self.wavelength):
            if str(finding) not in self._said:
                self._said.add(str(finding))
                caution(finding)

    def route(self, target: str) -> Route:
        """The light path to a camera, a detector, a dump or any port ("qp.back").

        A part without a face stands for the light that leaves it (for a camera: that enters it).

        Raises
        ------
        WiringError : no light gets there, or light by several paths (see :meth:`routes`).
        """
        lit = self._checked()
        route = find_route(self.elements, self.graph, lit, target)
        self._warn(lit)
        return route

    def routes(self, target: str) -> tuple[Route, ...]:
        """All light paths to a port that meet no port state twice: the arms of an interferometer.

        Light that runs round a cavity also comes by longer paths; those are summed where the light is worked out.

        Raises
        ------
        WiringError : no light gets there, or light by too many paths to list.
        """
        lit = self._checked()
        routes = find_routes(self.elements, self.graph, lit, target)
        self._warn(lit)
        return routes

    def reflections(self, target: str) -> int:
        """How often light is reflected on its way to a target; odd means it arrives mirrored."""
        return self.route(target).reflections


def _same(old: Any, new: Any) -> bool:
    """Whether a drawn graph still holds: parts are compared as objects, as their values may be arrays."""
    (old_parts, *old_rest), (new_parts, *new_rest) = old, new
    return old_rest == new_rest and [(n, id(e)) for n, e in old_parts] == [(n, id(e)) for n, e in new_parts]
