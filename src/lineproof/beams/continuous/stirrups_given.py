"""Stirrups as given: zones of one spacing, read and laid out."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from itertools import pairwise
from typing import Any

from lineproof.beams.continuous.layout import StirrupZone
from lineproof.beams.continuous.shear_numbers import ShearBasis
from lineproof.beams.continuous.stirrups import (
    CLEAR_FOR_PLACING,
    FROM_FACE,
    Band,
    first_distance,
)
from lineproof.errors import FaultList, UserError
from lineproof.quantity import echo, read_quantity

_KEYS = ("span", "from", "to", "spacing")
_NEAR = 1e-6
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
        stands half a spacing from it.
        """
        last: float | None = None
        for band in self.bands:
            s, start, end = band.spacing, band.start, band.end
            if math.isinf(s):
                last = None
                continue
            if start == 0:
                start = first_distance(s)
            elif last is not None:
                start = last + s
            end -= first_distance(s) if end == self.clear else 0.0
            number = math.floor((end - start) / s + _NEAR) + 1
            if number > 0:
                last = start + (number - 1) * s
                yield _placed(made_of, self.span, face, (start, last, number, s))
            if band.end == self.clear and last is not None and end - last > _NEAR:
                yield _placed(made_of, self.span, face, (end, end, 1, s))


def _placed(
    made_of: StirrupZone, span: int, face: float, row: tuple[float, float, int, float]
) -> StirrupZone:
    start, end, number, s = row
    return replace(made_of, span=span, start=face + start, end=face + end, number=number, spacing=s)


def read_stirrups(
    given: Sequence[Mapping[str, Any]], clear: Mapping[int, float], basis: ShearBasis
) -> dict[int, SpanStirrups]:
    """Read zones; ``clear`` is the clear length of every span [mm].

    Raises :class:`UserError` with every fault: what is missing, outside its span, overlapping, or
    closer than the clear space for placing.
    """
    faults = FaultList()
    rows: dict[int, list[Band]] = {span: [] for span in clear}
    if isinstance(given, str | Mapping) or not isinstance(given, Sequence):
        raise UserError(f"stirrups: {echo(given)} is not a list of zones; write [{_EXAMPLE}]")
    for number, row in enumerate(given, start=1):
        try:
            span, band = _read_zone(f"stirrups, zone {number}", row, clear, basis)
            rows[span].append(band)
        except UserError as error:
            faults.take(error)
    made = {}
    for span, bands in rows.items():
        bands.sort(key=lambda band: band.start)
        for one, other in pairwise(bands):
            if other.start < one.end - _NEAR:
                faults.add(
                    f"stirrups: span {span}: the zones from {one.start:g} to {one.end:g} mm and "
                    f"from {other.start:g} to {other.end:g} mm overlap; let one start where the "
                    "other ends"
                )
        made[span] = SpanStirrups(span, clear[span], tuple(_filled(bands, clear[span])))
    faults.raise_if_any()
    return made


def _read_zone(
    name: str, row: object, clear: Mapping[int, float], basis: ShearBasis
) -> tuple[int, Band]:
    if not isinstance(row, Mapping):
        raise UserError(f"{name}: {echo(row)} is not a zone; write {_EXAMPLE}")
    faults = FaultList()
    for key in row:
        if key not in _KEYS:
            faults.add(f"{name}: {echo(key)} is unknown; write {', '.join(_KEYS)}")
    span = row.get("span")
    if not isinstance(span, int) or span not in clear:
        faults.add(f"{name}: span {echo(span)} does not exist; write one of {_listed(clear)}")
        raise UserError(faults.faults)
    length = clear[span]
    start, end, s = _read_lengths(name, row, length, faults)
    _check_spacing(name, row, s, basis, faults)
    if not -_NEAR <= start < end <= length + _NEAR:
        faults.add(
            f"{name}: from {start:g} to {end:g} mm is not inside the clear length of span {span} "
            f"of {length:g} mm; measure from the face of its left support"
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
    name: str, row: Mapping[str, Any], s: float, basis: ShearBasis, faults: FaultList
) -> None:
    if row.get("spacing") is None:
        faults.add(f"{name}: no spacing; write for example 'spacing': '200 mm'")
    elif s - basis.d_bs < CLEAR_FOR_PLACING:
        faults.add(
            f"{name}: {echo(row['spacing'])} leaves {s - basis.d_bs:.0f} mm between "
            f"{basis.stirrup} stirrups, less than the {CLEAR_FOR_PLACING:g} mm for placing the "
            "concrete (common practice); write at least "
            f"'{math.ceil(CLEAR_FOR_PLACING + basis.d_bs)} mm', thicker stirrups or more legs"
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
