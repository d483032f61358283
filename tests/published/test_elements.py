"""Published laws of plates, polarizers, rotators, isolators, geometric phases and q-plates, by the parts' matrices.

Several sources name circular light by helicity, s+ = (1, i)/sqrt 2, with S3(s+) = +1. Here R = (1, -i)/sqrt 2 and
S3 = I_R - I_L (the naming of Hecht and of Born & Wolf), so s+ is L and their S3 is minus ours; where a printed S3 is
used the sign is turned explicitly. Section and equation numbers are from memory unless said otherwise.
"""

import cmath
import math
from itertools import pairwise

import numpy as np
import pytest

from fastaxis.elements import (
    BeamSplitter,
    FaradayRotator,
    HalfWavePlate,
    Mirror,
    PatternedRetarder,
    Polarizer,
    PolarizingBeamSplitter,
    QPlate,
    QuarterWavePlate,
    Retarder,
    Rotator,
)
from fastaxis.light import A, D, H, L, R, V, linear, stokes
from fastaxis.maths import NUMBERS
from fastaxis.units import deg, mm, nm

WAVELENGTH = 632.8 * nm
PLUS, MINUS = L.jones, R.jones  # by helicity
# Products of up to ten 2x2 matrices with entries up to 1: each entry gathers some tens of roundings of 1.1e-16.
ROUNDING = 1e-14
SWAP_S3 = np.diag([1, 1, 1, -1])


def jones(part, ways=("front", "back"), phi=0.0, x=0.0, y=0.0):
    out = np.eye(2, dtype=complex)
    for law in part.passages(WAVELENGTH)[ways].laws:
        out = np.array(law.linear(NUMBERS, phi, x, y), dtype=complex) @ out
    return out


def hwp(angle):
    return jones(HalfWavePlate(fast=angle))


def qwp(angle):
    return jones(QuarterWavePlate(fast=angle))


def retarder(delta, angle):
    return jones(Retarder(fast=angle, retardance=delta))


def polarizer(angle):
    return jones(Polarizer(axis=angle))


def rotation(angle):
    return jones(Rotator(angle=angle))


def there_and_back(*parts):
    """Round trip through parts to a plain mirror and back, each in the frame of its own beam."""
    out = np.eye(2, dtype=complex)
    for part in parts:
        out = jones(part) @ out
    out = jones(Mirror(), ("front", "front")) @ out
    for part in reversed(parts):
        out = jones(part, ("back", "front")) @ out
    return out


def mueller(matrix):
    """Mueller matrix in our S3: columns from six states through the Jones matrix."""
    h, v, d, a, r, left = (stokes(matrix @ s.jones) for s in (H, V, D, A, R, L))
    return np.stack([(h + v) / 2, (h - v) / 2, (d - a) / 2, (r - left) / 2], axis=1)


def share(field, state):
    return abs(np.vdot(state, field)) ** 2


def close(value, tolerance=ROUNDING):
    return pytest.approx(value, abs=tolerance, rel=0)


