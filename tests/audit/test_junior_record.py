"""A junior's record: first wrong line, own formulas, typed values, units that only look right.

Every rule has a case that triggers it and one in which it must stay silent.
"""

from __future__ import annotations

import copy
from collections.abc import Callable
from functools import cache
from typing import Any

import pytest
from tests.audit.altered import NAMES, changed, demo, edited
from tests.audit.junior_beam import own_record, said, sheet_with
from tests.beams import gallery

from lineproof.audit.data import Finding, Severity
from lineproof.audit.junior.search import audit_record
from lineproof.errors import UserError
from lineproof.formula import criterion, formula
from lineproof.record import Record
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import flexure, materials, shear, stress_block
from lineproof.standards.catalogue import NOTATION


def right_lines(sheet: Sheet) -> None:
    """Flexure and shear by the catalogue, as an own part records them."""
    sheet.line(stress_block.ALPHA_1)
    bars = sheet.given("n_b", "4", "number of bars", source="drawing S-501")
    area = sheet.given("A_b", "500 mm2", "area of one bar", source="drawing S-501")
    steel = sheet.line("A_s = n_b*A_b", n_b=bars, A_b=area, unit="mm2")
    sheet.given("c_c", "30 mm", source="drawing S-501")
    sheet.given("d_bs", "11.3 mm", source="drawing S-501")
    sheet.given("d_b", "25.2 mm", source="drawing S-501")
    depth = sheet.line("d = h - c_c - d_bs - d_b/2", unit="mm")
    sheet.line(flexure.BLOCK_RECTANGULAR, A_s=steel, b=sheet.entry("inputs/b_w"))
    sheet.line(flexure.M_R_RECTANGULAR, A_s=steel, d=depth)
    sheet.line(shear.D_V, d=depth)


def own(text: str, **extra: Any) -> Callable[[Sheet], object]:
    """Return a writer of one own line after the givens that it needs."""

    def write(sheet: Sheet) -> None:
        for symbol, value in extra.pop("given", {}).items():
            sheet.given(symbol, value, source="drawing S-501")
        sheet.line(formula(text, notation=NOTATION, **extra))

    return write


GIVEN_V_C = {"beta": "0.18", "d_v": "509.4 mm", "d": "566 mm"}


# -- silent on what is right -----------------------------------------------------------------


@pytest.mark.parametrize("name", NAMES)
def test_demo_calcs_give_no_finding(name: str) -> None:
    assert audit_record(demo(name)) == ()


@cache
def gallery_beam() -> Record:
    return gallery.record_of()


def test_a_simple_beam_gives_no_finding() -> None:
    assert audit_record(gallery_beam()) == ()


def test_own_lines_by_the_catalogue_give_no_finding() -> None:
    found = audit_record(own_record(right_lines))
    assert [f for f in found if f.severity is not Severity.OBSERVATION] == []
    assert said(found, "differs") == []


def test_own_lines_beside_a_beam_give_no_finding() -> None:
    beam = gallery.start()
    gallery.run(beam)
    with beam.sheet.part("curb", "Curb load, own lines"):
        beam.sheet.given("h_cb", "300 mm", "height of the curb", source="drawing A-210")
        beam.sheet.given("b_cb", "150 mm", "width of the curb")
        beam.sheet.line("w_cb = gamma_w*b_cb*h_cb", unit="kN/m", title="Curb")
        beam.sheet.check("w_cb <= w_SD", title="Curb within the superimposed load")
    assert audit_record(beam.sheet.close()) == ()


# -- worked again ----------------------------------------------------------------------------


def test_the_first_wrong_line_is_told_with_what_it_carries() -> None:
    # 1500 mm2 of bars recorded as 1234: what follows was worked with 1500.
    found = audit_record(changed(demo("floor-beam"), "sag-1/A_s", value=1234.0))
    assert len(found) == 1
    assert found[0].severity is Severity.CRITICAL
    assert found[0].ids[0] == "sag-1/A_s"
    assert "sag-1/M_r" in found[0].ids
    assert "1234 mm²" in found[0].what
    assert "1500 mm²" in found[0].what


