"""Every part of a bench: one physical idea a file, each a frozen dataclass that states its laws."""

from fastaxis.elements.apertures import Annulus, Aperture, KnifeEdge, Obstacle, RectangularAperture, Slit
from fastaxis.elements.base import Element, ThroughElement
from fastaxis.elements.beam_splitter import BeamSplitter
from fastaxis.elements.camera import ORIENTATIONS, Camera
from fastaxis.elements.detector import BeamDump, Detector
from fastaxis.elements.dove_prism import DovePrism
from fastaxis.elements.free_space import FreeSpace
from fastaxis.elements.k_mirror import KMirror
from fastaxis.elements.laser import Laser
from fastaxis.elements.lens import Lens
from fastaxis.elements.mask import Mask
from fastaxis.elements.metal_mirror import MetalMirror
from fastaxis.elements.mirror import Mirror
from fastaxis.elements.neutral_density import NeutralDensity
from fastaxis.elements.patterned_polarizer import PatternedPolarizer
from fastaxis.elements.patterned_retarder import PatternedRetarder
from fastaxis.elements.phase_modulator import PhaseModulator
from fastaxis.elements.phase_shift import PhaseShift
from fastaxis.elements.pick_off import PickOff
from fastaxis.elements.polarizer import Polarizer
from fastaxis.elements.polarizing_beam_splitter import PolarizingBeamSplitter
from fastaxis.elements.q_plate import QPlate
from fastaxis.elements.retarder import HalfWavePlate, QuarterWavePlate, Retarder
from fastaxis.elements.rhomb import Rhomb
from fastaxis.elements.rotator import FaradayRotator, Rotator
from fastaxis.elements.sensor import Sensor
from fastaxis.elements.spiral_plate import SpiralPlate
from fastaxis.elements.wedge import Wedge
from fastaxis.elements.window import Window

__all__ = [
    "ORIENTATIONS", "Annulus", "Aperture", "BeamDump", "BeamSplitter", "Camera", "Detector", "DovePrism",
    "Element", "FaradayRotator", "FreeSpace", "HalfWavePlate", "KMirror", "KnifeEdge", "Laser", "Lens",
    "Mask", "MetalMirror", "Mirror", "NeutralDensity", "Obstacle", "PatternedPolarizer", "PatternedRetarder",
    "PhaseModulator", "PhaseShift", "PickOff", "Polarizer", "PolarizingBeamSplitter", "QPlate", "QuarterWavePlate",
    "RectangularAperture", "Retarder", "Rhomb", "Rotator", "Sensor", "Slit", "SpiralPlate", "ThroughElement", "Wedge",
    "Window",
]  # fmt: skip
