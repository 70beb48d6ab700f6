"""Bad input: every fault at once, with the input, what was given and what to type; no record."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import pytest

from lineproof.beams import continuous_beam
from lineproof.beams.continuous.typed_torques import read_torques
from lineproof.errors import UserError
from lineproof.sheet import Sheet

from .flow import CALLS, PROJECT, start

BOTTOM = {"face": "bottom", "bars": "4-25M", "start": "-0.15 m", "end": "24.55 m"}
TOP = {"face": "top", "bars": "5-25M", "start": "-0.15 m", "end": "24.55 m"}
EDGE: dict[str, Any] = {
    "shape": "L", "tributary_width": "1.7 m", "torques": {"D": "14 kN.m", "L": "9 kN.m"},
}  # fmt: skip
REQUIRED = (
    "spans", "supports", "h", "b_w", "h_f", "spacing", "f_c", "grade", "superimposed", "use",
    "exposure", "fire_rating", "cover",
)  # fmt: skip
P24: dict[str, Any] = {"codes": {"pair": "NBC 2025 + A23.3:24"}}


def refused_at_start(*, project: Mapping[str, Any] = PROJECT, **changes: Any) -> list[str]:
    """Return the faults of inputs; nothing stands on the sheet."""
    sheet = Sheet("B7", "Gallery floor beam", project=project)
    with pytest.raises(UserError) as caught:
        start(sheet=sheet, **changes)
    assert sheet.parts == ()
    assert sheet.expected == {}
    return list(caught.value.faults)


def refused_at(stage: str, *, project: Mapping[str, Any] = PROJECT, **changes: Any) -> list[str]:
    """Return the faults at a call: it records nothing half-way, and the sheet does not close."""
    beam = start(project=project, **changes)
    for call in CALLS[: CALLS.index(stage)]:
        getattr(beam, call)()
    before = beam.sheet.parts
    with pytest.raises(UserError) as caught:
        getattr(beam, stage)()
    assert beam.sheet.parts == before
    with pytest.raises(UserError, match=rf"run beam\.{stage}\(\)"):
        beam.sheet.close()
    return list(caught.value.faults)


def matches(faults: list[str], *wanted: str) -> None:
    """Compare faults with the starts of those wanted, one by one."""
    assert len(faults) == len(wanted), faults
    for fault, start_of_it in zip(faults, wanted, strict=True):
        assert start_of_it in fault, fault


def test_a_wrong_span_hides_no_fault_of_what_is_given_by_span() -> None:
    matches(
        refused_at_start(spans=[7.6, "9.2 m", "7.6 m"], h=620, bottom_bars=["5-20N", None, None]),
        "spans, span 1: '7.6' has no unit; write '7.6 m'",
        "h: '620' has no unit; write '620 mm'",
        "bottom_bars",
    )


def test_spans_of_nothing_and_of_500_m() -> None:
    matches(
        refused_at_start(spans=["0 m", "500 m", "7.6 m"]),
        "spans, span 1: '0 m' is zero; write a positive value such as",
        "spans, span 2: '500 m' is outside 0.5 to 40 m",
    )
    matches(
        refused_at_start(spans=["-2 m", "9.2 m", "7.6"], f_c="320 MPa"),
        "spans, span 1: '-2 m'",
        "spans, span 3: '7.6' has no unit; write '7.6 m'",
        "f_c: '320 MPa'",
    )


def test_loads_outside_their_span() -> None:
    """Each fault of each load, the unknown type beside the place that lies outside."""
    matches(
        refused_at_start(
            loads=[
                {"type": "L", "span": 2, "point": "4 kN", "at": "9.3 m"},
                {"type": "L", "span": 9, "point": "4 kN", "at": "1 m"},
                {"type": "Q", "span": 1, "line": "4 kN/m", "from": "3 m", "to": "8 m"},
                {"type": "D", "span": 3, "line": "4 kN/m", "from": "5 m", "to": "2 m"},
                {"type": "D", "span": 3, "point": "4 kN"},
            ]
        ),
        "loads, load 1: at 9.3 m lies outside span 2 of 9.2 m; write a distance from the left axis",
        "loads, load 2: span '9'; write 1 to 3, or 'all'",
        "loads, load 3: type 'Q'; write one of D, L, L_st, S",
        "loads, load 3: to 8 m lies outside span 1 of 7.6 m",
        "loads, load 4: from 5 m to 2 m; write from < to",
        "loads, load 5: 'at' is missing; write for example 'at': '1.2 m'",
    )


def test_unstable_supports_are_named() -> None:
    matches(
        refused_at_start(spans=["3 m", "3 m"], supports=["free", "column 450 mm", "free"]),
        "supports: the beam is unstable: it turns about support 2, its only support, which is "
        "simple; write ', fixed' behind it, or add a support",
    )
    matches(
        refused_at_start(supports=["girder 400 mm", "free", "column 450 mm", "girder 400 mm"]),
        "support 2: 'free' between two spans; only the ends can be free",
    )
    matches(refused_at_start(spans=["7 m"], supports=["free", "free"]), "unstable")


def test_a_support_wider_than_the_span() -> None:
    faults = refused_at_start(
        spans=["2.6 m", "9.2 m", "7.6 m"],
        supports=["girder 400 mm", "column 2900 mm", "column 450 mm", "girder 400 mm"],
    )
    assert "support 2: width 2900 mm is wider than span 1 of 2600 mm; write a smaller" in faults[0]


def test_deep_beams_brackets_and_openings() -> None:
    """Clear 5.175 m < 2 x 2.7 m; 1.2 - 0.225 = 0.975 m < 1.0 m; a fault each."""
    matches(
        refused_at_start(
            spans=["5.6 m", "9.2 m", "1.2 m"], h=["2700 mm", "620 mm", "1000 mm"],
            supports=["girder 400 mm", "column 450 mm", "column 450 mm", "free"],
        ),
        "span 1: its clear length of 5.175 m is less than twice h of 2700 mm: a deep beam is "
        "outside the method; use strut-and-tie (A23.3, 10.7)",
        "span 3: its clear length of 0.975 m is less than h of 1000 mm: so short a cantilever",
    )  # fmt: skip
    matches(
        refused_at_start(web_openings="200 x 150 at 2 m"),
        "web_openings: '200 x 150 at 2 m': a beam with web openings is outside the method; write "
        "'none'",
    )


def test_contradictory_bars() -> None:
    """The same bars by section and along the beam; bars that are none."""
    matches(
        refused_at_start(
            bar_runs=[BOTTOM, TOP], bottom_bars="4-25M", top_bars=["3-20M"] + [None] * 3
        ),
        "bottom_bars: 4-25M at span 1 is given beside bar_runs, which hold all bars; write "
        "bottom_bars = None, or bar_runs = None",
        "top_bars: 3-20M at support 1 is given beside bar_runs",
    )  # fmt: skip
    matches(
        refused_at_start(bottom_bars=["4x25", None], top_bars=["2-99M", None, None, None]),
        "bottom_bars: 2 given; write 3, one a span",
        "bottom_bars, span 1: '4x25' is not understood; write '4-25M'",
        "top_bars, support 1: '99M' is not a Canadian bar; write one of 10M",
    )


def test_more_bars_than_fit() -> None:
    """14-25M in a web of 380 mm, by section and along the beam: a fault a span, none recorded."""
    matches(
        refused_at("flexure", bottom_bars="14-25M"),
        *(f"bottom_bars: 14-25M do not fit into the web at span {k}; write fewer or larger bars"
          for k in (1, 2, 3)),
    )  # fmt: skip
    matches(
        refused_at("flexure", bar_runs=[BOTTOM | {"bars": "12-25M"}, TOP | {"bars": "9-25M"}]),
        "bottom bars, layer 1, 12200 mm from the axis of support 1: 12 bars up to 25M stand side "
        "by side, -2 mm apart, at least 35 mm; write fewer bars there, or a second layer",
        "top bars, layer 1",
    )


def test_bars_along_the_beam_that_cannot_stand() -> None:
    """A hook in mid-span, ends outside the beam, a face that is none: every fault at once."""
    matches(
        refused_at_start(
            bar_runs=[
                BOTTOM | {"end": "12 m", "hook_end": "90"},
                BOTTOM | {"start": "13 m", "end": "32 m"},
                TOP | {"face": "side"},
                TOP | {"start": "9 m", "end": "2 m"},
                TOP | {"bars": "five"},
            ],
        ),
        "bar run 1, hook_end: the bars end at 12000 mm, not at an end support or a free end; "
        "write hook_end='' or end the bars there",
        "bar run 2, end: 32000 mm is outside the beam, which goes from -200 to 24600 mm",
        "bar run 3, face: 'side'; write one of 'bottom', 'top'",
        "bar run 4: starts at 9000 mm and ends at 2000 mm; write start below end",
        "bar run 5, bars: 'five' is not understood; write '2-25M'",
    )


def test_stirrups_closer_than_the_clear_space() -> None:
    """60 - 11.3 = 49 mm clear, 80 - 11.3 = 69 mm; a zone outside its span beside them."""
    matches(
        refused_at_start(
            stirrups=[
                {"span": 1, "spacing": "60 mm"},
                {"span": 2, "spacing": "80 mm"},
                {"span": 3, "spacing": "200 mm", "to": "30 m"},
                {"span": 4, "spacing": "200 mm"},
                {"span": 3},
            ],
        ),
        "stirrups, zone 1: '60 mm' leaves 49 mm between 10M stirrups, less than the 75 mm for "
        "placing the concrete (common practice); write at least '87 mm'",
        "stirrups, zone 2: '80 mm' leaves 69 mm",
        "stirrups, zone 3: from 0 to 30000 mm is not inside the clear length of span 3 of 7175 mm",
        "stirrups, zone 4: span '4' does not exist; write one of 1, 2, 3",
        "stirrups, zone 5: no spacing; write for example 'spacing': '200 mm'",
    )


@pytest.mark.parametrize(
    "stirrups",
    [None, [{"span": k, "spacing": "150 mm"} for k in (1, 2, 3)]],
    ids=["chosen", "given"],
)
def test_torsion_with_open_stirrups(stirrups: list[dict[str, Any]] | None) -> None:
    """Open stirrups, chosen or given, are refused where torsion counts: span by span."""
    matches(
        refused_at("flexure", **EDGE, stirrups=stirrups),
        *(f"closed_stirrups: span {k}: its torsion of" for k in (1, 2, 3)),
    )
    matches(
        refused_at("flexure", **EDGE, stirrups=stirrups, closed_stirrups=True, stirrup_legs=4),
        *(f"stirrup_legs: span {k}: its torsion of" for k in (1, 2, 3)),
    )


def test_torques_of_loads_that_are_not_there() -> None:
    matches(
        refused_at_start(**EDGE | {"torques": {"S": "2 kN.m", "Q": "2 kN.m"}}),
        "torques: load type 'Q'; write one of D, L, L_st, S",
    )
    matches(
        refused_at_start(
            **EDGE | {"torques": {"S": "2 kN.m", "L": "3 kN.m"}}, use="equipment room"
        ),
        "torques: a torque by S, but the beam has no load of that type (use 'equipment room' gives "
        "L_st); write one of D, L_st",
        "torques: a torque by L, but",
    )  # fmt: skip


def test_the_simplified_method_outside_its_limits() -> None:
    matches(
        refused_at_start(shear_method="simplified", grade="500R", f_c="70 MPa"),
        "shear_method: 'simplified' holds up to bars of 400 MPa, but grade '500R' has 500 MPa; "
        "write 'general'",
        "shear_method: 'simplified' holds up to concrete of 60 MPa, but f_c is 70 MPa",
    )


def test_hooks_to_the_edition_whose_rule_is_unknown() -> None:
    """A23.3:24 changed the hook: hooks given are refused with the reason."""
    matches(
        refused_at_start(project=P24, bar_runs=[BOTTOM | {"hook_start": "90"}, TOP]),
        "bar run 1, hook_start: hooks cannot be calculated to CSA A23.3:24, whose expression is "
        "not known here; write straight bars",
    )


def test_a_construction_stage_beside_single_live_loads() -> None:
    matches(
        refused_at_start(
            construction_load="2.4 kPa",
            loads=[
                {"type": "D", "span": 2, "point": "4 kN", "at": "3 m"},
                {"type": "L", "span": 2, "point": "4 kN", "at": "3 m"},
            ],
        ),
        "construction_load: 2.4 kPa cannot stand in the place of single live loads (load 2); leave",
    )


def test_end_supports_too_narrow_for_hooks() -> None:
    """Walls of 60 mm hold the beam fixed: bars end 50 mm inside, where none is developed."""
    faults = refused_at(
        "flexure", spans=["7 m"], supports=["wall 60 mm, fixed", "wall 400 mm, fixed"]
    )
    assert faults[0].startswith("top_bars: no bars pass every check at support 1: stopped by")
    assert "anchorage in the support" in faults[0]
    assert "write a wider support" in faults[0]


def test_bars_that_do_not_fit_do_not_hide_what_stops_those_that_do() -> None:
    """More bars than fit are always tried; that they do not fit is no reason by itself."""
    faults = refused_at("flexure", h="400 mm", b_w="250 mm")
    start_of_it = "top_bars: no bars pass every check at support 2: stopped by: Moment resistance"
    assert faults[0].startswith(start_of_it)
    assert faults[0].endswith("write a deeper or wider beam, or stronger concrete")


def test_where_not_two_bars_fit_width_alone_makes_room() -> None:
    """190 - 2 x (60 + 11.3) = 47.4 mm between the legs: no room for 2 x 16 + 30 mm."""
    faults = refused_at("flexure", b_w="190 mm", cover="60 mm", h="800 mm")
    assert "stopped by: Bars fit into the layer" in faults[0]
    assert faults[0].endswith("come nearest; write a wider beam")


def test_the_advice_where_cracks_stop_the_bars_is_a_cure() -> None:
    """The stress is M_s over the bars and their arm: width makes room for bars, depth for the arm.

    Stronger concrete stays refused as it was; a deeper and a wider beam are not.
    """
    cracking: dict[str, Any] = {
        "spans": ["8.4 m"], "supports": ["column 500 mm, fixed"] * 2, "h": "700 mm",
        "b_w": "300 mm", "h_f": "200 mm", "spacing": "5 m", "exposure": "C-1", "cover": "90 mm",
        "f_c": "35 MPa", "grade": "500R", "use": "garage, vehicles to 4000 kg",
    }  # fmt: skip
    for more in ({}, {"f_c": "50 MPa"}):
        faults = refused_at("flexure", project=P24, **cracking | more)
        assert "stopped by: Crack control; " in faults[0]
        assert faults[0].endswith("write a deeper or wider beam")
    for cure in ({"b_w": "400 mm"}, {"h": "900 mm"}):
        beam = start(project=P24, **cracking | cure)
        for call in ("loads", "spans", "analysis", "flexure"):
            getattr(beam, call)()
        lhs, rhs = beam.sheet.entry("sag-1/crack-control").value
        assert lhs <= rhs


def test_a_frame_analysis_that_is_not_there() -> None:
    matches(
        refused_at_start(forces_csv="nowhere.csv", b_w="38 m"),
        "b_w: '38 m'",
        "forces_csv: 'nowhere.csv': no such file; write its path from the folder of the notebook",
    )


def test_many_faults_are_told_together() -> None:
    """One of every kind of input, in one refusal."""
    faults = refused_at_start(
        spans=["7.6 m", "60 m", "7.6 m"], supports=["girder 400 mm"], b_w="380", grade="600R",
        use="ballroom", exposure="Z", cover="-30 mm", shear_method="best", stirrup="99M",
        carries="a wall", torsion="some", web_openings="yes", closed_stirrups="yes",
        stirrup_legs=9, sustained="3", shape="I", fire_rating="9 h",
    )  # fmt: skip
    named = {fault.partition(":")[0].partition(",")[0] for fault in faults}
    assert named >= {
        "spans", "b_w", "grade", "use", "exposure", "cover", "shear_method", "stirrup", "carries",
        "torsion", "web_openings", "closed_stirrups", "stirrup_legs", "sustained", "shape",
        "fire_rating",
    }  # fmt: skip
    assert all("; " in fault for fault in faults)


def test_a_weight_that_does_not_go_with_the_density_of_the_concrete() -> None:
    """2500 kg/m3 x 9.81 m/s2 = 24.5 kN/m3 without steel, 25.6 rounded up with 1 kN/m3 of it."""
    matches(
        refused_at_start(gamma_c="2500 kg/m3"),
        "gamma_w: concrete of 2500 kg/m3 does not weigh the usual 24 kN/m3 with its steel; write "
        "that of the reinforced concrete, for example gamma_w = '25.6 kN/m3'",
    )
    matches(
        refused_at_start(gamma_w="20 kN/m3"),
        "gamma_w: 20 kN/m3 is less than the 23.5 kN/m3 of concrete of 2400 kg/m3 without steel; "
        "write for example '24.6 kN/m3'",
    )


def test_a_weight_that_is_given_is_the_one_that_loads_the_beam() -> None:
    """25.6 x 0.14 x 3.1 = 11.1104 kN/m of slab."""
    beam = start(gamma_c="2500 kg/m3", gamma_w="25.6 kN/m3")
    beam.loads()
    assert beam.sheet.entry("loads/w_sl").value == pytest.approx(11.1104, rel=1e-12)


def test_every_size_of_a_column_is_told_at_once() -> None:
    matches(
        refused_at_start(columns={2: ["450 x 450 kPa x 36 m"]}),
        "columns, support 2, along the beam: '450' has no unit; write '450 mm'",
        "columns, support 2, across it: '450 kPa' is a stress or pressure, but a length is needed; "
        "write it in mm, cm, m, in, ft",
        "columns, support 2, height: '36 m' is outside 0.5 to 20 m, the range of the method; write "
        "a value inside it",
    )


def test_a_comma_left_out_between_two_spans_is_asked_for() -> None:
    """Python joins two texts that stand beside each other: ["7.6 m", "9.2 m" "7.6 m"]."""
    faults = refused_at_start(spans=["7.6 m", "9.2 m7.6 m"])
    assert faults[0] == (
        "spans, span 2: '9.2 m7.6 m': 'm7.6 m' is not a unit of the list; write one number with "
        "one unit, such as '26 in', and a comma between two texts of a list"
    )


def test_columns_that_are_no_columns_or_wider_than_their_support() -> None:
    matches(
        refused_at_start(columns={2: 5}),
        "columns, support 2: '5' is not understood; write '450 mm x 450 mm x 3.6 m' (along the "
        "beam, across it, height)",
    )
    matches(
        refused_at_start(columns={2: ["900 mm x 450 mm x 3.6 m"]}),
        "supports, support 2: 'column 450 mm' has columns of 900 mm along the beam; write "
        "'column 900 mm', or columns of 450 mm",
    )


def test_inputs_that_would_change_nothing_are_refused() -> None:
    matches(
        refused_at_start(torsion="equilibrium"),
        "torsion: 'equilibrium' is given, but nothing turns the beam; write torques = {'D': "
        "'5.5 kN.m/m'}, or leave torsion out",
    )
    matches(
        refused_at_start(
            shape="rectangular", h_f=None, floor_weight="3.4 kPa", slab_bars="2 x 10M at 300 mm"
        ),
        "slab_bars: a rectangular beam has no flange; write slab_bars = None",
    )


def test_a_torque_per_metre_may_be_typed_as_the_message_and_the_page_write_it() -> None:
    """5.5 kN.m on every metre: '5.5 kN.m', and '5.5 kN·m/m' as the page prints it."""
    texts = "5.5 kN.m", "5.5 kN.m/m", "5.5 kN·m/m"
    assert [read_torques("torques", {"D": text})["D"].value for text in texts] == [5.5e6] * 3
    with pytest.raises(UserError, match=r"'5\.5 kN' is a force"):
        read_torques("torques", {"D": "5.5 kN"})


def test_a_share_without_a_unit_is_refused_without_a_blank_for_it() -> None:
    matches(
        refused_at_start(sustained=50),
        "sustained: '50' is outside 0 to 1, the range of the method; write a value inside it",
    )
    matches(
        refused_at_start(sustained=-0.1),
        "sustained: '-0.1' is negative; write a positive value such as '0.25'",
    )


def test_a_load_that_lifts_is_not_answered_with_one_that_presses() -> None:
    """Uplift is calculated by hand: '6 kN/m' in its place would be the opposite."""
    wind = {"type": "W", "span": 1, "line": "-3 kN/m", "what": "wind"}
    by_hand = ", and calculate what wind or earthquake does to the beam by hand"
    lifts = (
        f"'-3 kN/m' would lift the beam, and loads act downward here; leave the load out{by_hand}"
    )
    matches(
        refused_at_start(loads=[wind]),
        f"loads, load 1: type 'W'; write one of D, L, L_st, S{by_hand}",
        f"loads, load 1, line: {lifts}",
    )
    matches(refused_at_start(loads=[wind | {"type": "D"}]), f"loads, load 1, line: {lifts}")
    matches(
        refused_at_start(loads=[wind | {"type": "D", "line": "-3 m"}]),
        "loads, load 1, line: '3 m' is a length",
    )


def test_a_number_without_a_unit_is_answered_with_the_unit_that_it_can_stand_in() -> None:
    """7600 m is no span, 4500 MPa no concrete, 24 mm no depth."""
    said = refused_at_start(spans=["7600", "9.2 m", "7.6 m"], h="24", f_c="4500")
    assert sorted(said) == [
        "f_c: '4500' has no unit; write '4500 psi'",
        "h: '24' has no unit; write '24 cm' or '24 in'",
        "spans, span 1: '7600' has no unit; write '7600 mm'",
    ]


def test_whole_numbers_in_quotes_or_with_a_point_are_told_as_that() -> None:
    """Span '2' is not answered with 'write 1 to 3': that is what seems to stand there."""
    said = refused_at_start(
        columns={"2": ["450 mm x 450 mm x 3.6 m"]}, stirrup_legs="2",
        loads=[{"type": "D", "span": "2", "line": "3 kN/m"},
               {"type": "D", "span": 2.0, "line": "3 kN/m"}],
        redistribution={"2": 10, 3: "10 %"},
    )  # fmt: skip
    assert sorted(said) == [
        "columns, support '2': write 2 without quotes",
        "loads, load 1: span '2'; write 2 without quotes",
        "loads, load 2: span '2.0'; write 2 without a point",
        ("redistribution: {'2': 10}; write number of the support and per cent, both without "
        "quotes: {2: 15}"),
        ("redistribution: {3: '10 %'}; write number of the support and per cent, both without "
        "quotes: {2: 15}"),
        "stirrup_legs: '2'; write 2 without quotes",
    ]  # fmt: skip


def test_a_share_is_no_redistribution_in_per_cent() -> None:
    matches(
        refused_at_start(redistribution={2: 0.1}),
        "redistribution at support 2: 0.1 % is less than one per cent; write 10 for 10 %",
    )


def test_supports_with_more_than_a_width_are_shown_how_to_write() -> None:
    girder = "girder 400 mm"
    matches(
        refused_at_start(supports=[girder, "column 450 mm fixed", "column 450 x 450 mm", girder]),
        "supports, support 2: 'column 450 mm fixed' is not understood; write 'column 450 mm', ",
        "supports, support 3: 'column 450 x 450 mm' is not understood; write 'column 450 mm', ",
    )


def test_a_spacing_that_is_not_read_has_one_fault() -> None:
    matches(
        refused_at_start(stirrups=[{"span": 1, "spacing": "150"}, {"span": "2"}]),
        "stirrups, zone 1: spacing: '150' has no unit; write '150 mm'",
        "stirrups, zone 2: span '2' does not exist; write 2 without quotes",
    )


@pytest.mark.parametrize(
    ("given", "told"),
    [
        ("4 months", "write the shorter '3 months', which is safe"),
        ("7 Months", "write the shorter '6 months', which is safe"),
        ("1 year", "5 years or more; write '12 months'"),
        ("2 years", "write the shorter '12 months', which is safe"),
        ("10 years", "5 years or more; write '5 years or more'"),
        ("2 weeks", "write '3 months'; of a shorter time no factor is given"),
    ],
)
def test_a_duration_between_those_of_the_standard(given: str, told: str) -> None:
    """S_t rises with time (9.8.2.5): S_ta of a shorter time leaves more deflection for later."""
    matches(refused_at_start(attached_after=given), told)


def test_imperial_and_bundled_bars_are_told_apart_from_slips() -> None:
    """#8: 510 mm2 and 25.4 mm (ASTM A615); 25M: 500 mm2 and 25.2 mm. Neither stands in for both."""
    matches(
        refused_at_start(
            bottom_bars=["4-#8", "4 No. 8", "4-25M in bundles of 2"], slab_bars="#4 at 12 in",
            bar_runs=[BOTTOM | {"bars": "3-#8"}, BOTTOM | {"bars": "4-25M bundled", "layer": 3}],
        ),
        "slab_bars: '#4 at 12 in' has imperial bars, which are outside the method",
        "bottom_bars, span 1: '4-#8' has imperial bars",
        "bottom_bars, span 2: '4 No. 8' has imperial bars",
        "bottom_bars, span 3: '4-25M in bundles of 2' has bundled bars, which are outside the",
        "bar run 1, bars: '3-#8' has imperial bars, which are outside the method: no size of CSA",
        "bar run 2, layer: '3'; write one of 1, 2",
        "bar run 2, bars: '4-25M bundled' has bundled bars",
    )  # fmt: skip


