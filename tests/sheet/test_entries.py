"""What can be recorded, and what an entry refuses to be used for."""

from __future__ import annotations

import math
import operator
from collections.abc import Callable
from importlib import import_module
from typing import Any

import pint
import pytest

from lineproof.errors import UserError
from lineproof.formula import Notation, Symbol, criterion, formula
from lineproof.record import Entry, Part, Procedure, Record, procedure, recompute
from lineproof.sheet import LookupTable, Sheet

NOTATION = Notation([
    Symbol("f_c", "f", "c", "′", "specified strength", "MPa"),
    Symbol("d", "d", "", "", "effective depth", "mm"),
])  # fmt: skip
M_R = formula("M_r = F*d", unit="kN.m", notation=NOTATION)
BARS = LookupTable(
    "bars", "bar size", {"A_b": "mm2", "d_b": "mm"},
    {"10M": {"A_b": "100", "d_b": "11.3"}, "25M": {"A_b": "500", "d_b": "25.2"}}, "a table",
)  # fmt: skip


@pytest.fixture
def sheet() -> Sheet:
    made = Sheet("B1", notation=NOTATION)
    with made.part("inputs", "Inputs"):
        made.given("f_c", "32 MPa")
        made.given("d", "550 mm")
        made.given("F", "850 kN")
        made.given("z", "0 mm")
    return made


@pytest.fixture
def value(sheet: Sheet) -> Entry:
    return sheet.entry("inputs/d")


OPERATIONS: list[Callable[[Any], Any]] = [
    *[
        lambda e, f=f: f(e, 2)
        for f in (
            operator.add, operator.sub, operator.mul, operator.truediv, operator.floordiv,
            operator.mod, operator.pow, operator.lt, operator.le, operator.gt, operator.ge,
            operator.matmul, divmod,
        )
    ],
    *[
        lambda e, f=f: f(2.0, e)
        for f in (
            operator.add, operator.sub, operator.mul, operator.truediv, operator.floordiv,
            operator.mod, operator.pow, operator.lt, operator.le, operator.gt, operator.ge, divmod,
        )
    ],
    lambda e: e + e, lambda e: operator.le(e, e), lambda e: 1 <= e <= 2, lambda e: max(e, e),
    lambda e: min([e, e]), lambda e: sorted([e, e]), lambda e: sum([e]), bool,
    lambda e: not e, lambda e: 1 if e else 2, lambda e: e and 1, float, int, complex, abs, round,
    operator.neg, operator.pos, operator.index, math.sqrt, math.floor, lambda e: f"{e:.3f}",
    range, lambda e: pint.UnitRegistry().Quantity(3, "mm") * e,
    lambda e: pint.UnitRegistry().Quantity(3, "mm") + e,
]  # fmt: skip


@pytest.mark.parametrize("operation", OPERATIONS, ids=range(len(OPERATIONS)))
def test_a_value_refuses_arithmetic_comparison_and_truth(
    value: Entry, operation: Callable[[Any], Any]
) -> None:
    with pytest.raises(TypeError):
        operation(value)


def test_a_value_refuses_numpy(value: Entry) -> None:
    numpy = import_module("numpy")  # its stubs would refuse the calls before they are made
    two = numpy.float64(2.0)
    operations: list[Callable[[], Any]] = [
        lambda: two * value, lambda: value * two, lambda: two <= value,
        lambda: numpy.array([1.0, 2.0]) <= value, lambda: numpy.array([1.0, 2.0]) + value,
        lambda: numpy.sqrt(value), lambda: numpy.asarray(value, dtype=float),
        lambda: numpy.linspace(0, value, 3),
    ]  # fmt: skip
    for operation in operations:
        with pytest.raises(TypeError):
            operation()


def test_the_refusal_says_what_to_write(value: Entry) -> None:
    with pytest.raises(TypeError) as caught:
        bool(value <= 140)
    assert str(caught.value) == (
        "inputs/d is a recorded given, not a number or a truth; record the comparison: "
        "sheet.decide('d <= ...'), or read d.quantity"
    )


