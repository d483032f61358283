"""Beams that go round through parts that shape them, followed by one field: against trips one by one and closed forms."""

import math
import tracemalloc

import numpy as np
import pytest
import sympy as sp

import fastaxis as fa
from fastaxis.engines.azimuthal.circulating import Circulation
from fastaxis.engines import propagate
from fastaxis.plan import make_plan
from fastaxis.units import deg, mm, nm, um

WAVELENGTH, ARM, FOCAL = 633 * nm, 0.1, 0.3


def matched_waist():
    return math.sqrt(math.sqrt(ARM * (2 * FOCAL - ARM)) * WAVELENGTH / math.pi)


def ring(reflectance, *parts, mode=None, phase=0.0, focal=FOCAL, **light):
    """Two splitters, two mirrors and a lens; the parts stand behind the second half of the way."""
    light = light if "incoherent" in light else {"mode": mode or fa.Gaussian(matched_waist()), **light}
    train = fa.Train(wavelength=WAVELENGTH).along(
        fa.Laser(power=1.0, name="laser", **light),
        fa.BeamSplitter(reflectance=reflectance, name="in"), fa.FreeSpace(ARM, name="one"),
        fa.Lens(focal=focal, name="lens"), fa.FreeSpace(ARM, name="two"), *parts,
        fa.PhaseShift(phase=phase, name="tuning"), fa.BeamSplitter(reflectance=reflectance, name="out"),
    )  # fmt: skip
    return train.along("out.reflected", fa.Mirror(name="m1"), fa.Mirror(name="m2"), "in.side")


def hole(radius):
    return fa.Aperture(radius=radius, name="hole")


@pytest.mark.parametrize(
    "parts",
    [(hole(0.3 * mm),), (fa.SpiralPlate(charge=1, name="spiral"), hole(0.4 * mm)),
     (fa.QPlate(q=0.5, retardance=2.0, name="qp"), hole(0.35 * mm))],
    ids=["hole", "spiral", "q-plate"],
)  # fmt: skip
@pytest.mark.parametrize("port", ["out.transmitted", "in.reflected", "two.back"])
def test_one_field_going_round_is_the_sum_of_the_trips(parts, port):
    train = ring(0.04, *parts, mode=fa.Gaussian(0.15 * mm), state=fa.L)
    (quick,) = propagate(make_plan(train, port))
    (slow,) = propagate(make_plan(train, port, by_arms=True))
    x, y = np.linspace(-0.25 * mm, 0.2 * mm, 7), np.linspace(-0.1 * mm, 0.2 * mm, 5)
    # Both settle their profiles to 1e-12 of the peak, for each of some ten trips.
    assert np.allclose(quick.at(x, y), slow.at(x, y), rtol=0, atol=1e-10 * abs(slow.at(x, y)).max())


def two_mirrors(laser, reflectance=0.04):
    train = fa.Train(wavelength=WAVELENGTH).along(
        laser, fa.BeamSplitter(reflectance=reflectance, name="m1"), fa.FreeSpace(0.02, name="gap"), hole(0.3 * mm),
        fa.FreeSpace(0.05, name="rest"), fa.BeamSplitter(reflectance=reflectance, name="m2"),
        fa.FreeSpace(0.1, name="behind"),
    )  # fmt: skip
    return train.along("m2.reflected", "rest.back", "hole.back", "gap.back", "m1.side")


@pytest.mark.parametrize(
    ("laser", "ports"),
    [
        (fa.Laser(waist=0.25 * mm, name="laser"), ["behind", "m1.reflected", "gap.front", "hole.back", "hole.front"]),
        (fa.Laser(mode=fa.PlaneWave(area=1 * mm**2), name="laser"), ["behind"]),
    ],
    ids=["beam", "plane wave"],
)
def test_a_hole_that_is_met_twice_on_each_trip(laser, ports):
    train = two_mirrors(laser)
    for port in ports:
        plan = make_plan(train, port)
        assert any(branch.round_trip for branch in plan.branches)
        (quick,), (slow,) = propagate(plan), propagate(make_plan(train, port, by_arms=True))
        x, y = np.linspace(-0.25 * mm, 0.2 * mm, 5), np.array([0.1 * mm])
        # Both settle their profiles to 1e-12 of the peak, for each of some ten trips.
        assert np.allclose(quick.at(x, y), slow.at(x, y), rtol=0, atol=1e-10 * abs(slow.at(x, y)).max())


def airy(mode, reflectance, phase):
    """Transmitted share of a mode that fits the cavity."""
    matched = math.sqrt(ARM * (2 * FOCAL - ARM))
    gouy = (mode.degree + 1) * math.atan2((2 * ARM - ARM**2 / FOCAL) / matched, 1 - ARM / FOCAL)
    trip = 2 * math.pi * (2 * ARM / WAVELENGTH % 1) + math.pi - gouy + phase
    return (1 - reflectance) ** 2 / abs(1 - reflectance * np.exp(1j * trip)) ** 2


@pytest.mark.parametrize("phase", [0.0, 2.0])
@pytest.mark.parametrize("mode", [fa.Gaussian(matched_waist()), fa.LaguerreGauss(1, 2, matched_waist())])
def test_a_hole_far_outside_the_mode_leaves_the_airy_function_with_its_gouy_phases(mode, phase):
    train = ring(0.95, hole(10 * matched_waist()), mode=mode, phase=phase)
    # 540 trips, each right to 1e-12; the path of 3e5 waves is known to 4e-10 of a radian, times the finesse of 60.
    assert train.power("out.transmitted") == pytest.approx(airy(mode, 0.95, phase), rel=1e-7)
    assert train.power("out.transmitted") + train.power("in.reflected") == pytest.approx(1, abs=1e-9)


