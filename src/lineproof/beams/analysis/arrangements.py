"""Which spans carry live load, with which factors: arrangements, combinations, cases.

A23.3, 9.2.3.1: factored dead load on all spans with factored live load on two adjacent spans, on
alternate spans, and on all spans. Alternate spans give the largest span moments there are. Two
adjacent spans do not give the largest support moment there is when there are four spans or more:
that needs every other span beyond the two loaded as well (``beyond=True``). The spans that these
leave out lift the support between the two the most, and pull its bottom. NBC 4.1.5.3 asks for any
portions, so the wider set is on offer; the difference is shown in the tests.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.analysis.solve import Row
from lineproof.errors import UserError
from lineproof.standards.nbc.combinations import CASES, Case, Companion

LIVE = ("L", "L_st")
"""Load types placed by arrangement; ``L_st`` is live load of storage, equipment and the like."""
LOAD_TYPES = ("D", "L", "L_st", "S", "W", "E")
PRINTED = {"L_st": "L (storage)"}
"""How a load type is printed where its letter alone does not name it."""
_TYPES_OF = {"L": LIVE}
"""Load types that stand behind a letter of the table."""
TOGETHER = ("E",)
"""Principal loads whose companions act together (case 5), not one or the other."""

SERVICE_CASES = (
    Case(0, ("1.0",)),
    Case(1, ("1.0",), ("L", "1.0"), (Companion("W", "0.3"), Companion("S", "0.35"))),
    Case(2, ("1.0",), ("W", "1.0"), (Companion("L", "0.35", "0.15"), Companion("S", "0.35"))),
    Case(3, ("1.0",), ("S", "1.0"), (Companion("W", "0.3"), Companion("L", "0.35", "0.15"))),
)
"""NBC 2020, Table 4.1.3.4; live load of storage accompanies with 0.5 instead of 0.35."""


@dataclass(frozen=True, slots=True)
class Arrangement:
    """The spans that carry live load, numbered from 1."""

    name: str
    spans: frozenset[int]


@dataclass(frozen=True, slots=True)
class Combination:
    """Factors by load type, as the code's table gives them; absent types do not act."""

    name: str
    clause: str
    factors: tuple[tuple[str, float], ...]


@dataclass(frozen=True, slots=True)
class LoadCase:
    """One combination with one arrangement; ``arrangement`` is "" where none has a meaning."""

    combination: str
    arrangement: str

    def __str__(self) -> str:
        """Name both: ``1.25D + 1.5L, live load on spans 1, 3``."""
        return ", ".join(part for part in (self.combination, self.arrangement) if part)


@dataclass(frozen=True, eq=False, slots=True)
class Cases:
    """Load cases with their factors (cases, rows) on the rows of a solution."""

    names: tuple[LoadCase, ...]
    factors: Floats


def _named(spans: Iterable[int]) -> Arrangement:
    loaded = sorted(spans)
    return Arrangement(loaded_spans(loaded), frozenset(loaded))


def loaded_spans(spans: Sequence[int]) -> str:
    """Say on which spans live load stands.

    >>> loaded_spans([1, 3]), loaded_spans([])
    ('live load on spans 1, 3', 'no live load')
    """
    if not spans:
        return "no live load"
    return f"live load on span{'' if len(spans) == 1 else 's'} {', '.join(map(str, spans))}"


_EVERYWHERE = Arrangement("", frozenset())


def standard_arrangements(spans: int, *, beyond: bool = False) -> tuple[Arrangement, ...]:
    """Return the arrangements of 9.2.3.1; a cantilever counts as a span.

    ``beyond`` adds, for every support, the two adjacent spans with every other span beyond them,
    and all other spans without these.

    >>> [a.name for a in standard_arrangements(3)]  # doctest: +NORMALIZE_WHITESPACE
    ['live load on spans 1, 2, 3', 'live load on spans 1, 3', 'live load on span 2',
     'live load on spans 1, 2', 'live load on spans 2, 3']
    """
    numbers = range(1, spans + 1)
    sets = [set(numbers), set(numbers[::2]), set(numbers[1::2])]
    sets += [{left, left + 1} for left in numbers[:-1]]
    if beyond:
        pairs = [{*range(left, 0, -2), *range(left + 1, spans + 1, 2)} for left in numbers[:-1]]
        sets += [*pairs, *(set(numbers) - pair for pair in pairs)]
    return tuple(dict.fromkeys(_named(s) for s in sets if s))


