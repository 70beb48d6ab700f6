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
