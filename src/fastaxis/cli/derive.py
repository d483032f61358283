"""``fastaxis derive``: the light at a camera as formulas."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Iterator
from typing import Any

from fastaxis.cli.bench_file import BenchFile
from fastaxis.cli.choices import STATES, one_setting
from fastaxis.cli.console import say, tell
from fastaxis.cli.letters import with_letters
from fastaxis.cli.targets import targets
from fastaxis.conventions import View, stamp
from fastaxis.errors import FastaxisError

__all__ = ["NOT_CONFIRMED", "derive"]

NOT_CONFIRMED = 4  # exit code

ROUNDING = 2.0**-52
AGREED = 1e-3  # of the irradiance; a numeric engine meets a hard edge or a singular point to about this


def derive(bench: BenchFile, options: Namespace) -> int:
    """Print the field, the Stokes parameters and, where asked, a frame, each as a formula with a numeric check.

    Returns 4 where numbers don't confirm a formula, else 0.
    """
    train = with_letters(bench.train, options)
    _tell_letter(train, options.setting)
    good = True
    for target in targets(train, options.camera):
        form = train.derive(target)
        say(f"{train.name}, {target}: light relative to its envelope [sqrt(W)/m]")
        quantities = dict(_quantities(form, options.setting, options.view))
        for name, value in quantities.items():
            say(f"  {name} = {form.show(value, latex=options.latex)}")
        for name, meaning in form.names_in(quantities.values()).items():
            say(f"    with {form.show(name, latex=options.latex)} = {form.show(meaning, latex=options.latex)}")
        for line in form.assumptions[1:]:  # the first is the stamp, which closes the answer
            say(f"  assumed: {line}")
        agreed, verdict = _checked(form, train, target)
        good &= agreed
        say(f"  {verdict}")
    say(stamp(options.view))
    return 0 if good else NOT_CONFIRMED


def _checked(form: Any, train: Any, target: str) -> tuple[bool, str]:
    """Whether numbers don't contradict a form, and the words for it."""
    try:
        check = form.check()
    except FastaxisError as error:
        apart = _beside_powers(form, train, target)
        if apart is None:
            # The fix is for those who ask in Python; here there is nothing to be typed.
            return True, f"not checked: {error.got}; {error.rule}"
        agreed = apart < AGREED
        check = f"S1 to S3 over S0 within {apart:.2g} of the powers that arrive; the envelope was not compared"
    else:
        agreed = check.roundings * ROUNDING < AGREED
    return agreed, f"{'checked' if agreed else 'NOT CONFIRMED, do not rely on this form'}: {check}"


def _beside_powers(form: Any, train: Any, target: str) -> float | None:
    """Largest deviation of S1 .. S3 over S0 from those of all the light together; None if that is no comparison.

    A detector has no places at which a formula could be compared. Where polarization is the same all over the beam,
    the light taken together has it too.
    """
    if any(value.free_symbols for value in form.stokes) or form.stokes[0] == 0:
        return None
    s0, *rest = (float(value) for value in form.stokes)
    total = sum(part.total_stokes for part in train.field(target))
    return max(abs(value / s0 - float(whole / total[0])) for value, whole in zip(rest, total[1:], strict=True))


def _tell_letter(train: Any, setting: str | None) -> None:
    """Say what a setting that is no state and no angle was taken for."""
    if setting is None or not setting.isidentifier() or setting in STATES:
        return
    if setting in map(str, train.symbols):
        tell(f"caution: {setting} is a letter of the bench too: the analyzer turns with it", style="yellow")
    else:
        tell(f"{setting} is no state ({', '.join(STATES)}): taken as a letter, the angle of a linear analyzer")


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
