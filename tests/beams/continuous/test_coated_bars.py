"""Bars coated with epoxy: longer development and hooks, closer bars for cracks (from memory).

A parking beam of two spans, T, 400 x 600 mm, 35 MPa (square root 5.91608), 60 mm of cover, 400R,
stirrups 10M: 71.3 mm of cover to the bars. 12.2.4: k_2 = 1.5 below 3 d_b of cover or 6 d_b between
the bars, else 1.2; k_1 k_2 at most 1.7. 12.5.3: 1.2 for hooks. 10.6.1: z counts 1.2 times.
"""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.errors import UserError
from lineproof.record import Record, recompute

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .flow import record_of, start

PARKADE: dict[str, Any] = {
    "spans": ["7.5 m", "7.5 m"], "supports": ["column 350 mm"] * 3, "h": "600 mm", "b_w": "400 mm",
    "h_f": "150 mm", "spacing": "3 m", "f_c": "35 MPa", "exposure": "C-1", "cover": "60 mm",
    "use": "garage, vehicles to 4000 kg", "superimposed": "0.5 kPa",
    "slab_bars": "2 x 10M at 250 mm",
}  # fmt: skip


@pytest.fixture(scope="module")
def records() -> dict[str, Record]:
    return {coating: record_of(**PARKADE, coating=coating) for coating in ("none", "epoxy")}


def test_development_by_the_table(records: dict[str, Record]) -> None:
    """0.45 or 0.60 min(k_1 k_2, 1.7) k_4 f_y d_b/sqrt(f'c), k_2 by cover and distance."""
    entries = records["epoxy"].entries
    parts = [p["key"] for p in records["epoxy"].data["parts"]]
    bars = [key for key in parts if key.startswith("anchorage-bar-")]
    assert bars
    for part in bars:
        at = {n: entries[f"{part}/{n}"]["value"] for n in ("d_b", "c_b1", "s_c", "k_1", "k_4")}
        near = at["c_b1"] < 3 * at["d_b"] or at["s_c"] < 6 * at["d_b"]
        assert entries[f"{part}/k_2"]["value"] == (1.5 if near else 1.2)
        factor = min(at["k_1"] * (1.5 if near else 1.2), 1.7) * at["k_4"]
        each = factor * 400 / 35**0.5 * at["d_b"]
        found = entries.get(f"{part}/l_d0t", entries[f"{part}/l_d0"])["value"]
        assert found == pytest.approx(0.45 * each) or found == pytest.approx(0.60 * each)


def test_hooks_and_cracks(records: dict[str, Record]) -> None:
    entries = records["epoxy"].entries
    assert {e["value"] for k, e in entries.items() if k.endswith("/k_he")} == {1.2}
    limits = [e["value"] for k, e in entries.items() if k.endswith("/z_max")]
    assert limits
    assert limits == pytest.approx([25000 / 1.2] * len(limits))


@pytest.mark.parametrize("coating", ["none", "epoxy"])
def test_no_choice_fails_its_own_check(records: dict[str, Record], coating: str) -> None:
    record = records[coating]
    assert [key for key in record.failed if not key.startswith("deflection-")] == []
    assert list(faults(record.data)) == []
    assert recompute(record) == []
    said = record.entries["given/choices"]["text"]
    assert ("coated with epoxy" in said) == (coating == "epoxy")


@pytest.mark.parametrize("coating", ["none", "epoxy"])
def test_drawing_and_schedule_name_the_coating(records: dict[str, Record], coating: str) -> None:
    """Who orders bars by the schedule or places them by the elevation sees neither page 1."""
    entries, coated = records[coating].entries, coating == "epoxy"
    shapes = entries["summary/elevation-1"]["figure"]["shapes"]
    said = [run[0] for each in shapes for run in each.get("runs", ())]
    assert ("All bars and stirrups are coated with epoxy." in said) == coated
    total = entries["schedule/bars"]["rows"][-1]
    assert (total[0], "all coated with epoxy" in total) == ("Total", coated)


def test_another_coating_is_refused() -> None:
    with pytest.raises(UserError) as caught:
        start(**PARKADE, coating="galvanized")
    (fault,) = caught.value.faults
    assert fault.startswith("coating: 'galvanized' is not")
    assert "epoxy" in fault
    assert "none" in fault
