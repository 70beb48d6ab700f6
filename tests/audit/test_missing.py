"""Checks that a complete calc holds: nothing is missed in one, and what is taken away is named."""

from __future__ import annotations

import pytest
from tests.beams import gallery
from tests.beams.continuous.flow import MIXED, record_of

from lineproof.audit.data import Severity
from lineproof.audit.search.missing import CONTINUOUS, SINGLE, Expected, missing_checks
from lineproof.audit.search.missing_places import Where
from lineproof.record import Record
from lineproof.sheet import Sheet

from .altered import NAMES, Data, changed, demo, edited, without_entries, without_parts

ONLY_AT_OTHERS = {Where.DEEP_SPAN, Where.LAP}
"""Places that the demo calcs do not have, or that go with the check itself."""


def sentences(record: Record) -> list[str]:
    """Return what is missed, one sentence each."""
    return [finding.what for finding in missing_checks(record)]


@pytest.mark.parametrize("name", NAMES)
def test_a_complete_calc_misses_nothing(name: str) -> None:
    assert missing_checks(demo(name)) == ()


@pytest.fixture(scope="module")
def mixed() -> Record:
    """A beam with a cantilever, a support held by columns and a fixed end."""
    return record_of(**MIXED, slab_bars="2 x 10M at 300 mm")


def test_a_cantilever_and_held_ends_miss_nothing(mixed: Record) -> None:
    assert missing_checks(mixed) == ()


def test_the_simple_beam_says_itself_what_it_does_not_cover() -> None:
    assert missing_checks(gallery.record_of()) == ()


@pytest.mark.parametrize(
    ("taken", "sentence"),
    [
        ("sag-2/crack-control",
         "Crack control: checked for span 1 and span 3 only, not for span 2."),
        ("(sag|hog)-.*/crack-control",
         "Crack control: not checked anywhere; it is needed for every span."),
        ("hog-2-right/strength",
         "Moment resistance: checked at 5 places, not for support 2, right face."),
        ("shear-2-left/shear-strength",
         "Shear resistance: checked at 5 places, not for span 2 at its left support."),
        ("shear-3-right/stirrup-spacing",
         ("Spacing of the stirrups: checked at 5 places, not for shear of span 3 at its right "
          "support.")),
        ("hog-1-right/waiver",
         ("Minimum reinforcement: checked for support 2, support 3 and support 4 only, not for "
          "support 1.")),
        ("support-4/hanger-stirrups",
         ("Bearing at the support: checked for support 1, support 2 and support 3 only, not for "
          "support 4.")),
        ("deflection-2/deflection-attached",
         "Deflection after attachment: checked for span 1 and span 3 only, not for span 2."),
        ("interface-3/interface-shear",
         "Interface shear: checked for span 1 and span 2 only, not for span 3."),
        ("anchorage-end-1-bottom/bars-end-support",
         ("Bottom bars at the inner edge of the bearing: checked for support 4 only, not for "
          "support 1.")),
        ("anchorage-bottom-2-left-zero/development-zero-moment",
         ("Development of the bottom bars where the moment is zero: checked at 5 places, not for "
          "span 2 at its left support.")),
        ("anchorage-lap-2/lap-length",
         ("Length of the lap: checked for lap of top bars 20M, span 1; lap of top bars 20M, "
          "span 2; and lap of top bars 20M, span 3 only, not for lap of bottom bars 20M, "
          "supports 2, 3.")),
        ("cover/cover-fire", "Cover of the principal bars for fire: not checked."),
    ],
)  # fmt: skip
def test_a_check_taken_away_is_named_with_its_place(taken: str, sentence: str) -> None:
    assert sentence in sentences(without_entries(demo("floor-beam"), taken))


@pytest.mark.parametrize(
    "row", [row for row in CONTINUOUS if row.where not in ONLY_AT_OTHERS],
    ids=lambda row: f"{row.tests[0].key} {row.where.name}",
)  # fmt: skip
def test_every_expectation_is_missed_when_it_is_nowhere(row: Expected) -> None:
    """The edge beam has torsion and a flange; top bars that end past an inflection the other."""
    record = demo("existing-beam" if row.where == Where.TOP_END else "edge-beam")
    keys = "|".join(test.key for test in row.tests)
    bare = without_entries(record, rf".*/({keys})(-\d+)?")

    named = row.tests[0].title.replace(": ", ", ")
    found = [f for f in missing_checks(bare) if f.what.startswith(f"{named}: ")]

    assert {f.severity for f in found} >= {row.severity}
    assert {f.clause for f in found} == {row.tests[0].clause}
    assert all("cover as not covered" in f.advice for f in found)


