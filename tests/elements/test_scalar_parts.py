"""Parts that keep the polarization: lens, space, stops, spiral plate, filter, mask, wedge, phase."""

import cmath
import math

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.elements import (
    Annulus,
    Aperture,
    FreeSpace,
    KnifeEdge,
    Lens,
    Mask,
    NeutralDensity,
    Obstacle,
    PhaseShift,
    RectangularAperture,
    Slit,
    SpiralPlate,
    Wedge,
)
from fastaxis.errors import SlipWarning
from fastaxis.laws import TravelLaw
from fastaxis.maths import NUMBERS
from fastaxis.units import deg, mm, mrad, nm, um

WAVELENGTH = 532 * nm
quick = settings(max_examples=50, deadline=None)


def law(part, ways=("front", "back")):
    (only,) = part.passages(WAVELENGTH)[ways].laws
    return only


class TestLens:
    def test_vergence_and_clear_area(self):
        lens = law(Lens(focal=250 * mm, radius=12.7 * mm, centre=(1 * mm, 0)))
        assert (lens.vergence, lens.stop.radius, lens.centre) == (4.0, 12.7 * mm, (1 * mm, 0.0))

    @quick
    @given(st.floats(0.01, 10), st.floats(0.01, 10))
    def test_two_lenses_one_focal_length_apart_image_at_infinity(self, f, g):
        # f + g apart: the ray matrix of a telescope has c = 0 and magnification -g/f.
        section = TravelLaw.lens(law(Lens(focal=f)).vergence).then(law(FreeSpace(f + g)))
        telescope = section.then(TravelLaw.lens(law(Lens(focal=g)).vergence))
        # Three products with entries up to 100 (1/f) times 20: relative rounding 1e-15 of them.
        assert telescope.c == pytest.approx(0, abs=1e-12)
        assert telescope.a == pytest.approx(-g / f, rel=1e-12)

    def test_same_from_behind(self):
        assert law(Lens(focal=0.5), ("back", "front")).vergence == 2.0

    def test_letter(self):
        f = sympy.Symbol("f", positive=True)
        assert law(Lens(focal=f)).vergence == 1 / f

    def test_a_radius_beyond_the_paraxial_is_a_caution(self):
        (caution,) = Lens(focal=20 * mm, radius=12.7 * mm, name="ball").cautions(WAVELENGTH)
        assert isinstance(caution, SlipWarning)
        fixed = eval(f"dict({caution.fix})", {"mm": mm})
        assert Lens(focal=20 * mm, **fixed).cautions(WAVELENGTH) == []

    def test_a_bare_number_of_millimetres_is_a_caution(self):
        (caution,) = Lens(focal=500).cautions(WAVELENGTH)
        assert caution.fix == "focal=500.0*mm"
        assert Lens(focal=500 * mm).cautions(WAVELENGTH) == []


class TestFreeSpace:
    def test_distance_by_position_or_by_name(self):
        assert FreeSpace(0.5) == FreeSpace(distance=0.5)
        assert law(FreeSpace(0.5)) == TravelLaw(1.0, 0.5, 0.0, 1.0, 0.5)

    def test_same_both_ways(self):
        assert law(FreeSpace(0.5), ("back", "front")) == law(FreeSpace(0.5))

    def test_zero_is_allowed(self):
        assert FreeSpace(0).distance == 0

    def test_half_a_kilometre_is_a_caution(self):
        (caution,) = FreeSpace(500, name="gap").cautions(WAVELENGTH)
        assert str(caution) == (
            "gap: distance = 500.0; distance is in metres and rarely beyond 100 m: its unit may be missing "
            "(fix: distance=500.0*mm)"
        )

    def test_letter(self):
        z = sympy.Symbol("z", positive=True)
        assert law(FreeSpace(z)).path == z


class TestStops:
    @pytest.mark.parametrize(
        ("part", "clear", "dark"),
        [
            (Aperture(radius=1 * mm), (0.9, 0.0), (0.0, 1.1)),
            (Aperture(radius=1 * mm, centre=(1 * mm, 0)), (1.9, 0.0), (-0.1, 0.0)),
            (Obstacle(radius=1 * mm), (0.0, 1.1), (0.9, 0.0)),
            (Annulus(inner=1 * mm, outer=2 * mm), (1.5, 0.0), (0.5, 0.0)),
            (RectangularAperture(width=4 * mm, height=2 * mm), (1.9, 0.9), (0.0, 1.1)),
            (Slit(width=1 * mm), (0.4, 30.0), (0.6, 0.0)),
            (Slit(width=1 * mm, angle=0), (30.0, 0.4), (0.0, 0.6)),
            (KnifeEdge(angle=0), (0.1, 5.0), (-0.1, 5.0)),
            (KnifeEdge(angle=90 * deg), (5.0, 0.1), (5.0, -0.1)),
            (KnifeEdge(centre=(1 * mm, 0)), (1.1, 0.0), (0.9, 0.0)),
        ],
        ids=lambda value: type(value).__name__,
    )
    @pytest.mark.parametrize("ways", [("front", "back"), ("back", "front")])
    def test_clear_and_dark_places_both_ways(self, part, clear, dark, ways):
        scalar = law(part, ways)
        side = 1 if ways[0] == "front" else -1
        for (x, y), sign in ((clear, 1), (dark, -1)):
            depth = scalar.stop.depth(side * x * mm - scalar.centre[0], y * mm - scalar.centre[1])
            assert depth * sign > 0

    def test_letters_for_sizes(self):
        a = sympy.Symbol("a", positive=True)
        assert law(Aperture(radius=a)).stop.radius == a
        assert Annulus(inner=a, outer=2 * a).symbols == {a}

    def test_a_radius_of_30_centimetres_is_a_caution(self):
        (caution,) = Aperture(radius=0.3).cautions(WAVELENGTH)
        assert caution.fix == "radius=0.3*mm"
        assert KnifeEdge(angle=2.5).cautions(WAVELENGTH) == []


