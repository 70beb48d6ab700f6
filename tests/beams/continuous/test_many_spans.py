"""The longest beam that may be typed: 24 spans, whose sums are too long for one line."""

from __future__ import annotations

import pytest

from lineproof import Sheet, beams
from lineproof.resources import folder

SPANS = 24
LENGTHS = ("7.6 m", "9.2 m", "7.6 m")


@pytest.fixture(scope="module")
def sheet() -> Sheet:
    """Return the gallery floor beam over 24 spans, analysed."""
    made = Sheet.open("B7", project=folder("calcs") / "project.toml")
    beam = beams.continuous_beam(
        made, spans=[LENGTHS[n % 3] for n in range(SPANS)],
        supports=["girder 400 mm", *["column 450 mm"] * (SPANS - 1), "girder 400 mm"],
        h="620 mm", b_w="380 mm", h_f="140 mm", spacing="3.1 m", f_c="32 MPa", grade="400R",
        superimposed="1.8 kPa", use="assembly area", exposure="N", fire_rating="2 h",
        cover="30 mm", slab_bars="2 x 10M at 300 mm",
    )  # fmt: skip
    beam.loads()
    beam.spans()
    beam.analysis()
    return made


def test_reactions_balance_the_loads_in_sums_of_a_line_each(sheet: Sheet) -> None:
    """Dead load 20.3736 kN/m by hand, slab 10.416, web 4.3776, 1.8 x 3.1 = 5.58 kN/m.

    Over 8 x (7.6 + 9.2 + 7.6) = 195.2 m that is 3976.9 kN, in sums of 12 terms at most.
    """
    entries = next(part for part in sheet.parts if part.key == "analysis").entries
    total = 20.3736 * 195.2

    for letter, count in (("R", 3), ("W", 2)):
        sums = [entries[f"{letter}_p{number}D"] for number in range(1, count + 1)]
        assert sum(entry.value for entry in sums) / 1e3 == pytest.approx(total, rel=1e-9)
        assert all(len(entry.args) <= 24 for entry in sums)  # 12 terms, w and l of a load each
    check = entries["equilibrium-D"]
    assert bool(check)
    assert {arg.symbol for arg in check.args} == {"R_p1D", "R_p2D", "R_p3D", "W_p1D", "W_p2D"}


def test_a_single_loaded_span_needs_no_sums(sheet: Sheet) -> None:
    """Live load on span 7: 25 reactions and one load fit into one line."""
    entries = next(part for part in sheet.parts if part.key == "analysis").entries

    assert bool(entries["equilibrium-L7"])
    assert "R_p1L7" not in entries
