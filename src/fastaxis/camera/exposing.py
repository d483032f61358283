"""From a train to the pictures its camera takes."""

from __future__ import annotations

from dataclasses import fields as fields_of
from dataclasses import replace
from functools import reduce
from itertools import count
from typing import TYPE_CHECKING, Any, TypeAlias, overload

import numpy as np
from numpy.typing import NDArray

from fastaxis.camera.arrival import arrival
from fastaxis.camera.exposure import Exposure
from fastaxis.camera.room import check_room
from fastaxis.camera.settings import Setting, as_settings, weight_matrix
from fastaxis.elements.camera import Camera
from fastaxis.elements.detector import Detector
from fastaxis.errors import ParameterError
from fastaxis.light.raster import Raster
from fastaxis.light.states import State
from fastaxis.loader import late

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Sequence

    Settings: TypeAlias = Setting | State | Iterable[Setting | State]

__all__ = ["expose", "merge_guards", "recorded", "sensor_at"]


@overload
def expose(
    train: Any, target: str, settings: Settings, *, grid: Any = ..., engine: str = ..., precision: str = ...
) -> Exposure: ...
@overload
def expose(
    train: Any, target: Sequence[str], settings: Settings, *, grid: Any = ..., engine: str = ..., precision: str = ...
) -> tuple[Exposure, ...]: ...
def expose(
    train: Any,
    target: str | Sequence[str],
    settings: Settings,
    *,
    grid: Any = None,
    engine: str = "auto",
    precision: str = "double",
) -> Exposure | tuple[Exposure, ...]:
    """Take one frame for each analyzer setting, all on one scale.

    The light is propagated once, whatever the number of settings: the camera plane is kept as four Stokes images,
    W per pixel, light being collected over the whole square of a pixel. Mutually incoherent parts of the source
    add there. A frame is then the weighted sum of the four images.

    The camera's ``centre`` is the place of the middle of its sensor in the beam's plane [m]. Its ``orientation`` turns
    or mirrors the picture *after* that; states keep the names of the beam's own frame, so that H and the analyzer
    angles mean the same whichever way the camera is mounted. ``shots.upright`` sets the picture upright again.
    A detector gives frames of one pixel that hold all the power.

    On a grid, an edge scatters a little light to steeper angles than the samples hold: it is in ``train.power``, in a
    detector's frames and in ``shots.guard.discarded``, but in no picture of a camera. Above 1 % there is a
    SamplingWarning that names a finer grid.

    Parameters
    ----------
    train : the bench.
    target : name of a Camera or Detector, as in "cam"; or several names, which give as many exposures. What the ways
        to several sensors have in common is propagated once.
    settings : states that pass (fa.SIX_STATES, fa.linear(30*deg)) or analyzers (fa.plate_then_polarizer(...)).
    grid : sampling set by hand (fa.Grid); chosen by the plan if left out.
    engine : "auto", or the name of an engine.
    precision : "double", or "single" for samples and frames of half the memory; frames are then right to about 1e-6
        of their peak. Only the grid engine has samples; the others take no notice.

    Raises
    ------
    ParameterError : no settings; a setting that is neither state nor analyzer; a target that takes no pictures; a
        sensor whose pictures don't fit into memory.
    SymbolError : a letter left open in a setting or in the train.

    Examples
    --------
    >>> import fastaxis as fa
    >>> from fastaxis.units import deg, mm, mW, nm
    >>> train = fa.Train(wavelength=633*nm)
    >>> _ = train.along(fa.Laser(waist=1*mm, power=4*mW, state=fa.H), fa.Detector(name="bucket"))
    >>> shots = expose(train, "bucket", [fa.linear(30*deg), fa.V])
    >>> round(shots.power(0) / mW, 9), shots.power("V")
    (3.0, 0.0)
    """
    analyzers = as_settings(settings)
    weight_matrix(analyzers)  # letters are refused before anything is computed
    targets = (target,) if isinstance(target, str) else tuple(target)
    plan = late("plan", "make_plan")
    plans = [plan(train, name, grid=grid, engine=engine) for name in targets]
    if precision != "double":
        plans = [one.with_precision(precision) for one in plans]
    sensors = [sensor_at(train, name) for name in targets]  # refused before anything is propagated
    check_room(", ".join(targets), [sensor.shape for sensor in sensors if isinstance(sensor, Camera)])
    with late("engines.content", "large_arrays_once")():
        lights = _lights(plans, sensors)
        shots = [_shot(train, *taken, analyzers) for taken in zip(targets, plans, lights, strict=True)]
    return shots[0] if isinstance(target, str) else tuple(shots)


