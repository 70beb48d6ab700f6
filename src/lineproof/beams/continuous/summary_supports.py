"""What the beam asks of what carries it: steel in the joints that its own drawings do not show."""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.continuous.anchorage import tie_spacing
from lineproof.beams.continuous.cutoff_support import OUTSIDE
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.model import ANALYSIS, Model
from lineproof.beams.continuous.resistance_demand import NOTHING
from lineproof.beams.continuous.summary_tables import NONE, Row, printed
from lineproof.beams.continuous.support_turning import TORQUES
from lineproof.beams.continuous.symbols import KINDS, code
from lineproof.standards.a23_3 import shear_bars
from lineproof.standards.a23_3.bars import BARS

TITLE = "What the design of the supports must show; not in the drawings and schedules here"
COLUMNS = ["Support", "In the joint"]
TURNING = "Moments, clockwise positive, and torques on the supports, unfactored, by load type"
WIDTHS = (20.0, 140.0)


def support_rows(design: Design) -> Iterator[Row]:
    """Give a row for the hanger stirrups of each girder, and for hooks that are not tied here."""
    for number in range(1, len(design.outline.supports) + 1):
        if design.designed.held(number):
            yield from _hangers(design, number)
        yield from _hooks(design, number)


def turning_table(model: Model) -> tuple[list[str], list[Row]]:
    """Return the unfactored moments and torques that supports take, by load type; no rows of none.

    For the design of what carries the beam, beside the reactions.
    """
    parts = (part for part in model.sheet.parts if part.key in (ANALYSIS, TORQUES))
    entries = {name: entry for part in parts for name, entry in part.entries.items()}
    supports = model.inputs.held
    kinds = [(f"{{}}{code(kind)}", KINDS[kind], kind in LIVE) for kind in KINDS]
    asked = [("M_c" + mark, f"{'largest ' * live}M, {words}, kN.m") for mark, words, live in kinds]
    asked += [("M_cm" + mark, f"least M, {words}, kN.m") for mark, words, live in kinds if live]
    asked += [("T_c" + mark, f"{'largest ' * live}T, {words}, kN.m") for mark, words, live in kinds]
    kept = [
        (mark, words) for mark, words in asked if any(mark.format(j) in entries for j in supports)
    ]
    rows = []
    for j in supports:
        found = [entries.get(mark.format(j)) for mark, _ in kept]
        there = [entry for entry in found if entry is not None]
        if there:
            cells = (NONE if entry is None else _moment(entry.value) for entry in found)
            rows.append(Row((str(j), model.inputs.supports[j - 1].carrier, *cells), there[-1]))
    return ["Support", "On", *(words for _, words in kept)], rows


def _hangers(design: Design, number: int) -> Iterator[Row]:
    made, inputs = design.model.sheet.entries_of(f"support-{number}"), design.model.inputs
    if shear_bars.HANGERS_PROVIDED.key in made:
        ties = " and the ties around its hooks" if _tied(design, number) else ""
        text = (
            f"{made['n_h'].value:g} hanger stirrups {inputs.stirrup} with {inputs.stirrup_legs} "
            f"legs, besides the stirrups of the beam{ties}"
        )
        yield Row((str(number), text), made[shear_bars.HANGERS_PROVIDED.key])


def _moment(value: float) -> str:
    """Print a moment [N.mm] in kN.m; what equal moments of both spans leave is 0."""
    return printed(0.0 if abs(value) <= NOTHING else value, "kN.m")


def _tied(design: Design, number: int) -> bool:
    """Tell whether ties stand around hooks within a support."""
    axes = design.outline.axes
    middles = (
        (zone.start + zone.end) / 2 for zone in design.detailing.stirrups if zone.around_hooks
    )
    nearest = {min(axes, key=lambda axis: abs(axis - middle)) for middle in middles}
    return axes[number - 1] in nearest


def _hooks(design: Design, number: int) -> Iterator[Row]:
    head = f"anchorage-end-{number}-hook-"
    for part in design.model.sheet.parts:
        if part.key.startswith(head) and "ties-in-joint" in part.entries:
            size = part.key.removeprefix(head).removesuffix(OUTSIDE).upper()
            text = (
                f"ties around the hooks of the top bars {size} in the overhangs, at most "
                f"{tie_spacing(BARS.number(size, 'd_b')):g} mm apart"
            )
            yield Row((str(number), text), part.entries["l_dh"])
