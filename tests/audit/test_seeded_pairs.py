"""Two slips on one sheet, one of them of the pen: both are told, nothing else is called wrong."""

from __future__ import annotations

import sys

import pytest

from lineproof.audit.data import Verdict

from .hand import judged, sheet_of, verdicts_of
from .planting_pairs import NUMBERS, Pairs, measured_pairs


@pytest.fixture(scope="module")
def made() -> Pairs:
    """The counts of a hundred beams; ``pytest -s`` shows them."""
    found = measured_pairs(NUMBERS)
    sys.stdout.writelines(f"{line}\n" for line in found.lines())
    return found


def test_enough_pairs_were_planted(made: Pairs) -> None:
    assert len(NUMBERS) == 100
    assert made.sheets >= 180
    assert made.planted >= 350
    assert made.untouched >= 45_000


def test_both_slips_of_a_pair_are_told(made: Pairs) -> None:
    assert made.missed == []
    assert made.told == made.planted


def test_no_line_below_a_pair_is_called_wrong(made: Pairs) -> None:
    assert made.false == []


# By hand ------------------------------------------------------------------------------------------

LINES = {
    "w_D = q*b_tr": "kN/m",
    "w_f = 1.25*w_D": "kN/m",
    "M_f = w_f*l**2/8": "kN.m",
    "V_f = w_f*l/2": "kN",
}
GIVENS = {"q": "8 kPa", "b_tr": "4 m", "l": "6 m"}
"""w_D = 32, w_f = 40, M_f = 40 x 36/8 = 180, V_f = 120."""


def verdicts(**claims: str) -> dict[str, Verdict]:
    return verdicts_of(LINES, GIVENS, claims)


def test_a_value_written_wrongly_and_used_as_worked_beside_another_slip() -> None:
    """b_tr halved: w_D = 16, w_f = 20, written 22; M_f = 20 x 36/8 = 90, V_f = 60 from the 20."""
    assert verdicts(w_D="16.0", w_f="22.0", M_f="90.0", V_f="60.0") == {
        "w_D": Verdict.ORIGIN,
        "w_f": Verdict.ORIGIN,
        "M_f": Verdict.CARRIED,
        "V_f": Verdict.CARRIED,
    }


def test_it_names_both_and_carries_only_the_other() -> None:
    record = sheet_of(LINES, GIVENS).close()
    claims = {"beam/w_D": "16.0", "beam/w_f": "22.0", "beam/M_f": "90.0"}
    said = judged(record, claims)["beam/M_f"]
    assert said.causes == ("beam/w_D",)
    assert said.note.startswith("follows from what w_f (2.2) should be, not from it as claimed")


def test_a_wrong_unit_written_is_not_found_again_below() -> None:
    """20 kN/m written as 20 000: M_f = 90 follows from 20, and is no slip of units itself."""
    assert verdicts(w_D="16.0", w_f="20000", M_f="90.0") == {
        "w_D": Verdict.ORIGIN,
        "w_f": Verdict.UNIT,
        "M_f": Verdict.CARRIED,
    }


def test_a_line_that_follows_from_neither_is_an_origin_of_its_own() -> None:
    """From 22 it is 99, from 20 it is 90, and right is 180: 95 is none of them."""
    assert verdicts(w_D="16.0", w_f="22.0", M_f="95.0")["M_f"] is Verdict.ORIGIN


def test_a_line_that_nobody_claimed_may_lie_between() -> None:
    """With q = 9 w_D = 36, written 63; M_f = 1.25 x 36 x 36/8 = 202.5 by a w_f not claimed."""
    record = sheet_of(LINES, GIVENS).close()
    said = judged(record, {"given/q": "9", "beam/w_D": "63.0", "beam/M_f": "202.5"})
    assert said["beam/w_D"].verdict is Verdict.ORIGIN
    assert said["beam/M_f"].verdict is Verdict.CARRIED
    assert said["beam/M_f"].causes == ("given/q",)
