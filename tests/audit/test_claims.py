"""Reading claims: lines by id, label or symbol and place; units; every fault with its row."""

from __future__ import annotations

from pathlib import Path

import pytest
from tests.audit.hand import beam, sheet_of

from lineproof.audit.audit import audit_claims
from lineproof.audit.claims.blank import blank_table
from lineproof.audit.claims.read import read_claims
from lineproof.audit.claims.tables import read_table, write_table
from lineproof.audit.data import Claim
from lineproof.audit.graph import Graph
from lineproof.errors import UserError


@pytest.fixture(scope="module")
def graph() -> Graph:
    return Graph(beam())


@pytest.fixture(scope="module")
def twice() -> Graph:
    """The same symbol in two parts."""
    sheet = sheet_of({}, {"q": "4 kPa", "b_tr": "3 m"})
    for span in ("1", "2"):
        with sheet.part(f"load-{span}", f"Span {span}: load"):
            sheet.line("w = q*b_tr", unit="kN/m")
    return Graph(sheet.close())


def read(graph: Graph, folder: Path, text: str) -> tuple[Claim, ...]:
    path = folder / "claims.csv"
    path.write_text(text, encoding="utf-8")
    return read_claims(graph, path)


def faults(graph: Graph, folder: Path, text: str) -> tuple[str, ...]:
    with pytest.raises(UserError) as caught:
        read(graph, folder, text)
    start = f"{folder / 'claims.csv'}: "
    assert all(fault.startswith(start) for fault in caught.value.faults)
    return tuple(fault.removeprefix(start) for fault in caught.value.faults)


def test_a_claim_stands_for_half_a_unit_of_its_last_digit(graph: Graph, tmp_path: Path) -> None:
    """M_r "207 kN.m": 206.5 to 207.5 kN.m, in N.mm; d "0.539 m": 538.5 to 539.5 mm."""
    claims = read(graph, tmp_path, "id,claimed,unit\nstrength/M_r,207,kN.m\nbeam/d,0.539,m\n")
    first, second = claims
    assert (first.id, first.typed, first.unit, first.row) == ("strength/M_r", "207", "kN.m", 2)
    assert (first.value, first.stands_for.low, first.stands_for.high) == (207e6, 206.5e6, 207.5e6)
    assert (second.stands_for.low, second.stands_for.high) == pytest.approx((538.5, 539.5))


def test_a_claim_keeps_its_place_in_the_others_calculation(graph: Graph, tmp_path: Path) -> None:
    first, second = read(graph, tmp_path, "id,claimed,where\nbeam/d,539 mm,p.  3\nbeam/a,65 mm,\n")
    assert (first.where, second.where) == ("p. 3", "")


@pytest.mark.parametrize(
    ("typed", "unit", "value"),
    [
        ("207", "kN.m", 207e6),
        ("207 kN·m", "", 207e6),
        ("207 kN.m", "kip.ft", 207e6),  # the cell's own unit goes before that of the column
        ("152.4", "kip.ft", 152.4 * 1_355_817.9483),
        ("2.07e2", "kN.m", 207e6),
        ("−207", "kN.m", -207e6),
    ],
)
def test_units_of_the_same_kind_are_converted(
    graph: Graph, tmp_path: Path, typed: str, unit: str, value: float
) -> None:
    """1 kip.ft = 4448.2216 N x 304.8 mm = 1 355 817.95 N.mm."""
    (claim,) = read(graph, tmp_path, f"id,claimed,unit\nstrength/M_r,{typed},{unit}\n")
    assert claim.value == pytest.approx(value, rel=1e-9)


def test_lines_are_named_by_id_label_or_symbol(graph: Graph, tmp_path: Path) -> None:
    text = "label,symbol,claimed,unit\n2.1,,539,mm\n,M_r,207,kN.m\n,beam/a,65.0,mm\n"
    assert [c.id for c in read(graph, tmp_path, text)] == ["beam/d", "strength/M_r", "beam/a"]


@pytest.mark.parametrize("place", ["span 2", "Span 2: load", "load-2", "SPAN 2", "2"])
def test_a_symbol_in_several_parts_needs_its_place(
    twice: Graph, tmp_path: Path, place: str
) -> None:
    (claim,) = read(twice, tmp_path, f"symbol,place,claimed\nw,{place},12 kN/m\n")
    assert claim.id == "load-2/w"
    assert faults(twice, tmp_path, "symbol,place,claimed\nw,,12 kN/m\n") == (
        "row 2, symbol: w stands in 2 places; write one of load-1/w, load-2/w",
    )
    assert faults(twice, tmp_path, "symbol,place,claimed\nw,span 7,12 kN/m\n") == (
        "row 2, symbol: w stands nowhere at 'span 7'; write one of load-1/w, load-2/w",
    )


