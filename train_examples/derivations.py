"""Trains with letters, and the page of formulas that follow from them: python derivations.py writes derivations.md.

Each entry states a train, asks it for a form, and puts beside it the number the formula gives at one set of values and
how closely the numeric laws agree with it at random ones.

Look for: frames that are one squared cosine, lobes that know only differences of angles, leaks that start in second
order. ``fastaxis derive derivations.py --setting 30deg`` shows the detuned q-plate alone.
"""

from __future__ import annotations

import warnings
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from math import pi
from pathlib import Path

import sympy as sp

import fastaxis as fa
from fastaxis.conventions import stamp
from fastaxis.units import deg, nm

PAGE = Path(__file__).with_suffix(".md")
DIGITS = 6
CLOSE = (1e-12, 1e-9, 1e-6)  # relative deviations that are told apart on the page

alpha, beta, gamma, delta, eps, theta, q, p, psi, chi, Delta = sp.symbols(
    "alpha beta gamma delta epsilon theta q p psi chi Delta", real=True
)
w, v, f, lam, X, R_1, R_2 = sp.symbols("w v f lambda X R_1 R_2", positive=True)
H, V, D, L, R = fa.H, fa.V, fa.D, fa.L, fa.R

VALUES = {
    "alpha": 0.31, "beta": 0.83, "gamma": 1.27, "delta": 2.1, "epsilon": 0.05, "theta": 0.47, "q": 0.5, "p": 1.5,
    "psi": 0.6, "chi": 0.2, "Delta": 0.9, "w": 8e-4, "v": 6e-4, "f": 0.3, "lambda": 532e-9, "X": 1000.0,
    "R_1": 0.4, "R_2": 0.55, "r": 3e-4, "phi": 0.7,
}  # fmt: skip


@dataclass(frozen=True)
class Line:
    """One formula: what it is, as LaTeX and as a sympy expression (None where there is nothing to evaluate)."""

    name: str
    latex: str
    value: object = None


@dataclass(frozen=True)
class Entry:
    """A train, a sentence on what it does to the light, and its formulas."""

    title: str
    parts: str
    sentence: str
    lines: Callable[[], Iterator[Line | object]]


def bench(*parts, state=H, laser=None, wavelength=532 * nm):
    train = fa.Train(wavelength=wavelength)
    laser = laser or fa.Laser(waist=w, state=state, power=1.0)
    return train.along(laser, *parts, fa.Camera(pixel=5e-6, shape=(8, 8), name="cam"))


def form(*parts, **options):
    return bench(*parts, **options).derive("cam")


def line(name, made, value):
    """A formula and its value; ``made`` is the form it belongs to."""
    return Line(name, made.show(value, latex=True), made.spelled_out(value))


# --- plates and polarizers -------------------------------------------------------------------------------------------


def retarder():
    made = form(fa.Retarder(fast=alpha, retardance=delta))
    yield made
    yield from _vector(made)
    yield line(r"I_\perp", made, made.frame(sp.pi / 2))


def _vector(made, basis="linear", of=""):
    names = ("E_x", "E_y") if basis == "linear" else ("E_L", "E_R")
    for name, value in zip(names, made.jones(basis), strict=True):
        yield line(name + of, made, value)


def chain():
    made = form(fa.Polarizer(axis=alpha), fa.Polarizer(axis=beta), fa.Polarizer(axis=gamma))
    yield made
    yield line("P", made, made.power)


def extinction():
    made = form(fa.Polarizer(axis=alpha, extinction=X))
    yield made
    yield line(r"I(\theta)", made, made.frame(theta))
    crossed = form(fa.Polarizer(axis=0.0, extinction=X), fa.Polarizer(axis=pi / 2, extinction=X), state=fa.UNPOLARIZED)
    yield crossed
    yield line(r"P_\perp", crossed, crossed.power)


def geometric_phase():
    plates = (fa.QuarterWavePlate(fast=45 * deg), fa.HalfWavePlate(fast=alpha), fa.QuarterWavePlate(fast=45 * deg))
    for name, state, component in (("E_x(H)", H, 0), ("E_y(V)", V, 1)):
        made = form(*plates, state=state)
        yield made
        yield line(name, made, made.jones(global_phase=True)[component])


def polarimeter():
    made = form(fa.Retarder(fast=theta, retardance=sp.pi / 2 + eps), state=fa.elliptical(psi, chi))
    yield made
    for order, (cosine, sine) in made.harmonics(0, theta).items():
        for name, value in ((f"a_{order}", cosine), (f"b_{order}", sine)):
            if value != 0:
                yield line(name, made, value)
    yield line(r"I \approx", made, made.series(0, [eps], order=1))