class TestSpiralPlate:
    def test_charge(self):
        assert law(SpiralPlate(charge=-2)).charge == -2

    @quick
    @given(st.integers(-5, 5), st.floats(-3, 3))
    def test_from_behind_it_is_the_same_staircase(self, charge, phi):
        there, back = law(SpiralPlate(charge=charge)), law(SpiralPlate(charge=charge), ("back", "front"))
        forward = there.transmission.number() * cmath.exp(1j * there.charge * phi)
        backward = back.transmission.number() * cmath.exp(1j * back.charge * (math.pi - phi))
        # Phases up to 5 * 6 rad, rounded to 1.1e-16 of them.
        assert backward == pytest.approx(forward, abs=1e-13)

    def test_off_design_the_charge_goes_as_one_over_wavelength(self):
        plate = SpiralPlate(charge=2, design=633 * nm)
        assert plate.charge_at(633 * nm) == 2
        assert plate.charge_at(532 * nm) == pytest.approx(2 * 633 / 532, rel=1e-15)
        assert len(plate.cautions(532 * nm)) == 1

    def test_letter(self):
        charge = sympy.Symbol("l", integer=True)
        assert law(SpiralPlate(charge=charge)).charge == charge


class TestNeutralDensity:
    @quick
    @given(st.floats(0, 6), st.floats(0, 6))
    def test_densities_add(self, one, two):
        together = NeutralDensity(density=one + two).share
        assert NeutralDensity(density=one).share * NeutralDensity(density=two).share == pytest.approx(
            together, rel=1e-14
        )

    def test_density_2_passes_a_hundredth(self):
        assert law(NeutralDensity(density=2)).transmission.power == 0.01
        assert law(NeutralDensity(transmission=0.3)).transmission.power == 0.3

    def test_letter(self):
        density = sympy.Symbol("D", positive=True)
        assert NeutralDensity(density=density).share.subs(density, 2) == sympy.Rational(1, 100)


class TestMask:
    def test_phase_and_transmission_at_a_place(self):
        mask = Mask(phase=lambda x, y: 1e3 * x, transmission=np.array([[0.25, 1.0]]), pixel=1 * mm)
        value = law(mask).transmission.value(NUMBERS, np.array(-0.5 * mm), np.array(0.0))
        assert value == pytest.approx(0.5 * cmath.exp(-0.5j), abs=1e-15)

    def test_from_behind_x_is_reversed(self):
        mask = law(Mask(phase=lambda x, y: 1e3 * x + y), ("back", "front"))
        value = mask.transmission.value(NUMBERS, np.array(-0.5 * mm), np.array(0.0))
        assert value == pytest.approx(cmath.exp(0.5j), abs=1e-15)

    def test_plain_numbers_make_a_grey_phase_plate(self):
        assert law(Mask(phase=0.3, transmission=0.25)).transmission.number() == pytest.approx(
            0.5 * cmath.exp(0.3j), abs=1e-15
        )


class TestWedgeAndPhase:
    def test_tilt_is_met_reversed_in_x_from_behind(self):
        wedge = Wedge(x=2 * mrad, y=1 * mrad)
        assert law(wedge).tilt == (2 * mrad, 1 * mrad)
        assert law(wedge, ("back", "front")).tilt == (-2 * mrad, 1 * mrad)

    def test_phase_is_the_same_both_ways(self):
        for ways in (("front", "back"), ("back", "front")):
            assert law(PhaseShift(phase=0.4), ways).transmission.number() == pytest.approx(cmath.exp(0.4j), abs=1e-15)

    def test_letters(self):
        a = sympy.Symbol("a", real=True)
        assert law(Wedge(x=a)).tilt == (a, 0.0)
        assert law(PhaseShift(phase=a)).transmission.phase == a
        assert PhaseShift(phase=a).symbols == {a}


def test_moving_a_part_by_one_coordinate():
    assert Aperture(radius=1 * mm).changed(centre_x=5 * um).centre == (5 * um, 0.0)