def test_a_plate_inside_is_as_derived_for_plane_waves_where_nothing_spreads():
    psi = sp.Symbol("psi", real=True)

    def cavity(laser, reflectance, phase, fast, retardance, *parts):
        train = fa.Train(wavelength=WAVELENGTH).along(
            laser, fa.BeamSplitter(reflectance=reflectance, name="m1"), fa.PhaseShift(phase=phase, name="tuning"),
            fa.Retarder(fast=fast, retardance=retardance, name="plate"), *parts,
            fa.BeamSplitter(reflectance=reflectance, name="m2"),
        )  # fmt: skip
        back = [f"{part.name}.back" for part in parts]
        return train.along("m2.reflected", *back, "plate.back", "tuning.back", "m1.side")

    wave = fa.Laser(mode=fa.PlaneWave(area=1 * mm**2), power=1.0, name="laser")
    beam = fa.Laser(waist=1 * mm, power=1.0, name="laser")
    form = cavity(wave, 0.7, psi, 20 * deg, 0.8).derive("m2.transmitted")
    train = cavity(beam, 0.7, 1.2, 20 * deg, 0.8, hole(7 * mm))  # exp(-2 49) of the beam hits its rim
    assert train.power("m2.transmitted") == pytest.approx(form.to_function("power")(psi=1.2), rel=1e-9)


def test_memory_does_not_grow_with_the_number_of_trips():
    peaks = []
    for reflectance in (0.3, 0.9):  # 25 and 260 trips
        train = ring(reflectance, hole(0.5 * mm))
        tracemalloc.start()
        train.power("out.transmitted")
        peaks.append(tracemalloc.get_traced_memory()[1])
        tracemalloc.stop()
    # Tables of the integrals are kept for reuse, a bounded number of them.
    assert peaks[1] < 3 * peaks[0]


def test_the_picture_of_a_cavity_holds_its_power():
    train = ring(0.8, hole(0.5 * mm))
    train.along("out.transmitted", fa.FreeSpace(0.05), fa.Camera(pixel=20 * um, shape=(160, 160), name="cam"))
    frame = train.expose("cam", [fa.H]).frame(0)
    # Light scattered at the rim misses the camera.
    assert frame.sum() == pytest.approx(train.power("out.transmitted"), rel=1e-4)


def test_each_part_of_a_mixture_goes_round_by_itself():
    one, other = (
        fa.Beam((fa.Term(1, fa.Gaussian(0.15 * mm), fa.H),)),
        fa.Beam((fa.Term(1, fa.Gaussian(0.2 * mm), fa.V),)),
    )
    parts = ((one,), (other, 640 * nm))
    alone = [
        ring(0.5, hole(0.4 * mm), incoherent=[(1.0, *part)]).power("out.transmitted") for part in parts
    ]  # fmt: skip
    mixed = ring(0.5, hole(0.4 * mm), incoherent=[(0.3, *parts[0]), (0.7, *parts[1])])
    assert mixed.power("out.transmitted") == pytest.approx(0.3 * alone[0] + 0.7 * alone[1], rel=1e-12)


def test_the_plan_tells_what_goes_round_and_how_often():
    text = str(ring(0.9, hole(0.5 * mm)).plan("out.transmitted"))
    assert "goes round through parts that shape it, and is followed trip by trip" in text
    assert "up to 0.9 of the amplitude is left after a trip" in text
    assert "add less than 1e-12 of it, at most 263 trips" in text
    assert "round 3. hole: scalar law, stop Disc" in text


def closed_loop(reflectance, *parts):
    train = fa.Train(wavelength=WAVELENGTH).along(
        fa.Laser(waist=0.5 * mm, power=1.0, name="laser"), fa.BeamSplitter(reflectance=reflectance, name="bs"),
        fa.Aperture(radius=5 * mm, name="hole"), *parts,
    )  # fmt: skip
    return train.along(parts[-1].name if parts else "hole", *(fa.Mirror() for _ in range(3)), "bs.side")


def test_light_that_fades_too_slowly_is_refused_with_its_loss_and_the_fix_adds_some():
    with pytest.raises(fa.SamplingError, match="0.99995 of the amplitude is left after a trip, which takes") as caught:
        closed_loop(0.9999).power("bs.reflected")
    assert "round hole, mirror1, mirror2, mirror3, bs: " in str(caught.value)
    fixed = closed_loop(0.9999, eval(caught.value.fix, {"fa": fa}))
    assert 0 < fixed.power("bs.reflected") < 1


def test_light_that_loses_next_to_nothing_is_refused_too():
    with pytest.raises(fa.SamplingError, match="1 of the amplitude is left after a trip, which takes no end of trips"):
        closed_loop(1 - 1e-11).power("bs.reflected")


def test_a_fine_cavity_that_nothing_cuts_is_refused_after_a_few_trips(monkeypatch):
    """Mirrors of 0.9999: 1e-12 (1 - 0.9999) of the sum is left after ln(1e-16)/ln(0.9999) = 368396 trips."""
    trips, step = [], Circulation.step
    monkeypatch.setattr(Circulation, "step", lambda self, rounds: (trips.append(1), step(self, rounds))[1])
    train = fa.Train(wavelength=850 * nm).along(
        fa.Laser(waist=0.3 * mm), fa.BeamSplitter(reflectance=0.9999, name="m1"), fa.FreeSpace(10 * mm, name="gap"),
        fa.BeamSplitter(reflectance=0.9999, name="m2"), fa.Detector(name="out"),
    ).along("m2.reflected", "gap.back", "m1.side")  # fmt: skip
    with pytest.raises(fa.SamplingError, match=r"takes 368396 trips to fade.*in the loop, behind m1"):
        train.power("out")
    assert len(trips) < 16
