"""Fields of several arms together: power, pictures, partial coherence."""

import math

import numpy as np
import pytest
from scipy.integrate import dblquad

import fastaxis as fa
from fastaxis.engines.joined import JoinedField
from fastaxis.engines.joined.coherence import coherence, mixtures
from fastaxis.engines.joined.extent import Extent
from fastaxis.engines.joined.nodes import Axis, nodes_needed
from fastaxis.light import Raster
from fastaxis.units import deg, mm, mrad, nm, um


def ports(train, **options):
    return [train.power(port, **options) for port in ("out.transmitted", "out.reflected")]


@pytest.mark.parametrize("engine", ["auto", "grid", "azimuthal"])
def test_both_ports_of_two_shaped_arms_add_up_to_the_input(mach_zehnder, engine):
    train = mach_zehnder(arm=[fa.FreeSpace(1.2), fa.Lens(focal=3.0)], other=[fa.FreeSpace(0.7)])
    assert sum(ports(train, engine=engine)) == pytest.approx(1, abs=1e-12)


def test_engines_agree_on_arms_of_different_length(mach_zehnder):
    train = mach_zehnder(arm=[fa.FreeSpace(2.0)], other=[fa.FreeSpace(0.5)])
    # The grid window holds a Gaussian to 1e-12 of its power.
    assert ports(train, engine="grid") == pytest.approx(ports(train, engine="azimuthal"), abs=1e-11)


def test_tilted_arms_share_the_power_as_their_overlap_says(mach_zehnder):
    tilt, phase = 0.2 * mrad, 0.6
    train = mach_zehnder(other=[fa.Wedge(x=tilt)]).with_changes({"phase.phase": phase})
    overlap = math.exp(-((math.pi * 1 * mm * tilt / (632.8 * nm)) ** 2) / 2)  # of two Gaussians tilted by an angle
    # i^2 for the two reflections of one arm: dark at zero phase.
    expected = (1 - overlap * math.cos(phase)) / 2
    assert ports(train) == pytest.approx([expected, 1 - expected], abs=1e-12)


def test_equal_arms_are_in_phase_exactly_however_their_lengths_are_written(mach_zehnder):
    arm = [fa.FreeSpace(d) for d in (0.1, 0.2, 0.3)]
    other = [fa.FreeSpace(d) for d in (0.3, 0.1, 0.2)]
    dark, bright = ports(mach_zehnder(arm=arm, other=other))
    assert dark == pytest.approx(0, abs=1e-13)
    assert bright == pytest.approx(1, abs=1e-13)


def test_a_quarter_wave_of_length_is_a_quarter_wave_of_phase(mach_zehnder):
    laser = fa.Laser(mode=fa.PlaneWave(area=1e-6), power=1.0, name="laser")  # a beam adds the Gouy phase
    train = mach_zehnder(laser, arm=[fa.FreeSpace(0.5 + 632.8 * nm / 4)], other=[fa.FreeSpace(0.5)])
    # 0.5 m is written to 1.1e-16 m: 1e-9 rad.
    assert ports(train) == pytest.approx([0.5, 0.5], abs=2e-9)


def test_the_pictures_of_both_ports_add_up_only_when_one_is_mirrored(mach_zehnder):
    train = mach_zehnder(arm=[fa.SpiralPlate(charge=2)], other=[fa.FreeSpace(0.04), fa.Wedge(x=2 * mrad)])
    for port in ("transmitted", "reflected"):
        train.along(f"out.{port}", fa.Camera(pixel=20 * um, shape=(80, 80), name=port))
    one, other = (train.expose(camera, [fa.H]).frame(0) for camera in ("transmitted", "reflected"))
    arms = mach_zehnder(arm=[fa.SpiralPlate(charge=2)])
    # Each arm leaves half of its light at this port.
    alone = sum(branch_picture(train, index) for index in range(2)) * 2
    assert one + other[:, ::-1] == pytest.approx(alone, abs=1e-9 * alone.max())
    assert abs(one + other - alone).max() > 0.3 * alone.max()
    assert arms.power("out.transmitted") == pytest.approx(0.5, abs=1e-3)


