"""How right the light is: ``python tests/benchmarks/bench_accuracy.py``, half a minute.

* the azimuthal engine beside closed forms: complex amplitudes of both components along a radius;
* the grid engine beside the azimuthal one: camera frames of S0 .. S3, each row twice the samples of the row before on
  the same window, with the order the error falls by and the one to be expected;
* single precision beside double;
* radii, peaks and shares as works print them, beside both engines.

An error is the largest anywhere, as a share of the peak. What the library says of its own answer stands beside it: the
azimuthal engine's estimate, the grid's warnings.
"""

from __future__ import annotations

import math
import warnings
from collections.abc import Callable
from dataclasses import dataclass, replace

import numpy as np
from closed_forms import airy, laguerre, lommel, matrix, on_axis_behind_hole, vortex, vortex_by_kummer
from printed_values import printed_rows
from timing import machine, seconds, table

from fastaxis.elements import Aperture, Camera, FreeSpace, Laser, Lens, QPlate, SpiralPlate
from fastaxis.engines import propagate
from fastaxis.errors import SamplingError, SamplingWarning
from fastaxis.light import FlatTop, Gaussian, H, L, LaguerreGauss, PlaneWave, Raster
from fastaxis.plan import Grid, make_plan
from fastaxis.train import Train
from fastaxis.units import mm, nm, um

WAVELENGTH, WAIST, RADIUS, FOCAL = 632.8 * nm, 0.5 * mm, 1 * mm, 300 * mm
NEAR, FAR = 100 * mm, 20.0
FOCUS = WAVELENGTH * FOCAL / (np.pi * WAIST)
PLACES = {  # sections behind the first part, their ray matrix, how far out to look
    "near": ([FreeSpace(NEAR)], matrix(NEAR), 2 * mm),
    "far": ([FreeSpace(FAR)], matrix(FAR), 4 * FAR / FOCAL * FOCUS),
    "focus": ([Lens(focal=FOCAL), FreeSpace(FOCAL)], matrix(("lens", FOCAL), FOCAL), 4 * FOCUS),
}
AT_H, AT_L, AT_R = np.array([1, 0]), np.array([1, 1j]) / np.sqrt(2), np.array([1, -1j]) / np.sqrt(2)
DETUNED = 2.4
WINDOW, ROUNDINGS = 8 * mm, 1e-12  # frames of transforms of up to 2048 samples are no better
SCATTER = 0.3  # a fitted order over three doublings scatters by so much where rims fall at random


@dataclass(frozen=True)
class Case:
    """Light behind some parts, known in closed form: ``exact(r)`` gives (Ex, Ey) on the axis of x."""

    name: str
    where: str
    reference: str
    mode: object
    parts: list
    exact: Callable
    reach: float
    state: object = H
    power: float = 1.0

    def field(self, engine, grid=None, precision="double"):
        laser = Laser(mode=self.mode, power=1.0, state=self.state, name="laser")
        train = Train(wavelength=WAVELENGTH).along(laser, *self.parts, Camera(pixel=5 * um, shape=(8, 8), name="cam"))
        return propagate(make_plan(train, "cam", engine=engine, grid=grid).with_precision(precision))[0]


def of_modes(where):
    sections, rays, reach = PLACES[where]
    for p, l in ((0, 0), (0, 1), (1, 2), (3, 0), (2, -3), (5, 5)):
        mode = LaguerreGauss(p, l, WAIST) if p or l else Gaussian(waist=WAIST)
        name = f"LG p = {p}, l = {l}" if p or l else "Gaussian"

        def exact(r, p=p, l=l):
            return np.outer(AT_H, laguerre(p, l, WAIST, WAVELENGTH, rays, r))

        yield Case(name, where, "Siegman 1986", mode, sections, exact, reach)


def of_vortices(where):
    sections, rays, reach = PLACES[where]
    ring = lambda charge, r: vortex(charge, WAIST, WAVELENGTH, rays, r)  # noqa: E731 - a formula
    spot = lambda r: laguerre(0, 0, WAIST, WAVELENGTH, rays, r)  # noqa: E731 - a formula
    for charge in (1, 2, 4, 5, 12, 20):

        def twisted(r, charge=charge):
            return np.outer(AT_H, ring(charge, r))

        parts = [SpiralPlate(charge=charge), *sections]
        yield Case(f"spiral plate {charge}", where, "Bessel difference", Gaussian(waist=WAIST), parts, twisted, reach)
    for q, retardance in ((0.5, np.pi), (0.5, DETUNED), (1, DETUNED)):

        def converted(r, q=q, half=retardance / 2):
            return np.cos(half) * np.outer(AT_L, spot(r)) - 1j * np.sin(half) * np.outer(AT_R, ring(2 * q, r))

        name = f"q-plate {q}" + ("" if retardance == np.pi else f", {retardance} rad")
        parts = [QPlate(q=q, retardance=retardance), *sections]
        yield Case(name, where, "Bessel difference", Gaussian(waist=WAIST), parts, converted, reach, L)


