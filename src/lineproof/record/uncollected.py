"""Making many things of which none is garbage yet, without looking for garbage among them."""

from __future__ import annotations

import gc
from collections.abc import Iterator
from contextlib import contextmanager


@contextmanager
def uncollected() -> Iterator[None]:
    """Let the collector of cycles wait: it would walk over a record that grows, again and again.

    What is not part of a cycle is freed as ever. Inside another such block nothing changes. What
    was made counts as old at the end: the next young collection would walk over all of it.
    """
    if not gc.isenabled():
        yield
        return
    gc.disable()
    try:
        yield
    finally:
        if not gc.get_freeze_count():  # else somebody keeps things frozen on purpose
            gc.freeze()
            gc.unfreeze()
        gc.enable()
