"""Deflections in numbers: published checks, hand formulas, sympy's beam, what must hold always."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from tests.beams.analysis.solving import all_arrangements

from lineproof.beams.analysis.model import (
    Beam,
    Load,
    PointLoad,
    Span,
    Support,
    UniformLoad,
)
from lineproof.beams.analysis.solve import solve
from lineproof.beams.continuous import deflection as numbers
from lineproof.beams.continuous.deflection_service import (
    STAGES,
    Stage,
    StageMoments,
    service_moments,
    sustained_share,
)
from lineproof.errors import UserError
from lineproof.standards.a23_3 import deflection as clause
from lineproof.standards.nbc.loads import USES

from .deflecting import E_C, FLOOR, PARTITIONS, STIFF, beam_of, gross, section_of

EXACT = 1e-9
# The base beam of the independent checks: 350 x 600, d 535, 4-25M, 35 MPa.
BASE = numbers.SpanSection(
    l=7000, l_n=6600, h=600, b_w=350, h_f=0, I_g=6.3e9, y_b=300, f_r=0.6 * 35**0.5,
    E_c=4500 * 35**0.5, E_s=200000, midspan=numbers.Place(350, 535, 2000), left=None, right=None,
)  # fmt: skip


def same(moments: StageMoments) -> dict[Stage, StageMoments]:
    """Return the same moments at every stage."""
    return dict.fromkeys(STAGES, moments)


def simple(M_m: float) -> dict[Stage, StageMoments]:
    return same(StageMoments(M_m, 0, 0))


def test_no_11_effective_inertia() -> None:
    """Independent check no. 11: M_cr 37.27 kN.m, I_cr 2572e6, I_e 2630e6 at 150 kN.m."""
    found = numbers.deflections(BASE, simple(150e6), carries=FLOOR)

    assert found.M_crd / 1e6 == pytest.approx(37.27, abs=0.005)
    assert found.cracked["midspan"].I_cr / 1e6 == pytest.approx(2572, abs=0.6)
    assert found.stages["all"].I_ea / 1e6 == pytest.approx(2630, abs=0.6)


def test_no_11_full_modulus_of_rupture_would_be_stiffer() -> None:
    """Independent check no. 11: with the full modulus 3030e6 mm4 (trap no. 18)."""
    doubled = replace(BASE, f_r=2 * BASE.f_r)
    found = numbers.deflections(doubled, simple(150e6), carries=FLOOR)

    assert found.stages["all"].I_ea / 1e6 == pytest.approx(3030, abs=0.6)


def test_no_11_average_of_continuous_spans() -> None:
    """Independent check no. 11: 0.7 I_em + 0.15 (I_e1 + I_e2), one end 0.85 I_em + 0.15 I_ec.

    2501e6 and 2535e6 with ends of 2000e6 and 2400e6; then with ends that come out of a section.
    """
    assert clause.BOTH_ENDS.function(2629.7e6, 2000e6, 2400e6) == pytest.approx(2501e6, abs=0.6e6)
    assert clause.ONE_END.function(2629.7e6, 2000e6) == pytest.approx(2535e6, abs=0.6e6)
    ends = numbers.Place(350, 535, 2000)
    moments = same(StageMoments(150e6, 200e6, 120e6))
    both = numbers.deflections(replace(BASE, left=ends, right=ends), moments, carries=FLOOR)
    one = numbers.deflections(replace(BASE, right=ends), moments, carries=FLOOR)
    stage = both.stages["all"]

    # by hand: I_e = 2572.5 + 3727.5 (37.27/M)^3: 2596.6 at 200, 2684.2 at 120 kN.m
    assert stage.I_e1 == pytest.approx(2596.6e6, rel=1e-4)
    assert stage.I_e2 == pytest.approx(2684.2e6, rel=1e-4)
    # 0.7*2629.7 + 0.15*(2596.6 + 2684.2) = 2632.9; 0.85*2629.7 + 0.15*2684.2 = 2637.9
    assert stage.I_ea == pytest.approx(2632.9e6, rel=1e-4)
    assert one.stages["all"].I_ea == pytest.approx(2637.9e6, rel=1e-4)


def test_no_11b_long_term_and_immediate() -> None:
    """Independent check no. 11b: zeta_s 2.724 with A'_s 600; I_e 2677e6, 8.77 mm at 122.5 kN.m."""
    place = numbers.Place(350, 535, 2000, A_sp=600, d_p=60)
    zeta_s, _ = numbers.long_term(replace(BASE, midspan=place), numbers.History())
    found = numbers.deflections(BASE, simple(122.5e6), carries=FLOOR)

    assert zeta_s == pytest.approx(2.724, abs=5e-4)
    assert found.stages["all"].I_ea / 1e6 == pytest.approx(2677, abs=0.6)
    assert found.stages["all"].delta == pytest.approx(8.77, abs=0.005)


