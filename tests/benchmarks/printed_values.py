"""Radii, peaks and shares of propagated light as works print them, beside what either engine makes of them.

Numbers are those of the works named, from memory, recomputed from the formulas with an arbitrary-precision library.
"""

import math

import numpy as np
from closed_forms import laguerre, matrix
from scipy.optimize import brentq
from timing import table

from fastaxis.elements import Aperture, Camera, FreeSpace, KnifeEdge, Laser, Lens, QPlate, Slit, SpiralPlate
from fastaxis.engines import propagate
from fastaxis.light import Gaussian, H, L, LaguerreGauss, PlaneWave
from fastaxis.plan import make_plan
from fastaxis.train import Train
from fastaxis.units import cm, mm, nm, um

WAVELENGTH, WAIST = 632.8 * nm, 0.5 * mm
RAYLEIGH = np.pi * WAIST**2 / WAVELENGTH
GAUSS, ON_AXIS = Gaussian(waist=WAIST), np.zeros(1)
NODES, WEIGHTS = np.polynomial.legendre.leggauss(200)


def light(engine, mode, *parts, state=H):
    laser = Laser(mode=mode, power=1.0, state=state, name="laser")
    train = Train(wavelength=WAVELENGTH).along(laser, *parts, Camera(pixel=10 * um, shape=(64, 64), name="cam"))
    return propagate(make_plan(train, "cam", engine=engine))[0]


def irradiance(field, r):
    return (abs(field.at(np.atleast_1d(r), ON_AXIS)) ** 2).sum(axis=0)[0]


def extreme(field, guess, share=0.2):
    """(radius, irradiance) of the largest or smallest near a guess: where a polynomial through 25 places is flat.

    A search for the largest value knows its place to the root of the rounding only.
    """
    curve = np.polynomial.Chebyshev.interpolate(
        lambda r: irradiance(field, r), 24, domain=[guess * (1 - share), guess * (1 + share)]
    )
    flat = curve.deriv().roots()
    flat = flat[(abs(flat.imag) < 1e-6 * guess) & (abs(flat.real - guess) < share * guess)].real
    place = flat[abs(flat - guess).argmin()]
    return place, curve(place)


def inside(field, radius, other=None):
    """Power within a radius, or the amplitude that another shape takes, by Gauss-Legendre."""
    r, weights = radius * (NODES + 1) / 2, 2 * np.pi * WEIGHTS * radius / 2
    if other is None:
        return np.sum(irradiance(field, r) * r * weights)
    return np.sum(field.at(r, ON_AXIS)[0, 0] * other(r).conj() * r * weights)


def gaussian(engine):
    """Kogelnik and Li, Appl. Opt. 5, 1550 (1966); Siegman, Lasers (1986), section 17.1."""
    field, r = light(engine, GAUSS, FreeSpace(1.0)), 0.3 * mm
    on_axis, beside = field.at(np.array([0, r]), ON_AXIS)[0, 0]
    peak = np.sqrt(2 / np.pi) / WAIST
    yield "Gaussian, 1 m: w, mm", "0.64209854", np.sqrt(2 / np.pi) / abs(on_axis) / mm
    yield "R, m", "2.54044722", np.pi * r**2 / WAVELENGTH / np.angle(beside / on_axis)
    yield "Gouy phase", "0.67821053", -np.angle(on_axis)
    yield "Re u(0.3 mm)", "0.54865390", (beside / peak).real
    yield "Im u(0.3 mm)", "-0.30139358", (beside / peak).imag
    for share, printed in ((0.5, "0.39346934"), (1, "0.86466472"), (1.5, "0.98889100")):
        yield f"share within {share} w", printed, light(engine, GAUSS, Aperture(radius=share * WAIST)).power


def focused(engine):
    """S. A. Self, Appl. Opt. 22, 658 (1983)."""

    def square(before, behind):  # of the radius
        field = light(engine, GAUSS, FreeSpace(before), Lens(focal=0.2), FreeSpace(behind))
        return 2 / np.pi / irradiance(field, 0.0)[0]

    cases = ((1.0, "0.21467589", "67.721600"), (0.2, None, "80.570598"), (1e-9, "0.19493814", None))
    for before, place, waist in (*cases, (0.2 + RAYLEIGH, "0.21611412", None)):
        # w^2 is a parabola in the distance.
        parabola = np.polynomial.Polynomial.fit(
            z := np.array([0.19, 0.21, 0.23]), [square(before, one) for one in z], 2
        )
        found = parabola.deriv().roots()[0]
        if place:
            yield f"lens, s = {before:.3g} m: s', m", place, found
        if waist:
            yield f"lens, s = {before:.3g} m: w', um", waist, np.sqrt(parabola(found)) / um


