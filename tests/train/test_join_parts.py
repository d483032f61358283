"""New parts in a joint, a ledger without a laser, a camera where there was none."""

import pytest

import fastaxis as fa
from fastaxis.units import mm, nm, um


def split():
    return fa.Train(wavelength=633 * nm).along(fa.Laser(waist=1 * mm, name="laser"), fa.BeamSplitter(name="bs"))


def test_a_new_part_is_added_by_its_joint():
    train = split().join("bs.reflected", fa.Camera(pixel=5 * um, shape=(16, 16), name="cam"))
    assert train.joints[-1] == ("bs.reflected", "cam.in")
    assert train.cameras == ["cam"]


def test_a_joint_to_no_part_at_all_is_refused_in_a_sentence():
    with pytest.raises(fa.WiringError, match="a train takes parts"):
        split().join("bs.reflected", 0.1)


def test_a_ledger_needs_a_laser_as_a_power_does():
    train = fa.Train(wavelength=633 * nm).along(fa.FreeSpace(10 * mm, name="gap"))
    with pytest.raises(fa.WiringError, match="no source among gap; a train needs a laser") as caught:
        train.ledger()
    eval(caught.value.fix, {"train": train, "fa": fa, "mm": mm, "mW": 1e-3})
    assert len(train.ledger().ends) == 1


@pytest.mark.parametrize("asked", ["bs.reflected", "bs"])
def test_pictures_of_an_open_port_are_taken_by_a_camera_put_there(asked):
    train = split()
    with pytest.raises(fa.ParameterError, match="pictures are taken by a Camera") as caught:
        train.expose(asked, fa.H)
    eval(caught.value.fix, {"train": train, "fa": fa, "um": um})
    assert train.joints[-1][0] in {"bs.reflected", "bs.transmitted"}
    assert train.expose("cam2", fa.H).power(0) > 0


def test_pictures_inside_the_bench_are_those_of_the_camera_behind():
    train = split().along("bs.transmitted", fa.Camera(pixel=100 * um, shape=(64, 64), name="cam"))
    with pytest.raises(fa.ParameterError) as caught:
        train.expose("bs.transmitted", fa.H)
    assert eval(caught.value.fix, {"train": train, "fa": fa}).target == "cam"
