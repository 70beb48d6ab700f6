"""What stands on the pages of a printed package, mark by mark, as it is drawn.

A mark is a text, a line or box, or a figure. Its key holds all that is drawn but its height on the
page: prose between the parts moves lines up and down, never sideways.
"""

from __future__ import annotations

import hashlib
import re
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from enum import StrEnum
from typing import Any, NamedTuple

from lineproof.audit.verify.glyphs import Face, face_of


class Kind(StrEnum):
    """What a mark is; ``FOREIGN`` is what our printer does not write."""

    TEXT = "text"
    RULE = "rule"
    SHAPE = "shape"
    FIGURE = "figure"
    FOREIGN = "foreign"


class Zone(StrEnum):
    """Where a mark belongs: the page itself, its running heads, a table's head said again."""

    BODY = "body"
    RUNNING = "running"
    AGAIN = "again"


class Mark(NamedTuple):
    """A mark: page counted from 0, place in points from the left and from below.

    ``size`` is that of a text, or the width of a line or box. ``inner`` are the heights of the
    parts of a figure, counted from its own; ``number`` is the page that the mark names, where it
    names one, which its key then leaves out.
    """

    key: int
    kind: Kind
    zone: Zone
    page: int
    x: float
    y: float
    text: str = ""
    size: float = 0.0
    inner: tuple[float, ...] = ()
    number: int = 0


class _Drawn(NamedTuple):
    """What a group of drawing operators draws, wherever it stands."""

    shown: int
    kind: Kind
    text: str
    size: float
    x: float
    y: float


class Keys:
    """Numbers for what is drawn, the same in all documents that are compared."""

    def __init__(self) -> None:
        self._known: dict[object, int] = {}

    def of(self, drawn: object) -> int:
        """Return the number of something drawn."""
        return self._known.setdefault(drawn, len(self._known))


_NUMBER = rb"-?[\d.]+"
# Nothing is tried in a second way (++ and *+): each character can stand in one place only, and a
# page that another program has written, or that is damaged, would take hours.
_STRING = rb"\((?:[^()\\]|\\.)*+\)"
for _ in range(6):  # pairs of parentheses stand in a string as they are
    _STRING = rb"\((?:[^()\\]++|\\.|%b)*+\)" % _STRING
_PROPERTIES = (
    rb"<<(?:[^<>()]|" + _STRING + rb"|<[0-9A-Fa-f]*>|<<(?:[^<>()]|" + _STRING + rb")*+>>)*+>>"
)
_STEP = re.compile(
    rb"q (?P<a>%b) 0 0 (?P<d>%b) (?P<x>%b) (?P<y>%b) cm(?P<body>(?:[^()qQ\n]++|\n(?!Q)|%b)*+)\nQ\s*"
    rb"|/(?P<tag>\w+)\s*(?P<properties>%b)?\s*BDC\s*"
    rb"|(?P<close>EMC)\s*" % (*(_NUMBER,) * 4, _STRING, _PROPERTIES),
    re.DOTALL,
)
_SHOWN = re.compile(
    rb"/(\w+) (%b) Tf|(?<!ActualText)(%b|<[0-9A-Fa-f]+>)" % (_NUMBER, _STRING), re.DOTALL
)
_COLOUR = re.compile(rb"/(\w+) (cs|CS)\b")
_MARKED = re.compile(rb"%b|BDC|BMC|EMC" % _STRING, re.DOTALL)
_POINT = re.compile(rb"(%b) (%b) [mlc]\b" % (_NUMBER, _NUMBER))
_FIRST_NUMBERS = re.compile(_NUMBER)
_FIGURE_PLACE = re.compile(rb"(?<=q )(%b %b %b %b %b) (%b) (?=cm)" % ((_NUMBER,) * 6))
_PLACE_IN_FILE = re.compile(rb"/MCID \d+")
_ESCAPE = re.compile(rb"\\(?:([0-7]{1,3})|(\r\n|.))", re.DOTALL)
_ESCAPED = {b"n": b"\n", b"r": b"\r", b"t": b"\t", b"b": b"\b", b"f": b"\f", b"\n": b"", b"\r": b"",
            b"\r\n": b""}  # fmt: skip
_OF_TAG = re.compile(rb"/MCID \d+|/Lang\([\w-]*\)")
_TAGS = frozenset({
    b"Span<<>>", b"Artifact<</Type/Layout>>", b"Artifact<</Type/Pagination>>",
    b"Artifact<</Attached[/Top]/Subtype/Header/Type/Pagination>>",
    b"Artifact<</Attached[/Bottom]/Subtype/Footer/Type/Pagination>>",
})  # fmt: skip
"""The tags around what our printer draws. Others put it on a layer that is not shown, or give it a
text that is copied and read aloud in its place."""
_CONTENTS_NUMBER = b"BT/Span<</ActualText<FEFF00202060>>>BDC"
_SEE_PAGE = re.compile(r"see page (\d+)\Z")
_PAGE_OF = re.compile(r"Page (\d+) of (\d+)\Z")
_THIN = 1.0
SHORT_RULE = 60.0
"""A rule shorter than this, in points, belongs to a formula; longer ones part rows."""


