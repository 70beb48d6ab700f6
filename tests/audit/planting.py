"""A junior's sheet: a right calculation worked again with slips, and what he wrote down of it.

A slip is put at a line, the wrong value goes down the sheet, every value is written with three
digits. ``Planted`` keeps what a checker should find. Shares nothing with the search for slips.
"""

from __future__ import annotations

import math
import re
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from itertools import product
from random import Random

from lineproof.audit.data import Claim, Interval, Judged, read_from
from lineproof.audit.graph import Graph, Node
from lineproof.quantity.units import internal_factor

from .planting_rows import WORDS
from .planting_slips import Planted, Values, all_slips, three_digits

MOST_CORNERS = 12
"""Arguments of which every end is tried against every end of the others."""
TRIES = 8
"""So many slips of a kind are tried on a beam until one moves its line."""
PEN_EVERY = 5
"""Slips of the pen, each on a sheet of its own, are planted in every fifth beam."""


def junior_sheet(graph: Graph, planted: Sequence[Planted]) -> tuple[Values, list[str]]:
    """Work a sheet with slips, one pass in order; return its values and the lines that failed."""
    at = {slip.id: slip for slip in planted}
    values = dict(graph.stored) | {n: v for slip in planted for n, v in slip.inputs}
    dirty = {n for slip in planted for n, _ in slip.inputs}
    failed = []
    for node in graph:
        if not node.has_value or not (node.id in at or dirty.intersection(node.args.values())):
            continue
        try:
            slip = at.get(node.id)
            made = slip.work(values) if slip else node.compute(graph.named(node, values))
        except (ArithmeticError, ValueError):
            failed.append(node.id)
        else:
            if made != values[node.id]:
                values[node.id] = made
                dirty.add(node.id)
    return values, failed


def claim(node: Node, value: float, row: int = 0) -> Claim:
    """Return the claim that a junior writes for a value in internal units."""
    factor = internal_factor(node.unit)
    text = three_digits(value / factor)
    return Claim(node.id, text, node.unit, float(text) * factor, read_from(text).times(factor), row)


def claims_of(
    graph: Graph, values: Mapping[str, float], ids: Sequence[str] | None = None
) -> dict[str, Claim]:
    """Return the table of claims: of every value, or of those asked for."""
    nodes = [graph[i] for i in ids] if ids is not None else [n for n in graph if n.has_value]
    return {n.id: claim(n, values[n.id], row) for row, n in enumerate(nodes, start=2)}


def reach(node: Node, claims: Mapping[str, Claim]) -> Interval:
    """Return least and largest value of a line, its arguments at any of the ends they stand for."""
    ends = {n: claims[t].stands_for for n, t in node.args.items()}
    if len(ends) <= MOST_CORNERS:
        corners = list(product(*[(e.low, e.high) for e in ends.values()]))
    else:
        middle = [e.middle for e in ends.values()]
        corners = [
            (*middle[:k], end, *middle[k + 1 :])
            for k, e in enumerate(ends.values())
            for end in (e.low, e.high)
        ]
    found = []
    for corner in corners:
        try:
            found.append(node.compute(dict(zip(ends, corner, strict=True))))
        except (ArithmeticError, ValueError):
            return Interval(-math.inf, math.inf)
    return Interval(min(found), max(found))


def is_beyond(
    graph: Graph, slip: Planted, claims: Mapping[str, Claim], values: Mapping[str, float]
) -> bool:
    """Tell whether a slip moves its line beyond rounding.

    The claim cannot follow from the claims it rests on. Among many slips on a sheet, one does not
    count there whose line by chance follows with some of the wrong claims above it put right, nor
    one in a part where others turned a decision, so that other formulas apply.
    """
    node, written = graph[slip.id], claims[slip.id].stands_for
    if reach(node, claims).meets(written):
        return False
    if not slip.inputs and any(
        reach(node, mixed).meets(written) for mixed in _put_right(graph, node, claims)
    ):
        return False
    return not _turned(graph, node.part, values)


def _put_right(
    graph: Graph, node: Node, claims: Mapping[str, Claim]
) -> Iterator[Mapping[str, Claim]]:
    """Give the claims that a line rests on with some of the wrong ones put right, or all.

    One put right is as coarse as it was written.
    """
    right = {i: graph.stored[i] for i in node.args.values()}
    wrong = [i for i, value in right.items() if not claims[i].stands_for.holds(value)]
    for chosen_ones in product([False, True], repeat=len(wrong)):
        put = {
            i: _as_coarse(claims[i], right[i])
            for i, yes in zip(wrong, chosen_ones, strict=True)
            if yes
        }
        if put:
            yield dict(claims) | put


def _as_coarse(written: Claim, value: float) -> Claim:
    half = written.stands_for.half
    return replace(written, value=value, stands_for=Interval(value - half, value + half))


def _turned(graph: Graph, part: str, values: Mapping[str, float]) -> bool:
    decisions = [n for n in graph if n.part == part and n.kind == "decision"]
    return any(n.compared(graph.named(n, values)).holds != n.entry["holds"] for n in decisions)


def written(values: Mapping[str, float], planted: Sequence[Planted]) -> Values:
    """Return the values as they were written, slips of the pen with them."""
    return dict(values) | {s.id: s.written(values[s.id]) for s in planted if s.written}


