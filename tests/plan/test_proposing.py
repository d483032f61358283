import pytest

from fastaxis.elements import Aperture, FreeSpace, Lens, QPlate, Wedge
from fastaxis.errors import SamplingError, SamplingWarning
from fastaxis.light import FlatTop, Gaussian, LaguerreGauss, PlaneWave
from fastaxis.plan import Grid, make_plan
from fastaxis.units import mm, mrad, um


def test_smooth_beams_take_few_samples_and_six_radii(bench):
    sampling = make_plan(bench(FreeSpace(1.0)), "cam", engine="grid").sampling
    assert sampling.grid.samples == 256
    assert all(plane.window / 2 >= 6 * 2 * plane.spread.size for plane in sampling.planes)


def test_higher_modes_take_more(bench):
    few = make_plan(bench(FreeSpace(1.0)), "cam", engine="grid").sampling.grid.samples
    many = make_plan(
        bench(FreeSpace(1.0), mode=LaguerreGauss(3, 4, 0.5 * mm)), "cam", engine="grid"
    ).sampling.grid.samples
    assert many > few


@pytest.mark.parametrize("parts", [[QPlate(q=0.5)], [Aperture(radius=1 * mm)]])
def test_singular_plates_and_edges_take_1024(bench, parts):
    assert make_plan(bench(*parts, FreeSpace(0.5)), "cam", engine="grid").sampling.grid.samples == 1024


def test_the_window_holds_three_radii_of_a_stop(bench):
    plan = make_plan(bench(Aperture(radius=2 * mm), FreeSpace(0.5), mode=PlaneWave(area=1e-6)), "cam", engine="grid")
    assert plan.sampling.planes[1].window >= 6 * 2 * mm


def test_the_window_reaches_off_axis_beams_and_stops(bench):
    off = make_plan(bench(FreeSpace(0.1), mode=Gaussian(waist=0.5 * mm, centre=(3 * mm, 0))), "cam", engine="grid")
    assert off.sampling.planes[-1].window / 2 >= 6 * 0.5 * mm + 3 * mm
    stop = make_plan(
        bench(Aperture(radius=1 * mm, centre=(2 * mm, 0)), mode=FlatTop(radius=4 * mm)), "cam", engine="grid"
    )
    assert stop.sampling.planes[-1].window / 2 >= 5 * mm


def test_a_pinhole_in_a_focus_is_drawn_with_twelve_samples(bench):
    parts = [Lens(focal=100 * mm), FreeSpace(100 * mm), Aperture(radius=40 * um), FreeSpace(100 * mm)]
    sampling = make_plan(bench(*parts, mode=Gaussian(waist=1 * mm)), "cam", engine="grid").sampling
    assert sampling.planes[1].pitch <= 40 * um / 12  # samples begin in the focus
    assert sampling.grid.window / 2 >= 6 * mm


def test_near_planes_go_by_the_spectrum_and_far_ones_by_one_transform(bench):
    near = make_plan(bench(FreeSpace(0.01)), "cam", engine="grid").sampling
    far = make_plan(bench(FreeSpace(60.0)), "cam", engine="grid").sampling
    focus = make_plan(bench(Lens(focal=0.3), FreeSpace(0.3)), "cam", engine="grid").sampling
    assert [s.planes[-1].hop.kernel for s in (near, far, focus)] == ["scaled", "single", "single"]


def test_a_small_grid_is_refused_and_the_message_names_a_good_one(bench):
    train = bench(FreeSpace(1.0))
    with pytest.raises(SamplingError) as refused:
        make_plan(train, "cam", grid=Grid(64, 0.8 * mm), engine="grid")
    assert refused.value.got == "window 0.8 mm at the source"
    assert refused.value.fix.startswith("grid=fa.Grid(samples=256, window=0.0")
    good = eval(refused.value.fix.removeprefix("grid=fa."), {"Grid": Grid})
    assert make_plan(train, "cam", grid=good, engine="grid").sampling.worst.margin >= 1


def test_a_coarse_grid_is_refused_by_its_pitch(bench):
    with pytest.raises(SamplingError, match="pitch 625 um"):
        make_plan(bench(FreeSpace(1.0)), "cam", grid=Grid(32, 20 * mm), engine="grid")


def test_a_steep_wedge_counts_as_pitch_needed(bench):
    with pytest.raises(SamplingError, match="pitch .* um after wedge1"):
        make_plan(bench(Wedge(x=20 * mrad)), "cam", grid=Grid(256, 16 * mm), engine="grid")


def test_a_tight_grid_is_warned_about(bench):
    with pytest.warns(SamplingWarning, match="window 3 mm after space1"):
        make_plan(bench(FreeSpace(0.01)), "cam", grid=Grid(256, 3 * mm), engine="grid")


def test_a_plane_wave_has_no_finite_focus(bench):
    train = bench(Lens(focal=0.5), FreeSpace(0.5), mode=PlaneWave(area=1e-6))
    with pytest.raises(SamplingError, match="no finite focus"):
        make_plan(train, "cam", engine="grid")
