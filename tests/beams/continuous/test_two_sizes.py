"""Bars of two sizes side by side, as they stand in old beams: area, depth, fit and cracks by hand.

The beam is that of the notebook ``existing-beam``: h 600, b_w 350, cover 30 to stirrups 10M
(11.3 mm), f_c' 25, f_y 400, alpha_1 = 0.85 - 0.0015*25 = 0.8125, phi_c 0.65, phi_s 0.85.
"""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.beams.continuous.cures_tried import failing
from lineproof.errors import UserError
from lineproof.record.recompute import recompute
from lineproof.sheet import Sheet

from .beam_with_gaps import row
from .flow import run, start
from .notebooks import EXISTING_BEAM, inputs_of
from .two_sizes import D_20, D_25, FLEXURE, INSIDE, SPREAD, TOP, beam

BOTTOM = [
    row("bottom", "2-25M", -0.1, 7.6), row("bottom", "2-20M", -0.1, 7.6),
    row("bottom", "2-20M", -0.1, 6.0, layer=2),
    row("bottom", "2-25M", 6.45, 14.5), row("bottom", "2-20M", 6.8, 14.5),
]  # fmt: skip


@pytest.fixture(scope="module")
def sheet() -> Sheet:
    """The whole flow with two sizes in the first bottom layer, in the web and in the overhangs."""
    return beam([*BOTTOM, *TOP, SPREAD])


def test_area_and_depth_of_two_sizes_and_two_layers(sheet: Sheet) -> None:
    """2-25M + 2-20M, and 2-20M above: 1000 + 600 + 600 = 2200 mm2.

    The second layer stands 1.4*25.2 = 35.28 mm clear above the 25M: d_2 = 546.1 - 12.6 - 35.28 -
    9.75 = 488.47. d = (1000*546.1 + 600*548.95 + 600*488.47)/2200 = 531.16.
    """
    counted, section = sheet.entries_of("sag-1-developed"), sheet.entries_of("sag-1")
    d_2 = D_25 - 25.2 / 2 - 1.4 * 25.2 - 19.5 / 2
    assert counted["A_s"].value == 2200
    d = (1000 * D_25 + 600 * D_20 + 600 * d_2) / 2200
    assert counted["d"].value == pytest.approx(d, rel=1e-12)
    assert section["d_2"].value == pytest.approx(d_2, rel=1e-12)
    assert "A_s" not in section  # that of one size is not printed
    b = dict(zip(section["a"].source.names, section["a"].args, strict=True))["b"].value
    a = 0.85 * 2200 * 400 / (0.8125 * 0.65 * 25 * b)
    assert section["M_r"].value == pytest.approx(0.85 * 2200 * 400 * (d - a / 2), rel=1e-9)


def test_the_fit_is_that_of_the_larger_size(sheet: Sheet) -> None:
    """(350 - 2*(30 + 11.3 + 22.5))/3 - 25.2 = 48.93 mm clear; the page says as what."""
    section = sheet.entries_of("sag-1")
    least, clear = section["bars-fit"].value
    assert (least, clear) == (
        pytest.approx(1.4 * 25.2), pytest.approx((350 - 2 * (INSIDE + 22.5)) / 3 - 25.2),
    )  # fmt: skip
    assert section["bars-text"].source.text == (
        "Bottom bars: 2-25M + 2-20M / 2-20M, as given along the beam. The distance between them "
        "is taken as if all of a layer had the larger size."
    )


def test_cracks_count_the_bars_by_the_area_of_the_largest(sheet: Sheet) -> None:
    """10.6.1: 2200/500 = 4.4 bars at the bottom; at the top (1000 + 300 + 400)/500 = 3.4."""
    assert sheet.entries_of("sag-1")["n_z"].value == pytest.approx(4.4)
    assert sheet.entries_of("hog-2-left")["n_z"].value == pytest.approx(3.4)


def test_bars_of_the_overhang_count_with_their_own_area(sheet: Sheet) -> None:
    """1-15M, 200 mm2, in each overhang; 0.004*360*130 = 187.2 are asked for. 1-10M is less."""
    entries = sheet.entries_of("hog-2-left")
    assert entries["top-bars-spread"].value == (pytest.approx(187.2), 200)
    assert "1-15M in each overhang" in entries["bars-text"].source.text
    assert sheet.entries_of("hog-2-left-developed")["A_s"].value == 1000 + 300 + 2 * 200
    thin = beam([*BOTTOM, *TOP, SPREAD | {"bars": "2-10M"}], FLEXURE).entries_of("hog-2-left")
    assert thin["top-bars-spread"].value == (pytest.approx(187.2), 100)
    assert not thin["top-bars-spread"]


def test_flange_and_web_join_by_the_bars_of_the_overhang(sheet: Sheet) -> None:
    """Their tension is that of 1-15M, not of the 25M of the web."""
    part = next(p for p in sheet.parts if p.key.startswith("interface-hog-2"))
    lines = [e for e in part.entries.values() if e.kind == "line" and "n_o" in e.source.names]
    assert lines
    for entry in lines:
        bound = dict(zip(entry.source.names, entry.args, strict=True))
        assert (bound["n_o"].value, bound["A_b"].value) == (1, 200)


