from dataclasses import replace

import numpy as np
import pytest

from fastaxis.camera.sets import rotating_plate
from fastaxis.camera.settings import as_settings
from fastaxis.report.frames import draw_frames


@pytest.fixture
def readings(six_shots):
    stokes = np.array([1.0, 0.5, 0.3, 0.2]).reshape(4, 1, 1) * 1e-3
    return replace(
        six_shots, stokes=stokes, x=np.zeros(1), y=np.zeros(1), pixel=None, settings=as_settings(rotating_plate(64))
    )


def test_a_detector_gets_a_curve_of_power_in_a_readable_unit(readings):
    axes = draw_frames(readings).axes[0]
    drawn = axes.lines[0].get_ydata()
    assert axes.get_ylabel() == "power [µW]"
    assert drawn == pytest.approx([readings.power(k) * 1e6 for k in range(64)])
    assert axes.get_ylim()[0] == 0


def test_the_words_all_settings_share_are_on_the_axis(readings):
    axes = draw_frames(readings).axes[0]
    assert axes.get_xlabel() == "analyzer setting: plate fast …, polarizer 0°"


def test_of_many_settings_those_with_short_names_are_named(readings):
    """2.8125° apart, every third would be 8.4375°, every fourth is 11.25°."""
    named = [label.get_text() for label in draw_frames(readings).axes[0].get_xticklabels()]
    assert named[:3] == ["0°", "11.25°", "22.5°"]
    assert len(named) == 16
