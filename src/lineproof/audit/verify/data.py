"""What verifying a printed file finds, as plain data."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import asdict, dataclass, field
from enum import StrEnum
from typing import Any

from lineproof.audit.data import Finding, Severity

LONGEST_SHOWN = 160


class Outcome(StrEnum):
    """What is said of a file, in the words of the report."""

    INTACT = "intact"
    HANDLED = "sealed or merged by others, content intact"
    ALTERED = "altered"
    STRIPPED = "record stripped"
    NOT_OURS = "not ours"


class Where(StrEnum):
    """What has been altered: the record itself, the text as printed, or how it is drawn."""

    RECORD = "record"
    PRINT = "print"
    DRAWN = "drawn"


@dataclass(frozen=True, slots=True)
class Alteration:
    """One place in which a file departs from its record, or a record from itself.

    ``line`` is the printed number of the line, ``id`` its id, ``page`` the page of the file,
    counted from 1, 0 where there are no pages; ``recorded`` what should stand, ``found`` what does.
    """

    where: Where
    what: str
    calc: str = ""
    line: str = ""
    id: str = ""
    page: int = 0
    recorded: str = ""
    found: str = ""

    @property
    def sentence(self) -> str:
        """Say it in one sentence."""
        place = ", ".join(
            part
            for part in (
                self.calc,
                f"page {self.page}" if self.page else "",
                f"line {self.line}" if self.line else "",
                self.id,
            )
            if part
        )
        said = self.what
        if self.recorded or self.found:
            said += f": {_shown(self.found)} stands, the record gives {_shown(self.recorded)}"
        return f"{place}: {said}" if place else said


def _shown(text: str) -> str:
    short = text if len(text) <= LONGEST_SHOWN else f"{text[: LONGEST_SHOWN - 1]}…"
    return f"“{short}”" if short else "nothing"


@dataclass(frozen=True, slots=True)
class Outside:
    """Text that the record does not hold, such as a notebook's prose: not provable from it."""

    text: str
    page: int = 0
    after: str = ""

    @property
    def has_number(self) -> bool:
        """Tell whether it states any number."""
        return any(letter.isdigit() for letter in self.text)


@dataclass(frozen=True, slots=True)
class Proof:
    """What is found about one record of a file: its calculation, digest and lines compared."""

    calc: str
    digest: str
    lines: int


@dataclass(frozen=True, slots=True)
class Verification:
    """What is found about a file; ``remarks`` say what others did that alters no line."""

    file: str
    outcome: Outcome
    proofs: tuple[Proof, ...] = ()
    alterations: tuple[Alteration, ...] = ()
    outside: tuple[Outside, ...] = ()
    remarks: tuple[str, ...] = ()
    pages: int = 0
    own_pages: int = field(default=0)

    @property
    def intact(self) -> bool:
        """Tell whether the content is that of the record inside the file."""
        return self.outcome in (Outcome.INTACT, Outcome.HANDLED)

    def as_json(self) -> dict[str, Any]:
        """Return it as plain data."""
        made: Mapping[str, Any] = asdict(self)
        sentences = [altered.sentence for altered in self.alterations]
        return {**made, "outcome": str(self.outcome), "sentences": sentences}

    def findings(self) -> tuple[Finding, ...]:
        """Return the alterations as findings of an audit."""
        return tuple(
            Finding(
                source="verify",
                severity=Severity.CRITICAL,
                what=altered.sentence,
                ids=(altered.id,) if altered.id else (),
                advice="Ask the designer for the file as issued and for the reason of the change.",
            )
            for altered in self.alterations
        )
