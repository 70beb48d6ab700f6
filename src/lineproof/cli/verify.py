"""``lineproof verify``: whether a package prints what the record inside it gives."""

from __future__ import annotations

import argparse
import json
import sys
from collections.abc import Iterable, Iterator, Sequence
from pathlib import Path
from typing import TYPE_CHECKING

from lineproof.cli.lines import MOST_NAMED
from lineproof.errors import UserError
from lineproof.notebook.records import LARGEST_FILE, read_records
from lineproof.resources import read_file
from lineproof.typeset import printable

if TYPE_CHECKING:
    from lineproof.audit.verify.verification import Source, Verification

INTACT, ALTERED, WRONG = 0, 1, 2
_KINDS = (".pdf", ".html", ".htm")
_LONGEST_OUTSIDE = 100


def run(options: argparse.Namespace) -> int:
    """Verify a file; returns 0 if intact, 1 if altered or stripped, 2 for no package of ours."""
    from lineproof.audit.verify.verification import verify  # noqa: PLC0415 - 0.5 s with all that it prints

    against = _sources(options.against) if options.against else []
    content = _content(options.file)
    try:
        found = verify(content, options.file.name, against)
    except UserError as error:
        named = [f if str(options.file) in f else f"{options.file}: {f}" for f in error.faults]
        raise UserError(named) from None
    if options.json:
        sys.stdout.write(json.dumps(found.as_json(), indent=1) + "\n")
    else:
        sys.stdout.writelines(f"{printable(line)}\n" for line in said(found))
    return _code(found)


def _content(path: Path) -> bytes:
    """Read a package, never more than one could hold."""
    if path.suffix.lower() not in _KINDS:
        raise UserError(f"{path}: not a printed package; give one of {', '.join(_KINDS)}")
    return read_file(path, LARGEST_FILE)


def _sources(path: Path) -> list[Source]:
    """Return the records to compare with; a notebook gives its prose as well."""
    from lineproof.audit.verify.verification import Source  # noqa: PLC0415 - as in run

    if path.suffix.lower() != ".ipynb":
        return [Source(record) for record in read_records(path)]
    from lineproof.notebook.read import read_calc  # noqa: PLC0415 - by kind of file

    calc = read_calc(path)
    return [Source(calc.record, calc.walk)]


def _code(found: Verification) -> int:
    from lineproof.audit.verify.verification import Outcome  # noqa: PLC0415 - as in run

    if found.outcome is Outcome.NOT_OURS:
        return WRONG
    return INTACT if found.intact else ALTERED


def said(found: Verification) -> Iterator[str]:
    """Give what was found, a line each, the verdict first."""
    yield f"{found.file}: {found.outcome}"
    for proof in found.proofs:
        yield f"  calculation {proof.calc}, record {proof.digest}, {proof.lines} lines compared"
    yield from _verdict(found)
    yield from _most([altered.sentence for altered in found.alterations])
    yield from _most(found.remarks)
    yield from _not_provable(found)


def _verdict(found: Verification) -> Iterator[str]:
    """Say what the outcome means where it is not plain."""
    from lineproof.audit.verify.verification import Outcome  # noqa: PLC0415 - as in run

    if found.outcome is Outcome.NOT_OURS:
        yield "  no record of lineproof in it and no page that one was printed on"
    elif found.outcome is Outcome.STRIPPED and not (found.proofs or found.alterations):
        yield "  pages of a package without its record; compare them with --against RECORD"
    elif found.outcome is Outcome.STRIPPED and not found.alterations:
        yield "  what is printed is what the record given prints"
    elif found.proofs and found.alterations:
        yield f"  {len(found.alterations)} place(s) altered:"


def _most(sentences: Sequence[str]) -> Iterator[str]:
    for sentence in sentences[:MOST_NAMED]:
        yield f"  {sentence}"
    if len(sentences) > MOST_NAMED:
        yield f"  and {len(sentences) - MOST_NAMED} more"


def _not_provable(found: Verification) -> Iterator[str]:
    """Name the texts that are not in the record: prose, marks of the review."""
    if not found.outside:
        return
    numbers = sum(text.has_number for text in found.outside)
    yield (
        f"  text outside the record, not provable from it: {len(found.outside)} place(s), "
        f"{numbers} of them with numbers; --against CALC.ipynb compares these as well"
    )
    yield from _most(list(_outside(found)))


def _outside(found: Verification) -> Iterable[str]:
    for text in found.outside:
        place = f"page {text.page}" if text.page else ""
        after = f"after line {text.after}" if text.after else ""
        short = text.text[:_LONGEST_OUTSIDE].strip()
        yield f"  {', '.join(filter(None, (place, after))) or 'beside the print'}: “{short}”"
