"""Progress on stderr: a plain line per step, and on a terminal a live count."""

from __future__ import annotations

import sys
from typing import TextIO


class Progress:
    """Tells what is being done; results go to stdout, so a pipe sees none of this."""

    def __init__(self, stream: TextIO | None = None) -> None:
        self._stream = stream if stream is not None else sys.stderr
        self._live = self._stream.isatty()
        self._width = 0

    def step(self, text: str) -> None:
        """Say what begins now."""
        self._clear()
        self._stream.write(f"{text}\n")
        self._stream.flush()

    def count(self, done: int, total: int) -> None:
        """Show how far the step is, on a terminal only."""
        if not self._live:
            return
        text = f"  cell {done} of {total}"
        self._stream.write(f"\r{text.ljust(self._width)}")
        self._width = len(text)
        if done == total:
            self._clear()
        self._stream.flush()

    def _clear(self) -> None:
        if self._width:
            self._stream.write(f"\r{' ' * self._width}\r")
            self._width = 0
