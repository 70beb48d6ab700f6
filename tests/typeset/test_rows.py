"""Rows: one wording of an entry for HTML, PDF and notebook."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.formula import Notation, Symbol
from lineproof.formula.grammar import parse_expression
from lineproof.typeset.measure import broken, shrink, width
from lineproof.typeset.plain import plain
from lineproof.typeset.rows import PrintedRow, printed_row
from lineproof.typeset.values import symbol_math, value_math
from lineproof.typeset.visitor import formula_math

NOTATION = Notation(
    [
        Symbol("a", "a", "", "", "depth of the stress block", "mm"),
        Symbol("h_f", "h", "f", "", "thickness of flange", "mm"),
        Symbol("M_r", "M", "r", "", "moment resistance", "kN.m"),
        Symbol("f_c", "f", "c", "′", "strength of concrete", "MPa"),
        Symbol("E_c", "E", "c", "", "modulus of elasticity", "MPa"),
    ]
)


def entry(kind: str, **more: Any) -> dict[str, Any]:
    """Return an entry with what all kinds have in common."""
    common = {"id": "p/x", "kind": kind, "symbol": "x", "label": "1.1", "title": "", "clause": "",
              "basis": "", "digest": "0"}  # fmt: skip
    return common | more


def texts(row: PrintedRow) -> list[str]:
    """Return the row's chains in plain text."""
    return [chain.plain for chain in row.chains]


def test_a_line_prints_formula_substitution_and_coherent_result() -> None:
    """The result stands apart, the working before it is recomputable."""
    row = printed_row(
        entry(
            "line", symbol="M_r", formula="M_r = phi_s*A_s*f_y*(d - a/2)",
            args={"phi_s": "m/phi_s", "a": "p/a"},
            printed={
                "args": {"phi_s": "0.85", "A_s": "3000", "f_y": "400", "d": "556", "a": "19.7"},
                "result": "557", "unit": "kN.m", "coherent": {"result": "557e6", "unit": "N.mm"},
            },
        ),
        NOTATION, {"m/phi_s": "2.4", "p/a": "5.1"},
    )  # fmt: skip

    assert texts(row) == [
        "M_r = phi_s A_s f_y (d - a / 2) = 0.85 x 3000 x 400 x (556 - 19.7 / 2) = 557 x 10^6 N.mm"
    ]
    assert row.result is not None
    assert plain(row.result) == "M_r = 557 kN.m"
    assert [(o.id, o.label) for o in row.origins] == [("m/phi_s", "2.4"), ("p/a", "5.1")]
    assert row.title == "Moment resistance"


def test_an_origin_names_both_symbols_only_where_they_print_differently() -> None:
    """A station and the place of a section may both print as x: "x = x" would say nothing."""
    alike = Notation([
        Symbol("x_f", "x", "", "", "place of the section", "m"),
        Symbol("x_st", "x", "", "", "station", "m"),
        Symbol("x_t", "x", "t", "", "end of the bars", "m"),
    ])  # fmt: skip
    row = printed_row(
        entry("line", symbol="V", formula="V = w*x_f", args={"x_f": "p/x_st", "w": "p/x_t"},
              printed={"args": {"w": "2", "x_f": "3"}, "result": "6", "unit": "kN",
                       "coherent": None}),
        alike, {"p/x_st": "1.1", "p/x_t": "1.2"},
    )  # fmt: skip

    assert [plain(origin.symbol) for origin in row.origins] == ["x", "w = x_t"]


def test_a_line_that_only_names_a_value_is_not_printed_twice() -> None:
    """A line "M = M_f" has no substitution apart from its result."""
    row = printed_row(
        entry("line", symbol="a", formula="a = h_f", args={},
              printed={"args": {"h_f": "140"}, "result": "140", "unit": "mm", "coherent": None}),
        NOTATION,
    )  # fmt: skip

    assert texts(row) == ["a = h_f"]


