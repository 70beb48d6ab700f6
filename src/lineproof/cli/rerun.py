"""Re-executing stored calcs and comparing them: what ``issue`` and ``recheck`` share."""

from __future__ import annotations

import json
from collections.abc import Iterable
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from lineproof.cli.progress import Progress
from lineproof.errors import FaultList, UserError
from lineproof.notebook.cells import Cell, cells_of, load_notebook
from lineproof.notebook.compare import Change, compare
from lineproof.notebook.execute import execute
from lineproof.notebook.read import (
    Calc,
    altered_outputs,
    calc_of,
    check_parameters,
    has_outputs,
    shown_otherwise,
    stale_cells,
)
from lineproof.notebook.unused import unused_inputs
from lineproof.record import Record

MOST_CHANGES = 25
"""Differences listed one by one; of more only the number is told."""


@dataclass(frozen=True, slots=True)
class Stored:
    """A notebook as it lies on the disk.

    ``record`` is None when it has never been run, or when what is stored does not matter
    (``issue --update``).
    """

    path: Path
    data: dict[str, Any]
    cells: tuple[Cell, ...]
    record: Record | None


@dataclass(frozen=True, slots=True)
class Rerun:
    """A stored notebook and what a fresh run of it gives."""

    stored: Stored
    text: str
    calc: Calc
    changes: tuple[Change, ...]

    @property
    def path(self) -> Path:
        """The notebook's path."""
        return self.stored.path


def load_all(paths: Iterable[Path], *, need_record: bool = True) -> list[Stored]:
    """Read all notebooks; raises :class:`UserError` with the faults of all.

    Without ``need_record`` it does not matter what an earlier run has left in them.
    """
    faults, found = FaultList(), []
    for path in _each_once(paths):
        try:
            found.append(_load(path, need_record=need_record))
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return found


def _each_once(paths: Iterable[Path]) -> list[Path]:
    """Return each file once, as first named: ``a.ipynb`` and ``./a.ipynb`` are one."""
    named: dict[Path, Path] = {}
    for path in paths:
        named.setdefault(path.resolve(), path)
    return list(named.values())


def _load(path: Path, *, need_record: bool) -> Stored:
    data = load_notebook(path)
    cells = cells_of(data, str(path))
    check_parameters(cells, str(path))
    _check_inputs_used(cells, str(path))
    record = None
    if has_outputs(cells) and need_record:
        record = calc_of(data, str(path), fresh=False).record
    return Stored(path, data, cells, record)


def _check_inputs_used(cells: tuple[Cell, ...], name: str) -> None:
    """Refuse inputs that change nothing, such as one added that the call does not name."""
    faults = [
        f"{name}: input {each} is used nowhere, so it changes nothing; write {each}={each} into "
        "the call that takes it, or take the line out"
        for each in unused_inputs(cells)
    ]
    if faults:
        raise UserError(faults)


def rerun_all(found: Iterable[Stored], progress: Progress) -> list[Rerun]:
    """Execute all notebooks; raises :class:`UserError` with the faults of all."""
    faults, made = FaultList(), []
    for stored in found:
        progress.step(f"running {stored.path}")
        try:
            made.append(_rerun(stored, progress))
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return made


def _rerun(stored: Stored, progress: Progress) -> Rerun:
    name = str(stored.path)
    text = execute(stored.data, name, stored.path.resolve().parent, progress.count)
    calc = calc_of(json.loads(text), name)
    changes = compare(stored.record, calc.record) if stored.record is not None else []
    return Rerun(stored, text, calc, tuple(changes))


def report_changes(rerun: Rerun) -> list[str]:
    """Return what differs, as sentences; cells edited after their run come first."""
    name = rerun.path
    ids = {change.id for change in rerun.changes}
    lines = list(dict.fromkeys(str(change) for change in rerun.changes))
    hidden = len(lines) - MOST_CHANGES
    return [
        *(f"{name}: {sentence}" for sentence in stale_cells(rerun.stored.cells)),
        f"{name}: {len(ids)} {'line differs' if len(ids) == 1 else 'lines differ'} from a re-run",
        *(f"  {line}" for line in lines[:MOST_CHANGES]),
        *([f"  and {hidden} more"] if hidden > 0 else []),
    ]


def report_shown(rerun: Rerun) -> list[str]:
    """Return which parts are shown otherwise than they were run, as sentences.

    Where lines differ, what they show differs as well: then only outputs are told that are not
    those of their own run.
    """
    stored = rerun.stored.cells
    said = altered_outputs(stored)
    if not rerun.changes and not said:
        said = shown_otherwise(stored, cells_of(json.loads(rerun.text), str(rerun.path)))
    hidden = len(said) - MOST_CHANGES
    return [
        *(f"{rerun.path}: {sentence}" for sentence in said[:MOST_CHANGES]),
        *([f"  and {hidden} more"] if hidden > 0 else []),
    ]


def failed_checks(record: Record) -> list[str]:
    """Return a sentence per check that does not hold, its line as the package numbers it."""
    titles = {part["key"]: part["title"] for part in record.parts}
    return [
        _failed(record.calc_id, record.entries[entry_id], titles[entry_id.partition("/")[0]])
        for entry_id in record.failed
    ]


def _failed(calc_id: str, entry: dict[str, Any], part: str) -> str:
    check = f"{entry['label']} {entry['title'] or entry['formula']}"
    where = f" ({part})" if part else ""
    ratio = entry["printed"].get("utilisation")
    told = f"; ratio {ratio}" if ratio else ""
    accepted = entry.get("exception")
    note = f"; accepted by {accepted['initials']}" if accepted else ""
    return f"{calc_id}: {check}{where} does not hold{told}{note}"
