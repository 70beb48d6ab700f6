"""What rests on what: the order of the parts, and what has to be run again."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from lineproof.errors import UserError
from lineproof.record import Entry, Part


def rests_on(entry: Entry) -> Iterator[Entry]:
    """Give the entries that an entry rests on, those of its closing criterion included.

    Left out are those of its own part: values found together close one another.
    """
    yield from entry.args
    for arg in (entry.extra or {}).get("closing_args", ()):
        if arg.part is not entry.part:
            yield arg


def behind(part: Part, parts: Mapping[str, Part]) -> list[Part]:
    """Return the parts that a part rests on, near or far, and itself; in the order recorded."""
    found = {part.key}
    waiting = [part]
    while waiting:
        for entry in waiting.pop().entries.values():
            for key in {arg.part.key for arg in rests_on(entry)} - found:
                if key in parts:
                    found.add(key)
                    waiting.append(parts[key])
    return [other for key, other in parts.items() if key in found]


def in_order(parts: Mapping[str, Part]) -> list[Part]:
    """Return the parts so that each stands behind those it rests on, otherwise as first run.

    A cell run too early opens its part before the one it needs. Raises :class:`UserError` for two
    parts that rest on each other.
    """
    ordered: dict[str, Part] = {}

    def place(part: Part, behind: tuple[str, ...]) -> None:
        if part.key in ordered:
            return
        if part.key in behind:
            raise UserError(
                f"parts {behind[-1]!r} and {part.key!r} rest on each other; "
                "put what both need into a part of its own"
            )
        for entry in part.entries.values():
            for arg in rests_on(entry):
                needed = parts.get(arg.part.key)
                if needed is not None and needed is not part:
                    place(needed, (*behind, part.key))
        ordered[part.key] = part

    for part in parts.values():
        place(part, ())
    return list(ordered.values())


def out_of_date(parts: Mapping[str, Part], expected: Mapping[str, str]) -> list[str]:
    """Return a sentence for each part that rests on something replaced, and the call to run."""
    known: dict[int, bool] = {}

    def is_old(entry: Entry) -> bool:
        """Tell whether an entry was replaced by a different one, or rests on such a one."""
        if id(entry) in known:
            return known[id(entry)]
        waiting = [entry]
        while waiting:  # not by recursion: a calculation may be one long chain
            top = waiting[-1]
            missing = [arg for arg in rests_on(top) if id(arg) not in known]
            if missing:
                waiting.extend(missing)
                continue
            waiting.pop()
            known[id(top)] = _is_replaced(top, parts) or any(known[id(a)] for a in rests_on(top))
        return known[id(entry)]

    faults = []
    for part in parts.values():
        old = [a.id for e in part.entries.values() for a in rests_on(e) if is_old(a)]
        outside = [name for name in dict.fromkeys(old) if name.partition("/")[0] != part.key]
        if outside:
            faults.append(
                f"part {part.key!r} rests on {', '.join(outside)}, which has changed since; "
                f"run {expected.get(part.key, 'it')} again"
            )
    return faults


def _is_replaced(entry: Entry, parts: Mapping[str, Part]) -> bool:
    part = parts.get(entry.part.key)
    current = part.entries.get(entry.symbol) if part is not None else None
    # Run again with nothing changed, an entry has the same digest: nothing is out of date.
    return current is not entry and (current is None or current.digest != entry.digest)
