"""The printed sections: recorded values are the numbers of the choice, each line by hand."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
import pytest

from lineproof.beams.analysis.model import Load, PartialLoad
from lineproof.beams.continuous.shear_numbers import (
    ShearBasis,
    SpanEnd,
    Stretch,
    area_at,
    depth_at,
)
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.stirrups_choice import Choice, choose_stirrups
from lineproof.record import Record

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .shear_models import (
    BASIS,
    Case,
    case_of,
    check_zones,
    new_sheet,
    point,
    record,
    three_spans,
    uniform,
)


def made(case: Case, basis: ShearBasis = BASIS) -> tuple[Choice, Record]:
    """Choose and record; the recorded values are compared with the numbers on the way."""
    choice = choose_stirrups(case.outline, case.forces, basis, case.spans)
    return choice, record(new_sheet(basis), case, choice)


def entries(record: Record, part: str) -> dict[str, Any]:
    """Return the entries of a part by name."""
    [found] = [p for p in record.data["parts"] if p["key"] == part]
    return {entry["id"].partition("/")[2]: entry for entry in found["entries"]}


def section(choice: Choice, key: str) -> ShearSection:
    [found] = [s for row in choice.sections for s in row if s.key == key]
    return found


@pytest.mark.parametrize("method", ["general", "simplified"])
def test_three_spans_are_followed_by_hand(method: str) -> None:
    basis = replace(BASIS, method=method)  # type: ignore[arg-type]
    choice, record = made(three_spans(), basis)
    assert not list(faults(record.data))
    keys = [s.key for row in choice.sections for s in row]
    assert len(keys) == len(set(keys))
    assert {f"shear-{k}-{end}" for k in (1, 2, 3) for end in ("left", "right")} <= set(keys)


def test_the_table_counts_every_stirrup_once() -> None:
    choice, record = made(three_spans())
    table = entries(record, "stirrups")["stirrup-zones"]["rows"]
    assert sum(int(row[2].partition("-")[0]) for row in table) == sum(
        z.number for z in choice.zones
    )
    assert table[0][:3] == ["1", "0.000 to 6.175", "18-10M at 350 mm"]
    assert table[1][2] == "5-10M at 225 mm"
    assert [row[3] for row in table] == [r.partition("; ")[2] for r in choice.reasons]


def test_every_check_of_an_end_is_printed() -> None:
    _, record = made(three_spans())
    printed = entries(record, "shear-1-left")
    checks = {name for name, entry in printed.items() if entry["kind"] == "check"}
    assert checks == {
        "strain-range", "minimum-stirrups", "stirrup-spacing", "shear-strength", "web-crushing",
        "bars-tension-side", "bars-end-support",
    }  # fmt: skip
    assert printed["shear-halves-spacing"]["kind"] == "decision"
    assert "simplified method gives a resistance of" in printed["other-method"]["text"]
    assert not any(name.endswith("_g") for name in entries(record, "shear-2-along"))


def test_the_other_method_does_not_apply_to_grade_500() -> None:
    _, record = made(three_spans(), replace(BASIS, f_y=500.0))
    text = entries(record, "shear-1-left")["other-method"]["text"]
    assert text.startswith("The simplified method does not apply")


def test_the_critical_section_lies_at_the_face_of_a_girder() -> None:
    """An indirect support: x is half its width; V is taken there, the cap of 11.3.9.4 is not."""
    girder = SpanEnd("indirect", A_sr=1800.0)
    lengths = (7600.0, 7600.0)
    case = case_of(lengths, uniform(lengths, 30, 20), inner=girder, top=(3500.0, 560.0))
    choice, record = made(case)
    assert not list(faults(record.data))
    found = section(choice, "shear-1-right")
    assert found.distance == pytest.approx(225.0)
    assert (found.place, found.reason, found.cap) == ("face", "indirect", None)
    assert "x_f = b_sn/2" in entries(record, "shear-1-right")["x_f"]["formula"]
    direct = case_of(lengths, uniform(lengths, 30, 20), inner=replace(girder, held="direct"))
    other = section(made(direct)[0], "shear-1-right")
    assert other.cap == 1800.0
    assert other.demand.V > found.demand.V


@pytest.mark.parametrize(("P", "at_face"), [(140e3, False), (160e3, True)])
def test_a_large_point_load_near_the_support(P: float, at_face: bool) -> None:  # noqa: FBT001
    """0.3 phi_c sqrt(f'c) b_w d_v = 0.3 x 0.65 x 5.65685 x 380 x 509.4 = 213.5 kN; 1.4 P decides.

    1.4 x 140 = 196 kN is small, 1.4 x 160 = 224 kN is not.
    """
    length = 6000.0
    loads = [*uniform((length,), 20, 0), point(1, P, 225.0 + 300)]
    case = case_of((length,), loads, bottom=(4000.0, 566.0))
    choice, record = made(case)
    assert not list(faults(record.data))
    found, printed = section(choice, "shear-1-left"), entries(record, "shear-1-left")
    assert found.place == ("face" if at_face else "d_v")
    assert printed["near-point-loads"]["holds"] is not at_face
    assert found.near_loads == f"1.4 x {P / 1e3:g} kN (D)"
    assert section(choice, "shear-1-right").V_pl == 0


def test_a_short_strip_of_load_counts_as_a_point_load() -> None:
    """A strip of 400 mm, not longer than d_v, whole within it; one of 600 mm does not count."""
    length = 6000.0
    for width, counted in ((400.0, 1.4 * 400.0 * 100), (600.0, 0.0)):
        strip: Load = PartialLoad("D", 1, 100.0, 300.0, 300.0 + width)
        case = case_of((length,), [*uniform((length,), 20, 0), strip], bottom=(4000.0, 566.0))
        choice, _ = made(case)
        assert choice.checks[0].state.left.V_pl.max() == pytest.approx(counted)


def test_a_support_that_pulls_down_is_designed_at_its_face() -> None:
    """A short end span beside a long one: uplift at support 1 under load on span 2."""
    lengths = (3000.0, 9000.0)
    case = case_of(lengths, uniform(lengths, 5, 40), bottom=(4000.0, 566.0), top=(5000.0, 560.0))
    choice, record = made(case)
    assert not list(faults(record.data))
    left = choice.checks[0].state.left
    assert "uplift" in left.reason
    row = left.reason.index("uplift")
    assert left.V[row] < 0
    assert left.x[row] == 225.0


def test_where_the_moment_changes_sign_the_smaller_depth_counts() -> None:
    case = case_of((6000.0, 6000.0), uniform((6000.0, 6000.0), 20, 20), bottom=(3000.0, 500.0))
    state = choose_stirrups(case.outline, case.forces, BASIS, case.spans).checks[0].state
    for critical in (state.left, state.right):
        for mixed, d, M in zip(critical.mixed, critical.d, critical.M, strict=True):
            assert d == (500.0 if mixed or M >= 0 else 560.0)


def test_bars_count_where_they_stand() -> None:
    """Where stretches meet the smaller area counts, outside of them none; depth of the nearest."""
    bars = (
        Stretch(0, 1000, 2000, 560),
        Stretch(1000, 2000, 1000, 550),
        Stretch(2600, 3000, 500, 540),
    )
    x = np.array([-5.0, 0, 500, 999.9, 1000, 1500, 2000, 2200, 2400, 2600, 3000, 3001])
    areas = [0, 2000, 2000, 2000, 1000, 1000, 1000, 0, 0, 500, 500, 0]
    assert area_at(bars, x).tolist() == areas
    depths = [560, 560, 560, 560, 550, 550, 550, 550, 540, 540, 540, 540]
    assert depth_at(bars, x).tolist() == depths
    one = (Stretch(0, 1000, 2000, 560),)
    assert area_at(one, np.array([1000.0, 1001.0])).tolist() == [2000, 0]
    assert depth_at(one, np.array([5000.0])).tolist() == [560]
    # The last bits of a place, such as a sum of spans, decide nothing.
    near = np.array([1000 - 1e-9, 1000 + 1e-9, 2000 + 1e-9, 2600 - 1e-9])
    assert area_at(bars, near).tolist() == [1000, 1000, 1000, 500]
    assert depth_at(bars, near).tolist() == [550, 550, 550, 540]


def test_stirrups_as_given_fail_their_check() -> None:
    """600 mm throughout: too far apart and too weak; the checks fail, nothing is refused."""
    case = three_spans()
    zones = [{"span": k, "spacing": "600 mm"} for k in (1, 2, 3)]
    choice = check_zones(case, BASIS, zones)
    printed = record(new_sheet(BASIS), case, choice)
    assert not list(faults(printed.data))
    checks = entries(printed, "shear-2-left")
    assert checks["stirrup-spacing"]["holds"] is False
    assert checks["shear-strength"]["holds"] is False
    assert choice.worst > 1


def test_without_stirrups_a_shallow_light_beam_holds_and_a_deep_one_fails() -> None:
    """11.2.8.1: V_f <= V_c and h <= 750 mm."""
    for h, holds in ((600.0, True), (800.0, False)):
        case = case_of(
            (4000.0,), uniform((4000.0,), 15, 0), h=h, bottom=(2000.0, h - 50), top=(600.0, h - 50)
        )
        choice = check_zones(case, BASIS, [])
        printed = record(new_sheet(BASIS), case, choice)
        assert not list(faults(printed.data))
        checks = entries(printed, "shear-1-left")
        assert checks["depth-without-stirrups"]["holds"] is holds
        assert checks["shear-strength"]["holds"] is True
        assert (choice.worst <= 1) is holds
        assert not choice.zones


def test_stirrups_below_the_minimum_do_not_count() -> None:
    """10M at 650 mm in a web of 380: the minimum is at 620 mm; V_c then is that without."""
    case = case_of((4000.0,), uniform((4000.0,), 15, 0))
    zone = [{"span": 1, "spacing": "650 mm"}]
    with_them = check_zones(case, BASIS, zone)
    without = check_zones(case, BASIS, [])
    one, other = with_them.sections[0][0], without.sections[0][0]
    assert one.plain
    assert one.values["V_r"] == other.values["V_r"]


def test_beside_a_change_the_counted_spacing_is_printed() -> None:
    """Closer stirrups that end right behind d_v: the counted spacing lies between both."""
    case = three_spans(24.0, 16.0)
    zones = [
        {"span": 1, "spacing": "200 mm"}, {"span": 3, "spacing": "200 mm"},
        {"span": 2, "from": "0 mm", "to": "600 mm", "spacing": "150 mm"},
        {"span": 2, "from": "600 mm", "to": "8000 mm", "spacing": "300 mm"},
        {"span": 2, "from": "8000 mm", "spacing": "150 mm"},
    ]  # fmt: skip
    choice = check_zones(case, BASIS, zones)
    printed = record(new_sheet(BASIS), case, choice)
    assert not list(faults(printed.data))
    lines = entries(printed, "shear-2-left")
    # 600 - 504 = 96 mm from the change: 1/(0.65484/150 + 0.34516/300) = 181.3 mm
    assert lines["s_x"]["printed"]["result"] == "181"


def test_the_case_of_the_bars_is_printed_when_it_is_another() -> None:
    """Where another case uses the bars more, it has a part of its own with all checks."""
    end = SpanEnd(exterior=True, A_bearing=300.0)
    lengths = (6000.0, 6000.0)
    case = case_of(lengths, uniform(lengths, 20, 30), ends=(end, end))
    choice, printed = made(case)
    assert not list(faults(printed.data))
    check = choice.checks[0]
    rows = [s for s in choice.sections[0] if s.key.startswith("shear-1-left")]
    for name in ("strength", "tension", "compression", "bearing"):
        uses = check.strength if name == "strength" else check.bars[name]
        most = float(uses[:, 0].max())
        assert most <= 0.5 or max(s.use[name] for s in rows) == pytest.approx(most)
