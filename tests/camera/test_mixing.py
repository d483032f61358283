"""Frames as weighted sums of images."""

import numpy as np
import pytest

from fastaxis.camera import mixing
from fastaxis.camera.mixing import mixed


@pytest.mark.parametrize("pixels", [1, 255, 256, 257, 5000])
@pytest.mark.parametrize("alone", [0, 1 << 22])
def test_blocks_and_threads_change_nothing(pixels, alone, monkeypatch):
    monkeypatch.setattr(mixing, "BLOCK", 0)  # the smallest blocks
    monkeypatch.setattr(mixing, "ALONE", alone)
    rng = np.random.default_rng(pixels)
    weights, images = rng.normal(size=(7, 4)), rng.normal(size=(4, pixels))
    # A product of four terms of size 1, summed in any order.
    assert np.allclose(mixed(weights, images), np.maximum(weights @ images, 0), rtol=0, atol=1e-14)


def test_power_has_no_sign():
    assert not mixed(np.array([[0.5, -0.5, 0, 0]]), np.array([[1.0], [1 + 1e-15], [0], [0]])).any()


def test_images_of_single_precision_give_frames_of_it():
    assert mixed(np.ones((2, 4)), np.ones((4, 3), dtype=np.float32)).dtype == np.float32
