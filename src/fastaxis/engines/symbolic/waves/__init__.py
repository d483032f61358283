"""Transverse waves with a closed form: the modes of the Gaussian family, and what spiral plates make of them."""

from fastaxis.engines.symbolic.waves.base import Place, Section, Wave
from fastaxis.engines.symbolic.waves.integral import IntegralWave
from fastaxis.engines.symbolic.waves.kummer import TwistedWave
from fastaxis.engines.symbolic.waves.modes import ModeWave
from fastaxis.engines.symbolic.waves.still import StillWave

__all__ = ["IntegralWave", "ModeWave", "Place", "Section", "StillWave", "TwistedWave", "Wave"]