def branch_picture(train, index):
    joined, branch = train.field("transmitted")[0], train.plan("transmitted").branches[index]
    alone = JoinedField((joined.arms[index],), np.eye(1), Extent.of((branch,)), (branch.engine,))
    return alone.stokes_on(Raster(20 * um, (80, 80)))[0]


def test_a_pixel_holds_the_integral_of_the_fringes(mach_zehnder):
    tilt, pixel = 3 * mrad, 100 * um  # half a fringe a pixel
    train = mach_zehnder(other=[fa.Wedge(x=tilt)])
    train.along("out.transmitted", fa.Camera(pixel=pixel, shape=(1, 3), name="cam"))
    frame = train.expose("cam", [fa.H]).frame(0)
    k = 2 * math.pi / (632.8 * nm)

    def irradiance(y, x):
        return 2 / math.pi / mm**2 * math.exp(-2 * (x * x + y * y) / mm**2) * (1 - math.cos(k * tilt * x)) / 2

    for index, middle in enumerate((-pixel, 0, pixel)):
        expected, _ = dblquad(irradiance, middle - pixel / 2, middle + pixel / 2, -pixel / 2, pixel / 2, epsabs=1e-15)
        assert frame[0, index] == pytest.approx(expected, rel=1e-9, abs=1e-13)


def test_partial_coherence_lies_between_full_and_none(mach_zehnder):
    line = fa.GaussianLine(coherence_length=0.1)
    train = mach_zehnder(arm=[fa.FreeSpace(0.05)])
    full, none = np.array(ports(train)), np.array([0.5, 0.5])
    partly = ports(train.with_changes({"laser.line": line}))
    assert partly == pytest.approx(none + (full - none) * math.exp(-0.25), abs=1e-12)


def test_three_arms_of_different_length_keep_three_degrees(mach_zehnder):
    train = mach_zehnder(arm=[fa.FreeSpace(0.01)]).with_changes(
        {"laser.line": fa.LorentzianLine(coherence_length=0.03)}
    )
    train.along("out.transmitted", fa.FreeSpace(0.02, name="third"), fa.BeamSplitter(name="last"))
    train.along("out.reflected", "last.side")
    arms = train.plan("last.transmitted").groups[0]
    degrees = coherence(arms)
    rows = mixtures(arms)
    phases = np.exp(1j * np.angle(rows.T @ rows.conj()))
    assert len(arms) == 4
    assert abs(rows.T @ rows.conj()) == pytest.approx(degrees.real, abs=1e-14)
    assert abs(phases) == pytest.approx(1)
    total = sum(train.power(f"last.{port}") for port in ("transmitted", "reflected"))
    assert total == pytest.approx(1, abs=1e-12)


def test_partly_coherent_light_has_no_one_field(mach_zehnder):
    line = fa.GaussianLine(coherence_length=0.1)
    train = mach_zehnder(arm=[fa.FreeSpace(0.05)]).with_changes({"laser.line": line})
    with pytest.raises(fa.ParameterError, match="has no one field") as caught:
        train.field("out.transmitted")[0].at(np.zeros(1), np.zeros(1))
    sharp = eval(caught.value.fix, {"fa": fa, "train": train})
    assert sharp.field("out.transmitted")[0].at(np.zeros(1), np.zeros(1)).shape == (2, 1, 1)


def test_unpolarized_light_interferes_as_its_two_halves_do(mach_zehnder):
    laser = fa.Laser(waist=1 * mm, power=1.0, state=fa.light.UNPOLARIZED if hasattr(fa, "light") else fa.UNPOLARIZED,
                     name="laser")  # fmt: skip
    train = mach_zehnder(laser, arm=[fa.HalfWavePlate(fast=45 * deg)])
    assert ports(train) == pytest.approx([0.5, 0.5], abs=1e-12)
    assert ports(mach_zehnder(laser)) == pytest.approx([0, 1], abs=1e-12)


def test_two_lasers_add_in_power(mach_zehnder):
    train = mach_zehnder()
    train.along(fa.Laser(waist=1 * mm, power=0.5, name="second"), "in.side")
    assert ports(train) == pytest.approx([0.5, 1.0], abs=1e-12)


