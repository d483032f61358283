"""The power beside a sensor: asked for once, and only when somebody wants to know."""

import pickle

import pytest

import fastaxis as fa
from fastaxis.camera.arrival import Arrival, arrival
from fastaxis.engines.joined import JoinedField
from fastaxis.units import mm, mrad, nm, um


@pytest.fixture
def gannet_stack():
    """A wedge in one of two arms, and a camera that sees the middle of the beam."""
    train = fa.Train(wavelength=633 * nm, name="Gannet Stack").along(
        fa.Laser(waist=0.5 * mm, power=0.8, name="laser"), fa.BeamSplitter(name="in"), fa.Aperture(radius=0.4 * mm),
        fa.FreeSpace(0.2), fa.Mirror(name="m1"), fa.BeamSplitter(name="out"),
        fa.Camera(pixel=50 * um, shape=(8, 8), name="cam"),
    )  # fmt: skip
    return train.along("in.reflected", fa.FreeSpace(0.1), fa.Mirror(name="m2"), fa.Wedge(x=0.5 * mrad), "out.side")


def test_a_question_is_asked_once():
    asked = []
    power = Arrival(lambda: asked.append(1) or 0.25)
    assert not asked
    assert (power.power, power.power, len(asked)) == (0.25, 0.25, 1)


def test_an_exposure_of_two_arms_goes_to_another_process(gannet_stack):
    shots = gannet_stack.expose("cam", fa.H)
    there = pickle.loads(pickle.dumps(shots))
    assert there.arrived == shots.arrived
    assert (there.frames == shots.frames).all()


def test_an_exposure_of_two_arms_asks_for_their_overlap_when_it_is_wanted(gannet_stack, monkeypatch):
    asked, total = [], JoinedField.power
    monkeypatch.setattr(JoinedField, "power", property(lambda field: asked.append(1) or total.fget(field)))
    shots = gannet_stack.expose("cam", fa.H)
    turned = shots.upright.in_view(fa.View.SOURCE)
    assert not asked
    assert shots.arrived == turned.arrived == pytest.approx(gannet_stack.power("cam"), rel=1e-12)
    assert len(asked) == 2  # the train asked once more
    assert 0.1 < shots.total_power / shots.arrived < 0.9


def test_fields_too_large_to_keep_are_followed_again(gannet_stack):
    plan, fields = gannet_stack.plan("cam"), gannet_stack.field("cam")
    # The same sums of the same numbers.
    assert arrival(plan, fields, room=0).power == arrival(plan, fields, room=1 << 40).power


def test_what_is_known_as_the_light_goes_is_a_number(gannet_stack):
    one = gannet_stack.along("out.reflected", fa.Camera(pixel=50 * um, shape=(8, 8), name="other"))
    straight = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.5 * mm, power=0.8), fa.Camera(pixel=50 * um, shape=(4, 4), name="cam")
    )
    assert straight.expose("cam", fa.H).arrived == pytest.approx(0.8, rel=1e-12)
    total = sum(one.expose(camera, fa.H).arrived for camera in ("cam", "other"))
    alone = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.5 * mm, power=0.4), fa.Aperture(radius=0.4 * mm), fa.Detector(name="meter")
    )
    # Both ports together have what the splitters were given; the wedge's arm is sampled to its guard.
    assert total == pytest.approx(0.4 + alone.power("meter"), abs=1e-9)
