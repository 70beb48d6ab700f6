"""Bars along a beam tried by the whole calculation: which checks would fail with them."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass, field

from lineproof.beams.continuous.deflection_service import DEFLECTION
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance_cover import COVERAGE, Gap
from lineproof.errors import UserError
from lineproof.record import Entry, Part
from lineproof.record.entry import CHECK

Runs = tuple[BarRun, ...]
Failing = frozenset[tuple[str, str]]
"""Checks that fail, by key of their part and their own; those of the cover by bars apart."""


def failing(part: Part) -> list[Entry]:
    """Return the checks of a part that fail and are not accepted by the engineer."""
    return [
        entry for entry in part.entries.values()
        if entry.kind == CHECK and not entry and "exception" not in (entry.extra or {})
    ]  # fmt: skip


def failing_of(parts: Iterable[Part]) -> Failing:
    """Return the checks that fail in parts, without the cover: a cure of it looks at all spans.

    A deflection fails as one: with other bars it may be another of its checks that tells so.
    """
    return frozenset(
        (part.key, "" if part.key.startswith(DEFLECTION) else check.symbol)
        for part in parts
        if not part.key.startswith(COVERAGE)
        for check in failing(part)
    )


@dataclass(frozen=True, eq=False, slots=True)
class Calculated:
    """A beam calculated with other bars along it: after every chapter what fails; its gaps.

    Both are worked out as they are asked for.
    """

    chapters: Iterator[Failing]
    gaps: Callable[[], tuple[Gap, ...]]


@dataclass(frozen=True, eq=False, slots=True)
class Tried:
    """A beam calculated with other bars along it, once for the same bars.

    ``calculate`` raises :class:`UserError` where they are refused.
    """

    calculate: Callable[[Runs], Calculated]
    now: dict[Runs, tuple[tuple[Gap, ...], Failing]] = field(default_factory=dict)
    made: dict[tuple[Runs, Runs, Gap], bool] = field(default_factory=dict)

    def closes(self, runs: Runs, before: Runs, gap: Gap) -> bool:
        """Tell whether bars are taken and close a gap, no other gap grows, and no check fails more.

        The gaps are looked for anew: with other bars the shear leaves another tension in them.
        ``before`` are the bars with the gap. Nothing is calculated behind what fails first.
        """
        if (runs, before, gap) not in self.made:
            try:
                self.made[runs, before, gap] = self._closes(runs, before, gap)
            except UserError:
                self.made[runs, before, gap] = False
        return self.made[runs, before, gap]

    def _closes(self, runs: Runs, before: Runs, gap: Gap) -> bool:
        gaps, then = self._as_they_are(before)
        others, now = [old for old in gaps if not old.covers(gap)], self.calculate(runs)
        if not all(failing_so_far <= then for failing_so_far in now.chapters):
            return False
        return all(any(old.covers(new) for old in others) for new in now.gaps())

    def _as_they_are(self, before: Runs) -> tuple[tuple[Gap, ...], Failing]:
        """Return gaps and what fails with the bars of the beam, the cover by bars left aside."""
        if before not in self.now:
            found = self.calculate(before)
            *_, last = found.chapters
            self.now[before] = found.gaps(), last
        return self.now[before]
