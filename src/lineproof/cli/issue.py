"""``lineproof issue``: from notebooks to the printed package."""

from __future__ import annotations

import argparse
import os
import sys
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import replace
from pathlib import Path
from typing import Any

from lineproof.cli.files import write_all
from lineproof.cli.progress import Progress
from lineproof.cli.rerun import Rerun, failed_checks, load_all, report_changes, rerun_all
from lineproof.errors import FaultList, UserError
from lineproof.notebook.records import read_records
from lineproof.notebook.reviews import printed_beside
from lineproof.package.facts import PAPERS
from lineproof.package.joined import PACKAGE_NAME
from lineproof.package.reviewed import PrintedReview
from lineproof.quantity import echo

DEFAULT_FOLDER = "issued"


def run(options: argparse.Namespace) -> int:
    """Issue the package; returns 1 when a check in it does not hold."""
    progress = Progress()
    found = load_all(options.notebooks, need_record=not options.update)
    folder = options.into or options.notebooks[0].parent / DEFAULT_FOLDER
    _check_names([stored.path for stored in found], folder)
    reruns = rerun_all(found, progress)
    _refuse_changes(reruns)
    _check_project(reruns)
    progress.step(f"printing {folder}")
    files = _files(reruns, folder, options.paper)
    if options.update:
        files |= {rerun.path.resolve(): rerun.text.encode() for rerun in reruns}
    superseded = _superseded(reruns, folder, files)
    write_all(files, superseded)
    return _report(reruns, files, superseded)


def _check_names(paths: Sequence[Path], folder: Path) -> None:
    """Refuse, before anything is run, what could not be written at the end."""
    stems = [path.stem for path in paths]
    twice = sorted({stem for stem in stems if stems.count(stem) > 1})
    if twice:
        raise UserError(f"two notebooks are called {twice[0]!r}; issue them into two folders")
    try:
        standing = next(place for place in (folder, *folder.absolute().parents) if place.exists())
    except OSError as error:  # a name too long for the file system
        shown = f"{str(folder)[:60]}…"
        raise UserError(f"{shown}: {error.strerror}; choose another folder with --into") from None
    if not standing.is_dir():
        raise UserError(f"{standing}: is a file, not a folder; choose another with --into")
    if not os.access(standing, os.W_OK):
        raise UserError(f"{standing}: cannot be written; choose another folder with --into")


def _refuse_changes(reruns: Sequence[Rerun]) -> None:
    faults = FaultList()
    for rerun in reruns:
        if rerun.changes:
            for fault in report_changes(rerun):
                faults.add(fault)
    if faults.faults:
        faults.add(
            "nothing has been issued; run all cells and save, or store the new values with --update"
        )
    faults.raise_if_any()


def _check_project(reruns: Sequence[Rerun]) -> None:
    """One package has one project, and no two calcs of one id."""
    first = reruns[0]
    faults = FaultList()
    seen: dict[str, Path] = {}
    for rerun in reruns:
        record = rerun.calc.record
        unlike = _unlike(record.data["project"], first.calc.record.data["project"])
        if unlike:
            faults.add(
                f"{rerun.path}: its project differs from that of {first.path} in {unlike}; give "
                "both the same project.toml, or issue it by itself"
            )
        if record.calc_id in seen:
            faults.add(
                f"{rerun.path}: its calc id {record.calc_id!r} is that of {seen[record.calc_id]}; "
                "give each calc its own in Sheet.open(...)"
            )
        seen[record.calc_id] = rerun.path
    faults.raise_if_any()


def _unlike(own: Mapping[str, Any], other: Mapping[str, Any]) -> str:
    """Name the first fact in which two projects differ, with both values; empty where none does.

    >>> _unlike({"codes": {"pair": "NBC 2020"}}, {"codes": {"pair": "NBC 2015"}})
    "[codes] pair: 'NBC 2020' here, 'NBC 2015' there"
    """
    for section in sorted({*own, *other}):
        mine, theirs = own.get(section), other.get(section)
        if mine == theirs:
            continue
        if not isinstance(mine, dict) or not isinstance(theirs, dict):
            return f"[{section}]"
        fact = next(n for n in sorted({*mine, *theirs}) if mine.get(n) != theirs.get(n))
        here, there = (echo(facts.get(fact, "")) for facts in (mine, theirs))
        return f"[{section}] {fact}: {here} here, {there} there"
    return ""


