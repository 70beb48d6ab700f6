"""Figures and tables as files of their own."""

from __future__ import annotations

import io
from typing import Any

import pytest
from ezdxf.filemanagement import read

from lineproof.package import calc_files
from lineproof.package.files import file_name, table_csv

from .csv_rows import rows_of
from .whole_beam import SPANS, whole_beam


def table(*cells: str) -> dict[str, Any]:
    return {"columns": [f"column {n}" for n in range(len(cells))], "rows": [list(cells)]}


def test_a_calc_gives_the_files_it_asks_for_and_the_same_every_time() -> None:
    files = calc_files(whole_beam().close().data)
    assert list(files) == [
        "B9-elevation.dxf", "B9-governing.csv", "B9-reactions.csv", "B9-bar-schedule.csv",
        "B9-envelopes.csv",
    ]  # fmt: skip
    assert files == calc_files(whole_beam().close().data)


def test_a_calc_that_asks_for_none_gives_none(record: dict[str, Any]) -> None:
    assert calc_files(record) == {}


def test_the_elevation_is_the_figure_at_full_scale() -> None:
    content = calc_files(whole_beam().close().data)["B9-elevation.dxf"]
    made = read(io.StringIO(content.decode()))
    audit = made.audit()
    assert (audit.errors, audit.fixes) == ([], [])
    texts: list[Any] = list(made.modelspace().query("MTEXT"))
    # bar marks begin anew in each calc
    assert sum(text.text.startswith("B9: ") for text in texts) == 1
    dimensions: list[Any] = list(made.modelspace().query("DIMENSION"))
    assert [dimension.get_measurement() for dimension in dimensions] == pytest.approx(SPANS)


def test_the_schedule_reads_back_as_recorded() -> None:
    content = calc_files(whole_beam().close().data)["B9-bar-schedule.csv"]
    rows = rows_of(content)
    assert content.startswith(b"\xef\xbb\xbfCalc,Mark,Size,Number")
    assert rows[0][1:] == [
        "Mark", "Size", "Number", "Shape", "A, mm", "B, mm", "Length, mm", "Mass, kg", "Where"
    ]  # fmt: skip
    assert rows[1][:9] == ["B9", "B1", "25M", "4", "00", "7010", "–", "7010", "111"]
    # Bar marks begin anew in each calc: put under another table, a row still says whose bar it is.
    assert {row[0] for row in rows[1:]} == {"B9"}
    assert len(rows) == 9


@pytest.mark.parametrize(
    "text",
    ['say "25M", twice', "two\nlines", "a,b", "Ø11 – f′c²", "it's", "", " x ", "日本", "1 2"],
)
def test_text_reads_back_as_it_was(text: str) -> None:
    """RFC 4180: fields with comma, quote or line break in quotes, quotes doubled."""
    assert rows_of(table_csv(table(text, "end")))[1] == [text, "end"]


def test_lines_end_and_quotes_stand_as_rfc_4180_says() -> None:
    made = table_csv(table('a"b', "c,d"))
    assert made == b'\xef\xbb\xbfcolumn 0,column 1\r\n"a""b","c,d"\r\n'


@pytest.mark.parametrize(
    ("text", "cell", "number"),
    [
        ("-6.5", "-6.5", -6.5),
        ("+3", "+3", 3),
        ("-1.5e-3", "-1.5e-3", -0.0015),
        ("−6.5", "-6.5", -6.5),  # a true minus would make it a text
        ("−12\u202f500", "-12500", -12500),
        ("12\u2009500", "12500", 12500),
    ],
)
def test_a_negative_number_stays_a_number(text: str, cell: str, number: float) -> None:
    (found,) = rows_of(table_csv(table(text)))[1]
    assert found == cell
    assert float(found) == number


@pytest.mark.parametrize(
    "text",
    [
        "=1+1", '=HYPERLINK("http://x","y")', "+1+1", "-1+1", "-2-25M", "@SUM(A1)", "\t=1", "\r=1",
        "\n=1", "  =1", "-", "-1\n", "＝1+1", "-1,5", "=cmd|' /C calc'!A0", "--1", "-.5x", "-१",
    ],
)  # fmt: skip
def test_no_cell_begins_a_formula(text: str) -> None:
    """A cell that begins with a sign and is no number is text: an apostrophe stands before it."""
    (cell,) = rows_of(table_csv(table(text)))[1]
    assert cell == f"'{text}"
    (heading,) = rows_of(table_csv({"columns": [text], "rows": []}))[0]
    assert heading == f"'{text}"


@pytest.mark.parametrize(
    ("calc_id", "name"),
    [
        ("B7", "B7"), ("B 7/a", "B-7-a"), ("../../etc", "-..-etc"), ("...", "calc"),
        ("梁", "-"), ("x" * 99, "x" * 60), ("C:\\a", "C--a"),
    ],
)  # fmt: skip
def test_a_calc_id_names_a_file_in_the_folder(calc_id: str, name: str) -> None:
    assert file_name(calc_id) == name