def test_empirical_numbers_are_named_with_their_units() -> None:
    """4500 in the root of MPa."""
    row = printed_row(
        entry("line", symbol="E_c", formula="E_c = 4500*sqrt(f_c)", args={}, basis="from memory",
              numbers={"4500": "MPa^0.5"},
              printed={"args": {"f_c": "32"}, "result": "25500", "unit": "MPa", "coherent": None}),
        NOTATION,
    )  # fmt: skip

    assert row.remarks == ("Units of the constants: 4500 in √MPa.",)
    assert row.basis == ""


def criterion(formula: str, left: str, right: str, *, holds: bool, **args: str) -> dict[str, Any]:
    """Return the part of an entry that a criterion fills."""
    return {
        "formula": formula, "args": {}, "holds": holds, "unit": "mm", "conclusion": "So it is.",
        "printed": {"args": args, "left": left, "right": right, "unit": "mm"},
    }  # fmt: skip


def test_two_plain_names_print_as_one_comparison() -> None:
    """Both symbols stand with their values."""
    made = criterion("a <= h_f", "26.1", "140", holds=True, a="26.1", h_f="140")
    row = printed_row(entry("decision", **made), NOTATION)

    assert texts(row) == ["a = 26.1 mm <= h_f = 140 mm"]
    assert row.verdict == "yes"
    assert row.conclusion == "So it is."


def test_a_failed_comparison_is_true_as_printed() -> None:
    """What was asked stands first; the values stand with the sign that holds."""
    made = criterion("a <= h_f", "150", "140", holds=False, a="150", h_f="140")
    row = printed_row(entry("check", **made), NOTATION)

    assert texts(row) == ["asked: a <= h_f", "a = 150 mm > h_f = 140 mm"]
    assert row.verdict == "does not hold"
    assert not row.holds


def test_a_number_that_was_asked_for_prints_its_unit() -> None:
    """No substitution follows that would tell in which unit 750 is."""
    made = criterion("h > 750", "620", "750", holds=False, h="620")
    row = printed_row(entry("decision", **made), NOTATION)

    assert texts(row) == ["asked: h > 750 mm", "h = 620 mm <= 750 mm"]


def test_an_expression_prints_in_three_lines() -> None:
    """Criterion, substitution, both values."""
    made = criterion("2*a <= h_f", "52.2", "140", holds=True, a="26.1", h_f="140")
    row = printed_row(entry("check", **made), NOTATION)

    assert texts(row) == ["2 a <= h_f", "2 x 26.1 <= 140", "52.2 mm <= 140 mm"]


def test_an_accepted_exception_still_does_not_hold() -> None:
    """Reason and initials are printed."""
    made = criterion("a <= h_f", "150", "140", holds=False, a="150", h_f="140")
    exception = {"reason": "shored until cured.", "initials": "A.V."}
    row = printed_row(entry("check", **made, exception=exception), NOTATION)

    assert row.verdict == "accepted, does not hold"
    assert row.remarks == ("Exception accepted by A.V.: shored until cured.",)


def test_givens_and_lookups_name_their_source() -> None:
    """A US unit shows what was typed; a table its row."""
    given = printed_row(
        entry("given", symbol="h_f", source="drawing A-210", printed={
            "typed": "5.5", "typed_unit": "in", "result": "139.7", "unit": "mm"}),
        NOTATION,
    )  # fmt: skip
    lookup = printed_row(
        entry("lookup", symbol="h_f", table="slabs", row="S1", source="schedule",
              printed={"result": "140", "unit": "mm"}),
        NOTATION,
    )  # fmt: skip

    feet = printed_row(
        entry("given", symbol="h_f", typed="2'-1 1/2\"", printed={
            "typed": "25.5", "typed_unit": "in", "result": "647.7", "unit": "mm"}),
        NOTATION,
    )  # fmt: skip

    assert given.remarks == ("Typed as 5.5\u202fin.", "Source: drawing A-210.")
    assert feet.remarks == ("Typed as 2'-1 1/2\", which is 25.5\u202fin.",)  # 2 x 12 + 1.5
    assert lookup.remarks == ("Table: slabs, row S1.", "Source: schedule.")


