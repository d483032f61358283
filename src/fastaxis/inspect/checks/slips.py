"""Values that are possible but look like slips: missing units, bare degrees, a diameter for a radius."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import fields
from typing import Any

from fastaxis.elements.base import Element
from fastaxis.elements.camera import Camera
from fastaxis.elements.laser import Laser
from fastaxis.elements.lens import Lens
from fastaxis.inspect.bench import Bench
from fastaxis.inspect.finding import Finding, Severity, from_message
from fastaxis.inspect.words import degrees, length, watts
from fastaxis.light import State
from fastaxis.maths import is_symbolic
from fastaxis.train.lab_values import ANGLES

__all__ = ["slips"]

DIAMETERS = (25.4e-3, 50.8e-3)  # of one-inch and two-inch optics [m]
SHORTEST_FOCAL = 1.5e-3  # [m]; shorter ones are lenses of objectives and fibres
PIXELS = (0.7e-6, 60e-6)  # [m]
USUAL_WAVELENGTHS = (200e-9, 12e-6)  # [m]


def slips(bench: Bench) -> Iterator[Finding]:
    """Cautions of the parts themselves, and values no drawer holds."""
    for name, element in bench.train.elements.items():
        yield from _cautions(element, bench.wavelength)
        yield from _whole_radians(name, element)
        yield from _sizes(element)
    low, high = USUAL_WAVELENGTHS
    if not low <= bench.wavelength <= high:
        yield _slip(
            bench.train.name, "wavelength", got=f"wavelength {length(bench.wavelength)}",
            rule="laser lines lie between 200 nm and 12 µm", fix='train.with_changes({"wavelength": 532*nm})',
        )  # fmt: skip


def _slip(element: str, check: str, *, got: str, rule: str, fix: str, severity: Severity = Severity.MEDIUM) -> Finding:
    return Finding(severity=severity, check=check, element=element, rule=rule, got=f"{element}: {got}", fix=fix)


def _cautions(element: Element, wavelength: float) -> Iterator[Finding]:
    for caution in element.cautions(wavelength):
        # Plates off their design wavelength are told with the error it makes, angles of whole radians with all others.
        if getattr(element, "design", None) is None and "is in radians" not in caution.rule:
            yield from_message(caution, severity=Severity.MEDIUM, check="slip", element=element.name)


def _whole_radians(name: str, element: Element) -> Iterator[Finding]:
    """Angles of whole radians: 3 written for 3 deg; multiples of pi are never whole."""
    for parameter, value, change in _angles(element):
        if is_symbolic(value) or not isinstance(value, int | float) or value == 0 or value != round(value):
            continue
        yield _slip(
            name, "bare degrees", got=f"{parameter} = {value:g} rad = {degrees(value)}",
            rule="angles are in radians, and whole numbers of radians are rare",
            fix=f'train.with_changes({{"{name}.{change}}})',
        )  # fmt: skip


def _angles(element: Element) -> Iterator[tuple[str, Any, str]]:
    """(name, value, the change that makes degrees of it) of each angle of a part and of the states it holds."""
    for field in fields(element):
        value = getattr(element, field.name)
        if isinstance(value, State):
            yield from _of_state(field.name, value)
        elif field.name in ANGLES and not is_symbolic(value) and isinstance(value, int | float):
            yield field.name, value, f'{field.name}": {value:g}*deg'


def _of_state(parameter: str, state: State) -> Iterator[tuple[str, Any, str]]:
    azimuth, ellipticity = state.azimuth, state.ellipticity
    made = f"fa.elliptical({azimuth}*deg, {ellipticity})" if ellipticity != 0 else f"fa.linear({azimuth}*deg)"
    yield f"{parameter}.azimuth", azimuth, f'{parameter}": {made}'


def _sizes(element: Element) -> Iterator[Finding]:
    if isinstance(element, Lens):
        yield from _of_lens(element)
    if isinstance(element, Camera) and not PIXELS[0] <= element.pixel <= PIXELS[1]:
        yield _slip(
            element.name, "unit", got=f"pixel {length(element.pixel)}", rule="pixels of cameras are 0.7 to 60 µm wide",
            fix=f'train.with_changes({{"{element.name}.pixel": 3.45*um}})',
        )  # fmt: skip
    if isinstance(element, Laser) and float(element.power) < 1e-6:
        yield _slip(
            element.name, "unit", got=f"power {watts(float(element.power))}", rule="lasers give a microwatt or more",
            fix=f'train.with_changes({{"{element.name}.power": 5*mW}})', severity=Severity.LOW,
        )  # fmt: skip


def _of_lens(lens: Lens) -> Iterator[Finding]:
    focal = float(lens.focal)
    if abs(focal) < SHORTEST_FOCAL:
        yield _slip(
            lens.name, "unit", got=f"focal length {length(focal)}", rule="lenses of a bench are longer than 1.5 mm",
            fix=f'train.with_changes({{"{lens.name}.focal": {focal * 1e6:.4g}*mm}})',
        )  # fmt: skip
    if lens.radius is not None and any(abs(float(lens.radius) - size) < 1e-5 for size in DIAMETERS):
        yield _slip(
            lens.name, "diameter for radius", got=f"radius {length(float(lens.radius))}",
            rule="25.4 and 50.8 mm are the diameters of one-inch and two-inch optics; radius is half of it",
            fix=f'train.with_changes({{"{lens.name}.radius": {float(lens.radius) * 500:.4g}*mm}})',
        )  # fmt: skip
