"""What was worked out for earlier questions, kept for later ones as far as it fits."""

from __future__ import annotations

import os
import threading
from collections import OrderedDict
from collections.abc import Hashable
from typing import Any

from fastaxis import recycled
from fastaxis.errors import ParameterError

__all__ = ["LIGHT", "Memory", "forget_light", "remember_light"]

UP_TO = 256 << 20
"""Bytes kept in all, if not set otherwise."""

FRAMES = recycled.KEPT // UP_TO
"""Memory of frames nobody holds, over that of light kept: frames of many settings are far larger than the light."""

MEMORIES: list[Memory] = []


class Memory:
    """Answers by what they depend on, up to a number of bytes; what was longest unused goes first.

    Several threads may ask. What is kept is handed out as it is, so whoever takes it must leave it as it is.

    Parameters
    ----------
    share : of all that is kept; a single answer is kept up to a quarter of it.
    """

    def __init__(self, share: float) -> None:
        self._share = share
        self._limit = int(share * UP_TO)
        MEMORIES.append(self)
        self._kept: OrderedDict[Hashable, tuple[Any, int]] = OrderedDict()
        self._lock = threading.RLock()
        self.size = 0

    @property
    def limit(self) -> int:
        """Bytes kept in all, at most."""
        return self._limit

    def share_in(self, up_to: int) -> None:
        """Keep no more than this one's share of so many bytes."""
        with self._lock:
            self._limit = int(self._share * up_to)
            self._make_room(0)

    @property
    def largest(self) -> int:
        """Bytes of the largest answer that is kept."""
        return self._limit // 4

    def __len__(self) -> int:
        return len(self._kept)

    def __contains__(self, key: Hashable) -> bool:
        return key in self._kept

    def get(self, key: Hashable) -> Any:
        """The answer kept under a key; None if there is none."""
        with self._lock:
            found = self._kept.get(key)
            if found is None:
                return None
            self._kept.move_to_end(key)
            return found[0]

    def put(self, key: Hashable, answer: Any, size: int) -> None:
        """Keep an answer of so many bytes in place of an earlier one, if it is not too large."""
        with self._lock:
            self.size -= self._kept.pop(key, (None, 0))[1]
            if self._limit and size <= self.largest:
                self._make_room(size)
                self._kept[key] = (answer, size)
                self.size += size

    def clear(self, *, over: int = 0) -> None:
        """Forget everything of more than some bytes."""
        with self._lock:
            for key in [key for key, (_, size) in self._kept.items() if size > over or not over]:
                self.size -= self._kept.pop(key)[1]

    def _make_room(self, size: int) -> None:
        while self._kept and (self.size + size > self._limit or self._limit == 0):
            self.size -= self._kept.popitem(last=False)[1][1]

    def unlock(self) -> None:
        """A lock that another thread held when the process was forked would never open again; nor would it count on."""
        self._lock = threading.RLock()
        self.size = sum(size for _, size in self._kept.values())


LIGHT = Memory(0.75)
"""Light behind the first steps of plans, what arrived behind a section, and what cameras saw."""


def _unlock() -> None:
    for memory in MEMORIES:
        memory.unlock()


if hasattr(os, "register_at_fork"):
    os.register_at_fork(after_in_child=_unlock)


def forget_light() -> None:
    """Free the memory of the light kept between questions, and that of frames that nobody holds any more.

    Answers stay what they are.

    Examples
    --------
    >>> import fastaxis as fa
    >>> fa.forget_light()
    """
    for memory in MEMORIES:
        memory.clear()
    recycled.give_up()


def remember_light(up_to: int) -> None:
    """How much light is kept between questions, so that a turned knob re-uses what did not change before it.

    A new question goes on from the last step up to which the source, the parts and the samples are those of an earlier
    one. Where all differ by uniform parts behind the last patterned one, by the laser's power or by analyzers alone,
    the picture kept is turned by a Mueller matrix. No picture and no power depends on it but by roundings;
    ``shots.guard`` may be that of the light before its last uniform parts.

    Parameters
    ----------
    up_to : bytes in all, 256 MiB if never set; light or a picture of more than some fifth of it is not kept. 0 keeps
        none. Memory of frames that nobody holds any more is used again for the next ones, up to four times as much; the
        system may take it meanwhile.

    Raises
    ------
    ParameterError : less than no bytes.

    Examples
    --------
    >>> import fastaxis as fa
    >>> fa.remember_light(up_to=0)
    >>> fa.remember_light(up_to=256 * 2**20)
    """
    if isinstance(up_to, bool) or not isinstance(up_to, int) or up_to < 0:
        raise ParameterError(
            "light is kept up to a whole number of bytes, 0 for none",
            got=f"remember_light: up_to = {up_to!r}",
            fix="fa.remember_light(up_to=256 * 2**20)",
        )
    for memory in MEMORIES:
        memory.share_in(up_to)
    recycled.keep(FRAMES * up_to)