class TestJonesAndMueller:
    def test_pol_004_half_wave_plate(self):
        # Goldstein, Polarized Light, 2nd ed., ch. 10-11; R. C. Jones, J. Opt. Soc. Am. 31, 488 (1941).
        printed = [[0.76604444, 0.64278761], [0.64278761, -0.76604444]]
        assert 1j * hwp(20 * deg) == close(np.array(printed), 5e-9)
        for theta in (0.3, 1.0):
            assert hwp(theta) @ PLUS == close(-1j * cmath.exp(2j * theta) * MINUS)
            assert hwp(theta) @ MINUS == close(-1j * cmath.exp(-2j * theta) * PLUS)
            assert share(hwp(theta) @ linear(0.2).jones, linear(2 * theta - 0.2).jones) == close(1)

    def test_pol_005_quarter_wave_plate(self):
        # Hecht, Optics, 4th ed., table 8.6: fast axis vertical ~ diag(1, -i), horizontal ~ diag(1, i).
        assert share(qwp(0) @ D.jones, PLUS) == close(1)
        assert share(qwp(90 * deg) @ D.jones, MINUS) == close(1)
        assert share(qwp(45 * deg) @ H.jones, MINUS) == close(1)
        assert share(qwp(45 * deg) @ V.jones, PLUS) == close(1)
        assert share(qwp(-45 * deg) @ H.jones, PLUS) == close(1)
        assert qwp(0)[1, 1] / qwp(0)[0, 0] == close(1j)

    @pytest.mark.parametrize(("delta", "theta"), [(90 * deg, 30 * deg), (1.1, -0.4), (2.5, 1.2)])
    def test_pol_006_retarder_mueller_matrix(self, delta, theta):
        # Goldstein ch. 5; Hecht table 8.6. Printed for S3(s+) = +1 with the upper signs, turned to ours by SWAP_S3.
        c, s = math.cos(2 * theta), math.sin(2 * theta)
        cd, sd = math.cos(delta), math.sin(delta)
        upper = np.array(
            [
                [1, 0, 0, 0],
                [0, c * c + s * s * cd, c * s * (1 - cd), s * sd],
                [0, c * s * (1 - cd), s * s + c * c * cd, -c * sd],
                [0, -s * sd, c * sd, cd],
            ]
        )
        assert mueller(retarder(delta, theta)) == close(SWAP_S3 @ upper @ SWAP_S3)

    def test_pol_006_printed_numbers(self):
        printed = np.array(
            [[1, 0, 0, 0], [0, 0.25, 0.433013, 0.866025], [0, 0.433013, 0.75, -0.5], [0, -0.866025, 0.5, 0]]
        )
        assert mueller(qwp(30 * deg)) == close(SWAP_S3 @ printed @ SWAP_S3, 5e-7)

    def test_pol_007_polarizer(self):
        # Hecht table 8.6; Goldstein ch. 5.
        assert mueller(polarizer(30 * deg))[0] == close(np.array([0.5, 0.25, 0.4330127019, 0.0]), 5e-11)
        c, s = math.cos(0.7), math.sin(0.7)
        assert polarizer(0.7) == close(np.array([[c * c, c * s], [c * s, s * s]]))

    def test_pol_008_partial_polarizer(self):
        # Goldstein section 5.2: px = 0.9, py = 0.1.
        part = Polarizer(axis=0.0, transmission=0.81, extinction=81)
        m = mueller(jones(part))
        assert m[:2, :2] == close(np.array([[0.41, 0.40], [0.40, 0.41]]))
        assert m[2:, 2:] == close(np.diag([0.09, 0.09]))
        assert m[0, 1] / m[0, 0] == close(0.97560976, 5e-9)

    def test_pol_009_rotator(self):
        # Hecht section 8.10.
        printed = [[0.76604444, -0.64278761], [0.64278761, 0.76604444]]
        m = mueller(rotation(20 * deg))
        assert m[1:3, 1:3] == close(np.array(printed), 5e-9)
        assert m[3, 3] == close(1)
        assert rotation(0.3) @ PLUS == close(cmath.exp(-0.3j) * PLUS)
        assert rotation(0.3) @ MINUS == close(cmath.exp(0.3j) * MINUS)

    def test_pol_010_jones_to_mueller(self):
        # R. A. Chipman, Handbook of Optics I, 3rd ed., ch. 14; last row of A turned to our S3.
        a = np.array([[1, 0, 0, 1], [1, 0, 0, -1], [0, 1, 1, 0], [0, -1j, 1j, 0]])
        one = jones(Polarizer(axis=0.3, extinction=20, transmission=0.9)) @ retarder(1.2, 0.8)
        two = retarder(0.4, -0.3) @ rotation(0.9)
        for matrix in (one, two):
            assert mueller(matrix) == close((a @ np.kron(matrix, matrix.conj()) @ np.linalg.inv(a)).real)
        assert mueller(one @ two) == close(mueller(one) @ mueller(two))

    def test_pol_011_mirror(self):
        # Goldstein, reflection chapter: axes that follow the beam.
        mirror = jones(Mirror(), ("front", "front"))
        assert mueller(mirror) == close(np.diag([1, 1, -1, -1]))
        assert share(mirror @ PLUS, MINUS) == close(1)

    def test_pol_013_the_mirror_names_its_p_axis(self):
        # IUPAC Gold Book S06030 orders s before p; here p is named, and lies in the plane of the fold.
        for fold, p, s in (("horizontal", H, V), ("vertical", V, H)):
            mirror = jones(Mirror(fold=fold, Rp=0.25, Rs=0.81), ("front", "front"))
            assert np.linalg.norm(mirror @ p.jones) == close(0.5)
            assert np.linalg.norm(mirror @ s.jones) == close(0.9)

    @pytest.mark.parametrize(("theta", "phi", "delta"), [(0.3, 1.1, 0.7), (-0.8, 0.2, 2.9), (1.4, -1.0, -1.3)])
    def test_pol_014_identities(self, theta, phi, delta):
        # R. C. Jones, J. Opt. Soc. Am. 31, 493 (1941); C. Ye, Opt. Eng. 34, 3031 (1995) for the last.
        one = np.eye(2)
        assert hwp(theta) @ hwp(theta) == close(-one)
        assert qwp(theta) @ qwp(theta) == close(hwp(theta))
        assert hwp(phi) @ hwp(theta) == close(-rotation(2 * phi - 2 * theta))
        assert rotation(phi) @ retarder(delta, theta) @ rotation(-phi) == close(retarder(delta, theta + phi))
        assert retarder(delta, theta) @ retarder(-delta, theta) == close(one)
        assert retarder(delta, theta + 90 * deg) == close(retarder(-delta, theta))
        assert np.linalg.det(retarder(delta, theta)) == close(1)
        assert hwp(theta) @ retarder(delta, phi) @ hwp(theta) == close(-retarder(delta, 2 * theta - phi))
        assert qwp(45 * deg) @ retarder(delta, 0) @ qwp(-45 * deg) == close(rotation(-delta / 2))

    def test_pol_015_state_preparation(self):
        # R. Simon & N. Mukunda, Phys. Lett. A 143, 165 (1990), for S3(s+) = +1: the last number changes sign here.
        out = stokes(qwp(25 * deg) @ hwp(6.5 * deg) @ H.jones)
        assert SWAP_S3 @ out == close(np.array([1, 0.5872157011, 0.6998164214, -0.4067366431]), 5e-11)
        for psi, chi in ((0.4, 0.3), (-1.0, -0.7), (1.2, 0.1)):
            s = SWAP_S3 @ stokes(qwp(psi) @ hwp((psi + chi) / 2) @ H.jones)
            assert s[3] == close(math.sin(2 * chi))
            assert s[2] == close(math.sin(2 * psi) * math.cos(2 * chi))