def of_holes():
    lit, (_, _, reach) = PlaneWave(area=np.pi * RADIUS**2), PLACES["near"]
    sections, _, _ = PLACES["focus"]
    pattern = lambda r: np.outer(AT_H, airy(RADIUS, FOCAL, WAVELENGTH, r))  # noqa: E731 - a formula
    yield Case(
        "hole, evenly lit",
        "focus",
        "Airy",
        lit,
        [Aperture(radius=RADIUS), *sections],
        pattern,
        4 * WAVELENGTH * FOCAL / RADIUS,
    )
    for zones in (1, 2):
        z = RADIUS**2 / WAVELENGTH / zones
        fresnel = lambda r, z=z: np.outer(AT_H, lommel(RADIUS, z, WAVELENGTH, r))  # noqa: E731 - a formula
        yield Case(
            "hole, evenly lit",
            f"{zones} zones",
            "Lommel U1, U2",
            lit,
            [Aperture(radius=RADIUS), FreeSpace(z)],
            fresnel,
            reach,
        )
    hole = 0.4 * mm
    for where in PLACES:
        sections, rays, _ = PLACES[where]
        cut = lambda r, rays=rays: np.outer(AT_H, on_axis_behind_hole(hole, WAIST, WAVELENGTH, rays))  # noqa: E731 - a formula
        share, parts = -np.expm1(-2 * (hole / WAIST) ** 2), [Aperture(radius=hole), *sections]
        yield Case(
            "hole in a Gaussian", f"{where}, axis", "elementary", Gaussian(waist=WAIST), parts, cut, 0.0, H, share
        )


def beside_closed_forms():
    rows = []
    cases = [*(case for where in PLACES for of in (of_modes, of_vortices) for case in of(where)), *of_holes()]
    for case in cases:
        field = case.field("azimuthal")
        r = np.linspace(0, case.reach, 201)[1:] if case.reach else np.zeros(1)
        exact = case.exact(r)
        error = abs(field.at(r, np.zeros(1))[:, 0] - exact).max() / abs(exact).max()
        nodes, estimate = len(field.harmonics.profile.nodes), field.error(r[-1] or 1 * um)
        power = field.power / case.power - 1
        rows.append((case.name, case.where, case.reference, nodes, f"{error:.0e}", f"{estimate:.0e}", f"{power:+.0e}"))
    head = ("case", "where", "reference", "nodes", "error", "own estimate", "power error")
    table("azimuthal engine beside closed forms: amplitude, share of its peak", head, rows)
    print(f"  the reference itself: Bessel difference and Kummer function differ by {_forms_apart():.0e} of the peak\n")


def _forms_apart():
    found = []
    for _, rays, reach in PLACES.values():
        for charge in (1, 2, 5):
            r = np.linspace(0, reach, 13)[1:]
            ours = vortex(charge, WAIST, WAVELENGTH, rays, r)
            exact = [vortex_by_kummer(charge, WAIST, WAVELENGTH, rays, one) for one in r]
            found.append(abs(ours - exact).max() / abs(ours).max())
    return max(found)


# Why an error falls as it does. The waves of a sampled field repeat at every multiple of 1/pitch along either axis, and
# what the repeats put into the band is the error. About a singularity waves fall only as f^-2, but the samples next to it
# are such that the repeats leave nothing of the powers of f up to the fourth: with those of the sum itself, order 7. Near
# by, light that comes to the rim of the picture is steep, and coarse samples are not there yet.
SPECTRAL = "all of it within band and window: faster than any power"
SINGULAR = "singularity: sums over the samples about it are integrals of polynomials up to degree 4; 8 if it is even"
EDGE = "hard edge: each rim sample's share is right, its place in the sample is not"


