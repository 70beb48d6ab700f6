"""Schedules, quantities, drawings: what is handed over, from the design as it stands."""

from __future__ import annotations

from collections.abc import Sequence

from lineproof.beams.continuous.bending import BEND_NOTE
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.figure_bends import bends_figures
from lineproof.beams.continuous.figure_cross_section import sections_of
from lineproof.beams.continuous.figure_elevation import elevation_figures
from lineproof.beams.continuous.figure_elevation_gaps import Short
from lineproof.beams.continuous.quantities import NOTE as QUANTITY_NOTE
from lineproof.beams.continuous.quantities import quantities
from lineproof.beams.continuous.schedule import Schedule, over_stock, schedule
from lineproof.beams.continuous.schedule_checks import contradictions
from lineproof.beams.continuous.schedule_tables import (
    STIRRUP_NOTE,
    PrintedTable,
    bar_table,
    quantity_table,
    stirrup_table,
)
from lineproof.beams.steel import bends_as
from lineproof.drawing import Figure, to_json
from lineproof.errors import UserError
from lineproof.formula import FROM_MEMORY
from lineproof.record import Entry
from lineproof.sheet import Sheet

SCHEDULE = "schedule"
FIRST_SCHEDULE = 60
"""Place of the schedules on the summary pages."""


def schedule_of(design: Design) -> Schedule:
    """Return the schedule of a design; raises :class:`UserError` for bars that contradict."""
    grade = bends_as(design.model.inputs.grade)
    faults = contradictions(design.outline, design.detailing, grade)
    if faults:
        raise UserError(list(faults))
    return schedule(design.outline, design.detailing, grade)


def record_schedule(design: Design) -> None:
    """Record bar schedule, bends, stirrup schedule and quantities."""
    made = schedule_of(design)
    sheet = design.model.sheet
    rests = _rests_on(sheet)
    with sheet.part(SCHEDULE, "Schedules and quantities"):
        coated = design.model.inputs.coated
        listed = bar_table(made, coated=coated)
        _table(sheet, "bars", listed, "bar-schedule", FIRST_SCHEDULE, rests)
        for number, figure in enumerate(bends_figures(made.items), start=1):
            _figure(sheet, f"bends-{number}", figure, FIRST_SCHEDULE + 1, rests)
        _table(sheet, "stirrup-schedule", stirrup_table(made), "stirrup-schedule",
               FIRST_SCHEDULE + 2, rests)  # fmt: skip
        amounts = quantities(design.outline, made)
        _table(
            sheet, "quantities", quantity_table(amounts), "quantities", FIRST_SCHEDULE + 3, rests
        )
        sheet.note("bends-note", BEND_NOTE, title="Bends", clause="A23.1 6.6.2", basis=FROM_MEMORY)
        sheet.note("stirrups-note", STIRRUP_NOTE, title="Stirrups")
        sheet.note("quantities-note", QUANTITY_NOTE, title="Quantities")
        long = over_stock(made.detailing, bends_as(design.model.inputs.grade))
        if long:
            sheet.note("stock", " ".join(long), title="Stock length")


def _rests_on(sheet: Sheet) -> list[Entry]:
    """Return the entries that bars and stirrups rest on: areas asked for and provided."""
    names = ("A_s", "M_r", "V_r", "l_d")
    return [
        part.entries[name]
        for part in sheet.parts
        if part.key.startswith(("sag-", "hog-", "shear-", "anchorage-bar-"))
        for name in names
        if name in part.entries
    ]


def _table(
    sheet: Sheet, key: str, table: PrintedTable, csv: str, front: int, rests: Sequence[Entry]
) -> None:
    sheet.table(
        key, list(table.columns), [list(row) for row in table.rows], title=table.title,
        rests_on=rests, front=front, csv=csv,
    )  # fmt: skip


def _figure(
    sheet: Sheet, key: str, figure: Figure, front: int, rests: Sequence[Entry], dxf: str = ""
) -> None:
    sheet.figure(
        key, to_json(figure), title=figure.caption, alt=figure.alt, rests_on=rests, front=front,
        dxf=dxf,
    )  # fmt: skip


def _short(design: Design) -> list[Short]:
    """Return where given bars are not enough, as the elevation shows it."""
    if not design.given:
        return []
    return [
        Short(gap.face, gap.span, gap.start, gap.end, "gap " * gap.bare + " to ".join(gap.ends))
        for gap in design.coverage.gaps
    ]


def record_drawings(design: Design, front: int) -> None:
    """Record elevation and sections inside the open part, for the page and as DXF."""
    made = schedule_of(design)
    sheet, aggregate = design.model.sheet, design.model.inputs.aggregate.value
    rests = _rests_on(sheet)
    sections = sections_of(
        design.outline, made.detailing, aggregate=aggregate, stirrup=design.model.inputs.stirrup
    )
    marks = tuple((letter, x) for letter, x, _ in sections)
    grade = bends_as(design.model.inputs.grade)
    drawn = elevation_figures(
        design.outline, made.detailing, sections=marks, short=_short(design), grade=grade,
        coated=design.model.inputs.coated,
    )  # fmt: skip
    for number, figure in enumerate(drawn, start=1):
        dxf = "elevation" if len(drawn) == 1 else f"elevation-{number}"
        _figure(sheet, f"elevation-{number}", figure, front, rests, dxf=dxf)
    for letter, _, figure in sections:
        _figure(sheet, f"section-{letter.lower()}", figure, front + 1, rests,
                dxf=f"section-{letter.lower()}")  # fmt: skip
