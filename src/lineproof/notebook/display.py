r"""Parts in a notebook: HTML with TeX, plain text, and an anchor by which an exporter finds them.

JupyterLab shows untrusted HTML without MathML and SVG but keeps their text, so that a fraction
a/2 = 26 reads "a2=26". TeX between ``\( \)``, tables and pictures as data URIs survive.
"""

from __future__ import annotations

import base64
import hashlib
import sys
from collections.abc import Mapping
from html import escape
from typing import Any
from weakref import WeakKeyDictionary

from lineproof.drawing import from_json, svg
from lineproof.errors import UserError
from lineproof.record import digest_of
from lineproof.sheet import PartView, Sheet
from lineproof.typeset import plain, printable, tex
from lineproof.typeset.chains import Chain
from lineproof.typeset.measure import broken, width
from lineproof.typeset.nodes import Math, Word, row
from lineproof.typeset.rows import PrintedRow, PrintedTable, notation_of, printed_row

ANCHOR = "application/vnd.lineproof.part+json"
METADATA = "lineproof"
_WIDEST = 26.0  # em; a longer formula breaks before one of its signs
_CELL = "text-align:left;vertical-align:top"
_NO_TEX = 'class="mathjax_ignore"'  # a "$" in a title must stay a "$"

_HELD: WeakKeyDictionary[Sheet, tuple[Mapping[str, object], frozenset[str]]] = WeakKeyDictionary()
"""Inputs of a sheet with the names of the notebook that held them when it was started."""
_TOLD: WeakKeyDictionary[Sheet, int] = WeakKeyDictionary()
"""The run of a cell in which it was last said that inputs of a sheet have changed."""

Bundle = tuple[dict[str, Any], dict[str, Any]]


def register() -> bool:
    """Show every part that closes under its cell, if this is a notebook; tell whether it is."""
    shell = _shell()
    if shell is not None:
        Sheet.shown = show
    return shell is not None


def show(view: PartView) -> None:
    """Display a part under the running cell."""
    from IPython.display import display  # noqa: PLC0415 - only inside IPython

    shell = _shell()
    names = getattr(shell, "user_ns", {})
    refuse_replaced(view.sheet, names)
    remarks = changed_since(view.sheet, names)
    run = getattr(shell, "execution_count", 0)
    if remarks and _TOLD.get(view.sheet) != run:  # once a cell, however many parts it shows
        _TOLD[view.sheet] = run
        sys.stderr.write("".join(f"{line}\n" for line in remarks))
    data, metadata = bundle(view, ran=_cells_run(shell))
    display(data, metadata=metadata, raw=True)  # type: ignore[no-untyped-call]


def refuse_replaced(sheet: Sheet, names: Mapping[str, Any]) -> None:
    """Refuse a part of a sheet in whose place another has been opened for the same calc.

    Where the cell that starts the beam was refused, later cells still find the beam before it:
    its results would stand below the new inputs. ``names`` are those of the notebook.
    """
    open_now = [v for n, v in names.items() if isinstance(v, Sheet) and not n.startswith("_")]
    if any(each is sheet for each in open_now):
        return
    if any(each.calc["id"] == sheet.calc["id"] for each in open_now):
        raise UserError(
            f"{sheet.calc['id']}: this rests on a sheet from before the inputs were changed; run "
            "the cell that starts the calculation again, and mend what it refuses"
        )


def changed_since(sheet: Sheet, names: Mapping[str, Any]) -> list[str]:
    """Return a remark for every input that has another value now than the beam was started with.

    A cell of the inputs that is run without the one that starts the beam changes no number below.
    ``names`` are those of the notebook. Only a name that held the input when the first part was
    shown counts as one: others may stand for anything.
    """
    typed, held = _HELD.get(sheet, ({}, frozenset()))
    if typed is not sheet.typed:
        held = frozenset(n for n, v in sheet.typed.items() if n in names and _same(names[n], v))
        _HELD[sheet] = sheet.typed, held
    return [
        f"{name} is {names[name]!r:.60} now, but what follows rests on {sheet.typed[name]!r:.60}: "
        "run the cell that starts the calculation again"
        for name in sheet.typed
        if name in held and name in names and not _same(names[name], sheet.typed[name])
    ]


