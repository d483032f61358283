"""Power and state of all the light at a port."""

from types import SimpleNamespace

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.train.collected import state_of
from fastaxis.units import deg, mm, mW, nm


def fields(*stokes):
    return [SimpleNamespace(total_stokes=np.array(s)) for s in stokes]


def test_pure_light_gives_a_state():
    state = state_of(fields((2e-3, 0.0, 0.0, 2e-3)), "cam")
    assert isinstance(state, fa.State)
    assert state.ellipticity == pytest.approx(fa.R.ellipticity, abs=1e-15)


def test_parts_that_do_not_interfere_add_up():
    mixture = state_of(fields((3.0, 3.0, 0.0, 0.0), (1.0, -1.0, 0.0, 0.0)), "cam")
    assert mixture.stokes == pytest.approx([1, 0.5, 0, 0], abs=1e-12)


def test_unpolarized_light_has_no_direction():
    assert state_of(fields((1.0, 0.0, 0.0, 0.0)), "cam").stokes == pytest.approx([1, 0, 0, 0], abs=1e-15)


def test_the_dark_is_refused():
    with pytest.raises(fa.ParameterError, match="cam: 0 W; the dark has no polarization"):
        state_of(fields((0.0, 0.0, 0.0, 0.0)), "cam")


def test_a_double_pass_turns_the_light_to_the_side(isolator):
    assert isolator.power("cam") == pytest.approx(5 * mW, rel=1e-12)
    assert isolator.power("pbs.front") == pytest.approx(0, abs=1e-12 * mW)
    assert isolator.state("cam").stokes == pytest.approx([1, -1, 0, 0], abs=1e-12)


def test_a_plane_wave_counts_on_its_own_area():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), state=fa.D, power=2 * mW, name="laser"),
        fa.Polarizer(axis=0 * deg, name="pol"),
    )
    assert train.power("pol") == pytest.approx(1 * mW, rel=1e-12)
    assert train.state("pol").stokes == pytest.approx([1, 1, 0, 0], abs=1e-12)


def test_a_radial_beam_is_unpolarized_as_a_whole():
    train = fa.Train(wavelength=532 * nm).along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"), fa.QPlate(q=0.5, name="qp"), fa.FreeSpace(distance=0.1)
    )
    # A quarter turn of the grid maps it on itself and changes the sign of S1 and S2: they cancel to rounding.
    assert train.state("space1").stokes == pytest.approx([1, 0, 0, 0], abs=1e-12)


def test_rooms_to_the_right_answer_through_the_train(line):
    assert len(line.field("cam")) == 1
    assert line.expose("cam", fa.SIX_STATES).frames.shape == (6, 16, 16)
    assert "engine" in str(line.plan("cam"))
    assert line.derive("hwp").jones is not None
