"""Where bars that are cut are needed no further: in their span, or in the one behind the support.

Top bars that end a little past a support, in a short span or in a cantilever, may be there for the
moment of the span behind alone: the point that their extension counts from then lies in that span.
"""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.beams.continuous.cutoff import (
    Frame,
    Point,
    along,
    first_need,
    full_moment,
    half_of,
    no_further_need,
    support_of,
)
from lineproof.beams.continuous.cutoff_ends import Runs, SideOf
from lineproof.beams.continuous.forces import End, other


@dataclass(frozen=True, slots=True)
class Need:
    """A point of no further need: its span, the support that it is measured from, the point.

    ``behind`` tells that the span is the one on the other side of the support.
    """

    span: int
    near: End
    point: Point
    behind: bool

    def place(self, frame: Frame) -> float:
        """Return the place of the point from the axis of support 1 [mm]."""
        return along(frame.designed, self.span, self.near, self.point.t)


def need_of(frame: Frame, side: SideOf, index: int) -> Need | None:
    """Return the point of no further need of a cut, by the bars that go on past it.

    None where the bars that go on do alone along the whole span (bottom bars), or nowhere (top).
    """
    going = side.continuing(index)
    M_r = full_moment(frame.designed, side.face, side.span, going)
    point = no_further_need(frame, side.face, side.span, side.near, M_r)
    if point is None:
        return None
    if side.face == "top" and point.t <= half_of(frame.designed, side.span, side.near):
        behind = _behind(frame, side, going)
        if behind is not None:
            return behind
    return Need(side.span, side.near, point, behind=False)


def _behind(frame: Frame, side: SideOf, going: Runs) -> Need | None:
    """Return the point in the span behind the support up to which the continuing bars do alone.

    None where there is no such span, where they do alone all along it, and where they do not even
    at its face: the point lies in the support then, and the extension counts from its other face.
    """
    designed = frame.designed
    support, near = support_of(side.span, side.near), other(side.near)
    if not designed.forces.has_span(support, side.near):
        return None
    span = support - 1 if side.near == "left" else support
    M_r = full_moment(designed, "top", span, going)
    point = first_need(frame, span, near, M_r)
    return None if point is None else Need(span, near, point, behind=True)
