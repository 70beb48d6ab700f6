"""Reactions after redistribution: from those of the analysis, by statics of the spans beside."""

from __future__ import annotations

import pytest

from .flow import CALLS, run, start, without_cures


def test_reactions_after_redistribution_are_followed_by_hand() -> None:
    """Two spans of 6 m, D 4.2, L 1.9 x 8 = 15.2 kN/m; 10 % taken off the moment at support 2.

    Both loaded: w = 1.25 x 4.2 + 1.5 x 15.2 = 28.05 kN/m, M_2 = -28.05 x 36/8 = -126.225 kN.m,
    R_2 = 1.25 x 28.05 x 6 = 210.375 kN; taken off -12.6225 kN.m on either side: 210.375 -
    2 x 12.6225/6 = 206.17 kN. Span 1 alone: M_2 = -(28.05 + 5.25) x 36/16 = -74.925 kN.m, R_1 =
    28.05 x 3 - 74.925/6 = 71.6625 kN; taken off -7.4925: 71.6625 + 7.4925/6 = 72.91 kN.
    """
    beam = start(
        spans=["6 m", "6 m"], supports=["wall 300 mm"] * 3, h="500 mm", b_w="350 mm", h_f=None,
        shape="rectangular", floor_weight="0 kPa", superimposed="0 kPa", use="residential area",
        spacing="8 m", f_c="30 MPa", redistribution={2: 10},
    )  # fmt: skip
    sheet = run(without_cures(beam), CALLS[:5])
    middle, end = (sheet.entries_of(f"support-{n}") for n in (2, 1))
    assert middle["M_q2l"].value == pytest.approx(-12.6225e6)
    assert middle["M_q2r"].value == pytest.approx(-12.6225e6)
    assert middle["R_f"].value == pytest.approx(206.1675e3)
    assert end["M_q2l"].value == pytest.approx(-7.4925e6)
    assert end["R_f"].value == pytest.approx(72.91125e3)
    assert "R_fa" not in end
