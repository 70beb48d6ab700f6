"""A beam seen from the other side of the street is the same beam: every check of it, in a mirror.

Nothing but symmetry is expected here; each side of the comparison is a design of its own. Clear
lengths and places are whole multiples of the spacing of stations, so that these mirror as well.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from typing import Any

import pytest

from lineproof.record import Record

from .flow import record_of

FRAME: Mapping[str, Any] = {
    "spans": ["6.3 m", "6.8 m", "5.4 m"],
    "supports": ["wall 600 mm", "column 250 mm", "girder 400 mm", "wall 300 mm"],
    "columns": {2: ["250 mm x 500 mm x 3.2 m", "250 mm x 500 mm x 3.2 m"]},
    "h": "570 mm", "b_w": "320 mm", "h_f": "134 mm", "shape": "L", "spacing": "2.6 m",
    "tributary_width": "1.9 m", "f_c": "25 MPa", "grade": "500R", "superimposed": "3.6 kPa",
    "use": "office", "exposure": "C-1", "cover": "40 mm", "slab_bars": "2 x 10M at 300 mm",
    "loads": [
        {"type": "D", "span": 2, "point": "17 kN", "at": "3.08 m"},
        {"type": "L", "span": 3, "point": "80 kN", "at": "1.9 m"},
    ],
}  # fmt: skip
TURNED: Mapping[str, Any] = {
    "spans": ["8.2 m", "7.9 m", "7.4 m"],
    "supports": ["wall 450 mm", "column 250 mm", "girder 400 mm", "column 450 mm"],
    "columns": {4: ["450 mm x 400 mm x 4.2 m"]},
    "h": ["530 mm", "530 mm", "630 mm"], "b_w": "340 mm", "h_f": "181 mm", "shape": "L",
    "spacing": "4.2 m", "tributary_width": "1.5 m", "f_c": "25 MPa", "grade": "500R",
    "superimposed": "0.4 kPa", "exposure": "F-1", "cover": "40 mm",
    "slab_bars": "2 x 10M at 300 mm", "closed_stirrups": True,
    "torques": {"D": "7 kN.m", "L": "2 kN.m"}, "torsion": "equilibrium",
}  # fmt: skip
OVERHANG: Mapping[str, Any] = {
    "spans": ["9.4 m", "8.9 m", "2.8 m"],
    "supports": ["wall 400 mm", "wall 400 mm", "wall 300 mm", "free"],
    "h": "630 mm", "b_w": "540 mm", "h_f": "131 mm", "shape": "L", "spacing": "3.9 m",
    "tributary_width": "1.3 m", "f_c": "35 MPa", "grade": "400W", "superimposed": "0.5 kPa",
    "cover": "40 mm", "slab_bars": "2 x 10M at 300 mm", "reduce_live_load": True,
    "loads": [
        {"type": "D", "span": 2, "point": "67 kN", "at": "1.66 m"},
        {"type": "D", "span": 3, "point": "48 kN", "at": "0.39 m"},
    ],
}  # fmt: skip
MOST_ALIKE = 1e-6
"""Relative difference of a ratio by the order of sums; no printed place is rounded here."""


def mirrored(given: Mapping[str, Any]) -> dict[str, Any]:
    """Return the inputs with right for left; loads of these beams are single point loads."""
    count = len(given["spans"])
    made = {**given, "spans": given["spans"][::-1], "supports": given["supports"][::-1]}
    if isinstance(given["h"], list):
        made["h"] = given["h"][::-1]
    if "columns" in given:
        made["columns"] = {count + 2 - n: rows for n, rows in given["columns"].items()}
    lengths = [float(text.split()[0]) for text in given["spans"]]
    made["loads"] = [
        load
        | {
            "span": count + 1 - load["span"],
            "at": f"{lengths[load['span'] - 1] - float(load['at'].split()[0]):.6g} m",
        }
        for load in given.get("loads", [])
    ]
    return made


def checks(record: Record) -> list[tuple[str, str, bool, float]]:
    """Return clause, title without its place, truth and utilisation of every check, in order."""
    made = []
    for entry in record.entries.values():
        if entry["kind"] == "check" and entry.get("utilisation") is not None:
            title = re.sub(r"left|right|[0-9]+", "#", entry["title"])
            made.append((entry["clause"], title, entry["holds"], entry["utilisation"]))
    return sorted(made)


@pytest.mark.parametrize(
    ("given", "interfaces"), [(FRAME, 5), (TURNED, 6), (OVERHANG, 6)],
    ids=["frame", "turned", "overhang"],
)  # fmt: skip
def test_mirrored_beam_has_the_same_checks(given: Mapping[str, Any], interfaces: int) -> None:
    """All checks with their ratios; the closings that measure rounding alone are left out.

    At least ``interfaces`` of them are of the flange, whose lengths are rounded to whole mm.
    """
    one, other = checks(record_of(**given)), checks(record_of(**mirrored(given)))
    assert len([row for row in one if row[0] == "11.5"]) >= interfaces
    rows = [(a, b) for a, b in zip(one, other, strict=True) if max(a[3], b[3]) > MOST_ALIKE]
    assert len(rows) > 100
    for a, b in rows:
        assert a[:3] == b[:3]
        within = 2e-3 if a[0] == "11.5" else MOST_ALIKE
        assert a[3] == pytest.approx(b[3], rel=within)
