"""Errors a user can cause, each with all its faults and an exit code."""

from __future__ import annotations

from collections.abc import Iterable

SHOWN_PREFIX = "Wrong input: "
"""What a fault begins with under a notebook cell; a stored output is told by it."""


class UserError(ValueError):
    """Wrong input: says what was given and what to type instead, all faults at once.

    ``faults`` holds one sentence per fault. Shown without a traceback; exit code 2.

    >>> str(UserError(["span: '7.6' has no unit; write '7.6 m'"]))
    "span: '7.6' has no unit; write '7.6 m'"
    """

    exit_code = 2

    def __init__(self, faults: str | Iterable[str]) -> None:
        self.faults: tuple[str, ...] = (faults,) if isinstance(faults, str) else tuple(faults)
        super().__init__("\n".join(self.faults))

    def __reduce__(self) -> tuple[type[UserError], tuple[tuple[str, ...]]]:
        """Survive a process border with the faults kept apart."""
        return type(self), (self.faults,)

    def _render_traceback_(self) -> list[str]:
        """Show only the faults in a notebook (IPython asks for this method)."""
        return [f"{SHOWN_PREFIX}{fault}" for fault in self.faults]


MOST_FAULTS = 40
"""Of the faults of one file more are only counted."""


class FaultList:
    """Collect faults and raise them together.

    >>> faults = FaultList()
    >>> faults.add("h: '-620 mm' is negative; write a positive length")
    >>> faults.raise_if_any()
    Traceback (most recent call last):
    lineproof.errors.UserError: h: '-620 mm' is negative; write a positive length
    """

    def __init__(self) -> None:
        self.faults: list[str] = []

    def add(self, fault: str) -> None:
        """Note one fault."""
        self.faults.append(fault)

    def take(self, error: UserError) -> None:
        """Note all faults of a caught error."""
        self.faults.extend(error.faults)

    def raise_if_any(self) -> None:
        """Raise one :class:`UserError` with every fault noted so far."""
        if self.faults:
            raise UserError(self.faults)


class FileFaults(FaultList):
    """Faults of one file, each with its name; after the first forty only their number is told."""

    def __init__(self, name: str) -> None:
        super().__init__()
        self.name = name

    def add(self, fault: str) -> None:
        """Note one fault of the file."""
        super().add(f"{self.name}: {fault}")

    def raise_if_any(self) -> None:
        """Raise the first faults and the number of the others."""
        more = len(self.faults) - MOST_FAULTS
        if more > 0:
            raise UserError([*self.faults[:MOST_FAULTS], f"{self.name}: and {more} faults more"])
        super().raise_if_any()
