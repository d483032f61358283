import ast
import re

import numpy
import pytest
import sympy

import fastaxis
from fastaxis import errors, light, units

NAMES = {name: getattr(room, name) for room in (light, units) for name in room.__all__}


@pytest.fixture
def symbols(letters):
    return letters


@pytest.fixture
def refuses():
    """Run code that must be refused: the message must hold the given text, and its fix must run.

    A fix written as keywords is put in place of those of the refused call, which then must pass.
    """

    def check(code, text, kind=errors.ParameterError, **more):
        names = NAMES | {"numpy": numpy, "sympy": sympy, "fa": fastaxis} | more
        with pytest.raises(kind) as caught:
            eval(code, names)
        assert text in str(caught.value), str(caught.value)
        fix = caught.value.fix
        if re.match(r"\w+=[^=]", fix):
            fixed = eval(f"dict({fix})", names)
            call = ast.parse(code, mode="eval").body
            if isinstance(call, ast.Call) and isinstance(call.func, ast.Name) and not call.args:
                given = {keyword.arg: eval(ast.unparse(keyword.value), names) for keyword in call.keywords}
                eval(call.func.id, names)(**(given | fixed))
        else:
            eval(fix, names)
        return caught.value

    return check
