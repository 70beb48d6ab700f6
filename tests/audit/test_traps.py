"""Traps of section and shear: each rule is set off by a line that fell into it, and by no other."""

from __future__ import annotations

from collections.abc import Mapping
from functools import cache

import pytest
from tests.beams import gallery
from tests.beams.continuous.flow import MIXED, record_of

from lineproof.audit.data import Finding, Severity
from lineproof.audit.search.traps import TRAPS, trap_findings, traps_met
from lineproof.audit.search.traps_view import Trap
from lineproof.audit.slips.kinds import FAMILIES
from lineproof.sheet import Sheet

from .altered import NAMES, changed, demo, edited
from .trap_cases import SECTION, SHEAR, STIRRUPS, Case, project
from .trap_cases_service import LAID, LOADS, SERVICE, WHOLE
from .trap_sheets import SHEETS, right

CASES = (*SECTION, *SHEAR, *STIRRUPS, *LOADS, *WHOLE, *SERVICE, *LAID, *SHEETS)
SLIP = "slip: "
COVERED_BY: Mapping[tuple[int, str], str] = {
    (6, "moment in kN.m with shear in N"): f"{SLIP}unit factor",
    (30, "kPa used as kN/m"): f"{SLIP}unit factor",
    (30, "half or full tributary width in a claim"): f"{SLIP}half or full tributary width",
    (30, "clear for centre span in a claim"): f"{SLIP}clear for centre span",
    (30, "simple span for continuous in a claim"): f"{SLIP}simple span for continuous",
    (30, "moment at the axis in a claim"): f"{SLIP}centreline for face",
    (30, "supports swapped in a claim"): f"{SLIP}left for right, or neighbouring place",
    (30, "factored for specified in a claim"): f"{SLIP}factored for service",
    (31, "one leg of the stirrups in a claim"): f"{SLIP}stirrup legs",
    (31, "number of bars and their area in a claim"): f"{SLIP}bar count changed but not the area",
    (31, "length of a cantilever in a claim"): f"{SLIP}clear for centre span",
    (31, "calc and drawing at different revisions"): "drawing",
    (28, "checks that another standard asks for, and this one too"): "missing",
}
"""Parts of traps that do not show in a record alone: the search that finds them.

They show in the claims of another (``slip:`` and the kind that the slip finder tells), in a
drawing, or in what is missing.
"""


@cache
def met(case: Case) -> list[tuple[Trap, Finding]]:
    """Return what is found of a case, with the rules that found it."""
    return [(trap, f) for trap, f in traps_met(case.record()) if case.said in f.what]


@pytest.mark.parametrize("name", NAMES)
def test_no_false_alarm_in_the_demo_calcs(name: str) -> None:
    assert trap_findings(demo(name)) == ()


def test_no_false_alarm_in_a_calc_of_its_own_making() -> None:
    assert trap_findings(right()) == ()


def test_no_false_alarm_in_the_simple_beam() -> None:
    assert trap_findings(gallery.record_of()) == ()


def test_no_false_alarm_with_a_cantilever_a_fixed_end_and_single_loads() -> None:
    assert trap_findings(record_of(**MIXED)) == ()


@pytest.mark.parametrize(
    ("codes", "said"),
    [
        ({"pair": "NBC 2015 + A23.3-14"}, ()),
        ({"concrete": "A23.3-04"}, ("A23.3-04 are no pair that goes together.",)),
    ],
)
def test_a_calc_of_its_own_may_name_its_codes_in_part(
    codes: dict[str, str], said: tuple[str, ...]
) -> None:
    sheet = Sheet("J1", "Own sheet")
    sheet.codes = codes
    with sheet.part("given", "Given"):
        sheet.given("h", "600 mm", "overall depth")
    assert tuple(finding.what for finding in trap_findings(sheet.close())) == said


@pytest.mark.parametrize("case", CASES, ids=lambda case: f"{case.number} {case.said[:50]}")
def test_a_line_in_a_trap_is_found(case: Case) -> None:
    found = met(case)

    assert {trap.number for trap, _ in found} == {case.number}
    assert all(finding.clause and finding.advice for _, finding in found)
    if case.entry_id:
        assert case.entry_id in {entry_id for _, finding in found for entry_id in finding.ids}


