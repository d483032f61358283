import numpy as np
import pytest

import fastaxis as fa
from fastaxis.studies.tolerance.chain import make_chain
from fastaxis.units import deg, mm, nm


def bench(*parts):
    return fa.Train(wavelength=633 * nm, name="t").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"), *parts, fa.Detector(name="meter")
    )


ROWS = np.random.default_rng(3).normal(size=(50, 1))


def test_uniform_parts_behind_the_last_pattern_are_taken_out():
    train = bench(
        fa.HalfWavePlate(fast=0.1, name="first"), fa.QPlate(q=0.5, name="qp"), fa.HalfWavePlate(fast=0.2, name="last")
    )
    chain = make_chain(train, "meter", ("last.fast",), ROWS)
    assert chain.removed == ("last",)
    assert np.linalg.matrix_rank(chain.fields) == 1  # nothing in front of it changes
    assert make_chain(train, "meter", ("first.fast",), ROWS).fields.shape[1] == 2  # what the plate makes of H


def test_a_plate_met_twice_stays():
    train = bench(fa.QPlate(q=0.5, name="qp"), fa.HalfWavePlate(fast=0.2, name="hwp")).copy()
    twice = fa.Train(wavelength=633 * nm, name="t").along(
        fa.Laser(waist=1 * mm, state=fa.H, name="laser"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(fast=45 * deg, name="qwp"),
        fa.Mirror(name="end"),
    )
    twice.along("end", "qwp.back", "pbs.transmitted")
    twice.along("pbs.side", fa.Detector(name="meter"))
    chain = make_chain(twice, "meter", ("qwp.fast",), ROWS)
    assert "qwp" not in chain.removed
    assert make_chain(train, "meter", ("hwp.fast",), ROWS).removed == ("hwp",)


@pytest.mark.parametrize("name", ["laser.waist", "wavelength", "qp.centre_x"])
def test_what_changes_more_than_polarization_has_no_chain(name):
    values = np.array([[600 * nm], [700 * nm]]) if name == "wavelength" else np.array([[1e-3], [1.1e-3]])
    assert make_chain(bench(fa.QPlate(q=0.5, name="qp")), "meter", (name,), values) is None


def test_a_double_pass_agrees_with_its_closed_form():
    from fastaxis.studies.tolerance import normal, power_at

    train = fa.Train(wavelength=633 * nm, name="Kelp").along(
        fa.Laser(waist=1 * mm, power=1.0, state=fa.H, name="laser"),
        fa.PolarizingBeamSplitter(name="pbs"),
        fa.QuarterWavePlate(fast=45 * deg, name="qwp"),
        fa.Mirror(name="end"),
    )
    train.along("end", "qwp.back", "pbs.transmitted")
    train.along("pbs.side", fa.Detector(name="meter"))
    errors = {"qwp.retardance": normal(3 * deg), "qwp.fast": normal(2 * deg)}
    found = train.tolerance(errors, {"power": power_at("meter")}, draws=200)
    fast, retardance = 45 * deg + found.offsets[:, 1], 90 * deg + found.offsets[:, 0]
    # Twice the plate is a plate of twice the retardance: sin^2(2 fast) sin^2(retardance).
    assert found.samples["power"] == pytest.approx(np.sin(2 * fast) ** 2 * np.sin(retardance) ** 2, abs=1e-12)
    assert all(slope.exact for slope in found.sensitivities["power"].values())
