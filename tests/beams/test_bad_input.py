"""Wrong input gives one error with every fault: the input, what was given, what to type."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.beams.inputs import RANGES, read_input
from lineproof.errors import UserError
from lineproof.sheet import Sheet

from .gallery import PROJECT_2015, RECTANGULAR, record_of, start

EXACT: dict[str, tuple[dict[str, Any], str]] = {
    "unit missing": ({"f_c": "32"}, "f_c: '32' has no unit; write '32 MPa'"),
    "unit wrong": (
        {"span": "7.6 kN"},
        "span: '7.6 kN' is a force, but a length is needed; write it in ",
    ),
    "negative": (
        {"span": "-7 m"},
        "span: '-7 m' is negative; write a positive value such as '8 m'",
    ),
    "zero": ({"h": "0 mm"}, "h: '0 mm' is zero; write a positive value such as '600 mm'"),
    "not a number": (
        {"spacing": float("nan")},
        "spacing: 'nan' is not a number with a unit; write for example '3.1 m'",
    ),
    "decimal comma": (
        {"span": "7,6 m"},
        ("span: '7,6 m' is not a number with a unit; write a decimal point: '7.6 m'"),
    ),
    "too strong": (
        {"f_c": "90 MPa"},
        "f_c: '90 MPa' is outside 20 to 80 MPa (A23.3, 8.6.1.1); write a value inside it",
    ),
    "too weak": (
        {"f_c": "19.9 MPa"},
        "f_c: '19.9 MPa' is outside 20 to 80 MPa (A23.3, 8.6.1.1); write a value inside it",
    ),
    "flange thinner than its cover": (
        {"h_f": "28 mm"},
        "h_f: '28 mm' is not thicker than its cover of '30 mm'; write a thicker slab",
    ),
    "flange thicker than the beam": (
        {"h_f": "620 mm"},
        "h_f: '620 mm' is not less than h of '620 mm'; write a smaller h_f or a larger h",
    ),
    "unknown bar": (
        {"bottom_bars": "4-22M"},
        (
            "bottom_bars: '22M' is not a Canadian bar; did you mean '25M'? There are 10M, 15M, "
            "20M, "
            "25M, 30M, 35M, 45M, 55M"
        ),
    ),
    "bars not understood": (
        {"bottom_bars": "4x25M"},
        (
            "bottom_bars: '4x25M' is not understood; write '4-25M', or '4-25M / 2-25M' for two "
            "layers "
            "from the bottom up"
        ),
    ),
    "three layers": (
        {"bottom_bars": "4-25M / 4-25M / 2-25M"},
        "bottom_bars: '4-25M / 4-25M / 2-25M' has 3 layers; write at most 2",
    ),
    "one bar": (
        {"bottom_bars": "1-25M"},
        "bottom_bars: '1-25M' has a layer of 1; write at least 2 bars a layer",
    ),
    "not in line": (
        {"bottom_bars": "2-25M / 4-25M"},
        (
            "bottom_bars: '2-25M / 4-25M': the bars of the second layer cannot stand in line with "
            "the first; write for example '2-25M / 2-25M'"
        ),
    ),
    "odd above even": (
        # two over the outer bars, the third over the middle of four: no bar stands there
        {"bottom_bars": "4-25M / 3-20M"},
        (
            "bottom_bars: '4-25M / 3-20M': the bars of the second layer cannot stand in line with "
            "the first; write for example '4-25M / 2-20M'"
        ),
    ),
    "compression bars in two layers": (
        {"compression_bars": "2-20M / 2-20M"},
        "compression_bars: '2-20M / 2-20M' has two layers; write one, such as '2-20M'",
    ),
    "top bars in two layers": (
        {"top_bars": "3-20M / 2-20M"},
        "top_bars: '3-20M / 2-20M' has two layers; write one, such as '3-20M'",
    ),
    "top bars at free ends": (
        {"ends": "free", "top_bars": "2-15M"},
        "top_bars: free ends have no moment to carry; leave them out: top_bars = None",
    ),
    "bars that do not fit": (
        {"bottom_bars": "7-25M"},
        # (380 - 127.6)/6 - 25.2 = 16.9; 1.4 x 25.2 = 35.3
        (
            "bottom_bars: '7-25M': 7-25M do not fit into a web of 380 mm (clear distance 17 mm, at "
            "least 35 mm); write fewer or larger bars, two layers such as '4-25M / 2-25M', or a "
            "wider "
            "web"
        ),
    ),
    "top bars that do not fit": (
        {"top_bars": "9-25M"},
        # 252.4/8 - 25.2 = 6.35
        (
            "top_bars: '9-25M': 9-25M do not fit into a web of 380 mm (clear distance 6 mm, at "
            "least "
            "35 mm); write fewer or larger bars, or a wider web"
        ),
    ),
    "compression bars that do not fit": (
        {**RECTANGULAR, "compression_bars": "9-25M"},
        (
            "compression_bars: '9-25M': 9-25M do not fit into a web of 380 mm (clear distance 6 "
            "mm, at "
            "least 35 mm); write fewer or larger bars, or a wider web"
        ),
    ),
    "grade": (
        {"grade": "600R"},
        (
            "grade: '600R' is not a grade of reinforcement; did you mean '500R'? There are "
            "400R, 400W, "
            "500R, 500W; of older bars write the yield strength, such as '300 MPa'"
        ),
    ),
    "older bars": (
        {"grade": "150 MPa"},
        (
            "grade: '150 MPa' is outside 200 to 500 MPa (A23.3, 8.5.1; older bars); write a value "
            "inside it"
        ),
    ),
    "rating between the rows": (
        {"fire_rating": "2.5 h"},
        (
            "fire_rating: '2.5 h' is not in the table; write one of 0.5 h, 0.75 h, 1 h, 1.5 h, "
            "2 h, "
            "3 h, 4 h"
        ),
    ),
    "exposure": (
        {"exposure": "C-2"},
        "exposure: 'C-2' is not an exposure class of reinforced beams; ",
    ),
    "web opening": (
        {"web_openings": "1 at midspan"},
        (
            "web_openings: '1 at midspan': a beam with web openings is outside the method; write "
            "'none' and design the opening region by strut-and-tie"
        ),
    ),
    "deep beam": (
        {"span": "1.1 m", "spacing": "2 m"},
        (
            "span: '1.1 m' is less than twice h of '620 mm': a deep beam is outside the method; "
            "use "
            "strut-and-tie (A23.3, 10.7)"
        ),
    ),
    "no slab": ({"h_f": None}, "h_f: a beam of shape 'T' needs its slab; write '140 mm'"),
    "rectangle with a slab": (
        {"shape": "rectangular", "floor_weight": "0 kPa"},
        "h_f: a rectangular beam has no flange; write h_f = None, or shape = 'T'",
    ),
    "rectangle without its floor": (
        {"shape": "rectangular", "h_f": None},
        (
            "floor_weight: a rectangular beam needs the weight of the floor it carries; write "
            "'3.4 kPa', or '0 kPa' if it carries none"
        ),
    ),
    "floor of a tee": (
        {"floor_weight": "3.4 kPa"},
        "floor_weight: the slab of a T or an L is counted from h_f; write None",
    ),
    "negative floor": (
        {**RECTANGULAR, "floor_weight": "-1 kPa"},
        "floor_weight: '-1 kPa' is negative; write a positive value such as '3.4 kPa'",
    ),
    "light, called normal": (
        {"gamma_c": "2149 kg/m3"},
        (
            "gamma_c: '2149 kg/m3' is not normal density; write at least '2150 kg/m3', or density "
            "= 'semi-low' or 'low'"
        ),
    ),
    "edge beam without its width": (
        {"shape": "L"},
        "tributary_width: an edge beam needs it; write for example '1.7 m'",
    ),
    "spacing within the web": (
        {"spacing": "0.35 m"},
        (
            "spacing: '0.35 m' is not more than b_w of '380 mm'; write the distance between the "
            "centres of the beams"
        ),
    ),
    "shape": ({"shape": "I"}, "shape: 'I' is not known; write one of 'T', 'L', 'rectangular'"),
    "ends": (
        {"ends": "fixed"},
        (
            "ends: 'fixed' is not known; write one of 'free', 'cast with a girder', 'cast with a "
            "column'"
        ),
    ),
    "rule": (
        {"minimum_rule": "10.5.1"},
        "minimum_rule: '10.5.1' is not known; write one of '10.5.1.1', '10.5.1.2'",
    ),
    "snow": (
        {"use": "roof"},
        "use: 'roof' carries snow, which this beam does not take; write a use inside the building",
    ),
}


@pytest.mark.parametrize("name", EXACT)
def test_one_fault(name: str) -> None:
    """One fault, its sentence word for word (a list of many words only to its beginning)."""
    changes, sentence = EXACT[name]
    with pytest.raises(UserError) as caught:
        record_of(**changes)
    (fault,) = caught.value.faults
    assert fault == sentence or (sentence.endswith(" ") and fault.startswith(sentence))
    assert caught.value.exit_code == 2


def test_all_faults_at_once() -> None:
    """Each input in the order of the call, one sentence each; nothing is recorded."""
    sheet = Sheet("B7", project={"codes": {"pair": "NBC 2015 + A23.3:19"}})
    with pytest.raises(UserError) as caught:
        start(
            sheet=sheet, f_c="32", span="-7 m", h="0 mm", grade="600R", use="zoo",
            web_openings="1 at midspan", spacing=float("nan"), b_w="60 mm", cover="3 cm2",
            bottom_bars="many", fire_rating="soon", exposure="X", shape="U",
        )  # fmt: skip
    named = [fault.partition(":")[0] for fault in caught.value.faults]
    assert sorted(named) == sorted([
        "codes.pair", "f_c", "span", "h", "grade", "use", "web_openings", "spacing", "b_w", "cover",
        "bottom_bars", "fire_rating", "exposure", "shape",
    ])  # fmt: skip
    assert all(";" in fault for fault in caught.value.faults)
    assert sheet.parts == ()


@pytest.mark.parametrize("name", ["span", "spacing", "b_w", "h", "h_f", "f_c", "gamma_c", "cover",
                                  "aggregate", "superimposed", "fire_rating"])  # fmt: skip
@pytest.mark.parametrize(
    "given", [None, "", "nan mm", "1e400 mm", "12 parsecs", True, [1], "--3 mm"]
)
def test_odd_quantities(name: str, given: object) -> None:
    """Whatever stands for a quantity: an error that names the input."""
    if name == "h_f" and given is None:
        given = "none"
    with pytest.raises(UserError) as caught:
        start(**dict[str, Any]({name: given}))
    assert caught.value.faults[0].startswith(f"{name}: ")


def test_the_project_names_its_codes() -> None:
    """No default pair."""
    with pytest.raises(UserError, match=r"^codes\.pair: 'nothing' is not a locked code pair"):
        start(project={})
    start(project=PROJECT_2015)


def test_compression_bars_below_the_axis() -> None:
    """A wide flange needs 13 mm; bars 51 mm down are not in compression, and the error says so."""
    with pytest.raises(
        UserError, match="compression_bars: they lie below the neutral axis"
    ) as caught:
        record_of(bottom_bars="4-25M", compression_bars="2-20M")
    assert "leave them out: compression_bars = None" in str(caught.value)


@pytest.mark.parametrize("name", RANGES)
def test_what_is_told_to_write_is_taken(name: str) -> None:
    """The sample of a message lies in the range itself: 625 kg/m3 was told, and refused."""
    with pytest.raises(UserError) as caught:
        read_input(name, "-1 " + RANGES[name].unit)
    sample = caught.value.faults[0].rpartition(" such as ")[2].strip("'")
    assert read_input(name, sample).value > 0
