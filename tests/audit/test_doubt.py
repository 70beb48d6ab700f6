"""Claims with two readings: told as doubtful with both; a reading alone, or a slip alone, is not.

w_f l/2 = 40.3 x 6/2 = 120.9 kN; with the clear span 40.3 x 5.95/2 = 119.9 kN. A claim of 120 is the
first with its last digit cut off, and the second to its last digit.
"""

from __future__ import annotations

from collections.abc import Mapping

import pytest
from tests.audit import hand
from tests.audit.hand import beam, judged, sheet_of, typed
from tests.beams.continuous import flow

from lineproof.audit.audit import audit_claims
from lineproof.audit.claims.sought import SlipFinder
from lineproof.audit.data import Audit, Severity, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.report import report_record
from lineproof.audit.slips.search import find_slips
from lineproof.cli.audit_output import as_data, as_text
from lineproof.record import Record
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import materials

CLEAR = {"w_f": "40.3 kN/m", "l": "6 m", "l_n": "5.95 m", "V_r": "121 kN"}


def shear(**changed: str) -> Record:
    """Return a shear of a simple span, a double of it, and the check of the shear."""
    sheet = sheet_of({"V_f = w_f*l/2": "kN", "R_f = 2*V_f": "kN"}, CLEAR | changed)
    with sheet.part("checks", "Span 1: checks"):
        sheet.check("V_f <= V_r", key="shear", title="Shear resistance")
    return sheet.close()


def said_of(
    record: Record, claims: Mapping[str, str], line: str, find: SlipFinder | None = find_slips
) -> tuple[Verdict, str]:
    made = judged(record, claims, find)[line]
    return made.verdict, made.note


def audited(record: Record, claims: Mapping[str, str]) -> Audit:
    graph = Graph(record)
    return audit_claims(record, [typed(graph, i, t) for i, t in claims.items()], graph)


def test_a_rounding_that_a_likely_slip_gives_as_well_is_doubtful() -> None:
    verdict, note = said_of(shear(), {"beam/V_f": "120"}, "beam/V_f")
    assert verdict is Verdict.DOUBTFUL
    rounding, _, slip = note.partition("; the same value is ")
    assert rounding == "120.90 kN rounded down to a step of 1 kN: not conservative"
    assert slip.startswith("reproduced exactly with l_n (")


def test_the_same_rounding_is_one_where_no_slip_gives_it() -> None:
    """With a clear span of 5.4 m the shear is 108.8 kN, far from 120."""
    said = said_of(shear(l_n="5.4 m"), {"beam/V_f": "120"}, "beam/V_f")
    assert said[0] is Verdict.UNSAFE_ROUNDING
    assert said_of(shear(), {"beam/V_f": "120"}, "beam/V_f", None)[0] is Verdict.UNSAFE_ROUNDING


@pytest.mark.parametrize(
    ("spans", "expected"), [(1, Verdict.UNSAFE_ROUNDING), (2, Verdict.DOUBTFUL)]
)
def test_beside_a_rounding_to_the_unsafe_side_another_place_is_asked_about(
    spans: int, expected: Verdict
) -> None:
    """Span 2: 40.3 x 5.945/2 = 119.8 kN, which is 120 to three digits as well."""
    sheet = sheet_of({"V_f = w_f*l/2": "kN"}, CLEAR | {"l_n": "5.4 m", "l_2": "5.945 m"})
    if spans > 1:
        with sheet.part("next", "Span 2: by hand"):
            sheet.line("V_f = w_f*l_2/2", unit="kN")
    with sheet.part("checks", "Span 1: checks"):
        shear = sheet.entry("beam/V_f")
        sheet.check("V_f <= V_r", key="shear", title="Shear resistance", V_f=shear)
    verdict, note = said_of(sheet.close(), {"beam/V_f": "120"}, "beam/V_f")
    assert verdict is expected
    assert note.startswith("120.90 kN rounded down to a step of 1 kN: not conservative")
    assert (" = 119.8 kN written in this row" in note) is (spans > 1)


