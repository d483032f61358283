"""Errors are worked out when somebody asks for them, once."""

from fastaxis.elements import FreeSpace, QPlate
from fastaxis.engines.azimuthal import travelling
from fastaxis.engines.memory import forget_light
from fastaxis.light import Gaussian, Raster
from fastaxis.units import mm, um


def test_a_picture_asks_for_no_estimate(arrive, monkeypatch):
    forget_light()
    asked, share = [], travelling.share_of_error
    monkeypatch.setattr(travelling, "share_of_error", lambda *which: asked.append(which) or share(*which))
    field = arrive(Gaussian(waist=0.5 * mm), QPlate(q=0.5), FreeSpace(0.3))
    field.stokes_on(Raster(50 * um, (32, 32)))
    assert not asked
    first = field.error(1 * mm)
    assert len(asked) == 1
    # 1e-13 of what panels leave unsettled, and ten times what a finer integral differs by.
    assert 1e-13 <= first < 1e-11
    assert field.error(1 * mm) == first
    assert len(asked) == 1
