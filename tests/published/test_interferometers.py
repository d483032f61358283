"""Interferometers, cavities and coherence against published laws; each value recomputed here from its formula."""

import math

import numpy as np
import pytest
import sympy as sp
from scipy.optimize import brentq

import fastaxis as fa
from fastaxis.units import deg, mm, mrad, nm, um

C = 299792458.0
# Phases enter as floats of order 1 and a bench has some ten parts: a few tens of roundings of the largest power.
ROUNDING = 1e-14


def wave(state=fa.H, **values):
    return fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1.0, state=state, name="laser", **values)


def mach_zehnder(phase=0.0, reflectance=0.5, laser=None, arm=(), other=()):
    train = fa.Train(wavelength=632.8 * nm)
    train.along(
        laser or wave(), fa.BeamSplitter(reflectance=reflectance, name="in"), fa.PhaseShift(phase=phase, name="phase"),
        *arm, fa.Mirror(name="m1"), fa.BeamSplitter(reflectance=reflectance, name="out"),
    )  # fmt: skip
    return train.along("in.reflected", fa.Mirror(name="m2"), *other, "out.side")


@pytest.mark.parametrize("reflectance", [0.5, 0.3])
@pytest.mark.parametrize("phase", [0.0, 0.4, math.pi / 2, 3.0])
def test_mach_zehnder_ports(phase, reflectance):
    """B. E. A. Saleh and M. C. Teich, Fundamentals of Photonics, section 2.5; A. Zeilinger, Am. J. Phys. 49, 882 (1981)."""
    train = mach_zehnder(phase, reflectance)
    through = 1 - 4 * reflectance * (1 - reflectance) * math.cos(phase / 2) ** 2
    assert train.power("out.transmitted") == pytest.approx(through, abs=ROUNDING)
    assert train.power("out.reflected") == pytest.approx(1 - through, abs=ROUNDING)


def michelson(length, reflectance=0.5, laser=None):
    train = fa.Train(wavelength=632.8 * nm).along(laser or wave(), fa.BeamSplitter(reflectance=reflectance, name="bs"))
    train.retro("bs.transmitted", fa.FreeSpace(length, name="long"), fa.Mirror(name="end1"))
    return train.retro("bs.reflected", fa.FreeSpace(0.1, name="short"), fa.Mirror(name="end2"))


@pytest.mark.parametrize("reflectance", [0.5, 0.3])
def test_michelson_ports(reflectance):
    """P. Hariharan, Optical Interferometry, 2nd ed. (2003), chapters 2, 3: at equal arms all light goes to the output."""
    for waves in (0, 1 / 8, 1 / 3):
        train = michelson(0.1 + waves * 632.8 * nm / 2, reflectance)
        out = 4 * reflectance * (1 - reflectance) * math.cos(math.pi * waves) ** 2
        # 0.1 m is written to 1.4e-17 m, which is 3e-10 rad there and back.
        assert train.power("bs.side") == pytest.approx(out, abs=1e-9)
        assert train.power("bs.side") + train.power("bs.front") == pytest.approx(1, abs=ROUNDING)


@pytest.mark.parametrize("phase", [0.0, 0.7])
def test_sagnac_ports(phase):
    """P. Hariharan (2003), chapter 3: (T - R)^2 at the dark port; a phase between the two senses adds to that."""
    train = fa.Train(wavelength=632.8 * nm).along(wave(), fa.BeamSplitter(reflectance=0.45, name="bs"))
    # A Faraday rotator turns circular light by exp(-i angle) one way and by exp(+i angle) the other: the only
    # non-reciprocal phase on the bench. Two mirrors keep the hand of the light between them apart from one.
    train = train.with_changes({"laser.state": fa.L})
    parts = [fa.Mirror(name=f"m{n}") for n in range(3)]
    train.loop("bs.transmitted", parts[0], fa.FaradayRotator(angle=phase / 2), *parts[1:], "bs.reflected")
    both = 4 * 0.45 * 0.55
    dark = train.power("bs.side")
    assert dark + train.power("bs.front") == pytest.approx(1, abs=ROUNDING)
    assert dark == pytest.approx(1 - both * math.cos(phase / 2) ** 2, abs=ROUNDING)


