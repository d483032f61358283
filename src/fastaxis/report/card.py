"""The card of a part: what it is, how it is set, what it does to light, and under which signs that is said."""

from __future__ import annotations

import re
from collections.abc import Iterator
from html import escape
from typing import Any

from fastaxis.conventions import View, stamp
from fastaxis.elements import Camera, Element, Laser, ThroughElement
from fastaxis.elements.splitting import Splitter
from fastaxis.laws import AxisLaw
from fastaxis.maths import is_symbolic
from fastaxis.report.deeds import deeds
from fastaxis.report.echo import echoed, length, percent
from fastaxis.report.states_text import named

__all__ = ["card", "card_html", "card_rows"]

KINDS = {
    "HalfWavePlate": "half-wave plate",
    "QuarterWavePlate": "quarter-wave plate",
    "QPlate": "q-plate",
    "Retarder": "wave plate",
    "FaradayRotator": "Faraday rotator",
    "NeutralDensity": "neutral-density filter",
    "Annulus": "ring aperture",
    "DovePrism": "Dove prism",
    "KMirror": "K-mirror",
    "PickOff": "pick-off plate",
    "Rhomb": "Fresnel rhomb",
}
# Any wavelength does for a part without design=: its laws don't depend on it.
ANY_WAVELENGTH = 1e-6

Rows = list[tuple[str, str]]


def kind(element: Element) -> str:
    """The trade's word for a part.

    >>> from fastaxis.elements import FreeSpace
    >>> kind(FreeSpace(0.5))
    'free space'
    """
    name = type(element).__name__
    return KINDS.get(name) or re.sub(r"(?<=[a-z])(?=[A-Z])", " ", name).lower()


def card_rows(element: Element, view: View = View.RECEIVER) -> list[tuple[str, Rows]]:
    """The card as data: sections of (heading, rows of (what, text)); a text may have several lines."""
    sections = [("set to", list(echoed(element, view)))]
    wavelength = getattr(element, "design", None) or ANY_WAVELENGTH
    seen: dict[Any, list[str]] = {}
    for (into, out), passage in element.forward(wavelength).items():
        seen.setdefault(passage, []).append(f"{into} to {out}")
    for passage, ways in seen.items():
        rows = list(deeds(passage, view))
        # Fixed on the table, or turning the picture too: nobody turns it about the beam for the polarization alone.
        if not isinstance(element, ThroughElement) or "roll" in element.parameters():
            rows = [(what, text) for what, text in rows if what != "turning"]
        sections.append((", ".join(ways), rows))
    if isinstance(element, Splitter):
        sections.append(("all ports", [("power", _port_sums(element, wavelength))]))
    if ghosts := getattr(element, "ghosts", None):
        sections.append(("ghosts", [(what, f"{percent(share)} {where}") for what, share, where in ghosts]))
    sections += _ends(element, view)
    return [(heading, rows) for heading, rows in sections if rows]


def _port_sums(splitter: Splitter, wavelength: Any) -> str:
    """Share of the power of p and of s light that leaves by the two ports together."""
    into_front = [way.laws[0] for (into, _), way in splitter.forward(wavelength).items() if into == "front"]
    p = sum(law.along.power for law in into_front if isinstance(law, AxisLaw))
    s = sum(law.across.power for law in into_front if isinstance(law, AxisLaw))
    return "all of it leaves" if (p, s) == (1, 1) else f"{percent(p)} of p and {percent(s)} of s leaves"


def _ends(element: Element, view: View) -> Iterator[tuple[str, Rows]]:
    """Where light begins or ends."""
    if isinstance(element, Laser):
        yield "gives", list(_light(element, view))
    elif isinstance(element, Camera):
        ny, nx = element.shape
        yield "takes", [("view", f"{length(nx * element.pixel)} x {length(ny * element.pixel)}"), *_TAKEN]
    elif element.exit is None:
        yield "takes", _TAKEN


_TAKEN = [("power", "all light that reaches it ends here")]


def _light(laser: Laser, view: View) -> Iterator[tuple[str, str]]:
    for component in laser.source.components:
        state = component.beam.state
        light = "several states" if state is None else (state.label if state.symbols else named(state.jones, view))
        shapes = " + ".join(type(term.mode).__name__ for term in component.beam.terms)
        line = "" if component.wavelength is None else f" at {component.wavelength * 1e9:.6g} nm"
        yield percent(component.weight), f"{shapes}, {light or 'state with letters'}{line}"
    yield "caution", "enclose the beam; follow your local rules and your laser safety officer"


def card(element: Element, view: View = View.RECEIVER) -> str:
    """The card as text, for a terminal.

    >>> from fastaxis.elements import Rotator
    >>> print(card(Rotator(angle=0.5235987755982988, name="quartz")))  # doctest: +ELLIPSIS
    quartz: rotator
      set to
        angle         30 deg
    ...
    """
    lines = [_title(element)]
    for heading, rows in card_rows(element, view):
        lines.append(f"  {heading}")
        for what, text in rows:
            first, *more = text.split("\n")
            lines.append(f"    {what:<13} {first}")
            lines += [" " * 18 + line for line in more]
    return "\n".join([*lines, f"  {stamp(view)}"])


def _title(element: Element) -> str:
    at = getattr(element, "design", None)
    told = "" if at is None or is_symbolic(at) else f" at its design wavelength {at * 1e9:.6g} nm"
    return f"{element.label}: {kind(element)}{told}" if element.name else f"{kind(element)}{told}"


def card_html(element: Element, view: View = View.RECEIVER) -> str:
    """The card as HTML, for a notebook."""
    body = []
    for heading, rows in card_rows(element, view):
        body.append(f'<tr><th colspan="2" style="text-align:left">{escape(heading)}</th></tr>')
        body += [
            f'<tr><td style="text-align:left">{escape(what)}</td>'
            f'<td style="text-align:left"><span style="white-space:pre">{escape(text)}</span></td></tr>'
            for what, text in rows
        ]
    return (
        f"<table><caption>{escape(_title(element))}</caption><tbody>{''.join(body)}</tbody></table>"
        f"<small>{escape(stamp(view))}</small>"
    )