def test_case_j2() -> None:
    """Case J2 of the published cases (textbook, from memory): I_cr 4067, I_e 4199 in4, 0.467 in.

    12 x 20 in, d 17, 3 in2, n 9; w 1.7 kip/ft on 20 ft. That code has the whole modulus of
    rupture, 7.5 sqrt(3000) psi; half of twice that is it.
    """
    inch, psi, kip_ft = 25.4, 6.894757e-3, 1.355818e6
    E_c = 3.12e6 * psi
    section = replace(
        BASE, l=240 * inch, h=20 * inch, b_w=12 * inch, I_g=8000 * inch**4, y_b=10 * inch,
        f_r=2 * 7.5 * 3000**0.5 * psi, E_c=E_c, E_s=9 * E_c,
        midspan=numbers.Place(12 * inch, 17 * inch, 3 * inch**2),
    )  # fmt: skip
    found = numbers.deflections(section, simple(85 * kip_ft), carries=FLOOR)

    assert found.M_crd / kip_ft == pytest.approx(27.4, abs=0.05)
    assert found.cracked["midspan"].kd / inch == pytest.approx(6.78, abs=0.005)
    assert found.cracked["midspan"].I_cr / inch**4 == pytest.approx(4067, abs=2)
    assert found.stages["all"].I_ea / inch**4 == pytest.approx(4199, abs=2)
    assert found.stages["all"].delta / inch == pytest.approx(0.467, abs=5e-4)


def test_simple_span_equals_the_hand_formula() -> None:
    """5 w l^4/(384 E I) and, for a point load at midspan, P l^3/(48 E I), from the solved beam."""
    beam = beam_of([8000], ["simple", "simple"])
    uniform = service_moments(beam, [UniformLoad("D", 1, 20)], 1)
    point = service_moments(beam, [PointLoad("D", 1, 50e3, 4000)], 1)
    section = section_of(beam, 1, **STIFF)
    EI = E_C * 7.2e9

    for service, exact in (
        (uniform, 5 * 20 * 8000**4 / (384 * EI)),
        (point, 50e3 * 8000**3 / (48 * EI)),
    ):
        found = numbers.deflections(section, service.stages, carries=FLOOR)
        assert found.stages["all"].delta == pytest.approx(exact, rel=EXACT)


THREE = beam_of([7600, 9200, 7600], ["simple"] * 4)
WITH_TIP = beam_of([2200, 7600, 9200], ["free", "simple", "simple", "simple"])


@pytest.mark.parametrize(("beam", "span"), [(THREE, 1), (THREE, 2), (WITH_TIP, 1), (WITH_TIP, 2)])
def test_live_load_lies_where_it_deflects_most(beam: Beam, span: int) -> None:
    """No arrangement of all 2^n deflects the span more than the one chosen."""
    loads: list[Load] = [UniformLoad(kind, k, w) for k in (1, 2, 3) for kind, w in _DL]
    service = service_moments(beam, loads, span)
    solution = solve(beam, loads)
    length = beam.spans[span - 1].length
    at = np.array([0.0 if service.free else length / 2])
    moved = solution.span(span).deflection(at)[:, 0]

    def deflected(live: frozenset[int] | set[int]) -> float:
        rows = zip(solution.rows, moved, strict=True)
        return float(sum(y for (kind, k), y in rows if kind == "D" or k in live))

    most = max(deflected(each.spans) for each in all_arrangements(3))
    assert deflected(set(service.live_spans)) == pytest.approx(most)


_DL = (("D", 22.0), ("L", 15.0))


def test_arrangement_and_shares_are_stated() -> None:
    """Middle span alone; outer spans together; half of the live load is sustained, storage all."""
    loads: list[Load] = [UniformLoad(kind, k, w) for k in (1, 2, 3) for kind, w in _DL]
    middle, outer = (service_moments(THREE, loads, k) for k in (2, 1))
    stored = service_moments(THREE, [*loads, UniformLoad("L_st", 2, 5)], 2)

    assert middle.arrangement == "live load on span 2"
    assert outer.arrangement == "live load on spans 1, 3"
    assert middle.case == "1.0D + 1.0L"
    assert middle.factors["sustained"]["L", 2] == 0.5
    assert stored.factors["sustained"]["L_st", 2] == 1.0
    assert ("L", 1) not in middle.factors["all"]
    dead, sustained, total = (middle.stages[stage].M_m for stage in STAGES)
    assert sustained == pytest.approx((dead + total) / 2, rel=1e-12)


