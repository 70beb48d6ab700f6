"""Bars of several sizes and layers along a beam, as a checker follows them by hand.

The beam is that of ``two_sizes``: h 600, b_w 350, cover 30 to stirrups 10M (11.3 mm, bend
22.5 mm), 325 mm apart at most, f_c' 25, f_y 400, flange 130 mm; walls 300 mm, column 400 mm at
7.2 m. Bars in a layer of n stand (350 - 2*(41.3 + 22.5))/(n - 1) = 222.4/(n - 1) mm apart.
"""

from __future__ import annotations

import math

import pytest

from lineproof.beams.continuous.figure_cross_section_steel import steel_at
from lineproof.beams.continuous.layout import BarRun, Detailing
from lineproof.beams.continuous.model import outline_of
from lineproof.beams.continuous.resistance import lap_pairs
from lineproof.errors import UserError
from lineproof.record import Entry
from lineproof.record.recompute import recompute
from lineproof.sheet import Sheet

from .beam_with_gaps import Row, row
from .flow import CALLS, analysed, run, start
from .notebooks import EDGE_BEAM, EXISTING_BEAM, inputs_of
from .two_sizes import D_20, D_25, FLEXURE, INSIDE, SPREAD, TOP, beam

ALONG = (-0.1, 14.5)
B_25, B_20 = row("bottom", "2-25M", *ALONG), row("bottom", "2-20M", *ALONG)
T_25, T_20 = row("top", "2-25M", *ALONG), row("top", "2-20M", *ALONG)
UPPER = [
    row("top", "2-20M", 5.2, 9.2, layer=2), row("top", "2-15M", 5.2, 9.2, layer=2),
]  # fmt: skip
ANCHORED = CALLS[: CALLS.index("anchorage") + 1]


def entries_titled(sheet: Sheet, title: str) -> dict[str, Entry]:
    """The entries of the one part with a title."""
    (found,) = [part.entries for part in sheet.parts if part.title == title]
    return found


@pytest.fixture(scope="module")
def laps() -> Sheet:
    """2-25M through and 2-20M lapped beside them over the column, by 800 mm."""
    thin = [row("bottom", "2-20M", -0.1, 7.6), row("bottom", "2-20M", 6.8, 14.5)]
    return beam([B_25, *thin, *TOP, SPREAD])


@pytest.fixture(scope="module")
def upper() -> Sheet:
    """Two top layers of two sizes each over the column, 15M in the overhangs."""
    return beam([B_25, B_20, T_25, T_20, *UPPER, SPREAD])


def test_development_goes_by_all_bars_of_the_layer(laps: Sheet) -> None:
    """Four bars, 222.4/3 = 74.13 mm apart; d_cs is 2/3 of it, K_tr = 200*400/(10.5*325*4) = 5.86.

    25M: 1.15*400*500/((49.42 + 5.86)*5) = 832.1 mm by the general expression.
    """
    made = entries_titled(laps, "Development of bottom bars 25M, 4 in a layer")
    assert made["s_bb"].value == pytest.approx(222.4 / 3)
    assert made["d_cs"].value == pytest.approx(2 / 3 * 222.4 / 3)
    assert made["K_tr"].value == pytest.approx(80_000 / (10.5 * 325 * 4))
    assert made["l_d0g"].value == pytest.approx(832.1, abs=0.1)
    assert entries_titled(laps, "Development of bottom bars 20M, 4 in a layer")["n_b"].value == 4


def test_development_in_an_overhang_goes_by_all_bars_in_it() -> None:
    """1-25M and 4-25M in each overhang of 7200/20 = 360 mm: 360/5 - 25.2 = 46.8 mm clear.

    That is less than 2*25.2 = 50.4: 0.60*400/5*25.2 = 1209.6 mm, for the one bar too; alone, with
    360 - 25.2 mm, it would have 0.45 in place of 0.60. 130 mm of concrete make no top bars.
    """
    spread = [
        row("top", "2-25M", 5.2, 9.2, place="overhang"),
        row("top", "8-25M", 5.4, 9.0, place="overhang"),
    ]
    sheet = beam([B_25, B_20, *TOP, *spread], ANCHORED)
    made = entries_titled(sheet, "Development of top bars 25M, in the overhang")
    assert made["n_o"].value == 5
    assert made["s_c"].value == pytest.approx(360 / 5 - 25.2)
    assert made["l_d"].value == pytest.approx(1209.6)


