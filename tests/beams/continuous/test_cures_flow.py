"""Cures told in the flow: the beam is calculated anew with each cure, and the check then holds.

A step less does not. Where depth or width is the cure, the superimposed load is taken down by what
the beam weighs more, since the cure is told with the loads as they are.
"""

from __future__ import annotations

from collections.abc import Mapping
from itertools import pairwise
from typing import Any

import pytest

from lineproof import beams
from lineproof.beams.continuous import beam as flow
from lineproof.beams.continuous import cures_checks
from lineproof.beams.continuous.cures_flow import AS_ABOVE, NOT_SOUGHT
from lineproof.beams.continuous.cures_replay import AnotherCaseError, Replay, bound_names
from lineproof.beams.continuous.cures_tried import failing
from lineproof.errors import UserError
from lineproof.record.entry import CHECK
from lineproof.record.printing import utilisation
from lineproof.sheet import Sheet

from .cures_told import FLEXURE, check, checked, lighter, note, sheet_of, told
from .flow import CALLS, PROJECT, run, without_cures
from .notebooks import EXISTING_BEAM, inputs_of

THROUGH = tuple(CALLS[: CALLS.index("anchorage") + 1])


def existing(calls: tuple[str, ...] = CALLS, *, cures: bool = False, **changes: Any) -> Sheet:
    """Return the sheet of the existing beam of the notebook with some inputs changed."""
    sheet = Sheet("B3", "Existing beam", project=PROJECT)
    beam = beams.continuous_beam(sheet, **(inputs_of(EXISTING_BEAM) | changes))
    return run(beam if cures else without_cures(beam), calls)


# -- flexure ---------------------------------------------------------------------------------

WEAK: Mapping[str, Any] = {"bottom_bars": ["3-20M", "5-20M", "5-20M"]}


def test_more_bars_as_told_hold_in_the_flow() -> None:
    """3-20M where 1235 mm2 are asked for: 5-20M are told; they hold and 4-20M (1200) do not."""
    weak = sheet_of(FLEXURE, **WEAK)
    text = note(weak, "sag-1")

    assert not check(weak, "sag-1/strength")
    number = told(text, r"\((\d)-20M\)")
    assert number == 5
    assert told(text, r"(\d+) mm² of bars") == pytest.approx(weak.entry("sag-1/A_sr").value, abs=10)
    for bars, holds in (("5-20M", True), ("4-20M", False)):
        again = checked(FLEXURE, bottom_bars=[bars, "5-20M", "5-20M"])
        assert bool(check(again, "sag-1/strength")) is holds
        assert bool(check(again, "sag-1/steel-for-moment")) is holds
    assert "No width of the web up to 1500 mm and no concrete up to 80 MPa would do" in text


def test_the_depth_told_holds_in_the_flow_with_the_loads_as_they_are() -> None:
    weak = sheet_of(FLEXURE, **WEAK)
    depth = told(note(weak, "sag-1"), r"a depth of (\d+) mm")
    again = checked(FLEXURE, **WEAK, **lighter(h=depth))
    less = checked(FLEXURE, **WEAK, **lighter(h=depth - 10))

    moment = weak.entry("sag-1/M_f").value
    assert again.entry("sag-1/M_f").value == pytest.approx(moment, rel=1e-4)
    assert check(again, "sag-1/strength")
    assert not check(less, "sag-1/strength")


def test_what_no_width_or_concrete_cures_fails_with_much_of_both() -> None:
    weak = sheet_of(FLEXURE, **WEAK)
    assert "no concrete up to 80 MPa" in note(weak, "sag-1")
    assert not check(checked(FLEXURE, **WEAK, f_c="80 MPa"), "sag-1/strength")
    assert not check(checked(FLEXURE, **WEAK, **lighter(b_w=700)), "sag-1/strength")


