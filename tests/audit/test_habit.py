"""What counts as its author's way of rounding, and what does not: slips that must not hide in it.

V_f = w_f l/2 = 40.3 x 6/2 = 120.9 kN; with the clear span 40.3 x 5.95/2 = 119.9 kN. A claim of 120
is the first rounded to 10 kN, and the second to its last digit: a habit, or a question.
"""

from __future__ import annotations

from collections.abc import Mapping

import pytest

from lineproof.audit.data import Judged, Verdict
from lineproof.audit.slips.search import find_slips
from lineproof.record import Record

from .hand import judged, sheet_of

WORDS = "other numbers of the table are rounded so too"
SPAN = {"w_f": "40.3 kN/m", "l": "6 m", "l_n": "5.95 m", "k_1": "1.1", "k_2": "1.5"}
SHEAR = {"V_f = w_f*l/2": "kN"}
POINTS = {"P_D": "239 kN", "P_L": "284 kN", "P_S": "171 kN"}


def forces(**points: str) -> Record:
    """Return V_f and 1.1 times each of some forces, R_A of P_A and so on."""
    lines = {f"R_{name} = k_1*P_{name}": "kN" for name in points}
    given = {f"P_{name}": f"{value} kN" for name, value in points.items()}
    return sheet_of(SHEAR | lines, SPAN | given).close()


def said(record: Record, **claims: str) -> Judged:
    """Return what is said of the first of some claims of the part ``beam``."""
    made = judged(record, {f"beam/{i}": text for i, text in claims.items()}, find_slips)
    return made[f"beam/{next(iter(claims))}"]


def is_habit(found: Judged) -> bool:
    return WORDS in found.note


def test_one_slip_in_three_quantities_is_no_habit() -> None:
    """The clear span in all of them: V_f 119.9, W_f 40.3 x 5.95 = 239.8, Q_f 1.5 x 239.8 = 359.7.

    With the span W_f is 241.8 and Q_f 362.7: 120, 240 and 360 are these to 10 kN as well. None of
    the three says that the other two are roundings.
    """
    record = sheet_of(SHEAR | {"W_f = w_f*l": "kN", "Q_f = k_2*w_f*l": "kN"}, SPAN).close()
    claims = {"beam/V_f": "120", "beam/W_f": "240", "beam/Q_f": "360"}
    made = judged(record, claims, find_slips)
    assert {made[i].verdict for i in claims} == {Verdict.DOUBTFUL}


def test_a_finer_number_tells_though_it_is_smaller() -> None:
    """262.9 and 312.4 as 260 and 310; 388.3 as 388, and 1.1 x 98.5 = 108.35 as 108, below 120.

    Two against two is no habit: who rounds 120.9 to 10 kN rounds 108.35 too.
    """
    record = forces(D="239", L="284", S="353", Q="98.5")
    tens = {"V_f": "120", "R_D": "260", "R_L": "310"}
    assert is_habit(said(record, **tens, R_S="388"))
    assert said(record, **tens, R_S="388", R_Q="108").verdict is Verdict.DOUBTFUL


def test_who_rounds_to_fives_does_not_round_to_tens() -> None:
    """1.1 x 148.5 = 163.35 is 165 to the nearest five, and 160 to the nearest ten.

    262.9 as 265, 312.4 as 310 and 388.3 as 390: all are fives, two of them tens by chance.
    """
    record = forces(Q="148.5", D="239", L="284", S="353")
    others = {"R_D": "265", "R_L": "310", "R_S": "390"}
    assert is_habit(said(record, R_Q="165", **others))
    assert not is_habit(said(record, R_Q="160", **others))
    assert is_habit(said(record, R_Q="160", R_D="260", R_L="310", R_S="390"))


@pytest.mark.parametrize("built", [{"l_d": "1020", "l_dh": "320"}, {"l_d": "1015", "l_dh": "315"}])
def test_lengths_that_are_built_round_say_nothing_of_a_depth(built: Mapping[str, str]) -> None:
    """d = 600 - 40 - 11.3 - 9.75 = 538.95; with 10 mm for the stirrup 540.25: 540 is both.

    Bars of 1017.5 and 317.9 mm are made 1020 and 320 by everybody. As 1015 and 315 they are in
    fives, as only he writes them who writes all lengths so: 1017.4 and 317.4 mm.
    """
    exact = {"1020": ("925 mm", "289 mm"), "1015": ("924.9 mm", "288.5 mm")}[built["l_d"]]
    lines = {
        "d = h - c_c - d_bs - d_b/2": "mm",
        "l_d = k_1*x_1": "mm",
        "l_dh = k_1*x_2": "mm",
    }
    givens = {
        "h": "600 mm", "c_c": "40 mm", "d_bs": "11.3 mm", "d_b": "19.5 mm", "k_1": "1.1",
        "x_1": exact[0], "x_2": exact[1],
    }  # fmt: skip
    found = said(sheet_of(lines, givens).close(), d="540", **built)
    assert (found.verdict is Verdict.DOUBTFUL) == (built["l_d"] == "1020")