def test_an_entry_gives_itself_and_its_quantity(value: Entry, sheet: Sheet) -> None:
    assert value in [value, None]
    assert value == value  # noqa: PLR0124 - the very same entry
    assert value != sheet.entry("inputs/F")
    assert repr(value) == "inputs/d = 550 mm"
    assert value.quantity.m_as("m") == pytest.approx(0.55)
    with sheet.part("p", "P"):
        note = sheet.note("n", "text")
        test = sheet.decide("d <= 2*d")
    assert repr(note) == "p/n (note)"
    assert repr(test) == "p/d_at_most_2_d: holds"
    assert bool(test)
    with pytest.raises(TypeError):
        bool(note)
    with pytest.raises(TypeError):
        _ = test.quantity
    with pytest.raises(TypeError):
        operator.lt(test, test)
    with pytest.raises(AttributeError):
        value.anything = 3  # type: ignore[attr-defined]


# -- givens ----------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("symbol", "typed", "unit", "sentence"),
    [
        ("f_c", "32", None, "f_c: '32' has no unit; write '32 MPa'"),
        ("f_c", "32 mm", None, "f_c: '32 mm' is a length, but a stress or pressure is needed"),
        ("f_c", "32 MPa", "mm", "f_c: 'mm' is a unit of length, but a stress or pressure is"),
        ("x", "32 furlong", None, "x: '32 furlong': 'furlong' is not a unit of the list"),
        ("x", "32 mm", "furlong", "'furlong' is not a unit of the list"),
        ("x", "nan mm", "mm", "x: 'nan mm' is not a number with a unit"),
        ("lambda", "1", None, "symbol 'lambda': use letters"),
        ("a b", "1", None, "symbol 'a b': use letters"),
        ("x", None, None, "x: name the unit to print it in"),
        ("x", [1], "mm", "x: '[1]' is not a quantity"),
    ],
)  # fmt: skip
def test_wrong_givens(
    sheet: Sheet, symbol: str, typed: Any, unit: str | None, sentence: str
) -> None:
    with pytest.raises(UserError) as caught, sheet.part("p", "P"):
        sheet.given(symbol, typed, unit=unit)
    assert str(caught.value).startswith(sentence)


def test_us_and_metric_givens_of_one_kind(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        length = sheet.given("l", "24 ft", unit="m")  # 24 x 0.3048 = 7.3152
        plain = sheet.given("n", 6)
        strength = sheet.given("f_y", "60 ksi", unit="MPa")  # 60 x 6.894757 = 413.685
        own = sheet.given("s", "12 in")
        inches = sheet.given("b", "1'-0 1/2\"")  # 12.5 in, 317.5 mm
        product = sheet.line("F_s = n*s*l*f_y", unit="kip")
    assert length.quantity.magnitude == pytest.approx(7.3152, rel=1e-14)
    assert plain.unit == ""
    assert strength.value == pytest.approx(413.68542, rel=1e-7)
    assert (own.unit, inches.unit) == ("in", "in")
    # 6 x 12 in x 288 in x 60 ksi = 1 244 160 kip
    assert product.quantity.magnitude == pytest.approx(1_244_160, rel=1e-12)
    record = sheet.close()
    assert recompute(record) == []
    # Printed in the unit in which it was typed, it is not said twice, nor given another digit.
    printed = record.entries["p/b"]["printed"]
    assert printed == {"result": "12.5", "unit": "in"}


# -- lines -----------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("text", "unit", "sentence"),
    [
        (
            "x = d/z",
            "",
            (
                "'x = d/z' cannot be computed (division by zero) with inputs/d = 550 mm, "
                "inputs/z = 0 mm"
            ),
        ),
        (
            "x = sqrt(z - d)/d**0.5",
            "",
            "'x = sqrt(z - d)/d**0.5' cannot be computed (no real number)",
        ),
        ("x = (z - d)**0.5/d**0.5", "", "'x = (z - d)**0.5/d**0.5' cannot be computed (no real"),
        ("x = abs((z - d)**0.5)/d**0.5", "", "'x = abs((z - d)**0.5)/d**0.5' cannot be computed"),
        ("x = min((z - d)**0.5, d**0.5)**2", "mm", "'x = min((z - d)**0.5, d**0.5)**2' cannot be"),
        ("x = 9**9**9", "", "formula 'x = 9**9**9': an exponent must be a plain number"),
        ("x = 9**99*9**99*9**99*9**99", "", "'x = 9**99*9**99*9**99*9**99' cannot be computed"),
        ("x = 9e99**99", "", "'x = 9e99**99' cannot be computed (no real number)"),
        ("x = 1e99*1e99*1e99*1e99", "", "'x = 1e99*1e99*1e99*1e99' cannot be computed"),
        ("x = d*unknown", "mm", "unknown is not recorded; give it first, or name it unknown=..."),
        ("x = d", None, "x: say in which unit it is printed: unit='kN.m' (unit='' for a number)"),
        ("x = d", "kN", "formula 'x = d': gives mm, which is not the result's kN"),
        ("f_c = d/d", "", "f_c: '' is a unit of number, but a stress or pressure is printed"),
        ("x = __import__('os')", "", 'formula "'),
        ("x = d", "furlong", "'furlong' is not a unit of the list"),
        ("x == d", "mm", "formula 'x == d': write one symbol"),
    ],
)
def test_wrong_lines(sheet: Sheet, text: str, unit: str | None, sentence: str) -> None:
    with pytest.raises(UserError) as caught, sheet.part("p", "P"):
        sheet.line(text, unit=unit)
    assert str(caught.value).startswith(sentence)


