"""The table of torsion of the summary: threshold, stirrups, section and bars at every section."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.summary_tables import Row, place_of, printed, ratio_text, short_case
from lineproof.record import Entry
from lineproof.standards.a23_3 import shear_bars, torsion

TORSION = [
    "Place", "Load case", "T_f, kN.m", "Threshold, kN.m", "Design, kN.m", "a_v, mm2/m",
    "a_t, mm2/m", "Legs, mm2/m", "Stirrups", "Section", "Bars",
]  # fmt: skip
TORSION_WIDTHS = (22.0, 24.0, 11.0, 15.0, 12.0, 11.0, 11.0, 11.0, 0.0, 0.0, 0.0)
TITLE = "Torsion with shear: from where it counts, closed stirrups, section and bars"
_PER_METRE = 1000.0
_QUARTER = 4.0


def torsion_rows(design: Design) -> Iterator[Row]:
    """Give a row for every section of shear at which a torsion acts."""
    for section in (each for row in design.stirrups.sections for each in row):
        entries = design.model.sheet.entries_of(section.key)
        if "T_f" in entries:
            yield _row(design, section, entries)


def _row(design: Design, section: ShearSection, entries: Mapping[str, Entry]) -> Row:
    T_cr = design.model.sheet.entry(f"torsion-{section.span}/T_cr").value
    start = (
        place_of(section), short_case(section.demand.case), printed(entries["T_f"].value, "kN.m"),
        printed(T_cr / _QUARTER, "kN.m"),
    )  # fmt: skip
    check = entries.get(torsion.LEGS_PROVIDED.key)
    if check is None:
        return Row((*start, "0", "", "", "", "", "", ""), entries["T_f"])
    designed_for = entries.get(torsion.COMPATIBILITY.symbol, entries["T_f"])
    legs = (entries["a_v"].value, entries["a_t"].value, check.value[1])
    keys = (torsion.LEGS_PROVIDED.key, torsion.SECTION.key, shear_bars.TENSION_SIDE_HOLDS.key)
    cells = (
        *start, printed(designed_for.value, "kN.m"), *(f"{each * _PER_METRE:.0f}" for each in legs),
        *(ratio_text(entries[key]) if key in entries else "" for key in keys),
    )  # fmt: skip
    return Row(cells, check)
