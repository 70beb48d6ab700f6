"""Lines of which each step is written down with three or four digits: honest, and no errors.

The beam of ``hand``: A_s 1200 mm2, d 538.95 mm, block 6279 N/mm. Every number typed is worked here
in steps, each rounded as its comment says.
"""

from __future__ import annotations

import pytest
from tests.audit.hand import GIVENS, judged, sheet_of

from lineproof.audit.data import Judged, Verdict
from lineproof.audit.slips.search import find_slips


def said(lines: dict[str, str], givens: dict[str, str], text: str) -> Judged:
    record = sheet_of(lines, dict(GIVENS) | givens).close()
    entry_id = f"beam/{next(reversed(lines)).partition(' =')[0]}"
    return judged(record, {entry_id: text}, find_slips)[entry_id]


FOLLOWS = "follows where the steps of the line are rounded to 3 digits"


@pytest.mark.parametrize(
    ("line", "unit", "typed", "in_steps", "wrong"),
    [
        # sqrt(29) = 5.385 = 5.39; 0.2 x 5.39/500 = 0.002156 = 0.00216; x 430 x 830 = 770.9 mm2.
        # By all digits 0.2 x 5.38516/500 x 356 900 = 768.8.
        (
            "A_smin = 0.2*sqrt(f_c*f_o)*b*h/f_y", "mm2",
            {"f_c": "29 MPa", "f_o": "1 MPa", "f_y": "500 MPa", "b": "430 mm", "h": "830 mm"},
            "771 mm2", "775 mm2",
        ),
        # T = 0.85 x 2928 x 400 = 995.52 = 996 kN; 0.8 x 0.65 x 30 x 644 = 10 046 = 10 000 N/mm:
        # 996/10.0 = 99.6 mm. By all digits 995 520/10 046.4 = 99.09.
        (
            "a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)", "mm",
            {"A_s": "2928 mm2", "alpha_1": "0.8", "b": "644 mm"}, "99.6 mm", "98.5 mm",
        ),
        # T = 0.85 x 2955 x 400 = 1004.7 = 1000 kN; 471.3 - 66.5/2 = 438.05 = 438 mm: 438 kN.m.
        # By all digits 1004.7 x 0.43805 = 440.1.
        (
            "M_r = phi_s*A_s*f_y*(d - a/2)", "kN.m",
            {"A_s": "2955 mm2", "d": "471.3 mm", "a": "66.5 mm"}, "438 kN.m", "436 kN.m",
        ),
    ],
    ids=["a root and a ratio", "a force and what it is divided by", "a force and an arm"],
)  # fmt: skip
def test_steps_written_down_first(
    line: str, unit: str, typed: dict[str, str], in_steps: str, wrong: str
) -> None:
    found = said({line: unit}, typed, in_steps)
    assert (found.verdict, found.note) == (Verdict.AGREES, FOLLOWS)
    assert said({line: unit}, typed, wrong).verdict is Verdict.ORIGIN


def test_what_a_likely_slip_gives_as_well_is_doubtful() -> None:
    """440.15 - 4.2/2 = 438.05 = 438 mm, x 1000 kN: 438. With a for a/2: 1004.7 x 0.43595 = 438."""
    lines = {"M_r = phi_s*A_s*f_y*(d - a/2)": "kN.m"}
    givens = {"A_s": "2955 mm2", "d": "440.15 mm", "a": "4.2 mm"}

    found = said(lines, givens, "438 kN.m")
    assert found.verdict is Verdict.DOUBTFUL
    assert FOLLOWS in found.note
    assert "the number 2 left out" in found.note
