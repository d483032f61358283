"""What pictures and Stokes images say: lobes, turning, widths, ellipses, singular points."""

from fastaxis.analysis.ellipse_map import EllipseMap, ellipse_map
from fastaxis.analysis.lobes import Lobes, lobes
from fastaxis.analysis.rings import Rings, rings
from fastaxis.analysis.singular import l_line_radius, polarization_index
from fastaxis.analysis.sphere import sphere_wrapping
from fastaxis.analysis.turning import Turning, turning, turning_rate
from fastaxis.analysis.widths import Widths, fwhm, radial_profile, ring_radius, widths

__all__ = [
    "EllipseMap", "Lobes", "Rings", "Turning", "Widths", "ellipse_map", "fwhm", "l_line_radius", "lobes",
    "polarization_index", "radial_profile", "ring_radius", "rings", "sphere_wrapping", "turning", "turning_rate",
    "widths",
]  # fmt: skip
