"""The package: what is printed, in which order, as plain data that HTML and PDF both lay out."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from typing import Any

from lineproof.errors import FaultList, UserError
from lineproof.package.calc import Calc, NotCovered, PartBlock, ProseBlock
from lineproof.package.facts import FINAL_STATUSES, ProjectFacts, project_facts
from lineproof.package.files import file_name
from lineproof.package.joined import total_quantities
from lineproof.package.merged import (
    NotCoveredBy,
    ScopeBox,
    ToConfirm,
    scopes,
    to_confirm,
    unconfirmed,
    uncovered,
)
from lineproof.package.prose import Mark, Prose, read_prose
from lineproof.package.repeats import Worked
from lineproof.package.reviewed import PrintedReview, checked_by
from lineproof.package.summary import (
    Confirmation,
    Failure,
    NotationRow,
    confirmations,
    failures,
    is_proof_that_holds,
    load_rows,
    notation_rows,
    summary_rows,
)
from lineproof.package.words import Words, words_of
from lineproof.record.entry import CRITERIA, VALUES
from lineproof.record.plain_data import json_text
from lineproof.typeset.glyphs import has_missing, tree_has_missing
from lineproof.typeset.nodes import EQUALS, Math, row
from lineproof.typeset.rows import PrintedRow, PrintedTable, notation_of, printed_row
from lineproof.typeset.values import symbol_math, symbol_of, value_math

Walk = Iterable[tuple[str, str]]
"""Blocks of a calc in order: ``("prose", markdown)`` and ``("part", key)``."""

_PART_LEVEL, _DEEPEST_LEVEL = 2, 4


@dataclass(frozen=True, slots=True)
class Package:
    """A whole package: the project's facts once, then one or many calcs."""

    title: str
    facts: ProjectFacts
    calcs: tuple[Calc, ...]
    notation: tuple[NotationRow, ...]
    missing_glyphs: bool
    words: Words
    quantities: PrintedTable | None = None
    reviews: tuple[PrintedReview, ...] = ()

    @property
    def failures(self) -> tuple[Failure, ...]:
        """The checks of all calcs that do not hold."""
        return tuple(failure for calc in self.calcs for failure in calc.failures)

    @property
    def contents_lines(self) -> int:
        """About how many lines the contents have; long ones are set smaller."""
        parts = sum(isinstance(b, PartBlock) for calc in self.calcs for b in calc.blocks)
        tables = sum(printed.kind == "table" for calc in self.calcs for printed in calc.front)
        return parts + tables + 4 * len(self.calcs) + 5

    @property
    def has_lines_to_check(self) -> bool:
        """Tell whether there is a value or a comparison that a reviewer could mark."""
        parts = (b for calc in self.calcs for b in calc.blocks if isinstance(b, PartBlock))
        return any(printed.kind in (*VALUES, *CRITERIA) for part in parts for printed in part.rows)

    @property
    def scopes(self) -> tuple[ScopeBox, ...]:
        """What is preliminary and not covered yet, each once."""
        return scopes(self.calcs)

    @property
    def not_covered(self) -> tuple[NotCoveredBy, ...]:
        """What is not covered yet, each item once."""
        return uncovered(self.calcs)

    @property
    def to_confirm(self) -> tuple[ToConfirm, ...]:
        """The clauses to confirm, each once over all calcs."""
        return to_confirm(self.calcs)

    @property
    def unconfirmed(self) -> str:
        """Say how many clauses the office has not confirmed yet; "" if none."""
        return unconfirmed(self.to_confirm)

    @property
    def digest(self) -> str:
        """The digests of all records, as the footer prints them."""
        return " ".join(calc.digest for calc in self.calcs)


