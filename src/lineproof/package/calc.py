"""One calculation of a package, as plain data that HTML and PDF both lay out."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from lineproof.package.prose import Prose
from lineproof.package.repeats import Group
from lineproof.package.summary import (
    Confirmation,
    Failure,
    LoadRow,
    PartSummary,
    SummaryRow,
    part_summaries,
)
from lineproof.typeset.rows import PrintedRow


@dataclass(frozen=True, slots=True)
class PartBlock:
    """A part of the working: its rows under its heading.

    ``groups`` hold the rows in order, those that repeat lines of earlier parts apart.
    """

    key: str
    anchor: str
    label: str
    title: str
    rows: tuple[PrintedRow, ...]
    groups: tuple[Group, ...] = ()


@dataclass(frozen=True, slots=True)
class ProseBlock:
    """Prose between parts."""

    prose: Prose


@dataclass(frozen=True, slots=True)
class NotCovered:
    """A check that a complete calc holds and this one does not yet."""

    check: str
    clause: str

    @property
    def text(self) -> str:
        """The check with its clause."""
        return f"{self.check} ({self.clause})" if self.clause else self.check


@dataclass(frozen=True, slots=True)
class Calc:
    """One calculation of the package; ``proofs`` that hold are no checks of the beam."""

    id: str
    title: str
    anchor: str
    member: str
    digest: str
    record_text: str
    blocks: tuple[PartBlock | ProseBlock, ...]
    summary: tuple[SummaryRow, ...]
    loads: tuple[LoadRow, ...]
    section: PrintedRow | None
    loading: tuple[PrintedRow, ...]
    failures: tuple[Failure, ...]
    confirm: tuple[Confirmation, ...]
    scope: str
    not_covered: tuple[NotCovered, ...]
    marks: Mapping[str, tuple[str, ...]]
    statements: tuple[str, ...]
    front: tuple[PrintedRow, ...] = ()
    proofs: int = 0

    @property
    def failing(self) -> tuple[SummaryRow, ...]:
        """The checks that do not hold, first those that lead."""
        failed = (row for row in self.summary if not row.holds)
        return tuple(sorted(failed, key=lambda row: not row.leads))

    @property
    def part_summaries(self) -> tuple[PartSummary, ...]:
        """One row for the checks of each part."""
        return part_summaries(self.summary)

    @property
    def has_summary(self) -> bool:
        """Tell whether there is anything for summary pages."""
        return bool(self.summary or self.front)

    @property
    def repeats(self) -> bool:
        """Tell whether any line of the working repeats an earlier one."""
        parts = (block for block in self.blocks if isinstance(block, PartBlock))
        return any(group.repeated for part in parts for group in part.groups)

    @property
    def in_front(self) -> frozenset[str]:
        """Ids of figures and tables that stand before the working and are not repeated in it."""
        shown = [printed.id for printed in (*self.loading, *self.front)]
        # The section is drawn on the summary page, which exists only where checks do.
        shown += [self.section.id] if self.section is not None and self.summary else []
        return frozenset(shown)
