"""What stands in front of the camera: a state that passes, or a plate and a polarizer with their flaws."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING, Any

import numpy as np
from numpy.typing import NDArray

from fastaxis import checks
from fastaxis.errors import ParameterError, SymbolError
from fastaxis.laws import Amplitude, AxisLaw, CircularLaw, ScalarLaw
from fastaxis.light.states import State
from fastaxis.maths import NUMBERS, Scalar, free_symbols, is_symbolic

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

    from fastaxis.laws import Law

__all__ = [
    "Setting",
    "as_setting",
    "as_settings",
    "no_analyzer",
    "plate_then_polarizer",
    "polarizer_at",
]

Laws = tuple[AxisLaw | CircularLaw | ScalarLaw, ...]
_NAMED = ("H", "V", "D", "A", "R", "L")  # states of this name stand in fastaxis itself
_FIX = 'train.expose("cam", fa.SIX_STATES)'


@dataclass(frozen=True)
class Setting:
    """One analyzer setting: a state that passes, or uniform laws in the order the light meets them.

    The power behind it is ``weights`` . (S0, S1, S2, S3). For a state with the vector (1, a1, a2, a3) on the
    Poincare sphere the weights are half of that vector; for laws with the Jones matrix J they are the first row
    of its Mueller matrix, weights_k = tr(J^H J sigma_k) / 2.

    Parameters
    ----------
    label : name of the setting, as in ``shots.frame(label)``. "R" and "L" are the receiver's names.
    laws : laws of the analyzer; none for all light.
    state : the state that passes without loss, its orthogonal one being blocked. Not together with ``laws``.

    Raises
    ------
    ParameterError : an empty label; laws and a state together; a law that varies over the plane.
    SymbolError : ``weights`` asked while letters are left in the angles.

    Examples
    --------
    >>> from fastaxis.light.states import R
    >>> Setting("R", state=R).weights
    array([0.5, 0. , 0. , 0.5])
    """

    label: str
    laws: Laws = ()
    state: State | None = None

    def __post_init__(self) -> None:
        if not isinstance(self.label, str) or not self.label:
            raise ParameterError(
                "a setting has a label of at least one character", got=f"Setting: label = {self.label!r}", fix='"H"'
            )
        if self.laws and self.state is not None:
            raise ParameterError(
                "a setting is either a state that passes or the laws of an analyzer",
                got=f"{self.label}: {len(self.laws)} laws and a state",
                fix="fa.Setting('H', state=fa.H)",
            )
        for law in self.laws:
            _check_uniform(self.label, law)

    @property
    def symbols(self) -> set[Any]:
        """The letters left in the angles and transmissions."""
        values = [v for law in self.laws for v in law.values]
        if self.state is not None:
            values += [self.state.azimuth, self.state.ellipticity]
        return free_symbols(values)

    @cached_property
    def weights(self) -> NDArray[np.float64]:
        """(m0, m1, m2, m3) of the power m . S behind the analyzer, S3 in the receiver's view; shape (4,)."""
        if self.symbols:
            raise SymbolError(
                "a frame needs numbers; letters are for train.derive",
                got=f"setting '{self.label}': {', '.join(sorted(map(str, self.symbols)))} left open",
                fix="fa.linear(30*deg)",
            )
        weights = self._state_weights() if self.state is not None else self._law_weights()
        weights.flags.writeable = False
        return weights

    def _state_weights(self) -> NDArray[np.float64]:
        assert self.state is not None
        return np.asarray(self.state.stokes, float) / 2

    def _law_weights(self) -> NDArray[np.float64]:
        jones = np.eye(2, dtype=complex)
        for law in self.laws:
            jones = _matrix(law) @ jones
        passed = jones.conj().T @ jones
        # E^H A E = (A00+A11)/2 S0 + (A00-A11)/2 S1 + Re A01 S2 + Im A01 S3, with S3 = 2 Im(Ex Ey*).
        return np.array(
            [
                (passed[0, 0] + passed[1, 1]).real / 2,
                (passed[0, 0] - passed[1, 1]).real / 2,
                passed[0, 1].real,
                passed[0, 1].imag,
            ]
        )

    def power(self, stokes: Any) -> Any:
        """Power behind the analyzer for a Stokes vector or map (4, ...), in the same unit."""
        return np.tensordot(self.weights, np.asarray(stokes, float), axes=1)


def _check_uniform(label: str, law: Law) -> None:
    if not isinstance(law, AxisLaw | CircularLaw | ScalarLaw) or not law.uniform:
        raise ParameterError(
            "the laws of an analyzer setting are uniform; a patterned part belongs into the train",
            got=f"{label}: {type(law).__name__} varies over the plane",
            fix='train.join("qplate.back", "cam")',
        )


def _matrix(law: AxisLaw | CircularLaw | ScalarLaw) -> NDArray[Any]:
    if isinstance(law, ScalarLaw):
        return np.eye(2) * law.transmission.number()
    return np.array(law.linear(NUMBERS), complex)


def no_analyzer(label: str = "no analyzer") -> Setting:
    """All light: nothing stands in front of the camera.

    >>> no_analyzer().weights
    array([1., 0., 0., 0.])
    """
    return Setting(label)