def build_package(
    records: Sequence[Any],
    walks: Sequence[Walk | None] | None = None,
    reviews: Sequence[PrintedReview | None] = (),
) -> Package:
    """Build the package of one or several records of one project.

    ``records`` are records or their plain data; ``walks`` give each record's blocks (None: all
    parts in order); ``reviews`` give the review of each record, None for none.
    Raises :class:`UserError` with all faults of prose and anchors at once.
    """
    data = [_plain_data(record) for record in records]
    if not data:
        raise UserError("package: no record; give at least one calc")
    faults = FaultList()
    calcs, reviewed = [], []
    for place, (record, prefix) in enumerate(zip(data, _prefixes(data), strict=True)):
        walk = walks[place] if walks is not None else None
        review = reviews[place] if reviews else None
        beside = review.notes if review is not None else {}
        calcs.append(_Builder(record, prefix, beside, faults).calc(walk))
        reviewed += [replace(review, anchor=prefix)] if review is not None else []
    facts = project_facts(
        data[0]["project"], data[0]["codes"], [each["calc"]["id"] for each in data]
    )
    _check_status(facts.status, calcs, faults)
    faults.raise_if_any()
    return Package(
        title=calcs[0].title if len(calcs) == 1 else facts.name,
        facts=checked_by(facts, reviews),
        calcs=tuple(calcs),
        notation=notation_rows(data),
        missing_glyphs=any(tree_has_missing(record) for record in data)
        or any(has_missing(review.text) for review in reviewed),
        words=words_of(record["kind_of_member"] for record in data),
        quantities=total_quantities(data),
        reviews=tuple(reviewed),
    )


def _check_status(status: str, calcs: Sequence[Calc], faults: FaultList) -> None:
    """Refuse to issue what is preliminary for a permit or for construction."""
    preliminary = [calc.id for calc in calcs if calc.scope.startswith("preliminary")]
    if preliminary and status in FINAL_STATUSES:
        faults.add(
            f"issue.status: {status!r}: {', '.join(preliminary)} is preliminary and cannot be "
            f"issued {status}; write 'preliminary' or 'for review'"
        )


def _plain_data(record: Any) -> Mapping[str, Any]:
    data: Mapping[str, Any] = record if isinstance(record, Mapping) else record.data
    return data


def _prefixes(data: Sequence[Mapping[str, Any]]) -> list[str]:
    """Return what stands before the anchors of each calc: its id, made unlike any other."""
    if len(data) == 1:
        return [""]
    names: list[str] = []
    for record in data:
        name = base = file_name(record["calc"]["id"])
        number = 1
        while name in names:
            number += 1
            name = f"{base}.{number}"
        names.append(name)
    return [f"{name}/" for name in names]


