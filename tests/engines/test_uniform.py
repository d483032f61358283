import numpy as np
import pytest

from fastaxis.elements import BeamSplitter, Detector, FreeSpace, Laser, Mirror, Polarizer, QuarterWavePlate
from fastaxis.engines import propagate
from fastaxis.errors import ParameterError
from fastaxis.light import Beam, D, Gaussian, H, PlaneWave, Raster, Term, UNPOLARIZED, V
from fastaxis.plan import make_plan
from fastaxis.train import Train
from fastaxis.units import deg, mm, nm, um

RASTER = Raster(10 * um, (3, 4))


def test_a_plane_wave_puts_its_irradiance_on_every_pixel(arrive):
    field = arrive(PlaneWave(area=2e-6), QuarterWavePlate(fast=45 * deg), FreeSpace(0.3), engine="auto")
    stokes = field.stokes_on(RASTER)
    assert stokes.shape == (4, 3, 4)
    # A quarter-wave plate at +45 deg makes H into R, and S3 = I_R - I_L = +S0. 1 W on 2 mm^2, 100 um^2 a pixel.
    assert np.allclose(stokes, np.array([1, 0, 0, 1])[:, None, None] * 5e-5, atol=1e-19)
    assert np.allclose(field.at(RASTER.x, RASTER.y)[:, 0, 0], np.array([1, -1j]) / np.sqrt(2) / np.sqrt(2e-6))
    assert field.power == pytest.approx(1, abs=1e-15)


def test_both_engines_agree_on_a_plane_wave(arrive):
    parts = [Polarizer(axis=0.3), FreeSpace(0.4), Mirror(), QuarterWavePlate(fast=0.2)]
    plain, sampled = (arrive(PlaneWave(area=1e-6), *parts, state=D, engine=e) for e in ("uniform", "grid"))
    assert np.allclose(plain.stokes_on(RASTER), sampled.stokes_on(RASTER), rtol=1e-12, atol=1e-18)
    assert np.allclose(plain.at(RASTER.x, RASTER.y), sampled.at(RASTER.x, RASTER.y), atol=1000 * 1e-12)


def test_both_engines_agree_on_the_power_of_a_beam(bench):
    train = bench(Gaussian(waist=1 * mm), BeamSplitter(reflectance=0.3, name="bs"), state=D)
    train.along("bs.reflected", Polarizer(axis=20 * deg), FreeSpace(0.2), Detector(name="det"))
    plans = [make_plan(train, "det", engine=engine) for engine in ("auto", "grid")]
    assert [plan.engine for plan in plans] == ["uniform", "grid"]
    (plain,), (sampled,) = map(propagate, plans)
    assert plain.power == pytest.approx(sampled.power, rel=1e-13)
    # The reflected beam's D has become A: cos^2(65 deg) of 0.3 W.
    assert plain.power == pytest.approx(0.3 * np.cos(65 * deg) ** 2, rel=1e-13)


def test_a_collected_beam_is_all_in_one_pixel():
    train = Train(wavelength=633 * nm).along(Laser(waist=1 * mm, power=0.5), Detector(name="det"))
    (field,) = propagate(make_plan(train, "det"))
    assert field.stokes_on(Raster(1 * mm, (1, 1)))[:, 0, 0] == pytest.approx([0.5, 0.5, 0, 0])
    with pytest.raises(ParameterError, match="was not followed"):
        field.stokes_on(RASTER)
    with pytest.raises(ParameterError, match="was not followed"):
        field.at(RASTER.x, RASTER.y)


def test_unpolarized_light_is_two_fields_of_half_the_power():
    laser = Laser(waist=1 * mm, power=0.5, state=UNPOLARIZED)
    train = Train(wavelength=633 * nm).along(laser, Polarizer(axis=0.7), Detector(name="det"))
    fields = propagate(make_plan(train, "det"))
    assert sum(field.power for field in fields) == pytest.approx(0.25, rel=1e-14)


def test_a_coherent_sum_of_states_in_one_mode(arrive):
    mode = PlaneWave(area=1e-6)
    beam = Beam((Term(1, mode, H), Term(1j, mode, V)))
    stokes = arrive(None, beam=beam, engine="auto").stokes_on(Raster(1 * mm, (1, 1)))[:, 0, 0]
    assert stokes == pytest.approx([1, 0, 0, -1])  # (1, i)/sqrt2 is L