def of_grid():
    near, far, focus = ({case.name: case for of in (of_modes, of_vortices) for case in of(where)} for where in PLACES)
    holes = {(case.name, case.where): case for case in of_holes()}
    smooth, rough, close, steep = (24, 32, 48, 64, 128), (256, 512, 1024, 2048), (512, 1024, 2048), (128, 256, 512)
    for case in (near["Gaussian"], focus["Gaussian"], near["LG p = 1, l = 2"], far["LG p = 2, l = -3"]):
        yield case, smooth, math.inf, SPECTRAL
    for case in (near["spiral plate 1"], near["spiral plate 2"], near["spiral plate 4"]):
        yield case, close, 7, SINGULAR
    for case in (focus["spiral plate 1"], focus["spiral plate 2"], focus["spiral plate 4"], focus["spiral plate 5"]):
        yield case, steep, 7, SINGULAR
    for case in (far["q-plate 0.5, 2.4 rad"], focus["q-plate 1, 2.4 rad"]):
        yield case, steep, 7, SINGULAR
    for name, ring in (("spiral plate 12", 6 * FOCUS), ("spiral plate 20", 10 * FOCUS)):
        yield replace(focus[name], reach=1.3 * ring), rough, 7, SINGULAR
    for key in (("hole, evenly lit", "focus"), ("hole, evenly lit", "2 zones"), ("hole in a Gaussian", "near, axis")):
        yield holes[key], rough, 1.5, EDGE
    lit, cut = FlatTop(radius=RADIUS), holes["hole, evenly lit", "focus"]
    yield replace(cut, name="flat top, no hole", mode=lit, parts=cut.parts[1:]), rough, 1.5, EDGE


def raster_for(case):
    return Raster((case.reach or 1 * mm) / 48, (64, 64))


def told(case, grid, precision="double"):
    """(Stokes images, power, whether the library warned); None where it refuses the grid."""
    with warnings.catch_warnings(record=True) as said:
        warnings.simplefilter("always", SamplingWarning)
        try:
            field = case.field("grid", grid, precision)
        except SamplingError:
            return None
        return field.stokes_on(raster_for(case)), field.power, "warned" if said else ""


def beside_each_other():
    rows, reasons = [], {}
    for case, counts, expected, why in of_grid():
        reasons.setdefault(why, expected)
        best, errors = case.field("azimuthal"), []
        exact = best.stokes_on(raster_for(case))
        for count in counts:
            name = f"{case.name}, {case.where}" if count == counts[0] else ""
            found = told(case, Grid(count, WINDOW))
            if found is None:
                rows.append((name, count, "refused", "", "", "", ""))
                continue
            image, power, said = found
            errors.append((np.log(count), np.log(abs(image - exact).max() / exact[0].max())))
            error, off = np.exp(errors[-1][1]), power / best.power - 1
            falling = len(errors) > 1 and error > ROUNDINGS
            order = f"{-np.divide(*np.subtract(errors[-1], errors[-2])[::-1]):.1f}" if falling else ""
            rows.append((name, count, f"{error:.0e}", f"{off:+.0e}", order, expected if order else "", said))
        if expected < math.inf:
            slope = -np.polyfit(*zip(*(one for one in errors if np.exp(one[1]) > ROUNDINGS), strict=True), 1)[0]
            rows.append(("", "", "", "all:", f"{slope:.1f}", expected, "LOW" if slope < expected - SCATTER else ""))
    head = ("case", "samples", "error", "power error", "order", "expected", "library")
    table(f"grid beside azimuthal engine: frames of S0 .. S3, window {WINDOW / mm:g} mm", head, rows)
    print("\n".join(f"  {expected:>4}: {why}" for why, expected in reasons.items()) + "\n")


def single_precision():
    rows = []
    for case, counts, _, _ in of_grid():
        count = min(2 * counts[-1], 1024)
        double, single = (told(case, Grid(count, WINDOW), name) for name in ("double", "single"))
        error = abs(single[0] - double[0]).max() / double[0][0].max()
        rows.append((f"{case.name}, {case.where}", count, f"{error:.0e}", f"{single[1] / double[1] - 1:+.0e}"))
    table(
        "single beside double precision: frames (24 bits are 6e-8)", ("case", "samples", "error", "power error"), rows
    )


def main():
    print(machine())
    blocks = (beside_closed_forms, beside_each_other, single_precision, printed_rows)
    took = [seconds(block)[0] for block in blocks]
    print("took " + ", ".join(f"{one:.0f}" for one in took) + f" s; {sum(took):.0f} s in all")


if __name__ == "__main__":
    main()
