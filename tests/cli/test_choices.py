import math

import numpy as np
import pytest
import sympy as sp

from fastaxis.camera import SIX_STATES
from fastaxis.cli import choices
from fastaxis.errors import ParameterError


def test_sets_by_name():
    assert choices.settings("six") == SIX_STATES
    assert [state.label for state in choices.settings("four")] == ["H", "V", "D", "R"]


def test_linear_analyzers_share_half_a_turn():
    assert [state.azimuth for state in choices.settings("linear:4")] == pytest.approx(np.arange(4) * math.pi / 4)


def test_a_rotating_plate():
    assert len(choices.settings("plate:16")) == 16


@pytest.mark.parametrize("text", ["seven", "linear", "linear:0", "linear:x", "plate:-3", ""])
def test_other_sets_are_refused(text):
    with pytest.raises(ParameterError, match="six, four, linear:N or plate:N"):
        choices.settings(text)


def test_one_setting_is_a_state_an_angle_or_a_letter():
    assert choices.one_setting("L").label == "L"
    assert choices.one_setting("30deg").azimuth == pytest.approx(math.pi / 6)
    assert choices.one_setting("alpha").azimuth == sp.Symbol("alpha", real=True)


def test_a_grid():
    grid = choices.grid("1024, 8mm")
    assert (grid.samples, grid.window) == (1024, 8e-3)


@pytest.mark.parametrize("text", ["1024", "8mm,1024", "10.5,8mm", "1024,"])
def test_a_grid_is_samples_and_window(text):
    with pytest.raises(ParameterError, match="SAMPLES,WINDOW"):
        choices.grid(text)


def test_formats():
    assert choices.formats("pdf, png") == ("pdf", "png")
    with pytest.raises(ParameterError, match="format 'svg'"):
        choices.formats("png,svg")
