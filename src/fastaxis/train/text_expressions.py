"""Symbolic values as text: written term by term, read back by a reader that knows arithmetic and nothing else."""

from __future__ import annotations

import ast
import operator
from collections.abc import Callable, Mapping
from functools import reduce
from typing import Any

from fastaxis.errors import FileFormatError

__all__ = ["read_expression", "write_expression"]

FUNCTIONS = ("sqrt", "cos", "sin", "exp")
CONSTANTS = ("pi", "I")
NUMBERS = {"Pi": "pi", "ImaginaryUnit": "I", "Exp1": "exp(1)"}
SIGNS = {"Add": " + ", "Mul": "*", "Pow": "**"}
ASSUMPTIONS: tuple[dict[str, bool], ...] = (
    {},
    {"real": True},
    {"positive": True},
    {"integer": True},
    {"nonnegative": True},
)
# 9**9**9 would fill the memory before anything could be checked; no angle or length needs more digits than this.
LARGEST_BITS = 4096


def _sympy() -> Any:
    import sympy  # noqa: PLC0415  # only a train with letters needs it

    return sympy


def _refused(got: str) -> FileFormatError:
    return FileFormatError(
        "a formula in a file holds names, numbers, + - * / **, pi, I, sqrt, cos, sin and exp",
        got=got,
        fix='{"expression": "pi/4 + alpha"}',
    )


def write_expression(value: Any) -> dict[str, Any]:
    """{"expression": text, "letters": {name in the text: {"name": ..., assumptions}}} of a sympy value.

    Raises
    ------
    FileFormatError : a function outside the reader's vocabulary, or a letter that cannot be told by its name.
    """
    ordered = sorted(value.free_symbols, key=lambda letter: (str(letter), repr(sorted(letter.assumptions0.items()))))
    aliases = {letter: _alias(letter, index, ordered) for index, letter in enumerate(ordered)}
    described = {alias: {"name": letter.name, **_assumptions(letter)} for letter, alias in aliases.items()}
    written = {"expression": _written(value, aliases), "letters": described}
    back, meant = read_expression(written), _in_doubles(value)
    if back != meant and _sympy().expand(back - meant) != 0:
        raise _refused(f"{value}: would read back as {back}")
    return written


def _in_doubles(value: Any) -> Any:
    """The value with what is below the smallest double set to 0: 1e-445, say, a product of two tiny numbers."""
    floats = value.atoms(_sympy().Float)
    return value.xreplace({number: _sympy().Integer(0) for number in floats if float(number) == 0})


def _alias(letter: Any, index: int, letters: list[Any]) -> str:
    """The letter's own name where that is a plain word of its own, else a made-up one."""
    plain = letter.name.isascii() and letter.name.isidentifier()
    alone = sum(other.name == letter.name for other in letters) == 1
    reserved = letter.name in (*FUNCTIONS, *CONSTANTS, "lambda") or letter.name.startswith("letter_")
    return letter.name if plain and alone and not reserved else f"letter_{index}"


def _assumptions(letter: Any) -> dict[str, bool]:
    """The shortest set of assumptions that makes the same letter again."""
    sympy = _sympy()
    for known in ASSUMPTIONS:
        if sympy.Symbol(letter.name, **known) == letter:
            return dict(known)
    if sympy.Symbol(letter.name, **letter.assumptions0) == letter:
        return dict(letter.assumptions0)
    raise _refused(f"{letter}: a letter that is not told by its name ({type(letter).__name__})")


def _written(value: Any, aliases: Mapping[Any, str]) -> str:
    if value in aliases:
        return aliases[value]
    if value.is_Float:
        return f"({float(value)!r})"
    if value.is_Rational:
        return f"({int(value.p)})" if value.is_Integer else f"({int(value.p)}/{int(value.q)})"
    kind = value.func.__name__
    if kind in NUMBERS:
        return NUMBERS[kind]
    parts = [_written(part, aliases) for part in value.args]
    if kind in SIGNS:
        return f"({SIGNS[kind].join(parts)})"
    if kind in FUNCTIONS:
        return f"{kind}({', '.join(parts)})"
    raise _refused(f"{value}: {kind} is not among them")


