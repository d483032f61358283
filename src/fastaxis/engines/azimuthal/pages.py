"""Arrays of some hundred kilobytes, which this engine takes and gives back all the time, without new pages for each."""

from __future__ import annotations

import numpy as np

__all__ = ["keep_pages"]

LARGEST = 1 << 22  # bytes; planes beyond are few


def keep_pages() -> None:
    """Have the process keep the memory of arrays up to 4 MB for the next ones.

    The GNU C library gets memory beyond 128 kB from the system and gives it back at once, so that half of the time goes
    into clearing pages, until a larger stretch has been given back: from then on it keeps what is smaller than that
    (mallopt(3), M_MMAP_THRESHOLD). A stretch that nobody writes to costs nothing.
    """
    np.empty(LARGEST, dtype=np.uint8)
