"""A sweep gives what an exposure of every value gives, from fewer propagations."""

import numpy as np
import pytest

import fastaxis as fa
from fastaxis.units import deg, mm, mW, nm

GRID = fa.Grid(samples=192, window=6 * mm)
ANGLES = np.radians(np.linspace(-80, 170, 23))
SPANS = np.radians(np.linspace(20, 340, 11))

# A hand-set grid of 192 samples keeps the tests fast; both ways use the same samples, so how good they are is no matter.
pytestmark = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")


# A plate's angle turns cos 2a, sin 2a, beside which a half-wave plate passes nothing; a retardance cos d/2, sin d/2; a
# polarizer's leak sqrt(1/extinction); a transmission is one factor.
@pytest.mark.parametrize(
    ("parameter", "values", "fields"),
    [
        ("hwp.fast", ANGLES, 2),
        ("hwp.slow", ANGLES, 2),
        ("qwp.fast", ANGLES, 3),
        ("qwp.retardance", SPANS, 2),
        ("pol.axis", ANGLES, 3),
        ("pol.extinction", np.geomspace(2, 1e5, 9), 2),
        ("hwp.transmission", np.linspace(0, 1, 7), 1),
        ("qp.offset", ANGLES, 3),
        ("qp.retardance", SPANS, 2),
        ("second.offset", ANGLES, 3),
    ],
)
def test_one_parameter_on_the_grid(bench, compare, parameter, values, fields):
    assert compare(bench, {parameter: values}, checked=3, grid=GRID).propagations == fields


def test_fewer_values_than_coefficients_cost_one_propagation_each(bench, compare):
    assert compare(bench, {"qwp.fast": ANGLES[:2]}, checked=2, grid=GRID).propagations == 2


def test_close_values_are_as_exact(bench, compare):
    compare(bench, {"qwp.fast": 0.3 + 1e-5 * np.arange(9)}, grid=GRID)


def test_two_parameters_take_the_product_of_their_propagations(bench, compare):
    swept = compare(bench, {"qwp.retardance": SPANS, "hwp.fast": ANGLES}, grid=GRID)
    assert swept.propagations == 4
    assert swept.shape == (11, 23)
    assert swept.powers.reshape(*swept.shape, -1).shape == (11, 23, 6)


def test_both_parameters_of_one_plate_take_three(bench, compare):
    assert compare(bench, {"qwp.retardance": SPANS, "qwp.fast": ANGLES}, grid=GRID).propagations == 3


# Two plates turned together are of second degree in cos 2a, sin 2a: 1, and sine and cosine of 2a and 4a.
def test_plates_turned_together(bench, compare):
    assert compare(bench, {"qp.offset": ANGLES, "qwp.fast": ANGLES}, zipped=True, grid=GRID).propagations == 5


def test_plates_turned_against_each_other(bench, compare):
    compare(bench, {"qp.offset": ANGLES, "qwp.fast": -2 * ANGLES[::-1] / 3}, zipped=True, grid=GRID)


def test_incoherent_light_of_two_lines_and_states(bench_with, compare):
    red, green = (fa.Beam((fa.Term(1, fa.Gaussian(waist=0.5 * mm), state),)) for state in (fa.R, fa.linear(20 * deg)))
    train = bench_with(incoherent=((0.5, red, 633 * nm), (0.2, green, 633 * nm), (0.3, green, 500 * nm)))
    # The plate has a design wavelength, so each line sees retardances of its own and asks for two numbers.
    assert compare(train, {"qwp.retardance": SPANS}, grid=GRID, checked=3).propagations == 4
    assert compare(train, {"hwp.fast": ANGLES}, grid=GRID, checked=2).propagations == 2


# Of second degree in cos d/2, sin d/2 and in cos 2a, sin 2a.
@pytest.mark.parametrize(("parameter", "values", "fields"), [("qwp.retardance", SPANS, 3), ("qwp.fast", ANGLES, 5)])
def test_a_plate_passed_twice(compare, parameter, values, fields):
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), power=2 * mW, state=fa.H, name="laser"),
        fa.QuarterWavePlate(fast=10 * deg, name="qwp"),
        fa.Retarder(fast=20 * deg, retardance=1, name="between"),
        fa.Mirror(name="mirror"),
        "between.back",
        "qwp.back",
        fa.Camera(pixel=60e-6, shape=(2, 3), name="cam"),
    )
    assert compare(train, {parameter: values}).propagations == fields


