"""Summary pages of a calc that says what stands on them, and packages of several such calcs."""

from __future__ import annotations

import copy
import io
import re
from dataclasses import replace
from typing import Any

import pypdf
import pytest

from lineproof.package import Package, build_package, to_html, to_pdf
from lineproof.package.environment import _on_one_page
from lineproof.typeset import plain
from lineproof.typeset.rows import PrintedTable

from .whole_beam import whole_beam

Record = dict[str, Any]
FRONT = [
    "deliverables/elevation", "deliverables/governing", "deliverables/take-down",
    "deliverables/sketch", "deliverables/reactions", "deliverables/bars",
]  # fmt: skip
"""By rising order key, and as recorded where the key is the same."""
TITLES = [
    "Elevation, 1 : 150", "Governing moments", "Load take-down", "Loads on the beam",
    "Reactions, unfactored", "Bar schedule",
]  # fmt: skip

FIGURES = (TITLES[0], TITLES[3])


def pages(content: bytes) -> list[str]:
    return [
        " ".join(page.extract_text().split()) for page in pypdf.PdfReader(io.BytesIO(content)).pages
    ]


@pytest.fixture(scope="module")
def holding() -> Record:
    return whole_beam().close().data


@pytest.fixture(scope="module")
def failing() -> Record:
    return whole_beam("B10", holds=False).close().data


@pytest.fixture(scope="module")
def several(holding: Record, failing: Record) -> Package:
    return build_package([holding, failing])


@pytest.fixture(scope="module")
def page(several: Package) -> str:
    return to_html(several)


@pytest.fixture(scope="module")
def printed(several: Package) -> list[str]:
    return pages(to_pdf(several))


def in_order(text: str, wanted: list[str]) -> None:
    places = [text.index(piece) for piece in wanted]
    assert places == sorted(places)


def test_front_entries_come_by_their_key_then_by_their_place(holding: Record) -> None:
    (calc,) = build_package([holding]).calcs
    assert [row.id for row in calc.front] == FRONT
    assert calc.in_front == set(FRONT)
    assert (calc.loading, calc.loads, calc.section) == ((), (), None)


def test_a_calc_without_front_entries_prints_as_before(record: Record) -> None:
    (calc,) = build_package([record]).calcs
    assert calc.front == ()
    assert calc.loads
    assert calc.section is not None
    assert "Checks by part" not in to_html(build_package([record]))


def test_summary_pages_hold_them_in_order_before_the_working(holding: Record) -> None:
    text = " ".join(pages(to_pdf(build_package([holding]))))
    start = text.index("Summary, B9", text.index("Design") if "Design" in text else 0)
    # On paper figures stand at the end of a page, before which tables may go on: each in order.
    tables = [title for title in TITLES if title not in FIGURES]
    for kept in ([*FIGURES, "Working, B9"], [*tables, "Checks by part"]):
        in_order(text[text.rindex("Summary, B9") :], ["Summary, B9", *kept])
    assert start < text.rindex("Summary, B9") < text.rindex("Working, B9")
    html = to_html(build_package([holding]))
    body = html[html.index('id="sheet-summary"') :]
    in_order(body, [f'id="front/{row}"' for row in FRONT] + ["Checks by part", "Working, B9"])


def test_a_high_drawing_does_not_stand_before_the_heading_of_its_summary(holding: Record) -> None:
    """Of 195 mm: the table behind the heading has no room on the page, the drawing has."""
    made = copy.deepcopy(holding)
    (drawn,) = [e for p in made["parts"] for e in p["entries"] if e["id"] == FRONT[0]]
    drawn["figure"]["height"] = 195.0
    texts = pages(to_pdf(build_package([made])))
    first = min(i for i, text in enumerate(texts) if TITLES[0] in text and "Contents" not in text)
    assert "Summary, B9" in texts[first]


def test_a_page_of_drawings_does_not_begin_with_a_gap(holding: Record) -> None:
    """The second drawing, 100 mm high, has no room below the first of 150 mm: it heads a page.

    A page is 792 points high; its text ends 19 mm (54 points) above its foot and is 236 mm high.
    The line below a drawing at its head is then above the middle, at its foot below it.
    """
    made = copy.deepcopy(holding)
    for entry in (e for p in made["parts"] for e in p["entries"]):
        if entry["id"] in (FRONT[0], FRONT[3]):
            entry["figure"]["height"] = 150.0 if entry["id"] == FRONT[0] else 100.0
    reader = pypdf.PdfReader(io.BytesIO(to_pdf(build_package([made]))))
    low = [height(page, FIGURES[1]) for page in reader.pages]
    captions = [at for at in low if at is not None]
    assert captions
    assert captions[0] > 792 / 2


