"""Draws, slopes, rankings and limits against brute force and closed forms."""

import math
import re

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.studies.tolerance import (
    azimuth_error,
    correlated,
    ellipticity_error,
    extinction_ratio,
    frame_correlation,
    lobe_angle,
    normal,
    power_at,
    ring_radius,
    stokes_component,
    together,
    triangular,
    uniform,
    worst_case,
)
from fastaxis.units import deg, mm, um

# Sums of a few dozen products of numbers near 1, each good to 1e-16, from few propagations instead of one a draw.
SUMMED = 1e-11


def test_draws_agree_with_brute_force(many, twelve):
    merits = {
        "power": power_at("cam"),
        "behind D": power_at("h2", fa.D),
        "azimuth": azimuth_error("q2"),
        "ellipticity": ellipticity_error("q2", 5 * deg),
        "s3": stokes_component("q2", 3),
        "ratio": extinction_ratio("q1", fa.H, fa.V),
    }
    found = many.tolerance(twelve, merits, draws=300, seed=3)
    for row in (0, 7, 299):
        bench = many.with_changes(found.causes.changes(found.offsets[row]))
        at_h2, at_q1, at_q2 = (sum(f.total_stokes for f in bench.field(port)) for port in ("h2", "q1", "q2"))
        expected = [
            bench.power("cam"),
            (at_h2[0] + at_h2[2]) / 2,
            math.atan2(at_q2[2], at_q2[1]) / 2,
            math.atan2(at_q2[3], math.hypot(at_q2[1], at_q2[2])) / 2 - 5 * deg,
            at_q2[3] / at_q2[0],
            10 * math.log10((at_q1[0] + at_q1[1]) / (at_q1[0] - at_q1[1])),
        ]
        assert found.values[row] == pytest.approx(expected, rel=SUMMED, abs=1e-10)


def test_pictures_agree_with_brute_force(many, twelve):
    reference = many.expose("cam", [fa.H]).frame(0)
    merits = {
        "ring": ring_radius("cam"),
        "likeness": frame_correlation("cam", fa.H, reference),
        "lobe": lobe_angle("cam", fa.H, count=2),
    }
    found = many.tolerance(twelve, merits, draws=20)
    for row in (0, 19):
        shots = many.with_changes(found.causes.changes(found.offsets[row])).expose("cam", [fa.H, fa.no_analyzer()])
        expected = [
            merits["ring"].value(shots.frame(1), shots.x, shots.y),
            merits["likeness"].value(shots.frame(0), shots.x, shots.y),
            merits["lobe"].value(shots.frame(0), shots.x, shots.y),
        ]
        assert found.values[row] == pytest.approx(expected, rel=1e-9, abs=1e-12, nan_ok=True)


def test_lobes_are_those_of_the_beam_however_the_camera_is_mounted(many):
    merits = {"lobe": lobe_angle("cam", fa.linear(30 * deg), count=2)}
    errors = {"qp.offset": normal(1 * deg)}
    bare = many.with_changes({"q1.retardance": 0.0, "q2.retardance": 0.0, "pol.extinction": 1.001})
    upright = bare.tolerance(errors, merits, draws=3)
    mirrored = bare.with_changes({"cam.orientation": "mirrored"}).tolerance(errors, merits, draws=3)
    assert np.isfinite(upright.values).all()
    assert mirrored.values == pytest.approx(upright.values, abs=1e-12)


def test_slopes_are_those_of_the_law_of_malus(malus):
    found = malus.tolerance({"pol.axis": normal(1 * deg)}, {"power": power_at("meter")}, draws=10)
    slope = found.sensitivities["power"]["pol.axis"]
    assert slope.exact
    assert slope.value == pytest.approx(-math.sin(60 * deg), rel=1e-12)  # d cos^2(a)/da = -sin 2a
    assert found.nominal["power"] == pytest.approx(0.75)


