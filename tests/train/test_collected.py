"""Power and state of all the light at a port."""

from types import SimpleNamespace

import pytest

import fastaxis as fa
from fastaxis.train.collected import state_of


def fields(*stokes):
    return [SimpleNamespace(total_stokes=s) for s in stokes]


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
