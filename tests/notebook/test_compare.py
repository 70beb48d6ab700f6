from __future__ import annotations

import copy
from typing import Any

import pytest

from lineproof.notebook.compare import compare
from lineproof.notebook.read import calc_of
from lineproof.record import Record

Notebook = dict[str, Any]


@pytest.fixture
def stored(beam: Notebook) -> Record:
    return calc_of(beam, "beam.ipynb").record


@pytest.fixture
def again(stored: Record) -> Record:
    return Record(copy.deepcopy(stored.data))


def said(stored: Record, again: Record) -> list[str]:
    return [str(change) for change in compare(stored, again)]


def test_equal_records_agree(stored: Record, again: Record) -> None:
    assert compare(stored, again) == []


@pytest.mark.parametrize(("factor", "count"), [(1 + 1e-12, 0), (1 + 1e-10, 0), (1 + 1e-8, 1)])
def test_numbers_agree_within_a_billionth(
    stored: Record, again: Record, factor: float, count: int
) -> None:
    again.entries["flexure/M_r"]["value"] *= factor
    assert len(compare(stored, again)) == count


def test_a_changed_value_is_named_with_both_numbers(stored: Record, again: Record) -> None:
    again.entries["flexure/M_r"]["value"] = 470.25
    (line,) = said(stored, again)
    assert line.startswith("flexure/M_r: value stored 456.1023")
    assert line.endswith("made again 470.25 kN.m")


@pytest.mark.parametrize(("left", "count"), [(1e-12, 0), (1e-6, 1)])
def test_the_remainder_of_a_balance_counts_against_what_it_is_compared_with(
    stored: Record, again: Record, left: float, count: int
) -> None:
    """What balances to zero is 1e-12 kN.m on another processor: beside 456 no change."""
    stored.entries["flexure/moment"]["left"] = 0.0
    again.entries["flexure/moment"]["left"] = left
    assert len(compare(stored, again)) == count


def test_missing_and_added_lines_are_named(stored: Record, again: Record) -> None:
    moved = again.parts[1]["entries"].pop()
    assert said(stored, again) == [f"{moved['id']}: stored as holds, not made again"]
    assert said(again, stored) == [f"{moved['id']}: not stored, made as holds"]


def test_a_changed_verdict_is_named(stored: Record, again: Record) -> None:
    check = again.entries["flexure/moment"]
    check["left"], check["holds"] = 485.0, False
    assert said(stored, again) == [
        "flexure/moment: left side stored 385 kN.m, made again 485 kN.m",
        "flexure/moment: verdict stored holds, made again does not hold",
    ]


@pytest.mark.parametrize(
    ("what", "value"),
    [
        ("formula", "M_r = phi_s*A_s*f_y*(d - a)"),
        ("clause", "10.1.8"),
        ("args", {"a": "data/b"}),
    ],
)
def test_what_a_line_is_made_from_is_compared(
    stored: Record, again: Record, what: str, value: object
) -> None:
    again.entries["flexure/M_r"][what] = value
    (change,) = compare(stored, again)
    assert (change.id, change.what) == ("flexure/M_r", what)


def test_another_printed_unit_is_a_difference(stored: Record, again: Record) -> None:
    value = stored.entries["flexure/M_r"]["value"] * 1e6
    again.entries["flexure/M_r"] |= {"unit": "N.mm", "value": value}
    assert [change.what for change in compare(stored, again)] == ["value"]


def test_a_changed_kind_is_named_once(stored: Record, again: Record) -> None:
    again.entries["data/b"] |= {"kind": "line", "formula": "b = d", "args": {"d": "data/d"}}
    assert said(stored, again) == ["data/b: kind stored 'given', made again 'line'"]


def test_calc_and_code_pair_are_compared(stored: Record, again: Record) -> None:
    again.data["calc"]["id"] = "B2"
    again.data["codes"] = {"pair": "NBC 2020 + A23.3:19"}
    assert [change.what for change in compare(stored, again)] == ["id", "code pair"]


def test_project_facts_and_titles_are_no_part_of_the_calculation(
    stored: Record, again: Record
) -> None:
    again.data["project"] = {"issue": {"revision": "C"}}
    again.data["calc"]["title"] = "Beam, revised"
    again.parts[0]["title"] = "Inputs"
    assert compare(stored, again) == []


def test_two_long_texts_are_shown_where_they_part(stored: Record, again: Record) -> None:
    line = next(iter(again.entries.values()))
    stored.entries[line["id"]]["text"] = f"{'as written before, ' * 10}closer than 100 mm"
    again.entries[line["id"]]["text"] = f"{'as written before, ' * 10}closer than 120 mm"
    (said_of_it,) = said(stored, again)
    start = "…" + ("as written before, " * 10 + "closer than 1")[-40:]
    assert said_of_it == (f"{line['id']}: text stored '{start}00 mm', made again '{start}20 mm'")
