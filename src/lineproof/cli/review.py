"""``lineproof review``: how a review stands against its calc; merging files, signing off."""

from __future__ import annotations

import argparse
import datetime as dt
import sys
from collections.abc import Iterable, Iterator, Sequence
from functools import reduce
from pathlib import Path
from typing import TYPE_CHECKING

from lineproof.cli.files import write_all
from lineproof.cli.lines import MOST_NAMED
from lineproof.errors import FaultList, UserError
from lineproof.notebook.records import read_records
from lineproof.notebook.reviews import (
    beside,
    read_review_file,
    refuse_originators,
    review_inside,
)
from lineproof.record import Record
from lineproof.sentences import listed
from lineproof.typeset import printable

if TYPE_CHECKING:
    from lineproof.audit.review.data import Review
    from lineproof.audit.review.marks import Standing
    from lineproof.audit.review.merge import Merged


def run(options: argparse.Namespace) -> int:
    """Show how a review stands; returns 1 while anything stands open."""
    from lineproof.audit.review.marks import sign, standing  # noqa: PLC0415 - 0.1 s

    given = [*options.files, *options.marks]
    files = given or [beside(options.calc)]
    _check_places(options, files)
    records = read_records(options.calc)
    made = _merged(files, None if given else review_inside(options.calc))
    review = made.review
    record = _record_of(review, records, options.calc)
    refuse_originators(review, record)
    if options.sign is not None:
        review = sign(review, record, options.sign, options.on or _today())
    if options.merge or options.sign is not None:
        place = options.merge or files[0]
        write_all({place: review.to_text().encode()})
        sys.stdout.write(f"{printable(str(place))}\n")
    stands = standing(review, record)
    told = [*_told(review, record, stands), *_merge_conflicts(made, stands)]
    sys.stdout.writelines(f"{printable(line)}\n" for line in told)
    return 1 if stands.open_items or made.conflicts else 0


def _check_places(options: argparse.Namespace, files: Sequence[Path]) -> None:
    """Refuse, before anything is read, what could lose marks at the end."""
    faults = FaultList()
    out = options.merge
    if out is not None and out.exists() and out.resolve() not in [file.resolve() for file in files]:
        faults.add(f"{out}: exists and would be lost; name it behind --marks too, or give another")
    if options.sign is not None and not options.sign.strip():
        faults.add("--sign: no name; write who signs, as in --sign 'A. Checker'")
    if options.sign and out is None and len(files) > 1:
        faults.add(f"--sign: {len(files)} files of marks; say with --merge OUT where they go")
    if options.on and options.sign is None:
        faults.add("--on is the day of a sign-off; give --sign NAME with it")
    faults.raise_if_any()


def _merged(files: Sequence[Path], inside: Review | None) -> Merged:
    """Read all files and make one review of them; raises with the faults of all.

    ``inside`` is what the package itself holds, for where no file lies beside it.
    """
    from lineproof.audit.review.merge import Merged, conflicts, merge  # noqa: PLC0415 - as in run

    if inside is not None and not files[0].exists():
        return Merged(inside, conflicts(inside))
    faults, reviews = FaultList(), []
    for path in files:
        try:
            reviews.append(read_review_file(path))
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()

    def join(made: Merged, review: Review) -> Merged:
        both = merge(made.review, review)
        return Merged(both.review, tuple(dict.fromkeys((*made.conflicts, *both.conflicts))))

    first = reviews[0]
    return reduce(join, reviews[1:], Merged(first, conflicts(first)))


def _record_of(review: Review, records: Sequence[Record], path: Path) -> Record:
    for record in records:
        if record.calc_id == review.calc:
            return record
    held = ", ".join(record.calc_id for record in records)
    raise UserError(f"{path}: holds {held}, but the review is of calc {review.calc[:40]!r}")


def _today() -> str:
    return dt.datetime.now(tz=dt.UTC).astimezone().date().isoformat()


def _told(review: Review, record: Record, stands: Standing) -> Iterator[str]:
    """Give the state of a review, a line each."""
    from lineproof.audit.review.print import printed_review  # noqa: PLC0415 - as in run

    printed = printed_review(review, record)
    yield f"{record.calc_id}: record {record.digest}, reviewed by {printed.reviewers or 'nobody'}"
    yield f"  {printed.summary}"
    for name, ids in (("not marked", stands.unmarked), ("queried", stands.queried)):
        if ids:
            yield f"  {name}: {_labels(record, ids)}"
    for stale in printed.stale:
        lines = ", ".join(label for _, label in stale.lines[:MOST_NAMED])
        more = f" and {len(stale.lines) - MOST_NAMED} more" * (len(stale.lines) > MOST_NAMED)
        yield f"  stale: {stale.why} {stale.marks}: {lines}{more}{stale.more}"
    for found in printed.findings:
        yield f"  finding {found.number}, {found.severity}, {found.standing}: {found.text}"
    yield from (f"  conflict: {sentence}" for sentence in printed.conflicts)
    yield from (f"  {sentence}" for sentence in printed.signed)


def _labels(record: Record, ids: Iterable[str]) -> str:
    return listed((record.entries[line]["label"] or line for line in ids), MOST_NAMED)


def _merge_conflicts(made: Merged, stands: Standing) -> Iterator[str]:
    """Give what only the merging could see: numbers given anew, fields that differed."""
    known = {conflict.sentence for conflict in stands.conflicts}
    yield from (
        f"  conflict: {each.sentence}" for each in made.conflicts if each.sentence not in known
    )
