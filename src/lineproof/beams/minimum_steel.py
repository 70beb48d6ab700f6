"""Minimum reinforcement of clause 10.5.1, by either rule, or waived."""

from __future__ import annotations

from lineproof.beams.flexure import midspan
from lineproof.beams.inputs import Shape
from lineproof.beams.steps import Steps
from lineproof.formula import Criterion, Formula
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import minimum

MINIMUM = "minimum-steel"


def record_minimum(sheet: Sheet, shape: Shape, rule: str) -> None:
    """Record the minimum at midspan, web in tension, by clause 10.5.1.1 or 10.5.1.2."""
    steps = midspan(sheet, shape)
    steps.bind(M_f=sheet.entry("loads/M_f"), M_r=sheet.entry("flexure/M_r"))
    with sheet.part(MINIMUM, "Minimum reinforcement at midspan"):
        minimum_of(steps, rule, minimum.BY_CRACKING, minimum.WIDTH_WEB, waivable=True)


def minimum_of(
    steps: Steps, rule: str, by_cracking: Criterion, width: Formula, *, waivable: bool
) -> None:
    """Record inside the open part the rule that the calc uses as a check.

    Where it is not met and may be waived, that is recorded as a decision, and the check is the
    waiver of 10.5.1.3. One check stands in any case.
    """
    if rule == "10.5.1.1":
        test = by_cracking
    else:
        steps.lines(width, minimum.A_S_MIN)
        test = minimum.BY_AREA
    if steps.holds(test) or not waivable:
        steps.check(test)
        return
    steps.decide(test)
    steps.check(minimum.WAIVER)
    steps.sheet.note(
        "waiver-rests-on",
        "The waiver rests on the factored moment above; where that moment is assumed, so is the "
        "waiver, and with a larger moment the bars may yield as the section cracks.",
        title="Waiver",
        clause="10.5.1.3",
    )
