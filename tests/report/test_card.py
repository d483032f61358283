"""The card of each part: what is said about it must be what it does."""

import html
import re

import numpy as np
import pytest
import sympy

import fastaxis.elements as e
from fastaxis import light
from fastaxis.conventions import View, stamp
from fastaxis.maths import NUMBERS
from fastaxis.report.card import card, card_html, card_rows, kind
from fastaxis.units import deg, mm, mrad, mW, nm, um, waves

theta, delta, q = sympy.symbols("theta delta q", real=True)
TWO = light.Beam(
    (light.Term(1, light.Gaussian(1 * mm), light.H), light.Term(1j, light.LaguerreGauss(0, 1, 1 * mm), light.V))
)
ALL = [
    e.HalfWavePlate(fast=22.5 * deg, name="hwp"),
    e.QuarterWavePlate(slow=45 * deg),
    e.Retarder(fast=20 * deg, retardance=100 * deg, design=633 * nm, order=2, transmission=0.98),
    e.Retarder(fast=theta, retardance=delta),
    e.HalfWavePlate(fast=theta),
    e.QPlate(q=0.5),
    e.QPlate(q=-1, offset=30 * deg, retardance=170 * deg, centre=(0.1 * mm, 0)),
    e.QPlate(q=q, offset=theta, retardance=delta),
    e.Polarizer(axis=30 * deg, extinction=1e4, transmission=0.9),
    e.Polarizer(axis=theta),
    e.PatternedRetarder(fast=lambda x, y: x),
    e.PatternedPolarizer(axis=np.zeros((4, 6)), pixel=8 * um),
    e.Rotator(angle=30 * deg),
    e.FaradayRotator(angle=theta),
    e.FreeSpace(500 * mm),
    e.Lens(focal=500 * mm, radius=12.7 * mm),
    e.Lens(focal=delta),
    e.Aperture(radius=2 * mm),
    e.RectangularAperture(width=2 * mm, height=1 * mm),
    e.Slit(width=0.1 * mm),
    e.KnifeEdge(centre=(1 * mm, 0)),
    e.Annulus(inner=1 * mm, outer=2 * mm),
    e.Obstacle(radius=1 * mm),
    e.SpiralPlate(charge=-2, design=532 * nm),
    e.NeutralDensity(density=1.5),
    e.Mask(phase=lambda x, y: x * y),
    e.Wedge(x=2 * mrad, y=theta),
    e.PhaseShift(phase=0.25 * waves),
    e.Mirror(),
    e.Mirror(fold="vertical", Rp=0.9, Rs=0.98, phase_p=20 * deg),
    e.BeamSplitter(reflectance=0.45),
    e.BeamSplitter(reflectance=q),
    e.PolarizingBeamSplitter(Tp=0.97, Ts=0.001),
    e.Laser(waist=0.8 * mm, power=5 * mW, state=light.D),
    e.Laser(mode=light.LaguerreGauss(0, 1, 1 * mm), state=light.UNPOLARIZED),
    e.Laser(beam=TWO),
    e.Laser(incoherent=[(0.5, TWO), (0.5, TWO, 633 * nm)]),
    e.Laser(waist=1 * mm, state=light.linear(theta)),
    e.Camera(pixel=3.45 * um, shape=(512, 640), name="cam"),
    e.Detector(),
    e.BeamDump(),
    e.MetalMirror(index=0.184 + 3.431j),
    e.KMirror(),
    e.KMirror(index=0.184 + 3.431j, roll=30 * deg),
    e.DovePrism(index=1.515),
    e.DovePrism(index=1.515, roll=theta),
    e.Rhomb(index=1.51, incidence=54.62 * deg),
    e.PickOff(index=1.515),
    e.Window(index=1.515),
    e.Window(index=1.52, layer=1.38, wedge=0.5 * deg, design=532 * nm),
    e.BeamSplitter(Rp=0.47, Rs=0.52, phase_rs=90 * deg, transmittance=0.45),
    e.PhaseModulator(axis=30 * deg, phase=0.5 * waves, expects=light.D),
    e.PhaseModulator(axis=theta, phase=delta),
]


def told(element, what, view=View.RECEIVER):
    """All texts of a row of this name."""
    return [text for _, rows in card_rows(element, view) for name, text in rows if name == what]


