"""The parts of a calculation being made: opening, finding entries by name, running again."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Mapping
from contextlib import contextmanager
from typing import Any, NoReturn

from lineproof.errors import UserError
from lineproof.record import Entry, Part
from lineproof.record.entry import VALUES
from lineproof.record.uncollected import uncollected

_CALLS_NAMED = 3
_LONGEST_ID = 60


class Parts:
    """Parts by key, the one that is open, and the entries its names stand for.

    ``expected`` names the calls that make the parts a calculation must have, by key.
    """

    def __init__(self) -> None:
        self.expected: dict[str, str] = {}
        self._parts: dict[str, Part] = {}
        self._stopped: dict[str, str] = {}
        self._stopped_calls: dict[str, None] = {}
        self._chapter: dict[str, None] | None = None
        self._closing: Callable[[Part], None] | None = None
        self._part: Part | None = None
        self._scope_of_part: dict[str, Any] = {}
        self._closed_values: dict[str, list[Entry]] = {}

    def _show_part(self, key: str) -> None:
        """Show the part that has just closed."""

    @contextmanager
    def part(self, key: str, title: str) -> Iterator[Part]:
        """Open a part; an existing key is replaced in place. Parts do not nest."""
        if self._part is not None:
            msg = f"part {key!r} opened inside part {self._part.key!r}; close that one first"
            raise UserError(msg)
        check_key(key)
        if self._chapter is not None:
            if key in self._chapter:  # the first would be gone, with its checks
                msg = f"part {key!r} is made twice by one call"
                raise AssertionError(msg)
            self._chapter[key] = None
        part = Part(key, title)
        self._forget(key)
        self._parts[key] = part
        self._part, self._scope_of_part = part, {}
        try:
            yield part
            if self._closing is not None:
                self._closing(part)
            self._keep_apart(part)
        except BaseException:
            self._stopped[key] = title
            raise
        finally:
            self._part = None
            self._add_values(part)
        self._stopped.pop(key, None)
        self._show_part(key)

    @property
    def parts(self) -> tuple[Part, ...]:
        """The parts recorded so far, in order."""
        return tuple(self._parts.values())

    def expect(self, calls: Mapping[str, str]) -> None:
        """Say which parts the calculation must have and the call that makes each.

        A part that was expected before and is no longer is forgotten: with other inputs there
        may be no call left that could make it again.
        """
        for key in self.expected:
            if key not in calls:
                self._forget(key)
                self._parts.pop(key, None)
                self._stopped.pop(key, None)
        self.expected = dict(calls)
        for call in self._stopped_calls.keys() - self.expected.values():
            del self._stopped_calls[call]

    def begin_anew(self) -> None:
        """Forget every part that a call was expected to make, whatever call it was."""
        self.expect({})

    def need(self, *calls: str) -> None:
        """Refuse to go on before what some calls make is recorded, all of it.

        Calls that the calculation does not have are not needed. Raises :class:`UserError`.
        """
        missing = {
            call
            for key, call in self.expected.items()
            if key not in self._parts or key in self._stopped or call in self._stopped_calls
        }
        faults = [f"{call} has not been run, or stopped; run {call} first" for call in calls
                  if call in missing]  # fmt: skip
        if faults:
            raise UserError(faults)

    @contextmanager
    def chapter(self, call: str, closing: Callable[[Part], None] | None = None) -> Iterator[None]:
        """Let every part opened inside belong to one call, whatever parts it comes to make.

        Parts that the call made before and does not make now are forgotten. ``closing`` is called
        with every part before it closes, and may record in it.
        """
        if self._chapter is not None:
            raise UserError(f"{call} was called inside a chapter; call it by itself")
        made: dict[str, None] = {}
        self._chapter, self._closing = made, closing
        self._stopped_calls[call] = None
        try:
            with uncollected():
                yield
            del self._stopped_calls[call]
        finally:
            self._chapter = self._closing = None
            self._expect_of(call, made)

    def _expect_of(self, call: str, made: Mapping[str, None]) -> None:
        """Expect of a call the parts it made; one that stopped is to make those before as well."""
        before = list(self.expected.items())
        if call in self._stopped_calls:
            made = dict(made) | {key: None for key, other in before if other == call}
        place = next((n for n, (_, other) in enumerate(before) if other == call), len(before))
        others = [row for row in before if row[1] != call and row[0] not in made]
        first = sum(row[1] != call and row[0] not in made for row in before[:place])
        mine = [(key, call) for key in made]
        self.expect(dict([*others[:first], *mine, *others[first:]]))

    @property
    def part_entries(self) -> Mapping[str, Entry]:
        """The entries made so far in the open part, by symbol."""
        return self._open_part().entries

    def adopt(self, parts: Iterable[Part]) -> None:
        """Take over recorded parts as they are."""
        for part in parts:
            self._forget(part.key)
            self._parts[part.key] = part
            self._add_values(part)

    def find(self, name: str) -> Entry:
        """Return the entry a name stands for: in the open part, else outside if unique."""
        found: Entry | None = self._scope_of_part.get(name) if self._part is not None else None
        return self._find(name) if found is None else found

    def entries_of(self, key: str) -> dict[str, Entry]:
        """Return the entries of a recorded part by symbol, or name the call to run first."""
        part = self._parts.get(key)
        if part is None or (key in self._stopped and part is not self._part):
            raise UserError(f"part {key!r} is not recorded{self._run_first(key)}")
        return dict(part.entries)

    def entry(self, entry_id: str) -> Entry:
        """Return a recorded entry by its id ``part-key/symbol``."""
        key, _, symbol = entry_id.partition("/")
        part = self._parts.get(key)
        if part is None or symbol not in part.entries:
            raise UserError(f"{entry_id!r} is not recorded{self._run_first(key)}")
        return part.entries[symbol]

    def _run_first(self, key: str) -> str:
        call = self.expected.get(key)
        return f"; run {call} first" if call else ""

    def _open_part(self) -> Part:
        if self._part is None:
            raise UserError("nothing can be recorded outside a part; write 'with sheet.part(...):'")
        return self._part

    def _find(self, name: str) -> Entry:
        values = self._closed_values.get(name, [])
        if len(values) == 1:
            return values[0]
        if values:
            places = ", ".join(entry.id for entry in values)
            raise UserError(
                f"{name} stands in {places}; say which: {name}=sheet.entry({values[0].id!r})"
            )
        calls = [call for key, call in self.expected.items() if key not in self._parts]
        waiting = list(dict.fromkeys(calls))
        more = ", ..." if len(waiting) > _CALLS_NAMED else ""
        hint = f" (not run yet: {', '.join(waiting[:_CALLS_NAMED])}{more})" if waiting else ""
        raise UserError(f"{name} is not recorded{hint}; give it first, or name it {name}=...")

    def _add_values(self, part: Part) -> None:
        """Keep the values of a closed part by symbol: a long beam looks for one in many parts.

        What stands in the open part is in its scope already.
        """
        for symbol, entry in part.entries.items():
            if entry.kind in VALUES:
                self._closed_values.setdefault(symbol, []).append(entry)

    def _forget(self, key: str) -> None:
        """Look for no value in a part any more that is replaced or dropped."""
        part = self._parts.get(key)
        for symbol, entry in part.entries.items() if part else ():
            if entry.kind in VALUES:
                self._closed_values[symbol].remove(entry)

    def _record(self, entry: Entry) -> Entry:
        part = self._open_part()
        if entry.symbol in part.entries:
            self._refuse_place(entry.symbol)
        part.entries[entry.symbol] = entry
        if entry.kind in VALUES:
            self._scope_of_part[entry.symbol] = entry
        return entry

    def stand_for(self, entries: Mapping[str, Entry]) -> None:
        """Let names stand for these entries inside the open part, before what stands elsewhere.

        A beam of several spans has an ``h`` and a ``d`` at every place; the part of a place says
        once which ones it means.
        """
        self._open_part()
        self._scope_of_part.update(entries)

    def take_back(self, symbols: Iterable[str]) -> None:
        """Take entries out of the open part again: what does not close is not recorded."""
        part = self._open_part()
        for symbol in symbols:
            part.entries.pop(symbol, None)
            self._scope_of_part.pop(symbol, None)

    def _keep_apart(self, part: Part) -> None:
        """Refuse in a part of the user's own a symbol that the calculation finds by its name."""
        if part.key in self.expected or self._chapter is not None:
            return
        own = {s for s, entry in part.entries.items() if entry.kind in VALUES}
        taken = [
            f"{symbol} stands in {other.key}/{symbol} already; give your own value another symbol"
            for other in self._parts.values()
            if other.key in self.expected
            for symbol in other.entries
            if symbol in own
        ]
        if taken:
            raise UserError(taken)

    def _refuse_place(self, name: str) -> NoReturn:
        part = self._open_part()
        raise UserError(f"{name} stands twice in part {part.key!r}; use another symbol")

    def _bring_in(self, names: Iterable[str]) -> None:
        for name in names:
            if name not in self._scope_of_part:
                self._scope_of_part[name] = self._find(name)

    def _arguments(self, names: Iterable[str], bound: Mapping[str, Entry]) -> tuple[Entry, ...]:
        self._open_part()
        unknown = [name for name in bound if name not in tuple(names)]
        if unknown:
            raise UserError(f"{unknown[0]} is not a name of the formula; it has {', '.join(names)}")
        args = []
        for name in names:
            entry = bound.get(name, self._scope_of_part.get(name))
            if entry is None:
                entry = self._find(name)
            if not isinstance(entry, Entry) or entry.kind not in VALUES:
                raise UserError(f"{name}: {entry!r} is not a recorded value")
            args.append(entry)
        return tuple(args)

    def _units(self, names: Iterable[str], bound: Mapping[str, Entry]) -> dict[str, str]:
        names = tuple(names)
        return {n: a.unit for n, a in zip(names, self._arguments(names, bound), strict=True)}


def check_key(key: str) -> None:
    """Refuse a key that cannot stand in an id."""
    plain = key.replace("-", "").replace("_", "")
    if not (plain.isascii() and plain.isalnum() and len(key) <= _LONGEST_ID and key[0].isalnum()):
        shown = repr(key[:_LONGEST_ID])
        raise UserError(
            f"key {shown}: use letters, digits and hyphens, {_LONGEST_ID} at most, "
            "such as 'flexure-2'"
        )


def check_calc_id(calc_id: object) -> None:
    """Refuse an id that could not stand in a running head or name an attachment."""
    text = calc_id if isinstance(calc_id, str) else ""
    if not text.strip() or not text.isprintable() or len(text) > _LONGEST_ID:
        raise UserError(
            f"calc id: {ascii(calc_id)[:_LONGEST_ID]} is no short text; write the beam's mark, "
            "such as 'B7'"
        )
