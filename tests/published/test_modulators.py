"""Published laws of electro-optic modulators, by the matrices of the parts.

A. Yariv and P. Yeh, Photonics, 6th ed. (2007), chapter 9; from memory.
"""

import math

import numpy as np
import pytest
from scipy.special import jv

from fastaxis.elements import PhaseModulator, Polarizer, QuarterWavePlate
from fastaxis.light import H, linear
from fastaxis.maths import NUMBERS
from fastaxis.units import deg

ROUNDING = 1e-14  # products of a few 2x2 matrices with entries up to 1


def jones(*parts):
    out = np.eye(2, dtype=complex)
    for part in parts:
        for law in part.laws(633e-9):
            out = np.array(law.linear(NUMBERS), dtype=complex) @ out
    return out


def passed(*parts):
    out = jones(*parts) @ linear(45 * deg).jones
    return float(np.vdot(out, out).real)


@pytest.mark.parametrize("gamma", [0.2, 1.0, 2.5, math.pi])
def test_amplitude_modulator_between_crossed_polarizers(gamma):
    """I_out/I_in = sin^2(Gamma/2), full transmission at the half-wave voltage."""
    cell, analyzer = PhaseModulator(axis=0, phase=gamma), Polarizer(axis=-45 * deg)
    assert passed(cell, analyzer) == pytest.approx(math.sin(gamma / 2) ** 2, abs=ROUNDING)


@pytest.mark.parametrize("gamma", [-0.4, -0.05, 0.05, 0.4])
def test_a_quarter_wave_bias_makes_it_linear(gamma):
    """I_out/I_in = (1 + sin Gamma)/2 with a quarter-wave plate whose slow axis is along the modulated component."""
    bias = QuarterWavePlate(slow=0)
    cell, analyzer = PhaseModulator(axis=0, phase=gamma), Polarizer(axis=-45 * deg)
    assert passed(bias, cell, analyzer) == pytest.approx((1 + math.sin(gamma)) / 2, abs=ROUNDING)


@pytest.mark.parametrize("depth", [0.5, 1.435, 2.405])
def test_sidebands_of_a_phase_modulator_are_bessel_functions(depth):
    """exp(i m sin x) = sum J_n(m) exp(i n x): the power of the n-th sideband is J_n(m)^2, the carrier gone at 2.405."""
    steps = 64
    swing = depth * np.sin(2 * math.pi * np.arange(steps) / steps)
    field = [(jones(PhaseModulator(axis=0, phase=float(phase))) @ H.jones)[0] for phase in swing]
    powers = np.abs(np.fft.fft(field) / steps) ** 2
    # J_n(2.4) with n beyond 32, which 64 samples fold back, is below 1e-30.
    assert powers[:5] == pytest.approx([jv(n, depth) ** 2 for n in range(5)], abs=ROUNDING)
    if depth == 2.405:
        assert powers[0] < 1e-6  # the zero of J_0 is 2.404826: J_1(2.4)^2 (1.7e-4)^2 = 8e-9