def test_all_faults_come_at_once(graph: Graph, tmp_path: Path) -> None:
    text = (
        "id,claimed,unit\n"
        "strength/M_rr,207,kN.m\n"
        "beam/d,539,\n"
        "beam/a,=1+1,mm\n"
        "given/b,400,mm\n"
        "given/b,400,mm\n"
        'given/h,"600,5",mm\n'
        "given/n_b,four,\n"
        "given/l,40,kN\n"
        "strength/strength,0.87,\n"
        ",12,mm\n"
        "beam/A_s,1 200,mm2\n"
    )
    expected = """\
row 4, claimed: '=1+1' is a formula; write the value that it shows
row 2, id: 'strength/M_rr' is not a line of this calc; write 'strength/M_r' or 'strength/M_f'
row 3, claimed: d: '539' has no unit; write '539 mm'
row 6, id: given/b is claimed in row 5 already; keep one of them
row 7, claimed: h: '600,5 mm' is not a number with a unit; write a decimal point: '600.5 mm'
row 8, claimed: 'four' holds no number; write for example '25', or leave the cell empty
row 9, claimed: l: '40 kN' is a force, but a length is needed; write it in m, mm, cm, in, ft
row 10, id: 'strength/strength' is a check and has no value; claim the lines it compares
row 11, id: names no line; write the id that the blank table shows
row 12, claimed: '1 200' has marks between its digits; write '1200'
"""
    assert "\n".join(faults(graph, tmp_path, text)) + "\n" == expected


def test_symbols_not_known_get_the_nearest_names(graph: Graph, tmp_path: Path) -> None:
    (said,) = faults(graph, tmp_path, "symbol,claimed\nM_R,207 kN.m\n")
    assert "'M_R' is not a line of this calc; write 'M_r'" in said
    (said,) = faults(graph, tmp_path, "symbol,claimed\nzzzzzz,207 kN.m\n")
    assert said.endswith("take the id of a blank")
    (said,) = faults(graph, tmp_path, "label,claimed\n99.9,207 kN.m\n")
    assert "'99.9' is not a line" in said


def test_an_id_in_capitals_or_in_another_column_is_understood_or_named(
    graph: Graph, tmp_path: Path
) -> None:
    """The line d of the part beam has the label 2.1: an id is never a label."""
    label = graph["beam/d"].label
    (claim,) = read(graph, tmp_path, "label,claimed\nbeam/d,539 mm\n")
    assert claim.id == "beam/d"
    assert faults(graph, tmp_path, f"id,claimed\nBEAM/D,1 mm\n{label},1 mm\n") == (
        "row 2, id: 'BEAM/D' is not a line of this calc; write 'beam/d'",
        (
            f"row 3, id: '{label}' is not a line of this calc, but a label; "
            "write it under the heading 'label'"
        ),
    )


def test_a_row_whose_symbol_is_that_of_another_line_is_refused(
    graph: Graph, tmp_path: Path
) -> None:
    """As after one column of a spreadsheet was sorted and not the others."""
    said = faults(graph, tmp_path, "id,symbol,claimed\nbeam/d,a,539 mm\nbeam/a,a,62 mm\n")
    assert said == (
        (
            "row 2, symbol: 'a', but beam/d is d; see whether columns were sorted apart, and "
            "write both of one line"
        ),
    )
    own_way = read(graph, tmp_path, "id,symbol,claimed\nbeam/d,d (eff.),539 mm\n")
    assert [claim.id for claim in own_way] == ["beam/d"]


def test_units_may_stand_under_a_heading_in_the_plural(graph: Graph, tmp_path: Path) -> None:
    (claim,) = read(graph, tmp_path, "id,claimed,units\nbeam/d,539,mm\n")
    assert (claim.typed, claim.unit) == ("539", "mm")


def test_a_title_above_the_headings_is_named(graph: Graph, tmp_path: Path) -> None:
    text = "Beam B1,,\n,,\nid,claimed,unit\nbeam/d,539,mm\n"
    assert faults(graph, tmp_path, text) == ("row 3 holds the headings; delete the rows above it",)


