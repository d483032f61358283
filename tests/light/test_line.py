"""Spectral lines: their degree of coherence is the Fourier transform of their spectrum."""

import math

import numpy as np
import pytest
from scipy.integrate import quad

import fastaxis as fa
from fastaxis.light.line import SPEED_OF_LIGHT
from fastaxis.units import mm, nm

SIGMA = 1 / (2 * math.sqrt(2 * math.log(2)))


def test_gaussian_line_is_the_transform_of_its_spectrum():
    line = fa.GaussianLine(fwhm=1e9)
    for tau in (0.2e-9, 0.7e-9):
        spectrum = lambda f: math.exp(-((f / SIGMA) ** 2) / 2) / SIGMA / math.sqrt(2 * math.pi)
        expected, _ = quad(lambda f: spectrum(f) * math.cos(2 * math.pi * f * 1e9 * tau), -8, 8, epsabs=1e-13)
        assert line.degree(SPEED_OF_LIGHT * tau) == pytest.approx(expected, abs=1e-12)


def test_lorentzian_line_is_the_transform_of_its_spectrum():
    line = fa.LorentzianLine(fwhm=1e9)
    for tau in (0.2e-9, -0.7e-9):
        half = quad(
            lambda f: 0.5 / math.pi / (f * f + 0.25), 0, math.inf, weight="cos", wvar=2 * math.pi * abs(tau) * 1e9
        )
        assert line.degree(SPEED_OF_LIGHT * tau) == pytest.approx(2 * half[0], abs=1e-8)


@pytest.mark.parametrize("kind", [fa.GaussianLine, fa.LorentzianLine])
def test_fringes_fall_to_1_over_e_at_the_coherence_length(kind):
    line = kind(coherence_length=30 * mm)
    assert line.degree(30 * mm) == pytest.approx(math.exp(-1))
    assert kind(fwhm=SPEED_OF_LIGHT).degree(kind(fwhm=SPEED_OF_LIGHT).length) == pytest.approx(math.exp(-1))
    assert line.degree(0.0) == 1


def test_an_even_comb_repeats_with_its_spacing():
    comb = fa.Comb(spacing=SPEED_OF_LIGHT, weights=(0.25, 0.5, 0.25))
    assert comb.degree(1.0) == pytest.approx(1)
    assert comb.degree(0.5) == pytest.approx(0)
    assert comb.degree(0.1) == pytest.approx(math.cos(math.pi * 0.1) ** 2)


def test_an_uneven_comb_has_a_complex_degree():
    comb = fa.Comb(spacing=SPEED_OF_LIGHT, weights=(0.8, 0.2), tooth=fa.GaussianLine(coherence_length=1.0))
    expected = (0.8 * np.exp(-0.2j * np.pi) + 0.2 * np.exp(0.2j * np.pi)) * math.exp(-0.04)
    assert comb.degree(0.2) == pytest.approx(expected)


@pytest.mark.parametrize(
    ("make", "says"),
    [
        (lambda: fa.GaussianLine(), "neither given"),
        (lambda: fa.LorentzianLine(fwhm=1.0, coherence_length=1.0), "both given"),
        (lambda: fa.GaussianLine(coherence_length=0.0), "coherence_length = 0.0; a line has a width above zero"),
        (lambda: fa.GaussianLine(fwhm=2e-9), "GaussianLine: fwhm = 2e-09; the width of a line is a frequency in hertz"),
        (lambda: fa.LorentzianLine(fwhm=2e-9), "LorentzianLine: fwhm = 2e-09; the width of a line is a frequency"),
        (lambda: fa.Comb(spacing=2e-9, weights=(1,)), "Comb: spacing = 2e-09; the spacing of a comb is a frequency"),
        (lambda: fa.Comb(spacing=0.0, weights=(1.0,)), "the teeth of a comb stand apart"),
        (lambda: fa.Comb(spacing=1e9, weights=(0.5, 0.6)), "add up to 1"),
        (lambda: fa.Laser(waist=1 * mm, line=0.2), "line is the shape of a spectral line"),
    ],
)
def test_refusals(make, says):
    with pytest.raises(fa.ParameterError, match=says):
        make()


def test_a_line_survives_the_text_form():
    line = fa.Comb(spacing=5e8, weights=(0.25, 0.75), tooth=fa.LorentzianLine(fwhm=1e6))
    train = fa.Train(wavelength=633e-9).along(fa.Laser(waist=1 * mm, line=line, name="laser"))
    assert fa.Train.from_text(train.to_text()).elements["laser"].line == line


def test_the_fix_of_a_width_in_nanometres_is_that_width_in_hertz():
    """c 2 nm/(532 nm)^2 = 2.12 THz; over a path of 100 um that leaves exp(-(pi fwhm d/c)^2/(4 ln 2))."""
    with pytest.raises(fa.ParameterError) as refusal:
        fa.GaussianLine(fwhm=2 * nm)
    line = fa.GaussianLine(**eval(f"dict({refusal.value.fix})", {"nm": nm}))
    assert line.fwhm == pytest.approx(2.1185e12, rel=1e-4)
    # The same in wavelengths: fwhm d/c is 2 nm * 100 um/(532 nm)^2 = 0.70665 periods of beat.
    assert line.degree(1e-4) == pytest.approx(math.exp(-((math.pi * 0.70665) ** 2) / (4 * math.log(2))), rel=1e-4)
