"""The camera model against EMVA Standard 1288, release 4.0 Linear (2021), sections 2 and 6; relations from memory.

Photon-transfer method: frames of even light at many exposure times give the gain K as the slope of variance over mean,
and the quantum efficiency as the slope of the mean over photons, divided by K.
"""

import math

import numpy as np
import pytest
from scipy.optimize import brentq

import fastaxis as fa
from fastaxis.camera.photons import electrons_of, photons_per_joule, signal_to_noise
from fastaxis.units import ms, nm, um

SIDE = 256
SENSOR = fa.Sensor(
    full_well=10_000, quantum_efficiency=0.6, read_noise=2.5, dark_current=0.0, bit_depth=12, offset=60, gain=0.35
)


def even(power):
    """Frames of even light, this power on each pixel behind the analyzer."""
    axis = (np.arange(SIDE) - SIDE / 2 + 0.5) * 3.45 * um
    stokes = np.zeros((4, SIDE, SIDE))
    stokes[:2] = power
    return fa.Exposure(
        stokes=stokes, settings=(fa.camera.settings.as_setting(fa.H),), x=axis, y=axis, pixel=3.45 * um,
        wavelength=632.8 * nm, target="cam", sensor=SENSOR,
    )  # fmt: skip


def test_photons_on_a_pixel():
    """mu_p = A E t lambda/(h c), equations (1) to (3): 1 uW/cm^2, 1 ms, (3.45 um)^2 at 632.8 nm give 379.1647."""
    energy = (3.45e-6) ** 2 * 1e-2 * 1e-3
    assert energy * photons_per_joule(632.8 * nm) == pytest.approx(379.164727, rel=1e-8)
    # The standard prints 50.34 A[um^2] t[ms] E[uW/cm^2] lambda[um], four digits.
    assert energy * photons_per_joule(632.8 * nm) == pytest.approx(50.34 * 3.45**2 * 0.6328, rel=1e-4)


def test_photon_transfer_gives_gain_and_quantum_efficiency():
    """sigma_y^2 - sigma_dark^2 = K (mu_y - mu_dark); mu_y - mu_dark = K eta mu_p."""
    power = 6e-13
    times = np.linspace(0.1, 5, 15) * ms
    photons = power * times * photons_per_joule(632.8 * nm)
    assert 0.6 * photons.max() < 0.7 * SENSOR.full_well  # the standard fits up to 70 % of saturation
    means, variances = [], []
    for k, time in enumerate(times):
        # Two frames: their difference frees the variance of what stands still from frame to frame.
        one, other = (even(power).counts("H", exposure_time=float(time), seed=2 * k + n).counts for n in (0, 1))
        means.append((one.mean(dtype=float) + other.mean(dtype=float)) / 2)
        variances.append(np.var(one.astype(float) - other) / 2)
    dark = [even(0.0).counts("H", exposure_time=1e-4, seed=n).counts.astype(float) for n in (0, 1)]
    means, variances = np.array(means) - dark[0].mean(), np.array(variances) - np.var(dark[0] - dark[1]) / 2
    # A variance of 65536 pixels is good to sqrt(2/65536) = 0.55 %; fifteen of them to a slope good to about 0.3 %.
    assert means @ variances / (means @ means) == pytest.approx(SENSOR.gain, rel=0.012)
    # Means are good to K sqrt(N/65536)/(K N) < 1e-4.
    assert photons @ means / (photons @ photons) / SENSOR.gain == pytest.approx(0.6, rel=5e-4)


def test_noise_in_the_dark():
    """sigma_dark^2 = K^2 sigma_d^2 + sigma_q^2 with sigma_q^2 = 1/12."""
    dark = even(0.0).counts("H", exposure_time=1e-3, seed=11).counts.astype(float)
    expected = 0.35**2 * 2.5**2 + 1 / 12
    # 0.55 % of the estimate; rounding adds 1/12 to exp(-2 pi^2 * 0.77) = 3e-7 for a noise this wide.
    assert dark.var() == pytest.approx(expected, rel=5 * math.sqrt(2 / dark.size))
    assert dark.mean() == pytest.approx(60, abs=5 * math.sqrt(expected / dark.size))


def test_signal_to_noise_threshold_and_dynamic_range():
    """mu_p.min = (sqrt(sigma_d^2 + sigma_q^2/K^2 + 1/4) + 1/2)/eta at SNR 1; SNR_max = sqrt(mu_e.sat)."""
    sensor = fa.Sensor(full_well=10_000, quantum_efficiency=0.6, read_noise=2.5, bit_depth=12, gain=0.1)

    def snr(photons):
        electrons = electrons_of(photons / photons_per_joule(1e-6), sensor, wavelength=1e-6, exposure_time=1.0)
        return float(signal_to_noise(electrons, sensor, 1.0))

    threshold = (math.sqrt(2.5**2 + 100 / 12 + 0.25) + 0.5) / 0.6
    assert threshold == pytest.approx(7.252344, abs=1e-6)
    assert brentq(lambda photons: snr(photons) - 1, 1, 100) == pytest.approx(threshold, rel=1e-9)
    assert snr(1000.0) == pytest.approx(24.202535, rel=1e-7)
    saturation = sensor.full_well / sensor.quantum_efficiency
    assert 20 * math.log10(saturation / threshold) == pytest.approx(67.2274, abs=1e-4)
    # 100 of shot noise alone; 14.6 electrons squared of the sensor's take 0.073 % of it.
    assert snr(saturation) == pytest.approx(100 / math.sqrt(1 + 14.5833 / 1e4), rel=1e-7)


def test_saturation_by_the_counts():
    """Common practice, no source: 12 bits, 0.25 counts an electron and offset 64 are full at 16124 electrons."""
    assert fa.Sensor(full_well=20_000, quantum_efficiency=0.6, gain=0.25, offset=64).most_electrons == 16_124
