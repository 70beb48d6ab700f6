"""The part of the analysis where forces are brought in: what was read, checked and taken."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Any

import numpy as np

from lineproof.beams.analysis.envelope import Envelope
from lineproof.beams.analysis.imported import SMALL_CASE, TOLERANCE, WIDEST_GAP
from lineproof.beams.continuous.forces import Demand
from lineproof.beams.continuous.imported_case import case_symbols, printed, record_station, typed
from lineproof.beams.continuous.imported_forces import ForcesFile, ImportedForces, Piece
from lineproof.beams.continuous.imported_take_down import record_take_down
from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.continuous.interface import POINT_LOAD
from lineproof.beams.continuous.model import ANALYSIS, Model
from lineproof.beams.continuous.reactions import note_uplift
from lineproof.beams.continuous.symbols import notation, numbered, required
from lineproof.beams.steps import Steps
from lineproof.sentences import counted

_SIGNS = (
    "x runs from the left axis of each span; loads act downward, reactions upward. M is positive "
    "where the bottom is in tension. V is the change of M along x: positive where the part on the "
    "left is held up, so at the left end of a span under gravity load. T may have either sign; its "
    "size counts."
)
_BETWEEN = (
    "Between two neighbouring stations i and j of the file the load is taken uniform: V is linear, "
    "and M is the straight line from M_i to M_j plus the moment of that load on the piece between. "
    "At the stations M and V are those of the file. A change of V within a station is a "
    "point load; a load over a short length is one only where the file writes it so."
)
_LARGEST = (
    numbered("M_max", "M", "max", "largest size of the moment of a case in a span, imported"),
    numbered("M_all", "M", "all", "largest size of the moment of all cases in a span, imported"),
    numbered("V_max", "V", "max", "largest size of the shear of a case in a span, imported"),
)
_COUPLES = "A change of M over a support is the couple that columns take there."
_HANGERS_INSIDE = {
    "check": "Hanger stirrups where beams carried from the side bring in the point loads of the "
    "file",
    "clause": "11.2.12",
}
_GROUP = 8
_CASE_COLUMNS = [
    "Combination", "Case", "M, largest, kN.m", "At", "M, smallest, kN.m", "At",
    "V, largest size, kN", "At",
]  # fmt: skip
REACTIONS_TITLE = "Largest and smallest reactions of the imported cases, factored as in the file"
_COMBINATION_COLUMNS = ["Combination", "Cases", "Not in it, but in others that share a case"]
_REACTION_COLUMNS = ["Support", "R, largest, kN", "Case", "R, smallest, kN", "Case"]
NOT_COVERED = (
    {"check": "Deflections: the imported moments are not known by load type", "clause": "9.8"},
    {
        "check": "Approximate coefficients beside the analysis: imported cases have no load types",
        "clause": "9.3.3",
    },
    {
        "check": "Bottom bars developed at the faces of supports, where the imported forces make "
        "the beam resist lateral loads",
        "clause": "12.11.2",
    },
    {
        "check": "Reactions by load type: to be taken from the frame analysis",
        "clause": "NBC 4.1.3.2",
    },
    {
        "check": "Load combinations and arrangements of the imported file: completeness is the "
        "frame analysis's",
        "clause": "9.2.3.1",
    },
)


def not_covered(inputs: ContinuousInputs) -> list[Mapping[str, str]]:
    """Return what imported forces leave uncovered; nothing for our own analysis."""
    if inputs.forces_file is None:
        return []
    rows: list[Mapping[str, str]] = [dict(row) for row in NOT_COVERED]
    typed = any(load.form == "point" for load in inputs.loads)  # said of them already
    if not typed and _jumps_inside(inputs.forces_file.imported.envelope):
        rows.append(dict(_HANGERS_INSIDE))
    return rows


def _jumps_inside(envelope: Envelope) -> bool:
    """Tell whether the shear of a case jumps at a station within a span: a point load."""
    return any(
        (one.span, one.x) == (other.span, other.x)
        and float(np.abs(envelope.V[:, n + 1] - envelope.V[:, n]).max()) >= POINT_LOAD
        for n, (one, other) in enumerate(pairwise(envelope.stations))
    )


def record_imported_analysis(model: Model) -> None:
    """Record the part of the analysis: source, signs, checks, cases and reactions of the file."""
    forces = model.imported
    if forces is None:
        msg = "the forces are not imported"
        raise TypeError(msg)
    sheet, file = model.sheet, forces.source
    sheet.notation = sheet.notation | notation((*case_symbols(), *_LARGEST))
    with sheet.part(ANALYSIS, "Analysis: forces brought in from the frame analysis"):
        sheet.note("source", _source_text(forces), title="Source of moments, shears and torsions")
        sheet.note("file-hash", _hash_text(file), title="SHA-256 of what was read")
        sheet.note("signs", _SIGNS, title="Signs")
        sheet.note("between", _BETWEEN, title="Between the stations", clause="statics")
        sheet.note("checked", _checked_text(model, file), title="Checked before use")
        _record_closing(model, forces)
        rows = list(_case_rows(forces))
        sheet.table(
            "imported-cases", _CASE_COLUMNS, rows,
            title="Imported load cases with the largest or smallest moment or shear of a station",
        )  # fmt: skip
        sheet.table(
            "imported-combinations", _COMBINATION_COLUMNS, list(_combination_rows(forces)),
            title="Imported combinations with their cases",
        )  # fmt: skip
        columns, reactions = imported_reactions(model)
        sheet.table("imported-reactions", columns, reactions, title=REACTIONS_TITLE)
        for support in range(1, model.spans + 2):
            R = _reactions_of(forces, support)
            if min(R) < -TOLERANCE * max(abs(each) for each in R):
                note_uplift(sheet, support)
        record_take_down(model, forces)
        sheet.note("reactions-source", _reactions_text(file), title="Reactions")


def _source_text(forces: ImportedForces) -> str:
    file = forces.source
    cases = file.imported.envelope.cases
    combinations = len({case.combination for case in cases})
    stations = len(file.imported.envelope.stations)
    torsion = (
        "with torsion" if file.imported.T.any() else "without torsion (no column T, or all zero)"
    )
    return (
        f"Moments and shears come from the frame analysis of the office, not from an analysis in "
        f"this calculation: file {file.name}, {counted(len(cases), 'load case')} in "
        f"{counted(combinations, 'combination')}, {stations} rows of stations each, {torsion}. "
        "Arrangements of live load and lateral loads are those of the file; the load take-down "
        "above stands for comparison, no moment follows from it."
    )


def _hash_text(file: ForcesFile) -> str:
    pairs = [(file.name, file.digest)]
    if file.reactions is not None:
        pairs.append((file.reactions_name, file.reactions_digest))
    return "; ".join(f"{name}: {_grouped(digest)}" for name, digest in pairs) + "."


def _grouped(digest: str) -> str:
    return " ".join(digest[n : n + _GROUP] for n in range(0, len(digest), _GROUP))


def _checked_text(model: Model, file: ForcesFile) -> str:
    percent = f"{100 * TOLERANCE:g} %"
    known = " where the loads given begin or stand," if model.single or _placed(model) else ""
    reactions = (
        f"; every reaction of {file.reactions_name} is the jump of V over its support, within "
        f"{percent} of the largest of its case"
        if file.reactions is not None
        else ""
    )
    return (
        "Every load case has the same stations; a station stands at both ends of every span,"
        f"{known} and no two are farther apart than 1/{1 / WIDEST_GAP:g} of the span; M is the "
        "same on both sides of a station; between two stations, and from the left end of the span "
        f"to every station, M changes by the area of V, within {percent} of the largest moment of "
        f"the case in the span, or of its largest shear times the distance (of a case below "
        f"{100 * SMALL_CASE:g} % of the largest moment in the span, of that part){reactions}. M at "
        "a free "
        f"end is zero. {_COUPLES}"
    )


def _placed(model: Model) -> bool:
    return any(load.at is not None or load.start is not None for load in model.inputs.loads)


@dataclass(frozen=True, slots=True)
class _Worst:
    """Where M and the area of V differ most, as part of what is allowed; largest M and V there."""

    part: float
    row: int
    span: int
    piece: Piece
    M: float
    V: float
    M_all: float


def _worst(forces: ImportedForces) -> _Worst:
    """Return the piece whose moments follow worst from its shears."""
    envelope = forces.source.imported.envelope
    found = []
    for span, pieces in enumerate(forces.pieces, start=1):
        i, j = [p.i for p in pieces], [p.j for p in pieces]
        M, V = envelope.M, envelope.V
        most_M, most_V = (np.abs(each[:, i + j]).max(axis=1) for each in (M, V))
        lengths = np.array([p.x_j - p.x_i for p in pieces])
        gaps = np.abs(M[:, j] - M[:, i] - (V[:, i] + V[:, j]) / 2 * lengths)
        M_all = float(most_M.max())
        least = np.maximum(most_M, SMALL_CASE * M_all)
        allowed = np.maximum(least[:, None], most_V[:, None] * lengths)
        parts = gaps / np.where(allowed > 0, allowed, np.inf)
        row, n = (int(each) for each in np.unravel_index(int(parts.argmax()), parts.shape))
        most = float(most_M[row]), float(most_V[row]), M_all
        found.append(_Worst(float(parts[row, n]), row, span, pieces[n], *most))
    return max(found, key=lambda worst: worst.part)


def _record_closing(model: Model, forces: ImportedForces) -> None:
    """Record the statics of the piece where M and V of the file agree worst."""
    worst = _worst(forces)
    case = forces.cases[worst.row]
    steps = Steps(model.sheet, {})
    demand = Demand(worst.span, worst.piece.x_i, "right", worst.row, case, 0.0, 0.0)
    for letter in ("i", "j"):
        record_station(steps, forces, demand, worst.piece, letter, larger=False)
    source = f"{forces.source.name}, this case in span {worst.span}"
    largest = {
        "M_max": model.sheet.given("M_max", typed(worst.M, "kN.m"), source=source),
        "V_max": model.sheet.given("V_max", typed(worst.V, "kN"), source=source),
        "M_all": model.sheet.given(
            "M_all",
            typed(worst.M_all, "kN.m"),
            source=f"{forces.source.name}, all cases in span {worst.span}",
        ),
    }
    test = required(
        f"abs(M_j - M_i - (V_i + V_j)/2*(x_j - x_i)) <= "
        f"{TOLERANCE}*max(M_max, V_max*(x_j - x_i), {SMALL_CASE}*M_all)",
        "kN.m", key="imported-statics", title=f"Statics where the file closes worst: {case}",
        yes="The moments of the file follow from its shears.",
    )  # fmt: skip
    bound: dict[str, Any] = dict(steps.place) | largest
    model.sheet.check(test, **bound)


def _combination_rows(forces: ImportedForces) -> Iterator[list[str]]:
    """Give the combinations with their cases, and the cases that may have been left out."""
    cases: dict[str, dict[str, None]] = {}
    for case in forces.cases:
        cases.setdefault(case.combination, {})[case.arrangement] = None
    for combination, own in cases.items():
        alike = (each for each in cases.values() if each.keys() & own.keys())
        absent = {name: None for each in alike for name in each if name not in own}
        yield [combination, "; ".join(own), "; ".join(absent) or "–"]


def _case_rows(forces: ImportedForces) -> Iterator[list[str]]:
    """Give the cases that have the largest or smallest M or V of any station."""
    envelope = forces.source.imported.envelope
    rows = {
        int(row)
        for values in (envelope.M, envelope.V)
        for row in (*values.argmax(axis=0), *values.argmin(axis=0))
    }
    for row in sorted(rows):
        M, V = envelope.M[row], np.abs(envelope.V[row])
        places = int(M.argmax()), int(M.argmin()), int(V.argmax())
        values = (M[places[0]], "kN.m"), (M[places[1]], "kN.m"), (V[places[2]], "kN")
        case = forces.cases[row]
        made = [case.combination, case.arrangement]
        for (value, unit), column in zip(values, places, strict=True):
            at = envelope.stations[column]
            made += [printed(float(value), unit), f"span {at.span}, {at.x / 1000:.2f} m"]
        yield made


def imported_reactions(model: Model) -> tuple[list[str], list[list[str]]]:
    """Return columns and rows of the largest and smallest reaction of every support, by case."""
    forces = model.imported
    if forces is None:
        msg = "the forces are not imported"
        raise TypeError(msg)
    made = []
    for number, support in enumerate(model.inputs.supports, start=1):
        if support.kind == "free":
            continue
        R = _reactions_of(forces, number)
        high, low = int(np.argmax(R)), int(np.argmin(R))
        made.append([
            str(number),
            printed(R[high], "kN"), str(forces.cases[high]),
            printed(R[low], "kN"), str(forces.cases[low]),
        ])  # fmt: skip
    return list(_REACTION_COLUMNS), made


def _reactions_of(forces: ImportedForces, support: int) -> Sequence[float]:
    """Return the reaction of every case: of the file, else the jump of V."""
    given = forces.source.reactions
    if given is not None:
        return [given[case][support - 1] for case in forces.cases]
    jumps: list[float] = forces.solved.solution.reactions[:, support - 1].tolist()
    return jumps


def _reactions_text(file: ForcesFile) -> str:
    origin = (
        f"from {file.reactions_name}"
        if file.reactions is not None
        else "the jumps of V over the supports; no file of reactions was given"
    )
    return (
        f"Reactions: {origin}. They are of the cases as imported; reactions by load type, "
        "unfactored, for the design of what carries the beam are to be taken from the frame "
        "analysis."
    )