def test_slopes_agree_with_differences(many, twelve):
    merits = {"power": power_at("pol"), "azimuth": azimuth_error("q2"), "ellipticity": ellipticity_error("q2"),
              "s1": stokes_component("h2", 1), "ratio": extinction_ratio("hwp", fa.H, fa.D)}  # fmt: skip
    found = many.tolerance(twelve, merits, draws=1)
    step = 1e-6
    for name, merit in merits.items():
        for parameter in ("hwp.fast", "qp.retardance", "q2.retardance"):
            ends = [many.with_changes({parameter: found.causes.nominal[parameter] + sign * step}) for sign in (1, -1)]
            values = [merit.values(sum(f.total_stokes for f in end.field(merit.target))[None]) for end in ends]
            # The light behind the q-plate is polarized to 1e-3 as a whole, so its azimuth turns a thousand times faster
            # than an axis: a difference is off by up to (1e3 step)^2 of the slope, and by roundings of 1e-13/step.
            expected = float(values[0] - values[1]) / (2 * step)
            slope = found.sensitivities[name][parameter]
            assert slope.value == pytest.approx(expected, rel=1e-5, abs=1e-6)


def test_a_difference_knows_its_error(malus):
    longer = malus.copy()
    found = longer.tolerance({"laser.waist": normal(0.1 * mm), "pol.transmission": uniform(0.0)},
                             {"power": lambda train: train.elements["laser"].waist ** 3}, draws=2)  # fmt: skip
    slope = found.sensitivities["power"]["laser.waist"]
    assert not slope.exact
    # Exact for a cubic: the extrapolation takes the error of the square of the step away.
    assert slope.value == pytest.approx(3 * (1 * mm) ** 2, rel=1e-9)
    assert slope.error > 0
    assert math.isnan(found.sensitivities["power"]["pol.transmission"].value)


def test_variance_of_a_linear_merit_is_the_sum_of_squares(malus):
    # Near 45 deg cos^2 is straight: slope -1 per radian.
    train = malus.with_changes({"pol.axis": 45 * deg})
    found = train.tolerance({"pol.axis": normal(0.2 * deg)}, {"power": power_at("meter")}, draws=10_000)
    assert found.ranking[0].sigma == pytest.approx(0.2 * deg, rel=1e-3)
    # The standard deviation of 10 000 draws is itself known to 1/sqrt(2 * 10 000) = 0.7 %; four times that.
    assert np.std(found.samples["power"]) == pytest.approx(0.2 * deg, rel=0.03)


def test_a_dark_port_is_ranked_by_its_curvature(malus):
    train = malus.with_changes({"pol.axis": 90 * deg})
    found = train.tolerance({"pol.axis": normal(1 * deg)}, {"leak": power_at("meter")}, draws=10_000)
    assert abs(found.sensitivities["leak"]["pol.axis"].value) < 1e-14
    # sin^2 e is e^2: its standard deviation is sqrt(2) s^2.
    assert found.ranking[0].sigma == pytest.approx(math.sqrt(2) * (1 * deg) ** 2, rel=1e-3)
    assert np.std(found.samples["leak"]) == pytest.approx(math.sqrt(2) * (1 * deg) ** 2, rel=0.1)
    assert found.worst["leak"].high == pytest.approx(math.sin(3 * deg) ** 2, rel=1e-9)
    assert found.worst["leak"].low == pytest.approx(0, abs=1e-15)


@pytest.mark.parametrize(
    ("error", "sigma", "limit"),
    [(normal(2.0), 2.0, 6.0), (uniform(3.0), math.sqrt(3), 3.0), (triangular(3.0), math.sqrt(1.5), 3.0),
     (worst_case(2.0), 2.0, 2.0)],
)  # fmt: skip
def test_distributions_have_their_moments(error, sigma, limit):
    values = error.values((np.arange(100_000) + 0.5) / 100_000)
    assert error.sigma == pytest.approx(sigma)
    assert error.limit == limit
    assert values.mean() == pytest.approx(0, abs=1e-9)
    assert values.std() == pytest.approx(sigma, rel=1e-3)  # the tails of the normal one are cut at 1/100 000
    assert (values**4).mean() / values.std() ** 4 == pytest.approx(error.kurtosis, rel=0.01)


