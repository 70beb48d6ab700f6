"""Checking what a record prints and hashes against what it holds."""

from __future__ import annotations

from collections.abc import Mapping
from decimal import Decimal
from functools import lru_cache
from typing import Any

from lineproof.formula import parse_criterion
from lineproof.formula.compiled import PLAIN_COMPARE
from lineproof.quantity.typed import Typed
from lineproof.quantity.units import internal_factor, system_factor
from lineproof.record.build import record_digest
from lineproof.record.entry import (
    CHECK,
    CRITERIA,
    FIGURE,
    FOUND,
    GIVEN,
    LINE,
    LOOKUP,
    NOTE,
    digest_of,
)
from lineproof.record.utilisation import ratio_of_texts

_MOST_KEPT = 8192
"""Printed numbers that are kept as read and as compared: the same ones stand in many lines."""
_LEAST_DIGITS = 3
_NAMED = (LINE, FOUND, *CRITERIA)
"""Kinds whose digest names what they rest on; figures and tables only show it."""
_LAST_BITS = 1e-9
"""Relative difference that is nobody's to judge: the last bits of a value."""
_NEARLY = 1e-5
"""Distance from the limit, relative to it, above which floats are exact enough."""
Data = Mapping[str, Any]
Finding = tuple[str, str, str]
"""What differs, as stored, as it should be."""


@lru_cache(maxsize=_MOST_KEPT)
def rounds_to(text: str, value: float) -> bool:
    """Tell whether a printed number is ``value`` rounded to the digits that it shows.

    >>> rounds_to("551", 550.8), rounds_to("552", 550.8), rounds_to("12300", 12345.0)
    (True, False, True)
    """
    number, half, last, surely = _read(text)
    missed = abs(number - value)
    if missed < surely:
        return True
    room = half + abs(value) * _LAST_BITS
    if abs(missed - room) > room * _NEARLY:
        return missed < room
    # So near to the limit only decimals can tell.
    exact = Decimal(value)
    room_left = Decimal(5).scaleb(last - 1) + abs(exact) * Decimal(str(_LAST_BITS))
    return abs(Decimal(text) - exact) <= room_left


@lru_cache(maxsize=_MOST_KEPT)
def _read(text: str) -> tuple[float, float, int, float]:
    """Return a printed number, half a unit of its last digit, the power of ten of that unit.

    Last comes the distance from the number within which a float surely rounds to it.
    """
    mantissa, _, power = text.lstrip("-").partition("e")
    whole, _, decimals = mantissa.partition(".")
    last = int(power or 0) - len(decimals)
    if not power and not decimals and whole != "0":
        # Zeros hold the place, but at least three digits are digits.
        zeros = len(whole) - len(whole.rstrip("0"))
        last = max(0, min(zeros, len(whole) - _LEAST_DIGITS))
    half = float(f"5e{last - 1}")
    return float(text), half, last, half * (1 - _NEARLY)


def printed_value(printed: Data, value: float) -> list[Finding]:
    """Compare a printed result (and the coherent one) with a value in internal units."""
    found = []
    for place in (printed, printed.get("coherent")):
        if place:
            again = value / internal_factor(place["unit"])
            if not rounds_to(place["result"], again):
                found.append(("print", f"{place['result']} {place['unit']}", f"{again:.10g}"))
    return found


def printed_typed(entry: Data, typed: Typed) -> list[Finding]:
    """Compare what is printed of a given with what was typed."""
    printed = entry["printed"]
    number, unit = printed["result"], printed["unit"]
    if "typed" in printed:
        number, unit = printed["typed"], printed["typed_unit"]
    if (number, unit) == (typed.number, typed.unit):
        return []
    return [("print", f"{number} {unit}", f"{typed.number} {typed.unit}")]


