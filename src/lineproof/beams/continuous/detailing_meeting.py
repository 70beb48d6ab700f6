"""Top bars of two supports that meet in a span: like bars that overlap are lapped in full."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from lineproof.beams.continuous.anchorage import development_length
from lineproof.beams.continuous.cutoff import ceil50, half_of, support_of
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.laps import lap_length
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import alike


@dataclass(frozen=True, slots=True)
class Reach:
    """How far long and short bars reach into a span, from the axis of their support.

    ``through`` says that the long bars meet those of the next support: there is no point of
    inflection between.
    """

    long: float
    short: float
    through: bool = False

    def longer(self, by: float) -> Reach:
        """Return a reach further by a length."""
        return Reach(self.long + by, self.short + by, self.through)


def with_restraint(
    designed: Designed, span: int, near: End, groups: Sequence[BarRun], found: Reach
) -> Reach:
    """Return a reach that is enough at an end whose restraint is assumed.

    There all bars reach a quarter of the clear span past the face (common practice), and are
    developed at the face.
    """
    if support_of(span, near) not in designed.restrained:
        return found
    start, end = designed.outline.faces(span)
    l_d = max(development_length(designed, run) for run in groups)
    least = ceil50(half_of(designed, span, near) + max((end - start) / 4, l_d))
    most = designed.outline.lengths[span - 1]
    return Reach(
        max(found.long, min(least, most)), max(found.short, min(least, most)), found.through
    )


def met(
    designed: Designed,
    span: int,
    reaches: tuple[Reach, Reach],
    bars: tuple[Sequence[tuple[BarRun, bool]], Sequence[tuple[BarRun, bool]]],
) -> tuple[Reach, Reach]:
    """Return the reaches of both supports of a span so that no like bars overlap by half a lap.

    ``bars`` are the groups of either support besides the corner bars, with whether they are long.
    """
    length = designed.outline.lengths[span - 1]
    left, right = reaches
    for first, first_long in bars[0]:
        for second, second_long in bars[1]:
            if not alike(first, second):
                continue
            reach = (
                (left.long if first_long else left.short),
                (right.long if second_long else right.short),
            )
            overlap, lap = sum(reach) - length, lap_length(designed, first)
            if 0 < overlap < lap:
                by = ceil50((lap - overlap) / 2)
                left, right = left.longer(by), right.longer(by)
    return left, right