def test_errors_that_move_together_cancel(malus):
    train = malus.with_changes({"pol.axis": 45 * deg})
    turned = fa.Train(wavelength=train.wavelength, name="t").along(
        train.elements["laser"],
        fa.HalfWavePlate(fast=0 * deg, name="hwp"),
        train.elements["pol"],
        fa.Detector(name="m"),
    )
    errors = {("hwp.fast", "pol.axis"): together(normal(1 * deg), factors=(1, 2))}
    found = turned.tolerance(errors, {"power": power_at("m")}, draws=50)
    # The plate turns the light by twice its own angle, so the polarizer follows it.
    assert found.samples["power"] == pytest.approx(np.full(50, 0.5), abs=1e-12)
    assert found.sensitivities["power"]["hwp.fast"].value == pytest.approx(2.0)
    assert found.ranking[0].sigma < 1e-12


def test_correlated_errors_have_their_covariance(many):
    covariance = np.array([[4.0, 3.0], [3.0, 9.0]]) * deg**2
    found = many.tolerance({("hwp.fast", "q1.fast"): correlated(covariance), "hwp.fast": uniform(1 * deg)},
                           {"power": power_at("pol")}, draws=10_000)  # fmt: skip
    expected = covariance + np.diag([1 / 3, 0]) * deg**2
    # Variances of 10 000 draws are known to 1.4 %; four times that.
    assert np.cov(found.offsets.T) == pytest.approx(expected, rel=0.06)


def test_yield_and_percentiles(malus):
    train = malus.with_changes({"pol.axis": 45 * deg})
    found = train.tolerance({"pol.axis": uniform(1 * deg)}, {"power": power_at("meter")}, draws=5_000,
                            limits={"power": (0.5, None)})  # fmt: skip
    assert found.yield_.low < 0.5 < found.yield_.high
    assert found.percentile(5) == pytest.approx(0.5 - 0.9 * deg, abs=2e-4)  # 90 % of the half width
    bench = found.at_percentile(5)
    assert bench.power("meter") == pytest.approx(found.percentile(5), abs=2e-5)
    text = str(found)
    for word in ("pol.axis: uniform", "as declared", "worst case", "within all limits", "exact", "signs:"):
        assert word in text
    with pytest.raises(fa.ParameterError, match="figures of merit are power"):
        found.percentile(5, "size")


def test_draws_that_cannot_be_read_are_not_good(many):
    found = many.tolerance({"qp.retardance": uniform(1 * deg)}, {"lobe": lobe_angle("cam", fa.R, count=7)}, draws=4,
                           limits={"lobe": (None, 1.0)})  # fmt: skip
    assert found.yield_.good == 0
    assert "could not be read" in str(found)
    with pytest.raises(fa.ParameterError, match="could be read"):
        found.at_percentile(5)


def test_a_place_is_propagated_draw_by_draw(malus):
    bench = fa.Train(wavelength=633e-9, name="Saltpan").along(
        fa.Laser(waist=0.4 * mm, state=fa.H, name="laser"),
        fa.QPlate(q=0.5, name="qp"),
        fa.Camera(pixel=100 * um, shape=(24, 24), name="cam"),
    )
    found = bench.tolerance({"qp.centre_x": uniform(50 * um)}, {"h": power_at("cam", fa.H)}, draws=3)
    one = bench.with_changes({"qp.centre_x": float(found.offsets[1, 0])})
    assert found.values[1, 0] == pytest.approx(sum(f.total_stokes for f in one.field("cam"))[:2].sum() / 2, rel=1e-9)


