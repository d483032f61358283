"""Pictures given by formula, on a raster like a camera's."""

from types import SimpleNamespace

import numpy as np
import pytest


@pytest.fixture
def plane():
    """Coordinates in units of the beam radius w = 1: 81 by 101 pixels of w/15, so that rows and columns differ."""
    x, y = np.arange(-50, 51) / 15, np.arange(-40, 41) / 15
    X, Y = np.meshgrid(x, y)
    return SimpleNamespace(x=x, y=y, X=X, Y=Y, r=np.hypot(X, Y), phi=np.arctan2(Y, X), axes={"x": x, "y": y})
