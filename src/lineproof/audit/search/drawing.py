"""A drawing against the calc: what is drawn otherwise, what it does, what is not drawn at all."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass

from lineproof.audit.claims.tables import Row
from lineproof.audit.data import Effect, Finding, Severity
from lineproof.audit.effects import DRAWN, effects_of, turned_sentence
from lineproof.audit.graph import Graph
from lineproof.audit.search.drawing_rows import (
    BARS_ITEM,
    CUT_ITEM,
    FORM_ITEM,
    FROM_ITEM,
    HANGER_ITEM,
    HEADINGS,
    LAP_ITEM,
    LENGTH_ITEM,
    SPACING_ITEM,
    STIRRUPS_ITEM,
    TO_ITEM,
    WHOLE,
    Item,
    area_of,
    items_of,
)
from lineproof.audit.search.member import project_rows
from lineproof.errors import FaultList, UserError
from lineproof.quantity import echo, read_quantity
from lineproof.record import Record
from lineproof.sentences import begun
from lineproof.standards.a23_3.bars import BARS

SOURCE = "drawing"
MATTERS = {
    "overall depth": Severity.MAJOR,
    "width of the web": Severity.MAJOR,
    "thickness of the slab": Severity.MAJOR,
    "cover": Severity.MAJOR,
    "span": Severity.MAJOR,
    "strength of concrete": Severity.MAJOR,
    "strength of bars": Severity.MAJOR,
    BARS_ITEM: Severity.MAJOR,
    LENGTH_ITEM: Severity.MAJOR,
    STIRRUPS_ITEM: Severity.MAJOR,
    FORM_ITEM: Severity.MAJOR,
    SPACING_ITEM: Severity.MAJOR,
    CUT_ITEM: Severity.MAJOR,
    LAP_ITEM: Severity.MAJOR,
    HANGER_ITEM: Severity.MAJOR,
}
"""How much less than the calc's matters, by item; of any other item it is minor."""
WITHIN = {LENGTH_ITEM: 10.0, FROM_ITEM: 25.0, TO_ITEM: 25.0}
"""Lengths [mm] that a drawing may differ by, by item; else half a millimetre."""
CLAUSES = {
    "cover": "A23.1 Table 17",
    "strength of concrete": "8.6.1",
    "strength of bars": "8.5.1",
    BARS_ITEM: "8.1.3",
    LENGTH_ITEM: "12.1",
    STIRRUPS_ITEM: "11.3.5",
    FORM_ITEM: "11.2.7",
    SPACING_ITEM: "11.3.8",
    FROM_ITEM: "11.3.8",
    TO_ITEM: "11.3.8",
    CUT_ITEM: "12.10.3",
    LAP_ITEM: "12.15",
    HANGER_ITEM: "11.2.12",
}
"""The clause that an item belongs to; sizes belong to the section as a whole."""
_SECTION = "geometry"
_REVISIONS = "drawings"
_SAME = 0.5
_BARS = re.compile(r"(\d{1,3})\s*[-– x×]?\s*(\d\dM)", re.IGNORECASE | re.ASCII)
_LEGS = re.compile(r"(\d{1,2})\s*(?:legs?|[-– x×])?\s*(?:of\s+)?(\d\dM)", re.IGNORECASE | re.ASCII)
_FORMS = {"open": 0.0, "closed": 1.0}
_SHOWN_FAULTS = 40
_SHARED = (
    " The effects take the drawn bars as shared like the calc's; they hold nothing of what bars do "
    "for shear, nor of their anchorage."
)
_THICKER = "Larger bars need longer development, hooks and laps, which the effects do not hold."


@dataclass(frozen=True, slots=True)
class Drawn:
    """A row read: which item, what is drawn in internal units, and on which drawing."""

    row: int
    item: str
    place: str
    text: str
    value: float
    drawing: str
    revision: str


def drawing_blank(record: Record) -> tuple[tuple[str, ...], ...]:
    """Return the rows of a table to be filled in from a drawing, without the calc's values.

    The columns are :data:`HEADINGS`.
    """
    return tuple((item.name, item.place, "", item.unit, "", "") for item in items_of(record))


def drawing_findings(record: Record, rows: Iterable[Row]) -> tuple[Finding, ...]:
    """Return what is drawn otherwise than the calc has it, the gravest first.

    ``rows`` are those of a table with the columns :data:`HEADINGS`; one with nothing drawn is
    taken as not drawn. Less than the calc's counts as major, and as critical where a check that
    holds in the calc would not hold as drawn. Raises :class:`UserError` with every fault of the
    rows: an unknown item, a missing unit, a row that stands twice.
    """
    items = {item.key: item for item in items_of(record)}
    drawn = _read(rows, items)
    graph = Graph(record)
    found = [
        *_revisions(record, drawn.values()),
        *(
            finding
            for key, row in drawn.items()
            for finding in (_compared(graph, items[key], row) if key in items else [_extra(row)])
        ),
        *_not_drawn([item for key, item in items.items() if key not in drawn]),
    ]
    order = list(Severity)
    return tuple(sorted(found, key=lambda finding: order.index(finding.severity)))