def test_a_span_above_its_level_is_limited_upward_without_live_load_beside() -> None:
    """Dead load of the long spans lifts the short one; live load lies on the short one alone."""
    loads: list[Load] = [UniformLoad("D", k, 22) for k in (1, 2, 3)]
    beam = beam_of([9000, 2400, 9000], ["simple"] * 4)
    service = service_moments(beam, [*loads, UniformLoad("L", 2, 15)], 2)

    assert service.lifting == "no live load"
    assert service.stages["rise"] == service.stages["dead"]


def lifted(
    dead: float, sustained: float
) -> tuple[float, numbers.SpanSection, dict[Stage, StageMoments]]:
    """Return the deflection [mm] of 10 kN.m, an uncracked section, moments that lift it [N.mm].

    The largest rise is that of 40 kN.m.
    """
    section = replace(BASE, f_r=1e6)
    at = numbers.deflections(section, simple(10e6), carries=FLOOR).stages["all"].delta
    moments: dict[Stage, StageMoments] = {
        "dead": StageMoments(dead, 0, 0), "sustained": StageMoments(sustained, 0, 0),
        "all": StageMoments(0, 0, 0), "rise": StageMoments(-40e6, 0, 0),
    }  # fmt: skip
    return at, section, moments


def test_rise_with_parts_attached_goes_on_by_creep() -> None:
    """Above its level under sustained load: (3.0 - 2.0)*2 mm more than the live load alone."""
    at, section, moments = lifted(-10e6, -20e6)
    floor = numbers.deflections(section, moments, carries=FLOOR)
    attached = numbers.deflections(section, moments, carries=PARTITIONS)

    assert floor.rise == pytest.approx(3 * at)
    assert attached.rise == pytest.approx(3 * at + 2 * at)
    assert attached.utilisation == pytest.approx(5 * at / (6600 / 480))


def test_sustained_load_that_holds_a_place_down_need_not_be_there() -> None:
    """Dead load lifts by 2 units, with the sustained load on the place itself by 1, rise 4.

    Without that load dead load creeps: 4 - 2 at once, (3.0 - 2.0)*2 by creep, not (3.0 - 2.0)*1.
    """
    at, section, moments = lifted(-20e6, -10e6)
    attached = numbers.deflections(section, moments, carries=PARTITIONS)

    assert attached.rise == pytest.approx(2 * at + 2 * at)


def test_a_place_above_its_level_under_dead_load_alone_is_limited_upward() -> None:
    """Storage on the short span brings it down for good; without it dead load creeps upward.

    Three-moment equation, 9, 4.8, 9 m, like moments M at both inner supports: M(2(9 + 4.8) + 4.8)
    = -(w_1 9**3 + w_2 4.8**3)/4, deflection at midspan times EI: 5w_2 4.8**4/384 + M 4.8**2/8.
    D = 22: M = -142.5, 152.1 - 410.5 < 0. Storage of 60 beside it: M = -193.7, 566.8 - 557.9 > 0.
    """
    loads: list[Load] = [UniformLoad("D", k, 22) for k in (1, 2, 3)]
    beam = beam_of([9000, 4800, 9000], ["simple"] * 4)
    live: list[Load] = [UniformLoad("L_st", 2, 60), *(UniformLoad("L_st", k, 8) for k in (1, 3))]
    service = service_moments(beam, [*loads, *live], 2)

    assert service.arrangement == "live load on span 2"
    assert service.stages["sustained"].M_m > 0 > service.stages["dead"].M_m
    assert service.lifting == "live load on spans 1, 3"


def test_share_by_use_is_a_stated_assumption() -> None:
    uses = set(USES.rows)
    assert {"storage area", "library stack room", "office"} <= uses
    assert sustained_share("storage area")[0] == "1.0"
    assert sustained_share("library stack room")[0] == "1.0"
    assert sustained_share("office") == ("0.5", "assumed, to be confirmed by the designer")


def test_wind_is_left_out_and_named() -> None:
    loads: list[Load] = [UniformLoad("D", 1, 20), UniformLoad("W", 1, 3)]
    assert service_moments(beam_of([8000], ["simple"] * 2), loads, 1).left_out == ("W",)


@settings(max_examples=60, deadline=None, derandomize=True, database=None)
@given(
    A_s=st.floats(600, 6000),
    M=st.floats(1e6, 900e6),
    b=st.sampled_from([380.0, 1900.0]),
    more=st.floats(1.01, 2),
)
def test_inertia_lies_between_and_deflection_grows(
    A_s: float, M: float, b: float, more: float
) -> None:
    """I_cr <= I_e <= I_g wherever I_cr <= I_g, and a larger load deflects more."""
    I_g, y_b = gross()
    section = section_of(
        beam_of([8000], ["simple"] * 2), 1,
        midspan=numbers.Place(b, 555, A_s), I_g=I_g, y_b=y_b,
    )  # fmt: skip
    less = numbers.deflections(section, simple(M), carries=FLOOR)
    larger = numbers.deflections(section, simple(M * more), carries=FLOOR)
    I_e = less.stages["all"].I_ea

    assert min(less.cracked["midspan"].I_cr, I_g) <= I_e * (1 + 1e-12)
    assert I_e <= I_g * (1 + 1e-12)
    assert larger.stages["all"].delta > less.stages["all"].delta
    assert larger.stages["all"].I_ea <= I_e * (1 + 1e-12)


