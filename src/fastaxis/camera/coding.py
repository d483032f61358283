"""Settings and the facts about an exposure as plain JSON, and back."""

from __future__ import annotations

import json
from dataclasses import fields
from typing import Any

from fastaxis.camera.exposure import Exposure
from fastaxis.camera.settings import Setting
from fastaxis.conventions import View
from fastaxis.elements.sensor import Sensor
from fastaxis.laws import Amplitude, AxisLaw, CircularLaw, ScalarLaw
from fastaxis.light.states import State

__all__ = [
    "FORMAT",
    "facts",
    "facts_from",
    "sensor_from_json",
    "setting_from_json",
    "setting_to_json",
    "to_text",
    "view_from",
]

FORMAT = "fastaxis exposure 1"
_KINDS = {kind.__name__: kind for kind in (AxisLaw, CircularLaw, ScalarLaw, Amplitude, State, Setting, Sensor)}


def _encode(value: Any) -> Any:
    if type(value).__name__ in _KINDS:
        return {"kind": type(value).__name__} | {f.name: _encode(getattr(value, f.name)) for f in fields(value)}
    if isinstance(value, tuple):
        return [_encode(one) for one in value]
    return value


def _decode(value: Any) -> Any:
    if isinstance(value, dict):
        kind = _KINDS[value["kind"]]
        return kind(**{name: _decode(one) for name, one in value.items() if name != "kind"})
    if isinstance(value, list):
        return tuple(_decode(one) for one in value)
    return value


def setting_to_json(setting: Setting) -> dict[str, Any]:
    """A numeric setting as plain data: kinds by name, angles [rad], powers as shares."""
    encoded: dict[str, Any] = _encode(setting)
    return encoded


def setting_from_json(data: dict[str, Any]) -> Setting:
    """The setting again; KeyError or TypeError if the data is something else."""
    setting = _decode(data)
    if not isinstance(setting, Setting):
        raise TypeError(data.get("kind"))
    return setting


def sensor_from_json(data: dict[str, Any] | None) -> Sensor | None:
    """The sensor of a camera again; None without one, as in files that know of none."""
    sensor = _decode(data)
    if sensor is not None and not isinstance(sensor, Sensor):
        raise TypeError(type(sensor).__name__)
    return sensor


def facts(shots: Exposure) -> dict[str, Any]:
    """Everything about an exposure but its arrays."""
    guard = shots.guard
    return {
        "format": FORMAT,
        "name": shots.name,
        "target": shots.target,
        "wavelength": shots.wavelength,
        "pixel": shots.pixel,
        "orientation": shots.orientation,
        "view": shots.view.value,
        "stamp": shots.stamp,
        "labels": list(shots.labels),
        "settings": [setting_to_json(setting) for setting in shots.settings],
        "guard": None if guard is None else {f.name: getattr(guard, f.name) for f in fields(guard)},
        "plan": shots.plan,
        "sent": shots.sent,
        "arrived": shots.arrived,
        "sensor": _encode(shots.sensor),
        "exposure_time": shots.exposure_time,
    }


def facts_from(text: str) -> dict[str, Any]:
    """The facts in a text written by :func:`to_text`; KeyError, TypeError or ValueError if it is another text."""
    about: dict[str, Any] = json.loads(text)
    if about["format"] != FORMAT:
        raise ValueError(about["format"])
    return about


def view_from(data: dict[str, Any]) -> View:
    """The naming under which a file was written."""
    return View(data["view"])


def to_text(data: dict[str, Any]) -> str:
    """One line of ASCII; exact numbers of a symbol library are written as floats."""
    return json.dumps(data, default=float)
