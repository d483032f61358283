"""Single values as plain data."""

import json
import math
from dataclasses import dataclass

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from fastaxis.errors import FileFormatError
from fastaxis.train.text_values import read_value, write_value


@dataclass(frozen=True)
class Point:
    x: float
    y: float = 0.0

    def __post_init__(self):
        if not self.x + 0 >= 0:
            raise ValueError("x must be\n0 or more")


KINDS = {"Point": Point}


def there_and_back(value):
    return read_value(
        json.loads(json.dumps(write_value(value, "part.value", KINDS), allow_nan=False)), "part.value", KINDS
    )


def values():
    numbers = st.floats(allow_nan=False) | st.integers() | st.complex_numbers(allow_nan=False) | st.booleans()
    points = st.builds(Point, st.floats(0, 1e300), st.floats(allow_nan=False))
    return st.recursive(numbers | st.text() | st.none() | points, lambda inner: st.lists(inner, max_size=4).map(tuple))


@given(values())
def test_values_come_back_with_their_types(value):
    back = there_and_back(value)
    assert back == value
    assert repr(back) == repr(value)  # tells 1 from 1.0 and 0.0 from -0.0


def test_no_number_is_a_number_too():
    assert math.isnan(there_and_back(float("nan")))


@pytest.mark.parametrize("number", [np.float64(0.1), np.int32(7), np.complex128(1 - 0.5j), np.bool_(True)], ids=repr)
def test_array_scalars_become_plain_numbers(number):
    back = there_and_back(number)
    assert back == number
    assert type(back) is type(number.item())


@pytest.mark.parametrize("kind", ["float64", "float32", "complex128", "complex64", "int16", "uint8", "bool"])
def test_arrays_keep_shape_kind_and_every_bit(kind):
    array = (
        (np.arange(6).reshape(2, 3) % 2 / 3 - 1j / 7).astype(kind)
        if "complex" in kind
        else (np.arange(6).reshape(2, 3) / 3).astype(kind)
    )
    back = there_and_back(array)
    assert back.dtype == array.dtype
    assert np.array_equal(back, array)


@pytest.mark.parametrize("array", [np.array([np.nan]), np.array([np.inf * 1j]), np.array([None])], ids=str)
def test_arrays_of_anything_but_finite_numbers_are_refused(array):
    with pytest.raises(FileFormatError, match=r"part\.value: array of .*; an array in a file holds finite numbers"):
        write_value(array, "part.value", KINDS)


def test_an_object_of_an_unknown_class_is_refused():
    with pytest.raises(FileFormatError, match=r"part\.value: a set; a file keeps numbers, letters"):
        write_value({1}, "part.value", KINDS)


def test_fields_that_cannot_be_are_told_in_one_sentence():
    for data in ({"kind": "Point", "x": -1.0}, {"kind": "Point", "x": "wide"}):
        with pytest.raises(FileFormatError, match="the fields of Point must be possible values") as caught:
            read_value(data, "part.value", KINDS)
        assert "\n" not in str(caught.value)


@pytest.mark.parametrize("word", [3, True, [1], "ten"], ids=str)
def test_odd_complex_numbers_are_refused(word):
    with pytest.raises(FileFormatError, match="a number, complex number or array"):
        read_value({"complex": [0.0, word] if word != 3 else 3}, "part.value", KINDS)
