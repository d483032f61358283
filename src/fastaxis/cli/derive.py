"""``fastaxis derive``: the light at a camera as formulas."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Iterator
from typing import Any

from fastaxis.cli.bench_file import BenchFile
from fastaxis.cli.choices import one_setting
from fastaxis.cli.console import say
from fastaxis.cli.targets import targets
from fastaxis.conventions import View, stamp
from fastaxis.errors import FastaxisError

__all__ = ["derive"]

ROUNDING = 2.0**-52
AGREED = 1e-3  # of the irradiance; a numeric engine meets a hard edge or a singular point to about this


def derive(bench: BenchFile, options: Namespace) -> None:
    """Print the field, the Stokes parameters and, where asked, a frame, each as a formula with a numeric check."""
    train = bench.train.with_values(dict(options.symbol)) if options.symbol else bench.train
    for target in targets(train, options.camera):
        form = train.derive(target)
        say(f"{train.name}, {target}: light relative to its envelope [sqrt(W)/m]")
        for name, value in _quantities(form, options.setting, options.view):
            say(f"  {name} = {_latex(value) if options.latex else value}")
        for name, meaning in form.meanings.items():
            say(f"    with {name} = {_latex(meaning) if options.latex else meaning}")
        for line in form.assumptions[1:]:  # the first is the stamp, which closes the answer
            say(f"  assumed: {line}")
        say(f"  {_checked(form)}")
    say(stamp(options.view))


def _checked(form: Any) -> str:
    try:
        check = form.check()
    except FastaxisError as error:
        return f"not checked: {error}"
    agreed = check.roundings * ROUNDING < AGREED
    return f"{'checked' if agreed else 'NOT CONFIRMED, do not rely on this form'}: {check}"


def _quantities(form: Any, setting: str | None, view: View) -> Iterator[tuple[str, Any]]:
    """(name, expression) of all that is shown; a mixture of incoherent parts has no Jones vector."""
    yield "envelope", form.envelope
    if len(form.parts) == 1:
        yield from zip(("Ex", "Ey"), form.jones(), strict=True)
    signs = (1, 1, 1, view.s3_sign)
    yield from ((f"S{k}", sign * value) for k, (sign, value) in enumerate(zip(signs, form.stokes, strict=True)))
    if setting is not None:
        # R and L are typed as the view names them, and exposed as the receiver names them.
        yield f"frame behind {setting}", form.frame(one_setting(view.rename(setting)))


def _latex(value: Any) -> str:
    from sympy import latex  # noqa: PLC0415  # loaded only where formulas are asked for

    return str(latex(value))
