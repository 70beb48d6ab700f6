"""Values found together: two of them closing one another, through the record and back."""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import Any

import pytest

from lineproof.errors import UserError
from lineproof.formula import criterion
from lineproof.record import Record
from lineproof.record.procedures import procedure
from lineproof.record.recompute import recompute
from lineproof.sheet import Sheet
from lineproof.sheet.finding import Wanted


@procedure("sides of a rectangle", 1, "quadratic of half perimeter and area", None)
def sides(values: Mapping[str, float], *, which: float) -> float:
    """Return the longer (1) or the shorter (0) side from ``half`` perimeter and ``area``."""
    root = math.sqrt((values["half"] / 2) ** 2 - values["area"])
    return values["half"] / 2 + (root if which else -root)


LONG = criterion("abs(u*v - A_q) <= 0.001*A_q", unit="mm2", key="area")
SHORT = criterion("abs(u + v - p_h) <= 0.001*p_h", unit="mm", key="half")
WRONG = criterion("abs(u - v) <= 0.001*u", unit="mm", key="square")


def _sheet(second: Any = SHORT) -> Sheet:
    sheet = Sheet("Q1")
    with sheet.part("q", "Rectangle"):
        half = sheet.given("p_h", "700 mm", "half the perimeter")
        area = sheet.given("A_q", "120000 mm2", "area")
        args = {"half": half, "area": area}
        sheet.found_set(
            sides,
            [
                Wanted("u", LONG, "mm", args, {"which": 1}, "longer side"),
                Wanted("v", second, "mm", args, {"which": 0}, "shorter side"),
            ],
        )
    return sheet


def test_values_close_one_another_and_read_back() -> None:
    """300 x 400: the half perimeter is 700, the area 120 000 (hand calculation)."""
    record = Record.from_data(_sheet().close().data)
    assert record.entries["q/u"]["value"] == pytest.approx(400)
    assert record.entries["q/v"]["value"] == pytest.approx(300)
    assert record.entries["q/u"]["closing"]["args"]["v"] == "q/v"
    assert recompute(record) == []


def test_a_changed_value_is_told() -> None:
    data = _sheet().close().data
    data["parts"][0]["entries"][3]["value"] = 301.0
    assert "q/v" in {d.id for d in recompute(Record.from_data(data))}


def test_what_does_not_close_is_not_recorded() -> None:
    sheet = Sheet("Q1")
    with sheet.part("q", "Rectangle"):
        args = {
            "half": sheet.given("p_h", "700 mm", "half the perimeter"),
            "area": sheet.given("A_q", "120000 mm2", "area"),
        }
        wanted = [
            Wanted("u", LONG, "mm", args, {"which": 1}),
            Wanted("v", WRONG, "mm", args, {"which": 0}),
        ]
        with pytest.raises(UserError, match=r"its closing criterion .* does not name it|fails"):
            sheet.found_set(sides, wanted)
        assert {"u", "v"} & set(sheet.parts[-1].entries) == set()


def test_a_later_entry_cannot_close() -> None:
    data = _sheet().close().data
    entries = data["parts"][0]["entries"]
    entries[2], entries[1] = entries[1], entries[2]
    with pytest.raises(UserError):
        Record.from_data(data)
