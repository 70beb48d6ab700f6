"""``lineproof compare``: what changed from one issue of a calc to the next."""

from __future__ import annotations

import argparse
import re
import sys
from collections.abc import Iterable, Iterator, Mapping
from pathlib import Path
from typing import Any

from lineproof.errors import UserError
from lineproof.notebook.compare import compare
from lineproof.notebook.records import read_records
from lineproof.package.facts import revision_of
from lineproof.record import Record
from lineproof.record.entry import CHECK, CRITERIA, GIVEN, LOOKUP, NOTE, VALUES
from lineproof.typeset import printable
from lineproof.typeset.values import told

Entry = Mapping[str, Any]

MOST_NAMED = 30
_NONE: Entry = {}
_PIECES = re.compile(r"(?<=[.;]) ")


def run(options: argparse.Namespace) -> int:
    """Say what changed in every calc that both files hold; returns 1 where anything did."""
    old, new = _by_id(options.old), _by_id(options.new)
    both = [calc for calc in old if calc in new]
    if not both:
        raise UserError(
            f"{options.new}: holds {', '.join(new)}, but {options.old} holds {', '.join(old)}; "
            "give two issues of the same calc"
        )
    said = [line for calc in both for line in changes(old[calc], new[calc], everything=options.all)]
    said += [f"{calc}: only in {options.old}" for calc in old if calc not in new]
    said += [f"{calc}: only in {options.new}" for calc in new if calc not in old]
    sys.stdout.writelines(f"{printable(line)}\n" for line in said)
    same = len(old) == len(new) == len(both) and not any(
        compare(old[calc], new[calc]) for calc in both
    )
    return 0 if same else 1


def _by_id(path: Path) -> dict[str, Record]:
    return {record.calc_id: record for record in read_records(path)}


def changes(old: Record, new: Record, *, everything: bool) -> list[str]:
    """Return what changed in a calc: inputs and choices, verdicts, then how many lines in all.

    With ``everything`` every changed line is named, in the order of the calc.
    """
    changed = {change.id for change in compare(old, new)}
    head = f"{_issue(old)} to {_issue(new)}"
    if not changed:
        return [f"{head}: the same calculation, {len(new.entries)} lines"]
    ids = dict.fromkeys([*old.entries, *new.entries])
    pairs = [(old.entries.get(i, _NONE), new.entries.get(i, _NONE)) for i in ids if i in changed]
    if "calc" in changed:  # no line, but the codes that all of them are made by
        first, second = (str(record.data["codes"].get("pair", "none")) for record in (old, new))
        head += f", codes: was {first}, is {second}"
    verdicts = [pair for pair in pairs if _turned(*pair)]
    typed = [pair for pair in pairs if (pair[1] or pair[0])["kind"] in (GIVEN, LOOKUP, NOTE)]
    return [
        f"{head}: {_counted(pairs)}",
        *_same_revision(old, new),
        *_section("Checks with another verdict", verdicts, whole=True),
        *(
            _section("Lines", pairs, whole=True)
            if everything
            else _section("Inputs, choices and notes", typed, whole=False)
        ),
    ]


def _issue(record: Record) -> str:
    revision = revision_of(record.data["project"])
    named = f" revision {revision}" if revision else ""
    return f"{record.calc_id}{named} (record {record.digest})"


def _same_revision(old: Record, new: Record) -> Iterator[str]:
    """Say that two issues that differ carry one revision: on paper nobody can tell them apart."""
    revision = revision_of(new.data["project"])
    if revision and revision == revision_of(old.data["project"]):
        yield f"  Both carry revision {revision}: give the new issue its own in project.toml."


def _counted(pairs: Iterable[tuple[Entry, Entry]]) -> str:
    kinds = ["new" if not old else "gone" if not new else "changed" for old, new in pairs]
    return ", ".join(f"{kinds.count(kind)} lines {kind}" for kind in ("changed", "new", "gone"))


def _turned(old: Entry, new: Entry) -> bool:
    """Tell whether a check holds in one issue only, or fails without standing in the other."""
    first, second = (each.get("kind") != CHECK or each["holds"] for each in (old, new))
    return bool(first) != bool(second)


def _section(title: str, pairs: Iterable[tuple[Entry, Entry]], *, whole: bool) -> Iterator[str]:
    rows = [row for old, new in pairs if (row := _row(old, new))]
    if not rows:
        return
    yield f"  {title}:"
    shown = rows if whole else rows[:MOST_NAMED]
    yield from (f"    {row}" for row in shown)
    if len(shown) < len(rows):
        yield f"    and {len(rows) - len(shown)} more: --all names every line"


def _row(old: Entry, new: Entry) -> str:
    """Name a line with both values; nothing where only what it rests on has another name."""
    entry = new or old
    was, now = _words(old), _words(new)
    if was == now:
        return ""
    if old and new and old["kind"] == new["kind"] == NOTE:
        was, now = _apart(old["text"], new["text"])
    title = f" ({entry['title']})" if entry.get("title") else ""
    label = f"{entry['label']} " if entry.get("label") else ""
    if not old:
        return f"{label}{entry['id']}{title}: new: {now}"
    if not new:
        return f"{label}{entry['id']}{title}: gone, was: {was}"
    return f"{label}{entry['id']}{title}: was: {was}; is: {now}"


def _apart(old: str, new: str) -> tuple[str, str]:
    """Return the pieces of two texts that only one of them has, quoted.

    >>> _apart("Use: office; exposure N.", "Use: garage; exposure N.")
    ("'Use: office;'", "'Use: garage;'")
    """
    first, second = (_PIECES.split(text) for text in (old, new))
    return (
        repr(" ".join(piece for piece in first if piece not in second)),
        repr(" ".join(piece for piece in second if piece not in first)),
    )


def _words(entry: Entry) -> str:
    """Return what a line says, as it prints."""
    if not entry:
        return ""
    printed = entry.get("printed") or {}
    if entry["kind"] in CRITERIA:
        ratio = f", ratio {printed['utilisation']}" if printed.get("utilisation") else ""
        return f"{'holds' if entry['holds'] else 'does not hold'}{ratio}"
    if entry["kind"] in VALUES:
        return str(entry.get("typed") or told(printed["result"], printed["unit"]))
    return repr(entry["text"]) if entry["kind"] == NOTE else f"another {entry['kind']}"
