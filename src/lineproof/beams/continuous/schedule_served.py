"""What the pieces of bars that run through are for: the places that each of them reaches."""

from __future__ import annotations

import re

from lineproof.beams.continuous.layout import BarRun, BeamOutline

LEAST_PART = 0.1
"""Part of the clear length of a span from which on a bar is for it: laps at supports are less."""
_SPANS = re.compile(r"spans (\d+) to (\d+)")
_PLACE = re.compile(r"(span|support) (\d+)")


def served(outline: BeamOutline, run: BarRun) -> str:
    """Return what a run is for; of several places only those that it reaches.

    A bar is for a support whose axis it crosses and for a span of which it covers a tenth or more.
    """
    whole = [part for text in run.serves.split(", ") for part in _single(text)]
    if len(whole) == 1:
        return run.serves
    kept = [part for part in whole if _reached(outline, run, part)]
    return ", ".join(_together(kept)) or run.serves


def _single(text: str) -> list[str]:
    """Return the spans of ``spans 1 to 3`` one by one."""
    found = _SPANS.fullmatch(text)
    if found is None:
        return [text]
    first, last = map(int, found.groups())
    return [f"span {number}" for number in range(first, last + 1)]


def _reached(outline: BeamOutline, run: BarRun, part: str) -> bool:
    found = _PLACE.fullmatch(part)
    if found is None:
        return True
    number = int(found[2])
    if found[1] == "support":
        return run.start <= outline.axes[number - 1] <= run.end
    start, end = outline.faces(number)
    return min(run.end, end) - max(run.start, start) >= LEAST_PART * (end - start)


def _together(parts: list[str]) -> list[str]:
    """Write places first, spans that follow one another as ``spans 1 to 3``."""
    parts = sorted(parts, key=lambda part: _PLACE.fullmatch(part) is None)
    spans = [part for part in parts if part.startswith("span ")]
    if len(spans) < 2:  # noqa: PLR2004 - one span stands for itself
        return parts
    numbers = [part.removeprefix("span ") for part in spans]
    others = [part for part in parts if part not in spans]
    return [f"spans {numbers[0]} to {numbers[-1]}", *others]