def test_top_bars_and_the_minimum_of_the_flange() -> None:
    """Two kinds of cure in one part, each titled; the face beside has its own."""
    weak = sheet_of(FLEXURE, top_bars=[None, "3-20M", None, None])
    notes = {
        e.source.title: e.source.text
        for s, e in weak.entries_of("hog-2-left").items()
        if s.startswith("cure-")
    }
    strength, waiver = notes.values()

    assert list(notes) == [
        "Cure: reinforcement provided for the moment; moment resistance",
        "Cure: waiver of the minimum: resistance a third above the moment",
    ]
    assert "6-20M" in strength
    assert "6-20M" in waiver
    assert "6-20M" in note(weak, "hog-2-right")
    (beside,) = [s for s in weak.entries_of("hog-2-right") if s.startswith("cure-")]
    assert check(weak, f"hog-2-right/{beside}").source.title == "Cure: moment resistance"
    again = checked(FLEXURE, top_bars=[None, "4-20M", None, None])
    # 4 in the web and 1 in each overhang are the six
    assert again.entry("hog-2-left/A_s").value == 1800
    assert not failing(next(p for p in again.parts if p.key == "hog-2-left"))
    assert not failing(next(p for p in again.parts if p.key == "hog-2-right"))


def test_smaller_bars_told_for_cracks_hold() -> None:
    wet: Mapping[str, Any] = {"exposure": "F-1", "cover": "40 mm"}
    weak = sheet_of(FLEXURE, **wet, bottom_bars=["2-30M", None, None])
    text = note(weak, "sag-1")

    assert "3 bars of this size in the layer" in text
    assert "bars 25M of at least the same area" in text
    again = checked(FLEXURE, **wet, bottom_bars=["3-25M", None, None])  # 1500 of 1400 mm2
    assert not check(weak, "sag-1/crack-control")
    assert check(again, "sag-1/crack-control")


# -- shear -----------------------------------------------------------------------------------

SHEAR = (*FLEXURE, "shear")


def zones(spacing: float, to: str = "7.1 m") -> list[dict[str, Any]]:
    """Return one zone a span."""
    row = {"from": "0 m", "to": to, "spacing": f"{spacing:g} mm"}
    return [{"span": span} | row for span in (1, 2, 3)]


def test_the_spacing_told_holds_in_the_flow() -> None:
    wide = sheet_of(SHEAR, stirrups=zones(450))
    s = told(note(wide, "shear-1-left"), r"stirrups at (\d+) mm or less")

    assert s == 350
    assert check(checked(SHEAR, stirrups=zones(s)), "shear-1-left/stirrup-spacing")
    assert not check(checked(SHEAR, stirrups=zones(s + 25)), "shear-1-left/stirrup-spacing")


def test_with_an_assumed_restraint_closer_stirrups_are_told_as_well() -> None:
    """One span whose ends are cast with columns: the restraint adds to the shear there."""
    slim: Mapping[str, Any] = {
        "spans": ["9 m"], "supports": ["column 450 mm"] * 2, "b_w": "300 mm",
        "superimposed": "4 kPa",
    }  # fmt: skip
    entry = "shear-1-left-restraint/shear-restraint"
    wide = sheet_of(SHEAR, **slim, stirrups=zones(400)[:1])
    s = told(note(wide, "shear-1-left-restraint"), r"stirrups at (\d+) mm or less")

    assert not check(wide, entry)
    assert check(checked(SHEAR, **slim, stirrups=zones(s)[:1]), entry)
    assert not check(checked(SHEAR, **slim, stirrups=zones(s + 25)[:1]), entry)


def test_where_there_are_no_stirrups_stirrups_are_told() -> None:
    """The zone ends 1.65 m before the right face of span 2; told is the widest that does."""
    gap = sheet_of(SHEAR, stirrups=zones(350))
    s = told(note(gap, "shear-2-right"), r"stirrups at (\d+) mm")

    assert not check(gap, "shear-2-right/shear-strength")
    filled = [z | ({"to": "8.75 m"} if z["span"] == 2 else {}) for z in zones(s)]
    assert check(checked(SHEAR, stirrups=filled), "shear-2-right/shear-strength")
    wider = [z | {"spacing": f"{s + 25:g} mm"} for z in filled]
    failed = sheet_of(SHEAR, stirrups=wider)
    assert failing(next(p for p in failed.parts if p.key == "shear-2-right"))


