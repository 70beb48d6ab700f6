"""Bars at narrow end supports: they count with the part that hook or straight end develops."""

from __future__ import annotations

import math
import re
from dataclasses import replace
from itertools import pairwise
from typing import Any

import pytest

from lineproof.beams.bars import BarLayer, TopBars
from lineproof.beams.continuous.anchorage import hook_at
from lineproof.beams.continuous.anchored_ends import end_hook, least_anchored, top_part
from lineproof.beams.continuous.detailing_data import Designed, SectionBars
from lineproof.beams.continuous.layout import BarRun
from lineproof.errors import UserError
from lineproof.record import recompute

from . import flow

EDITION_2024 = {"codes": {"pair": "NBC 2025 + A23.3:24"}}
WALLS: list[dict[str, Any]] = [
    {"spans": ["5.5 m"], "supports": ["wall 250 mm"] * 2},
    {"spans": ["3.6 m"] * 3, "supports": ["wall 200 mm"] * 4, "h": "400 mm", "b_w": "300 mm"},
    {"spans": ["6 m"], "supports": ["wall 250 mm"] * 2,
     "project": EDITION_2024},
    # Its top bars run through to the outer wall, where no hook fits and no moment stands.
    {"spans": ["3.4 m", "4.9 m"], "supports": ["wall 250 mm"] * 3, "h": "380 mm", "b_w": "350 mm",
     "spacing": "4.7 m", "superimposed": "1.0 kPa"},
]  # fmt: skip


@pytest.mark.parametrize("inputs", WALLS, ids=lambda inputs: "-".join(inputs["spans"]))
def test_beams_on_masonry_walls_are_designed(inputs: dict[str, Any]) -> None:
    """Walls of 200 and 250 mm: every check of strength and anchorage holds by the choice made."""
    record = flow.run(flow.start(**inputs)).close()

    assert [key for key in record.failed if not key.startswith("deflection")] == []
    assert record.entries["anchorage-end-1-bottom/bars-end-support"]["holds"]
    assert recompute(record) == []


def test_straight_top_bars_at_a_narrow_end_say_why_they_have_no_hook() -> None:
    """25M at a girder 250 mm wide: 8 x 25.2 = 201.6 mm are more than 250 - 50 = 200 mm."""
    given = ["2-25M", "2-25M"]
    beam = flow.start(spans=["7 m"], supports=["girder 250 mm"] * 2, top_bars=given)
    record = flow.run(flow.without_cures(beam)).close()

    fits = record.entries["anchorage-end-1-top-1/hook-least-length"]
    assert fits["kind"] == "decision"
    assert fits["holds"] is False


def bare_of(**inputs: Any) -> Designed:
    """Return a beam as it is while its bars are chosen: none stand yet."""
    design = flow.analysed(**inputs).design
    return replace(design.designed, bars=SectionBars((), (), "15M"))


def test_area_of_hooked_bottom_bars_by_hand() -> None:
    """A wall 250 mm wide, bars that end 50 mm before its outer face: l_av = 200 mm.

    A hook of a 15M bar needs 100 x 16/sqrt(32) = 282.9 mm (the ties of 12.5.4 earn nothing),
    8 x 16 = 128 and 150 at least: the part 200/282.9 = 0.707 counts, 2-15M hold 282.8 mm2, 3-15M
    424.2 mm2.
    """
    bare = bare_of(spans=["5.5 m"], supports=["wall 250 mm"] * 2)

    areas = [least_anchored(bare, 1, "15M", needed) for needed in (282.0, 283.0, 424.0, 425.0)]

    assert areas == [400.0, 600.0, 600.0, 800.0]


def test_area_of_straight_bottom_bars_by_hand() -> None:
    """The same wall, and an edition whose hooks cannot be calculated: the bars are straight.

    By the table of 12.2.3 (factor 0.8 of thin bars, the others 1) l_d =
    0.45 x 0.8 x 400/sqrt(32) x 16 = 407 mm. The part 200/407 = 0.491 counts: 2-15M hold 196.4 mm2,
    3-15M 294.6 mm2: 197 mm2 ask for three bars, 600 mm2, and 295 mm2 for four.
    """
    bare = bare_of(spans=["5.5 m"], supports=["wall 250 mm"] * 2, project=EDITION_2024)

    areas = [least_anchored(bare, 1, "15M", needed) for needed in (196.0, 197.0, 294.0, 295.0)]

    assert areas == [400.0, 600.0, 600.0, 800.0]


