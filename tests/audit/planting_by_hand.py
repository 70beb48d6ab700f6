"""Honest tables of governing results as worked on paper, where every line is rounded.

``python -m tests.audit.planting_by_hand`` from the root of the project prints what is said of them.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from random import Random

from lineproof.audit.claims.blank import quick_lines
from lineproof.audit.claims.judge import judge
from lineproof.audit.data import Claim, Judged, Verdict, read_from
from lineproof.audit.graph import Graph, Node
from lineproof.quantity.digits import significant
from lineproof.quantity.units import internal_factor

from .planting_beams import BEAMS, beam

Values = Mapping[str, float]
Line = Callable[[Node, Values], tuple[float, int]]
"""Works a line from the values carried on [internal units]; says with how many digits it stands."""
MIXED = 0
"""For the digits: each line has three, four, or all that a calculator carries."""
_OF_A_LINE = (3, 3, 4, 6)


def worked(graph: Graph, digits: int, seed: int = 0) -> list[Claim]:
    """Return the quick table of a calc of which every line is rounded and carried on so."""
    draw = Random(seed)  # noqa: S311 - the same digits every time

    def line(node: Node, values: Values) -> tuple[float, int]:
        return node.compute(graph.named(node, values)), digits or draw.choice(_OF_A_LINE)

    texts = sheet(graph, line)
    return [claim(graph, i, texts[i]) for i in quick_lines(graph)]


def sheet(graph: Graph, line: Line) -> dict[str, str]:
    """Return a whole sheet as texts by id: every line as ``line`` works it, rounded, carried on."""
    values, texts = dict(graph.stored), dict[str, str]()
    for node in graph:
        if not node.has_value:
            continue
        factor = internal_factor(node.unit)
        if node.is_computed:
            made, digits = line(node, values)
            number = significant(made / factor, digits)
            texts[node.id], values[node.id] = f"{number:f}", float(number) * factor
        else:
            texts[node.id] = f"{values[node.id] / factor:.10g}"
    return texts


def claim(graph: Graph, entry_id: str, text: str) -> Claim:
    """Return what a sheet says of a line, in the unit in which the calc has it."""
    unit = graph[entry_id].unit
    factor = internal_factor(unit)
    return Claim(entry_id, text, unit, float(text) * factor, read_from(text).times(factor))


def judged_by_hand(numbers: Iterable[int], digits: int) -> list[tuple[int, Judged]]:
    """Judge the honest tables of random beams; return each claim with the number of its beam."""
    graphs = ((number, beam(number)) for number in numbers)
    said = ((number, judge(graph, worked(graph, digits, number))) for number, graph in graphs)
    return [(number, each) for number, all_ in said for each in all_ if each.claim is not None]


def not_agreeing(said: Iterable[tuple[int, Judged]]) -> list[tuple[int, str, str]]:
    """Return beam, line and verdict of each claim that is said to be something else than right."""
    return [(n, j.id, str(j.verdict)) for n, j in said if j.verdict is not Verdict.AGREES]


if __name__ == "__main__":
    for digits in (3, 4, MIXED):
        said = judged_by_hand(range(0, BEAMS, 12), digits)
        wrong = not_agreeing(said)
        counts = f"{len(said)} numbers, not agreeing {len(wrong)}"
        print(f"{digits or 'mixed'} digits: {counts}", *wrong, sep="\n")  # noqa: T201
