import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fastaxis.laws import TravelLaw

sections = st.one_of(st.builds(TravelLaw.free, st.floats(0, 3)), st.builds(TravelLaw.lens, st.floats(-3, 3)))
trains = st.lists(sections, min_size=1, max_size=5)
REVERSE = np.diag([1.0, -1.0])  # a ray met from behind: same height, angle reversed
# Five products of 2x2 matrices with entries up to 3: results up to some thousand, relative rounding 1e-15.
ROUNDING = 1e-11


def matrix(law):
    return np.array([[law.a, law.b], [law.c, law.d]])


def joined(train):
    first, *rest = train
    for later in rest:
        first = first.then(later)
    return first


@settings(max_examples=50, deadline=None)
@given(trains)
def test_then_multiplies_the_later_one_from_the_left_and_adds_paths(train):
    product = np.eye(2)
    for law in train:
        product = matrix(law) @ product
    assert matrix(joined(train)) == pytest.approx(product, abs=ROUNDING)
    assert joined(train).path == pytest.approx(sum(law.path for law in train), abs=ROUNDING)


@settings(max_examples=50, deadline=None)
@given(trains)
def test_backward_undoes_a_reversed_ray(train):
    law = joined(train)
    round_trip = REVERSE @ matrix(law.backward()) @ REVERSE @ matrix(law)
    # The inverse of a matrix with entries up to some thousand: squares of them cancel.
    assert round_trip == pytest.approx(np.eye(2), abs=1e-8)
    assert law.backward().backward() == law


def test_lens_brings_a_parallel_ray_to_its_focus():
    law = TravelLaw.lens(2.0).then(TravelLaw.free(0.5))
    assert matrix(law) @ np.array([1e-3, 0.0]) == pytest.approx([0.0, -2e-3], abs=1e-18)


def test_mirrored_is_the_same():
    law = TravelLaw.free(0.3)
    assert law.mirrored("y") is law
    assert law.values == (1.0, 0.3, 0.0, 1.0, 0.3)