def test_a_wrong_span_hides_no_fault_of_bars_and_stirrups_along_the_beam() -> None:
    """What stands in a row is told at once; whether its places lie in the beam, once that is known.

    The second zone has the size of another fault: 60 - 11.3 mm for the 10M that is usual.
    """
    matches(
        refused_at_start(
            spans=["7.6", "9.2 m", "7.6 m"], stirrup="9M",
            bar_runs=[BOTTOM | {"bars": "five", "end": "90 m"}],
            stirrups=[{"span": 4, "spacing": "200 mm"}, {"span": 1, "spacing": "60 mm"},
                      {"span": 1, "spacing": "200 mm", "from": "5 m", "to": "3 m"}],
        ),
        "spans, span 1: '7.6' has no unit",
        "stirrup: '9M'",
        "bar run 1, bars: 'five' is not understood",
        "stirrups, zone 1: span '4' does not exist; write one of 1, 2, 3",
        "stirrups, zone 2: '60 mm' leaves 49 mm between 10M stirrups",
        "stirrups, zone 3: from 5000 to 3000 mm is not inside the clear length of span 1; measure",
    )  # fmt: skip


def test_an_input_by_another_name_is_told_with_the_one_that_is_missing() -> None:
    with pytest.raises(UserError) as caught:
        continuous_beam(  # type: ignore[call-arg]
            Sheet("B7", "Beam", project=PROJECT), "7.6 m", spacin="3 m",
            **{name: None for name in REQUIRED if name != "spacing"},  # type: ignore[arg-type]
        )  # fmt: skip
    assert caught.value.faults == (
        (
            "continuous_beam: '7.6 m' stands alone; write it with the name of its input, such as "
            "spacing=..."
        ),
        "continuous_beam: 'spacin' is no input; did you mean 'spacing'?",
        "continuous_beam: 'spacing' is missing; write spacing=...",
    )


