"""Torsion of an edge beam: independent check 10, threshold, closed stirrups, what is refused."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from typing import Any

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from lineproof.beams.analysis.model import Beam, Span, Support, UniformLoad
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.shear_numbers import ShearBasis, SpanEnd, SpanNumbers, Stretch
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.shear_state import span_state
from lineproof.beams.continuous.stirrups_choice import Choice, choose_stirrups
from lineproof.beams.continuous.torsion import SpanTorsion
from lineproof.beams.continuous.torsion_record import record_span_torsion
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.record import Entry, Record
from lineproof.standards.a23_3.bars import BARS

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .shear_models import (
    BASIS,
    CHECKED,
    DEAD_ONLY,
    Case,
    case_of,
    check_zones,
    new_sheet,
    record,
    uniform,
)
from .shear_search import assert_lightest

CLOSED = replace(BASIS, closed=True)


def torsion(
    basis: ShearBasis,
    torques: Mapping[str, float],
    *,
    compatibility: bool = False,
    h: float = 620.0,
    flange: bool = False,
) -> SpanTorsion:
    """Return a torque on the web of a basis, with an L flange of 140 mm or without."""
    return SpanTorsion.of(
        torques, compatibility=compatibility, d_b=19.5, shape="L" if flange else "rectangular",
        b_w=basis.b_w, h=h, h_f=140.0, b_o=900.0, cover=basis.cover, stirrup=basis.stirrup,
        f_c=basis.f_c, lambda_=basis.lambda_, phi_c=basis.phi_c,
    )  # fmt: skip


def turned(case: Case, acting: SpanTorsion) -> Case:
    """Return the case with the same torque on every span."""
    return replace(case, spans=tuple(replace(span, torsion=acting) for span in case.spans))


def edge_beam(torque: float = 6e3, *, compatibility: bool = False) -> Case:
    """Return a two-span edge beam whose slab turns it by dead and live load."""
    lengths = (6000.0, 7200.0)
    case = case_of(lengths, uniform(lengths, 18, 12), bottom=(3000.0, 566.0), top=(3500.0, 560.0))
    torques = {"D": torque, "L": torque / 2}
    return turned(case, torsion(BASIS, torques, compatibility=compatibility, flange=True))


def printed(case: Case, choice: Choice) -> Record:
    """Record the torsion of each span and every section."""
    sheet, made = new_sheet(choice.basis), {}
    for numbers in case.spans:
        k, acting = numbers.span, numbers.torsion
        assert acting is not None
        with sheet.part(f"torsion-{k}", f"Torsion of span {k}"):
            given, clear = sheet.given, case.forces.beam.clear(k)
            steps = Steps(sheet, {})
            steps.bind(
                h=given("h", f"{numbers.h} mm"), h_f=given("h_f", "140 mm"),
                b_o=given("b_o", "900 mm"), d_bs=sheet.lookup("d_bs", BARS, "10M", "d_b"),
            )  # fmt: skip
            entries = {"l_n": given("l_n", f"{clear / 1000:.12g} m")}
            shape: Any = "L" if choice.basis is CLOSED else "rectangular"
            made[k] = entries | record_span_torsion(steps, acting, shape, "20M")

    def more(section: ShearSection) -> Mapping[str, Entry]:
        return made[section.span]

    return record(sheet, case, choice, more)


def check_10() -> tuple[Case, ShearBasis]:
    """Return a span with V = 260 kN and T = 28 kN.m at d_v from the face, M = 160 kN.m."""
    x = 100 + 481.5
    w = (160e6 - 260e3 * x) * 2 / x**2
    length = 2 * (260e3 / w + x)
    case = case_of(
        (length,), [UniformLoad("D", 1, w)], width=200.0, h=600.0, bottom=(2000.0, 535.0),
        top=(2000.0, 535.0), ends=(SpanEnd(exterior=True, A_bearing=2000.0),) * 2,
        combinations=DEAD_ONLY,
    )  # fmt: skip
    basis = replace(CHECKED, method="simplified", closed=True)
    t = 28e6 / (length / 2 - 100 - 481.5)
    return turned(case, torsion(basis, {"D": t}, h=600.0)), basis


def test_independent_check_10() -> None:
    """T_cr 33.92, a quarter 8.48; A_oh 131 601, p_h 1534.8; A_t/s 0.258; 2.124 <= 5.688 MPa.

    V that stands for both in the bars: with all of V_s = 207.8 kN it is 178.4 kN (worked in the
    catalogue); here torsion first takes 2 x 0.258 x 225 = 116 of the 200 mm2.
    """
    case, basis = check_10()
    choice = check_zones(case, basis, [{"span": 1, "spacing": "225 mm"}])
    acting = case.spans[0].torsion
    assert acting is not None
    assert acting.values["T_cr"] == pytest.approx(33.92e6, abs=5e3)
    assert acting.values["A_oh"] == pytest.approx(131601, abs=1)
    assert acting.values["p_h"] == pytest.approx(1534.8)
    section = choice.sections[0][0]
    assert section.counts
    assert section.values["T_f"] == pytest.approx(28e6)
    assert section.values["a_t"] == pytest.approx(0.258, abs=5e-4)
    v = choice.checks[0].state.v
    assert v["section"][0, 0] == pytest.approx(2.124 / 5.688, abs=1e-4)
    # V_s = 207.83 (200 - 2 x 0.25775 x 225)/200 = 207.83 x 0.42006 = 87.30 kN
    assert section.values["V_s"] == pytest.approx(87.3e3, abs=60)
    assert section.use["spacing"] == pytest.approx(225 / 168.5, abs=2e-3)
    made = printed(case, choice)
    assert not list(faults(made.data))


@pytest.mark.parametrize("compatibility", [False, True])
@pytest.mark.parametrize("method", ["general", "simplified"])
def test_an_edge_beam_is_followed_by_hand(method: Any, compatibility: bool) -> None:  # noqa: FBT001
    case = edge_beam(compatibility=compatibility)
    basis = CLOSED if method == "general" else replace(CLOSED, method=method)
    choice = choose_stirrups(case.outline, case.forces, basis, case.spans)
    assert choice.closed
    assert choice.worst <= 1
    assert all(zone.closed for zone in choice.zones)
    if method == "general":
        made = printed(case, choice)
        assert not list(faults(made.data))
        parts = {p["key"]: [e["id"].partition("/")[2] for e in p["entries"]]
                 for p in made.data["parts"]}  # fmt: skip
        ends = parts["shear-1-left"]
        for name in ("torsion-counts", "corner-bars", "stirrups-shear-torsion",
                     "section-shear-torsion", "bars-tension-side"):  # fmt: skip
            assert name in ends
        assert ("T_fr" in ends) is compatibility
        assert ("T_crf" in parts["torsion-1"]) is compatibility


def test_torsion_falls_linearly_from_face_to_midspan() -> None:
    """T = t (l_n/2 - x) of each case by its own factors; live torque only where live load is."""
    case = edge_beam(6e3)
    choice = choose_stirrups(case.outline, case.forces, CLOSED, case.spans)
    state = choice.checks[0].state
    clear = 6000.0 - 450.0
    D = {"1.4D": 1.4, "1.25D + 1.5L": 1.25, "0.9D + 1.5L": 0.9, "1.25D": 1.25, "0.9D": 0.9}
    for row, name in enumerate(state.cases):
        loaded = name.arrangement in ("live load on spans 1, 2", "live load on span 1")
        t = D[name.combination] * 6e3 + (1.5 * 3e3 if loaded else 0.0)
        expected = np.abs(t * (clear / 2 - (state.stations - 225)))
        assert state.v["T_all"][row, 1:-1] == pytest.approx(expected, abs=1)
    assert {"live load on spans 1, 2", "live load on span 2"} <= {
        name.arrangement for name in state.cases
    }


def test_corner_bars_limit_the_spacing() -> None:
    """10M corner bars of 11.3 mm: s <= 16 x 11.3 = 180.8 mm, less than half of 0.7 d_v here.

    0.5 x 0.7 x 0.9 x 846 = 266 mm.
    """
    case = case_of((6000.0,), uniform((6000.0,), 10, 5), h=900.0, bottom=(6000.0, 846.0),
                   top=(6000.0, 846.0))  # fmt: skip
    acting = replace(torsion(BASIS, {"D": 7e3}, h=900.0), d_b=11.3)
    case = turned(case, acting)
    choice = choose_stirrups(case.outline, case.forces, CLOSED, case.spans)
    state = choice.checks[0].state
    assert state.allowed[state.v["counts"]].max() == pytest.approx(180.8)
    assert {z.spacing for z in choice.zones} & {150.0, 175.0}
    thick = turned(case, replace(acting, d_b=19.5))
    free = choose_stirrups(thick.outline, thick.forces, CLOSED, thick.spans)
    assert min(z.spacing for z in free.zones) > 180.8


def test_torsion_of_a_cantilever_comes_from_its_tip() -> None:
    """T = t (l_n - x) at the face of its only support; nothing at the tip."""
    beam = Beam((Span(2400.0, 1e14), Span(6000.0, 1e14)),
                (Support("free"), Support("simple", 450.0), Support("simple", 450.0)))  # fmt: skip
    forces = Forces.of(beam, uniform((2400.0, 6000.0), 18, 0), DEAD_ONLY)
    acting = torsion(BASIS, {"D": 6e3})
    numbers = SpanNumbers(
        1, 620.0, (Stretch(0, 2400, 1500, 566),), (Stretch(0, 2400, 3000, 560),),
        SpanEnd("free", exterior=True), torsion=acting,
    )  # fmt: skip
    state = span_state(CLOSED, numbers, forces)
    assert state.faces == (0.0, 2175.0)
    assert state.v["T_all"][0, 1] == 0
    assert state.v["T_all"][0, -2] == pytest.approx(6e3 * 2175)


def test_small_torsion_is_neglected() -> None:
    """A quarter of T_cr = 38.78/4 = 9.70 kN.m; open stirrups do where no case exceeds it."""
    lengths = (6000.0, 7200.0)
    case = case_of(lengths, uniform(lengths, 18, 12), bottom=(3000.0, 566.0), top=(3500.0, 560.0))
    # 1.4 x 2.0 x 3.375 m = 9.45 kN.m at the face of span 2
    case = turned(case, torsion(BASIS, {"D": 2.0e3}))
    choice = choose_stirrups(case.outline, case.forces, BASIS, case.spans)
    assert not choice.closed
    plain = replace(case, spans=tuple(replace(s, torsion=None) for s in case.spans))
    without = choose_stirrups(plain.outline, plain.forces, BASIS, plain.spans)
    assert choice.zones == without.zones


def test_open_stirrups_are_refused_where_torsion_counts() -> None:
    case = edge_beam()
    with pytest.raises(UserError) as caught:
        choose_stirrups(case.outline, case.forces, BASIS, case.spans)
    assert "closed_stirrups: span 1: its torsion of" in caught.value.faults[0]
    assert "but the stirrups are open; write closed_stirrups = True" in caught.value.faults[0]
    with pytest.raises(UserError, match="write 2 legs, closed"):
        choose_stirrups(case.outline, case.forces, replace(CLOSED, legs=4), case.spans)


def test_a_gap_without_stirrups_is_refused_where_torsion_counts() -> None:
    case = edge_beam()
    zones = [{"span": 1, "spacing": "150 mm"},
             {"span": 2, "from": "0 m", "to": "3 m", "spacing": "150 mm"}]  # fmt: skip
    with pytest.raises(UserError, match="span 2 has torsion that counts, but part of it"):
        check_zones(case, CLOSED, zones)


def test_torsion_halves_the_largest_spacing() -> None:
    """0.5 x 0.7 x 0.9 x 560 = 176.4 mm where it counts, 352.8 mm at midspan."""
    case = edge_beam()
    choice = choose_stirrups(case.outline, case.forces, CLOSED, case.spans)
    state = choice.checks[0].state
    counts = state.v["counts"]
    assert counts.any()
    assert not counts.all()
    top = ~state.v["bottom"]
    assert state.v["s_max"][counts & top] == pytest.approx(176.4)
    assert state.v["s_max"][~counts & top & (state.v["V_f"] < 400e3)] == pytest.approx(352.8)


def test_too_much_torsion_for_the_section_is_refused() -> None:
    case = edge_beam(60e3)
    with pytest.raises(UserError) as caught:
        choose_stirrups(case.outline, case.forces, CLOSED, case.spans)
    assert any("shear and torsion use" in f or "strain leaves" in f for f in caught.value.faults)


def test_a_torque_of_a_load_that_is_not_there_is_refused() -> None:
    lengths = (6000.0,)
    case = turned(case_of(lengths, uniform(lengths, 18, 0)), torsion(BASIS, {"L": 3e3}))
    with pytest.raises(UserError, match="span 1 has a torque by L, but no load of that type"):
        choose_stirrups(case.outline, case.forces, CLOSED, case.spans)


def test_what_may_be_redistributed_is_limited_with_the_flange() -> None:
    """The larger cracking torsion, of the section with its overhang, limits what is given away.

    b_pf = min(900, 480, 560) = 480; A_cf = 235600 + 67200 = 302800; p_cf = 2960;
    302800^2/2960 x 0.38 x 0.65 x sqrt(32) = 30.9759e6 x 1.397235 = 43.28 kN.m.
    """
    acting = torsion(BASIS, {"D": 1e3}, compatibility=True, flange=True)
    assert acting.values["T_crd"] == pytest.approx(43.28e6, abs=5e3)
    assert acting.values["T_cr"] == pytest.approx(38.78e6, abs=5e3)


def test_forces_in_the_bars_by_torsion() -> None:
    """Where torsion counts, both faces of every station get the force of 11.3.10.6."""
    case = edge_beam()
    choice = choose_stirrups(case.outline, case.forces, CLOSED, case.spans)
    check = choice.checks[0]
    x, bottom, top = check.bar_forces()
    assert len(x) == len(bottom) == len(top)
    v = check.state.v
    V_le = np.sqrt(np.maximum(v["V_f"] - 0.5 * check.bars["V_s"], 0) ** 2
                   + (0.45 * v["p_h"] * v["T_f"] / (2 * v["A_o"])) ** 2)  # fmt: skip
    cot = 1 / np.tan(np.radians(v["theta"]))
    F = np.where(v["counts"], V_le * cot + v["M_f"] / v["d_v"], 0.0)
    own = np.where(v["bottom"], F, 0.0).max(axis=0)
    assert (bottom >= own * (1 - 1e-9)).all()
    assert bottom.max() > 0
    assert top.max() > 0


@settings(max_examples=4, deadline=None, derandomize=True, database=None,
          suppress_health_check=list(HealthCheck))  # fmt: skip
@given(torque=st.floats(500, 14e3), compatibility=st.booleans(),
       method=st.sampled_from(["general", "simplified"]))  # fmt: skip
def test_no_choice_of_closed_stirrups_is_lighter(
    torque: float,
    compatibility: bool,  # noqa: FBT001
    method: Any,
) -> None:
    """Brute force over both spacings and both lengths of the end zones, as without torsion."""
    case = edge_beam(torque, compatibility=compatibility)
    basis = replace(CLOSED, method=method)
    states = [span_state(basis, numbers, case.forces) for numbers in case.spans]
    assert_lightest(states)