def polarizer_at(
    axis: Scalar, extinction: Scalar = math.inf, *, transmission: Scalar = 1.0, label: str = ""
) -> Setting:
    """A real polarizer in front of the camera.

    Parameters
    ----------
    axis : transmission axis [rad], counter-clockwise from x facing the source.
    extinction : power passed along the axis over power passed across it, 1 or more; infinite for an ideal one.
    transmission : share of the power passed along the axis [0 .. 1].

    Raises
    ------
    ParameterError : extinction below 1, transmission above 1, an angle in degrees.

    Examples
    --------
    >>> polarizer_at(0, extinction=100).weights
    array([0.505, 0.495, 0.   , 0.   ])
    """
    return Setting(label or f"polarizer {_degrees(axis)}", (_polarizer(axis, extinction, transmission),))


def plate_then_polarizer(
    *,
    fast: Scalar | None = None,
    slow: Scalar | None = None,
    retardance: Scalar = math.pi / 2,
    axis: Scalar = 0.0,
    extinction: Scalar = math.inf,
    transmission: Scalar = 1.0,
    label: str = "",
) -> Setting:
    """A wave plate followed by a polarizer; the light meets the plate first.

    With a quarter-wave plate and ``axis=0`` the state R passes at ``fast=-45*deg`` and L at ``fast=+45*deg``.

    Parameters
    ----------
    fast, slow : angle of the plate's fast or slow axis [rad]; one of them.
    retardance : of the plate [rad].
    axis : transmission axis of the polarizer [rad].
    extinction : power passed along the axis over power passed across it, 1 or more.
    transmission : share of the power passed by the pair at its best [0 .. 1].
    label : name of the setting; made from the angles if left empty.

    Raises
    ------
    ParameterError : both or neither of ``fast`` and ``slow``, an angle in degrees, extinction below 1.

    Examples
    --------
    >>> from fastaxis.units import deg
    >>> plate_then_polarizer(fast=-45*deg, axis=0*deg).weights.round(12) + 0.
    array([0.5, 0. , 0. , 0.5])
    """
    if (fast is None) == (slow is None):
        raise ParameterError(
            "a plate has its axis named once, as fast= or as slow=",
            got=f"plate_then_polarizer: fast = {fast}, slow = {slow}",
            fix="fast=45*deg",
        )
    named, angle = ("fast", fast) if slow is None else ("slow", slow)
    checks.degrees_missed("plate_then_polarizer", named, angle)
    angle = checks.angle("plate_then_polarizer", named, angle)
    half = checks.angle("plate_then_polarizer", "retardance", retardance) / 2
    plate = AxisLaw(Amplitude(1.0, -half), Amplitude(1.0, half), angle if named == "fast" else angle - math.pi / 2)
    label = label or f"plate {named} {_degrees(angle)}, polarizer {_degrees(axis)}"
    return Setting(label, (plate, _polarizer(axis, extinction, transmission)))


def _polarizer(axis: Scalar, extinction: Scalar, transmission: Scalar) -> AxisLaw:
    checks.degrees_missed("polarizer", "axis", axis)
    axis = checks.angle("polarizer", "axis", axis)
    transmission = checks.fraction("polarizer", "transmission", transmission, fix="transmission=0.9")
    leak = 0.0 if extinction == math.inf else transmission / _extinction(extinction)
    return AxisLaw(Amplitude(transmission), Amplitude(leak), axis)


def _extinction(value: Any) -> Scalar:
    value = checks.number("polarizer", "extinction", value, fix="extinction=1e5")
    if not is_symbolic(value) and value < 1:
        raise ParameterError(
            "extinction is power passed along the axis over power passed across it, 1 or more",
            got=f"polarizer: extinction = {value:g}",
            fix=f"extinction={1 / value:g}" if value > 0 else "extinction=1e5",
        )
    return value


def _degrees(angle: Scalar) -> str:
    return str(angle) if is_symbolic(angle) else f"{math.degrees(angle):.6g}°"


def as_setting(setting: Setting | State) -> Setting:
    """A state as the setting that lets it pass; a setting as it is.

    Raises
    ------
    ParameterError : neither a state nor a setting.
    """
    if isinstance(setting, Setting):
        return setting
    if isinstance(setting, State):
        return Setting(setting.label or _state_label(setting), state=setting)
    raise ParameterError(
        "a setting is a state that passes (fa.H, fa.linear(30*deg)) or an analyzer (fa.plate_then_polarizer(...))",
        got=f"setting {setting!r}",
        fix=f"fa.{setting}" if isinstance(setting, str) and setting in _NAMED else "fa.linear(30*deg)",
    )


def _state_label(state: State) -> str:
    if not is_symbolic(state.ellipticity) and state.ellipticity == 0:
        return _degrees(state.azimuth)
    return f"{_degrees(state.azimuth)}, {_degrees(state.ellipticity)}"


def as_settings(settings: Setting | State | Iterable[Setting | State]) -> tuple[Setting, ...]:
    """One or several states or settings as a tuple of settings.

    Raises
    ------
    ParameterError : none at all, or one of them is neither a state nor a setting.
    """
    if isinstance(settings, Setting | State):
        settings = (settings,)
    if isinstance(settings, str) or not hasattr(settings, "__iter__"):
        raise ParameterError(
            "settings are states or analyzers, not their labels", got=f"expose: settings = {settings!r}", fix=_FIX
        )
    found = tuple(as_setting(one) for one in settings)
    if not found:
        raise ParameterError("a camera needs at least one setting to expose", got="expose: no settings", fix=_FIX)
    return found


def weight_matrix(settings: Sequence[Setting]) -> NDArray[np.float64]:
    """The instrument matrix: one row of weights a setting, shape (n, 4), S3 in the receiver's view."""
    return np.array([setting.weights for setting in settings])
