"""Branches of a beam: take-down, web block, compression bars, layers, skin."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.beams.flexure import record_doubly, record_flexure
from lineproof.beams.second_path import record_second_path
from lineproof.record import Record, recompute
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import strain
from lineproof.standards.catalogue import NOTATION
from lineproof.standards.codes import code_pair

from .gallery import EDGE, RECTANGULAR, holds, number, record_of
from .pocket import calculate, faults

PAIR = code_pair("NBC 2015 + A23.3-14")
THIN = {
    "b_w": "400 mm",
    "h_f": "60 mm",
    "spacing": "0.9 m",
    "bottom_bars": "4-35M / 4-35M",
    "ends": "free",
}
DEEP = {"h": "900 mm", "span": "12 m"}
DOUBLY: dict[str, Any] = {
    **RECTANGULAR, "superimposed": "8 kPa", "bottom_bars": "4-25M / 4-25M",
    "compression_bars": "3-20M",
}  # fmt: skip


def assert_by_hand(record: Record, hand: dict[str, str]) -> None:
    """Compare recorded values with the last numbers of the chains, to the digit written."""
    for place, chain in hand.items():
        *steps, result = chain.split(" = ")
        unit = 10.0 ** -len(result.partition(".")[2])
        for step in steps:
            assert calculate(step) == pytest.approx(float(result), abs=0.6 * unit, rel=5e-5), step
        assert number(record, place) == pytest.approx(float(result), abs=0.6 * unit), place


TAKE_DOWN: dict[str, tuple[dict[str, Any], dict[str, str]]] = {
    # slab 24 x 0.14 on the whole tributary width, web 24 x 0.38 x 0.48 below it, nothing twice
    "T": (
        {},
        {
            "loads/w_D": "24*0.14*3.1 + 24*0.38*(0.62 - 0.14) + 1.8*3.1 = 20.3736",
            "loads/w_f": "1.25*20.3736 + 1.5*4.8*3.1 = 47.787",
            "loads/M_f": "47.787*7.6**2/8 = 345.022",
        },
    ),
    "L": (
        dict(EDGE),
        {
            "loads/w_D": "24*0.14*1.75 + 24*0.38*(0.62 - 0.14) + 1.8*1.75 = 13.4076",
            "loads/w_f": "1.25*13.4076 + 1.5*4.8*1.75 = 29.3595",
            "loads/M_f": "29.3595*7.6**2/8 = 211.976",
            "section/b_o": "min(7600/12, 6*140, 2720/2) = min(633.33, 840, 1360) = 633.33",
            "section/b_f": "380 + 633.33 = 1013.33",
        },
    ),
    "rectangular": (
        dict(RECTANGULAR),
        {
            "loads/w_fl": "3.4*3.1 = 10.54",
            "loads/w_D": "24*0.38*0.62 + 3.4*3.1 + 1.8*3.1 = 5.6544 + 10.54 + 5.58 = 21.7744",
            "loads/w_f": "1.25*21.7744 + 1.5*4.8*3.1 = 49.538",
            "loads/M_f": "49.538*7.6**2/8 = 357.664",
        },
    ),
}


@pytest.mark.parametrize("shape", TAKE_DOWN)
def test_take_down_counts_nothing_twice(shape: str) -> None:
    """Dead load written out for each shape; every printed line follows."""
    changes, hand = TAKE_DOWN[shape]
    record = record_of(**changes)
    assert_by_hand(record, hand)
    assert record.failed == []
    assert list(faults(record.data)) == []


def test_floor_of_no_weight_is_said() -> None:
    """0 kPa is an input like any other: w_D = 5.6544 + 0 + 5.58 = 11.2344 kN/m."""
    record = record_of(**{**RECTANGULAR, "floor_weight": "0 kPa"})
    assert_by_hand(
        record, {"loads/w_fl": "0*3.1 = 0.0", "loads/w_D": "5.6544 + 0 + 5.58 = 11.2344"}
    )
    assert list(faults(record.data)) == []


def test_tributary_width_is_a_line_or_given() -> None:
    """From the spacing where none is typed; typed where one is."""
    assert record_of().entries["given/b_tr"]["kind"] == "line"
    typed = record_of(tributary_width="2.9 m").entries["given/b_tr"]
    assert (typed["kind"], typed["value"]) == ("given", 2.9)


def test_dead_load_alone_governs_where_live_load_is_small() -> None:
    """1.4 D > 1.25 D + 1.5 L where L < 0.1 D: D 20 kPa, residential 1.9 kPa is 0.086 D."""
    record = record_of(superimposed="20 kPa", use="residential area")
    # w_D = 10.416 + 4.3776 + 62 = 76.7936; 1.4 D = 107.511; 1.25 D + 1.5 x 5.89 = 104.827
    assert_by_hand(
        record,
        {"loads/w_f1": "1.4*76.7936 = 107.511", "loads/w_f2": "1.25*76.7936 + 1.5*5.89 = 104.827",
         "loads/w_f": "max(107.511, 104.827) = 107.511"},
    )  # fmt: skip


def test_two_layers() -> None:
    """4-25M below 2-25M: clear 35.28 between the layers, d by areas."""
    record = record_of(bottom_bars="4-25M / 2-25M")
    assert_by_hand(
        record,
        {
            "bars/d_1": "620 - 30 - 11.3 - 12.6 = 566.1",
            "bars/s_l": "max(1.4*25.2, 1.4*20, 30) = 35.28",
            "bars/d_2": "566.1 - 12.6 - 35.28 - 12.6 = 505.62",
            "bars/s_c2": "(380 - 2*(30 + 11.3 + 22.5))/1 - 25.2 = 227.2",
            "bars/A_s": "2000 + 1000 = 3000",
            "bars/d": "(2000*566.1 + 1000*505.62)/3000 = 545.94",
            "flexure/a": "0.85*3000*400/51712.96 = 19.724",
            "flexure/M_r": "1020000*(545.94 - 19.7243/2)/1e6 = 546.80",
            # z: tension centroid 74.06 above the bottom, nearest bar 53.9, six bars
            "crack-control/A_e": "2*(620 - 545.94)*380/6 = 9380.9",
            "crack-control/z": "240*(53.9*9380.93)**(1/3) = 19120",
        },
    )
    assert record.entries["second-path/M_l"]["procedure"]["name"].endswith("two layers")


def test_layers_of_two_sizes() -> None:
    """3-20M below 3-25M: the thicker bars rule the distance of layers, cover and z."""
    record = record_of(bottom_bars="3-20M / 3-25M", span="5 m")
    assert_by_hand(
        record,
        {
            "bars/d_2": "(620 - 30 - 11.3 - 9.75) - 9.75 - 35.28 - 12.6 = 511.32",
            "bars/s_min2": "max(1.4*25.2, 28, 30) = 35.28",
            "cover/c_rb": "max(30, 25.2, 20) = 30",
            "crack-control/n_z": "(3*300 + 3*500)/500 = 4.8",
            "crack-control/d_c": "30 + 11.3 + 9.75 = 51.05",
        },
    )


def test_the_stress_of_the_bars_where_the_allowance_does_not_do() -> None:
    """4-25M of 500 MPa under 60 mm: 0.6 x 500 (83.9 x 15 941)^(1/3) = 33 050 > 25 000 N/mm."""
    record = record_of(
        bottom_bars="4-25M", exposure="C-1", cover="60 mm", grade="500R", f_c="35 MPa"
    )
    assert not holds(record, "crack-control/stress-allowance")
    assert_by_hand(
        record,
        {
            "crack-control/w_s1": "20.374 + 14.88 = 35.254",
            "crack-control/M_s": "35.254*7.6**2/8 = 254.53",
            "crack-control/n_E": "200000/(4500*35**0.5) = 7.5125",
            "crack-control/kd": "4.84677*((1 + 2*536.1/4.84677)**0.5 - 1) = 67.40",
            "crack-control/f_s": "7.5125*254.53e6*(536.1 - 67.40)/3.617e9 = 247.8",
        },
    )
    z = 247.78 * (83.9 * 15941) ** (1 / 3)
    assert number(record, "crack-control/z") == pytest.approx(z, rel=2e-4)
    I_cr = 3100 * 67.40**3 / 3 + 7.5125 * 2000 * (536.1 - 67.40) ** 2
    assert number(record, "crack-control/I_cr") == pytest.approx(I_cr, rel=2e-4)


def test_block_in_the_web_of_a_beam() -> None:
    """Thin narrow flange, much steel: flange and web apart, both paths within 0.1 %."""
    record = record_of(**THIN)
    # b_o = min(1520, 12*60 = 720, (900 - 400)/2 = 250) = 250; d of two layers of 35M
    assert_by_hand(
        record,
        {
            "section/b_f": "400 + 2*min(1520, 720, 250) = 900",
            "bars/d": "620 - 30 - 11.3 - 35.7/2 - (35.7 + 1.4*35.7)/2 = 518.01",
            "flexure/a": "0.85*8000*400/(16.6816*900) = 181.17",
            "flexure/C_f": "16.6816*500*60/1e3 = 500.448",
            "flexure/a_w": "(2720 - 500.448)*1000/(16.6816*400) = 332.63",
            "flexure/M_r": "500.448*(0.51801 - 0.03) + 2219.552*(0.51801 - 0.332635/2) = 1024.8",
        },
    )
    assert not holds(record, "flexure/block-in-flange")
    # c/d = 332.63/0.89/518.0 = 0.721: the bars do not yield, and the calc says so
    assert "flexure/yield" in record.failed
    # d_2 = 518.01 - 42.84 = 475.17: c/d_2 = 373.74/475.17 = 0.787
    assert record.entries["flexure/yield-upper"]["left"] == pytest.approx(0.787, abs=0.0006)
    assert "flexure/yield-upper" in record.failed
    assert "second-path/second-path" in record.failed
    # more steel than balanced: 4000 mm2 a layer, words in place of the curve
    assert record.entries["capacity/no-curve"]["kind"] == "note"
    assert list(faults(record.data)) == []


def test_more_moment_than_any_bars_balance() -> None:
    """Given bars are shown as failing; the steel is that of a block down to the bars."""
    inputs: dict[str, Any] = {"superimposed": "40 kPa", "bottom_bars": "4-25M", "ends": "free"}
    record = record_of(**{**RECTANGULAR, **inputs})
    assert_by_hand(
        record,
        {
            "loads/w_f": "1.25*(5.6544 + 3.4*3.1 + 40*3.1) + 1.5*14.88 = 197.563",
            "required-steel/M_rc": "16.6816*380*566.1**2/2/1e6 = 1015.7",
            "required-steel/a_r": "620 - 30 - 11.3 - 12.6 = 566.1",
            "required-steel/A_sr": "16.6816*380*566.1/340 = 10554.4",
        },
    )
    assert not holds(record, "required-steel/concrete-balances")
    assert {"required-steel/steel-for-moment", "flexure/strength"} <= set(record.failed)
    assert list(faults(record.data)) == []


def test_more_moment_than_any_bars_balance_with_a_flange() -> None:
    """As above, with 500 x 60 mm of flange beside a web of 400 mm, to the last line.

    The web gives 16.6816 x 400 = 6672.64 N a mm of depth.
    """
    record = record_of(**{**THIN, "superimposed": "90 kPa", "span": "10 m"})
    assert_by_hand(
        record,
        {
            "required-steel/C_f": "16.6816*500*60/1e3 = 500.448",
            "required-steel/M_rc": "500.448*0.48801 + 6672.64*0.51801*0.259005 = 1139.47",
            "required-steel/A_sr": "(500448 + 6672.64*518.01)/340 = 11638",
        },
    )
    assert not holds(record, "required-steel/concrete-balances")
    assert "flexure/strength" in record.failed


def sheet_with(**values: str) -> Sheet:
    """Return a sheet with the parts that the resistance rests on, filled as given."""
    sheet = Sheet("X", notation=NOTATION)
    parts: dict[str, dict[str, str]] = {
        "materials": {
            "alpha_1": "0.7975", "beta_1": "0.8825", "phi_c": "0.65", "phi_s": "0.85",
            "f_c": "35 MPa", "f_y": "400 MPa", "E_s": "200000 MPa", "eps_cu": "0.0035",
        },
        "loads": {"M_f": "300 kN.m"},
        "section": {},
        "bars": {},
        "compression-bars": {},
    }  # fmt: skip
    for place, text in values.items():
        key, _, symbol = place.partition("__")
        parts[key.replace("_", "-")][symbol] = text
    for key, given in parts.items():
        with sheet.part(key, key):
            for symbol, text in given.items():
                sheet.given(symbol, text)
    return sheet


def test_upper_layer_alone_does_not_yield() -> None:
    """Block of check no. 5a, 2700 mm2 at 560 and at 480: d 520, the lower layer yields alone.

    a = 0.85 x 5400 x 400/(18.143125 x 350) = 1836000/6350.094 = 289.13; c = 289.13/0.8825 =
    327.63; c/d = 0.6301 <= 0.6364, but c/d_2 = 327.63/480 = 0.6826 is more.
    """
    sheet = sheet_with(
        section__b_w="350 mm", section__h="620 mm", bars__A_s="5400 mm2", bars__d="520 mm",
        bars__A_s1="2700 mm2", bars__d_1="560 mm", bars__A_s2="2700 mm2", bars__d_2="480 mm",
    )  # fmt: skip
    record_flexure(sheet, "rectangular", PAIR)
    record = sheet.close()
    assert record.failed == ["flexure/yield-upper"]
    assert record.entries["flexure/yield"]["left"] == pytest.approx(0.6301, abs=0.00006)
    assert record.entries["flexure/yield-upper"]["left"] == pytest.approx(0.6826, abs=0.00006)
    assert list(faults(record.data)) == []


def test_no_5b_through_the_flow() -> None:
    """Hand calculation, independent check no. 5b: C_f 1088.6 kN, a 237.3, M_r 1220.4 kN.m."""
    sheet = sheet_with(
        section__b_f="900 mm", section__b_w="300 mm", section__h_f="100 mm",
        section__h="660 mm", bars__A_s="7000 mm2", bars__d="600 mm",
    )  # fmt: skip
    record_flexure(sheet, "T", PAIR)
    record = sheet.close()
    assert number(record, "flexure/C_f") == pytest.approx(1088.6, abs=0.05)
    assert number(record, "flexure/a_w") == pytest.approx(237.3, abs=0.05)
    assert number(record, "flexure/M_r") == pytest.approx(1220.4, abs=0.05)
    assert record.entries["flexure/yield"]["left"] == pytest.approx(0.448, abs=0.0005)
    assert list(faults(record.data)) == []


def test_no_5c_through_the_flow() -> None:
    """Hand calculation, independent check no. 5c, displaced concrete counted: c 145.3, 445.3."""
    sheet = sheet_with(
        section__b_w="300 mm", section__h="565 mm", bars__A_s="3000 mm2", bars__d="500 mm",
        compression_bars__A_sp="1000 mm2", compression_bars__d_p="62 mm",
    )  # fmt: skip
    record_doubly(sheet, "rectangular", PAIR)
    record = sheet.close()
    assert number(record, "flexure/c") == pytest.approx(145.3, abs=0.05)
    assert number(record, "flexure/f_sp") == pytest.approx(400)
    assert number(record, "flexure/M_r") == pytest.approx(445.3, abs=0.05)
    assert list(faults(record.data)) == []


def test_compression_bars_in_a_tee_with_the_block_in_the_web() -> None:
    """5b with 1000 mm2 at 62 mm: c = (2380 - 1088.5875 - 321.857)/(18.143*0.3*0.8825) = 201.85 mm.

    M_r = 1088.5875 x 0.550 + 969.555 x (0.6 - 0.178133/2) + 321.857 x 0.538 = 1267.3 kN.m.
    """
    sheet = sheet_with(
        section__b_f="900 mm", section__b_w="300 mm", section__h_f="100 mm",
        section__h="660 mm", bars__A_s="7000 mm2", bars__d="600 mm",
        compression_bars__A_sp="1000 mm2", compression_bars__d_p="62 mm",
    )  # fmt: skip
    record_doubly(sheet, "T", PAIR)
    record = sheet.close()
    assert number(record, "flexure/c") == pytest.approx(201.85, abs=0.01)
    assert number(record, "flexure/M_r") == pytest.approx(1267.3, abs=0.05)
    assert not holds(record, "flexure/block-in-flange")
    assert list(faults(record.data)) == []


def test_compression_bars_of_a_beam() -> None:
    """The whole beam with 3-20M counted at the top: they fit, act, and both paths agree."""
    record = record_of(**DOUBLY)
    assert_by_hand(
        record,
        {
            "compression-bars/n_c": "3*1 = 3",
            "compression-bars/A_sp": "3*300 = 900",
            "compression-bars/d_p": "30 + 11.3 + 9.75 = 51.05",
            "compression-bars/s_c": "(380 - 2*(30 + 11.3 + 22.5))/2 - 19.5 = 106.7",
        },
    )
    # equilibrium by hand: 16.6816 x 380 x 0.89 c + 900 x (0.85 f's - 16.6816) = 1360000
    c, f_sp = number(record, "flexure/c"), number(record, "flexure/f_sp")
    assert f_sp == pytest.approx(min(400, 700 * (c - 51.05) / c), rel=1e-6)
    concrete, bars = 16.6816 * 380 * 0.89 * c, 900 * (0.85 * f_sp - 16.6816)
    assert concrete + bars == pytest.approx(1360000, rel=1e-6)
    d = number(record, "bars/d")
    M_r = concrete * (d - 0.89 * c / 2) + bars * (d - 51.05)
    assert number(record, "flexure/M_r") == pytest.approx(M_r / 1e6, rel=1e-6)
    assert record.failed == []
    assert "required-steel/A_sr" not in record.entries
    assert holds(record, "compression-bars/bars-fit")
    assert holds(record, "second-path/second-path")
    assert recompute(record) == []
    assert list(faults(record.data)) == []


def test_over_reinforced_with_compression_bars_is_a_failing_check() -> None:
    """Not an error: the axis is found with bars that do not yield, and the yield check fails."""
    record = record_of(
        **RECTANGULAR, bottom_bars="6-30M / 6-30M", b_w="500 mm", h="500 mm", f_c="20 MPa",
        compression_bars="2-20M",
    )  # fmt: skip
    assert "flexure/yield" in record.failed


def test_skin_steel() -> None:
    """h 900, 12 m: strips by hand, 10M bars in them, at most 200 mm apart."""
    record = record_of(**DEEP, bottom_bars="5-30M / 4-30M", b_w="450 mm")
    d = number(record, "bars/d")
    height, width = 450 - 2 * (900 - d), 2 * (30 + 11.3 + 5.65)
    area = 0.008 * 2 * height * width
    assert width < 225
    assert number(record, "crack-control/h_sk") == pytest.approx(height)
    assert number(record, "crack-control/A_sk") == pytest.approx(area)
    n = number(record, "crack-control/n_k")
    # the least whole number of 10M on each face for the area and for 200 mm
    assert 2 * n * 100 >= area
    assert height / n <= 200
    assert 2 * (n - 1) * 100 < area or height / max(n - 1, 1) > 200
    assert holds(record, "crack-control/skin-area")
    assert holds(record, "crack-control/skin-spacing")
    assert list(faults(record.data)) == []


def test_skin_steel_starts_above_750() -> None:
    """750 mm needs none, 760 mm does."""
    assert not holds(record_of(h="750 mm"), "crack-control/skin-required")
    assert holds(record_of(h="760 mm"), "crack-control/skin-required")


def test_second_path_needs_the_flexure_part() -> None:
    """The proof rests on the resistance itself, not on a copy of it."""
    sheet = sheet_with(
        section__b_w="350 mm", section__h="600 mm", bars__A_s="2000 mm2", bars__d="535 mm",
    )  # fmt: skip
    record_flexure(sheet, "rectangular", PAIR)
    with sheet.part("balanced", "Balanced"):
        sheet.given("A_sb", "5611.5 mm2")
        sheet.given("M_rb", "734.1 kN.m")
        sheet.given("a_b", "300.45 mm")
    record_second_path(sheet, "rectangular")
    record = sheet.close()
    args = record.entries["second-path/second-path"]["args"]
    assert args["M_r"] == "flexure/M_r"
    assert number(record, "second-path/M_l") == pytest.approx(327.4, abs=0.05)
    assert holds(record, "second-path-balanced/second-path")


@pytest.mark.parametrize("case", strain.CASES)
def test_rectangle_is_a_tee_of_one_width(case: str) -> None:
    """The procedures of a rectangle take b alone; no. 5a: c 121.3, M 327.4; 5c: c 145.3, 445.3."""
    rectangle = {
        "alpha_1": 0.7975, "beta_1": 0.8825, "phi_c": 0.65, "f_c": 35.0, "eps_cu": 0.0035,
        "b": 350.0, "phi_s": 0.85, "f_y": 400.0, "E_s": 200000.0, "A_s": 2000.0, "d": 535.0,
        # the same 2000 mm2 about the same 535 mm
        "A_s1": 1500.0, "d_1": 550.0, "A_s2": 500.0, "d_2": 490.0,
    }  # fmt: skip
    axis, moment = 121.3, 327.4
    if case.startswith("compression bars"):
        rectangle |= {"b": 300.0, "A_s": 3000.0, "d": 500.0, "A_sp": 1000.0, "d_p": 62.0}
        # the same 3000 mm2 about the same 500 mm
        rectangle |= {"A_s1": 2000.0, "d_1": 515.0, "A_s2": 1000.0, "d_2": 470.0}
        axis, moment = 145.3, 445.3
    made = [each["rectangle", case] for each in (strain.AXIS, strain.MOMENT)]
    assert all({"b_w", "h_f"}.isdisjoint(each.names) for each in made)
    c, M = (each.function(*[rectangle[n] for n in each.names]) for each in made)
    assert c == pytest.approx(axis, abs=0.05)
    assert pytest.approx(moment, abs=0.05) == M / 1e6
    tee = rectangle | {"b_w": rectangle["b"], "h_f": 100.0}
    same = strain.AXIS["tee", case]
    assert same.function(*[tee[n] for n in same.names]) == pytest.approx(c, rel=1e-9)
