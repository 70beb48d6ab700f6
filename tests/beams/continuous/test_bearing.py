"""Bearing and hanger stirrups, by hand."""

from __future__ import annotations

import pytest

from lineproof.beams.continuous.bearing import (
    hangers_needed,
    largest_reaction,
    record_bearing,
    record_hangers,
)
from lineproof.beams.steps import Steps

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .flow import CALLS, close_anyway, run, start
from .shear_models import BASIS, DEAD_ONLY, case_of, new_sheet, number, uniform


def test_hangers_carry_the_whole_reaction() -> None:
    """204 kN: 204000/(0.85 x 400) = 600 mm2, three 10M of two legs; a little more takes four."""
    assert hangers_needed(BASIS, 204e3) == 3
    assert hangers_needed(BASIS, 204.1e3) == 4
    assert hangers_needed(BASIS, 1.0) == 1
    sheet = new_sheet(BASIS)
    with sheet.part("hangers-1", "Hanger stirrups at support 1"):
        steps = Steps(sheet, {})
        steps.bind(R_f=sheet.given("R_f", "300 kN"), A_v=sheet.given("A_v", "200 mm2"))
        record_hangers(steps, hangers_needed(BASIS, 300e3))
    made = sheet.close()
    assert number(made, "hangers-1/A_hr") == pytest.approx(882, abs=1)
    assert number(made, "hangers-1/n_h") == 5
    assert number(made, "hangers-1/A_h") == 1000
    assert not list(faults(made.data))


def test_largest_reaction_by_statics() -> None:
    """Two equal spans, 10 kN/m on both: 1.25 w l = 1.25 x 10 x 6 = 75 kN at the middle support."""
    lengths = (6000.0, 6000.0)
    case = case_of(lengths, uniform(lengths, 10, 0), combinations=DEAD_ONLY)
    row, reaction = largest_reaction(case.forces, 2)
    assert row == 0
    assert reaction == pytest.approx(75e3)
    # 3/8 w l at the ends
    assert largest_reaction(case.forces, 1)[1] == pytest.approx(22.5e3)


def test_bearing() -> None:
    """0.85 x 0.65 x 32 x 380 x 200 = 17.68 x 76000 = 1343.7 kN."""
    sheet = new_sheet(BASIS)
    with sheet.part("bearing-1", "Bearing on support 1"):
        steps = Steps(sheet, {})
        steps.bind(R_f=sheet.given("R_f", "900 kN"), l_b=sheet.given("l_b", "200 mm"))
        record_bearing(steps)
    made = sheet.close()
    assert number(made, "bearing-1/B_r") == pytest.approx(1343.7, rel=5e-3)
    assert not list(faults(made.data))


def test_a_column_narrower_than_the_beam_gives_the_width_of_the_bearing() -> None:
    """A beam 380 wide on columns of 450 mm along and 250 or 600 mm across it.

    250 x 450 = 112500 mm2 and 0.85 x 0.65 x 32 x 112500 = 1989 kN; of the wider column the width
    of the beam: 380 x 450 = 171000 mm2 and 3023 kN.
    """
    columns = {2: ["450 mm x 250 mm x 3.6 m"], 3: ["450 mm x 600 mm x 3.6 m"]}
    made = close_anyway(run(start(columns=columns, slab_bars="2 x 10M at 300 mm"), CALLS[:5]))
    assert number(made, "support-2/A_1") == 112500
    assert number(made, "support-2/B_r") == pytest.approx(1989, abs=5)
    assert number(made, "support-3/A_1") == 171000
    assert number(made, "support-3/B_r") == pytest.approx(3023, abs=5)  # three digits
    assert not list(faults(made.data))