def test_a_catalogue_line_that_cannot_be_computed(sheet: Sheet) -> None:
    for text in ("q = F/z", "q = sqrt(z - d)", "q = min((z - d)**0.5, 1)", "q = (z - d)**0.5"):
        made = formula(text, unit="N/mm")
        with pytest.raises(UserError, match="cannot be computed"), sheet.part("p", "P"):
            sheet.line(made)


def test_a_catalogue_line_under_another_symbol_and_unit(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        first = sheet.line(M_R)
        other = sheet.line(M_R, symbol="M_max", unit="kip.ft", title="In US units")
        assert sheet.line("y = M_max/M_r", unit="").value == 1.0
    # 850 x 0.55 = 467.5 kN.m; / 1.3558179483 kN.m per kip.ft = 344.8102
    assert first.quantity.magnitude == pytest.approx(467.5, rel=1e-14)
    assert other.quantity.magnitude == pytest.approx(344.8102, rel=1e-6)
    record = Record.from_text(sheet.close().to_text())
    assert record.entries["p/M_max"]["unit"] == "kip.ft"
    assert recompute(record) == []


@pytest.mark.parametrize(
    ("keywords", "sentence"),
    [
        ({"unit": "kN"}, "M_r: 'kN' is a unit of force, but a moment is printed"),
        ({"unit": ""}, "M_r: '' is a unit of number, but a moment is printed"),
        ({"unit": "furlong"}, "'furlong' is not a unit of the list"),
        ({"symbol": "M r"}, "symbol 'M r': use letters"),
        ({"symbol": "f_c"}, "f_c: 'kN.m' is a unit of moment, but a stress or pressure is printed"),
        ({"d": 3.0}, "d: 3.0 is not a recorded value"),
        ({"x": None}, "x is not a name of the formula; it has F, d"),
    ],
)
def test_wrong_keywords(sheet: Sheet, keywords: dict[str, Any], sentence: str) -> None:
    with pytest.raises(UserError) as caught, sheet.part("p", "P"):
        sheet.line(M_R, **keywords)
    assert str(caught.value).startswith(sentence)


def test_an_argument_of_another_kind_is_refused(sheet: Sheet) -> None:
    # The formula's units were proved with d in mm; a force in its place computes without a word.
    with sheet.part("p", "P"):
        sheet.line(M_R, d=sheet.entry("inputs/F"))
    with pytest.raises(UserError, match="p/M_r: d is a length, but inputs/F is a force"):
        sheet.close()


def test_a_decision_is_no_value(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        test = sheet.decide("d <= d", key="t")
        with pytest.raises(UserError, match="d: p/t: holds is not a recorded value"):
            sheet.line(M_R, d=test)


# -- comparisons -----------------------------------------------------------------------------


def test_decisions_and_checks(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        assert sheet.decide("z <= d", key="one")
        assert not sheet.check("2*d <= d", key="two")
        assert sheet.check("d/d <= 1", key="three")
        bound = sheet.decide("x <= 2*x", key="four", x=sheet.entry("inputs/F"))
    assert bound.unit == "kN"
    record = sheet.close()
    assert record.failed == ["p/two"]
    assert record.entries["p/two"]["utilisation"] == 2.0


def test_a_criterion_that_cannot_be_computed_stops(sheet: Sheet) -> None:
    for text in ("d/z <= 1", "(z - d)**0.5/d**0.5 <= 1", "min((z - d)**0.5/d**0.5, 1) <= 1"):
        with pytest.raises(UserError, match="cannot be computed"), sheet.part("p", "P"):
            sheet.check(text)
    with pytest.raises(UserError, match="stopped with an error"):
        sheet.close()


def test_an_exception_carries_reason_and_initials(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        sheet.check("2*d <= d", key="a", accepted="temporary stage", initials="A.B.")
        sheet.check("d <= d", key="b", accepted="not needed", initials="A.B.")
        for wrong in ({"accepted": "x"}, {"initials": "A.B."}):
            with pytest.raises(UserError, match="an accepted exception needs both"):
                sheet.check("2*d <= d", key="c", **wrong)  # type: ignore[arg-type]
    entries = sheet.close().entries
    assert entries["p/a"]["exception"] == {"reason": "temporary stage", "initials": "A.B."}
    assert "exception" not in entries["p/b"]  # it holds: nothing is excepted
    assert sheet.close().failed == ["p/a"]


@pytest.mark.parametrize("key", ["a b", "é", "-x", "x/y"])
def test_keys_of_checks(sheet: Sheet, key: str) -> None:
    with pytest.raises(UserError, match="use letters, digits"), sheet.part("p", "P"):
        sheet.check("d <= d", key=key)


# -- look-ups --------------------------------------------------------------------------------


def test_lookups(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        bar = sheet.lookup("A_b", BARS, "25M", title="area of a bar")
        size = sheet.lookup("d_1", BARS, "10M", "d_b")
    assert (bar.value, size.value) == (500.0, 11.3)
    entry = sheet.close().entries["p/d_1"]
    assert entry["printed"] == {"result": "11.3", "unit": "mm"}
    assert (entry["table"], entry["row"], entry["source"]) == ("bars", "10M", "a table")
    assert BARS.number("25M", "d_b") == 25.2


@pytest.mark.parametrize(
    ("row", "column", "sentence"),
    [
        ("26M", "A_b", "A_b: '26M' is not a bar size; did you mean '25M'? There are 10M, 25M"),
        ("#5", "A_b", "A_b: '#5' is not a bar size; write one of 10M, 25M"),
        (25, "A_b", "A_b: '25' is not a bar size; did you mean '25M'? There are 10M, 25M"),
        (None, "A_b", "A_b: 'None' is not a bar size; write one of 10M, 25M"),
        ("25M", "mass", "A_b: table 'bars' has no column 'mass'; it has A_b, d_b"),
    ],
)
def test_wrong_lookups(sheet: Sheet, row: Any, column: str, sentence: str) -> None:
    with pytest.raises(UserError) as caught, sheet.part("p", "P"):
        sheet.lookup("A_b", BARS, row, column)
    assert str(caught.value) == sentence


def test_a_lookup_keeps_to_the_notation(sheet: Sheet) -> None:
    with pytest.raises(UserError, match="f_c: 'mm2' is a unit of area"), sheet.part("p", "P"):
        sheet.lookup("f_c", BARS, "25M", "A_b")


# -- found values ----------------------------------------------------------------------------


@procedure("root of a square", 1, "Root", ("A_sq",))
def root(area: float, add: float = 0.0) -> float:
    """Return the root of an area in mm, or something wrong on demand."""
    return math.nan if add < 0 else math.sqrt(area) + add


CLOSES = criterion("abs(s*s - A_sq) <= 0.001*A_sq", unit="mm2")


def test_a_found_value_is_confirmed_by_its_criterion(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        sheet.line("A_sq = d*d", unit="mm2")
        found = sheet.found("s", root, CLOSES, unit="mm", clause="1", basis="common practice")
    assert found.value == pytest.approx(550.0)
    closing = sheet.close().entries["p/s"]["closing"]
    assert closing["args"] == {"s": "p/s", "A_sq": "p/A_sq"}
    assert closing["holds"] is True
    assert closing["right"] == pytest.approx(302.5)  # 0.001 x 550^2


def _failing(_: float) -> float:
    msg = "no bracket"
    raise ValueError(msg)


@pytest.mark.parametrize(
    ("made", "closing", "unit", "add", "sentence"),
    [
        (root, CLOSES, "mm", 1.0, "s: found p/s = 551 mm, but its closing criterion"),
        (root, CLOSES, "mm", -1.0, "s: procedure 'root of a square' found no finite number"),
        (root, criterion("d <= d", unit="mm"), "mm", 0.0, "does not name it"),
        (root, CLOSES, "furlong", 0.0, "'furlong' is not a unit of the list"),
        (Procedure("failing", 1, "", ("A_sq",), _failing), CLOSES, "mm", 0.0,
         "s: procedure 'failing' failed"),
    ],
)  # fmt: skip
def test_wrong_found_values(
    sheet: Sheet, made: Procedure, closing: Any, unit: str, add: float, sentence: str
) -> None:
    with sheet.part("p", "P"):
        sheet.line("A_sq = d*d", unit="mm2")
        with pytest.raises(UserError) as caught:
            sheet.found("s", made, closing, unit=unit, settings={"add": add} if add else None)
    assert sentence in str(caught.value)
    assert "s" not in sheet.parts[-1].entries


# -- figures, tables, notes ------------------------------------------------------------------


def test_shown_entries_rest_on_values(sheet: Sheet) -> None:
    with sheet.part("other", "Other"):
        twice = sheet.given("d", "500 mm")
    with sheet.part("p", "P"):
        rests = [sheet.entry("inputs/d"), twice]
        sheet.figure("fig", {"shapes": []}, title="Section", alt="A section", rests_on=rests)
        sheet.table("tab", ["d, mm"], [["550"]], title="Depths", rests_on=rests[:1])
        sheet.note("n", "<script>#let $x$ \\", title="A note")
    record = Record.from_text(sheet.close().to_text())
    assert record.entries["p/fig"]["args"] == {"d": "inputs/d", "other/d": "other/d"}
    assert record.entries["p/tab"]["rows"] == [["550"]]
    assert record.entries["p/n"]["text"] == "<script>#let $x$ \\"
    assert [record.entries[f"p/{k}"]["label"] for k in ("fig", "tab", "n")] == ["", "", ""]
    assert recompute(record) == []
    with sheet.part("inputs", "Inputs"):
        sheet.given("d", "551 mm")
    with pytest.raises(UserError, match="part 'p' rests on inputs/d"):
        sheet.close()


@pytest.mark.parametrize(
    "drawing", [{"x": math.nan}, {"x": {1, 2}}, {"x": "\ud800"}, {"x": 10**400}, {3: 4}]
)
def test_nothing_that_json_cannot_hold_enters_a_record(sheet: Sheet, drawing: Any) -> None:
    with sheet.part("p", "P"):
        sheet.figure("fig", drawing, title="T", alt="A")
    with pytest.raises(UserError, match="is neither text nor a finite number"):
        sheet.close()


def test_entries_are_small() -> None:
    assert not hasattr(Entry(Part("p", "P"), "x", "line", None, (), 1.0), "__dict__")


# -- the calc itself ---------------------------------------------------------------------------


@pytest.mark.parametrize("calc_id", ["", " ", "B1\n", "\x1b[2J", "\u202eB1", "W" * 61, 5, None])
def test_a_calc_id_is_a_short_text(calc_id: Any) -> None:
    with pytest.raises(UserError, match="write the beam's mark, such as 'B7'"):
        Sheet(calc_id)


def test_text_that_no_file_can_hold_is_refused_with_a_sentence() -> None:
    sheet = Sheet("B1", project={"codes": {"pair": "NBC 2015 + A23.3-14"}})
    with sheet.part("given", "Given"):
        sheet.given("b", "400 mm")
        sheet.note("why", "half of a sign: \ud800")
    with pytest.raises(UserError, match="is neither text nor a finite number"):
        sheet.close()
