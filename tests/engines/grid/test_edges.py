"""Power behind edges: what the samples do not hold is counted beside them."""

from math import erf, exp, pi, sqrt

import numpy as np
import pytest

from fastaxis.elements import (
    Aperture,
    BeamDump,
    Camera,
    Detector,
    FreeSpace,
    KnifeEdge,
    Laser,
    PolarizingBeamSplitter,
    RectangularAperture,
    Slit,
)
from fastaxis.engines import propagate
from fastaxis.engines.grid.combining import combined
from fastaxis.errors import SamplingError, SamplingWarning
from fastaxis.light import D, Gaussian, H, HermiteGauss, Raster, SampledMode
from fastaxis.plan import Grid, make_plan
from fastaxis.train import Train
from fastaxis.units import deg, mm, nm, um

WAIST = 0.5 * mm
DARK_LINE = HermiteGauss(1, 0, WAIST)
ROUND = Gaussian(WAIST)


def arrive(mode, *parts, grid=None):
    train = Train(wavelength=633 * nm).along(Laser(mode=mode, power=1.0, state=H), *parts, Detector(name="meter"))
    (field,) = propagate(make_plan(train, "meter", grid=grid, engine="grid"))
    return field


def past_slit(width, centre=0.0):
    """Share of HG10 from centre - width/2 to centre + width/2: the integral up to x is half of
    erf(v) - 2 v exp(-v^2)/sqrt(pi), v = sqrt2 x/w."""
    ends = [sqrt(2) * (centre + side * width / 2) / WAIST for side in (1, -1)]
    up, down = (erf(v) - 2 * v * exp(-v * v) / sqrt(pi) for v in ends)
    return (up - down) / 2


def past_edge(offset):
    """Share of a Gaussian beam on the clear side of a knife edge at x = offset."""
    return (1 - erf(sqrt(2) * offset / WAIST)) / 2


def slit(shift):
    return DARK_LINE, Slit(width=0.3 * mm, angle=90 * deg, centre=(shift, 0)), past_slit(0.3 * mm, shift)


def edge(shift):
    return ROUND, KnifeEdge(angle=0 * deg, centre=(0.2 * mm + shift, 0)), past_edge(0.2 * mm + shift)


def slanted(shift):
    return ROUND, KnifeEdge(angle=0.3, centre=((0.2 * mm + shift) / np.cos(0.3), 0)), past_edge(0.2 * mm + shift)


def hole(shift):
    radius = 0.4 * mm + shift
    return ROUND, Aperture(radius=radius), 1 - exp(-2 * (radius / WAIST) ** 2)


@pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")  # coarse on purpose
@pytest.mark.parametrize(("bench", "least"), [(slit, 1.8), (edge, 1.8), (slanted, 1.8), (hole, 1.5)])
def test_powers_behind_edges_converge_to_second_order(bench, least):
    """How wrong one power is depends on where the edge falls in its sample: rms over ten places in a sample."""
    counts = np.array([128, 180, 256, 360, 512, 720])
    errors = []
    for count in counts:
        found = []
        for shift in np.arange(10) / 10 * 6 * mm / count:
            mode, part, exact = bench(shift)
            found.append(arrive(mode, part, grid=Grid(int(count), 6 * mm)).power / exact - 1)
        errors.append(np.sqrt(np.mean(np.square(found))))
    order = np.polyfit(np.log(1 / counts), np.log(errors), 1)[0]
    # Without what edges scatter it is 1. A round rim crosses N = 2 pi radius/pitch samples at all angles, each wrong by a
    # part of pitch^2 at random, so together by pitch^2 sqrt(N): order 3/2.
    assert order > least
    assert errors[-1] < 1e-3


@pytest.mark.parametrize("width", [0.3 * mm, 0.1 * mm])
def test_automatic_powers_through_slits_are_right_to_one_part_in_a_thousand(width):
    """Beside a dark line the blur of an edge over its sample adds (pitch/width)^2: 33 samples across leave 1e-3."""
    assert arrive(DARK_LINE, Slit(width=width, angle=90 * deg)).power == pytest.approx(past_slit(width), rel=1e-3)


def test_power_is_that_of_the_frame_and_what_is_discarded():
    field = arrive(ROUND, Slit(width=0.3 * mm, angle=30 * deg), FreeSpace(100 * mm))
    frame = field.stokes_on(Raster(field.light.window / 256, (256, 256)))[0].sum()
    assert frame == pytest.approx(field.power * (1 - field.guard.discarded), rel=1e-9)
    assert 1e-3 < field.guard.discarded < 1e-2


def test_all_stokes_parameters_share_what_edges_scatter():
    train = Train(wavelength=633 * nm).along(
        Laser(waist=WAIST, power=1.0, state=D), KnifeEdge(angle=0.3, centre=(0.1 * mm, 0)), Detector(name="meter")
    )
    (field,) = propagate(make_plan(train, "meter", engine="grid"))
    assert field.total_stokes == pytest.approx(np.array([1, 0, 1, 0]) * field.power, abs=1e-12)


