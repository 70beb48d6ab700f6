"""Chains broken into lines that fit the working column, the same for HTML and PDF."""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.typeset.chains import Chain
from lineproof.typeset.measure import broken, shrink, width
from lineproof.typeset.nodes import Math
from lineproof.typeset.plain import plain

WORKING_WIDTH = 33.0
"""Width of the working column, in em of its text."""
RESULT_WIDTH = 11.5
_HEAD_MOST = 12.0


@dataclass(frozen=True, slots=True)
class Piece:
    """A stretch of mathematics that stays on one line; ``scale`` below 1 makes it smaller."""

    math: Math
    alt: str
    scale: str


@dataclass(frozen=True, slots=True)
class FittedChain:
    """A chain as the printers lay it out: left side, then pieces that wrap between each other."""

    lead: str
    head: tuple[Piece, ...]
    pieces: tuple[Piece, ...]


def fitted(chain: Chain) -> FittedChain:
    """Break a chain; a long left side stands on lines of its own before the rest."""
    head_width = width(chain.head)
    room = WORKING_WIDTH - head_width
    if head_width > _HEAD_MOST:
        room = WORKING_WIDTH - 2
    pieces = [part for piece in chain.pieces for part in broken(piece, room)]
    if head_width > _HEAD_MOST:
        return FittedChain(
            chain.lead,
            (),
            tuple(_piece(m, room) for m in (*broken(chain.head, room), *pieces)),
        )
    return FittedChain(
        chain.lead, (_piece(chain.head, room),), tuple(_piece(part, room) for part in pieces)
    )


def fitted_result(math: Math) -> tuple[Piece, ...]:
    """Return a result for the narrow result column; a long one breaks before its equals sign."""
    return tuple(_piece(part, RESULT_WIDTH) for part in broken(math, RESULT_WIDTH))


def _piece(math: Math, room: float) -> Piece:
    return Piece(math, plain(math), f"{shrink(math, room):.3g}")


def cut(text: str, longest: int) -> str:
    """Cut a text for a running head; an ellipsis shows that something is missing.

    >>> cut("Gallery floor beam", 8)
    'Gallery…'
    """
    return text if len(text) <= longest else text[: longest - 1].rstrip() + "…"
