"""Edges and singularities on the grid: measured orders of convergence, and laws that hold at any sampling."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import special

from fastaxis.elements import (
    Aperture,
    Camera,
    FreeSpace,
    HalfWavePlate,
    Laser,
    Lens,
    Mirror,
    Polarizer,
    QPlate,
    Retarder,
    SpiralPlate,
)
from fastaxis.engines import propagate
from fastaxis.light import FlatTop, Gaussian, H, L, LaguerreGauss, PlaneWave, Raster, State, linear
from fastaxis.plan import Grid, make_plan
from fastaxis.train import Train
from fastaxis.units import deg, mm, mW, nm, um

# Samples set by hand on purpose coarser than edges and vortices want; that they are is said, and tested elsewhere.
coarse = pytest.mark.filterwarnings("ignore::fastaxis.errors.SamplingWarning")

WAVELENGTH = 632.8 * nm
ORIGIN = np.array([0.0])


def order(steps, errors):
    """Slope of log error over log step."""
    return np.polyfit(np.log(steps), np.log(errors), 1)[0]


def far_field(l, s):
    return s**l * special.gamma(l / 2 + 1) / special.gamma(l + 1) * special.hyp1f1(l / 2 + 1, l + 1, -s * s)


@pytest.mark.parametrize("charge", [1, 2, 3, 4, -8])
@coarse
def test_spiral_plates_converge(arrive, charge):
    """Sums over the samples about the singularity are integrals, of polynomials up to the fourth degree: what is left
    of the far field's error is of order 7. A field of the wrong waves would not get better at all."""
    waist, focal = 1 * mm, 0.3
    focus = WAVELENGTH * focal / (np.pi * waist)
    s = np.linspace(0.0, 3, 61)
    counts = np.array([128, 160, 192, 256, 320]) * (1 + (abs(charge) > 4))
    errors = []
    for count in counts:
        parts = [SpiralPlate(charge=charge), Lens(focal=focal), FreeSpace(focal)]
        field = arrive(Gaussian(waist=waist), *parts, grid=Grid(int(count), 12 * mm))
        found = abs(field.at(s * focus, ORIGIN)[0, 0]) ** 2 * np.pi * focus**2 / 2
        errors.append(np.max(abs(found - far_field(abs(charge), s) ** 2)))
    assert order(1 / counts, errors) > 6.5
    assert errors[-1] < 1e-6


OFF = 0.37, -0.12  # of a pitch


def beside_harmonics(count, part, *after, centre=None, camera=None):
    """How wrong frames of S0 .. S3 are at most, as a share of the peak: the bench moved off the lattice as a whole by a
    share of a pitch, where that is given, beside harmonics about its own axis."""
    x, y = (0.0, 0.0) if centre is None else (share * 6 * mm / count for share in centre)

    def seen(engine, grid, at):
        laser = Laser(mode=Gaussian(waist=0.5 * mm, centre=at), power=1.0, state=L)
        train = Train(wavelength=WAVELENGTH).along(
            laser, part(at), *after, Camera(pixel=5 * um, shape=(8, 8), name="cam")
        )
        (field,) = propagate(make_plan(train, "cam", engine=engine, grid=grid))
        return field.stokes_on(Raster(camera or 30 * um, (48, 48), at))

    exact = seen("azimuthal", None, (0.0, 0.0))
    return abs(seen("grid", Grid(count, 6 * mm), (x, y)) - exact).max() / exact[0].max()


def spiral(charge):
    return lambda at: SpiralPlate(charge=charge, centre=at)


def q_plate(q):
    return lambda at: QPlate(q=q, retardance=2.4, offset=0.3, centre=at)


@pytest.mark.parametrize("part", [spiral(1), spiral(4), spiral(-12), q_plate(0.5), q_plate(-1), q_plate(2)])
@pytest.mark.parametrize("centre", [(0.0, 0.0), (0.5, 0.5), OFF])
@coarse
def test_singular_plates_converge_wherever_their_axis_falls_between_samples(part, centre):
    counts = np.array([256, 320, 384, 512])
    errors = [beside_harmonics(int(n), part, FreeSpace(200 * mm), centre=centre) for n in counts]
    # The seventh order is that of the lowest waves; near by, those that go steeply to the rim of the picture count too.
    assert order(1 / counts, errors) > 5
    assert errors[-1] < 1e-4


@pytest.mark.parametrize(("charge", "limit"), [(4, 1e-9), (12, 1e-7), (20, 1e-6)])
@coarse
def test_rings_of_high_charge_are_right_in_focus(charge, limit):
    after = Lens(focal=0.3), FreeSpace(0.3)
    assert beside_harmonics(1024, spiral(charge), *after, camera=25 * um) < limit