def test_every_class_of_part_has_a_card_here():
    classes = {getattr(e, name) for name in e.__all__ if name != "ORIENTATIONS"} - {
        e.Element,
        e.ThroughElement,
        e.Sensor,
    }
    assert {type(part) for part in ALL} == classes


@pytest.mark.parametrize("part", ALL, ids=lambda part: type(part).__name__)
def test_card_as_text_and_html_say_the_same(part):
    text, table = card(part), card_html(part)
    assert str(part) == text
    assert part._repr_html_() == table
    assert text.endswith(stamp())
    assert "None" not in text
    words = html.unescape(re.sub(r"<[^>]+>", " ", table)).split()
    assert sorted(words) == sorted(text.split())


def test_the_card_of_a_half_wave_plate_in_full():
    body = card(ALL[0]).rsplit("\n", 1)[0]
    assert body == "\n".join(
        [
            "hwp: half-wave plate",
            "  set to",
            "    fast          22.5 deg",
            "    retardance    180 deg (0.500 waves)",
            "  front to back",
            "    matrix        [ -0.7071i  -0.7071i ]",
            "                  [ -0.7071i   0.7071i ]",
            "    H             -> linear at 45 deg (D)",
            "    D             -> linear at 0 deg (H)",
            "    R             -> L",
            "    turning       linear light at a leaves at 2 fast - a: it turns 2 deg per deg of the plate",
            "    power         all of it, in any state",
        ]
    )


@pytest.mark.parametrize(
    ("part", "what", "text"),
    [
        (e.Laser(waist=0.8 * mm), "waist", "w = 0.80 mm (FWHM 0.94 mm)"),
        (e.Laser(waist=12.34 * um), "waist", "w = 12.3 µm (FWHM 14.5 µm)"),
        (e.Laser(waist=0.8 * mm, power=5 * mW), "power", "5.00 mW"),
        (e.QuarterWavePlate(fast=0), "retardance", "90 deg (0.250 waves)"),
        (e.Polarizer(axis=0), "extinction", "ideal"),
        (e.Polarizer(axis=0, extinction=1e5), "extinction", "100000 : 1"),
        (e.Polarizer(axis=0, extinction=100), "power", "1 % to 100 %, by the state; 50.5 % of unpolarized light"),
        (e.Lens(focal=-0.1), "curvature", "exp(-i k r^2/2f) with f = -100 mm: diverges"),
        (e.Aperture(radius=0.5 * mm), "clear area", "inside a circle of 1.00 mm diameter"),
        (e.SpiralPlate(charge=-2), "charge", "exp(-2i phi): l -> l - 2"),
        (e.Rotator(angle=30 * deg), "H", "-> linear at 30 deg"),
        (e.FaradayRotator(angle=45 * deg), "way back", "turns on: 90 deg after a mirror"),
        (e.QuarterWavePlate(fast=45 * deg), "H", "-> R"),
        (e.Mirror(), "R", "-> L"),
        (e.Mirror(), "D", "-> linear at -45 deg (A)"),
        (e.HalfWavePlate(fast=theta), "H", "-> linear at 2*theta"),
        (e.Rotator(angle=theta), "D", "-> linear at theta + pi/4"),
        (e.Rotator(angle=theta), "R", "-> R"),
        (e.Polarizer(axis=theta, transmission=0.9), "H", "-> linear at theta, 9*cos(theta)**2/10 of the power"),
        (e.Polarizer(axis=theta), "R", "-> linear at theta, 1/2 of the power"),
        (e.QPlate(q=0.5), "H", "-> linear at phi (radial)"),
        (e.QPlate(q=0.5, offset=45 * deg), "H", "-> linear at phi + 90 deg (azimuthal)"),
        (e.QPlate(q=0.5), "D", "-> linear at phi - 45 deg (spiral)"),
        (e.QPlate(q=-0.5), "H", "-> linear at -phi"),
        (e.QPlate(q=1), "L", "-> R, charge l -> l + 2"),
        (e.QPlate(q=-1), "R", "-> L, charge l -> l + 2"),
        (e.QPlate(q=-1), "analyzer", "linear light shows 4 lobes, which turn -0.5 deg per deg of the analyzer"),
        (
            e.QPlate(q=0.5, retardance=170 * deg),
            "unconverted",
            "0.7596 % of what passes keeps its state and charge; of the rest:",
        ),
        (e.Polarizer(axis=90 * deg), "H", "-> dark"),
        (e.MetalMirror(index=0.184 + 3.431j), "index", "0.184 + 3.431i"),
        (e.DovePrism(index=1.5), "picture", "flipped y -> -y: up and down change places, charge l becomes -l"),
        (
            e.KMirror(roll=10 * deg),
            "",
            "then turned by 20 deg counter-clockwise, which puts exp(-i l 20 deg) on charge l",
        ),
        (e.DovePrism(index=1.5), "coated", "no"),
        (e.PickOff(index=1.5, incidence=0), "s", "3.84 % leaves beside the two beams"),
        (e.Window(index=1.5), "first", "0.16 % of the beam, along it and counted with it"),
        (e.Camera(pixel=10 * um, shape=(100, 200)), "view", "2.00 mm x 1.00 mm"),
    ],
)
def test_what_is_told(part, what, text):
    assert text in told(part, what)