def test_light_about_the_axis(centred, compare):
    swept = compare(centred, {"qwp.fast": ANGLES}, checked=2)
    assert "engine azimuthal" in swept.exposure(0).plan


def test_a_plane_wave(flat, compare):
    swept = compare(flat, {"qwp.fast": ANGLES, "hwp.fast": ANGLES})
    assert swept.exposure(0).plan.startswith("plan for cam: engine uniform")
    assert swept.propagations == 6


def test_a_detector(bench, compare):
    train = fa.Train(wavelength=633 * nm).along(*list(bench.elements.values())[:-1], fa.Detector(name="bucket"))
    assert compare(train, {"qwp.fast": ANGLES}, target="bucket", grid=GRID).propagations == 3


@pytest.mark.parametrize(
    "values",
    [
        {"leg.distance": [0.1, 0.15]},
        {"laser.waist": [0.5 * mm, 0.6 * mm]},
        {"laser.state": [fa.H, fa.R]},
        {"second.q": [0.5, 1.0]},
        {"qp.centre_x": [0.0001, 0.0002]},
        {"cam.pixel": [50e-6, 60e-6]},
        {"wavelength": [633 * nm, 640 * nm]},
    ],
)
def test_parameters_that_change_more_than_polarization_run_again(bench, compare, values):
    assert compare(bench, values, checked=2, grid=GRID).propagations == 2


def test_a_distance_and_an_angle(bench, compare):
    swept = compare(bench, {"leg.distance": [0.1, 0.12, 0.15], "hwp.fast": ANGLES}, grid=GRID, checked=5)
    assert swept.propagations == 3 * 2


def test_the_order_of_parameters_is_that_of_the_values(bench, compare):
    swept = compare(bench, {"hwp.fast": ANGLES[:4], "leg.distance": [0.1, 0.12]}, grid=GRID, checked=5)
    assert swept.at(1) == {"hwp.fast": ANGLES[0], "leg.distance": 0.12}
    assert [index for index, _ in swept.frames("H")] == [0, 2, 4, 6, 1, 3, 5, 7]


@pytest.mark.filterwarnings("ignore:spare:fastaxis.errors.WiringWarning")
def test_a_part_beside_the_path_changes_nothing(bench, compare):
    bench.add(fa.HalfWavePlate(fast=0, name="spare"))
    assert compare(bench, {"spare.fast": ANGLES}, grid=GRID).propagations == 1


def test_light_by_two_paths_is_propagated_for_each_value(compare):
    train = fa.Train(wavelength=633 * nm, name="Gannet Stack").along(
        fa.Laser(mode=fa.PlaneWave(area=1e-6), power=2 * mW, state=fa.D, name="laser"),
        fa.BeamSplitter(name="split"),
    )
    train.along("split.transmitted", fa.HalfWavePlate(fast=20 * deg, name="hwp"), fa.BeamSplitter(name="join"))
    train.along("split.reflected", fa.Mirror(name="mirror"), "join.side")
    train.along("join.transmitted", fa.Camera(pixel=60e-6, shape=(2, 3), name="cam"))
    assert compare(train, {"hwp.fast": ANGLES[:3]}, checked=3).propagations == 3


def test_three_propagations_an_angle_about_the_axis(centred):
    angles = {"qwp.fast": np.linspace(0, np.pi, 7), "qp.offset": np.linspace(0, 0.9, 5)}
    for name, some in angles.items():
        swept = centred.sweep({name: some}, "cam", fa.H)
        swept.frame(0, "H")
        assert swept.propagations <= 3
    # Two angles: all pairs of three.
    both = centred.sweep(angles, "cam", fa.H)
    both.frame(0, "H")
    assert both.propagations <= 9