@coarse
def test_plates_in_contact_are_one_plate(arrive):
    """Two q-plates of q = 1 with a half-wave plate between them are one of q = 2, on the way as in their plane."""
    left, at = {"state": L, "grid": Grid(256, 6 * mm)}, (10 * um, 0.0)
    parts = [QPlate(q=1, centre=at), HalfWavePlate(fast=0), QPlate(q=1, centre=at), HalfWavePlate(fast=0)]
    for after in ([], [FreeSpace(0.3)]):
        several = arrive(Gaussian(waist=0.5 * mm), *parts, *after, **left)
        one = arrive(Gaussian(waist=0.5 * mm), QPlate(q=2, centre=at), HalfWavePlate(fast=0), *after, **left)
        raster = Raster(20 * um, (64, 64))
        assert abs(several.stokes_on(raster) - one.stokes_on(raster)).max() < 1e-12 * one.stokes_on(raster)[0].max()


@coarse
def test_flat_tops_converge_in_focus(arrive):
    """1 W on a disc is pi a^2/(wavelength f)^2 W/m^2 in the middle of the focus. Each sample the rim crosses has its
    area wrong by a part of pitch^2 at random, all together by pitch^(3/2): rms over grids of unrelated pitch."""
    radius, focal = 1 * mm, 0.3
    peak, errors = np.pi * radius**2 / (WAVELENGTH * focal) ** 2, []
    counts = np.array([128, 256, 512, 1024])
    for count in counts:
        wrong = []
        for near in (count - 6, count - 2, count + 4, count + 10):
            field = arrive(FlatTop(radius=radius), Lens(focal=focal), FreeSpace(focal), grid=Grid(int(near), 6 * mm))
            wrong.append(abs(field.at(ORIGIN, ORIGIN)[0, 0, 0]) ** 2 / peak - 1)
        errors.append(np.sqrt(np.mean(np.square(wrong))))
        assert field.power == pytest.approx(1, rel=1e-12)
        # Of what a rim sample holds, 1/6 on the average is beyond its band, as behind a stop.
        assert field.guard.discarded == pytest.approx(6 * mm / near / (3 * radius), rel=0.2)
    assert order(1 / counts, errors) > 1.2
    assert errors[-1] < 2e-4


@coarse
def test_round_edges_converge(arrive):
    """On the axis behind a hole, N = 1: the rim's area is right to second order in the pitch on the average; measured
    over grids of unrelated pitch because each catches the rim elsewhere in its samples."""
    radius = 1 * mm
    counts = np.array([128, 180, 256, 360, 512, 720, 1024])
    errors = []
    for count in counts:
        field = arrive(
            PlaneWave(area=1.0),
            Aperture(radius=radius),
            FreeSpace(radius**2 / WAVELENGTH),
            grid=Grid(int(count), 6 * mm),
        )
        x = np.linspace(0, 0.5 * mm, 26)
        errors.append(np.max(abs(abs(field.at(x, ORIGIN)[0, 0]) - abs(_hankel(x, radius)))))
    assert order(1 / counts, errors) > 1
    assert errors[-1] < 5e-3


def _hankel(rho, radius):
    """Fresnel integral of a hole at N = 1: 2 pi |int_0^1 exp(i pi s^2) J0(2 pi s rho/a) s ds|, Gauss-Legendre."""
    nodes, weights = np.polynomial.legendre.leggauss(60)
    s, w = (nodes + 1) / 2, weights / 2
    return (
        2
        * np.pi
        * np.sum(np.exp(1j * np.pi * s**2) * special.j0(2 * np.pi * np.outer(rho / radius, s)) * s * w, axis=1)
    )


def test_samples_behind_a_hole_fall_short_to_first_order(arrive):
    """A rim sample passes c of the amplitude and c^2 of the power, 1/6 of a sample less than its area on the average:
    the share of a plane wave falls short by pitch/(3 radius), and is counted as scattered beyond the band."""
    radius = 1 * mm
    for count in (256, 512, 1024):
        field = arrive(PlaneWave(area=1.0), Aperture(radius=radius), grid=Grid(count, 6 * mm))
        assert field.guard.discarded == pytest.approx(6 * mm / count / (3 * radius), rel=0.1)
        # 256 samples: the rim crosses 270 samples, each with its area wrong by up to 1/24 at random.
        assert field.power == pytest.approx(np.pi * radius**2, rel=5e-4)


