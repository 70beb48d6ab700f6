"""HTML packages verified: as issued, saved by a browser, forged, reviewed, stripped."""

from __future__ import annotations

import re
from html.parser import HTMLParser

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from tests.audit import verifying as by

from lineproof.audit.verify.html_page import OPENER_SAYS
from lineproof.audit.verify.verification import Outcome, Source, Verification, Where, verify
from lineproof.errors import UserError

_BODY = re.compile(r"<main>.*</main>", re.DOTALL)


def checked(page: str, *against: Source) -> Verification:
    return verify(page.encode(), "beam.html", against)


def digits() -> list[int]:
    """Return the place of every digit of the text between the cover and the record."""
    main = _BODY.search(by.html())
    assert main is not None
    found = []
    for text in re.finditer(r">([^<>]+)<", by.html()):
        if main.start() < text.start() < main.end():
            found += [text.start(1) + n for n, letter in enumerate(text[1]) if letter.isdigit()]
    return found


def test_a_page_as_issued_is_intact() -> None:
    found = checked(by.html())

    assert (found.outcome, found.alterations, found.outside) == (Outcome.INTACT, (), ())


def test_prose_is_told_apart_and_a_notebook_proves_it() -> None:
    issued = by.html(prose=True)
    forged = issued.replace("7 of 9 bars", "8 of 9 bars")
    against = Source(by.record(), by.PROSE)

    assert [o.after for o in checked(issued).outside] == ["", "1.15"]
    assert checked(forged).outcome is Outcome.INTACT
    assert checked(issued, against).outside == ()
    assert checked(forged, against).outcome is Outcome.ALTERED


@settings(max_examples=40, deadline=None, suppress_health_check=[HealthCheck.too_slow])
@given(data=st.data())
def test_any_other_digit_anywhere_in_the_print_is_found(data: st.DataObject) -> None:
    place = data.draw(st.sampled_from(digits()))
    page = by.html()
    digit = data.draw(st.sampled_from(sorted(set("0123456789") - {page[place]})))

    found = checked(page[:place] + digit + page[place + 1 :])

    assert found.outcome is Outcome.ALTERED
    assert found.alterations[0].found != found.alterations[0].recorded


def test_an_altered_number_names_its_line() -> None:
    """The fifteenth given is l = 6 m, line 1.15."""
    row = by.html().index('id="given/l"')
    place = by.html().index(">6<", row) + 1

    found = checked(by.html()[:place] + "7" + by.html()[place + 1 :])

    assert [(a.line, a.id, a.where) for a in found.alterations] == [
        ("1.15", "given/l", Where.PRINT)
    ]
    assert found.alterations[0].sentence.startswith("H1, line 1.15, given/l: the print differs")


@pytest.mark.parametrize(
    ("old", "new"),
    [
        ("</main>", '<div class="entry"><div class="result">M = 999</div></div></main>'),
        ("</head>", "<style>.result { visibility: hidden }</style></head>"),
        ("</body>", "<script>document.title = 'x'</script></body>"),
        ('id="given/l"', 'id="given/l" style="display: none"'),
        ('id="given/l"', 'id="given/l" hidden'),
        ("<msup>", "<msub>"),
        ("<main>", '<main><img src="http://example.org/999.png" alt="" />'),
        ('id="given/l"', 'id="given/l" onclick="this.textContent = 9"'),
    ],
    ids=["row added", "style", "script", "hidden by style", "hidden", "power", "picture", "click"],
)
def test_what_shows_something_else_than_the_record_is_found(old: str, new: str) -> None:
    page = (
        by.html()
        .replace(old, new, 1)
        .replace("</msup>", "</msub>" if "msub" in new else "</msup>", 1)
    )

    assert page != by.html()
    assert checked(page).outcome is Outcome.ALTERED


LINE = 'id="given/l"'
OVER = "position: absolute; top: 9em; background: white"