def test_a_found_value_names_procedure_arguments_and_closing_criterion() -> None:
    """The reader can confirm the value without the procedure."""
    row = printed_row(
        entry("found", symbol="a", args={}, unit="mm",
              procedure={"name": "root", "version": 2, "title": "bisection"},
              printed={"args": {"f_c": "32", "M_r": "557e6"}, "result": "26.10", "unit": "mm"},
              closing=criterion("a <= h_f", "26.10", "140", holds=True, a="26.10", h_f="140")),
        NOTATION,
    )  # fmt: skip

    assert row.text == "Found by bisection (version 2), with"
    assert [plain(m) for m in row.inputs] == ["f'c = 32 MPa", "M_r = 557 x 10^6 N.mm"]
    assert texts(row) == ["a = 26.10 mm <= h_f = 140 mm"]


def test_table_headings_name_symbol_and_unit() -> None:
    """A heading "M_r, kN.m" is typeset; other headings stay text; columns of numbers are known."""
    row = printed_row(
        entry("table", columns=["Bars", "M_r, kN.m", "Depth, of a pit"],
              rows=[["4-25M", "557", "1"], ["2-25M", "5.00e9", ""]]),
        NOTATION,
    )  # fmt: skip

    assert row.table is not None
    assert [plain(c) for c in row.table.columns] == ["Bars", "M_r, kN·m", "Depth, of a pit"]
    assert row.table.rows[1] == ("2-25M", "5.00 × 10⁹", "")
    assert row.table.numeric == (False, True, True)


@pytest.mark.parametrize("limit", [8.0, 14.0, 30.0])
def test_long_rows_break_before_signs_and_lose_nothing(limit: float) -> None:
    """Pieces joined again give the same text; each begins with a sign."""
    math = formula_math(parse_expression("a*b + c*d - a*b*c + (a + b)*c - d*d + a*a"), NOTATION)
    pieces = broken(math, limit)

    assert "".join(map(plain, pieces)) == plain(math)
    assert all(width(piece) <= limit for piece in pieces)
    assert all(plain(piece).startswith((" + ", " - ")) for piece in pieces[1:])
    assert len(pieces) > 1 or limit == 30.0


def test_a_mark_that_cannot_break_is_made_smaller() -> None:
    """There is a limit to how small it gets."""
    math = formula_math(parse_expression("(" + " + ".join(["a_bcdef"] * 30) + ")/2"), NOTATION)

    assert broken(math, 30.0) == (math,)
    longer = formula_math(parse_expression("(" + " + ".join(["a_bcdef"] * 38) + ")/2"), NOTATION)
    assert 0.4 <= shrink(longer, 30.0) == shrink(math, 30.0) < 1
    assert shrink(symbol_math(NOTATION["a"]), 30.0) == 1.0
    assert width(value_math("551", "kN.m")) == pytest.approx(1.5 + 0.17 + 4 * 0.52)


def test_a_line_breaks_inside_brackets_only_when_it_must() -> None:
    """Whole brackets stay together while they fit; else they open at their signs."""
    text = "abs(a*b*c*d*a*b - a*b*c*d*a*b*c*d)"
    math = formula_math(parse_expression(text), NOTATION)

    assert broken(math, 40.0) == (math,)
    pieces = [plain(piece) for piece in broken(math, 7.0)]
    assert pieces == ["|a b c d a b", " - a b c d a b c d|"]


def test_a_name_against_a_number_prints_as_one_comparison() -> None:
    """No substitution stands between f'c ≤ 40 and its value."""
    made = criterion("h_f <= 40", "32", "40", holds=True, h_f="32")

    assert texts(printed_row(entry("decision", **made), NOTATION)) == ["h_f = 32 mm <= 40 mm"]
    made = criterion("100 <= h_f", "100", "380", holds=True, h_f="380")
    assert texts(printed_row(entry("check", **made), NOTATION)) == ["100 mm <= h_f = 380 mm"]


@pytest.mark.parametrize(
    ("basis", "printed"),
    [("from memory", ""), ("mechanics", ""), ("Bentz 2006", "Bentz 2006")],
)
def test_basis_is_printed_where_it_says_more(basis: str, printed: str) -> None:
    """Values from memory are gathered on one page instead."""
    made = entry("note", text="x", basis=basis)

    assert printed_row(made, NOTATION).basis == printed
