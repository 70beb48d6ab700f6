"""Moments, shears, torsions and reactions of an office's frame analysis, read from CSV.

One row a station, case and combination; where a station stands twice, the first row is its left
side and the second its right. A combination may hold several cases (arrangements, directions of
wind); a pair of the two makes one load case. The sign convention is the one of ``curves``, torsion
with either sign.

Checked before anything is used, all faults at once: every load case has the same stations, both
ends of every span among them and none too far from the next; M is the same on both sides of a
station; between two stations, and from the left end of the span to every station, M changes by the
mean of V times the distance, which is exact where the load is uniform; a reaction is the jump of V
over its support.
"""

from __future__ import annotations

import math
from collections import Counter, defaultdict
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from lineproof.beams.analysis.arrangements import LoadCase
from lineproof.beams.analysis.csv_table import Column, Line, read_table
from lineproof.beams.analysis.curves import Floats, Side
from lineproof.beams.analysis.envelope import Envelope, Station
from lineproof.errors import FileFaults

Lines = NDArray[np.int64]
"""Line numbers of a file."""

FORCES = (
    Column("span", "count"),
    Column("station", "number", "m", most=1e6),
    Column("case", "text"),
    Column("combination", "text"),
    Column("M", "number", "kN.m", most=1e12),
    Column("V", "number", "kN", most=1e9),
    Column("T", "number", "kN.m", most=1e12, needed=False),
)
REACTIONS = (
    Column("support", "count"),
    Column("case", "text"),
    Column("combination", "text"),
    Column("R", "number", "kN", most=1e9),
)
TOLERANCE = 0.01
"""Statics hold within this part of the largest moment or shear of the case in the span."""
SMALL_CASE = 0.1
"""A case smaller than this part of the largest moment of the span is checked as if it were so
large: the numbers of a nearly empty case are little more than their rounding."""
WIDEST_GAP = 1 / 8
"""Stations stand no farther apart than this part of the span."""
ROUNDED = 0.5
"""A station is known to this [mm]: files give metres with three decimals."""


@dataclass(frozen=True, slots=True)
class Ordinate:
    """Forces at one station of one case: N and mm, with the line of the file."""

    line: int
    x: float
    M: float
    V: float
    T: float


@dataclass(frozen=True, eq=False, slots=True)
class Imported:
    """The pairs M-V as an envelope, with the torsion of the same cases (cases, stations) [N.mm].

    ``lines`` are the lines of the file that they stand on (cases, stations).
    """

    envelope: Envelope
    T: Floats
    lines: Lines


Table = Mapping[LoadCase, Mapping[int, Sequence[Ordinate]]]


def read_forces(
    content: bytes,
    lengths: Sequence[float],
    *,
    breaks: Mapping[int, Sequence[float]] | None = None,
    name: str = "forces",
) -> Imported:
    """Return the forces of a CSV file, checked; raises :class:`UserError` with all faults.

    ``lengths`` are the spans [mm]; ``breaks`` holds by span the stations at which the load is
    known to change [mm], each of which must be a station of the file.
    """
    faults = FileFaults(name)
    table = _table(read_table(content, name, FORCES), lengths, faults)
    faults.raise_if_any()
    _check_once(table, faults)
    _check_signs(table, faults)
    faults.raise_if_any()
    _check_downward(table, faults)
    known = breaks or {}
    largest = _largest(table)
    for case, spans in table.items():
        for number, length in enumerate(lengths, start=1):
            where = f"{case}, span {number}"
            rows = spans.get(number, ())
            _check_stations(rows, length, known.get(number, ()), where, faults)
            least = SMALL_CASE * largest.get(number, 0.0)
            _check_statics(rows, least, where, faults)
    _check_alike(table, lengths, faults)
    faults.raise_if_any()
    return _imported(table, lengths)


def _table(lines: Sequence[Line], lengths: Sequence[float], faults: FileFaults) -> Table:
    table: dict[LoadCase, dict[int, list[Ordinate]]] = defaultdict(lambda: defaultdict(list))
    for line in lines:
        span, x, case, combination, M, V, T = line.cells
        number, station = int(span), float(x)
        if not 1 <= number <= len(lengths):
            faults.add(f"line {line.number}: span {number}; the beam has {len(lengths)}")
            continue
        length = lengths[number - 1]
        if not -ROUNDED <= station <= length + ROUNDED:
            faults.add(
                f"line {line.number}: station {station / 1000:g} m is outside span {number} of "
                f"{length / 1000:g} m; write stations from the left axis of their span"
            )
            continue
        end = next((e for e in (0.0, length) if abs(station - e) <= ROUNDED), station)
        rows = table[LoadCase(str(combination), str(case))][number]
        rows.append(Ordinate(line.number, end, float(M), float(V), float(T)))
    for spans in table.values():
        for rows in spans.values():
            rows.sort(key=lambda row: row.x)
    return table


