"""Exposures whose Stokes images are known in closed form, made without a train."""

import numpy as np
import pytest

from fastaxis.camera.exposure import Exposure
from fastaxis.camera.sets import SIX_STATES
from fastaxis.camera.settings import as_settings
from fastaxis.light.raster import Raster


def poincare_shots(settings=SIX_STATES, shape=(96, 128), pitch=25e-6, waist=0.6e-3, centre=(0.2e-3, 0.0), power=4e-3):
    """E_L = LG00, E_R = LG01 with charge +1, equal powers: S3 > 0 (R) outside r = waist/sqrt2."""
    raster = Raster(pitch, shape)
    x, y = np.meshgrid(raster.x - centre[0], raster.y - centre[1])
    ring = np.sqrt(2) * (x + 1j * y) / waist
    left = np.sqrt(2 / np.pi) / waist * np.exp(-(x**2 + y**2) / waist**2) * np.sqrt(power / 2)
    right = ring * left
    cross = left.conj() * right
    stokes = [abs(left) ** 2 + abs(right) ** 2, 2 * cross.real, 2 * cross.imag, abs(right) ** 2 - abs(left) ** 2]
    return exposure(np.stack(stokes) * pitch**2, raster, settings)


def exposure(stokes, raster, settings=SIX_STATES):
    return Exposure(
        stokes=stokes,
        settings=as_settings(settings),
        x=raster.x,
        y=raster.y,
        pixel=raster.pitch,
        wavelength=532e-9,
        name="Saltpan",
        target="cam",
    )


@pytest.fixture
def six_shots():
    return poincare_shots()


@pytest.fixture(name="poincare_shots")
def _poincare_shots():
    return poincare_shots


@pytest.fixture(name="exposure")
def _exposure():
    return exposure


def _shown_texts(figure):
    figure.canvas.draw()
    texts = [figure._suptitle, *figure.texts]
    for axes in figure.axes:
        texts += [*axes.texts, axes.title]
        if axes.axison:
            texts += [axes.xaxis.label, axes.yaxis.label]
            for axis in (axes.xaxis, axes.yaxis):
                low, high = sorted(axis.get_view_interval())
                ticks = [tick for tick in axis.get_major_ticks() if low <= tick.get_loc() <= high]
                texts += [label for tick in ticks for label in (tick.label1, tick.label2) if label.get_visible()]
    return [text for text in dict.fromkeys(texts) if text is not None and text.get_text()]


@pytest.fixture
def assert_nothing_collides():
    """All texts of a figure lie within it, and none on another."""

    def check(figure):
        boxes = [(text.get_text(), text.get_window_extent()) for text in _shown_texts(figure)]
        assert len(boxes) > 2
        for text, box in boxes:
            inside = box.x0 >= 0 and box.y0 >= 0 and box.x1 <= figure.bbox.x1 and box.y1 <= figure.bbox.y1
            assert inside, f"{text!r} runs out of the figure"
        for k, (text, box) in enumerate(boxes):
            for other, against in boxes[k + 1 :]:
                # Boxes that share less than half a pixel are apart on paper.
                over_x = min(box.x1, against.x1) - max(box.x0, against.x0)
                over_y = min(box.y1, against.y1) - max(box.y0, against.y0)
                assert min(over_x, over_y) < 0.5, f"{text!r} lies on {other!r}"

    return check