def cinder_lane(plate, *after, retardance=180 * deg):
    laser = Laser(waist=0.80 * mm, power=5 * mW, state=H, name="laser")
    camera = Camera(pixel=3.45 * um, shape=(128, 128), name="cam")
    train = Train(wavelength=532 * nm).along(
        laser, HalfWavePlate(fast=plate), QPlate(q=0.5, offset=0 * deg, retardance=retardance),
        FreeSpace(500 * mm), Lens(focal=500 * mm), FreeSpace(500 * mm), *after, camera,
    )  # fmt: skip
    (field,) = propagate(make_plan(train, "cam"))
    return field


def test_cinder_lane_ring_radius():
    """0.8442312118 wavelength f/(pi w) = 89.4 um: the ring of a singular plate, not of a Laguerre mode."""
    x = np.linspace(80, 100, 401) * um
    profile = np.sum(abs(cinder_lane(0.0).at(x, ORIGIN)) ** 2, axis=0)[0]
    assert x[profile.argmax()] == pytest.approx(89.4 * um, abs=0.1 * um)


@pytest.mark.parametrize(("plate", "radial"), [(0 * deg, 1.0), (45 * deg, -1.0)])
def test_cinder_lane_switches_from_radial_to_azimuthal(plate, radial):
    """S1 cos 2 phi + S2 sin 2 phi is +S0 for radial light and -S0 for azimuthal light, everywhere on the ring."""
    raster = Raster(3.45 * um, (128, 128))
    s = cinder_lane(plate).stokes_on(raster)
    phi = np.arctan2(raster.y[:, None], raster.x[None, :])
    ring = s[0] > 0.5 * s[0].max()
    turned = (s[1] * np.cos(2 * phi) + s[2] * np.sin(2 * phi))[ring] / s[0][ring]
    # A pixel at radius r sees directions over pixel/r: (2 pixel/r)^2/24 of the sum is lost, r > 40 um here.
    assert np.allclose(turned, radial, atol=(2 * 3.45 / 40) ** 2 / 24 + 5e-4)
    assert np.allclose(s[3], 0, atol=1e-6 * s[0].max())


def test_a_detuned_plate_leaves_its_centre_spot():
    """170 deg leaves cos^2(85 deg) = 0.76 % of the power unconverted, in the input state."""
    field = cinder_lane(0.0, retardance=170 * deg)
    focus = 532 * nm * 0.5 / (np.pi * 0.80 * mm)
    centre = abs(field.at(ORIGIN, ORIGIN)[:, 0, 0]) ** 2 / (5 * mW * 2 / (np.pi * focus**2))
    # The half-wave plate at 0 leaves H; the converted light has a zero there.
    assert centre == pytest.approx([np.cos(85 * deg) ** 2, 0], abs=1e-6)


parts = st.lists(
    st.one_of(
        st.builds(lambda a, d: Retarder(fast=a, retardance=d), st.floats(-3, 3), st.floats(0, 3)),
        st.builds(lambda q, a, d: QPlate(q=q, offset=a, retardance=d), st.sampled_from([0.5, 1, -0.5]), st.floats(-3, 3), st.floats(0, 3.1)),
        st.builds(lambda c: SpiralPlate(charge=c), st.sampled_from([-1, 2])),
        st.builds(lambda d: FreeSpace(d), st.floats(0.1, 0.5)),
        st.builds(lambda f: Lens(focal=f), st.sampled_from([0.5, -1.0])),
        st.just(Mirror()),
    ),
    min_size=1,
    max_size=6,
)  # fmt: skip


@settings(max_examples=15, deadline=None)
@given(parts)
@coarse
def test_lossless_trains_keep_the_power(some):
    laser = Laser(mode=LaguerreGauss(0, 1, 0.6 * mm), state=L, power=1.0, name="laser")
    train = Train(wavelength=WAVELENGTH).along(laser, *some, Camera(pixel=10 * um, shape=(8, 8), name="cam"))
    (field,) = propagate(make_plan(train, "cam", grid=Grid(256, 10 * mm), engine="grid"))
    # Every kernel is unitary on the samples; only the band limit takes power, and says so. What singular points scatter
    # beyond the band is in the power.
    cut = field.carried.discarded
    assert field.power + cut == pytest.approx(1, abs=1e-12 + cut**2)


