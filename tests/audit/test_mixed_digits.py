"""Governing results alone, the lines between each rounded in its own way; worked by hand.

w_D = 12.96 + 4.2 + 5.425 = 22.585 kN/m, w_f = 1.25 x 22.585 + 1.5 x 8.64 = 41.19125 kN/m, over
8.4 m: M_f = 41.19125 x 8.82 = 363.307 kN.m.
"""

from __future__ import annotations

import pytest

from lineproof.audit.data import Judged, Verdict
from lineproof.audit.slips.search import find_slips

from .hand import judged, sheet_of
from .planting_beams import BEAMS
from .planting_by_hand import MIXED, judged_by_hand, not_agreeing

GIVENS = {
    "w_sl": "12.96 kN/m", "w_wb": "4.2 kN/m", "w_SD": "5.425 kN/m", "w_L": "8.64 kN/m",
    "l": "8.4 m",
}  # fmt: skip
LINES = {
    "w_D = w_sl + w_wb + w_SD": "kN/m", "w_f = 1.25*w_D + 1.5*w_L": "kN/m",
    "M_f = w_f*l**2/8": "kN.m",
}  # fmt: skip


def moment(text: str, **more: str) -> Judged:
    """Judge M_f alone, or beside claims of lines that it rests on."""
    record = sheet_of(LINES, GIVENS).close()
    claims = {f"beam/{symbol}": value for symbol, value in (more | {"M_f": text}).items()}
    return judged(record, claims, find_slips)["beam/M_f"]


@pytest.mark.parametrize(
    ("text", "why"),
    [
        (
            "363.4",
            "w_D 22.585; w_f 41.2 of 41.19; 41.2 x 8.82 = 363.38",
        ),
        ("363.45", "w_D 22.6; w_f 41.21 of four digits; 41.21 x 8.82 = 363.47, within the reach"),
        ("362.9", "w_D 22.58; w_f 41.185, 41.15 of a slide rule; 41.15 x 8.82 = 362.94"),
    ],
)
def test_lines_rounded_each_in_its_own_way_are_no_error(text: str, why: str) -> None:
    """Reach: 0.05 x 1.25 x 8.82 = 0.55 of w_D and 0.05 x 8.82 = 0.44 of w_f, together 0.71."""
    assert moment(text).verdict is Verdict.AGREES, why


@pytest.mark.parametrize(
    ("text", "why"),
    [
        ("364.1", "0.79 off, farther than 0.71 and half a digit"),
        ("362.5", "0.81 off to the other side"),
        ("366.9", "1.4 w_D + 1.5 w_L would be 393; nothing gives this"),
    ],
)
def test_what_lies_beyond_the_reach_is_an_origin(text: str, why: str) -> None:
    assert moment(text).verdict is Verdict.ORIGIN, why


def test_where_the_lines_are_claimed_no_band_is_let_pass() -> None:
    """41.19 x 8.82 = 363.30: 362.9 does not follow, whatever the line above it was rounded to."""
    assert moment("362.9", w_f="41.19").verdict is Verdict.ORIGIN


def test_one_line_alone_has_few_values_and_no_band() -> None:
    """w_f of 22.585 claimed: 41.2 or 41.19, 363.38 or 363.30; 362.9 is 41.15 x 8.82 of neither."""
    assert moment("363.4", w_D="22.585").verdict is Verdict.AGREES
    assert moment("362.9", w_D="22.585").verdict is not Verdict.AGREES


def test_never_more_than_a_hundredth_is_let_pass() -> None:
    """3.01 - 2.96 = 0.05, of lines that half a third digit each moves by 14 %: 0.0508 is not it."""
    givens = {"u": "2.004 kN", "v": "1.5045 kN", "r": "1.004 kN", "q": "1.9485 kN", "l": "1 m"}
    lines = {"V_1 = u + r": "kN", "V_2 = r + q": "kN", "V_r = V_1 - V_2": "kN"}
    record = sheet_of(lines, givens).close()  # 3.008 - 2.9525 = 0.0555

    def said(text: str) -> Verdict:
        return judged(record, {"beam/V_r": text})["beam/V_r"].verdict

    assert said("0.05551") is Verdict.AGREES
    assert said("0.0570") is not Verdict.AGREES


def test_a_slip_that_gives_it_too_is_asked_about() -> None:
    """V = 41.19125 x 4.2 + 0.3 = 173.303; 173.003 without P_x, as near as 0.26 and 0.21."""
    lines = dict(list(LINES.items())[:2]) | {"V_f = w_f*l/2 + P_x": "kN"}
    record = sheet_of(lines, {**GIVENS, "P_x": "0.3 kN"}).close()
    found = judged(record, {"beam/V_f": "173.003"}, find_slips)["beam/V_f"]
    assert found.verdict is Verdict.DOUBTFUL
    assert "rounded to three digits or more; the same value is" in found.note
    assert "w_f*l/2" in found.note
    assert judged(record, {"beam/V_f": "173.1"}, find_slips)["beam/V_f"].verdict is Verdict.AGREES


def test_honest_tables_rounded_line_by_line_hold_no_error() -> None:
    """Every fifteenth random beam, each line of it with three digits, four, or all: all agree."""
    said = judged_by_hand(range(0, BEAMS, 15), MIXED)
    assert len(said) > 800  # more than forty a beam: no empty count
    assert [each for each in not_agreeing(said) if each[2] == str(Verdict.ORIGIN)] == []


def test_a_line_that_rounding_moves_back_was_not_left_unchanged() -> None:
    """gamma 24: (6.4872 + 3.564) x 4.2 = 42.215; 23.9: 10.0242 x 4.2 = 42.10, 0.05 x 4.2 about it.

    With 20 it is 8.97 x 4.2 = 37.7, which no rounding brings to 42.2.
    """
    lines = {"w_sl = gamma*A": "kN/m", "w = w_sl + w_c": "kN/m", "V = w*l/2": "kN"}
    givens = {"gamma": "24 kN/m3", "A": "0.2703 m2", "w_c": "3.564 kN/m", "l": "8.4 m"}
    record = sheet_of(lines, givens).close()

    def said(gamma: str) -> Judged:
        found = judged(record, {"given/gamma": gamma, "beam/V": "42.2"}, find_slips)
        return found["beam/V"]

    assert said("23.9").verdict is Verdict.CARRIED
    assert said("23.9").causes == ("given/gamma",)
    assert said("20").verdict is Verdict.ORIGIN
    assert "not changed with gamma" in said("20").note