@pytest.mark.parametrize(
    ("support", "top", "part"),
    [
        (1, TopBars(BarLayer(2, "15M"), 0, 2), 250 / 282.9),
        (1, TopBars(BarLayer(2, "15M"), 1, 2), 250 / 282.9),
        (1, TopBars(BarLayer(2, "20M"), 0, 2), 250 / 344.8),
        (1, TopBars(BarLayer(2, "25M"), 1, 2), 250 / 445.5),
        (1, TopBars(BarLayer(2, "35M"), 0, 2), 250 / (1.3 * 0.45 * 400 / math.sqrt(32) * 35.7)),
        (2, TopBars(BarLayer(2, "35M"), 0, 2), 1.0),
    ],
)
def test_part_of_top_bars_that_counts_by_hand(support: int, top: TopBars, part: float) -> None:
    """A girder of 300 mm at the end, bars that end 50 mm before its outer face: l_av = 250 mm.

    Hooks, 100 d_b/sqrt(32): 15M 282.9, 20M 344.8, 25M 445.5 mm, in the overhangs and within the
    web, whose ties 12.5.4 asks for. 8 diameters of 35M are 285.6 mm, more than
    that: these end straight, as top bars over more than 300 mm of concrete (12.2.4), with minimum
    stirrups. An inner girder is run through.
    """
    bare = bare_of(spans=["5 m", "5 m"], supports=["girder 300 mm"] * 3)

    assert top_part(bare, support, top) == pytest.approx(part, rel=1e-3)


def test_the_part_of_a_hook_is_that_of_the_lengths_as_recorded() -> None:
    """20M: 100 x 19.5/sqrt(32) = 344.71 mm, recorded as 344.8, the needed length rounded up.

    With the length not rounded, bars were chosen that failed their minimum by 0.03 %.
    """
    bare = bare_of(spans=["5 m", "5 m"], supports=["girder 300 mm"] * 3)

    part = top_part(bare, 1, TopBars(BarLayer(2, "20M"), 0, 2))
    assert part == pytest.approx(250 / 344.8, rel=1e-9)


NARROW: list[dict[str, Any]] = [
    {"spans": ["6.3 m"], "supports": ["girder 300 mm"] * 2, "h": "520 mm", "b_w": "400 mm"},
    {"spans": ["6.3 m"], "supports": ["girder 250 mm"] * 2, "h": "520 mm", "b_w": "300 mm",
     "spacing": "4.2 m", "superimposed": "2.5 kPa"},
    {"spans": ["6 m"], "supports": ["girder 300 mm"] * 2, "project": EDITION_2024},
    # At the outer column the top is in tension by shear alone: the bars that hold the stirrups.
    {"spans": ["8 m", "5.4 m"], "supports": ["column 250 mm"] * 3, "h": "570 mm", "b_w": "400 mm",
     "spacing": "3.7 m", "superimposed": "1.4 kPa",
     "columns": dict.fromkeys((1, 2, 3), ["250 mm x 250 mm x 3.2 m"] * 2)},
    # Bars that run through a short span are no third of the steel of their support.
    {"spans": ["4.3 m", "7.5 m", "4.3 m"], "supports": ["girder 300 mm"] * 4, "h": "540 mm",
     "b_w": "400 mm", "spacing": "3 m", "superimposed": "2.5 kPa"},
    # The top of the first span is in tension by the second one from near the end on.
    {"spans": ["4.3 m", "6.2 m", "6.8 m"], "supports": ["girder 300 mm"] * 4, "h": "420 mm",
     "b_w": "300 mm", "spacing": "4.3 m", "superimposed": "1.9 kPa"},
]  # fmt: skip


@pytest.mark.parametrize("inputs", NARROW, ids=lambda i: f"{i['supports'][0]}-{i['spans'][0]}")
def test_beams_on_narrow_girders_and_columns_are_designed(inputs: dict[str, Any]) -> None:
    """Ends of 250 and 300 mm: every check of strength and anchorage holds by the choice made."""
    record = flow.run(flow.start(**inputs)).close()

    assert [key for key in record.failed if not key.startswith("deflection")] == []
    assert recompute(record) == []


