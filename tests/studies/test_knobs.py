"""Parameters and values: their order, their groups, and what is refused."""

import numpy as np
import pytest
import sympy

from fastaxis.errors import ParameterError, SymbolError
from fastaxis.studies.knobs import read_knobs


def test_every_combination_the_last_fastest():
    knobs = read_knobs({"a.x": [1.0, 2.0], "b.y": (3.0, 4.0, 5.0)}, zipped=False)
    assert (len(knobs), knobs.shape) == (6, (2, 3))
    assert [knobs.at(k) for k in (0, 1, 5)] == [{"a.x": 1, "b.y": 3}, {"a.x": 1, "b.y": 4}, {"a.x": 2, "b.y": 5}]


def test_zipped_go_together():
    knobs = read_knobs({"a.x": [1.0, 2.0], "b.y": np.array([3.0, 4.0])}, zipped=True)
    assert (len(knobs), knobs.shape) == (2, (2,))
    assert knobs.at(1) == {"a.x": 2.0, "b.y": 4.0}
    assert knobs.groups() == [("a.x", "b.y")]
    np.testing.assert_array_equal(knobs.places(("a.x", "b.y")), [0, 1])


def test_parameters_of_one_part_are_one_group():
    knobs = read_knobs({"a.x": [1.0, 2.0], "b.y": [3.0, 4.0, 5.0], "a.z": [6.0, 7.0]}, zipped=False)
    assert knobs.groups() == [("a.x", "a.z"), ("b.y",)]
    group = knobs.only(("a.x", "a.z"))
    for index, place in enumerate(knobs.places(("a.x", "a.z"))):
        assert group.at(int(place)).items() <= knobs.at(index).items()


@pytest.mark.parametrize(
    ("values", "zipped", "kind", "words"),
    [
        ({}, False, ParameterError, "names at least one parameter"),
        ([1, 2], False, ParameterError, "names at least one parameter"),
        ({"a.x": []}, False, ParameterError, "a.x has none; a parameter is given at least one value"),
        ({"a.x": 0.3}, False, ParameterError, "a.x = 0.3; the values of a parameter are a list or an array"),
        ({"a.x": "0.3"}, False, ParameterError, "list or an array"),
        ({"a.x": [1.0], "b.y": [1.0, 2.0]}, True, ParameterError, "a.x has 1, b.y has 2; parameters changed together"),
        ({"a.x": [0.1, sympy.Symbol("t")]}, False, SymbolError, "a.x has the letter t among its values"),
    ],
)
def test_refusals(values, zipped, kind, words):
    with pytest.raises(kind, match=words):
        read_knobs(values, zipped=zipped)