def laguerre_rings(engine):
    """L. Allen et al., Phys. Rev. A 45, 8185 (1992)."""
    width = 0.64209854 * mm
    for l, place, height in ((1, "0.70710678", "0.23419933"), (3, "1.22474487", "0.14262945")):
        found = extreme(light(engine, LaguerreGauss(0, l, WAIST), FreeSpace(1.0)), float(place) * width)
        yield f"LG l = {l}, 1 m: ring / w", place, found[0] / width
        yield "peak w^2", height, found[1] * width**2


def airy_pattern(engine):
    """Born and Wolf, Principles of Optics, 7th ed. (1999), section 8.5.2, table 8.2."""
    radius, focal = 1 * mm, 300 * mm
    field = light(
        engine, PlaneWave(area=np.pi * radius**2), Aperture(radius=radius), Lens(focal=focal), FreeSpace(focal)
    )
    unit, top = WAVELENGTH * focal / (2 * radius), irradiance(field, 0.0)[0]

    def signed(u):
        beside, on_axis = field.at(np.array([u * unit, 0.0]), ON_AXIS)[0, 0]
        return (beside / on_axis * np.exp(-1j * np.pi / WAVELENGTH / focal * (u * unit) ** 2)).real

    shares = ("0.83778487", "0.90993054", "0.93764747", "0.95231917")
    for zero, share in zip(("1.21966989", "2.23313059", "3.23831548", "4.24106286"), shares, strict=True):
        yield "Airy, dark ring v/pi", zero, brentq(signed, float(zero) - 0.1, float(zero) + 0.1, xtol=1e-13)
        yield "power within", share, inside(field, float(zero) * unit)
    for place, height in (("1.634719", "0.01749786"), ("2.679292", "0.00415800"), ("3.698710", "0.00160064")):
        ring, peak = extreme(field, float(place) * unit, 0.1)
        yield "Airy, bright ring v/pi", place, ring / unit
        yield "peak", height, peak / top
    half = brentq(lambda u: irradiance(field, u * unit)[0] / top - 0.5, 0.4, 0.6, xtol=1e-13)
    yield "Airy, full width / (wavelength N)", "1.02899397", 2 * half
    yield "two points 1.2197 apart", "0.735032", 2 * irradiance(field, 1.21966989 / 2 * unit)[0] / top


def edges(engine):
    """Born and Wolf, section 8.7.3 (knife edge); Hecht, Optics, section 10.2.1 (slit)."""
    field, unit = light(engine, PlaneWave(area=1.0), KnifeEdge(angle=0.0), FreeSpace(1.0)), np.sqrt(WAVELENGTH / 2)
    yield "knife edge, shadow's edge", "0.25000000", irradiance(field, 0.0)[0]
    heights = ("1.37044292", "0.77825105", "1.19927120", "0.84316190")
    for place, height in zip(("1.217198", "1.872519", "2.344485", "2.739008"), heights, strict=True):
        found = extreme(field, float(place) * unit, 0.05)
        yield "knife edge, fringe w", place, found[0] / unit
        yield "irradiance", height, found[1]
    width, focal = 200 * um, 500 * mm
    field = light(engine, PlaneWave(area=1.0), Slit(width=width), Lens(focal=focal), FreeSpace(focal))
    unit, top = WAVELENGTH * focal / width, irradiance(field, 0.0)[0]
    for place, height in (("1.43029665", "0.04719045"), ("2.45902403", "0.01648003"), ("3.47088972", "0.00834029")):
        found = extreme(field, float(place) * unit, 0.1)
        yield "slit, beta/pi", place, found[0] / unit
        yield "peak", height, found[1] / top


RINGS = {
    1: ("0.8442312118", "0.1987534442"), 2: ("1.339134845", "0.08905784323"), 3: ("1.798697673", "0.04889991868"),
    4: ("2.251992386", "0.03019399449"), 5: ("2.709924335", "0.02021741239"), 6: ("3.176027573", "0.01437591191"),
    8: ("4.130241394", "0.008262805099"), 10: ("5.102862407", "0.005336136589"),
}  # fmt: skip


