"""What the audit makes of the seeded errors, counted by kind.

``python -m tests.audit.planting_measure`` from the root of the project prints the table and what
went wrong; a number behind it takes every so many beams only, a second one is another seed.
"""

from __future__ import annotations

import argparse
import math
import sys
from collections import Counter
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field

from lineproof.audit.claims.judge import judge
from lineproof.audit.data import Claim, Judged, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.slips.search import find_slips

from .planting import Sheet, sheets, told_at
from .planting_beams import BEAMS, beam
from .planting_quick import Quick, quick_tables, reach
from .planting_rows import KINDS
from .planting_slips import Planted

FOUND = (Verdict.ORIGIN, Verdict.UNIT)
CALM = (Verdict.AGREES, Verdict.CARRIED)
"""What may be said of a line that was honestly worked and written."""
ROUNDINGS = (Verdict.SAFE_ROUNDING, Verdict.UNSAFE_ROUNDING)
READINGS = (Verdict.OTHER_METHOD, *ROUNDINGS)
"""What is said of a number that has a reading besides a slip, where no likely slip fits."""
FIRST = 3
DIGITS = 3
"""Digits to which claims are rounded, and lines between by hand."""
QUICK_EVERY = 3
"""Every third beam is judged by its quick table too."""


@dataclass
class Tally:
    """Counts by kind of slip: planted beyond rounding, origin found, slip told; what went wrong.

    Some slips give by chance the number of another valid method, or a round one near the right
    value. ``doubtful`` are those told as such with the true slip named beside that reading,
    ``rounded`` those left that are round numbers and called so, ``not_told`` all others: called
    another way, a rounding though they are not round, or doubtful for another slip.
    """

    planted: Counter[str] = field(default_factory=Counter)
    found: Counter[str] = field(default_factory=Counter)
    told: Counter[str] = field(default_factory=Counter)
    claims: int = 0
    untouched: int = 0
    doubtful: list[str] = field(default_factory=list)
    rounded: list[str] = field(default_factory=list)
    not_told: list[str] = field(default_factory=list)
    missed: list[str] = field(default_factory=list)
    false: list[str] = field(default_factory=list)
    untold: list[str] = field(default_factory=list)

    @property
    def share_told(self) -> float:
        """Share of the origins found whose true slip stands among the first three; 0 of none."""
        return self.told.total() / max(self.found.total(), 1)

    def lines(self) -> Iterable[str]:
        """Give the table of counts by kind."""
        for kind in KINDS:
            if self.planted[kind]:
                yield (
                    f"{kind:34} planted {self.planted[kind]:4}  origin {self.found[kind]:4}  "
                    f"among the first three {self.told[kind]:4}"
                )
        yield (
            f"all: planted {self.planted.total()}, origin {self.found.total()}, among the first "
            f"three {self.told.total()} ({100 * self.share_told:.1f} %); {self.claims} claims, "
            f"{self.untouched} of them on untouched lines, false origins {len(self.false)}; "
            f"by chance another valid way or a round number: doubtful with the slip named "
            f"{len(self.doubtful)}, called a round number {len(self.rounded)}, "
            f"not told {len(self.not_told)}"
        )

    def another(self, slip: Planted, judged: Judged, what: str) -> bool:
        """Count a slip whose number has another reading; tell whether it has."""
        if judged.verdict is not Verdict.DOUBTFUL and judged.verdict not in READINGS:
            return False
        place = told_at(slip, judged)
        told = judged.verdict is Verdict.DOUBTFUL and place is not None and place <= FIRST
        kept = self.doubtful if told else self.rounded if _is_round(judged) else self.not_told
        kept.append(f"{what}{judged.note}")
        return True


def _within_roundings(graph: Graph, entry_id: str, claims: Mapping[str, Claim]) -> bool:
    """Tell whether rounding the lines between by hand, to the digits of the claims, gives it."""
    return reach(graph, entry_id, claims, DIGITS).meets(claims[entry_id].stands_for)


def _is_round(judged: Judged) -> bool:
    """Tell whether a number of three digits is round, or the right one cut off after its third.

    Round is what ends in 0, a size in millimetres in 5.
    """
    if judged.claim is None or judged.verdict not in ROUNDINGS:
        return False
    typed = float(judged.claim.typed)
    right = typed * judged.follows.middle / judged.claim.value
    if 0 <= abs(right) - abs(typed) < 10.0 ** (math.floor(math.log10(abs(right))) + 1 - DIGITS):
        return True
    digits = f"{float(judged.claim.typed):.2e}".partition("e")[0]
    return digits.endswith("0") or (judged.claim.unit == "mm" and digits.endswith("5"))


