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
        minimum_of(steps, rule, minimum.BY_CRACKING, minimum.WIDTH_WEB)


def minimum_of(steps: Steps, rule: str, by_cracking: Criterion, width: Formula) -> None:
    """Record inside the open part the waiver, or else the rule that the calc uses."""
    if steps.decide(minimum.WAIVER):
        return
    if rule == "10.5.1.1":
        steps.check(by_cracking)
        return
    steps.lines(width, minimum.A_S_MIN)
    steps.check(minimum.BY_AREA)
