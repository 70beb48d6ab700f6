"""The cells of a junior's notebook as plain data, for reading; nothing in them is run."""

from __future__ import annotations

from dataclasses import dataclass

CODE = "code"
PARAMETERS = "parameters"
LONGEST_CELL = 60_000
"""Characters of a cell that are still read as code."""
MOST_CELLS = 2_000
"""Cells that are read."""
MOST_CHARACTERS = 1_000_000
"""Characters of all cells together that are read."""


@dataclass(frozen=True, slots=True)
class Cell:
    """A cell: its number from 1, its kind (``code``, ``markdown``, ``raw``), source and tags.

    ``count`` is its execution count, None if it was not run; ``outputs`` are the texts that it
    left (plain text and what it printed), one a piece, also where they are empty.
    """

    number: int
    kind: str
    source: str
    tags: tuple[str, ...] = ()
    count: int | None = None
    outputs: tuple[str, ...] = ()

    @property
    def name(self) -> str:
        """How a finding calls the cell."""
        return f"cell {self.number}"
