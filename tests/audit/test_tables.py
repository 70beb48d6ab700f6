"""Tables of claims: read as text, hostile ones refused by name, written without formulas."""

from __future__ import annotations

import csv
import io
import os
import zipfile
from pathlib import Path

import pytest
from openpyxl import Workbook, load_workbook
from openpyxl.cell.rich_text import CellRichText, TextBlock
from openpyxl.cell.text import InlineFont
from openpyxl.styles import Font
from openpyxl.worksheet.formula import ArrayFormula

from lineproof.audit.claims.tables import read_table, write_table
from lineproof.errors import UserError

GOOD = [["id", "claimed", "unit"], ["beam/d", "0.50", "m"], ["beam/b", "400", "mm"]]


def saved(folder: Path, text: str | bytes, name: str = "claims.csv") -> Path:
    path = folder / name
    path.write_bytes(text if isinstance(text, bytes) else text.encode())
    return path


def workbook(folder: Path, rows: list[list[object]], merged: str = "") -> Path:
    book = Workbook()
    sheet = book.worksheets[0]
    for row in rows:
        sheet.append(row)
    if merged:
        sheet.merge_cells(merged)
    path = folder / "claims.xlsx"
    book.save(path)
    return path


def with_member(path: Path, name: str, content: bytes) -> Path:
    with zipfile.ZipFile(path, "a", zipfile.ZIP_DEFLATED) as archive:
        archive.writestr(name, content)
    return path


def faults(path: Path) -> tuple[str, ...]:
    with pytest.raises(UserError) as caught:
        read_table(path)
    assert all(str(path) in fault for fault in caught.value.faults)
    return caught.value.faults


@pytest.mark.parametrize(
    "text",
    [
        "id,claimed,unit\nbeam/d,0.50,m\nbeam/b,400,mm\n",
        "\ufeffID ; Claimed;unit\r\nbeam/d;0.50;m\r\nbeam/b;400;mm\r\n",
        'id\tclaimed\tunit\n"beam/d"\t0.50\tm\nbeam/b\t400\tmm\n\n\n',
    ],
)
def test_csv_of_every_kind_reads_alike(tmp_path: Path, text: str) -> None:
    table = read_table(saved(tmp_path, text))
    assert table.headings == ("id", "claimed", "unit")
    assert [(row.number, *row.cells.values()) for row in table.rows] == [
        (2, "beam/d", "0.50", "m"), (3, "beam/b", "400", "mm"),
    ]  # fmt: skip


def test_rows_are_counted_as_a_spreadsheet_shows_them(tmp_path: Path) -> None:
    """A cell of two lines makes one row; an empty row counts and is passed over."""
    table = read_table(saved(tmp_path, 'id,claimed\n"two\nlines",1\n\nx,2\n'))
    assert [row.number for row in table.rows] == [2, 4]


def test_a_workbook_reads_as_it_shows(tmp_path: Path) -> None:
    """0.5 under the format 0.00 shows 0.50, which stands for less than 0.5 does."""
    path = workbook(tmp_path, [["id", "claimed", "unit"], ["beam/d", 0.5, "m"], ["beam/b", 400]])
    book = load_workbook(path)
    book.worksheets[0]["B2"].number_format = "0.00"
    book.save(path)
    rows = read_table(path).rows
    assert [row.cells["claimed"] for row in rows] == ["0.50", "400"]


@pytest.mark.parametrize("ending", [".csv", ".xlsx"])
def test_what_is_written_reads_back_and_starts_no_formula(tmp_path: Path, ending: str) -> None:
    cells = ["=1+1", "+1", "-12.5", "-x", "@SUM(A1)", "＝1", "Ø 20", '"quoted", twice', " =2"]
    content = write_table(["id", "what"], [["x", cell] for cell in cells], ending)
    path = saved(tmp_path, content, f"t{ending}")
    if ending == ".csv":
        plain = [row[1] for row in csv.reader(io.StringIO(content.decode("utf-8-sig")))][1:]
    else:
        sheet = load_workbook(path).worksheets[0]
        plain = [str(row[1].value) for row in sheet.iter_rows(min_row=2)]
        assert {row[1].data_type for row in sheet.iter_rows()} == {"s"}
    for text in plain:
        number = text.lstrip("+-").replace(".", "").isdigit()
        assert number or text.lstrip()[0] not in "=+-@＝"
    assert [row.cells["what"] for row in read_table(path).rows] == cells


