"""Prose between the parts: a Markdown subset, read to plain marks that both printers write.

Nothing in prose is ever run: ``{{ M_r }}`` is found by a regular expression and looked up.
"""

from __future__ import annotations

import difflib
import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import cache
from html import escape
from typing import Any

from lineproof.errors import FaultList, UserError
from lineproof.typeset.glyphs import printable
from lineproof.typeset.mathml import mathml
from lineproof.typeset.nodes import Math

_PLACE = re.compile(r"\{\{(.{0,120}?)\}\}")
_NAME = re.compile(r"\s*([A-Za-z0-9_./-]+)\s*\Z")
_OPEN, _CLOSE = "\ue000", "\ue001"
_MARKED = re.compile(f"{_OPEN}([0-9]+){_CLOSE}")
_NESTED = {
    "paragraph": "paragraph",
    "block_text": "paragraph",
    "emphasis": "emphasis",
    "strong": "strong",
    "block_quote": "quote",
    "list_item": "item",
    "table_row": "row",
    "table_cell": "cell",
}
_DEEPEST = 12


@dataclass(frozen=True, slots=True)
class Mark:
    """A piece of prose: a block or a run of text, by its kind, with what stands inside it."""

    kind: str
    text: str = ""
    children: tuple[Mark, ...] = ()
    math: Math | None = None
    level: int = 0


@dataclass(frozen=True, slots=True)
class Prose:
    """The blocks of one piece of prose."""

    blocks: tuple[Mark, ...]


Values = Mapping[str, Math]


@cache
def _reader() -> Callable[[str], Any]:
    import mistune  # noqa: PLC0415 - only prose needs it

    return mistune.create_markdown(renderer=None, plugins=["table"])


def read_prose(markdown: str, values: Values) -> Prose:
    """Read a Markdown subset; ``values`` give what stands for each ``{{ name }}``.

    Raises :class:`UserError` with all raw HTML, images and unknown names at once.
    """
    faults = FaultList()
    found: list[tuple[str, Math | None]] = []

    def note(match: re.Match[str]) -> str:
        found.append((match[0], _value(match[1], values, faults)))
        return f"{_OPEN}{len(found) - 1}{_CLOSE}"

    tidy = markdown.replace("\x00", "\ufffd").replace(_OPEN, "\ufffd").replace(_CLOSE, "\ufffd")
    tokens = _reader()(_PLACE.sub(note, tidy))
    blocks = _Tokens(found, faults).marks(tokens, 0)
    faults.raise_if_any()
    return Prose(blocks)


def _value(text: str, values: Values, faults: FaultList) -> Math | None:
    name = _NAME.match(text)
    if name and name[1] in values:
        return values[name[1]]
    shown = text.strip()[:60]
    near = difflib.get_close_matches(shown, values, n=3, cutoff=0.5)
    hint = f"; write {' or '.join(near)}" if near else "; write a symbol such as {{ M_r }}"
    faults.add(f"prose: '{{{{ {shown} }}}}' is no value of this calc (or not unique){hint}")
    return None


