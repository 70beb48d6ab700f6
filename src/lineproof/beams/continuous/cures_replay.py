"""A recorded check computed again with some of the values that it rests on changed.

What is recorded is the calculation itself: the formulas between a changed value and the check are
evaluated once more, in their order. Moments, shears, torsions and reactions stay as they are. Where
a decision on the way would fall the other way, other formulas would count, and nothing is said.
"""

from __future__ import annotations

from collections import deque
from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from lineproof.beams.continuous.cures import part_used
from lineproof.record import Entry
from lineproof.record.entry import CRITERIA, DECISION, FOUND, LINE
from lineproof.record.procedures import run
from lineproof.standards.a23_3 import crack_control

FORCES = frozenset(("M_f", "M_s", "V_f", "T_f", "R_f", "v_f"))
"""Values that stay as they are, whatever is changed."""
_EITHER_WAY = frozenset({crack_control.ALLOWANCE_DOES.key})
"""Decisions that may fall as they will: what is calculated holds where less would do as well."""


class AnotherCaseError(ValueError):
    """A decision falls the other way with the changed values: other formulas would count."""


def bound_names(check: Entry) -> dict[str, Entry]:
    """Return what every name stands for in a check and behind it; the nearest use of a name."""
    made: dict[str, Entry] = {}
    waiting, seen = deque([check]), {id(check)}
    while waiting:
        entry = waiting.popleft()
        for name, arg in zip(_names(entry), entry.args, strict=True):
            made.setdefault(name, arg)
            if id(arg) not in seen:
                seen.add(id(arg))
                if arg.symbol not in FORCES:
                    waiting.append(arg)
    return made


def behind(check: Entry) -> list[Entry]:
    """Return the check and the entries behind it, each after what it rests on; no forces' origin.

    >>> from lineproof.sheet import Sheet
    >>> sheet = Sheet("B1")
    >>> with sheet.part("bars", "Bars"):
    ...     A_b, A_sr = sheet.given("A_b", "500 mm2"), sheet.given("A_sr", "1900 mm2")
    ...     A_s = sheet.line("A_s = 4*A_b", unit="mm2")
    ...     made = sheet.check("A_sr <= A_s", key="enough", unit="mm2")
    >>> [entry.symbol for entry in behind(made)]
    ['A_sr', 'A_b', 'A_s', 'enough']
    """
    order: dict[int, Entry] = {}
    waiting = [(check, False)]
    while waiting:
        entry, ready = waiting.pop()
        if id(entry) in order:
            continue
        if ready or entry.kind not in (LINE, FOUND, *CRITERIA) or entry.symbol in FORCES:
            order[id(entry)] = entry
            continue
        waiting.append((entry, True))
        waiting.extend((arg, False) for arg in reversed(entry.args))
    return list(order.values())


def _names(entry: Entry) -> Iterable[str]:
    """Return the names of the entries that an entry rests on."""
    if entry.kind in (LINE, FOUND, *CRITERIA):
        return tuple(entry.source.names)
    return ()


@dataclass(frozen=True, eq=False)
class Replay:
    """The utilisation of a check as a function of changed values of some entries.

    ``roots`` names the entries that may be changed. Calling it raises :class:`AnotherCaseError`
    where a decision would fall the other way.
    """

    check: Entry
    roots: Mapping[str, tuple[Entry, ...]]
    steps: tuple[Entry, ...]

    @classmethod
    def of(
        cls, check: Entry, roots: Mapping[str, tuple[Entry, ...]], apart: Iterable[Entry] = ()
    ) -> Replay:
        """Return the replay of a check; ``roots`` are the entries that one name changes.

        Decisions that stand ``apart`` may fall as they will.
        """
        changed = {id(entry) for entries in roots.values() for entry in entries}
        order = _touched(behind(check), changed)
        free = {id(entry) for entry in apart}
        decisions = [d for d in _decisions(order, check) if id(d) not in free]
        whole = {id(e): e for d in decisions for e in behind(d)}
        return cls(check, roots, tuple(_touched([*whole.values(), *order], changed)))

    def __call__(self, changes: Mapping[str, float]) -> float:
        """Return left over right side with the changed values: it holds up to 1."""
        values = {id(entry): value for name, value in changes.items() for entry in self.roots[name]}
        for entry in self.steps:
            if id(entry) in values or entry is self.check:
                continue
            if entry.kind == DECISION:
                self._same(entry, _sides(entry, values))
            elif entry.kind in (LINE, FOUND):
                values[id(entry)] = _again(entry, values)
        return part_used(self.check.source, *_sides(self.check, values))

    @property
    def touches(self) -> bool:
        """Tell whether the check rests on what may be changed at all."""
        return any(entry is self.check for entry in self.steps)

    def _same(self, decision: Entry, sides: tuple[float, float]) -> None:
        if decision.source.holds(*sides) != bool(decision):
            raise AnotherCaseError(decision.id)


def _sides(entry: Entry, values: Mapping[int, float]) -> tuple[float, float]:
    args = [values.get(id(arg), arg.value) for arg in entry.args]
    left, right = (side(*args) for side in entry.source.functions)
    return left, right


def _touched(order: Iterable[Entry], changed: set[int]) -> list[Entry]:
    """Return the entries that rest on changed ones, in order, each once; the check comes last."""
    known, made = set(changed), {}
    for entry in order:
        if entry.symbol in FORCES and id(entry) not in changed:
            continue
        if id(entry) not in changed and any(id(arg) in known for arg in entry.args):
            known.add(id(entry))
            made[id(entry)] = entry
    return list(made.values())


def _decisions(touched: Iterable[Entry], check: Entry) -> Iterable[Entry]:
    """Give the decisions that stand, in their parts, before what rests on changed values."""
    last: dict[int, Entry] = {}
    for entry in (*touched, check):
        last[id(entry.part)] = _later(last.get(id(entry.part), entry), entry)
    for entry in last.values():
        for each in entry.part.entries.values():
            if each is entry:
                break
            if each.kind == DECISION and each.source.key not in _EITHER_WAY:
                yield each


def _later(one: Entry, other: Entry) -> Entry:
    order = list(one.part.entries.values())
    return max(one, other, key=order.index)


def _again(entry: Entry, values: Mapping[int, float]) -> float:
    """Compute a line or a found value with changed arguments."""
    args = [values.get(id(arg), arg.value) for arg in entry.args]
    source = entry.source
    if entry.kind == FOUND:
        named = dict(zip(source.names, args, strict=True))
        return run(source.procedure, named, source.settings)
    return float(source.function(*args))
