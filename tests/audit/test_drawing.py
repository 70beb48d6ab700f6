"""A drawing against the demo calc: the same is silent, each difference by what it does."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

import pytest

from lineproof.audit.claims.tables import Row, read_table, write_table
from lineproof.audit.data import Finding, Severity
from lineproof.audit.search.drawing import HEADINGS, drawing_blank, drawing_findings
from lineproof.audit.search.drawing_rows import Item, items_of
from lineproof.errors import UserError
from lineproof.record import Record

from .altered import Data, demo, edited

NAMES = ("edge-beam", "existing-beam", "floor-beam")
CRITICAL, MAJOR, MINOR, OBSERVATION = Severity


def as_drawn(
    items: Sequence[Item], changes: dict[tuple[str, str], str], sheet: tuple[str, str] = ("", "")
) -> list[Row]:
    """Return the rows of a drawing that shows the calc, some items otherwise; empty: not drawn."""
    cells = [
        {
            "item": item.name, "place": item.place, "drawn": changes.get(item.key, item.text),
            "drawing": sheet[0], "revision": sheet[1],
        }
        for item in items
    ]  # fmt: skip
    return [Row(number, row) for number, row in enumerate(cells, start=2) if row["drawn"]]


def found(changes: dict[tuple[str, str], str], name: str = "floor-beam") -> tuple[Finding, ...]:
    """Return what is found on a drawing of a demo calc with some items drawn otherwise."""
    record = demo(name)
    return drawing_findings(record, as_drawn(items_of(record), changes))


@pytest.mark.parametrize("name", NAMES)
def test_a_drawing_of_the_calc_itself_is_silent(name: str) -> None:
    assert found({}, name) == ()


@pytest.mark.parametrize("name", NAMES)
def test_the_blank_table_asks_for_everything_and_tells_nothing(name: str) -> None:
    record = demo(name)
    blank = drawing_blank(record)

    assert [row[:2] for row in blank] == [item.key for item in items_of(record)]
    assert {row[HEADINGS.index("drawn")] for row in blank} == {""}
    assert {row[HEADINGS.index("unit")] for row in blank} == {"", "mm", "MPa"}


def test_a_filled_table_is_read_back(tmp_path: Path) -> None:
    """Written as CSV, filled in with a number beside its unit, read, compared."""
    record = demo("floor-beam")
    texts = {item.key: item.text for item in items_of(record)}
    rows = []
    for item, place, _, unit, *rest in drawing_blank(record):
        text = texts[item, place]
        rows.append([item, place, text.removesuffix(f" {unit}") if unit else text, unit, *rest])
    rows[0][2] = "600"
    path = tmp_path / "drawn.csv"
    path.write_bytes(write_table(HEADINGS, rows, ".csv"))

    (finding, *more) = drawing_findings(record, read_table(path).rows)

    assert finding.what == "Overall depth: drawn 600 mm, 620 mm in the calc."
    assert more == []


def test_thinner_bars_are_critical_with_their_effect_on_the_moment() -> None:
    # Mark B02 is half of 6-20M in each end span: 5-20M become 2-20M + 3-15M, 1200 mm2 for 1500.
    # a = 0.85 x 1200 x 400/(0.802 x 0.65 x 32 x 1900) = 12.87 mm;
    # M_r = 408000 x (568.95 - 12.87/2) = 229.5 kN.m against M_f = 236.1 kN.m: 1.029.
    (finding,) = found({("bars", "B02"): "6-15M"})
    strength = next(e for e in finding.effects if e.check == "sag-1/strength")

    assert finding.severity == CRITICAL
    assert finding.what == "Bars, B02: drawn 6-15M, 6-20M in the calc."
    assert finding.ids == ("sag-1/A_s", "sag-3/A_s")
    assert strength.claimed == pytest.approx(236.132 / 229.506, rel=1e-4)
    assert strength.right == pytest.approx(236.132 / 286.061, rel=1e-4)
    assert "shared like the calc's" in finding.advice


def test_bars_that_run_through_have_what_the_others_leave() -> None:
    # T04 is 4 of the 6-20M over support 2, T03 the other 2: 4-20M and 2-15M are left.
    (finding,) = found({("bars", "T03"): "4-15M"})
    effect = next(e for e in finding.effects if e.check == "hog-2-left/steel-for-moment")

    # A_sr = 1753.19 mm2 of 1800: 0.974; of 4 x 300 + 2 x 200 = 1600: 1.0957.
    assert effect.claimed == pytest.approx(1753.186 / 1600, rel=1e-4)
    assert not effect.holds_as_claimed


def test_other_bars_of_the_same_area_are_not_the_bars_of_the_calc() -> None:
    # 20M has 300 mm2, 15M 200 mm2, 30M 700 mm2 (CSA G30.18): 4 x 300 = 6 x 200 = 1200.
    (thinner,) = found({("bars", "T03"): "6-15M"})
    assert thinner.what == "Bars, T03: drawn 6-15M, 4-20M in the calc."
    assert (thinner.severity, thinner.effects) == (OBSERVATION, ())

    # 10M has 100 mm2: one leg of 15M stands for two of 10M.
    (other,) = found({("stirrups", "span 1, zone 1"): "1 leg 15M"})
    assert other.severity == MAJOR
    assert "Larger bars need longer development" in other.advice


def test_more_area_by_larger_bars_is_not_on_the_safe_side() -> None:
    """3-25M have 1500 mm2 for the 1200 of 4-20M; laps and development are those of 20M."""
    (finding,) = found({("bars", "B01"): "3-25M"})
    assert finding.severity == MAJOR
    assert "Larger bars need longer development, hooks and laps" in finding.advice
    assert "On the safe side" not in finding.advice


def test_more_steel_is_an_observation() -> None:
    (finding,) = found({("bars", "B04"): "3-20M"})

    assert finding.severity == OBSERVATION
    assert finding.advice.startswith("On the safe side")


def test_a_wider_spacing_breaks_the_largest_spacing() -> None:
    # s_max = 0.7 x 512.055 = 358.4 mm: 400/358.4 = 1.116.
    (finding,) = found({("stirrup spacing", "span 2, zone 1"): "400 mm"})
    first = finding.effects[0]

    assert finding.severity == CRITICAL
    assert finding.ids == ("shear-2-left/s", "shear-2-right/s")
    assert first.claimed == pytest.approx(400 / 358.4385, rel=1e-5)


@pytest.mark.parametrize(
    ("item", "text", "severity"),
    [
        (("strength of concrete", "the beam"), "25 MPa", CRITICAL),
        (("strength of concrete", "the beam"), "35 MPa", OBSERVATION),
        (("cover", "the beam"), "25 mm", CRITICAL),  # c_rs = 30 mm for durability
        # Four 20M at the top: (250 - 2 x 63.8)/3 - 19.5 = 21.3 mm apart, 30 are needed.
        (("width of the web", "the beam"), "250 mm", CRITICAL),
        (("width of the web", "the beam"), "381 mm", OBSERVATION),
        (("stirrup spacing", "span 1, zone 1"), "325 mm", OBSERVATION),
        (("stirrups", "span 1, zone 1"), "1 leg 10M", CRITICAL),
        (("hanger stirrups", "support 1"), "2", CRITICAL),  # 486 mm2 of 400
        (("lap length", "lap 1"), "800 mm", CRITICAL),  # l_s = 839 mm
        (("lap length", "lap 1"), "950 mm", OBSERVATION),
        (("cut length", "B01"), "8000 mm", MAJOR),
        (("cut length", "B01"), "8200 mm", OBSERVATION),
        (("zone to", "span 1, zone 1"), "6000 mm", MINOR),
        (("width of support", "support 2"), "440 mm", MINOR),
        (("cut-off", "top bars, support 2, left side, cut 1"), "2300 mm", CRITICAL),
        (("cut-off", "top bars, support 2, left side, cut 1"), "2500 mm", OBSERVATION),
        (("cut-off", "bottom bars, span 1, right side, cut 1"), "1400 mm", CRITICAL),
        (("cut-off", "bottom bars, span 1, right side, cut 1"), "1200 mm", OBSERVATION),
    ],
)  # fmt: skip
def test_severity_by_direction_and_effect(
    item: tuple[str, str], text: str, severity: Severity
) -> None:
    (finding,) = found({item: text})

    assert finding.severity == severity
    assert finding.what.endswith("in the calc.")
    assert finding.clause
    assert finding.advice


def test_stirrups_of_one_span_do_nothing_to_the_others() -> None:
    """One leg of 100 mm2 at 350 mm: 0.06 x sqrt(32) x 380 x 350/400 = 112.9 mm2 is the minimum."""
    record = demo("floor-beam")
    spacing = next(i for i in items_of(record) if i.key == ("stirrup spacing", "span 2, zone 1"))
    least = 0.06 * 32**0.5 * 380 * spacing.value / 400
    (finding,) = found({("stirrups", "span 2, zone 1"): "1 legs 10M"})
    assert finding.severity is CRITICAL
    assert {effect.check.split("/")[0] for effect in finding.effects} == {
        "shear-2-left", "shear-2-right",
    }  # fmt: skip
    minimum = next(e for e in finding.effects if e.check.endswith("/minimum-stirrups"))
    assert minimum.claimed == pytest.approx(least / 100)
    assert minimum.right == pytest.approx(least / 200)


def test_open_stirrups_for_closed_ones_are_major() -> None:
    (finding,) = found({("stirrup form", "span 1, zone 1"): "open"}, "edge-beam")

    assert finding.severity == MAJOR
    assert finding.what == "Stirrup form, span 1, zone 1: drawn open, closed in the calc."


def test_the_last_millimetres_of_a_length_are_nobodys() -> None:
    assert found({("cut length", "B01"): "8108 mm", ("zone from", "span 1, zone 1"): "50 mm"}) == ()


def test_what_is_not_drawn_is_told_by_kind() -> None:
    findings = found({("bars", "B01"): "", ("bars", "T04"): "", ("cover", "the beam"): ""})

    assert [(f.severity, f.what) for f in findings] == [
        (MAJOR, "Bars of B01, T04: not on the drawing."),
        (MINOR, "Cover: not on the drawing."),
    ]


def test_what_is_drawn_and_not_in_the_calc() -> None:
    record = demo("floor-beam")
    extra = Row(99, {"item": "bars", "place": "F01", "drawn": "4-15M", "drawing": "S-501"})

    (finding,) = [
        f for f in drawing_findings(record, [*as_drawn(items_of(record), {}), extra])
        if "F01" in f.what
    ]  # fmt: skip

    assert finding.severity == MINOR
    assert finding.what == "Bars, F01: drawn 4-15M, not in the calc (S-501)."


def test_the_revision_of_the_drawing_against_that_of_the_calc() -> None:
    """The demo's project lists S-201 at revision B."""
    record = demo("floor-beam")

    def told(drawing: str, revision: str) -> list[str]:
        rows = as_drawn(items_of(record), {}, (drawing, revision))
        return [finding.what for finding in drawing_findings(record, rows)]

    assert told("S-201", "B") == []
    assert told("S-201", "C") == [
        "The calc rests on revision B of S-201, the drawing is revision C."
    ]
    assert told("S-999", "A") == ["The calc names no drawing S-999."]


