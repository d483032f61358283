"""Light itself: polarization states, Stokes parameters, transverse modes and sources."""

from fastaxis.light.mixtures import UNPOLARIZED, StateMixture, partially_polarized
from fastaxis.light.modes import FlatTop, Gaussian, HermiteGauss, LaguerreGauss, Mode, Moments, PlaneWave, SampledMode
from fastaxis.light.raster import Raster
from fastaxis.light.states import A, D, H, L, R, State, V, elliptical, from_jones, from_stokes, helicity, linear
from fastaxis.light.stokes import degree_of_polarization, ellipse, stokes

__all__ = [
    "UNPOLARIZED",
    "A",
    "D",
    "FlatTop",
    "Gaussian",
    "H",
    "HermiteGauss",
    "L",
    "LaguerreGauss",
    "Mode",
    "Moments",
    "PlaneWave",
    "R",
    "Raster",
    "SampledMode",
    "State",
    "StateMixture",
    "V",
    "degree_of_polarization",
    "ellipse",
    "elliptical",
    "from_jones",
    "from_stokes",
    "helicity",
    "linear",
    "partially_polarized",
    "stokes",
]