def test_concrete_and_width_told_hold_by_the_simplified_method() -> None:
    """Without stirrups at the right end of span 3: each cure is tried in the flow."""
    fixed: Mapping[str, Any] = {
        "shear_method": "simplified", "stirrups": zones(250, to="2 m")[::2],
        "bottom_bars": ["5-20M"] * 3, "top_bars": [None, "5-20M", "5-20M", None],
    }  # fmt: skip
    bare = sheet_of(SHEAR, **fixed)
    text = note(bare, "shear-3-right", "shear-strength")
    f_c = told(text, r"concrete of (\d+) MPa")
    b_w = told(text, r"a web (\d+) mm wide")

    entry = "shear-3-right/shear-strength"
    assert check(checked(SHEAR, **fixed, f_c=f"{f_c:g} MPa"), entry)
    assert not check(checked(SHEAR, **fixed, f_c=f"{f_c - 5:g} MPa"), entry)
    wide = sheet_of(SHEAR, **fixed, **lighter(b_w=b_w))
    assert wide.entry("shear-3-right/V_f").value == pytest.approx(
        bare.entry("shear-3-right/V_f").value, rel=1e-3
    )
    assert check(wide, entry)
    assert not check(checked(SHEAR, **fixed, **lighter(b_w=b_w - 10)), entry)


def test_steel_told_for_the_tension_side_is_that_of_the_face_in_tension() -> None:
    """At the column the top is in tension: 6-20M of the top bars; stirrups do not help.

    The depth is that of the bottom bars as well, of which no more would fit: that is not asked.
    """
    asked = existing((*FLEXURE, "shear"), cures=True)
    text = note(asked, "shear-1-right")
    bars = [
        run | ({"bars": "2-20M"} if run["bars"] == "1-20M" else {})
        for run in inputs_of(EXISTING_BEAM)["bar_runs"]
    ]
    again = existing((*FLEXURE, "shear"), bar_runs=bars)

    assert "(6-20M)" in text
    assert again.entry("shear-1-right/A_s").value == 1800
    assert check(again, "shear-1-right/bars-tension-side")
    assert "No spacing of the stirrups down to 75 mm would do" in text


# -- deflection ------------------------------------------------------------------------------


def test_the_depth_told_for_a_deflection_holds_in_the_flow() -> None:
    """450 mm under 7.2 kPa; the bars stay those chosen for 450 mm."""
    bars: Mapping[str, Any] = {
        "live_load": "7.2 kPa", "bottom_bars": ["4-25M"] * 3,
        "top_bars": [None, "5-25M", "5-25M", None],
    }  # fmt: skip
    calls = (*FLEXURE, "deflections")
    shallow = sheet_of(calls, **bars, h="450 mm")
    h = told(note(shallow, "deflection-1"), r"a depth of (\d+) mm")

    entry = "deflection-1/deflection-attached"
    assert not check(shallow, entry)
    assert check(checked(calls, **bars, **lighter(h=h, h_before=450.0)), entry)
    assert not check(checked(calls, **bars, **lighter(h=h - 10, h_before=450.0)), entry)
    assert "No number of bars 25M in one layer" in note(shallow, "deflection-1")
    assert "chosen anew" not in note(shallow, "deflection-1")


def test_a_cure_of_a_deflection_says_that_open_bars_are_chosen_anew() -> None:
    """A deeper beam needs fewer bars: with those it may bend as much as before."""
    shallow = sheet_of((*FLEXURE, "deflections"), h="420 mm", superimposed="1.2 kPa")

    assert not check(shallow, "deflection-1/deflection-attached")
    assert "bars left open are chosen anew" in note(shallow, "deflection-1")


# -- anchorage -------------------------------------------------------------------------------