class _Tokens:
    """Turns the reader's tokens into marks and collects what the subset leaves out."""

    def __init__(self, found: list[tuple[str, Math | None]], faults: FaultList) -> None:
        self.found = found
        self.faults = faults

    def marks(self, tokens: list[dict[str, Any]], depth: int) -> tuple[Mark, ...]:
        if depth > _DEEPEST:
            raise UserError("prose: nested too deeply; write it with fewer levels")
        return tuple(mark for token in tokens for mark in self._mark(token, depth + 1))

    def _mark(  # noqa: C901, PLR0911 - one case per kind of token
        self, token: dict[str, Any], depth: int
    ) -> tuple[Mark, ...]:
        kind = token["type"]
        children = token.get("children") or []
        if kind in _NESTED:
            return (Mark(_NESTED[kind], children=self.marks(children, depth)),)
        match kind:
            case "text":
                return self._text(token["raw"])
            case "codespan" | "block_code":
                text = self._restored(token["raw"]).rstrip("\n")
                return (Mark("code" if kind == "codespan" else "listing", text),)
            case "heading":
                level = int(token["attrs"]["level"])
                inside = self.marks(children, depth)
                if not inside:
                    return self._empty_heading(level)
                return (Mark("heading", children=inside, level=level),)
            case "list":
                ordered = "numbered" if token["attrs"]["ordered"] else "list"
                return (Mark(ordered, children=self.marks(children, depth)),)
            case "table":
                return (self._table(children, depth),)
            case "softbreak":
                return (Mark("text", " "),)
            case "linebreak":
                return (Mark("break"),)
            case "thematic_break":
                return (Mark("rule"),)
            case "link":
                return self._link(token, depth)
            case "blank_line":
                return ()
        return self._refused(kind, token)

    def _table(self, children: list[dict[str, Any]], depth: int) -> Mark:
        rows: list[Mark] = []
        for group in children:
            cells = group.get("children") or []
            if group["type"] == "table_head":
                rows.append(Mark("row", children=self.marks(cells, depth)))
            else:
                rows += self.marks(cells, depth)
        return Mark("table", children=tuple(rows))

    def _link(self, token: dict[str, Any], depth: int) -> tuple[Mark, ...]:
        inside = self.marks(token.get("children") or [], depth)
        address = str(token["attrs"].get("url", ""))
        same = len(inside) == 1 and inside[0].text == address
        return inside if same else (*inside, Mark("text", f" ({address})"))

    def _refused(self, kind: str, token: dict[str, Any]) -> tuple[Mark, ...]:
        raw = self._restored(str(token.get("raw") or token.get("attrs") or "")).strip()[:60]
        if "html" in kind:
            self.faults.add(f"prose: raw HTML {raw!r} is not printed; write it in Markdown")
        else:
            self.faults.add(f"prose: {kind.replace('_', ' ')} {raw!r} is not printed; leave it out")
        return ()

    def _empty_heading(self, level: int) -> tuple[Mark, ...]:
        self.faults.add(f"prose: heading {'#' * level} has no words; write them or leave it out")
        return ()

    def _text(self, raw: str) -> tuple[Mark, ...]:
        marks = []
        for place, piece in enumerate(_MARKED.split(raw)):
            if place % 2 == 0:
                marks += [Mark("text", piece)] if piece else []
            else:
                marks.append(Mark("math", math=self.found[int(piece)][1]))
        return tuple(marks)

    def _restored(self, raw: str) -> str:
        return _MARKED.sub(lambda match: self.found[int(match[1])][0], raw)


_TAGS = {
    "paragraph": "p", "emphasis": "em", "strong": "strong", "list": "ul", "numbered": "ol",
    "item": "li", "quote": "blockquote",
}  # fmt: skip


def prose_html(prose: Prose) -> str:
    """Return prose as safe HTML; headings begin one level below those of the PDF."""
    return "".join(map(_html, prose.blocks))


def _html(mark: Mark) -> str:  # noqa: PLR0911 - one return per kind of mark
    if mark.kind == "table":
        return _html_table(mark)
    inside = "".join(map(_html, mark.children))
    if mark.kind in _TAGS:
        tag = _TAGS[mark.kind]
        return f"<{tag}>{inside}</{tag}>"
    match mark.kind:
        case "text":
            return escape(printable(mark.text))
        case "math":
            return mathml(mark.math) if mark.math is not None else ""
        case "code":
            return f"<code>{escape(printable(mark.text))}</code>"
        case "listing":
            lines = "\n".join(printable(line) for line in mark.text.split("\n"))
            return f"<pre><code>{escape(lines)}</code></pre>"
        case "heading":
            return f"<h{mark.level + 1}>{inside}</h{mark.level + 1}>"
    return {"break": "<br />", "rule": "<hr />"}[mark.kind]


def _html_table(table: Mark) -> str:
    rows = []
    for place, line in enumerate(table.children):
        tag = "th" if place == 0 else "td"
        scope = ' scope="col"' if place == 0 else ""
        cells = "".join(
            f"<{tag}{scope}>{''.join(map(_html, cell.children))}</{tag}>" for cell in line.children
        )
        rows.append(f"<tr>{cells}</tr>")
    head, *body = rows or [""]
    return f"<table><thead>{head}</thead><tbody>{''.join(body)}</tbody></table>"


def prose_tree(mark: Mark, place: Callable[[Math], int]) -> list[Any]:
    """Return a mark as nested lists for the Typst template: kind, text, level, math, children.

    ``place`` tells where a formula stands among the texts and marks of the document.
    """
    math = None if mark.math is None else place(mark.math)
    text = mark.text if mark.kind == "listing" else printable(mark.text)
    if mark.kind == "listing":
        text = "\n".join(printable(line) for line in text.split("\n"))
    children = [prose_tree(child, place) for child in mark.children]
    return [mark.kind, text, mark.level, math, children]
