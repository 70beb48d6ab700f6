"""Numbers of a workbook as its spreadsheet shows them: decimals, unit and sign of a format.

A format such as ``0.00" kN";[Red]0.00" kN"`` has a section for positive numbers and zero, one for
negative numbers, and one for zero, or conditions in their place; each holds places for digits
between texts. What a checker sees is what is claimed, so 0.5 under ``0.00" m"`` is ``0.50 m``.
"""

from __future__ import annotations

import operator
import re
from dataclasses import dataclass
from decimal import ROUND_HALF_UP, Decimal, localcontext

from lineproof.quantity import echo
from lineproof.quantity.digits import MINUS

_GENERAL_DIGITS = 10
_MOST_DECIMALS = 20
_TOKEN = re.compile(
    r'"(?P<quoted>[^"]*)"?|\\(?P<escaped>.)|_(?P<space>.)|\*.|\[(?P<bracket>[^\]]*)\]|(?P<plain>.)',
    re.DOTALL,
)
_CONDITION = re.compile(r"(<=|>=|<>|<|>|=)\s*(-?\d+(?:\.\d+)?)\Z")
_COLOUR = re.compile(r"black|blue|cyan|green|magenta|red|white|yellow|colou?r ?\d+", re.IGNORECASE)
_CORE = re.compile(
    r"general|(?:[0#?][0#?, ]*|(?=\.[0#?]))(?:\.[0#?]*)?(?:E[+-][0#?]+)?", re.IGNORECASE
)
_SCALED = re.compile(r"[0#?],+(?![0#?,])")
_POWERS = re.compile(r"0(?:\.(0+))?E\+0+\Z", re.IGNORECASE)
_COMPARED = {
    "<": operator.lt, "<=": operator.le, ">": operator.gt, ">=": operator.ge,
    "=": operator.eq, "<>": operator.ne,
}  # fmt: skip
_STARTS_A_FORMULA = ("=", "＝", "@", "＠", "+", "-", "'")


@dataclass(frozen=True, slots=True)
class _Section:
    """One section of a format: the places of its digits, and the texts around them.

    In ``pattern`` every character of a quoted text is a zero byte: it keeps its place and means
    nothing.
    """

    pattern: str
    texts: str
    condition: tuple[str, float] | None
    red: bool


def shown_number(value: float, shown: str) -> str:
    """Return a number as a format shows it, with the unit that the format holds.

    What shows another number than the cell holds is told in brackets, for a reader to refuse.

    >>> shown_number(0.5, "0.00"), shown_number(620.0, '0.0" mm"'), shown_number(-3.0, "0.0;(0.0)")
    ('0.50', '620.0 mm', '-3.0')
    >>> shown_number(0.5, "0%"), shown_number(6.0, ";;;"), shown_number(-6.0, "0;0")
    ('0.5 (shown in percent)', '6 (hidden by its format)', '-6 (shown without its sign)')
    """
    sections = _sections(shown)
    section, own = _chosen(sections, value)
    if section is None:
        return f"{_general(value)} (hidden by its format)"
    return _in_section(section, value, own_sign=own)


def _sections(shown: str) -> list[_Section]:
    """Return the sections of a format; texts may hold semicolons of their own."""
    made: list[_Section] = []
    pattern: list[str] = []
    texts: list[str] = []
    condition, red = None, False
    for token in _TOKEN.finditer(f"{shown};"):
        plain = token["plain"]
        if plain == ";":
            made.append(_Section("".join(pattern), "".join(texts), condition, red))
            pattern, texts, condition, red = [], [], None, False
        elif token["bracket"] is not None:
            bracket = token["bracket"]
            found = _CONDITION.match(bracket)
            condition = (found[1], float(found[2])) if found else condition
            red = red or _COLOUR.fullmatch(bracket) is not None
            currency = bracket[1:].partition("-")[0] if bracket.startswith("$") else ""
            pattern.append("\0" * len(currency))
            texts.append(currency)
        elif plain is not None:
            pattern.append(plain)
            texts.append(plain)
        else:
            text = (
                token["quoted"] or token["escaped"] or ("" if token["quoted"] is not None else " ")
            )
            pattern.append("\0" * len(text))
            texts.append(text)
    return made


