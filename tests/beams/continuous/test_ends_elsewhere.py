"""Top bars that meet those of the next support end in a tension zone like any other (12.10.5)."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from lineproof.record import Record
from lineproof.sheet import Sheet

from .beam_with_gaps import row
from .cures_told import note, told
from .flow import CALLS, record_of, run, start, without_cures

ANCHORED = CALLS[: CALLS.index("anchorage") + 1]

SHORT_MIDDLE: dict[str, Any] = {
    "spans": ["9 m", "3 m", "9 m"],
    "supports": ["girder 400 mm", "column 450 mm", "column 450 mm", "girder 400 mm"],
    "loads": [{"type": "D", "span": 2, "point": "170 kN", "at": "1.5 m", "what": "post"}],
}
RUNS = [
    row("bottom", "4-25M", -0.15, 21.15),
    row("top", "4-25M", -0.15, 21.15),
    row("top", "2-20M", 6.2, 11.2, place="overhang"),
    row("top", "4-20M", 9.8, 14.8, place="overhang"),
]
"""Over each middle support further bars, which end 0.8 m before the axis of the other one."""


def recorded(stirrups: str) -> Record:
    zones = [{"span": k, "spacing": stirrups} for k in (1, 2, 3)]
    return record_of(**SHORT_MIDDLE, bar_runs=RUNS, stirrups=zones)


@pytest.mark.parametrize(("stirrups", "holds"), [("300 mm", True), ("600 mm", False)])
def test_shear_where_bars_meet_those_of_the_next_support(stirrups: str, holds: bool) -> None:  # noqa: FBT001
    """2200 mm from the axis of support 2, where the top is pulled: the largest shear of the cases.

    The forces are those of the solver, which equals sympy's. Closer stirrups make V_r large enough.
    """
    made = recorded(stirrups)
    forces = start(**SHORT_MIDDLE)
    for call in ("loads", "spans", "analysis"):
        getattr(forces, call)()
    M, V = forces.model.forces.along(2, np.array([2200.0]))
    pulled = M[:, 0] < 0
    assert pulled.any()
    for support, towards, bars in ((2, "right", "2-20M"), (3, "left", "4-20M")):
        part = f"anchorage-top-{support}-{towards}-end-1-shear"
        shear = made.entries[f"{part}/V_f"]["value"]
        assert shear == pytest.approx(abs(V[pulled, 0]).max() / 1e3, rel=1e-3)
        check = made.entries[f"{part}/cut-low-shear"]
        assert check["holds"] is holds
        assert check["holds"] == (shear <= 2 / 3 * made.entries[f"{part}/V_r"]["value"])
        said = made.entries[f"anchorage-top-{support}-{towards}-inflection/through"]["text"]
        assert (
            f"{bars} in the overhangs end beside the bars of the next support, past midspan" in said
        )


def test_bars_lapped_with_others_do_not_end_there() -> None:
    """The corner bars of the gallery beam are lapped or run through: no part is about their end."""
    made = record_of()
    assert [key for key in made.entries if "-end-1-shear" in key] == []


def test_what_is_told_for_such_an_end_holds() -> None:
    """Closer stirrups along the span, or the bars of support 3 as far as the face of support 2.

    That face is 225 mm from its axis, the bars end 800 mm from it: 575 mm, in steps of 50 mm 600.
    """
    part = "anchorage-top-3-left-end-1-shear"

    def laid(more: float = 0.0, spacing: float = 600.0, *, cures: bool = False) -> Sheet:
        rows = [*RUNS[:-1], row("top", "4-20M", 9.8 - more / 1000, 14.8, place="overhang")]
        zones = [{"span": k, "spacing": f"{spacing if k == 2 else 600:g} mm"} for k in (1, 2, 3)]
        beam = start(**SHORT_MIDDLE, bar_runs=rows, stirrups=zones)
        return run(beam if cures else without_cures(beam), ANCHORED)

    def low(sheet: Sheet) -> bool:
        return all(
            bool(entry) for p in sheet.parts for entry in p.entries.values()
            if p.key.startswith("anchorage-top-3-left-end") and entry.symbol == "cut-low-shear"
        )  # fmt: skip

    text = note(laid(cures=True), part)
    more = told(text, r"the 4-20M in the overhangs that end here made (\d+) mm longer")
    assert more == 600
    assert low(laid(more))
    assert not low(laid(more - 50))
    s = told(text, r"stirrups at (\d+) mm along span 2")
    assert low(laid(spacing=s))
    assert not low(laid(spacing=s + 25))
