"""The forces of one imported case at one place, as lines: the file's numbers on both sides of it.

Stations are measured from the left axis of the span, as in the file, also at its right end.
"""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.beams.analysis.arrangements import LoadCase
from lineproof.beams.continuous.forces import Demand, End
from lineproof.beams.continuous.groups import named
from lineproof.beams.continuous.imported_forces import AT, ForcesFile, ImportedForces, Piece
from lineproof.beams.continuous.model import GIVEN, Model, near_support
from lineproof.beams.continuous.symbols import notation, numbered, stated
from lineproof.beams.steps import Steps
from lineproof.formula import Symbol
from lineproof.record import Entry
from lineproof.record.printing import in_unit
from lineproof.standards.a23_3 import analysis

_SCOPE = ("x_i", "x_j", "M_i", "M_j", "V_i", "V_j", "T_i", "T_j", "w_f", "x_f", "x_s")
_DIGITS = 4


def case_symbols() -> Iterator[Symbol]:
    """Give the symbols of the two stations of the file beside a section."""
    for letter, where in (("i", "left"), ("j", "right")):
        side = f"at the station {where} of the section"
        yield numbered(f"x_{letter}", "x", letter, f"station {where} of the section, from the left")
        yield numbered(f"M_{letter}", "M", letter, f"moment {side}, imported")
        yield numbered(f"V_{letter}", "V", letter, f"shear {side}, imported")
        yield numbered(f"T_{letter}", "T", letter, f"torsion {side}, imported")
    yield numbered("x_s", "x", "s", "section, from the left axis of the span")


def record_imported(
    steps: Steps, model: Model, demand: Demand, near: End, *, x: Entry | None = None
) -> None:
    """Record inside the open part M_f and V_f of an imported case, and bind both.

    ``x`` is the distance of the section from the near support axis; left out, the place of the
    largest moment is recorded: a station, the face of the support, or between two stations where
    the moment is level. M_f and V_f are sizes, as of our own analysis.
    """
    forces = model.forces
    if not isinstance(forces, ImportedForces):
        msg = "the forces are not imported"
        raise TypeError(msg)
    model.sheet.notation = model.sheet.notation | notation(case_symbols())
    _Lines(steps, model, forces, demand, near).record(x)


