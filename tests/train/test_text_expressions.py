"""Formulas as text: exact both ways, and read without ever being run."""

import pytest
import sympy
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from fastaxis.errors import FileFormatError
from fastaxis.train.text_expressions import read_expression, write_expression

x, y = sympy.symbols("x y")
real = sympy.Symbol("alpha", real=True)
positive = sympy.Symbol("w", positive=True)


def formulas():
    leaves = (
        st.sampled_from([x, y, real, positive, sympy.pi, sympy.E])
        | st.builds(sympy.Rational, st.integers(-20, 20), st.integers(1, 20))
        | st.floats(-1e6, 1e6).map(sympy.Float)
    )
    # sympy turns cos(i) into cosh(1), which is outside the vocabulary: the imaginary unit stays outside functions.
    parts = st.recursive(
        leaves,
        lambda inner: (
            st.builds(lambda a, b: a + b, inner, inner)
            | st.builds(lambda a, b: a * b, inner, inner)
            | inner.map(sympy.cos)
            | inner.map(sympy.sin)
            | st.builds(lambda n: positive**n, st.integers(-3, 3))
        ),
        max_leaves=6,
    )
    return st.builds(lambda a, b: a + sympy.I * b, parts, parts)


@settings(max_examples=50, deadline=None)
@given(formulas())
def test_formulas_come_back(formula):
    # Products of tiny numbers leave the range of a double; the next test is about those.
    assume(all(float(number) != 0 for number in formula.atoms(sympy.Float)))
    back = read_expression(write_expression(formula))
    assert back == formula or sympy.expand(back - formula) == 0
    assert back.free_symbols == formula.free_symbols


def test_a_number_beyond_the_smallest_double_is_nothing_in_a_file():
    tiny = sympy.Float("1e-445")
    assert read_expression(write_expression(1 + sympy.I * tiny)) == 1


@settings(max_examples=50)
@given(st.floats(allow_nan=False, allow_infinity=False))
def test_numbers_come_back_to_the_last_bit(number):
    assert float(read_expression(write_expression(sympy.Float(number) + sympy.I)).subs(sympy.I, 0)) == number


@pytest.mark.parametrize(
    "letter",
    [
        sympy.Symbol("lambda", positive=True),
        sympy.Symbol("\\theta_1", real=True),
        sympy.Symbol("pi", real=True),
        sympy.Symbol("θ"),
        sympy.Symbol("n", integer=True, positive=True),
        sympy.Symbol("a b"),
    ],
    ids=str,
)
def test_any_letter_keeps_its_name_and_what_is_known_of_it(letter):
    assert read_expression(write_expression(2 * letter + sympy.pi)) == 2 * letter + sympy.pi


def test_letters_of_one_name_are_kept_apart():
    formula = sympy.Symbol("a") + 2 * sympy.Symbol("a", real=True)
    assert read_expression(write_expression(formula)) == formula


def test_factored_formulas_keep_their_value():
    formula = sympy.factor(2 * x + 2)
    assert sympy.expand(read_expression(write_expression(formula)) - formula) == 0


def test_the_usual_way_of_writing_is_read():
    assert read_expression({"expression": "-alpha/2 + 3*pi/8 - sqrt(2)*exp(I*pi/4)"}) == (
        -sympy.Symbol("alpha") / 2 + 3 * sympy.pi / 8 - sympy.sqrt(2) * sympy.exp(sympy.I * sympy.pi / 4)
    )


def test_a_long_sum_is_no_deep_one():
    assert read_expression({"expression": "+".join(["x"] * 2000)}) == 2000 * x


@pytest.mark.parametrize(
    "text",
    [
        "__import__('os').system('true')", "x.__class__", "x[0]", "lambda: 1", "open('f')", "cos(x, y)", "sin(x=1)", "cos",
        "x if x else y", "[x]", "x; y", "x = 1", "'x'", "True", "x // 2", "x % 2", "x @ y", "~x", "x < y", "x and y", "f(x)",
        "(cos)(x)(y)", "1j", "", "x +", "9**9**9", "9.0**9**9**9", "(1/9)**(9**6)", "(" * 500 + "x" + ")" * 500,
        "-" * 5000 + "x", "eval('1')", "f'{x}'", "x := 2", "*x", "...", "None",
    ],
)  # fmt: skip
def test_anything_else_is_refused(text):
    with pytest.raises(FileFormatError, match="a formula in a file holds names, numbers"):
        read_expression({"expression": text})


@pytest.mark.parametrize(
    "letters",
    [
        {"x": 1},
        {"x": {"name": 3}},
        {"x": {"real": "yes"}},
        {"x": {"shiny": True}},
        {"x": {"positive": True, "negative": True}},
        [],
    ],
    ids=str,
)
def test_odd_letters_are_refused(letters):
    with pytest.raises(FileFormatError, match="a formula in a file"):
        read_expression({"expression": "x", "letters": letters})


@pytest.mark.parametrize(
    "formula", [sympy.tan(x), sympy.Abs(x), sympy.Function("f")(x), sympy.Dummy("d"), sympy.oo + x], ids=str
)
def test_what_cannot_be_read_back_is_not_written(formula):
    with pytest.raises(FileFormatError, match="a formula in a file"):
        write_expression(formula)


def test_more_digits_than_a_float_holds_are_not_dropped_in_silence():
    with pytest.raises(FileFormatError, match="would read back as"):
        write_expression(x + sympy.Float("0.1234567890123456789012345", 25))