def fabry_perot(reflectance, phase, laser=None, length=632.8 * nm * 1000):
    train = fa.Train(wavelength=632.8 * nm).along(
        laser or wave(), fa.BeamSplitter(reflectance=reflectance, name="left"), fa.FreeSpace(length, name="gap"),
        fa.PhaseShift(phase=phase, name="scan"), fa.BeamSplitter(reflectance=reflectance, name="right"),
        fa.Detector(name="out"),
    )  # fmt: skip
    return train.along("right.reflected", "scan.back", "gap.back", "left.side")


@pytest.mark.parametrize(
    ("reflectance", "F", "finesse", "least"),
    [(0.3, 2.448980, 2.265974, 0.28994083), (0.5, 8.0, 4.346816, 0.11111111), (0.9, 360.0, 29.789956, 0.00277008),
     (0.99, 39600.0, 312.583207, 0.00002525)],
)  # fmt: skip
def test_fabry_perot(reflectance, F, finesse, least):
    """M. Born and E. Wolf, Principles of Optics, section 7.6; N. Ismail et al., Opt. Express 24, 16366 (2016)."""
    # r = i sqrt(R) at both mirrors is half a wave a trip: resonance is where the scan adds the other half.
    scan = fabry_perot(reflectance, 0.0)

    def passed(trip):
        return scan.with_changes({"scan.phase": (trip - math.pi) / 2}).power("out")

    assert passed(0.0) == pytest.approx(1, abs=1e-10)  # a rounding of the phase, times F of up to 4e4
    assert passed(math.pi) == pytest.approx(least, abs=5e-9)
    for trip in (0.1, 1.0, 2.5):
        # A rounding of the trip's phase changes this by at most sqrt(F)/2 of it.
        assert passed(trip) == pytest.approx(1 / (1 + F * math.sin(trip / 2) ** 2), rel=1e-6)  # F to seven digits
    half = brentq(lambda trip: passed(trip) - 0.5, 0.0, math.pi, xtol=1e-12)
    assert math.pi / half == pytest.approx(finesse, rel=3e-7)


def test_fabry_perot_on_resonance_returns_nothing():
    """Born and Wolf, section 7.6.2: equal mirrors let all light through, and send none back."""
    train = fabry_perot(0.9, -math.pi / 2)
    assert train.power("left.reflected") < 1e-13


def test_finesse_of_the_derived_form():
    """Born and Wolf, section 7.6, from memory: F = 4R/(1 - R)^2, half width pi/finesse, finesse = pi sqrt(F)/2."""
    R, psi = sp.symbols("R psi", positive=True)
    through = fabry_perot(R, psi).derive("out").power
    F = 4 * R / (1 - R) ** 2
    # The trip is twice the scan and, of both mirrors' i sqrt(R), half a wave.
    assert sp.simplify(sp.expand(1 / through - 1 - F * sp.cos(psi) ** 2, trig=True)) == 0
    half = sp.nsolve((through - sp.Rational(1, 2)).subs(R, sp.Rational(99, 100)), psi, (1.55, 1.57), solver="bisect")
    # pi sqrt(F)/2 takes sin(x) for x: wrong by x^2/6 with x = 0.005, half the width of the peak.
    assert float(sp.pi / (2 * (sp.pi / 2 - half))) == pytest.approx(math.pi * math.sqrt(39600) / 2, rel=5e-6)


def test_fabry_perot_of_a_wide_gaussian_beam_is_that_of_a_plane_wave():
    """Born and Wolf, section 7.6.1; a beam of 20 mm spreads by 1e-6 of its width in the trips that matter."""
    beam = fa.Laser(waist=20 * mm, power=1.0, name="laser")
    train = fabry_perot(0.15, 0.4, beam)
    assert train.power("out") == pytest.approx(fabry_perot(0.15, 0.4).power("out"), rel=1e-6)


