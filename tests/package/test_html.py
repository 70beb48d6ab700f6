"""The HTML page: one file, well formed, nothing loaded, nothing run."""

from __future__ import annotations

import base64
import hashlib
import json
import re
import xml.etree.ElementTree as ET
from itertools import pairwise
from typing import Any
from urllib.parse import unquote

import pytest

from lineproof.package import build_package, records_in_html, to_html
from lineproof.resources import folder
from lineproof.sheet import Sheet

Record = dict[str, Any]


def tree_of(page: str) -> ET.Element:
    """Parse a page as XML, which is stricter than HTML."""
    body = page.removeprefix("<!DOCTYPE html>")
    return ET.fromstring(body)  # noqa: S314 - our own page


@pytest.fixture(scope="module")
def page(whole_record: Record) -> str:
    """Return the page of the beam whose checks hold."""
    return to_html(build_package([whole_record]))


def test_page_is_well_formed_and_the_same_every_time(page: str, whole_record: Record) -> None:
    """Every element is closed; printing again gives the same text."""
    assert tree_of(page).tag == "html"
    assert page == to_html(build_package([json.loads(json.dumps(whole_record))]))


def test_every_class_named_has_a_rule() -> None:
    """In a style sheet, or in the scripts of the review; a class without one shows nothing."""
    templates = folder("templates")
    pages = [*templates.glob("**/*.html.j2")]
    named = {
        name
        for path in pages
        for words in re.findall(r'class="([^"{]+)["{]', path.read_text(encoding="utf-8"))
        for name in words.split()
    }
    rules = "".join(
        path.read_text(encoding="utf-8")
        for path in [*templates.glob("**/*.css"), *templates.glob("review/*.js")]
    )
    assert len(pages) > 8
    assert {"entry", "working", "rv-row", "failed"} <= named
    assert [n for n in sorted(named) if not re.search(rf"\.{re.escape(n)}(?![\w-])", rules)] == []


def test_room_is_kept_for_a_column_of_words_and_for_no_ratio() -> None:
    """The column without a width takes the rest; a ratio beside FAILS needs none of it."""
    sheet = Sheet("B1", "Words")
    with sheet.part("p", "P"):
        sheet.given("a", "1 kN", "force")
        for key, last in (("words", "What would cure a failing check"), ("ratios", "Ratio")):
            rows = [["span 1", "1.41 FAILS"], ["span 2", "none"]]
            sheet.table(key, ["Place", last], rows, title=key, widths=(30.0, 0.0))
    heads = re.findall(r'<th scope="col" class="rest">([^<]*)', to_html(build_package([
        sheet.close().data
    ])))  # fmt: skip
    assert heads == ["What would cure a failing check"]


def test_page_loads_nothing(page: str) -> None:
    """No address outside the file, no script that runs but our own module, fonts as data."""
    root = tree_of(page)
    links = [
        value
        for element in root.iter()
        for name, value in element.attrib.items()
        if name.rpartition("}")[2] in ("href", "src", "action", "data", "poster", "srcset")
    ]

    assert all(link.startswith("#") for link in links)
    assert [s.get("type") for s in root.iter("script")] == [
        "application/vnd.lineproof.record+json",
        "module",
    ]
    addresses = set(re.findall(r"https?://[^\"' )<]+", page))
    assert addresses <= {"http://www.w3.org/2000/svg"}
    assert all(url.startswith("data:font/woff2") for url in re.findall(r"url\(([^)]{0,30})", page))
    assert "@import" not in page


def test_the_policy_of_the_page_allows_its_own_module_only(page: str) -> None:
    """By its hash, as a browser takes it: over the text of the element, to the last sign."""
    (policy,) = re.findall(r'Content-Security-Policy" content="([^"]+)"', page)
    (module,) = re.findall(r'<script type="module">(.*?)</script>', page, re.DOTALL)
    told = base64.b64encode(hashlib.sha256(module.encode()).digest()).decode()

    assert policy.split("; ") == [
        "default-src 'none'",
        "style-src 'unsafe-inline'",
        "font-src data:",
        "img-src data:",
        f"script-src 'sha256-{told}'",
    ]
    assert "import" not in re.findall(r"\b\w+\b", module)


