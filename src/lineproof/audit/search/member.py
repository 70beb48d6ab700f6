"""What kind of beam a record is of: its spans, supports and shape, read from what it says."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import Any

from lineproof.record import Record

_SPAN = re.compile(r"l_(\d+)")
_SPANS = re.compile(r"beam of (\w+) spans?\b")
_SHAPE = re.compile(r"\b(T|L|rectangular) section")
_SUPPORT = re.compile(r"(\d+): an? ([a-z ]+?)(?:, [^,;]*? wide)?, ([a-z ]+?)(?:; |\.)")
_SIMPLE = ("holds it vertically and leaves it free to rotate", "holds it up and lets it turn")
"""How a record tells a support that is free to rotate; the second is that of older ones."""
_FREE_END = "free end"
SIDES = ("left", "right")


@dataclass(frozen=True, slots=True)
class Support:
    """What carries the beam at a support: column, girder, wall, free end; and whether it turns."""

    number: int
    carrier: str
    turns: bool

    @property
    def is_free(self) -> bool:
        """Tell whether nothing carries the beam here: the end of a cantilever."""
        return self.carrier == _FREE_END


@dataclass(frozen=True, slots=True)
class Member:
    """A beam as its record describes it.

    ``flow`` is ``continuous`` for a beam of numbered spans, ``single`` for one simple span,
    ``own`` for a calc that names no kind of member, and empty for what is no design of a member.
    """

    flow: str
    shape: str
    spans: int = 0
    supports: tuple[Support, ...] = ()

    def cantilever(self, span: int) -> bool:
        """Tell whether a span hangs at one end."""
        return self.support(span).is_free or self.support(span + 1).is_free

    def support(self, number: int) -> Support:
        """Return a support; one that the record does not describe counts as a column."""
        found = [support for support in self.supports if support.number == number]
        return found[0] if found else Support(number, "column", turns=True)

    def is_exterior(self, number: int) -> bool:
        """Tell whether a support is the last that carries the beam at its end, with no overhang."""
        return number in (1, self.spans + 1) and not self.support(number).is_free

    def carrying(self) -> Iterator[Support]:
        """Give the supports that carry the beam, from left to right."""
        every = (self.support(number) for number in range(1, self.spans + 2))
        return (support for support in every if not support.is_free)

    def sagging(self) -> list[int]:
        """Return the spans between two supports."""
        return [span for span in range(1, self.spans + 1) if not self.cantilever(span)]

    def ends(self) -> Iterator[tuple[int, str]]:
        """Give both ends of every span that rest on a support."""
        for span in range(1, self.spans + 1):
            for side, support in zip(SIDES, (span, span + 1), strict=True):
                if not self.support(support).is_free:
                    yield span, side

    def faces(self) -> Iterator[tuple[int, str]]:
        """Give both faces of every support at which a span begins: (support, side)."""
        for support in self.carrying():
            if support.number > 1:
                yield support.number, "left"
            if support.number <= self.spans:
                yield support.number, "right"


def project_rows(record: Record, name: str) -> list[Mapping[str, str]]:
    """Return the rows of a table of the project's facts as text; what is none is left out."""
    project = record.data.get("project")
    found = project.get(name, []) if isinstance(project, Mapping) else []
    rows = found if isinstance(found, list) else [found]
    return [
        {str(key): "" if value is None else str(value) for key, value in row.items()}
        for row in rows
        if isinstance(row, Mapping)
    ]


def project_table(record: Record, name: str) -> Mapping[str, str]:
    """Return a table of the project's facts as text; empty if there is none."""
    return next(iter(project_rows(record, name)), {})


def member_of(record: Record) -> Member:
    """Read what kind of beam a record is of."""
    kind = str(record.data.get("kind_of_member", ""))
    shape = _SHAPE.search(kind)
    words = shape.group(1) if shape else ""
    if not kind:
        return Member("own", words)
    if kind.startswith("floor beam, one simple span"):
        return Member("single", words, 1)
    count = _SPANS.match(kind)
    if count is None:
        return Member("", words)
    given = sum(1 for entry in record.entries.values() if _is_span(entry))
    told = 1 if count.group(1) == "one" else int(count.group(1))
    return Member("continuous", words, max(told, given), _supports(record))


def _is_span(entry: Mapping[str, Any]) -> bool:
    return entry["kind"] == "given" and _SPAN.fullmatch(entry["symbol"]) is not None


def _supports(record: Record) -> tuple[Support, ...]:
    text = str(record.entries.get("given/supports", {}).get("text", ""))
    return tuple(
        Support(int(number), carrier, hold in _SIMPLE)
        for number, carrier, hold in _SUPPORT.findall(text)
    )
