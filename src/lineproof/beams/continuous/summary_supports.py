"""What the beam asks of what carries it: steel in the joints that its own drawings do not show."""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.beams.continuous.anchorage import tie_spacing
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.summary_tables import Row
from lineproof.standards.a23_3 import shear_bars
from lineproof.standards.a23_3.bars import BARS

TITLE = "What the design of the supports must show; not in the drawings and schedules here"
COLUMNS = ["Support", "In the joint"]
WIDTHS = (20.0, 140.0)


def support_rows(design: Design) -> Iterator[Row]:
    """Give a row for the hanger stirrups of each girder, and for hooks that are not tied here."""
    for number in range(1, len(design.outline.supports) + 1):
        if design.outline.supports[number - 1].kind != "free":
            yield from _hangers(design, number)
        yield from _hooks(design, number)


def _hangers(design: Design, number: int) -> Iterator[Row]:
    made, inputs = design.model.sheet.entries_of(f"support-{number}"), design.model.inputs
    if shear_bars.HANGERS_PROVIDED.key in made:
        text = (
            f"{made['n_h'].value:g} hanger stirrups {inputs.stirrup} with {inputs.stirrup_legs} "
            "legs, besides the stirrups of the beam and the ties around its hooks"
        )
        yield Row((str(number), text), made[shear_bars.HANGERS_PROVIDED.key])


def _hooks(design: Design, number: int) -> Iterator[Row]:
    head = f"anchorage-end-{number}-hook-"
    for part in design.model.sheet.parts:
        if part.key.startswith(head) and "ties-in-joint" in part.entries:
            size = part.key.removeprefix(head).upper()
            text = (
                f"ties around the hooks of the top bars {size} in the overhangs, at most "
                f"{tie_spacing(BARS.number(size, 'd_b')):g} mm apart"
            )
            yield Row((str(number), text), part.entries["l_dh"])
