"""Figures and tables: where they are printed, which files they make, what they rest on."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.errors import UserError
from lineproof.formula import criterion
from lineproof.record import Record, recompute
from lineproof.sheet import Sheet


@pytest.fixture
def sheet() -> Sheet:
    made = Sheet("B1")
    with made.part("inputs", "Inputs"):
        made.given("d", "550 mm", "depth")
        made.given("h", "620 mm", "height")
        made.check(criterion("d <= h", title="Depth", key="fits", yes="Yes.", no="No."))
    return made


def closed(sheet: Sheet) -> Record:
    return Record.from_text(sheet.close().to_text())


def record_all(sheet: Sheet, **placed: Any) -> None:
    lines = [sheet.entry("inputs/d"), None, sheet.entry("inputs/fits")]
    with sheet.part("p", "P"):
        sheet.figure(
            "elevation", {"shapes": []}, title="Elevation", alt="An elevation",
            rests_on=[sheet.entry("inputs/d")], **{k: v for k, v in placed.items() if k != "csv"},
        )  # fmt: skip
        sheet.table(
            "bars", ["Mark", "d, mm"], [["a", "550"], ["b", ""], ["c", "FAILS"]], title="Bars",
            widths=(12, 0) if placed else (), lines=lines,
            **{k: v for k, v in placed.items() if k != "dxf"},
        )  # fmt: skip


def test_place_and_files_are_recorded(sheet: Sheet) -> None:
    record_all(sheet, front=3, dxf="elevation", csv="bar-schedule")
    record = closed(sheet)
    figure, table = record.entries["p/elevation"], record.entries["p/bars"]
    assert (figure["front"], figure["dxf"]) == (3, "elevation")
    assert (table["front"], table["csv"], table["widths"]) == (3, "bar-schedule", [12, 0])
    assert table["lines"] == ["inputs/d", "", "inputs/fits"]
    assert table["args"] == {"d": "inputs/d", "fits": "inputs/fits"}
    assert recompute(record) == []


def test_where_a_figure_is_printed_changes_no_digest(sheet: Sheet) -> None:
    record_all(sheet)
    before = closed(sheet)
    assert not {"front", "dxf", "csv", "widths"} & {
        key for entry in before.entries.values() for key in entry
    }
    record_all(sheet, front=0, dxf="elevation", csv="bars")
    assert closed(sheet).digest == before.digest


def test_a_table_is_out_of_date_with_the_check_that_a_row_shows(sheet: Sheet) -> None:
    record_all(sheet)
    with sheet.part("inputs", "Inputs"):
        sheet.given("d", "550 mm", "depth")
        sheet.given("h", "500 mm", "height")
        sheet.check(criterion("d <= h", title="Depth", key="fits", yes="Yes.", no="No."))
    with pytest.raises(UserError, match="part 'p' rests on inputs/fits, which has changed since"):
        sheet.close()


def test_an_entry_named_several_times_counts_once(sheet: Sheet) -> None:
    d = sheet.entry("inputs/d")
    with sheet.part("p", "P"):
        sheet.table("t", ["d"], [["1"]] * 3, title="T", rests_on=[d, d], lines=[d, d, d])
    assert recompute(closed(sheet)) == []


BAD: list[tuple[str, dict[str, Any], str]] = [
    ("figure", {"front": -1}, "front=-1 is no place on the summary pages"),
    ("figure", {"front": True}, "front=.* is no place on the summary pages"),
    ("figure", {"front": 1.5}, "front=1.5 is no place"),
    ("figure", {"front": 10_000}, "front=10000 is no place"),
    ("figure", {"dxf": "../x"}, r"dxf='\.\./x' cannot name a file; use letters"),
    ("figure", {"dxf": 3}, "dxf=3 cannot name a file"),
    ("table", {"csv": "a b"}, "csv='a b' cannot name a file"),
    ("table", {"csv": "x" * 61}, "cannot name a file"),
    ("table", {"csv": "x\n"}, "cannot name a file"),
    ("table", {"widths": [10]}, "give one width a column"),
    ("table", {"widths": [10, -1]}, "give one width a column"),
    ("table", {"widths": [10, "1"]}, "give one width a column"),
    ("table", {"lines": [None, None]}, "do not name one entry a row"),
]


@pytest.mark.parametrize(("kind", "given", "said"), BAD)
def test_what_cannot_be_printed_is_refused(
    sheet: Sheet, kind: str, given: dict[str, Any], said: str
) -> None:
    with sheet.part("p", "P"):
        if kind == "figure":
            sheet.figure("f", {}, title="F", alt="F", **given)
        else:
            sheet.table("t", ["a", "b"], [["1", "2"]], title="T", **given)
    with pytest.raises(UserError, match=said):
        sheet.close()


def test_two_files_of_one_name_are_refused(sheet: Sheet) -> None:
    with sheet.part("p", "P"):
        sheet.table("one", ["a"], [["1"]], title="T", csv="bars")
        sheet.table("two", ["a"], [["1"]], title="T", csv="Bars")
        sheet.figure("f", {}, title="F", alt="F", dxf="bars")
    with pytest.raises(UserError) as refused:
        sheet.close()
    assert refused.value.faults == (
        "record: p/two: p/one is also called csv='Bars'; give each file its own name",
    )


def test_a_row_of_a_stored_table_cannot_name_a_line_elsewhere(sheet: Sheet) -> None:
    record_all(sheet)
    data = closed(sheet).data
    data["parts"][1]["entries"][1]["lines"][0] = "inputs/h"
    with pytest.raises(UserError, match="do not name one entry a row that it rests on"):
        Record.from_data(data)