def test_the_room_at_a_lap_of_thin_bars_is_that_beside_thick_ones(laps: Sheet) -> None:
    """74.13 - 25.2 = 48.93 mm between bars, 48.93 - 19.5 = 29.43 with a lapped one; 35.28 asked."""
    lap = laps.entries_of("anchorage-lap-1")
    assert lap["s_c"].value == pytest.approx(222.4 / 3 - 25.2)
    assert lap["lap-room"].value == (
        pytest.approx(1.4 * 25.2), pytest.approx(222.4 / 3 - 25.2 - 19.5),
    )  # fmt: skip
    assert not lap["lap-room"]


def test_like_bars_are_lapped_with_each_other_in_any_order() -> None:
    """The 20M that end last overlap the 25M more than their own kind; they lap their own kind."""
    ends = [("20M", 0, 7700), ("25M", 0, 7600), ("20M", 6900, 14000), ("25M", 6400, 14000)]
    runs = [BarRun("bottom", 1, 2, size, a, b) for size, a, b in ends]
    assert sorted(lap_pairs(runs)) == [(0, 2), (1, 3)]


def test_a_second_layer_at_the_top_is_named_fits_and_counts(upper: Sheet) -> None:
    """2000 mm2 below the first layer's bars and 600 + 400 in the second, 400 in the overhangs.

    d_2 = 546.1 - 12.6 - 35.28 - 9.75 = 488.47 for 20M, 490.22 for 15M; clear 74.13 - 19.5 = 54.63.
    """
    entries = upper.entries_of("hog-2-left")
    text = entries["bars-text"].source.text
    assert text.startswith("Top bars: 2-25M + 2-20M / 2-20M + 2-15M, 1-15M in each overhang, as")
    assert entries["bars-fit-2"].value == (30, pytest.approx(222.4 / 3 - 19.5))
    over = D_25 - 25.2 / 2 - 1.4 * 25.2
    d_2 = over - 19.5 / 2
    moment = 1000 * D_25 + 600 * D_20 + 400 * (600 - INSIDE - 8) + 600 * d_2 + 400 * (over - 8)
    counted = upper.entries_of("hog-2-left-developed")
    assert counted["A_s"].value == 3000
    assert counted["d"].value == pytest.approx(moment / 3000, rel=1e-12)
    assert entries["d_2"].value == pytest.approx(d_2, rel=1e-12)
    c, _ = entries["yield-upper"].value
    assert c == pytest.approx(entries["c"].value / d_2, rel=1e-12)
    assert entries["n_z"].value == pytest.approx(6)
    rows = {line[0]: line for line in upper.entries_of("summary")["flexure"].source.content["rows"]}
    assert rows["support 2, left"][4:6] == [
        "2-25M + 2-20M / 2-20M + 2-15M, 1-15M in each overhang", "3000",
    ]  # fmt: skip
    assert recompute(upper.close()) == []


@pytest.mark.parametrize(
    ("top", "n_z"),
    [
        ([row("top", "4-20M", *ALONG), row("top", "2-25M", 5.2, 9.2, layer=2), SPREAD], 2600 / 500),
        ([T_20, row("top", "2-25M", 5.2, 9.2, place="overhang")], 1600 / 500),
    ],
)
def test_cracks_count_by_the_largest_bar_wherever_it_stands(top: list[Row], n_z: float) -> None:
    """In a second layer, 1200 + 1000 + 400 mm2; in the overhangs, 600 + 1000 mm2, both by 25M."""
    sheet = beam([B_25, B_20, *top], FLEXURE)
    for key in ("hog-2-left", "hog-2-right"):
        assert sheet.entries_of(key)["n_z"].value == pytest.approx(n_z)


def test_cover_goes_by_the_thickest_bar_of_the_beam() -> None:
    """25M stand in the overhangs alone; 20M elsewhere."""
    top = [T_20, row("top", "2-25M", 5.2, 9.2, place="overhang")]
    sheet = beam([row("bottom", "4-20M", *ALONG), *top], FLEXURE)
    assert sheet.entries_of("cover")["d_b"].value == 25.2


def test_bars_not_in_line_are_told() -> None:
    runs = [B_25, row("bottom", "4-20M", *ALONG, layer=2), *TOP, SPREAD]
    note = beam(runs, FLEXURE).entries_of("sag-1")["bars-text"].source.text
    assert note == (
        "Bottom bars: 2-25M / 4-20M, as given along the beam. The bars of the second layer do not "
        "all stand in line with those of the first, as A23.1 asks."
    )


