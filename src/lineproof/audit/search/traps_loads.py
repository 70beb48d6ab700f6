"""Traps of loads and analysis: combinations, reductions, patterns, weights, spans, editions."""

from __future__ import annotations

import re
from collections.abc import Iterator

from lineproof.audit.data import Severity
from lineproof.audit.graph import Node
from lineproof.audit.search.member import project_table
from lineproof.audit.search.traps_view import (
    Caught,
    Remark,
    Trap,
    View,
    has,
    names,
)
from lineproof.formula.tree import Call, walk

_TYPE = re.compile(r"[wMRVTtPq]_[a-z]?\d*[lr]?(Lst|D|L|S)\d*")
"""A load or what follows from it by load type: ``w_D1``, ``M_2lLst1``, ``R_1S``."""
_HEAVY = ("assembly", "storage", "manufacturing", "factory", "retail", "garage", "library")
_DEAD_FACTORS = (1.25, 0.9, 1.4)
_HALF = (0.4, 0.5)
_WITH_COMPANION = 3


def shares_of(view: View, node: Node) -> dict[str, float]:
    """Return how often each load type stands in a sum of loads; empty for any other formula."""
    used = {name: _TYPE.fullmatch(name) for name in node.args}
    if not used or not all(used.values()):
        return {}
    none = dict.fromkeys(used, 0.0)
    found: dict[str, float] = {}
    for name, match in used.items():
        share = view.compute(node, **(none | {name: 1.0}))
        if match is None or share is None:
            return {}
        kind = match.group(1)
        found[kind] = max(found.get(kind, 0.0), share)
    return found


def _companions(view: View) -> Iterator[Caught]:
    storage = "storage" in view.choice("use")
    for node in view.quantities(r"[wMRV]_\w+"):
        shares = shares_of(view, node)
        if shares.get("D") not in _DEAD_FACTORS:
            if {1.2, 1.6} <= set(shares.values()):
                yield Caught(
                    node,
                    "1.2D + 1.6L is the combination of another standard",
                    "NBC: 1.25D + 1.5L.",
                    clause="NBC 4.1.3.2",
                )
            continue
        if any(shares.get(kind) in _HALF for kind in ("S", "L", "Lst")):
            yield Caught(
                node,
                "a companion load has the factor of an older edition",
                "Companion loads: 1.0S and 1.0L.",
                clause="NBC 4.1.3.2",
            )
        stored = shares.get("Lst", shares.get("L") if storage else None)
        if shares.get("S") == 1.5 and stored == 1.0:  # noqa: PLR2004 - NBC 4.1.3.2
            yield Caught(
                node,
                "a stored load as companion of snow has the factor of other uses",
                "1.25D + 1.5S + 1.5L for storage.",
                clause="NBC 4.1.3.2",
            )


def _combinations(view: View) -> Iterator[Remark]:
    for text in view.texts("cases"):
        told = re.search(r"Combinations: ([^.]*(?:\.\d[^.]*)*)\.", text)
        made = {row.strip() for row in told.group(1).split(";")} if told is not None else set()
        if not made:
            continue
        for row in sorted(_lacking(made, several=view.member.spans > 1)):
            yield Remark(
                f"The load combination {row} is not among the cases",
                "Add it.",
                clause="NBC 4.1.3.2",
                ids=("analysis/cases",),
            )
    yield from _simple_combinations(view)


def _lacking(made: set[str], *, several: bool) -> set[str]:
    """Return combinations that belong to those made: alone, and with less dead load."""
    wanted = {"1.4D"}
    for row in made:
        principal = row.split(" + ")
        snow = "S" in "".join(principal[1:])
        if len(principal) == _WITH_COMPANION and snow:
            wanted.add(" + ".join(principal[:-1]))
        if several and row.startswith("1.25D"):
            wanted.add(row.replace("1.25D", "0.9D"))
    return wanted - made


def _simple_combinations(view: View) -> Iterator[Remark]:
    """Look at a calc that factors its loads in lines, without a list of cases."""
    if any(True for _ in view.texts("cases")):
        return
    shares = {node.id: shares_of(view, node).get("D") for node in view.quantities(r"w_f\d*")}
    if 1.25 in shares.values() and 1.4 not in shares.values():  # noqa: PLR2004 - NBC 4.1.3.2
        ids = tuple(entry_id for entry_id, share in shares.items() if share == 1.25)  # noqa: PLR2004 - the clause
        yield Remark(
            "The load combination 1.4D is not made", "Add it.", Severity.MINOR, "NBC 4.1.3.2", ids
        )


