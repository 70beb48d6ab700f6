"""Recomputing: an honest record has no difference, a changed one shows where."""

from __future__ import annotations

import copy
import hashlib
import json
import os
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from lineproof.record import Record, digest_of, recompute
from lineproof.record.printed_checks import rounds_to
from lineproof.record.procedures import PROCEDURES
from lineproof.sheet import Sheet
from lineproof.sheet.tables import LookupTable

Data = dict[str, Any]
SRC = Path(__file__).resolve().parents[2] / "src"


def _entry(data: Data, entry_id: str) -> Data:
    return next(e for part in data["parts"] for e in part["entries"] if e["id"] == entry_id)


def _found(data: Data) -> set[tuple[str, str]]:
    return {(d.id, d.what) for d in recompute(Record.from_data(data))}


def test_an_honest_record_has_no_difference(sample: Record) -> None:
    assert recompute(sample) == []


def _numbers(data: Data) -> list[tuple[Data, str, str]]:
    rows = []
    for part in data["parts"]:
        for entry in part["entries"]:
            rows += [
                (row, field, entry["id"])
                for row in (entry, entry.get("closing", {}))
                for field in ("value", "left", "right", "utilisation")
                if isinstance(row.get(field), float)
            ]
    return rows


@settings(
    max_examples=150, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture]
)
@given(draw=st.data(), by=st.floats(2e-8, 0.5), sign=st.sampled_from([1, -1]))
def test_a_change_of_any_number_is_found(
    sample: Record, draw: st.DataObject, by: float, sign: int
) -> None:
    data = copy.deepcopy(sample.data)
    row, field, entry_id = draw.draw(st.sampled_from(_numbers(data)))
    row[field] = row[field] * (1 + sign * by) or sign * by
    found = _found(data)
    what = {"value": "value", "utilisation": "utilisation"}.get(field, f"{field} side")
    assert (entry_id, what) in found


@pytest.mark.parametrize(
    ("entry_id", "path", "value", "what"),
    [
        ("inputs/f_c", ("typed",), "32.0000004 MPa", "value"),
        ("inputs/h", ("typed",), "24.000001 in", "value"),
        ("inputs/h", ("printed", "typed"), "25", "print"),
        ("inputs/h", ("printed", "result"), "609.7", "print"),
        ("inputs/w", ("printed", "result"), "41.4", "print"),
        ("inputs/A_b", ("printed", "result"), "300", "value"),
        ("inputs/A_b", ("row",), "20M", "digest"),
        ("flexure/M_f", ("formula",), "M_f = w*L**2/8.000001", "value"),
        ("flexure/M_f", ("clause",), "10.1", "digest"),
        ("flexure/M_f", ("printed", "result"), "299", "print"),
        ("flexure/M_f", ("printed", "coherent", "result"), "298e5", "print"),
        ("flexure/M_f", ("printed", "args", "L"), "7601", "print of L"),
        ("flexure/M_f", ("args", "L"), "inputs/h", "value"),
        ("flexure/M_f_at_most_M_r", ("holds",), False, "truth"),
        ("flexure/M_f_at_most_M_r", ("printed", "left"), "300", "print"),
        ("flexure/M_f_at_most_M_r", ("printed", "utilisation"), "0.54", "utilisation"),
        ("flexure/M_f_at_most_M_r", ("utilisation",), None, "utilisation"),
        ("flexure/half", ("holds",), True, "truth"),
        ("flexure/half", ("printed", "right"), "299", "printed comparison"),
        ("found/s", ("closing", "holds"), False, "truth"),
        ("found/s", ("closing", "formula"), "abs(s*s - A_sq) <= A_sq*0.01", "right side"),
        ("found/s", ("procedure", "version"), 2, "value"),
        ("found/s", ("settings", "tolerance"), 2e-9, "digest"),
        ("flexure/why", ("text",), "The block lies in the web.", "digest"),
    ],
)
def test_a_forged_entry_is_found(
    data: Data, entry_id: str, path: tuple[str, ...], value: object, what: str
) -> None:
    row = _entry(data, entry_id)
    for key in path[:-1]:
        row = row[key]
    assert row[path[-1]] != value
    row[path[-1]] = value
    assert (entry_id, what) in _found(data)


def test_the_records_own_statements_are_compared(data: Data) -> None:
    data["status"]["failed"] = []
    assert ("record", "failed checks") in _found(data)
    data["codes"]["pair"] = "NBC 2020 + A23.3:19"
    assert ("record", "digest") in _found(data)


def test_a_division_by_zero_is_a_difference_not_an_error(data: Data) -> None:
    _entry(data, "flexure/M_f")["formula"] = "M_f = w/(L - L)"
    differences = [str(d) for d in recompute(Record.from_data(data))]
    assert differences[0] == (
        "flexure/M_f: value stored 298.186, recomputed failed: float division by zero"
    )


