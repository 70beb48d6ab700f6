"""Loads of one simple span: take-down, factored cases, moment, reactions."""

from __future__ import annotations

from lineproof.beams.figures import UniformLoad, loading_figure
from lineproof.beams.inputs import FloorBeamInputs
from lineproof.drawing import Runs, to_json
from lineproof.record import Entry
from lineproof.record.printing import in_unit
from lineproof.sheet import Sheet
from lineproof.standards.nbc import combinations, loads

LOADS = "loads"


def record_loads(sheet: Sheet, inputs: FloorBeamInputs) -> None:
    """Record dead and live load by tributary width, the factored cases and the moment."""
    with sheet.part(LOADS, "Loads and factored moment"):
        sheet.lookup("gamma_w", loads.UNIT_WEIGHT, "reinforced, normal density")
        dead = _record_dead(sheet, inputs)
        live = _record_live(sheet, inputs)
        sheet.line(combinations.CASE_1)
        sheet.line(combinations.CASE_2)
        w_f = sheet.line(combinations.GOVERNING)
        M_f = sheet.line(loads.MOMENT_SIMPLE)
        V_f = sheet.line(loads.SHEAR_SIMPLE)
        sheet.line(loads.REACTION_DEAD)
        sheet.line(loads.REACTION_LIVE)
        sheet.note(
            "load-notes",
            "The live load is not reduced for tributary area. Companion snow, wind and earthquake "
            "loads are zero for this beam; dead load does not counteract, so its factor 0.9 does "
            "not govern.",
            title="Not taken",
            clause="NBC 4.1.5.8",
        )
        _record_figure(sheet, [*dead, live], w_f, M_f, V_f)


def _record_dead(sheet: Sheet, inputs: FloorBeamInputs) -> list[Entry]:
    if inputs.slab:
        made = [sheet.line(loads.SLAB), sheet.line(loads.WEB), sheet.line(loads.SUPERIMPOSED)]
        sheet.line(loads.DEAD_WITH_SLAB)
    else:
        made = [sheet.line(f) for f in (loads.BEAM, loads.FLOOR, loads.SUPERIMPOSED)]
        sheet.line(loads.DEAD_BEAM)
    return made


def _record_live(sheet: Sheet, inputs: FloorBeamInputs) -> Entry:
    if inputs.live_load is None:
        sheet.lookup("q_L", loads.USES, inputs.use)
    else:
        sheet.given("q_L", inputs.live_load)
        least = sheet.lookup("q_Lmin", loads.USES, inputs.use, "q_L")
        sheet.check(loads.LIVE_IS_ENOUGH, q_Lmin=least)
    return sheet.line(loads.LIVE)


_NAMES = {
    "w_sl": "slab",
    "w_wb": "web below slab",
    "w_bm": "beam",
    "w_fl": "floor carried",
    "w_SD": "superimposed dead",
    "w_L": "live",
}


def _record_figure(sheet: Sheet, parts: list[Entry], w_f: Entry, M_f: Entry, V_f: Entry) -> None:
    shown = [
        UniformLoad(_NAMES[p.symbol], p.value, f"{in_unit(p.value, 'kN/m', 3)} kN/m")
        for p in parts
        if p.value > 0
    ]
    end: Runs = (("V", "italic"), ("f", "sub"), (f" = {in_unit(V_f.value, 'kN', 3)} kN", "roman"))
    width = sheet.entry("given/b_tr")
    span = sheet.entry("given/l")
    figure = loading_figure(
        span.value,
        shown,
        reactions=(end, end),
        note=f"tributary width {width.value / 1000:g} m; "
        f"factored {in_unit(w_f.value, 'kN/m', 3)} kN/m",
        moment=(
            ("M", "italic"),
            ("f", "sub"),
            (f" = {in_unit(M_f.value, 'kN.m', 3)} kN·m", "roman"),
        ),
        caption="Loads unfactored; reactions and moment factored; restraint of the ends not shown",
    )
    sheet.figure(
        "loading", to_json(figure), title=figure.caption, alt=figure.alt,
        rests_on=[span, width, *parts, M_f, V_f],
    )  # fmt: skip
