"""Torsion of an imported case as a line: between two stations of the file on the straight line.

It stands in the place of a torque per length by load type. Where a station is written twice, the
side with the larger torsion counts.
"""

from __future__ import annotations

from lineproof.beams.analysis.curves import Side
from lineproof.beams.continuous.forces import Demand, End
from lineproof.beams.continuous.groups import named
from lineproof.beams.continuous.imported_case import line_of, typed
from lineproof.beams.continuous.imported_forces import AT, ImportedForces, Piece
from lineproof.beams.continuous.symbols import stated
from lineproof.beams.steps import Steps

_SCOPE = ("x_i", "x_j", "x_f", "x_s")


def record_imported_torsion(
    steps: Steps, forces: ImportedForces, demand: Demand, near: End
) -> None:
    """Record inside the open part the torsion T_f of a case, and bind it: its size.

    The forces of the same demand stand in the part before: x_i, x_j and the section are theirs.
    """
    piece = _piece(forces, demand)
    T, sheet, row = forces.source.imported.T, steps.sheet, demand.row
    for letter, column in (("i", piece.i), ("j", piece.j)):
        entry = sheet.given(
            f"T_{letter}", typed(float(T[row, column]), "kN.m"),
            source=line_of(forces.source, row, column),
        )  # fmt: skip
        steps.bind(**{f"T_{letter}": entry})
    at = "x_f" if near == "left" else "x_s"
    text = f"T_f = abs(T_i + (T_j - T_i)*({at} - x_i)/(x_j - x_i))"
    if abs(demand.x - piece.x_i) <= AT or abs(demand.x - piece.x_j) <= AT:
        text = f"T_f = abs({'T_i' if abs(demand.x - piece.x_i) <= AT else 'T_j'})"
    scope = {n: e for n, e in steps.place.items() if n in (*_SCOPE, "T_i", "T_j")}
    title = f"Torsion at the section: {demand.case}"
    steps.bind(T_f=sheet.line(stated(text), title=title, **named(scope, text)))


def _piece(forces: ImportedForces, demand: Demand) -> Piece:
    """Return the piece of a section; at a station the one with the larger torsion there."""
    sides: tuple[Side, ...] = (demand.side, "right" if demand.side == "left" else "left")
    found = [forces.piece(demand.span, demand.x, side) for side in sides]
    T = forces.source.imported.T[demand.row]

    def size(piece: Piece) -> float:
        share = (demand.x - piece.x_i) / (piece.x_j - piece.x_i)
        return abs(float(T[piece.i] + (T[piece.j] - T[piece.i]) * share))

    return max(found, key=size)
