"""Live loads that the code allows to be reduced, where the calculation has them whole."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from lineproof.audit.claims.propagate import Form, combined
from lineproof.audit.data import Interval
from lineproof.audit.graph import Graph, Node
from lineproof.errors import UserError
from lineproof.formula import Formula
from lineproof.record.entry import LOOKUP
from lineproof.standards.nbc import loads, reduction
from lineproof.typeset.values import told

_PER_M2 = 1e6
_DIGITS = 4


def by_reduction(
    graph: Graph, used: Mapping[str, Form], node: Node
) -> Iterator[tuple[str, Interval]]:
    """Give a live load reduced by NBC 4.1.5.8 for the area of each span, with what was done.

    Nothing where the area is too small, the use is not known or allows no reduction.
    """
    source = graph.nodes.get(node.args.get("q_L", ""))
    if str(node.entry.get("formula", "")) != loads.LIVE.text or source is None:
        return
    factor = _factor(source, used[source.id].middle)
    if factor is None:
        return
    group = reduction.HEAVY if factor is reduction.FACTOR_HEAVY else reduction.OTHER
    reference, least = (
        reduction.AREAS.number(group, symbol) * _PER_M2 for symbol in ("A_0", "A_Lmin")
    )
    width = used[node.args["b_tr"]]
    for span in _spans(graph):
        area = combined(lambda l, b: l * b, [used[span], width])
        if area.middle > least:
            reduced = combined(factor.function, [Form(reference), area])
            load = combined(lambda r, q, b: r * q * b, [reduced, used[source.id], width])
            shown = told(f"{area.middle / _PER_M2:.{_DIGITS}g}", "m2")
            sentence = (
                "follows with the live load reduced by NBC 4.1.5.8 for the tributary area of a "
                f"span, {shown}; the calc does not reduce it"
            )
            yield sentence, load.interval


def _factor(source: Node, load: float) -> Formula | None:
    if source.kind != LOOKUP:
        return None
    try:
        return reduction.reduction(str(source.entry.get("row", "")), load, "")
    except UserError:
        return None


def _spans(graph: Graph) -> Iterator[str]:
    yield from (i for i in graph.nodes if i == "given/l" or i.startswith("given/l_"))