class TestPolarizerChains:
    def test_mal_001_malus(self):
        # E. L. Malus 1809; Hecht section 8.2.1.
        printed = [1.0, 0.9330127, 0.75, 0.5, 0.25, 0.0669873, 0.0]
        for degrees, power in zip(range(0, 91, 15), printed, strict=True):
            assert np.linalg.norm(polarizer(degrees * deg) @ H.jones) ** 2 == close(power, 5e-8)
        assert mueller(polarizer(0.4))[0, 0] == close(0.5)

    def test_mal_002_third_polarizer(self):
        # Hecht section 8.2 and problems.
        for theta, power in ((20 * deg, 0.0516469889), (45 * deg, 0.125)):
            chain = polarizer(90 * deg) @ polarizer(theta) @ polarizer(0)
            assert mueller(chain)[0, 0] == close(power, 5e-11)

    @pytest.mark.parametrize(
        ("count", "power"),
        [(1, 0.0), (2, 0.25), (3, 0.42187500), (6, 0.65966788), (10, 0.78054607), (45, 0.94663444), (90, 0.97295547)],
    )
    def test_mal_003_chain(self, count, power):
        # Hecht, problems ch. 8; A. Peres, Quantum Theory (1993), ch. 12.
        field = H.jones
        for k in range(1, count + 1):
            field = polarizer(90 * deg * k / count) @ field
        assert np.linalg.norm(field) ** 2 == close(power, 5e-9)

    @pytest.mark.parametrize(("theta", "delta", "power"), [(45, 90, 0.5), (22.5, 180, 0.5), (30, 60, 0.1875)])
    def test_mal_004_retarder_between_polarizers(self, theta, delta, power):
        # Born & Wolf, 7th ed., section 15.4.1.
        inside = retarder(delta * deg, theta * deg) @ polarizer(0) @ H.jones
        assert np.linalg.norm(polarizer(90 * deg) @ inside) ** 2 == close(power)
        assert np.linalg.norm(polarizer(0) @ inside) ** 2 == close(1 - power)