def test_every_line_of_the_flow_follows_from_the_record(sheet: Sheet) -> None:
    record = sheet.close()
    assert recompute(record) == []
    rows = sheet.entries_of("summary")["flexure"].source.content["rows"]
    texts = {line[0]: (line[4], line[5]) for line in rows}
    assert texts["span 1"] == ("2-25M + 2-20M / 2-20M", "2200")
    assert texts["support 2, left"] == ("2-25M + 1-20M, 1-15M in each overhang", "1700")


def test_shear_goes_by_the_depth_of_all_sizes(sheet: Sheet) -> None:
    """d_v = 0.9*531.16 where the bottom is in tension in span 1."""
    d_v = 0.9 * sheet.entries_of("sag-1-developed")["d"].value
    along = sheet.entries_of("shear-1-along")
    assert along["d_v"].value == pytest.approx(d_v, rel=1e-12)
    assert along["A_s"].value == 2200


def test_a_depth_that_no_section_has_is_recorded_for_the_shear() -> None:
    """Beside the column 2-25M + 2-15M stand, without the 20M of its section, which counts in part.

    d = (400*550.7 + 1000*546.1)/1400 = 547.41, less than that with the 20M.
    """
    short = [row("top", "2-25M", -0.1, 14.5), row("top", "1-20M", 6.65, 7.75), SPREAD]
    made = beam([*BOTTOM, *short])
    assert recompute(made.close()) == []
    found = {p.entries["d"].value for p in made.parts if p.key.startswith("depth-")}
    d_15 = 600 - INSIDE - 16.0 / 2
    assert (400 * d_15 + 1000 * D_25) / 1400 in [pytest.approx(d, rel=1e-12) for d in found]


def test_shear_goes_by_the_bars_that_stand_at_its_section() -> None:
    """4-25M, and 2-20M above them beside the wall alone: the largest moment knows of one layer.

    d = (2000*546.1 + 600*488.47)/2600 = 532.80 there, not 546.1: d_v = 0.9*532.80.
    """
    upper = row("bottom", "2-20M", -0.1, 2.4, layer=2)
    made = beam([row("bottom", "4-25M", -0.1, 14.5), upper, *TOP, SPREAD])
    assert recompute(made.close()) == []
    d_2 = D_25 - 25.2 / 2 - 1.4 * 25.2 - 19.5 / 2
    d = (2000 * D_25 + 600 * d_2) / 2600
    assert made.entries_of("sag-1")["d"].value == pytest.approx(D_25, rel=1e-12)
    assert made.entries_of("shear-1-left")["d_v"].value == pytest.approx(0.9 * d, rel=1e-12)
    assert made.entries_of("depth-shear-1-left")["d"].value == pytest.approx(d, rel=1e-12)


def test_what_is_too_little_in_two_sizes_fails() -> None:
    """2-20M + 2-15M, 1000 mm2, for a moment that asks for 1400."""
    weak = [
        row("bottom", "2-20M", -0.1, 14.5), row("bottom", "2-15M", -0.1, 14.5), *TOP, SPREAD,
    ]  # fmt: skip
    made = beam(weak, FLEXURE)
    part = next(p for p in made.parts if p.key == "sag-1")
    assert {"steel-for-moment", "strength"} <= {check.symbol for check in failing(part)}
    assert made.entries_of("sag-1-developed")["A_s"].value == 600 + 400


def test_three_sizes_in_a_layer_are_refused_with_what_to_write() -> None:
    ends = (-0.1, 14.5)
    three = [row("bottom", bars, *ends) for bars in ("2-25M", "1-20M", "1-15M")]
    with pytest.raises(UserError) as refused:
        beam([*three, *TOP, SPREAD], FLEXURE)
    assert refused.value.faults[0] == (
        "bar runs: span 1: 25M, 20M, 15M stand in layer 1 of the bottom bars; write at most two "
        "sizes a layer, such as 25M and 15M"
    )


@pytest.mark.parametrize(
    ("changes", "fault"),
    [
        (
            {"bar_runs": [row("bottom", "2-25M + 2-20M", -0.1, 14.5)]},
            (
                "bar run 1, bars: '2-25M + 2-20M' is not understood; write '2-25M', a row for each "
                "size"
            ),
        ),
        (
            {"bar_runs": None, "bottom_bars": ["2-25M + 2-20M", None]},
            (
                "bottom_bars, span 1: '2-25M + 2-20M' has two sizes in one layer; write one, such "
                "as '4-25M' (bars along a beam, bar_runs, may have two)"
            ),
        ),
    ],
)
def test_two_sizes_typed_at_once_say_how_to_give_them(changes: dict[str, Any], fault: str) -> None:
    with pytest.raises(UserError) as refused:
        run(start(**(inputs_of(EXISTING_BEAM) | changes)), FLEXURE)
    assert fault in refused.value.faults