# --- q-plates and vector beams ---------------------------------------------------------------------------------------


def q_plate():
    for name, state in (("(L)", L), ("(R)", R)):
        made = form(fa.QPlate(q=q, offset=alpha, retardance=delta), state=state)
        yield made
        yield from _vector(made, "circular", of=name)


def tuned_frame():
    made = form(fa.HalfWavePlate(fast=beta), fa.QPlate(q=q, offset=alpha))
    yield made
    yield line(r"I(\theta)", made, made.frame(theta))
    found = made.lobes(theta)
    yield line("n", made, found.count)
    yield line(r"\phi_1", made, found.first)
    yield line(r"\partial\phi_1/\partial\theta", made, found.turning)


def detuned_frame():
    made = form(fa.QPlate(q=q, offset=alpha, retardance=delta))
    yield made
    yield line(r"I(\theta)", made, made.frame(theta))


def two_q_plates():
    made = form(fa.QPlate(q=q, offset=alpha), fa.QPlate(q=p, offset=alpha + gamma))
    yield made
    yield line(r"I(\theta + 2\alpha)", made, made.frame(theta + 2 * alpha))


def pair_of_plates():
    made = form(fa.QPlate(q=q, offset=gamma), fa.HalfWavePlate(fast=alpha), fa.HalfWavePlate(fast=beta))
    yield made
    yield from _vector(made)


def vector_beams():
    for name, state, offset in (("radial", H, 0.0), ("azimuthal", H, 45 * deg), ("spiral", D, 0.0)):
        made = form(fa.QPlate(q=0.5, offset=offset), state=state)
        yield made
        yield Line(rf"\text{{{name}}}", made.latex("jones"))


def l_line():
    made = form(fa.QPlate(q=0.5, offset=0.0, retardance=pi / 2))
    yield made
    yield line("S_3", made, made.stokes[3])


def full_poincare():
    beam = fa.Beam((fa.Term(1, fa.LaguerreGauss(0, 0, w), L), fa.Term(1, fa.LaguerreGauss(0, 1, w), R)))
    made = form(laser=fa.Laser(beam=beam, power=1.0))
    yield made
    for k, value in enumerate(made.stokes):
        yield line(f"S_{k}", made, value)
    radius = sp.Symbol("r", positive=True)
    yield line("r_L", made, sp.solve(made.stokes[3], radius)[0])


# --- beams that travel -----------------------------------------------------------------------------------------------


def far_field():
    for charge in (1, 2):
        made = form(fa.SpiralPlate(charge=charge), fa.Lens(focal=f), fa.FreeSpace(f), wavelength=lam)
        yield made
        yield Line(f"I_{charge}(r)", made.latex("irradiance"), made.spelled_out(made.irradiance))
        s = sp.Symbol("s", positive=True)
        radius = sp.Symbol("r", positive=True)
        scaled = made.spelled_out(made.irradiance).subs(radius, s * lam * f / (sp.pi * w))
        peak = sp.nsolve(sp.diff(sp.log(scaled.subs({w: 1, lam: 1, f: 1})), s), s, 0.85 if charge == 1 else 1.34)
        yield Line("r_{max}", rf"{float(peak):.7f}\, \frac{{\lambda f}}{{\pi w}}")


def overlap():
    made = form(fa.SpiralPlate(charge=1))
    yield made
    share = made.share(fa.LaguerreGauss(0, 1, v))
    yield line(r"\eta(v)", made, share)
    (best,) = [root for root in sp.solve(sp.diff(sp.log(share), v), v) if root.is_positive]
    yield line("v_{best}", made, best)
    yield line(r"\eta(v_{best})", made, sp.simplify(share.subs(v, best)))
    yield line(r"\eta(w)", made, made.share(fa.LaguerreGauss(0, 1, w)))


def fractional_step():
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", fa.SlipWarning)  # the plate is far off its design on purpose
        made = form(fa.SpiralPlate(charge=1, design=600 * nm), wavelength=800 * nm)
    for charge in (0, 1, 2):
        yield line(f"P_{charge}", made, made.charge_share(charge))


# --- several paths ---------------------------------------------------------------------------------------------------


def interferometer(*arm, other=(), ratios=(0.5, 0.5), mode=None):
    """Two splitters and two mirrors; ``arm`` stands in the transmitted arm, ``other`` in the reflected one."""
    train = fa.Train(wavelength=532 * nm)
    laser = fa.Laser(mode=mode or fa.Gaussian(w), power=1.0)
    train.along(laser, fa.BeamSplitter(reflectance=ratios[0], name="first"))
    train.along("first.transmitted", *arm, fa.Mirror(), fa.BeamSplitter(reflectance=ratios[1], name="second"))
    return train.along("first.reflected", *other, fa.Mirror(), "second.side")


