"""Every slip gets one sentence with the part, the value, the rule and a fix; and every fix, pasted, works."""

import math

import numpy as np
import pytest
import sympy

import fastaxis as fa
import fastaxis.elements as parts
from fastaxis import light, units
from fastaxis.errors import ParameterError, SlipWarning, SymbolError

PASTE = vars(units) | {"fa": fa}
WAY = {"power": 5e-3}
SLIPS = [
    # part, what is given, how the message reads before the fix
    (
        "HalfWavePlate",
        {"fast": 22.5},
        "fast = 22.5; fast is in radians and 22.5 rad is 3.6 turns: write degrees as 45*deg",
    ),
    ("HalfWavePlate", {}, "fast = None, slow = None; a plate has its axis named once, as fast= or as slow="),
    ("HalfWavePlate", {"fast": 0.1, "slow": 0.2}, "fast = 0.1, slow = 0.2; a plate has its axis named once"),
    (
        "Retarder",
        {"fast": 0.1, "retardance": 90},
        "retardance = 90.0; retardance is in radians and 90 rad is 14.3 turns",
    ),
    ("Retarder", {"fast": math.nan}, "fast = nan; fast must be one real, finite number or a symbol"),
    ("Retarder", {"fast": "22.5"}, "fast = '22.5'; fast must be one real, finite number or a symbol"),
    ("Retarder", {"fast": 1j}, "fast = 1j; fast must be one real, finite number or a symbol"),
    ("Retarder", {"fast": sympy.I}, "fast = I; fast must be real and finite"),
    ("Retarder", {"fast": 0, "transmission": 1.2}, "transmission = 1.2; transmission is a share of power"),
    ("Retarder", {"fast": 0, "design": 633}, "design = 633.0; design is in metres and must lie between 10 nm and 1 mm"),
    (
        "Retarder",
        {"fast": 0, "order": 3},
        "order = 3, design = None; order counts whole waves at the design wavelength",
    ),
    ("Retarder", {"fast": 0, "order": 1.5, "design": 6e-7}, "order = 1.5; order must be a whole number, 0 or more"),
    ("Retarder", {"fast": 0, "order": -1, "design": 6e-7}, "order = -1.0; order must be a whole number, 0 or more"),
    ("QPlate", {"q": 0.3}, "q = 0.3; q must be a multiple of 1/2 (0.5, 1, 1.5 ...): any other value leaves a cut"),
    ("QPlate", {"q": 0.5, "offset": 45}, "offset = 45.0; offset is in radians and 45 rad is 7.2 turns"),
    ("QPlate", {"q": 0.5, "centre": 0.1}, "centre = 0.1; centre must be a pair (x, y) in metres"),
    ("QPlate", {"q": 0.5, "centre": (2.0, 0)}, "centre x = 2.0; centre x is in metres and 2 m is beyond 1 m"),
    ("Polarizer", {"axis": 0, "extinction": 1e-5}, "extinction = 1e-05; extinction is the ratio T1/T2"),
    ("Polarizer", {"axis": 0, "extinction": -3}, "extinction = -3.0; extinction is the ratio T1/T2"),
    ("Polarizer", {"axis": 45}, "axis = 45.0; axis is in radians"),
    (
        "PatternedRetarder",
        {"fast": np.zeros((4, 4))},
        "pixel is not given; fast as an array needs the side of its cells",
    ),
    (
        "PatternedRetarder",
        {"fast": np.zeros(4), "pixel": 8e-6},
        "fast has shape (4,) and type float64; fast as an array",
    ),
    ("PatternedRetarder", {}, "neither of fast and slow given; a plate has its axis named once"),
    (
        "PatternedRetarder",
        {"fast": lambda x, y: math.atan2(y, x)},
        "the function fast stops with TypeError (only",
    ),
    (
        "PatternedPolarizer",
        {"axis": lambda x, y: 1.0},
        "the function axis gives float64 of shape () at places of shape (2, 3); axis as a function",
    ),
    ("PatternedPolarizer", {"axis": np.zeros((2, 2)), "pixel": 8}, "pixel = 8.0; pixel is in metres and 8 m is beyond"),
    ("Rotator", {"angle": 90}, "angle = 90.0; angle is in radians and 90 rad is 14.3 turns"),
    ("FaradayRotator", {"angle": 0, "transmission": -0.1}, "transmission = -0.1; transmission is a share of power"),
    ("FreeSpace", {"distance": -0.5}, "distance = -0.5; distance must be zero or more"),
    ("Lens", {"focal": 0}, "focal = 0; a focal length of zero would turn light by any angle"),
    ("Lens", {"focal": 0.5, "radius": 12.7}, "radius = 12.7; radius is in metres and 12.7 m is beyond 1 m: its unit"),
    ("Aperture", {"radius": 0}, "radius = 0.0; radius must be positive"),
    (
        "Aperture",
        {"radius": 2},
        "radius = 2.0; radius is in metres and 2 m is beyond 1 m: its unit is probably missing",
    ),
    ("Annulus", {"inner": 2e-3, "outer": 1e-3}, "inner = 0.002, outer = 0.001; the inner radius of a ring is smaller"),
    ("Slit", {"width": 1e-4, "angle": 45}, "angle = 45.0; angle is in radians"),
    ("SpiralPlate", {"charge": 1.4}, "charge = 1.4; charge must be a whole number"),
    ("NeutralDensity", {}, "density = None, transmission = None; a grey filter is given once"),
    ("NeutralDensity", {"density": -2}, "density = -2; an optical density below zero would be gain"),
    (
        "Mask",
        {"transmission": np.full((2, 2), 2.0), "pixel": 8e-6},
        "transmission runs from 2 to 2; transmission is a share",
    ),
    ("Wedge", {"x": 2}, "x = 2; a thin wedge turns the beam by at most 0.3 rad"),
    ("PhaseShift", {"phase": 180}, "phase = 180.0; phase is in radians"),
    ("Mirror", {"fold": "sideways"}, "fold = 'sideways'; a mirror folds the beam \"horizontal\""),
    ("Mirror", {"Rp": 1.01}, "Rp = 1.01; Rp is a share of power"),
    ("MetalMirror", {"index": 0.2 - 3.4j}, "index = (0.2-3.4j); index is n + ik with n above 0 and k not below 0"),
    ("MetalMirror", {"index": "gold"}, "index = gold; index must be one finite number"),
    ("MetalMirror", {"index": 0.2 + 3.4j, "incidence": math.pi / 2}, "incidence = 90 deg; incidence is an angle of 0"),
    ("MetalMirror", {"index": 0.2 + 3.4j, "fold": "up"}, "fold = 'up'; a mirror folds the beam \"horizontal\""),
    ("PickOff", {"index": 0.9}, "index = 0.9; index is the refractive index of clear glass: real, and 1 or more"),
    ("PickOff", {"index": 1.5, "incidence": 45}, "incidence = 45.0; incidence is in radians"),
    ("Window", {"index": 1.5 + 0.1j}, "index = (1.5+0.1j); index is the refractive index of clear glass"),
    ("Window", {"index": 1.5, "wedge": 0.5}, "wedge = 0.5; the faces of a window make an angle of at most 0.1 rad"),
    ("Window", {"index": 1.5, "layer": 1.38, "design": 532}, "design = 532.0; design is in metres"),
    ("Rhomb", {"index": 1.5, "incidence": 0.5}, "incidence = 28.65 deg with index = 1.5; only beyond the critical"),
    ("Rhomb", {"index": 1.5, "incidence": 1.0, "reflections": 3}, "reflections = 3; a rhomb has 2 reflections"),
    ("DovePrism", {"index": 1.0}, "index = 1, base = 45 deg; the base of a Dove prism must be met beyond the critical"),
    ("DovePrism", {"index": 1.5, "roll": 22.5}, "roll = 22.5; roll is in radians"),
    ("KMirror", {"incidence": 0.7}, "incidence = 40.11 deg; the first mirror of a K-mirror is met at more than 45 deg"),
    ("BeamSplitter", {"Rp": 0.5, "Tp": 0.6}, "Tp = 0.6, Rp = 0.5; a splitter has no gain"),
    ("BeamSplitter", {"phase_rs": 0.0}, "transmittance = 0.5, reflectance = 0.5, phase_t = 0, phase_rs = 0; light at"),
    ("BeamSplitter", {"reflectance": 50}, "reflectance = 50.0; reflectance is a share of power"),
    ("PolarizingBeamSplitter", {"Tp": 1.5}, "Tp = 1.5; Tp is a share of power"),
    (
        "Camera",
        {"pixel": 3.45},
        "pixel = 3.45; pixel is in metres and 3.45 m is beyond 0.01 m: its unit is probably missing",
    ),
    ("Camera", {"pixel": 1e-6, "shape": 512}, "shape = 512; shape is a pair (ny, nx) of whole numbers of pixels"),
    ("Camera", {"pixel": 1e-6, "shape": (0, 5)}, "shape = (0, 5); shape is a pair (ny, nx) of whole numbers of pixels"),
    ("Camera", {"pixel": 1e-6, "orientation": "left"}, "orientation = 'left'; orientation is one of 'upright'"),
    ("Laser", WAY, "none given; the shape of a laser beam is given once"),
    (
        "Laser",
        {"waist": 1e-3, "mode": light.Gaussian(1e-3)},
        "waist and mode given; the shape of a laser beam is given",
    ),
    ("Laser", {"waist": 80}, "waist = 80.0; waist is in metres and 80 m is beyond 0.2 m: its unit is probably missing"),
    ("Laser", {"waist": 1e-3, "power": 0}, "power = 0.0; power must be positive"),
    ("Laser", {"waist": 1e-3, "state": "H"}, "state = 'H'; state is a polarization state or a mixture of states"),
    ("Laser", {"mode": "TEM00"}, "mode = 'TEM00'; mode is a transverse mode"),
    ("Laser", {"beam": "TEM00"}, "beam = 'TEM00'; beam is a Beam of Terms"),
    ("Laser", {"incoherent": [0.5]}, "part 0.5; each incoherent part is (weight, Beam) or (weight, Beam, wavelength)"),
]