def test_larger_earlier_moment_softens() -> None:
    """A construction stage of 200 kN.m: the live load of 100 kN.m finds a cracked beam."""
    virgin = numbers.deflections(BASE, simple(100e6), carries=FLOOR)
    before = same(StageMoments(100e6, 0, 0, earlier=(200e6, 0, 0)))
    loaded = numbers.deflections(BASE, before, carries=FLOOR)

    # by hand: 2572.5 + 3727.5 (37.27/200)^3 = 2596.6e6 mm4
    assert loaded.stages["dead"].I_ea == pytest.approx(2596.6e6, rel=1e-4)
    assert loaded.stages["dead"].delta > virgin.stages["dead"].delta


def test_parts_by_stage_add_up() -> None:
    """Attached: (3.0 - 2.0) sustained + rest; total 3.0 sustained + rest; live: all - dead."""
    beam = beam_of([7600, 9200, 7600], ["simple"] * 4)
    loads: list[Load] = [UniformLoad(kind, k, w) for k in (1, 2, 3) for kind, w in _DL]
    found = numbers.deflections(
        section_of(beam, 2), service_moments(beam, loads, 2).stages, carries=PARTITIONS
    )
    dead, sustained, total = (found.stages[stage].delta for stage in STAGES)

    assert found.attached == pytest.approx(sustained + (total - sustained))
    assert found.total == pytest.approx(3 * sustained + (total - sustained))
    assert found.live == pytest.approx(total - dead)
    assert found.allowed == pytest.approx((9200 - 400) / 480)
    assert found.utilisation == pytest.approx(found.attached / found.allowed)


def test_limit_follows_what_the_span_carries() -> None:
    """Live load alone where nothing is attached: l_n/360 of a floor, l_n/180 of a flat roof."""
    divisors = {}
    for carries in clause.LIMITS.rows:
        found = numbers.deflections(BASE, simple(150e6), carries=carries)
        divisors[carries] = (round(BASE.l_n / found.allowed), found.by_live)

    assert list(divisors.values()) == [(180, True), (360, True), (480, False), (240, False)]


def _least_depth(section: numbers.SpanSection, f_y: float) -> float:
    row = numbers.continuity(section.free, section.left, section.right)
    return numbers.least_depth(row, section.l_n, f_y, 2400)


def test_span_depth_table() -> None:
    """l_n/16 simple: 6600/16 = 412.5; 500 MPa: x 1.1463 = 472.8 mm; /18, /21, /8."""
    assert _least_depth(BASE, 400) == 412.5
    assert round(_least_depth(BASE, 500), 1) == 472.8
    end = numbers.Place(350, 535, 2000)
    one, two = replace(BASE, left=end), replace(BASE, left=end, right=end)
    assert _least_depth(one, 400) == pytest.approx(6600 / 18)
    assert _least_depth(two, 400) == pytest.approx(6600 / 21)
    tip = replace(BASE, midspan=None, left=end, free="right", l_n=2000)
    assert _least_depth(tip, 400) == pytest.approx(250)


def test_what_is_not_computed_is_refused() -> None:
    """A hogging midspan that cracks, a cantilever on a column alone, an unknown row."""
    with pytest.raises(UserError, match="no stiffness"):
        numbers.deflections(BASE, simple(-60e6), carries=FLOOR)
    with pytest.raises(UserError, match="carries: 'a wall' is not"):
        numbers.deflections(BASE, simple(60e6), carries="a wall")
    column = Support("elastic", 400, stiffness=1e12)
    stiff = Beam((Span(2000, 1e14),), (column, Support("free")))
    with pytest.raises(UserError, match="held by a column alone"):
        service_moments(stiff, [UniformLoad("D", 1, 20)], 1)
    rootless = replace(BASE, midspan=None, free="right")
    with pytest.raises(UserError, match="no top bars are given"):
        numbers.deflections(rootless, same(StageMoments(0, 50e6, 0)), carries=FLOOR)


def test_hogging_midspan_that_does_not_crack_rises() -> None:
    found = numbers.deflections(BASE, simple(-20e6), carries=FLOOR)
    assert found.stages["all"].I_ea == BASE.I_g
    assert found.stages["all"].delta < 0
