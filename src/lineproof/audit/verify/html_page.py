"""An HTML page read for verifying: what stands under each anchor, as a browser shows it.

What a browser shows is more than texts: attributes of the page itself, the place of a text among
its tags, what another parser takes for a comment. Only what the review tools write into a page
while it is read is left out, and said.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from html.parser import HTMLParser

from lineproof.audit.verify.html_written import Written, odd_raw
from lineproof.package.reviewed import REVIEW_MIME
from lineproof.record import MIME

_VOID = frozenset({"br", "hr", "img", "input", "link", "meta", "area", "base", "col", "embed",
                   "source", "track", "wbr"})  # fmt: skip
_PLAIN = frozenset({"html", "head", "body"})
_ADDRESSES = frozenset({"href", "src", "xlink:href"})
_PROSE = "prose"
_BESIDE = ("data-mark", "data-trace")
_UNSEEN = frozenset({"tabindex", "xmlns", "xmlns:xlink"})
_NOTHING_IF_EMPTY = frozenset({"class", "style", "alt"})
_OF_TOOLS = frozenset({"rv-here", "rv-shown"})
"""Classes that the review tools give a line: the one being looked at, those that a filter shows."""
_TOOLS_OPEN, _FILTERED = "rv-on", "rv-some"
"""Classes that the tools give the page: they are open, and they hide the lines not asked for."""
_HARMFUL = frozenset({"script", "style", "template", "iframe", "object", "embed", "img", "svg",
                      "link", "base"})  # fmt: skip
_TOOL_TAGS = frozenset({"a", "aside", "button", "dd", "details", "div", "dl", "dt", "h2", "h3",
                        "input", "label", "li", "ol", "option", "p", "progress", "section",
                        "select", "small", "span", "strong", "summary", "textarea",
                        "ul"})  # fmt: skip
"""All that the review tools are made of; what else stands in them acts on the page around them."""
_OPENER = "rv-open"
OPENER_SAYS = "Review"
"""The words of the button that opens the review tools."""
_LAID = frozenset({"style", "class", "id", "hidden", "popover", "inert"})
_OTHERWISE = "what a browser shows and another program takes for a comment"
_ODD = "written so that a browser shows something else than another program reads"
OPEN = "the review tools stand open in the file as saved; what they show is not in the record"
FILTERED = "saved while a filter of the review tools hid lines; open it and choose all lines"


@dataclass
class Block:
    """What stands under one anchor: its texts, and its tags with all that styles or draws them."""

    anchor: str
    texts: list[str] = field(default_factory=list)
    drawn: list[str] = field(default_factory=list)

    @property
    def text(self) -> str:
        """The texts, one space between them."""
        return " ".join(self.texts)

    def add_text(self, place: str, text: str) -> None:
        """Note that a text stands here among the tags, in which element."""
        start = f"text in {place}: "
        if self.drawn and self.drawn[-1].startswith(start):
            self.drawn[-1] += f" {text}"
        else:
            self.drawn.append(f"{start}{text}")


@dataclass
class Page:
    """A page read: its blocks by anchor in order, prose, styles, scripts, texts of reviews.

    ``beside`` are the words that the review tools show beside lines, ``remarks`` say what else
    they have done. ``leads`` are the pages to which its links lead, "" for this one.
    """

    blocks: dict[str, Block] = field(default_factory=dict)
    prose: list[Block] = field(default_factory=list)
    styles: list[str] = field(default_factory=list)
    scripts: list[str] = field(default_factory=list)
    reviews: list[str] = field(default_factory=list)
    beside: list[str] = field(default_factory=list)
    leads: set[str] = field(default_factory=set)
    remarks: list[str] = field(default_factory=list)

    def remark(self, told: str) -> None:
        """Note what was done to the page by the tools in it, once."""
        if told not in self.remarks:
            self.remarks.append(told)


def read_page(text: str, *, with_prose: bool = False) -> Page:
    """Read a page; ``with_prose`` takes prose for a part of the page like any other."""
    reader = _Reader(Written(text), with_prose=with_prose)
    reader.feed(text)
    reader.close()
    return reader.page


class _Reader(HTMLParser):
    """Reads a page into blocks; an element belongs to the nearest anchor above it."""

    def __init__(self, written: Written, *, with_prose: bool) -> None:
        super().__init__(convert_charrefs=True)
        self.written = written
        self.page = Page()
        self.with_prose = with_prose
        self.open: list[tuple[str, Block]] = []
        self.raw: list[str] | None = None
        self.passed: list[str] = []
        self.in_opener = False

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        """Note an element under its anchor."""
        self._look_at_start(closed=False)
        self._start(tag, attrs)

    def _start(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        # Of two attributes of one name a browser takes the first.
        named = {name: value or "" for name, value in reversed(attrs)}
        if self.passed or self._is_tool(tag, named):
            self._pass(tag, named)
        elif tag in ("style", "script"):
            self._raw(tag, named)
        else:
            block = self._block(named)
            if tag == "a" and "#" in named.get("href", ""):
                self.page.leads.add(named["href"].rpartition("#")[0])
            self.page.beside += [named.pop(name) for name in _BESIDE if name in named]
            if tag == "html":
                self._page(named)
            drawn = _drawn(tag, named)
            if drawn:
                block.drawn.append(drawn)
            if any(block is prose for prose in self.page.prose):
                self._in_prose(tag, named, block.anchor)
            if tag not in _VOID:
                self.open.append((tag, block))

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        """Note an element without content."""
        self._look_at_start(closed=tag not in _VOID)
        self._start(tag, attrs)
        if tag not in _VOID:
            self._end(tag)

    def _look_at_start(self, *, closed: bool) -> None:
        said = self.get_starttag_text() or ""
        among = tuple(tag for tag, _ in self.open)
        if self.written.odd_start(said, closed=closed, among=among):
            self._foreign(said, _ODD)

    def handle_endtag(self, tag: str) -> None:
        """Close an element, and what was left open inside it."""
        if self.written.odd_end(tag, self.getpos()) or (self.raw and odd_raw(self.raw[-1])):
            self._foreign(tag, _ODD)
        self._end(tag)

    def _end(self, tag: str) -> None:
        self.raw = None
        if self.passed:
            if tag not in _VOID and self.passed.pop() != tag:
                # A browser passes over it and goes on inside, where all that follows may be hidden.
                self._in_tools(f"an end of {tag} that has no beginning")
        elif any(tag == opened for opened, _ in self.open):
            while self.open.pop()[0] != tag:
                pass

    def handle_data(self, data: str) -> None:
        """Note a text."""
        text = " ".join(data.split())
        if self.passed:
            if self.in_opener and text not in ("", OPENER_SAYS):
                self._in_tools(f"{_OPENER} says {text}")
            return
        if self.raw is not None:
            self.raw[-1] += data
            return
        if text:
            block = self._current()
            block.texts.append(text)
            place = "/".join(tag for tag, _ in self.open if tag not in _PLAIN)
            block.add_text(place, text)

    def handle_comment(self, data: str) -> None:
        """Note what is a comment here and ends earlier for a browser."""
        # In a field for text a browser shows it, and ends the field where it says so.
        if self.passed or self.written.odd_comment(data, self.getpos()):
            self._foreign(data)

    def unknown_decl(self, data: str) -> None:
        """Note a marked section, of which a browser shows what stands behind its first bracket."""
        self._foreign(data)

    def _foreign(self, data: str, what: str = _OTHERWISE) -> None:
        block = self._current()
        if any(block is prose for prose in self.page.prose):
            block = self._anchored(block.anchor)  # it may act beyond the prose
        block.drawn.append(f"{what}: {' '.join(data.split())}")

    def _in_tools(self, what: str) -> None:
        self._anchored("").drawn.append(f"in the review tools: {what}")

    def _in_prose(self, tag: str, named: dict[str, str], anchor: str) -> None:
        """Note what no prose of ours has: it looks like the working, or is laid over it."""
        names = set(named) - ({"class"} if named.get("class") == _PROSE else set())
        if tag in _HARMFUL or names & _LAID or any(name.startswith("on") for name in names):
            self._anchored(anchor).drawn.append(f"in the prose below it: {tag} {sorted(named)}")

    def _page(self, named: dict[str, str]) -> None:
        """Take the classes of the tools off the whole page, and say what they do."""
        classes = named.get("class", "").split()
        for name, told in ((_TOOLS_OPEN, OPEN), (_FILTERED, FILTERED)):
            if name in classes:
                self.page.remark(told)
        named["class"] = " ".join(set(classes) - {_TOOLS_OPEN, _FILTERED})

    def _pass(self, tag: str, named: dict[str, str]) -> None:
        """Pass over a tool; what would change the page around it is noted all the same."""
        if not self.passed:
            self.in_opener = named.get("class") == _OPENER
        if tag not in _VOID:
            self.passed.append(tag)
        if named.get("id") == "rv" and "hidden" not in named:
            self.page.remark(OPEN)
        acts = "style" in named or any(name.startswith("on") for name in named)
        if acts or tag not in _TOOL_TAGS:
            self._in_tools(f"{tag} {sorted(named)}")

    def _is_tool(self, tag: str, named: dict[str, str]) -> bool:
        """Tell whether this is a tool of the review page, which stands apart from the print.

        What the tools are made from, a template, is a part of the page as issued.
        """
        top = all(opened in ("html", "body") for opened, _ in self.open)
        tool = (tag, named.get("id")) == ("aside", "rv")
        opener = (tag, named.get("class")) == ("button", _OPENER)
        return top and (tool or opener)

    def _raw(self, tag: str, named: dict[str, str]) -> None:
        kind = named.get("type", "")
        if tag == "style":
            self.raw = self.page.styles
        elif kind == REVIEW_MIME:
            self.raw = self.page.reviews
        else:
            self.raw = [] if kind == MIME else self.page.scripts
        # What it says depends on its attributes too: a style sheet for no screen styles nothing.
        said = {} if kind in (MIME, REVIEW_MIME) else named
        self.raw.append("".join(f"{name}={value} " for name, value in sorted(said.items())))

    def _current(self) -> Block:
        return self.open[-1][1] if self.open else self._anchored("")

    def _anchored(self, anchor: str) -> Block:
        return self.page.blocks.setdefault(anchor, Block(anchor))

    def _block(self, named: dict[str, str]) -> Block:
        current = self._current()
        if any(current is prose for prose in self.page.prose):
            return current
        if not self.with_prose and named.get("class") == _PROSE:
            self.page.prose.append(Block(next(reversed(self.page.blocks), "")))
            return self.page.prose[-1]
        anchor = named.get("id") or named.get("aria-labelledby")
        return current if anchor is None else self._anchored(anchor)


def _drawn(tag: str, named: dict[str, str]) -> str:
    """Return a tag with its attributes, "" for one that says nothing.

    Of an address within the page only its end counts: a browser saves it whole.
    """
    if tag == "meta" and _is_utf_8({name: value.lower() for name, value in named.items()}):
        return ""
    classes = named.get("class", "").split()
    shown = {**named, "class": " ".join(name for name in classes if name not in _OF_TOOLS)}
    kept = sorted(
        (name, _end(value) if name in _ADDRESSES else "" if name == "hidden" else value)
        for name, value in shown.items()
        if name not in _UNSEEN and (value or name not in _NOTHING_IF_EMPTY)
    )
    if tag in _PLAIN and (not kept or (tag == "html" and [n for n, _ in kept] == ["lang"])):
        return ""
    return f"{tag} {kept}"


def _is_utf_8(named: dict[str, str]) -> bool:
    """Tell whether a tag says nothing but that the page is UTF-8; a browser says it its own way."""
    if set(named) == {"charset"}:
        return named["charset"] == "utf-8"
    typed = named.get("http-equiv") == "content-type" and set(named) == {"http-equiv", "content"}
    return typed and named["content"].replace(" ", "") == "text/html;charset=utf-8"


def _end(address: str) -> str:
    scheme = address.strip().lower().partition(":")[0]
    return address if scheme in ("javascript", "data") else address.rpartition("#")[2]