def test_every_rule_is_set_off_by_a_case() -> None:
    names = {
        (trap.number, trap.name)
        for case in CASES
        for trap, _ in met(case)
        if trap.number == case.number
    }

    assert names == {(trap.number, trap.name) for trap in TRAPS}


def test_every_trap_of_the_list_has_a_rule_or_a_search_that_finds_it() -> None:
    """The list of traps has 32 numbers."""
    ruled = {trap.number for trap in TRAPS} | {number for number, _ in COVERED_BY}

    assert ruled == set(range(1, 33))


def test_what_the_slip_finder_covers_it_knows() -> None:
    kinds = {family.kind for family in FAMILIES.values()}
    named = {how.removeprefix(SLIP) for how in COVERED_BY.values() if how.startswith(SLIP)}

    assert named <= kinds
    assert set(COVERED_BY.values()) - {f"{SLIP}{kind}" for kind in kinds} == {"drawing", "missing"}


def test_a_trap_that_hides_a_failing_check_is_critical() -> None:
    """With the flange at support 2: a = 0.85 x 1800 x 400/(0.802 x 0.65 x 32 x 2220) = 16.53 mm.

    M_r = 612000 x (568.95 - 16.53/2) = 343.1 kN.m. Against 330 kN.m it holds; with the web,
    a = 96.55 mm and M_r = 318.7 kN.m, it does not: 330/343.1 = 0.962, 330/318.7 = 1.036.
    """
    wrong = changed(demo("floor-beam"), "hog-2-left/M_f", value=330.0)
    wrong = changed(wrong, "hog-2-left/a", args={"b": "span-2/b_f"}, value=16.526)
    wrong = changed(wrong, "hog-2-left/M_r", value=343.14)

    (finding,) = trap_findings(wrong)
    strength = next(e for e in finding.effects if e.check == "hog-2-left/strength")

    assert finding.severity == Severity.CRITICAL
    assert finding.what == (
        "Depth of the stress block, width b, support 2, left face (14.21): the width of the flange "
        "is used in negative moment."
    )
    assert strength.claimed == pytest.approx(330 / 343.14, rel=1e-3)
    assert strength.right == pytest.approx(330 / 318.655, rel=1e-4)
    assert strength.sentence.endswith(
        "utilisation from 0.96 as recorded to 1.04 put right, no longer holds"
    )


def test_a_trap_without_effect_keeps_its_own_weight() -> None:
    """λ is 1 for normal density: the line is right by number, and the formula is not."""
    case = next(case for case in STIRRUPS if case.entry_id == "materials/f_r")

    (finding,) = trap_findings(case.record())

    assert finding.severity == Severity.OBSERVATION
    assert finding.effects == ()


def test_one_leg_for_two_is_told_with_the_resistance_put_right() -> None:
    """V_s counts 100 mm2 where the stirrups have 200: put right it is twice as large."""
    right = demo("floor-beam")
    V_s = float(right.entries["shear-2-left/V_s"]["value"])
    V_c = float(right.entries["shear-2-left/V_c"]["value"])
    V_f = float(right.entries["shear-2-left/V_f"]["value"])
    wrong = changed(right, "shear-2-left/V_s", args={"A_v": "stirrups/A_t"}, value=V_s / 2)
    wrong = changed(wrong, "shear-2-left/V_r", value=V_c + V_s / 2)

    (finding,) = trap_findings(wrong)
    strength = next(e for e in finding.effects if e.check == "shear-2-left/shear-strength")

    assert strength.claimed == pytest.approx(V_f / (V_c + V_s / 2), rel=1e-9)
    assert strength.right == pytest.approx(V_f / (V_c + V_s), rel=1e-9)


@pytest.mark.parametrize("fact", ["text", ["text"], {"date": None}, 7, None])
def test_facts_of_another_kind_set_off_nothing(fact: object) -> None:
    facts = dict.fromkeys(("issue", "revisions", "locations", "building", "drawings"), fact)
    record = edited(demo("floor-beam"), project(**facts))

    assert trap_findings(record) == ()
