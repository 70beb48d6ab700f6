"""Lines that repeat earlier ones: which are told so, which are worked again, and that all link."""

from __future__ import annotations

import io
import re
from collections.abc import Sequence
from typing import Any

import pypdf
import pytest

from lineproof.package import build_package, to_html, to_pdf
from lineproof.package.calc import PartBlock
from lineproof.package.reviewed import PrintedReview
from lineproof.sheet import Sheet

from .noted import noted

Record = dict[str, Any]


def record_of(moments: Sequence[str], *, h: str = "500 mm") -> Record:
    """Return a record with a part for each moment: two lines and a check against 200 kN.m."""
    sheet = Sheet("B1")
    with sheet.part("data", "Data"):
        sheet.given("M_r", "200 kN.m", "resistance")
        sheet.given("h", h, "depth")
    for number, moment in enumerate(moments, 1):
        with sheet.part(f"span-{number}", f"Span {number}"):
            sheet.given("M_1", moment, f"moment of span {number}", source="analysis")
            sheet.line("M_f = 1.5*M_1", unit="kN.m", title=f"Factored moment of span {number}")
            sheet.check("M_f <= M_r", title="Resistance")
            sheet.note("Bars", "The bars run through.")
    return sheet.close().data


def told(record: Record, review: PrintedReview | None = None) -> dict[str, str]:
    """Return the label of every line that is told as a repeated one, and of the one it repeats."""
    blocks = build_package([record], reviews=[review]).calcs[0].blocks
    return {
        same.row.label: same.label
        for block in blocks
        if isinstance(block, PartBlock)
        for group in block.groups
        for same in group.repeated
    }


def test_equal_lines_name_the_first_that_was_worked() -> None:
    """The third part repeats the first, not the second, which is not worked itself."""
    record = record_of(["90 kN.m", "90 kN.m", "90 kN.m"])

    assert told(record) == {
        "3.1": "2.1", "3.2": "2.2", "3.3": "2.3", "4.1": "2.1", "4.2": "2.2", "4.3": "2.3",
    }  # fmt: skip


def test_another_number_is_worked_again() -> None:
    """90.0001 kN.m gives another line, though its result would be rounded to the same."""
    assert told(record_of(["90 kN.m", "90.0001 kN.m"])) == {}


def test_equal_prints_of_unequal_values_are_worked_again() -> None:
    """Two values that differ behind equal prints are two values."""
    record = record_of(["90 kN.m", "90 kN.m"])
    line = record["parts"][2]["entries"][1]
    line["value"] *= 1 + 1e-8

    assert told(record) == {"3.1": "2.1", "3.3": "2.3"}


def test_a_check_that_does_not_hold_is_never_told_short() -> None:
    """1.5 x 140 = 210 kN.m is more than 200 kN.m, in both parts with all its numbers."""
    record = record_of(["140 kN.m", "140 kN.m"])

    assert told(record) == {"3.1": "2.1", "3.2": "2.2"}


def test_a_long_note_is_printed_once() -> None:
    """The second names the part of the first; a short one, or one beside a failure, stands whole.

    The sentence has 126 letters, a line of print about 100; 1.5 x 140 is more than 200 kN.m.
    """
    long = "The bars run through the support, " * 3 + "and end in the span."

    def record(moment: str) -> Record:
        made = record_of(["90 kN.m", moment])
        for part in made["parts"][1:]:
            part["entries"].append(part["entries"][-1] | {"id": f"{part['key']}/n", "text": long})
        return made

    blocks = build_package([record("90 kN.m")]).calcs[0].blocks
    notes = [
        (same.row.text, same.id, same.label)
        for block in blocks
        if isinstance(block, PartBlock)
        for group in block.groups
        for same in group.repeated
        if same.row.kind == "note"
    ]
    assert notes == [(long, "span-1/n", "part 2")]
    assert "" not in told(record("140 kN.m"))


def test_a_marked_line_is_worked_where_it_stands() -> None:
    """A note beside a line needs the line."""
    record = record_of(["90 kN.m", "90 kN.m"])

    assert told(record, noted({"span-2/M_f": ("see drawing",)})) == {"3.1": "2.1", "3.3": "2.3"}


@pytest.mark.parametrize(
    ("field", "other"),
    [("clause", "9.9"), ("basis", "test"), ("formula", "M_f = M_1*1.5"), ("unit", "N.mm")],
)
def test_what_reads_differently_is_worked_again(field: str, other: str) -> None:
    """Clause, basis, formula and unit are part of what a line says."""
    record = record_of(["90 kN.m", "90 kN.m"])
    record["parts"][2]["entries"][1][field] = other

    assert "3.2" not in told(record)


def test_every_row_stands_in_one_group() -> None:
    """Nothing is left out and the order is kept."""
    blocks = build_package([record_of(["90 kN.m", "90 kN.m"])]).calcs[0].blocks
    for block in blocks:
        assert isinstance(block, PartBlock)
        rows = [
            row
            for group in block.groups
            for row in (*group.rows, *(same.row for same in group.repeated))
        ]
        assert rows == list(block.rows)


def test_page_links_the_repeated_line_and_keeps_its_result() -> None:
    """The result 135 kN.m = 1.5 x 90 stands in both parts, the working in the first."""
    page = to_html(build_package([record_of(["90 kN.m", "90 kN.m"])]))
    row = page.partition('id="span-2/M_f"')[2].partition('<div class="entry"')[0]

    assert '<a href="#span-1/M_f">as 2.2</a>' in row
    assert "Factored moment of span 2" in row
    assert "135" in row
    assert "1.5" not in re.sub(r"<[^>]+>", " ", row)


def test_pdf_tells_what_a_repeated_line_is() -> None:
    """The numbers of the lines, the verdict and the sentence that explains them are printed."""
    package = build_package([record_of(["90 kN.m", "90 kN.m"])])
    pages = pypdf.PdfReader(io.BytesIO(to_pdf(package))).pages
    text = " ".join(" ".join(page.extract_text() for page in pages).split())

    assert "repeats the line or note of that number" in text
    for label in ("as 2.1", "as 2.2", "as 2.3"):
        assert label in text
    assert len(re.findall("holds, ratio 0.68", text)) == 2


def test_working_without_repeated_lines_does_not_explain_them() -> None:
    """No sentence without a cause."""
    assert "repeats the line" not in to_html(build_package([record_of(["90 kN.m"])]))


def test_values_to_confirm_name_no_repeated_line() -> None:
    """The line of the first span stands for that of the second, which repeats it."""
    record = record_of(["90 kN.m", "90 kN.m", "80 kN.m"])
    lines = ["span-1/M_f", "span-2/M_f", "span-3/M_f"]
    record["confirm"] = [
        {"clause": "8.3.2", "what": "Factor", "basis": "from memory", "confirmed": "",
         "lines": lines},
    ]  # fmt: skip
    items = build_package([record]).calcs[0].confirm

    assert [label for item in items for _, label in item.lines] == ["2.2", "4.2"]