@pytest.mark.parametrize(
    ("runs", "fault"),
    [
        (
            [row("bottom", "4-25M", *ALONG, layer=2), *TOP, SPREAD],
            (
                "bar runs: span 1: 4-25M stand in layer 2 of the bottom bars without a first "
                "layer; write layer 1 for them, or bars of layer 1 that pass there"
            ),
        ),
        (
            [B_25, row("top", "3-20M", *ALONG, layer=2)],
            (
                "bar runs: support 1: 3-20M stand in layer 2 of the top bars without a first "
                "layer; write layer 1 for them, or bars of layer 1 that pass there"
            ),
        ),
        (
            [B_25, T_25, SPREAD, row("top", "2-25M", 5.2, 9.2, place="overhang")],
            (
                "bar runs: support 2: 25M, 15M stand in the overhangs; write bars of one size "
                "there, such as 15M"
            ),
        ),
        (
            [B_25, T_25, SPREAD, row("top", "6-25M", 5.2, 9.2, layer=2)],
            (
                "top bars, layer 2, 7200 mm from the axis of support 1: 6 bars up to 25M stand "
                "side by side, 19 mm apart, at least 35 mm; write fewer bars there"
            ),
        ),
    ],
)
def test_what_cannot_be_computed_is_refused(runs: list[Row], fault: str) -> None:
    with pytest.raises(UserError) as refused:
        beam(runs, FLEXURE)
    assert refused.value.faults[0] == fault


def test_a_second_layer_beside_a_gap_in_the_first_keeps_its_depth() -> None:
    """4-20M stop between 5.0 and 5.6 m, 2-20M above run through: 548.95 - 9.75 - 30 - 9.75."""
    runs = [
        row("bottom", "4-20M", -0.1, 5.0), row("bottom", "4-20M", 5.6, 14.5),
        row("bottom", "2-20M", -0.1, 7.5, layer=2),
    ]  # fmt: skip
    sheet = beam([*runs, *TOP, SPREAD])
    assert recompute(sheet.close()) == []
    depths = [p.entries["d"].value for p in sheet.parts if p.key.startswith("depth-shear-1")]
    assert depths == [pytest.approx(D_20 - 19.5 - 30)]


def test_straight_bars_beside_hooked_ones_need_their_own_length() -> None:
    """At the wall 25M with hooks and 25M without: 0.45*400/5*25.2 = 907.2 mm, not 403.2 mm."""
    hooked = row("bottom", "2-25M", *ALONG, hook_start="90", hook_end="90")
    sheet = beam([hooked, row("bottom", "2-25M", -0.05, 14.4), *TOP, SPREAD], ANCHORED)
    entries = sheet.entries_of("anchorage-bottom-1-left-zero")
    assert entries["development-zero-moment"].value[0] == pytest.approx(907.2)


def test_the_length_past_the_support_is_that_of_the_bars_as_they_end() -> None:
    """Bars that end 50 mm past the axis of a wall of 300 mm: l_a = 150 - 100 = 50 mm."""
    runs = [row("bottom", "2-25M", -0.05, 14.5), row("bottom", "2-20M", -0.1, 14.5)]
    entries = beam([*runs, *TOP, SPREAD], ANCHORED).entries_of("anchorage-bottom-1-left-zero")
    assert entries["c_end"].value == 100
    assert entries["l_a"].value == 50


def test_hooks_near_the_end_of_the_beam_have_the_cover_that_is_there() -> None:
    """Hooks that end 20 mm from the end: no 50 mm of concrete outside; 300 - 20 mm to the face."""
    hooked = row("bottom", "2-25M", -0.13, 14.53, hook_start="90", hook_end="90")
    entries = beam([hooked, B_20, *TOP, SPREAD], ANCHORED).entries_of("anchorage-end-1-hook-25m")
    assert entries["c_tail"].value == 20
    assert not entries["hook-tail-cover"]
    assert entries["l_av"].value == 280


def edge(runs: list[Row], calls: tuple[str, ...] = CALLS) -> Sheet:
    """The edge beam with torsion (L, 380 x 620, cover 40, two spans of 7.6 m), bars given."""
    return run(start(**(inputs_of(EDGE_BEAM) | {"bar_runs": runs})), calls)


EDGE_ENDS = (-0.15, 15.35)
OVERHANG = [row("top", "2-20M", 5.6, 9.6, place="overhang")] + [
    row("top", "1-20M", *ends, place="overhang") for ends in ((-0.15, 2.0), (13.2, 15.35))
]


@pytest.mark.parametrize(
    ("top", "d_bc"),
    [
        ([row("top", "2-10M", *EDGE_ENDS), row("top", "2-20M", 5.6, 9.6)], 11.3),
        ([row("top", "2-20M", *EDGE_ENDS)], 19.5),
    ],
)
def test_the_corner_bars_are_those_along_the_span(top: list[Row], d_bc: float) -> None:
    """Between the supports 2-10M stand alone; of 2-25M + 1-10M below the 25M stand in corners."""
    bottom = [row("bottom", "2-25M", *EDGE_ENDS), row("bottom", "1-10M", *EDGE_ENDS)]
    calls = CALLS[: CALLS.index("shear") + 1]
    assert edge([*bottom, *top, *OVERHANG], calls).entries_of("torsion-1")["d_bc"].value == d_bc