def test_a_part_left_out_of_a_series_is_named() -> None:
    found = sentences(without_parts(demo("floor-beam"), "anchorage-lap-2"))

    assert found == ["Lap 2: left out, though later ones are there."]


def test_a_deep_web_asks_for_its_skin_bars() -> None:
    deep = changed(demo("floor-beam"), "sag-2/skin-required", holds=True)

    assert [f.clause for f in missing_checks(deep)] == ["10.6.2", "10.6.2"]


def test_a_decision_that_does_not_hold_is_no_check() -> None:
    """Shallower than span over 18 says nothing of the deflection: it must be calculated."""
    shallow = changed(demo("existing-beam"), "deflection-1/span-depth", holds=False)

    assert sentences(shallow) == [
        "Deflection after attachment: checked for span 2 only, not for span 1."
    ]


def test_a_strain_out_of_range_fails_on_its_own() -> None:
    """There is no resistance to compare with: the check of the strain fails and says so."""
    record = changed(demo("floor-beam"), "shear-2-left/strain-range", holds=False)
    bare = without_entries(record, "shear-2-left/(V_.*|s_max|shear-strength|web-crushing|bars-.*)")

    assert missing_checks(bare) == ()


@pytest.fixture(scope="module")
def gaps() -> Record:
    """No bottom bars at the middle of span 1, no top bars over support 2."""
    runs = [
        {"face": "bottom", "bars": "4-25M", "start": "-0.15 m", "end": "3.5 m"},
        {"face": "bottom", "bars": "4-25M", "start": "4.2 m", "end": "24.55 m"},
        {"face": "top", "bars": "2-25M", "start": "-0.15 m", "end": "6 m"},
        {"face": "top", "bars": "4-25M", "start": "9.5 m", "end": "24.55 m"},
    ]
    return record_of(bar_runs=runs, slab_bars="2 x 10M at 300 mm")


def test_where_no_bars_stand_the_failing_check_is_enough(gaps: Record) -> None:
    assert {"sag-1/strength", "hog-2-left/strength", "shear-1-right/strain-bars"} <= set(
        gaps.failed
    )
    assert missing_checks(gaps) == ()


@pytest.mark.parametrize(
    ("taken", "sentence"),
    [
        ("sag-2/crack-control",
         "Crack control: checked for span 1 and span 3 only, not for span 2."),
        ("hog-2-left/(strength|steel-for-moment)",
         "Moment resistance: checked at 5 places, not for support 2, left face."),
        ("sag-1/strength",
         "Moment resistance: checked for span 2 and span 3 only, not for span 1."),
        ("cover/cover-.*", "Cover of the stirrup for durability: not checked."),
    ],
)  # fmt: skip
def test_beside_a_gap_what_is_taken_away_is_named(gaps: Record, taken: str, sentence: str) -> None:
    assert sentence in sentences(without_entries(gaps, taken))


def test_what_the_record_lists_as_not_covered_is_not_missed() -> None:
    bare = without_parts(demo("floor-beam"), "deflection-.*")

    def tell(data: Data) -> None:
        data["status"]["not_covered"] += [{"check": "Deflection", "clause": "9.8"}]

    assert len(missing_checks(bare)) == 1
    assert missing_checks(edited(bare, tell)) == ()


def test_top_bars_told_say_nothing_of_the_span() -> None:
    bare = without_entries(demo("floor-beam"), "sag-2/crack-control")

    def tell(data: Data) -> None:
        row = {"check": "Crack control of the top bars at the ends", "clause": "10.6.1"}
        data["status"]["not_covered"] += [row]

    assert len(missing_checks(edited(bare, tell))) == 1


def test_a_calc_of_its_own_making_is_held_to_the_list_of_one_span() -> None:
    sheet = Sheet("B1")
    with sheet.part("flexure", "Flexure"):
        sheet.given("M_f", "180 kN.m", "factored moment")
        sheet.given("M_r", "200 kN.m", "moment resistance")
        sheet.check("M_f <= M_r", title="Moment resistance", key="moment")

    found = missing_checks(sheet.close())

    named = {row.tests[0].title for row in SINGLE if row.where == Where.BEAM}
    assert {f.what.removesuffix(": not checked.") for f in found} == named - {"Moment resistance"}
    assert Severity.CRITICAL in {f.severity for f in found}


def test_a_calc_of_a_load_alone_is_no_design() -> None:
    sheet = Sheet("C1")
    with sheet.part("curb", "Curb"):
        sheet.given("h_cb", "300 mm", "height of the curb")

    assert missing_checks(sheet.close()) == ()