def printed_arguments(entry: Data, named: Mapping[str, float], units: Data) -> list[Finding]:
    """Compare printed arguments with the values by name, which stand in ``units`` by id."""
    system, args = entry.get("system", "N-mm"), entry["args"]
    found = []
    for name, text in entry["printed"]["args"].items():
        again = named[name] / system_factor(units[args[name]], system)
        if not rounds_to(text, again):
            found.append((f"print of {name}", text, f"{again:.10g}"))
    return found


def printed_comparison(test: Data, sides: tuple[float, float]) -> list[Finding]:
    """Compare both printed sides with the values, and their truth with the recorded one."""
    printed, scale = test["printed"], internal_factor(test["unit"])
    left, right = printed["left"], printed["right"]
    found = [
        ("print", text, f"{side / scale:.10g}")
        for text, side in zip((left, right), sides, strict=True)
        if not rounds_to(text, side / scale)
    ]
    sign = parse_criterion(test["formula"])[1]
    if PLAIN_COMPARE[sign](Decimal(left), Decimal(right)) != test["holds"]:
        found.append(("printed comparison", f"{left} {sign} {right}", "another truth"))
    return found


def printed_utilisation(entry: Data, ratio: float | None) -> list[Finding]:
    """Compare a check's utilisation with the one of its sides."""
    stored, again = entry.get("utilisation"), "none" if ratio is None else f"{ratio:.10g}"
    if stored is None or ratio is None:
        return [] if stored is ratio else [("utilisation", str(stored), again)]
    text = entry["printed"]["utilisation"]
    agrees = rounds_to(text, ratio) or _ratio_of_sides(entry, text)
    if abs(stored - ratio) <= 1e-9 * abs(ratio) and agrees:
        return []
    return [("utilisation", f"{stored:.10g} ({text})", again)]


def _ratio_of_sides(test: Data, text: str) -> bool:
    """Tell whether a printed ratio is that of the printed sides, as of a residual cut short."""
    sign = parse_criterion(test["formula"])[1]
    left, right = test["printed"]["left"], test["printed"]["right"]
    return ratio_of_texts(sign, left, right, -len(text.partition(".")[2])) == text


def hashed(entries: Mapping[str, Data]) -> list[tuple[str, Finding]]:
    """Return the ids whose digest is not that of the record's own texts, hashed again."""
    made: dict[str, str] = {}
    found = []
    for entry_id, entry in entries.items():
        kind, args = entry["kind"], entry.get("args", {})
        if kind in _NAMED:
            on = [f"{name}={made[target]}" for name, target in args.items()]
        else:
            on = [f"={made[target]}" for target in args.values()]
        again = digest_of(kind, entry["symbol"], *_pieces(entry), *sorted(on))
        made[entry_id] = again
        if again != entry["digest"]:
            found.append((entry_id, ("digest", entry["digest"], again)))
    return found


def _pieces(entry: Data) -> tuple[str, ...]:
    kind = entry["kind"]
    if kind == LINE or kind in CRITERIA:
        return entry["formula"], entry["unit"], entry["clause"]
    if kind == GIVEN:
        return entry["typed"], entry["unit"]
    if kind == LOOKUP:
        return entry["table"], entry["row"], entry["printed"]["result"], entry["unit"]
    if kind == FOUND:
        made, settings = entry["procedure"], sorted(entry["settings"].items())
        pieces = [f"{k}={v!r}" for k, v in settings]
        return made["name"], str(made["version"]), *pieces, entry["closing"]["formula"]
    text = {FIGURE: entry.get("alt"), NOTE: entry.get("text")}.get(kind, entry["title"])
    return entry["title"], str(text)


def whole(data: Data, entries: Mapping[str, Data]) -> list[Finding]:
    """Compare the record's own digest and its list of failed checks with its entries."""
    found = []
    again = record_digest(data["calc"]["id"], data["codes"], entries.values())
    if again != data["digest"]:
        found.append(("digest", data["digest"], again))
    failed = [i for i, e in entries.items() if e["kind"] == CHECK and not e["holds"]]
    if failed != data["status"]["failed"]:
        found.append(("failed checks", str(data["status"]["failed"])[:80], str(failed)[:80]))
    return found