class _Lines:
    """The lines of one imported case at one place."""

    def __init__(
        self, steps: Steps, model: Model, forces: ImportedForces, demand: Demand, near: End
    ) -> None:
        self.steps, self.model, self.forces = steps, model, forces
        self.demand, self.near = demand, near
        self.length = model.lengths[demand.span - 1]
        self.piece = forces.piece(demand.span, demand.x, demand.side)
        self.at = "x_f" if near == "left" else "x_s"

    def record(self, x: Entry | None) -> None:
        """Record stations, load between them, section, moment and shear."""
        loaded = self._record_stations()
        if x is None:
            x = self._record_place()
        self.steps.bind(x_f=x)
        if self.near == "right" and "x_s" not in self.steps.sheet.part_entries:
            self._line("x_s = l - x_f", "Section, from the left axis of the span")
        self._record_section(loaded=loaded)

    def _line(self, text: str, title: str, *, absent: str = "") -> Entry:
        scope = {n: e for n, e in self.steps.place.items() if n in _SCOPE and n != absent}
        scope["l"] = self.length
        made = self.steps.sheet.line(stated(text), title=title, **named(scope, text))
        self.steps.place[made.symbol] = made
        return made

    def _record_stations(self) -> bool:
        """Record the numbers of the file on both sides of the section, and the load between."""
        record_station(self.steps, self.forces, self.demand, self.piece, "i")
        record_station(self.steps, self.forces, self.demand, self.piece, "j")
        V_i, V_j = (self.steps.entry(n).value for n in ("V_i", "V_j"))
        if V_i == V_j:
            return False
        title = f"Load between the stations: {self.demand.case}"
        self._line("w_f = (V_i - V_j)/(x_j - x_i)", title)
        return True

    def _record_place(self) -> Entry:
        """Record where the largest moment stands; return its distance from the near axis."""
        x, piece = self.demand.x, self.piece
        start, end = self.forces.beam.faces(self.demand.span)
        if min(abs(x - piece.x_i), abs(x - piece.x_j)) <= AT:
            which = "x_i" if abs(x - piece.x_i) <= AT else "x_j"
            self._line(f"{self.at} = {which}", "The largest moment stands at a station of the file")
        elif x in (start, end):
            return self._record_face()
        else:
            self._line(
                f"{self.at} = (x_i + x_j)/2 + (M_j - M_i)/(w_f*(x_j - x_i))",
                "The largest moment stands where the moment is level",
            )
        if self.near == "left":
            return self.steps.entry("x_f")
        return self._line("x_f = l - x_s", "Section, from the near support axis")

    def _record_face(self) -> Entry:
        support = near_support(self.demand.span, self.near)
        return self.steps.line(
            analysis.TO_FACE, b_sn=self.model.sheet.entry(f"{GIVEN}/b_s{support}")
        )

    def _record_section(self, *, loaded: bool) -> None:
        """Record M_f and V_f at the section."""
        at, demand = self.at, self.demand
        moment = f"M_i + (M_j - M_i)*({at} - x_i)/(x_j - x_i)"
        shear = "V_i"
        if loaded:
            moment += f" + w_f*({at} - x_i)*(x_j - {at})/2"
            shear += f" - w_f*({at} - x_i)"
        top = demand.M < 0
        kind = "Negative" if top else "Positive"
        self._line(
            f"M_f = {signed(moment, negative=top)}",
            f"{kind} moment at the section: {demand.case}",
        )
        self._line(
            f"V_f = {signed(shear, negative=demand.V < 0)}", f"Shear at the section: {demand.case}"
        )


def record_station(
    steps: Steps,
    forces: ImportedForces,
    demand: Demand,
    piece: Piece,
    letter: str,
    *,
    larger: bool = True,
) -> None:
    """Record station, moment and shear of the file at one end of a piece, and bind them.

    Of a station written twice the ``larger`` moment, else the one of the piece's own side.
    """
    column = piece.i if letter == "i" else piece.j
    at = piece.x_i if letter == "i" else piece.x_j
    envelope = forces.source.imported.envelope
    row = demand.row
    of_moment = forces.moment_column(row, column) if larger else column
    sheet = steps.sheet
    given = {
        f"x_{letter}": sheet.given(
            f"x_{letter}", typed(at, "m"),
            source=f"{line_of(forces.source, row, column)}: {case_words(demand.case)}",
        ),
        f"M_{letter}": sheet.given(
            f"M_{letter}", typed(float(envelope.M[row, of_moment]), "kN.m"),
            source=line_of(forces.source, row, of_moment),
        ),
        f"V_{letter}": sheet.given(
            f"V_{letter}", typed(float(envelope.V[row, column]), "kN"),
            source=line_of(forces.source, row, column),
        ),
    }  # fmt: skip
    steps.bind(**given)


def typed(value: float, unit: str) -> str:
    """Return a number of the file [N and mm] as it is typed in a unit."""
    factor = {"m": 1e3, "kN": 1e3, "kN.m": 1e6}[unit]
    return f"{value / factor + 0.0:.12g} {unit}"


def printed(value: float, unit: str) -> str:
    """Return a number of the file to four digits; below 1 N or 1 N.mm it is round-off, and 0."""
    return in_unit(value, unit, _DIGITS) if abs(value) >= 1.0 else "0"


def line_of(file: ForcesFile, row: int, column: int) -> str:
    """Say where a number stands: file and line."""
    return f"{file.name}, line {file.imported.lines[row, column]}"


def case_words(case: LoadCase) -> str:
    """Name a case of the file: its combination and its case."""
    return f"combination {case.combination}, case {case.arrangement}"


def signed(text: str, *, negative: bool) -> str:
    """Return a sum of terms, its sign turned where it is negative."""
    return f"-({text})" if negative else text
