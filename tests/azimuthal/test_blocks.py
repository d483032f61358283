import numpy as np
import pytest

from fastaxis.engines.azimuthal.blocks import MOST, blocks_along, collected, lines_across

PITCH = 0.1


def places(count):
    return (np.arange(count) - (count - 1) / 2) * PITCH


@pytest.mark.parametrize("count", [1, 2, 63, 64, 65, 300])
def test_means_of_a_wave_are_exact(count):
    """The mean of cos(k x) over a pixel is cos(k x) sinc(k pitch/2)."""
    k, x = 3.0, places(count)
    blocks = blocks_along(lambda p: np.cos(k * p + 0.3), x, PITCH, 1.0)
    assert [b.pixels.start for b in blocks[1:]] == [b.pixels.stop for b in blocks[:-1]]
    assert (blocks[0].pixels.start, blocks[-1].pixels.stop) == (0, count)
    image = np.empty((1, count, count))
    collected(lambda x, y: np.cos(k * x + 0.3)[None, None] * np.ones((1, len(y), 1)), blocks, blocks, 2.0, image)
    exact = 2 * np.cos(k * x + 0.3) * np.sinc(k * PITCH / 2 / np.pi)
    # Settled to 3e-12 of the peak, which is 2 here.
    assert abs(image[0] - exact).max() < 6e-12


def test_finer_fringes_make_smaller_blocks():
    x = places(256)
    widths = [
        max(b.pixels.stop - b.pixels.start for b in blocks_along(lambda p: np.cos(k * p), x, PITCH, 1.0))
        for k in (1.0, 20.0, 100.0)
    ]
    assert widths[0] > widths[1] > widths[2]
    assert all(len(b.nodes) <= MOST for b in blocks_along(lambda p: np.cos(100.0 * p), x, PITCH, 1.0))


def test_an_edge_is_no_polynomial():
    assert blocks_along(lambda p: (p > 0.123) * 1.0, places(64), PITCH, 1.0) is None


def test_rows_and_columns_keep_their_places():
    x, y = places(5), places(3) + 1
    row, column = (blocks_along(lambda p: p, side, PITCH, 1.0) for side in (y, x))
    image = np.empty((2, 3, 5))
    collected(lambda x, y: np.stack([x + 0 * y[:, None], 0 * x + y[:, None]]), row, column, 1.0, image)
    assert np.allclose(image[0], x + 0 * y[:, None], atol=1e-14)
    assert np.allclose(image[1], 0 * x + y[:, None], atol=1e-14)


def test_lines_reach_from_the_axis_to_the_corner():
    lines = lines_across(places(64) + 0.5)
    assert abs(lines).min() == pytest.approx(abs(places(64) + 0.5).min())
    assert abs(lines).max() == pytest.approx(abs(places(64) + 0.5).max())
