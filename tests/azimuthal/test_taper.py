import numpy as np

from fastaxis.engines.azimuthal.taper import Taper


def test_one_before_zero_behind_and_smooth_between():
    taper = Taper(1.0, 2.0)
    assert np.all(abs(taper(np.array([0.0, 1.0])) - 1) < 1e-14)
    assert np.all(taper(np.array([2.0, 5.0])) < 1e-14)
    assert np.all(np.diff(taper(np.linspace(1, 2, 50))) <= 0)
    assert taper(np.array([1.5]))[0] == 0.5


def test_an_earlier_end():
    assert Taper(1.0, 2.0).earlier() == Taper(0.8, 1.6)


def test_a_step_is_a_short_polynomial():
    taper = Taper(1.0, 2.0)
    middles = np.linspace(1, 2, 33)
    places = np.polynomial.chebyshev.chebpts1(24)
    series = np.polynomial.chebyshev.chebfit(places, taper(middles + taper.step / 2 * places[:, None]), 23)
    assert taper.step == 1 / 16
    # Degree 13, and some roundings.
    assert abs(series[14:]).max() < 2e-15