def height(page: pypdf.PageObject, wanted: str) -> float | None:
    """Return how high above the foot of a page a text stands, in points; None where it does not."""
    found: list[float] = []

    def visit(text: str, matrix: Any, text_matrix: Any, _font: Any, _size: float) -> None:
        if wanted in text:
            found.append(matrix[5] + text_matrix[5] * matrix[3])

    page.extract_text(visitor_text=visit)
    return found[0] if found else None


def test_the_working_points_to_what_stands_in_front(holding: Record) -> None:
    html = to_html(build_package([holding]))
    working = html[html.index('id="sheet-working"') :]
    assert html.count("<svg") == 2, "each figure is drawn once"
    for row in FRONT:
        assert f'<a href="#front/{row}">shown before the working</a>' in working
    text = pages(to_pdf(build_package([holding])))
    assert sum(f"Bar schedule see page {n}" in " ".join(text) for n in range(1, 10)) == 1


def test_checks_are_one_row_a_part(holding: Record, failing: Record) -> None:
    """M_f is 320, 340, 360 kN.m; M_r is 380 kN.m, or 330 kN.m in the span that fails."""
    good, bad = (build_package([r]).calcs[0] for r in (holding, failing))
    assert [(p.group, p.count, p.failed) for p in good.part_summaries] == [
        ("Flexure, span 1", 1, 0), ("Flexure, span 2", 1, 0), ("Flexure, span 3", 1, 0)
    ]  # fmt: skip
    ratios = [320 / 380, 340 / 380, 360 / 380]
    assert [p.governing.utilisation for p in good.part_summaries] == pytest.approx(ratios)
    assert [p.failed for p in bad.part_summaries] == [0, 1, 0]
    assert (good.failing, [row.group for row in bad.failing]) == ((), ["Flexure, span 2"])


def test_parts_of_one_title_have_a_row_each_and_proofs_are_told(holding: Record) -> None:
    """Three parts of one title, the last check a proof: two rows of one check, and a sentence."""
    made = copy.deepcopy(holding)
    parts = [part for part in made["parts"] if part["title"].startswith("Flexure, span")]
    for part in parts:
        part["title"] = "Flexure"
    next(e for e in parts[2]["entries"] if e["kind"] == "check")["proof"] = True
    package = build_package([made])
    (calc,) = package.calcs
    assert [(p.group, p.count) for p in calc.part_summaries] == [("Flexure", 1)] * 2
    assert (len(calc.summary), calc.proofs) == (2, 1)
    told = "One line that proves the calculation itself holds as well; it is not counted here."
    assert told in to_html(package)
    assert told in " ".join(" ".join(pages(to_pdf(package))).split())


def test_the_check_nearest_its_limit_stands_for_its_part(record: Record) -> None:
    """Of "steel yields first" and "moment resistance" the second is nearer to its limit."""
    (calc,) = build_package([record]).calcs
    part = next(p for p in calc.part_summaries if p.group == "Flexure at midspan")
    ratios = [row.utilisation or 0.0 for row in calc.summary if row.group == part.group]
    assert (part.count, part.failed, part.governing.utilisation) == (2, 0, max(ratios))


def test_a_failing_check_stands_before_everything_else(failing: Record) -> None:
    html = to_html(build_package([failing]))
    body = html[html.index('id="sheet-summary"') :]
    in_order(body, ["1 of 3 checks does not hold.", "does not hold</span>", "<figure"])
    assert "<strong>1 of 1 FAILS</strong>" in body
    assert "<strong>FAILS</strong>" in body