class _Builder:
    """Builds one calc from its record."""

    def __init__(
        self,
        record: Mapping[str, Any],
        prefix: str,
        marks: Mapping[str, tuple[str, ...]],
        faults: FaultList,
    ) -> None:
        self.record = record
        self.prefix = prefix
        self.marks = marks
        self.faults = faults
        self.notation = notation_of(record)
        self.entries = {e["id"]: e for part in record["parts"] for e in part["entries"]}
        labels = {entry_id: e.get("label", "") for entry_id, e in self.entries.items()}
        self.rows = {
            entry_id: printed_row(entry, self.notation, labels)
            for entry_id, entry in self.entries.items()
        }

    def calc(self, walk: Walk | None) -> Calc:
        record, rows = self.record, list(self.rows.values())
        status = record["status"]
        front = sorted((r for r in rows if r.front is not None), key=_front_key)
        # A calc that says what stands in front says it all.
        figures = [r for r in rows if r.kind == "figure" and not front]
        blocks = self._blocks(walk)
        return Calc(
            id=record["calc"]["id"],
            title=record["calc"].get("title", ""),
            anchor=self.prefix,
            member=record.get("kind_of_member", ""),
            digest=record["digest"],
            record_text=json_text(record),
            blocks=blocks,
            summary=summary_rows(record["parts"], self.rows, self.notation, self.prefix),
            proofs=sum(is_proof_that_holds(e) for part in record["parts"] for e in part["entries"]),
            loads=() if front else load_rows(record["parts"], self.rows, self.prefix),
            section=next((f for f in figures if f.id.endswith("/section")), None),
            loading=tuple(f for f in figures if f.id.endswith(("/plan", "/loading"))),
            failures=failures(record, self.rows, self.prefix),
            confirm=tuple(
                self._worked_lines(confirmations(record, self.rows, self.prefix), blocks)
            ),
            scope=status.get("scope", ""),
            not_covered=tuple(
                NotCovered(item["check"], item.get("clause", ""))
                for item in status.get("not_covered", [])
            ),
            marks=self.marks,
            statements=() if front else tuple(r.text for r in rows if r.id.endswith("/bars-text")),
            front=tuple(front),
        )

    def _worked_lines(
        self, items: Iterable[Confirmation], blocks: Iterable[PartBlock | ProseBlock]
    ) -> Iterator[Confirmation]:
        """Leave out lines that repeat others: these stand in the list by their first."""
        repeated = {
            self.prefix + same.row.id
            for block in blocks
            if isinstance(block, PartBlock)
            for group in block.groups
            for same in group.repeated
        }
        for item in items:
            lines = tuple(line for line in item.lines if line[0] not in repeated)
            yield replace(item, lines=lines)

    def _blocks(self, walk: Walk | None) -> tuple[PartBlock | ProseBlock, ...]:
        parts = {part["key"]: part for part in self.record["parts"]}
        steps = list(walk) if walk is not None else [("part", key) for key in parts]
        self._check_anchors([key for kind, key in steps if kind == "part"], parts)
        blocks: list[PartBlock | ProseBlock] = []
        values = self._values()
        worked = Worked(self.marks)
        level = _PART_LEVEL - 1
        for kind, content in steps:
            if kind == "part" and content in parts:
                blocks.append(self._part(parts[content], worked))
                level = _PART_LEVEL
            elif kind == "prose":
                prose, level = _levelled(self._prose(content, values), level)
                blocks += [ProseBlock(prose)] if prose.blocks else []
        return tuple(blocks)

    def _prose(self, markdown: str, values: Mapping[str, Math]) -> Prose:
        try:
            return read_prose(markdown, values)
        except UserError as error:
            self.faults.take(error)
            return Prose(())

    def _check_anchors(self, anchors: list[str], parts: Mapping[str, Any]) -> None:
        calc = self.record["calc"]["id"]
        for key in dict.fromkeys(anchors):
            if key not in parts:
                self.faults.add(
                    f"{calc}: part {key!r} is shown but not in the record; run the calc again"
                )
            elif anchors.count(key) > 1:
                self.faults.add(f"{calc}: part {key!r} is shown twice; remove one of the outputs")
        for key in parts:
            if key not in anchors:
                self.faults.add(
                    f"{calc}: part {key!r} is in the record but not shown; run the calc again"
                )

    def _values(self) -> dict[str, Math]:
        """Give symbol = value for every full id and for every symbol that stands once."""
        values: dict[str, Math] = {}
        bare: dict[str, list[Math]] = {}
        for entry_id, entry in self.entries.items():
            printed = entry.get("printed") or {}
            if "result" in printed:
                symbol = symbol_math(symbol_of(entry["symbol"], self.notation))
                math = row([symbol, EQUALS, value_math(printed["result"], printed["unit"])])
                values[entry_id] = math
                bare.setdefault(entry["symbol"], []).append(math)
        return values | {symbol: maths[0] for symbol, maths in bare.items() if len(maths) == 1}

    def _part(self, part: Mapping[str, Any], worked: Worked) -> PartBlock:
        rows = _once_named([self.rows[entry["id"]] for entry in part["entries"]])
        return PartBlock(
            key=part["key"],
            anchor=f"{self.prefix}part-{part['key']}",
            label=part.get("label", ""),
            title=part.get("title", ""),
            rows=rows,
            groups=worked.groups(part["entries"], rows, part.get("label", "")),
        )


def _front_key(printed: PrintedRow) -> int:
    return printed.front or 0


def _once_named(rows: Iterable[PrintedRow]) -> tuple[PrintedRow, ...]:
    """Name a basis where it begins, not again on the lines that share it.

    So it is with the numbers that values found together share: they stand where the first is.
    """
    made = []
    last = ""
    first: PrintedRow | None = None
    for printed in rows:
        row = replace(printed, basis="") if printed.basis == last else printed
        last = printed.basis
        if first is not None and printed.inputs and printed.inputs == first.inputs:
            text = printed.text.removesuffix("with") + f"with the numbers of line {first.label}."
            row = replace(row, inputs=(), origins=(), text=text)
        elif printed.inputs:
            first = printed
        made.append(row)
    return tuple(made)


def _levelled(prose: Prose, level: int) -> tuple[Prose, int]:
    """Fit prose headings under the package's own, leaving no level out; return the last level."""
    blocks: list[Mark] = []
    for mark in prose.blocks:
        if mark.kind == "heading":
            level = min(max(mark.level, _PART_LEVEL), level + 1, _DEEPEST_LEVEL)
            blocks.append(Mark("heading", children=mark.children, level=level))
        else:
            blocks.append(mark)
    return Prose(tuple(blocks)), level
