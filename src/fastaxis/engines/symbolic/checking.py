"""A form beside the numeric laws, at random places and random values of the letters."""

from __future__ import annotations

import math
from dataclasses import dataclass, fields, is_dataclass
from typing import TYPE_CHECKING, Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.engines.symbolic.paths import laws_at
from fastaxis.laws import AxisLaw, CircularLaw, Flip, Law, ScalarLaw, TravelLaw, Turn
from fastaxis.maths import NUMBERS
from fastaxis.train.letters import letters

if TYPE_CHECKING:
    from fastaxis.engines.symbolic.form import Form

__all__ = ["Check", "check"]

EPS = 2.0**-52


@dataclass(frozen=True)
class Check:
    """Largest deviation of a form from the numeric engine.

    Parameters
    ----------
    roundings : largest deviation of a Stokes parameter, in units of 2^-52 of the largest S0 met.
    points : at how many places and values.
    beside : what it was compared with.
    """

    roundings: float
    points: int
    beside: str

    def __str__(self) -> str:
        return f"largest deviation {self.roundings:.2g} roundings at {self.points} random points, beside {self.beside}"


def check(form: Form, *, points: int = 24, seed: int = 1) -> Check:
    """Compare the Stokes parameters of a form with numbers, at random admissible values of its letters.

    A train of thin parts is compared with the product of their matrices; one in which light travels, with the
    numeric engine, whose own error then counts too.
    """
    generator = np.random.default_rng(seed)
    routes = form.train.routes(form.target)
    # Of a loop the routes are only the first trips.
    travels = form.looped or any(isinstance(law, TravelLaw) for route in routes for _, law in route.steps())
    numeric = _propagated if travels else _direct
    function = form.to_function("stokes", absolute=True)
    worst, scale = 0.0, 0.0
    for _ in range(points):
        values = {letter: _admissible(form.train, letter, generator) for letter in sorted(form.letters, key=str)}
        train = form.train.with_values(values) if values else form.train
        radius = _radius(train, form.target)
        r, phi = radius * generator.uniform(0.1, 1.2), generator.uniform(0, 2 * math.pi)
        wanted = numeric(train, form.target, r, phi)
        exact = np.asarray(function({**values, "r": r, "phi": phi}), complex).real.ravel()
        worst, scale = max(worst, float(np.abs(wanted - exact).max())), max(scale, float(wanted[0]))
    beside = "the numeric engine" if travels else "the product of the parts' numeric matrices"
    return Check(worst / (EPS * scale), points, beside)


def _radius(train: Any, target: str) -> float:
    """Radius [m] the bare source would have at the target."""
    route = train.routes(target)[0]
    component = route.laser.source.components[0]
    mode = component.beam.terms[0].mode
    if mode.infinite:
        return 1e-3
    section = TravelLaw()
    for _, law in route.steps():
        if isinstance(law, TravelLaw):
            section = section.then(law)
        elif isinstance(law, ScalarLaw) and law.vergence != 0:
            section = section.then(TravelLaw.lens(law.vergence))
    moments = mode.moments(component.wavelength_or(train.wavelength))
    spread = section.a**2 * moments.x2 + 2 * section.a * section.b * moments.xt
    if section.b:
        spread += section.b**2 * moments.t2
    # A hard edge has no finite spread of angles.
    return 2 * math.sqrt(spread) if math.isfinite(spread) else 1e-3


def _propagated(train: Any, target: str, r: float, phi: float) -> NDArray[np.float64]:
    x, y = np.array([r * math.cos(phi)]), np.array([r * math.sin(phi)])
    return np.asarray(sum(_stokes(*field.at(x, y)[:, 0, 0]) for field in train.field(target)))


def _stokes(ex: complex, ey: complex) -> NDArray[np.float64]:
    cross, power = np.conj(ex) * ey, (abs(ex) ** 2, abs(ey) ** 2)
    return np.array([sum(power), power[0] - power[1], 2 * cross.real, -2 * cross.imag])


