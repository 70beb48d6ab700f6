"""The analysis on the sheet: what is recorded equals the solver and sympy, and closes by hand."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st
from sympy.physics.continuum_mechanics.beam import Beam as SympyBeam

from lineproof.beams.continuous import case_forces
from lineproof.beams.continuous.faces import faces_of, sagging_spans
from lineproof.beams.continuous.forces import Demand
from lineproof.beams.continuous.model import Model
from lineproof.beams.steps import Steps
from lineproof.record.recompute import recompute

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .flow import MIXED, analysed, close_anyway, record_so_far, start

EQUAL = 1e-9
"""Recorded lines and the solver are the same statics in two orders of summing."""


def _recorded(model: Model, demand: Demand, near: Any, key: str) -> tuple[float, float]:
    with model.sheet.part(key, "Forces of one case"):
        steps = Steps(model.sheet, {})
        x = None
        if abs(demand.V) > 1:
            span = model.lengths[demand.span - 1].value
            at = demand.x if near == "left" else span - demand.x
            x = model.sheet.given("x_f", f"{at / 1000!r} m")
        case_forces.record_forces(steps, model, demand, near, x=x)
        return steps.place["M_f"].value, steps.place["V_f"].value


def _all_demands(model: Model) -> list[tuple[Demand, Any, str]]:
    made: list[tuple[Demand, Any, str]] = []
    for span in sagging_spans(model):
        demand = model.forces.sag(span)
        made.append((demand, "left", f"s{span}-left"))
        made.append((demand, "right", f"s{span}-right"))
    return made + [
        (model.forces.hog(face.support, face.side), face.near, face.key) for face in faces_of(model)
    ]


@pytest.mark.parametrize("changes", [{}, MIXED], ids=["three spans", "mixed"])
def test_recorded_forces_are_those_of_the_solver(changes: dict[str, Any]) -> None:
    model = analysed(**changes).model
    for demand, near, key in _all_demands(model):
        M_f, V_f = _recorded(model, demand, near, key)
        assert M_f == pytest.approx(abs(demand.M), rel=EQUAL), key
        assert V_f == pytest.approx(abs(demand.V), rel=EQUAL, abs=1e-3), key


@pytest.mark.parametrize("changes", [{}, MIXED], ids=["three spans", "mixed"])
def test_record_reads_back_recomputes_and_is_followed_by_hand(changes: dict[str, Any]) -> None:
    beam = analysed(**changes)
    for demand, near, key in _all_demands(beam.model):
        _recorded(beam.model, demand, near, key)
    record = record_so_far(beam)
    assert recompute(record) == []
    assert list(faults(record.data)) == []


def test_support_moments_against_sympy() -> None:
    """Dead load on three spans: sympy's Beam, constant EI, solved for the reactions."""
    record = record_so_far(analysed())
    w, x = sympy.Float(record.entries["loads/w_D1"]["value"]), sympy.Symbol("x")
    R = sympy.symbols("R1:5")
    beam = SympyBeam(sympy.Rational("24.4"), 1, 1, x)
    for force, at in zip(R, ("0", "7.6", "16.8", "24.4"), strict=True):
        beam.apply_load(force, sympy.Rational(at), -1)
        beam.bc_deflection.append((sympy.Rational(at), 0))
    beam.apply_load(-w, 0, 0, end=sympy.Rational("24.4"))
    beam.solve_for_reaction_loads(*R)
    found = [float(beam.reaction_loads[force]) for force in R]
    recorded = [record.entries[f"analysis/R_{j}D"]["value"] for j in range(1, 5)]
    assert recorded == pytest.approx(found, rel=EQUAL)


def test_three_equal_spans_of_the_tables() -> None:
    """Three equal spans, load on all: -0.100 w l^2 at both supports (published tables; K2)."""
    record = record_so_far(analysed(spans=["8 m"] * 3))
    w = record.entries["loads/w_D1"]["value"]
    for support in (2, 3):
        moment = record.entries[f"analysis/M_{support}D"]["value"]
        assert round(-moment / (w * 64), 3) == pytest.approx(0.100, abs=1e-12)