def string_bytes(literal: bytes) -> bytes:
    r"""Return the bytes of a string as a page writes it, in parentheses or as digits.

    >>> string_bytes(rb"(a\(\051\n)"), string_bytes(b"<6128>")
    (b'a()\n', b'a(')
    """
    if literal.startswith(b"<"):
        digits = literal[1:-1].decode("ascii")
        return bytes.fromhex(digits + "0" * (len(digits) % 2))
    if b"\\" not in literal:
        return literal[1:-1]
    return _ESCAPE.sub(_unescaped, literal[1:-1])


def _unescaped(found: re.Match[bytes]) -> bytes:
    if found[1]:
        return bytes([int(found[1], 8) & 0xFF])
    return _ESCAPED.get(found[2], found[2])


@dataclass
class Document:
    """Reads the pages of one file; fonts and keys of what is drawn are kept between pages."""

    keys: Keys
    faces: dict[object, Face] = field(default_factory=dict)
    colours: dict[object, str] = field(default_factory=dict)
    drawn: dict[object, dict[bytes, _Drawn]] = field(default_factory=dict)

    def marks(self, page: Any, number: int) -> list[Mark]:
        """Return the marks of a page of a PDF reader; ``number`` counts from 0."""
        resources = page.get("/Resources", {}).get_object()
        fonts = resources.get("/Font", {}).get_object()
        faces = {name[1:]: self._face(fonts.raw_get(name)) for name in fonts}
        spaces = resources.get("/ColorSpace", {}).get_object()
        colours = {name[1:]: self._colour(spaces.raw_get(name)) for name in spaces}
        contents = page.get_contents()
        content = b"" if contents is None else contents.get_data()
        return list(_Page(self, content, number, faces, colours).marks())

    def _face(self, reference: Any) -> tuple[object, Face]:
        place = getattr(reference, "idnum", id(reference))
        if place not in self.faces:
            self.faces[place] = face_of(reference.get_object())
        return place, self.faces[place]

    def _colour(self, reference: Any) -> str:
        place = getattr(reference, "idnum", id(reference))
        if place not in self.colours:
            space = reference.get_object()
            pieces = [
                hashlib.sha256(part.get_data()).hexdigest() if hasattr(part, "get_data") else part
                for part in (piece.get_object() for piece in _listed(space))
            ]
            self.colours[place] = str(pieces)
        return self.colours[place]


def _listed(space: Any) -> Sequence[Any]:
    return space if isinstance(space, list) else [space]


