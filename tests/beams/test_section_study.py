"""Section study: cracking, balanced steel, and the capacity at shares of it, worked by hand."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof import beams
from lineproof.errors import UserError
from lineproof.record import Record, recompute
from lineproof.sheet import Sheet

from .gallery import PROJECT_2015, holds, number
from .pocket import faults
from .tee_study import TEE, study

BLOCK = 0.7975 * 0.65 * 35  # 18.143125 MPa


def by_hand(A_s: float, d: float, *, b: float = 900, b_w: float = 300, h_f: float = 100) -> float:
    """Return M_r [kN.m] from the two rectangles of the compression zone."""
    tension = 340 * A_s
    a = tension / (BLOCK * b)
    if a <= h_f:
        return tension * (d - a / 2) / 1e6
    flange = BLOCK * (b - b_w) * h_f
    a = (tension - flange) / (BLOCK * b_w)
    return (flange * (d - h_f / 2) + (tension - flange) * (d - a / 2)) / 1e6


@pytest.fixture(scope="module")
def record() -> Record:
    """The study of the tee."""
    return study()


def test_cracking_moments(record: Record) -> None:
    """Hand: A 259500, y_b = (199500 x 332.5 + 60000 x 615)/259500 = 397.82 mm.

    I = 300 x 665^3/12 + 199500 x 65.32^2 + 600 x 100^3/12 + 60000 x 217.18^2 = 1.1083e10 mm4;
    f_r 3.5496; M_cr = 3.5496 x 1.1083e10/397.82 = 98.89, top 3.5496 x 1.1083e10/267.18 = 147.2.
    """
    assert number(record, "section/y_b") == pytest.approx(397.82, abs=0.005)
    inertia = 300 * 665**3 / 12 + 199500 * 65.32**2 + 600 * 100**3 / 12 + 60000 * 217.18**2
    assert number(record, "section/I_g") == pytest.approx(inertia, rel=1e-5)
    assert number(record, "section/M_cr") == pytest.approx(3.5496 * inertia / 397.82e6, rel=1e-4)
    assert number(record, "section/M_crn") == pytest.approx(3.5496 * inertia / 267.18e6, rel=1e-4)


def test_balanced_state(record: Record) -> None:
    """Hand: d = 665 - 40 - 11.3 - 29.9/2 - (29.9 + 41.86)/2 = 562.87; c_b = 7/11 d = 358.19 mm.

    a_b = 0.8825 x 358.19 = 316.10; C_b = 18.143125 x (60000 + 300 x 316.10) = 2809.1 kN;
    A_s,b = 2809100/340 = 8262 mm2.
    """
    assert number(record, "bars/d") == pytest.approx(562.87, abs=0.005)
    assert number(record, "balanced/c_b") == pytest.approx(358.19, abs=0.005)
    assert number(record, "balanced/a_b") == pytest.approx(316.10, abs=0.005)
    assert not holds(record, "balanced/balanced-block-in-flange")
    assert number(record, "balanced/C_b") == pytest.approx(2809.1, abs=0.06)
    assert number(record, "balanced/A_sb") == pytest.approx(8262, abs=0.6)
    assert number(record, "balanced/M_rb") == pytest.approx(by_hand(8262.0, 562.87), rel=1e-4)


@pytest.mark.parametrize("share", [25, 50, 75, 100])
def test_capacity_at_shares(record: Record, share: int) -> None:
    """25, 50, 75, 100 % of 8262 mm2: flange or web by hand; the table prints the same."""
    A_s, d = number(record, f"capacity-{share}/A_s"), number(record, "bars/d")
    assert A_s == pytest.approx(8262 * share / 100, abs=0.6)
    expected = by_hand(A_s, d)
    assert number(record, f"capacity-{share}/M_r") == pytest.approx(expected, rel=1e-6)
    assert number(record, f"capacity-{share}/M_l") == pytest.approx(expected, rel=1e-3)
    rows = record.entries["capacity/shares"]["rows"]
    row = next(r for r in rows if r[0] == str(share))
    # three digits are printed
    assert float(row[1]) == pytest.approx(A_s, rel=0.005)
    assert float(row[3]) == pytest.approx(expected, rel=0.005)
    in_flange = 340 * A_s / (BLOCK * 900) <= 100
    assert holds(record, f"capacity-{share}/block-in-flange") == in_flange
    assert float(row[2]) == pytest.approx(
        number(record, f"capacity-{share}/{'a' if in_flange else 'a_w'}"), rel=0.005
    )


def test_whole_share_is_the_balanced_moment(record: Record) -> None:
    """100 % of the balanced steel resists the balanced moment."""
    whole, balanced = number(record, "capacity-100/M_r"), number(record, "balanced/M_rb")
    assert whole == pytest.approx(balanced, rel=1e-9)
    assert number(record, "capacity/r_b") == pytest.approx(4200 / 8262, rel=1e-4)


def test_bars_chosen_and_both_paths(record: Record) -> None:
    """6-30M, 4200 mm2: hand M_r, second path, printed lines, recomputed record."""
    expected = by_hand(4200, 562.87)
    assert number(record, "flexure/M_r") == pytest.approx(expected, rel=1e-4)
    assert number(record, "second-path/M_l") == pytest.approx(expected, rel=1e-3)
    assert record.failed == []
    assert list(faults(record.data)) == []
    assert recompute(Record.from_text(record.to_text())) == []
    checks = {i for i, e in record.entries.items() if e["kind"] == "check"}
    assert checks == {
        "bars/bars-fit", "bars/bars-fit-2", "flexure/yield", "flexure/yield-upper",
        "second-path/second-path", "second-path-balanced/second-path",
        *(f"capacity-{share}/second-path" for share in (25, 50, 75, 100)),
    }  # fmt: skip
    assert record.data["status"]["scope"] == "preliminary: section study, no loads"


def test_rectangle_and_over_reinforced() -> None:
    """Check no. 5a as a study: 4-25M in 350 x 600, d 536.1; then far more than balanced."""
    rectangle: dict[str, Any] = {
        "shape": "rectangular", "b_f": None, "h_f": None, "b_w": "350 mm", "h": "600 mm",
    }  # fmt: skip
    record = study(**rectangle, bars="4-25M")
    assert number(record, "flexure/M_r") == pytest.approx(
        by_hand(2000, 536.1, b=350, b_w=350, h_f=600), rel=1e-6
    )
    heavy = study(**rectangle, bars="3-35M / 3-35M")
    assert {"flexure/yield", "second-path/second-path"} <= set(heavy.failed)
    assert number(heavy, "capacity/r_b") > 1
    # the closed forms of the curve end at the balanced steel: words in place of the curve
    kinds = {i: e["kind"] for i, e in heavy.entries.items() if i.startswith("capacity/")}
    assert kinds["capacity/no-curve"] == "note"
    assert "figure" not in kinds.values()
    assert any(
        e["kind"] == "figure" for i, e in record.entries.items() if i.startswith("capacity/")
    )


def test_bad_input_of_a_study() -> None:
    """All faults at once, nothing recorded."""
    sheet = Sheet("T1", project=PROJECT_2015)
    with pytest.raises(UserError) as caught:
        beams.section_study(sheet, **(TEE | {"f_c": "35", "bars": "3x30M", "b_f": "250 mm",
                                            "h_f": "700 mm", "grade": "X"}))  # fmt: skip
    named = [fault.partition(":")[0] for fault in caught.value.faults]
    assert named == ["f_c", "bars", "grade", "b_w", "h_f"]
    assert sheet.parts == ()
    with pytest.raises(UserError, match="leave it out for a rectangle"):
        study(shape="rectangular")
    with pytest.raises(UserError, match="do not fit into a web of 300 mm"):
        study(bars="9-30M")