@pytest.mark.parametrize(
    ("text", "said"),
    [
        (
            "id,mine\nbeam/d,539\n",
            "no heading 'claimed' among 'id', 'mine'; write 'id,claimed,unit'",
        ),
        (
            "name,claimed\nbeam/d,539\n",
            "no heading 'id', 'label' or 'symbol' among 'name', 'claimed'; write 'id'",
        ),
        ("id,claimed\nbeam/d,\n", "no row has a value in the column 'claimed'; write one"),
    ],
)
def test_tables_without_claims(graph: Graph, tmp_path: Path, text: str, said: str) -> None:
    assert said in faults(graph, tmp_path, text)[0]


def test_many_faults_are_counted(graph: Graph, tmp_path: Path) -> None:
    said = faults(graph, tmp_path, "id,claimed\n" + "beam/zz,1\n" * 1000)
    assert len(said) == 41
    assert said[-1] == "and 960 faults more"


@pytest.mark.parametrize("ending", [".csv", ".xlsx"])
def test_a_blank_filled_in_reads_as_claims(graph: Graph, tmp_path: Path, ending: str) -> None:
    blank = tmp_path / f"blank{ending}"
    blank.write_bytes(blank_table(graph, ending))
    table = read_table(blank)
    values = {"beam/d": "539", "strength/M_r": "0.207e3", "given/h": "600"}
    rows = [
        [
            {**row.cells, "claimed": values.get(row.cells["id"], "")}.get(h, "")
            for h in table.headings
        ]
        for row in table.rows
    ]
    filled = tmp_path / f"filled{ending}"
    filled.write_bytes(write_table(table.headings, rows, ending))
    assert {c.id: c.typed for c in read_claims(graph, filled)} == values


def test_bars_claimed_for_their_area_are_read_by_the_bar_table(
    graph: Graph, tmp_path: Path
) -> None:
    """20M has 300 mm2, 25M 500 mm2 (CSA G30.18): 4 x 300 = 1200, 2 x 300 + 2 x 500 = 1600."""
    table = "id,claimed,unit\nbeam/A_s,{},mm2\n"
    (claim,) = read(graph, tmp_path, table.format("4-20M"))
    assert (claim.typed, claim.unit, claim.bars) == ("1200", "mm2", "4-20M")
    (claim,) = read(graph, tmp_path, table.format("2 x 20m + 2–25M"))
    assert (claim.value, claim.bars) == (1600.0, "2 x 20m + 2–25M")
    audit = audit_claims(graph.record, read(graph, tmp_path, table.format("3-20M")), graph)
    assert audit.notes == (
        "Bars are read as their area by the bar table (CSA G30.18): A_s (2.2) 3-20M as 900 mm².",
    )
    assert "900 mm² (3-20M) does not follow" in audit.findings[0].what


@pytest.mark.parametrize(
    ("typed", "said"),
    [
        # 4 x 300 mm2 by the bar table (CSA G30.18); 4 pi 20^2/4 = 1256.6 mm2.
        ("4Ø20", "may be 4-20M (1200 mm2) or 4 round bars of 20 mm (1257 mm2); write '4-20M', or"),
        # 3 x 500 mm2; 3 pi 25^2/4 = 1472.6 mm2.
        ("3 - ø 25 mm", "may be 3-25M (1500 mm2) or 3 round bars of 25 mm (1473 mm2); write"),
        # As many, with the letters of other standards for the diameter.
        ("4T20", "may be 4-20M (1200 mm2) or 4 round bars of 20 mm (1257 mm2); write '4-20M', or"),
        ("4 dia 20", "may be 4-20M (1200 mm2) or 4 round bars of 20 mm (1257 mm2)"),
        ("4-20", "names bars in a way that is not read; write them such as '4-20M'"),
        ("4-#6", "names bars in a way that is not read"),
        ("10M@200", "names bars in a way that is not read"),
        ("4Ø16", "names bars in a way that is not read; write them such as '4-20M'"),
        ("4-20M (bottom)", "names bars in a way that is not read; write them such as '4-20M'"),
        ("4-20M E.F.", "or write their area such as '1200 mm2'"),
        ("1200 (4-20M)", "names bars in a way that is not read"),
    ],
)
def test_bars_with_more_than_one_reading_are_refused(
    graph: Graph, tmp_path: Path, typed: str, said: str
) -> None:
    """Bars by diameter are not those of the standard, and each face may double a number."""
    (fault,) = faults(graph, tmp_path, f"id,claimed\nbeam/A_s,{typed}\n")
    assert said in fault