def ports():
    for name, port in (("P_t", "second.transmitted"), ("P_r", "second.reflected")):
        made = interferometer(fa.PhaseShift(phase=Delta), ratios=(R_1, R_2)).derive(port)
        yield made
        yield line(name, made, made.power)


def marked_paths():
    train = interferometer(fa.PhaseShift(phase=Delta), fa.HalfWavePlate(fast=alpha))
    made = train.derive("second.transmitted")
    yield made
    yield line("P", made, made.power)
    erased = interferometer(fa.PhaseShift(phase=Delta), fa.HalfWavePlate(fast=45 * deg)).derive("second.transmitted")
    yield erased
    yield line(r"P(\alpha = 45^\circ)", erased, erased.power)
    yield line(r"I(\theta)", erased, erased.frame(theta))


def sorter():
    for charge in (1, 2, 3):
        # A K-mirror rolled by alpha turns the picture by 2 alpha; the half-wave plate undoes what its mirrors do to H.
        arms = [(fa.KMirror(roll=roll), fa.HalfWavePlate(fast=roll)) for roll in (alpha, 0.0)]
        train = interferometer(*arms[0], other=arms[1], mode=fa.LaguerreGauss(0, charge, w))
        for name, port in (("t", "second.transmitted"), ("r", "second.reflected")):
            made = train.derive(port)
            yield made
            yield line(f"P_{name}(l={charge})", made, made.power)


def isolator():
    train = fa.Train(wavelength=532 * nm)
    train.along(fa.Laser(waist=w, power=1.0), fa.PolarizingBeamSplitter(name="pbs"))
    train.retro("pbs.transmitted", fa.Retarder(fast=alpha, retardance=delta, name="qwp"), fa.Mirror(name="end"))
    made = train.derive("pbs.front")
    yield made
    yield line("P_{back}", made, made.power)
    yield line(r"P_{back}(45^\circ + \epsilon, \delta)", made, made.power.subs(alpha, sp.pi / 4 + eps))


def faraday():
    rod, end = fa.FaradayRotator(angle=beta, name="rod"), fa.Mirror(name="end")
    train = fa.Train(wavelength=532 * nm).along(fa.Laser(waist=w, power=1.0), rod, end).join("end", "rod.back")
    made = train.derive("rod.front")
    yield made
    yield from _vector(made)


train = bench(fa.QPlate(q=q, offset=alpha, retardance=delta, name="qp"))  # for fastaxis derive

