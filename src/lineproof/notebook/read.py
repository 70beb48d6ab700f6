"""A stored calc notebook: prose and parts in order, and the record; nothing in it is run."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from lineproof.errors import FaultList, UserError
from lineproof.notebook.cells import LEFT_OUT, PARAMETERS, Cell, cells_of, data_of, load_notebook
from lineproof.notebook.display import ANCHOR, METADATA, cell_hash, part_digest, shown_hash
from lineproof.record import MIME, Record

RUN_ALL = "run all cells, then save"


@dataclass(frozen=True, slots=True)
class Calc:
    """What a notebook holds for a package.

    ``walk`` gives the blocks in order, ``("prose", markdown)`` and ``("part", key)``; ``remarks``
    say what the package leaves out.
    """

    name: str
    walk: tuple[tuple[str, str], ...]
    record: Record
    remarks: tuple[str, ...] = ()


def read_calc(path: Path) -> Calc:
    """Read a stored notebook; raises :class:`UserError` with all its faults."""
    return calc_of(load_notebook(path), str(path))


def calc_of(data: Mapping[str, Any], name: str, *, fresh: bool = True) -> Calc:
    """Read a notebook given as plain data.

    ``fresh`` asks also that the outputs are those of the cells as they stand. Raises
    :class:`UserError` with all faults, each with the notebook's ``name``.
    """
    cells = cells_of(data, name)
    check_parameters(cells, name)
    faults = FaultList()
    if not has_outputs(cells):
        raise UserError(f"{name}: has not been run; {RUN_ALL}")
    for cell in cells:
        _check_errors(cell, name, faults)
    record = record_of(cells, name, faults)
    if not record.entries:
        faults.add(f"{name}: its record holds no line; record something before sheet.close()")
    parts = {part["key"]: part for part in record.parts}
    anchors = _anchors(cells, name, faults)
    _check_anchors(anchors, parts, name, faults)
    if fresh:
        _check_fresh(cells, anchors, parts, name, faults)
    faults.raise_if_any()
    return Calc(name, _walk(cells), record, tuple(_remarks(cells, name)))


def has_outputs(cells: tuple[Cell, ...]) -> bool:
    """Tell whether any cell has been run and has left something."""
    return any(cell.outputs for cell in cells)


def check_parameters(cells: tuple[Cell, ...], name: str) -> None:
    """Refuse a notebook without exactly one code cell tagged ``parameters``."""
    tagged = [cell for cell in cells if cell.kind == "code" and PARAMETERS in cell.tags]
    if not tagged:
        raise UserError(
            f"{name}: no cell with the inputs; tag the code cell that holds them {PARAMETERS!r} "
            "(in JupyterLab: click the cell, then the gears at the right, Cell Tags)"
        )
    if len(tagged) > 1:
        places = " and ".join(cell.name for cell in tagged)
        raise UserError(f"{name}: {places} are both tagged {PARAMETERS!r}; leave the tag on one")


def record_of(cells: tuple[Cell, ...], name: str, faults: FaultList | None = None) -> Record:
    """Return the one record of a notebook; raises :class:`UserError`."""
    before = faults.faults if faults is not None else []
    found = [(cell, data) for cell in cells for _, data in data_of(cell, MIME)]
    if not found:
        raise UserError(
            [*before, f"{name}: holds no record; end it with a cell 'sheet.close()', {RUN_ALL}"]
        )
    if len(found) > 1:
        places = " and ".join(dict.fromkeys(cell.name for cell, _ in found))
        raise UserError(
            [*before, f"{name}: holds {len(found)} records, in {places}; close the sheet once"]
        )
    try:
        return Record.from_data(found[0][1])
    except UserError as error:
        raise UserError([*before, *(f"{name}: {fault}" for fault in error.faults)]) from None


def _check_errors(cell: Cell, name: str, faults: FaultList) -> None:
    for output in cell.outputs:
        if output["output_type"] == "error":
            value = str(output.get("evalue", "")).strip() or str(output.get("ename", ""))
            shown = value.splitlines()[0][:200] if value else ""
            faults.add(f"{name}: {cell.name} ended with an error: {shown}; mend it, then {RUN_ALL}")


def _anchors(cells: tuple[Cell, ...], name: str, faults: FaultList) -> dict[str, _Anchor]:
    anchors: dict[str, _Anchor] = {}
    for cell in cells:
        for output, data in data_of(cell, ANCHOR):
            key = data.get("part") if isinstance(data, Mapping) else None
            if not isinstance(key, str):
                faults.add(f"{name}: {cell.name} shows a damaged part; {RUN_ALL}")
            elif key in anchors:
                first = anchors[key].cell
                faults.add(
                    f"{name}: part {key!r} is shown twice, by {first.name} and by {cell.name}; "
                    f"keep one of them, then {RUN_ALL}"
                )
            else:
                note = output.get("metadata", {}).get(METADATA, {})
                anchors[key] = _Anchor(cell, note if isinstance(note, Mapping) else {})
    return anchors


@dataclass(frozen=True, slots=True)
class _Anchor:
    """Where a part is shown, and what its output says of its making."""

    cell: Cell
    note: Mapping[str, Any]


def _check_anchors(
    anchors: Mapping[str, _Anchor], parts: Mapping[str, Any], name: str, faults: FaultList
) -> None:
    for key, anchor in anchors.items():
        if key not in parts:
            faults.add(
                f"{name}: {anchor.cell.name} shows part {key!r}, which the record does not hold; "
                f"put the cell above the one with sheet.close(), {RUN_ALL}"
            )
    for key in parts:
        if key not in anchors:
            faults.add(f"{name}: part {key!r} of the record is shown by no cell; {RUN_ALL}")
    shown, recorded = [k for k in anchors if k in parts], [k for k in parts if k in anchors]
    if shown != recorded:
        faults.add(f"{name}: the parts were not run in the order of the cells; {RUN_ALL}")


def _check_fresh(
    cells: tuple[Cell, ...],
    anchors: Mapping[str, _Anchor],
    parts: Mapping[str, Any],
    name: str,
    faults: FaultList,
) -> None:
    for sentence in (*stale_cells(cells), *altered_outputs(cells)):
        faults.add(f"{name}: {sentence}; {RUN_ALL}")
    for key, anchor in anchors.items():
        made_from = anchor.note.get("part")
        if key in parts and made_from and made_from != part_digest(parts[key]):
            faults.add(
                f"{name}: {anchor.cell.name} shows part {key!r} otherwise than the record holds "
                f"it; {RUN_ALL}"
            )


def stale_cells(cells: tuple[Cell, ...]) -> list[str]:
    """Say which code cells, up to the last part shown, are not those that the parts rest on.

    The metadata of a part carry the hashes of the cells run before it, by their counts; where a
    tool has stripped them, nothing can be told.
    """
    history = {cell.number: ran for cell in cells if (ran := _ran_before(cell))}
    said = []
    for cell in cells:
        later = [ran for number, ran in history.items() if number >= cell.number]
        if cell.kind == "code" and cell.source.strip() and later:
            said += _stale(cell, later, shows_part=any(data_of(cell, ANCHOR)))
    return said


def altered_outputs(cells: tuple[Cell, ...]) -> list[str]:
    """Say which parts are shown otherwise than when they were run: changed by hand since.

    Outputs of before the hash was kept say nothing of it.
    """
    said = []
    for cell in cells:
        for output, data in _parts(cell):
            note = output.get("metadata", {}).get(METADATA)
            kept = note.get("shown") if isinstance(note, Mapping) else None
            if kept and kept != shown_hash(output["data"]):
                said.append(
                    f"{cell.name} shows part {_key(data)!r} otherwise than it was run: its output "
                    "was changed by hand"
                )
    return said


def shown_otherwise(stored: tuple[Cell, ...], again: tuple[Cell, ...]) -> list[str]:
    """Say which parts are shown otherwise than a fresh run of the same record shows them.

    Whoever changes an output by hand may change the hash in its metadata as well.
    """
    fresh = {_key(data): shown_hash(out["data"]) for cell in again for out, data in _parts(cell)}
    return [
        f"{cell.name} shows part {_key(data)!r} otherwise than a re-run: its output was changed "
        "by hand, or printed by another version"
        for cell in stored
        for output, data in _parts(cell)
        if shown_hash(output["data"]) != fresh.get(_key(data))
    ]


def _parts(cell: Cell) -> Iterator[tuple[Mapping[str, Any], Any]]:
    return data_of(cell, ANCHOR)


def _key(data: object) -> str:
    return str(data.get("part")) if isinstance(data, Mapping) else ""


def _stale(cell: Cell, later: list[list[str]], *, shows_part: bool) -> list[str]:
    count = cell.count
    if count is None:
        return [f"{cell.name} has not been run"]
    known = {ran[count - 1] for ran in later if 0 < count <= len(ran)}
    if known - {cell_hash(cell.source)}:
        return [f"{cell.name} was changed after it was run"]
    # A part run again is told by its digest; any other cell must be older than what follows.
    if not shows_part and min(map(len, later)) < count:
        return [f"{cell.name} was run again after what stands below it"]
    return []


def _ran_before(cell: Cell) -> list[str]:
    notes = [output.get("metadata", {}).get(METADATA) for output, _ in data_of(cell, ANCHOR)]
    lists = [note["cells"] for note in notes if isinstance(note, Mapping) and "cells" in note]
    return [str(known) for known in lists[0]] if lists and isinstance(lists[0], list) else []


def _walk(cells: tuple[Cell, ...]) -> tuple[tuple[str, str], ...]:
    walk: list[tuple[str, str]] = []
    for cell in cells:
        if cell.kind == "markdown" and LEFT_OUT not in cell.tags:
            walk.append(("prose", cell.source))
        walk += [("part", data["part"]) for _, data in data_of(cell, ANCHOR)]
    return tuple(walk)


def _remarks(cells: tuple[Cell, ...], name: str) -> list[str]:
    return [
        f"{name}: what {cell.name} shows beside the record is not printed"
        for cell in cells
        if any(not {ANCHOR, MIME} & set(output.get("data", {})) for output in cell.outputs)
    ]
