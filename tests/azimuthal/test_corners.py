import numpy as np

import fastaxis as fa
from fastaxis.units import mm, nm


def test_the_farthest_place_asked_for_is_lit_like_its_neighbours():
    """Its distance, taken twice, may differ by a rounding; no place may read as dark for that."""
    train = fa.Train(wavelength=532 * nm).along(fa.Laser(waist=1 * mm), fa.QPlate(q=0.5), fa.FreeSpace(1.0, name="gap"))
    (field,) = train.field("gap", engine="azimuthal")
    generator = np.random.default_rng(7)
    for r, phi in zip(generator.uniform(0.1 * mm, 1 * mm, 2000), generator.uniform(0, 2 * np.pi, 2000), strict=True):
        assert np.abs(field.at(np.array([r * np.cos(phi)]), np.array([r * np.sin(phi)]))).max() > 0