def test_a_sheet_opened_without_its_project_says_so() -> None:
    with pytest.raises(UserError) as caught:
        Sheet.open("B7", "project.toml")  # type: ignore[call-arg]
    assert caught.value.faults == (
        (
            "Sheet.open: 'project.toml' stands alone; write it with the name of its input, such as "
            "project=..."
        ),
        "Sheet.open: 'project' is missing; write project=...",
    )


def test_a_cantilever_that_turns_is_told_how_a_support_is_held() -> None:
    """The word alone is no support: 'column 400 mm, fixed' is."""
    said = refused_at_start(spans=["2.4 m"], supports=["column 400 mm", "free"])
    assert said[0].endswith("write ', fixed' behind it, or add a support")
    start(spans=["2.4 m"], supports=["column 400 mm, fixed", "free"])


def test_a_sheet_without_any_part_is_no_record() -> None:
    """Its beam was refused; cells below may have run all the same, with the beam before it."""
    sheet = Sheet("B7", "Gallery floor beam", project=PROJECT)
    with pytest.raises(UserError):
        start(sheet=sheet, f_c="32")
    with pytest.raises(UserError) as caught:
        sheet.close()
    assert caught.value.faults == (
        (
            "B7: nothing is recorded on this sheet; run the cell that opens it and starts the "
            "calculation"
        ),
    )