def visibility_of(line, difference):
    train = mach_zehnder(laser=wave(line=line), arm=[fa.FreeSpace(difference)])
    scan = [train.with_changes({"phase.phase": step}).power("out.transmitted") for step in (0, math.pi / 2, math.pi)]
    cosine, sine = (scan[0] - scan[2]) / 2, (scan[0] + scan[2]) / 2 - scan[1]
    return math.hypot(cosine, sine) / ((scan[0] + scan[2]) / 2)


@pytest.mark.parametrize(
    ("tau", "gaussian", "lorentzian"), [(0.1e-9, 0.92303012, 0.62422843), (0.3e-9, 0.48634320, 0.24323756)]
)
def test_visibility_against_path_difference(tau, gaussian, lorentzian):
    """J. W. Goodman, Statistical Optics (1985), section 5.1; Born and Wolf, section 7.5.8."""
    assert visibility_of(fa.GaussianLine(fwhm=1.5e9), C * tau) == pytest.approx(gaussian, abs=1e-8)
    assert visibility_of(fa.LorentzianLine(fwhm=1.5e9), C * tau) == pytest.approx(lorentzian, abs=1e-8)


def test_coherence_times():
    """Goodman (1985), section 5.1.3: integral of |degree|^2 over the delay, in units of 1/fwhm."""
    delays = np.linspace(-8, 8, 200001)
    for line, expected in ((fa.GaussianLine(fwhm=1.0), 0.66428247), (fa.LorentzianLine(fwhm=1.0), 0.31830989)):
        values = np.array([abs(line.degree(C * t)) ** 2 for t in delays])
        assert np.trapezoid(values, delays) == pytest.approx(expected, abs=1e-6)


def test_two_sodium_lines_beat():
    """E. Hecht, Optics, section 9.4.2; wavelengths in air of the NIST Atomic Spectra Database."""
    one, other = 588.9950 * nm, 589.5924 * nm
    beat = one * other / (other - one)
    assert beat == pytest.approx(0.581297 * mm, rel=1e-6)
    pair = fa.Comb(spacing=C / beat, weights=(0.5, 0.5))
    for d in (0.1 * mm, beat / 2, 0.4 * mm, beat):
        assert visibility_of(pair, d) == pytest.approx(abs(math.cos(math.pi * d / beat)), abs=1e-9)


@pytest.mark.parametrize(("ratio", "expected"), [(4, 0.8), (9, 0.6), (100, 0.198019802)])
def test_unequal_beams(ratio, expected):
    """Born and Wolf, sections 7.2, 7.3: 2 sqrt(I1 I2)/(I1 + I2)."""
    train = mach_zehnder(arm=[fa.NeutralDensity(transmission=1 / ratio)])
    assert train.visibility("out.transmitted").value == pytest.approx(expected, abs=1e-9)
    low, high = (train.with_changes({"phase.phase": p}).power("out.transmitted") for p in (0.0, math.pi))
    assert (high - low) / (high + low) == pytest.approx(expected, abs=1e-9)


@pytest.mark.parametrize("angle", [0, 15, 40, 45])
def test_polarization_marks_a_path_and_an_analyzer_erases_the_mark(angle):
    """Fresnel-Arago laws; E. Hecht, Optics, section 9.1: |cos 2 theta| behind a half-wave plate at theta."""
    train = mach_zehnder(arm=[fa.HalfWavePlate(fast=angle * deg)])
    expected = abs(math.cos(2 * angle * deg))
    for port in ("out.transmitted", "out.reflected"):
        assert train.visibility(port).value == pytest.approx(expected, abs=1e-9)
    if angle == 45:
        train.along("out.transmitted", fa.Polarizer(axis=45 * deg, name="eraser"))
        # A half-wave plate adds exp(-i pi/2) to the light it turns, so fringes stand a quarter of a period aside.
        phases = np.arange(4) * math.pi / 2
        powers = [train.with_changes({"phase.phase": p}).power("eraser") for p in phases]
        assert sorted(powers) == pytest.approx([0, 0.25, 0.25, 0.5], abs=ROUNDING)
        assert np.mean(powers) == pytest.approx(0.25)
        crossed = [train.with_changes({"eraser.axis": -45 * deg, "phase.phase": p}).power("eraser") for p in phases]
        assert np.add(powers, crossed) == pytest.approx(0.5)


