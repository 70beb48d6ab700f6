"""Tables of several calcs put together: sums by hand, rows as each calc issues them."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof import Sheet
from lineproof.package import build_package, calc_files, joined_files, to_html
from lineproof.package.joined import total_quantities
from lineproof.typeset.plain import plain

from .csv_rows import rows_of

COLUMNS = ["Quantity", "Amount", "Unit"]
FIRST = [["Concrete", "5.84", "m³"], ["Steel 10M", "101.0", "kg"], ["Steel 20M", "484.9", "kg"],
         ["Steel", "585.9", "kg"], ["Steel in the concrete", "100", "kg/m³"]]  # fmt: skip
SECOND = [["Concrete", "3.69", "m³"], ["Steel 10M", "127.6", "kg"], ["Steel 15M", "248.2", "kg"],
          ["Steel", "375.8", "kg"], ["Steel in the concrete", "102", "kg/m³"]]  # fmt: skip


def calc(calc_id: str, rows: list[list[str]], columns: list[str] | None = None) -> dict[str, Any]:
    sheet = Sheet(calc_id, f"Beam {calc_id}")
    with sheet.part("deliverables", "Schedules"):
        sheet.table("q", columns or COLUMNS, rows, title="Quantities", csv="quantities")
    record: dict[str, Any] = sheet.close().data
    return record


def test_quantities_of_two_beams_are_added_up() -> None:
    """By hand: 5.84 + 3.69 = 9.53; 101.0 + 127.6 = 228.6; 585.9 + 375.8 = 961.7."""
    total = total_quantities([calc("B7", FIRST), calc("B12", SECOND)])
    assert total is not None
    assert [plain(column) for column in total.columns] == [
        "Quantity", "B7", "B12", "All 2", "Unit"
    ]  # fmt: skip
    assert total.rows == (
        ("Concrete", "5.84", "3.69", "9.53", "m³"),
        ("Steel 10M", "101.0", "127.6", "228.6", "kg"),
        # The sizes stay together, before their sum.
        ("Steel 15M", "–", "248.2", "248.2", "kg"),
        ("Steel 20M", "484.9", "–", "484.9", "kg"),
        ("Steel", "585.9", "375.8", "961.7", "kg"),
        # So much steel a cubic metre is no amount that adds up.
        ("Steel in the concrete", "100", "102", "–", "kg/m³"),
    )


def test_of_many_beams_the_sum_alone_is_printed() -> None:
    """Ten columns of numbers would leave the page; by hand: 7 × 5.84 = 40.88."""
    total = total_quantities([calc(f"B{n}", FIRST) for n in range(7)])
    assert total is not None
    assert [plain(column) for column in total.columns] == ["Quantity", "All 7", "Unit"]
    assert total.rows[0] == ("Concrete", "40.88", "m³")


def test_one_beam_alone_has_no_sum() -> None:
    other = calc("B8", [["a", "1", "b", "c"]], ["Quantity", "Amount", "Unit", "Remark"])
    assert total_quantities([calc("B7", FIRST)]) is None
    assert total_quantities([calc("B7", FIRST), other]) is None


def test_the_page_shows_the_sums_and_lists_them() -> None:
    page = to_html(build_package([calc("B7", FIRST), calc("B12", SECOND)]))
    assert '<li><a href="#quantities">Quantities of all calculations</a></li>' in page
    assert '<td class="number">961.7</td>' in page
    assert "Quantities of all calculations" not in to_html(build_package([calc("B7", FIRST)]))


def test_tables_alike_are_one_file_of_all_rows() -> None:
    records = [calc("B7", FIRST), calc("B12", SECOND)]
    (name, content), = joined_files(records).items()  # fmt: skip
    assert name == "package-quantities.csv"
    own = [rows_of(calc_files(record)[f"{record['calc']['id']}-quantities.csv"])
           for record in records]  # fmt: skip
    assert rows_of(content) == [*own[0], *own[1][1:]]


@pytest.mark.parametrize("columns", [["Quantity", "Amount", "Measure"], ["a", "b", "c"]])
def test_tables_of_other_columns_are_not_put_together(columns: list[str]) -> None:
    assert joined_files([calc("B7", FIRST), calc("B12", SECOND, columns)]) == {}
    assert joined_files([calc("B7", FIRST)]) == {}