def test_columns_of_numbers_stand_right_also_with_fails_and_dashes(failing: Record) -> None:
    rows = {row.id: row for row in build_package([failing]).calcs[0].front}
    bars, governing = rows["deliverables/bars"].table, rows["deliverables/governing"].table
    assert bars is not None
    assert governing is not None
    assert bars.numeric == (False, False, True, True, True, True, True, True, False)
    assert governing.numeric == (False, False, False, True, True, True, True, True, False)
    assert [plain(c) for c in governing.columns][3:6] == [
        "M_f, kN·m", "A_s required, mm²", "A_s provided, mm²"
    ]  # fmt: skip
    assert governing.lines == (
        ("flexure-1/moment", "1.3"), ("flexure-2/moment", "2.3"), ("flexure-3/moment", "3.3")
    )  # fmt: skip


def test_rows_lead_to_their_lines(page: str) -> None:
    for calc in ("B9", "B10"):
        assert f'<a href="#{calc}/flexure-2/moment">2.3</a>' in page
        assert page.count(f'id="{calc}/flexure-2/moment"') == 1


def test_a_long_table_repeats_its_head_on_every_page() -> None:
    text = pages(to_pdf(build_package([whole_beam(stations=150).close().data])))
    # 150 rows of 4 mm and more need 600 mm; a page of 11 in has 233 mm for them.
    assert sum("Envelopes at stations" in page for page in text) == 1
    assert sum("x, mm" in page for page in text) >= 3


def test_a_wide_table_stays_on_the_paper(holding: Record) -> None:
    """Nine columns and the line number, 21 mm from the left and 15 mm from the right edge."""
    content = to_pdf(build_package([holding]))
    right = []

    def note(text: str, _: Any, matrix: Any, font: Any, size: float) -> None:
        if text.strip() and font is not None:
            right.append(matrix[4] + 0.35 * size * len(text.strip()))

    for page in pypdf.PdfReader(io.BytesIO(content)).pages:
        page.extract_text(visitor_text=note)
    assert max(right) <= 612  # 8.5 in at 72 points


def test_the_first_drawing_stands_below_the_heading_of_the_summary(holding: Record) -> None:
    """The table that follows it stands below it, where a drawing that floats would follow it."""
    heights: dict[str, float] = {}

    def note(text: str, onto: Any, matrix: Any, *_font: Any) -> None:
        heights.setdefault(text.strip(), onto[5] + onto[3] * matrix[5])

    reader = pypdf.PdfReader(io.BytesIO(to_pdf(build_package([holding]))))
    page = next(p for p in reader.pages if "Elevation, 1 : 150" in p.extract_text())
    page.extract_text(visitor_text=note)
    assert heights["Elevation, 1 : 150"] > heights["Governing moments"]


def test_every_anchor_of_several_calcs_is_one(page: str) -> None:
    ids = re.findall(r'\sid="([^"]*)"', page)
    assert len(ids) == len(set(ids))
    assert set(re.findall(r'href="#([^"]*)"', page)) <= set(ids)


def test_ids_that_differ_in_marks_only_have_anchors_of_their_own(holding: Record) -> None:
    others = [holding | {"calc": {"id": name, "title": ""}} for name in ("B/9", "B 9", "B-9")]
    package = build_package([holding, *others])
    assert [calc.anchor for calc in package.calcs] == ["B9/", "B-9/", "B-9.2/", "B-9.3/"]
    ids = re.findall(r'\sid="([^"]*)"', to_html(package))
    assert len(ids) == len(set(ids))


def test_several_calcs_come_in_order(printed: list[str], page: str) -> None:
    wanted = [
        "Summary, B9", "Summary, B10", "Working, B9", "Working, B10", "Notation",
        "Values to confirm", "Review record", "Cautions and what is not covered",
    ]  # fmt: skip
    in_order(" ".join(printed[2:]), wanted)
    in_order(page[page.index("</nav>") :], wanted)


def test_the_cover_lists_calcs_with_status_and_digest(
    printed: list[str], page: str, holding: Record, failing: Record
) -> None:
    cover = printed[0]
    assert "1 check does not hold: B10 2.3 Moment resistance" in cover
    assert f"B9 Floor beam B9, three spans All 3 checks hold. {holding['digest']}" in cover
    assert (
        f"B10 Floor beam B10, three spans 1 of 3 checks does not hold. {failing['digest']}" in cover
    )
    head = page[page.index("<header>") : page.index("</header>")]
    assert head.count(holding["digest"]) == head.count(failing["digest"]) == 1


