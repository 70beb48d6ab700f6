"""A junior's own small calculation, for the tests of what is found in it.

Section 380 x 620, f'c 32 MPa, f_y 400 MPa, A_s 2000 mm2, d 566 mm. By hand: alpha_1 = 0.85 -
0.0015 x 32 = 0.802; a = 0.85 x 2000 x 400/(0.802 x 0.65 x 32 x 380) = 680 000/6339.0 = 107.27 mm;
M_r = 680 000 x (566 - 53.64) = 348.4 kN.m; d_v = max(0.9 x 566, 0.72 x 620) = max(509.4, 446.4) =
509.4 mm; V_c = 0.65 x 1 x 0.18 x 5.6569 x 380 x 509.4 = 128.1 kN.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping

from lineproof.audit.data import Finding
from lineproof.audit.junior.search import Cell
from lineproof.record import Record
from lineproof.sheet import Sheet
from lineproof.standards.catalogue import NOTATION

INPUTS: Mapping[str, str] = {
    "f_c": "32 MPa", "f_y": "400 MPa", "phi_c": "0.65", "phi_s": "0.85", "lambda_": "1.0",
    "b_w": "380 mm", "h": "620 mm",
}  # fmt: skip
CODES = {"pair": "NBC 2015 + A23.3-14", "building": "NBC 2015", "concrete": "CSA A23.3-14"}


def sheet_with(**typed: str) -> Sheet:
    """Return a sheet of the junior's own with its inputs; more may be typed, or others."""
    sheet = Sheet("B9", "Beam B9", project={"codes": {"pair": CODES["pair"]}})
    sheet.notation, sheet.codes = NOTATION, dict(CODES)
    with sheet.part("inputs", "Inputs"):
        for symbol, text in (dict(INPUTS) | typed).items():
            sheet.given(symbol, text, source="drawing S-501")
    return sheet


def own_record(write: Callable[[Sheet], object], **typed: str) -> Record:
    """Return the record of a sheet with one part of own lines."""
    sheet = sheet_with(**typed)
    with sheet.part("own", "Own lines"):
        write(sheet)
    return sheet.close()


def said(found: tuple[Finding, ...], *words: str) -> list[Finding]:
    """Return the findings that say all of some words."""
    return [one for one in found if all(word in one.what for word in words)]


def code(
    source: str, number: int = 1, *, count: int | None = 1, outputs: tuple[str, ...] = ()
) -> Cell:
    """Return a code cell that was run."""
    return Cell(number, "code", source, (), count, outputs)