REFUSED = [
    (({}, {"p": power_at("meter")}), {}, "at least one"),
    (({"pol.axis": 0.1}, {"p": power_at("meter")}), {}, "an error like"),
    (({"pol.axes": normal(0.1)}, {"p": power_at("meter")}), {}, "has the parameters"),
    (({"laser.state": normal(0.1)}, {"p": power_at("meter")}), {}, "has a number"),
    (
        ({("pol.axis", "pol.transmission"): together(normal(0.1), factors=(1,))}, {"p": power_at("meter")}),
        {},
        "one number",
    ),
    (({"pol.axis": normal(0.1)}, {}), {}, "are named"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"limits": {"q": (0, 1)}}, "limits belong"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"limits": {"p": (2e-3, 1e-3)}}, "in this order"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"limits": {"p": (float("nan"), 1)}}, "in this order"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"limits": {"p": 1e-3}}, "a lowest and a highest"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"draws": 0}, "draws is a whole number of 1"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"seed": -1}, "seed is a whole number of 0"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"batch": 0}, "batch is a whole number of 1"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"executor": 3}, "concurrent.futures"),
    (({"pol.axis": normal(0.1)}, {"p": power_at("meter")}), {"limits": (0, 1)}, "by the name of the figure"),
    (({"pol.axis": normal(0.1)}, {"p": lambda train: "dark"}), {"draws": 3}, "gave 'dark'"),
]


@pytest.mark.parametrize(("arguments", "options", "words"), REFUSED)
def test_refusals(malus, arguments, options, words):
    with pytest.raises((fa.ParameterError, fa.WiringError), match=words):
        malus.tolerance(*arguments, **options)


@pytest.mark.parametrize("error", [normal(2), uniform(2), together(normal(2))])
def test_an_error_meant_in_degrees_is_told(malus, error):
    causes = {("pol.axis",): error} if not isinstance(error, type(normal(1))) else {"pol.axis": error}
    with pytest.warns(fa.SlipWarning, match="2 rad is 114.6 deg") as caught:
        malus.tolerance(causes, {"p": power_at("meter")}, draws=3)
    assert re.search(r"fix: (normal|uniform)\(2\*deg\)", str(caught[0].message))


def test_whole_numbers_of_numpy_will_do(malus):
    found = malus.tolerance({"pol.axis": normal(0.1)}, {"p": power_at("meter")}, draws=np.int64(3), seed=np.int32(1))
    assert len(found.values) == 3


def test_more_refusals():
    with pytest.raises(fa.ParameterError, match="zero or more"):
        normal(-1.0)
    with pytest.raises(fa.ParameterError, match="symmetric"):
        correlated([[1.0, 2.0], [0.0, 1.0]])
    with pytest.raises(fa.ParameterError, match="1, 2 and 3"):
        stokes_component("cam", 0)


def test_the_question_to_a_train_spells_out_every_option():
    import inspect

    from fastaxis.studies.fault import find_fault
    from fastaxis.studies.tolerance import tolerance

    for asked, answered in ((fa.Train.tolerance, tolerance), (fa.Train.find_fault, find_fault)):
        options = [
            {
                name: one.default
                for name, one in inspect.signature(each).parameters.items()
                if one.kind is one.KEYWORD_ONLY
            }
            for each in (asked, answered)
        ]
        assert options[0] == options[1]
        assert all(f"{name}" in asked.__doc__ for name in options[0])


def test_power_at_a_camera_counts_light_beside_the_sensor():
    small = fa.Train(wavelength=633e-9, name="Tern").along(
        fa.Laser(waist=1 * mm, power=1e-3, state=fa.H, name="laser"),
        fa.Polarizer(axis=0.0, name="pol"),
        fa.Camera(pixel=50 * um, shape=(16, 16), name="cam"),
    )
    found = small.tolerance({"pol.axis": normal(1 * deg)}, {"all": power_at("cam")}, draws=1)
    assert found.nominal["all"] == pytest.approx(small.power("cam"), rel=1e-12)
    # A square of 0.8 mm over a waist of 1 mm: erf(0.4 sqrt 2)^2.
    share = small.expose("cam", [fa.no_analyzer()]).power(0) / small.power("cam")
    assert share == pytest.approx(math.erf(0.4 * math.sqrt(2)) ** 2, rel=1e-3)