def test_bars_too_short_are_told_by_how_much() -> None:
    """Top bars that end 506 mm past their point shall end 829 mm past it: 330 mm longer do."""
    runs = inputs_of(EXISTING_BEAM)["bar_runs"]
    short = existing(THROUGH, cures=True)
    part = "anchorage-top-2-left-cut-1"
    needed, provided = check(short, f"{part}/cut-extension").value
    more = told(note(short, part), r"made (\d+) mm longer")

    assert (needed, provided) == (pytest.approx(829, abs=1), pytest.approx(506, abs=1))
    assert more == 330
    for longer, holds in ((more, True), (more - 10, False)):
        start_at = f"{5200 - longer:g} mm"
        changed = [run | ({"start": start_at} if run["start"] == "5.20 m" else {}) for run in runs]
        again = existing(THROUGH, bar_runs=changed)
        assert bool(check(again, f"{part}/cut-extension")) is holds


def test_a_support_too_short_for_its_bars_is_told_to_be_longer() -> None:
    """A wall 150 mm wide, bars that end 50 mm before its far face: 100 mm where 150 are asked."""
    part = "anchorage-bottom-1-left"
    one: Mapping[str, Any] = {"spans": ["5 m"], "h": "450 mm"}
    text = note(sheet_of(THROUGH, supports=["wall 150 mm"] * 2, **one), part)
    more = told(text, r"made (\d+) mm longer into the support, which must be as much longer")

    for longer, holds in ((more, True), (more - 10, False)):
        wider = checked(THROUGH, supports=[f"wall {150 + longer:g} mm"] * 2, **one)
        assert bool(check(wider, f"{part}/length-in-support")) is holds


def test_the_existing_beam_holds_what_it_was_built_for_and_not_what_is_asked() -> None:
    """The notebook says so: with 4.8 kPa every check holds; with 7.2 the top steel does not."""
    built, asked = existing(live_load="4.8 kPa"), existing()

    assert not [e for part in built.parts for e in failing(part)]
    bad = {part.key for part in asked.parts if failing(part)}
    assert {"hog-2-left", "hog-2-right", "coverage-top"} <= bad
    assert not [key for key in bad if key.startswith(("sag", "deflection", "anchorage-bottom"))]
    strength = {k for k in bad for e in asked.entries_of(k) if e == "shear-strength"}
    assert all(check(asked, f"{key}/shear-strength") for key in strength)


def test_no_moment_is_none_of_the_top_at_either_end() -> None:
    """At both simple ends the moment is 0 but for round-off; one of them was called negative."""
    titles = [
        (entry.extra or {})["title"]
        for part in existing().parts
        if "development at the simple support" in part.title
        for entry in part.entries.values()
        if entry.symbol == "M_f"
    ]
    assert [title.partition(":")[0] for title in titles] == ["Positive moment at the section"] * 2


def test_what_is_not_about_the_section_says_so() -> None:
    weak = sheet_of(FLEXURE, exposure="F-1", cover="40 mm", bottom_bars=["2-35M", None, None])
    assert note(weak, "cover") == NOT_SOUGHT


# -- all of it -------------------------------------------------------------------------------


def test_nothing_is_solved_while_all_checks_hold(monkeypatch: pytest.MonkeyPatch) -> None:
    def refuse(*_: object) -> None:
        pytest.fail("a cure was sought although no check fails")

    monkeypatch.setattr(flow, "record_cures", refuse)
    sheet = sheet_of()

    assert not any(failing(part) for part in sheet.parts)
    assert "failing" not in sheet.entries_of("summary")
    assert not [s for part in sheet.parts for s in part.entries if s.startswith("cure-")]


def test_the_summary_lists_every_check_that_fails() -> None:
    sheet = sheet_of(**WEAK, stirrups=zones(450))
    bad = [(part, e) for part in sheet.parts for e in failing(part)]
    rows = sheet.entry("summary/failing").source.content["rows"]

    assert {part.title for part, _ in bad} == {row[0] for row in rows}
    told_of = [title for row in rows for title in row[1].lower().split("; ")]
    assert len(told_of) == len(bad) > 6
    assert all("FAILS" in row[2] and row[3] for row in rows)
    assert all(any(s.startswith("cure-") for s in part.entries) for part, _ in bad)


