"""``lineproof recheck``: re-execute, compare, change nothing."""

from __future__ import annotations

import argparse
import sys

from lineproof.cli.progress import Progress
from lineproof.cli.rerun import (
    Rerun,
    Stored,
    failed_checks,
    load_all,
    report_changes,
    report_shown,
    rerun_all,
)
from lineproof.errors import UserError


def run(options: argparse.Namespace) -> int:
    """Compare stored notebooks with a fresh run; returns 1 when something is found."""
    found = load_all(options.notebooks)
    _refuse_unrun(found)
    reruns = rerun_all(found, Progress())
    return max(map(_report, reruns), default=0)


def _refuse_unrun(found: list[Stored]) -> None:
    faults = [
        f"{stored.path}: has not been run, so nothing is stored to compare; "
        "run all cells, then save"
        for stored in found
        if stored.record is None
    ]
    if faults:
        raise UserError(faults)


def _report(rerun: Rerun) -> int:
    record = rerun.calc.record
    failed, altered = failed_checks(record), report_shown(rerun)
    said = (
        report_changes(rerun) if rerun.changes
        else [f"{rerun.path}: {len(record.entries)} lines agree"]
    )  # fmt: skip
    for sentence in (*said, *altered, *failed):
        sys.stdout.write(f"{sentence}\n")
    return 1 if rerun.changes or altered or failed else 0
