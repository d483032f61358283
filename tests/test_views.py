"""The naming of circular light switches as a whole; the physics never does."""

import pytest

from fastaxis.conventions import View, stamp


@pytest.mark.parametrize(("view", "plus", "minus"), [(View.RECEIVER, "L", "R"), (View.SOURCE, "R", "L")])
def test_names_by_helicity(view, plus, minus):
    assert view.circular_name(+1) == plus
    assert view.circular_name(-1) == minus


def test_renaming_is_an_involution_and_leaves_linear_states_alone():
    assert View.SOURCE.rename("R") == "L"
    assert View.SOURCE.rename(View.SOURCE.rename("R")) == "R"
    assert View.SOURCE.rename("D") == "D"
    assert View.RECEIVER.rename("R") == "R"


def test_s3_sign():
    assert View.RECEIVER.s3_sign == 1
    assert View.SOURCE.s3_sign == -1


def test_stamp_is_one_line_and_says_which_view():
    receiver, source = stamp(View.RECEIVER), stamp(View.SOURCE)
    assert "\n" not in receiver
    assert receiver != source
    assert "exp(-iwt)" in receiver
    assert "R = (1,-i)/√2 clockwise, helicity -1" in receiver
    assert "R = (1,+i)/√2 counter-clockwise, helicity +1" in source
