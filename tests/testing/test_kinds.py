"""An assertion handed another kind of object says which kind it wants."""

import inspect
import re

import numpy as np
import pytest

import fastaxis as fa
import fastaxis.testing as ft
from fastaxis.units import deg, mW, um

AXIS = np.linspace(-1e-4, 1e-4, 4)
OF_TRAINS = {
    "charge": ("cam", 1),
    "field_equal": ("cam", np.ones((2, 4, 4))),
    "form_equal": ("cam", 1),
    "frame_matches": ("cam", np.ones((64, 64))),
    "lobe_angle": ("cam", 0 * deg),
    "lobe_count": ("cam", 2),
    "port_dark": ("cam",),
    "port_power": ("cam", 2 * mW),
    "ring_radius": ("cam", 90 * um),
    "singular_index": ("cam", 1),
    "state_at": ("cam",),
    "turning": ("cam", 1),
    "visibility": ("cam", 0.9),
    "energy_closes": (),
    "passes_inspection": (),
}
ALSO = {
    "charge": {"behind": fa.R, "radius": 80 * um},
    "field_equal": {"x": AXIS, "y": AXIS},
    "singular_index": {"radius": 80 * um},
    "state_at": {"azimuth": 0 * deg},
    **dict.fromkeys(("form_equal", "frame_matches", "lobe_angle", "lobe_count"), {"behind": fa.H}),
}


def refused(assertion, *arguments, words, **options):
    with pytest.raises(fa.ParameterError, match=re.escape(words)) as caught:
        getattr(ft, assertion)(*arguments, **options)
    assert caught.value.got.startswith(f"{assertion}: ")
    assert caught.value.fix
    return caught.value


def test_every_assertion_is_tried_here():
    assert {*OF_TRAINS} == {*ft.__all__} - {"BenchError"}


@pytest.mark.parametrize("wrong", [3, None, "bench.py", fa.H], ids=["number", "None", "path", "state"])
@pytest.mark.parametrize("assertion", OF_TRAINS)
def test_something_else_in_place_of_a_train(assertion, wrong):
    error = refused(
        assertion, wrong, *OF_TRAINS[assertion], **ALSO.get(assertion, {}), words="an assertion is about a train"
    )
    assert error.fix == f"{assertion}(train, ...)"


def test_the_path_of_a_bench_is_shown_how_to_become_a_train():
    error = refused("port_power", "bench.py", "cam", 2 * mW, words="about a train")
    assert error.got == "port_power: train = 'bench.py'"


@pytest.mark.parametrize("wrong", [3, None, fa.H], ids=["number", "None", "state"])
@pytest.mark.parametrize("assertion", [name for name, more in OF_TRAINS.items() if more])
def test_something_else_in_place_of_a_port(ring, assertion, wrong):
    more = OF_TRAINS[assertion][1:]
    error = refused(assertion, ring, wrong, *more, **ALSO.get(assertion, {}), words="is named by a text")
    assert error.fix == f'{assertion}(train, "cam", ...)'


def test_named_arguments_are_looked_at_too(ring):
    refused("port_power", train=3, port="cam", power=2 * mW, words="about a train")
    refused("port_power", ring, port=3, power=2 * mW, words="is named by a text")


def test_what_is_no_picture_no_field_and_no_axis(ring):
    for wrong in ("frame.npy", ring):
        refused("frame_matches", ring, "cam", wrong, behind=fa.H, words="an array of numbers")
        refused("field_equal", ring, "cam", np.ones((2, 4, 4)), x=wrong, y=AXIS, words="an array of numbers")
        refused("field_equal", ring, "cam", np.ones((2, 4, 4)), x=AXIS, y=wrong, words="an array of numbers")
    refused("field_equal", ring, "cam", "field.npy", x=AXIS, y=AXIS, words="an array of numbers")


def test_what_is_no_list(ring):
    for wrong in (3, None):
        refused("turning", ring, "cam", 1, analyzers=wrong, words="one analyzer to the next")
        refused("passes_inspection", ring, allowed=wrong, words="a list of texts")
    refused("passes_inspection", ring, allowed="qp", words="a list of texts")  # not "q" and "p"
    refused("passes_inspection", ring, allowed=[3], words="a list of texts")


def test_what_is_no_knob_and_no_state(ring):
    refused("visibility", ring, "cam", 0.9, knob=3, words="a knob is a parameter")
    for wrong in ("R", 3, None):
        refused("charge", ring, "cam", 1, behind=wrong, radius=80 * um, words="a charge is told behind a state")


@pytest.mark.parametrize("assertion", OF_TRAINS)
def test_names_and_help_are_those_of_the_assertion(assertion):
    known = getattr(ft, assertion)
    assert known.__name__ == assertion
    assert known.__doc__
    assert next(iter(inspect.signature(known).parameters)) == "train"