def test_sizes_say_nothing_of_forces() -> None:
    """d_v 0.9 x 538.95 = 485.06 as 490 and s_z 1.1 x 388 = 426.8 as 430 beside V_f 120.9 as 120.

    Forces as coarse do: 1.1 x 239 = 262.9 as 260 in kN, and 1.1 x 284 as 310 in kN.m.
    """
    lines = SHEAR | {"d_v = k_3*d": "mm", "s_z = k_1*s": "mm", "M_D = k_1*M_1": "kN.m"}
    lines |= {"M_L = k_1*M_2": "kN.m"}
    givens = {"k_3": "0.9", "d": "538.95 mm", "s": "388 mm", "M_1": "239 kN.m", "M_2": "284 kN.m"}
    record = sheet_of(lines, SPAN | givens).close()
    assert said(record, V_f="120", d_v="490", s_z="430").verdict is Verdict.DOUBTFUL
    assert is_habit(said(record, V_f="120", M_D="260", M_L="310"))


def test_two_digits_of_a_number_below_a_hundred_are_not_those_of_a_hundred() -> None:
    """1.1 x 89.3 = 98.23 has two digits as 98: 100 is none of them beside 260 and 310.

    Nor is it a ten beside 1.1 x 80.3 = 88.33 and 1.1 x 70.2 = 77.22 written to the tenth.
    """
    record = forces(C="89.3", D="239", L="284", A="80.3", B="70.2")
    tens = {"R_D": "260", "R_L": "310"}
    assert not is_habit(said(record, R_C="100", **tens, R_A="88.3", R_B="77.2"))
    assert is_habit(said(record, R_C="100", **tens))  # a ten of kilonewtons, as the others


def test_what_is_written_finely_in_its_own_part_is_asked_about() -> None:
    """Loads in tens, 260 and 310; beside V_f stands 1.1 x 171 = 188.1 as 188, or as 190."""
    sheet = sheet_of({"R_D = k_1*P_D": "kN", "R_L = k_1*P_L": "kN"}, SPAN | POINTS)
    with sheet.part("shear", "Span 1: shear"):
        sheet.line("V_f = w_f*l/2", unit="kN")
        sheet.line("V_s = k_1*P_S", unit="kN")
    record = sheet.close()
    claims = {"shear/V_f": "120", "beam/R_D": "260", "beam/R_L": "310"}

    def verdict(other: str) -> Verdict:
        return judged(record, claims | {"shear/V_s": other}, find_slips)["shear/V_f"].verdict

    assert (verdict("188"), verdict("190")) == (Verdict.DOUBTFUL, Verdict.SAFE_ROUNDING)


def test_what_hardly_moves_a_number_is_no_sign_of_a_step() -> None:
    """1.1 x 236.9 = 260.59 and 1.1 x 281.2 = 309.3 to 10 kN are 260 and 310, and so to the unit.

    260 is 0.59 of a kilonewton off and 310 is 0.7: these tell of cutting or of fives, not of tens.
    """
    record = forces(Q="148.5", D="236.9", L="281.2")
    assert not is_habit(said(record, R_Q="160", R_D="260", R_L="310"))


def test_a_number_tells_though_it_follows_from_a_coarse_one() -> None:
    """262.9 as 260, and 3.005 x 260 = 781.3 as 780: it follows from 259.6, and yet is a ten."""
    lines = SHEAR | {"R_D = k_1*P_D": "kN", "W_f = k_3*R_D": "kN"}
    record = sheet_of(lines, SPAN | {"P_D": "239 kN", "k_3": "3.005"}).close()
    assert said(record, V_f="120", R_D="260").verdict is Verdict.DOUBTFUL
    assert is_habit(said(record, V_f="120", R_D="260", W_f="780"))
    assert not is_habit(said(record, V_f="120", R_D="260", W_f="781"))


def test_order_of_the_table_does_not_matter() -> None:
    record = forces(D="239", L="284", S="353")
    claims = {"beam/V_f": "120", "beam/R_D": "260", "beam/R_L": "310", "beam/R_S": "388"}
    forwards = judged(record, claims, find_slips)
    backwards = judged(record, dict(reversed(claims.items())), find_slips)
    assert {i: (j.verdict, j.note) for i, j in forwards.items()} == {
        i: (j.verdict, j.note) for i, j in backwards.items()
    }


def test_a_habit_is_that_of_a_unit() -> None:
    """262.9 and 312.4 kN as 260 and 310 are tens of kN; 0.263 and 0.312 MN are what they are."""
    record = forces(D="239", L="284")
    assert is_habit(said(record, V_f="120", R_D="260", R_L="310"))
    assert not is_habit(said(record, V_f="120", R_D="0.263 MN", R_L="0.312 MN"))


def test_a_spreadsheet_rounds_what_it_shows_and_works_with_all_digits() -> None:
    """1.1 x 84.75 = 93.225 is shown as 93, and 18.81 x 93.225 = 1753.6 mm2 as 1800.

    From 93 it would be 1749.3, nearer to 1700. 262.9 and 382.8 mm2 stand as 260 and 380.
    """
    lines = {
        "a = k_1*c": "mm",
        "A_s = k_2*a": "mm2",
        "A_v = k_1*A_t": "mm2",
        "A_g = k_1*A_b": "mm2",
    }
    givens = {"k_1": "1.1", "c": "84.75 mm", "k_2": "18.81 mm", "A_t": "239 mm2", "A_b": "348 mm2"}
    found = said(sheet_of(lines, givens).close(), A_s="1800", a="93", A_v="260", A_g="380")
    assert found.verdict is Verdict.SAFE_ROUNDING
    assert is_habit(found)