@pytest.mark.parametrize(
    ("old", "new"),
    [
        ("<body>", '<body style="display: none">'),
        ("<body>", '<body onload="document.body.textContent = 9">'),
        ("<html ", "<html hidden "),
        ("</head>", '<meta http-equiv="refresh" content="0; url=http://example.org/" /></head>'),
        ("</head>", '<meta charset="utf-8" http-equiv="refresh" content="0; url=x" /></head>'),
        ('<meta charset="utf-8" />', '<meta charset="iso-2022-jp" />'),
        ('<meta http-equiv="Content-Security-Policy"', '<meta name="x"'),
        (LINE, f'{LINE} style="display: none" style=""'),
        (LINE, f"{LINE} popover"),
        (f"{LINE}>", f'{LINE}><template shadowrootmode="open"><b>M_r = 999</b></template>'),
        ("<body>", f'<body><div id="rv" style="{OVER}">M_r = 999 kN.m</div>'),
        ("<body>", '<body><div id="rv"><style>.result { visibility: hidden }</style></div>'),
        ("<body>", '<body><p id="rv"><img src="data:image/png;base64,AA" /></p>'),
        ("</main>", "<!--><p>M_r = 999</p>--></main>"),
        ("</main>", "<!-- a --!><p>M_r = 999</p> --></main>"),
        ("</main>", "<![CDATA[><p>M_r = 999</p>]]></main>"),
        (f'class="entry value" {LINE}', f'class="entry value rv-file" {LINE}'),
        ("<td>B1</td>", "<td></td>"),
    ],
    ids=[
        "page hidden by style", "page changed by a script", "page hidden", "led elsewhere",
        "led elsewhere beside utf-8", "other coding", "scripts let in", "the first of two styles",
        "pop-over", "shadow", "overlay as a tool", "style in a tool", "picture in a tool",
        "empty comment", "comment ended early", "marked section", "class of a tool", "cell emptied",
    ],
)  # fmt: skip
def test_what_a_browser_shows_and_a_simpler_reader_does_not_is_found(old: str, new: str) -> None:
    assert old in by.html()
    assert checked(by.html().replace(old, new, 1)).outcome is Outcome.ALTERED


DATA = '<script type="application/vnd.lineproof.review+json">'


def around(before: str, after: str) -> str:
    """Return the page with the row of l = 6 m between two texts."""
    page, start = by.html(), by.html().index(f'<div class="entry value" {LINE}')
    end = page.index('<div class="entry', start + 1)
    return f"{page[:start]}{before}{page[start:end]}{after}{page[end:]}"


@pytest.mark.parametrize(
    ("before", "after"),
    [
        (f"{DATA}<!--<script ></script>", "<!-- --></script>"),
        (f"{DATA}</ script >", "</script>"),
        (f"{DATA}</script x><p>M_r = 999</p></script>", ""),
        ("<!-- a -- >", "<!-- -->"),
    ],
    ids=["script within a script", "end with a space", "end with a word", "comment with a space"],
)
def test_a_row_that_ends_of_scripts_and_comments_hide_from_a_browser_is_found(
    before: str, after: str
) -> None:
    """HTML, 13.2.5: ``</ script`` ends no script, ``</script x`` does; ``-- >`` ends no comment."""
    assert checked(around(before, after)).outcome is Outcome.ALTERED


@pytest.mark.parametrize(
    ("old", "new"),
    [
        ("<body>", '<body><button class="rv-open">Sealed. M_r = 999</button>'),
        ("<body>", '<body><aside id="rv" hidden></b>'),
        ("<body>", '<body><aside id="rv" hidden><frameset></frameset></aside>'),
        ("<body>", '<body><aside id="rv" hidden><body hidden></body></aside>'),
        ('aria-controls="rv">Review<', f'style="{OVER}" aria-controls="rv">M_r = 999<'),
        ("<style>", '<style media="none">'),
        ('<script type="module">', '<script type="text/plain">'),
        (f'class="entry value" {LINE}', f'class="entry value"\xa0{LINE}'),
        ("</main>", "</main x>"),
        ('href="#', 'href="https://example.org/#'),
    ],
    ids=[
        "words on the button", "tool never closed", "frames in a tool", "page hidden by a tool",
        "words of the tools", "style for no screen", "script that does not run", "hard space",
        "end with a word", "link to another page",
    ],
)  # fmt: skip
def test_what_the_tools_and_odd_tags_do_to_the_page_is_found(old: str, new: str) -> None:
    assert old in by.html()
    assert checked(by.html().replace(old, new, 1)).outcome is Outcome.ALTERED