def test_two_revisions_of_one_drawing() -> None:
    record = demo("floor-beam")
    rows = as_drawn(items_of(record), {}, ("S-201", "B"))
    rows[3].cells["revision"] = "A"

    (first, second) = drawing_findings(record, rows)

    assert first.what == "S-201 is told with revisions A, B."
    assert second.what == "The calc rests on revision B of S-201, the drawing is revision A."
    # A revision is no critical finding: differences stand before it as well as after it.
    assert second.advice == "Compare the two revisions before its other differences are judged."


def test_a_unit_typed_beside_the_number_is_told_and_not_that_of_the_column() -> None:
    record = demo("floor-beam")
    rows = as_drawn(items_of(record), {("overall depth", "the beam"): "0.6 m"})
    in_mm = [Row(row.number, row.cells | {"unit": "mm"}) for row in rows]
    (finding,) = drawing_findings(record, in_mm)
    assert finding.what == "Overall depth: drawn 0.6 m, 620 mm in the calc."


def test_units_of_the_drawing_may_be_others() -> None:
    # 24.41 in = 620.0 mm; 15 in = 381 mm.
    assert found({("overall depth", "the beam"): "24.41 in"}) == ()
    (finding,) = found({("width of the web", "the beam"): "15 in"})
    assert finding.severity == OBSERVATION