@pytest.mark.parametrize("angle", [0, 10, 22.5, 30, 40, 45])
def test_double_pass_through_a_quarter_wave_plate(angle):
    """B. E. A. Saleh and M. C. Teich, section 6.6: back to the laser cos^2 2 theta, to the side sin^2 2 theta."""
    train = fa.Train(wavelength=632.8 * nm).along(wave(), fa.PolarizingBeamSplitter(name="pbs"))
    train.retro("pbs.transmitted", fa.QuarterWavePlate(fast=angle * deg), fa.Mirror())
    assert train.power("pbs.front") == pytest.approx(math.cos(2 * angle * deg) ** 2, abs=ROUNDING)
    assert train.power("pbs.side") == pytest.approx(math.sin(2 * angle * deg) ** 2, abs=ROUNDING)


@pytest.mark.parametrize(("beta", "leak"), [(45, 0.0), (44, 3.04586490e-4), (42, 2.73905232e-3)])
def test_faraday_isolator(beta, leak):
    """B. E. A. Saleh and M. C. Teich, section 6.6D: forward cos^2(45 - beta), backward cos^2(45 + beta)."""
    train = fa.Train(wavelength=632.8 * nm).along(
        wave(), fa.Polarizer(axis=0 * deg, name="in"), fa.FaradayRotator(angle=beta * deg, name="rotator"),
        fa.Polarizer(axis=45 * deg, name="out"), fa.Mirror(name="end"),
    )  # fmt: skip
    train.along("end", "out.back", "rotator.back", "in.back")
    forward = math.cos((45 - beta) * deg) ** 2
    assert train.power("out.back") == pytest.approx(forward, abs=ROUNDING)
    # What the second polarizer let out comes back through it whole, and then meets rotator and first polarizer.
    assert train.power("in.front") / forward == pytest.approx(leak, abs=1e-11)


@pytest.mark.parametrize(("waves", "expected"), [(0, 1), (1 / 16, 0.85355339), (1 / 8, 0.5), (1 / 4, 0)])
def test_polarizing_michelson(waves, expected):
    """P. Hariharan (2003), chapter 2: all light leaves by the output; behind 45 deg it goes as cos^2(k dL)."""
    train = fa.Train(wavelength=632.8 * nm).along(wave(fa.D), fa.PolarizingBeamSplitter(name="pbs"))
    train.retro(
        "pbs.transmitted", fa.QuarterWavePlate(fast=45 * deg), fa.PhaseShift(phase=2 * math.pi * waves), fa.Mirror()
    )
    train.retro("pbs.reflected", fa.QuarterWavePlate(fast=45 * deg), fa.Mirror())
    assert train.power("pbs.front") < ROUNDING
    assert train.power("pbs.side") == pytest.approx(1, abs=ROUNDING)
    dark = train.copy().along("pbs.side", fa.Polarizer(axis=45 * deg, name="analyzer")).power("analyzer")
    bright = train.along("pbs.side", fa.Polarizer(axis=-45 * deg, name="analyzer")).power("analyzer")
    assert dark + bright == pytest.approx(1, abs=ROUNDING)
    assert max(dark, bright) == pytest.approx(max(expected, 1 - expected), abs=1e-8)


