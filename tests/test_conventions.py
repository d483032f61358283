"""The truth table of signs: every row of the conventions as one test, on the parts themselves."""

import cmath
import math

import numpy as np
import pytest

from fastaxis import conventions
from fastaxis.elements import (
    BeamSplitter,
    FaradayRotator,
    FreeSpace,
    Lens,
    Mirror,
    PhaseShift,
    Polarizer,
    QPlate,
    Retarder,
    Rotator,
    SpiralPlate,
)
from fastaxis.laws import Flip
from fastaxis.light import A, D, H, L, LaguerreGauss, R, Raster, State, V, ellipse, stokes
from fastaxis.maths import NUMBERS
from fastaxis.units import deg, mm, nm, um

WAVELENGTH = 532 * nm
# A product of a few 2x2 matrices with entries up to 1: some tens of roundings of 1.1e-16.
ROUNDING = 1e-14
MIRROR_X = np.diag([-1.0, 1.0])


def jones(part, ways=("front", "back"), phi=0.0):
    out = np.eye(2, dtype=complex)
    for law in part.passages(WAVELENGTH)[ways].laws:
        out = np.array(law.linear(NUMBERS, phi), dtype=complex) @ out
    return out


def same_state(one, other):
    """Equal up to a common phase."""
    one, other = np.asarray(one, complex), np.asarray(other, complex)
    return abs(abs(np.vdot(one, other)) - np.linalg.norm(one) * np.linalg.norm(other)) < ROUNDING


class TestWaves:
    def test_more_optical_path_is_more_positive_phase(self):
        assert PhaseShift(phase=0.3).laws(WAVELENGTH)[0].transmission.number() == pytest.approx(
            cmath.exp(0.3j), abs=ROUNDING
        )

    def test_the_slow_wave_of_a_plate_gains_phase(self):
        fast, slow = np.diag(jones(Retarder(fast=0.0, retardance=0.4)))
        assert cmath.phase(slow / fast) == pytest.approx(0.4, abs=ROUNDING)

    def test_with_this_time_factor_R_turns_clockwise_seen_by_the_receiver(self):
        # The tip of Re[E exp(-iwt)], x to the right and y up: a clockwise path has negative area.
        t = np.linspace(0, 2 * np.pi, 1001)
        ex, ey = (R.jones[:, None] * np.exp(-1j * t)).real
        area = 0.5 * np.sum(ex[:-1] * ey[1:] - ex[1:] * ey[:-1])
        # The polygon of 1000 sides is smaller than the circle of area pi/2 by (2 pi/1000)^2/6 = 7e-6 of it.
        assert area == pytest.approx(-np.pi / 2, rel=1e-5)

    def test_free_space_keeps_the_carrier_as_path(self):
        (law,) = FreeSpace(0.25).laws(WAVELENGTH)
        assert (law.b, law.path) == (0.25, 0.25)


class TestFrames:
    def test_rows_run_along_plus_y_and_samples_are_half_pixel_symmetric(self):
        raster = Raster(2.0, (2, 4))
        assert raster.y.tolist() == [-1.0, 1.0]
        assert raster.x.tolist() == [-3.0, -1.0, 1.0, 3.0]

    def test_angles_grow_counter_clockwise_from_x(self):
        passed = jones(Polarizer(axis=30 * deg)) @ H.jones
        assert passed[1] / passed[0] == pytest.approx(math.tan(math.pi / 6), abs=ROUNDING)


class TestPolarization:
    @pytest.mark.parametrize(
        ("state", "vector", "parameters"),
        [
            (H, (1, 0), (1, 1, 0, 0)),
            (V, (0, 1), (1, -1, 0, 0)),
            (D, (1, 1), (1, 0, 1, 0)),
            (A, (1, -1), (1, 0, -1, 0)),
            (R, (1, -1j), (1, 0, 0, 1)),
            (L, (1, 1j), (1, 0, 0, -1)),
        ],
    )
    def test_the_six_states(self, state, vector, parameters):
        assert same_state(state.jones, np.array(vector) / np.linalg.norm(vector))
        assert stokes(state.jones) == pytest.approx(parameters, abs=ROUNDING)

    def test_s3_is_2_im_ex_times_conjugate_ey(self):
        ex, ey = field = np.array([0.3 + 0.4j, -0.2 + 0.7j])
        assert stokes(field)[3] == pytest.approx(2 * (ex * np.conj(ey)).imag, abs=ROUNDING)
        assert stokes(field)[3] == pytest.approx(
            abs(np.vdot(R.jones, field)) ** 2 - abs(np.vdot(L.jones, field)) ** 2, abs=ROUNDING
        )

    def test_positive_ellipticity_is_right_handed(self):
        azimuth, ellipticity = ellipse(stokes(State(20 * deg, 15 * deg).jones))
        assert azimuth == pytest.approx(20 * deg, abs=ROUNDING)
        assert ellipticity == pytest.approx(15 * deg, abs=ROUNDING)

    def test_left_has_positive_helicity_and_the_other_view_renames_it(self):
        assert conventions.View.RECEIVER.circular_name(+1) == "L"
        assert conventions.View.SOURCE.circular_name(+1) == "R"


