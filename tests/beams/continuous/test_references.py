"""Lines take depth, size and length from the very bars they speak of, where others are alike too.

All bars of the three-span beam are 20M in one layer: d is 568.95 mm below and above, A_b 300 mm2.
"""

from __future__ import annotations

import pytest

from lineproof.record import Entry
from lineproof.sheet import Sheet

from .flow import CALLS, run, start


@pytest.fixture(scope="module")
def sheet() -> Sheet:
    return run(start(), CALLS[: CALLS.index("anchorage") + 1])


def behind(entry: Entry, symbol: str) -> Entry:
    """Return the entry of a symbol that a line rests on."""
    (found,) = [each for each in entry.args if each.symbol == symbol]
    return found


@pytest.mark.parametrize(
    ("part", "of"),
    [("shear-1-left", "sag-1"), ("shear-1-right", "hog-2-left"), ("shear-2-left", "hog-2"),
     ("shear-2-right", "hog-3"), ("shear-3-right", "sag-3")],
)  # fmt: skip
def test_shear_takes_the_depth_of_the_bars_in_tension(sheet: Sheet, part: str, of: str) -> None:
    d = behind(sheet.entries_of(part)["d_v"], "d")
    assert d.part.key.startswith(of)
    assert d.value == pytest.approx(620 - 30 - 11.3 - 19.5 / 2)


def test_anchorage_takes_the_sizes_of_its_face(sheet: Sheet) -> None:
    titles = {
        key: {behind(sheet.entries_of(key)[line], symbol).part.title
              for line, symbol in (("A_s", "A_b"), ("d", "d_b"))}
        for key in ("anchorage-bottom-2", "coverage-bottom")
    }  # fmt: skip
    for found in titles.values():
        assert all(title.startswith("Development of bottom bars 20M") for title in found)


def test_resistance_of_the_shear_stands_only_where_it_is_used(sheet: Sheet) -> None:
    """V_r, V_s, theta of the shear chapter, and depths of bars counted, go into a later line."""
    looked_at = 0
    for part in sheet.parts:
        if part.key.startswith(("anchorage-", "coverage-")):
            used = {arg.id for entry in part.entries.values() for arg in entry.args}
            own = [e for n, e in part.entries.items() if n in ("V_r", "V_s", "theta", "d_1", "d_2")]
            assert [e.id for e in own if e.id not in used] == []
            looked_at += len(own)
    assert looked_at > 10


def test_resistance_of_the_shear_names_place_and_case(sheet: Sheet) -> None:
    """Stirrups at the face of support 1: the smallest V_s is that of live load on spans 1 and 3.

    V_f = 140.67 kN, M_f < V_f d_v, 1050 mm2: eps_x = 140 670/(200 000 x 1050) = 0.000 669 9;
    theta = 33.69 deg; V_s = 0.85 x 200 x 400 x 512.06 x cot(33.69)/350 = 149.2 kN.
    """
    entries = sheet.entries_of("anchorage-end-1-bottom")
    assert entries["V_s"].value == pytest.approx(149.2e3, abs=50)
    told = entries["V_s"].source.origin
    assert "in 1.25D + 1.5L, live load on spans 1, 3; 0.20 to 0.25 m from support 1" in told
    assert "taken by itself: on the safe side" in told
    assert "V_r" not in entries
