"""Power of a form: its irradiance summed over the plane."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI, R
from fastaxis.engines.symbolic.presentations import compact
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.errors import SymbolError

if TYPE_CHECKING:
    from fastaxis.engines.symbolic.form import Form

__all__ = ["total_power"]


def total_power(form: Form) -> Any:
    """Power [W]: 2 pi times the integral over r of the part of S0 that does not turn with phi."""
    mean = _round_part(form.stokes_polys()[0])
    watts = sp.nsimplify(form.source_power, rational=True)
    expression = compact(mean)
    if form._factored and not expression.has(R):  # noqa: SLF001  # the mode has unit power and travels without loss
        return watts * expression
    meanings = form.parts[0].field.place.letters
    named = form.irradiance if form._factored else watts * expression  # noqa: SLF001
    density = sp.expand(meanings.spelled_out(named))
    if density.has(sp.Heaviside, sp.Integral, sp.hyper, sp.conjugate):
        raise SymbolError(
            "the power of light cut by a stop or known by an integral has no closed form here",
            got=f"{form.target}: a field with a stop or a special function of r",
            fix=f'train.power("{form.target}")',
        )
    return sp.simplify(sp.integrate(2 * sp.pi * R * density, (R, 0, sp.oo)))


def _round_part(poly: Poly) -> Poly:
    """The terms that do not turn with phi."""
    ring = poly.ring

    def turns(key: int) -> bool:
        return any(ring.generators[place].expression.has(PHI) for place in ring.exponents(key)[1])

    return ring.poly({key: value for key, value in poly.terms.items() if not turns(key)}, poly.den)
