"""Published laws of wave plates, polarizers and rotators, by the parts' matrices.

Several sources name circular light by helicity, s+ = (1, i)/sqrt 2, with S3(s+) = +1. Here R = (1, -i)/sqrt 2 and
S3 = I_R - I_L (the naming of Hecht and of Born & Wolf), so s+ is L and their S3 is minus ours; where a printed S3 is
used the sign is turned explicitly. Section and equation numbers are from memory unless said otherwise.
"""

import cmath
import math

import numpy as np
import pytest

from fastaxis.elements import Mirror, Polarizer
from fastaxis.light import D, H, L, R, V, linear, stokes
from fastaxis.units import deg

PLUS, MINUS = L.jones, R.jones  # by helicity
SWAP_S3 = np.diag([1, 1, 1, -1])


class TestJonesAndMueller:
    def test_pol_004_half_wave_plate(self, hwp, share, close):
        # Goldstein, Polarized Light, 2nd ed., ch. 10-11; R. C. Jones, J. Opt. Soc. Am. 31, 488 (1941).
        printed = [[0.76604444, 0.64278761], [0.64278761, -0.76604444]]
        assert 1j * hwp(20 * deg) == close(np.array(printed), 5e-9)
        for theta in (0.3, 1.0):
            assert hwp(theta) @ PLUS == close(-1j * cmath.exp(2j * theta) * MINUS)
            assert hwp(theta) @ MINUS == close(-1j * cmath.exp(-2j * theta) * PLUS)
            assert share(hwp(theta) @ linear(0.2).jones, linear(2 * theta - 0.2).jones) == close(1)

    def test_pol_005_quarter_wave_plate(self, qwp, share, close):
        # Hecht, Optics, 4th ed., table 8.6: fast axis vertical ~ diag(1, -i), horizontal ~ diag(1, i).
        assert share(qwp(0) @ D.jones, PLUS) == close(1)
        assert share(qwp(90 * deg) @ D.jones, MINUS) == close(1)
        assert share(qwp(45 * deg) @ H.jones, MINUS) == close(1)
        assert share(qwp(45 * deg) @ V.jones, PLUS) == close(1)
        assert share(qwp(-45 * deg) @ H.jones, PLUS) == close(1)
        assert qwp(0)[1, 1] / qwp(0)[0, 0] == close(1j)

    @pytest.mark.parametrize(("delta", "theta"), [(90 * deg, 30 * deg), (1.1, -0.4), (2.5, 1.2)])
    def test_pol_006_retarder_mueller_matrix(self, delta, theta, retarder, mueller, close):
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

    def test_pol_006_printed_numbers(self, qwp, mueller, close):
        printed = np.array(
            [[1, 0, 0, 0], [0, 0.25, 0.433013, 0.866025], [0, 0.433013, 0.75, -0.5], [0, -0.866025, 0.5, 0]]
        )
        assert mueller(qwp(30 * deg)) == close(SWAP_S3 @ printed @ SWAP_S3, 5e-7)

    def test_pol_007_polarizer(self, polarizer, mueller, close):
        # Hecht table 8.6; Goldstein ch. 5.
        assert mueller(polarizer(30 * deg))[0] == close(np.array([0.5, 0.25, 0.4330127019, 0.0]), 5e-11)
        c, s = math.cos(0.7), math.sin(0.7)
        assert polarizer(0.7) == close(np.array([[c * c, c * s], [c * s, s * s]]))

    def test_pol_008_partial_polarizer(self, jones, mueller, close):
        # Goldstein section 5.2: px = 0.9, py = 0.1.
        part = Polarizer(axis=0.0, transmission=0.81, extinction=81)
        m = mueller(jones(part))
        assert m[:2, :2] == close(np.array([[0.41, 0.40], [0.40, 0.41]]))
        assert m[2:, 2:] == close(np.diag([0.09, 0.09]))
        assert m[0, 1] / m[0, 0] == close(0.97560976, 5e-9)

    def test_pol_009_rotator(self, rotation, mueller, close):
        # Hecht section 8.10.
        printed = [[0.76604444, -0.64278761], [0.64278761, 0.76604444]]
        m = mueller(rotation(20 * deg))
        assert m[1:3, 1:3] == close(np.array(printed), 5e-9)
        assert m[3, 3] == close(1)
        assert rotation(0.3) @ PLUS == close(cmath.exp(-0.3j) * PLUS)
        assert rotation(0.3) @ MINUS == close(cmath.exp(0.3j) * MINUS)

    def test_pol_010_jones_to_mueller(self, jones, retarder, rotation, mueller, close):
        # R. A. Chipman, Handbook of Optics I, 3rd ed., ch. 14; last row of A turned to our S3.
        a = np.array([[1, 0, 0, 1], [1, 0, 0, -1], [0, 1, 1, 0], [0, -1j, 1j, 0]])
        one = jones(Polarizer(axis=0.3, extinction=20, transmission=0.9)) @ retarder(1.2, 0.8)
        two = retarder(0.4, -0.3) @ rotation(0.9)
        for matrix in (one, two):
            assert mueller(matrix) == close((a @ np.kron(matrix, matrix.conj()) @ np.linalg.inv(a)).real)
        assert mueller(one @ two) == close(mueller(one) @ mueller(two))

    def test_pol_011_mirror(self, jones, mueller, share, close):
        # Goldstein, reflection chapter: axes that follow the beam.
        mirror = jones(Mirror(), ("front", "front"))
        assert mueller(mirror) == close(np.diag([1, 1, -1, -1]))
        assert share(mirror @ PLUS, MINUS) == close(1)

    def test_pol_013_the_mirror_names_its_p_axis(self, jones, close):
        # IUPAC Gold Book S06030 orders s before p; here p is named, and lies in the plane of the fold.
        for fold, p, s in (("horizontal", H, V), ("vertical", V, H)):
            mirror = jones(Mirror(fold=fold, Rp=0.25, Rs=0.81), ("front", "front"))
            assert np.linalg.norm(mirror @ p.jones) == close(0.5)
            assert np.linalg.norm(mirror @ s.jones) == close(0.9)

    @pytest.mark.parametrize(("theta", "phi", "delta"), [(0.3, 1.1, 0.7), (-0.8, 0.2, 2.9), (1.4, -1.0, -1.3)])
    def test_pol_014_identities(self, theta, phi, delta, hwp, qwp, retarder, rotation, close):
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

    def test_pol_015_state_preparation(self, hwp, qwp, close):
        # R. Simon & N. Mukunda, Phys. Lett. A 143, 165 (1990), for S3(s+) = +1: the last number changes sign here.
        out = stokes(qwp(25 * deg) @ hwp(6.5 * deg) @ H.jones)
        assert SWAP_S3 @ out == close(np.array([1, 0.5872157011, 0.6998164214, -0.4067366431]), 5e-11)
        for psi, chi in ((0.4, 0.3), (-1.0, -0.7), (1.2, 0.1)):
            s = SWAP_S3 @ stokes(qwp(psi) @ hwp((psi + chi) / 2) @ H.jones)
            assert s[3] == close(math.sin(2 * chi))
            assert s[2] == close(math.sin(2 * psi) * math.cos(2 * chi))