def test_cures_that_are_those_of_the_row_above_are_not_told_again() -> None:
    """Of the existing beam: three checks of one gap in the top bars, and both sides in shear."""
    sheet = existing(cures=True)
    rows = sheet.entry("summary/failing").source.content["rows"]
    told = [row[3] for row in rows]
    pairs = list(pairwise(told))
    assert told.count(AS_ABOVE) == 3
    assert told[-2:] == [AS_ABOVE, AS_ABOVE]
    assert told[-3].startswith("(a) further bars")
    assert not [above for above, below in pairs if above == below != AS_ABOVE]
    first = [row for row in rows if row[0].startswith("Shear of span")]
    assert [row[3] == AS_ABOVE for row in first] == [False, True]


def test_a_check_accepted_by_the_engineer_asks_for_no_cure() -> None:
    sheet = Sheet("B1")
    with sheet.part("own", "Own") as part:
        sheet.given("A_sr", "1900 mm2")
        sheet.given("A_s", "1800 mm2")
        sheet.check("A_sr <= A_s", key="one")
        sheet.check("A_sr <= A_s", key="two", accepted="tested on site", initials="R.P.")
    assert [e.symbol for e in failing(part)] == ["one"]


# -- the recorded calculation computed again -------------------------------------------------


@pytest.fixture(scope="module")
def whole() -> Sheet:
    """Return the three spans with everything that hangs together."""
    return sheet_of(THROUGH)


def test_computed_again_unchanged_every_check_is_as_recorded(whole: Sheet) -> None:
    count = 0
    for part in whole.parts:
        for entry in part.entries.values():
            if entry.kind != CHECK or utilisation(entry) is None:
                continue
            roots = {name: (arg,) for name, arg in bound_names(entry).items() if name == "f_c"}
            assert Replay.of(entry, roots)({}) == pytest.approx(utilisation(entry), rel=1e-12)
            count += bool(roots)
    assert count > 20


@pytest.mark.parametrize(
    "changes", [{"h": 700.0}, {"b_w": 420.0}, {"f_c": 45.0}, {"s": 150.0}, {"A_s": 2600.0}]
)
def test_changed_shear_is_that_of_the_formulas_put_together_by_hand(
    whole: Sheet, changes: Mapping[str, float]
) -> None:
    """Beside it stands ``cures_checks``, whose numbers are checked against hand calculations."""
    shear = check(whole, "shear-2-right/shear-strength")
    bound = bound_names(shear)
    names = ("f_c", "phi_c", "phi_s", "f_y", "lambda_", "E_s", "b_w", "h", "d", "s", "A_v", "A_s",
             "M_f", "V_f")  # fmt: skip
    by_hand = cures_checks.shear_strength({name: bound[name].value for name in names})
    ((name, value),) = changes.items()
    replay = Replay.of(shear, {name: (bound[name],)})

    assert replay.touches
    assert replay({name: value}) == pytest.approx(by_hand(changes), rel=1e-12)


def test_a_decision_that_would_fall_the_other_way_stops() -> None:
    sheet = Sheet("B1")
    with sheet.part("own", "Own"):
        sheet.given("h", "500 mm")
        sheet.given("h_1", "700 mm")
        sheet.given("h_2", "400 mm")
        sheet.decide("h <= h_1", key="shallow")
        made = sheet.check("h_2 <= h", key="deep")
    replay = Replay.of(made, {"h": (sheet.entry("own/h"),)})

    assert replay({"h": 600.0}) == pytest.approx(400 / 600)
    with pytest.raises(AnotherCaseError):
        replay({"h": 710.0})


def test_a_fault_while_cures_are_sought_is_not_hidden() -> None:
    """A part in which recording fails is not closed: the sheet asks for it again."""
    sheet = Sheet("B1")

    def fault(_: object) -> None:
        raise UserError("no cure")

    with (
        pytest.raises(UserError, match="no cure"),
        sheet.chapter("call()", closing=fault),
        sheet.part("own", "Own"),
    ):
        sheet.given("h", "500 mm")
    with pytest.raises(UserError, match="stopped with an error"):
        sheet.close()
