"""Equal contents have equal digests, and nothing else has."""

from dataclasses import dataclass, replace
from fractions import Fraction

import numpy as np
import pytest

from fastaxis.engines import content
from fastaxis.engines.content import LARGE, content_of, large_arrays_once
from fastaxis.laws import Disc, TravelLaw
from fastaxis.light import Gaussian, H, SampledMode
from fastaxis.maths import Pattern

CELLS = np.arange(6.0).reshape(2, 3)

UNLIKE = [
    1, 1.0, True, 1 + 0j, "1", b"1", None, Fraction(1), np.float64(1), np.float32(1),
    0.0, -0.0, np.nextafter(1.0, 2.0).item(),
    (), [], ((),), ("a", "b"), ("ab",), (("a",), "b"), ("a", ("b",)),
    CELLS, CELLS.T, CELLS.reshape(3, 2), CELLS.astype(np.float32), CELLS + 1e-15, CELLS[:, ::-1], CELLS[:0],
    TravelLaw.free(0.3), TravelLaw.free(0.3 + 6e-17), TravelLaw(b=0.3), Disc(radius=1e-3), Gaussian(waist=1e-3), H,
    Pattern(CELLS, 1e-5), Pattern(CELLS, 1e-5, flip_x=True), Pattern(CELLS + 1, 1e-5), SampledMode(np.eye(4), pixel=1e-5),
]  # fmt: skip


def test_whatever_differs_has_another_digest():
    digests = [content_of(value) for value in UNLIKE]
    assert None not in digests
    assert len(set(digests)) == len(UNLIKE)


def test_contents_count_and_not_the_objects_that_hold_them():
    assert content_of(CELLS.copy()) == content_of(CELLS) == content_of(np.asfortranarray(CELLS))
    assert content_of(Pattern(CELLS.copy(), 1e-5)) == content_of(Pattern(CELLS, 1e-5))
    assert content_of(replace(TravelLaw.free(0.3))) == content_of(TravelLaw.free(0.3))


def test_what_came_before_counts():
    first = content_of(1)
    assert content_of(2, after=first) == content_of(2, after=content_of(1))
    assert len({content_of(1, 2), content_of(2, 1), content_of(2, after=first), content_of(2)}) == 4


@dataclass(frozen=True)
class Own:
    """A class whose methods may be written anew under the same name."""

    number: float = 1.0


@pytest.mark.parametrize(
    "value", [abs, lambda x, y: x, Own(), {1: 2}, {1}, object(), int, np.array([None, 1]), Pattern(lambda x, y: x)]
)
def test_what_is_not_all_data_has_no_digest(value):
    assert content_of(value) is None
    assert content_of(1.0, (value,)) is None


def test_a_large_array_is_digested_once_in_a_while(monkeypatch):
    met, own = [], content._bytes
    monkeypatch.setattr(content, "_bytes", lambda array: met.append(1) or own(array))
    large = np.arange(LARGE / 8 + 1)
    other, again = large + 1, large.copy()
    outside = [content_of(one) for one in (large, other, again)]
    met.clear()
    with large_arrays_once():
        within = [content_of(one) for one in (large, other, again, large, other)]
        assert len(met) == 3
    assert within == [*outside, *outside[:2]]
    assert outside[0] == outside[2] != outside[1]
    large[3] = 0.5
    assert content_of(large) != outside[0]
