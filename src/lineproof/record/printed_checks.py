"""Checking what a record prints and hashes against what it holds."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from decimal import Decimal
from functools import lru_cache
from typing import Any

from lineproof.formula import parse_criterion
from lineproof.formula.compiled import PLAIN_COMPARE
from lineproof.quantity import read_quantity
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
    rested_on,
)
from lineproof.record.utilisation import ratio_of_texts

_MOST_KEPT = 8192
"""Printed numbers that are kept as read: the same ones stand in many lines."""
_LEAST_DIGITS = 3
_LAST_BITS = 1e-9
"""Relative difference that is nobody's to judge: the last bits of a value."""
_NEARLY = 1e-5
"""Distance from the limit, relative to it, above which floats are exact enough."""
Data = Mapping[str, Any]
Finding = tuple[str, str, str]
"""What differs, as stored, as it should be."""


def rounds_to(text: str, value: float) -> bool:
    """Tell whether a printed number is ``value`` rounded to the digits that it shows.

    >>> rounds_to("551", 550.8), rounds_to("552", 550.8), rounds_to("12300", 12345.0)
    (True, False, True)
    """
    number, half, last = _read(text)
    missed, room = abs(number - value), half + abs(value) * _LAST_BITS
    if abs(missed - room) > room * _NEARLY:
        return missed < room
    # So near to the limit only decimals can tell.
    exact = Decimal(value)
    room_left = Decimal(5).scaleb(last - 1) + abs(exact) * Decimal(str(_LAST_BITS))
    return abs(Decimal(text) - exact) <= room_left


@lru_cache(maxsize=_MOST_KEPT)
def _read(text: str) -> tuple[float, float, int]:
    """Return a printed number, half a unit of its last digit, and the power of ten of that unit."""
    mantissa, _, power = text.lstrip("-").partition("e")
    whole, _, decimals = mantissa.partition(".")
    last = int(power or 0) - len(decimals)
    if not power and not decimals and whole != "0":
        # Zeros hold the place, but at least three digits are digits.
        zeros = len(whole) - len(whole.rstrip("0"))
        last = max(0, min(zeros, len(whole) - _LEAST_DIGITS))
    return float(text), float(f"5e{last - 1}"), last


def printed_value(printed: Data, value: float) -> Iterator[Finding]:
    """Compare a printed result (and the coherent one) with a value in internal units."""
    places = [printed, printed["coherent"]] if printed.get("coherent") else [printed]
    for place in places:
        again = value / internal_factor(place["unit"])
        if not rounds_to(place["result"], again):
            yield "print", f"{place['result']} {place['unit']}", f"{again:.10g}"


def printed_typed(entry: Data) -> Iterator[Finding]:
    """Compare what is printed of a given with what was typed."""
    printed, typed = entry["printed"], read_quantity(entry["symbol"], entry["typed"], entry["unit"])
    number, unit = printed["result"], printed["unit"]
    if "typed" in printed:
        number, unit = printed["typed"], printed["typed_unit"]
    if (number, unit) != (typed.number, typed.unit):
        yield "print", f"{number} {unit}", f"{typed.number} {typed.unit}"


def printed_arguments(entry: Data, values: Mapping[str, float], units: Data) -> Iterator[Finding]:
    """Compare printed arguments with the values of the entries they stand for."""
    system, args = entry.get("system", "N-mm"), entry["args"]
    for name, text in entry["printed"]["args"].items():
        target = args[name]
        again = values[target] / system_factor(units[target], system)
        if not rounds_to(text, again):
            yield f"print of {name}", text, f"{again:.10g}"


def printed_comparison(test: Data, sides: tuple[float, float]) -> Iterator[Finding]:
    """Compare both printed sides with the values, and their truth with the recorded one."""
    printed, scale = test["printed"], internal_factor(test["unit"])
    for text, side in zip((printed["left"], printed["right"]), sides, strict=True):
        if not rounds_to(text, side / scale):
            yield "print", text, f"{side / scale:.10g}"
    sign = parse_criterion(test["formula"])[1]
    if PLAIN_COMPARE[sign](Decimal(printed["left"]), Decimal(printed["right"])) != test["holds"]:
        yield "printed comparison", f"{printed['left']} {sign} {printed['right']}", "another truth"


def printed_utilisation(entry: Data, ratio: float | None) -> Iterator[Finding]:
    """Compare a check's utilisation with the one of its sides."""
    stored, again = entry.get("utilisation"), "none" if ratio is None else f"{ratio:.10g}"
    if (stored is None) != (ratio is None):
        yield "utilisation", str(stored), again
    elif stored is not None and ratio is not None:
        text = entry["printed"]["utilisation"]
        agrees = rounds_to(text, ratio) or _ratio_of_sides(entry, text)
        if abs(stored - ratio) > 1e-9 * abs(ratio) or not agrees:
            yield "utilisation", f"{stored:.10g} ({text})", again


def _ratio_of_sides(test: Data, text: str) -> bool:
    """Tell whether a printed ratio is that of the printed sides, as of a residual cut short."""
    sign = parse_criterion(test["formula"])[1]
    left, right = test["printed"]["left"], test["printed"]["right"]
    return ratio_of_texts(sign, left, right, -len(text.partition(".")[2])) == text


def digests(entries: Mapping[str, Data]) -> dict[str, str]:
    """Return the digest of each entry, hashed again from the record's own texts."""
    made: dict[str, str] = {}
    for entry_id, entry in entries.items():
        named = entry["kind"] in (LINE, FOUND, *CRITERIA)
        on = rested_on(
            [
                (name if named else "", made[target])
                for name, target in entry.get("args", {}).items()
            ]
        )
        made[entry_id] = digest_of(entry["kind"], entry["symbol"], *_pieces(entry), *on)
    return made


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


def whole(data: Data, entries: Mapping[str, Data]) -> Iterator[Finding]:
    """Compare the record's own digest and its list of failed checks with its entries."""
    again = record_digest(data["calc"]["id"], data["codes"], entries.values())
    if again != data["digest"]:
        yield "digest", data["digest"], again
    failed = [i for i, e in entries.items() if e["kind"] == CHECK and not e["holds"]]
    if failed != data["status"]["failed"]:
        yield "failed checks", str(data["status"]["failed"])[:80], str(failed)[:80]
