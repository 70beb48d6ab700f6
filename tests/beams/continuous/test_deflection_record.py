"""The record of deflections: equal to the numbers, to be followed by hand, complete."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from typing import Any

import pytest

from lineproof.beams.analysis.model import Beam, Load, PartialLoad, PointLoad, UniformLoad
from lineproof.beams.continuous import deflection as numbers
from lineproof.beams.continuous import deflection_record as record
from lineproof.beams.continuous.deflection_service import service_moments
from lineproof.record import Record
from lineproof.sheet import Sheet

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .deflecting import (
    E_C,
    F_R,
    FLOOR,
    PARTITIONS,
    acting,
    beam_of,
    given_span,
    gross,
    local_of,
    record_span,
    section_of,
    start_sheet,
)
from .flow import CALLS, run, start

EXACT = 1e-9
UNIFORM: tuple[Load, ...] = tuple(
    UniformLoad(kind, k, w) for k in (1, 2, 3) for kind, w in (("D", 22.0), ("L", 15.0))
)
LIGHT: tuple[Load, ...] = tuple(
    UniformLoad(kind, k, w) for k in (1, 2, 3) for kind, w in (("D", 4.0), ("L", 1.0))
)
LOCAL: tuple[Load, ...] = (
    PointLoad("D", 2, 40e3, 3000), PointLoad("L", 2, 30e3, 6000),
    PartialLoad("L", 2, 8, 2000, 6000),
    PointLoad("D", 1, 25e3, 500), PartialLoad("D", 1, 9, 100, 900),
)  # fmt: skip
POSTS: tuple[Load, ...] = (PointLoad("S", 2, 60e3, 4600), PartialLoad("S", 2, 5, 1000, 3000))
DEEP_SNOW: tuple[Load, ...] = (PointLoad("S", 2, 90e3, 4000), PartialLoad("S", 1, 30, 0, 7600))
THREE = beam_of([7600, 9200, 7600], ["simple"] * 4)
TIP_LEFT = beam_of([1800, 9200, 7600], ["free", "simple", "simple", "simple"])
LONE = beam_of([7600], ["simple"] * 2)
CORRIDOR = beam_of([9000, 2400, 9000], ["simple"] * 4)
TOP = numbers.Place(380, 560, 2000)
DOUBLE = numbers.Place(1900, 555, 2500, A_sp=600, d_p=60)
DEEP_AXIS = numbers.Place(1900, 520, 9000)


def alone(loads: Sequence[Load], beam: Beam) -> list[Load]:
    return [load for load in loads if load.span <= len(beam.spans)]


CASES: dict[str, tuple[Beam, int, tuple[Load, ...], dict[str, Any]]] = {
    "middle span": (THREE, 2, UNIFORM, {}),
    "end span": (THREE, 1, UNIFORM, {}),
    "other end span": (THREE, 3, UNIFORM, {}),
    "simple span": (LONE, 1, UNIFORM, {}),
    "point and partial loads": (THREE, 2, (*UNIFORM, *LOCAL), {}),
    "snow beside live load": (THREE, 2, (*UNIFORM, *LOCAL, *POSTS), {}),
    "live load beside snow": (THREE, 2, (*UNIFORM, *LOCAL, *DEEP_SNOW), {}),
    "snow on one span alone": (THREE, 1, (*UNIFORM, *POSTS), {}),
    "compression bars": (THREE, 2, UNIFORM, {"midspan": DOUBLE}),
    "short span between long ones": (CORRIDOR, 2, UNIFORM, {"top": TOP}),
    "short span that does not crack": (CORRIDOR, 2, LIGHT, {}),
    "axis in the web": (THREE, 2, UNIFORM, {"midspan": DEEP_AXIS}),
    "not cracked": (THREE, 2, UNIFORM, {"f_r": 10 * F_R}),
}


def recorded(
    beam: Beam, span: int, loads: Sequence[Load], changes: dict[str, Any], carries: str
) -> tuple[numbers.Deflections, Record]:
    """Return a span in numbers and as a record."""
    section = section_of(beam, span, **changes)
    service = service_moments(beam, loads, span)
    sheet = start_sheet(f_r=section.f_r)
    entries = given_span(sheet, section, span, loads, service)
    record_span(sheet, entries, service, carries=carries)
    return numbers.deflections(section, service.stages, carries=carries), sheet.close()


def value(made: Record, entry_id: str) -> float:
    return float(made.entries[entry_id]["value"])


@pytest.mark.parametrize("name", CASES)
def test_record_equals_the_numbers_and_is_followed_by_hand(name: str) -> None:
    """Every deflection and inertia to 1e-9; every printed line by calculator."""
    beam, span, loads, changes = CASES[name]
    found, made = recorded(beam, span, alone(loads, beam), changes, PARTITIONS)
    key = f"deflection-{span}"

    for stage, result in found.stages.items():
        symbol = record.SYMBOLS[stage]
        assert value(made, f"{key}-{stage}/{symbol}") == pytest.approx(result.delta, rel=EXACT)
        for name_of, inertia in (
            ("I_em", result.I_em),
            ("I_e1", result.I_e1),
            ("I_e2", result.I_e2),
        ):
            if inertia is not None:
                at = value(made, f"{key}-{stage}/{name_of}")
                assert at == pytest.approx(inertia, rel=EXACT)
    for symbol, number in (
        ("zeta_s", found.zeta_s), ("zeta_sa", found.zeta_sa), ("delta_L", found.live),
        ("delta_Lr", found.rest_of_live), ("delta_t", found.total), ("delta_at", found.attached),
        ("delta_max", found.allowed),
    ):  # fmt: skip
        assert value(made, f"{key}/{symbol}") == pytest.approx(number, rel=EXACT)
    check = made.entries[f"{key}/deflection-attached"]["utilisation"]
    if found.attached > 0:
        assert check == pytest.approx(found.attached / found.allowed, rel=EXACT)
    else:
        assert check is None
    assert list(faults(made.data)) == []


def test_snow_that_accompanies_counts_with_its_factor() -> None:
    """A post at midspan of a simple span that does not crack, by hand.

    1.0D + 1.0L + 0.35S (NBC 4.1.3.4): 22 + 15 = 37 N/mm and 0.35*60 = 21 kN over 7600 mm; the
    deflection of beam tables is 5 w l^4/(384 EI) + P l^3/(48 EI). Dead load alone has no post.
    """
    loads = (UniformLoad("D", 1, 22.0), UniformLoad("L", 1, 15.0), PointLoad("S", 1, 60e3, 3800))
    _, made = recorded(LONE, 1, loads, {"f_r": 10 * F_R}, PARTITIONS)

    I_g, _ = gross()
    of_all = 5 * 37 * 7600**4 / 384 + 21e3 * 7600**3 / 48
    of_dead = 5 * 22 * 7600**4 / 384
    at = "deflection-1"
    assert value(made, f"{at}-all/delta_DL") == pytest.approx(of_all / (E_C * I_g), rel=EXACT)
    assert value(made, f"{at}-dead/delta_D") == pytest.approx(of_dead / (E_C * I_g), rel=EXACT)


def test_branches_are_those_meant() -> None:
    """The cases above reach the web, count compression bars, and stay uncracked."""
    _, web = recorded(*CASES["axis in the web"], PARTITIONS)
    _, double = recorded(*CASES["compression bars"], PARTITIONS)
    _, whole = recorded(*CASES["not cracked"], PARTITIONS)

    assert "deflection-2-sections/kd_wm" in web.entries
    assert value(double, "deflection-2/rho_p") == pytest.approx(600 / (1900 * 555))
    assert whole.entries["deflection-2-all/uncracked-m"]["holds"]


def tip(sheet: Sheet, loads: Sequence[Load], **choices: Any) -> tuple[Any, Any]:
    """Record the span behind and the cantilever; return the cantilever in numbers, its record."""
    back = section_of(TIP_LEFT, 2)
    behind = service_moments(TIP_LEFT, loads, 2)
    entries = given_span(sheet, back, 2, loads, behind)
    record_span(sheet, entries, behind, carries=FLOOR, calculate=True)
    found = numbers.deflections(back, behind.stages, carries=FLOOR)
    inertia = {stage: result.I_ea for stage, result in found.stages.items()}
    section = section_of(TIP_LEFT, 1, behind=numbers.Behind(9200, inertia))
    service = service_moments(TIP_LEFT, loads, 1)
    own = given_span(sheet, section, 1, loads, service)
    there = acting(entries.local, local_of(loads, 2), service)
    own = replace(own, behind=2, l_behind=sheet.entry("span-2/l"), local_behind=there)
    record_span(sheet, own, service, **choices)
    return numbers.deflections(section, service.stages, carries=choices["carries"]), sheet.close()


TIP_LOADS = [UNIFORM, (*UNIFORM, *LOCAL), (*UNIFORM, *LOCAL, *POSTS, PointLoad("S", 1, 20e3, 300))]


@pytest.mark.parametrize("loads", TIP_LOADS, ids=["uniform", "local", "snow"])
def test_cantilever_with_the_rotation_of_its_root(loads: tuple[Load, ...]) -> None:
    found, made = tip(start_sheet(), loads, carries=FLOOR, calculate=True)

    for stage, result in found.stages.items():
        symbol, key = record.SYMBOLS[stage], f"deflection-1-{stage}"
        assert value(made, f"{key}/theta_r") == pytest.approx(result.theta_r, rel=EXACT)
        assert value(made, f"{key}/{symbol}") == pytest.approx(result.delta, rel=EXACT)
    assert "rotation of the root" in made.entries["deflection-1/place"]["text"]
    assert list(faults(made.data)) == []


def test_rise_of_a_tip_and_of_a_short_span() -> None:
    """Live load on the long spans lifts them: that stage is recorded and limited as well."""
    found, made = recorded(*CASES["short span between long ones"], PARTITIONS)
    stage = found.stages["rise"]

    assert found.rise is not None
    assert stage.delta < found.stages["all"].delta < 0
    assert made.entries["deflection-2-rise/M_m"]["value"] < 0
    assert value(made, "deflection-2/delta_up") == pytest.approx(found.rise, rel=EXACT)
    check = made.entries["deflection-2/deflection-rise"]
    assert max(check["utilisation"], 0) == pytest.approx(found.utilisation, rel=EXACT)
    assert "spans 1, 3" in made.entries["deflection-2/rise"]["text"]
    tip_found, tip_made = tip(start_sheet(), UNIFORM, carries=FLOOR, calculate=True)
    assert value(tip_made, "deflection-1/delta_up") == pytest.approx(tip_found.rise, rel=EXACT)


def test_where_no_rise_governs_it_is_said() -> None:
    _, made = recorded(*CASES["middle span"], PARTITIONS)

    assert "does not govern" in made.entries["deflection-2/rise"]["text"]
    assert "deflection-2/deflection-rise" not in made.entries


def test_fixed_root() -> None:
    beam = beam_of([2500], ["fixed", "free"])
    found, made = recorded(beam, 1, alone(UNIFORM, beam), {}, PARTITIONS)

    assert value(made, "deflection-1-all/delta_DL") == pytest.approx(
        found.stages["all"].delta, rel=EXACT
    )
    assert list(faults(made.data)) == []


def test_deep_span_needs_no_calculation_unless_it_carries_what_is_damaged() -> None:
    """7600 - 400 = 7200 mm, simple: 7200/16 = 450 < 620; both ends continuous 8800/21 = 419."""
    _, floor = recorded(*CASES["middle span"], FLOOR)
    _, attached = recorded(*CASES["middle span"], PARTITIONS)

    assert floor.entries["deflection-2/span-depth"]["holds"]
    assert value(floor, "deflection-2/h_min") == pytest.approx(8800 / 21)
    assert "deflection-2/deflection-live" not in floor.entries
    assert "deflection-2-sections/span-depth" not in attached.entries


def test_calculated_all_the_same_the_live_load_is_limited() -> None:
    section, service = section_of(THREE, 2), service_moments(THREE, UNIFORM, 2)
    sheet = start_sheet()
    record_span(sheet, given_span(sheet, section, 2), service, carries=FLOOR, calculate=True)
    found = numbers.deflections(section, service.stages, carries=FLOOR)
    made = sheet.entries_of("deflection-2")

    assert "deflection-live" in made
    assert made["delta_L"].value == pytest.approx(found.live, rel=EXACT)
    assert sheet.close().entries["deflection-2-sections/span-depth"]["holds"]


def test_failing_deflection_fails() -> None:
    """Four times the load: the check of what is attached fails, and is reported."""
    heavy = tuple(
        UniformLoad(x.kind, x.span, 4 * x.w) for x in UNIFORM if isinstance(x, UniformLoad)
    )
    found, made = recorded(THREE, 2, heavy, {}, PARTITIONS)

    assert found.utilisation > 1
    assert made.failed == ["deflection-2/deflection-attached"]


def test_the_largest_moment_of_earlier_stages_counts() -> None:
    """150 kN.m of a construction stage at midspan is more than dead load gives there."""
    section, service = section_of(THREE, 2), service_moments(THREE, UNIFORM, 2)
    stages = {stage: replace(m, earlier=(150e6, 0, 0)) for stage, m in service.stages.items()}
    sheet = start_sheet()
    entries = given_span(sheet, section, 2)
    record_span(sheet, entries, replace(service, stages=stages), carries=PARTITIONS)
    found = numbers.deflections(section, stages, carries=PARTITIONS)
    made = sheet.close()

    assert value(made, "deflection-2/delta_at") == pytest.approx(found.attached, rel=EXACT)
    assert value(made, "deflection-2-dead/M_am") == pytest.approx(150)
    assert list(faults(made.data)) == []


def test_curvature_stands_beside_for_information() -> None:
    """A found value within its bound, recomputed by its procedure; no check rests on it."""
    _, made = recorded(*CASES["point and partial loads"], PARTITIONS)
    entry = made.entries["deflection-2/delta_k"]

    assert entry["kind"] == "found"
    assert entry["value"] > 0
    assert entry["closing"]["holds"]
    assert [e["id"] for e in made.entries.values() if e["kind"] == "check"] == [
        "deflection-2/deflection-attached"
    ]


@pytest.mark.parametrize(("spans", "row"), [(1, "simply supported"), (2, "one end continuous")])
def test_an_end_held_by_columns_alone_is_not_continuous_in_the_table(spans: int, row: str) -> None:
    """Table 9.2: 7 m between columns of 400 mm, l_n = 6.6 m; /16 = 412.5, two spans: /18 = 366.7.

    The columns hold the beam elastically, but no span goes on beyond them.
    """
    column = "400 mm x 400 mm x 3 m"
    beam = start(
        spans=["7 m"] * spans, supports=["column 400 mm"] * (spans + 1),
        columns={1: column, spans + 1: column}, use="office",
        carries="floor, nothing attached that deflection damages",
    )  # fmt: skip
    run(beam, CALLS[: CALLS.index("deflections") + 1])
    entries = beam.sheet.entries_of(f"deflection-{spans}")

    assert entries["k_h"].source.row == f"beam, {row}"
    assert entries["h_min"].value == pytest.approx(6600 / {1: 16, 2: 18}[spans])
    assert "columns alone" in entries["by-columns"].source.text
