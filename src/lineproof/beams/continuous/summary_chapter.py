"""The summary pages of a beam: drawings, governing tables, loads, reactions, envelopes."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.cures_flow import COLUMNS as FAILING_COLUMNS
from lineproof.beams.continuous.cures_flow import TITLE as FAILING
from lineproof.beams.continuous.cures_flow import WIDTHS as FAILING_WIDTHS
from lineproof.beams.continuous.cures_flow import Found, failing_rows
from lineproof.beams.continuous.deflection_figure import deflection_shapes_figure
from lineproof.beams.continuous.deliverables import record_drawings
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.envelope_sections import moment_sections, shear_sections
from lineproof.beams.continuous.faces import restrained_supports
from lineproof.beams.continuous.figure_along import in_figures
from lineproof.beams.continuous.figure_envelope import (
    MomentPiece,
    ShearPiece,
    moment_figure,
    shear_figure,
)
from lineproof.beams.continuous.figure_loads import loads_figure
from lineproof.beams.continuous.imported_record import REACTIONS_TITLE
from lineproof.beams.continuous.model import LOADS, Model
from lineproof.beams.continuous.resistance import provide
from lineproof.beams.continuous.resistance_demand import covered_length, stretches_at
from lineproof.beams.continuous.restraint import left_out
from lineproof.beams.continuous.summary_supports import COLUMNS as FOR_COLUMNS
from lineproof.beams.continuous.summary_supports import TITLE as FOR_SUPPORTS
from lineproof.beams.continuous.summary_supports import TURNING, support_rows, turning_table
from lineproof.beams.continuous.summary_supports import WIDTHS as FOR_WIDTHS
from lineproof.beams.continuous.summary_tables import (
    FLEXURE,
    FLEXURE_WIDTHS,
    SERVICE,
    SERVICE_WIDTHS,
    SHEAR,
    SHEAR_WIDTHS,
    Row,
    flexure_rows,
    printed,
    reaction_table,
    service_rows,
    shear_rows,
    unit_word,
)
from lineproof.beams.continuous.summary_torsion import (
    TITLE,
    TORSION,
    TORSION_WIDTHS,
    torsion_rows,
)
from lineproof.beams.continuous.symbols import KINDS
from lineproof.drawing import Figure, to_json
from lineproof.record import Entry
from lineproof.record.entry import GIVEN, VALUES
from lineproof.sentences import begun
from lineproof.sheet import Sheet

SUMMARY = "summary"
FAILS, DRAWN, TABLES, TAKE_DOWN, REACTIONS, ALONG = 5, 10, 20, 30, 40, 50
"""Places on the summary pages; the schedules stand behind them."""
PIECES = 100
INSIDE = 1e-3
"""How far inside the faces the stirrups at a face count [mm]."""
CSV_PIECES = 20
_ENVELOPE = [
    "Span",
    "x, m",
    "M, largest, kN.m",
    "M, smallest, kN.m",
    "V, largest, kN",
    "V, smallest, kN",
]
_LOADS = ["Load", "Value"]


def record_summary(design: Design, cures: Found) -> None:
    """Record the summary: what governs everywhere, drawn and in tables; ``cures`` found so far."""
    model = design.model
    sheet = model.sheet
    with sheet.part(SUMMARY, "Summary of the beam"):
        record_drawings(design, DRAWN)
        fails = list(failing_rows(design, cures))
        if fails:
            _table(sheet, "failing", FAILING, FAILING_COLUMNS, fails, FAILS, widths=FAILING_WIDTHS)
        for number, (key, title, columns, widths, rows) in enumerate(_tables(design)):
            _table(sheet, key, title, columns, rows, TABLES + number, widths=widths)
        asked = list(support_rows(design))
        if asked:
            _table(sheet, "for-supports", FOR_SUPPORTS, FOR_COLUMNS, asked, DRAWN + 2,
                   widths=FOR_WIDTHS)  # fmt: skip
        _record_loads(model)
        columns, rows = reaction_table(model)
        title = "Reactions, unfactored, by load type"
        if model.imported is not None:
            title = REACTIONS_TITLE
        _table(sheet, "reactions", title, columns, rows, REACTIONS, csv="reactions")
        columns, rows = turning_table(model)
        if rows:
            _table(sheet, "support-moments", TURNING, columns, rows, REACTIONS + 1,
                   csv="support-moments")  # fmt: skip
        _record_envelopes(design)


def _tables(
    design: Design,
) -> Iterator[tuple[str, str, list[str], Sequence[float], Iterable[Row]]]:
    yield "flexure", "Flexure: what governs", FLEXURE, FLEXURE_WIDTHS, flexure_rows(design)
    yield "shear", "Shear: what governs", SHEAR, SHEAR_WIDTHS, shear_rows(design)
    turned = list(torsion_rows(design))
    if turned:
        yield "torsion", TITLE, TORSION, TORSION_WIDTHS, turned
    yield (
        "service", "Cracks, minimum bars, deflections", SERVICE, SERVICE_WIDTHS,
        service_rows(design.model),
    )  # fmt: skip


def _table(
    sheet: Sheet,
    key: str,
    title: str,
    columns: list[str],
    rows: Iterable[Row],
    front: int,
    *,
    csv: str = "",
    widths: Sequence[float] = (),
) -> None:
    kept = list(rows)
    sheet.table(
        key, columns, [list(row.cells) for row in kept], title=title,
        lines=[row.entry for row in kept], front=front, csv=csv, widths=widths,
    )  # fmt: skip


def _record_loads(model: Model) -> None:
    sheet = model.sheet
    names = {kind: words for kind, words in KINDS.items() if kind in model.kinds()}
    loads = sheet.entries_of(LOADS)
    shown = [e for e in loads.values() if e.kind in VALUES and e.symbol.startswith(("w_", "P_"))]
    if model.forces.loads:
        figure = loads_figure(
            [entry.value for entry in model.lengths], model.forces.beam.supports,
            model.forces.loads, names,
        )  # fmt: skip
        _figure(sheet, "loads", figure, TAKE_DOWN, shown)
    rows = [
        Row((_title(entry), f"{printed(entry.value, entry.unit)} {unit_word(entry.unit)}"), entry)
        for entry in shown
    ]
    _table(sheet, "take-down", "Load take-down", _LOADS, rows, TAKE_DOWN + 1, widths=(110.0, 30.0))


def _title(entry: Entry) -> str:
    """Return the title of a load; of one that is typed in also its type and span."""
    title = str((entry.extra or {}).get("title") or entry.source.title)
    where = f": {entry.source.origin}" if entry.kind == GIVEN else ""
    return f"{begun(title)}{where}"


def _figure(sheet: Sheet, key: str, figure: Figure, front: int, rests: Iterable[Entry]) -> None:
    sheet.figure(
        key, to_json(figure), title=figure.caption, alt=figure.alt, rests_on=rests, front=front
    )


def _record_envelopes(design: Design) -> None:
    """Record moment and shear envelopes with the resistance laid over, and deflected shapes."""
    model, sheet = design.model, design.model.sheet
    rests = [*model.lengths, *(p.entries["M_f"] for p in sheet.parts if "M_f" in p.entries)]
    standing = design.standing
    moments, shears = [], []
    for span in range(1, model.spans + 1):
        left = design.outline.axes[span - 1]
        local = _stations(design, span)
        M, V = model.forces.along(span, local)
        spans = np.full(len(local), span)
        bottom, top = (
            provide(design.designed, standing, face, local + left, spans).M_r
            for face in ("bottom", "top")
        )
        start, end = design.outline.faces(span)
        inside = np.clip(local + left, start + INSIDE, end - INSIDE)
        V_r = [met.V_r for met in stretches_at(design.designed, inside)]
        x = (local + left).tolist()
        first, last = covered_length(design.designed, span)  # bars end short of a free end
        asked = max(start, left + first), min(end, left + last)
        moments.append(
            MomentPiece(span, x, M.max(0).tolist(), M.min(0).tolist(), bottom.tolist(),
                        top.tolist(), asked)
        )  # fmt: skip
        shears.append(ShearPiece(span, x, V.max(0).tolist(), V.min(0).tolist(), V_r))
    bent, sheared = list(moment_sections(design)), list(shear_sections(design))
    for number, part in enumerate(in_figures(moments), start=1):
        _figure(sheet, f"moments-{number}", moment_figure(design.outline, part, bent), ALONG, rests)
    for number, each in enumerate(in_figures(shears), start=1):
        figure = shear_figure(design.outline, each, sheared, _critical(design))
        _figure(sheet, f"shears-{number}", figure, ALONG + 1, rests)
    shapes = deflection_shapes_figure(design)
    if shapes is not None:
        _figure(sheet, "deflected", shapes, ALONG + 2, rests)
    _record_stations(model)


def _stations(design: Design, span: int) -> Floats:
    """Return the stations of the envelopes in a span: even pieces, faces, critical sections."""
    left, right = design.outline.axes[span - 1 : span + 1]
    places = (*design.outline.faces(span), *(x for x in _critical(design) if left <= x <= right))
    even = np.linspace(0.0, right - left, PIECES + 1)
    return np.unique(np.clip(np.round([*even, *(x - left for x in places)], 6), 0.0, even[-1]))


def _critical(design: Design) -> list[float]:
    """Return the sections at the supports that shear is designed at, along the beam."""
    return [
        design.outline.axes[s.span - 1] + s.demand.x
        for row in design.stirrups.sections
        for s in row
        if s.place != "station"
    ]


def _record_stations(model: Model) -> None:
    """Record the envelopes at stations, for the CSV file and the working."""
    rows = []
    for span in range(1, model.spans + 1):
        x = np.linspace(0.0, model.lengths[span - 1].value, CSV_PIECES + 1)
        M, V = model.forces.along(span, x)
        M_left, V_left = model.forces.along(span, x, "left")
        for i, at in enumerate(x.tolist()):
            values = (
                (max(M[:, i].max(), M_left[:, i].max()), "kN.m"),
                (min(M[:, i].min(), M_left[:, i].min()), "kN.m"),
                (max(V[:, i].max(), V_left[:, i].max()), "kN"),
                (min(V[:, i].min(), V_left[:, i].min()), "kN"),
            )
            shown = [_number(value, unit) for value, unit in values]
            rows.append([str(span), f"{at / 1000:.3f}", *shown])
    model.sheet.table(
        "envelope", _ENVELOPE, rows, title="Envelopes of factored moments and shears",
        rests_on=model.lengths,
        csv="envelopes",
    )  # fmt: skip
    restrained = restrained_supports(model)
    if restrained:
        model.sheet.note("restraint", left_out(restrained), title="Restraint")


def _number(value: float, unit: str) -> str:
    small = abs(value) < (1e3 if unit == "kN.m" else 1.0)
    return "0" if small else printed(float(value), unit, 4)