# Where a letter is drawn from [SI units], by the parameter it stands in; all others from 0.05 to 0.95.
RANGES = {
    "wavelength": (4e-7, 8e-7), "design": (4e-7, 8e-7), "waist": (0.3e-3, 1e-3), "power": (1e-3, 1e-2),
    "radius": (2e-3, 1e-2), "extinction": (10.0, 1e3), "centre": (-1e-4, 1e-4),
    "focal": (0.2, 1.0), "distance": (0.1, 1.0), "area": (1e-6, 1e-5),
    "ellipticity": (-0.7, 0.7), "x": (-1e-4, 1e-4), "y": (-1e-4, 1e-4),
}  # fmt: skip
STEPS = {"q": 0.5, "charge": 1.0}


def _admissible(train: Any, letter: Any, generator: np.random.Generator) -> float:
    """A random value that the part with this letter accepts."""
    places = {name for name, value in _parameters(train) if letter in letters(value)}
    for name, step in STEPS.items():
        if name in places:
            return step * float(generator.integers(-3, 4) or 1)
    if letter.is_integer:
        return float(generator.integers(1, 4))
    low, high = next((RANGES[name] for name in RANGES if name in places), (0.05, 0.95))
    return float(generator.uniform(low, high))


def _parameters(train: Any) -> list[tuple[str, Any]]:
    """(name, value) of every parameter of the train, those of states and modes at any depth included."""
    found = [("wavelength", train.wavelength)]
    for element in train.elements.values():
        found += [pair for name, value in element.parameters().items() for pair in _leaves(name, value)]
    return found


def _leaves(name: str, value: Any) -> list[tuple[str, Any]]:
    if isinstance(value, tuple | list):
        return [pair for item in value for pair in _leaves(name, item)]
    if is_dataclass(value):
        return [pair for f in fields(value) for pair in _leaves(f.name, getattr(value, f.name))]
    return [(name, value)]


def _direct(train: Any, target: str, r: float, phi: float) -> NDArray[np.float64]:
    total, routes = np.zeros(4), train.routes(target)
    for name in dict.fromkeys(route.source_name for route in routes):
        ways = [route for route in routes if route.source_name == name]
        source = ways[0].laser.source
        for component in source.components:
            wavelength = component.wavelength_or(train.wavelength)
            vectors = [
                _along([law for _, law in laws_at(train, route, wavelength)], component.beam, wavelength, r, phi)
                for route in ways
            ]
            ex, ey = np.sum(vectors, axis=0)
            total += float(component.weight) * float(source.power) * _stokes(ex, ey)
    return total


def _along(laws: list[Law], beam: Any, wavelength: float, r: float, phi: float) -> NDArray[Any]:
    """(Ex, Ey) behind some laws. Places are followed from the port back to the source, so that reflections find the
    place a ray started from.
    """
    x, y = r * math.cos(phi), r * math.sin(phi)
    places = []
    for law in reversed(laws):
        if isinstance(law, Flip):
            x, y = (-x, y) if law.axis == "x" else (x, -y)
        if isinstance(law, Turn):
            cosine, sine = math.cos(law.angle), math.sin(law.angle)
            x, y = cosine * x + sine * y, cosine * y - sine * x
        places.append((x, y))
    vector = np.asarray(beam.field(x, y, wavelength), complex)
    for law, (px, py) in zip(laws, reversed(places), strict=True):
        vector = _matrix(law, px, py, wavelength) @ vector
    return vector


def _matrix(law: Law, x: float, y: float, wavelength: float) -> NDArray[Any]:
    if isinstance(law, Flip | Turn):
        return np.eye(2, dtype=complex)
    if isinstance(law, AxisLaw | CircularLaw):
        cx, cy = law.centre if isinstance(law, AxisLaw) else (0.0, 0.0)
        phi = math.atan2(y - cy, x - cx)
        return np.array(law.linear(NUMBERS, phi, x - cx, y - cy), complex)
    assert isinstance(law, ScalarLaw)
    x, y = x - law.centre[0], y - law.centre[1]
    k = 2 * math.pi / wavelength
    phase = law.charge * math.atan2(y, x) - k * law.vergence * (x * x + y * y) / 2
    phase += k * (law.tilt[0] * x + law.tilt[1] * y)
    clear = 1.0 if law.stop is None else float(law.stop.depth(x, y) > 0)
    return np.eye(2) * complex(law.transmission.value(NUMBERS)) * clear * complex(math.cos(phase), math.sin(phase))
