"""Top steel at nominally simple ends, for the restraint that exists."""

from __future__ import annotations

from lineproof.beams.bars import BarLayer, bars_text
from lineproof.beams.basics import record_bar_cover
from lineproof.beams.bottom_bars import record_fit_overhang
from lineproof.beams.flexure import record_yield, required, resistance
from lineproof.beams.inputs import FloorBeamInputs, Shape
from lineproof.beams.minimum_steel import minimum_of
from lineproof.beams.second_path import record_proof
from lineproof.beams.section import SPREAD_AREAS, TENSION_WIDTHS
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars, minimum
from lineproof.standards.a23_3 import flexure as clause
from lineproof.standards.codes import CodePair
from lineproof.standards.nbc import loads

TOP_STEEL = "top-steel"
TITLE = "Top bars at the ends"
_ASSUMED = (
    "The restraint is assumed, by the coefficient of clause 9.3.3 for an exterior support. It "
    "holds only where no beam continues beyond the support; where one does, the beam is "
    "continuous and outside this calculation."
)
_RESTRAINT = {
    "cast with a girder": f"The beam is cast with a girder that restrains its end. {_ASSUMED}",
    "cast with a column": f"The beam is cast with a column that restrains its end. {_ASSUMED}",
}


def record_free_ends(sheet: Sheet) -> None:
    """Record that free ends need no top steel for a moment."""
    with sheet.part(TOP_STEEL, TITLE):
        sheet.note(
            "free-ends",
            "The ends rest freely: no moment arises there; the bars that hold the stirrups are "
            "not part of this calculation.",
            title="Ends",
            basis=COMMON_PRACTICE,
        )


def record_top_steel(
    sheet: Sheet,
    inputs: FloorBeamInputs,
    pair: CodePair,
    web: BarLayer,
    overhang: int,
    *,
    proof: bool = True,
) -> None:
    """Record top bars for the end moment: ``web`` in the web, ``overhang`` in each overhang.

    The compression zone is the web: b = b_w, whatever the flange.
    """
    shape = inputs.shape
    with sheet.part(TOP_STEEL, TITLE):
        steps = _start(sheet, inputs, web, overhang)
        required(steps, "rectangular")
        steps.check(clause.ENOUGH_STEEL)
        M_r = resistance(steps, "rectangular")
        record_yield(steps, pair)
        steps.check(clause.STRENGTH)
        minimum_of(
            steps,
            inputs.minimum_rule,
            minimum.BY_CRACKING_TOP,
            TENSION_WIDTHS[shape],
            waivable=inputs.waive_minimum_at_ends,
        )
        if proof:
            record_proof(steps, ("rectangle", "one layer"), M_r)
        if shape != "rectangular":
            steps.lines(minimum.SPREAD_WIDTH, minimum.SPREAD_AREA)
            steps.check(minimum.SPREAD)
            if overhang:
                record_fit_overhang(steps, steps.entry("d_b"))


def _start(sheet: Sheet, inputs: FloorBeamInputs, web: BarLayer, overhang: int) -> Steps:
    b_w = sheet.entry("given/b_w")
    steps = Steps(sheet, {"b": b_w, "b_w": b_w})
    origin = "given" if inputs.top_bars else "chosen: least mass, then few bars"
    sheet.note("bars-text", _text(inputs.shape, web, overhang), title="Bars")
    sheet.note("restraint", _RESTRAINT[inputs.ends], title="Restraint", basis=COMMON_PRACTICE)
    steps.line(
        loads.MOMENT_END_GIRDER if inputs.ends.endswith("girder") else loads.MOMENT_END_COLUMN
    )
    entries = {
        "d_bs": sheet.lookup("d_bs", bars.BARS, inputs.stirrup, "d_b"),
        "r_s": sheet.lookup("r_s", bars.STIRRUP_BENDS, inputs.stirrup),
        "d_b": sheet.lookup("d_b", bars.BARS, web.size),
        "A_b": sheet.lookup("A_b", bars.BARS, web.size),
        "n_t": sheet.given("n_t", str(web.number), source=origin),
    }
    entries["n_b"] = entries["n_t"]
    if inputs.shape != "rectangular":
        entries["n_o"] = sheet.given("n_o", str(overhang), source=origin)
    steps.bind(**entries)
    steps.lines(bars.LEAST_CLEAR, bars.CLEAR)
    steps.check(bars.FITS)
    record_bar_cover(steps)
    steps.lines(SPREAD_AREAS[inputs.shape], bars.DEPTH_ONE_LAYER)
    return steps


def _text(shape: Shape, web: BarLayer, overhang: int) -> str:
    inside = f"Top bars: {bars_text((web,))} within the web"
    if shape == "rectangular" or not overhang:
        return f"{inside}."
    sides = "each overhang" if shape == "T" else "the overhang"
    return f"{inside}, {overhang}-{web.size} in {sides}, beside the web."