def _same(one: object, other: object) -> bool:
    try:
        return bool(one == other)
    except Exception:  # noqa: BLE001 - whatever a foreign object does when compared
        return False


def bundle(view: PartView, ran: list[str] | None = None) -> Bundle:
    """Return the MIME bundle of a part and its metadata.

    ``ran`` holds the hashes of the cells run so far, by their counts. They stand in the metadata
    with the part's digest, so that a reader can tell outputs that are older than their cells, and
    with a hash of what is shown, by which one changed by hand gives itself away.
    """
    record, labels = view.record()
    part = record["part"]
    data = part_bundle(record, part, labels)
    note = {"part": part_digest(part), "shown": shown_hash(data), "cells": ran or []}
    return data, {METADATA: note}


def part_bundle(
    record: Mapping[str, Any], part: Mapping[str, Any], labels: Mapping[str, str]
) -> dict[str, Any]:
    """Return what a part looks like in a notebook, by MIME type.

    ``record`` carries the notation, ``labels`` the printed label of every entry by id.
    """
    notation = notation_of(record)
    rows = [printed_row(entry, notation, labels) for entry in part["entries"]]
    return {
        ANCHOR: {"part": part["key"]},
        "text/html": _html(part, rows),
        "text/plain": _plain(part, rows),
    }


def part_digest(part: Mapping[str, Any]) -> str:
    """Hash what a part was made from; no computed number enters."""
    return digest_of(*[f"{entry['id']}:{entry['digest']}" for entry in part["entries"]])


def shown_hash(data: Mapping[str, Any]) -> str:
    """Hash what a part looks like under its cell, whether its texts stand whole or in lines."""
    texts = (data.get(kind, "") for kind in ("text/html", "text/plain"))
    return digest_of(*("".join(map(str, t)) if isinstance(t, list) else str(t) for t in texts))


def cell_hash(source: str) -> str:
    """Hash a cell's source, without white space at its ends."""
    return hashlib.sha256(source.strip().encode()).hexdigest()[:12]


def _shell() -> Any:
    ipython = sys.modules.get("IPython")
    return ipython.get_ipython() if ipython is not None else None


def _cells_run(shell: Any) -> list[str]:
    """Return the hash of every cell run so far; the place in the list is its count, from 1."""
    history = getattr(shell, "history_manager", None)
    return [cell_hash(source) for source in history.input_hist_raw[1:]] if history else []


# -- plain text ------------------------------------------------------------------------------


def _plain(part: Mapping[str, Any], rows: list[PrintedRow]) -> str:
    blocks = [f"{part['label']}  {part['title']}", *map(_plain_row, rows)]
    return "\n".join(printable(line) for block in blocks for line in block.split("\n"))


def _plain_row(printed: PrintedRow) -> str:
    clause = f"[{printed.clause}]" if printed.clause else ""
    head = "  ".join(mark for mark in (printed.label, clause, printed.title) if mark)
    inputs = ", ".join(map(plain, printed.inputs))
    lines = [
        f"{printed.text} {inputs}".strip(),
        *(chain.plain for chain in printed.chains),
        plain(printed.result) if printed.result is not None else "",
        f"{printed.verdict}, ratio {printed.ratio}" if printed.ratio else printed.verdict,
        printed.conclusion,
        *_plain_table(printed.table),
        f"[figure: {printed.alt}]" if printed.figure is not None else "",
        *printed.remarks,
    ]
    return "\n    ".join([head, *filter(None, lines)] if head else [*filter(None, lines)])


def _plain_table(table: PrintedTable | None) -> list[str]:
    if table is None:
        return []
    lines = [[plain(column) for column in table.columns], *map(list, table.rows)]
    widths = [max(len(line[place]) for line in lines) for place in range(len(table.columns))]
    return [
        "  ".join(
            cell.rjust(width) if numeric else cell.ljust(width)
            for cell, width, numeric in zip(line, widths, table.numeric, strict=True)
        ).rstrip()
        for line in lines
    ]


# -- HTML with TeX ---------------------------------------------------------------------------


