"""Integrals over pixels from the samples near them."""

import numpy as np
import pytest

from fastaxis.engines.grid.kernel import blocks, reach_for

COUNT, PITCH = 256, 0.7


def dense(found, pixels):
    matrix = np.zeros((pixels, COUNT))
    for block in found:
        for row, values in zip(range(block.pixels.start, block.pixels.stop), block.matrix, strict=True):
            np.add.at(matrix[row], np.arange(block.first, block.last) % COUNT, values)
    return matrix


@pytest.mark.parametrize("spare", [1.25, 1.5, 2.0, 5.0])
@pytest.mark.parametrize(
    ("pixels", "pixel", "middle"), [(50, 0.3, 3.3), (100, 0.7, 0.0), (40, 7.0, 10.0), (1, 1e4, 0.0)]
)
def test_near_samples_give_the_integral_of_the_curve_through_all(integral_matrix, spare, pixels, pixel, middle):
    rng = np.random.default_rng(0)
    orders = np.arange(1, int(COUNT / 2 / spare))
    places = (np.arange(COUNT) - (COUNT - 1) / 2) / COUNT
    curve = np.cos(2 * np.pi * np.outer(places, orders) + 0.3) @ rng.normal(size=orders.size)
    found = blocks(count=COUNT, pitch=PITCH, parts=1, reach=reach_for(spare), pixels=pixels, pixel=pixel, middle=middle)
    edges = (np.arange(pixels + 1) - pixels / 2) * pixel + middle
    right = integral_matrix(edges, COUNT, PITCH) @ curve
    # The kernel's exp(-31) = 2e-14 and differences of numbers of order one sample, rounded.
    assert np.allclose(dense(found, pixels) @ curve, right, rtol=0, atol=1e-13 * abs(curve).max() * max(PITCH, pixel))


def test_pixels_beyond_the_window_collect_nothing():
    (block,) = blocks(count=COUNT, pitch=PITCH, parts=2, reach=20, pixels=3, pixel=1.0, middle=1000.0)
    assert not block.matrix.any()


def test_parts_of_a_block_share_its_samples():
    (block,) = blocks(count=COUNT, pitch=PITCH, parts=3, reach=30, pixels=5, pixel=1.0, middle=0.2)
    parts = [block.every(3, part, "f4") for part in range(3)]
    assert {part.matrix.shape[1] * 3 for part in parts} == {block.last - block.first}
    assert all(part.first * 3 == block.first and part.matrix.dtype == np.float32 for part in parts)
    assert np.allclose(sum(part.matrix.sum(axis=1) for part in parts), 1.0, atol=1e-6)  # a constant; single precision


def test_a_kernel_needs_room_to_fall_off():
    assert reach_for(1.25) > reach_for(1.5) > reach_for(5.0) > 10
