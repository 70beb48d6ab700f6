"""The two jinja2 environments: HTML escapes, Typst interns.

In the Typst template nothing but ``t.x7`` is ever written: every text and every mark of a
formula goes into one JSON list that Typst reads as data. So no user text can become Typst source.
"""

from __future__ import annotations

import base64
import json
import math
import re
import threading
from dataclasses import dataclass, field
from functools import cache
from typing import TYPE_CHECKING, Any
from urllib.parse import quote

from lineproof.package.layout import cut, fitted, fitted_result, whole, working_lines
from lineproof.package.prose import Prose, prose_html, prose_tree
from lineproof.package.row_heights import row_heights, table_heights
from lineproof.resources import folder
from lineproof.sentences import begun
from lineproof.typeset.glyphs import bound, printable
from lineproof.typeset.mathml import mathml
from lineproof.typeset.nodes import (
    Digits,
    Fence,
    Fraction,
    Letter,
    Math,
    Prime,
    Root,
    Row,
    Scripts,
    Sign,
    Thin,
    Unit,
    Word,
    row,
)
from lineproof.typeset.plain import plain
from lineproof.typeset.rows import FAILS_WORD, PrintedTable, fails
from lineproof.typeset.typst_mark import typst_mark

if TYPE_CHECKING:
    from collections.abc import Sequence

    import jinja2

    from lineproof.package.calc import Calc
    from lineproof.package.merged import ToConfirm
    from lineproof.package.summary import NotationRow, PartSummary

_NODES = (
    Digits, Fence, Fraction, Letter, Prime, Root, Row, Scripts, Sign, Thin, Unit, Word,
)  # fmt: skip
_PAGE_ROWS, _PAGE_LINES = 24, 40
"""Rows and lines of text that surely have room on one page."""
_LETTERS = 20
"""Letters that stand in a line of a narrow column."""
_SHORT_CELL = 160
_TEXT_SIZES = ((6, "9"), (8, "8.5"), (10, "8"), (12, "7.5"), (10_000, "7"))
_LONG_WORD = re.compile(r"\S{40}")


@dataclass(frozen=True, slots=True)
class Verbatim:
    """Data that must reach the file unchanged: a record, a drawing."""

    text: str


@dataclass
class Interned:
    """The texts, marks and formulas of one document, each once, what it is made of before it."""

    items: list[Any] = field(default_factory=list)
    places: dict[str, str] = field(default_factory=dict)
    texts: dict[str, str] = field(default_factory=dict)
    marks: dict[Math, int] = field(default_factory=dict)
    formulas: dict[Math, int] = field(default_factory=dict)
    long_words: bool = False

    def place(self, value: object) -> str:
        """Store a text or formula and return the only thing the template may print: ``t.x7``."""
        if isinstance(value, str):
            known = self.texts.get(value)
            if known is None:
                text = bound(printable(value))
                self.long_words = self.long_words or _LONG_WORD.search(text) is not None
                known = self.texts[value] = self._at(text, text)
            return known
        if isinstance(value, _NODES):
            return f"t.x{self._formula(value)}"
        if isinstance(value, Verbatim):
            return self._at(value.text, value.text)
        if isinstance(value, Prose):
            tree = ["prose", *(prose_tree(block, self._formula) for block in value.blocks)]
            return f"t.x{self._add(tree)}"
        msg = (
            f"{type(value).__name__} in the Typst template; only text, maths and prose are printed"
        )
        raise TypeError(msg)

    def _formula(self, math: Math) -> int:
        """Store a formula with its reading; a symbol stands in many lines, and is stored once."""
        known = self.formulas.get(math)
        if known is None:
            item = ["formula", self._mark(math), plain(math)]
            known = self.formulas[math] = self._add(item)
        return known

    def _mark(self, math: Math) -> int:
        """Store a node after those inside it."""
        known = self.marks.get(math)
        if known is None:
            known = self.marks[math] = self._add(typst_mark(math, self._mark))
        return known

    def _at(self, key: str, item: str) -> str:
        known = self.places.get(key)
        if known is None:
            known = self.places[key] = f"t.x{self._add(item)}"
        return known

    def _add(self, item: Any) -> int:
        self.items.append(item)
        return len(self.items) - 1

    def to_json(self) -> str:
        """Return the list as ASCII JSON."""
        return json.dumps(self.items, ensure_ascii=True, allow_nan=False)