def test_a_wrong_line_in_a_chain_is_one_origin() -> None:
    # The junior computed a with alpha_1 = 0.85 and carried it on to M_r, all by hand:
    # a = 680 000/(0.85 x 0.65 x 32 x 380) = 680 000/6718.4 = 101.215 mm.
    record = own_record(right_lines)
    wrong = 680_000 / 6718.4
    depth = 620 - 30 - 11.3 - 12.6
    moment = 680_000 * (depth - wrong / 2) / 1e6

    def change(data: dict[str, Any]) -> None:
        rows = {e["id"]: e for p in data["parts"] for e in p["entries"]}
        rows["own/a"]["value"] = wrong
        rows["own/a"]["printed"] = rows["own/a"]["printed"] | {"result": "101.22"}
        rows["own/M_r"]["value"] = moment
        rows["own/M_r"]["printed"] = rows["own/M_r"]["printed"] | {
            "args": rows["own/M_r"]["printed"]["args"] | {"a": "101.22"}
        }

    critical = [f for f in audit_record(edited(record, change)) if f.severity is Severity.CRITICAL]
    assert [f.ids[0] for f in critical] == ["own/a"]
    assert "own/M_r" in critical[0].ids
    assert "107.2" in critical[0].what  # what its own values give


def test_a_given_changed_after_its_lines_is_told() -> None:
    row = demo("floor-beam").entries["given/f_c"]
    found = audit_record(
        changed(
            demo("floor-beam"),
            "given/f_c",
            typed="35 MPa",
            value=35.0,
            printed=row["printed"] | {"result": "35"},
        )
    )
    (older,) = said(found, "was changed after them")
    assert older.ids[0] == "given/f_c"
    assert "materials/E_c" in older.ids
    (altered,) = said(found, "its text is not that of which the record was made")
    assert altered.ids[0] == "given/f_c"
    assert len(found) == 2


def test_a_given_that_is_not_what_was_typed() -> None:
    found = audit_record(changed(demo("floor-beam"), "given/f_c", typed="35 MPa"))
    (origin,) = said(found, "recorded as 32 MPa, but 35 MPa was typed")
    assert "materials/E_c" in origin.ids


def test_a_check_whose_truth_was_turned() -> None:
    found = audit_record(changed(demo("floor-beam"), "sag-1/strength", holds=False))
    (turned,) = said(found, "the record says that the check does not hold")
    assert turned.severity is Severity.CRITICAL
    assert turned.ids == ("sag-1/strength",)


def test_what_is_printed_but_not_recorded() -> None:
    printed = demo("floor-beam").entries["sag-1/d"]["printed"] | {"result": "999"}
    found = audit_record(changed(demo("floor-beam"), "sag-1/d", printed=printed))
    assert said(found, "sag-1/d", "what is printed is not what is recorded")


def test_a_value_that_its_table_does_not_hold() -> None:
    row = demo("floor-beam").entries["materials/phi_c"]
    found = audit_record(
        changed(
            demo("floor-beam"),
            "materials/phi_c",
            value=0.7,
            printed=row["printed"] | {"result": "0.70"},
        )
    )
    (wrong,) = said(found, "is not what the table 'Resistance factors' holds", "0.65")
    assert wrong.clause == "8.4.2"


def test_a_procedure_not_known_here_is_told_once() -> None:
    def rename(data: dict[str, Any]) -> None:
        for part in data["parts"]:
            for entry in part["entries"]:
                if entry["kind"] == "found" and entry["procedure"]["name"] == "support moment":
                    entry["procedure"] = entry["procedure"] | {"name": "a guess"}

    found = audit_record(edited(demo("floor-beam"), rename))
    (unknown,) = said(found, "cannot be worked again")
    assert "a guess of version 1 is not known here" in unknown.what


