"""Where a linear analyzer sees most and least light, and the lobes of a frame."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.coordinates import PHI
from fastaxis.engines.symbolic.expressions import written
from fastaxis.engines.symbolic.presentations import compact, harmonics
from fastaxis.engines.symbolic.presentations.harmonics import order_in
from fastaxis.engines.symbolic.ring import Poly
from fastaxis.engines.symbolic.ring.reading import read
from fastaxis.errors import SymbolError

__all__ = ["AnalyzerAngles", "Lobes", "analyzer_angles", "lobes"]


@dataclass(frozen=True)
class AnalyzerAngles:
    """Angles of a linear analyzer, modulo pi.

    Parameters
    ----------
    bright, dark : where the frame is largest and smallest [rad]; half a turn of the Poincare sphere apart.
    brightest, darkest : the frame there, relative to the envelope.
    """

    bright: Any
    dark: Any
    brightest: Any
    darkest: Any


def analyzer_angles(stokes: tuple[Poly, ...]) -> AnalyzerAngles:
    """The extremes of (S0 + S1 cos 2t + S2 sin 2t)/2 over t.

    Raises
    ------
    SymbolError : every analyzer angle gives the same frame (circular or unpolarized light).
    """
    s0, s1, s2, _ = stokes
    ring = s0.ring
    turned = s1 + s2 * ring.root_of_unity(Fraction(1, 4))
    if turned.is_zero():
        raise SymbolError(
            "light without linear polarization looks the same through every linear analyzer",
            got="S1 = S2 = 0",
            fix="form.frame(fa.R)",
        )
    length, azimuth = _polar(turned, s1, s2)
    half = sp.Rational(1, 2)
    size = compact(s0)
    return AnalyzerAngles(
        azimuth, azimuth + sp.pi / 2, sp.expand_mul(half * (size + length)), sp.expand_mul(half * (size - length))
    )


def _polar(turned: Poly, s1: Poly, s2: Poly) -> tuple[Any, Any]:
    """(length, half the argument) of S1 + i S2; the argument is exact where the phase is a plain angle."""
    value = written(turned)
    size, phase = sp.S.One, sp.S.Zero
    for factor in sp.Mul.make_args(value):
        if isinstance(factor, sp.exp):
            phase += factor.args[0] / sp.I
        elif factor == sp.I:
            phase += sp.pi / 2
        else:
            size *= factor
    if size.has(sp.I):
        one, two = compact(s1), compact(s2)
        return sp.sqrt(one**2 + two**2), sp.atan2(two, one) / 2
    size = compact(read(turned.ring, size))
    if size.could_extract_minus_sign():
        size, phase = -size, phase + sp.pi
    # sin^2 and the like are never negative; anything else may change sign, and bright and dark with it.
    length = size if size.is_nonnegative or not size.free_symbols else sp.Abs(size)
    shift = sp.S.Zero if length == size else sp.pi * (1 - sp.sign(size)) / 4
    return length, sp.expand(phase) / 2 + shift


@dataclass(frozen=True)
class Lobes:
    """The lobes of a frame around the axis.

    Parameters
    ----------
    count : lobes in a full turn.
    first : azimuth of one bright lobe [rad]; the others follow at 2 pi/count.
    turning : how far the pattern turns per turn of the setting's angle; negative against it.
    contrast : (largest - smallest)/(largest + smallest) around the axis.
    """

    count: Any
    first: Any
    turning: Any
    contrast: Any


def lobes(frame: Poly, angle: Any) -> Lobes:
    """Lobes of a frame that has one harmonic in phi, and how they turn with ``angle``.

    Raises
    ------
    SymbolError : the frame is the same all round, or has several harmonics.
    """
    found = harmonics(frame, PHI)
    orders = [order for order in found if order != 0]
    if len(orders) != 1:
        raise SymbolError(
            "lobes are counted in a frame with one harmonic of phi",
            got=f"harmonics {', '.join(map(str, orders)) or '0 only'}",
            fix="form.harmonics(theta, sympy.Symbol('phi', real=True))",
        )
    (order,) = orders
    wave = _of_order(frame, order)
    size, phase = _polar_of(wave)
    first = sp.expand(-phase / order)
    mean, _ = found.get(sp.S.Zero, (sp.S.Zero, 0))
    return Lobes(sp.Abs(order), first, sp.diff(first, angle), sp.cancel(2 * size / mean))


def _of_order(frame: Poly, order: Any) -> Poly:
    return frame.parts(lambda key: order_in(frame, key, PHI))[order]


def _polar_of(wave: Poly) -> tuple[Any, Any]:
    length, half = _polar(wave, wave + wave.conj(), wave - wave.conj())
    return length, 2 * half
