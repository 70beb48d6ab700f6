"""The three-span gallery beam and its calls, for the tests of the whole flow."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

from lineproof import beams
from lineproof.beams.continuous.layout import BarRun
from lineproof.record import Record
from lineproof.sheet import Sheet

PROJECT: Mapping[str, Any] = {"codes": {"pair": "NBC 2015 + A23.3-14"}}
THREE_SPANS: Mapping[str, Any] = {
    "spans": ["7.6 m", "9.2 m", "7.6 m"],
    "supports": ["girder 400 mm", "column 450 mm", "column 450 mm", "girder 400 mm"],
    "h": "620 mm", "b_w": "380 mm", "h_f": "140 mm", "spacing": "3.1 m",
    "f_c": "32 MPa", "grade": "400R", "superimposed": "1.8 kPa", "use": "assembly area",
    "exposure": "N", "fire_rating": "2 h", "cover": "30 mm",
}  # fmt: skip
MIXED: Mapping[str, Any] = {
    "spans": ["2 m", "7 m", "8 m"],
    "supports": ["free", "column 450 mm", "column 450 mm", "wall 400 mm, fixed"],
    "columns": {3: ["450 mm x 450 mm x 3.6 m", "450 mm x 450 mm x 3.6 m, pinned"]},
    "h": ["500 mm", "620 mm", "700 mm"],
    "loads": [
        {"type": "L", "span": 2, "point": "40 kN", "at": "3.1 m", "what": "reaction of beam B12"},
        {"type": "D", "span": 2, "point": "60 kN", "at": "3.1 m", "what": "reaction of beam B12"},
        {"type": "D", "span": 3, "line": "5 kN/m", "from": "1 m", "to": "4 m", "what": "wall"},
        {"type": "D", "span": "all", "line": "2 kN/m", "what": "curb"},
        {"type": "L", "span": 1, "point": "10 kN", "at": "0.5 m"},
    ],
}
"""A cantilever, a support held by columns, a fixed end, three depths, single loads of all kinds."""


def start(
    *, project: Mapping[str, Any] = PROJECT, sheet: Sheet | None = None, **changes: Any
) -> beams.ContinuousBeam:
    """Start the three-span beam with some inputs changed, on a sheet given or a new one."""
    sheet = sheet or Sheet("B7", "Gallery floor beam", project=project)
    return beams.continuous_beam(sheet, **(dict(THREE_SPANS) | changes))


def without_cures(beam: beams.ContinuousBeam) -> beams.ContinuousBeam:
    """Return a beam that seeks no cures for its failing checks; the checks are the same."""
    return beams.ContinuousBeam(beam.sheet, beam.inputs, beam.pair, cures=False)


def analysed(**changes: Any) -> beams.ContinuousBeam:
    """Return the beam with its loads, spans and analysis recorded."""
    beam = start(**changes)
    beam.loads()
    beam.spans()
    beam.analysis()
    return beam


def record_so_far(beam: beams.ContinuousBeam) -> Record:
    """Close the sheet whatever chapters have been made."""
    return close_anyway(beam.sheet)


def close_anyway(sheet: Sheet) -> Record:
    """Close a sheet although not every chapter has been made."""
    sheet.expected = {}
    return sheet.close()


CALLS = (
    "loads", "spans", "analysis", "flexure", "shear", "deflections", "anchorage", "schedule",
    "summary",
)  # fmt: skip
"""The calls of the flow, in the order of the calculation."""


def run(beam: beams.ContinuousBeam, calls: Iterable[str] = CALLS) -> Sheet:
    """Make calls one after the other; return the sheet."""
    for call in calls:
        getattr(beam, call)()
    return beam.sheet


def record_of(**inputs: Any) -> Record:
    """Return the record of the whole flow for the three-span beam with some inputs changed."""
    return run(start(**inputs)).close()


def typed_row(run: BarRun) -> dict[str, Any]:
    """Return a run of bars as it is typed."""
    return {
        "face": run.face, "bars": f"{run.number}-{run.size}", "start": f"{run.start:.12g} mm",
        "end": f"{run.end:.12g} mm", "layer": run.layer, "place": run.place,
        "hook_start": run.hook_start, "hook_end": run.hook_end, "serves": run.serves,
    }  # fmt: skip
