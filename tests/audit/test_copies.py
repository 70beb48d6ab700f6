"""A slip made in every row is told as what it is, not as the number of the other row."""

from __future__ import annotations

from lineproof.audit.data import Verdict
from lineproof.audit.slips.search import find_slips
from lineproof.sheet import Sheet

from .hand import judged

DEPTH = "d = h - c_c - d_bs - d_b/2"
COPIED = "written in this row"


def _sheet() -> Sheet:
    """d = 620 - 30 - 11.3 - 19.5/2 = 568.95 mm in two spans."""
    sheet = Sheet("B1", title="Two depths")
    with sheet.part("given", "Given"):
        sheet.given("h", "620 mm", "depth")
        sheet.given("c_c", "30 mm", "cover")
        sheet.given("d_bs", "11.3 mm", "diameter of the stirrup")
        sheet.given("d_b", "19.5 mm", "diameter of the bar")
    for span in (1, 2):
        with sheet.part(f"sag-{span}", f"Flexure, span {span}"):
            sheet.line(DEPTH, unit="mm")
    return sheet


def test_one_slip_in_two_rows_is_no_copy() -> None:
    """The stirrup forgotten in both: 620 - 30 - 9.75 = 580.25, claimed as 580 twice."""
    claims = {"sag-1/d": "580", "sag-2/d": "580"}
    made = judged(_sheet().close(), claims, find_slips)

    first, second = (made[i] for i in claims)
    assert (first.verdict, second.verdict) == (Verdict.ORIGIN, Verdict.ORIGIN)
    assert "the term d_bs" in first.slips[0].sentence
    assert "the term d_bs" in second.slips[0].sentence
    assert not any(COPIED in slip.sentence for slip in first.slips)
    assert COPIED in second.slips[-1].sentence  # the row before is told, after what explains it


def test_what_is_worked_from_the_claim_does_not_explain_it() -> None:
    """d_s = 620 - 537.4 = 82.6 comes of the claim: 620 - 30 - 11.3 - 82.6/2 = 537.4 is a circle."""
    sheet = _sheet()
    with sheet.part("sag-3", "Flexure, span 3"):
        sheet.line(DEPTH, unit="mm")
        sheet.line("d_s = h - d", unit="mm")
    claims = {"sag-3/d": "537.4", "sag-3/d_s": "82.6"}
    found = judged(sheet.close(), claims, find_slips)["sag-3/d"]
    assert found.verdict is Verdict.ORIGIN
    assert not any("d_s" in slip.sentence for slip in found.slips)


def test_a_row_without_fault_may_have_been_copied() -> None:
    """With 19.5 + 9.75 in span 3, d = 620 - 30 - 11.3 - 29.25 = 549.45; span 2 claimed as that."""
    sheet = _sheet()
    with sheet.part("sag-3", "Flexure, span 3"):
        sheet.line("d = h - c_c - d_bs - 1.5*d_b", unit="mm")
    found = judged(sheet.close(), {"sag-2/d": "549", "sag-3/d": "549"}, find_slips)["sag-2/d"]
    assert found.verdict is Verdict.ORIGIN
    assert COPIED in found.slips[0].sentence