def test_live_load_is_one_row_a_span() -> None:
    """Rows of live load on single spans add to live load on all (superposition)."""
    record = record_so_far(analysed())
    moments = {i: e["value"] for i, e in record.entries.items() if i.startswith("analysis/M_")}
    by_span = sum(moments[f"analysis/M_2L{k}"] for k in (1, 2, 3))
    ratio = record.entries["loads/w_L1"]["value"] / record.entries["loads/w_D1"]["value"]
    assert by_span == pytest.approx(ratio * moments["analysis/M_2D"], rel=EQUAL)


@st.composite
def _beams(draw: st.DrawFn) -> dict[str, Any]:
    count = draw(st.integers(1, 4))
    spans = [f"{draw(st.integers(45, 110)) / 10} m" for _ in range(count)]
    kinds = ["column 400 mm", "girder 350 mm", "wall 300 mm", "wall 300 mm, fixed"]
    supports = [draw(st.sampled_from(kinds)) for _ in range(count + 1)]
    columns = {}
    for number, support in enumerate(supports, start=1):
        if support.startswith("column") and draw(st.booleans()):
            columns[number] = ["400 mm x 400 mm x 3.5 m"]
    if count > 1 and draw(st.booleans()):
        spans[0], supports[0] = "1.8 m", "free"
        columns.pop(1, None)
    loads: list[dict[str, Any]] = []
    for _ in range(draw(st.integers(0, 3))):
        span = draw(st.integers(1, count))
        at = draw(st.integers(3, 14)) / 10
        kind = draw(st.sampled_from(["D", "L", "S"]))
        if draw(st.booleans()):
            loads.append({"type": kind, "span": span, "point": "25 kN", "at": f"{at} m"})
        else:
            loads.append(
                {"type": kind, "span": span, "line": "4 kN/m", "from": "0.2 m", "to": f"{at} m"}
            )
    depths: Any = draw(st.sampled_from(["600 mm", None]))
    depth = depths or [f"{draw(st.integers(50, 70)) * 10} mm" for _ in range(count)]
    return {
        "spans": spans, "supports": supports, "columns": columns or None, "loads": loads,
        "h": depth,
    }  # fmt: skip


@settings(max_examples=40, deadline=None)
@given(_beams())
def test_any_beam_is_recorded_as_it_is_solved(changes: dict[str, Any]) -> None:
    model = analysed(**changes).model
    for demand, near, key in _all_demands(model):
        M_f, V_f = _recorded(model, demand, near, key)
        scale = max(abs(d.M) for d, _, _ in _all_demands(model))
        assert M_f == pytest.approx(abs(demand.M), rel=EQUAL, abs=1e-9 * scale), key
        assert V_f == pytest.approx(abs(demand.V), rel=EQUAL, abs=1e-2), key
    record = close_anyway(model.sheet)
    assert recompute(record) == []


def test_live_load_on_the_far_of_two_equal_spans_lowers_an_end_by_a_sixteenth() -> None:
    """Two equal spans, one loaded: its unloaded end takes -w l/16 (three-moment equation)."""
    beam = analysed(spans=["8 m", "8 m"], supports=["wall 400 mm", "column 450 mm", "wall 400 mm"])
    made = beam.sheet.entries_of("analysis")
    w_L, w_D = (beam.sheet.entry(f"loads/{name}").value for name in ("w_L1", "w_D1"))
    least = -w_L * 8000.0 / 16
    assert made["R_m1L"].value == pytest.approx(least, rel=1e-9)
    assert made["R_u1"].value == pytest.approx(0.9 * 3 / 8 * w_D * 8000.0 + 1.5 * least, rel=1e-9)
    assert "uplift-1" not in made


def test_a_short_span_beside_a_long_one_is_told_to_lift_off() -> None:
    """Spans of 3 and 9 m: M_B = w (27 + 729)/(8 x 12) = 7.875 w, so R_A = 1.5 w - 2.625 w < 0."""
    beam = analysed(spans=["3 m", "9 m"], supports=["wall 400 mm", "column 450 mm", "wall 400 mm"])
    made = beam.sheet.entries_of("analysis")
    assert made["R_u1"].value < 0
    assert "held down" in made["uplift-1"].source.text


