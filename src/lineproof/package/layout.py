"""Chains broken into lines that fit the working column, the same for HTML and PDF."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import groupby

from lineproof.typeset.chains import Chain
from lineproof.typeset.glyphs import printable
from lineproof.typeset.measure import broken, shrink, width
from lineproof.typeset.nodes import Math, row
from lineproof.typeset.rows import PrintedRow

WORKING_WIDTH = 33.0
"""Width of the working column, in em of its text."""
RESULT_WIDTH = 11.5
_HEAD_MOST = 12.0
_INDENT = 2.0
_SURELY_ONE_LINE = 0.8
_WIDE, _CAPITAL, _OTHER = 1.8, 1.3, 1.0


@dataclass(frozen=True, slots=True)
class Piece:
    """A stretch of mathematics that stays on one line; ``scale`` below 1 makes it smaller."""

    math: Math
    scale: str


@dataclass(frozen=True, slots=True)
class FittedChain:
    """A chain as the printers lay it out: left side, then pieces that wrap between each other."""

    lead: str
    head: tuple[Piece, ...]
    pieces: tuple[Piece, ...]


@dataclass(frozen=True, slots=True)
class WorkingLine:
    """Chains that stand on one line, and the conclusion where it follows them.

    A chain that ``wraps`` stands alone.
    """

    chains: tuple[Chain, ...]
    wraps: bool
    conclusion: str = ""


def working_lines(printed: PrintedRow) -> tuple[WorkingLine, ...]:
    """Return the working of a row line by line: short chains side by side, long ones alone."""
    lines = []
    for wraps, group in groupby(printed.chains, _wraps):
        chains = tuple(group)
        lines += [WorkingLine((c,), wraps=True) for c in chains] if wraps else []
        lines += [] if wraps else [WorkingLine(chains, wraps=False)]
    if printed.conclusion and (not lines or lines[-1].wraps):
        lines.append(WorkingLine((), wraps=False))
    if lines:
        lines[-1] = WorkingLine(lines[-1].chains, lines[-1].wraps, printed.conclusion)
    return tuple(lines)


def whole(chain: Chain) -> Math:
    """Return a short chain as one stretch of mathematics."""
    return row([chain.head, *chain.pieces])


def _wraps(chain: Chain) -> bool:
    """Tell whether a chain may need more than one line."""
    return width(whole(chain)) > _SURELY_ONE_LINE * WORKING_WIDTH


def fitted(chain: Chain) -> FittedChain:
    """Break a chain; a long left side stands on lines of its own before the rest."""
    head_width = width(chain.head)
    long_head = head_width > _HEAD_MOST
    room = WORKING_WIDTH - (_INDENT if long_head else head_width)
    pieces = [part for piece in chain.pieces for part in broken(piece, room)]
    heads = [chain.head]
    if long_head:
        pieces = [*broken(chain.head, room), *pieces]
        heads = []
    return FittedChain(
        chain.lead,
        tuple(_piece(part, room) for part in heads),
        tuple(_piece(part, room) for part in pieces),
    )


def fitted_result(math: Math) -> tuple[Piece, ...]:
    """Return a result for the narrow result column; a long one breaks before its equals sign."""
    return tuple(_piece(part, RESULT_WIDTH) for part in broken(math, RESULT_WIDTH))


def _piece(math: Math, room: float) -> Piece:
    return Piece(math, f"{shrink(math, room):.3g}")


def cut(text: str, longest: int) -> str:
    """Cut a text for a running head; an ellipsis shows that something is missing.

    ``longest`` counts characters of usual width; capitals and wide letters count for more.

    >>> cut("Gallery floor beam", 10)
    'Gallery…'
    """
    used = 0.0
    shown = printable(text)  # one character may be printed as its code of nine
    for place, letter in enumerate(shown):
        used += _WIDE if letter in "MWmw@%" else _CAPITAL if letter.isupper() else _OTHER
        if used > longest:
            return shown[: max(place - 1, 1)].rstrip() + "…"
    return text