def test_the_plan_names_each_arm(mach_zehnder):
    wedge, slit = [fa.FreeSpace(0.25), fa.Wedge(x=1 * mrad)], [fa.Slit(width=1 * mm)]
    text = str(mach_zehnder(arm=[fa.SpiralPlate(charge=1)], other=wedge).plan("out.transmitted"))
    assert "engine joined, because light comes by several paths" in text
    first = "arm laser -> in -> phase -> spiral1 -> m1 -> out -> out.transmitted"
    assert f"{first}: engine azimuthal, path 0 mm" in text
    assert "engine modes, path 250 mm" in text
    assert "moved by (0, 0) mm, tilted by (-1, 0) mrad" in text  # the last splitter reflects
    assert "engine grid, path 250 mm" in str(mach_zehnder(other=[*wedge, *slit]).plan("out.transmitted"))


@pytest.mark.parametrize("turns", [0.0, 0.004, 0.1, 0.5, 2.0, 9.0])
def test_pixels_hold_the_integral_of_a_fringe(turns):
    middles = np.arange(200) - 99.5
    axis = Axis.of(middles, 1.0, turns)
    found = axis.matrix @ np.cos(2 * np.pi * turns * axis.places + 0.3)
    # Wide fringes are interpolated to 3e-12, and at most as many nodes are spent on fine ones as their error asks.
    assert found == pytest.approx(np.sinc(turns) * np.cos(2 * np.pi * turns * middles + 0.3), abs=2e-11)
    assert len(axis.places) <= 200 * nodes_needed(turns / max(1, math.ceil(turns / 4))) * max(1, math.ceil(turns / 4))


def test_wide_fringes_need_fewer_places_than_pixels():
    assert len(Axis.of(np.arange(500.0), 1.0, 0.01).places) < 70


@pytest.mark.parametrize("count", [1, 2, 7, 200])
def test_places_wider_than_pixels_hold_the_integral_whatever_the_number_of_pixels(count):
    middles, turns = (np.arange(count) - (count - 1) / 2) * 0.3 + 5.0, 0.01
    axis = Axis.of(middles, 0.3, turns / 0.3)
    found = axis.matrix @ np.cos(2 * np.pi * turns / 0.3 * axis.places + 0.3)
    expected = 0.3 * np.sinc(turns) * np.cos(2 * np.pi * turns / 0.3 * middles + 0.3)
    assert found == pytest.approx(expected, abs=1e-11)  # the kernel is good to 3e-12


def test_a_large_camera_takes_memory_for_each_pixel_not_for_each_pair():
    middles = np.arange(2048) - 1023.5
    fine = Axis.of(middles, 1.0, 0.3)
    assert len(fine.places) > len(middles)  # fringes of three pixels
    # Twice the reach of 17 places, and those that a pixel of up to two of them adds.
    assert fine.matrix.nnz <= 38 * len(middles)


def with_mirrored_plates(other, charge=4):
    """Two arms with a spiral plate each, and a mirror more behind one of them."""
    train = fa.Train(wavelength=633 * nm).along(
        fa.Laser(waist=0.8 * mm, power=1e-3, name="laser"),
        fa.BeamSplitter(name="split"),
        fa.FreeSpace(distance=0.3, name="short"),
        fa.SpiralPlate(charge=charge, centre=(0.1 * mm, 0.05 * mm), name="one"),
        fa.BeamSplitter(name="join"),
        fa.FreeSpace(distance=0.1, name="ahead"),
        fa.Detector(name="along"),
    )
    train.along("split.reflected", fa.FreeSpace(distance=0.3, name="long"), fa.SpiralPlate(charge=-charge, **other))
    train.along("other", "join.side")
    train.along("join.reflected", fa.FreeSpace(distance=0.1, name="aside"), fa.Detector(name="across"))
    return [train.power(port, engine="grid") / 1e-3 for port in ("along", "across")]


def test_light_that_axes_scatter_beyond_the_samples_leaves_dark_ports_dark():
    """Else its 2e-3 of the power would go to both ports alike; arms cancel to what the pitch leaves, 1e-6."""
    same = with_mirrored_plates({"centre": (-0.1 * mm, 0.05 * mm), "name": "other"})
    assert min(same) < 1e-5
    assert sum(same) == pytest.approx(1, abs=1e-7)
