"""Pictures: analyzer settings, exposures, Stokes reconstruction and files."""

from fastaxis.camera.bundle import load, save
from fastaxis.camera.counts import Counts
from fastaxis.camera.exposing import expose
from fastaxis.camera.exposure import Exposure, Row
from fastaxis.camera.pictures import Pictures, read_pictures, save_pngs, save_tiff
from fastaxis.camera.reconstruct import PlateHarmonics, Reconstruction, condition_number, plate_harmonics, reconstruct
from fastaxis.camera.sets import SIX_STATES, four_frames, rotating_plate
from fastaxis.camera.settings import Setting, no_analyzer, plate_then_polarizer, polarizer_at

__all__ = [
    "SIX_STATES", "Counts", "Exposure", "Pictures", "PlateHarmonics", "Reconstruction", "Row", "Setting",
    "condition_number", "expose", "four_frames", "load", "no_analyzer", "plate_harmonics", "plate_then_polarizer",
    "polarizer_at", "read_pictures", "reconstruct", "rotating_plate", "save", "save_pngs", "save_tiff",
]  # fmt: skip
