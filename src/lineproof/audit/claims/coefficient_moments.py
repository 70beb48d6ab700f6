"""Moments and shears by the coefficients of A23.3, 9.3.3, for a line of a continuous beam."""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass
from itertools import pairwise

from lineproof.audit.claims.propagate import Form, combined
from lineproof.audit.data import Interval
from lineproof.audit.graph import Graph, Node
from lineproof.beams.analysis.coefficients import (
    LONGEST_RATIO,
    MOST_LIVE,
    NEGATIVE,
    POSITIVE,
    SHEAR,
    TWO,
)
from lineproof.standards.nbc.combinations import DEAD, LIVE

_PART = re.compile(r"(?:sag-(?P<span>\d+)|(?:hog|shear)-(?P<at>\d+)-(?P<side>left|right))\Z")
_CLEAR = re.compile(r"span-(\d+)\Z")
_SUPPORT = re.compile(r"(\d+): an? (girder|column|wall)\b")
"""How the record names what carries the beam at a support."""
_NOT_APPLICABLE = "coefficients/not-applicable"
_SINGLE = re.compile(r"[PQ]_|w_[DL]\d+_")
_DEAD, _LIVE = float(DEAD), float(LIVE)
_NEGATIVE_AT_END = {"girder": ("spandrel",), "column": ("column",), "wall": ()}
"""By what the end is cast with; on a wall the beam rests freely."""
_POSITIVE_AT_END = {"wall": ("unrestrained",)}


@dataclass(frozen=True, slots=True)
class _Beam:
    """The clear spans and the factored loads of a beam that 9.3.3 covers."""

    clear: tuple[Form, ...]
    load: tuple[Form, ...]
    carriers: Mapping[int, str]

    @property
    def count(self) -> int:
        return len(self.clear)


def by_coefficients(
    graph: Graph, used: Mapping[str, Form], node: Node
) -> tuple[tuple[str, Interval], ...]:
    """Return what the coefficients of 9.3.3 give for M_f or V_f of a part, with a sentence each.

    Empty where the line is no such moment or shear, or the coefficients do not apply.
    """
    place = _PART.match(node.part)
    wanted = "V_f" if node.part.startswith("shear") else "M_f"
    beam = _beam(graph, used) if place is not None and node.symbol == wanted else None
    if place is None or beam is None:
        return ()
    if place["span"]:
        return _positive(beam, int(place["span"]))
    return (_shear if wanted == "V_f" else _negative)(beam, place)


def _beam(graph: Graph, used: Mapping[str, Form]) -> _Beam | None:
    clear, load = [], []
    count = sum(1 for part in graph.record.parts if _CLEAR.match(part["key"]))
    for span in range(1, count + 1):
        ids = (f"span-{span}/l_n", f"loads/w_D{span}", f"loads/w_L{span}")
        if not all(i in used for i in ids):
            return None
        length, dead, live = (used[i] for i in ids)
        if _LIVE * live.middle > MOST_LIVE * _DEAD * dead.middle:
            return None
        clear.append(length)
        load.append(combined(lambda d, l: _DEAD * d + _LIVE * l, [dead, live]))
    beam = _Beam(tuple(clear), tuple(load), _carriers(graph))
    return beam if count >= TWO and _regular(graph, beam) else None


def _regular(graph: Graph, beam: _Beam) -> bool:
    """Tell whether spans are alike and no single load stands on the beam."""
    lengths = [form.middle for form in beam.clear]
    alike = all(max(pair) <= LONGEST_RATIO * min(pair) for pair in pairwise(lengths))
    if _NOT_APPLICABLE in graph.record.entries:  # as the calc itself has found
        return False
    single = any(_SINGLE.match(node.symbol) for node in graph if node.part == "loads")
    return alike and not single


def _carriers(graph: Graph) -> dict[int, str]:
    """Return what carries the beam by support, as far as the record says it."""
    said = str(graph.record.entries.get("given/supports", {}).get("text", ""))
    return {int(found[1]): found[2] for found in _SUPPORT.finditer(said)}


def _at(beam: _Beam, place: re.Match[str]) -> tuple[int, int]:
    """Return span and support of a face: the left face of support 2 stands in span 1."""
    at = int(place["at"])
    if place.string.startswith("shear"):  # counted by spans
        return at, at + (place["side"] == "right")
    span = at - 1 if place["side"] == "left" else at
    return min(max(span, 1), beam.count), at


_Made = tuple[tuple[str, Interval], ...]


def _positive(beam: _Beam, span: int) -> _Made:
    if not 1 <= span <= beam.count:
        return ()
    kinds: tuple[str, ...] = ("interior",)
    if span in (1, beam.count):
        carrier = beam.carriers.get(1 if span == 1 else beam.count + 1, "")
        kinds = _POSITIVE_AT_END.get(carrier, ("unrestrained", "integral"))
    divisors = [POSITIVE[kind] for kind in kinds]
    return tuple(_moment(k, beam.load[span - 1], beam.clear[span - 1]) for k in divisors)


def _moment(divisor: float, load: Form, clear: Form) -> tuple[str, Interval]:
    form = combined(lambda w, l: w * l**2 / divisor, [load, clear])
    return _said(f"1/{divisor:g}", "w_f l_n2"), form.interval


def _negative(beam: _Beam, place: re.Match[str]) -> _Made:
    span, support = _at(beam, place)
    first = support in (TWO, beam.count)
    outer = support in (1, beam.count + 1)
    if outer:
        carrier = beam.carriers.get(support, "")
        kinds: tuple[str, ...] = _NEGATIVE_AT_END.get(carrier, ("spandrel", "column"))
    elif first and (beam.count == TWO or _outside(span, support, beam)):
        kinds = ("first, two spans",) if beam.count == TWO else ("first",)
    else:
        kinds = ("other",)
    clear = [beam.clear[s - 1] for s in (support - 1, support) if 1 <= s <= beam.count]
    mean = combined(lambda *spans: sum(spans) / len(spans), clear)
    return tuple(_moment(NEGATIVE[kind], beam.load[span - 1], mean) for kind in kinds)


def _outside(span: int, support: int, beam: _Beam) -> bool:
    """Tell whether a face at a first interior support looks to the end span."""
    return (support == TWO and span == 1) or (support == beam.count and span == beam.count)


def _shear(beam: _Beam, place: re.Match[str]) -> _Made:
    span, support = _at(beam, place)
    if not 1 <= span <= beam.count:
        return ()
    first = span in (1, beam.count) and support not in (1, beam.count + 1)
    factor = SHEAR["first" if first else "other"]
    form = combined(lambda w, l: factor * w * l / 2, [beam.load[span - 1], beam.clear[span - 1]])
    return ((_said(f"{factor:g}", "w_f l_n/2"), form.interval),)


def _said(factor: str, of: str) -> str:
    return f"follows by the coefficient {factor} of 9.3.3, times {of}, which the standard allows"