def test_a_setting_that_a_procedure_does_not_have_is_told() -> None:
    def add(data: dict[str, Any]) -> None:
        for part in data["parts"]:
            for entry in part["entries"]:
                if entry["id"] == "second-path/c_l":
                    entry["settings"] = {"depth": 2.0}

    found = audit_record(edited(demo("tee-section"), add))
    (line,) = said(found, "cannot be worked again")
    assert "has no setting 'depth'" in line.what


def test_a_record_with_code_in_a_formula_is_refused() -> None:
    data = copy.deepcopy(demo("tee-section").data)
    line = next(e for p in data["parts"] for e in p["entries"] if e["kind"] == "line")
    line["formula"] = "x = __import__('os').system('true')"
    with pytest.raises(UserError, match="is not plain arithmetic"):
        Record.from_data(data)


def test_a_record_cut_off_is_refused() -> None:
    text = demo("tee-section").to_text()
    with pytest.raises(UserError, match="not readable as JSON"):
        Record.from_text(text[: len(text) // 2])


# -- own formulas ----------------------------------------------------------------------------


def test_lambda_missing_has_no_effect_in_normal_concrete() -> None:
    write = own(
        "V_c = phi_c*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v",
        numbers={"1.0": "MPa^0.5", "8": "MPa"}, given=dict(GIVEN_V_C),
    )  # fmt: skip
    (one,) = said(audit_record(own_record(write)), "differs from 11.3.4: lambda is missing")
    assert one.severity is Severity.MINOR
    assert "without effect here" in one.what


def test_lambda_missing_matters_in_low_density_concrete() -> None:
    # V_c = 0.65 x 0.18 x 5.65685 x 380 x 509.4 = 128 118 N; times 0.75 it is 96.1 kN.
    write = own(
        "V_c = phi_c*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v",
        numbers={"1.0": "MPa^0.5", "8": "MPa"}, given=dict(GIVEN_V_C),
    )  # fmt: skip
    found = audit_record(own_record(write, lambda_="0.75"))
    (one,) = said(found, "differs from 11.3.4: lambda is missing")
    assert one.severity is Severity.MAJOR
    assert "it gives 128.1 kN, 11.3.4 gives 96.09 kN" in one.what


def test_the_lines_of_a_changed_package_are_compared_too() -> None:
    text = "M_r = phi_s*A_s*f_y*(d + a/2)"
    found = audit_record(changed(demo("floor-beam"), "sag-1/M_r", formula=text))
    (one,) = said(found, "differs from 10.1: the sign of a/2 is turned")
    assert one.ids == ("sag-1/M_r",)


def test_a_limit_left_out_is_told_only_where_it_governs() -> None:
    # 0.9 d = 0.9 x 566 = 509.4 > 0.72 h = 446.4 mm; with d = 480 mm 0.9 d = 432 < 446.4 mm.
    found = audit_record(own_record(own("d_v = 0.9*d", given={"d": "566 mm"})))
    assert said(found, "leaves out a limit") == []
    found = audit_record(own_record(own("d_v = 0.9*d", given={"d": "480 mm"})))
    (one,) = said(found, "leaves out a limit of 2.3 that governs")
    assert "it gives 432 mm in place of 446.4 mm" in one.what


def test_an_own_formula_for_a_known_symbol_is_an_observation() -> None:
    write = own("V_f = w_x*x_1", given={"w_x": "40 kN/m", "x_1": "3 m"})
    (one,) = said(audit_record(own_record(write)), "is a formula of its own")
    assert one.severity is Severity.OBSERVATION


def test_a_rule_of_another_standard_is_named() -> None:
    write = own("E_c = 4700*sqrt(f_c)", numbers={"4700": "MPa^0.5"})
    (one,) = said(audit_record(own_record(write)), "differs from 8.6.2.3")
    assert "4700 in place of 4500" in one.what
    assert "ACI 318" in one.what


def test_a_formula_of_another_edition_is_named() -> None:
    # NBC 2010 had 0.5 S as a companion; since 2015 it is 1.0 S (BASIS of the catalogue).
    given = {"w_D": "10 kN/m", "w_L": "8 kN/m", "w_S": "4 kN/m"}
    write = own("w_f2 = 1.25*w_D + 1.5*w_L + 0.5*w_S", given=given)
    (one,) = said(audit_record(own_record(write)), "differs from NBC 4.1.3.2")
    assert "NBC 2005 and 2010" in one.what
    # 12.5 + 12 + 2 = 26.5 in place of 12.5 + 12 + 4 = 28.5 kN/m
    assert "it gives 26.5 kN/m, NBC 4.1.3.2 gives 28.5 kN/m" in one.what


# -- constants typed -------------------------------------------------------------------------


def test_a_constant_typed_where_a_line_stands() -> None:
    write = own("M_r = 0.85*A_s*f_y*(d - a/2)",
                given={"A_s": "2000 mm2", "d": "566 mm", "a": "107 mm"})  # fmt: skip
    found = audit_record(own_record(write))
    (one,) = said(found, "0.85 is typed where", "inputs/phi_s stands")
    assert one.severity is Severity.MINOR
    assert said(found, "differs from 10.1") == []  # it is phi_s, only typed


def test_a_declared_constant_typed_where_a_line_stands() -> None:
    write = own("M_r = phi_s*A_s*400*(566 - a/2)", numbers={"400": "MPa", "566": "mm"},
                given={"A_s": "2000 mm2", "d": "566 mm", "a": "107 mm"})  # fmt: skip
    (one,) = said(audit_record(own_record(write)), "is typed where")
    assert "400 is typed where 1.2 inputs/f_y stands" in one.what
    assert "566 is typed where 2.2 own/d stands" in one.what


def test_constants_of_the_formula_itself_are_no_typed_values() -> None:
    # 8 is the divisor, though n_8 is 8 as well; 0.5 is no line's value.
    write = own("M_f = w_f*l**2/8", given={"w_f": "40 kN/m", "l": "6 m", "n_8": "8"})
    assert said(audit_record(own_record(write)), "is typed where") == []


# -- values given ----------------------------------------------------------------------------


def test_a_given_that_a_formula_gives_otherwise() -> None:
    # d_v = max(0.9 x 566, 0.72 x 620) = 509.4 mm, typed 560.
    write = own("V_rmax = 0.25*phi_c*f_c*b_w*d_v", given={"d": "566 mm", "d_v": "560 mm"})
    (one,) = said(audit_record(own_record(write)), "d_v is typed 560 mm")
    assert one.severity is Severity.MAJOR
    assert "d_v = max(0.9*d, 0.72*h) (2.3) gives 509.4 mm" in one.what


def test_a_given_that_a_formula_gives_is_an_observation() -> None:
    write = own("V_rmax = 0.25*phi_c*f_c*b_w*d_v", given={"d": "566 mm", "d_v": "509 mm"})
    (one,) = said(audit_record(own_record(write)), "d_v = 509 mm is typed")
    assert one.severity is Severity.OBSERVATION


def test_a_result_typed_without_source_is_told() -> None:
    def write(sheet: Sheet) -> None:
        sheet.given("M_f", "388 kN.m")
        sheet.given("V_f", "210 kN", source="frame analysis of 3 May, page 12")

    found = audit_record(own_record(write))
    (moment,) = said(found, "M_f = 388 kN.m is typed")
    assert "nothing shows where it comes from" in moment.what
    assert moment.severity is Severity.MINOR
    (force,) = said(found, "V_f = 210 kN is typed")
    assert force.severity is Severity.OBSERVATION


def test_inputs_are_no_results() -> None:
    found = audit_record(own_record(lambda sheet: sheet.given("h_f", "140 mm")))
    assert found == ()


@pytest.mark.parametrize(("typed", "told"), [("0.60", True), ("0.65", False)])
def test_a_factor_of_the_standard_typed_otherwise(typed: str, *, told: bool) -> None:
    found = audit_record(own_record(lambda sheet: sheet.note("n", "none"), phi_c=typed))
    assert bool(said(found, "phi_c is typed 0.60", "0.65")) is told


@pytest.mark.parametrize(
    ("typed", "words", "severity"),
    [
        ("35 MPa", "f_c is typed 35 MPa, but 32 MPa stands at 1.1 inputs/f_c", Severity.MAJOR),
        ("32 MPa", "as it stands at 1.1 inputs/f_c already", Severity.OBSERVATION),
    ],
)
def test_a_value_typed_again(typed: str, words: str, severity: Severity) -> None:
    (one,) = audit_record(own_record(lambda sheet: sheet.given("f_c", typed)))
    assert words in one.what
    assert one.severity is severity
    assert one.ids == ("own/f_c", "inputs/f_c")


# -- units -----------------------------------------------------------------------------------


def test_a_power_of_ten_in_an_own_line() -> None:
    def write(sheet: Sheet) -> None:
        sheet.given("w_x", "40 kN/m")
        sheet.given("x_1", "3 m")
        sheet.line("M_x = w_x*x_1**2/2/1000", unit="kN.m")

    (one,) = said(audit_record(own_record(write)), "1000 in M_x", "converts nothing")
    assert one.severity is Severity.MAJOR


def test_a_unit_right_only_by_a_declared_number() -> None:
    write = own("q_x = 12*b_x/1000", unit="kN/m",
                numbers={"12": "kPa"}, given={"b_x": "3 m"})  # fmt: skip
    (one,) = said(audit_record(own_record(write)), "is right only because", "12 is declared in kPa")
    assert one.severity is Severity.MINOR


def test_declared_numbers_of_the_catalogue_are_known() -> None:
    found = audit_record(own_record(lambda sheet: sheet.line(materials.E_C_NORMAL)))
    assert found == ()
    write = own("E_c = 4500*sqrt(f_c)", numbers={"4500": "MPa^0.5"})
    assert audit_record(own_record(write)) == ()


@pytest.mark.parametrize(
    ("text", "told"),
    [("T_x = F_x/tan(theta*3.14159/180)", True), ("T_x = F_x/tan(theta)", False)],
)
def test_degrees_turned_into_radians(text: str, *, told: bool) -> None:
    def write(sheet: Sheet) -> None:
        sheet.given("F_x", "100 kN")
        sheet.given("theta", "36 deg", source="general method")
        sheet.line(text, unit="kN")

    found = audit_record(own_record(write))
    assert bool(said(found, "turns degrees into radians")) is told


# -- own checks ------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("text", "words", "severity"),
    [
        ("M_r <= M_f", "asks the reverse of 8.1.3", Severity.CRITICAL),
        ("M_f >= M_r", "asks the reverse of 8.1.3", Severity.CRITICAL),
        ("0.9*M_f <= M_r", "asks less than 8.1.3", Severity.MAJOR),
        ("M_f <= 1.1*M_r", "asks less than 8.1.3", Severity.MAJOR),
        ("M_f <= 0.9*M_r", "asks more than 8.1.3", Severity.OBSERVATION),
    ],
)
def test_an_own_check_against_the_catalogue(text: str, words: str, severity: Severity) -> None:
    def write(sheet: Sheet) -> None:
        sheet.given("M_f", "300 kN.m", source="analysis")
        sheet.given("M_r", "350 kN.m", source="page 4")
        sheet.check(text)

    (one,) = said(audit_record(own_record(write)), words)
    assert one.severity is severity


@pytest.mark.parametrize("text", ["M_f <= M_r", "M_r >= M_f", "M_f/M_r <= 1"])
def test_an_own_check_that_asks_the_same_is_silent(text: str) -> None:
    def write(sheet: Sheet) -> None:
        sheet.given("M_f", "300 kN.m", source="analysis")
        sheet.given("M_r", "350 kN.m", source="page 4")
        sheet.check(criterion(text, unit="" if "/" in text else "kN.m", notation=NOTATION))

    found = audit_record(own_record(write))
    assert said(found, "asks") == []


# -- editions and head -----------------------------------------------------------------------


def with_head(edit: Callable[[dict[str, Any]], None]) -> tuple[Finding, ...]:
    """Audit an own record whose head was changed."""
    record = own_record(lambda sheet: sheet.given("h_f", "140 mm", source="drawing S-201, rev B"))
    data = copy.deepcopy(record.data)
    edit(data)
    return tuple(f for f in audit_record(Record.from_data(data)) if "record: digest" not in f.what)


def test_a_pair_that_mixes_editions() -> None:
    found = with_head(lambda d: d["codes"].update(pair="NBC 2015 + A23.3:19"))
    assert said(found, "NBC 2015 + A23.3:19", "mixes editions")
    assert said(found, "the project is to NBC 2015 + A23.3-14")
    assert with_head(lambda _: None) == ()


def test_a_standard_that_is_not_of_the_pair() -> None:
    found = with_head(lambda d: d["codes"].update(concrete="CSA A23.3:19"))
    assert said(found, "the head names CSA A23.3:19, which is not of the pair")


@pytest.mark.parametrize(
    ("source", "told"),
    [
        ("A23.3:19, 8.4.2", "A23.3:19"),
        ("CSA A23.3-04", "A23.3-04"),
        ("NBCC 2010", "NBCC 2010"),
        ("A23.3-14, 8.4.2", ""),
        ("A23.3-2014", ""),
        ("NBC 2015, 4.1.5", ""),
    ],
)
def test_another_edition_in_an_own_text(source: str, told: str) -> None:
    found = audit_record(own_record(lambda s: s.given("h_f", "140 mm", source=source)))
    assert [f.what for f in found if "speaks of" in f.what] == (
        [f"2.1 own/h_f speaks of {told}; the calculation is to NBC 2015 + A23.3-14"] if told else []
    )


def test_a_title_of_the_old_job() -> None:
    found = with_head(lambda d: d["calc"].update(title="Beam B7, level 2"))
    assert said(found, "the calculation is B9, but its title speaks of B7")


@pytest.mark.parametrize("title", ["Beam B9 as B7", "Edge beam", "Beam of 2 spans", "Bars 20M"])
def test_a_title_that_is_its_own(title: str) -> None:
    assert with_head(lambda d: d["calc"].update(title=title)) == ()


@pytest.mark.parametrize(("revision", "told"), [("C", True), ("B", False)])
def test_a_drawing_of_another_revision(revision: str, *, told: bool) -> None:
    rows = [{"number": "S-201", "revision": revision, "title": "Plan"}]
    found = with_head(lambda d: d["project"].update(drawings=rows))
    assert bool(said(found, "S-201 revision B", "the project lists revision C")) is told


@pytest.mark.parametrize(("date", "told"), [("2026-11-01", True), ("2026-12-01", False)])
def test_an_issue_older_than_its_revision(date: str, *, told: bool) -> None:
    head = {"issue": {"date": date}, "revisions": [{"letter": "A", "date": "2026-12-01"}]}
    found = with_head(lambda d: d["project"].update(head))
    assert bool(said(found, "the issue is dated", "revision A")) is told


def test_findings_come_the_gravest_first() -> None:
    def write(sheet: Sheet) -> None:
        sheet.given("M_f", "388 kN.m")
        sheet.given("M_r", "350 kN.m", source="page 4")
        sheet.check("M_r <= M_f")

    found = audit_record(own_record(write, phi_c="0.60"))
    order = list(Severity)
    places = [order.index(one.severity) for one in found]
    assert places == sorted(places)
    assert places[0] == 0
    assert all(one.source == "notebook" for one in found)


def test_a_sheet_of_many_own_formulas_is_cut_off() -> None:
    def write(sheet: Sheet) -> None:
        for number in range(70):
            sheet.line(f"M_f = {number + 20}*q_x", unit="kN.m", symbol=f"M_{number}",
                       q_x=sheet.entry("load/q_x"))  # fmt: skip

    sheet = sheet_with()
    with sheet.part("load", "Load"):
        sheet.given("q_x", "3 kN.m")
    with sheet.part("own", "Own"):
        write(sheet)
    assert said(audit_record(sheet.close()), "more than 60 formulas of its own")