def check_types(kinds: Iterable[str]) -> tuple[str, ...]:
    """Return the load types present, in the table's order; refuse a type it does not know."""
    present = set(kinds)
    unknown = sorted(present - set(LOAD_TYPES))
    if unknown:
        raise UserError(
            f"load type {kind!r} has no factor in NBC 4.1.3.2; write one of {', '.join(LOAD_TYPES)}"
            for kind in unknown
        )
    return tuple(kind for kind in LOAD_TYPES if kind in present)


def factored_combinations(kinds: Iterable[str]) -> tuple[Combination, ...]:
    """Return the strength combinations of NBC 4.1.3.2 for the load types present.

    Every case stands with either dead load factor, with each companion, and without one.

    >>> [c.name for c in factored_combinations(["D", "L"])]
    ['1.4D', '1.25D + 1.5L', '0.9D + 1.5L']
    >>> factored_combinations(["D", "L_st"])[1].name
    '1.25D + 1.5L (storage)'
    """
    return _combinations(CASES, "NBC 4.1.3.2", kinds)


def service_combinations(kinds: Iterable[str]) -> tuple[Combination, ...]:
    """Return the service combinations of NBC 2020, 4.1.3.4, and dead load alone.

    >>> [c.name for c in service_combinations(["D", "L"])]
    ['1.0D', '1.0D + 1.0L']
    """
    return _combinations(SERVICE_CASES, "NBC 4.1.3.4", kinds)


def _combinations(
    cases: Iterable[Case], clause: str, kinds: Iterable[str]
) -> tuple[Combination, ...]:
    present = check_types(kinds)
    made = {
        factors: Combination(_sum_of(factors), clause, factors)
        for case in cases
        if case.principal is None or _acting(case.principal[0], present)
        for factors in _of_case(case, present)
        if factors
    }
    return tuple(made.values())


def _acting(letter: str, present: Sequence[str]) -> list[str]:
    return [kind for kind in _TYPES_OF.get(letter, (letter,)) if kind in present]


def _of_case(case: Case, present: Sequence[str]) -> Iterator[tuple[tuple[str, float], ...]]:
    """Yield the factors of one case: every dead load factor with every companion, and none."""
    principal = {}
    if case.principal is not None:
        letter, factor = case.principal
        principal = {kind: float(factor) for kind in _acting(letter, present)}
    beside = [_companion(companion, present) for companion in case.companions]
    if case.principal is not None and case.principal[0] in TOGETHER:
        beside = [{kind: f for companion in beside for kind, f in companion.items()}]
    for dead in case.dead:
        first = {"D": float(dead)} if "D" in present else {}
        for other in ({}, *filter(None, beside)):
            yield tuple((first | principal | other).items())


def _companion(companion: Companion, present: Sequence[str]) -> dict[str, float]:
    """Return the factors of a companion; live load of storage takes its extra."""
    extra = {"L_st": float(companion.storage_extra)}
    return {
        kind: float(companion.factor) + extra.get(kind, 0.0)
        for kind in _acting(companion.load, present)
    }


def _sum_of(factors: Sequence[tuple[str, float]]) -> str:
    """Write a combination as a sum: ``1.25D + 1.5L``; storage in words: ``1.5L (storage)``."""
    texts = ((PRINTED.get(kind, kind), f"{factor:.12g}") for kind, factor in factors)
    return " + ".join(f"{text if '.' in text else text + '.0'}{kind}" for kind, text in texts)


def cases_of(
    rows: Sequence[Row], combinations: Iterable[Combination], arrangements: Iterable[Arrangement]
) -> Cases:
    """Return every combination with every arrangement as factors on the rows of a solution.

    Dead and other loads act on all spans. Cases that load the beam alike stand once.
    """
    placements = tuple(arrangements)
    kept: dict[tuple[float, ...], LoadCase] = {}
    for combination in combinations:
        factors = dict(combination.factors)
        arranged = any(factors.get(kind) and kind in LIVE for kind, _ in rows)
        for arrangement in placements if arranged else (_EVERYWHERE,):
            row = tuple(
                factors.get(kind, 0.0)
                if kind not in LIVE or not arranged or span in arrangement.spans
                else 0.0
                for kind, span in rows
            )
            kept.setdefault(row, LoadCase(combination.name, arrangement.name))
    return Cases(tuple(kept.values()), np.array(list(kept), dtype=float).reshape(-1, len(rows)))