class TestRotators:
    def test_rot_001_half_wave_plate_turns_by_twice_its_angle(self):
        # Hecht section 8.7.1.
        for degrees, power in ((0, 0.0), (11.25, 0.14644661), (22.5, 0.5), (45, 1.0)):
            assert share(hwp(degrees * deg) @ H.jones, V.jones) == close(power, 5e-9)

    def test_rot_002_two_half_wave_plates(self):
        # Azzam & Bashara, Ellipsometry and Polarized Light (1977), section 2.
        assert hwp(1.1) @ hwp(0.4) == close(-rotation(1.4))


class TestIsolators:
    @pytest.mark.parametrize(("theta", "h"), [(45, 0.0), (30, 0.25), (22.5, 0.5), (0, 1.0), (40, 0.03015369)])
    def test_iso_001_double_pass_of_a_quarter_wave_plate(self, theta, h):
        # Hecht section 8.7; Saleh & Teich, Fundamentals of Photonics, 3rd ed., section 6.6.
        out = there_and_back(QuarterWavePlate(fast=theta * deg)) @ H.jones
        assert share(out, H.jones) == close(h, 5e-9)
        assert share(out, V.jones) == close(1 - h, 5e-9)

    def test_iso_001_is_a_half_wave_plate_in_the_frame_that_follows_the_beam(self):
        assert there_and_back(QuarterWavePlate(fast=0.3)) == close(np.diag([1, -1]) @ hwp(0.3))

    def test_iso_002_forgetting_the_frame_would_give_1(self):
        # Derived from ISO-001. The plate met at +45 on the way back too is the usual mistake.
        mirror = jones(Mirror(), ("front", "front"))
        assert share(qwp(45 * deg) @ mirror @ qwp(45 * deg) @ H.jones, H.jones) == close(1)
        assert share(there_and_back(QuarterWavePlate(fast=45 * deg)) @ H.jones, H.jones) == close(0)

    @pytest.mark.parametrize(("delta", "leak"), [(100, 0.0301536896), (89, 3.0459e-4), (91, 3.0459e-4)])
    def test_iso_003_imperfect_plate(self, delta, leak):
        # Common practice, no source: cos^2(delta).
        out = there_and_back(Retarder(fast=45 * deg, retardance=delta * deg)) @ H.jones
        assert share(out, H.jones) == close(leak, 5e-9)

    def test_iso_polarizing_splitter_sends_the_return_aside(self):
        # Saleh & Teich section 6.6: laser, splitter, plate at 45 degrees, mirror.
        cube = PolarizingBeamSplitter()
        out = there_and_back(QuarterWavePlate(fast=45 * deg)) @ jones(cube, ("front", "transmitted")) @ H.jones
        assert np.linalg.norm(jones(cube, ("transmitted", "front")) @ out) ** 2 == close(0)
        assert np.linalg.norm(jones(cube, ("transmitted", "side")) @ out) ** 2 == close(1)

    def test_far_001_faraday_adds_and_optical_activity_cancels(self):
        # Hecht section 8.11.2; Saleh & Teich sections 6.4B, 6.6D; M. Faraday 1845.
        out = there_and_back(FaradayRotator(angle=23 * deg)) @ H.jones
        assert share(out, V.jones) == close(0.5174497484, 5e-11)
        assert share(there_and_back(Rotator(angle=23 * deg)) @ H.jones, V.jones) == close(0)
        assert share(there_and_back(FaradayRotator(angle=45 * deg)) @ H.jones, V.jones) == close(1)

    def test_far_002_orthogonal_return(self):
        # M. Martinelli, Opt. Commun. 72, 341 (1989): any reciprocal path before a 45 degree rotator and a mirror.
        path = (Retarder(fast=0.3, retardance=1.9), Rotator(angle=0.7), Retarder(fast=-1.0, retardance=0.8))
        for state in (H, D, R, linear(0.2)):
            sent = state.jones
            back = there_and_back(*path, FaradayRotator(angle=45 * deg)) @ sent
            # The bilinear product is taken on fixed axes; the returning beam's x is reversed.
            assert (np.diag([-1, 1]) @ back) @ sent == close(0)

    def test_cmp_002_isolator_with_a_wrong_rotator(self):
        # Saleh & Teich section 6.6D: polarizer 0, rotator, polarizer 45 degrees, and light coming back.
        for beta, forward, backward in (
            (45, 1.0, 0.0),
            (44, 0.99969541, 3.04586490e-4),
            (42, 0.99726095, 2.73905232e-3),
        ):
            rotator = FaradayRotator(angle=beta * deg)
            first, last = Polarizer(axis=0.0), Polarizer(axis=45 * deg)
            onward = jones(last) @ jones(rotator) @ jones(first) @ H.jones
            assert np.linalg.norm(onward) ** 2 == close(forward, 5e-9)
            # Light passed by the last polarizer on its way back lies at -45 degrees in its own frame.
            back = jones(first, ("back", "front")) @ jones(rotator, ("back", "front")) @ linear(-45 * deg).jones
            assert np.linalg.norm(back) ** 2 == close(backward, 5e-9)


