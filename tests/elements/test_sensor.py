"""The data of a sensor: what follows from them, and what they cannot be."""

import pytest
import sympy

import fastaxis as fa
from fastaxis import units
from fastaxis.elements import Camera, Sensor
from fastaxis.errors import ParameterError
from fastaxis.units import ms, um

PASTE = vars(units) | {"fa": fa}
GIVEN = {"full_well": 10_000, "quantum_efficiency": 0.6}


def test_a_full_well_reads_full_scale_unless_a_gain_is_given():
    sensor = Sensor(**GIVEN, bit_depth=12, offset=95)
    assert sensor.counts_per_electron == 0.4
    assert sensor.most_electrons == 10_000
    assert sensor.largest_count == 4095


def test_a_large_gain_ends_the_counts_before_the_well():
    # 12 bits, 0.25 counts an electron, offset 64: (4095 - 64)/0.25 electrons
    sensor = Sensor(full_well=30_000, quantum_efficiency=0.6, gain=0.25, offset=64)
    assert sensor.most_electrons == 16_124


def test_a_camera_with_a_sensor_survives_its_text_form():
    camera = Camera(pixel=3.45 * um, sensor=Sensor(**GIVEN, read_noise=2.5), exposure_time=2 * ms, name="cam")
    train = fa.Train(wavelength=532e-9).add(camera)
    assert fa.Train.from_text(train.to_text()).elements["cam"] == camera
    assert "full well 10000 e-, quantum efficiency 0.6, read noise 2.5 e-, 12 bit" in str(camera)
    assert "2.00 ms" in str(camera)


@pytest.mark.parametrize(
    ("given", "said", "fix"),
    [
        (
            {"quantum_efficiency": 62},
            "quantum_efficiency = 62; quantum_efficiency is a share",
            "quantum_efficiency=0.62",
        ),
        ({"quantum_efficiency": 0}, "quantum_efficiency = 0; ", "quantum_efficiency=0.6"),
        ({"full_well": 0}, "full_well = 0; full_well is above zero", "full_well=10000"),
        ({"full_well": sympy.Symbol("N")}, "full_well = N; what a sensor holds is given in numbers", "full_well=10000"),
        ({"read_noise": -1}, "read_noise = -1; read_noise is zero or more", "read_noise=2.5"),
        ({"dark_current": -1}, "dark_current = -1; dark_current is zero or more", "dark_current=1.0"),
        ({"bit_depth": 12.5}, "bit_depth = 12.5; bit_depth must be a whole number, 1 or more", "bit_depth=12"),
        ({"bit_depth": 64}, "bit_depth = 64; bit_depth is 1 to 32 bits", "bit_depth=12"),
        ({"gain": 0}, "gain = 0; gain is above zero", "gain=0.4"),
        ({"offset": 4095}, "offset = 4095; offset is a number of counts below full scale, 4095 here", "offset=0"),
        ({"offset": -1}, "offset = -1; ", "offset=0"),
    ],
)
def test_what_a_sensor_cannot_be(given, said, fix):
    with pytest.raises(ParameterError) as refusal:
        Sensor(**GIVEN | given)
    assert str(refusal.value).startswith(f"Sensor: {said}")
    assert refusal.value.fix == fix
    Sensor(**GIVEN | eval(f"dict({fix})", dict(PASTE)))


@pytest.mark.parametrize(
    ("given", "said"),
    [
        ({"sensor": 10_000}, "cam: sensor = 10000; a sensor is declared by what it holds"),
        ({"exposure_time": 0}, "cam: exposure_time = 0.0; exposure_time is a number of seconds above zero"),
        ({"exposure_time": sympy.Symbol("t")}, "cam: exposure_time = t; exposure_time is a number of seconds"),
    ],
)
def test_what_a_camera_cannot_read_with(given, said):
    with pytest.raises(ParameterError) as refusal:
        Camera(pixel=3.45 * um, name="cam", **given)
    assert str(refusal.value).startswith(said)
    Camera(pixel=3.45 * um, **eval(f"dict({refusal.value.fix})", dict(PASTE)))