class _Page:
    """The marks of one page."""

    def __init__(
        self,
        document: Document,
        content: bytes,
        number: int,
        faces: Mapping[str, tuple[object, Face]],
        colours: Mapping[str, str],
    ) -> None:
        self.document, self.content, self.number = document, content, number
        self.faces, self.colours = faces, colours
        used = tuple(sorted((name, str(place)) for name, (place, _) in faces.items()))
        context = (used, tuple(sorted(colours.items())))
        self.drawn = document.drawn.setdefault(context, {})
        self.zone = Zone.BODY

    def marks(self) -> Iterator[Mark]:
        """Give the marks in the order in which they are drawn."""
        content, place, depth, step = self.content, 0, 0, _STEP.match
        while place < len(content):
            found = step(content, place)
            kind = found.lastgroup if found else None
            if found is None and content[place : place + 1].isspace():
                place += 1  # where another program has joined streams
                continue
            if found is None or (kind == "close" and not depth):
                end = self._next(place)
                yield self._foreign(content[place:end])
                place = end
                continue
            place = found.end()
            if kind == "body":
                yield self._group(found)
            elif kind == "close":
                depth, self.zone = depth - 1, Zone.BODY
            else:
                properties = found["properties"] or b""
                depth += 1
                if not _is_ours(found["tag"], properties):
                    yield self._foreign(found[0])
                self._enter(found["tag"], properties)
                if b"/Alt" in properties:
                    end = self._end_of(place)
                    yield self._figure(content[place:end], properties)
                    place = end

    def _enter(self, tag: bytes, properties: bytes) -> None:
        if tag == b"Artifact" and b"/Type/Pagination" in properties:
            self.zone = Zone.RUNNING if b"/Subtype" in properties else Zone.AGAIN

    def _end_of(self, place: int) -> int:
        """Return where the marked content that begins at a place ends."""
        depth = 1
        for found in _MARKED.finditer(self.content, place):
            depth += {b"BDC": 1, b"BMC": 1, b"EMC": -1}.get(found[0], 0)
            if not depth:
                return found.start()
        return len(self.content)

    def _next(self, place: int) -> int:
        """Return where something begins again that our printer writes."""
        starts = (self.content.find(sign, place + 1) for sign in (b"\nq 1 ", b"\nEMC", b"/Span<<"))
        return min((at + (self.content[at] == 10) for at in starts if at > 0), default=10**9)  # noqa: PLR2004 - a line feed

    def _foreign(self, content: bytes) -> Mark:
        shown = self.document.keys.of(("foreign", content))
        text = "".join(
            face.text(string_bytes(found[3]))
            for _, face in list(self.faces.values())[:1]
            for found in _SHOWN.finditer(content)
            if found[3]
        )
        return Mark(shown, Kind.FOREIGN, self.zone, self.number, 0.0, 0.0, text)

    def _group(self, group: re.Match[bytes]) -> Mark:
        a, d, x, y, body = group["a"], group["d"], group["x"], group["y"], group["body"]
        known = self.drawn.get(body)
        if known is None:
            known = self.drawn[body] = self._drawn(body)
        number, key = 0, 0
        if known.kind is Kind.TEXT and known.text[-1:].isdigit() and " " in known.text:
            key, number = self._named_page(known.text, x, body)
        if not number:
            key = self.document.keys.of((a, d, x, known.shown))
        left, low = float(x) + float(a) * known.x, float(y) + float(d) * known.y
        return Mark(
            key, known.kind, self.zone, self.number, left, low, known.text, known.size, (), number
        )

    def _named_page(self, text: str, x: bytes, body: bytes) -> tuple[int, int]:
        """Return a key without the number of the page that is named, and the number; 0 for none."""
        of = self.document.keys.of
        if _CONTENTS_NUMBER in body and text.strip().isdigit():
            return of("page in the contents"), int(text)
        seen = _SEE_PAGE.match(text)
        if seen:
            return of(("see page", x)), int(seen[1])
        running = _PAGE_OF.match(text) if self.zone is Zone.RUNNING else None
        if running:
            return of("page of pages"), int(running[1])
        return 0, 0

    def _drawn(self, body: bytes) -> _Drawn:
        shown, text, size = self._shown(body)
        key = self.document.keys.of(shown)
        if b"BT" in body:
            return _Drawn(key, Kind.TEXT, text, size, 0.0, 0.0)
        left, width, middle, height = _extent(body)
        kind = Kind.RULE if height <= _THIN else Kind.SHAPE
        return _Drawn(key, kind, "", width, left, middle)

    def _shown(self, body: bytes) -> tuple[tuple[object, ...], str, float]:
        """Return what is drawn with its glyphs in place of codes, its text and its size."""
        pieces: list[object] = []
        texts: list[str] = []
        size, place, face = 0.0, 0, None
        for found in _SHOWN.finditer(body):
            pieces.append(self._coloured(body[place : found.start()]))
            place = found.end()
            if found[1]:
                face = self.faces.get(found[1].decode("latin-1"), (None, None))[1]
                size = float(found[2])
                pieces += [face.name if face else "no font", found[2]]
            else:
                string = string_bytes(found[3])
                pieces.append(face.glyphs(string) if face else string)
                texts.append(face.text(string) if face else "")
        pieces.append(self._coloured(body[place:]))
        return tuple(pieces), "".join(texts), size

    def _coloured(self, piece: bytes) -> bytes:
        """Put what a colour space is in place of its name."""
        return _COLOUR.sub(
            lambda found: self.colours.get(found[1].decode("latin-1"), "none").encode() + found[2],
            piece,
        )

    def _figure(self, content: bytes, properties: bytes) -> Mark:
        """Return a figure: its drawing with all heights taken out, and the heights apart."""
        lines = content.split(b"\nW\nn\n", 1)
        clip = [float(n) for n in _FIRST_NUMBERS.findall(lines[0])] if len(lines) > 1 else []
        base = clip[1] if len(clip) > 1 else 0.0
        left = clip[0] if clip else 0.0
        heights = [height - base for height in clip[1::2]]
        rest = _FIGURE_PLACE.sub(
            lambda found: found[1] + b" " + self._taken(found[2], base, heights), lines[-1]
        )
        alt = _PLACE_IN_FILE.sub(b"", properties)
        shown, text, _ = self._shown(rest)
        key = self.document.keys.of(("figure", alt, tuple(clip[::2]), shown))
        return Mark(key, Kind.FIGURE, self.zone, self.number, left, base, text, 0.0, tuple(heights))

    @staticmethod
    def _taken(height: bytes, base: float, heights: list[float]) -> bytes:
        heights.append(float(height) - base)
        return b"y"


def _is_ours(tag: bytes, properties: bytes) -> bool:
    """Tell whether a tag is one of our printer's; that of a figure is compared with its drawing."""
    if b"/Alt" in properties:
        return tag == b"Span"
    return tag + _OF_TAG.sub(b"", properties) in _TAGS


def _extent(body: bytes) -> tuple[float, float, float, float]:
    """Return left end, width, middle height and height of the points of a path."""
    points = _POINT.findall(body)
    xs, ys = [float(x) for x, _ in points] or [0.0], [float(y) for _, y in points] or [0.0]
    return min(xs), max(xs) - min(xs), (max(ys) + min(ys)) / 2, max(ys) - min(ys)
