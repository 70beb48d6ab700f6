"""Sheets with coarse numbers: what is said of honest roundings, and of slips among them.

``python -m tests.audit.planting_roundings`` from the root of the project prints the counts. Every
number is worked from those written above it. On some honest sheets every number is coarse, as its
author's habit; on others one in ten, where he rounded for once. Slips are planted one a sheet, on
sheets of two digits throughout.
"""

from __future__ import annotations

import argparse
import sys
from collections import Counter
from collections.abc import Callable, Iterable, Iterator, Mapping
from decimal import Decimal

from lineproof.audit.claims.judge import judge
from lineproof.audit.data import Claim, Judged, Verdict, read_from
from lineproof.audit.graph import Graph, Node
from lineproof.audit.slips.search import searching
from lineproof.quantity.digits import significant
from lineproof.quantity.units import internal_factor

from .planting import chosen
from .planting_beams import BEAMS, beam
from .planting_slips import Planted, three_digits

SELDOM = 10
"""One number in so many is coarse on the sheet of somebody who rounds for once."""
Coarse = Callable[[Node, float], str]
"""Writes a number of a line more coarsely than with three digits; empty where it does not."""


def two_digits(_node: Node, value: float) -> str:
    """Write 453 as 450, and 12 300 as 12 000; nothing is coarse in 4.5."""
    text = f"{significant(value, 2):f}"
    return "" if "." in text or abs(Decimal(text)) < 100 else text


def fives(node: Node, value: float) -> str:
    """Write a size in millimetres to the nearest five: 538.9 as 540."""
    return f"{5 * round(value / 5)}" if node.unit == "mm" and abs(value) >= 100 else ""


WAYS: Mapping[str, Coarse] = {"two digits": two_digits, "sizes to 5 mm": fives}


def sheet(
    graph: Graph, coarse: Coarse, every: int, start: int = 0, slip: Planted | None = None
) -> dict[str, Claim]:
    """Return the claims of a sheet on which every so many of the coarse numbers are written so.

    At its line a ``slip`` is worked in place of the formula.
    """
    values, claims, met = dict(graph.stored), {}, start
    for node in graph:
        if not node.has_value:
            continue
        if node.is_computed:
            try:
                if slip is not None and slip.id == node.id:
                    values[node.id] = slip.work(values)
                else:
                    values[node.id] = node.compute(graph.named(node, values))
            except (ArithmeticError, ValueError):
                continue
        factor = internal_factor(node.unit)
        number = values[node.id] / factor
        text = coarse(node, number) if node.is_computed else ""
        met += bool(text)
        text = text if text and met % every == 0 else three_digits(number)
        stands = read_from(text).times(factor)
        claims[node.id] = Claim(node.id, text, node.unit, float(text) * factor, stands)
        values[node.id] = values[node.id] if not node.is_computed else float(text) * factor
    return claims


def judged_roundings(graph: Graph, claims: Mapping[str, Claim], coarse: Coarse) -> Iterator[Judged]:
    """Give what is said of the numbers that are coarse and do not agree within their digits."""
    for said in judge(graph, list(claims.values()), searching()):
        node = graph[said.id]
        if said.claim is None or not node.is_computed or said.verdict is Verdict.AGREES:
            continue
        if coarse(node, float(said.claim.typed)) == said.claim.typed:
            yield said


def counted(numbers: Iterable[int], seed: int = 0) -> dict[str, Counter[Verdict]]:
    """Count the verdicts on coarse numbers by way of rounding and by whether it is a habit."""
    found: dict[str, Counter[Verdict]] = {}
    for number in numbers:
        graph = beam(number, seed)
        for name, coarse in WAYS.items():
            for often, every in (("habit", 1), ("for once", SELDOM)):
                claims = sheet(graph, coarse, every, number)
                tally = found.setdefault(f"{name}, {often}", Counter())
                tally.update(said.verdict for said in judged_roundings(graph, claims, coarse))
    return found


def counted_slips(numbers: Iterable[int], seed: int = 0) -> Counter[Verdict]:
    """Count the verdicts on slips that change what is written in two digits."""
    found: Counter[Verdict] = Counter()
    for number in numbers:
        graph = beam(number, seed)
        honest = sheet(graph, two_digits, 1)
        for slip in chosen(graph, number, seed):
            if slip.inputs or slip.written:
                continue
            claims = sheet(graph, two_digits, 1, slip=slip)
            if slip.id in claims and claims[slip.id].typed != honest[slip.id].typed:
                said = judge(graph, list(claims.values()), searching())
                found.update(each.verdict for each in said if each.id == slip.id)
    return found


if __name__ == "__main__":
    arguments = argparse.ArgumentParser(description=__doc__)
    arguments.add_argument("step", nargs="?", type=int, default=30, help="every so many beams")
    arguments.add_argument("seed", nargs="?", type=int, default=0)
    given = arguments.parse_args()
    for name, tally in counted(range(0, BEAMS, given.step), given.seed).items():
        sys.stdout.write(f"{name}: {tally.total()}; {dict(tally)}\n")
    slips = counted_slips(range(0, BEAMS, given.step), given.seed)
    sys.stdout.write(f"two digits, slips: {slips.total()}; {dict(slips)}\n")