def test_fringe_period_of_two_tilted_beams():
    """Born and Wolf, section 7.3: wavelength/angle for small angles, where it equals wavelength/(2 sin(angle/2))."""
    tilt = 5 * mrad
    beam = fa.Laser(waist=1 * mm, power=1.0, name="laser")
    train = mach_zehnder(laser=beam, other=[fa.Wedge(x=tilt)])
    train.along("out.transmitted", fa.Camera(pixel=4 * um, shape=(8, 400), name="cam"))
    shots = train.expose("cam", [fa.H])
    row = shots.frame(0)[4] / np.exp(-2 * shots.x**2 / mm**2)
    turns = np.unwrap(np.angle(np.fft.ifft(np.fft.fft(row - row.mean()) * (np.arange(400) < 200))))
    period = 2 * math.pi / abs(np.polyfit(shots.x[100:300], turns[100:300], 1)[0])
    # The analytic signal of some five periods leaks at its ends by a few parts in a thousand.
    assert period == pytest.approx(632.8 * nm / tilt, rel=3e-3)


def phase_around(field, radius, count=64):
    phi = np.arange(count + 1) * 2 * np.pi / count
    values = np.array([field.at(np.array([radius * np.cos(a)]), np.array([radius * np.sin(a)]))[0, 0, 0] for a in phi])
    return values, phi


def interferogram(charge, tilt, lens=None):
    beam = fa.Laser(waist=1 * mm, power=1.0, state=fa.H, name="laser")
    other = [fa.Wedge(x=tilt)] if tilt else [fa.Lens(focal=lens)]
    train = mach_zehnder(laser=beam, arm=[fa.SpiralPlate(charge=charge, name="spiral")], other=other)
    return train.along("out.transmitted", fa.Camera(pixel=8 * um, shape=(200, 200), name="cam"))


def turns_of_difference(train, x, y):
    """Turns of the phase between the arms along a line of places."""
    one, other = train.field("cam")[0].arms
    values = np.array([one.at(a, b)[0, 0, 0] * np.conj(other.at(a, b)[0, 0, 0]) for a, b in zip(x, y, strict=True)])
    return np.sum(np.angle(values[1:] / values[:-1])) / (2 * np.pi)


@pytest.mark.parametrize("charge", [1, 2, -2])
def test_fork_has_as_many_extra_fringes_as_the_charge(charge):
    """N. R. Heckenberg et al., Opt. Lett. 17, 221 (1992): fringes above less fringes below the axis."""
    x = np.linspace(-0.7 * mm, 0.7 * mm, 400)
    for tilt in (2 * mrad, -2 * mrad):
        train = interferogram(charge, tilt)
        above, below = (turns_of_difference(train, x, np.full(400, y)) for y in (0.01 * mm, -0.01 * mm))
        # Along y = +e the phase of exp(i l phi) runs from l pi to 0, along y = -e from -l pi to 0. The lines miss the
        # axis by 0.01 mm and end at 0.7 mm, which leaves |l| 4 asin(1/70)/(2 pi) = 1 % of a turn each.
        seen = above - below if _first_is_spiral(train) else below - above
        assert seen * train_parity(train) == pytest.approx(-charge, abs=0.05)
        assert abs(above) != pytest.approx(abs(below), abs=0.5)


def _first_is_spiral(train):
    return "spiral" in train.plan("cam").branches[0].path


def train_parity(train):
    return train.routes("cam")[0].parity


@pytest.mark.parametrize("charge", [1, 2, 3])
def test_petals_of_opposite_charges(charge):
    """J. Leach et al. (2002); S. Franke-Arnold et al., Opt. Express 15, 8619 (2007): 2 |l| petals."""
    beam = fa.Laser(mode=fa.LaguerreGauss(0, charge, 1 * mm), power=1.0, state=fa.H, name="laser")
    # One mirror more in one arm reverses its charge.
    train = mach_zehnder(laser=beam, other=[fa.Mirror(name="m3")])
    values, phi = phase_around(train.field("out.transmitted")[0], 0.7 * mm, 256)
    ring = abs(values[:-1]) ** 2
    spectrum = abs(np.fft.rfft(ring))
    assert np.argmax(spectrum[1:]) + 1 == 2 * charge
    assert spectrum[2 * charge] / spectrum[0] == pytest.approx(0.5, abs=1e-9)  # 1 + cos: full contrast