def test_bars_over_a_web_and_its_overhangs_are_whole_bars(tmp_path: Path) -> None:
    lines = {"A_s = (n_t + 2*n_o)*A_b": "mm2"}
    graph = Graph(sheet_of(lines, {"n_t": "2", "n_o": "1", "A_b": "300 mm2"}).close())
    assert read(graph, tmp_path, "id,claimed\nbeam/A_s,4-20M\n")[0].value == 1200.0
    assert read(graph, tmp_path, "id,claimed\nbeam/A_s,4 20M\n")[0].value == 1200.0


def test_bars_are_no_area_that_a_moment_requires(tmp_path: Path) -> None:
    """A_sr = M_f/(phi_s f_y 0.9 d) is worked out; 4-20M is what was chosen for it."""
    lines = {"A_sr = M_f/(phi_s*f_y*0.9*d)": "mm2"}
    given = {"M_f": "180 kN.m", "phi_s": "0.85", "f_y": "400 MPa", "d": "540 mm", "n_b": "4"}
    graph = Graph(sheet_of(lines, given).close())
    said = faults(graph, tmp_path, "id,claimed\nbeam/A_sr,4-20M\ngiven/n_b,4-20M\n")
    other = "'4-20M' names bars, and this line is no area of whole bars; write it as a number"
    assert said == (
        f"row 2, claimed: A_sr: {other}, such as '25 mm2'",
        f"row 3, claimed: n_b: {other}, such as '4'",
    )


def test_a_bar_is_no_number_for_its_diameter_or_area(tmp_path: Path) -> None:
    """20M is no 20 metres: 19.5 mm and 300 mm2 by the bar table (CSA G30.18)."""
    given = {"n_b": "4", "A_b": "300 mm2", "d_b": "19.5 mm"}
    graph = Graph(sheet_of({"A_s = n_b*A_b": "mm2"}, given).close())
    said = faults(graph, tmp_path, "id,claimed\ngiven/A_b,20M\ngiven/d_b,20m\n")
    assert "A_b: '20M' names a bar; write '300 mm2'" in said[0]
    assert "d_b: '20m' names a bar; write '19.5 mm'" in said[1]


def test_bars_of_a_size_that_there_is_not(graph: Graph, tmp_path: Path) -> None:
    (said,) = faults(graph, tmp_path, "id,claimed\nbeam/A_s,4-22M\n")
    assert said.startswith("row 2, claimed: A_s: '22M' is not a Canadian bar")


@pytest.mark.parametrize(
    ("line", "typed", "value"),
    [
        ("strength/M_r", "–207", -207e6),
        ("strength/M_r", "－2.07e−1 MN⋅m", -207e6),
        ("strength/M_r", "207 kN•m", 207e6),
        ("strength/M_r", "'207", 207e6),
        ("beam/A_s", "1.200 mm²", 1.2),
        ("strength/M_r", "2.07×10² kN.m", 207e6),
        ("strength/M_r", "2.07 x 10^8 N.mm", 207e6),
        ("strength/M_r", "207·10⁻³ MN.m", 207e6),
    ],
)
def test_odd_spelling_with_one_meaning_is_read(
    graph: Graph, tmp_path: Path, line: str, typed: str, value: float
) -> None:
    """Dashes for a minus, dots between units, the apostrophe of a text; a point is decimal."""
    unit = "" if "m" in typed else "kN.m"
    (claim,) = read(graph, tmp_path, f"id,claimed,unit\n{line},{typed},{unit}\n")
    assert claim.value == pytest.approx(value, rel=1e-9)


