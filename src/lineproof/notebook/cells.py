"""The cells of a stored notebook as plain data, read without running anything."""

from __future__ import annotations

import json
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from lineproof.errors import UserError
from lineproof.resources import read_file

PARAMETERS = "parameters"
LEFT_OUT = "remove-cell"
LARGEST_NOTEBOOK = 64_000_000
_FORMAT = 4
_KINDS = ("code", "markdown", "raw")


@dataclass(frozen=True, slots=True)
class Cell:
    """A cell: its number from 1, kind, source, tags, outputs, and its count if it was run."""

    number: int
    kind: str
    source: str
    tags: tuple[str, ...]
    outputs: tuple[Mapping[str, Any], ...]
    count: int | None = None

    @property
    def name(self) -> str:
        """How an error calls the cell: its number and its first line."""
        lines = [line for line in self.source.splitlines() if line.strip()]
        first = lines[0].strip() if lines else ""
        shown = first if len(first) <= 40 else first[:39] + "…"  # noqa: PLR2004 - part of a line
        return f"cell {self.number} ({shown})" if shown else f"cell {self.number}"


def load_notebook(path: Path) -> dict[str, Any]:
    """Read a notebook file as plain JSON data; raises :class:`UserError`."""
    content = read_file(path, LARGEST_NOTEBOOK)
    try:
        data = json.loads(content)
    except (ValueError, RecursionError):
        raise UserError(f"{path}: not a notebook; give a file that Jupyter has saved") from None
    check_format(data, str(path))
    return dict(data)


def check_format(data: object, name: str) -> None:
    """Refuse what is not a notebook of format 4."""
    if not isinstance(data, Mapping) or not isinstance(data.get("cells", []), list):
        raise UserError(f"{name}: not a notebook; give a file that Jupyter has saved")
    if not isinstance(data.get("metadata", {}), Mapping) or not _can_be_saved(data.get("metadata")):
        raise UserError(f"{name}: its metadata are damaged; open it in JupyterLab and save it")
    if data.get("nbformat") != _FORMAT or "cells" not in data:
        given = str(data.get("nbformat", "none"))[:20]
        raise UserError(
            f"{name}: notebook format {given} is not read; open it in JupyterLab and save it "
            f"(that writes format {_FORMAT})"
        )


def cells_of(data: Mapping[str, Any], name: str) -> tuple[Cell, ...]:
    """Return the cells of a notebook; raises :class:`UserError` for damaged ones."""
    check_format(data, name)
    cells, faults = [], []
    for number, raw in enumerate(data["cells"], 1):
        try:
            cells.append(_cell(number, raw))
        except (AttributeError, KeyError, TypeError, ValueError):
            faults.append(f"{name}: cell {number} is damaged; open the notebook in JupyterLab")
    if faults:
        raise UserError(faults)
    return tuple(cells)


def _cell(number: int, raw: Mapping[str, Any]) -> Cell:
    kind = raw["cell_type"]
    if kind not in _KINDS:
        raise ValueError
    outputs = tuple(raw.get("outputs", ())) if kind == "code" else ()
    for output in outputs:
        if not isinstance(output["output_type"], str) or not isinstance(_data(output), Mapping):
            raise TypeError
        if not isinstance(output.get("metadata", {}), Mapping):
            raise TypeError
    if not all(isinstance(held, Mapping) for held in dict(raw.get("attachments", {})).values()):
        raise TypeError
    source = joined(raw["source"])
    if not _can_be_saved([source, raw.get("metadata")]):
        raise ValueError
    tags = raw.get("metadata", {}).get("tags", ())
    count = raw.get("execution_count")
    return Cell(
        number,
        kind,
        source,
        tuple(map(str, tags)),
        outputs,
        count if isinstance(count, int) else None,
    )


def _can_be_saved(data: object) -> bool:
    """Tell whether data can be written as text; a lone half of a character cannot."""
    try:
        json.dumps(data, ensure_ascii=False).encode()
    except (UnicodeEncodeError, RecursionError):
        return False
    return True


def joined(text: str | list[str]) -> str:
    """Return a multi-line text of a notebook file, which may be stored as a list of lines."""
    return text if isinstance(text, str) else "".join(text)


def _data(output: Mapping[str, Any]) -> Any:
    return output.get("data", {})


def data_of(cell: Cell, mime: str) -> Iterator[tuple[Mapping[str, Any], Any]]:
    """Yield every output of a cell that holds data of a MIME type, with that data."""
    for output in cell.outputs:
        if mime in _data(output):
            yield output, _data(output)[mime]