def test_a_section_counts_its_top_bars_as_far_as_their_hooks_are_developed() -> None:
    """Girders of 300 mm: 15M count by 250/282.9, in the web and in the overhangs.

    f_c = 32 MPa, alpha_1 = 0.85 - 0.0015 x 32 = 0.802, b_w = 400, d = 520 - 41.3 - 8 = 470.7 mm.
    """
    record = flow.record_of(**NARROW[0])
    section, part = (f"hog-1-right{tail}" for tail in ("", "-developed"))
    A_sd = 200 * record.entries[f"{part}/n_b"]["value"] * 250 / 282.9
    a = 0.85 * A_sd * 400 / (0.802 * 0.65 * 32 * 400)

    assert record.entries[f"{part}/A_sd"]["value"] == pytest.approx(A_sd, rel=1e-6)
    assert record.entries[f"{section}/M_r"]["value"] == pytest.approx(
        0.85 * A_sd * 400 * (470.7 - a / 2) / 1e6, rel=1e-6
    )
    assert record.entries["anchorage-end-1-hook-15m/hook-in-part"]["holds"]
    assert record.entries["anchorage-end-1-hook-15m-overhang/hook-in-part"]["holds"]
    assert record.entries["anchorage-end-1-hook-15m/hook-least-length"]["holds"]


def test_shear_at_a_girder_counts_the_bars_in_the_overhangs() -> None:
    """11.3.9 asks for area in tension: that of all top bars, not only of those within the web."""
    beam = flow.analysed(**NARROW[1])
    top = beam.design.top[1].bars
    assert isinstance(top, TopBars)
    told = next(text for text in beam.design.raised if text.startswith("support 1"))
    alone = told.split("by the moments alone ")[1]

    assert str(top) in told
    beside = re.search(r"(\d)-15M in each", alone)
    assert beside is not None
    assert int(beside[1]) < top.overhang


@pytest.mark.parametrize(("restrained", "hook"), [(frozenset({2}), "90"), (frozenset(), "")])
def test_only_an_end_that_is_free_to_rotate_goes_without_a_hook(
    restrained: frozenset[int], hook: str
) -> None:
    """On 250 mm a hook of 226 mm is developed in part; a restraint assumed asks for it still."""
    design = flow.analysed(spans=["5.5 m"], supports=["wall 250 mm"] * 2).design
    end = replace(design.designed, restrained=restrained)
    run = BarRun("top", 1, 2, "15M", 0.0, 5450.0)

    assert end_hook(end, 2, run) == hook


def test_more_is_never_less() -> None:
    bare = bare_of(spans=["5.5 m"], supports=["wall 250 mm"] * 2)

    areas = [least_anchored(bare, 1, "20M", 50.0 * n) for n in range(1, 12)]

    assert all(a <= b for a, b in pairwise(areas))
    assert areas[0] < areas[-1]


def test_no_number_of_bars_holds_everything() -> None:
    bare = bare_of(spans=["5.5 m"], supports=["wall 250 mm"] * 2)

    assert least_anchored(bare, 1, "15M", 1e5) == float("inf")


def test_bars_developed_in_part_are_counted_whole_for_cracks() -> None:
    """3-25M hooked in a support 300 mm wide: z by 10.6.1 with n = 3, though less than 3 develop.

    d_c = d_s = 30 + 11.3 + 25.2/2 = 53.9 mm; A = 2*53.9*380/3 = 13 655 mm2 a bar;
    z = 0.6*400*(53.9*13 655)**(1/3) = 21 670 N/mm. The area that counts for the moment is less:
    l_hb = 100*25.2/sqrt(32) = 445 mm, and 300 - 50 = 250 mm stand there.
    """
    beam = flow.start(
        spans=["6 m", "6 m"], supports=["wall 300 mm, fixed", "column 450 mm", "wall 300 mm"],
        shape="rectangular", h_f=None, floor_weight="3.4 kPa", top_bars=["3-25M"] * 3,
    )  # fmt: skip
    flow.run(beam, ["loads", "spans", "analysis", "flexure"])

    face = beam.sheet.entries_of("hog-1-right")
    assert face["n_z"].value == 3.0
    assert face["z"].value == pytest.approx(240 * (53.9 * 2 * 53.9 * 380 / 3) ** (1 / 3), rel=1e-9)
    assert face["steel-for-moment"].value[1] < 1500.0


def test_ties_of_15m_stand_on_whole_mm_where_five_leave_no_clear_space() -> None:
    """Hooks of 15M: at most 3*16 = 48 mm; ties of 15M need 16 + max(22.4, 28, 30) = 46 mm."""
    bare = bare_of(stirrup="15M", supports=["girder 400 mm", *["column 450 mm"] * 3])
    assert hook_at(bare, 1, "15M").s_tie == 48.0
    assert hook_at(bare, 1, "20M").s_tie == 55.0, "58.5 mm on the step of 5 mm"
    assert hook_at(bare_of(), 1, "15M").s_tie == 45.0, "ties of 10M need 41.3 mm"