ENTRIES = (
    Entry("A retarder", "laser H, retarder (fast axis α, retardance δ)",
          "The slow wave gains δ; between crossed polarizers the light goes as the square of sin 2α.", retarder),
    Entry("Three polarizers", "laser H, polarizers at α, β, γ",
          "Each passes the square of the cosine to the one before.", chain),
    Entry("A polarizer of finite extinction", "laser H, polarizer at α (extinction X); unpolarized light, two crossed",
          "The blocked amplitude leaks as 1/√X and interferes with the light that passes.", extinction),
    Entry("Geometric phase of three plates", "laser H or V, quarter-wave plate at 45°, half-wave plate at α, again 45°",
          "The middle plate changes neither H nor V but their phases, by twice its angle, in opposite senses.",
          geometric_phase),
    Entry("A rotating-plate polarimeter", "ellipse (azimuth ψ, ellipticity χ), plate at θ of retardance π/2 + ε, H",
          "The second harmonic shows the hand, the fourth the linear part; a wrong plate puts ε into the mean and the "
          "fourth harmonic in first order, into the second harmonic only in second order.", polarimeter),
    Entry("A q-plate on circular light", "laser L or R, q-plate (q, offset α, retardance δ)",
          "A share of the light swaps hands and gains ±2q turns of phase; the rest passes unchanged.", q_plate),
    Entry("The frame of a tuned q-plate", "laser H, half-wave plate at β, q-plate (q, offset α), analyzer at θ",
          "Linear light everywhere: n lobes, the first at φ₁, turning with the analyzer.", tuned_frame),
    Entry("The frame of a detuned q-plate", "laser H, q-plate (q, offset α, retardance δ), analyzer at θ",
          "The unconverted light adds in power, the same all round, and fills the dark lobes.", detuned_frame),
    Entry("Two q-plates, one rolled", "laser H, q-plate (q, α), q-plate (p, α + γ), analyzer that turns along",
          "The charges subtract; the lobes know only the roll of one plate against the other.", two_q_plates),
    Entry("Two half-wave plates after a vector beam", "laser H, q-plate (q, γ), half-wave plates at α and β",
          "Two half-wave plates are a rotator by twice their difference, whatever the light.", pair_of_plates),
    Entry("Radial, azimuthal, spiral", "laser, q-plate of q = 1/2",
          "The plate's offset or the light's azimuth chooses the vector beam.", vector_beams),
    Entry("L-line of a quarter-wave q-plate", "laser H, q-plate of q = 1/2, δ = 90°",
          "The hand changes across the x axis, where the light is linear.", l_line),
    Entry("A full-Poincare beam", "LG₀⁰ in L and LG₀¹ in R, equal powers",
          "Every state occurs once; the light is linear on a circle of radius r_L.", full_poincare),
    Entry("Far field of a spiral plate", "Gaussian of radius w, spiral plate of charge 1 and 2, focus of a lens f",
          "A ring that is no Laguerre-Gauss mode; its radius follows from the Kummer function.", far_field),
    Entry("A spiral-plate beam in Laguerre-Gauss modes", "Gaussian of radius w, spiral plate of charge 1",
          "The overlap with LG₀¹ of radius v is best for a smaller v than w.", overlap),
    Entry("A spiral plate off its wavelength", "spiral plate of charge 1 made for 600 nm, light of 800 nm",
          "A step of three quarters of a wave shares the light among whole charges.", fractional_step),
    Entry("Ports of an interferometer", "two splitters of reflectance R₁ and R₂, phase Δ in one arm",
          "The two ports always share all the light; the fringes are full if the paths carry equal light.", ports),
    Entry("Marked paths and their erasure", "splitters of one half, phase Δ and a half-wave plate at α in one arm",
          "What tells the paths apart takes the fringes away; an analyzer between the two polarizations brings them "
          "back.", marked_paths),
    Entry("Sorting charges", "interferometer with a picture turned by 2α in one arm, a beam of charge l",
          "The turned picture gains 2lα of phase against the other, so each port passes its own charges.", sorter),
    Entry("Leak of a double-pass isolator", "polarizing splitter, retarder (α, δ), mirror and back",
          "Light comes back to the laser unless the plate is a quarter-wave plate at 45°; both errors leak in second "
          "order.", isolator),
    Entry("A Faraday rotator met twice", "laser H, Faraday rotator by β, mirror and back",
          "The rotation does not undo itself: it adds up to 2β.", faraday),
)  # fmt: skip


def section(entry):
    """The markdown of one entry."""
    found = list(entry.lines())
    lines = [item for item in found if isinstance(item, Line)]
    forms = [item for item in found if not isinstance(item, Line)]
    yield f"## {entry.title}"
    yield ""
    yield f"*{entry.parts}.* {entry.sentence}"
    for item in lines:
        equals = "" if item.name.endswith("approx") else " ="
        yield ""
        yield f"$$ {item.name}{equals} {item.latex} $$"
    yield ""
    yield from _spots(lines)
    if forms:
        yield f"Beside the numeric laws, at random values of all letters: within {_agreement(forms):.0e} of the light."
        yield ""


def _spots(lines):
    """The value of each formula at one set of values."""
    spots, used = [], set()
    for item in lines:
        if item.value is not None and not getattr(item.value, "is_number", False):
            letters = {letter: VALUES[letter.name] for letter in item.value.free_symbols}
            used |= {letter.name for letter in letters}
            spots.append(f"${item.name}$ {_short(complex(item.value.subs(letters).evalf()))}".replace(r" \approx", ""))
    if spots:
        at = ", ".join(f"{name} = {VALUES[name]:g}" for name in sorted(used))
        yield f"At {at}: {'; '.join(spots)}."
        yield ""


def _short(value):
    if abs(value.imag) < 1e-14 * max(abs(value), 1e-14):
        return f"{value.real:.{DIGITS}g}"
    return f"{value.real:.{DIGITS}g} {value.imag:+.{DIGITS}g} i"


def _agreement(forms):
    worst = max(made.check(points=3).roundings for made in forms) * 2.0**-52
    return next(limit for limit in CLOSE if worst < limit)


def page():
    """The whole page as markdown."""
    head = (
        "# Derivations",
        "",
        "Formulas that fastaxis derives from trains whose parameters are letters. Written by `derivations.py`; the",
        "trains are declared there. Powers and frames are shares of the laser's light, relative to the envelope of the",
        "beam; r and φ are about its axis.",
        "",
        f"> {stamp()}",
        "",
    )
    return "\n".join((*head, *(text for entry in ENTRIES for text in section(entry)))).rstrip() + "\n"


if __name__ == "__main__":
    PAGE.write_text(page(), encoding="utf-8")