# -- reading ---------------------------------------------------------------------------------


def _read(
    rows: Iterable[Row], items: Mapping[tuple[str, str], Item]
) -> dict[tuple[str, str], Drawn]:
    faults, found = FaultList(), dict[tuple[str, str], Drawn]()
    names = {name for name, _ in items} | set(MATTERS)
    for row in rows:
        text = row.cells.get("drawn", "")
        if not text:
            continue
        try:
            made = _row(row, text, names, items)
        except UserError as error:
            faults.take(UserError(f"row {row.number}: {fault}" for fault in error.faults))
            continue
        if (made.item, made.place) in found:
            first = found[made.item, made.place].row
            faults.add(
                f"row {row.number}: {made.item}, {made.place} stands in row {first} already; "
                "keep one of the two"
            )
        found[made.item, made.place] = made
    if len(faults.faults) > _SHOWN_FAULTS:
        more = len(faults.faults) - _SHOWN_FAULTS
        raise UserError([*faults.faults[:_SHOWN_FAULTS], f"and {more} faults more"])
    faults.raise_if_any()
    return found


def _row(row: Row, text: str, names: set[str], items: Mapping[tuple[str, str], Item]) -> Drawn:
    name = " ".join(row.cells.get("item", "").lower().split())
    place = " ".join(row.cells.get("place", "").split()) or WHOLE
    if name not in names:
        raise UserError(f"item: {echo(name)} is not known; write one of {', '.join(sorted(names))}")
    item = items.get((name, place)) or _alike(items, name, place)
    if item is None and name not in (BARS_ITEM, LENGTH_ITEM):
        there = [p for n, p in items if n == name]
        raise UserError(
            f"place: {echo(place)} is no place of {name!r} in this calc; write one of "
            f"{', '.join(there) or 'none: the calc has none'}"
        )
    unit = row.cells.get("unit", "") or ""
    value = _value(name, text, unit)
    return Drawn(
        row.number,
        name,
        place if item is None else item.place,
        _with_unit(text, unit),
        value,
        row.cells.get("drawing", ""),
        row.cells.get("revision", ""),
    )


def _alike(items: Mapping[tuple[str, str], Item], name: str, place: str) -> Item | None:
    """Return the item whose place differs by capital letters alone."""
    same = (item for item in items.values() if item.name == name)
    return next((item for item in same if item.place.lower() == place.lower()), None)


def _value(name: str, text: str, unit: str) -> float:
    reader = _READERS.get(name)
    if reader is not None:
        return reader(text)
    wanted = "MPa" if name.startswith("strength") else "mm"
    return read_quantity("drawn", _with_unit(text, unit), wanted).value


def _with_unit(text: str, unit: str) -> str:
    """Return what is drawn with the unit of its column, unless one is typed beside the number."""
    return text if re.search(r"[A-Za-z]", text) else f"{text} {unit}".strip()


def _bars(text: str) -> float:
    return _of_size(_BARS, text, "4-20M")


def _legs(text: str) -> float:
    return _of_size(_LEGS, text, "2 legs 10M")


def _of_size(pattern: re.Pattern[str], text: str, like: str) -> float:
    match = pattern.fullmatch(text.strip())
    if match is None or match.group(2).upper() not in BARS.rows:
        raise UserError(f"drawn: {echo(text)} is not understood; write it like {like!r}")
    return area_of(int(match.group(1)), match.group(2).upper())


def _form(text: str) -> float:
    if text.strip().lower() not in _FORMS:
        raise UserError(f"drawn: {echo(text)} is not understood; write 'open' or 'closed'")
    return _FORMS[text.strip().lower()]


def _count(text: str) -> float:
    if re.fullmatch(r"\d{1,3}", text.strip(), re.ASCII) is None:
        raise UserError(f"drawn: {echo(text)} is no whole number; write it like '3'")
    return float(text)


_READERS: Mapping[str, Callable[[str], float]] = {
    BARS_ITEM: _bars,
    STIRRUPS_ITEM: _legs,
    FORM_ITEM: _form,
    HANGER_ITEM: _count,
}
"""How the items that are no quantities are read."""


# -- comparing -------------------------------------------------------------------------------


def _compared(graph: Graph, item: Item, drawn: Drawn) -> Iterator[Finding]:
    difference = drawn.value - item.value
    other = _other_bars(item, drawn)
    if abs(difference) < WITHIN.get(item.name, _SAME) and other == 0:
        return
    changes = item.changes(drawn.value)
    effects = effects_of(graph, changes, DRAWN) if changes else ()
    if item.parts is not None:
        effects = tuple(e for e in effects if graph[e.check].part in item.parts)
    less = difference * item.more < 0
    worse = item.more == 0 or less or other > 0
    severity = _severity(item, effects, worse=worse)
    place = "" if item.place == WHOLE else f", {item.place}"
    yield Finding(
        SOURCE,
        severity,
        f"{begun(item.name)}{place}: drawn {drawn.text}, {item.text} in the calc{_where(drawn)}.",
        item.ids,
        CLAUSES.get(item.name, _SECTION),
        _advice(item, graph, changes, harmless=severity == Severity.OBSERVATION, thicker=other > 0),
        effects,
    )


