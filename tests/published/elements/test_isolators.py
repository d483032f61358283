"""Published laws of isolators, there and back, and of a splitter, by the parts' matrices.

Section and equation numbers are from memory unless said otherwise.
"""

import cmath
import math

import numpy as np
import pytest

from fastaxis.elements import (
    BeamSplitter,
    FaradayRotator,
    Mirror,
    Polarizer,
    PolarizingBeamSplitter,
    QuarterWavePlate,
    Retarder,
    Rotator,
)
from fastaxis.light import D, H, R, V, linear
from fastaxis.units import deg


class TestIsolators:
    @pytest.mark.parametrize(("theta", "h"), [(45, 0.0), (30, 0.25), (22.5, 0.5), (0, 1.0), (40, 0.03015369)])
    def test_iso_001_double_pass_of_a_quarter_wave_plate(self, theta, h, there_and_back, share, close):
        # Hecht section 8.7; Saleh & Teich, Fundamentals of Photonics, 3rd ed., section 6.6.
        out = there_and_back(QuarterWavePlate(fast=theta * deg)) @ H.jones
        assert share(out, H.jones) == close(h, 5e-9)
        assert share(out, V.jones) == close(1 - h, 5e-9)

    def test_iso_001_is_a_half_wave_plate_in_the_frame_that_follows_the_beam(self, hwp, there_and_back, close):
        assert there_and_back(QuarterWavePlate(fast=0.3)) == close(np.diag([1, -1]) @ hwp(0.3))

    def test_iso_002_forgetting_the_frame_would_give_1(self, jones, qwp, there_and_back, share, close):
        # Derived from ISO-001. The plate met at +45 on the way back too is the usual mistake.
        mirror = jones(Mirror(), ("front", "front"))
        assert share(qwp(45 * deg) @ mirror @ qwp(45 * deg) @ H.jones, H.jones) == close(1)
        assert share(there_and_back(QuarterWavePlate(fast=45 * deg)) @ H.jones, H.jones) == close(0)

    @pytest.mark.parametrize(("delta", "leak"), [(100, 0.0301536896), (89, 3.0459e-4), (91, 3.0459e-4)])
    def test_iso_003_imperfect_plate(self, delta, leak, there_and_back, share, close):
        # Common practice, no source: cos^2(delta).
        out = there_and_back(Retarder(fast=45 * deg, retardance=delta * deg)) @ H.jones
        assert share(out, H.jones) == close(leak, 5e-9)

    def test_iso_polarizing_splitter_sends_the_return_aside(self, jones, there_and_back, close):
        # Saleh & Teich section 6.6: laser, splitter, plate at 45 degrees, mirror.
        cube = PolarizingBeamSplitter()
        out = there_and_back(QuarterWavePlate(fast=45 * deg)) @ jones(cube, ("front", "transmitted")) @ H.jones
        assert np.linalg.norm(jones(cube, ("transmitted", "front")) @ out) ** 2 == close(0)
        assert np.linalg.norm(jones(cube, ("transmitted", "side")) @ out) ** 2 == close(1)

    def test_far_001_faraday_adds_and_optical_activity_cancels(self, there_and_back, share, close):
        # Hecht section 8.11.2; Saleh & Teich sections 6.4B, 6.6D; M. Faraday 1845.
        out = there_and_back(FaradayRotator(angle=23 * deg)) @ H.jones
        assert share(out, V.jones) == close(0.5174497484, 5e-11)
        assert share(there_and_back(Rotator(angle=23 * deg)) @ H.jones, V.jones) == close(0)
        assert share(there_and_back(FaradayRotator(angle=45 * deg)) @ H.jones, V.jones) == close(1)

    def test_far_002_orthogonal_return(self, there_and_back, close):
        # M. Martinelli, Opt. Commun. 72, 341 (1989): any reciprocal path before a 45 degree rotator and a mirror.
        path = (Retarder(fast=0.3, retardance=1.9), Rotator(angle=0.7), Retarder(fast=-1.0, retardance=0.8))
        for state in (H, D, R, linear(0.2)):
            sent = state.jones
            back = there_and_back(*path, FaradayRotator(angle=45 * deg)) @ sent
            # The bilinear product is taken on fixed axes; the returning beam's x is reversed.
            assert (np.diag([-1, 1]) @ back) @ sent == close(0)

    def test_cmp_002_isolator_with_a_wrong_rotator(self, jones, close):
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


class TestBeamSplitter:
    @pytest.mark.parametrize("reflectance", [0.5, 0.1, 0.45])
    def test_bsp_001_symmetric_lossless(self, reflectance, jones, close):
        # V. Degiorgio, Am. J. Phys. 48, 81 (1980); A. Zeilinger, Am. J. Phys. 49, 882 (1981).
        cube = BeamSplitter(reflectance=reflectance)
        t = jones(cube, ("front", "transmitted"))[0, 0]
        r = jones(cube, ("front", "reflected"))[0, 0]
        assert np.array([[t, r], [r, t]]) @ np.array([[t, r], [r, t]]).conj().T == close(np.eye(2))
        assert abs(2 * cmath.phase(r) - 2 * cmath.phase(t)) == close(math.pi)
