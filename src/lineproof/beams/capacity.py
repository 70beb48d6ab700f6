"""Capacity curve: moment resistance against reinforcement, up to the balanced condition."""

from __future__ import annotations

from lineproof.beams.figures import MomentLevel
from lineproof.beams.flexure import block_of, midspan, resistance
from lineproof.beams.inputs import Shape
from lineproof.beams.record_figures import record_capacity_figure
from lineproof.beams.second_path import record_proof
from lineproof.beams.section import zone_of
from lineproof.record import Entry
from lineproof.record.printing import in_unit
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import capacity as clause
from lineproof.standards.a23_3 import flexure

SHARES = ((25, clause.QUARTER), (50, clause.HALF), (75, clause.THREE_QUARTERS), (100, clause.WHOLE))
_POINTS = 40
_OVER = (
    "There is more reinforcement than the balanced condition holds: the bars do not yield, and the "
    "closed forms of the curve do not apply."
)
_MATERIALS = ("alpha_1", "phi_c", "f_c", "phi_s", "f_y")


def curve(sheet: Sheet, shape: Shape) -> list[tuple[float, float]]:
    """Return pairs (A_s / A_s,b, M_r [N.mm]) from nothing to the balanced steel."""
    place = midspan(sheet, shape).place
    values = {n: sheet.find(n).value for n in _MATERIALS}
    values |= {n: place[n].value for n in ("b", "b_w", "h_f", "d") if n in place}
    balanced = sheet.entry("balanced/A_sb").value
    ratios = [i / _POINTS for i in range(_POINTS + 1)]
    return [(r, _resistance(values | {"A_s": r * balanced}, shape)) for r in ratios]


def _resistance(values: dict[str, float], shape: Shape) -> float:
    values["a"] = flexure.BLOCK_RECTANGULAR.at(values)
    if shape == "rectangular" or values["a"] <= values["h_f"]:
        return flexure.M_R_RECTANGULAR.at(values)
    values["C_f"] = flexure.FLANGE_FORCE.at(values)
    values["a_w"] = flexure.BLOCK_IN_WEB.at(values)
    return flexure.M_R_TEE.at(values)


def record_shares(sheet: Sheet, shape: Shape) -> list[tuple[Entry, Entry, Entry]]:
    """Record the resistance at 25, 50, 75 and 100 % of the balanced steel, proved, a part for each.

    Return (area, depth of the block, resistance) of each.
    """
    made = []
    for share, area in SHARES:
        steps = midspan(sheet, shape)
        with sheet.part(f"capacity-{share}", f"Resistance with {share} % of the balanced steel"):
            A_s = steps.line(area)
            M_r = resistance(steps, shape)
            made.append((A_s, block_of(steps.place), M_r))
            record_proof(steps, (zone_of(shape), "one layer"), M_r)
    return made


def record_capacity(
    sheet: Sheet,
    shape: Shape,
    chosen: tuple[Entry, Entry],
    label: str,
    levels: list[MomentLevel],
    *,
    tabulate: bool,
) -> None:
    """Record the ratio of the chosen steel, the table of shares and the curve."""
    shares = record_shares(sheet, shape) if tabulate else []
    A_s, M_r = chosen
    balanced = sheet.entry("balanced/A_sb")
    with sheet.part("capacity", "Moment resistance against reinforcement"):
        ratio = sheet.line(clause.RATIO, A_s=A_s, A_sb=balanced)
        if shares:
            _record_table(sheet, shares)
        if ratio.value > 1:
            sheet.note("no-curve", _OVER, title="No curve")
            return
        record_capacity_figure(
            sheet,
            curve(sheet, shape),
            (ratio.value, M_r.value),
            label,
            levels,
            [A_s, M_r, balanced],
        )


def _record_table(sheet: Sheet, shares: list[tuple[Entry, Entry, Entry]]) -> None:
    columns = ["Share, %", "A_s, mm2", "Depth of block, mm", "M_r, kN.m"]
    rows = [
        [
            str(share),
            in_unit(A_s.value, "mm2", 3),
            in_unit(a.value, "mm", 3),
            in_unit(M_r.value, "kN.m", 3),
        ]
        for (share, _), (A_s, a, M_r) in zip(SHARES, shares, strict=True)
    ]
    sheet.table(
        "shares", columns, rows, title="Resistance at shares of the balanced reinforcement",
        rests_on=[entry for each in shares for entry in each],
    )  # fmt: skip