@pytest.mark.parametrize(
    ("clear", "expected"), [("5.4 m", Verdict.UNSAFE_ROUNDING), ("5.702 m", Verdict.DOUBTFUL)]
)
def test_a_rounding_of_other_values_than_claimed_is_doubted_for_a_slip_with_these(
    clear: str, expected: Verdict
) -> None:
    """w_f = 20.3 + 20 = 40.3 kN/m gives 120.9 kN, which 120 may round; but 42.3 is claimed.

    With that and l_n for l it is 42.25 x 5.702/2 = 120.46 to 42.35 x 5.702/2 = 120.74, so that 120
    follows within the digits of 42.3; with 5.4 m it is 114 kN.
    """
    made = {"w_f = w_D + w_L": "kN/m", "V_f = w_f*l/2": "kN"}
    given = {"w_D": "20.3 kN/m", "w_L": "20 kN/m", "l": "6 m", "l_n": clear, "V_r": "121 kN"}
    sheet = sheet_of(made, given)
    with sheet.part("checks", "Span 1: checks"):
        sheet.check("V_f <= V_r", key="shear", title="Shear resistance")
    verdict, note = said_of(sheet.close(), {"beam/w_f": "42.3", "beam/V_f": "120"}, "beam/V_f")
    assert verdict is expected
    assert note.startswith("120.90 kN rounded down to a step of 1 kN: not conservative")
    told = "the same value is reproduced within the digits of its arguments with l_n ("
    assert (told in note) is (expected is Verdict.DOUBTFUL)


@pytest.mark.parametrize(
    ("clear", "expected"), [("5.4 m", Verdict.SAFE_ROUNDING), ("5.64 m", Verdict.DOUBTFUL)]
)
def test_nor_is_one_to_the_safe_side_taken_for_granted(clear: str, expected: Verdict) -> None:
    """w_f = 22.4 + 20 = 42.4 kN/m gives 127.2 kN, which 130 may round up; but 46.3 is claimed.

    With that and l_n for l it is 46.25 x 5.64/2 = 130.43 to 46.35 x 5.64/2 = 130.71, so that 130
    follows within the digits of 46.3; with 5.4 m it is 125 kN.
    """
    made = {"w_f = w_D + w_L": "kN/m", "V_f = w_f*l/2": "kN"}
    given = {"w_D": "22.4 kN/m", "w_L": "20 kN/m", "l": "6 m", "l_n": clear, "V_r": "140 kN"}
    sheet = sheet_of(made, given)
    with sheet.part("checks", "Span 1: checks"):
        sheet.check("V_f <= V_r", key="shear", title="Shear resistance")
    verdict, note = said_of(sheet.close(), {"beam/w_f": "46.3", "beam/V_f": "130"}, "beam/V_f")
    assert verdict is expected
    assert note.startswith("127.20 kN rounded up to a step of 10 kN: conservative")


def test_a_slip_that_is_no_rounding_stays_an_origin() -> None:
    assert said_of(shear(), {"beam/V_f": "119.9"}, "beam/V_f")[0] is Verdict.ORIGIN


def test_what_rests_on_a_doubtful_line_agrees_and_names_it() -> None:
    """2 x 120 = 240; with the right shear it is 241.8."""
    claims = {"beam/V_f": "120", "beam/R_f": "240.0"}
    made = judged(shear(), claims, find_slips)["beam/R_f"]
    assert (made.verdict, made.causes) == (Verdict.AGREES, ("beam/V_f",))
    (finding,) = audited(shear(), claims).findings
    assert finding.ids == ("beam/V_f", "beam/R_f")
    assert finding.what.endswith("1 claimed line rests on it")
    assert finding.advice.startswith("Doubtful, not proved an error: ask which")


@pytest.mark.parametrize(
    ("resistance", "severity"),
    [
        ("121 kN", Severity.MINOR),  # 120/121 = 0.99 hides 120.9/121 = 1.00
        ("120.5 kN", Severity.MAJOR),  # 120 holds, 120.9 does not: to be settled, yet not proved
    ],
)
def test_a_doubtful_line_is_never_critical(resistance: str, severity: Severity) -> None:
    (finding,) = audited(shear(V_r=resistance), {"beam/V_f": "120"}).findings
    assert finding.severity is severity


def test_doubtful_lines_are_counted_apart_from_origins() -> None:
    """R_f 250 is an origin: 240 follows from 120. Both print; the report names the slip once."""
    record = shear()
    audit = audited(record, {"beam/V_f": "120", "beam/R_f": "250.5"})
    graph = Graph(record)
    text = as_text(audit, graph)
    assert "1 is the origin of an error, 1 is doubtful" in text[1]
    assert as_data(audit, graph)["counts"]["doubtful"] == 1
    parts = {part["key"]: part for part in report_record(audit, record).parts}
    counts = next(e for e in parts["compared"]["entries"] if e["id"] == "compared/verdicts")
    assert ["doubtful", "1"] in counts["rows"]
    notes = [e["text"] for p in parts.values() for e in p["entries"] if e["kind"] == "note"]
    assert sum("l_n (" in text for text in notes) == 1


# -- how the author rounds ----------------------------------------------------------------------