@pytest.mark.parametrize("ending", [".csv", ".xlsx"])
def test_formulas_are_refused_with_row_and_column(tmp_path: Path, ending: str) -> None:
    rows: list[list[object]] = [["id", "claimed"], ["a", "=1+1"], ["b", 2], ["c", "=B2*9"]]
    path = tmp_path / "claims.csv"
    if ending == ".xlsx":
        path = workbook(tmp_path, rows)
    else:
        path.write_text("\n".join(",".join(map(str, row)) for row in rows))
    said = faults(path)
    assert len(said) == 2
    assert "row 2, claimed: '=1+1' is a formula; write the value" in said[0]
    assert "row 4, claimed" in said[1]


def test_merged_cells_are_refused(tmp_path: Path) -> None:
    path = workbook(tmp_path, [["id", "claimed"], ["a", 1], ["b", 2]], merged="A2:B2")
    assert "cells A2:B2 are merged; split them" in faults(path)[0]


def test_macros_are_refused(tmp_path: Path) -> None:
    path = workbook(tmp_path, [["id", "claimed"], ["a", 1]])
    with_member(path, "xl/vbaProject.bin", b"\0")
    assert "holds macros" in faults(path)[0]
    renamed = path.rename(tmp_path / "claims.xlsm")
    assert "save it as .xlsx without them" in faults(renamed)[0]


def test_a_zip_bomb_is_not_opened(tmp_path: Path) -> None:
    """Fifty megabytes of zeros pack into fifty kilobytes: a thousand times."""
    path = workbook(tmp_path, [["id", "claimed"], ["a", 1]])
    with_member(path, "xl/media/x.bin", bytes(50_000_000))
    assert path.stat().st_size < 100_000
    assert "times its size. Not opened" in faults(path)[0]
    big = workbook(tmp_path, [["id", "claimed"], ["a", 1]])
    with_member(big, "xl/media/x.bin", bytes(50_000_000))
    with_member(big, "xl/media/y.bin", bytes(50_000_000))
    assert "unpacks to 100 MB" in faults(big)[0]


def test_an_archive_of_many_files_or_with_declarations_is_not_opened(tmp_path: Path) -> None:
    path = workbook(tmp_path, [["id", "claimed"], ["a", 1]])
    entities = b'<?xml version="1.0"?><!DOCTYPE x [<!ENTITY a "aaaa">]><x>&a;</x>'
    with_member(path, "xl/worksheets/sheet9.xml", entities)
    assert "declarations that no spreadsheet writes" in faults(path)[0]
    many = workbook(tmp_path, [["id", "claimed"], ["a", 1]])
    with zipfile.ZipFile(many, "a") as archive:
        for number in range(600):
            archive.writestr(f"x/{number}", b"")
    assert "files inside" in faults(many)[0]


@pytest.mark.parametrize(
    ("content", "name", "said"),
    [
        (b"", "c.csv", "the file is empty"),
        (b"", "c.xlsx", "the file is empty"),
        (b"PK\x03\x04 cut off", "c.xlsx", "not a workbook, or cut off"),
        (b"id,claimed\n", "c.xlsx", "not a workbook, or cut off"),
        (b"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1", "c.xlsx", "old or locked workbook"),
        (b"PK\x03\x04", "c.csv", "a workbook with the ending .csv"),
        ("id,claimed\nx,1".encode("utf-16"), "c.csv", "UTF-16 text; save it as 'CSV UTF-8'"),
        ("id,Ø\nx,1".encode("latin-1"), "c.csv", "not UTF-8 at byte 3"),
        (b"id,claimed\0\n", "c.csv", "zero bytes"),
        (b'id,claimed\n"x,1\n', "c.csv", "no CSV"),
        (b"\n\n", "c.csv", "the file is empty"),
        (b",,\nx,1\n", "c.csv", "row 1 holds no headings"),
        (b"id,claimed,Claimed\nx,1,2\n", "c.csv", "heading 'claimed' stands twice"),
        (b"id,claimed\nx,1,2\n", "c.csv", "row 2, column 3: '2' stands beyond the last heading"),
        (b"id\nx" + b"y" * 600, "c.csv", "row 2, id: holds more than 500 characters"),
        (b"id\n" + b"y" * 200_000, "c.csv", "no CSV (field larger"),
        (b"id", "c.ods", "neither .csv nor .xlsx"),
    ],
)  # fmt: skip
def test_what_is_no_table_is_refused(tmp_path: Path, content: bytes, name: str, said: str) -> None:
    assert said in faults(saved(tmp_path, content, name))[0]


