"""Published laws of geometric phases and q-plates, by the parts' matrices.

Several sources name circular light by helicity, s+ = (1, i)/sqrt 2, with S3(s+) = +1. Here R = (1, -i)/sqrt 2 and
S3 = I_R - I_L (the naming of Hecht and of Born & Wolf), so s+ is L and their S3 is minus ours; where a printed S3 is
used the sign is turned explicitly. Section and equation numbers are from memory unless said otherwise.
"""

import cmath
import math
from itertools import pairwise

import numpy as np
import pytest

from fastaxis.elements import PatternedRetarder, QPlate
from fastaxis.light import D, H, L, R, V, linear
from fastaxis.units import deg, mm, nm

WAVELENGTH = 632.8 * nm
PLUS, MINUS = L.jones, R.jones  # by helicity


class TestGeometricPhase:
    @pytest.mark.parametrize("degrees", [0, 5, 17, 22.5, 45, 60])
    def test_geo_001_and_002_phase_shifter(self, degrees, hwp, qwp, close):
        # S. Pancharatnam, Proc. Indian Acad. Sci. A 44, 247 (1956); T. H. Chyba et al., Opt. Lett. 13, 562 (1988).
        theta = degrees * deg
        matrix = qwp(45 * deg) @ hwp(theta) @ qwp(45 * deg)
        assert matrix == close(np.diag([-1j * cmath.exp(-2j * theta), 1j * cmath.exp(2j * theta)]))

    def test_geo_002_table(self, hwp, qwp, close):
        # Derived from GEO-001; Pancharatnam (1956).
        for degrees, phase in ((0, -90), (5, -100), (22.5, -135), (45, -180), (60, 150)):
            first = (qwp(45 * deg) @ hwp(degrees * deg) @ qwp(45 * deg))[0, 0]
            assert first == close(cmath.exp(1j * phase * deg))

    def test_geo_004_cycle_of_projections(self, polarizer, close):
        # M. V. Berry, J. Mod. Opt. 34, 1401 (1987): half the solid angle of an octant.
        def projector(state):
            return np.outer(state, state.conj())

        for circular, phase in ((PLUS, -45), (MINUS, 45)):
            cycle = np.vdot(H.jones, projector(circular) @ polarizer(45 * deg) @ H.jones)
            assert abs(cycle) == close(0.35355339, 5e-9)
            assert cmath.phase(cycle) == close(phase * deg)

    def test_geo_005_rotating_half_wave_plate(self, hwp, close):
        # B. A. Garetz & S. Arnold, Opt. Commun. 31, 1 (1979): s+ leaves with exp(+2i Omega t), that is omega - 2 Omega.
        turns = [cmath.phase(np.vdot(MINUS, hwp(angle) @ PLUS)) for angle in (0.0, 0.1, 0.2)]
        assert [later - earlier for earlier, later in pairwise(turns)] == close([0.2, 0.2])


class TestQPlates:
    # L. Marrucci, C. Manzo, D. Paparo, Phys. Rev. Lett. 96, 163905 (2006), eqs. (1)-(3); they call (1, i) left-circular.
    @pytest.mark.parametrize("q", [0.5, 1, -0.5, 1.5])
    @pytest.mark.parametrize("phi", [0.4, -2.0])
    def test_qpl_001(self, q, phi, jones, close):
        delta, offset = 2.1, 0.3
        matrix = jones(QPlate(q=q, offset=offset, retardance=delta), phi=phi)
        kept, made = math.cos(delta / 2), -1j * math.sin(delta / 2)
        turned = cmath.exp(2j * (q * phi + offset))
        assert matrix @ PLUS == close(kept * PLUS + made * turned * MINUS)
        assert matrix @ MINUS == close(kept * MINUS + made / turned * PLUS)

    def test_qpl_002_conversion(self, jones, share, close):
        # S. Slussarenko et al., Opt. Express 19, 4085 (2011).
        degrees = [0, 45, 60, 90, 120, 135, 150, 170, 180]
        printed = [0.0, 0.14644661, 0.25, 0.5, 0.75, 0.85355339, 0.93301270, 0.99240388, 1.0]
        for delta, converted in zip(degrees, printed, strict=True):
            plate = QPlate(q=0.5, retardance=delta * deg)
            assert share(jones(plate, phi=0.9) @ PLUS, MINUS) == close(converted, 5e-9)
            assert plate.unconverted(WAVELENGTH) == close(1 - converted, 5e-9)

    @pytest.mark.parametrize("phi", [0.0, 0.8, 2.5, -1.3])
    def test_qpl_003_vector_beams(self, phi, jones, share, close):
        # Q. Zhan, Adv. Opt. Photon. 1, 1 (2009); M. Stalder & M. Schadt, Opt. Lett. 21, 1948 (1996).
        c, s = math.cos(phi), math.sin(phi)
        plate = jones(QPlate(q=0.5), phi=phi)
        assert plate @ H.jones == close(-1j * np.array([c, s]))
        assert plate @ V.jones == close(-1j * np.array([s, -c]))
        assert share(plate @ D.jones, linear(phi - 45 * deg).jones) == close(1)
        assert jones(QPlate(q=0.5, offset=45 * deg), phi=phi) @ H.jones == close(-1j * np.array([-s, c]))
        assert jones(QPlate(q=-0.5), phi=phi) @ H.jones == close(-1j * np.array([c, -s]))

    @pytest.mark.parametrize(("q", "lobes"), [(0.5, 2), (1, 4), (1.5, 6), (2, 8), (-0.5, 2)])
    def test_qpl_004_lobes(self, q, lobes, jones, polarizer, close):
        # Zhan (2009), section 2. Lobes are counted as the falls through half of the maximum.
        beta, offset = 0.35, 0.2
        phi = np.linspace(0, 2 * np.pi, 721)
        plate = QPlate(q=q, offset=offset)
        power = np.array([np.linalg.norm(polarizer(beta) @ jones(plate, phi=p) @ H.jones) ** 2 for p in phi])
        assert power == close(np.cos(2 * q * phi + 2 * offset - beta) ** 2)
        assert np.sum((power[:-1] >= 0.5) & (power[1:] < 0.5)) == lobes

    def test_qpl_007_two_in_series(self, jones, hwp, rotation, close):
        # Marrucci et al. (2006), with ROT-002.
        one, two = QPlate(q=1, offset=0.5), QPlate(q=1, offset=0.1)
        for phi in (0.3, 1.9):
            assert jones(one, phi=phi) @ jones(two, phi=phi) == close(-rotation(0.8))
            half = QPlate(q=0.5)
            out = jones(half, phi=phi) @ hwp(0) @ jones(half, phi=phi) @ PLUS
            assert out == close((-1j) ** 3 * cmath.exp(2j * phi) * MINUS)

    def test_pbl_001_geometric_phase_lens(self, jones, close):
        # E. Hasman, V. Kleiner, G. Biener, A. Niv, Appl. Phys. Lett. 82, 328 (2003).
        focal, k = 0.2, 2 * math.pi / WAVELENGTH
        lens = PatternedRetarder(fast=lambda x, y: -k * (x**2 + y**2) / (4 * focal))
        for x, y in ((0.3 * mm, 0.0), (0.2 * mm, -0.5 * mm)):
            phase = k * (x * x + y * y) / (2 * focal)
            matrix = jones(lens, x=np.array(x), y=np.array(y))
            # The phase is some radians: its rounding, and that of its cosine, stay below 1e-14.
            assert matrix @ PLUS == close(-1j * cmath.exp(-1j * phase) * MINUS)
            assert matrix @ MINUS == close(-1j * cmath.exp(1j * phase) * PLUS)
