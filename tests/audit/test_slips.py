"""The slip finder: a claim made with one slip is explained by that slip."""

from __future__ import annotations

from functools import cache

import pytest

from lineproof.audit.data import Claim, read_from
from lineproof.audit.graph import Graph
from lineproof.audit.slips import find_slips, none_fits
from lineproof.quantity.units import internal_factor
from lineproof.sheet import Sheet


@cache
def section() -> Graph:
    """A T section by its own lines: flexure and stirrups, numbers that a hand can follow."""
    sheet = Sheet("S1", "Section by hand", project={"codes": {"pair": "NBC 2015 + A23.3-14"}})
    with sheet.part("section-1", "Section"):
        for symbol, typed, title in (
            ("h", "600 mm", "overall depth"), ("b_w", "350 mm", "width of the web"),
            ("b_f", "1500 mm", "width of the flange"), ("d", "540 mm", "effective depth"),
            ("f_c", "30 MPa", "strength of concrete"), ("f_y", "400 MPa", "yield strength"),
            ("phi_c", "0.65", "resistance factor for concrete"),
            ("phi_s", "0.85", "resistance factor for reinforcement"),
            ("alpha_1", "0.805", "stress of the block"), ("n_1", "4", "number of bars"),
            ("A_b", "500 mm2", "area of one bar"), ("d_b", "25.2 mm", "diameter of the bar"),
        ):  # fmt: skip
            sheet.given(symbol, typed, title)
        sheet.line("A_s = n_1*A_b", unit="mm2", title="Area of the bars")
        sheet.line("a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b_f)", unit="mm", title="Depth of block")
        sheet.line("M_r = phi_s*A_s*f_y*(d - a/2)", unit="kN.m", title="Resistance")
    return Graph(sheet.close())


def claimed(entry_id: str, typed: str, unit: str) -> Claim:
    factor = internal_factor(unit)
    return Claim(entry_id, typed, unit, float(typed) * factor, read_from(typed).times(factor))


def first(entry_id: str, typed: str, unit: str) -> str:
    graph = section()
    found = find_slips(graph, entry_id, {}, claimed(entry_id, typed, unit), set(graph.stored))
    assert found, none_fits(graph, entry_id)
    return f"{found[0].kind}: {found[0].sentence}"


def test_a_factor_left_out() -> None:
    # 2000*400/(0.805*0.65*30*1500) = 800000/23546.25 = 33.98
    assert "phi_s" in first("section-1/a", "34.0", "mm")


def test_the_web_for_the_flange() -> None:
    # 0.85*2000*400/(0.805*0.65*30*350) = 680000/5494.125 = 123.77
    assert "b_w (1.2, width of the web) = 350.0 mm in place of b_f" in first(
        "section-1/a", "123.8", "mm"
    )


@pytest.mark.parametrize("typed", ["1234567"])
def test_none_fits(typed: str) -> None:
    graph = section()
    claim = claimed("section-1/M_r", typed, "kN.m")
    assert find_slips(graph, "section-1/M_r", {}, claim, set(graph.stored)) == ()
    assert none_fits(graph, "section-1/M_r").startswith("No single slip reproduces")
