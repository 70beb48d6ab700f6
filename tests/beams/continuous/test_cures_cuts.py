"""Cures of a rise, of bars cut where the shear is not low, of hanger stirrups: each verified.

The beam is calculated anew with the cure, and the check holds; a step less and it does not.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import pytest

from lineproof.beams.continuous.bearing import record_hangers
from lineproof.beams.continuous.cures_sought import cures_of
from lineproof.beams.steps import Steps
from lineproof.sheet import Sheet

from .cures_told import FLEXURE, check, checked, lighter, note, sheet_of, told
from .flow import CALLS, run, start, without_cures

THROUGH = (*FLEXURE, "deflections")
ANCHORED = CALLS[: CALLS.index("anchorage") + 1]
TIP: Mapping[str, Any] = {
    "spans": ["1.5 m", "7 m"], "supports": ["free", "column 450 mm", "column 450 mm"],
    "bottom_bars": [None, "4-20M"], "top_bars": [None, "3-20M", "3-20M"],
}  # fmt: skip
"""A short cantilever, lifted by live load on the long span behind it."""


def test_what_is_told_for_the_rise_of_a_tip_holds() -> None:
    """The span behind turns its root: the depth is that of both."""
    entry = "deflection-1/deflection-rise"
    lifted = sheet_of(THROUGH, **TIP)
    text = note(lifted, "deflection-1", "deflection-rise")
    h = told(text, r"a depth of (\d+) mm in this span and the one behind")

    assert not check(lifted, entry)
    assert check(checked(THROUGH, **TIP, **lighter(h=h)), entry)
    assert not check(checked(THROUGH, **TIP, **lighter(h=h - 10)), entry)


def runs(*rows: tuple[str, str, float, float]) -> list[dict[str, Any]]:
    """Bars along a beam, in m."""
    return [
        {"face": face, "bars": bars, "start": f"{a} m", "end": f"{b} m"}
        for face, bars, a, b in rows
    ]


def test_what_is_told_for_the_rise_of_a_short_span_holds() -> None:
    """3 m between spans of 9 m hogs; its top bars are lapped too short, so that it is soft."""
    beam: dict[str, Any] = {
        "spans": ["9 m", "3 m", "9 m"],
        "bar_runs": runs(
            ("bottom", "4-25M", -0.15, 20.9), ("top", "5-25M", -0.15, 10.6),
            ("top", "5-25M", 10.4, 20.9),
        ),
    }  # fmt: skip
    entry = "deflection-2/deflection-rise"
    lifted = sheet_of(THROUGH, **beam)
    h = told(note(lifted, "deflection-2", "deflection-rise"), r"a depth of (\d+) mm")

    assert not check(lifted, entry)
    assert check(checked(THROUGH, **beam, **lighter(h=h)), entry)
    assert not check(checked(THROUGH, **beam, **lighter(h=h - 10)), entry)


BOTTOM = ("bottom", "4-25M", -0.15, 24.55)
LONG = ("top", "2-25M", -0.15, 24.55)


def cut_at(x: float, spacing: float = 250, *, cures: bool = False) -> Sheet:
    """The beam with 2-25M that begin x m along it, cut in the tension zone before support 2."""
    beam = start(
        bar_runs=runs(BOTTOM, LONG, ("top", "2-25M", x, 24.55)),
        stirrups=[{"span": k, "spacing": f"{spacing if k == 1 else 250:g} mm"} for k in (1, 2, 3)],
    )
    return run(beam if cures else without_cures(beam), ANCHORED)


def low(sheet: Sheet) -> bool:
    """Whether the bars may end where they do: by low shear, or by another rule of 12.10.5."""
    shear = [e for p in sheet.parts if p.key.startswith(CUT) for e in p.entries.values()
             if e.symbol == "cut-low-shear"]  # fmt: skip
    return all(bool(entry) for entry in shear)


CUT = "anchorage-top-2-left-cut-1"


def test_a_longer_bar_or_closer_stirrups_let_bars_end_in_tension() -> None:
    short = cut_at(6.9, cures=True)
    text = note(short, f"{CUT}-shear")
    V_f, limit = check(short, f"{CUT}-shear/cut-low-shear").value
    assert V_f > limit

    more = told(text, r"the 2-25M that end here made (\d+) mm longer")
    assert low(cut_at(6.9 - more / 1000))
    assert not low(cut_at(6.9 - (more - 50) / 1000))

    s = told(text, r"stirrups at (\d+) mm along span 1")
    assert low(cut_at(6.9, s))
    assert not low(cut_at(6.9, s + 25))


def test_hanger_stirrups_too_few_are_told_by_number() -> None:
    """500 kN: 500e3/(0.85*400) = 1471 mm2; 7 of 2 legs 10M, 200 mm2 each, are 1400, 8 are 1600."""
    sheet = Sheet("B1")
    with sheet.part("hung", "A joint"):
        for symbol, text in (("phi_s", "0.85"), ("f_y", "400 MPa"), ("A_v", "200 mm2")):
            sheet.given(symbol, text)
        sheet.given("R_f", "500 kN")
        record_hangers(Steps(sheet, {}), 5)
    made = sheet.entries_of("hung")["hanger-stirrups"]
    assert not made
    assert made.value[0] == pytest.approx(500e3 / 340)
    (cure,) = cures_of(made)
    assert cure.text == "8 hanger stirrups in the joint or more"
    assert cure.utilisation == pytest.approx(500e3 / 340 / 1600)