class TestElements:
    def test_axis_formula(self):
        theta, t1, t2 = 0.4, cmath.exp(-0.35j), cmath.exp(0.35j)
        turned = np.array([[math.cos(0.8), math.sin(0.8)], [math.sin(0.8), -math.cos(0.8)]])
        expected = (t1 + t2) / 2 * np.eye(2) + (t1 - t2) / 2 * turned
        assert jones(Retarder(fast=theta, retardance=0.7)) == pytest.approx(expected, abs=ROUNDING)

    def test_fast_axis_at_45_makes_H_right_handed(self):
        assert same_state(jones(Retarder(fast=45 * deg, retardance=90 * deg)) @ H.jones, R.jones)

    @pytest.mark.parametrize("q", [0.5, 1.0, 1.5, -0.5])
    @pytest.mark.parametrize("phi", [0.3, 2.0, -1.1])
    def test_tuned_q_plate_adds_2q_to_left_and_takes_it_from_right(self, q, phi):
        plate = QPlate(q=q)
        assert jones(plate, phi=phi) @ L.jones == pytest.approx(-1j * np.exp(2j * q * phi) * R.jones, abs=ROUNDING)
        assert jones(plate, phi=phi) @ R.jones == pytest.approx(-1j * np.exp(-2j * q * phi) * L.jones, abs=ROUNDING)

    def test_detuned_q_plate_leaves_cos_squared(self):
        out = jones(QPlate(q=0.5, retardance=2.2), phi=0.7) @ L.jones
        assert abs(np.vdot(L.jones, out)) ** 2 == pytest.approx(math.cos(1.1) ** 2, abs=ROUNDING)
        assert abs(np.vdot(R.jones, out)) ** 2 == pytest.approx(math.sin(1.1) ** 2, abs=ROUNDING)

    def test_spiral_plate_of_charge_l_is_exp_i_l_phi_and_so_is_a_mode(self):
        assert SpiralPlate(charge=3).laws(WAVELENGTH)[0].charge == 3
        mode = LaguerreGauss(0, 3, 1 * mm)
        on_x, on_y = (
            mode.amplitude(np.array([x]), np.array([y]), WAVELENGTH)[0] for x, y in ((1 * mm, 0.0), (0.0, 1 * mm))
        )
        assert on_y / on_x == pytest.approx(np.exp(3j * np.pi / 2), abs=ROUNDING)

    def test_rotator_turns_counter_clockwise(self):
        assert same_state(jones(Rotator(angle=30 * deg)) @ H.jones, State(30 * deg).jones)

    def test_a_converging_lens_has_positive_vergence_in_exp_minus_i_k_r2_over_2f(self):
        assert Lens(focal=0.5).laws(WAVELENGTH)[0].vergence == 2.0


class TestReflections:
    def test_perfect_mirror(self):
        mirror = jones(Mirror(), ("front", "front"))
        assert mirror == pytest.approx(np.diag([1, -1]), abs=0)
        for before, after in ((H, H), (V, V), (D, A), (R, L), (L, R)):
            assert same_state(mirror @ before.jones, after.jones)

    @pytest.mark.parametrize(("fold", "axis"), [("horizontal", "x"), ("vertical", "y")])
    def test_the_picture_flips_within_the_fold(self, fold, axis):
        passage = Mirror(fold=fold).passages(WAVELENGTH)["front", "front"]
        assert passage.reflected == axis
        assert passage.steps()[-1].axis == axis

    @pytest.mark.parametrize("fold", ["horizontal", "vertical"])
    def test_two_reflections_restore_every_state(self, fold):
        mirror = jones(Mirror(fold=fold), ("front", "front"))
        assert mirror @ mirror == pytest.approx(np.eye(2), abs=0)

    def test_reflected_port_is_i_times_the_mirror(self):
        splitter = BeamSplitter(reflectance=0.3)
        t = jones(splitter, ("front", "transmitted"))
        r = jones(splitter, ("front", "reflected"))
        assert t == pytest.approx(math.sqrt(0.7) * np.eye(2), abs=ROUNDING)
        assert r == pytest.approx(1j * math.sqrt(0.3) * np.diag([1, -1]), abs=ROUNDING)
        assert r @ t.conj().T + t @ r.conj().T == pytest.approx(np.zeros((2, 2)), abs=ROUNDING)


