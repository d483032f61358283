"""What every part of a bench has: a name, faces, and the passages between them."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, fields, replace
from difflib import get_close_matches
from math import pi
from typing import Any, ClassVar, Self

from fastaxis import checks
from fastaxis.errors import FastaxisWarning, ParameterError
from fastaxis.laws import Law, Passage
from fastaxis.light import State
from fastaxis.loader import late
from fastaxis.maths import Scalar, free_symbols

__all__ = ["Element", "ThroughElement"]

COMMON = ("name", "expects")  # parameters of all parts
# Of these a few whole radians were meant as degrees.
ANGLES = ("fast", "slow", "axis", "offset", "angle", "retardance", "roll")
TYPED = set(ANGLES) - {"retardance"}  # 2 degrees would be no plate, 2 radians is one
TURNS = (*ANGLES, "theta", "azimuth", "rotation")
Passages = Mapping[tuple[str, str], Passage]


@dataclass(frozen=True, kw_only=True)
class Element:
    """Base of all parts.

    Parameters
    ----------
    name : how the part is called in the train, in ports ("pbs.reflected") and in changes ("hwp.fast");
        left empty, the train gives one.
    expects : polarization of the light that should arrive at the part, for inspections; it does nothing to the light.
        For light that meets it as drawn; None if any will do.
    """

    name: str = ""
    expects: State | None = None

    stem: ClassVar[str] = "part"  # names are made of it: plate1, plate2
    faces: ClassVar[tuple[str, ...]] = ()
    entry: ClassVar[str | None] = None  # face met by default
    exit: ClassVar[str | None] = None  # face left by default
    _told: ClassVar[frozenset[str]] = frozenset()  # angles cautioned when the part was made

    def __new__(cls, *_: Any, **given: Any) -> Self:
        """Parameters are looked at by name before they are taken, so that a wrong one is told with the right ones."""
        unknown = sorted(given.keys() - {f.name for f in fields(cls) if f.init})
        if unknown:
            raise cls._no_parameter(given.get("name") or cls.__name__, unknown[0], given[unknown[0]])
        if not isinstance(given.get("expects"), State | None):
            raise ParameterError(
                "a part expects a state of polarization",
                got=f"{given.get('name') or cls.__name__}: expects = {given['expects']!r}",
                fix="expects=fa.H",
            )
        part = super().__new__(cls)
        # Of what was typed with a point the train warns, and of larger ones: it knows the part by its name.
        typed = {angle for angle in given.keys() & TYPED if isinstance(given[angle], int) and abs(given[angle]) <= pi}
        for angle in sorted(typed):
            checks.degrees_missed(given.get("name") or cls.__name__, angle, given[angle])
        object.__setattr__(part, "_told", frozenset(typed))
        return part

    @classmethod
    def _no_parameter(cls, label: str, wrong: str, value: Any) -> ParameterError:
        known = [f.name for f in fields(cls) if f.init and f.name not in COMMON]
        # An angle is an angle, however a part calls it.
        angles = [name for name in known if name in ANGLES and name != "retardance"] if wrong in TURNS else []
        likely = (*get_close_matches(wrong, [*known, "expects"], 1), *angles, *known, "name")[0]
        plain = value if isinstance(value, int | float | complex | str | tuple) else None
        return ParameterError(
            f"{cls.__name__} has the parameters {', '.join(known) or '(none)'}",
            got=f"{label}: no parameter '{wrong}'",
            fix=f"{likely}={plain!r}",
        )

    @property
    def expected(self) -> State | None:
        """The polarization that should arrive, declared or by the nature of the part; None if any will do."""
        return self.expects

    @property
    def label(self) -> str:
        """The name in messages."""
        return self.name or type(self).__name__

    def forward(self, wavelength: Scalar) -> Passages:
        """Passages (face in, face out) -> Passage, for light that meets the part as drawn."""
        return {}

    def passages(self, wavelength: Scalar) -> Passages:
        """All passages at a wavelength [m], the ways back included."""
        # A plan asks each part some ten times, and a part is frozen. A letter and a number may be equal, not the same.
        known = self.__dict__.get("_passages")
        if known is None or type(known[0]) is not type(wavelength) or known[0] != wavelength:
            forward = dict(self.forward(wavelength))
            backward = {(out, into): way.backward() for (into, out), way in forward.items()}
            known = (wavelength, backward | forward)
            self._keep(_passages=known)
        passages: Passages = known[1]
        return passages

    def parameters(self) -> dict[str, Any]:
        """The declared values, without the name."""
        own = {f.name: getattr(self, f.name) for f in fields(self) if f.name not in COMMON}
        return own | {"expects": self.expects}

    def changed(self, **changes: Any) -> Element:
        """A copy with some parameters changed; the same checks apply."""
        known = self.parameters()
        if {"centre_x", "centre_y"} & changes.keys() and "centre" in known:
            x, y = changes.get("centre", known["centre"])
            changes["centre"] = (changes.pop("centre_x", x), changes.pop("centre_y", y))
        for parameter in changes:
            if parameter not in known and parameter != "name":
                own = [name for name in known if name not in COMMON]
                likely = (*get_close_matches(parameter, known, 1), *own, "name")[0]
                raise ParameterError(
                    f"{type(self).__name__} has the parameters {', '.join(own) or '(none)'}",
                    got=f"{self.label}: no parameter '{parameter}'",
                    fix=f'"{self.label}.{likely}"',
                )
        return replace(self, **changes)

    def cautions(self, wavelength: Scalar) -> list[FastaxisWarning]:
        """What is possible but looks like a slip at a wavelength [m]; the train shows these."""
        given = {name: value for name, value in self.parameters().items() if name in ANGLES and name not in self._told}
        return [
            c
            for name, value in given.items()
            for c in checks.whole_radians(self.label, name, value, least=0.0 if name in TYPED else pi)
        ]

    def _keep(self, **checked: Any) -> None:
        """Put checked values into this frozen part, while it is being made."""
        for parameter, value in checked.items():
            object.__setattr__(self, parameter, value)

    @property
    def symbols(self) -> set[Any]:
        """The letters among the parameters."""
        return free_symbols(self.parameters().values())

    def __str__(self) -> str:
        return str(late("report.card", "card")(self))

    def _repr_html_(self) -> str:
        return str(late("report.card", "card_html")(self))


@dataclass(frozen=True, kw_only=True)
class ThroughElement(Element):
    """A part with a front and a back; light goes through."""

    faces: ClassVar[tuple[str, ...]] = ("front", "back")
    entry: ClassVar[str | None] = "front"
    exit: ClassVar[str | None] = "back"

    def laws(self, wavelength: Scalar) -> tuple[Law, ...]:
        """The laws from front to back, in the order the light meets them."""
        raise NotImplementedError

    def forward(self, wavelength: Scalar) -> Passages:
        return {("front", "back"): Passage(self.laws(wavelength))}
