"""The heap while printing: told once, and only where the C library knows how."""

from __future__ import annotations

import ctypes
import sys
from typing import Any

import pytest

from lineproof.package.heap import steady_heap


class Library:
    """A C library that notes what it is told."""

    def __init__(self) -> None:
        self.told: list[tuple[int, int]] = []

    def mallopt(self, parameter: int, value: int) -> int:
        """Note it."""
        self.told.append((parameter, value))
        return 1


@pytest.fixture
def fresh() -> Any:
    """Forget that the heap has been told."""
    steady_heap.cache_clear()
    yield
    steady_heap.cache_clear()


@pytest.mark.usefixtures("fresh")
def test_the_threshold_is_told_once(monkeypatch: pytest.MonkeyPatch) -> None:
    """M_MMAP_THRESHOLD is -3 in malloc.h of glibc, 128 KiB its documented default."""
    library = Library()
    monkeypatch.setattr(ctypes, "CDLL", lambda _: library)
    monkeypatch.setattr(sys, "platform", "linux")
    steady_heap()
    steady_heap()

    assert library.told == [(-3, 131072)]


@pytest.mark.usefixtures("fresh")
def test_a_library_without_it_is_left_alone(monkeypatch: pytest.MonkeyPatch) -> None:
    """musl has no such function, and other systems are not asked."""
    monkeypatch.setattr(ctypes, "CDLL", lambda _: object())
    monkeypatch.setattr(sys, "platform", "linux")
    steady_heap()
    steady_heap.cache_clear()
    monkeypatch.setattr(ctypes, "CDLL", lambda _: pytest.fail("asked"))
    monkeypatch.setattr(sys, "platform", "win32")
    steady_heap()
