"""Forms of light that comes by several paths."""

import pytest
import sympy as sp
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines.symbolic import derive
from fastaxis.engines.symbolic.ring import ExactMaths, Ring
from fastaxis.errors import SymbolError

w, lam, R = sp.symbols("w lambda R", positive=True)
a, b, p = sp.symbols("alpha beta psi", real=True)


def vanishes(expression):
    return ExactMaths(Ring()).number(expression).is_zero()


def interferometer(arm, *, ratio=0.5, lengths=None):
    """Two splitters and two mirrors; ``arm`` stands in the transmitted arm."""
    train = fa.Train(wavelength=lam)
    spaces = [fa.FreeSpace(length) for length in lengths] if lengths else [fa.PhaseShift(phase=0.0)] * 2
    train.along(fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1.0), fa.BeamSplitter(reflectance=ratio, name="first"))
    train.along("first.transmitted", spaces[0], *arm, fa.Mirror(), fa.BeamSplitter(reflectance=ratio, name="second"))
    train.along("first.reflected", spaces[1], fa.Mirror(), "second.side")
    return train


def test_the_two_ports_of_an_interferometer_share_all_power():
    """L. Zehnder (1891), L. Mach (1892): cos^2 and sin^2 of half the phase."""
    train = interferometer([fa.PhaseShift(phase=p)])
    first, second = derive(train, "second.transmitted").power, derive(train, "second.reflected").power
    assert vanishes(first + second - 1)
    assert {sp.simplify(first), sp.simplify(second)} == {sp.cos(p / 2) ** 2, sp.sin(p / 2) ** 2}


def test_a_letter_for_the_splitting_ratio():
    train = interferometer([fa.PhaseShift(phase=p)], ratio=R)
    power = derive(train, "second.transmitted").power
    # One way is transmitted twice, the other reflected twice: t^2 exp(i psi) + (i r)^2.
    assert vanishes(power - ((1 - R) ** 2 + R**2 - 2 * R * (1 - R) * sp.cos(p)))
    assert vanishes(power + derive(train, "second.reflected").power - 1)


def test_a_half_wave_plate_in_one_arm_marks_the_path():
    """Fresnel and Arago: light of crossed polarizations does not interfere; visibility |cos 2 alpha|."""
    train = interferometer([fa.PhaseShift(phase=p), fa.HalfWavePlate(fast=a)])
    total = derive(train, "second.transmitted").power
    # 1/2 + v/2 cos(psi - psi_0): the squares of the first two slopes add up to v^2/4.
    assert vanishes(sp.diff(total, p) ** 2 + sp.diff(total, p, 2) ** 2 - sp.cos(2 * a) ** 2 / 4)


def test_path_lengths_enter_as_an_exact_phase():
    one, two = sp.symbols("L_1 L_2", positive=True)
    power = derive(interferometer([], lengths=(one, two)), "second.transmitted").power
    assert vanishes(power - sp.sin(sp.pi * (one - two) / lam) ** 2)


def test_forms_of_several_paths_agree_with_numbers():
    train = interferometer([fa.QPlate(q=0.5, retardance=a), fa.SpiralPlate(charge=1)], ratio=0.45)
    # Two paths of eight parts each.
    assert derive(train, "second.transmitted").check(points=4).roundings < 200


def test_light_of_two_lasers_adds_up_in_power():
    train = fa.Train(wavelength=lam)
    train.along(fa.Laser(waist=w, power=0.2, state=fa.H), fa.BeamSplitter(reflectance=0.5, name="bs"))
    train.along(fa.Laser(waist=w, power=0.1, state=fa.V), "bs.side")
    found = derive(train, "bs.transmitted")
    assert found.power == sp.Rational(3, 20)
    assert list(found.stokes) == [sp.Rational(1, 2), sp.Rational(1, 6), 0, 0]


def test_a_loop_has_no_closed_form():
    train = fa.Train(wavelength=lam)
    train.along(fa.Laser(waist=w), fa.BeamSplitter(name="bs"))
    train.along("bs.reflected", fa.Mirror(), fa.Rotator(angle=b), fa.Mirror(), fa.Mirror(), "bs.side")
    with pytest.raises(SymbolError, match="a loop on the way"):
        derive(train, "bs.reflected")


def test_a_line_of_some_width_is_refused_where_paths_differ_in_length():
    train = interferometer([], lengths=(0.1, 0.2)).with_changes({"wavelength": 633e-9})
    wide = train.with_changes({"laser1.line": fa.GaussianLine(coherence_length=0.05)})
    with pytest.raises(SymbolError, match="of a line of some width they are partly coherent") as caught:
        derive(wide, "second.transmitted")
    fixed = eval(caught.value.fix, {"train": wide, "fa": fa})
    assert derive(fixed, "second.transmitted").power == derive(train, "second.transmitted").power
    equal = interferometer([fa.PhaseShift(phase=p)]).with_changes(
        {"laser1.line": fa.GaussianLine(coherence_length=0.05)}
    )
    assert derive(equal, "second.transmitted").power.has(p)


