import matplotlib as mpl
import numpy as np
import pytest

from fastaxis.conventions import View, stamp
from fastaxis.report import style


def lightness(colours):
    """CIE L* of sRGB colours; sRGB and CIE 1976 formulas, IEC 61966-2-1 and ISO/CIE 11664-4, from memory."""
    rgb = np.asarray(colours)[:, :3]
    linear = np.where(rgb <= 0.04045, rgb / 12.92, ((rgb + 0.055) / 1.055) ** 2.4)
    y = linear @ np.array([0.2126, 0.7152, 0.0722])
    return np.where(y > 0.008856, 116 * np.cbrt(y) - 16, 903.3 * y)


def test_brighter_light_is_never_a_darker_colour():
    for colours in (style.light_map(), style.pale_map().reversed()):
        assert np.all(np.diff(lightness(colours(np.linspace(0, 1, 200)))) > 0)


def test_plus_and_minus_are_equally_strong_and_zero_is_the_lightest():
    values = lightness(style.signed_map()(np.linspace(-1, 1, 201) / 2 + 0.5))
    assert values.argmax() == pytest.approx(100, abs=1)
    # The two ends differ by less than a printer's step of ten in L*.
    assert abs(values[0] - values[-1]) < 10


def test_azimuth_colours_close():
    ends = style.azimuth_map()(np.array([0.0, 1.0]))
    assert np.allclose(ends[0], ends[1])


def test_the_two_hands_differ_in_every_kind_of_eye():
    # Rust and blue lie on opposite sides of the blue-yellow axis, which red-green blindness leaves alone.
    right, left = (np.array(mpl.colors.to_rgb(c)) for c in (style.RIGHT, style.LEFT))
    yellowness = [colour[:2].mean() - colour[2] for colour in (right, left)]
    assert yellowness[0] > 0.2
    assert yellowness[1] < -0.2


def test_the_callers_settings_are_left_alone():
    with mpl.rc_context({"font.size": 31.0}):
        figure = style.styled(lambda: style.new_figure(3, 3))()
        assert mpl.rcParams["font.size"] == 31.0
    assert figure.get_figwidth() == 3


def test_the_foot_holds_the_stamp_of_the_view():
    figure = style.new_figure(12, 3)
    style.footer(figure, View.SOURCE, note="a note")
    assert figure.texts[0].get_text() == f"a note\n{stamp(View.SOURCE)}"


def test_a_long_stamp_is_wrapped_within_a_narrow_figure():
    figure = style.new_figure(4, 3)
    style.footer(figure)
    box = figure.texts[0].get_window_extent()
    assert box.x1 <= figure.bbox.x1


@pytest.mark.parametrize("width", [3.2, 4.1, 5.1, 6.4])
def test_a_stamp_is_broken_between_two_signs_never_within_one(width):
    figure = style.new_figure(width, 3)
    style.footer(figure)
    *broken, last = figure.texts[0].get_text().split("\n")
    assert all(line.endswith(";") for line in broken)
    assert " ".join([*broken, last]) == stamp()
