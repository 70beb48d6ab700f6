"""The gallery beam and its calls, for the tests of beams; any input may be changed by keyword."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

from lineproof import beams
from lineproof.record import Record
from lineproof.sheet import Sheet

PROJECT_2015: Mapping[str, Any] = {"codes": {"pair": "NBC 2015 + A23.3-14"}}
GALLERY: Mapping[str, Any] = {
    "span": "7.6 m", "spacing": "3.1 m", "b_w": "380 mm", "h": "620 mm", "h_f": "140 mm",
    "f_c": "32 MPa", "grade": "400R", "superimposed": "1.8 kPa", "use": "assembly area",
    "exposure": "N", "fire_rating": "2 h", "cover": "30 mm",
}  # fmt: skip
RECTANGULAR: Mapping[str, Any] = {
    "shape": "rectangular", "h_f": None, "floor_weight": "3.4 kPa",
}  # fmt: skip
EDGE: Mapping[str, Any] = {"shape": "L", "tributary_width": "1.75 m"}
CALLS = (
    "loads", "section", "bars", "balanced", "flexure", "second_path", "minimum_steel", "top_steel",
    "crack_control", "summary",
)  # fmt: skip


def start(
    *, project: Mapping[str, Any] = PROJECT_2015, sheet: Sheet | None = None, **changes: Any
) -> beams.FloorBeam:
    """Start the gallery beam with some inputs changed, on a new sheet unless one is given."""
    sheet = sheet or Sheet("B7", "Gallery floor beam", project=project)
    return beams.floor_beam(sheet, **(dict(GALLERY) | changes))


def run(beam: beams.FloorBeam, calls: Iterable[str] = CALLS) -> Sheet:
    """Make the calls in order and return the sheet."""
    for call in calls:
        getattr(beam, call)()
    return beam.sheet


def record_of(**changes: Any) -> Record:
    """Return the record of the whole beam."""
    return run(start(**changes)).close()


def number(record: Record, entry_id: str) -> float:
    """Return a recorded value in its printed unit."""
    return float(record.entries[entry_id]["value"])


def holds(record: Record, entry_id: str) -> bool:
    """Return whether a recorded check or decision holds."""
    return bool(record.entries[entry_id]["holds"])


def bars_of(record: Record) -> str:
    """Return the bottom bars as noted: ``4-25M``."""
    text: str = record.entries["bars/bars-text"]["text"]
    return text.removeprefix("Bottom bars: ").partition(",")[0]
