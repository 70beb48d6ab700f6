"""What a drawing shows of a beam, item by item: the calc's values and the lines behind them."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, field
from typing import Any

from lineproof.audit.graph import Graph, Node
from lineproof.audit.search.stirrup_rows import first_column, last_column
from lineproof.errors import UserError
from lineproof.quantity import echo
from lineproof.record import Record
from lineproof.record.entry import GIVEN, LOOKUP
from lineproof.standards.a23_3.bars import BARS

HEADINGS = ("item", "place", "drawn", "unit", "drawing", "revision")
"""Columns of a table of what is drawn; ``unit`` may stand in ``drawn`` instead."""
WHOLE = "the beam"
Changed = Mapping[str, float]

_SIZES = (
    ("overall depth", r"h(?:_(\d+))?", "mm"),
    ("width of the web", r"b_w", "mm"),
    ("thickness of the slab", r"h_f", "mm"),
    ("cover", r"c_c", "mm"),
    ("span", r"l_(\d+)", "mm"),
    ("width of support", r"b_s(\d+)", "mm"),
    ("strength of concrete", r"f_c", "MPa"),
    ("strength of bars", r"f_y", "MPa"),
)
BARS_ITEM, LENGTH_ITEM = "bars", "cut length"
STIRRUPS_ITEM, FORM_ITEM, SPACING_ITEM = "stirrups", "stirrup form", "stirrup spacing"
FROM_ITEM, TO_ITEM = "zone from", "zone to"
CUT_ITEM, LAP_ITEM, HANGER_ITEM = "cut-off", "lap length", "hanger stirrups"
_CUT = re.compile(r"anchorage-(bottom|top)-(\d+)-(left|right)-cut-(\d+)")
_COLUMNS = ("Mark", "Size", "For", "Span", "Stirrups", "Form")
_NUMBER = re.compile(r"-?\d{1,9}(\.\d{1,6})?", re.ASCII)
_SAME = 0.5
"""Lengths [mm] that differ by less are the same."""
_WORDS = {"bottom": "span", "top": "support"}


@dataclass(frozen=True, slots=True)
class Item:
    """One thing that a drawing shows, as the calc has it.

    ``value`` is in internal units; of bars it is their area and ``text`` says them. ``more`` is
    1 where less than the calc's is worse, -1 where more is, 0 where both are. ``changes`` gives
    the lines of the calc that a drawn value stands for, so that its effects can be worked out.
    Where such a line is that of the whole beam, ``parts`` are those in which it is drawn so.
    """

    name: str
    place: str
    unit: str
    value: float
    text: str
    more: int
    ids: tuple[str, ...] = ()
    changes: Callable[[float], Changed] = field(default=lambda _: {})
    parts: frozenset[str] | None = None

    @property
    def key(self) -> tuple[str, str]:
        """Item and place, by which a row of the table finds it."""
        return self.name, self.place


def items_of(record: Record) -> tuple[Item, ...]:
    """Return everything of a beam that a drawing shows, in the order of the blank table."""
    graph = Graph(record)
    made = [*_sizes(graph), *_bars(graph), *_stirrups(graph), *_cuts(graph), *_laps(graph)]
    return tuple({item.key: item for item in made}.values())


def area_of(number: int, size: str) -> float:
    """Return the area of bars [mm2]; 0 for a size that there is not."""
    return number * BARS.number(size, "A_b") if size in BARS.rows else 0.0


def _to(*ids: str) -> Callable[[float], Changed]:
    return lambda value: dict.fromkeys(ids, value)


# -- sizes and strengths ---------------------------------------------------------------------


def _sizes(graph: Graph) -> Iterator[Item]:
    for name, pattern, unit in _SIZES:
        for node in graph:
            match = re.fullmatch(pattern, node.symbol)
            if match is None or node.kind not in (GIVEN, LOOKUP):
                continue
            if node.part not in ("given", "materials"):
                continue
            number = match.group(1) if match.groups() else None
            word = "support" if name.endswith("support") else "span"
            place = WHOLE if number is None else f"{word} {number}"
            yield _plain(graph, name, place, unit, node, 0 if word == "support" else _better(name))


def _better(name: str) -> int:
    """Tell whether more of a size is better: a longer span is worse, a thicker cover is both."""
    return {"span": -1, "cover": 0}.get(name, 1)


def _plain(graph: Graph, name: str, place: str, unit: str, node: Node, more: int) -> Item:
    value = graph.stored[node.id]
    return Item(name, place, unit, value, f"{value:g} {unit}", more, (node.id,), _to(node.id))


# -- bars ------------------------------------------------------------------------------------


def _table(graph: Graph, entry_id: str) -> list[dict[str, str]]:
    entry: Mapping[str, Any] = graph.record.entries.get(entry_id, {})
    empty = dict.fromkeys(_COLUMNS, "")
    rows = entry.get("rows", [])
    return [empty | dict(zip(entry["columns"], row, strict=False)) for row in rows]


def _number(row: Mapping[str, str], column: str) -> float:
    """Read a number of a schedule of the record; raises :class:`UserError` for anything else."""
    text = str(row.get(column, ""))
    if _NUMBER.fullmatch(text) is None:
        raise UserError(
            f"record: its schedules were changed by hand: {column!r} is {echo(text)}, no number; "
            "take the record from a package that 'lineproof verify' calls intact"
        )
    return float(text)


def _bars(graph: Graph) -> Iterator[Item]:
    rows = [row for row in _table(graph, "schedule/bars") if row.get("Size")]
    for row in rows:
        mark, size, number = row["Mark"], row["Size"], int(_number(row, "Number"))
        length = _number(row, "Cut length, mm")
        area = area_of(number, size)
        if not mark.startswith("S"):
            places = _sections(graph, rows, row)
            ids = tuple(entry_id for entry_id, _ in places)
            changes = _areas(graph, area, places)
            yield Item(BARS_ITEM, mark, "", area, f"{number}-{size}", 1, ids, changes)
        yield Item(LENGTH_ITEM, mark, "mm", length, f"{length:g} mm", 1)


def _areas(
    graph: Graph, area: float, places: list[tuple[str, float]]
) -> Callable[[float], Changed]:
    """Say which areas of steel change with the area of the bars of a mark.

    What is drawn is shared by the places as the calc shares it.
    """

    def changed(drawn: float) -> Changed:
        share = drawn / area if area else 1.0
        return {entry_id: graph.stored[entry_id] + (share - 1) * part for entry_id, part in places}

    return changed


def _sections(
    graph: Graph, rows: list[dict[str, str]], row: Mapping[str, str]
) -> list[tuple[str, float]]:
    """Return the areas of steel that bars of a mark belong to, with their part of each [mm2]."""
    letter = row["Mark"][:1]
    found = []
    for place in _places(row["For"]):
        for entry_id in _areas_at(graph, letter, place):
            own = _own_part(row)
            if own is None:  # bars that run through: what the others at this place leave
                same = [o for o in rows if o["Mark"][:1] == letter and place in _places(o["For"])]
                local = sum(_own_part(other) or 0.0 for other in same)
                own = max(graph.stored[entry_id] - local, 0.0)
            found.append((entry_id, own))
    return found


def _own_part(row: Mapping[str, str]) -> float | None:
    """Return the area of bars of a mark at each of its places; None where they run through."""
    serves = row["For"].split("; ")
    if any("," in each or " to " in each for each in serves):
        return None
    return area_of(int(_number(row, "Number")), row["Size"]) / len(serves)


def _places(text: str) -> list[str]:
    """Return the spans and supports that bars are for.

    >>> _places("spans 1 to 3"), _places("support 1, holds the stirrups, support 2")
    (['span 1', 'span 2', 'span 3'], ['support 1', 'support 2'])
    """
    found = []
    for piece in re.split(r"; |, ", text):
        if match := re.fullmatch(r"spans (\d+) to (\d+)", piece):
            found += [f"span {k}" for k in range(int(match.group(1)), int(match.group(2)) + 1)]
        elif re.fullmatch(r"(span|support) \d+", piece):
            found.append(piece)
    return found


def _areas_at(graph: Graph, letter: str, place: str) -> list[str]:
    kind, number = place.split()
    if letter == "B" and kind == "span":
        wanted = [f"sag-{number}/A_s"]
    elif letter == "T" and kind == "support":
        wanted = [f"hog-{number}-{side}/A_s" for side in ("left", "right")]
    else:
        wanted = []
    return [entry_id for entry_id in wanted if entry_id in graph.nodes]


# -- stirrups, cut-offs, laps ----------------------------------------------------------------


def _stirrups(graph: Graph) -> Iterator[Item]:
    counts: dict[str, int] = {}
    for row in _table(graph, "schedule/stirrup-schedule"):
        if not row["Spacing, mm"].isdigit() or not _in_clear_span(graph, row):
            continue
        span = row["Span"]
        counts[span] = counts.get(span, 0) + 1
        place = f"span {span}, zone {counts[span]}"
        start, end = _number(row, first_column(row)), _number(row, last_column(row))
        spacing, legs = _number(row, "Spacing, mm"), int(_number(row, "Legs"))
        area = area_of(legs, row["Stirrups"])
        text = f"{legs} legs {row['Stirrups']}"
        ids = tuple(_sections_in(graph, span, (start, end), spacing))
        parts = frozenset(graph[entry_id].part for entry_id in ids)
        legs_of = ("stirrups/A_v",)
        yield Item(STIRRUPS_ITEM, place, "", area, text, 1, legs_of, _to(*legs_of), parts)
        closed = row["Form"] == "closed"
        yield Item(FORM_ITEM, place, "", float(closed), row["Form"], 1)
        yield Item(
            SPACING_ITEM, place, "mm", spacing, f"{spacing:g} mm", -1, ids, _to(*ids)
        )  # fmt: skip
        yield Item(FROM_ITEM, place, "mm", start, f"{start:g} mm", 0)
        yield Item(TO_ITEM, place, "mm", end, f"{end:g} mm", 0)


def _in_clear_span(graph: Graph, row: Mapping[str, str]) -> bool:
    length = graph.stored.get(f"span-{row['Span']}/l_n", float("inf"))
    return 0 <= _number(row, first_column(row)) <= length


def _sections_in(
    graph: Graph, span: str, zone: tuple[float, float], spacing: float
) -> Iterator[str]:
    """Give the spacings of the shear sections of a span that lie in a zone of stirrups."""
    length = graph.stored.get(f"given/l_{span}", 0.0)
    left = graph.stored.get(f"given/b_s{span}", 0.0) / 2
    titles = {part["key"]: part["title"] for part in graph.record.parts}
    for node in graph:
        if node.symbol != "s" or re.fullmatch(rf"shear-{span}-\w+(-\d+)?", node.part) is None:
            continue
        x_f = graph.stored.get(f"{node.part}/x_f")
        if x_f is None:
            continue
        far = "right" in titles[node.part].rpartition("axis")[2] or "-right" in node.part
        x = (length - x_f if far else x_f) - left
        inside = zone[0] - spacing <= x <= zone[1] + spacing
        if inside and abs(graph.stored[node.id] - spacing) < _SAME:
            yield node.id


def _cuts(graph: Graph) -> Iterator[Item]:
    for part in graph.record.parts:
        match = _CUT.fullmatch(part["key"])
        node = graph.nodes.get(f"{part['key']}/x_e")
        if match is None or node is None:
            continue
        face, number, side, count = match.groups()
        place = f"{face} bars, {_WORDS[face]} {number}, {side} side, cut {count}"
        # Bottom bars that end nearer to the support are longer, top bars that end farther away.
        yield _plain(graph, CUT_ITEM, place, "mm", node, -1 if face == "bottom" else 1)


def _laps(graph: Graph) -> Iterator[Item]:
    for part in graph.record.parts:
        if match := re.fullmatch(r"anchorage-lap-(\d+)", part["key"]):
            node = graph.nodes.get(f"{part['key']}/l_lp")
            if node is not None:
                yield _plain(graph, LAP_ITEM, f"lap {match.group(1)}", "mm", node, 1)
        if match := re.fullmatch(r"support-(\d+)", part["key"]):
            node = graph.nodes.get(f"{part['key']}/n_h")
            if node is not None:
                place, value = f"support {match.group(1)}", graph.stored[node.id]
                yield Item(
                    HANGER_ITEM, place, "", value, f"{value:g}", 1, (node.id,), _to(node.id)
                )  # fmt: skip
