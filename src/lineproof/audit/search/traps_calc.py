"""Traps of the whole calc: editions, widths, levels of load, sides, values given twice, header."""

from __future__ import annotations

import re
from collections.abc import Iterator

from lineproof.audit.data import Severity
from lineproof.audit.graph import Node
from lineproof.audit.search.member import project_rows, project_table
from lineproof.audit.search.traps_loads import shares_of
from lineproof.audit.search.traps_view import (
    Caught,
    Remark,
    Trap,
    View,
    close,
)
from lineproof.record.entry import GIVEN, LOOKUP
from lineproof.standards.codes import CODE_PAIRS

_EDITION = re.compile(r"A23\.3\s*[-:]\s*(\d\d)\b|NBC\s*(20\d\d)\b")
_FACTORED = re.compile(r"(w_f|M_f|V_f|R_f)\d*")
_SERVICE = re.compile(r"w_s\d?|w_sus|M_[sam]|M_h\d?|delta_\w+")
_LIVE = ("L", "Lst")


def _tributary(view: View) -> Iterator[Caught]:
    for node in view.values("b_tr"):
        s_b = view.number(node, "s_b")
        value = view.graph.stored[node.id]
        if not s_b:
            continue
        if view.member.shape == "T" and close(value, s_b / 2):
            yield Caught(
                node,
                "is half of what this beam carries",
                "Half the spacing on each side.",
                clause="NBC 4.1.3.2",
                right={node.id: s_b},
            )
        if view.member.shape == "L" and close(value, s_b):
            yield Caught(
                node,
                "is that of a beam with slab on both sides",
                "An edge beam carries half the spacing and what lies outside.",
                Severity.OBSERVATION,
                "NBC 4.1.3.2",
            )


def _load_levels(view: View) -> Iterator[Caught]:
    for node in view.quantities(_FACTORED.pattern):
        shares = shares_of(view, node)
        if shares.get("D") == 1.0 and any(shares.get(kind) == 1.0 for kind in _LIVE):
            yield Caught(
                node,
                "specified loads stand for factored ones",
                "1.25D + 1.5L.",
                Severity.CRITICAL,
                "NBC 4.1.3.2",
            )
    for node in view.quantities(_SERVICE.pattern):
        load = view.target(node, "w_s")
        bound = load is not None and _FACTORED.fullmatch(view.quantity(load)) is not None
        if bound or shares_of(view, node).get("D") in (1.25, 1.4):
            yield Caught(
                node,
                "factored loads stand for specified ones",
                "Deflections and cracks belong to specified loads.",
                clause="NBC 4.1.3.4",
            )
    for node in view.lines("f_s"):
        if any(other.symbol == "M_f" for other in view.above(node)):
            yield Caught(
                node,
                "the stress is that of factored loads",
                "Take the stress under specified loads, or 0.6 f_y.",
                clause="10.6.1",
            )


def _sides(view: View) -> Iterator[Caught]:
    """Look for the width of another support than that of the place."""
    for node in view.graph:
        for name, number in _widths_of(node):
            target = view.target(node, name)
            if target is None or not re.fullmatch(r"b_s\d+", target.symbol):
                continue
            own = view.graph.nodes.get(f"given/b_s{number}")
            if own is not None and target.id != own.id:
                value = view.compute(node, **{name: view.graph.stored[own.id]})
                yield Caught(
                    node,
                    f"the width of support {target.symbol[3:]} stands for that of support {number}",
                    "Take the support of this place.",
                    clause="9.2.2",
                    right=view.right(node, value),
                )


def _widths_of(node: Node) -> Iterator[tuple[str, int]]:
    """Give the names of support widths in a line with the support that its part stands at."""
    key = node.part
    if found := re.fullmatch(r"span-(\d+)", key):
        yield "b_sl", int(found.group(1))
        yield "b_sr", int(found.group(1)) + 1
    elif found := re.fullmatch(r"shear-(\d+)-(left|right)(-\d+)?", key):
        yield "b_sn", int(found.group(1)) + (found.group(2) == "right")
    elif found := re.fullmatch(r"hog-(\d+)-(left|right)", key):
        yield "b_sn", int(found.group(1))


def _face_moments(view: View) -> Iterator[Caught]:
    for node in view.lines("M_f"):
        x_f = view.stored(view.target(node, "x_f"))
        if node.part.startswith("hog-") and x_f == 0.0:
            yield Caught(
                node,
                "the moment at the axis stands for that at the face",
                "The face governs: the moment at the axis is on the safe side.",
                Severity.OBSERVATION,
                "9.2.2",
            )


