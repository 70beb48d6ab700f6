"""The slip finder: where it looks, in which order it tells, when it says nothing."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence

import pytest
from tests.audit import hand
from tests.audit.slip_sheet import beam, claim_of, slips, typed
from tests.beams.continuous.flow import analysed, record_so_far

from lineproof.audit.data import Interval
from lineproof.audit.graph import Graph
from lineproof.audit.slips.digits import changed, swapped
from lineproof.audit.slips.rank import MOST
from lineproof.audit.slips.search import find_slips, none_fits, searching
from lineproof.formula import formula
from lineproof.sheet import Sheet

T = 0.85 * 2000 * 400
BLOCK = 0.805 * 0.65 * 30
A = T / (BLOCK * 1500)
D = 600 - 40 - 11.3 - 25.2 / 2
EVERYTHING = frozenset(beam().stored)


def test_a_slip_in_an_unclaimed_line_is_carried_on_to_the_claim() -> None:
    # The web in place of the flange in the block, which nobody claimed: 123.8 mm for 28.9.
    wrong = T / (BLOCK * 350)

    found = slips("sag-1/M_r", T * (D - wrong / 2) / 1e6, claimed={"sag-1/d", "sag-1/A_s"})

    assert found[0].kind == "other quantity"
    assert "b_w (1.4, given b_w) = 350 mm in place of b_f" in found[0].sentence
    assert "in a (" in found[0].sentence


def test_a_claimed_line_stops_the_search_above_it() -> None:
    wrong = T / (BLOCK * 350)
    claimed = EVERYTHING

    found = slips("sag-1/M_r", T * (D - wrong / 2) / 1e6, claimed=claimed)

    assert all("in a (" not in slip.sentence for slip in found)


def test_a_looked_up_value_wrong_wherever_it_is_used() -> None:
    # phi_s = 0.9 in the block and in the resistance alike.
    tension = 0.9 * 2000 * 400
    wrong = tension * (D - tension / (BLOCK * 1500) / 2) / 1e6

    found = slips("sag-1/M_r", wrong, claimed={"sag-1/d", "sag-1/A_s"})

    said = "phi_s (1.12, given phi_s) = 0.9 (member factor of ACI 318M) in place of 0.85"
    assert said in found[0].sentence
    assert "wherever it is used" in found[0].sentence


def test_values_that_the_claim_uses_count_and_not_those_recorded() -> None:
    # The claimed d is 530; h in place of d is told beside it, from the claimed a of 30.
    used = {"sag-1/a": Interval(29.5, 30.5), "sag-1/d": Interval(529.5, 530.5)}

    found = slips("sag-1/M_r", T * (600 - 30 / 2) / 1e6, used=used)

    assert "h (1.3, given h) = 600 mm in place of d (4.5, line of d) = 530.0" in (found[0].sentence)


def test_a_claimed_value_is_not_taken_as_what_follows() -> None:
    # The table of values used holds the claim itself for a claimed line.
    wrong = T * (600 - A / 2) / 1e6
    used = {"sag-1/M_r": Interval(wrong * 1e6, wrong * 1e6)}

    assert slips("sag-1/M_r", wrong, used=used) == slips("sag-1/M_r", wrong)


def test_rounding_of_the_arguments_is_allowed_for() -> None:
    # With a = 29 for 28.88 and d printed as 536 the claim is off by more than its own digits.
    used = {"sag-1/a": Interval(28.5, 29.5), "sag-1/d": Interval(535.5, 536.5)}
    wrong = 2000 * 400 * (536.45 - 29 / 2) / 1e6  # phi_s left out, d nearer 536.4 in truth

    found = slips("sag-1/M_r", wrong, digits=5, used=used)

    assert found[0].kind == "factor left out"
    assert "within the digits of its arguments" in found[0].sentence
    assert not slips("sag-1/M_r", wrong, digits=5)


def test_a_digit_is_misread_in_the_argument_as_it_was_claimed() -> None:
    # d is claimed as 518 where 536.1 is right; 581 was read from it.
    used = {"sag-1/d": Interval(517.5, 518.5)}

    found = slips("sag-1/M_r", T * (581 - A / 2) / 1e6, used=used, texts={"sag-1/d": "518"})

    assert found[0].kind == "transposed digits"
    assert "typed as 581 in place of 518" in found[0].sentence


def test_an_angle_taken_in_radians_is_met_over_the_digits_it_is_claimed_with() -> None:
    # theta claimed 36.0 stands for 35.95 to 36.05: cot of so many radians is 0.179 to 0.078.
    used = {"given/theta": Interval(35.95, 36.05)}
    wrong = 0.85 * 200 * 400 * 480 / math.tan(36.04) / 250 / 1e3

    found = slips("shear-1-left/V_s", wrong, used=used, digits=3)

    assert found[0].kind == "degrees for radians"


def test_a_common_slip_is_told_before_a_far_fetched_one() -> None:
    # 536.1 + 11.3 = 547.4: the stirrup left out; a claim of three digits, 547, is met by more.
    found = slips("sag-1/d", D + 11.3, digits=3)

    assert found[0].kind == "term left out"
    assert [slip.likely for slip in found] == sorted((s.likely for s in found), reverse=True)


def test_a_miscopied_result_is_told_after_what_explains_it_better() -> None:
    # h for d gives 398.2 kN.m; 354.7 as 394.7 would need another claim: 354.70 + 40 = 394.70.
    by_h = slips("sag-1/M_r", T * (600 - A / 2) / 1e6)
    by_pen = slips("sag-1/M_r", T * (D - A / 2) / 1e6 + 40)

    assert by_h[0].kind == "other quantity"
    assert "mistyped digit" in {slip.kind for slip in by_pen}


def test_the_same_value_found_twice_is_told_once() -> None:
    # n_v left out, one leg, A_t in place of A_v: all of them 100 mm2.
    found = slips("shear-1-left/A_v", 100.0)

    assert len({slip.value for slip in found}) == len(found)
    assert found[0].kind == "stirrup legs"
    assert "factor left out" in found[0].also


@pytest.mark.parametrize("value", [1.234567e9, 0.7231])
def test_no_slip_fits(value: float) -> None:
    assert slips("sag-1/M_r", value) == ()
    assert none_fits(beam(), "sag-1/M_r") == (
        "No single slip reproduces the value claimed for M_r (4.8, line of M_r)."
    )


@pytest.mark.parametrize("entry_id", sorted(EVERYTHING))
@pytest.mark.parametrize("factor", [-1.0, 0.5, 1.21])
def test_never_more_than_a_checker_reads(entry_id: str, factor: float) -> None:
    graph = beam()
    claim = claim_of(graph, entry_id, graph[entry_id].entry["value"] * factor, 2)

    found = find_slips(graph, entry_id, {}, claim)

    assert len(found) <= MOST
    assert all(math.isfinite(slip.value) and slip.likely > 0 for slip in found)


def test_a_table_searched_as_a_whole_says_the_same_as_line_by_line() -> None:
    graph = beam()
    used: dict[str, Interval] = {}
    claimed = {"sag-1/d": "540"}
    find = searching()
    for entry_id in ("sag-1/M_r", "sag-1/a", "shear-1-left/V_s", "loads/w_f"):
        claim = claim_of(graph, entry_id, graph[entry_id].entry["value"] / 2)

        assert find(graph, entry_id, used, claim, claimed) == find_slips(
            graph, entry_id, used, claim, claimed
        )


def hostile() -> Graph:
    """Return lines whose edits divide by zero, take roots of negatives and leave the range."""
    sheet = Sheet("S2", "Hostile numbers")
    with sheet.part("given", "Given"):
        for symbol, value in (("a", "2 mm"), ("b", "2 mm"), ("c", "0 mm"), ("p", "1e12 mm")):
            sheet.given(symbol, value)
    with sheet.part("lines", "Lines"):
        sheet.line("q = p*(p/a)**15", unit="mm")  # 3e187
        sheet.line("r = a*(a/p)**15", unit="mm")  # 7e-176
        sheet.line("d = sqrt(a*b - c**2)", unit="mm")
        sheet.line("e_1 = a*b/(a + c)", unit="mm")
        sheet.line("f_1 = p**3/(p*p)*(a/(b + c))**0.5", unit="mm")
        sheet.line("g_1 = cbrt(a*b*(a + c)) + min(a, b, c)", unit="mm")
        sheet.line("i_1 = q*r/a + r*a/q + sqrt(q*r) + cbrt(q*r*b)", unit="mm")
    return Graph(sheet.close())


@pytest.mark.parametrize("symbol", ["q", "r", "d", "e_1", "f_1", "g_1", "i_1"])
@pytest.mark.parametrize("value", [-3.0, 0.0, 1e-9, 4.0, 1e200])
def test_hostile_numbers_are_passed_over(symbol: str, value: float) -> None:
    graph = hostile()

    claimed = dict.fromkeys(graph.stored, "")
    found = find_slips(
        graph, f"lines/{symbol}", {}, claim_of(graph, f"lines/{symbol}", value), claimed
    )

    assert all(math.isfinite(slip.value) for slip in found)


def test_a_line_that_has_no_value_from_what_is_used_has_no_slips() -> None:
    graph = hostile()
    used = {"given/a": Interval(-2, -2)}  # a root of -4

    assert find_slips(graph, "lines/d", used, claim_of(graph, "lines/d", 3.0)) == ()


def test_claims_that_are_no_plain_number_are_searched_all_the_same() -> None:
    claim = typed("sag-1/a", "1e2", "mm")

    assert all(
        slip.sentence
        for slip in find_slips(beam(), "sag-1/a", {}, claim, dict.fromkeys(EVERYTHING, ""))
    )


def test_a_given_mistyped_and_a_constant_of_another_edition() -> None:
    assert slips("given/b_w", 530.0)[0].kind == "transposed digits"
    assert slips("given/phi_c", 0.6)[0].kind == "constant of another edition or standard"


def test_a_support_moment_found_by_analysis() -> None:
    """Three spans of 7.6, 9.2 and 7.6 m: w l^2/8 on the middle one is no analysis."""
    graph = Graph(record_so_far(analysed()))
    load = graph.stored["loads/w_D2"]
    claim = claim_of(graph, "analysis/M_2D", -load * 9200**2 / 8 / 1e6)

    found = find_slips(graph, "analysis/M_2D", {}, claim, dict.fromkeys(graph.stored, ""))

    assert found[0].kind == "simple span for continuous"
    assert "l_2**2/8" in found[0].sentence


def test_one_load_of_the_analysis_too_large_is_seen_in_a_reaction() -> None:
    """Support moments are proportional to loads: the dead load of all spans by 1.25."""
    graph = Graph(record_so_far(analysed()))
    right = graph.stored["analysis/R_1D"] / 1e3
    claimed = {"analysis/R_1D": ""}

    found = find_slips(
        graph, "analysis/R_1D", {}, claim_of(graph, "analysis/R_1D", 1.25 * right), claimed
    )

    assert found[0].kind == "load factor"


def test_digits_of_the_pen() -> None:
    assert list(swapped("7.6")) == ["6.7"]
    assert list(swapped("0.00085")) == ["0.00058"]
    assert list(swapped("024")) == ["204", "042"]
    assert len(list(changed("350"))) == 27
    assert len(list(changed("12300"))) == 27  # the zeros hold the place
    assert "8.6" in set(changed("7.6"))


def _said(
    givens: Mapping[str, str], lines: Sequence[str], units: Mapping[str, str], text: str
) -> list[str]:
    """Return what is said of a number typed for the last of some lines, the likeliest first."""
    sheet = Sheet("H5", "Lines")
    with sheet.part("given", "Given"):
        for symbol, value in givens.items():
            sheet.given(symbol, value)
    with sheet.part("hog-2-left", "Support 2, left face"):
        for line in lines:
            made = formula(line, unit=units[line.partition(" ")[0]], system="kN-m", title="own")
            sheet.line(made)
    graph = Graph(sheet.close())
    asked = f"hog-2-left/{lines[-1].partition(' ')[0]}"
    claimed = {i: "" for i in graph.nodes if i.startswith("given/")}
    found = find_slips(graph, asked, {}, hand.typed(graph, asked, text), claimed)
    return [slip.sentence for slip in found]


def test_the_moment_of_a_simple_span_for_that_at_a_support() -> None:
    """w_f = 1.25 x 20 = 25: 25 x 7^2/8 = 153.1; right is 1.25 x 20 x 7^2/10 = 122.5.

    The moment rests on the dead load alone; the factored load stands beside it.
    """
    said = _said(
        {"w_D": "20 kN/m", "l_1": "7 m"},
        ["w_f = 1.25*w_D", "M_2D = -w_D*l_1**2/10", "M_sn = 1.25*M_2D"],
        {"w_f": "kN/m", "M_2D": "kN.m", "M_sn": "kN.m"},
        "-153.1",
    )
    assert "w_f*l_1**2/8 (simple span)" in said[0]


def test_a_term_that_units_make_nothing_is_told_as_left_out() -> None:
    """12.25 x 6.55/2 = 40.12 without x_n: kN less mm is no bracket that somebody forgot."""
    said = _said(
        {"t_f": "12.25 kN.m/m", "l_n": "6.55 m", "x_n": "494 mm"},
        ["T_f = t_f*(l_n/2 - x_n)"],
        {"T_f": "kN.m"},
        "40.12",
    )
    assert "the term x_n" in said[0]
    assert not any("brackets" in sentence for sentence in said)


def test_a_term_divided_to_nothing_is_told_as_left_out() -> None:
    """1.25 x 178 + 1.5 x 34.9 = 274.9; 1.5/34.9 kN is next to nothing, and nobody does that."""
    said = _said(
        {"R_D": "178 kN", "R_L1": "34.9 kN", "R_L2": "30.2 kN"},
        ["R_f = 1.25*R_D + 1.5*R_L1 + 1.5*R_L2"],
        {"R_f": "kN"},
        "274.9",
    )
    assert any("the term 1.5*R_L2 left out" in sentence for sentence in said)
    assert not any("fraction bar" in sentence for sentence in said)


def test_the_result_of_another_place_is_not_the_argument_of_this_one() -> None:
    """b_f = 400 + 2 x 583 = 1566, the overhang twice; so is 983 + 583 with b_f of span 2."""
    sheet = Sheet("H6", "L sections")
    with sheet.part("given", "Given"):
        sheet.given("b_w", "400 mm")
        sheet.given("b_o", "583 mm")
    for span in (1, 2):
        with sheet.part(f"span-{span}", f"Span {span}"):
            sheet.line("b_f = b_w + b_o", unit="mm")
    graph = Graph(sheet.close())
    claim = hand.typed(graph, "span-1/b_f", "1566")
    found = find_slips(graph, "span-1/b_f", {}, claim, dict.fromkeys(graph.nodes, ""))
    assert "the term b_o (1.2) counted twice" in found[0].sentence.partition(". The")[0]


def test_nobody_writes_a_zero_in_front() -> None:
    """A_s = 4 x 200 = 800, claimed as 1800: not 0800 with its first digit mistyped."""
    said = _said({"n_b": "4", "A_b": "200 mm2"}, ["A_s = n_b*A_b"], {"A_s": "mm2"}, "1800")
    assert said
    assert not any("0800" in sentence for sentence in said)