def _chosen(sections: list[_Section], value: float) -> tuple[_Section | None, bool]:
    """Return the section that shows a value, and whether it is to show the sign itself."""
    if any(section.condition for section in sections):
        for section in sections:
            if section.condition is None:
                return section, False
            compare, bound = section.condition
            if _COMPARED[compare](value, bound):
                return section, False
        return sections[-1], False
    if value < 0 and len(sections) > 1:
        return _visible(sections[1]), True
    if value == 0 and len(sections) > 2:  # noqa: PLR2004 - the third section is that of zero
        return _visible(sections[2]) or sections[0], False
    return _visible(sections[0]), False


def _visible(section: _Section) -> _Section | None:
    return section if section.texts.strip() else None


def _in_section(section: _Section, value: float, *, own_sign: bool) -> str:
    """Return a value as a section shows it; ``own_sign``: a section of negative numbers alone."""
    core = None if "/" in section.pattern else _CORE.search(section.pattern)  # a fraction
    other = _shows_another(section, value)
    if core is None or other:
        return f"{_general(value)} {other}".strip()
    before = section.texts[: core.start()].strip()
    after = section.texts[core.end() :].strip()
    number = _digits(abs(value), core[0])
    if value < 0 and number.strip("0."):
        number = f"-{number}"
    if own_sign:
        brackets = before[:1] == "(" and after[-1:] == ")"
        if not (brackets or before[:1] in ("-", MINUS) or section.red):
            return f"{_general(value)} (shown without its sign)"
        before = before.lstrip(f"-{MINUS}(")
        after = after.removesuffix(")") if brackets else after
    if value == 0:
        before = before.removeprefix("-")  # a dash for zero
    return _with_texts(before.strip().removeprefix("+"), number, after.strip())


def _shows_another(section: _Section, value: float) -> str:
    """Say that a section shows another number than the cell holds; "" where it shows that one."""
    bare = section.pattern.replace("\0", "")
    if "%" in bare:
        return "(shown in percent)"
    if _SCALED.search(bare):
        return "(shown in thousands)"
    if _CORE.search(section.pattern) or value == 0 or "@" in bare:
        return ""  # zero may be a dash; @ is the format of text
    return f"(shown as {echo(section.texts.strip())})"


def _with_texts(before: str, number: str, after: str) -> str:
    if before.startswith(_STARTS_A_FORMULA):
        return f"{number} (shown with {echo(before)} before it)"
    return " ".join(text for text in (before, number, after) if text)


def _digits(size: float, core: str) -> str:
    """Return the size of a number in the places of a section."""
    powers = _POWERS.match(core)
    if powers:
        return f"{size:.{min(len(powers[1] or ''), _MOST_DECIMALS)}e}"
    if core.lower() == "general" or "e" in core.lower():
        return _general(size)
    _, _, decimals = core.replace(" ", "").replace(",", "").partition(".")
    most, least = len(decimals), len(decimals.rstrip("#?"))
    text = _rounded(size, min(most, _MOST_DECIMALS))
    if most > least and "." in text:
        whole, _, after = text.partition(".")
        kept = after[:least] + after[least:].rstrip("0")
        text = f"{whole}.{kept}" if kept else whole
    return text


def _rounded(size: float, decimals: int) -> str:
    """Return a number to decimals as a spreadsheet rounds it: halves of what it shows, upward."""
    with localcontext() as context:
        context.prec = 400  # more than any float has digits before and behind its point
        exact = Decimal(repr(size)).quantize(Decimal(1).scaleb(-decimals), ROUND_HALF_UP)
    return f"{exact:f}"


def _general(value: float) -> str:
    return str(value) if isinstance(value, int) else f"{value:.{_GENERAL_DIGITS}g}"
