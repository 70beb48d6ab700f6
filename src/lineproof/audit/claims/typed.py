"""A claimed number as people and spreadsheets write it: what is read, what is refused and why."""

from __future__ import annotations

import re
from collections.abc import Callable

from lineproof.audit.graph import Node
from lineproof.errors import UserError
from lineproof.quantity import echo, read_quantity
from lineproof.quantity.digits import MINUS
from lineproof.quantity.typed import Typed

_BARE = re.compile(r"[+-]?[\d.,' ]+(?:[eE][+-]?\d+)?\Z")
_DASHES = rf"[{MINUS}\u2010-\u2015\ufe63\uff0d]"
"""Hyphens and dashes that a program of texts or a spreadsheet puts for a minus."""
_MINUS = re.compile(rf"{_DASHES}(?= ?[\d.])")
_NO_UNIT = re.compile(rf"{_DASHES}|-\Z")
_GROUPED = re.compile(r"([+-]?\d{1,3})((?:[ ,.'’]\d{3})+)([.,]\d+)?(?![\d,.'’ ]*\d)")
"""Digits in groups of three: 12 300, 12,300.5, 12.300,5."""
_MONTH = r"(?:jan|feb|mar|apr|may|jun|jul|aug|sep|oct|nov|dec)"
_DATE = re.compile(
    r"\d{4}-\d\d-\d\d.*|\d{1,2}[/.]\d{1,2}[/.]\d{2,4}|.*\(a date\)"
    rf"|\d{{1,2}}-{_MONTH}(?:-\d{{2,4}})?|{_MONTH}-\d{{2,4}}",
    re.IGNORECASE,
)
DATE_ADVICE = "type it again in a cell of the format text"
_PERCENT = re.compile(r"([+-]?\d*\.?\d+) ?%\Z")
_STORED = re.compile(r"(\S+) \(((?:shown (?:in|as|with|without)|hidden by) .+)\)\Z")
"""A number of a workbook whose format shows another, as ``claims.shown`` tells it."""
_BRACKETS = re.compile(r"\(([\d.]+)\)|([\d.]+)-\Z")
_ERROR = re.compile(r"#[A-Z]")
_AT_SPACING = re.compile(r"@|\b[oc]\.?/?c\b", re.IGNORECASE)
_POWER = re.compile(
    r"(?<=[\d.]) ?[×x*·⋅•] ?10(?:(?:\^|\*\*)\(?([+-]?\d{1,2})\)?|([⁺⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]{1,2}))(?![\d.])"
)
"""A power of ten as written by hand: 1.66×10⁹, 1.66 x 10^9."""
_RAISED = str.maketrans("⁺⁻⁰¹²³⁴⁵⁶⁷⁸⁹", "+-0123456789")
_COUNTED = re.compile(r"([+-]?\d+\.?\d*) [A-Za-z].*")


def is_date(text: str) -> bool:
    """Tell whether a text is a date, which a spreadsheet may have made of what was typed."""
    return _DATE.fullmatch(text) is not None


def read_claimed(node: Node, typed: str, unit: str) -> Typed:
    """Return the number claimed for a line; ``unit`` is that of its column, for a bare number.

    Any dash before the digits is a minus. Raises :class:`UserError` with what to write where a
    text may be read in two ways, or in none.
    """
    text = _POWER.sub(_as_typed, _MINUS.sub("-", " ".join(typed.split())))
    refused = _refused(node, text)
    if refused:
        raise UserError(f"{echo(typed)} {refused}")
    own = "" if not node.unit and _NO_UNIT.fullmatch(unit) else unit
    whole = f"{text} {own}".strip() if _BARE.match(text) else text
    counted = not node.unit and _COUNTED.fullmatch(whole)
    if counted:
        raise UserError(
            f"{node.symbol}: {echo(whole)} has a unit, and this line has none; write {counted[1]!r}"
        )
    return read_quantity(node.symbol, whole, node.unit)


def _as_typed(power: re.Match[str]) -> str:
    return f"e{power[1] or power[2].translate(_RAISED)}"


def _refused(node: Node, text: str) -> str:
    """Say why a text is no claim, and what to write; nothing where it may be one."""
    return next((said for refuse in _REFUSALS if (said := refuse(node, text))), "")


def _as_groups(_: Node, text: str) -> str:
    grouped = _grouped(text)
    return f"has marks between its digits; write {grouped}" if grouped else ""


def _as_date(_: Node, text: str) -> str:
    return f"is a date that a spreadsheet made; {DATE_ADVICE}" if is_date(text) else ""


def _as_format(_: Node, text: str) -> str:
    stored = _STORED.match(text)
    if stored is None:
        return ""
    return f"holds {stored[1]}, {stored[2]}; write the number meant as a plain one"


def _as_percent(node: Node, text: str) -> str:
    percent = _PERCENT.match(text)
    if percent is None:
        return ""
    share = f"{float(percent[1]) / 100:.10g}"
    return f"is in percent; write {repr(share) if not node.unit else 'the value'}"


def _as_negative(_: Node, text: str) -> str:
    turned = _BRACKETS.fullmatch(text)
    if turned is None:
        return ""
    number = turned[1] or turned[2]
    return f"may be a negative number or not; write '-{number}' or {number!r}"


def _as_spacing(node: Node, text: str) -> str:
    if _AT_SPACING.search(text) is None:
        return ""
    sample = f"200 {node.unit}".strip()
    return f"names bars or their spacing; write the number alone, such as {sample!r}"


def _as_none(node: Node, text: str) -> str:
    if _ERROR.match(text):
        return "is an error of a spreadsheet; write the value, or leave the cell empty"
    if any(sign.isdigit() for sign in text):
        return ""
    sample = f"25 {node.unit}".strip()
    return f"holds no number; write for example {sample!r}, or leave the cell empty"


_REFUSALS: tuple[Callable[[Node, str], str], ...] = (
    _as_groups, _as_date, _as_format, _as_percent, _as_negative, _as_spacing, _as_none,
)  # fmt: skip


def _grouped(text: str) -> str:
    """Return what to write for digits in groups; nothing where there are none, as in 1.207."""
    found = _GROUPED.match(text)
    if found is None:
        return ""
    marks = set(re.sub(r"\d", "", found[2]))
    tail = found[3] or ""
    if len(marks) > 1 or tail[:1] in marks or (marks == {"."} and not tail):
        return ""
    whole = found[1] + re.sub(r"\D", "", found[2])
    if marks == {","} and not tail and len(found[2]) == len(",000"):
        return f"{whole!r}, or {found[0].replace(',', '.')!r} if the comma is the decimal point"
    return repr(whole + tail.replace(",", "."))
