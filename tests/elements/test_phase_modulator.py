import math

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.elements import HalfWavePlate, Mask, PhaseModulator, PhaseShift, Polarizer, Retarder
from fastaxis.errors import ParameterError
from fastaxis.light import A, D, H, V, linear
from fastaxis.maths import NUMBERS
from fastaxis.units import deg, um

ROUNDING = 1e-14  # products of up to three 2x2 matrices with entries up to 1
angles = st.floats(-3, 3).filter(lambda angle: angle == 0 or angle != round(angle))  # whole radians are cautioned
quick = settings(max_examples=40, deadline=None)


def test_along_the_axis_it_is_a_phase_shift_and_across_it_nothing(jones):
    cell = jones(PhaseModulator(axis=0, phase=1.1))
    assert cell @ H.jones == pytest.approx(np.exp(1.1j) * H.jones, abs=ROUNDING)
    assert cell @ V.jones == pytest.approx(V.jones, abs=0)
    # Positive is more optical path, as of a phase shift.
    assert np.exp(1.1j) == pytest.approx(PhaseShift(phase=1.1).laws(5e-7)[0].transmission.number())


@quick
@given(angles, angles)
def test_it_is_a_wave_plate_with_its_slow_axis_there(jones, axis, phase):
    plate = jones(Retarder(slow=axis, retardance=phase))
    assert jones(PhaseModulator(axis=axis, phase=phase)) == pytest.approx(np.exp(0.5j * phase) * plate, abs=ROUNDING)


@quick
@given(angles, angles, st.floats(0, 1))
def test_loss_is_the_transmission_and_the_way_back_is_met_mirrored(jones, axis, phase, transmission):
    cell = PhaseModulator(axis=axis, phase=phase, transmission=transmission)
    forward, back = jones(cell), jones(cell, ("back", "front"))
    assert forward @ forward.conj().T == pytest.approx(transmission * np.eye(2), abs=ROUNDING)
    mirror = np.diag([-1.0, 1.0])
    assert back == pytest.approx(mirror @ forward.T @ mirror, abs=ROUNDING)


def test_half_a_wave_of_phase_turns_diagonal_light(jones):
    out = jones(PhaseModulator(axis=0, phase=math.pi)) @ D.jones
    assert abs(np.vdot(A.jones, out)) == pytest.approx(1, abs=ROUNDING)
    assert abs(np.vdot(A.jones, jones(HalfWavePlate(fast=0)) @ D.jones)) == pytest.approx(1, abs=ROUNDING)


@pytest.mark.parametrize("phase", [0.3, 1.7, 3.0])
def test_between_crossed_polarizers_it_passes_sine_squared_of_half_the_phase(jones, phase):
    chain = jones(Polarizer(axis=-45 * deg)) @ jones(PhaseModulator(axis=0, phase=phase)) @ D.jones
    assert np.vdot(chain, chain).real == pytest.approx(math.sin(phase / 2) ** 2, abs=ROUNDING)


@pytest.mark.parametrize("place", [(2e-4, -1e-4), (-3e-4, 4e-4)])
def test_a_pattern_writes_on_one_polarization_what_a_mask_writes_on_both(jones, place):
    def drawn(x, y):
        return 2e3 * x - 5e6 * y**2

    spot = {"x": np.array(place[0]), "y": np.array(place[1])}
    cell = jones(PhaseModulator(axis=30 * deg, phase=drawn), **spot)
    (mask,) = Mask(phase=drawn).laws(5e-7)
    written = mask.transmission.value(NUMBERS, **spot)
    along, across = linear(30 * deg).jones, linear(120 * deg).jones
    assert cell @ along == pytest.approx(complex(written) * along, abs=ROUNDING)
    assert cell @ across == pytest.approx(across, abs=ROUNDING)


def test_numbers_agree_with_letters(agrees):
    agrees(lambda axis, phase: PhaseModulator(axis=axis, phase=phase), {"axis": 0.4, "phase": 1.3})
    agrees(lambda axis, phase: PhaseModulator(axis=axis, phase=phase), {"axis": 0.4, "phase": 1.3}, ("back", "front"))


def test_it_expects_light_along_its_axis_unless_told():
    assert PhaseModulator(axis=20 * deg, phase=0.1).expected == linear(20 * deg)
    assert PhaseModulator(axis=20 * deg, phase=0.1, expects=D).expected == D
    assert HalfWavePlate(fast=0).expected is None
    assert HalfWavePlate(fast=0, expects=H).changed(fast=0.1).expected == H


@pytest.mark.parametrize(
    ("given", "said"),
    [
        ({"axis": 45, "phase": 0}, "cell: axis = 45.0; axis is in radians"),
        ({"axis": 0, "phase": 90}, "cell: phase = 90.0; phase is in radians"),
        ({"axis": 0, "phase": np.zeros((4, 4))}, "cell: pixel is not given; phase as an array needs"),
        ({"axis": 0, "phase": 0, "transmission": 2}, "cell: transmission = 2.0; transmission is a share of power"),
        ({"axis": 0, "phase": 0, "expects": "H"}, "cell: expects = 'H'; a part expects a state of polarization"),
    ],
)
def test_what_it_cannot_be(given, said):
    with pytest.raises(ParameterError) as refusal:
        PhaseModulator(name="cell", **given)
    assert str(refusal.value).startswith(said)


def test_an_array_of_cells_has_a_pixel():
    assert not PhaseModulator(axis=0, phase=np.eye(4), pixel=8 * um).laws(5e-7)[0].uniform


def test_it_is_kept_in_files_and_derived():
    phase = sympy.Symbol("beta", real=True)
    train = fa.Train(wavelength=633e-9).along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), state=D),
        PhaseModulator(axis=0, phase=phase, expects=D, name="cell"),
        fa.Detector(name="meter"),
    )
    again = fa.Train.from_text(train.to_text())
    assert again.elements["cell"] == train.elements["cell"]
    assert sympy.simplify(again.derive("meter").frame(-45 * deg).subs(phase, 0.7) - sympy.sin(0.35) ** 2) == (
        pytest.approx(0, abs=1e-12)
    )
