"""Slips in lines that nobody claimed, beside a reading of the claim that is no error.

T = 0.85 x 1200 x 400 = 408 000 N in a web of 400 mm, f'c 30, alpha_1 0.805: a = 408 000/(0.805 x
0.65 x 30 x 400) = 64.979 mm, and with phi_c = 0.60 of A23.3-94 408 000/5796 = 70.393 mm.
"""

from __future__ import annotations

from collections.abc import Mapping

import pytest
from tests.audit.hand import GIVENS, judged

from lineproof.audit.data import Judged, Verdict
from lineproof.audit.slips.search import find_slips
from lineproof.record import Record
from lineproof.sheet import Sheet

OLD = "phi_c (1.6, resistance) = 0.6 (A23.3-94) in place of 0.65, in a ("


def sections(**depths: str) -> Record:
    """Return sections of the beam by hand, each in a part of its own, with a check of it."""
    sheet = Sheet("H1", "Sections by hand")
    with sheet.part("given", "Given"):
        for symbol in ("b", "f_c", "f_y", "phi_s", "alpha_1"):
            sheet.given(symbol, GIVENS[symbol])
        sheet.given("phi_c", "0.65", "resistance")
        sheet.given("A_s", "1200 mm2")
        sheet.given("M_f", "100 kN.m")
    for key, depth in depths.items():
        with sheet.part(key, f"Section {key}"):
            d = sheet.given("d", depth)
            a = sheet.line("a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)", unit="mm")
            sheet.line("k_a = a/b", unit="", a=a)
            made = sheet.line("M_r = phi_s*A_s*f_y*(d - a/2)", unit="kN.m", d=d, a=a)
            sheet.check("M_f <= M_r", key="strength", title="Moment resistance", M_r=made)
    return sheet.close()


def said(record: Record, claims: Mapping[str, str], entry_id: str) -> Judged:
    return judged(record, claims, find_slips)[entry_id]


# -- a table read by hand ------------------------------------------------------------------------

READ = {"north/M_r": "178"}
"""d 472: K_r = 408 000 x (472 - 32.489)/(400 x 472^2) = 2.0122, read 2.0: 178.2 kN.m; 179.3 is
right, and with phi_c = 0.60 it is 408 000 x (472 - 35.197) = 178.2 kN.m as well."""


def test_a_reading_of_a_table_stays_one_and_names_the_constant_of_another_edition() -> None:
    made = said(sections(north="472 mm"), READ, "north/M_r")
    assert made.verdict is Verdict.OTHER_METHOD
    reading, _, other = made.note.partition(", or with ")
    assert reading.startswith("follows with K_r read from a table as 2 (two digits)")
    assert other.startswith(OLD)


@pytest.mark.parametrize(
    ("south", "expected"),
    [
        ("207", Verdict.DOUBTFUL),  # 408 000 x (539 - 32.489) = 206.7, and no reading
        ("209", Verdict.OTHER_METHOD),  # K_r = 206.7e6/(400 x 539^2) = 1.778, read 1.8: 209.2
        ("230", Verdict.OTHER_METHOD),  # neither worked nor read
    ],
)
def test_who_worked_another_resistance_is_asked_whether_this_one_was_read(
    south: str, expected: Verdict
) -> None:
    record = sections(north="472 mm", south="539 mm")
    made = said(record, READ | {"south/M_r": south}, "north/M_r")
    assert made.verdict is expected
    if expected is Verdict.DOUBTFUL:
        assert f"the same value is reproduced exactly with {OLD}" in made.note


@pytest.mark.parametrize(
    ("south", "expected"), [("207", Verdict.DOUBTFUL), ("209", Verdict.OTHER_METHOD)]
)
def test_there_any_slip_counts_that_is_known_by_name(south: str, expected: Verdict) -> None:
    """d 468.4: without phi_s a is 480 000/6279 = 76.445, M_r 408 000 x (468.4 - 38.222) = 175.5.

    408 000 x (468.4 - 32.489) = 177.9 is right, K_r = 177.9e6/(400 x 468.4^2) = 2.027, read 2.0:
    175.5 kN.m as well.
    """
    record = sections(north="468.4 mm", south="539 mm")
    made = said(record, {"north/M_r": "175.5", "south/M_r": south}, "north/M_r")
    assert made.verdict is expected
    assert ("reproduced exactly with phi_s" in made.note) is (expected is Verdict.DOUBTFUL)


# -- a coarse number -----------------------------------------------------------------------------


def test_a_constant_of_another_edition_in_a_line_between_is_set_beside_a_coarse_number() -> None:
    """d 550: 408 000 x (550 - 32.489) = 211.1 kN.m, made 210; 408 000 x (550 - 35.197) = 210.0."""
    made = said(sections(north="550 mm"), {"north/M_r": "210"}, "north/M_r")
    assert made.verdict is Verdict.DOUBTFUL
    assert made.note.startswith("211.14 kN·m rounded down to a step of 10 kN·m: conservative")
    assert f"the same value is reproduced exactly with {OLD}" in made.note


def test_not_where_another_claim_shows_that_the_line_between_is_right() -> None:
    """k_a = 64.979/400 = 0.1624; with phi_c = 0.60 it were 0.1760."""
    claims = {"north/M_r": "210", "north/k_a": "0.162"}
    made = said(sections(north="550 mm"), claims, "north/M_r")
    assert made.verdict is Verdict.SAFE_ROUNDING


def test_nor_beside_a_last_digit_that_roundings_on_the_way_leave_open() -> None:
    """d 551.2: 408 000 x (551.2 - 32.489) = 211.6, cut to 211; by phi_c = 0.60 it were 210.5."""
    made = said(sections(north="551.2 mm"), {"north/M_r": "211"}, "north/M_r")
    assert made.verdict is Verdict.SAFE_ROUNDING