class TestGeometricPhase:
    @pytest.mark.parametrize("degrees", [0, 5, 17, 22.5, 45, 60])
    def test_geo_001_and_002_phase_shifter(self, degrees):
        # S. Pancharatnam, Proc. Indian Acad. Sci. A 44, 247 (1956); T. H. Chyba et al., Opt. Lett. 13, 562 (1988).
        theta = degrees * deg
        matrix = qwp(45 * deg) @ hwp(theta) @ qwp(45 * deg)
        assert matrix == close(np.diag([-1j * cmath.exp(-2j * theta), 1j * cmath.exp(2j * theta)]))

    def test_geo_002_table(self):
        # Derived from GEO-001; Pancharatnam (1956).
        for degrees, phase in ((0, -90), (5, -100), (22.5, -135), (45, -180), (60, 150)):
            first = (qwp(45 * deg) @ hwp(degrees * deg) @ qwp(45 * deg))[0, 0]
            assert first == close(cmath.exp(1j * phase * deg))

    def test_geo_004_cycle_of_projections(self):
        # M. V. Berry, J. Mod. Opt. 34, 1401 (1987): half the solid angle of an octant.
        def projector(state):
            return np.outer(state, state.conj())

        for circular, phase in ((PLUS, -45), (MINUS, 45)):
            cycle = np.vdot(H.jones, projector(circular) @ polarizer(45 * deg) @ H.jones)
            assert abs(cycle) == close(0.35355339, 5e-9)
            assert cmath.phase(cycle) == close(phase * deg)

    def test_geo_005_rotating_half_wave_plate(self):
        # B. A. Garetz & S. Arnold, Opt. Commun. 31, 1 (1979): s+ leaves with exp(+2i Omega t), that is omega - 2 Omega.
        turns = [cmath.phase(np.vdot(MINUS, hwp(angle) @ PLUS)) for angle in (0.0, 0.1, 0.2)]
        assert [later - earlier for earlier, later in pairwise(turns)] == close([0.2, 0.2])


