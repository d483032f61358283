"""Which setting a frame is asked for by: label, index, state or setting."""

import numpy as np
import pytest

from fastaxis.camera import no_analyzer, plate_then_polarizer
from fastaxis.camera.exposure import Exposure
from fastaxis.errors import ParameterError
from fastaxis.light import R, linear
from fastaxis.units import deg

EPS = np.finfo(float).eps


def test_a_frame_has_many_names(shots):
    for same in ("R", 4, -2, np.int64(4), R, shots.settings[4]):
        np.testing.assert_array_equal(shots.frame(same), shots.frames[4])


def test_a_setting_that_was_not_exposed_can_still_be_asked_for(shots):
    np.testing.assert_array_equal(shots.frame(no_analyzer()), shots.stokes[0])
    turned = shots.frame(linear(22.5 * deg))
    expected = (shots.stokes[0] + (shots.stokes[1] + shots.stokes[2]) / np.sqrt(2)) / 2
    np.testing.assert_allclose(turned, expected, atol=8 * EPS * shots.stokes[0].max())


@pytest.mark.parametrize(
    ("which", "message"),
    [
        ("Q", r"cam: no setting is called 'Q'; the settings exposed are: H, V, D, A, R, L \(fix: shots.frame\(\"H\"\)"),
        (6, r"cam: frame 6; frames are counted from 0 to 5 \(fix: shots.frame\(5\)\)"),
        (-7, "cam: frame -7; frames are counted from 0 to 5"),
        (1.5, "cam: frame 1.5; a frame is asked for by label, index, state or setting"),
        (True, "cam: frame True; a frame is asked for"),
    ],
)
def test_a_frame_that_is_not_there_is_refused(shots, which, message):
    with pytest.raises(ParameterError, match=message):
        shots.frame(which)


def test_a_label_that_two_settings_share_is_refused(shots):
    both = (plate_then_polarizer(fast=0.1, label="plate"), plate_then_polarizer(fast=0.2, label="plate"))
    twice = Exposure(stokes=shots.stokes, settings=both, x=shots.x, y=shots.y, pixel=1e-5, wavelength=633e-9)
    with pytest.raises(
        ParameterError, match=r"2 settings are called 'plate'; a label asked for belongs to one.*frame\(0"
    ):
        twice.frame("plate")


def test_the_same_setting_twice_is_no_riddle(shots):
    twice = Exposure(
        stokes=shots.stokes, settings=shots.settings[:1] * 2, x=shots.x, y=shots.y, pixel=1e-5, wavelength=633e-9
    )
    np.testing.assert_array_equal(twice.frame("H"), shots.frame("H"))
