"""Stirrups of a zone: the pieces of a set, where they stand, their mass."""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.beams.continuous.bending import (
    BentShape,
    closed_stirrup,
    open_stirrup,
    rounded_up,
    single_leg,
)
from lineproof.beams.continuous.layout import BeamOutline, StirrupZone
from lineproof.errors import UserError
from lineproof.standards.a23_3.bars import BARS

PAIR = 2


@dataclass(frozen=True, slots=True)
class StirrupSet:
    """The stirrups of one zone: ``pieces`` are shape and number in one set of legs.

    ``first`` and ``last`` are the distances of the outer stirrups from the left end of the clear
    length of the span: the right face of its left support, or the free end of a cantilever [mm].
    """

    zone: StirrupZone
    first: float
    last: float
    pieces: tuple[tuple[BentShape, int], ...]

    @property
    def mass(self) -> float:
        """Mass of all stirrups of the zone [kg]."""
        return self.zone.number * sum(shape.mass * count for shape, count in self.pieces)


def stirrup_set(outline: BeamOutline, zone: StirrupZone) -> StirrupSet:
    """Return the stirrups of a zone: an outer stirrup, inner ones, a single leg if one is left.

    The legs stand evenly over the width; inner stirrups take two neighbouring legs.
    """
    if zone.legs < PAIR:
        raise UserError(f"stirrups of span {zone.span}: {zone.legs} legs; write 2 or more")
    height = outline.depths[zone.span - 1] - 2 * outline.cover
    width = outline.b_w - 2 * outline.cover
    form = closed_stirrup if zone.closed else open_stirrup
    pieces: list[tuple[BentShape, int]] = [(form(zone.size, height, width), 1)]
    pairs, left = divmod(zone.legs - PAIR, PAIR)
    if pairs:
        pieces.append((form(zone.size, height, inner_width(width, zone)), pairs))
    if left:
        pieces.append((single_leg(zone.size, height, closed=zone.closed), 1))
    start, _ = outline.faces(zone.span)
    return StirrupSet(zone, zone.start - start, zone.end - start, tuple(pieces))


def inner_width(width: float, zone: StirrupZone) -> float:
    """Outside width of an inner stirrup, which takes two neighbouring legs [mm]."""
    diameter = BARS.number(zone.size, "d_b")
    return rounded_up((width - diameter) / (zone.legs - 1) + diameter)