@pytest.mark.parametrize(("kind", "given", "reads"), SLIPS, ids=lambda value: value if isinstance(value, str) else None)
def test_slip_is_told_in_one_sentence_and_its_fix_works(kind, given, reads):
    make = getattr(parts, kind)
    with pytest.raises(ParameterError) as refusal:
        make(name="it", **given)
    sentence = str(refusal.value)
    assert sentence.startswith(f"it: {reads}")
    assert sentence.count("(fix: ") == 1
    assert "\n" not in sentence
    fixed = eval(f"dict({refusal.value.fix})", dict(PASTE))
    make(name="it", **_merged(kind, given, fixed))


def _merged(kind, given, fixed):
    """What is given with the fix pasted over it; a plate's axis and a laser's shape take the place of the others."""
    groups = ({"fast", "slow"}, {"waist", "mode", "beam", "incoherent"})
    dropped = {name for group in groups if group & fixed.keys() for name in group}
    return {name: value for name, value in given.items() if name not in dropped} | fixed


def test_a_centre_needs_no_unit_to_be_a_pair():
    with pytest.raises(ParameterError, match="centre must be a pair"):
        parts.Aperture(radius=1e-3, centre=(1e-3, 0, 0))


def test_a_waist_place_belongs_to_a_waist():
    with pytest.raises(ParameterError) as refusal:
        parts.Laser(name="it", mode=light.Gaussian(1e-3), waist_at=0.2)
    assert str(refusal.value).startswith(
        "it: waist_at = 0.2, centre = (0.0, 0.0); waist_at and centre place the Gaussian"
    )
    parts.Laser(**eval(f"dict({refusal.value.fix})", dict(PASTE)))


