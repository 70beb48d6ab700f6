"""Blank tables of claims: what a checker fills in from another's calculation.

A blank names lines and prints none of our values, so that nobody copies them.
"""

from __future__ import annotations

import re
from collections.abc import Iterator

from lineproof.audit.claims.tables import write_table
from lineproof.audit.effects import place_of
from lineproof.audit.graph import Graph, Node
from lineproof.record.entry import GIVEN, LOOKUP

HEADINGS = ("id", "label", "place", "symbol", "title", "unit", "claimed", "where")
"""Columns of a blank; ``claimed`` and ``where`` (the page of the other's calc) are empty."""

_BARS = ("n_1", "n_2", "n_t", "n_o", "d_b", "A_b")
_SECTION = ("M_f", "A_s", "d", "M_r")
_QUICK: tuple[tuple[str, tuple[str, ...]], ...] = (
    (r"materials", ("f_y", "lambda_")),
    (r"loads", ("gamma_w", "q_SD", "q_L", "w_f", "M_f", "V_f", "R_D", "R_L")),
    (r"section|span-\d+", ("b_f", "M_cr")),
    (r"analysis", ()),
    (r"sag-\d+", ("w_f", *_BARS, *_SECTION)),
    (r"hog-\d+-(left|right)|top-steel|bars|flexure", (*_BARS, *_SECTION)),
    (r"required-steel", ("A_sr",)),
    (r"minimum-steel", ("A_smin",)),
    (r"balanced", ("A_sb", "M_rb")),
    (r"crack-control", ("z",)),
    (r"stirrups", ("A_t", "n_v")),
    (r"shear-\d+-(left|right)", ("V_f", "s", "V_r")),
    (r"support-\d+", ("R_f",)),
    (r"deflection-\d+", ("delta_L", "delta_t", "delta_at")),
    (r"anchorage-bar-\d+", ("l_d",)),
)
"""Quick lines by part: inputs on which much rests, and what governs."""
_REACTION = re.compile(r"R_\d+[DL]\Z")
_MADE_HERE = re.compile(
    r"(cover|coefficients|service|torsion|interface|second-path|capacity|coverage|schedule|summary"
    r"|shear|deflection|anchorage|imported|redistribution|equivalent|skin|holding|cure)"
)
"""Parts of the flow that hold no quick line beyond those named above."""
_ELSEWHERE = ("w_f", "M_f", "V_f", "d", "A_s", "A_sr", "M_r", "s", "V_r", "l_d", "M_cr")
"""Quick lines of a part that a designer wrote, beside its givens."""


def quick_lines(graph: Graph) -> tuple[str, ...]:
    """Return the ids of the inputs and governing results that a quick check asks for."""
    return tuple(node.id for node in graph if node.has_value and _is_quick(node))


def _is_quick(node: Node) -> bool:
    if node.part == "given":
        return node.kind == GIVEN
    for part, symbols in _QUICK:
        if re.fullmatch(part, node.part):
            reaction = node.part == "analysis" and bool(_REACTION.match(node.symbol))
            load = node.part == "loads" and node.kind in (GIVEN, LOOKUP)
            return node.symbol in symbols or reaction or load
    if _MADE_HERE.match(node.part):
        return False
    return node.kind == GIVEN or node.symbol in _ELSEWHERE or _is_last(node)


def _is_last(node: Node) -> bool:
    return node.symbol.startswith(("delta_", "R_"))


def blank_table(graph: Graph, ending: str, *, full: bool = False) -> bytes:
    """Return a blank table as CSV or .xlsx: the quick lines, or every line with a value.

    Raises :class:`UserError` for another ending.
    """
    wanted = None if full else set(quick_lines(graph))
    titles = {part["key"]: str(part.get("title", "")) for part in graph.record.parts}
    rows = [
        _row(node, titles[node.part])
        for node in _values(graph)
        if wanted is None or node.id in wanted
    ]
    return write_table(HEADINGS, rows, ending)


def _values(graph: Graph) -> Iterator[Node]:
    return (node for node in graph if node.has_value)


def _row(node: Node, title: str) -> tuple[str, ...]:
    return (node.id, node.label, place_of(title), node.symbol, node.title, node.unit, "", "")
