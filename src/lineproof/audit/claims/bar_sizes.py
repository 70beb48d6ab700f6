"""Bars measured by their sizes: 10M as 10 mm and 20M as 20 mm, which are 11.3 and 19.5 mm.

Many an office takes d = h - cover - 10 - 20/2 throughout. That is no slip of one number, nor quite
right: it is a rounding, which errs to the side that the checks show.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

from lineproof.audit.claims.bench import Bench
from lineproof.audit.claims.propagate import Form
from lineproof.audit.claims.safe_side import SIDES, errs_safely
from lineproof.audit.data import Claim, Judged, Verdict
from lineproof.audit.graph import Node
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.record.entry import LOOKUP
from lineproof.typeset.values import told

_LEAST = 2
"""One bar alone measured by its size, beside others by their diameters, is a slip."""


def by_sizes(benches: Sequence[Bench], node: Node, claim: Claim, judged: Judged) -> Judged | None:
    """Judge a claim that follows where every bar in its line is measured by its size, if it does.

    A bar whose diameter is claimed stays as claimed: as its diameter, it is not measured by size.
    """
    for bench in benches:
        sizes = _sizes(bench, node)
        if len(sizes) < _LEAST:
            continue
        try:
            made = bench.reworked(node, sizes)
        except NOT_COMPUTED:
            continue
        if claim.stands_for.overlaps(made.interval):
            safe = errs_safely(bench.graph, node.id, claim.value, judged.follows.middle)
            verdict = Verdict.UNSAFE_ROUNDING if safe is False else Verdict.SAFE_ROUNDING
            said = " and ".join(dict.fromkeys(_said(bench.graph[i], s) for i, s in sizes.items()))
            note = f"worked with the sizes of the bars for their diameters, {said}: {SIDES[safe]}"
            return replace(judged, verdict=verdict, note=note)
    return None


def _sizes(bench: Bench, node: Node) -> dict[str, Form]:
    """Return the sizes of all bars whose diameters a line uses; none where one is no size."""
    found: dict[str, Form] = {}
    for target in dict.fromkeys(node.args.values()):
        bar = bench.graph[target]
        if bar.kind != LOOKUP or not bar.symbol.startswith("d_b"):
            continue
        number = str(bar.entry["row"]).removesuffix("M")
        if not number.isdecimal():
            return {}
        size = Form(float(number))
        claim = bench.claims.get(target)
        if claim is not None and not claim.stands_for.holds(size.middle):
            return {}
        found[target] = size
    return found


def _said(bar: Node, size: Form) -> str:
    return f"{size.middle:g} for {told(bar.number_text(bar.stored), bar.unit)}"
