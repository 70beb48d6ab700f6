"""The governing tables of the summary: per span and face what governs, asked for and provided."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator, Mapping
from dataclasses import dataclass

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.bars import bars_text
from lineproof.beams.continuous.deflection_service import deflection_key
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.developed import bars_of, developed_key
from lineproof.beams.continuous.faces import (
    Face,
    faces_of,
    has_sag,
    hogging,
    nominally_simple,
    sagging_spans,
)
from lineproof.beams.continuous.imported_record import imported_reactions
from lineproof.beams.continuous.model import ANALYSIS, Model
from lineproof.beams.continuous.restraint import worst_case
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.symbols import KINDS, code
from lineproof.record import Entry
from lineproof.record.printing import in_unit, utilisation
from lineproof.record.utilisation import printed_ratio, sides_for_ratio
from lineproof.standards.a23_3 import crack_control, deflection_stages, flexure, minimum, shear

FLEXURE = ["Place", "Load case", "M_f, kN.m", "A_sr, mm2", "Bars", "A_s, mm2", "M_r, kN.m", "Ratio"]
FLEXURE_WIDTHS = (23.0, 41.0, 13.0, 13.0, 30.0, 13.0, 13.0, 0.0)
SHEAR = ["Place", "Load case", "Stirrups", "V_f, kN", "V_c, kN", "V_s, kN", "V_r, kN", "Ratio"]
SHEAR_WIDTHS = (28.0, 42.0, 20.0, 13.0, 13.0, 13.0, 13.0, 0.0)
SERVICE = ["Place", "Check", "Demand", "Limit", "Ratio"]
PAIR = 2
NONE = "–"
"""A cell of numbers where there is none."""
_DIGITS = 3
"""Digits that a value of a summary shows at least."""
SERVICE_WIDTHS = (32.0, 62.0, 24.0, 24.0, 0.0)


@dataclass(frozen=True, eq=False, slots=True)
class Row:
    """A row of a table with the entry it shows."""

    cells: tuple[str, ...]
    entry: Entry | None


def short_case(case: object) -> str:
    """Return a load case as a narrow column shows it: ``1.25D + 1.5L, L on 1, 3``."""
    text = str(case)
    for words in ("live load on spans ", "live load on span "):
        text = text.replace(words, "L on ")
    return text


def printed(value: float, unit: str, digits: int = _DIGITS) -> str:
    """Return a value as a summary prints it."""
    return in_unit(value, unit, digits)


def ratio_text(check: Entry) -> str:
    """Return the utilisation of a check, FAILS where it does not hold."""
    return _ratio_of(check, *printed_sides(check, check.source.unit))


def printed_sides(check: Entry, unit: str) -> tuple[str, str]:
    """Return demand and resistance of a check, with the digits that its ratio needs."""
    sides, sign = check.value, check.source.sign
    digits = sides_for_ratio(sign, unit, sides, [_DIGITS, _DIGITS], holds=bool(check))
    left, right = (printed(side, unit, n) for side, n in zip(sides, digits, strict=True))
    return (right, left) if sign in (">=", ">") else (left, right)


def _ratio_of(check: Entry, demand: str, resistance: str) -> str:
    used = utilisation(check)
    shown = ""
    if used is not None:
        shown = printed_ratio(used, "<=", demand, resistance, holds=bool(check))
    return shown or NONE if check else f"{shown} FAILS".strip()


def flexure_rows(design: Design) -> Iterator[Row]:
    """Give a row for every span and every face of a support, from left to right."""
    model = design.model
    faces = faces_of(model)
    spans = set(sagging_spans(model))
    for span in range(1, model.spans + 1):
        yield from (
            _hog(design, face) for face in faces if face.support == span and face.side == "right"
        )
        if span in spans:
            yield _sag(design, span)
        yield from (
            _hog(design, face) for face in faces if face.support == span + 1 and face.side == "left"
        )


def _sag(design: Design, span: int) -> Row:
    model = design.model
    entries = model.sheet.entries_of(f"sag-{span}")
    counted = entries | bars_of(model.sheet, f"sag-{span}")
    text = bars_text(design.bottom_bars(span)) or "none"
    if not has_sag(model, span):
        A_s = printed(counted["A_s"].value, "mm2")
        M_r = printed(entries["M_r"].value, "kN.m")
        cells = (f"span {span}", "no tension at the bottom", "", "", text, A_s, M_r, "")
        return Row(cells, None)
    case = short_case(model.forces.sag(span).case)
    return _moment_row(f"span {span}", case, entries, counted, text)


def _hog(design: Design, face: Face) -> Row:
    model = design.model
    entries = model.sheet.entries_of(face.key)
    name = f"support {face.support}, {face.side}"
    if flexure.STRENGTH.key not in entries:
        return Row((name, "no tension at the top", "", "", "", "", "", ""), None)
    if nominally_simple(model, face):
        worst_load = model.forces.cases[worst_case(model, face.span)[1]]
        case = f"restraint: {short_case(worst_load)}"
    else:
        case = short_case(model.forces.hog(face.support, face.side).case)
    own, bars = own_face(model, face), bars_at(model, face)
    return _moment_row(name, case, entries, bars, _top_text(design, own))


def _top_text(design: Design, face: Face) -> str:
    """Name the top bars whose area stands beside them: those of a face, or all that count there.

    Of an end support these may be more than those chosen for it: bars of the next one that run on.
    """
    top = design.top_bars(face)
    parts = {part.key for part in design.model.sheet.parts}
    if top is None or design.given or developed_key(face.key) not in parts:
        return str(top or "none")
    web: dict[int, Counter[str]] = {}
    beside: Counter[str] = Counter()
    for run in (each.run for each in design.top_counted(face)):
        group = beside if run.outside else web.setdefault(run.layer, Counter())
        group[run.size] += run.number
    where = "in each overhang" if top.sides > 1 else "in the overhang"
    texts = [" / ".join(_named(web[layer]) for layer in sorted(web))]
    texts += [f"{number // top.sides}-{size} {where}" for size, number in beside.items()]
    return ", ".join(texts)


def _named(bars: Mapping[str, int]) -> str:
    return " + ".join(f"{number}-{size}" for size, number in sorted(bars.items(), reverse=True))


def own_face(model: Model, face: Face) -> Face:
    """Return the face in whose part the bars of a face are recorded: its own, or the other one."""
    own = "bars-text" in model.sheet.entries_of(face.key)
    return face if own else _worst_face(model, face)


def bars_at(model: Model, face: Face) -> dict[str, Entry]:
    """Return the entries of the bars at a face with their resistance, from where they stand."""
    key = own_face(model, face).key
    return model.sheet.entries_of(key) | bars_of(model.sheet, key)


def _worst_face(model: Model, face: Face) -> Face:
    """Return the other face, in whose part the bars of both are recorded."""
    return max(
        (f for f in faces_of(model) if f.support == face.support and f != face),
        key=lambda f: hogging(model, f),
    )


def _moment_row(
    name: str, case: str, own: Mapping[str, Entry], bars: Mapping[str, Entry], text: str
) -> Row:
    check = own[flexure.STRENGTH.key]
    # Worked at one face only: the other's area would stand beside a moment that it is not of.
    needed = printed(own["A_sr"].value, "mm2") if "A_sr" in own else NONE
    M_f, M_r = printed_sides(check, "kN.m")
    cells = (
        name, case, M_f, needed, text,
        printed(bars["A_s"].value, "mm2"), M_r, _ratio_of(check, M_f, M_r),
    )  # fmt: skip
    return Row(cells, check)


def place_of(section: ShearSection) -> str:
    """Say where a section of shear lies."""
    if section.place == "station":
        return f"span {section.span}, {section.distance / 1000:.2f} m from {section.end}"
    return f"span {section.span}, {section.end} end"


def shear_rows(design: Design) -> Iterator[Row]:
    """Give a row for every section of shear that is printed."""
    sheet = design.model.sheet
    for section in (each for row in design.stirrups.sections for each in row):
        entries = sheet.entries_of(section.key)
        check = entries.get(shear.STRENGTH.key)
        forces = ("V_f", "V_c", "V_s", "V_r")
        shown = {n: printed(entries[n].value, "kN") for n in forces if n in entries}
        if check is not None:
            shown["V_f"], shown["V_r"] = printed_sides(check, "kN")
        values = [shown.get(n, "") for n in forces]
        place = place_of(section)
        basis = design.stirrups.basis
        legs = "" if basis.legs == PAIR else f"{basis.legs} legs "
        spaced = f"{legs}{basis.stirrup} at {section.spacing:g}" if not section.plain else "none"
        ratio = ratio_text(check) if check is not None else "FAILS"
        yield Row((place, short_case(section.demand.case), spaced, *values, ratio), check)


_SERVICE_CHECKS = (
    crack_control.CRACKS.key, minimum.BY_AREA.key, minimum.BY_CRACKING.key, minimum.WAIVER.key,
)  # fmt: skip


def service_rows(model: Model) -> Iterator[Row]:
    """Give a row for crack control, minimum bars and deflection of every place."""
    parts = {part.key: part for part in model.sheet.parts}
    for span in sagging_spans(model):
        yield from _checks(f"span {span}", parts[f"sag-{span}"].entries)
    for face in faces_of(model):
        yield from _checks(f"support {face.support}, {face.side}", parts[face.key].entries)
    for span in range(1, model.spans + 1):
        part = parts.get(deflection_key(span))
        for key, entry in (part.entries if part is not None else {}).items():
            if entry.kind == "check" and key.startswith("deflection"):
                whole = entry.source in deflection_stages.NO_STIFFNESS
                yield _check_row(f"span {span}", entry, "kN.m" if whole else "mm")


def _checks(place: str, entries: Mapping[str, Entry]) -> Iterator[Row]:
    for key in _SERVICE_CHECKS:
        if key in entries and entries[key].kind == "check":
            yield _check_row(place, entries[key], entries[key].source.unit)


def _check_row(place: str, check: Entry, unit: str) -> Row:
    sides = printed_sides(check, unit)
    shown = tuple(f"{side} {unit_word(unit)}".strip().replace("-", "−") for side in sides)
    title = (check.extra or {}).get("title") or check.source.title
    return Row((place, title, *shown, _ratio_of(check, *sides)), check)


def unit_word(unit: str) -> str:
    """Return a unit as plain text of a table."""
    return unit.replace("mm2", "mm²").replace(".", "·")


def reaction_table(model: Model) -> tuple[list[str], list[Row]]:
    """Return the unfactored reactions by load type, for whoever designs what carries the beam.

    Of forces that were brought in, the largest and smallest reaction of their cases.
    """
    if model.imported is not None:
        columns, found = imported_reactions(model)
        return columns, [Row(tuple(row), None) for row in found]
    entries = model.sheet.entries_of(ANALYSIS)
    kinds = [
        kind for kind in KINDS if any(f"R_{j}{code(kind)}" in entries for j in model.inputs.held)
    ]
    lowered = [
        kind for kind in kinds if any(f"R_m{j}{code(kind)}" in entries for j in model.inputs.held)
    ]
    columns = [
        "Support", "On",
        *(f"{'largest ' * (kind in LIVE)}R, {KINDS[kind]}, kN" for kind in kinds),
        *(f"least R, {KINDS[kind]}, kN" for kind in lowered),
    ]  # fmt: skip
    rows = []
    for j in model.inputs.held:
        cells, last = [], None
        names = [f"R_{j}{code(kind)}" for kind in kinds]
        names += [f"R_m{j}{code(kind)}" for kind in lowered]
        for name in names:
            entry = entries.get(name)
            cells.append(NONE if entry is None else printed(entry.value, "kN"))
            last = entry if entry is not None else last
        rows.append(Row((str(j), model.inputs.supports[j - 1].carrier, *cells), last))
    return columns, rows