def read_expression(stored: Mapping[str, Any]) -> Any:
    """The sympy value of :func:`write_expression`; nothing in the text is ever run.

    >>> read_expression({"expression": "pi/4 + alpha"})
    alpha + pi/4
    """
    text, described = stored.get("expression"), stored.get("letters", {})
    if not isinstance(text, str) or not isinstance(described, dict):
        raise _refused(f"{text!r} as a formula")
    letters = {alias: _letter(alias, about) for alias, about in described.items()}
    try:
        return _read(ast.parse(text, mode="eval").body, letters, text)
    except (SyntaxError, ValueError, RecursionError, MemoryError) as error:
        if isinstance(error, FileFormatError):
            raise
        raise _refused(f"{text[:60]!r}: not a formula") from None


def _letter(alias: str, about: Any) -> Any:
    if not isinstance(about, dict) or not all(isinstance(v, bool) for k, v in about.items() if k != "name"):
        raise _refused(f"{alias}: {about!r} as the description of a letter")
    assumptions = {key: value for key, value in about.items() if key != "name"}
    name = about.get("name", alias)
    unknown = [key for key in assumptions if not hasattr(_sympy().Symbol, f"is_{key}")]
    if not isinstance(name, str) or unknown:
        raise _refused(f"{alias}: {about!r} as the description of a letter")
    try:
        return _sympy().Symbol(name, **assumptions)
    except _sympy().core.facts.InconsistentAssumptions:
        raise _refused(f"{alias}: assumptions {assumptions} contradict each other") from None


OPERATORS: dict[type[ast.operator], Callable[[Any, Any], Any]] = {
    ast.Add: operator.add,
    ast.Sub: operator.sub,
    ast.Mult: operator.mul,
    ast.Div: operator.truediv,
}


def _read(node: ast.expr, letters: Mapping[str, Any], text: str) -> Any:  # one return a form
    match node:
        case ast.Constant(value=int() | float() as number) if not isinstance(number, bool):
            return _sympy().Integer(number) if isinstance(number, int) else _sympy().Float(number)
        case ast.Name(id=name) if name not in FUNCTIONS:
            return _named(name, letters)
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            return -_read(operand, letters, text)
        case ast.BinOp(left=left, op=ast.Pow(), right=right):
            return _power(_read(left, letters, text), _read(right, letters, text), text)
        case ast.BinOp(op=op) if type(op) in OPERATORS:
            return _chain(node, letters, text)
        case ast.Call(func=ast.Name(id=name), args=[argument], keywords=[]) if name in FUNCTIONS:
            return getattr(_sympy(), name)(_read(argument, letters, text))
    raise _refused(f"{ast.unparse(node)[:60]!r} in the formula {text[:60]!r}")


def _named(name: str, letters: Mapping[str, Any]) -> Any:
    if name in letters:
        return letters[name]
    return getattr(_sympy(), name) if name in CONSTANTS else _sympy().Symbol(name)


def _chain(node: ast.expr, letters: Mapping[str, Any], text: str) -> Any:
    """A long run a + b + c ... leans to the left; walking it in a loop keeps it clear of the recursion limit."""
    steps = []
    while isinstance(node, ast.BinOp) and type(node.op) in OPERATORS:
        steps.append((OPERATORS[type(node.op)], _read(node.right, letters, text)))
        node = node.left
    return reduce(lambda total, step: step[0](total, step[1]), reversed(steps), _read(node, letters, text))


def _power(base: Any, exponent: Any, text: str) -> Any:
    if base.is_number and exponent.is_number:
        bits = max((int(n).bit_length() for n in (getattr(base, "p", 2), getattr(base, "q", 1))), default=1)
        size = abs(float(abs(exponent))) if exponent.is_finite else float("inf")
        if bits * size > LARGEST_BITS:
            raise _refused(f"a power too large to write out in the formula {text[:60]!r}")
    return base**exponent