@dataclass(frozen=True)
class Sheet:
    """A junior's sheet: the values as he worked them, and the slips in it."""

    graph: Graph
    values: Mapping[str, float]
    planted: tuple[Planted, ...]

    def claims(self, ids: Sequence[str] | None = None) -> dict[str, Claim]:
        """Return what he wrote down, of every line or of those asked for."""
        return claims_of(self.graph, written(self.values, self.planted), ids)

    @property
    def touched(self) -> set[str]:
        """The ids that were not honestly worked or written."""
        return {s.id for s in self.planted} | {n for s in self.planted for n, _ in s.inputs}


def sheet_with(graph: Graph, wanted: Sequence[Planted]) -> Sheet:
    """Return the sheet with slips, those left out after which a line can no longer be worked."""
    kept = list(wanted)
    while True:
        values, failed = junior_sheet(graph, kept)
        if not failed:
            break
        above = set(graph.above([failed[0]])) | {failed[0]}
        guilty = [s for s in kept if s.id in above or {n for n, _ in s.inputs} & above]
        kept.remove(max(guilty, key=lambda s: _change(graph, s, values)))
    claims = claims_of(graph, written(values, kept))
    told = tuple(replace(s, beyond=is_beyond(graph, s, claims, values)) for s in kept)
    return Sheet(graph, values, told)


def sheets(graph: Graph, number: int, seed: int = 0) -> Iterator[Sheet]:
    """Give sheets until every slip chosen for a beam was planted where it moves its line.

    Many slips on one sheet are still each judged by what stands above them. A slip of the pen, one
    that others drown, or that leaves a line below without a number, comes on a sheet of its own.
    """
    wanted = chosen(graph, number, seed)
    first = sheet_with(graph, [slip for slip in wanted if slip.written is None])
    yield first
    done = {slip.id for slip in first.planted if slip.beyond}
    for slip in wanted:
        if slip.id not in done and (slip.written is None or number % PEN_EVERY == 0):
            yield sheet_with(graph, [slip])


def _change(graph: Graph, slip: Planted, values: Values) -> float:
    right = graph.stored[slip.id]
    return abs(values[slip.id] - right) / max(abs(right), 1e-12)


def chosen(graph: Graph, number: int, seed: int = 0) -> list[Planted]:
    """Choose one slip of each kind that moves its line beyond rounding, each at a line of its own.

    First the slip, then the line, so that a slip which fits many lines is not the only one.
    """
    draw = Random(1_000_000 * seed + number)  # noqa: S311 - the same slips every time
    claims = claims_of(graph, graph.stored)
    made: list[Planted] = []
    taken: set[str] = set()
    for slips in all_slips(graph, draw).values():
        for slip in _shuffled(slips, draw)[:TRIES]:
            used = {slip.id} | {n for n, _ in slip.inputs}
            if used & taken or not _moves(graph, slip, claims):
                continue
            made.append(slip)
            taken |= used
            break
    return made


def _shuffled(slips: Sequence[Planted], draw: Random) -> list[Planted]:
    by_what: dict[str, list[Planted]] = {}
    for slip in slips:
        by_what.setdefault(slip.what, []).append(slip)
    order = list(by_what)
    draw.shuffle(order)
    return [draw.choice(by_what[what]) for what in order]


def _moves(graph: Graph, slip: Planted, claims: Mapping[str, Claim]) -> bool:
    """Tell whether a slip alone moves its line beyond rounding, not a million times, not to 0."""
    values = dict(graph.stored) | dict(slip.inputs)
    try:
        wrong = slip.work(dict(values))
    except (ArithmeticError, ValueError):
        return False
    right = abs(graph.stored[slip.id])
    if not math.isfinite(wrong) or not 1e-6 * right < abs(wrong) < 1e6 * right:
        return False
    values[slip.id] = wrong
    wrong = slip.written(wrong) if slip.written else wrong
    new = {i: claim(graph[i], value) for i, value in slip.inputs}
    new[slip.id] = claim(graph[slip.id], wrong)
    return is_beyond(graph, slip, dict(claims) | new, values)


# What was said of it ------------------------------------------------------------------------------

_SYMBOL = re.compile(r"[A-Za-z]+\w*\Z")


def _named(term: str, text: str) -> bool:
    """Tell whether a term stands in a text: symbols as whole names, words anywhere."""
    if "_" in term or (len(term) == 1 and term.isalpha()) or term in ("kd", "theta", "beta"):
        name = re.escape(term.rstrip("_")) + ("_?" if term.endswith("_") else "")
        return re.search(rf"(?<![A-Za-z0-9_]){name}(?![A-Za-z0-9_])", text) is not None
    if re.fullmatch(r"[\d.]+", term):
        return re.search(rf"(?<![\d.]){re.escape(term)}(?![\d])", text) is not None
    return re.search(term, text, re.IGNORECASE) is not None


def tells(slip: Planted, text: str) -> bool:
    """Tell whether a sentence with its kind tells the slip: the kind's words and the symbols."""
    for alternative in slip.says:
        free = alternative.startswith("~")
        terms = [t.strip() for t in alternative.removeprefix("~").split("&")]
        if all(_named(t, text) for t in terms) and (
            free or re.search(WORDS[slip.kind], text, re.IGNORECASE)
        ):
            return True
    return False


def told_at(slip: Planted, judged: Judged) -> int | None:
    """Return at which place of the suggestions the slip is told, from 1; None where it is not."""
    for place, found in enumerate(judged.slips, start=1):
        if tells(slip, f"{found.kind}; {found.sentence}"):
            return place
    return None