def _check_once(table: Table, faults: FileFaults) -> None:
    """Find cases that stand twice as a whole: every station of a span, its ends included."""
    for case, spans in table.items():
        for number, rows in spans.items():
            counts = Counter(row.x for row in rows)
            if min(counts.values()) > 1:
                lines = sorted(row.line for row in rows)
                faults.add(
                    f"{case}, span {number}: all stations stand twice (lines {lines[0]} to "
                    f"{lines[-1]}); write every case once, or give the second another name"
                )


def _check_signs(table: Table, faults: FileFaults) -> None:
    """Find a file whose M and V follow opposite conventions: every station of it would fail."""
    pairs = [each for spans in table.values() for rows in spans.values() for each in pairwise(rows)]
    gained = [(b.M - a.M, (a.V + b.V) / 2 * (b.x - a.x)) for a, b in pairs]
    as_written, turned = (sum(abs(M - sign * V) for M, V in gained) for sign in (1, -1))
    if turned < TOLERANCE * as_written:
        faults.add(
            "M falls wherever V is positive and grows wherever it is negative, throughout the "
            "file; here M is positive where the bottom is in tension and grows where V is "
            "positive; write M or V with the other sign"
        )


def _check_downward(table: Table, faults: FileFaults) -> None:
    """Find spans that no case loads downward: both M and V have the wrong sign there.

    By statics alone such a span passes, and bars would be chosen for it at the wrong face.
    """
    most: dict[int, tuple[float, LoadCase]] = {}
    shear: dict[int, float] = defaultdict(float)
    for case, spans in table.items():
        for number, rows in spans.items():
            load = rows[0].V - rows[-1].V
            shear[number] = max(shear[number], *(abs(row.V) for row in rows))
            if number not in most or load > most[number][0]:
                most[number] = load, case
    for number, (load, case) in sorted(most.items()):
        if load < -TOLERANCE * shear[number]:
            faults.add(
                f"span {number}: no case loads it downward, V falls by {load / 1e3:g} kN at most "
                f"({case}); here V is positive at the left end of a span under gravity load, and "
                "M where the bottom is in tension; write both with the other sign in this span"
            )


def _check_stations(
    rows: Sequence[Ordinate],
    length: float,
    breaks: Sequence[float],
    where: str,
    faults: FileFaults,
) -> None:
    stations = [row.x for row in rows]
    if not stations:
        faults.add(f"{where}: no station; every case needs every span")
        return
    for needed in (0.0, length, *breaks):
        if not any(abs(x - needed) <= ROUNDED for x in stations):
            faults.add(f"{where}: no station at {needed / 1000:g} m")
    for a, b in pairwise(stations):
        if b - a > WIDEST_GAP * length + 2 * ROUNDED:
            faults.add(
                f"{where}: no station between {a / 1000:g} and {b / 1000:g} m; write one at least "
                f"every {WIDEST_GAP * length / 1000:g} m"
            )
    for x in sorted(set(stations)):
        most = 1 if x in (0.0, length) else 2
        if stations.count(x) > most:
            lines = ", ".join(str(row.line) for row in rows if row.x == x)
            faults.add(f"{where}: {x / 1000:g} m stands more than {most} times (lines {lines})")


def _largest(table: Table) -> dict[int, float]:
    """Return the largest size of M of all cases by span."""
    made: dict[int, float] = defaultdict(float)
    for spans in table.values():
        for number, rows in spans.items():
            made[number] = max(made[number], *(abs(row.M) for row in rows))
    return made


def _check_statics(rows: Sequence[Ordinate], least: float, where: str, faults: FileFaults) -> None:
    moment = max((least, *(abs(row.M) for row in rows)))
    shear = max((abs(row.V) for row in rows), default=0.0)
    total, found = 0.0, len(faults.faults)
    drift = ""
    for a, b in pairwise(rows):
        distance = b.x - a.x
        gained = (a.V + b.V) / 2 * distance
        total += gained
        if not drift and _drifts(rows[0], b, total, (moment, shear)):
            drift = (
                f"{where}, 0 to {b.x / 1000:g} m: M changes by {(b.M - rows[0].M) / 1e6:g} kN.m, "
                f"but V gives {total / 1e6:g} kN.m over that length (lines {rows[0].line} to "
                f"{b.line}); look at signs and units, and write more decimals"
            )
        slack = TOLERANCE * max(moment, shear * distance)
        if abs(b.M - a.M - gained) <= slack:
            continue
        if distance == 0:
            faults.add(
                f"{where}, {a.x / 1000:g} m: M is {a.M / 1e6:g} on the left and {b.M / 1e6:g} kN.m "
                f"on the right (lines {a.line}, {b.line}); they must be the same"
            )
        else:
            faults.add(
                f"{where}, {a.x / 1000:g} to {b.x / 1000:g} m: M changes by "
                f"{(b.M - a.M) / 1e6:g} kN.m, but V gives {gained / 1e6:g} kN.m (lines {a.line}, "
                f"{b.line}); look at signs and units, and give a load between them its own station"
            )
    if drift and len(faults.faults) == found:
        faults.add(drift)


