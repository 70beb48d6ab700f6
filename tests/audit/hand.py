"""A small beam worked by hand, and claims typed against it, for the tests of judging.

Section 400 x 600, cover 40, stirrup 11.3, four bars of 19.5 mm (300 mm2 each), f'c 30, f_y 400,
alpha_1 0.805: d = 600 - 40 - 11.3 - 9.75 = 538.95; A_s = 1200; T = 0.85 x 1200 x 400 = 408 000 N;
a = 408 000/(0.805 x 0.65 x 30 x 400) = 408 000/6279 = 64.9785; M_r = 408 000 x (538.95 - 32.4893)
= 206.636 kN.m; M_f = 40 x 6^2/8 = 180 kN.m.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from lineproof.audit.claims.judge import judge
from lineproof.audit.claims.sought import SlipFinder
from lineproof.audit.data import Claim, Judged, Verdict, read_from
from lineproof.audit.graph import Graph
from lineproof.quantity.units import internal_factor
from lineproof.record import Record
from lineproof.sheet import Sheet

GIVENS = {
    "b": "400 mm", "h": "600 mm", "c_c": "40 mm", "d_bs": "11.3 mm", "d_b": "19.5 mm",
    "A_b": "300 mm2", "n_b": "4", "f_c": "30 MPa", "f_y": "400 MPa", "phi_c": "0.65",
    "phi_s": "0.85", "alpha_1": "0.805", "h_f": "100 mm", "w_f": "40 kN/m", "l": "6 m",
}  # fmt: skip
LINES = {
    "d = h - c_c - d_bs - d_b/2": "mm",
    "A_s = n_b*A_b": "mm2",
    "a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)": "mm",
    "M_r = phi_s*A_s*f_y*(d - a/2)": "kN.m",
    "M_f = w_f*l**2/8": "kN.m",
}


def sheet_of(lines: Mapping[str, str] = LINES, givens: Mapping[str, str] = GIVENS) -> Sheet:
    """Return a sheet with the givens and lines in the parts ``given`` and ``beam``, still open."""
    sheet = Sheet("H1", "Beam by hand")
    with sheet.part("given", "Given"):
        for symbol, value in givens.items():
            sheet.given(symbol, value)
    with sheet.part("beam", "Span 1: by hand"):
        for text, unit in lines.items():
            sheet.line(text, unit=unit)
    return sheet


def beam(decision: str = "") -> Record:
    """Return the record of the beam with its check; a decision may stand between ``a`` and M_r."""
    sheet = sheet_of({text: unit for text, unit in LINES.items() if not text.startswith("M_")})
    with sheet.part("strength", "Span 1: strength"):
        if decision:
            sheet.decide(decision, key="branch", title="Which branch")
        for text in LINES:
            if text.startswith("M_"):
                sheet.line(text, unit="kN.m")
        sheet.check("M_f <= M_r", key="strength", title="Moment resistance")
    return sheet.close()


def typed(graph: Graph, entry_id: str, text: str, row: int = 0) -> Claim:
    """Return a claim as typed: ``209 kN.m``; without a unit in that of the line."""
    number, _, unit = text.partition(" ")
    unit = unit or graph[entry_id].unit
    factor = internal_factor(unit)
    return Claim(
        entry_id, number, unit, float(number) * factor, read_from(number).times(factor), row
    )


def verdicts_of(
    lines: Mapping[str, str], givens: Mapping[str, str], claims: Mapping[str, str]
) -> dict[str, Verdict]:
    """Judge numbers typed for lines of the part ``beam``; return the verdicts by symbol."""
    record = sheet_of(lines, givens).close()
    made = judged(record, {f"beam/{symbol}": text for symbol, text in claims.items()})
    return {entry_id.removeprefix("beam/"): each.verdict for entry_id, each in made.items()}


def judged(
    record: Record, claims: Mapping[str, str], find: SlipFinder | None = None
) -> dict[str, Judged]:
    """Judge typed claims; return the judgements of claimed lines by id."""
    graph = Graph(record)
    made: Sequence[Judged] = judge(graph, [typed(graph, i, t) for i, t in claims.items()], find)
    return {each.id: each for each in made if each.claim is not None}
