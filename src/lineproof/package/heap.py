"""The heap of the C library, kept from growing holes while a document is printed."""

from __future__ import annotations

import ctypes
import sys
from functools import cache

_MMAP_THRESHOLD = -3  # M_MMAP_THRESHOLD of glibc
_FIRST = 128 * 1024
"""The size from which glibc, when a program starts, gives each block pages of its own."""


@cache
def steady_heap() -> None:
    """Hold the size from which a block has pages of its own where it is when a program starts.

    glibc raises it, up to 32 MB, with every such block that is given back. The lists that the
    printer doubles again and again then lie in the heap and leave holes of their old size, some
    10 MB of a package of ninety pages. Elsewhere than with glibc nothing is done.
    """
    if sys.platform == "linux":
        mallopt = getattr(ctypes.CDLL(None), "mallopt", None)
        if mallopt is not None:
            mallopt(_MMAP_THRESHOLD, _FIRST)
