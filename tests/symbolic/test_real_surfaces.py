"""Parts whose numbers are worked out, beside letters: long decimals become exact surds in a form."""

import sympy as sp

import fastaxis as fa
from fastaxis.units import deg


def test_a_form_of_long_surds_is_a_numpy_function(form):
    roll = sp.Symbol("alpha", real=True)
    some = form(
        fa.DovePrism(index=1.515), fa.Rhomb(index=1.51, incidence=54.6 * deg, roll=roll), fa.Polarizer(axis=0.2)
    )
    assert some.check().roundings < 200  # the form has some dozens of terms of about the same size