class TestPolarizerChains:
    def test_mal_001_malus(self, polarizer, mueller, close):
        # E. L. Malus 1809; Hecht section 8.2.1.
        printed = [1.0, 0.9330127, 0.75, 0.5, 0.25, 0.0669873, 0.0]
        for degrees, power in zip(range(0, 91, 15), printed, strict=True):
            assert np.linalg.norm(polarizer(degrees * deg) @ H.jones) ** 2 == close(power, 5e-8)
        assert mueller(polarizer(0.4))[0, 0] == close(0.5)

    def test_mal_002_third_polarizer(self, polarizer, mueller, close):
        # Hecht section 8.2 and problems.
        for theta, power in ((20 * deg, 0.0516469889), (45 * deg, 0.125)):
            chain = polarizer(90 * deg) @ polarizer(theta) @ polarizer(0)
            assert mueller(chain)[0, 0] == close(power, 5e-11)

    @pytest.mark.parametrize(
        ("count", "power"),
        [(1, 0.0), (2, 0.25), (3, 0.42187500), (6, 0.65966788), (10, 0.78054607), (45, 0.94663444), (90, 0.97295547)],
    )
    def test_mal_003_chain(self, count, power, polarizer, close):
        # Hecht, problems ch. 8; A. Peres, Quantum Theory (1993), ch. 12.
        field = H.jones
        for k in range(1, count + 1):
            field = polarizer(90 * deg * k / count) @ field
        assert np.linalg.norm(field) ** 2 == close(power, 5e-9)

    @pytest.mark.parametrize(("theta", "delta", "power"), [(45, 90, 0.5), (22.5, 180, 0.5), (30, 60, 0.1875)])
    def test_mal_004_retarder_between_polarizers(self, theta, delta, power, retarder, polarizer, close):
        # Born & Wolf, 7th ed., section 15.4.1.
        inside = retarder(delta * deg, theta * deg) @ polarizer(0) @ H.jones
        assert np.linalg.norm(polarizer(90 * deg) @ inside) ** 2 == close(power)
        assert np.linalg.norm(polarizer(0) @ inside) ** 2 == close(1 - power)


class TestRotators:
    def test_rot_001_half_wave_plate_turns_by_twice_its_angle(self, hwp, share, close):
        # Hecht section 8.7.1.
        for degrees, power in ((0, 0.0), (11.25, 0.14644661), (22.5, 0.5), (45, 1.0)):
            assert share(hwp(degrees * deg) @ H.jones, V.jones) == close(power, 5e-9)

    def test_rot_002_two_half_wave_plates(self, hwp, rotation, close):
        # Azzam & Bashara, Ellipsometry and Polarized Light (1977), section 2.
        assert hwp(1.1) @ hwp(0.4) == close(-rotation(1.4))