@pytest.mark.parametrize(
    ("cells", "said"),
    [
        ({"item": "heigth", "drawn": "620 mm"}, "row 5: item: 'heigth' is not known; write one of"),
        ({"item": "cover", "drawn": "30"}, "row 5: drawn: "),
        ({"item": "bars", "place": "B01", "drawn": "four"}, "write it like '4-20M'"),
        ({"item": "bars", "place": "B01", "drawn": "4-22M"}, "write it like '4-20M'"),
        ({"item": "stirrups", "place": "span 1, zone 1", "drawn": "10M"}, "'2 legs 10M'"),
        ({"item": "hanger stirrups", "place": "support 1", "drawn": "2.5"}, "no whole number"),
        ({"item": "span", "place": "span 9", "drawn": "7 m"}, "write one of span 1, span 2, span"),
        ({"item": "stirrup form", "place": "span 1, zone 1", "drawn": "U"}, "'open' or 'closed'"),
    ],
)
def test_a_row_that_is_not_understood_says_what_to_write(cells: dict[str, str], said: str) -> None:
    with pytest.raises(UserError) as raised:
        drawing_findings(demo("floor-beam"), [Row(5, cells)])

    assert said in str(raised.value)
    assert str(raised.value).startswith("row 5: ")


def test_all_faults_at_once_and_no_row_twice() -> None:
    rows = [
        Row(2, {"item": "cover", "drawn": "30 mm"}),
        Row(3, {"item": "Cover", "place": "The Beam", "drawn": "40 mm"}),
        Row(4, {"item": "what", "drawn": "1 mm"}),
    ]

    with pytest.raises(UserError) as raised:
        drawing_findings(demo("floor-beam"), rows)

    assert len(raised.value.faults) == 2
    assert "row 3: cover, the beam stands in row 2 already" in str(raised.value)


