"""Records of a file: recomputed, compared with others, printed again."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from typing import Any

from lineproof.audit.review.print import printed_review
from lineproof.audit.review.read import read_review
from lineproof.audit.verify.data import Alteration, Where
from lineproof.errors import UserError
from lineproof.package import Package, PrintError, build_package
from lineproof.package.facts import PAPERS
from lineproof.package.model import Walk
from lineproof.record import Record, recompute
from lineproof.record.seal import SEAL, seal_of

_NAMED_APART = ("id", "digest", "label")


@dataclass(frozen=True, slots=True)
class Source:
    """A record, with the blocks of its notebook where they are known, and the text of its review.

    ``walk`` is None where the record came without a notebook: its prose is then not provable.
    """

    record: Record
    walk: Walk | None = None
    review: str = ""


def altered_records(records: Iterable[Record]) -> list[Alteration]:
    """Return every line of the records that its own formula, givens and texts do not give."""
    # Importing them registers the procedures by which found values are found again.
    import lineproof.beams  # noqa: PLC0415 - to recompute only
    import lineproof.standards.catalogue  # noqa: F401, PLC0415 - 0.1 s, to recompute only

    return [alteration for record in records for alteration in _altered(record)]


def _altered(record: Record) -> list[Alteration]:
    """Return what does not follow in a record; its broken seal, if nothing else shows why."""
    found = [
        Alteration(
            where=Where.RECORD,
            what=f"{found.what} of the record does not follow from it",
            calc=record.calc_id,
            line=_label(record, found.id),
            id="" if found.id == "record" else found.id,
            recorded=found.recomputed,
            found=found.stored,
        )
        for found in recompute(record)
    ]
    sealed = seal_of(record.data)
    if found or sealed == record.data[SEAL]:
        return found
    what = "the record was changed after it was closed, in what no line follows from"
    return [
        Alteration(Where.RECORD, what, record.calc_id, recorded=record.data[SEAL], found=sealed)
    ]


def _label(record: Record, entry_id: str) -> str:
    return str(record.entries.get(entry_id, {}).get("label", ""))


def differing_records(records: Iterable[Record], against: Sequence[Source]) -> list[Alteration]:
    """Return the lines in which records of a file differ from those given to compare with."""
    known = {source.record.calc_id: source.record for source in against}
    found: list[Alteration] = []
    for record in records:
        other = known.get(record.calc_id)
        if other is None:
            what = "is not among the records given to compare with"
            found.append(Alteration(Where.RECORD, what, record.calc_id))
        elif record.to_text() != other.to_text():
            found += _differences(record, other)
    return found


def _differences(record: Record, other: Record) -> Iterator[Alteration]:
    calc, told = record.calc_id, False
    for entry_id in {**other.entries, **record.entries}:
        mine, given = record.entries.get(entry_id), other.entries.get(entry_id)
        if mine != given:
            told = True
            own, wanted = _first_difference(mine or {}, given or {})
            what = "the record differs from the one given"
            label = _label(record, entry_id) or _label(other, entry_id)
            yield Alteration(Where.RECORD, what, calc, label, entry_id, 0, wanted, own)
    if not told:
        heads = [key for key in other.data if record.data.get(key) != other.data[key]]
        what = f"{', '.join(heads) or 'the order'} of the record differs from the one given"
        yield Alteration(Where.RECORD, what, calc)


def _first_difference(one: Mapping[str, Any], other: Mapping[str, Any]) -> tuple[str, str]:
    names = [name for name in {**other, **one} if one.get(name) != other.get(name)]
    plain = [name for name in names if name not in _NAMED_APART] or names
    name = plain[0]
    return tuple(  # type: ignore[return-value]
        "" if name not in entry else f"{name} {entry[name]}" for entry in (one, other)
    )


def printed_again(
    sources: Sequence[Source], paper: str = "", walks: Sequence[Walk | None] | None = None
) -> Package:
    """Return the package of some records; ``walks`` stand in for notebooks that are not known.

    Raises :class:`UserError` where a record or its review cannot be printed.
    """
    ordered = walks or [None] * len(sources)
    package = build_package(
        [source.record for source in sources],
        [source.walk or walk for source, walk in zip(sources, ordered, strict=True)],
        reviews=[
            printed_review(read_review(source.review), source.record) if source.review else None
            for source in sources
        ],
    )
    if paper in PAPERS.values():
        package = replace(package, facts=replace(package.facts, paper=paper))
    return package


def not_printed(error: Exception, sources: Sequence[Source]) -> Alteration:
    """Say that records cannot be printed any more; our printer prints every record that it made."""
    calcs = ", ".join(source.record.calc_id for source in sources)
    reason = error.faults[0] if isinstance(error, UserError) else str(error).splitlines()[0]
    return Alteration(Where.RECORD, f"cannot be printed again: {reason[:160]}", calcs)


NOT_PRINTED = (UserError, PrintError)
"""What printing a record again may raise."""


def lines_of(sources: Iterable[Source]) -> list[tuple[str, str, str]]:
    """Return calculation, printed number and id of every entry, in the order of print."""
    return [
        (source.record.calc_id, entry.get("label", ""), entry["id"])
        for source in sources
        for part in source.record.parts
        for entry in part["entries"]
    ]
