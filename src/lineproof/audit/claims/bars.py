"""Bars claimed where an area is asked: ``4-20M`` is 1200 mm2 by the bar table, and is noted."""

from __future__ import annotations

import math
import re
from collections.abc import Iterable
from decimal import Decimal

from lineproof.audit.data import Claim
from lineproof.audit.graph import Graph, Node
from lineproof.errors import UserError
from lineproof.formula.tree import Binary, Name, names_of
from lineproof.quantity import echo
from lineproof.quantity.units import UNITS
from lineproof.record.entry import GIVEN
from lineproof.standards.a23_3.bars import BARS
from lineproof.typeset.values import told

_GROUP = re.compile(r"(\d{1,3})(?: ?[-–x×] ?| )(\d{2}M)\Z", re.ASCII | re.IGNORECASE)
_BETWEEN = re.compile(r" ?(?:[+/]|\band\b) ?")
_BY_DIAMETER = re.compile(
    r"(\d{1,3}) ?-? ?(?:[ØøφΦ⌀THth]|[Dd]ia\.? ?) ?(\d{2})(?: ?mm)?\Z", re.ASCII
)
_NAMED = re.compile(
    r"(?<![\d.])\d\dM\b|[ØøφΦ⌀#]|\d ?-? ?(?:[THth]|[Dd]ia\b\.? ?)\d\d\b|\d ?[-–x×] ?\d\d\Z",
    re.ASCII,
)
"""What names bars: 20M, Ø20, #6, T20 or a number of bars and their size without its M."""
_ONE_BAR = re.compile(r"(?:1-)?(\d\dM)\Z", re.ASCII | re.IGNORECASE)
_OF_ONE = ("d_b", "A_b")
_GIVEN_AREAS = ("A_s", "A_sp")
"""Areas of bars that a calculation of a section may take as given: in tension, in compression."""


def bars_in(text: str) -> tuple[tuple[int, str], ...]:
    """Return number and size of the bars that a text names; empty where it names none.

    >>> bars_in("4 20M"), bars_in("2 x 25m + 2-20M"), bars_in("1200 mm2")
    (((4, '20M'),), ((2, '25M'), (2, '20M')), ())
    """
    found = [_GROUP.match(group) for group in _BETWEEN.split(text)]
    if not all(found):
        return ()
    return tuple((int(match[1]), match[2].upper()) for match in found if match)


def area_claimed(graph: Graph, node: Node, text: str) -> str:
    """Return the area [mm2] of bars claimed for a line, as a number text.

    The line must be the area of whole bars; that which a moment requires, or which counts as far
    as it is developed, is another number. Raises :class:`UserError` with what to write.
    """
    if not _is_of_whole_bars(graph, node):
        sample = f"25 {node.unit}" if node.unit else "4"
        raise UserError(
            f"{node.symbol}: {echo(text)} names bars, and this line is no area of whole bars; "
            f"write it as a number, such as {sample!r}"
        )
    areas = [n * Decimal(BARS.row(size, node.symbol)["A_b"]) for n, size in bars_in(text)]
    return f"{sum(areas)}"


def refuse_one_bar(node: Node, text: str) -> None:
    """Refuse a bar for its own diameter or area, and say its number: 20M would be 20 metres.

    Raises :class:`UserError` with what to write.
    """
    named = _ONE_BAR.match(text)
    column = next((name for name in _OF_ONE if node.symbol.startswith(name)), "")
    if named and column:
        of_bar = BARS.row(named[1].upper(), node.symbol)[column]
        raise UserError(
            f"{node.symbol}: {echo(text)} names a bar; write {f'{of_bar} {BARS.columns[column]}'!r}"
        )


def refuse_other_bars(graph: Graph, node: Node, text: str) -> None:
    """Refuse a text that names bars in a form with more than one reading, and say which.

    4 Ø20 may be four bars 20M (1200 mm2) or four round bars of 20 mm (1257 mm2): their areas
    differ, so none is taken. Raises :class:`UserError` with what to write.
    """
    if not _NAMED.search(text) or bars_in(text):
        return
    if not _is_of_whole_bars(graph, node):
        return
    by_diameter = _BY_DIAMETER.match(text)
    size = f"{by_diameter[2]}M" if by_diameter else ""
    if not by_diameter or size not in BARS.rows:
        raise UserError(
            f"{node.symbol}: {echo(text)} names bars in a way that is not read; write them such as "
            "'4-20M' or '2-25M + 2-20M', or write their area such as '1200 mm2'"
        )
    number, diameter = int(by_diameter[1]), int(by_diameter[2])
    metric = number * Decimal(BARS.row(size, node.symbol)["A_b"])
    raise UserError(
        f"{node.symbol}: {echo(text)} may be {number}-{size} ({metric} mm2) or {number} round bars "
        f"of {diameter} mm ({number * math.pi * diameter**2 / 4:.0f} mm2); write "
        f"'{number}-{size}', or the area meant"
    )


def _is_of_whole_bars(graph: Graph, node: Node) -> bool:
    """Tell whether a line is a number of bars times the area of one, or a sum of such lines."""
    if node.kind == GIVEN:
        return node.symbol in _GIVEN_AREAS and UNITS[node.unit].kind == "area"
    match node.tree:
        case Binary("*", count, Name(area)) if area.startswith("A_b"):
            counts = names_of(count)
            return bool(counts) and all(name.startswith("n_") for name in counts)
        case Binary("+", Name(), Name()):
            return all(_is_of_whole_bars(graph, graph[i]) for i in node.args.values())
    return False


def bars_note(graph: Graph, claims: Iterable[Claim]) -> str:
    """Return the sentence on bars that were read as their area; nothing where none were."""
    said = [
        f"{graph[c.id].symbol} ({graph[c.id].label}) {c.bars} as {told(c.typed, c.unit)}"
        for c in claims
        if c.bars
    ]
    if not said:
        return ""
    return f"Bars are read as their area by the bar table (CSA G30.18): {', '.join(said)}."