def test_an_unknown_procedure_is_said(data: Data, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.delitem(PROCEDURES, "side of a square")
    found = [d for d in recompute(Record.from_data(data)) if d.id == "found/s"]
    assert found[0].recomputed == "failed: procedure 'side of a square' is not known here"


@pytest.mark.parametrize(
    ("text", "value", "same"),
    [
        ("551", 550.8, True), ("552", 550.8, False), ("12300", 12345.0, True),
        ("300", 298.2, False), ("12000", 12345.0, False), ("12e3", 12345.0, True),
        ("5.00e9", 5.004e9, True), ("5.00e9", 5.006e9, False), ("0", 0.3, True),
        ("0.00", 0.004, True), ("0.00", 0.006, False), ("-12.5", -12.46, True),
        ("-12.5", 12.5, False),
    ],
)  # fmt: skip
def test_rounding_of_printed_numbers(text: str, value: float, same: bool) -> None:  # noqa: FBT001
    assert rounds_to(text, value) is same


# -- digests ---------------------------------------------------------------------------------


def test_a_digest_is_the_hash_of_the_texts(sample: Record) -> None:
    def by_hand(*pieces: str) -> str:
        return hashlib.sha256("\x1f".join(pieces).encode()).hexdigest()[:16]

    given_f_c = by_hand("given", "f_c", "32 MPa", "MPa")
    assert (
        sample.entries["inputs/f_c"]["digest"]
        == given_f_c
        == digest_of("given", "f_c", "32 MPa", "MPa")
    )
    assert sample.entries["flexure/E_c"]["digest"] == by_hand(
        "line", "E_c", "E_c = 4500*sqrt(f_c)", "MPa", "8.6.2.3", f"f_c={given_f_c}"
    )
    pieces = sorted(f"{i}:{e['digest']}" for i, e in sample.entries.items())
    assert sample.digest == by_hand("B7", "NBC 2015 + A23.3-14", *pieces)


def test_a_record_saved_with_its_keys_sorted_still_follows(sample: Record) -> None:
    # Jupyter sorts the keys of all it saves.
    saved = json.loads(json.dumps(sample.data, sort_keys=True))
    assert recompute(Record.from_data(saved)) == []


@pytest.mark.parametrize(
    "typed",
    [{"f_c": "33 MPa"}, {"h": "609.6 mm"}, {"w": "41.30 kN/m"}, {"L": "7600 mm"}, {"n": "7"}],
)
def test_any_given_changes_the_digest(
    sample: Record, make_sheet: Any, typed: dict[str, str]
) -> None:
    # Also where the value stays: 24 in = 609.6 mm; what was typed is what counts.
    other = make_sheet(**typed).close()
    assert other.digest != sample.digest
    changed = {
        i for i in sample.entries if other.entries[i]["digest"] != sample.entries[i]["digest"]
    }
    assert f"inputs/{next(iter(typed))}" in changed
    assert "inputs/A_b" not in changed


def test_no_computed_float_enters_a_digest(make_sheet: Any, sample: Record) -> None:
    sheet = make_sheet()
    for part in sheet.parts:
        for entry in part.entries.values():
            if entry.kind in {"line", "found"}:
                entry.value *= 1 + 2e-16  # as another processor might
    assert sheet.close().digest == sample.digest


def test_signing_keeps_the_digest(make_sheet: Any, sample: Record) -> None:
    sheet = make_sheet()
    sheet.project["issue"] = {"by": "A.B.", "on": "2026-11-20"}
    sheet.calc["title"] = "another title"
    assert sheet.close().digest == sample.digest


_SCRIPT = """
from lineproof.sheet import Sheet
sheet = Sheet("B1")
with sheet.part("p", "P"):
    sheet.given("b", "300 mm")
    sheet.given("h", "24 in", unit="mm")
    sheet.line("I = b*h**3/12", unit="mm4")
print(sheet.close().to_text())
"""


def test_the_record_is_the_same_in_every_process() -> None:
    outputs = set()
    for seed in ("0", "1"):
        env = os.environ | {"PYTHONHASHSEED": seed, "PYTHONPATH": str(SRC), "TZ": f"UTC{seed}"}
        made = subprocess.run(
            [sys.executable, "-c", _SCRIPT], env=env, capture_output=True, text=True, check=True
        )
        outputs.add(made.stdout)
    assert len(outputs) == 1


def test_a_looked_up_value_is_read_as_the_sheet_read_it() -> None:
    """7.2 kPa less 7.2 kPa is nothing: float(7.2)*0.001 would leave the last bit, and show it."""
    table = LookupTable("loads", "use", {"q_L": "kPa"}, {"stack room": {"q_L": "7.2"}}, "made up")
    sheet = Sheet("B1")
    with sheet.part("loads", "Loads"):
        sheet.lookup("q_L", table, "stack room", title="live load")
        sheet.given("q_g", "7.2 kPa", "load given")
        sheet.line("q_r = q_L - q_g", unit="kPa", title="What remains")
    assert recompute(Record.from_text(sheet.close().to_text())) == []