def _reduction(view: View) -> Iterator[Caught]:
    use, clause = view.choice("use"), "NBC 4.1.5.8"
    for node in view.values("r_L"):
        if "roof" in use or "slab" in str(view.record.data.get("kind_of_member", "")):
            yield Caught(
                node,
                "live load on roofs and slabs is not reduced",
                "Leave the reduction out.",
                clause=clause,
            )
        heavy = any(word in use for word in _HEAVY)
        if heavy and has(node, 0.3):
            yield Caught(
                node,
                "the reduction of other uses is taken for this use",
                "0.5 + √(20/A) above 80 m².",
                clause=clause,
            )
        area, least = view.number(node, "A_L"), view.number(node, "A_Lmin")
        if area is not None and least is not None and area <= least:
            yield Caught(
                node,
                "the area is too small for a reduction",
                "Take all of the live load.",
                clause=clause,
            )
        l, b_tr = view.number(node, "l"), view.number(node, "b_tr")
        if area is not None and l and b_tr and area > 1.001 * l * b_tr and view.member.spans <= 1:
            yield Caught(
                node,
                "the area is larger than span times tributary width",
                "Count the area of this use that the beam carries.",
                clause=clause,
            )
    for node in view.quantities(r"w_L\w*"):
        rests = view.target(node, "q_L")
        above = view.above(rests) if rests is not None else []
        if "r_L" in names(node) and "r_L" in {other.symbol for other in above}:
            what, advice = "the live load is reduced twice", "Reduce it once."
            yield Caught(node, what, advice, Severity.CRITICAL, clause)


def _snow(view: View) -> Iterator[Caught]:
    importance = project_table(view.record, "building").get("importance", "")
    if importance.lower() != "low":
        return
    for node in view.values("q_S"):
        if view.reaches_check(node):
            yield Caught(
                node,
                "with the importance factor 0.8 of a low category it serves "
                "deflections too, where the factor is 0.9",
                "Service: I_s = 0.9.",
                Severity.MINOR,
                "NBC 4.1.6.2",
            )


def _patterns(view: View) -> Iterator[Remark]:
    if view.member.spans <= 1:
        return
    every = set(range(1, view.member.spans + 1))
    for text in view.texts("cases"):
        placed = [
            {int(number) for number in found.split(", ")}
            for found in re.findall(r"live load on spans? (\d+(?:, \d+)*)", text)
        ]
        if placed and all(spans == every for spans in placed):
            yield Remark(
                "Live load stands on all spans only",
                "Place it on alternate spans and on two adjacent spans.",
                Severity.CRITICAL,
                "9.2.3.1",
                ("analysis/cases",),
            )


def _redistribution(view: View) -> Iterator[Caught]:
    for node in view.lines("M_f"):
        rests = view.target(node, "M_fe")
        if "p_rd" not in names(node) or rests is None or rests.tree is None:
            continue
        if any(isinstance(each, Call) and each.function == "max" for each in walk(rests.tree)):
            yield Caught(
                node,
                "an envelope is redistributed, not a load case",
                "Change the moments of one case and keep its statics.",
                clause="9.2.4",
            )
        if "k_M" in names(rests):
            yield Caught(
                node,
                "a moment by coefficients is redistributed",
                "Coefficients hold patterns already: no redistribution.",
                clause="9.3.3",
            )


def _weights(view: View) -> Iterator[Caught]:
    for node in view.quantities(r"w_D\d*"):
        used = names(node)
        if {"w_bm", "w_sl"} <= used:
            yield Caught(
                node,
                "the part of the beam within the slab is counted twice",
                "Slab on the tributary width and web below it.",
                Severity.MINOR,
                "NBC 4.1.4.1",
            )
        if not any(other.symbol.startswith("gamma") for other in view.above(node)):
            yield Caught(
                node, "no self weight is in it", "Add the weight of the beam.", clause="NBC 4.1.4.1"
            )
    for node in view.quantities(r"(w_L|q_L)\d*"):
        if names(node) & {"q_pt", "w_pt"}:
            yield Caught(
                node,
                "partitions are counted as live load",
                "They are a dead load.",
                clause="NBC 4.1.4.1",
            )


def _spans(view: View) -> Iterator[Caught]:
    for node in view.lines("M_f"):
        target = view.target(node, "l")
        plain = names(node) == {"w_f", "l"}
        if plain and target is not None and target.symbol == "l_n":
            l = view.stored(next(view.values("l"), None))
            value = None if l is None else view.compute(node, l=l)
            yield Caught(
                node,
                "the clear span stands for the span between supports",
                "Take the span, centre to centre.",
                clause="9.2.2",
                right=view.right(node, value),
            )
        span = re.search(r"(\d+)", node.part)
        hung = span is not None and view.member.cantilever(int(span.group(1)))
        if plain and has(node, 8.0) and (view.member.spans > 1 or hung):
            yield Caught(
                node,
                "w l²/8 is the moment of a simple span",
                "Take the moments of the analysis.",
                clause="9.2",
            )


TRAPS = (
    Trap(15, "factors of companion loads", _companions),
    Trap(15, "combinations", _combinations),
    Trap(16, "live load reduction", _reduction),
    Trap(16, "importance factor of snow", _snow),
    Trap(17, "pattern loading", _patterns),
    Trap(17, "redistribution", _redistribution),
    Trap(27, "weights and partitions", _weights),
    Trap(27, "spans", _spans),
)
