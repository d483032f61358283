import numpy as np
import pytest

from fastaxis.light import Raster


@pytest.mark.parametrize("count", [1, 4, 5])
def test_pixels_lie_evenly_about_the_centre(count):
    raster = Raster(2.0, (count, 3), centre=(10.0, -1.0))
    np.testing.assert_array_equal(raster.x, [8, 10, 12])
    assert raster.y.shape == (count,)
    assert raster.y.mean() == -1.0
    np.testing.assert_array_equal(np.diff(raster.y), 2.0)