def test_an_element_closed_by_a_slash_stays_open_in_a_browser() -> None:
    """HTML, 13.2.6: the slash of ``<td/>`` means nothing, what follows stands inside it."""
    page = re.sub(r"<(span|div|td)( [^<>]*)?></\1>", r"<\1\2/>", by.html(), count=1)

    assert page != by.html()
    assert checked(page).outcome is Outcome.ALTERED


def test_the_words_of_the_button_are_those_of_the_tools() -> None:
    button = re.search(r'<button [^<>]*class="rv-open"[^<>]*>([^<>]*)</button>', by.html())
    assert button is not None
    assert button[1] == OPENER_SAYS


def test_a_line_wrapped_in_a_title_which_no_browser_shows_is_found() -> None:
    page, start = by.html(), by.html().index(f'<div class="entry value" {LINE}')
    end = page.index('<div class="entry', start + 1)
    hidden = f"{page[:start]}<title>{page[start:end]}</title>{page[end:]}"

    assert checked(hidden).outcome is Outcome.ALTERED


def test_a_text_moved_to_another_place_among_the_same_tags_is_found() -> None:
    """10^6 as "10 6", and a number under the heading of another column: texts and tags are kept."""
    page = by.html()
    power = page.replace("<mn>10</mn><mn>6</mn>", "<mn>10 6</mn><mn></mn>", 1)
    cells = page.replace("<td>B1</td><td>4-20M</td>", "<td></td><td>B1 4-20M</td>", 1)

    assert page not in (power, cells)
    assert checked(power).outcome is checked(cells).outcome is Outcome.ALTERED


@pytest.mark.parametrize("attribute", [f'style="{OVER}"', 'class="result"', 'id="given/b"'])
def test_prose_that_lies_over_the_working_or_looks_like_it_is_found(attribute: str) -> None:
    page = by.html(prose=True).replace(
        '<div class="prose">', f'<div class="prose"><p {attribute}>9</p>', 1
    )
    assert checked(page).outcome is Outcome.ALTERED
    plain = by.html(prose=True).replace('<div class="prose">', '<div class="prose"><p>9</p>', 1)
    assert checked(plain).outcome is Outcome.INTACT  # told as text that the record does not prove


def test_a_page_saved_with_the_tools_open_or_lines_hidden_says_so() -> None:
    """A browser saves what the review tools have added to the page, filters too."""
    added = '<aside id="rv" class="rv"><p>1 of 9 lines seen</p></aside></body>'
    saved = by.html().replace("</body>", added).replace("<html ", '<html class="rv-on rv-some" ', 1)
    saved = saved.replace(
        'class="entry value" id="given/l"', 'class="entry value rv-here" id="given/l"'
    )
    found = checked(saved)

    assert found.outcome is Outcome.HANDLED
    assert [said.partition(" ")[0] for said in found.remarks] == ["the", "saved"]


def test_rows_in_another_order_are_found() -> None:
    page = by.html()
    first, second, third = (
        page.index(f'<div class="entry value" id="given/{s}"') for s in ("b", "h", "c_c")
    )
    swapped = page[:first] + page[second:third] + page[first:second] + page[third:]

    assert checked(swapped).outcome is Outcome.ALTERED


def test_a_mark_of_the_review_beside_a_line_is_told_as_outside_the_record() -> None:
    page = by.html().replace('id="given/l"', 'id="given/l" data-mark="✓ accepted"', 1)

    found = checked(page)

    assert found.outcome is Outcome.INTACT
    assert [outside.text for outside in found.outside] == ["✓ accepted"]