def _drifts(
    first: Ordinate,
    last: Ordinate,
    gained: float,
    largest: tuple[float, float],
) -> bool:
    """Tell whether gaps that may each pass have added up; ``largest`` M and V of the span."""
    moment, shear = largest
    slack = TOLERANCE * max(moment, shear * (last.x - first.x))
    return abs(last.M - first.M - gained) > slack


def _check_alike(table: Table, lengths: Sequence[float], faults: FileFaults) -> None:
    """Ask for the stations of the first case in every other."""
    first, *others = table
    for number in range(1, len(lengths) + 1):
        wanted = _places(table[first].get(number, ()))
        for case in others:
            found = _places(table[case].get(number, ()))
            for x, side in sorted(set(wanted) ^ set(found)) if wanted and found else ():
                what = "misses" if (x, side) in wanted else "has"
                faults.add(
                    f"{case}, span {number}: {what} the {side} side of the station {x / 1000:g} m, "
                    f"unlike {first}"
                )


def _places(rows: Sequence[Ordinate]) -> list[tuple[float, Side]]:
    """Return stations with the side each row stands for."""
    stations = [row.x for row in rows]
    if not stations:
        return []
    sides: list[tuple[float, Side]] = []
    for i, x in enumerate(stations):
        before_another = i + 1 < len(stations) and stations[i + 1] == x
        at_end = i == len(stations) - 1
        sides.append((x, "left" if before_another or at_end else "right"))
    return sides


def _imported(table: Table, lengths: Sequence[float]) -> Imported:
    cases = tuple(table)
    numbers = range(1, len(lengths) + 1)
    stations = tuple(
        Station(n, x, side, ("support",) if x in (0.0, lengths[n - 1]) else ())
        for n in numbers
        for x, side in _places(table[cases[0]][n])
    )
    rows = [[row for n in numbers for row in table[case][n]] for case in cases]
    M, V, T = (np.array([[getattr(row, what) for row in line] for line in rows]) for what in "MVT")
    lines = np.array([[row.line for row in line] for line in rows])
    return Imported(Envelope(stations, cases, M, V), T, lines)


def read_reactions(
    content: bytes,
    forces: Imported,
    *,
    name: str = "reactions",
) -> Mapping[LoadCase, tuple[float, ...]]:
    """Return reactions [N] by load case, one a support, in the order of the supports.

    Each must be the jump of V over its support; a free end needs none. Raises
    :class:`UserError` with all faults.
    """
    faults = FileFaults(name)
    found = _by_support(read_table(content, name, REACTIONS), faults)
    jumps = dict(_jumps(forces.envelope))
    for case, support in found:
        if (case, support) not in jumps:
            faults.add(f"{case}, support {support}: no such case or support in the forces")
    largest: dict[LoadCase, float] = defaultdict(float)
    for (case, _), jump in jumps.items():
        largest[case] = max(largest[case], abs(jump))
    for (case, support), jump in jumps.items():
        slack = TOLERANCE * largest[case]
        R = found.setdefault((case, support), 0.0 if abs(jump) <= slack else math.nan)
        if math.isnan(R):
            faults.add(f"{case}, support {support}: no reaction")
        elif abs(R - jump) > slack:
            what = f"reaction {R / 1e3:g} kN, but V jumps by {jump / 1e3:g} kN"
            faults.add(f"{case}, support {support}: {what}")
    faults.raise_if_any()
    supports = range(1, 2 + max(s.span for s in forces.envelope.stations))
    return {c: tuple(found[c, s] for s in supports) for c in forces.envelope.cases}


def _by_support(lines: Sequence[Line], faults: FileFaults) -> dict[tuple[LoadCase, int], float]:
    found: dict[tuple[LoadCase, int], float] = {}
    for line in lines:
        support, case, combination, R = line.cells
        key = LoadCase(str(combination), str(case)), int(support)
        if key in found:
            faults.add(f"line {line.number}: {key[0]}, support {key[1]} stands twice")
        found[key] = float(R)
    return found


def _jumps(envelope: Envelope) -> Iterator[tuple[tuple[LoadCase, int], float]]:
    ends: dict[int, list[int]] = defaultdict(list)
    for i, station in enumerate(envelope.stations):
        ends[station.span].append(i)
    last = max(ends)
    for row, case in enumerate(envelope.cases):
        for support in range(1, last + 2):
            right = envelope.V[row, ends[support][0]] if support <= last else 0.0
            left = envelope.V[row, ends[support - 1][-1]] if support > 1 else 0.0
            yield (case, support), float(right - left)