class TestPicturesAfterReflections:
    """Fields as functions of the place, taken step by step through real passages."""

    @staticmethod
    def through(steps, x, y, state):
        """(Ex, Ey) at (x, y) behind the steps, for light of one state that fills the plane."""
        if not steps:
            return state.jones
        *before, last = steps
        if isinstance(last, Flip):
            x, y = (-x, y) if last.axis == "x" else (x, -y)
            return TestPicturesAfterReflections.through(before, x, y, state)
        matrix = np.array(last.linear(NUMBERS, math.atan2(y, x)), dtype=complex)
        return matrix @ TestPicturesAfterReflections.through(before, x, y, state)

    def local_azimuth(self, folds, offset, phi):
        """Azimuth relative to the radius, behind a tuned q = 1/2 plate and mirrors."""
        steps = list(QPlate(q=0.5, offset=offset).passages(WAVELENGTH)["front", "back"].steps())
        for fold in folds:
            steps += Mirror(fold=fold).passages(WAVELENGTH)["front", "front"].steps()
        field = self.through(steps, math.cos(phi), math.sin(phi), H)
        s = stokes(field)
        assert abs(s[3]) < ROUNDING
        return math.remainder(math.atan2(s[2], s[1]) / 2 - phi, math.pi)

    @pytest.mark.parametrize("folds", [["horizontal"], ["vertical"], ["horizontal", "vertical"], ["horizontal"] * 3])
    @pytest.mark.parametrize("phi", [0.3, 1.4, -2.0])
    def test_radial_stays_radial(self, folds, phi):
        assert self.local_azimuth(folds, 0.0, phi) == pytest.approx(0, abs=ROUNDING)

    @pytest.mark.parametrize(
        ("folds", "sign"), [([], 1), (["horizontal"], -1), (["vertical"], -1), (["vertical"] * 2, 1)]
    )
    def test_a_spiral_changes_its_sense_at_each_reflection(self, folds, sign):
        assert self.local_azimuth(folds, 10 * deg, 0.7) == pytest.approx(sign * 20 * deg, abs=ROUNDING)

    @pytest.mark.parametrize("axis", ["x", "y"])
    def test_charge_and_helicity_both_flip(self, axis):
        fold = {"x": "horizontal", "y": "vertical"}[axis]
        steps = [
            *QPlate(q=0.5).passages(WAVELENGTH)["front", "back"].steps(),
            *Mirror(fold=fold).passages(WAVELENGTH)["front", "front"].steps(),
        ]
        # L becomes R with l = +1 in the plate, and L with l = -1 in the mirror.
        one, other = (self.through(steps, math.cos(phi), math.sin(phi), L) for phi in (0.2, 0.9))
        assert np.vdot(L.jones, other) / np.vdot(L.jones, one) == pytest.approx(cmath.exp(-0.7j), abs=ROUNDING)
        assert abs(np.vdot(R.jones, one)) < ROUNDING


class TestBackwards:
    def test_reciprocal_part_is_d_jt_d(self):
        plate = Retarder(fast=0.4, retardance=1.1, transmission=0.8)
        expected = MIRROR_X @ jones(plate).T @ MIRROR_X
        assert jones(plate, ("back", "front")) == pytest.approx(expected, abs=ROUNDING)

    def test_plate_is_met_at_minus_theta(self):
        assert jones(Retarder(fast=0.4, retardance=1.1), ("back", "front")) == pytest.approx(
            jones(Retarder(fast=-0.4, retardance=1.1)), abs=ROUNDING
        )

    def test_faraday_rotation_is_met_as_minus_beta_and_optical_activity_as_plus_beta(self):
        assert jones(FaradayRotator(angle=0.3), ("back", "front")) == pytest.approx(
            jones(Rotator(angle=-0.3)), abs=ROUNDING
        )
        assert jones(Rotator(angle=0.3), ("back", "front")) == pytest.approx(jones(Rotator(angle=0.3)), abs=ROUNDING)

    def test_places_map_x_to_minus_x(self):
        law = Lens(focal=0.5, centre=(50 * um, 20 * um)).passages(WAVELENGTH)["back", "front"].laws[0]
        assert law.centre == (-50 * um, 20 * um)

    def test_charge_counts_in_the_beams_own_frame(self):
        law = SpiralPlate(charge=2).passages(WAVELENGTH)["back", "front"].laws[0]
        assert law.charge == -2


class TestAnalyzer:
    def test_a_state_passes_its_projection(self):
        # (S0 + a.S)/2 for a setting with the Stokes vector (1, a) against the polarizer's own matrix.
        field = np.array([0.8 + 0.1j, 0.3 - 0.5j])
        setting = State(0.35)
        power = np.linalg.norm(jones(Polarizer(axis=0.35)) @ field) ** 2
        assert power == pytest.approx(setting.stokes @ stokes(field) / 2, abs=ROUNDING)

    def test_stamp_names_the_set(self):
        assert "R = (1,-i)/√2 clockwise" in conventions.stamp()