def test_light_of_two_wavelengths_meets_plates_as_each_wavelength_does():
    beam = fa.Beam((fa.Term(1, fa.PlaneWave(area=1e-6), fa.H),))
    laser = fa.Laser(incoherent=[(0.5, beam, 633e-9), (0.5, beam, 500e-9)], power=1.0)
    train = fa.Train(wavelength=633e-9).along(
        laser, fa.Retarder(fast=0.5, retardance=1.2, design=633e-9), fa.Polarizer(axis=0.0), fa.Detector(name="out")
    )
    assert float(derive(train, "out").power) == pytest.approx(train.power("out"), rel=1e-13)
    assert derive(train, "out").check().roundings < 100


def test_an_analyzer_erases_what_marks_the_paths():
    """M. O. Scully, K. Druehl, Phys. Rev. A 25, 2208 (1982), in classical light: none without, full fringes at 45 deg."""
    made = derive(interferometer([fa.PhaseShift(phase=p), fa.HalfWavePlate(fast=sp.pi / 4)]), "second.transmitted")
    assert made.power == sp.Rational(1, 2)
    assert vanishes(made.frame(sp.pi / 4) - (1 + sp.sin(p)) / 4)
    assert not made.frame(0).has(p)


@pytest.mark.parametrize("charge", [1, 2, 3])
def test_a_turned_picture_sorts_charges(charge):
    """J. Leach et al., Phys. Rev. Lett. 88, 257901 (2002): cos^2(l alpha) and sin^2(l alpha)."""

    def arm(roll):
        # The plate gives H back what the mirrors of a rolled K-mirror do to it.
        return fa.KMirror(roll=roll), fa.HalfWavePlate(fast=roll)

    train = fa.Train(wavelength=lam)
    train.along(fa.Laser(mode=fa.LaguerreGauss(0, charge, w), power=1.0), fa.BeamSplitter(name="first"))
    train.along("first.transmitted", *arm(a), fa.Mirror(), fa.BeamSplitter(name="second"))
    train.along("first.reflected", *arm(0.0), fa.Mirror(), "second.side")
    assert derive(train, "second.reflected").power == sp.cos(charge * a) ** 2
    assert derive(train, "second.transmitted").power == sp.sin(charge * a) ** 2


def test_the_leak_of_a_double_pass_isolator():
    """Common practice, no source: 1 - sin^2(2 alpha) sin^2(delta) comes back, the rest goes to the side."""
    train = fa.Train(wavelength=lam)
    train.along(fa.Laser(waist=w, power=1.0), fa.PolarizingBeamSplitter(name="pbs"))
    train.retro("pbs.transmitted", fa.Retarder(fast=a, retardance=b), fa.Mirror(name="end"))
    back, side = derive(train, "pbs.front").power, derive(train, "pbs.side").power
    assert vanishes(side - sp.sin(2 * a) ** 2 * sp.sin(b) ** 2)
    assert vanishes(back + side - 1)


_LOSSLESS = (
    lambda letter: fa.Retarder(fast=letter, retardance=1.1),
    lambda letter: fa.Retarder(fast=0.3, retardance=letter),
    lambda letter: fa.FaradayRotator(angle=letter),
    lambda letter: fa.PhaseShift(phase=letter),
    lambda letter: fa.Rotator(angle=letter),
)
_ARMS = st.lists(st.sampled_from(_LOSSLESS), max_size=2)


@given(_ARMS, _ARMS, st.booleans())
@settings(max_examples=10, deadline=None)
def test_energy_closes_identically(one, other, polarizing):
    one_arm = [make(sp.Symbol(f"x_{n}", real=True)) for n, make in enumerate(one)]
    other_arm = [make(sp.Symbol(f"y_{n}", real=True)) for n, make in enumerate(other)]
    train = fa.Train(wavelength=lam)
    last = fa.PolarizingBeamSplitter(name="second") if polarizing else fa.BeamSplitter(reflectance=R, name="second")
    train.along(fa.Laser(waist=w, power=1.0, state=fa.elliptical(0.2, b)), fa.BeamSplitter(reflectance=R, name="first"))
    train.along("first.transmitted", *one_arm, fa.Mirror(), last)
    train.along("first.reflected", *other_arm, fa.Mirror(), "second.side")
    ports = ("second.transmitted", "second.reflected")
    # Nothing here differs from place to place, so the shares of light add up to 1 whatever the letters.
    forms = [derive(train, port) for port in ports]
    total = forms[0].stokes_polys()[0] + forms[0].parts[0].field.place.maths.ring.adopted(forms[1].stokes_polys()[0])
    assert (total - total.ring.rational(1)).is_zero()