def _strengths(view: View) -> Iterator[Remark]:
    for symbol, what in (("f_c", "strength of the concrete"), ("f_y", "strength of the bars")):
        typed = [n for n in view.values(symbol) if n.kind in (GIVEN, LOOKUP)]
        values = {view.graph.stored[node.id] for node in typed}
        if view.is_one_member and len(values) > 1:
            yield Remark(
                f"The {what} stands with {len(values)} values: "
                + ", ".join(f"{value:g} MPa" for value in sorted(values)),
                "Give it once; ask which is right.",
                clause="8.6" if symbol == "f_c" else "8.5",
                ids=tuple(node.id for node in typed),
            )


def _unused(view: View) -> Iterator[Caught]:
    """Look for a load that was given and that nothing rests on: a reaction left out."""
    for node in view.quantities_given(r"[PwqRM]_\w+"):
        load = node.unit in ("kN", "kN/m", "kPa", "kN.m") and not node.symbol.endswith("min")
        if load and node.part in ("given", "loads") and not view.graph.users[node.id]:
            yield Caught(
                node,
                "is given, but nothing rests on it",
                "Add it to the loads, or take it out.",
                clause="NBC 4.1.3.2",
            )


def _category(view: View) -> Iterator[Caught]:
    carries = view.choice("carries")
    for node in view.values("k_D"):
        row = str(node.entry.get("row", ""))
        if node.kind == LOOKUP and carries and row and row != carries:
            yield Caught(
                node,
                f"the limit is that of: {row}; the beam carries: {carries}",
                "Take the row of Table 9.3 for what the span carries.",
                clause="9.8.2.6",
            )


def _editions(view: View) -> Iterator[Remark]:
    codes = view.record.data["codes"]
    pair = CODE_PAIRS.get(str(codes.get("pair", "")))
    if not codes:
        return
    building, concrete = codes.get("building", ""), codes.get("concrete", "")
    named = " and ".join(filter(None, (building, concrete))) or codes.get("pair", "")
    if pair is None or (building or pair.building, concrete or pair.concrete) != (
        pair.building, pair.concrete,
    ):  # fmt: skip
        yield Remark(
            f"{named} are no pair that goes together",
            "One building code adopts one concrete standard.",
            clause="codes",
        )
    own = {found for text in codes.values() for found in _EDITION.findall(str(text))}
    for entry in view.record.entries.values():
        said = f"{entry.get('source', '')} {entry['title'] if _typed(entry) else ''}"
        for found in sorted(set(_EDITION.findall(said)) - own):
            name = f"A23.3-{found[0]}" if found[0] else f"NBC {found[1]}"
            yield Remark(
                f"{entry['id']} rests on {name}, the calc on {codes['pair']}",
                "Take all of one pair of codes.",
                clause="codes",
                ids=(str(entry["id"]),),
            )


def _typed(entry: dict[str, object]) -> bool:
    return entry["kind"] in (GIVEN, "line", "check", "decision")


def _header(view: View) -> Iterator[Remark]:
    record, calc = view.record, view.record.calc_id
    places = [row["calc"] for row in project_rows(record, "locations") if row.get("calc")]
    if view.member.spans and places and calc not in places:
        yield Remark(
            f"The project tells places of {', '.join(places)}, not of {calc}",
            "Look at the header: it may be that of an older job.",
            Severity.MINOR,
            "cover",
        )
    issue = project_table(record, "issue")
    dates = [row.get("date", "") for row in project_rows(record, "revisions")]
    if issue.get("date") and dates and issue["date"] < max(dates):
        yield Remark(
            f"The issue is dated {issue['date']}, before its last revision of {max(dates)}",
            "Look at the header: it may be that of an older issue.",
            Severity.MINOR,
            "cover",
        )
    if issue.get("checked_by") and issue.get("checked_by") == issue.get("prepared_by"):
        yield Remark(
            f"{issue['checked_by']} prepared and checked the calc",
            "The checker is not the one who prepared it.",
            clause="cover",
        )


TRAPS = (
    Trap(29, "editions", _editions),
    Trap(30, "tributary width", _tributary),
    Trap(30, "specified and factored loads", _load_levels),
    Trap(30, "left and right support", _sides),
    Trap(30, "moment at the face", _face_moments),
    Trap(31, "strength given twice", _strengths),
    Trap(31, "load left out", _unused),
    Trap(31, "category of deflection", _category),
    Trap(32, "header of another job", _header),
)
