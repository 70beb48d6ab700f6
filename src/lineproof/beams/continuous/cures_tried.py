"""Bars along a beam tried by the whole calculation: which checks would fail with them."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass, field
from typing import Any

from lineproof.beams.continuous.deflection_service import DEFLECTION
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance_station import COVERAGE
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


def row_of(run: BarRun) -> dict[str, Any]:
    """Return a run of bars as it is typed."""
    return {
        "face": run.face, "bars": f"{run.number}-{run.size}", "start": f"{run.start:.12g} mm",
        "end": f"{run.end:.12g} mm", "layer": run.layer, "place": run.place,
        "hook_start": run.hook_start, "hook_end": run.hook_end, "serves": run.serves,
    }  # fmt: skip


@dataclass(frozen=True, eq=False, slots=True)
class Tried:
    """A beam calculated with other bars along it, once for the same bars.

    ``calculate`` gives, after every chapter, what fails so far with bars along the beam; it raises
    :class:`UserError` where they are refused.
    """

    calculate: Callable[[Runs], Iterator[Failing]]
    failed: dict[Runs, Failing] = field(default_factory=dict)
    made: dict[tuple[Runs, Runs], bool] = field(default_factory=dict)

    def fails_no_more(self, runs: Runs, before: Runs) -> bool:
        """Tell whether bars are taken, and no check fails with them that holds with those before.

        The cover by bars is left aside. Nothing is calculated behind the first chapter that fails.
        """
        if (runs, before) not in self.made:
            try:
                then = self._failing(before)
                self.made[runs, before] = all(now <= then for now in self.calculate(runs))
            except UserError:
                self.made[runs, before] = False
        return self.made[runs, before]

    def _failing(self, runs: Runs) -> Failing:
        """Return what fails with bars in all chapters."""
        if runs not in self.failed:
            *_, self.failed[runs] = self.calculate(runs)
        return self.failed[runs]