class TestQPlates:
    # L. Marrucci, C. Manzo, D. Paparo, Phys. Rev. Lett. 96, 163905 (2006), eqs. (1)-(3); they call (1, i) left-circular.
    @pytest.mark.parametrize("q", [0.5, 1, -0.5, 1.5])
    @pytest.mark.parametrize("phi", [0.4, -2.0])
    def test_qpl_001(self, q, phi):
        delta, offset = 2.1, 0.3
        matrix = jones(QPlate(q=q, offset=offset, retardance=delta), phi=phi)
        kept, made = math.cos(delta / 2), -1j * math.sin(delta / 2)
        turned = cmath.exp(2j * (q * phi + offset))
        assert matrix @ PLUS == close(kept * PLUS + made * turned * MINUS)
        assert matrix @ MINUS == close(kept * MINUS + made / turned * PLUS)

    def test_qpl_002_conversion(self):
        # S. Slussarenko et al., Opt. Express 19, 4085 (2011).
        degrees = [0, 45, 60, 90, 120, 135, 150, 170, 180]
        printed = [0.0, 0.14644661, 0.25, 0.5, 0.75, 0.85355339, 0.93301270, 0.99240388, 1.0]
        for delta, converted in zip(degrees, printed, strict=True):
            plate = QPlate(q=0.5, retardance=delta * deg)
            assert share(jones(plate, phi=0.9) @ PLUS, MINUS) == close(converted, 5e-9)
            assert plate.unconverted(WAVELENGTH) == close(1 - converted, 5e-9)

    @pytest.mark.parametrize("phi", [0.0, 0.8, 2.5, -1.3])
    def test_qpl_003_vector_beams(self, phi):
        # Q. Zhan, Adv. Opt. Photon. 1, 1 (2009); M. Stalder & M. Schadt, Opt. Lett. 21, 1948 (1996).
        c, s = math.cos(phi), math.sin(phi)
        plate = jones(QPlate(q=0.5), phi=phi)
        assert plate @ H.jones == close(-1j * np.array([c, s]))
        assert plate @ V.jones == close(-1j * np.array([s, -c]))
        assert share(plate @ D.jones, linear(phi - 45 * deg).jones) == close(1)
        assert jones(QPlate(q=0.5, offset=45 * deg), phi=phi) @ H.jones == close(-1j * np.array([-s, c]))
        assert jones(QPlate(q=-0.5), phi=phi) @ H.jones == close(-1j * np.array([c, -s]))

    @pytest.mark.parametrize(("q", "lobes"), [(0.5, 2), (1, 4), (1.5, 6), (2, 8), (-0.5, 2)])
    def test_qpl_004_lobes(self, q, lobes):
        # Zhan (2009), section 2. Lobes are counted as the falls through half of the maximum.
        beta, offset = 0.35, 0.2
        phi = np.linspace(0, 2 * np.pi, 721)
        plate = QPlate(q=q, offset=offset)
        power = np.array([np.linalg.norm(polarizer(beta) @ jones(plate, phi=p) @ H.jones) ** 2 for p in phi])
        assert power == close(np.cos(2 * q * phi + 2 * offset - beta) ** 2)
        assert np.sum((power[:-1] >= 0.5) & (power[1:] < 0.5)) == lobes

    def test_qpl_007_two_in_series(self):
        # Marrucci et al. (2006), with ROT-002.
        one, two = QPlate(q=1, offset=0.5), QPlate(q=1, offset=0.1)
        for phi in (0.3, 1.9):
            assert jones(one, phi=phi) @ jones(two, phi=phi) == close(-rotation(0.8))
            half = QPlate(q=0.5)
            out = jones(half, phi=phi) @ hwp(0) @ jones(half, phi=phi) @ PLUS
            assert out == close((-1j) ** 3 * cmath.exp(2j * phi) * MINUS)

    def test_pbl_001_geometric_phase_lens(self):
        # E. Hasman, V. Kleiner, G. Biener, A. Niv, Appl. Phys. Lett. 82, 328 (2003).
        focal, k = 0.2, 2 * math.pi / WAVELENGTH
        lens = PatternedRetarder(fast=lambda x, y: -k * (x**2 + y**2) / (4 * focal))
        for x, y in ((0.3 * mm, 0.0), (0.2 * mm, -0.5 * mm)):
            phase = k * (x * x + y * y) / (2 * focal)
            matrix = jones(lens, x=np.array(x), y=np.array(y))
            # The phase is some radians: its rounding, and that of its cosine, stay below 1e-14.
            assert matrix @ PLUS == close(-1j * cmath.exp(-1j * phase) * MINUS)
            assert matrix @ MINUS == close(-1j * cmath.exp(1j * phase) * PLUS)


class TestBeamSplitter:
    @pytest.mark.parametrize("reflectance", [0.5, 0.1, 0.45])
    def test_bsp_001_symmetric_lossless(self, reflectance):
        # V. Degiorgio, Am. J. Phys. 48, 81 (1980); A. Zeilinger, Am. J. Phys. 49, 882 (1981).
        cube = BeamSplitter(reflectance=reflectance)
        t = jones(cube, ("front", "transmitted"))[0, 0]
        r = jones(cube, ("front", "reflected"))[0, 0]
        assert np.array([[t, r], [r, t]]) @ np.array([[t, r], [r, t]]).conj().T == close(np.eye(2))
        assert abs(2 * cmath.phase(r) - 2 * cmath.phase(t)) == close(math.pi)