FORCES = {
    "V_f = w_f*l/2": "kN",
    "R_D = k_1*P_D": "kN",
    "R_L = k_1*P_L": "kN",
    "R_S = k_1*P_S": "kN",
}
POINTS = CLEAR | {"k_1": "1.1", "P_D": "239 kN", "P_L": "284 kN", "P_S": "353 kN"}
"""V_f = 120.9, R_D = 1.1 x 239 = 262.9, R_L = 1.1 x 284 = 312.4, R_S = 1.1 x 353 = 388.3."""


def forces_said(**claims: str) -> tuple[Verdict, str]:
    record = sheet_of(FORCES, POINTS).close()
    return said_of(record, {f"beam/{s}": text for s, text in claims.items()}, "beam/V_f")


@pytest.mark.parametrize(
    "others",
    [
        {"R_D": "260", "R_L": "310"},
        {"R_D": "260", "R_L": "310", "R_S": "388"},  # one is finer, two are as coarse
    ],
)
def test_a_rounding_among_others_like_it_is_the_habit_of_its_author(
    others: dict[str, str],
) -> None:
    """Whoever writes 262.9 as 260 and 312.4 as 310 writes 120.9 as 120, whatever l_n gives."""
    verdict, note = forces_said(V_f="120", **others)
    assert verdict is Verdict.SAFE_ROUNDING
    assert note == (
        "120.90 kN rounded down to a step of 10 kN: no check is moved by it; other numbers of the "
        "table are rounded so too"
    )


@pytest.mark.parametrize(
    "others",
    [
        {},
        {"R_D": "260"},  # one alone may be a chance
        {"R_S": "388"},
        {"R_D": "260", "R_L": "312", "R_S": "388"},  # two are finer, one is as coarse
        {"R_D": "263"},
        {"R_D": "220"},  # 42.9 off is no rounding
    ],
)
def test_a_coarse_number_among_finer_ones_stays_doubtful(others: dict[str, str]) -> None:
    assert forces_said(V_f="120", **others)[0] is Verdict.DOUBTFUL


def test_the_same_slip_at_every_place_is_no_habit() -> None:
    """V_f of two places, with the same clear span for the span: both stay doubtful."""
    record = sheet_of({"V_f = w_f*l/2": "kN", "V_f_2 = w_f*l/2": "kN"}, CLEAR).close()
    both = {"beam/V_f": "120", "beam/V_f_2": "120"}
    made = judged(record, both, find_slips)
    assert {made[i].verdict for i in both} == {Verdict.DOUBTFUL}


def test_two_digits_move_a_number_by_up_to_a_twentieth_where_all_have_two() -> None:
    """1.1 x 104.5 = 114.95 is 110 for who writes 262.9 as 260; alone nobody rounds so far."""
    record = sheet_of(FORCES, POINTS | {"P_L": "104.5 kN"}).close()
    alone = said_of(record, {"beam/R_L": "110"}, "beam/R_L")[0]
    beside = said_of(record, {"beam/R_L": "110", "beam/R_D": "260"}, "beam/R_L")[0]
    assert (alone, beside) == (Verdict.ORIGIN, Verdict.SAFE_ROUNDING)


def test_cutting_digits_off_is_a_habit_until_a_number_is_rounded_up() -> None:
    """120.9 cut to 120: 262.9 cut to 262 and 284.7 to 284 go with it, 354 for 353.8 does not.

    Nor does 360 for 357.8, though it follows within no digits. One up beside two cut is a chance,
    two are as many.
    """
    points = {"k_1": "1.0", "P_D": "262.9 kN", "P_L": "284.7 kN", "P_S": "353.8 kN"}
    lines = FORCES | {"R_Q = k_1*P_Q": "kN"}
    record = sheet_of(lines, POINTS | points | {"P_Q": "357.8 kN"}).close()
    cut = {"beam/V_f": "120", "beam/R_D": "262", "beam/R_L": "284"}
    up = {"beam/R_S": "354", "beam/R_Q": "360"}
    assert said_of(record, cut, "beam/V_f")[0] is Verdict.SAFE_ROUNDING
    assert said_of(record, cut | {"beam/R_S": "354"}, "beam/V_f")[0] is Verdict.SAFE_ROUNDING
    assert said_of(record, cut | up, "beam/V_f")[0] is Verdict.DOUBTFUL


