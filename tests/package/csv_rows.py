"""Reading a CSV file back, by another reader than the one under test."""

from __future__ import annotations

import csv
import io


def rows_of(content: bytes) -> list[list[str]]:
    """Return the rows of a CSV file."""
    return list(csv.reader(io.StringIO(content.decode("utf-8-sig"), newline=""), strict=True))