class Saved(HTMLParser):
    """Writes a page as a browser saves it: other spaces, no slashes, whole addresses."""

    def __init__(self) -> None:
        super().__init__(convert_charrefs=False)
        self.pieces: list[str] = ["<!-- saved from url=(0014)about:internet -->\n"]
        self.raw = False

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.raw = tag in ("style", "script")
        self.pieces.append(self._tag(tag, attrs))

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.pieces.append(self._tag(tag, attrs))
        if tag not in ("br", "meta", "input", "img"):
            self.pieces.append(f"</{tag}>")

    @staticmethod
    def _tag(tag: str, attrs: list[tuple[str, str | None]]) -> str:
        told = [
            f'{name}="file:///saved/beam.html{value}"'
            if name == "href" and (value or "").startswith("#")
            else f'{name}="{(value or "").replace("&", "&amp;").replace(chr(34), "&quot;")}"'
            for name, value in attrs
        ]
        return f"<{' '.join([tag, *told])}>"

    def handle_endtag(self, tag: str) -> None:
        self.raw = False
        self.pieces.append(f"</{tag}>")

    def handle_data(self, data: str) -> None:
        self.pieces.append(data if self.raw else data.replace("\n", "\n   "))

    def handle_entityref(self, name: str) -> None:
        self.pieces.append(f"&{name};")

    def handle_charref(self, name: str) -> None:
        self.pieces.append(f"&#{name};")


def test_a_page_saved_by_a_browser_is_still_intact_and_a_forged_one_is_not() -> None:
    saver = Saved()
    saver.feed(by.html(prose=True))
    page = "".join(saver.pieces)
    place = page.index(">6<", page.index('id="given/l"')) + 1

    assert page != by.html(prose=True)
    assert checked(page).outcome is Outcome.INTACT
    assert checked(page[:place] + "8" + page[place + 1 :]).outcome is Outcome.ALTERED


def test_a_page_without_its_record_is_stripped_and_compared_with_one_given() -> None:
    stripped = re.sub(
        r'<script type="application/vnd\.lineproof\.record.*?</script>', "", by.html()
    )
    against = Source(by.record())

    assert checked(stripped).outcome is Outcome.STRIPPED
    assert checked(stripped, against).alterations == ()
    assert checked(stripped, against).proofs[0].digest == by.record().digest
    assert checked(stripped.replace(">4<", ">5<", 1), against).alterations != ()


def test_a_page_with_prose_and_without_its_record_is_stripped_too() -> None:
    """As issued from a notebook: prose stands among the lines, and no record names its place."""
    start = by.html(prose=True).index('<script type="application/vnd.lineproof.record+json"')
    end = by.html(prose=True).index("</script>", start) + len("</script>")
    stripped = by.html(prose=True)[:start] + by.html(prose=True)[end:]

    assert checked(stripped).outcome is Outcome.STRIPPED
    assert [outside.after for outside in checked(stripped).outside] == ["", ""]
    assert checked(stripped, Source(by.record(), by.PROSE)).alterations == ()


def test_a_page_of_others_is_not_ours() -> None:
    assert checked("<html><body>M = 551 kN.m</body></html>").outcome is Outcome.NOT_OURS


def test_a_page_whose_end_is_missing_is_not_called_one_of_others() -> None:
    page = by.html()
    with pytest.raises(UserError, match="cut off, its end is missing; give the whole file"):
        checked(page[: page.index("</main>")])


def test_a_record_cut_off_is_a_message() -> None:
    with pytest.raises(UserError, match="cut short"):
        checked(by.html()[: by.html().index('"parts"')])


def test_text_that_is_not_utf_8_is_a_message() -> None:
    with pytest.raises(UserError, match="neither a PDF nor UTF-8 text"):
        verify(b"\xff\xfe\x00<", "beam.html")