def test_terms_bring_their_own_states():
    beam = light.Beam((light.Term(1, light.Gaussian(1e-3), light.H),))
    with pytest.raises(ParameterError) as refusal:
        parts.Laser(name="it", beam=beam, state=light.D)
    assert (
        str(refusal.value)
        == "it: state given beside beam; the terms of a beam have their states already (fix: state=None)"
    )
    parts.Laser(beam=beam, **eval(f"dict({refusal.value.fix})"))


def test_an_edge_needs_a_number():
    with pytest.raises(SymbolError) as refusal:
        parts.KnifeEdge(name="it", angle=sympy.Symbol("a"))
    assert (
        str(refusal.value)
        == "it: angle = a; an edge is drawn on a grid and needs its angle as a number (fix: angle=45*deg)"
    )
    parts.KnifeEdge(**eval(f"dict({refusal.value.fix})", dict(PASTE)))


def test_unknown_parameter_names_the_likely_one():
    with pytest.raises(ParameterError) as refusal:
        parts.Polarizer(axis=0.0, name="pol").changed(axes=0.3)
    assert str(refusal.value) == (
        "pol: no parameter 'axes'; Polarizer has the parameters axis, extinction, transmission (fix: \"pol.axis\")"
    )


def test_changed_values_are_checked_too():
    with pytest.raises(ParameterError, match="q must be a multiple of 1/2"):
        parts.QPlate(q=0.5).changed(q=0.3)


