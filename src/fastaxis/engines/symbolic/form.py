"""The light at a port as a formula."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import Any

import sympy as sp

from fastaxis.engines.symbolic.analyzers import behind
from fastaxis.engines.symbolic.answers import (
    AnalyzerAngles,
    Branches,
    Lobes,
    Mistake,
    analyzer_angles,
    charge_share,
    dark_when,
    lobes,
    mode_share,
    ranked_mistakes,
)
from fastaxis.engines.symbolic.checking import Check, check
from fastaxis.engines.symbolic.common_phase import plainest_phase, without_common_phase
from fastaxis.engines.symbolic.coordinates import check_asked
from fastaxis.engines.symbolic.expressions import written
from fastaxis.engines.symbolic.field import Field, Pair
from fastaxis.engines.symbolic.functions import NumericForm
from fastaxis.engines.symbolic.presentations import compact, exponential, harmonics, series
from fastaxis.engines.symbolic.presentations.reality import made_real
from fastaxis.engines.symbolic.presentations.shortness import length
from fastaxis.engines.symbolic.ring import ExactMaths, Poly
from fastaxis.engines.symbolic.ring.roots import split_square
from fastaxis.engines.symbolic.showing import Shown
from fastaxis.engines.symbolic.slopes import derivative
from fastaxis.errors import SymbolError
from fastaxis.light import Beam

__all__ = ["Form", "Part"]


@dataclass(frozen=True)
class Part:
    """One incoherent part of the light: its share of the power, its beam, and the field it arrives as."""

    weight: Any
    beam: Beam
    field: Field


@dataclass(frozen=True, eq=False, repr=False)
class Form(Shown):
    """The light at a port, exact, as Jones vector, Stokes parameters and frames.

    All quantities are relative to ``envelope``: where the light is one mode, its function of r is kept apart, the
    field is envelope * jones [sqrt(W)/m] and a frame in W/m^2 is |envelope|^2 * frame. Where modes differ between
    polarizations the envelope is sqrt(power) and the modes are in the Jones vector.

    Parameters
    ----------
    train, target : what was asked.
    parts : mutually incoherent parts.
    source_power : of the laser [W].
    letters : the user's letters.
    looped : whether light comes back to where it was on its way, so that all its trips are summed.
    """

    train: Any
    target: str
    parts: tuple[Part, ...]
    source_power: Any
    letters: frozenset[Any]
    looped: bool = False

    def __repr__(self) -> str:
        letters = ", ".join(sorted(str(letter) for letter in self.letters)) or "none"
        return f"<Form: light at {self.target}, letters {letters}; form.jones(), form.stokes, form.frame(angle)>"

    # --- the exact data ---------------------------------------------------------------------------------------------
    @cached_property
    def _factored(self) -> bool:
        """Whether all the light has one and the same function of the plane."""
        return len({tuple(wave for wave, _ in part.field.pieces) for part in self.parts}) == 1 and all(
            len(part.field.pieces) == 1 for part in self.parts
        )

    @cached_property
    def pairs(self) -> tuple[tuple[Poly, Pair], ...]:
        """((weight, (E_L, E_R)), ...) in the ring, relative to the envelope; powers add."""
        maths = self.parts[0].field.place.maths
        found = []
        for part in self.parts:
            pair = part.field.pieces[0][1] if self._factored else part.field.whole
            weight = maths.number(part.weight) * maths.ring.rational(part.field.scale)
            found.append((weight, pair))
        return tuple(found)

    @property
    def envelope(self) -> Any:
        """The common factor of the field [sqrt(W)/m]; long quantities in it are named in ``meanings``."""
        root = sp.sqrt(_plain(self.source_power))
        if not self._factored:
            return root
        wave, _ = self.parts[0].field.pieces[0]
        return root * written(wave.poly(self.parts[0].field.place))

    @property
    def meanings(self) -> dict[Any, Any]:
        """What the names in the form stand for (beam radius, Gouy phase ...)."""
        for part in self.parts:
            for wave, _ in part.field.pieces:
                wave.poly(part.field.place)
        return dict(self.parts[0].field.place.letters.meanings)

    # --- quantities -------------------------------------------------------------------------------------------------
    def jones(self, basis: str = "linear", *, global_phase: bool = False, way: str = "compact") -> Any:
        """The Jones vector as a sympy column: (Ex, Ey), or (E_L, E_R) with ``basis="circular"``.

        Without ``global_phase`` a phase that is the same for both components and everywhere in the plane is dropped.

        Raises
        ------
        SymbolError : the light is a mixture and has no Jones vector.
        """
        pair = self._only_pair()
        scale = self.parts[0].field.scale
        if not global_phase:
            pair = without_common_phase(pair, halfway=basis == "linear")
        if basis == "linear":
            (left, right), root, i = pair, self._maths.ring.surd(scale / 2), self._maths.number(1j)
            pair = ((left + right) * root, (left - right) * root * i)
        elif basis == "circular":
            root = self._maths.ring.surd(scale)
            pair = (pair[0] * root, pair[1] * root)
        else:
            raise SymbolError(
                "a Jones vector is written in one of two bases", got=f'basis="{basis}"', fix='basis="circular"'
            )
        if not global_phase:
            pair = plainest_phase(pair)
        return sp.Matrix([self._present(poly, way) for poly in pair])

    def stokes_polys(self) -> tuple[Poly, ...]:
        """(S0, S1, S2, S3) in the ring, relative to |envelope|^2; S3 = I_R - I_L."""
        zero, i = self._maths.ring.zero, self._maths.number(1j)
        total = [zero] * 4
        for weight, (left, right) in self.pairs:
            power_left, power_right, cross = left.abs2(), right.abs2(), left.conj() * right
            # S1 + i S2 = 2 conj(E_L) E_R.
            for n, part in enumerate(
                (
                    power_left + power_right,
                    cross + cross.conj(),
                    (cross.conj() - cross) * i,
                    power_right - power_left,
                )
            ):
                total[n] = total[n] + part * weight
        return tuple(total)

    @property
    def stokes(self) -> Any:
        """(S0, S1, S2, S3) as a sympy column, relative to |envelope|^2."""
        return sp.Matrix([self._present(poly, "compact") for poly in self.stokes_polys()])

    def frame_poly(self, setting: Any) -> Poly:
        """The frame of a setting in the ring, relative to |envelope|^2."""
        check_asked(self.letters, setting)
        total = self._maths.ring.zero
        for weight, pair in self.pairs:
            scale, amplitudes = behind(setting, pair, self._maths)
            for amplitude in amplitudes:
                total = total + amplitude.abs2() * weight * self._maths.ring.rational(scale)
        return total

    def frame(self, setting: Any, way: str = "compact", **options: Any) -> Any:
        """The frame behind an analyzer, relative to |envelope|^2.

        Parameters
        ----------
        setting : angle of a linear analyzer [rad] (a letter or a number), a State, or a camera setting.
        way : "compact", "exponential", "harmonics" (give ``angle``) or "series" (give ``small`` and ``order``).
        """
        found = self._present(self.frame_poly(setting), way, **options)
        square = self._square(setting) if way == "compact" else None
        return found if square is None else min(found, square, key=length)

    def _square(self, setting: Any) -> Any:
        """The frame as the square of its amplitude, where there is one and it is real, else None."""
        if len(self.pairs) > 1:
            return None
        ((weight, pair),) = self.pairs
        scale, amplitudes = behind(setting, pair, self._maths)
        real = made_real(amplitudes[0]) if len(amplitudes) == 1 else None
        if real is None:
            return None
        share = weight * self._maths.ring.rational(scale)
        if share.is_rational and not split_square(share.value)[1]:
            return compact(real * self._maths.ring.surd(share.value)) ** 2
        return compact(share) * compact(real) ** 2

    @property
    def power(self) -> Any:
        """Power at the port [W]."""
        from fastaxis.engines.symbolic.totals import total_power  # noqa: PLC0415  # it is made of forms

        return total_power(self)

    @property
    def irradiance(self) -> Any:
        """All light, no analyzer [W/m^2]."""
        return self.scale * self.stokes[0]

    @property
    def scale(self) -> Any:
        """|envelope|^2 [W/m^2], or the power [W] where the modes are in the Jones vector."""
        size = _plain(self.source_power)
        if not self._factored:
            return size
        wave, _ = self.parts[0].field.pieces[0]
        return size * compact(wave.poly(self.parts[0].field.place).abs2())

    # --- answers ----------------------------------------------------------------------------------------------------
    def analyzer_angles(self) -> AnalyzerAngles:
        """Angles of a linear analyzer that give the brightest and the darkest frame."""
        return analyzer_angles(self.stokes_polys())

    def lobes(self, setting: Any) -> Lobes:
        """Number, place and turning rate of the lobes around the axis; ``setting`` is the analyzer's letter."""
        return lobes(self.frame_poly(setting), setting)

    def dark_when(self, angle: Any, setting: Any = None) -> Branches:
        """Values of an angle that make the frame of a setting dark, or the port itself without one."""
        check_asked(self.letters, angle, setting)
        polys = [poly for weight, pair in self.pairs for poly in self._amplitudes(setting, pair)]
        return dark_when(tuple(polys), angle)

    def derivative(self, setting: Any, parameter: Any) -> Any:
        """Slope of the frame with a parameter, exact."""
        check_asked(self.letters, parameter)
        return compact(derivative(self.frame_poly(setting), parameter))

    def mistakes(self, setting: Any, small: Sequence[Any]) -> tuple[Mistake, ...]:
        """Small errors ranked by the order in which they change the frame, and where they do."""
        check_asked(self.letters, *small)
        return ranked_mistakes(self.frame_poly(setting), small)

    def share(self, mode: Any) -> Any:
        """Share of the laser's power in a Laguerre-Gauss mode, in either polarization; the mode may have letters."""
        return self._shared(lambda field: mode_share(field, mode))

    def charge_share(self, charge: Any) -> Any:
        """Share of the laser's power that turns with exp(i charge phi)."""
        return self._shared(lambda field: charge_share(field, charge))

    def _shared(self, share: Any) -> Any:
        maths, total = self._maths, self._maths.ring.zero
        for part in self.parts:
            total = total + maths.number(part.weight) * share(part.field)
        return compact(total)

    def _amplitudes(self, setting: Any, pair: Pair) -> tuple[Poly, ...]:
        return pair if setting is None else behind(setting, pair, self._maths)[1]

    # --- numbers ----------------------------------------------------------------------------------------------------
    def to_function(
        self, quantity: str = "stokes", *arguments: Any, absolute: bool = False, **options: Any
    ) -> NumericForm:
        """A quantity as a numpy function of the letters, of r [m] and phi [rad].

        Parameters
        ----------
        quantity : "stokes", "jones", "frame" (with its setting), "irradiance" or "power".
        absolute : multiply Stokes parameters and frames by |envelope|^2, so that they are in W/m^2.

        Examples
        --------
        ``form.to_function("frame", theta)(alpha=0.3, theta=0.1, r=0, phi=np.linspace(0, 6.28, 100))``
        """
        value = self._value(quantity, *arguments, **options)
        if absolute and quantity in ("stokes", "frame"):
            value = value * self.scale
        return NumericForm(self.spelled_out(value))

    def check(self, *, points: int = 24, seed: int = 1) -> Check:
        """The form beside numbers at random admissible points: the largest deviation, in roundings."""
        return check(self, points=points, seed=seed)

    # --- comparisons ------------------------------------------------------------------------------------------------
    def equals(self, other: Form) -> bool:
        """Whether another form of the same letters has the same Stokes parameters, decided exactly."""
        ring = self._maths.ring
        return all(one == ring.adopted(two) for one, two in zip(self.stokes_polys(), other.stokes_polys(), strict=True))

    # --- helpers ----------------------------------------------------------------------------------------------------
    @property
    def _maths(self) -> ExactMaths:
        return self.parts[0].field.place.maths

    def _only_pair(self) -> Pair:
        if len(self.pairs) != 1:
            raise SymbolError(
                "a mixture has no Jones vector, only Stokes parameters",
                got=f"{self.target}: light of {len(self.pairs)} incoherent parts",
                fix="form.stokes",
            )
        return self.pairs[0][1]

    def _present(self, poly: Poly, way: str, **options: Any) -> Any:
        ways: dict[str, tuple[Any, str, str]] = {
            "compact": (compact, "", ""),
            "exponential": (exponential, "", ""),
            "harmonics": (harmonics, "angle", ", angle=theta"),
            "series": (series, "small", ", small=[epsilon], order=2"),
        }
        if way not in ways:
            raise SymbolError(f"forms are written {', '.join(ways)}", got=f'way="{way}"', fix='way="compact"')
        write, needs, example = ways[way]
        if bool(needs) != (needs in options) or not options.keys() <= {needs, "order"}:
            raise SymbolError(
                f'way="{way}" takes {needs or "no letters"}',
                got=", ".join(options) or "none",
                fix=f'way="{way}"{example}',
            )
        return write(poly, **options)

    def harmonics(self, setting: Any, angle: Any) -> dict[Any, tuple[Any, Any]]:
        """The frame as a Fourier sum in an angle: {n: (cosine coefficient, sine coefficient)}."""
        check_asked(self.letters, angle)
        return harmonics(self.frame_poly(setting), angle)

    def series(self, setting: Any, small: Sequence[Any], order: int = 2) -> Any:
        """The frame to a total order in small symbols."""
        check_asked(self.letters, *small)
        return series(self.frame_poly(setting), small, order)


def _plain(value: Any) -> Any:
    return sp.nsimplify(value, rational=True) if isinstance(value, float) else sp.sympify(value)
