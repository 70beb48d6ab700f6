"""Slips that several origins have in common: a wrong constant used in five lines is told once."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from lineproof.audit.data import Audit, Cause, Verdict
from lineproof.audit.findings import SOURCE
from lineproof.audit.slips.search import WHEREVER

_LEAST = 2
"""Origins that a slip must explain to be shared."""


def shared_slips(audit: Audit) -> tuple[str, ...]:
    """Return a sentence for each slip that reproduces several origins, by the findings' numbers.

    Findings are counted as they are told, from 1. Only one value put for another counts, such as a
    constant or an input; what is done to a result, as a sign turned, is another slip in each line.
    Nothing is said of a slip that explains no more than another one does. Each origin stays a
    finding of its own.
    """
    numbers = {f.ids[0]: n for n, f in enumerate(audit.findings, 1) if f.source == SOURCE and f.ids}
    found: dict[str, dict[int, None]] = {}
    for number, words in _causes(audit, numbers):
        found.setdefault(words, {})[number] = None
    told: list[tuple[set[int], str]] = []
    for words, explained in sorted(found.items(), key=lambda pair: -len(pair[1])):
        group = set(explained)
        if len(group) >= _LEAST and not any(group <= other for other, _ in told):
            told.append((group, words))
    return tuple(_sentence(sorted(group), words) for group, words in told)


def _causes(audit: Audit, numbers: Mapping[str, int]) -> Iterator[tuple[int, str]]:
    """Give the causes of origins in words, with the number of the finding, the likeliest first."""
    for judged in audit.judged:
        if judged.verdict is Verdict.ORIGIN and judged.id in numbers:
            for slip in judged.slips:
                for cause in slip.causes:
                    if _is_of_a_value(cause, judged.id):
                        yield numbers[judged.id], cause.words.removesuffix(WHEREVER)


def _is_of_a_value(cause: Cause, entry_id: str) -> bool:
    return bool(cause.replaced) and cause.replaced != entry_id


def _sentence(numbers: list[int], words: str) -> str:
    named = f"{', '.join(map(str, numbers[:-1]))} and {numbers[-1]}"
    return f"One slip reproduces findings {named} alike: {words}."
