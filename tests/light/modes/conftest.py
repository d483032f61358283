import numpy as np
import pytest


@pytest.fixture
def wavelength():
    return 632.8e-9


@pytest.fixture
def integral():
    """Integral over the plane by equal steps: converges geometrically for smooth light that ends inside the window."""

    def integrate(function, reach, count=400, centre=(0.0, 0.0)):
        line = (np.arange(count) - (count - 1) / 2) * (2 * reach / count)
        x, y = np.meshgrid(line + centre[0], line + centre[1])
        return np.sum(function(x, y)) * (2 * reach / count) ** 2

    return integrate


@pytest.fixture
def paraxial_residue(wavelength):
    """Size of (2ik d/dz + d2/dx2 + d2/dy2) u over its largest term, for exp(-iwt), by eighth-order differences.

    A wrong sign of the curvature or of the Gouy phase leaves a residue of order 1.
    """
    third = np.array([-1 / 560, 8 / 315, -1 / 5, 8 / 5, -205 / 72, 8 / 5, -1 / 5, 8 / 315, -1 / 560])
    first = np.array([1 / 280, -4 / 105, 1 / 5, -4 / 5, 0, 4 / 5, -1 / 5, 4 / 105, -1 / 280])

    def residue(mode, x, y, step, z_step):
        k = 2 * np.pi / wavelength
        steps = np.arange(-4, 5)
        xx = third @ [mode.amplitude(x + n * step, y, wavelength) for n in steps] / step**2
        yy = third @ [mode.amplitude(x, y + n * step, wavelength) for n in steps] / step**2
        z = first @ [mode.moved(n * z_step).amplitude(x, y, wavelength) for n in steps] / z_step
        return abs(2j * k * z + xx + yy) / max(abs(2 * k * z), abs(xx), abs(yy))

    return residue
