"""Transverse modes of unit power: a file a mode."""

from fastaxis.light.modes.base import Mode, Moments
from fastaxis.light.modes.flat_top import FlatTop
from fastaxis.light.modes.gaussian import Gaussian
from fastaxis.light.modes.hermite_gauss import HermiteGauss
from fastaxis.light.modes.laguerre_gauss import LaguerreGauss
from fastaxis.light.modes.plane_wave import PlaneWave
from fastaxis.light.modes.sampled import SampledMode

__all__ = ["FlatTop", "Gaussian", "HermiteGauss", "LaguerreGauss", "Mode", "Moments", "PlaneWave", "SampledMode"]
