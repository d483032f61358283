"""Random lossless graphs with letters: their ports hold all the light, whatever the letters are."""

import warnings
from functools import reduce

import sympy as sp
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

import fastaxis as fa
from fastaxis.engines.symbolic import derive

RADIUS, WAVELENGTH = sp.symbols("w lambda", positive=True)
THROUGH = (
    lambda letter, name: fa.Retarder(fast=letter, retardance=1.1, name=name),
    lambda letter, name: fa.Retarder(fast=0.3, retardance=letter, name=name),
    lambda letter, name: fa.FaradayRotator(angle=letter, name=name),
    lambda letter, name: fa.Rotator(angle=letter, name=name),
    lambda letter, name: fa.PhaseShift(phase=letter, name=name),
    lambda letter, name: fa.Mirror(name=name),
)
SPLITTING = (
    lambda letter, name: fa.BeamSplitter(reflectance=sp.Symbol(f"R_{name}", positive=True), name=name),
    lambda letter, name: fa.BeamSplitter(name=name),
    lambda letter, name: fa.PolarizingBeamSplitter(name=name),
)


@st.composite
def benches(draw):
    """Up to 12 parts, each lit by one or, at a splitter, by two of the ports that are still open."""
    train = fa.Train(wavelength=WAVELENGTH)
    train.add(fa.Laser(waist=RADIUS, power=1.0, state=fa.elliptical(0.2, sp.Symbol("b", real=True)), name="laser"))
    dark = ["laser.out"]
    for number in range(draw(st.integers(3, 12))):
        name = f"p{number}"
        make = draw(st.sampled_from(THROUGH + SPLITTING if number else SPLITTING))
        part = make(sp.Symbol(f"x_{number}", real=True), name)
        train.add(part)
        inputs = ["front", "side"] if make in SPLITTING else ["front"]
        for face in inputs[: draw(st.integers(1, min(len(inputs), len(dark))))]:
            train.join(dark.pop(draw(st.integers(0, len(dark) - 1))), f"{name}.{face}")
        dark += [f"{name}.transmitted", f"{name}.reflected"] if make in SPLITTING else [f"{name}.{part.exit}"]
    return train, dark


@given(benches())
@settings(max_examples=20, deadline=None, suppress_health_check=[HealthCheck.too_slow])
def test_all_ports_together_hold_the_light_identically(bench):
    train, ports = bench
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # of ports that stay open: they are what is asked
        forms = [derive(train, port) for port in ports]
    # Nothing here differs from place to place, so the shares of light add up to 1 whatever the letters.
    total = forms[0].stokes_polys()[0]
    total = reduce(lambda one, form: one + one.ring.adopted(form.stokes_polys()[0]), forms[1:], total)
    assert (total - total.ring.rational(1)).is_zero()
