"""The load on a span where forces are imported: from the shears of the file."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.imported_case import line_of, typed
from lineproof.beams.continuous.imported_forces import ImportedForces
from lineproof.beams.continuous.symbols import notation, numbered
from lineproof.formula import Symbol
from lineproof.record import Entry
from lineproof.sheet import Sheet


def span_loads(forces: ImportedForces, span: int) -> Floats:
    """Return the load on a span of every case [N/mm]: from end to end, single loads smeared.

    As for our own cases a single load counts twice over the length: once it stands in the change of
    V from end to end, once more as the change of V at its station.
    """
    V = forces.source.imported.envelope.V
    ends, pairs = _columns(forces, span)
    total = V[:, ends[0]] - V[:, ends[1]]
    for before, after in pairs:
        total = total + np.abs(V[:, before] - V[:, after])
    made: Floats = total / forces.beam.spans[span - 1].length
    return made


def _columns(forces: ImportedForces, span: int) -> tuple[tuple[int, int], list[tuple[int, int]]]:
    """Return the columns of a span's ends, and of the stations written twice."""
    pieces = forces.pieces[span - 1]
    twice = [(a.j, b.i) for a, b in pairwise(pieces) if a.j != b.i]
    return (pieces[0].i, pieces[-1].j), twice


def record_load_terms(
    sheet: Sheet, forces: ImportedForces, span: int, row: int
) -> tuple[list[str], dict[str, Entry]]:
    """Record inside the open part the shears that give a case's load on a span.

    Returns the terms of w_f, in which l is the span, and the entries they name.
    """
    V = forces.source.imported.envelope.V
    ends, pairs = _columns(forces, span)
    pairs = [pair for pair in pairs if V[row, pair[0]] != V[row, pair[1]]]
    sheet.notation = sheet.notation | notation(_symbols(len(pairs)))
    entries: dict[str, Entry] = {}

    def given(name: str, column: int) -> None:
        entries[name] = sheet.given(
            name,
            typed(float(V[row, column]), "kN"),
            source=line_of(forces.source, row, column),
        )

    given("V_ie", ends[0])
    given("V_je", ends[1])
    terms = ["(V_ie - V_je)/l"]
    for number, (before, after) in enumerate(pairs, start=1):
        given(f"V_i{number}", before)
        given(f"V_j{number}", after)
        terms.append(f"abs(V_i{number} - V_j{number})/l")
    return terms, entries


def _symbols(count: int) -> Iterator[Symbol]:
    yield numbered("V_ie", "V", "left", "shear at the left end of the span, imported")
    yield numbered("V_je", "V", "right", "shear at the right end of the span, imported")
    for n in range(1, count + 1):
        yield numbered(f"V_i{n}", "V", f"i{n}", f"shear left of single load {n}, imported")
        yield numbered(f"V_j{n}", "V", f"j{n}", f"shear right of single load {n}, imported")
