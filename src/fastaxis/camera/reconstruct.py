"""From frames back to Stokes images: least squares with an assumed instrument, and the rotating plate's harmonics."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field
from typing import Any

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.settings import Setting, as_settings, weight_matrix
from fastaxis.errors import ParameterError
from fastaxis.light.states import State
from fastaxis.light.stokes import degree_of_polarization

__all__ = ["PlateHarmonics", "Reconstruction", "condition_number", "plate_harmonics", "reconstruct"]

Settings = Iterable[Setting | State]
# Weights are of order one and carry a few roundings each: what lies below this share is not measured.
_RANK = 64 * np.finfo(float).eps


@dataclass(frozen=True, kw_only=True)
class Reconstruction:
    """Stokes images reduced from frames.

    Parameters
    ----------
    stokes : (4, ...) in the unit of the frames, S3 = I_R - I_L in the receiver's view.
    residual : root mean square over the frames of measured minus explained, shape (...); zero if the assumed
        instrument explains the frames exactly.
    condition : largest over smallest singular value of the assumed instrument matrix; sqrt(3) at best.
    """

    stokes: NDArray[np.float64] = field(repr=False)
    residual: NDArray[np.float64] = field(repr=False)
    condition: float

    @property
    def degree(self) -> NDArray[np.float64]:
        """Degree of polarization sqrt(S1^2 + S2^2 + S3^2) / S0; 0 where there is no light."""
        return degree_of_polarization(self.stokes)


def condition_number(settings: Settings) -> float:
    """How much a set of settings may enlarge relative errors: largest over smallest singular value.

    Infinite if some Stokes component is not measured at all. No set of settings is better than sqrt(3).
    D. S. Sabatke et al., Opt. Lett. 25, 802 (2000).

    >>> from fastaxis.camera.sets import SIX_STATES
    >>> round(condition_number(SIX_STATES) ** 2, 9)
    3.0
    """
    values = _singular_values(weight_matrix(as_settings(settings)))
    return float(values[0] / values[-1]) if values[-1] > _RANK * values[0] else float("inf")


def _singular_values(matrix: NDArray[np.float64]) -> NDArray[np.float64]:
    return np.asarray(np.linalg.svd(np.vstack([matrix, np.zeros((max(0, 4 - len(matrix)), 4))]), compute_uv=False))


def reconstruct(frames: Any, settings: Settings) -> Reconstruction:
    """Stokes images from the frames of any set of settings, by least squares.

    The settings are those the *reduction* assumes. Given other settings than the frames were made with (a plate of
    90 deg where the true one had 85 deg), the result shows what that mistake does.

    Parameters
    ----------
    frames : (n, ...) one frame, or one power, for each setting.
    settings : the assumed instrument, n settings.

    Raises
    ------
    ParameterError : as many frames as settings are not there; the settings do not measure all four components.

    Examples
    --------
    >>> from fastaxis.camera.sets import four_frames
    >>> reconstruct([0.5, 0.5, 0.5, 1.0], four_frames()).stokes.round(12) + 0.
    array([1., 0., 0., 1.])
    """
    analyzers = as_settings(settings)
    measured = _checked_frames(frames, len(analyzers))
    matrix = weight_matrix(analyzers)
    _refuse_singular(matrix)
    flat = measured.reshape(len(measured), -1)
    stokes = np.linalg.pinv(matrix) @ flat
    missed = np.sqrt(np.mean((flat - matrix @ stokes) ** 2, axis=0))
    values = _singular_values(matrix)
    return Reconstruction(
        stokes=stokes.reshape(4, *measured.shape[1:]),
        residual=missed.reshape(measured.shape[1:]),
        condition=float(values[0] / values[-1]),
    )


def _checked_frames(frames: Any, count: int) -> NDArray[np.float64]:
    measured = np.asarray(frames, float)
    if measured.ndim == 0 or len(measured) != count:
        got = "one number" if measured.ndim == 0 else f"{len(measured)} frames"
        raise ParameterError(
            "each frame has its setting", got=f"reconstruct: {got} for {count} settings", fix=f"frames[:{count}]"
        )
    return measured


def _refuse_singular(matrix: NDArray[np.float64]) -> None:
    values = _singular_values(matrix)
    rank = int((values > _RANK * values[0]).sum())
    if rank == 4:
        return
    # The direction that no setting sees, named by its largest component.
    blind = np.linalg.svd(np.vstack([matrix, np.zeros((4, 4))]))[2][-1]
    raise ParameterError(
        f"four Stokes components need four independent settings, and these do not see S{int(np.argmax(np.abs(blind)))}",
        got=f"reconstruct: {len(matrix)} settings of rank {rank}",
        fix="fa.rotating_plate(8)",
    )


@dataclass(frozen=True, kw_only=True)
class PlateHarmonics:
    """Fourier amplitudes of the power behind a rotating plate, for the fast axis at t from the analyzer.

    I(t) = (A + B sin 2t + E cos 2t + C cos 4t + D sin 4t) / 2. A perfect plate gives E = 0: what is
    found there measures an error of the plate's zero (or a plate that wedges or absorbs).

    Parameters
    ----------
    A, B, C, D : amplitudes, in the unit of the frames.
    cos2 : E.
    """

    A: Any
    B: Any
    C: Any
    D: Any
    cos2: Any

    def stokes(self) -> NDArray[np.float64]:
        """(S0, S1, S2, S3) for a quarter-wave plate: A - C, 2C, 2D and -B, in the receiver's view.

        The sign of S3 belongs to fast axes and to S3 = I_R - I_L with R = (1,-i)/sqrt2.
        """
        return np.array([self.A - self.C, 2 * self.C, 2 * self.D, -self.B])


def plate_harmonics(frames: Any, fast: Any) -> PlateHarmonics:
    """Harmonics of the frames taken while a plate turns in front of an analyzer at 0.

    Parameters
    ----------
    frames : (n, ...), n >= 5.
    fast : (n,) angles of the fast axis [rad], in equal steps over half a turn or a whole number of half turns.

    Raises
    ------
    ParameterError : fewer than 5 frames, or angles not in equal steps over half turns: sums would mix harmonics.

    Notes
    -----
    B. Schaefer et al., Am. J. Phys. 75, 163 (2007); there B = +S3, a matter of the signs chosen.

    Examples
    --------
    >>> t = np.arange(8) * np.pi / 8
    >>> plate_harmonics(0.5 * (1 - np.sin(2 * t)), t).stokes().round(12) + 0.
    array([1., 0., 0., 1.])
    """
    angles = np.asarray(fast, float)
    measured = _checked_frames(frames, len(angles))
    _check_steps(angles)

    def amplitude(wave: NDArray[np.float64]) -> NDArray[np.float64]:
        return np.asarray(np.tensordot(wave, measured, axes=1) * (4 / len(angles)))

    return PlateHarmonics(
        A=amplitude(np.ones(len(angles))) / 2,
        B=amplitude(np.sin(2 * angles)),
        C=amplitude(np.cos(4 * angles)),
        D=amplitude(np.sin(4 * angles)),
        cos2=amplitude(np.cos(2 * angles)),
    )


def _check_steps(angles: NDArray[np.float64]) -> None:
    # The sums are exact if and only if the harmonics up to twice the fourth average to nothing over the angles.
    leaks = max(abs(np.exp(2j * k * angles).mean()) for k in range(1, 5))
    # Roundings of n angles and phasors average out; 1e-12 is far above them and far below any real step error.
    if len(angles) < 5 or leaks > 1e-12:
        raise ParameterError(
            "the harmonics need 5 or more angles in equal steps over whole half turns",
            got=f"plate_harmonics: {len(angles)} angles",
            fix="fast=[k * 22.5*deg for k in range(8)]",
        )