def test_a_file_that_is_not_there(tmp_path: Path) -> None:
    assert "cannot be read" in faults(tmp_path / "none.csv")[0]


def test_too_many_rows_are_refused_with_the_limit(tmp_path: Path) -> None:
    path = saved(tmp_path, "id,claimed\n" + "x,1\n" * 100_000)
    assert faults(path) == (f"{path}: more than 20 000 rows; keep one row for each claim",)


def test_too_many_rows_of_a_workbook(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = workbook(tmp_path, [["id", "claimed"], *(["x", 1] for _ in range(30))])
    assert len(read_table(path).rows) == 30
    monkeypatch.setattr("lineproof.audit.claims.tables.MOST_ROWS", 29)
    assert "more than 29 rows" in faults(path)[0]


def test_values_far_below_the_table_are_not_passed_over(tmp_path: Path) -> None:
    """In row 30 000 after a gap; a row there that only has a height is nothing."""
    path = workbook(tmp_path, [["id", "claimed"], ["x", 1]])
    book = load_workbook(path)
    sheet = book.worksheets[0]
    sheet.row_dimensions[30_000].height = 20
    book.save(path)
    assert len(read_table(path).rows) == 1
    sheet["A30000"] = "y"
    book.save(path)
    assert "rows below 20000 hold values, which are not read" in faults(path)[0]


@pytest.mark.parametrize(
    ("was", "put"),
    [
        (b'<row r="3"', b'<row r="2"'),  # a row twice
        (b'<row r="2"', b'<row r="9"'),  # row 9 before row 3
        (b'<row r="3"', b'<row r="-3"'),
        (b'r="B3"', b'r="A3"'),  # a cell twice
    ],
)
def test_rows_and_cells_that_a_reader_would_pass_over_are_told(
    tmp_path: Path, was: bytes, put: bytes
) -> None:
    name = "xl/worksheets/sheet1.xml"
    path = workbook(tmp_path, [["id", "claimed"], ["x", "1"], ["y", "2"]])
    assert [row.cells["id"] for row in read_table(path).rows] == ["x", "y"]
    with zipfile.ZipFile(path) as archive:
        members = {each: archive.read(each) for each in archive.namelist()}
    assert was in members[name]
    members[name] = members[name].replace(was, put)
    with zipfile.ZipFile(path, "w") as archive:
        for each, content in members.items():
            archive.writestr(each, content)
    assert "stand twice or out of order" in faults(path)[0]


def test_a_zip_that_is_no_workbook(tmp_path: Path) -> None:
    path = tmp_path / "claims.xlsx"
    with zipfile.ZipFile(path, "w") as archive:
        archive.writestr("readme.txt", "hello")
    assert "a zip archive without a worksheet" in faults(path)[0]
    with_member(path, "xl/worksheets/sheet1.xml", b"<worksheet")
    assert "cannot be read as a workbook" in faults(path)[0]


def test_a_date_is_told_as_one(tmp_path: Path) -> None:
    """A spreadsheet makes a date of 1-2; the reader of claims then names it."""
    import datetime as dt  # noqa: PLC0415 - here alone

    path = workbook(tmp_path, [["id", "claimed"], ["a", dt.date(2024, 2, 1)]])
    assert "(a date)" in read_table(path).rows[0].cells["claimed"]


def test_another_ending_is_not_written() -> None:
    with pytest.raises(UserError, match=r"'.pdf' is no ending of a table"):
        write_table(["id"], GOOD, ".pdf")


@pytest.mark.parametrize(
    ("name", "content"),
    [
        ("xl/strings.bin", b'<!DOCTYPE x [<!ENTITY a "600">]><x>&a;</x>'),
        ("xl/a.xml", '<!DOCTYPE x [<!ENTITY a "600">]><x>&a;</x>'.encode("utf-16")),
        ("xl/a.xml", b'<?xml version="1.0" encoding="cp037"?>' + "<!DOCTYPE x>".encode("cp037")),
    ],
    ids=["another ending", "UTF-16", "another code page"],
)
def test_declarations_are_found_however_they_are_hidden(
    tmp_path: Path, name: str, content: bytes
) -> None:
    path = with_member(workbook(tmp_path, [["id", "claimed"], ["a", 1]]), name, content)
    assert "declarations that no spreadsheet writes" in faults(path)[0]


@pytest.mark.parametrize(
    ("shown", "stored", "read"),
    [
        ("0%", 0.5, "0.5 (shown in percent)"),
        ("0,", 600000, "600000 (shown in thousands)"),
        ("#,##0", 600, "600"),
        ('0.0" % of steel"', 0.5, "0.5 % of steel"),
    ],
)
def test_a_format_that_shows_another_number_is_told(
    tmp_path: Path, shown: str, stored: float, read: str
) -> None:
    """50 % is shown where 0.5 is stored: neither may be taken for the claim in silence."""
    path = workbook(tmp_path, [["id", "claimed"], ["a", stored]])
    book = load_workbook(path)
    book.worksheets[0]["B2"].number_format = shown
    book.save(path)
    assert read_table(path).rows[0].cells["claimed"] == read


@pytest.mark.parametrize(
    ("shown", "stored", "read"),
    [
        ("0.00_ ", 620, "620.00"),
        ('_(* #,##0.00_);_(* (#,##0.00);_(* "-"??_);_(@_)', -1620, "-1620.00"),
        ('_(* #,##0.00_);_(* (#,##0.00);_(* "-"??_);_(@_)', 0, "0"),
        ("0.0#", 0.25, "0.25"),
        ("0.0#", 620, "620.0"),
        ("0", 2.5, "3"),
        ("0.00", 1.005, "1.01"),
        ("+0.0;-0.0", 12, "12.0"),
        ("+0.0;-0.0", -12, "-12.0"),
        ("0.0;[Red]0.0", -12, "-12.0"),
        ('0.0" in"', 24.4, "24.4 in"),
        ("0\\ \\m\\m", 620, "620 mm"),
        ('General" kN"', 12.5, "12.5 kN"),
        ('[>=1000]0.0," MN";0.0" kN"', 900, "900.0 kN"),
        ('[>=1000]0.0," MN";0.0" kN"', 1200, "1200 (shown in thousands)"),
        ('"approx. "0', 12, "approx. 12"),
        ("[$$-409]#,##0.00", 12, "$ 12.00"),
        ('"= "0', 12, "12 (shown with '=' before it)"),
        ("0.0;0.0", -12, "-12 (shown without its sign)"),
        (";;;", 12, "12 (hidden by its format)"),
        ('"see page"', 12, "12 (shown as 'see page')"),
    ],
)
def test_a_number_reads_as_its_format_shows_it(
    tmp_path: Path, shown: str, stored: float, read: str
) -> None:
    """Sections, places and literals as ECMA-376 Part 1, 18.8.30 and 18.8.31, give them.

    The sections are for positive, negative and zero; a place 0 is always shown, # and ? only where
    there is a digit; halves are rounded up. The unit in a format is what a checker sees.
    """
    path = workbook(tmp_path, [["id", "claimed"], ["a", stored]])
    book = load_workbook(path)
    book.worksheets[0]["B2"].number_format = shown
    book.save(path)
    assert read_table(path).rows[0].cells["claimed"] == read


@pytest.mark.parametrize(
    ("cell", "said"),
    [
        ((("10", ""), ("3", "superscript")), "'103': '3' in it is raised, a power of ten; write"),
        ((("6.2×10", ""), ("-2", "superscript")), "write it such as '1e-2'"),
        ((("62", ""), ("1", "strike"), ("0 mm", "")), "'6210 mm': '1' in it is struck out"),
    ],
)
def test_digits_raised_or_struck_out_are_not_read_as_the_others(
    tmp_path: Path, cell: tuple[tuple[str, str], ...], said: str
) -> None:
    fonts = {
        "": InlineFont(), "strike": InlineFont(strike=True),
        "superscript": InlineFont(vertAlign="superscript"),
    }  # fmt: skip
    text = CellRichText(*(TextBlock(fonts[form], part) for part, form in cell))
    (fault,) = faults(workbook(tmp_path, [["id", "claimed"], ["a", text]]))
    assert said in fault


def test_a_raised_digit_of_a_unit_is_one(tmp_path: Path) -> None:
    raised = TextBlock(InlineFont(vertAlign="superscript"), "2")
    unit = CellRichText(TextBlock(InlineFont(), "mm"), raised)
    path = workbook(tmp_path, [["id", "claimed", "unit"], ["a", 1200, unit]])
    assert read_table(path).rows[0].cells["unit"] == "mm2"


def test_a_cell_struck_out_is_refused(tmp_path: Path) -> None:
    path = workbook(tmp_path, [["id", "claimed"], ["a", 600], ["b", 2]])
    book = load_workbook(path)
    book.worksheets[0]["B2"].font = Font(strike=True)
    book.worksheets[0]["C2"].font = Font(strike=True)  # empty
    book.save(path)
    (fault,) = faults(path)
    assert "B2 struck out; empty the cells that are not claimed" in fault


def test_a_second_sheet_of_claims_is_not_passed_over(tmp_path: Path) -> None:
    path = workbook(tmp_path, [list(row) for row in GOOD])
    book = load_workbook(path)
    for title, headings in (("Notes", ["by", "unit"]), ("Shear", ["Claimed", "ID"])):
        book.create_sheet(title).append(headings)
    book.save(path)
    (fault,) = faults(path)
    assert "sheets 'Sheet' and 'Shear' both hold a table; put all rows into one" in fault
    book["Shear"].sheet_state = "hidden"
    book.save(path)
    assert len(read_table(path).rows) == 2


def test_the_first_sheet_that_is_seen_is_read(tmp_path: Path) -> None:
    path = workbook(tmp_path, [list(row) for row in GOOD])
    book = load_workbook(path)
    book.create_sheet("Lists", 0).sheet_state = "hidden"
    book.save(path)
    assert read_table(path).headings == ("id", "claimed", "unit")


def test_a_pipe_is_refused_without_waiting_for_its_writer(tmp_path: Path) -> None:
    path = tmp_path / "claims.csv"
    os.mkfifo(path)
    assert "a pipe or a device; give a saved file" in faults(path)[0]


@pytest.mark.parametrize(
    ("name", "content", "said"),
    [
        ("xl/macrosheets/sheet1.xml", b"<macrosheet/>", "holds macros"),
        ("a.xml", b'<a t="application/vnd.ms-excel.sheet.macroEnabled.main+xml"/>', "may hold"),
    ],
)
def test_macros_under_other_names_are_refused(
    tmp_path: Path, name: str, content: bytes, said: str
) -> None:
    path = with_member(workbook(tmp_path, [["id", "claimed"], ["a", 1]]), name, content)
    assert said in faults(path)[0]


def test_a_formula_of_many_cells_is_refused(tmp_path: Path) -> None:
    formula = ArrayFormula("B2:B3", "=A2:A3*2")
    path = workbook(tmp_path, [["id", "claimed"], ["a", formula], ["b", 2]])
    assert "row 2, claimed: '={...}' is a formula" in faults(path)[0]


def test_a_table_too_large_or_too_wide_is_refused(tmp_path: Path) -> None:
    large = saved(tmp_path, "id,claimed\n" + "x,1\n" * 5_000_001)
    assert "larger than 20 MB" in faults(large)[0]
    wide = saved(tmp_path, ",".join(f"h{n}" for n in range(61)) + "\n1\n")
    assert "more than 60 columns" in faults(wide)[0]
