"""Light itself: polarization states, Stokes parameters, transverse modes and sources."""

from fastaxis.light.line import MONOCHROMATIC, Comb, GaussianLine, Line, LorentzianLine, Monochromatic
from fastaxis.light.making_states import elliptical, from_jones, from_stokes, helicity, linear
from fastaxis.light.mixtures import UNPOLARIZED, StateMixture, partially_polarized
from fastaxis.light.modes import FlatTop, Gaussian, HermiteGauss, LaguerreGauss, Mode, Moments, PlaneWave, SampledMode
from fastaxis.light.mueller import muellers
from fastaxis.light.raster import Raster
from fastaxis.light.source import Component, Source, coherent_source, make_source
from fastaxis.light.states import A, D, H, L, R, State, V
from fastaxis.light.stokes import degree_of_polarization, ellipse, stokes
from fastaxis.light.terms import Beam, Term

__all__ = [
    "MONOCHROMATIC",
    "UNPOLARIZED",
    "A",
    "Beam",
    "Comb",
    "Component",
    "D",
    "FlatTop",
    "Gaussian",
    "GaussianLine",
    "H",
    "HermiteGauss",
    "L",
    "LaguerreGauss",
    "Line",
    "LorentzianLine",
    "Mode",
    "Moments",
    "Monochromatic",
    "PlaneWave",
    "R",
    "Raster",
    "SampledMode",
    "Source",
    "State",
    "StateMixture",
    "Term",
    "V",
    "coherent_source",
    "degree_of_polarization",
    "ellipse",
    "elliptical",
    "from_jones",
    "from_stokes",
    "helicity",
    "linear",
    "make_source",
    "muellers",
    "partially_polarized",
    "stokes",
]