def _files(reruns: Sequence[Rerun], folder: Path, paper: str | None) -> dict[Path, bytes]:
    from lineproof.package import (  # noqa: PLC0415 - 0.1 s
        build_package,
        calc_files,
        joined_files,
        to_html,
        to_pdf,
    )

    package = build_package(
        [rerun.calc.record for rerun in reruns],
        [rerun.calc.walk for rerun in reruns],
        reviews=_reviews(reruns),
    )
    if paper is not None:
        package = replace(package, facts=replace(package.facts, paper=PAPERS[paper]))
    name = reruns[0].path.stem if len(reruns) == 1 else PACKAGE_NAME
    printed = {
        folder / f"{name}.pdf": to_pdf(package),
        folder / f"{name}.html": to_html(package).encode(),
    }
    for rerun in reruns:
        printed[folder / f"{rerun.path.stem}.json"] = f"{rerun.calc.record.to_text()}\n".encode()
    data = [rerun.calc.record.data for rerun in reruns]
    for record in data:
        own = {folder / n: c for n, c in calc_files(record).items()}
        _refuse_twice(record["calc"]["id"], own, printed)
        printed |= own
    joined = {folder / n: content for n, content in joined_files(data).items()}
    _refuse_twice("all calcs together", joined, printed)
    return printed | joined


def _superseded(reruns: Sequence[Rerun], folder: Path, files: Iterable[Path]) -> list[Path]:
    """Return the drawings and tables that only the earlier issue of these calcs has made.

    Left beside the new ones they would be taken for part of this issue.
    """
    from lineproof.package import calc_file_names, joined_names  # noqa: PLC0415 - 0.1 s

    written = {path.name.casefold() for path in files}
    found: dict[Path, None] = {}
    for rerun in reruns:
        try:
            earlier = read_records(folder / f"{rerun.path.stem}.json")
        except UserError:  # none, or not a record: nothing is known of an earlier issue
            continue
        for record in earlier:
            names = calc_file_names(record.data)
            names += joined_names(record.data) if len(reruns) > 1 else []
            for name in names:
                if name.casefold() not in written and (folder / name).is_file():
                    found[folder / name] = None
    return list(found)


def _reviews(reruns: Sequence[Rerun]) -> list[PrintedReview | None]:
    """Return what is printed of the review that lies beside each notebook, None for none."""
    faults = FaultList()
    made: list[PrintedReview | None] = []
    for rerun in reruns:
        try:
            made.append(printed_beside(rerun.path, rerun.calc.record))
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return made


def _refuse_twice(calc_id: str, own: Iterable[Path], others: Iterable[Path]) -> None:
    """Refuse a drawing or table named like one of another calc; case does not tell them apart."""
    taken = {path.name.casefold() for path in others}
    faults = FaultList()
    for path in own:
        if path.name.casefold() in taken:
            faults.add(
                f"{calc_id}: {path.name} is already a file of another calc of the package; "
                "give the calcs ids that differ in letters or digits"
            )
    faults.raise_if_any()


def _report(reruns: Sequence[Rerun], files: Iterable[Path], superseded: Iterable[Path]) -> int:
    failed = [sentence for rerun in reruns for sentence in failed_checks(rerun.calc.record)]
    for rerun in reruns:
        for remark in rerun.calc.remarks:
            sys.stderr.write(f"{remark}\n")
    for path in superseded:
        sys.stderr.write(f"{path}: of the earlier issue, not made by this one; removed\n")
    for path in files:
        sys.stdout.write(f"{path}\n")
    for rerun in reruns:
        record = rerun.calc.record
        scope = record.data["status"].get("scope")
        sys.stdout.write(f"{record!r}{f'; {scope}' if scope else ''}\n")
    for sentence in failed:
        sys.stdout.write(f"{sentence}\n")
    return 1 if failed else 0
