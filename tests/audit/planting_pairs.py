"""Two slips on one sheet: one that was worked on, and one of the pen, written wrong but used right.

``python -m tests.audit.planting_pairs`` prints what the audit makes of them; a number behind it is
another seed. Lines below the slip of the pen rest on the value that was worked, which nobody wrote
down, and may carry the other slip as well.
"""

from __future__ import annotations

import sys
from collections.abc import Iterable, Iterator
from dataclasses import dataclass, field
from random import Random

from lineproof.audit.data import Judged, Verdict
from lineproof.audit.graph import Graph

from .planting import Sheet, chosen, sheet_with
from .planting_beams import beam
from .planting_measure import CALM, FOUND, said_of
from .planting_slips import Planted

NUMBERS = range(0, 300, 3)
"""A hundred of the random beams, of all kinds."""
A_BEAM = 2
"""Pairs tried on each beam, each on a sheet of its own."""


@dataclass
class Pairs:
    """Counts of pairs: slips planted beyond rounding and told, lines untouched, false origins."""

    sheets: int = 0
    planted: int = 0
    told: int = 0
    untouched: int = 0
    missed: list[str] = field(default_factory=list)
    false: list[str] = field(default_factory=list)

    def lines(self) -> Iterable[str]:
        """Give the counts and what went wrong."""
        yield (
            f"{self.sheets} sheets with two slips: {self.planted} slips beyond rounding, "
            f"{self.told} told at their line; {self.untouched} untouched lines, false origins "
            f"{len(self.false)}"
        )
        yield from (f"missed: {line}" for line in self.missed)
        yield from (f"false: {line}" for line in self.false)


def pairs(graph: Graph, number: int, seed: int = 0) -> Iterator[Sheet]:
    """Give sheets with a slip of the pen and one that was worked on, in turn one above it."""
    draw = Random(f"pairs {seed} {number}")  # noqa: S311 - the same pairs every time
    slips = chosen(graph, number, seed)
    pens = [slip for slip in slips if slip.written is not None]
    worked = [slip for slip in slips if slip.written is None]
    for turn in range(A_BEAM if pens and worked else 0):
        pen = pens[turn % len(pens)]
        above = set(graph.above([pen.id]))
        near = [slip for slip in worked if slip.id in above] if turn % 2 else []
        other = draw.choice(near or worked)
        if not _disjoint(pen, other):
            continue
        sheet = sheet_with(graph, [other, pen])
        # By chance both may make up for each other where they are written: then no number there
        # is wrong, and whoever reads it as right finds the next line to be the origin.
        if sheet.planted[-1].beyond or not other.beyond:
            yield sheet


def _disjoint(first: Planted, second: Planted) -> bool:
    ids = [{slip.id, *(i for i, _ in slip.inputs)} for slip in (first, second)]
    return not ids[0] & ids[1]


def measured_pairs(numbers: Iterable[int], seed: int = 0) -> Pairs:
    """Judge pairs of slips on the beams of these numbers."""
    made = Pairs()
    for number in numbers:
        graph = beam(number, seed)
        for sheet in pairs(graph, number, seed):
            _count(made, number, sheet)
    return made


def _count(made: Pairs, number: int, sheet: Sheet) -> None:
    claims = sheet.claims()
    said = said_of(sheet.graph, claims.values())
    made.sheets += 1
    what = ", ".join(f"{slip.kind} at {slip.id}" for slip in sheet.planted)
    for slip in sheet.planted:
        if slip.beyond:
            made.planted += 1
            is_told = said[slip.id].verdict in (*FOUND, Verdict.DOUBTFUL)
            made.told += is_told
            if not is_told:
                made.missed.append(f"beam {number}, {what}: {_told(said[slip.id])}")
    untouched = [i for i in claims if i not in sheet.touched]
    made.untouched += len(untouched)
    made.false += [
        f"beam {number}, {what}: {_told(said[i])}" for i in untouched if said[i].verdict not in CALM
    ]


def _told(judged: Judged) -> str:
    typed = judged.claim.typed if judged.claim else ""
    return f"{judged.id} claimed {typed}: {judged.verdict}, {judged.note}"


if __name__ == "__main__":
    SEED = int(sys.argv[1]) if len(sys.argv) > 1 else 0
    sys.stdout.writelines(f"{line}\n" for line in measured_pairs(NUMBERS, SEED).lines())