@pytest.mark.parametrize("run_again", [False, True])
def test_dead_load_that_lifts_an_end_is_factored_up_and_the_tie_is_on_the_cover(
    run_again: bool,  # noqa: FBT001 - a case of the test
) -> None:
    """Spans of 2 and 8.4 m: every load on both lifts support 1, snow as well as dead load.

    By hand: M_B = w (8 + 592.704)/(8 x 10.4) = 7.22 w, so R_A = w - 3.61 w = -2.61 w for a load on
    both spans; live load on span 2 alone: M_B = q 592.704/83.2 = 7.12385 q, R_A = -3.561923 q. With
    w_D = 20.3736, S = 9.3, L = 3.1 kN/m: R_D = -53.1751, R_S = -24.273, R_m = -11.04196 kN. Least
    is 1.25 D + 1.5 S + 1.0 L = -66.4689 - 36.4095 - 11.0420 = -113.920 kN, while 0.9 D + 1.5 L is
    -64.4 kN only.
    """
    given: Mapping[str, Any] = {
        "spans": ["2 m", "8.4 m"], "supports": ["wall 300 mm", "column 400 mm", "wall 300 mm"],
        "use": "roof", "snow": "3 kPa",
    }  # fmt: skip
    beam = analysed(**given)
    if run_again:
        beam = start(sheet=beam.sheet, **given)
    made = beam.sheet.entries_of("analysis")
    assert made["R_u1"].value == pytest.approx(-113.920e3, rel=1e-5)
    assert made["R_u1"].source.text == "R_u1 = 1.25*R_1D + 1.5*R_1S + 1.0*R_m1L"
    rows = [row["check"] for row in beam.sheet.not_covered]
    assert any("Tie that holds the beam down at support 1" in row for row in rows)
    assert not any("support 2" in row for row in rows)


def test_loads_that_ask_for_more_are_named_on_the_cover() -> None:
    """Beams from the side ask for hangers, partitions may go, snow may lie on one span alone."""
    point = {"type": "D", "span": 1, "point": "40 kN", "at": "3 m", "what": "beam B12"}
    rows = start(loads=[point], partitions="1.0 kPa", snow="1 kPa").sheet.not_covered
    clauses = {row["clause"] for row in rows}
    assert {"11.2.12", "NBC 4.1.4.1", "NBC 4.1.6.3"} <= clauses
    plain = {row["clause"] for row in start().sheet.not_covered}
    walls = ["wall 240 mm"] * 2
    roof = start(spans=["6 m"], supports=walls, use="roof", snow="1 kPa").sheet.not_covered
    named = {row["check"].partition(":")[0] for row in roof}
    assert {"The walls", "Wind that lifts the roof or balcony"} <= named
    assert not {"The walls", "Wind that lifts the roof or balcony"} & {
        row["check"].partition(":")[0] for row in start().sheet.not_covered
    }
    assert not {"11.2.12", "NBC 4.1.4.1", "NBC 4.1.6.3"} & plain


def test_a_load_on_a_cantilever_at_the_left_stands_from_its_free_end() -> None:
    """There is no axis at the left of it; 'left' alone was taken for the support."""
    load = {"point": "10 kN", "at": "0.5 m", "what": "facade", "type": "D"}
    sheet = analysed(
        spans=["2 m", "6 m"], supports=["free", "column 450 mm", "column 450 mm"],
        loads=[load | {"span": 1}, load | {"span": 2}],
    ).sheet  # fmt: skip
    said = [str(sheet.notation[f"a_x{n}"].meaning) for n in (1, 2)]
    assert said == ["facade: from the free end", "facade: from the left axis"]


def test_a_rectangular_beam_has_no_overhangs_to_speak_of() -> None:
    bare = start(shape="rectangular", h_f=None, floor_weight="3.4 kPa")
    texts = [beam.sheet.entry("given/choices").source.text for beam in (start(), bare)]
    assert ["overhangs" in text for text in texts] == [True, False]


def test_the_load_cases_are_listed() -> None:
    """Three spans: 1.4D once, two combinations with live load on seven placements (9.2.3.1)."""
    beam = analysed()
    text = beam.sheet.entries_of("analysis")["cases"].source.text
    assert "15 load cases" in text
    assert "0.9D + 1.5L" in text
    assert "live load on span 3" in text