def test_what_all_calcs_say_is_said_once(several: Package, printed: list[str], page: str) -> None:
    text = " ".join(printed)
    assert [box.calcs for box in several.scopes] == ["B9, B10"]
    assert text.count("preliminary: form of the package only") == 1
    assert text.count("1 clause is taken from memory of the standards") == 1
    for once in ("Gravity beams only", "These stand as remembered", "factored moment kN"):
        assert text.count(once) == 1
        assert once == "factored moment kN" or page.count(once) == 1


def test_what_one_calc_alone_does_not_cover_stands_behind_what_none_covers(
    holding: Record, failing: Record
) -> None:
    """The lists differ in one check: no calc gets a box of its own for that."""
    drift, torsion = ({"check": c, "clause": n} for c, n in (("Drift", "21.11"), ("Torsion", "")))
    first = holding | {"status": holding["status"] | {"not_covered": [torsion, drift]}}
    second = failing | {"status": failing["status"] | {"not_covered": [drift]}}
    package = build_package([first, second])
    (box,) = package.scopes
    assert box.calcs == "B9, B10"
    assert box.not_covered == "Not covered yet: Drift (21.11). Not covered yet in B9 only: Torsion."
    assert [each.calcs for each in package.not_covered] == ["B9, B10", "B9"]


def test_of_several_calcs_the_cover_names_three_failures_each_and_keeps_its_seal(
    several: Package,
) -> None:
    holds, fails = several.calcs
    many = replace(several, calcs=(holds, replace(fails, failures=fails.failures * 14)))
    cover = pages(to_pdf(many))[0]
    assert cover.count("B10 2.3 Moment resistance") == 3
    for said in ("14 checks do not hold:", "and 11 more of B10", "Seal of the", "not valid until"):
        assert said in cover


def test_values_to_confirm_are_merged_by_clause(several: Package, printed: list[str]) -> None:
    """Lines that repeat one with the same resistance are not named again."""
    (item,) = several.to_confirm
    assert (item.clause, item.what, item.confirmed) == ("10.1.7", "Resistance", "")
    assert item.calcs == (
        ("B9", (("B9/flexure-1/M_r", "1.2"),)),
        ("B10", tuple((f"B10/flexure-{n}/M_r", f"{n}.2") for n in (1, 2))),
    )
    assert "10.1.7 Resistance B9: 1.2 B10: 1.2, 2.2" in " ".join(printed)


def test_a_clause_is_confirmed_when_it_is_for_every_calc(holding: Record, failing: Record) -> None:
    signed = holding | {"confirm": [holding["confirm"][0] | {"confirmed": "A.V., 2026-11-18"}]}
    (half,) = build_package([signed, failing]).to_confirm
    other = failing | {"confirm": [failing["confirm"][0] | {"confirmed": "A.V., 2026-11-18"}]}
    (whole,) = build_package([signed, other]).to_confirm
    assert (half.confirmed, whole.confirmed) == ("", "A.V., 2026-11-18")


def test_running_heads_name_the_calc_of_the_page(printed: list[str]) -> None:
    for calc, other in (("B9", "B10"), ("B10", "B9")):
        own = [p for p in printed[2:] if f"Working, {calc} " in p or f"Summary, {calc} " in p]
        assert len(own) == 2
        for text in own:
            head = text[: text.index(",")]
            assert re.search(rf"\b{calc}\b", head)
            assert not re.search(rf"\b{other}\b", head)
    assert "B9, B10" in printed[-1][:60]
    assert "Clause Working Result" not in printed[-2][:80]


def test_a_row_that_says_much_is_still_printed_whole() -> None:
    sheet = whole_beam()
    words = [f"word{n}" for n in range(900)]
    with sheet.part("long", "Long"):
        sheet.table("t", ["a", "b"], [["1", " ".join(words)]], title="T", front=9)
    text = " ".join(pages(to_pdf(build_package([sheet.close().data]))))
    assert all(re.search(rf"\b{word}\b", text) for word in words)


@pytest.mark.parametrize(("letters", "whole"), [(10, True), (100, False)])
def test_only_a_table_that_has_room_on_a_page_stands_whole(letters: int, whole: bool) -> None:  # noqa: FBT001
    """24 rows of one line have; with cells of five lines, 120 of them, they have not."""
    table = PrintedTable((), (("1", "x" * letters),) * 24, (False, False))

    assert _on_one_page(table) is whole