def measured(numbers: Iterable[int], seed: int = 0) -> tuple[Tally, Tally]:
    """Judge the beams of these numbers; return the counts of full and of quick tables."""
    full, quick = Tally(), Tally()
    for number in numbers:
        graph = beam(number, seed)
        for sheet in sheets(graph, number, seed):
            _count_full(full, number, sheet)
        if number % QUICK_EVERY == 0:
            for table in quick_tables(graph, number, seed):
                _count_quick(quick, number, graph, table)
    return full, quick


def said_of(graph: Graph, claims: Iterable[Claim]) -> dict[str, Judged]:
    return {found.id: found for found in judge(graph, list(claims), find_slips)}


def _count_full(tally: Tally, number: int, sheet: Sheet) -> None:
    claims = sheet.claims()
    said = said_of(sheet.graph, claims.values())
    for slip in sheet.planted:
        if not slip.beyond:
            continue
        tally.planted[slip.kind] += 1
        what = f"beam {number}, {slip.kind}: {slip.id} worked as {slip.what}: "
        judged = said[slip.id]
        if tally.another(slip, judged, what):
            continue
        if judged.verdict not in FOUND:
            tally.missed.append(f"{what}{judged.verdict}, {judged.note}")
            continue
        tally.found[slip.kind] += 1
        tally.missed.extend(
            f"{what}{given} {said[given].verdict}"
            for given, _ in slip.inputs
            if said[given].verdict is not Verdict.INPUT
        )
        _count_told(tally, slip.kind, told_at(slip, judged), what, judged)
    untouched = set(claims) - sheet.touched
    tally.claims += len(claims)
    tally.untouched += len(untouched)
    tally.false.extend(
        f"beam {number}: {i} {said[i].verdict}, {said[i].note}"
        for i in claims
        if i in untouched and said[i].verdict not in CALM
    )


def _count_told(tally: Tally, kind: str, place: int | None, what: str, judged: Judged) -> None:
    if place is not None and place <= FIRST:
        tally.told[kind] += 1
    else:
        said = "; ".join(f"{slip.kind}: {slip.sentence}" for slip in judged.slips[:FIRST])
        typed = judged.claim.typed if judged.claim else ""
        tally.untold.append(f"{what}claimed {typed} for {judged.follows}; said: {said}")


def _count_quick(tally: Tally, number: int, graph: Graph, table: Quick) -> None:
    slip, claims = table.slip, table.claims
    said = said_of(graph, claims.values())
    tally.claims += len(claims)
    what = f"beam {number}, quick, {slip.kind}: {slip.id} worked as {slip.what}: "
    if table.shows_at:
        tally.planted[slip.kind] += 1
        origins = [said[i] for i in table.shows_at if said[i].verdict in FOUND]
        told = bool(origins) or any(tally.another(slip, said[i], what) for i in table.shows_at)
        if not told or any(
            said[i].verdict is Verdict.AGREES and not _within_roundings(graph, i, claims)
            for i in table.shows_at
        ):
            tally.missed.append(f"{what}{[(i, str(said[i].verdict)) for i in table.shows_at]}")
        if origins:
            tally.found[slip.kind] += 1
            places = [told_at(slip, judged) or sys.maxsize for judged in origins]
            _count_told(tally, slip.kind, min(places), what, origins[0])
    for i in claims:
        calm = (Verdict.AGREES,) if i not in table.below else CALM
        if i not in table.below or i in table.later:
            tally.untouched += 1
            if said[i].verdict not in calm and i not in dict(slip.inputs):
                tally.false.append(f"{what}{i} {said[i].verdict}, {said[i].note}")


def report(full: Tally, quick: Tally, *, faults: bool = False) -> str:
    """Return the counts as text, with what went wrong if asked for."""
    lines = []
    for name, tally in (("full tables", full), ("quick tables", quick)):
        lines += ["", name, *tally.lines()]
        if faults:
            for word in ("doubtful", "rounded", "not_told", "missed", "false", "untold"):
                lines += [f"{word}: {line}" for line in getattr(tally, word)]
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    arguments = argparse.ArgumentParser(description=__doc__)
    arguments.add_argument("step", nargs="?", type=int, default=1, help="every so many beams")
    arguments.add_argument("seed", nargs="?", type=int, default=0)
    given = arguments.parse_args()
    sys.stdout.write(report(*measured(range(0, BEAMS, given.step), given.seed), faults=True))
