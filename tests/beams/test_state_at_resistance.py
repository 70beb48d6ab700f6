"""Strain and forces of the strain figure: lines of their own, in balance, on straight strains."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.record import recompute

from .gallery import RECTANGULAR, number, record_of
from .pocket import faults

IN_WEB: dict[str, Any] = {
    "b_w": "400 mm", "h_f": "60 mm", "spacing": "0.9 m", "bottom_bars": "4-35M", "ends": "free",
}  # fmt: skip
CASES: dict[str, dict[str, Any]] = {
    "block in the flange": {"bottom_bars": "4-25M"},
    "block in the web": IN_WEB,
    "web and compression bars": {**IN_WEB, "compression_bars": "2-20M"},
    "rectangle": {**RECTANGULAR, "bottom_bars": "4-25M"},
    "rectangle and compression bars": {
        **RECTANGULAR, "bottom_bars": "4-25M / 4-25M", "compression_bars": "3-20M",
    },
}  # fmt: skip


@pytest.mark.parametrize("inputs", CASES.values(), ids=CASES)
def test_forces_balance_and_strains_are_straight(inputs: dict[str, Any]) -> None:
    """Statics: no axial force. Similar triangles: eps_s/(d - c) = eps_cu/c."""
    record = record_of(**inputs)
    forces = {
        entry["symbol"]: number(record, place)
        for place, entry in record.entries.items()
        for part, _, key in [place.partition("/")]
        if part in ("flexure", "summary") and key in ("C_c", "C_f", "C_w", "C_s", "T_s")
    }
    assert ("C_w" in forces) == (inputs.get("h_f") == "60 mm")
    assert ("C_s" in forces) == ("compression_bars" in inputs)
    assert sum(forces.values()) == pytest.approx(2 * forces["T_s"], rel=1e-9)
    c, d = number(record, "flexure/c"), number(record, "bars/d")
    eps_s = number(record, "summary/eps_s")
    assert eps_s == pytest.approx(0.0035 * (d - c) / c, rel=1e-9)
    assert list(faults(record.data)) == []
    assert recompute(record) == []


@pytest.mark.parametrize("inputs", CASES.values(), ids=CASES)
def test_the_figure_names_what_stands_in_lines(inputs: dict[str, Any]) -> None:
    """The figure rests on the forces it shows, so a change of one invalidates it."""
    record = record_of(**inputs)
    rests_on = set(record.entries["summary/strains"]["args"].values())
    assert {"summary/T_s", "summary/eps_s"} <= rests_on
    assert any(place.endswith(("/C_c", "/C_w")) for place in rests_on)


def test_gallery_by_hand() -> None:
    """0.85 x 2000 x 400 = 680 kN; 0.0035 x (0.890 x 566.1 - 13.15)/13.15 = 0.1306."""
    record = record_of(bottom_bars="4-25M")
    assert number(record, "summary/T_s") == pytest.approx(680)
    assert number(record, "summary/C_c") == pytest.approx(680)
    assert number(record, "summary/eps_s") == pytest.approx(0.1306, abs=0.00005)
