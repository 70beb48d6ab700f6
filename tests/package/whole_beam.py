"""A sheet with everything that stands on summary pages: wide figures, schedules, governing tables.

The beam and its numbers are invented; only their form matters.
"""

from __future__ import annotations

from typing import Any

from lineproof.drawing import (
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Polyline,
    Shape,
    Text,
    symbol,
    to_json,
    words,
)
from lineproof.formula import criterion
from lineproof.record import Entry
from lineproof.sheet import Sheet

SPANS = (7600.0, 9200.0, 7600.0)
DEPTH, COLUMN, STOREY = 620.0, 400.0, 500.0
SCALE = 1 / 150
GOVERNING = [
    "Place", "Combination", "Arrangement", "M_f, kN.m", "A_s required, mm2", "A_s provided, mm2",
    "M_r, kN.m", "Ratio", "Verdict",
]  # fmt: skip
ARRANGEMENTS = ("all spans", "spans 1 and 3", "span 2", "spans 1 and 2")


def elevation() -> Figure:
    """Return the elevation of three spans, 1 to 150: 174 mm wide on paper."""
    axes = [sum(SPANS[:k]) for k in range(4)]
    low, high = -COLUMN / 2, axes[-1] + COLUMN / 2
    shapes: list[Shape] = [
        Polyline(((low, 0), (high, 0), (high, DEPTH), (low, DEPTH)), closed=True, weight=0.4)
    ]
    for number, axis in enumerate(axes, 1):
        shapes += [
            Line((axis + side, 0), (axis + side, -STOREY), weight=0.3)
            for side in (-COLUMN / 2, COLUMN / 2)
        ]
        shapes.append(Line((axis, -STOREY - 100), (axis, DEPTH + 700), "centre", 0.13, "chain"))
        shapes.append(Circle((axis, DEPTH + 1000), 300, "centre", 0.2, "none"))
        shapes.append(Text((axis, DEPTH + 1000), words(str(number)), "centre"))
    for k, length in enumerate(SPANS):
        start, end = axes[k] + COLUMN / 2, axes[k + 1] - COLUMN / 2
        shapes.append(Line((start - 150, 60), (end + 150, 60), "bars", 0.5))
        shapes += [
            Line((start + 100 + n * 300, 40), (start + 100 + n * 300, 580), "stirrups", 0.13)
            for n in range(int(length / 300) - 2)
        ]
        shapes.append(Text(((start + end) / 2, -280), words(f"4-25M  B{k + 1}"), "text", 2.6))
        shapes.append(Dimension((axes[k], -STOREY), (axes[k + 1], -STOREY), "horizontal", -7.0))
    for axis in axes[1:3]:
        shapes.append(Line((axis - 2600, DEPTH - 60), (axis + 2600, DEPTH - 60), "bars", 0.5))
        shapes.append(Text((axis + 1400, DEPTH + 260), words("5-20M"), "text", 2.6))
    return Figure(
        174.0, 40.0, SCALE, (5.0, 16.0), tuple(shapes), "Elevation of three spans with bars",
        "Elevation, 1 : 150",
    )  # fmt: skip


def sketch() -> Figure:
    """Return a sketch of the loads."""
    arrows = [Arrow((x, 14), (x, 6)) for x in range(10, 151, 10)]
    return Figure(
        160.0, 22.0, 1.0, (0.0, 2.0),
        (Line((5, 5), (155, 5)), *arrows, Text((80, 17), (*symbol("w", "f"), (" = 47.8 kN/m",
                                                                               "roman")))),
        "Uniform load over three spans", "Loads on the beam",
    )  # fmt: skip


def whole_beam(
    calc_id: str = "B9", *, project: dict[str, Any] | None = None, holds: bool = True,
    stations: int = 60,
) -> Sheet:  # fmt: skip
    """Return a beam of three spans with front figures and tables; ``stations`` rows of envelope."""
    sheet = Sheet(calc_id, f"Floor beam {calc_id}, three spans", project=project)
    sheet.member = "floor beam, three spans"
    sheet.scope = "preliminary: form of the package only"
    checks = _moments(sheet, holds=holds)
    with sheet.part("deliverables", "Drawings and tables"):
        _front(sheet, checks, stations)
    return sheet


def _moments(sheet: Sheet, *, holds: bool) -> list[Entry]:
    made = []
    memory = "from memory"
    for number in range(1, 4):
        with sheet.part(f"flexure-{number}", f"Flexure, span {number}"):
            M_f = sheet.given("M_f", f"{300 + 20 * number} kN.m", "factored moment")
            limit = 380 if holds or number != 2 else 330
            M_r = sheet.given("M_r", f"{limit} kN.m", "resistance", clause="10.1.7", basis=memory)
            rule = criterion(
                "M_f <= M_r", title="Moment resistance", key="moment", clause="8.1.3", unit="kN.m",
                yes="The bars suffice.", no="The bars do not suffice.",
            )  # fmt: skip
            made.append(sheet.check(rule, M_f=M_f, M_r=M_r))
    return made


def _front(sheet: Sheet, checks: list[Entry], stations: int) -> None:
    drawn = elevation()
    sheet.figure(
        "elevation", to_json(drawn), title=drawn.caption, alt=drawn.alt, front=1, dxf="elevation"
    )
    rows = []
    for number, check in enumerate(checks, 1):
        demand, resistance = (side / 1e6 for side in check.value)
        rows.append(
            [
                f"Span {number}, bottom", "1.25D + 1.5L", ARRANGEMENTS[number], f"{demand:.0f}",
                f"{1700 + 100 * number}", "2000", f"{resistance:.0f}",
                f"{demand / resistance:.3f}", "holds" if check else "FAILS",
            ]
        )  # fmt: skip
    sheet.table(
        "governing", GOVERNING, rows, title="Governing moments", front=2, lines=checks,
        csv="governing",
    )  # fmt: skip
    loads = sketch()
    sheet.table(
        "take-down", ["Load", "Rule", "kN/m"],
        [["Slab", "24 kN/m3 x 0.14 m x 3.1 m", "10.4"], ["Live", "4.8 kPa x 3.1 m", "14.9"]],
        title="Load take-down", front=4,
    )  # fmt: skip
    sheet.figure("sketch", to_json(loads), title=loads.caption, alt=loads.alt, front=4)
    sheet.table(
        "reactions", ["Support", "Dead, kN", "Live, largest, kN", "Live, least, kN"],
        [[str(n), f"{80 + 90 * (n in (2, 3))}", f"{60 + 70 * (n in (2, 3))}", "-6.5"]
         for n in range(1, 5)],
        title="Reactions, unfactored", front=5, csv="reactions",
    )  # fmt: skip
    sheet.table(
        "bars", ["Mark", "Size", "Number", "Shape", "A, mm", "B, mm", "Length, mm", "Mass, kg",
                 "Where"],
        [[f"B{n}", "25M", "4", "00", f"{7000 + 10 * n}", "–", f"{7000 + 10 * n}", f"{110 + n}",
          f"bottom of span {n}, from face to face of the columns"] for n in range(1, 9)],
        title="Bar schedule", front=7, csv="bar-schedule",
    )  # fmt: skip
    sheet.table(
        "envelope", ["x, mm", "M_max, kN.m", "M_min, kN.m", "V_max, kN", "V_min, kN"],
        [[f"{400 * n}", f"{n * 3 % 345}", f"-{n * 7 % 400}", f"{n % 182}", f"-{n % 150}"]
         for n in range(stations)],
        title="Envelopes at stations", csv="envelopes", widths=(20, 30, 30, 30, 30),
    )  # fmt: skip