def test_many_faults_are_not_all_told() -> None:
    rows = [Row(number, {"item": f"x{number}", "drawn": "1"}) for number in range(100)]

    with pytest.raises(UserError) as raised:
        drawing_findings(demo("floor-beam"), rows)

    assert raised.value.faults[-1] == "and 60 faults more"


def test_a_schedule_changed_by_hand_is_refused_in_plain_words() -> None:
    def change(data: Data) -> None:
        table = next(e for p in data["parts"] for e in p["entries"] if e["id"] == "schedule/bars")
        table["rows"] = [["B01", "20M", "four", *table["rows"][0][3:]]]

    with pytest.raises(UserError, match="'Number' is 'four', no number; take the record from"):
        drawing_blank(edited(demo("floor-beam"), change))


def test_facts_of_another_kind_name_no_drawing() -> None:
    def change(data: Data) -> None:
        data["project"] = {"drawings": "S-201"}

    record = edited(demo("floor-beam"), change)

    (finding,) = drawing_findings(record, as_drawn(items_of(record), {}, ("S-201", "B")))
    assert finding.what == "The calc names no drawing S-201."


def test_a_calc_without_schedules_still_has_its_sizes() -> None:
    def take(data: Data) -> None:
        data["parts"] = [p for p in data["parts"] if p["key"] != "schedule"]

    bare: Record = edited(demo("floor-beam"), take)

    assert {item.name for item in items_of(bare)} >= {"overall depth", "cover", "lap length"}
    assert not [item for item in items_of(bare) if item.name == "bars"]