def test_spiral_fringes_follow_the_difference_of_curvature():
    """Heckenberg et al. (1992); M. S. Soskin and M. V. Vasnetsov, Prog. Opt. 42, 219 (2001): k r^2/2 (1/R1 - 1/R2) = l phi."""
    train = interferogram(1, 0, lens=2.0)
    r = np.linspace(0.1 * mm, 0.9 * mm, 300)
    outward = turns_of_difference(train, r, np.zeros(300))
    expected = (r[-1] ** 2 - r[0] ** 2) / (2 * 2.0 * 632.8 * nm)
    sign = 1 if _first_is_spiral(train) else -1
    assert outward * sign == pytest.approx(expected, rel=1e-6)


@pytest.mark.parametrize("ratio", [1, 2, 3])
@pytest.mark.parametrize("ahead", [0.0, 0.4])
def test_arms_of_different_length_lose_overlap_in_a_detector(ratio, ahead):
    """H. Kogelnik, in Proc. Symp. Quasi-Optics (1964), p. 333: 1/sqrt(1 + (dz/2 zR)^2), wherever the detector stands."""
    waist = 0.2 * mm
    rayleigh = math.pi * waist**2 / (632.8 * nm)
    beam = fa.Laser(waist=waist, power=1.0, name="laser")
    train = mach_zehnder(laser=beam, arm=[fa.FreeSpace(ratio * rayleigh)])
    train.along("out.transmitted", fa.FreeSpace(ahead), fa.Detector(name="bucket"))
    (pair,) = train.visibility("bucket").pairs
    assert pair.spatial == pytest.approx(1 / math.sqrt(1 + (ratio / 2) ** 2), abs=1e-8)
    powers = [train.with_changes({"phase.phase": p}).power("bucket") for p in np.arange(4) * math.pi / 2]
    seen = math.hypot(powers[0] - powers[2], powers[1] - powers[3]) / (sum(powers) / 2)
    assert seen == pytest.approx(1 / math.sqrt(1 + (ratio / 2) ** 2), abs=1e-8)


def test_rotating_half_wave_plate_shifts_the_phase_twice_as_fast():
    """Geometric phase, S. Pancharatnam (1956): left light through a half-wave plate at t leaves right with exp(2it)."""
    turned = [
        mach_zehnder(laser=wave(fa.L), arm=[fa.HalfWavePlate(fast=t)], other=[fa.HalfWavePlate(fast=0.0)])
        .power("out.transmitted")
        for t in np.arange(8) * math.pi / 8
    ]  # fmt: skip
    spectrum = abs(np.fft.rfft(turned))
    # Half a turn of the plate is one whole period of the fringes: twice the turning rate.
    assert spectrum[1] == pytest.approx(np.mean(turned) * 8 / 2)
    assert spectrum[2:] == pytest.approx(0, abs=1e-12)


@pytest.mark.parametrize("charge", [0, 1, 2, 3])
def test_rotated_reversers_sort_charges_by_parity(charge):
    """J. Leach et al., Phys. Rev. Lett. 88, 257901 (2002): cos^2(l a), sin^2(l a), at 90 deg even from odd charges.

    A reverser rolled by 90 deg also reverses the sign of the light's polarization, which a scalar account leaves out:
    the ports change places.
    """
    mode = fa.LaguerreGauss(0, charge, 1 * mm)
    train = mach_zehnder(
        laser=fa.Laser(mode=mode, power=1.0, name="laser"),
        arm=[fa.KMirror(roll=0 * deg)],
        other=[fa.KMirror(roll=90 * deg)],
    )
    # Radial quadrature and sums over samples are good to some 1e-13 of the power.
    assert train.power("out.transmitted") == pytest.approx(math.cos(charge * math.pi / 2) ** 2, abs=1e-12)
    assert train.power("out.reflected") == pytest.approx(math.sin(charge * math.pi / 2) ** 2, abs=1e-12)