def test_forces_are_rounded_to_fives_only_by_habit() -> None:
    """120.9 is 120 and 312.4 is 310 to the nearest five; 262.9 is 265 for who rounds so."""
    record = sheet_of(FORCES, POINTS).close()
    alone = said_of(record, {"beam/R_D": "265"}, "beam/R_D")[0]
    fives = {"beam/R_D": "265", "beam/R_S": "390", "beam/R_L": "310"}
    assert (alone, said_of(record, fives, "beam/R_D")[0]) == (
        Verdict.ORIGIN,
        Verdict.SAFE_ROUNDING,
    )


def test_an_exponent_is_no_load_factor() -> None:
    """E_c = (3300 sqrt(40) + 6900) (2400/2300)^1.5 = 27 771 x 1.06592 = 29 602.

    With 1.6 for the 1.5 it is 29 728: 29 700 is that, and no load factor stands there.
    """
    sheet = sheet_of({}, {"f_c": "40 MPa", "gamma_c": "2400 kg/m3"})
    with sheet.part("materials", "Materials"):
        sheet.line(materials.E_C_GENERAL)
    made = judged(sheet.close(), {"materials/E_c": "29728"}, find_slips)["materials/E_c"]
    assert made.verdict is Verdict.ORIGIN
    assert all("1.6 (ACI" not in slip.sentence for slip in made.slips)


# -- which slips are set beside a reading --------------------------------------------------------


def test_a_digit_typed_for_another_is_not_set_beside_a_rounding() -> None:
    """450 for 453.15: with l typed 5.98 it is 450.1, and some digit gives almost any number."""
    record = sheet_of({"M_f = w_f*l**2/8": "kN.m"}, {"w_f": "100.7 kN/m", "l": "6 m"}).close()
    assert said_of(record, {"beam/M_f": "450"}, "beam/M_f")[0] is Verdict.SAFE_ROUNDING


def test_a_row_that_is_the_same_by_rights_is_no_slip_when_copied() -> None:
    """d_v 0.9 x 518.9 = 467.01 at both ends: 465 at one is not copied from 465 at the other.

    Where the other is 464.9 by rights, 465 in this row may well be that one.
    """

    def verdict(other: str) -> Verdict:
        lines = {"d_v = 0.9*d_1": "mm", "d_vr = 0.9*d_2": "mm"}
        record = sheet_of(lines, {"d_1": "518.9 mm", "d_2": other}).close()
        claims = {"beam/d_v": "465", "beam/d_vr": "465"}
        return said_of(record, claims, "beam/d_v")[0]

    assert verdict("518.9 mm") is not Verdict.DOUBTFUL
    assert verdict("516.6 mm") is Verdict.DOUBTFUL


# -- readings that stay as they are ------------------------------------------------------------


def test_a_table_value_stays_one_where_a_slip_above_would_give_it_too() -> None:
    """209 = 1.8 x 400 x 539^2; alpha_1 left out of the unclaimed a gives 209.2 as well."""
    said = said_of(beam(), {"beam/d": "539", "strength/M_r": "209"}, "strength/M_r")
    assert said[0] is Verdict.OTHER_METHOD


def test_the_other_method_is_no_slip_of_taking_its_factor() -> None:
    """V_c by the simplified method is V_c with beta_g for beta: one reading, not two."""
    record = flow.record_of()
    value = float(record.entries["shear-1-left/V_cg"]["value"])
    claims = {"shear-1-left/V_c": f"{value:.2f}"}
    assert said_of(record, claims, "shear-1-left/V_c")[0] is Verdict.OTHER_METHOD


def test_a_result_written_wrongly_is_no_second_reading() -> None:
    """206 is 206.6 cut off, and 209 mistyped: every rounding differs from its number somewhere."""
    exact = {"beam/d": "538.95", "beam/a": "64.979"}
    said = said_of(beam(), exact | {"strength/M_r": "206"}, "strength/M_r")
    assert said[0] is Verdict.SAFE_ROUNDING


# -- readings that were too generous -----------------------------------------------------------


def test_a_depth_within_the_section_is_not_rounded_to_25_mm() -> None:
    """d 538.95: 540 and 535 are roundings to 5 mm; 550 on a step of 25 is none."""
    assert said_of(beam(), {"beam/d": "550"}, "beam/d")[0] is Verdict.ORIGIN
    assert said_of(beam(), {"beam/d": "540"}, "beam/d", None)[0] is Verdict.UNSAFE_ROUNDING


def test_a_length_that_is_set_out_is_rounded_to_25_mm() -> None:
    """l_d = 1.1 x 925 = 1017.5, as d_v: only a length along the beam is made 1025."""
    givens = {"k_1": "1.1", "d_b": "925 mm"}
    lines = {"l_d = k_1*d_b": "mm", "d_v = k_1*d_b": "mm"}
    record = sheet_of(lines, givens).close()
    said = {i: said_of(record, {i: "1025"}, i)[0] for i in ("beam/l_d", "beam/d_v")}
    assert said == {"beam/l_d": Verdict.SAFE_ROUNDING, "beam/d_v": Verdict.ORIGIN}


