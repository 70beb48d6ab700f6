"""What an audit works with: intervals of printed numbers, claims, judgements, slips. Plain data."""

from __future__ import annotations

from dataclasses import dataclass, field
from decimal import Decimal
from enum import StrEnum

LEAST_DIGITS = 3
"""Of a whole number such as 12300 so many digits count: the zeros behind them hold the place."""


@dataclass(frozen=True, slots=True)
class Interval:
    """All numbers from low to high, in internal units."""

    low: float
    high: float

    @property
    def middle(self) -> float:
        """The number in the middle."""
        return (self.low + self.high) / 2

    @property
    def half(self) -> float:
        """Half its width."""
        return (self.high - self.low) / 2

    def holds(self, value: float) -> bool:
        """Tell whether a number lies inside; the last bits are nobody's to judge."""
        slack = 1e-9 * max(abs(self.low), abs(self.high))
        return self.low - slack <= value <= self.high + slack

    def meets(self, other: Interval) -> bool:
        """Tell whether two intervals have a number in common."""
        slack = 1e-9 * max(abs(self.low), abs(self.high))
        return self.low - slack <= other.high and other.low <= self.high + slack

    def overlaps(self, other: Interval) -> bool:
        """Tell whether two intervals have more than an end in common; a number has only itself.

        >>> read_from("111").overlaps(read_from("112")), read_from("111").meets(read_from("112"))
        (False, True)
        """
        slack = 1e-9 * max(abs(self.low), abs(self.high))
        shared = min(self.high, other.high) - max(self.low, other.low)
        return self.meets(other) and (shared > slack or min(self.half, other.half) <= slack)

    def times(self, factor: float) -> Interval:
        """Return the interval of numbers times a factor."""
        ends = (self.low * factor, self.high * factor)
        return Interval(min(ends), max(ends))


def read_from(text: str) -> Interval:
    """Return what a written number stands for: half a unit of its last digit to both sides.

    >>> read_from("388"), read_from("0.50")
    (Interval(low=387.5, high=388.5), Interval(low=0.495, high=0.505))
    >>> read_from("12300"), read_from("2e-3")
    (Interval(low=12250.0, high=12350.0), Interval(low=0.0015, high=0.0025))
    """
    number = Decimal(text)
    last = int(number.as_tuple().exponent)
    if "." not in text and number and last >= 0:
        whole = int(number.normalize().as_tuple().exponent)
        last = max(min(last, 0), min(whole, number.adjusted() - LEAST_DIGITS + 1), 0)
    half = Decimal(5).scaleb(last - 1)
    return Interval(float(number - half), float(number + half))


@dataclass(frozen=True, slots=True)
class Claim:
    """A value that somebody else wrote for a line: as typed, and what it stands for.

    A moment claimed in another sign convention has the calc's own sign in both numbers.
    ``row`` is its row in the table that it came from, counted as the spreadsheet shows it;
    ``where`` is its place in the other's calculation as the table says: ``p. 3``. ``bars`` are
    those that were claimed for their area: ``4-20M``.
    """

    id: str
    typed: str
    unit: str
    value: float
    stands_for: Interval
    row: int = 0
    where: str = ""
    bars: str = ""

    @property
    def beside(self) -> str:
        """What stands in brackets beside the number: the bars claimed, the place; or nothing."""
        said = ", ".join(filter(None, (self.bars, self.where)))
        return f" ({said})" if said else ""


class Verdict(StrEnum):
    """What is said of a line."""

    AGREES = "agrees"
    INPUT = "other input"
    ORIGIN = "origin"
    CARRIED = "carried"
    UNIT = "unit slip"
    DOUBTFUL = "doubtful"
    OTHER_METHOD = "other valid method"
    SAFE_ROUNDING = "conservative rounding"
    UNSAFE_ROUNDING = "unconservative rounding"
    NOT_CLAIMED = "not claimed"
    UNKNOWN = "unknown"


@dataclass(frozen=True, slots=True)
class Cause:
    """What a slip may have been, in words such as ``h (1.4, overall depth) in place of d``.

    ``replaced`` and ``took`` are the ids of the value replaced and of the one taken for it, where
    a value was put for another. ``above`` tells that it was made before the claimed line, where
    nobody claimed anything, ``usual`` that it is a mistake known by name. ``published`` tells a
    value that another document prints; against ``contradicted`` another claimed line speaks.
    """

    words: str
    replaced: str = ""
    took: str = ""
    above: bool = False
    usual: bool = False
    published: bool = False
    contradicted: bool = False


@dataclass(frozen=True, slots=True)
class Slip:
    """One slip that reproduces a claimed value: its kind, the checker's sentence, its value.

    ``likely`` orders slips of one line, the most plausible first; it is no probability. ``also``
    names other kinds of slip that give the very same value. ``causes`` are what it may have been,
    the likeliest first.
    """

    kind: str
    sentence: str
    value: float
    likely: float
    also: tuple[str, ...] = ()
    causes: tuple[Cause, ...] = ()


@dataclass(frozen=True, slots=True)
class Judged:
    """A line judged: what was claimed, what follows from the claim's own values, what is right.

    ``follows`` is the interval that follows from the values the claim itself uses; ``right`` is
    the recorded value; ``causes`` are the ids of origins that a carried line rests on.
    """

    id: str
    verdict: Verdict
    claim: Claim | None
    follows: Interval
    right: float
    note: str = ""
    slips: tuple[Slip, ...] = ()
    causes: tuple[str, ...] = field(default=())


class Severity(StrEnum):
    """How much a finding matters, the gravest first."""

    CRITICAL = "critical"
    MAJOR = "major"
    MINOR = "minor"
    OBSERVATION = "observation"


@dataclass(frozen=True, slots=True)
class Effect:
    """What a wrong line does to a check downstream: utilisation and truth as claimed and right."""

    check: str
    claimed: float | None
    right: float | None
    holds_as_claimed: bool
    holds: bool
    sentence: str


@dataclass(frozen=True, slots=True)
class Finding:
    """One thing that a checker would write down.

    ``source`` says which search found it (``claims``, ``drawing``, ``missing``, ``traps``,
    ``notebook``, ``verify``); ``ids`` are the lines it concerns, ``advice`` what to do.
    """

    source: str
    severity: Severity
    what: str
    ids: tuple[str, ...] = ()
    clause: str = ""
    advice: str = ""
    effects: tuple[Effect, ...] = ()


@dataclass(frozen=True, slots=True)
class Audit:
    """All that an audit found about one calculation; ``findings`` the gravest first.

    ``notes`` say how the claims were read, where that is no finding.
    """

    calc: str
    digest: str
    judged: tuple[Judged, ...] = ()
    findings: tuple[Finding, ...] = ()
    notes: tuple[str, ...] = ()