def test_record_inside_reads_back_equal(page: str, whole_record: Record) -> None:
    """The script element is data and cannot end early."""
    assert records_in_html(page) == [whole_record]


def test_every_entry_has_an_anchor_and_every_link_a_target(page: str, whole_record: Record) -> None:
    """Arguments link to the line they come from."""
    root = tree_of(page)
    ids = [element.get("id") for element in root.iter() if element.get("id")]
    targets = {unquote(a.get("href", "")[1:]) for a in root.iter("a")}
    entries = [entry for part in whole_record["parts"] for entry in part["entries"]]

    assert len(ids) == len(set(ids))
    assert {entry["id"] for entry in entries} <= set(ids)
    assert targets <= set(ids)
    used = {source for entry in entries for source in entry.get("args", {}).values()}
    assert used <= targets


def test_page_is_accessible(page: str) -> None:
    """Language, title, landmarks, table headings, alternative texts, headings in order."""
    root = tree_of(page)

    assert root.get("lang") == "en-CA"
    assert root.findtext("head/title") == "Gallery floor beam B7"
    assert [len(list(root.iter(tag))) for tag in ("header", "nav", "main", "footer")] == [
        1,
        1,
        1,
        1,
    ]
    for table in root.iter("table"):
        assert all(th.get("scope") in ("col", "colgroup") for th in table.iter("th"))
        assert list(table.iter("th"))
    pictures = [e for e in root.iter() if e.tag.endswith("svg")]
    assert pictures
    assert all(p.get("role") == "img" and p.get("aria-label") for p in pictures)
    levels = [int(e.tag[1]) for e in root.iter() if re.fullmatch(r"h[1-6]", e.tag)]
    assert levels[0] == 1
    assert all(later <= earlier + 1 for earlier, later in pairwise(levels))


def test_only_core_mathml(page: str) -> None:
    """No element outside MathML Core."""
    core = {"math", "mrow", "mi", "mn", "mo", "mtext", "mspace", "mfrac", "msqrt", "mroot", "msub",
            "msup", "msubsup"}  # fmt: skip

    assert set(re.findall(r"<(m[a-z]+)", page)) - {"meta", "main"} <= core


def test_failing_check_stands_before_the_contents(failing_record: Record) -> None:
    """The loud line is part of the cover."""
    page = to_html(build_package([failing_record]))
    cover = page[: page.index("<nav")]

    assert "1 check does not hold" in cover
    assert 'href="#flexure/moment"' in cover


@pytest.mark.parametrize(
    "title",
    [
        "<script>alert(1)</script>",
        "#let x = 1 $ \\ & \" ' -->",
        "</style><!-- ]]> {{ 7*7 }}",
        "</script><script>",
        "x" * 10_000,
    ],
)
def test_hostile_titles_come_out_literally(record: Record, title: str) -> None:
    """In headings, in the running head of the print style, in the record."""
    record["calc"]["title"] = title
    record["project"]["project"]["name"] = title
    record["parts"][1]["entries"][0]["title"] = title
    record["project"]["revisions"] = [{"letter": title}]
    page = to_html(build_package([record]))
    root = tree_of(page)

    heading = root.findtext("body/header/h1") or ""
    assert title.startswith(heading.removesuffix("…"))
    assert len(heading) <= 300
    assert title in "".join(root.itertext())
    assert len(list(root.iter("script"))) == 2
    assert records_in_html(page) == [record]


def test_characters_without_a_glyph_are_shown_by_code(record: Record) -> None:
    """The same replacement as in the PDF, with the note."""
    record["calc"]["title"] = "Hall \U0001f600\x00\u202e"
    root = tree_of(to_html(build_package([record])))
    text = "".join(root.find("body/header").itertext())  # type: ignore[union-attr]

    assert "Hall <U+1F600><U+0000><U+202E>" in text
    assert "shown by their code" in "".join(root.itertext())


def test_page_stays_light(page: str) -> None:
    """Fonts weigh less than 700 kB."""
    fonts = re.findall(r"base64,([A-Za-z0-9+/=]+)", page)

    assert len(fonts) == 13
    assert sum(map(len, fonts)) < 700_000
