"""Tables of governing results alone: the lines between were rounded by hand, and are no errors.

d 538.95, A_s 1200, T = 0.85 x 1200 x 400 = 408 kN, a 64.9785, M_r 206.64 (hand.py); other numbers
are worked in the tests.
"""

from __future__ import annotations

import pytest

from lineproof.audit.audit import audit_claims
from lineproof.audit.data import Judged, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.slips.search import find_slips
from lineproof.formula import formula
from lineproof.sheet import Sheet

from .hand import judged, sheet_of, typed
from .planting_beams import BEAMS
from .planting_by_hand import judged_by_hand, not_agreeing

LOADS = {"w_sl": "12.96 kN/m", "w_wb": "4.2 kN/m", "w_SD": "5.4 kN/m", "l": "8.4 m"}
LINES = {"w_D = w_sl + w_wb + w_SD": "kN/m", "R_D = w_D*l/2": "kN"}


def reaction(text: str, **more: str) -> Judged:
    """Judge a reaction of w_D = 22.56 kN/m over 8.4 m, 94.752 kN; w_D may be claimed as well."""
    record = sheet_of(LINES, LOADS).close()
    claims = {f"beam/{symbol}": value for symbol, value in more.items()}
    return judged(record, claims | {"beam/R_D": text}, find_slips)["beam/R_D"]


def test_a_sum_written_with_three_digits_and_carried_on_is_no_error() -> None:
    """22.6 x 4.2 = 94.92: "94.9" for 94.752, whose digits it does not have."""
    said = reaction("94.9")
    assert said.verdict is Verdict.AGREES
    assert said.note == "follows where lines that are not claimed are rounded to 3 digits"
    assert said.slips == ()


@pytest.mark.parametrize(
    ("text", "why"),
    [
        ("95.3", "22.69 x 4.2, no rounding of 22.56"),
        ("94.5", "22.5 x 4.2 = 94.5, which 22.56 is not cut to by rounding"),
        ("72.1", "w_SD left out: 17.16 x 4.2 = 72.07"),
    ],
)
def test_no_more_is_let_pass(text: str, why: str) -> None:
    assert reaction(text).verdict is Verdict.ORIGIN, why


def test_a_claimed_line_was_not_rounded_otherwise_on_the_way() -> None:
    """22.56 claimed: 94.9 does not follow from it, whatever three digits would give."""
    assert reaction("94.9", w_D="22.56").verdict is Verdict.ORIGIN


def test_a_number_in_the_middle_may_be_rounded_to_either_side() -> None:
    """b_o = 3250/2 = 1625 is 1620 or 1630: b_f = 350 + 2 b_o = 3590 or 3610; 3570 is neither."""
    givens, lines = {"l_w": "3250 mm", "b_w": "350 mm"}, {"b_o = l_w/2": "mm"}
    record = sheet_of(lines | {"b_f = b_w + 2*b_o": "mm"}, givens).close()
    said = {text: judged(record, {"beam/b_f": text})["beam/b_f"] for text in ("3590", "3610")}
    assert {each.verdict for each in said.values()} == {Verdict.AGREES}
    assert judged(record, {"beam/b_f": "3570"})["beam/b_f"].verdict is not Verdict.AGREES


@pytest.mark.parametrize("digits", [3, 4])
def test_honest_tables_by_hand_hold_no_error(digits: int) -> None:
    """Quick tables of every twelfth random beam, all lines of it rounded: nothing but agrees."""
    said = judged_by_hand(range(0, BEAMS, 12), digits)
    assert len(said) > 1000  # more than forty a beam: no empty count
    assert not_agreeing(said) == []


def test_the_slip_behind_a_line_is_found_though_those_above_were_rounded() -> None:
    """f_r = 0.6 sqrt(30) = 3.286, 3.29: 3.29 x 350 x 650^2/6 = 81.09 for the web alone, "81.1".

    With 3.286 it is 80.99; the T section has 3.286 x 18.6e9/495 = 123.5.
    """
    sheet = Sheet("H8", "Cracking")
    with sheet.part("given", "Given"):
        for symbol, value in {
            "b_w": "350 mm", "h": "650 mm", "y_b": "495 mm", "A_c": "28617 mm2", "f_c": "30 MPa",
        }.items():  # fmt: skip
            sheet.given(symbol, value)
    numbers = {"0.6": "MPa^0.5"}
    with sheet.part("beam", "Span 1"):
        made = formula("f_r = 0.6*sqrt(f_c)", unit="MPa", numbers=numbers, title="Rupture")
        sheet.line(made)
        sheet.line("I_g = A_c*h**2 + b_w*h**3/12 - b_w*h**3/12", unit="mm4")
        sheet.line("M_cr = f_r*I_g/y_b", unit="kN.m")
    record = sheet.close()
    found = judged(record, {"beam/M_cr": "81.1"}, find_slips)["beam/M_cr"]
    assert found.verdict is Verdict.ORIGIN
    assert any("the web alone for the whole section" in slip.sentence for slip in found.slips)


def test_what_carries_an_error_through_rounded_lines_is_no_origin_of_its_own() -> None:
    """w_f 42.8 for 41.16: V = 42.8 x 4.2 = 179.76, 180; x = 180/42.8 = 4.21; M = 378.5 is carried.

    Without rounding 42.8 x 8.4^2/8 = 377.5; right is 41.16 x 8.4^2/8 = 363.0.
    """
    lines = {
        "w_f = 1.25*w_D + 1.5*w_L": "kN/m", "V_sn = w_f*l/2": "kN", "x_f = V_sn/w_f": "m",
        "M_f = V_sn*x_f - w_f*x_f**2/2": "kN.m",
    }  # fmt: skip
    givens = {"w_D": "22.56 kN/m", "w_L": "8.64 kN/m", "l": "8.4 m"}
    said = judged(sheet_of(lines, givens).close(), {"beam/w_f": "42.8", "beam/M_f": "378.5"})
    assert said["beam/w_f"].verdict is Verdict.ORIGIN
    assert said["beam/M_f"].verdict is Verdict.CARRIED
    assert said["beam/M_f"].causes == ("beam/w_f",)


def test_what_follows_by_rounding_does_not_show_that_a_value_was_not_used() -> None:
    """b_f 3590 of b_o 1620, and M_cr of the right b_f: neither is a finding."""
    sheet = Sheet("H7", "Quick table")
    with sheet.part("given", "Given"):
        for symbol, value in {"l_w": "3250 mm", "b_w": "350 mm", "f_r": "3.29 MPa"}.items():
            sheet.given(symbol, value)
    with sheet.part("beam", "Span 1"):
        sheet.line("b_o = l_w/2", unit="mm")
        sheet.line("b_f = b_w + 2*b_o", unit="mm")
        sheet.line("A_g = b_f*b_w", unit="mm2")
    record = sheet.close()
    graph = Graph(record)
    # 3590 x 350 = 1 256 500; with 3600 it is 1 260 000
    texts = {"beam/b_f": "3590", "beam/A_g": "1256500"}
    audit = audit_claims(record, [typed(graph, i, t) for i, t in texts.items()], graph)
    assert audit.findings == ()
    (note,) = audit.notes
    assert note.startswith("1 claim follows where lines that are not claimed are rounded")
    assert "b_f (2.2)" in note