def vortices(engine):
    """V. V. Kotlyar et al., J. Opt. Soc. Am. A 22, 849 (2005); Gradshteyn and Ryzhik, 7th ed., 6.631."""
    focal = 30 * cm
    spot = WAVELENGTH * focal / (np.pi * WAIST)
    peak = 2 / (np.pi * spot**2)
    for charge, (place, height) in RINGS.items():
        field = light(engine, GAUSS, SpiralPlate(charge=charge), Lens(focal=focal), FreeSpace(focal))
        found = extreme(field, float(place) * spot)
        yield f"spiral plate {charge}, focus: ring / w_f", place, found[0] / spot
        yield "peak", height, found[1] / peak
        if charge <= 3:
            value = ("0.433023297055", "0.264241117657", "0.121474012878")[charge - 1]
            yield "amplitude at w_f", value, np.sqrt(irradiance(field, spot)[0] / peak)
        if charge <= 2:  # for a waist of 1 mm
            yield "ring, waist 1 mm, um", ("51.015160", "80.921172")[charge - 1], found[0] / um / 2
        if charge <= 3 and engine == "azimuthal":  # beyond any window that is fine enough
            far = ("0.250104", "1.000000", "2.248437")[charge - 1]
            yield "s^4 I at s = 60", far, 60**4 * irradiance(field, 60 * spot)[0] / peak


def vortices_on_the_way(engine):
    """The same works for the Rayleigh range; shares of Laguerre-Gauss modes: M. W. Beijersbergen et al. (1994)."""
    values = {1: ("0.057550069", "0.130997222", "0.051362030"), 2: ("0.003306538", "0.032070124", "0.067736207")}
    shares = {1: ("0.78539816", "0.09817477", "0.03681554"), 2: ("0.50000000", "0.16666667", "0.08333333")}
    rays = matrix(RAYLEIGH)
    for charge, printed in values.items():
        field = light(engine, GAUSS, SpiralPlate(charge=charge), FreeSpace(RAYLEIGH))
        for place, value in zip((0.5, 1, 2), printed, strict=True):
            yield (
                f"spiral plate {charge}, z_R: I({place} w)",
                value,
                irradiance(field, place * WAIST)[0] * np.pi * WAIST**2 / 2,
            )
        for p, share in enumerate(shares[charge]):
            part = inside(field, 8 * WAIST, lambda r, p=p, l=charge: laguerre(p, l, WAIST, WAVELENGTH, rays, r))
            yield f"share of p = {p}", share, abs(part) ** 2


def detuned(engine):
    """S. Slussarenko et al., Opt. Express 19, 4085 (2011): sin^2(retardance/2)."""
    for degrees, printed in ((45, "0.14644661"), (135, "0.85355339"), (170, "0.99240388")):
        field = light(engine, GAUSS, QPlate(q=0.5, retardance=math.radians(degrees)), FreeSpace(1.0), state=L)
        s0, _, _, s3 = field.total_stokes
        yield f"q-plate of {degrees} deg: converted", printed, (s0 + s3) / 2


def agreed(printed, value):
    """Whether a value rounds to the printed digits ("all"); else how many of them are right."""
    decimals, off = len(printed.split(".")[1]), abs(value - float(printed))
    if off <= 0.5 * 10.0**-decimals * (
        1 + 1e-6
    ):  # a printed number has a rounding of its own, far below its last digit
        return "all"
    above = 10 ** math.floor(math.log10(abs(float(printed))) + 1)  # unit of the digit before the first
    return (
        f"{max(math.floor(-math.log10(2 * off / above)), 0)} of {len(printed.strip('-').replace('.', '').lstrip('0'))}"
    )


def printed_rows():
    rows, sources, right = [], [], {"azimuthal": [], "grid": []}
    for work in (gaussian, focused, laguerre_rings, airy_pattern, edges, vortices, vortices_on_the_way, detuned):
        sources.append(work.__doc__.strip())
        engines = ("grid",) if work is edges else ("azimuthal", "grid")
        found = {engine: {(name, printed): value for name, printed, value in work(engine)} for engine in engines}
        for name, printed in found[engines[0]]:
            cells = []
            for engine in right:
                value = found.get(engine, {}).get((name, printed))
                said = "" if value is None else agreed(printed, value)
                right[engine] += [said == "all"] if said else []
                cells += ["" if value is None else f"{value:.12g}", said]
            rows.append((f"[{len(sources)}] {name}", printed, *cells))
    head = ("[source] value", "printed", "azimuthal", "digits", "grid", "digits")
    table("printed values beside both engines, grids chosen automatically", head, rows)
    print("\n".join(f"  [{number}] {source}" for number, source in enumerate(sources, 1)))
    print(
        "  all printed digits: "
        + "; ".join(f"{name} {sum(flags)} of {len(flags)}" for name, flags in right.items())
        + "\n"
    )