def test_two_layers_developed_in_part_are_counted_whole_for_cracks() -> None:
    """A shallow band at a girder 250 mm wide: every bar that stands there counts for z.

    The bars count in part by their groups; n = n_t + n_o + n_2, all of one size.
    """
    record = flow.run(flow.start(
        spans=["4.6 m"], supports=["girder 250 mm", "wall 300 mm"], h="300 mm", b_w="480 mm",
        shape="L", h_f="134 mm", spacing="2.7 m", tributary_width="1.2 m", f_c="35 MPa",
        grade="500R", superimposed="2.7 kPa", use="library stack room", exposure="C-1",
        cover="60 mm", slab_bars="2 x 10M at 300 mm",
        loads=[{"type": "L", "span": 1, "point": "72 kN", "at": "3.89 m"},
               {"type": "D", "span": 1, "point": "27 kN", "at": "2.52 m"}],
    )).close()  # fmt: skip

    face = {n.removeprefix("hog-1-right/"): e for n, e in record.entries.items()
            if n.startswith("hog-1-right/")}  # fmt: skip
    standing = sum(face[name]["value"] for name in ("n_t", "n_o", "n_2"))
    assert face["n_z"]["value"] == standing
    assert face["steel-for-moment"]["right"] < 200 * standing  # those that count for the moment
    assert "hog-1-right/crack-control" not in record.failed
    assert recompute(record) == []


HOOKS = {"hook_start": "90", "hook_end": "90"}
HOOKED: list[dict[str, str]] = [
    {"face": "bottom", "bars": "3-20M", "start": "-0.1 m", "end": "6.1 m", **HOOKS},
    {"face": "top", "bars": "2-15M", "start": "-0.1 m", "end": "6.1 m"},
]


def test_ties_around_hooks_are_not_invented_where_bars_and_stirrups_are_given() -> None:
    """3-20M hooked in walls of 300 mm, cover 30 mm to stirrups 10M: 41.3 mm, below 60.

    Ties are asked for (12.5.4) and none are given: l_dh = 100 x 19.5/sqrt(32) = 344.7 mm without
    the factor for ties, and 900 x (300 - 50)/344.7 = 652.7 mm2 count at the face. With the
    stirrups left open the ties are laid and stand in the schedule.
    """
    given: dict[str, Any] = {
        "spans": ["6 m"], "supports": ["wall 300 mm"] * 2, "bar_runs": HOOKED,
    }  # fmt: skip
    beam = flow.start(**given, stirrups=[{"span": 1, "spacing": "250 mm"}])
    sheet = flow.run(beam)
    made = sheet.close()
    hook = "anchorage-end-1-hook-20m"
    assert made.entries[f"{hook}/l_dh"]["value"] == pytest.approx(344.7, abs=0.1)
    assert made.entries["anchorage-end-1-bottom/A_sd"]["value"] == pytest.approx(652.7, abs=0.2)
    assert f"{hook}/s_tie" not in made.entries
    assert "NOT checked here" in made.entries[f"{hook}/no-ties"]["text"]
    assert not any(zone.around_hooks for zone in beam.design.detailing.stirrups)
    assert "12.5.4" in [each["clause"] for each in sheet.not_covered]

    laid = flow.start(**given)
    assert "12.5.4" not in [each["clause"] for each in flow.run(laid).not_covered]
    assert any(zone.around_hooks for zone in laid.design.detailing.stirrups)


