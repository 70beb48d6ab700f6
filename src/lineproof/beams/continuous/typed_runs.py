"""Bars along a beam as they are typed: every row read and checked at the border."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping, Sequence
from typing import Any, TypeVar, get_args

from lineproof.beams.bars import refuse_other_bars
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Face, Hook
from lineproof.beams.continuous.typed_beam import read_list
from lineproof.errors import FaultList, UserError
from lineproof.quantity import echo, read_quantity
from lineproof.standards.a23_3.bars import BARS
from lineproof.standards.codes import CodePair

_T = TypeVar("_T")
KEYS = ("face", "bars", "start", "end", "layer", "place", "hook_start", "hook_end", "serves")
NEEDED = ("face", "bars", "start", "end")
FACES, HOOKS, PLACES = get_args(Face), get_args(Hook), ("web", "overhang", "side face")
LAYERS = (1, 2)
EXAMPLE = (
    "{'face': 'bottom', 'bars': '2-25M', 'start': '-0.15 m', 'end': '7.75 m'}, distances from the "
    "axis of support 1"
)
_BARS = re.compile(r"\s*(\d{1,2})\s*-\s*(\d{2}M)\s*\Z", re.IGNORECASE)


def read_runs(
    name: str, given: object, outline: BeamOutline | None, pair: CodePair | None
) -> tuple[BarRun, ...]:
    """Read runs of bars; raises :class:`UserError` with every fault.

    A row is for example ``{"face": "bottom", "bars": "2-25M", "start": "-0.15 m", "end":
    "7.75 m"}``, with ``layer`` 2, ``place`` ``overhang`` or ``side face`` (skin bars, half at each
    face), ``hook_start`` or ``hook_end`` ``90`` where they apply. Distances run from the axis of
    support 1. Where the concrete is not known, for faults of its own, places are not looked at.
    """
    rows = read_list(name, given)
    faults, made = FaultList(), []
    if not rows:
        faults.add(f"bar runs: none given; write for example {EXAMPLE}")
    for number, row in enumerate(rows, start=1):
        try:
            made.append(_read_row(f"bar run {number}", row, outline, pair))
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return tuple(made)


def _read_row(name: str, row: object, outline: BeamOutline | None, pair: CodePair | None) -> BarRun:
    faults = FaultList()
    if not isinstance(row, Mapping):
        raise UserError(f"{name}: {echo(row)} is not a run of bars; write for example {EXAMPLE}")
    for key in row:
        if key not in KEYS:
            faults.add(f"{name}: {echo(key)} is not known; write one of {', '.join(KEYS)}")
    for key in NEEDED:
        if key not in row:
            faults.add(f"{name}: {key} is missing; write for example {EXAMPLE}")
    faults.raise_if_any()
    face = _choice(f"{name}, face", row["face"], FACES, faults)
    place = _choice(f"{name}, place", row.get("place", "web"), PLACES, faults)
    layer = _choice(f"{name}, layer", row.get("layer", 1), LAYERS, faults)
    hooks = [_choice(f"{name}, {key}", str(row.get(key, "")), HOOKS, faults)
             for key in ("hook_start", "hook_end")]  # fmt: skip
    number, size = _take(faults, _read_bars, f"{name}, bars", row["bars"], (0, ""))
    start, end = (
        _take(faults, _read_distance, f"{name}, {key}", row[key], 0.0) for key in ("start", "end")
    )
    faults.raise_if_any()
    run = BarRun(
        face, layer, number, size, start, end, place, hooks[0], hooks[1],
        str(row.get("serves", "")),
    )  # fmt: skip
    _check_order(name, run, faults)
    if outline is not None:
        _check_ends(name, run, outline, faults)
    if pair is not None:
        _check_edition(name, run, pair, faults)
    faults.raise_if_any()
    return run


def _choice(name: str, given: Any, known: Sequence[Any], faults: FaultList) -> Any:
    if given not in known:
        shown = ", ".join(repr(item) for item in known)
        faults.add(f"{name}: {echo(given)}; write one of {shown}")
    return given


def _take(
    faults: FaultList, read: Callable[[str, object], _T], name: str, given: object, missing: _T
) -> _T:
    try:
        return read(name, given)
    except UserError as error:
        faults.take(error)
        return missing


def _read_bars(name: str, given: object) -> tuple[int, str]:
    refuse_other_bars(name, given)
    match = _BARS.match(str(given))
    if match is None or match[2].upper() not in BARS.rows or int(match[1]) < 1:
        again = ", a row for each size" if "+" in str(given) else ""
        raise UserError(f"{name}: {echo(given)} is not understood; write '2-25M'{again}")
    return int(match[1]), match[2].upper()


def _read_distance(name: str, given: Any) -> float:
    return read_quantity(name, given, "mm").value


def _check_order(name: str, run: BarRun, faults: FaultList) -> None:
    if run.start >= run.end:
        faults.add(
            f"{name}: starts at {run.start:g} mm and ends at {run.end:g} mm; write start below end"
        )


def _check_edition(name: str, run: BarRun, pair: CodePair, faults: FaultList) -> None:
    for key, hook in (("hook_start", run.hook_start), ("hook_end", run.hook_end)):
        if hook and pair.concrete == "CSA A23.3:24":
            faults.add(
                f"{name}, {key}: hooks cannot be calculated to {pair.concrete}, whose expression "
                "is not known here; write straight bars"
            )


def _check_ends(name: str, run: BarRun, outline: BeamOutline, faults: FaultList) -> None:
    low, high = outline.ends
    for key, x in (("start", run.start), ("end", run.end)):
        if not low <= x <= high:
            faults.add(
                f"{name}, {key}: {x:g} mm is outside the beam, which goes from {low:g} to "
                f"{high:g} mm; write a distance from the axis of support 1 inside it"
            )
    for key, hook, x in (
        ("hook_start", run.hook_start, run.start), ("hook_end", run.hook_end, run.end),
    ):  # fmt: skip
        if hook and not _at_end(outline, key, x):
            faults.add(
                f"{name}, {key}: the bars end at {x:g} mm, not at an end support or a free end; "
                f"write {key}='' or end the bars there"
            )
    if run.place == "overhang" and (run.face == "bottom" or not outline.h_f):
        faults.add(f"{name}, place: there is no slab beside the {run.face} bars; write 'web'")


def _at_end(outline: BeamOutline, key: str, x: float) -> bool:
    """Tell whether a hook stands in the end support of its side, or at a free end."""
    last = key == "hook_end"
    axis, support = outline.axes[-1 if last else 0], outline.supports[-1 if last else 0]
    reach = support.half if support.kind != "free" else outline.depths[-1 if last else 0]
    return abs(x - axis) <= reach
