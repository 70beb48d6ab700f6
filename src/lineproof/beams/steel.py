"""Strength of the bars: that of a grade, or of older bars as the drawings or tests show it."""

from __future__ import annotations

from lineproof.quantity import read_quantity
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars

_BENDS_OF_OLDER_BARS = "R"
OLDER_BARS = (
    "Their yield strength of {strength} is given and is not that of a grade of CSA G30.18: "
    "drawings, mill certificates or tests of the bars must show it. Sizes are those typed, bends "
    "those of grades R, and the bars are taken as deformed: plain bars develop less and are not "
    "covered."
)


def yield_strength(grade: str) -> float:
    """Return the yield strength of bars of a grade, or given as text [MPa]."""
    if grade in bars.GRADES.rows:
        return bars.GRADES.number(grade, "f_y")
    return read_quantity("grade", grade, "MPa").value


def bends_as(grade: str) -> str:
    """Return the kind of bars, R or W, by which bends are chosen: R for older bars."""
    return grade[-1] if grade in bars.GRADES.rows else _BENDS_OF_OLDER_BARS


def record_yield_strength(sheet: Sheet, grade: str) -> None:
    """Record f_y inside the open part, and of older bars what must be shown."""
    if grade in bars.GRADES.rows:
        sheet.lookup("f_y", bars.GRADES, grade)
        return
    sheet.given("f_y", grade, source="older bars, as given")
    sheet.note("older-bars", OLDER_BARS.format(strength=grade), title="Older bars")
