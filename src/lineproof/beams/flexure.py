"""Balanced condition, resistance, reinforcement required: the closed forms and their decisions."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from typing import Any

from lineproof.beams.bottom_bars import BARS, COMPRESSION_BARS
from lineproof.beams.inputs import Shape
from lineproof.beams.section import compression_zone, zone_of
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.formula import FROM_MEMORY, Formula
from lineproof.quantity import echo
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import compression_steel as double
from lineproof.standards.a23_3 import flexure as clause
from lineproof.standards.a23_3 import strain, stress_block
from lineproof.standards.codes import CodePair

BALANCED = "balanced"
REQUIRED = "required-steel"
FLEXURE = "flexure"
YIELD_CLAUSE = "10.5.2"
LAYERS = ("d", "A_s", "d_1", "d_2", "A_s1", "A_s2", "d_bs", "d_b", "A_b")
"""What stands for bottom bars in one or two layers."""


def midspan(sheet: Sheet, shape: Shape) -> Steps:
    """Return the steps at midspan: the bottom bars, compression at the top."""
    entries = sheet.entries_of(BARS)
    place = compression_zone(sheet, shape) | {n: entries[n] for n in LAYERS if n in entries}
    return Steps(sheet, place)


def record_balanced(sheet: Sheet, shape: Shape) -> None:
    """Record the balanced state: neutral axis from strains, steel by equilibrium, moment."""
    steps = midspan(sheet, shape)
    with sheet.part(BALANCED, "Balanced condition"):
        if any(part.key == COMPRESSION_BARS for part in sheet.parts):
            sheet.note(
                "compression-bars-left-out",
                "The compression bars are not counted here; with them the balanced reinforcement "
                "would be larger.",
                title="Compression bars",
            )
        balanced(steps, shape)


def balanced(steps: Steps, shape: Shape) -> None:
    """Record the balanced state inside the open part, the block in the flange or in the web."""
    steps.lines(stress_block.C_BALANCED, stress_block.A_BALANCED)
    in_flange = shape == "rectangular" or bool(steps.decide(stress_block.BALANCED_IN_FLANGE))
    if in_flange:
        steps.lines(
            stress_block.C_BALANCED_RECTANGULAR,
            stress_block.A_S_BALANCED,
            stress_block.M_R_BALANCED_RECTANGULAR,
        )
    else:
        steps.lines(
            stress_block.C_BALANCED_TEE,
            stress_block.A_S_BALANCED,
            stress_block.M_R_BALANCED_TEE,
        )


def record_required(sheet: Sheet, shape: Shape) -> None:
    """Record the reinforcement that the moment requires, and that the bars provide it."""
    steps = midspan(sheet, shape)
    steps.bind(M_f=sheet.entry("loads/M_f"))
    with sheet.part(REQUIRED, "Reinforcement required at midspan"):
        required(steps, shape)
        steps.check(clause.ENOUGH_STEEL)


def required(steps: Steps, shape: Shape) -> None:
    """Record inside the open part the steel required for M_f.

    Where the concrete balances no such moment this is the steel of the largest that it does: more
    bars have no larger force. The strength fails there, since M_r is never above that moment.
    """
    if _overloaded(steps, shape):
        _record_largest(steps, shape)
        return
    if shape != "rectangular":
        steps.line(clause.M_R_FLANGE_FULL)
        if not steps.decide(clause.NEEDS_FLANGE_ONLY):
            steps.lines(
                clause.FLANGE_FORCE,
                clause.WEB_MOMENT,
                clause.BLOCK_REQUIRED_WEB,
                clause.A_S_REQUIRED_WEB,
            )
            return
    steps.lines(clause.BLOCK_REQUIRED, clause.A_S_REQUIRED)


def _largest_moment(shape: Shape) -> tuple[Formula, ...]:
    """Return what gives the moment with the block down to the bars."""
    if shape == "rectangular":
        return (clause.LARGEST_MOMENT,)
    return (clause.FLANGE_FORCE, clause.LARGEST_MOMENT_TEE)


def _overloaded(steps: Steps, shape: Shape) -> bool:
    """Tell whether even a block down to the bars does not balance the moment."""
    formulas = _largest_moment(shape)
    made = {formula.symbol for formula in formulas}
    names = {name for formula in formulas for name in formula.names} - made
    at = {name: steps.entry(name).value for name in {*names, "M_f"}}
    for formula in formulas:
        at[formula.symbol] = formula.at(at)
    return not clause.BALANCES.holds(*clause.BALANCES.sides(at))


def _record_largest(steps: Steps, shape: Shape) -> None:
    """Record that no bars balance the moment, and the steel of the largest that is balanced."""
    steps.lines(*_largest_moment(shape))
    steps.decide(clause.BALANCES)
    steps.line(clause.BLOCK_LARGEST)
    steel = clause.A_S_REQUIRED if shape == "rectangular" else clause.A_S_REQUIRED_WEB
    steps.line(replace(steel, title="Reinforcement that the concrete balances: more adds nothing"))


def record_flexure(sheet: Sheet, shape: Shape, pair: CodePair) -> None:
    """Record the resistance of the bars, yield and strength."""
    steps = midspan(sheet, shape)
    steps.bind(M_f=sheet.entry("loads/M_f"))
    with sheet.part(FLEXURE, "Moment resistance at midspan"):
        resistance(steps, shape)
        record_yield(steps, pair)
        steps.check(clause.STRENGTH)


def resistance(steps: Steps, shape: Shape) -> Entry:
    """Record inside the open part the block, the neutral axis and M_r; return M_r."""
    steps.line(clause.BLOCK_RECTANGULAR)
    if shape == "rectangular" or steps.decide(clause.IN_FLANGE):
        steps.line(clause.NEUTRAL_AXIS)
        return steps.line(clause.M_R_RECTANGULAR)
    steps.lines(clause.FLANGE_FORCE, clause.BLOCK_IN_WEB, clause.NEUTRAL_AXIS_IN_WEB)
    return steps.line(clause.M_R_TEE)


def record_yield(steps: Steps, pair: CodePair) -> None:
    """Record the limit of c/d and the check against it inside the open part.

    An edition that changed the clause uses the value its office confirmed, if there is one.
    """
    value = confirmed_value(steps.sheet.project, pair)
    if value is None:
        steps.line(clause.YIELD_LIMIT)
    else:
        c_d = steps.sheet.given(
            "c_d", str(value["value"]), source=f"{pair.concrete}, 10.5.2, confirmed by "
            f"{value.get('by', '')}, {value.get('on', '')}", clause=YIELD_CLAUSE,
        )  # fmt: skip
        steps.bind(c_d=c_d)
    steps.check(clause.YIELDS)
    if "d_2" in steps.place:
        steps.check(clause.UPPER_LAYER_YIELDS)


def confirmed_value(project: Mapping[str, Any], pair: CodePair) -> Mapping[str, Any] | None:
    """Return the office's confirmed value of 10.5.2 for an edition that changed it.

    Raises :class:`UserError` if it is not a ratio c/d, between 0 and 1.
    """
    if not any(number == YIELD_CLAUSE for number, _ in pair.changed):
        return None
    for row in project.get("confirmed", ()):
        mine = row.get("clause") == YIELD_CLAUSE and row.get("edition") == pair.concrete
        if mine and "value" in row:
            _check_ratio(row["value"])
            return dict(row)
    return None


def _check_ratio(value: object) -> None:
    if not (isinstance(value, int | float) and 0 < value < 1):
        raise UserError(
            f"confirmed: value {echo(value)} of clause 10.5.2 is not a ratio c/d between 0 and 1; "
            "write for example value = 0.5"
        )


def record_doubly(sheet: Sheet, shape: Shape, pair: CodePair) -> None:
    """Record the resistance with the compression bars counted, displaced concrete taken off."""
    steps = midspan(sheet, shape)
    top = {n: sheet.entry(f"{COMPRESSION_BARS}/{n}") for n in ("A_sp", "d_p")}
    steps.bind(M_f=sheet.entry("loads/M_f"), **top)
    with sheet.part(FLEXURE, "Moment resistance at midspan, compression bars counted"):
        doubly(steps, shape)
        sheet.note(
            "ties",
            "Bars counted in compression must be tied as 7.6.5 asks, which is not checked here; "
            "the concrete they displace is taken off.",
            title="Compression bars",
            clause="7.6.5",
            basis=FROM_MEMORY,
        )
        record_yield(steps, pair)
        steps.check(clause.STRENGTH)


def doubly(steps: Steps, shape: Shape) -> Entry:
    """Record inside the open part neutral axis, forces and M_r with compression bars."""
    if not steps.decide(double.IN_COMPRESSION):
        raise UserError(
            "compression_bars: they lie below the neutral axis and are not in compression; "
            "leave them out: compression_bars = None"
        )
    in_flange = shape == "rectangular" or bool(steps.decide(double.STAYS_IN_FLANGE))
    closing = double.CLOSES if in_flange else double.CLOSES_TEE
    zone = zone_of(shape)
    steps.found(
        "c", strain.AXIS[zone, "compression bars"], closing, unit="mm", clause="10.1.1",
        title="Depth of the neutral axis, by equilibrium",
    )  # fmt: skip
    steps.lines(double.STRESS, double.FORCE, double.BLOCK)
    if not in_flange:
        steps.line(clause.FLANGE_FORCE)
        return steps.line(double.M_R_TEE)
    steps.line(double.CONCRETE_FORCE)
    return steps.line(double.M_R)


def block_of(flexure: Mapping[str, Entry]) -> Entry:
    """Return the depth of the stress block that M_r rests on: in the web where it reaches it."""
    return flexure["a_w"] if "a_w" in flexure else flexure["a"]


def record_state(sheet: Sheet, shape: Shape) -> dict[str, Entry]:
    """Record inside the open part strain and forces at the resistance; return them by symbol.

    For bars that all yield.
    """
    flexure = sheet.entries_of(FLEXURE)
    steps = midspan(sheet, shape)
    steps.bind(**{n: flexure[n] for n in ("a", "C_f") if n in flexure})
    forces: dict[str, Entry] = {n: flexure[n] for n in ("C_s", "C_f") if n in flexure}
    if "C_f" in flexure:
        block = block_of(flexure)
        steps.bind(a_w=block, a=block)
        forces["C_w"] = steps.line(clause.WEB_FORCE)
    else:
        forces["C_c"] = flexure["C_c"] if "C_c" in flexure else steps.line(double.CONCRETE_FORCE)
    forces["T_s"] = steps.line(double.TENSION)
    return forces | {"eps_s": steps.line(clause.STEEL_STRAIN)}