def test_a_right_handed_ellipse_is_called_so():
    # Quarter wave with the fast axis at +20 deg of H: positive ellipticity of the axis' own angle.
    (text,) = told(e.QuarterWavePlate(fast=20 * deg), "H")
    assert text == "-> right-handed ellipse at 20 deg, ellipticity 20 deg"


def test_the_view_renames_hands_and_nothing_else():
    plate = e.QuarterWavePlate(fast=45 * deg)
    assert told(plate, "H", View.SOURCE) == ["-> L"]
    assert told(plate, "matrix", View.SOURCE) == told(plate, "matrix")
    assert told(e.QPlate(q=0.5), "R", View.SOURCE) == ["-> L, charge l -> l + 1"]
    assert told(e.Laser(waist=1 * mm, state=light.R), "state", View.SOURCE) == ["L"]
    assert card(plate, View.SOURCE).endswith(stamp(View.SOURCE))


def test_ports_of_a_splitter_are_added_up():
    lossy = e.PolarizingBeamSplitter(Tp=0.9, Rp=0.05, Ts=0.01, Rs=0.99)
    assert told(lossy, "power")[-1] == "95 % of p and 100 % of s leaves"
    assert told(e.BeamSplitter(), "power")[-1] == "all of it leaves"


def test_a_part_says_what_it_expects():
    assert told(e.HalfWavePlate(fast=0.1, expects=light.D), "expects") == ["D"]
    assert told(e.HalfWavePlate(fast=0.1), "expects") == []


def test_what_goes_without_saying_is_left_out():
    assert [name for name, _ in card_rows(e.HalfWavePlate(fast=0.1))[0][1]] == ["fast", "retardance"]
    assert "centre" in dict(card_rows(e.QPlate(q=1, centre=(1 * mm, 0)))[0][1])


def test_matrix_with_letters_is_the_law():
    text = told(e.Retarder(fast=theta, retardance=delta), "matrix")[0]
    (law,) = e.Retarder(fast=0.4, retardance=1.1).laws(1e-6)
    for line, row in zip(text.split("\n"), law.linear(NUMBERS), strict=True):
        entries = re.split(r"  +", line.strip("[] "))
        values = [complex(sympy.sympify(x).subs({"theta": 0.4, "delta": 1.1}).evalf()) for x in entries]
        # Two ways of evaluating the same three-term sum.
        assert values == pytest.approx(list(row), abs=1e-14)


def test_matrix_with_numbers_is_rounded_to_four_digits():
    (law,) = e.Retarder(fast=20 * deg, retardance=100 * deg).laws(1e-6)
    entries = re.findall(r"[-\d.+i]+", told(e.Retarder(fast=20 * deg, retardance=100 * deg), "matrix")[0])
    values = [complex(entry.replace("i", "j")) for entry in entries]
    assert values == pytest.approx(
        [x for row in law.linear(NUMBERS) for x in row], abs=0.75e-4
    )  # half of the 4th digit, twice


def test_names_in_html_are_escaped():
    assert "&lt;b&gt;" in card_html(e.HalfWavePlate(fast=0, name="<b>"))


def test_kind_is_the_trades_word():
    assert kind(e.PolarizingBeamSplitter()) == "polarizing beam splitter"
    assert kind(e.KnifeEdge()) == "knife edge"


def test_laser_card_defers_to_the_safety_officer():
    assert told(ALL[33], "caution") == ["enclose the beam; follow your local rules and your laser safety officer"]