def test_areas_and_deflections_are_not_rounded_as_sizes_are() -> None:
    """A_s 3 x 304 = 912: 910 is a digit less, 925 on a step of 25 is nothing.

    A_sb 87 x 304 = 26 448: 26 000 is a digit less, 26 500 on a step of 500 is nothing.

    delta_L = 0.35 x 3.25 = 1.1375 mm: 1.13 is cut off, 1.15 on a step of 0.05 is nothing.
    """
    lines = {"A_s = n_b*A_b": "mm2", "A_sb = n_o*A_b": "mm2", "delta_L = k_1*a": "mm"}
    givens = {"n_b": "3", "n_o": "87", "A_b": "304 mm2", "k_1": "0.35", "a": "3.25 mm"}
    record = sheet_of(lines, givens).close()
    cases = {
        ("A_s", "910"): Verdict.SAFE_ROUNDING,
        ("A_s", "925"): Verdict.ORIGIN,
        ("A_sb", "26000"): Verdict.SAFE_ROUNDING,
        ("A_sb", "26500"): Verdict.ORIGIN,
        ("delta_L", "1.13"): Verdict.SAFE_ROUNDING,
        ("delta_L", "1.15"): Verdict.ORIGIN,
    }
    found = {
        (symbol, text): said_of(record, {f"beam/{symbol}": text}, f"beam/{symbol}", None)[0]
        for symbol, text in cases
    }
    assert found == cases


def test_a_zero_written_behind_the_point_was_worked_out() -> None:
    """M_r 206.64: 207.0 says 206.95 to 207.05, so that it is no rounding to 1 kN.m."""
    exact = {"beam/d": "538.95", "beam/a": "64.979"}
    said = said_of(beam(), exact | {"strength/M_r": "207.0"}, "strength/M_r")
    assert said[0] is Verdict.ORIGIN


def demand(*, checked: bool) -> Record:
    """M_f = 100.7 x 6^2/8 = 453.15 kN.m, with or without a check that rests on it."""
    givens = {"w_f": "100.7 kN/m", "l": "6 m", "M_r": "500 kN.m"}
    sheet: Sheet = hand.sheet_of({"M_f = w_f*l**2/8": "kN.m"}, givens)
    if checked:
        with sheet.part("checks", "Span 1: checks"):
            sheet.check("M_f <= M_r", key="strength", title="Moment resistance")
    return sheet.close()


def test_no_one_rounds_past_the_nearest_step_but_to_the_safe_side() -> None:
    """453.15 lies nearer to 450; 460 is taken for a demand that a check rests on, else by nobody.

    450 is the nearest step, and not conservative where the check rests on it.
    """
    cases = {
        (True, "460"): Verdict.SAFE_ROUNDING,
        (False, "460"): Verdict.ORIGIN,
        (True, "450"): Verdict.UNSAFE_ROUNDING,
        (False, "450"): Verdict.SAFE_ROUNDING,
    }
    found = {
        (checked, text): said_of(demand(checked=checked), {"beam/M_f": text}, "beam/M_f", None)[0]
        for checked, text in cases
    }
    assert found == cases


def test_a_way_is_taken_as_a_whole() -> None:
    """Who claims the beta of the recorded method did not work V_c by the other one.

    With the beta of the other method claimed too, both are of the other method.
    """
    record = flow.record_of()
    part = "shear-1-left"
    values = {s: float(record.entries[f"{part}/{s}"]["value"]) for s in ("beta", "V_cg")}
    other = {f"{part}/V_c": f"{values['V_cg']:.2f}"}
    own = {f"{part}/beta": f"{values['beta']:.4f}"}
    assert said_of(record, other | own, f"{part}/V_c", None)[0] is Verdict.ORIGIN
    both = judged(record, other | {f"{part}/beta": "0.180"})
    assert both[f"{part}/beta"].verdict is Verdict.OTHER_METHOD
    assert both[f"{part}/V_c"].verdict is Verdict.AGREES


def test_who_wrote_down_the_stress_block_did_not_read_a_table() -> None:
    """K_r = 1.8 gives 209.2; with a = 65.0 claimed M_r is 408 000 x (539 - 32.5) = 206.7."""
    claims = {"beam/d": "539", "beam/a": "65.0", "strength/M_r": "209"}
    assert said_of(beam(), claims, "strength/M_r", None)[0] is Verdict.ORIGIN