def test_a_closed_stop_further_on_drops_what_edges_scattered():
    slit, near = Slit(width=0.3 * mm, angle=90 * deg), FreeSpace(80 * mm)
    first = arrive(ROUND, slit, near)
    opened = arrive(ROUND, slit, near, KnifeEdge(angle=0 * deg, centre=(-2 * mm, 0)))
    closed = arrive(ROUND, slit, near, Aperture(radius=2 * mm, centre=(1 * um, 0)))
    assert opened.light.beyond == pytest.approx(first.light.beyond, rel=0.05)
    assert closed.light.beyond < 0.05 * first.light.beyond


def test_the_ledger_closes_behind_a_slit():
    train = Train(wavelength=633 * nm).along(
        Laser(waist=WAIST, power=1.0, state=D), Slit(width=0.3 * mm, angle=90 * deg), PolarizingBeamSplitter(name="pbs")
    )
    train.along("pbs.transmitted", Detector(name="p")).along("pbs.reflected", BeamDump(name="s"))
    ledger = train.ledger()
    passed = erf(sqrt(2) * 0.15 / 0.5)
    assert ledger.missing == pytest.approx(0, abs=1e-12)
    assert sum(ledger.of("clipped").values()) == pytest.approx(1 - passed, rel=1e-3)
    assert train.power("p") == pytest.approx(passed / 2, rel=1e-3)


def test_sums_of_fields_carry_what_edges_scattered():
    field = arrive(ROUND, Slit(width=0.3 * mm, angle=90 * deg))
    both = combined([field, field], np.array([0.6, 0.8j]))
    assert both.power == pytest.approx(field.power, rel=1e-12)
    assert combined([field, field], np.array([1, -1])).power == 0


def test_a_coarse_edge_warns_for_pictures_and_not_for_powers():
    slit = Slit(width=0.3 * mm, angle=90 * deg)
    field = arrive(ROUND, slit, grid=Grid(256, 6 * mm))
    assert field.power == pytest.approx(erf(sqrt(2) * 0.15 / 0.5), rel=5e-3)
    with pytest.warns(SamplingWarning, match=r"missing from the picture.*samples=\d+") as found:
        field.stokes_on(Raster(10 * um, (64, 64)))
    fixed = eval(found[0].message.fix.removeprefix("grid=fa."), {"Grid": Grid})  # noqa: S307 - our own fix
    arrive(ROUND, slit, grid=fixed).stokes_on(Raster(10 * um, (64, 64)))  # warns no more


@pytest.mark.parametrize("gap", [0.0, 50 * mm])
def test_a_small_stop_in_a_wide_beam_sets_the_pitch(gap):
    """A beam of w = 12 mm on a hole of 1 mm, 0.1 mm off the axis: 33 samples along the radius, or a word about it."""
    space = (FreeSpace(gap),) if gap else ()
    train = Train(wavelength=633 * nm).along(
        Laser(waist=12 * mm, power=1.0, state=H),
        *space,
        Aperture(radius=1 * mm, centre=(0.1 * mm, 0)),
        FreeSpace(300 * mm),
        Camera(pixel=10 * um, shape=(256, 256), name="cam"),
    )
    if gap:
        with pytest.warns(SamplingWarning, match="pitch 33.6 um at stop1; a picture 300 mm behind it"):
            sampling = make_plan(train, "cam").branches[0].sampling
    else:
        sampling = make_plan(train, "cam").branches[0].sampling
    pitch = sampling.planes[1 if not gap else 2].pitch
    assert pitch < 1 * mm / 25
    if not gap:
        assert pitch < 1 * mm / 100  # the light outside the hole is never needed
        exact = exp(-2 * (0.1 / 12) ** 2) * (1 - exp(-2 / 144))
        assert train.power("cam") == pytest.approx(exact, rel=1e-3)


def test_sampled_light_is_held_whole_though_a_small_stop_follows():
    """Its samples are scaled to unit power, which a window of the size of the hole would do to the wrong part."""
    x = (np.arange(256) - 127.5) * 20 * um
    samples = np.exp(-(x[None, :] ** 2 + x[:, None] ** 2) / WAIST**2)
    found = arrive(SampledMode(samples, pixel=20 * um), Aperture(radius=0.3 * mm, centre=(10 * um, 0)))
    whole = arrive(ROUND, Aperture(radius=0.3 * mm, centre=(10 * um, 0)))
    assert found.power == pytest.approx(whole.power, rel=2e-3)
    assert found.light.window > 2 * whole.light.window


def test_a_stop_narrower_than_its_samples_is_refused_with_the_pitch():
    slit = Slit(width=20 * um, angle=90 * deg)
    with pytest.raises(SamplingError, match=r"pitch 23.4 um at .*needs 0.6 um") as found:
        arrive(ROUND, slit, grid=Grid(256, 6 * mm))
    assert found.value.fix.startswith("grid=fa.Grid(samples=")
    with pytest.warns(SamplingWarning, match="needs"):
        arrive(ROUND, Slit(width=150 * um), grid=Grid(256, 6 * mm))


def test_the_narrow_side_of_an_opening_counts():
    narrow = RectangularAperture(width=1 * mm, height=0.1 * mm)
    plane = make_plan(
        Train(wavelength=633 * nm).along(Laser(mode=ROUND, power=1.0, state=H), narrow, Detector(name="meter")), "meter"
    ).branches[0].sampling.planes[1]  # fmt: skip
    # Area over perimeter is 45 um; a hundredth of the power asks for 6/100 of it.
    assert plane.pitch < 0.06 * 1e-3 * 0.1 / 2.2
