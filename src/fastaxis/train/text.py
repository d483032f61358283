"""A train as text: versioned JSON that reads well, compares well, and gives the same train back."""

from __future__ import annotations

import json
from collections.abc import Iterable
from typing import Any, NoReturn

from fastaxis.conventions import stamp
from fastaxis.elements.base import Element
from fastaxis.maths import Scalar
from fastaxis.train.graph import Joints
from fastaxis.train.ports import Elements
from fastaxis.train.text_kinds import part_kinds, value_kinds
from fastaxis.train.text_layout import laid_out
from fastaxis.train.text_values import build, known_kind, read_value, refused, write_fields, write_value

__all__ = ["VERSION", "decoded", "read_text", "write_text"]

VERSION = 1


def write_text(name: str, wavelength: Scalar, elements: Elements, joints: Joints) -> str:
    """The text form: format version, sign stamp, name, wavelength, parts in order, joints."""
    kinds = value_kinds()
    parts = [
        {"kind": type(part).__name__, "name": part.name, **write_fields(part, part.name, kinds)}
        for part in elements.values()
    ]
    head = {"fastaxis": VERSION, "stamp": stamp(), "name": name}
    body = {"wavelength": write_value(wavelength, "wavelength", kinds), "elements": parts, "joints": joints}
    return laid_out({**head, **body}) + "\n"


def decoded(data: bytes, path: str) -> str:
    """The text of a file."""
    try:
        return data.decode("utf-8")
    except UnicodeDecodeError:
        raise refused("a saved train is UTF-8 text", f"{path}: not text", 'train.save("bench.json")') from None


def _no_constant(word: str) -> NoReturn:
    raise refused("numbers in a file are finite or written as words", f"{word} as a number", '{"number": "inf"}')


def _parsed(text: str) -> dict[str, Any]:
    if not isinstance(text, str):
        raise refused("a saved train is JSON text", f"{text!r:.40} in place of text", "train.to_text()")
    try:
        data = json.loads(text, parse_constant=_no_constant)
    except (json.JSONDecodeError, RecursionError) as error:
        where = (
            f" at line {error.lineno}: {error.msg}" if isinstance(error, json.JSONDecodeError) else ": nested too deep"
        )
        raise refused("a saved train is JSON text", f"no JSON{where}", 'train.save("bench.json")') from None
    if not isinstance(data, dict) or "fastaxis" not in data:
        raise refused(
            'a saved train starts with {"fastaxis": 1', "JSON, but no saved train", 'train.save("bench.json")'
        )
    if data["fastaxis"] != VERSION or isinstance(data["fastaxis"], bool):
        raise refused(
            f"this fastaxis reads version {VERSION} of the format; a newer one may read it",
            f"version {data['fastaxis']!r}",
            "pip install --upgrade fastaxis",
        )
    return data


def _field(data: dict[str, Any], key: str, kind: type | tuple[type, ...], example: str) -> Any:
    if key not in data:
        raise refused("a saved train has stamp, wavelength, elements and joints", f"missing field '{key}'", example)
    if not isinstance(data[key], kind) or isinstance(data[key], bool):
        raise refused("every field of a saved train has its own shape", f"'{key}' is {data[key]!r:.40}", example)
    return data[key]


def _part(data: Any, kinds: dict[str, type], values: dict[str, type]) -> Element:
    if not isinstance(data, dict):
        raise refused(
            "a part is an object with its kind", f"{data!r:.40} as a part", '{"kind": "FreeSpace", "name": "gap"}'
        )
    for key in ("kind", "name"):
        if not isinstance(data.get(key), str):
            raise refused("a part has a kind and a name", f"{data!r:.60}: no {key}", f'"{key}": "..."')
    # A part holds values and never another part, so the two tables of kinds are kept apart.
    kind = known_kind(data["kind"], data["name"], kinds)
    part: Element = build(kind, data, data["name"], values, name=data["name"])
    return part


def read_text(
    text: str, kinds: Iterable[type[Element]] = ()
) -> tuple[str, Scalar, list[Element], list[tuple[str, str]]]:
    """Name, wavelength, parts and joints of a text form.

    Raises
    ------
    FileFormatError : no JSON, another version, an unknown kind, a missing or unknown field.
    ParameterError : a value its part refuses.
    """
    data = _parsed(text)
    known, values = part_kinds(kinds), value_kinds()
    _check_stamp(_field(data, "stamp", str, f'"stamp": "{stamp()}"'))
    wavelength = read_value(
        _field(data, "wavelength", (int, float, dict), '"wavelength": 5.32e-07'), "wavelength", values
    )
    parts = [_part(part, known, values) for part in _field(data, "elements", list, '"elements": []')]
    joints = [_joint(joint) for joint in _field(data, "joints", list, '"joints": []')]
    return _field({"name": "train", **data}, "name", str, '"name": "train"'), wavelength, parts, joints


def _check_stamp(found: str) -> None:
    if found != stamp():
        raise refused(
            "a train is read under the signs it was written with", f"stamp {found!r:.60}", f'"stamp": "{stamp()}"'
        )


def _joint(joint: Any) -> tuple[str, str]:
    if isinstance(joint, list) and len(joint) == 2 and all(isinstance(port, str) for port in joint):
        return joint[0], joint[1]
    raise refused("a joint is a pair of ports", f"{joint!r:.40} as a joint", '["pbs.reflected", "cam.in"]')
