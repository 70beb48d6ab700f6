"""Stirrups as given: zones of one spacing, read and laid out."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from itertools import pairwise
from typing import Any

from lineproof.beams.continuous.layout import StirrupZone
from lineproof.beams.continuous.stirrups import (
    CLEAR_FOR_PLACING,
    FROM_FACE,
    Band,
    evened,
    first_distance,
    least_space,
)
from lineproof.beams.inputs import bare_number
from lineproof.errors import FaultList, UserError
from lineproof.quantity import echo, read_quantity
from lineproof.standards.a23_3.bars import BARS

_KEYS = ("span", "from", "to", "spacing")
_NEAR = 1e-6
_WIDEST = 2000.0
"""Stirrups farther apart than this [mm] are a slip of units; a stretch without any is left out."""
_EXAMPLE = "{'span': 1, 'from': '0 mm', 'to': '1200 mm', 'spacing': '150 mm'}"


@dataclass(frozen=True, slots=True)
class SpanStirrups:
    """The stirrups of one span as given: bands of one spacing, gaps with infinite spacing."""

    span: int
    clear: float
    bands: tuple[Band, ...]

    def placed(self, face: float, made_of: StirrupZone) -> Iterator[StirrupZone]:
        """Give the zones along the beam; ``face`` is the left face of the span.

        Between the outer stirrups of a zone stand whole spacings; at a face the first stirrup
        stands half a spacing from it. What remains before the right face takes one more stirrup
        where it is wide enough for placing; else the zone moves up to the face beside wider
        spaces, or the stirrups move by a few centimetres.
        """
        rows, rest = self._rows()
        for start, number, s in _evened(rows, rest, BARS.number(made_of.size, "d_b")):
            last = start + (number - 1) * s
            yield _placed(made_of, self.span, face, (start, last, number, s))

    def _rows(self) -> tuple[list[list[_Row]], float]:
        """Return first place, number and spacing of the zones, and what remains at the right.

        Zones without a gap between them stand in one list.
        """
        groups: list[list[_Row]] = [[]]
        last: float | None = None
        rest = 0.0
        for band in self.bands:
            s, start, end = band.spacing, band.start, band.end
            if math.isinf(s):
                last = None
                groups.append([])
                continue
            if start == 0:
                start = first_distance(s)
            elif last is not None:
                start = last + s
            end -= first_distance(s) if end == self.clear else 0.0
            number = math.floor((end - start) / s + _NEAR) + 1
            if number > 0:
                last = start + (number - 1) * s
                groups[-1].append((start, number, s))
            if band.end == self.clear and last is not None:
                rest = max(end - last, 0.0)
        return groups, rest


_Row = tuple[float, int, float]
"""Where the first stirrup of a zone stands from the left face, their number and spacing."""


def _evened(groups: list[list[_Row]], rest: float, d_bs: float) -> Iterator[_Row]:
    """Give the zones with the space at the right face closed, or wide enough for placing."""
    for group in groups[:-1]:
        yield from group
    rows, least = groups[-1], least_space(d_bs)
    if not rows or rest <= _NEAR:
        yield from rows
        return
    start, number, s = rows[-1]
    last = start + (number - 1) * s
    if rest < least and len(rows) > 1 and rows[-2][2] >= s + rest - _NEAR:
        yield from rows[:-1]
        yield start + rest, number, s
        return
    whole = len(groups) == 1
    first = rows[0][0] if whole else FROM_FACE  # a zone after a gap reaches no nearer to it
    moved, left = evened(first, first_distance(s), rest, d_bs)
    yield from ((x + moved, count, spacing) for x, count, spacing in rows)
    if left:
        yield last + moved + left, 1, s


def _placed(
    made_of: StirrupZone, span: int, face: float, row: tuple[float, float, int, float]
) -> StirrupZone:
    start, end, number, s = row
    return replace(made_of, span=span, start=face + start, end=face + end, number=number, spacing=s)


def read_stirrups(
    name: str, given: object, clear: Mapping[int, float], stirrup: str
) -> dict[int, SpanStirrups]:
    """Read zones; ``clear`` is the clear length of every span [mm], ``stirrup`` the size.

    Raises :class:`UserError` with every fault: what is missing, outside its span, overlapping, or
    closer than the clear space for placing.
    """
    faults = FaultList()
    rows: dict[int, list[Band]] = {span: [] for span in clear}
    if isinstance(given, str | Mapping) or not isinstance(given, Sequence):
        raise UserError(f"{name}: {echo(given)} is not a list of zones; write [{_EXAMPLE}]")
    for number, row in enumerate(given, start=1):
        try:
            span, band = _read_zone(f"{name}, zone {number}", row, clear, stirrup)
            rows[span].append(band)
        except UserError as error:
            faults.take(error)
    made = {}
    for span, bands in rows.items():
        bands.sort(key=lambda band: band.start)
        for one, other in pairwise(bands):
            if other.start < one.end - _NEAR:
                faults.add(
                    f"{name}: span {span}: the zones from {one.start:g} to {one.end:g} mm and "
                    f"from {other.start:g} to {other.end:g} mm overlap; let one start where the "
                    "other ends"
                )
        made[span] = SpanStirrups(span, clear[span], tuple(_filled(bands, clear[span])))
    faults.raise_if_any()
    return made


def _read_zone(
    name: str, row: object, clear: Mapping[int, float], stirrup: str
) -> tuple[int, Band]:
    if not isinstance(row, Mapping):
        raise UserError(f"{name}: {echo(row)} is not a zone; write {_EXAMPLE}")
    faults = FaultList()
    for key in row:
        if key not in _KEYS:
            faults.add(f"{name}: {echo(key)} is unknown; write {', '.join(_KEYS)}")
    span = row.get("span")
    if span is None:
        faults.add(f"{name}: 'span' is missing; write for example 'span': 1")
        raise UserError(faults.faults)
    if not isinstance(span, int) or span not in clear:
        told = bare_number(span) or f"one of {_listed(clear)}"
        faults.add(f"{name}: span {echo(span)} does not exist; write {told}")
        raise UserError(faults.faults)
    length = clear[span]
    start, end, s = _read_lengths(name, row, length, faults)
    _check_spacing(name, row, s, stirrup, faults)
    if not -_NEAR <= start < end <= length + _NEAR:
        known = f" of {length:g} mm" if math.isfinite(length) else ""
        faults.add(
            f"{name}: from {start:g} to {end:g} mm is not inside the clear length of span {span}"
            f"{known}; measure from the face of its left support"
        )
    faults.raise_if_any()
    start = 0.0 if start <= FROM_FACE else start
    end = length if end >= length - FROM_FACE else end
    return span, Band(start, end, s)


def _read_lengths(
    name: str, row: Mapping[str, Any], length: float, faults: FaultList
) -> tuple[float, float, float]:
    """Return from, to and spacing [mm]; what is left out reaches to the face."""
    lengths = {"from": 0.0, "to": length, "spacing": math.inf}
    for key in lengths:
        if row.get(key) is not None:
            try:
                lengths[key] = read_quantity(f"{name}: {key}", row[key], "mm").value
            except UserError as error:
                faults.take(error)
    return lengths["from"], lengths["to"], lengths["spacing"]


def _check_spacing(
    name: str, row: Mapping[str, Any], s: float, stirrup: str, faults: FaultList
) -> None:
    d_bs = BARS.number(stirrup, "d_b")
    if not math.isfinite(s) and row.get("spacing") is not None:
        return  # not read: its fault is told
    if row.get("spacing") is None:
        faults.add(f"{name}: no spacing; write for example 'spacing': '200 mm'")
    elif s > _WIDEST:
        faults.add(
            f"{name}: {echo(row['spacing'])} is more than {_WIDEST:g} mm; write for example "
            "'200 mm', and leave out a stretch without stirrups"
        )
    elif s - d_bs < CLEAR_FOR_PLACING:
        faults.add(
            f"{name}: {echo(row['spacing'])} leaves {s - d_bs:.0f} mm between "
            f"{stirrup} stirrups, less than the {CLEAR_FOR_PLACING:g} mm for placing the "
            "concrete (common practice); write at least "
            f"'{math.ceil(CLEAR_FOR_PLACING + d_bs)} mm', thicker stirrups or more legs"
        )


def _listed(clear: Mapping[int, float]) -> str:
    return ", ".join(str(span) for span in clear)


def _filled(bands: Sequence[Band], clear: float) -> Iterator[Band]:
    """Give the bands with the gaps between them."""
    at = 0.0
    for band in bands:
        if band.start > at + _NEAR:
            yield Band(at, band.start, math.inf)
        yield band
        at = band.end
    if at < clear - _NEAR:
        yield Band(at, clear, math.inf)