def _lights(plans: Sequence[Any], sensors: Sequence[Camera | Detector]) -> Iterator[Any]:
    """What sensors see of the light at the targets of plans: pictures of earlier questions, or the light itself."""
    seen = [
        late("engines.pictures", "remembered")(plan, _raster(sensor), alone=len(plans) == 1)
        if isinstance(sensor, Camera)
        else None
        for plan, sensor in zip(plans, sensors, strict=True)
    ]
    followed = _followed([plan for plan, known in zip(plans, seen, strict=True) if known is None])
    return (next(followed) if known is None else known for known in seen)


def _followed(plans: Sequence[Any]) -> Iterator[Any]:
    if len(plans) > 1:
        yield from late("engines.sharing", "Relay")().propagate(plans)
    else:
        yield from map(late("engines", "propagate"), plans)


def _shot(train: Any, target: str, plan: Any, fields: Sequence[Any], analyzers: tuple[Setting, ...]) -> Exposure:
    sensor = sensor_at(train, target)
    stokes, x, y = recorded(fields, sensor)
    return Exposure(
        stokes=stokes,
        settings=analyzers,
        x=x,
        y=y,
        pixel=sensor.pixel if isinstance(sensor, Camera) else None,
        wavelength=float(plan.wavelength),
        name=str(getattr(train, "name", "")),
        target=target,
        orientation=getattr(sensor, "orientation", "upright"),
        guard=merge_guards([field.guard for field in fields]),
        plan=str(plan),
        sent=float(plan.source.power),
        arrival=arrival(plan, fields, stokes.nbytes),
        sensor=getattr(sensor, "sensor", None),
        exposure_time=getattr(sensor, "exposure_time", None),
    )


def sensor_at(train: Any, target: str) -> Camera | Detector:
    """The camera or detector that a target names.

    Raises
    ------
    ParameterError : it names something that takes no pictures.
    """
    sensor = train.elements.get(target.split(".", maxsplit=1)[0])
    if isinstance(sensor, Camera | Detector):
        return sensor
    raise ParameterError(
        "pictures are taken by a Camera and powers by a Detector",
        got=f"expose: target '{target}' ({'no such part' if sensor is None else type(sensor).__name__})",
        fix=_sensor_meant(train, target),
    )


def _sensor_meant(train: Any, target: str) -> str:
    """Code for a camera at the port that was asked; where light goes on from there, for one the train has."""
    free = train.open_ports()
    asked = [port for port in free if target in {port, port.split(".", maxsplit=1)[0]}]
    if not asked and train.cameras:
        return f'train.expose("{train.cameras[0]}", fa.SIX_STATES)'
    name = next(f"cam{n}" for n in count(2) if f"cam{n}" not in train.elements)
    camera = f'fa.Camera(pixel=3.45*um, shape=(512, 512), name="{name}")'
    ports = asked or free
    return f'train.along("{ports[0]}", {camera})' if ports else f"train.add({camera})"


def recorded(
    fields: Sequence[Any], sensor: Camera | Detector
) -> tuple[NDArray[np.float64], NDArray[np.float64], NDArray[np.float64]]:
    """What a sensor sees of mutually incoherent fields: (stokes, x, y).

    Stokes images [W per pixel], shape (4, ny, nx), in the sensor's picture; and its columns and rows [m].
    """
    if isinstance(sensor, Camera):
        return _picture(fields, sensor)
    totals = np.asarray(sum(field.total_stokes for field in fields))
    return totals[:, None, None], np.zeros(1), np.zeros(1)


def _picture(fields: Sequence[Any], camera: Camera) -> tuple[NDArray[Any], NDArray[Any], NDArray[Any]]:
    seen = _raster(camera)
    stokes = reduce(np.add, (field.stokes_on(seen) for field in fields))
    return np.ascontiguousarray(camera.oriented(stokes)), *_shown_axes(camera, seen)


def _raster(camera: Camera) -> Raster:
    cx, cy = camera.centre
    return Raster(camera.pixel, camera.seen, (float(cx), float(cy)))


def _shown_axes(camera: Camera, seen: Raster) -> tuple[NDArray[Any], NDArray[Any]]:
    """Column and row coordinates in the camera's picture, the axis of the beam being at (0, 0)."""
    # A 2 x 2 picture of the value x + 2y tells which of the beam's axes runs along the columns, and which way.
    probe = camera.oriented(np.array([[0, 1], [2, 3]]))
    along_columns, along_rows = probe[0, 1] - probe[0, 0], probe[1, 0] - probe[0, 0]
    return tuple(  # type: ignore[return-value]  # of two
        np.sort(np.sign(step) * (seen.x if abs(step) == 1 else seen.y)) for step in (along_columns, along_rows)
    )


def merge_guards(guards: Sequence[Any]) -> Any:
    """The worst of several sampling guards, figure by figure; None if there are none."""
    known = [guard for guard in guards if guard is not None]
    if not known:
        return None
    worst = {f.name: max(getattr(guard, f.name) for guard in known) for f in fields_of(known[0])}
    return replace(known[0], **worst)