@pytest.mark.parametrize(
    ("line", "typed", "said"),
    [
        ("beam/A_s", "1,200", "write '1200', or '1.200' if the comma is the decimal point"),
        ("beam/A_s", "1.207,5", "has marks between its digits; write '1207.5'"),
        ("beam/A_s", "1 207,5", "has marks between its digits; write '1207.5'"),
        ("beam/A_s", "1’207", "has marks between its digits; write '1207'"),
        ("given/phi_c", "65 %", "is in percent; write '0.65'"),
        (
            "given/phi_c",
            "0.65 (shown in percent)",
            "holds 0.65, shown in percent; write the number",
        ),
        ("beam/d", "-539 (shown without its sign)", "holds -539, shown without its sign; write"),
        ("beam/d", "539 (hidden by its format)", "holds 539, hidden by its format; write the"),
        ("beam/d", "539 (shown with '=' before it)", "holds 539, shown with '=' before it; write"),
        ("beam/d", "02-Dec", "is a date that a spreadsheet made; type it again in a cell of the"),
        ("beam/d", "12/02/2026", "is a date that a spreadsheet made"),
        ("beam/d", "(539)", "may be a negative number or not; write '-539' or '539'"),
        ("beam/d", "539-", "may be a negative number or not; write '-539' or '539'"),
        (
            "beam/d",
            "#N/A",
            "is an error of a spreadsheet; write the value, or leave the cell empty",
        ),
        ("beam/d", "#6", "d: '#6' is not a number with a unit"),
        (
            "beam/d",
            "200 c/c",
            "names bars or their spacing; write the number alone, such as '200 mm'",
        ),
        ("beam/d", "10M@200", "names bars or their spacing"),
        ("beam/d", "@ 200 mm", "begins with @, as a formula may; write '200 mm'"),
        ("beam/d", "@SUM(A1)", "is a formula; write the value that it shows"),
        ("beam/d", "2.07x109", "'x109' is not a unit of the list"),
        ("beam/d", "tbd", "holds no number; write for example '25 mm', or leave the cell empty"),
        ("beam/d", "21.2 inchs", "not a unit of the list; write it in mm, cm, m, in, ft"),
        ("given/f_c", "30 kN/cm2", "not a unit of the list; write it in MPa, Pa, kPa"),
        ("strength/M_r", "207 kN-mm2", "'kN-mm2' is not a unit of the list"),
        ("given/n_b", "4 bars", "has a unit, and this line has none; write '4'"),
        ("beam/d", "539 mm2", "'539 mm2' is an area, but a length is needed"),
    ],
)
def test_what_may_be_read_in_two_ways_is_refused(
    graph: Graph, tmp_path: Path, line: str, typed: str, said: str
) -> None:
    (fault,) = faults(graph, tmp_path, f'id,claimed\n{line},"{typed}"\n')
    assert fault.startswith("row 2, claimed: ")
    assert said in fault


def test_a_label_that_may_have_lost_its_last_zero_needs_its_symbol(tmp_path: Path) -> None:
    """A spreadsheet turns the label 1.10 into the number 1.1, which is another line."""
    given = {f"x_{n}": f"{n} mm" for n in range(1, 11)}
    graph = Graph(sheet_of({"a = x_1 + x_10": "mm"}, given).close())
    assert (graph["given/x_1"].label, graph["given/x_10"].label) == ("1.1", "1.10")
    (said,) = faults(graph, tmp_path, "label,claimed\n1.1,10 mm\n1.2,2 mm\n")
    assert "row 2, label: '1.1' may be 1.10, of which a spreadsheet makes 1.1" in said
    assert "write the symbol beside it, 'x_1' or 'x_10', or the id" in said
    (claim,) = read(graph, tmp_path, "label,symbol,claimed\n1.1,x_1,1 mm\n")
    assert claim.id == "given/x_1"
    (claim,) = read(graph, tmp_path, "label,claimed\n1.10,10 mm\n")
    assert claim.id == "given/x_10"


def test_a_label_that_became_a_date_is_named(graph: Graph, tmp_path: Path) -> None:
    (fault,) = faults(graph, tmp_path, "label,claimed\n02-Jan,539 mm\n")
    assert "a spreadsheet made a date of it, so type it again" in fault


def test_the_line_that_names_the_mark_between_cells_is_no_row(graph: Graph, tmp_path: Path) -> None:
    (claim,) = read(graph, tmp_path, "sep=;\nid;claimed\nbeam/d;539 mm\n")
    assert (claim.value, claim.row) == (539.0, 2)


@pytest.mark.parametrize(
    ("typed", "name"),
    [("m_R", "M_r"), ("Mr", "M_r"), ("Mᵣ", "M_r"), ("φc", "phi_c"), ("ϕ_c", "phi_c"),
     ("f'c", "f_c"), ("α1", "alpha_1"), ("As", "A_s")],
)  # fmt: skip
def test_a_symbol_written_otherwise_gets_its_own_name(
    graph: Graph, tmp_path: Path, typed: str, name: str
) -> None:
    (fault,) = faults(graph, tmp_path, f"symbol,claimed\n{typed},1 mm\n")
    assert fault.endswith(f"is not a line of this calc; write {name!r}")