_local = threading.local()


def html_environment() -> jinja2.Environment:
    """Return this thread's HTML environment."""
    made: jinja2.Environment | None = getattr(_local, "html", None)
    if made is None:
        made = _local.html = _html_environment()
    return made


def typst_environment() -> jinja2.Environment:
    """Return this thread's Typst environment."""
    made: jinja2.Environment | None = getattr(_local, "typst", None)
    if made is None:
        made = _local.typst = _typst_environment()
    return made


def _loader() -> jinja2.BaseLoader:
    import jinja2  # noqa: PLC0415 - 0.05 s, only printing needs it

    return jinja2.FileSystemLoader(folder("templates"))


def _typst_environment() -> jinja2.Environment:
    import jinja2  # noqa: PLC0415 - as in _loader

    @jinja2.pass_context
    def intern(context: jinja2.runtime.Context, value: object) -> str:
        interned: Interned = context["interned"]
        return interned.place(value)

    environment = jinja2.Environment(
        loader=_loader(),
        autoescape=False,  # noqa: S701 - finalize interns every value, nothing is escaped
        finalize=intern,
        undefined=jinja2.StrictUndefined,
        auto_reload=False,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    environment.filters.update(_filters())
    return environment


def _html_environment() -> jinja2.Environment:
    import jinja2  # noqa: PLC0415 - as in _loader
    from markupsafe import Markup  # noqa: PLC0415 - as in _loader

    def finish(value: object) -> object:
        if isinstance(value, Markup):
            return value
        if isinstance(value, str):
            return printable(value)
        if isinstance(value, _NODES):
            return Markup(mathml(value))  # noqa: S704 - the writer escapes its texts
        if isinstance(value, Prose):
            return Markup(prose_html(value))  # noqa: S704 - the writer escapes its texts
        msg = f"{type(value).__name__} in the HTML template; only text, maths and prose are printed"
        raise TypeError(msg)

    environment = jinja2.Environment(
        loader=_loader(),
        autoescape=True,
        finalize=finish,
        undefined=jinja2.StrictUndefined,
        auto_reload=False,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    environment.filters.update(_filters())
    environment.filters.update(
        script_json=lambda text: Markup(_script_json(text)),  # noqa: S704 - every < is escaped
        css_text=lambda text: Markup(_css_text(text)),  # noqa: S704 - all but letters is escaped
        anchor=lambda text: quote(text, safe="/-_.~"),
    )
    environment.globals["font_data"] = lambda name: Markup(font_data(name))  # noqa: S704 - base64
    return environment


def _filters() -> dict[str, Any]:
    return {
        "plain": plain,
        "fitted": fitted,
        "whole": whole,
        "working_lines": working_lines,
        "fitted_result": fitted_result,
        "cut": cut,
        "begun": begun,
        "yes_no": lambda truth: "yes" if truth else "no",
        "verdict": _verdict,
        "checks_text": _checks_text,
        "proofs_text": _proofs_text,
        "length_class": _length_class,
        "fails": fails,
        "short_cells": _short_cells,
        "on_one_page": _on_one_page,
        "longer_than_page": _longer_than_page,
        "heading": _heading,
        "text_size": _text_size,
        "table_heights": table_heights,
        "notation_heights": _notation_heights,
        "part_heights": _part_heights,
    }


def _heading(math: Math) -> tuple[Math | None, str, str]:
    """Part a heading into its symbol, the words after it, which may wrap, and the unit."""
    symbol: Math | None = math
    words = ""
    if isinstance(math, Word):
        symbol, words = None, math.text
    elif isinstance(math, Row) and isinstance(math.items[-1], Word):
        symbol, words = row(math.items[:-1]), math.items[-1].text
    first, comma, unit = words.rpartition(", ")
    return (symbol, first, unit) if comma else (symbol, words, "")


def _text_size(columns: int) -> str:
    """Return the text size of a table, in points: the more columns, the smaller."""
    return next(size for most, size in _TEXT_SIZES if columns <= most)


def _notation_heights(notation: Sequence[NotationRow]) -> str:
    """Tell which rows of the notation are one line high."""
    rows = [("", "", ""), *((row.symbol, row.meaning, row.unit) for row in notation)]
    return row_heights(rows, ("24", "1fr", "24"), 10.0, 3.5)


def _part_heights(parts: Sequence[PartSummary]) -> str:
    """Tell which rows of the checks by part are one line high."""
    rows = [("Line", "Part", "Check nearest its limit", "Clause", "Ratio", "Checks")]
    for part in parts:
        row = part.governing
        rows.append((row.label, part.group, row.title, row.clause, row.ratio, _checks_text(part)))
    return row_heights(rows, ("11", "1fr", "1fr", "", "", ""), 8.5, 3.0)


def _short_cells(table: PrintedTable) -> bool:
    """Tell whether no cell of a table can grow longer than a page, however narrow it is set."""
    return all(len(cell) <= _SHORT_CELL for line in table.rows for cell in line)


def _on_one_page(table: PrintedTable) -> bool:
    """Tell whether a table surely has room on one page, by the letters of its longest cells."""
    lines = sum(math.ceil(max(map(len, row), default=0) / _LETTERS) or 1 for row in table.rows)
    return len(table.rows) <= _PAGE_ROWS and lines <= _PAGE_LINES


def _longer_than_page(item: ToConfirm) -> bool:
    """Tell whether a clause to confirm might not have room on one page, beside any heading."""
    words = math.ceil((len(item.what) + len(item.basis)) / _LETTERS)
    numbers = sum(1 + len(lines) // 2 for _, lines in item.calcs)
    return max(words, numbers) > _PAGE_LINES


def _length_class(title: str) -> str:
    """Name the size of a title: long ones are set smaller."""
    return "title" if len(title) < 90 else "long"  # noqa: PLR2004 - about two lines


def _verdict(calc: Calc) -> str:
    """Say in one sentence whether the calc's checks hold."""
    count, failed = len(calc.summary), len(calc.failures)
    if not count:
        return "No checks of a member."
    if failed:
        return f"{failed} of {count} checks {'does' if failed == 1 else 'do'} not hold."
    return "The one check holds." if count == 1 else f"All {count} checks hold."


def _checks_text(part: PartSummary) -> str:
    """Say how many checks of a part hold."""
    if part.failed:
        return f"{part.failed} of {part.count} {FAILS_WORD if part.failed == 1 else 'FAIL'}"
    return "holds" if part.count == 1 else f"all {part.count} hold"


def _script_json(text: str) -> str:
    """Escape JSON for a script element: no tag and no comment can begin in it."""
    return text.replace("<", "\\u003c").replace(">", "\\u003e").replace("&", "\\u0026")


def _css_text(text: str) -> str:
    """Return text for the inside of a CSS string, everything but plain letters by its code."""
    return "".join(c if c.isascii() and c.isalnum() else f"\\{ord(c):06x}" for c in printable(text))


@cache
def font_data(name: str) -> str:
    """Return a font file of the templates as base64 text."""
    return base64.b64encode((folder("templates") / "fonts" / name).read_bytes()).decode("ascii")


def _proofs_text(calc: Calc) -> str:
    """Say which lines that print a verdict are not among the checks."""
    if calc.proofs == 1:
        return "One line that proves the calculation itself holds as well; it is not counted here."
    return (
        f"{calc.proofs} lines that prove the calculation itself hold as well; "
        "they are not counted here."
    )