@pytest.mark.filterwarnings("ignore:pitch .* at stop1:fastaxis.errors.SamplingWarning")
def test_turning_every_part_turns_the_picture(arrive):
    """A quarter turn of state, plates and offsets turns the picture by a quarter turn, sample by sample."""

    def turned(angle):
        # A q-plate's axis at q phi + offset, turned by angle: q (phi - angle) + offset + angle.
        qp = QPlate(q=0.5, offset=0.2 + angle - 0.5 * angle, retardance=2.5, centre=_turn((0.1 * mm, 0.05 * mm), angle))
        hole = Aperture(radius=0.8 * mm, centre=_turn((0.2 * mm, -0.1 * mm), angle))
        parts = [Retarder(fast=0.3 + angle, retardance=1.0), qp, FreeSpace(0.2), hole, FreeSpace(0.3)]
        return arrive(Gaussian(waist=0.6 * mm), *parts, Polarizer(axis=1.1 + angle), state=linear(0.1 + angle))

    raster = Raster(20 * um, (101, 101))
    plain, quarter = (turned(angle).stokes_on(raster)[0] for angle in (0.0, 90 * deg))
    # Position (x, y) of the plain picture is found at (-y, x): rows and columns change places, one reversed.
    assert np.allclose(np.rot90(plain, -1), quarter, atol=1e-12 * plain.max())


def _turn(place, angle):
    (x, y), c, s = place, np.cos(angle), np.sin(angle)
    return (c * x - s * y, s * x + c * y)


def test_a_mirror_shows_the_mirrored_picture(arrive):
    parts = [QPlate(q=0.5, centre=(0.2 * mm, 0.1 * mm)), FreeSpace(0.3)]
    raster = Raster(20 * um, (41, 41))
    plain = arrive(Gaussian(waist=0.6 * mm), *parts).stokes_on(raster)
    folded = arrive(Gaussian(waist=0.6 * mm), *parts, Mirror()).stokes_on(raster)
    scale = 1e-12 * plain[0].max()
    assert np.allclose(folded[0], plain[0, :, ::-1], atol=scale)
    # The polarization is seen from the other side too: S2 and S3 change sign.
    assert np.allclose(folded[1], plain[1, :, ::-1], atol=scale)
    assert np.allclose(folded[2:], -plain[2:, :, ::-1], atol=scale)


def test_the_state_behind_uniform_parts_is_the_jones_vector(arrive):
    state = State(0.4, 0.2)
    field = arrive(Gaussian(waist=0.6 * mm), Retarder(fast=0.3, retardance=1.0), FreeSpace(0.3), state=state)
    from fastaxis.laws import Amplitude, AxisLaw
    from fastaxis.maths import NUMBERS

    jones = np.array(AxisLaw(Amplitude(1.0, -0.5), Amplitude(1.0, 0.5), 0.3).linear(NUMBERS)) @ state.jones
    ex, ey = field.at(ORIGIN, ORIGIN)[:, 0, 0]
    assert ex / ey == pytest.approx(jones[0] / jones[1], rel=1e-12)


@pytest.mark.parametrize(("near", "focal", "far"), [(0.4, 10.0, 0.2), (0.4, 0.3, 0.3), (0.2, 0.3, 0.2)])
def test_tails_of_a_rim_are_held_from_one_travel_to_the_next(near, focal, far):
    """A hole and a lens, both off the axis: referred to the curvature of its middle the light's tails came back as 2 %."""
    lens = Lens(focal=focal, centre=(0.0, 0.1 * mm))
    bench = Train(wavelength=633 * nm).along(
        Laser(waist=0.5 * mm), Aperture(radius=0.4 * mm, centre=(0.05 * mm, 0.0)), FreeSpace(near), lens,
        FreeSpace(far), Camera(pixel=30 * um, shape=(48, 50), name="cam"),
    )  # fmt: skip
    seen = bench.expose("cam", [H]).stokes
    wide = bench.expose("cam", [H], grid=Grid(2048, 10 * mm)).stokes
    # A rim errs by some times (pitch/s)^2: 5 um over 0.3 mm, 3e-4.
    assert abs(seen - wide).max() < 3e-4 * wide.max()


@pytest.mark.parametrize(("before", "behind"), [(3.0, 0.3), (2.5, 0.3)])
def test_a_plate_far_from_the_laser_gets_samples_fine_enough(before, behind):
    """Behind a single transform they are fine where the window at the source is wide; on a narrow one half was wrong."""
    bench = Train(wavelength=633 * nm).along(
        Laser(mode=Gaussian(waist=0.3 * mm, centre=(0.2 * mm, 0.0)), state=H), FreeSpace(before),
        QPlate(q=0.5, centre=(0.3 * mm, 0.0)), FreeSpace(behind), Camera(pixel=40 * um, shape=(60, 60), name="cam"),
    )  # fmt: skip
    seen = bench.expose("cam", [H]).stokes
    # Twice as fine behind the transform and on a window twice as wide there; right to 1e-3 is what is promised.
    fine = bench.expose("cam", [H], grid=Grid(4096, 60 * mm)).stokes
    assert abs(seen - fine).max() < 1e-3 * fine.max()