def test_straight_top_bars_at_an_end_are_as_long_as_those_that_end_first() -> None:
    """In a column of 450 mm 2-20M end 150 mm past its axis and 2-20M 100 mm: 225 mm is the end.

    225 - 100 = 125 mm of concrete are outside these: 450 - 125 = 325 mm from the face. At the other
    column all end 150 mm past the axis: 450 - 75 = 375. Top bars at 32 MPa, with stirrups:
    1.3*0.45*0.8*400/sqrt(32)*19.5 = 645.3 mm.
    """
    bottom = [row("bottom", "2-25M", *EDGE_ENDS), row("bottom", "1-20M", *EDGE_ENDS)]
    top = [row("top", "2-20M", *EDGE_ENDS), row("top", "2-20M", -0.1, 15.35)]
    sheet = edge([*bottom, *top, *OVERHANG], ANCHORED)
    l_d = 1.3 * 0.45 * 0.8 * 400 / math.sqrt(32) * 19.5
    for support, c_end, l_av in ((1, 125, 325), (3, 75, 375)):
        entries = sheet.entries_of(f"anchorage-end-{support}-top-1")
        assert (entries["c_end"].value, entries["l_av"].value) == (c_end, l_av)
        assert entries["development-in-part"].value == (l_av, pytest.approx(l_d))
        assert entries["development-in-part"]
        assert "development" not in entries


def test_all_bars_share_cracks_and_those_developed_are_stretched() -> None:
    """At support 1 2-25M, 1-15M and 1-20M stand, 1500 mm2, of which 1368 count: d = 557.05 mm.

    A crack meets all of them: n_z = 1500/500 = 3, A_e = 2*62.95*760/3 = 31 900 mm2, d_c = 63.9 mm,
    0.6 f_y (d_c A_e)^(1/3) = 240*126.8 = 30 430 > 25 000 N/mm. So the stress is calculated:
    n_E = 200 000/25 456 = 7.857, n A_s/b = 28.28,
    kd = 28.28*(sqrt(1 + 2*557.05/28.28) - 1) = 151.5 mm,
    I_cr = 380*151.5**3/3 + 7.857*1368*405.6**2 = 2.208e9 mm4, f_s = n_E M_s 405.6/I_cr.
    """
    hooked = row("top", "2-25M", *EDGE_ENDS, hook_start="90", hook_end="90")
    bottom = [row("bottom", "2-25M", *EDGE_ENDS), row("bottom", "2-15M", *EDGE_ENDS)]
    runs = [*bottom, hooked, row("top", "1-15M", *EDGE_ENDS), *OVERHANG]
    entries = edge(runs, FLEXURE).entries_of("hog-1-right")
    left, right = entries["stress-allowance"].value
    assert (left, right) == (pytest.approx(30_430, abs=5), 25_000)
    M_s = entries["M_s"].value
    assert entries["f_s"].value == pytest.approx(7.857 * M_s * 405.57 / 2.2082e9, rel=2e-4)
    z = entries["f_s"].value * (63.9 * 31_896) ** (1 / 3)
    assert entries["z"].value == pytest.approx(z, rel=1e-4)


def test_the_section_is_drawn_as_deep_as_it_is_calculated() -> None:
    """Drawn: thicker bars above thinner ones, and bars of the overhang in the depth.

    4-20M and 2-25M above, aggregate 20: 41.3 + 19.5 + 1.4*25.2 to the second layer: d_2 = 491.32,
    d = (1200*548.95 + 1000*491.32)/2200 = 522.75.
    """
    made = analysed(**inputs_of(EXISTING_BEAM))
    outline = outline_of(made.sheet, made.inputs)
    thick = [BarRun("bottom", 1, 4, "20M", 0, 7000), BarRun("bottom", 2, 2, "25M", 0, 7000)]
    steel = steel_at(outline, Detailing(tuple(thick), ()), 3000, 20, "10M")
    d_2 = D_20 - 19.5 / 2 - 1.4 * 25.2 - 25.2 / 2
    assert steel.effective_depth("bottom") == pytest.approx((1200 * D_20 + 1000 * d_2) / 2200)
    tops = [BarRun("top", 1, 2, "25M", 0, 7000), BarRun("top", 1, 2, "15M", 0, 7000, "overhang")]
    steel = steel_at(outline, Detailing(tuple(tops), ()), 3000, 20, "10M")
    d = (1000 * D_25 + 400 * (600 - INSIDE - 8)) / 1400
    assert steel.effective_depth("top") == pytest.approx(d)