@pytest.mark.parametrize(
    ("supports", "spacing", "l_dh"),
    [("wall 300 mm", 55, 344.7), ("column 300 mm", 55, 193.0), ("column 300 mm", 65, 241.3)],
)
def test_ties_around_hooks_as_built_are_checked(supports: str, spacing: int, l_dh: float) -> None:
    """Ties 10M around hooks 20M: 3 x 19.5 = 58.5 mm apart at most (12.5.4).

    In a column of 500 mm a beam of 350 mm has 75 mm more at its sides, 116 mm: 0.7 x 344.7 = 241.3
    mm, and the factor of ties is earned, 0.8 x 241.3 = 193.0 mm, if they stand close enough.
    """
    given: dict[str, Any] = {
        "spans": ["6 m"], "supports": [supports] * 2, "bar_runs": HOOKED,
        "stirrups": [{"span": 1, "spacing": "250 mm"}],
        "hook_ties": {1: f"{spacing} mm", 2: f"{spacing} mm"},
    }  # fmt: skip
    if supports.startswith("column"):
        given |= {"columns": {n: ["300 mm x 500 mm x 3.5 m"] for n in (1, 2)}}
    beam = flow.start(**given)
    sheet = flow.run(beam)
    made = sheet.close()
    hook = "anchorage-end-1-hook-20m"
    assert made.entries[f"{hook}/l_dh"]["value"] == pytest.approx(l_dh, abs=0.1)
    assert made.entries[f"{hook}/s_tie"]["value"] == spacing
    assert made.entries[f"{hook}/hook-ties"]["holds"] is (spacing <= 58.5)
    ties = [zone for zone in beam.design.detailing.stirrups if zone.around_hooks]
    assert [(zone.spacing, zone.number) for zone in ties] == [(spacing, 250 // spacing)] * 2
    assert "12.5.4" not in [each["clause"] for each in sheet.not_covered]


def test_ties_around_hooks_of_one_end_leave_the_other_not_covered() -> None:
    sheet = flow.run(
        flow.start(
            spans=["6 m"], supports=["wall 300 mm"] * 2, bar_runs=HOOKED,
            stirrups=[{"span": 1, "spacing": "250 mm"}], hook_ties={1: "55 mm"},
        )
    )  # fmt: skip
    made = sheet.close()
    assert "anchorage-end-1-hook-20m/hook-ties" in made.entries
    assert "anchorage-end-2-hook-20m/no-ties" in made.entries
    assert "12.5.4" in [each["clause"] for each in sheet.not_covered]


@pytest.mark.parametrize(
    ("changes", "told"),
    [
        ({"hook_ties": {2: "75 mm"}}, "support 2 is no end of the beam; hooks stand at 1 and 4"),
        ({"hook_ties": {"1": "75 mm"}}, "is no number of a support"),
        ({"hook_ties": "75 mm"}, "write their spacing by the number of the end support"),
        ({"hook_ties": {1: "75"}}, "has no unit"),
        ({"hook_ties": {1: "7.5 m"}}, "outside 30 to 600 mm"),
        ({"hook_ties": {1: "75 mm"}, "stirrups": None}, "where bars and stirrups are both given"),
        (
            {"hook_ties": {1: "75 mm"}, "supports": ["free", *["column 450 mm"] * 3]},
            "support 1 is a free end",
        ),
    ],
)
def test_wrong_ties_are_told(changes: dict[str, Any], told: str) -> None:
    given: dict[str, Any] = {
        "bar_runs": [row | {"end": "24.55 m"} for row in HOOKED],
        "stirrups": [{"span": k, "spacing": "250 mm"} for k in (1, 2, 3)],
    }  # fmt: skip
    with pytest.raises(UserError) as raised:
        flow.start(**given | changes)
    assert "hook_ties" in str(raised.value)
    assert told in str(raised.value)


def test_hanger_stirrups_of_a_beam_as_built_are_listed_as_not_covered() -> None:
    """Their number is what carries, not what stands: with bars and stirrups given that is said."""
    given: dict[str, Any] = {"spans": ["6 m"], "bar_runs": HOOKED}
    stirrups = [{"span": 1, "spacing": "250 mm"}]
    for support, as_built, listed in (
        ("girder 300 mm", True, True),
        ("girder 300 mm", False, False),
        ("wall 300 mm", True, False),
    ):
        beam = flow.start(**given, supports=[support] * 2, stirrups=stirrups if as_built else None)
        rows = [each for each in beam.sheet.not_covered if "Hanger" in each["check"]]
        assert bool(rows) == listed


def test_hooks_of_corner_bars_beside_a_narrow_column_are_remarked() -> None:
    """A web of 380 mm on columns of 250: (250 - 380)/2 + 30 + 11.3 = -23.7 mm of side cover."""
    columns = dict.fromkeys((1, 2), ["450 mm x 250 mm x 3.6 m"] * 2)
    record = flow.record_of(spans=["7 m"], supports=["column 450 mm"] * 2, columns=columns)

    sides = {k: e for k, e in record.entries.items() if k.endswith("/c_side")}
    assert sides
    for key, entry in sides.items():
        assert entry["value"] == pytest.approx(-23.7)
        part = key.removesuffix("/c_side")
        assert "NOT checked here" in record.entries[f"{part}/beside-the-column"]["text"]
        assert record.entries[f"{part}/k_hc"]["value"] == 1.0
