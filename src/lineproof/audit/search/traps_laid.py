"""Traps of bars and stirrups as laid: text against number, spacing against zone."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping, Sequence

from lineproof.audit.graph import Node
from lineproof.audit.search.traps_view import Caught, Trap, View, close
from lineproof.standards.a23_3.bars import BARS

_BARS = re.compile(r"(\d+)-(\d\dM)")
_TOLD = re.compile(r"(?:Bottom|Top) bars: ([^,.]*)(, [^,.]* in (?:each|the) overhang)?[,.]")
_ZONE = re.compile(r"([\d.]+) to ([\d.]+)")
_SPACING = re.compile(r" at ([\d.]+) mm")
_BESIDE = 60.0
"""A section this near to a change of spacing [mm] may belong to either zone."""
_PLACE = re.compile(r"shear-(\d+)-(left|right|along)(-\d+)?")


def _told_bars(view: View) -> Iterator[Caught]:
    """Look for a number of bars in words that the area does not follow."""
    for part in view.record.parts:
        area = view.part(part["key"]).get("A_s")
        notes = (str(e["text"]) for e in part["entries"] if e["symbol"] == "bars-text")
        for told in filter(None, map(_TOLD.match, notes)):
            laid = _laid(told.group(1), told.group(2))
            if area is None or not laid or close(view.graph.stored[area.id], laid, 0.001):
                continue
            yield Caught(
                area,
                f"the bars are told as {told.group(1)}{told.group(2) or ''}, which have {laid:g} "
                "mm²",
                "Change number and area together.",
                clause="G30.18",
                right={area.id: laid},
            )


def _laid(web: str, overhangs: str | None) -> float:
    """Return the area of bars told in words, those in each overhang twice; 0 if not understood."""
    twice = overhangs is not None and "each" in overhangs
    found = [(1, bars) for bars in _BARS.findall(web)]
    found += [(1 + twice, bars) for bars in _BARS.findall(overhangs or "")]
    if any(size not in BARS.rows for _, (_, size) in found):
        return 0.0
    return sum(times * int(n) * BARS.number(size, "A_b") for times, (n, size) in found)


def _zones(view: View) -> dict[str, list[tuple[float, float, float]]]:
    """Return the stirrup zones of every span: from, to, spacing [mm], from its left face."""
    found: dict[str, list[tuple[float, float, float]]] = {}
    for table in view.tables("stirrup-zones"):
        for row in table["rows"]:
            at: Mapping[str, str] = dict(zip(table["columns"], row, strict=False))
            ends = _ZONE.search(str(at.get("From the left face, m", "")))
            spacing = _SPACING.search(str(at.get("Stirrups", "")))
            if ends is not None and spacing is not None:
                start, end = (1000 * float(ends.group(i)) for i in (1, 2))
                found.setdefault(str(at.get("Span")), []).append(
                    (start, end, float(spacing.group(1)))
                )
    return found


def _neighbouring_zone(view: View) -> Iterator[Caught]:
    zones = _zones(view)
    for node in view.quantities_given("s"):
        place = _PLACE.fullmatch(node.part)
        rows = zones.get(place.group(1), []) if place is not None else []
        x = _from_left_face(view, node) if rows else None
        if place is None or x is None:
            continue
        here = _spacings(rows, x)
        value = view.graph.stored[node.id]
        if here and not any(close(value, spacing) for spacing in here):
            yield Caught(
                node,
                f"the stirrups of this zone stand at {min(here):g} mm",
                "Take the spacing of the zone in which the section lies.",
                clause="11.3.5",
                right={node.id: min(here)},
            )


def _spacings(rows: Sequence[tuple[float, float, float]], x: float) -> list[float]:
    return [s for start, end, s in rows if start - _BESIDE <= x <= end + _BESIDE]


def _from_left_face(view: View, node: Node) -> float | None:
    """Return where a section of shear lies, from the left face of its span [mm]."""
    part = view.part(node.part)
    span = node.part.split("-")[1]
    x_f = view.stored(part.get("x_f"))
    l_n, l = view.stored(view.part(f"span-{span}").get("l_n")), view.number(node, f"l_{span}")
    left = view.graph.stored.get(f"given/b_s{span}", 0.0)
    if x_f is None or l_n is None or l is None:
        return None
    from_right = "right" in view.titles[node.part].rpartition("axis")[2] or "-right" in node.part
    return l - x_f - left / 2 if from_right else x_f - left / 2


TRAPS = (
    Trap(31, "number of bars and their area", _told_bars),
    Trap(31, "spacing of the neighbouring zone", _neighbouring_zone),
)