@pytest.mark.parametrize(
    ("kind", "given", "fix"),
    [
        ("HalfWavePlate", {"fast": 10}, "fast=10*deg"),
        ("Polarizer", {"axis": 5}, "axis=5*deg"),
        ("QPlate", {"q": 0.5, "offset": -12}, "offset=-12*deg"),
        ("Slit", {"width": 1e-3, "angle": 9}, "angle=9*deg"),
        ("Rotator", {"angle": 7}, "angle=7*deg"),
        ("HalfWavePlate", {"fast": 3.0}, "fast=3*deg"),
        ("Polarizer", {"axis": -1.0}, "axis=-1*deg"),
    ],
)
def test_a_few_whole_radians_are_a_caution(kind, given, fix):
    part = getattr(parts, kind)(name="it", **given)
    (caution,) = part.cautions(5e-7)
    assert caution.fix == fix
    assert part.changed(**eval(f"dict({fix})", dict(PASTE))).cautions(5e-7) == []


@pytest.mark.parametrize(
    ("make", "fix"),
    [
        (lambda: parts.HalfWavePlate(fast=3), "fast=3*deg"),
        (lambda: parts.Polarizer(axis=0).changed(axis=-1), "axis=-1*deg"),
        (lambda: light.State(2), "azimuth=2*deg"),
        (lambda: light.State(2.0), "azimuth=2*deg"),
        (lambda: light.linear(5.0), "angle=5*deg"),
        (lambda: fa.Mount(12.0), "zero=12*deg"),
        (lambda: fa.polarizer_at(1.0), "axis=1*deg"),
        (lambda: light.linear(5), "angle=5*deg"),
        (lambda: light.elliptical(1, 0.1), "azimuth=1*deg"),
        (lambda: fa.Mount(12), "zero=12*deg"),
        (lambda: fa.polarizer_at(6), "axis=6*deg"),
        (lambda: fa.plate_then_polarizer(slow=7), "slow=7*deg"),
    ],
)
def test_angles_typed_without_a_unit_are_a_caution_at_once(make, fix):
    with pytest.warns(SlipWarning) as found:
        made = make()
    assert [warning.message.fix for warning in found] == [fix]
    # What has been said is not said again by the train.
    assert not isinstance(made, parts.Element) or made.cautions(5e-7) == []


def test_a_few_whole_radians_read_as_a_sentence():
    (caution,) = parts.HalfWavePlate(fast=10, name="hwp").cautions(5e-7)
    assert str(caution) == (
        "hwp: fast = 10.0; fast is in radians and 10 rad is 573.0 deg: degrees are written 10*deg (fix: fast=10*deg)"
    )


@pytest.mark.parametrize("fast", [0, 0.5, -2.5, 4.5, sympy.Symbol("a"), math.pi])
def test_other_angles_are_none(fast):
    assert parts.HalfWavePlate(fast=fast).cautions(5e-7) == []


def test_a_retardance_of_two_radians_is_a_plate():
    assert parts.Retarder(fast=0.1, retardance=2.0).cautions(5e-7) == []
    assert parts.Retarder(fast=0.1, retardance=4.0).cautions(5e-7) != []
