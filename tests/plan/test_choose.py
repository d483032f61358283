import pytest

from fastaxis.elements import Aperture, Detector, FreeSpace, Laser, Lens, Polarizer, QPlate, SpiralPlate
from fastaxis.errors import ParameterError
from fastaxis.light import Gaussian, PlaneWave
from fastaxis.plan import make_plan
from fastaxis.train import Train
from fastaxis.units import mm, nm

BEAM, FLAT = Gaussian(waist=1 * mm), PlaneWave(area=1e-6)
OFF = (0.1 * mm, 0.0)


def engine(mode, *parts, end=None, asked="auto"):
    train = Train(wavelength=633 * nm).along(Laser(mode=mode, power=1.0), *parts, end or Detector(name="det"))
    return make_plan(train, "det", engine=asked).engine


@pytest.mark.parametrize(
    ("mode", "parts", "expected"),
    [
        (BEAM, [Polarizer(axis=0.3), FreeSpace(1.0), Lens(focal=0.5)], "uniform"),
        (BEAM, [SpiralPlate(charge=1), FreeSpace(1.0)], "uniform"),
        (BEAM, [Aperture(radius=1 * mm, centre=OFF)], "grid"),
        (BEAM, [QPlate(q=0.5, centre=OFF), Polarizer(axis=0.3)], "grid"),
        (FLAT, [Polarizer(axis=0.3), FreeSpace(1.0)], "uniform"),
        (FLAT, [Lens(focal=0.5, centre=OFF), FreeSpace(0.1)], "grid"),
    ],
)
def test_the_uniform_engine_answers_where_nothing_depends_on_the_place(mode, parts, expected):
    assert engine(mode, *parts) == expected


def test_a_camera_wants_the_picture(bench):
    assert make_plan(bench(Polarizer(axis=0.3)), "cam").engine != "uniform"
    assert make_plan(bench(Polarizer(axis=0.3), mode=FLAT), "cam").engine == "uniform"


def test_an_unknown_engine_is_refused():
    with pytest.raises(ParameterError, match="the engines are uniform, .*grid"):
        engine(BEAM, asked="quick")


def test_uniform_is_refused_where_there_is_structure():
    with pytest.raises(ParameterError, match="follows no transverse structure"):
        engine(BEAM, Aperture(radius=1 * mm), asked="uniform")