def _other_bars(item: Item, drawn: Drawn) -> int:
    """Return 1 where bars or stirrups are drawn of a larger size, -1 for others than the calc's.

    Bars of the same area are not the same bars: 3-25M for 5-20M need longer laps and development.
    """
    pattern = {BARS_ITEM: _BARS, STIRRUPS_ITEM: _LEGS}.get(item.name)
    if pattern is None:
        return 0
    own, other = (pattern.fullmatch(text.strip()) for text in (item.text, drawn.text))
    if own is None or other is None:
        return 0
    if (int(own[1]), own[2].upper()) == (int(other[1]), other[2].upper()):
        return 0
    diameters = [BARS.number(found[2].upper(), "d_b") for found in (own, other)]
    return 1 if diameters[1] > diameters[0] else -1


def _severity(item: Item, effects: Sequence[Effect], *, worse: bool) -> Severity:
    if any(effect.holds and not effect.holds_as_claimed for effect in effects):
        return Severity.CRITICAL
    if worse:
        return MATTERS.get(item.name, Severity.MINOR)
    return Severity.OBSERVATION


def _advice(
    item: Item, graph: Graph, changes: Mapping[str, float], *, harmless: bool, thicker: bool
) -> str:
    said = (
        _what_to_do(item, harmless=harmless),
        _THICKER * thicker,
        turned_sentence(graph, changes, DRAWN, item.parts),
    )
    return " ".join(filter(None, said))


def _what_to_do(item: Item, *, harmless: bool) -> str:
    if harmless:
        return "On the safe side by itself: see that it fits, and change calc or drawing."
    shared = _SHARED * (item.name == BARS_ITEM)
    return f"Change the drawing, or work the calc again with what is drawn.{shared}"


def _where(drawn: Drawn) -> str:
    if not drawn.drawing:
        return ""
    revision = f", revision {drawn.revision}" if drawn.revision else ""
    return f" ({drawn.drawing}{revision})"


def _extra(drawn: Drawn) -> Finding:
    return Finding(
        SOURCE,
        Severity.MINOR,
        f"{begun(drawn.item)}, {drawn.place}: drawn {drawn.text}, not in the calc{_where(drawn)}.",
        clause=CLAUSES.get(drawn.item, _SECTION),
        advice="Ask what they are for: bars that the calc does not count may hinder the concrete.",
    )


def _not_drawn(items: Iterable[Item]) -> Iterator[Finding]:
    """Give one finding for each kind of item of which something is not drawn."""
    kinds: dict[str, list[Item]] = {}
    for item in items:
        kinds.setdefault(item.name, []).append(item)
    for name, left in kinds.items():
        places = [item.place for item in left if item.place != WHOLE]
        where = f" of {', '.join(places)}" if places else ""
        steel = name in (BARS_ITEM, STIRRUPS_ITEM, SPACING_ITEM)
        yield Finding(
            SOURCE,
            Severity.MAJOR if steel else Severity.MINOR,
            f"{begun(name)}{where}: not on the drawing.",
            tuple(dict.fromkeys(entry_id for item in left for entry_id in item.ids)),
            CLAUSES.get(name, _SECTION),
            advice="See whether the drawing shows it, and fill in the row.",
        )


# -- revisions -------------------------------------------------------------------------------


def _revisions(record: Record, rows: Iterable[Drawn]) -> Iterator[Finding]:
    told = {
        row.get("number", ""): row.get("revision", "") for row in project_rows(record, "drawings")
    }
    seen: dict[str, set[str]] = {}
    for row in rows:
        if row.drawing:
            seen.setdefault(row.drawing, set()).add(row.revision)
    for drawing, revisions in seen.items():
        if len(revisions) > 1:
            yield _revision(
                f"{drawing} is told with revisions {', '.join(sorted(revisions))}",
                "Fill in the table from one revision.",
            )
        if drawing not in told:
            yield Finding(
                SOURCE, Severity.MINOR, f"The calc names no drawing {drawing}.", clause=_REVISIONS,
                advice="List it among the drawings of the project.",
            )  # fmt: skip
            continue
        for revision in sorted(revisions - {told[drawing], ""}):
            yield _revision(
                f"The calc rests on revision {told[drawing]} of {drawing}, the drawing is "
                f"revision {revision}",
                "Compare the two revisions before its other differences are judged.",
            )


def _revision(what: str, advice: str) -> Finding:
    return Finding(SOURCE, Severity.MAJOR, f"{what}.", clause=_REVISIONS, advice=advice)


__all__ = ["HEADINGS", "drawing_blank", "drawing_findings"]
