"""Errors and warnings carry rule, got and fix, and survive a process pool."""

import pickle
import warnings
from concurrent.futures import ThreadPoolExecutor

import pytest

from fastaxis import errors

ERRORS = [c for c in vars(errors).values() if isinstance(c, type) and issubclass(c, errors.FastaxisError)]
WARNINGS = [c for c in vars(errors).values() if isinstance(c, type) and issubclass(c, errors.FastaxisWarning)]


@pytest.mark.parametrize("kind", ERRORS + WARNINGS)
def test_one_sentence_with_rule_got_and_fix(kind):
    message = str(kind("q must be a multiple of 1/2.", got="qp: q = 0.3", fix="q=0.5"))
    assert message == "qp: q = 0.3; q must be a multiple of 1/2 (fix: q=0.5)"


@pytest.mark.parametrize("kind", ERRORS + WARNINGS)
@pytest.mark.parametrize("left_out", ["rule", "got", "fix"])
def test_no_part_can_be_left_out(kind, left_out):
    parts = {"rule": "r", "got": "g", "fix": "f"}
    del parts[left_out]
    with pytest.raises(TypeError):
        kind(**parts)


@pytest.mark.parametrize("kind", ERRORS)
def test_errors_cross_a_process_border(kind):
    error = pickle.loads(pickle.dumps(kind("rule", got="got", fix="fix")))
    assert type(error) is kind
    assert (error.rule, error.got, error.fix) == ("rule", "got", "fix")


def test_python_families_match():
    assert issubclass(errors.ParameterError, ValueError)
    assert issubclass(errors.SymbolError, TypeError)


def test_warnings_can_be_made_errors():
    with warnings.catch_warnings():
        warnings.simplefilter("error", errors.FastaxisWarning)
        with pytest.raises(errors.SlipWarning):
            warnings.warn(errors.SlipWarning("r", got="g", fix="f"), stacklevel=1)


def test_a_caution_points_at_the_line_of_the_user():
    with pytest.warns(errors.SlipWarning) as caught:
        errors.caution(errors.SlipWarning("r", got="g", fix="f"))
    assert caught[0].filename == __file__


def test_a_caution_from_deep_inside_points_at_the_line_of_the_user():
    import fastaxis as fa

    train = fa.Train(wavelength=532e-9).along(
        fa.Laser(waist=1e-3), fa.HalfWavePlate(fast=0, design=800e-9), fa.Detector(name="out")
    )
    with pytest.warns(errors.SlipWarning, match="design") as caught:
        train.expose("out", [fa.H])
    assert caught[0].filename == __file__


def test_cautions_of_one_thread_can_be_held_back_while_others_speak():
    told = errors.SlipWarning("a rule", got="a slip", fix="a fix")
    with errors.cautions_held() as held, ThreadPoolExecutor(1) as pool:
        errors.caution(told)
        with pytest.warns(errors.SlipWarning, match="a slip"):
            pool.submit(errors.caution, told).result()
    assert held == [told]
    with pytest.warns(errors.SlipWarning, match="a slip"):
        errors.caution(told)
