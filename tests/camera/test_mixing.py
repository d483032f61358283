"""Frames as weighted sums of images."""

import numpy as np
import pytest

from fastaxis.camera import mixing
from fastaxis.camera.mixing import mixed


@pytest.mark.parametrize("pixels", [1, 255, 256, 257, 5000])
@pytest.mark.parametrize("alone", [0, 1 << 22])
def test_blocks_and_threads_change_nothing(pixels, alone, monkeypatch):
    monkeypatch.setattr(mixing, "PIXELS", 256)
    monkeypatch.setattr(mixing, "FRAMES", 3)
    monkeypatch.setattr(mixing, "ALONE", alone)
    rng = np.random.default_rng(pixels)
    weights, images = rng.normal(size=(7, 4)), rng.normal(size=(4, pixels))
    # A product of four terms of size 1, summed in any order.
    assert np.allclose(mixed(weights, images), np.maximum(weights @ images, 0), rtol=0, atol=1e-14)


@pytest.mark.parametrize("degree", [0.0, 0.5, 1 - 1e-13, 1.0])
@pytest.mark.parametrize("kind", [np.float64, np.float32])
def test_light_of_any_degree_of_polarization_gives_no_negative_power(degree, kind):
    rng = np.random.default_rng(7)
    axes = rng.normal(size=(2, 3, 2000))
    states, settings = axes / np.linalg.norm(axes, axis=1, keepdims=True)
    settings[:, ::2] = -states[:, ::2]  # crossed
    images = rng.uniform(size=2000) * np.concatenate([np.ones((1, 2000)), degree * states])
    weights = np.concatenate([np.ones((1, 2000)), settings])[:, ::20].T / 2
    images, weights = images.astype(kind), weights.astype(kind)
    frames = mixed(weights, images)
    assert (frames >= 0).all()
    # Four products, each below 1/2.
    assert np.allclose(frames, np.maximum(weights @ images, 0), rtol=0, atol=4 * np.finfo(kind).eps)


def test_power_has_no_sign():
    assert not mixed(np.array([[0.5, -0.5, 0, 0]]), np.array([[1.0], [1 + 1e-15], [0], [0]])).any()


def test_images_of_single_precision_give_frames_of_it():
    assert mixed(np.ones((2, 4)), np.ones((4, 3), dtype=np.float32)).dtype == np.float32