def _html(part: Mapping[str, Any], rows: list[PrintedRow]) -> str:
    title = f"{part['label']} {part['title']}"
    body = "".join(map(_row_html, rows))
    return (
        f"<p><strong {_NO_TEX}>{_text(title)}</strong></p>\n"
        f'<table style="width:100%"><thead><tr><th style="{_CELL};width:12%">Clause</th>'
        f'<th style="{_CELL};width:64%">Working</th><th style="{_CELL};width:24%">Result</th>'
        f"</tr></thead><tbody>{body}</tbody></table>"
    )


def _row_html(printed: PrintedRow) -> str:
    return (
        f'\n<tr><td {_NO_TEX} style="{_CELL}">{_text(printed.clause)}</td>'
        f'<td style="{_CELL}">{"<br>".join(_working(printed))}</td>'
        f'<td style="{_CELL}">{"<br>".join(_result(printed))}</td></tr>'
    )


def _working(printed: PrintedRow) -> list[str]:
    lines = _titled(printed)
    if printed.text:
        inputs = ", ".join(map(_tex, printed.inputs))
        lines.append(f"{_span(printed.text)} {inputs}".rstrip())
    for chain in printed.chains:
        lines += _chain(chain)
    if printed.conclusion:
        lines.append(_span(f"∴ {printed.conclusion}"))
    if printed.table is not None:
        lines.append(_table(printed.table))
    return lines + [f"<small {_NO_TEX}>{_text(remark)}</small>" for remark in printed.remarks]


def _titled(printed: PrintedRow) -> list[str]:
    if printed.figure is not None:
        caption = printed.caption or printed.title
        return [_picture(printed), f"<em {_NO_TEX}>{_text(caption)}</em>"]
    label = f"<strong {_NO_TEX}>{_text(printed.label)}</strong>" if printed.label else ""
    title = _span(printed.title) if printed.title else ""
    return [f"{label} {title}".strip()] if label or title else []


def _result(printed: PrintedRow) -> list[str]:
    lines = [_tex(printed.result)] if printed.result is not None else []
    if printed.verdict:
        tag = "span" if printed.holds else "strong"
        lines.append(f"<{tag} {_NO_TEX}>{_text(printed.verdict)}</{tag}>")
    if printed.ratio:
        lines.append(_span(f"ratio {printed.ratio}"))
    return lines


def _chain(chain: Chain) -> list[str]:
    whole = row([chain.head, *chain.pieces])
    lines: list[Math] = [whole]
    if width(whole) > _WIDEST:
        first, *rest = chain.pieces
        lines = [part for m in (row([chain.head, first]), *rest) for part in broken(m, _WIDEST)]
    shown = [_tex(line) for line in lines]
    if chain.lead:
        shown[0] = f"{_span(chain.lead + ':')} {shown[0]}"
    return shown


def _tex(math: Math) -> str:
    return rf"\(\displaystyle {escape(tex(math))}\)"


def _text(text: str) -> str:
    return escape(printable(text))


def _span(text: str) -> str:
    return f"<span {_NO_TEX}>{_text(text)}</span>"


def _picture(printed: PrintedRow) -> str:
    drawn = svg(from_json(printed.figure or {}), any_font=True).encode()
    address = "data:image/svg+xml;base64," + base64.b64encode(drawn).decode()
    return f'<img src="{address}" alt="{_text(printed.alt)}" style="max-width:100%">'


def _table(table: PrintedTable) -> str:
    sides = ["text-align:right" if numeric else "text-align:left" for numeric in table.numeric]
    head = "".join(
        f'<th style="{side}">{_heading(column)}</th>'
        for column, side in zip(table.columns, sides, strict=True)
    )
    body = "".join(
        "<tr>"
        + "".join(
            f'<td {_NO_TEX} style="{side}">{_text(cell)}</td>'
            for cell, side in zip(line, sides, strict=True)
        )
        + "</tr>"
        for line in table.rows
    )
    return f"<table><thead><tr>{head}</tr></thead><tbody>{body}</tbody></table>"


def _heading(column: Math) -> str:
    return _span(column.text) if isinstance(column, Word) else _tex(column)


__all__ = [
    "ANCHOR",
    "METADATA",
    "bundle",
    "cell_hash",
    "part_bundle",
    "part_digest",
    "register",
    "show",
]
